"""Percentiles of an answer that may lie beyond the horizon, each with its own sampling error."""

from __future__ import annotations

from typing import Final

import numpy as np

from coldbox.physics.number import FloatArray
from coldbox.record import Record
from coldbox.spread.normal import TWO_SIDED_95

SHARES: Final = (0.1, 0.5, 0.9)


class Percentiles(Record):
    """The 10th, 50th and 90th percentile of `draws` figures, and how far off each may be with so many draws.

    Errors are half-widths that hold 95 of 100 cases. None: beyond the horizon.
    """

    draws: int
    p10: float | None
    p50: float | None
    p90: float | None
    p10_error: float | None
    p50_error: float | None
    p90_error: float | None


class Chance(Record):
    """A share of draws and the half-width that holds 95 of 100 cases."""

    share: float
    error: float


def percentiles(values: FloatArray) -> Percentiles:
    """Percentiles of figures, (draws,), those beyond the horizon being inf.

    Between two figures of the sorted ones, straight: at (n - 1) p. The error is half of what lies between the
    percentiles p ± 1.96 √(p (1 - p) / n): distribution-free, for draws that know nothing of each other; Latin hypercube
    draws come closer. Source: order statistics, binomial confidence interval of a quantile.
    """
    ordered = np.sort(np.asarray(values, dtype=np.float64).ravel())
    found = [at_share(ordered, share) for share in SHARES]
    errors = [_error(ordered, share) for share in SHARES]
    return Percentiles(
        draws=len(ordered),
        p10=found[0], p50=found[1], p90=found[2],
        p10_error=errors[0], p50_error=errors[1], p90_error=errors[2],
    )  # fmt: skip


def at_share(ordered: FloatArray, share: float) -> float | None:
    """The figure that so large a share of sorted ones stays below; None where it is not finite."""
    place = (len(ordered) - 1) * min(max(share, 0.0), 1.0)
    low = int(place)
    rest = place - low
    value = float(ordered[low])
    if rest > 0.0:
        above = float(ordered[low + 1])
        value = above if not np.isfinite(above) else value + rest * (above - value)
    return value if np.isfinite(value) else None


def _error(ordered: FloatArray, share: float) -> float | None:
    off = TWO_SIDED_95 * float(np.sqrt(share * (1.0 - share) / len(ordered)))
    low, high = at_share(ordered, share - off), at_share(ordered, share + off)
    return None if low is None or high is None else 0.5 * (high - low)


def chance(holds: FloatArray, at_least: float) -> Chance:
    """The share of draws, (draws,), that come to at least so much; inf does.

    Error: half of the score interval, which also says something where all draws or none do.
    Source: Wilson 1927, Journal of the American Statistical Association 22.
    """
    count = np.size(holds)
    share = float(np.count_nonzero(np.greater_equal(holds, at_least))) / count
    z = TWO_SIDED_95
    width = z * np.sqrt(share * (1.0 - share) / count + z * z / (4.0 * count * count)) / (1.0 + z * z / count)
    return Chance(share=share, error=float(width))
