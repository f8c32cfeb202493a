"""Which input moves the answer most: what it comes to where an input is lowest and where it is highest."""

from __future__ import annotations

from typing import Final

import numpy as np

from coldbox.physics.number import FloatArray
from coldbox.record import Record
from coldbox.spread.draws import Draws

FIFTH: Final = 0.2
NOISE: Final = 3.0  # standard deviations that a swing must stand above what chance brings


class Driver(Record):
    """An input that moves the answer, in the answer's unit against the mean of all draws."""

    key: str  # key path; of a factor "spreads.foam"
    label: str
    at_lowest: float  # mean of the fifth of all draws where it is lowest, less the mean of all
    at_highest: float
    beyond: bool  # whether some draws lie beyond the horizon and count as the horizon: it may move it more than that

    @property
    def swing(self) -> float:
        """From the lowest to the highest fifth."""
        return self.at_highest - self.at_lowest


def drivers(drawn: Draws, answer: FloatArray, horizon: float = np.inf) -> tuple[Driver, ...]:
    """The inputs that move an answer more than chance does, the most moving first.

    drawn: the draws. answer: (draws,), without the middle; inf beyond the horizon. horizon: what those count as.
    Source: comparison of conditional means, as in regional sensitivity analysis.
    """
    beyond = ~np.isfinite(answer)
    counted = np.where(beyond, horizon, answer)
    if not np.all(np.isfinite(counted)) or len(counted) < 1.0 / FIFTH:
        return ()
    mean, deviation = float(counted.mean()), float(counted.std())
    each = max(1, round(FIFTH * len(counted)))
    noise = NOISE * deviation * float(np.sqrt(2.0 / each))
    found = []
    for column in drawn.columns:
        order = np.argsort(drawn.ranks[column.key], kind="stable")
        low, high = float(counted[order[:each]].mean()), float(counted[order[-each:]].mean())
        if abs(high - low) > noise:
            found.append(
                Driver(
                    key=column.key,
                    label=column.label,
                    at_lowest=low - mean,
                    at_highest=high - mean,
                    beyond=bool(beyond.any()),
                )
            )
    return tuple(sorted(found, key=lambda one: (-abs(one.swing), one.key)))
