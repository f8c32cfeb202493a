"""What a timeline of draws costs, against scipy in a loop. Run alone: pytest -m bench -p no:xdist -s tests/bench"""

from __future__ import annotations

import subprocess
import sys
import time

import pytest
import reference_timeline as ref
from support.processes import AGREED_FLOOR_S, ROOT, environment, floor_seconds

import coldbox
from coldbox.spread import hold

FILE = ROOT / "projects" / "net-loft-full.toml"  # a walk-in freezer; its one lot is a body of 20 cells
DRAWS = 10_000
HOURS = 72.0
LOOPED = 3

pytestmark = pytest.mark.bench


def _loop_seconds() -> float:
    """One draw of as many cells (seven walls of 12, goods of 20) by LSODA at rtol 1e-6, the least of a few."""
    outside = ref.steady(24.0)
    walls = []
    for area in (10.0, 10.0, 9.0, 9.0, 12.0, 12.0, 2.0):
        sheet, foam = ref.Layer(0.6e-3, 50.0, 7850.0, 460.0, area), ref.Layer(0.12, 0.024, 40.0, 1400.0, area)
        walls.append(ref.Wall((sheet, foam, sheet), outside, 1.03 * area, 0.97 * area))
    body = ref.Body(1500.0, -20.0, "slab", 0.15, 950.0, 6.0, ref.chen(0.72, 0.20, -1.0), (0.48, -0.85, 0.0))
    box = ref.Box(
        volume=30.0, start_c=-20.0, humidity_ratio=ref.saturated(-20.0), bodies=(body,), walls=tuple(walls),
        leaks=(ref.Leak(5.0 / 3600.0, outside, ref.steady(0.009)),),
    )  # fmt: skip
    limits = (ref.Limit(("mean", 0), -12.0),)
    times = []
    for _ in range(LOOPED):
        start = time.perf_counter()
        ref.run(box, HOURS, limits, (("air",),), per_layer=11, per_body=20, rtol=1e-6, method="LSODA")
        times.append(time.perf_counter() - start)
    return min(times)


# Between this process and the command stands a small one: a child starts with the memory of whoever forks it.
COUNTED = """
import resource, subprocess, sys, time
start = time.perf_counter()
status = subprocess.run(sys.argv[1:], stdout=subprocess.DEVNULL).returncode
print(status, time.perf_counter() - start, resource.getrusage(resource.RUSAGE_CHILDREN).ru_maxrss / 1024.0)
"""


def _command() -> tuple[float, float]:
    """Seconds and MB of its largest process of the whole command, with two processes and all results."""
    words = ["-m", "coldbox", "outage", str(FILE), "--draws", str(DRAWS), "--set", f"outage.horizon={HOURS:g} h"]
    done = subprocess.run(
        [sys.executable, "-c", COUNTED, sys.executable, *words, "--json"], cwd=ROOT, env=environment(), text=True,
        capture_output=True, check=True,
    )  # fmt: skip
    status, seconds, megabytes = done.stdout.split()
    assert status in ("0", "1")
    return float(seconds), float(megabytes)


def test_ten_thousand_draws_against_a_loop() -> None:
    """Least of two runs of the command against the least of a few of the loop's draws."""
    runs = [_command() for _ in range(2)]
    ours, megabytes = min(seconds for seconds, _ in runs), max(megabytes for _, megabytes in runs)
    loop = DRAWS * _loop_seconds()
    print(f"\n{DRAWS} draws of {HOURS:g} h: {ours:.1f} s, scipy in a loop {loop:.0f} s: {loop / ours:.0f} times faster")
    print(f"largest process {megabytes:.0f} MB; three at most")
    assert loop / ours >= 500.0
    assert 3.0 * megabytes <= 500.0


def test_every_outage_has_its_draws() -> None:
    project = coldbox.open(FILE, {"outage.horizon": f"{HOURS:g} h"})
    hold.run(project, count=0)
    taken = []
    for _ in range(3):
        start = time.process_time()
        hold.run(project, count=500)
        taken.append(time.process_time() - start)
    floor = floor_seconds()
    print(f"\n500 draws of {project.name}: {min(taken):.2f} s, {min(taken) / floor:.1f} floors of {1e3 * floor:.0f} ms")
    assert min(taken) / floor * AGREED_FLOOR_S <= 1.5
