"""Schedules, rates and spreads as values: what is left of a text once it has been read."""

from __future__ import annotations

from functools import lru_cache
from typing import TYPE_CHECKING, Literal, NamedTuple

import numpy as np

if TYPE_CHECKING:
    from numpy.typing import NDArray


class Span(NamedTuple):
    """A stretch of the day from `start_h` to `end_h` (0..24, start < end) at `share` (0..1)."""

    start_h: float
    end_h: float
    share: float


class Schedule(NamedTuple):
    """Stretches of the day that do not overlap, in order; a span past midnight is stored as two."""

    spans: tuple[Span, ...]

    def shares(self) -> NDArray[np.float64]:
        """Mean share in each clock hour, (24,), read-only: one array serves all who ask."""
        return _shares(self.spans)

    def hours_per_day(self) -> float:
        """Full-share hours in a day."""
        return float(self.shares().sum())


@lru_cache(maxsize=256)
def _shares(spans: tuple[Span, ...]) -> NDArray[np.float64]:
    hours = np.arange(24.0)
    total = np.zeros(24)
    for start, end, share in spans:
        total += share * np.clip(np.minimum(end, hours + 1) - np.maximum(start, hours), 0.0, 1.0)
    total.flags.writeable = False
    return total


ALWAYS = Schedule((Span(0.0, 24.0, 1.0),))
NEVER = Schedule(())


class Rate(NamedTuple):
    """A rate: `per_second` (1/s, or kg/s, or s/s) and the basis it was written on.

    A rate per hour holds within the hours of its schedule; a rate per day is spread evenly over them.
    """

    per_second: float | NDArray[np.float64]
    basis: Literal["hour", "day"]


class Spread(NamedTuple):
    """How sure a value is: `normal` (half_width holds 95 of 100) or `even` (all within half_width)."""

    shape: Literal["normal", "even"]
    half_width: float
