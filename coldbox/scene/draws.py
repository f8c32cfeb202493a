"""Numbers that may hold draws: their extremes, and many of them stacked for one call."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from coldbox.physics.number import FloatArray, Number


def least(value: Number) -> float:
    """The smallest of all draws."""
    # The array's own method: on small arrays numpy's function takes three times as long.
    return value if isinstance(value, float) else float(value) if isinstance(value, int) else float(value.min())


def most(value: Number) -> float:
    """The largest of all draws."""
    return value if isinstance(value, float) else float(value) if isinstance(value, int) else float(value.max())


def matters(figure: Number) -> bool:
    """Whether a figure is other than zero in any draw."""
    return figure != 0.0 if isinstance(figure, float | int) else bool(figure.any())


def stack(values: Sequence[Number]) -> FloatArray:
    """Steady figures of several things on a new first axis: (things, 1, 1), or (things, draws, 1)."""
    if all(isinstance(value, float | int) for value in values):
        return np.array(values, dtype=float)[:, None, None]
    return np.stack(np.broadcast_arrays(*(np.reshape(value, (-1, 1)) for value in values)))
