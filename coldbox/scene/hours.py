"""Figures of the day: the 24 clock hours last, draws before them."""

from __future__ import annotations

import numpy as np

from coldbox.physics.number import FloatArray, Number
from coldbox.units.clock import Rate, Schedule

HOURS_A_DAY = 24.0
SECONDS_AN_HOUR = 3600.0
SECONDS_A_DAY = 86400.0
_HOURS: FloatArray = np.zeros(24)


def day(value: Number) -> FloatArray:
    """A steady figure or a figure of the day as a figure of the day, (24,) or (draws, 24)."""
    spread: FloatArray = value + _HOURS
    return spread


def over_hours(rate: Rate, hours: Schedule) -> FloatArray:
    """A rate through the day, per second in each clock hour.

    A rate per hour holds within the hours of the schedule; a rate per day is spread evenly over them, so that its
    daily sum is what was written. Shape (24,) or (draws, 24).
    """
    shares = hours.shares()
    if rate.basis == "day":
        open_hours = float(shares.sum())
        shares = shares * (HOURS_A_DAY / open_hours) if open_hours > 0 else shares
    return day(rate.per_second * shares)


def steady_mean(hours: FloatArray) -> Number:
    """Mean over the day as a steady figure that broadcasts again, a float or (draws, 1)."""
    if hours.ndim == 1:
        return float(hours.sum()) / hours.size  # half the time of numpy's own mean
    mean: FloatArray = hours.mean(axis=-1, keepdims=True)
    return mean
