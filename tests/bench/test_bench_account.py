"""What an account costs, alone and for many draws. Run alone: pytest -m bench -p no:xdist -s tests/bench

Times are those of the processor, not of the clock on the wall: what others do on the machine does not count. They are
held against the start of an interpreter that imports what no command can do without, timed in the same run.
"""

from __future__ import annotations

import time
from collections.abc import Callable
from pathlib import Path

import numpy as np
import pytest
from support.processes import AGREED_FLOOR_S, floor_seconds

import coldbox
from coldbox.project.draw import numeric_paths, with_values

PROJECTS = Path(__file__).parents[2] / "projects"
LARGEST = PROJECTS / "greens-hall.toml"  # by entries; the freezer has more in the sun
SUNNIEST = PROJECTS / "long-quay-freezer.toml"
DRAWS = 10_000

pytestmark = pytest.mark.bench


def _seconds(work: Callable[[], object], times: int) -> float:
    taken = []
    for _ in range(times):
        start = time.process_time()
        work()
        taken.append(time.process_time() - start)
    return min(taken)


def _in_agreed_seconds(label: str, taken: float) -> float:
    floor = floor_seconds()
    print(f"\n{label}: {1e3 * taken:.2f} ms, {taken / floor:.3f} of the floor of {1e3 * floor:.0f} ms")
    return taken / floor * AGREED_FLOOR_S


def test_the_largest_example_is_the_largest() -> None:
    entries = {file: len(coldbox.load(coldbox.open(file)).entries) for file in PROJECTS.glob("*.toml")}
    assert max(entries, key=entries.__getitem__) == LARGEST


@pytest.mark.parametrize("file", [LARGEST, SUNNIEST], ids=lambda file: file.stem)
def test_one_account_in_memory(file: Path) -> None:
    project = coldbox.open(file)
    best = _seconds(lambda: coldbox.load(project), 500)
    assert _in_agreed_seconds(f"account of {file.stem}", best) <= 5e-3


@pytest.mark.parametrize("file", [LARGEST, SUNNIEST], ids=lambda file: file.stem)
def test_ten_thousand_draws_in_one_call(file: Path) -> None:
    project = coldbox.open(file)
    rng = np.random.default_rng(1)
    paths = numeric_paths(project)
    varied = {path: value * (1.0 - 0.02 * rng.random((DRAWS, 1))) for path, value in paths.items()}
    drawn = with_values(project, varied)
    result = coldbox.load(drawn)
    assert np.shape(result.required_capacity_w) == (DRAWS,)
    assert len(np.unique(result.required_capacity_w)) > 0.99 * DRAWS
    best = _seconds(lambda: coldbox.load(drawn), 3)
    assert _in_agreed_seconds(f"{DRAWS} draws of {file.stem}, {len(paths)} inputs varied", best) <= 2.0
