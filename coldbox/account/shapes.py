"""Shapes of the account: a figure of the day has the 24 clock hours last, draws before them."""

from __future__ import annotations

import numpy as np

from coldbox.physics.number import FloatArray, Number
from coldbox.units.clock import Rate, Schedule

HOURS_A_DAY = 24.0
SECONDS_AN_HOUR = 3600.0
SECONDS_A_DAY = 86400.0
NOTHING: FloatArray = np.zeros(24)


def day(value: Number) -> FloatArray:
    """A steady figure or a figure of the day as a figure of the day, (24,) or (draws, 24)."""
    spread: FloatArray = value + NOTHING
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


def daily_mean(hours: FloatArray) -> Number:
    """Mean over the day, a float or (draws,)."""
    mean = hours.mean(axis=-1)
    return float(mean) if mean.ndim == 0 else mean


def steady_mean(hours: FloatArray) -> Number:
    """Mean over the day as a steady figure that broadcasts again, a float or (draws, 1)."""
    mean = hours.mean(axis=-1, keepdims=True)
    return float(mean[0]) if mean.ndim == 1 else mean


def called(kind: str, name: str) -> str:
    """A thing's kind and name for a label, said once: "main door", "quay door", "lights, aisle", "lights"."""
    bare = name.split("[")[0]
    if kind == "door":
        return name if "door" in name else f"{name} door"
    return kind if bare in (kind, f"{kind}s", kind.removesuffix("s")) else f"{kind}, {name}"
