"""What a start costs, against what cannot be done without. Run alone: pytest -m bench -p no:xdist -s tests/bench"""

from __future__ import annotations

import statistics
from collections.abc import Sequence

import pytest
from support.processes import FLOOR, seconds

FILE = "projects/greens-hall.toml"  # the largest example
PAIRS = 15

pytestmark = pytest.mark.bench


def _ratio(label: str, ours: Sequence[str], floor: Sequence[str]) -> float:
    """Least of ours against least of the floor, taken in turns; the middle of the pairs is printed beside it."""
    for command in (ours, floor):
        seconds(command)
    pairs = [(seconds(ours), seconds(floor)) for _ in range(PAIRS)]
    least = [min(times) for times in zip(*pairs, strict=True)]
    middle = statistics.median(one / other for one, other in pairs)
    ratio = least[0] / least[1]
    print(
        f"\n{label}: {ratio:.2f} of least, {middle:.2f} in the middle ({1e3 * least[0]:.0f} / {1e3 * least[1]:.0f} ms)"
    )
    return min(ratio, middle)  # either alone is at the mercy of one slow start


def test_a_load_against_the_imports_it_needs() -> None:
    ours = ["-m", "coldbox", "load", FILE, "--json"]
    assert _ratio("coldbox load --json / import numpy, tomllib, argparse", ours, FLOOR) <= 1.6


def test_help_against_a_bare_interpreter() -> None:
    assert _ratio("coldbox --help / bare interpreter", ["-m", "coldbox", "--help"], ["-c", ""]) <= 3.0
