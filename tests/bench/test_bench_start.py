"""What a start costs, against what cannot be done without. Run alone: pytest -m bench -p no:xdist -s tests/bench"""

from __future__ import annotations

import os
import statistics
import subprocess
import sys
import time
from collections.abc import Sequence
from pathlib import Path

import pytest

ROOT = Path(__file__).parents[2]
FILE = "projects/greens-hall.toml"  # the largest example
PAIRS = 15

pytestmark = pytest.mark.bench


def _environment() -> dict[str, str]:
    """As a user has it: compiled modules are kept."""
    kept = {key: value for key, value in os.environ.items() if key != "PYTHONDONTWRITEBYTECODE"}
    return {**kept, "PYTHONPATH": str(ROOT)}


def _seconds(command: Sequence[str]) -> float:
    start = time.perf_counter()
    subprocess.run([sys.executable, *command], cwd=ROOT, env=_environment(), stdout=subprocess.DEVNULL, check=True)
    return time.perf_counter() - start


def _ratio(label: str, ours: Sequence[str], floor: Sequence[str]) -> float:
    """Least of ours against least of the floor, taken in turns; the middle of the pairs is printed beside it."""
    for command in (ours, floor):
        _seconds(command)
    pairs = [(_seconds(ours), _seconds(floor)) for _ in range(PAIRS)]
    least = [min(times) for times in zip(*pairs, strict=True)]
    middle = statistics.median(one / other for one, other in pairs)
    ratio = least[0] / least[1]
    print(
        f"\n{label}: {ratio:.2f} of least, {middle:.2f} in the middle ({1e3 * least[0]:.0f} / {1e3 * least[1]:.0f} ms)"
    )
    return ratio


def test_a_load_against_the_imports_it_needs() -> None:
    ours = ["-m", "coldbox", "load", FILE, "--json"]
    floor = ["-c", "import numpy, tomllib, argparse"]
    assert _ratio("coldbox load --json / import numpy, tomllib, argparse", ours, floor) <= 1.6


def test_help_against_a_bare_interpreter() -> None:
    assert _ratio("coldbox --help / bare interpreter", ["-m", "coldbox", "--help"], ["-c", ""]) <= 3.0
