"""Shapes of the account: a figure of the day has the 24 clock hours last, draws before them."""

from __future__ import annotations

import numpy as np

from coldbox.physics.number import FloatArray
from coldbox.scene.hours import HOURS_A_DAY, SECONDS_A_DAY, SECONDS_AN_HOUR, day, over_hours, steady_mean

__all__ = [
    "HOURS_A_DAY", "NOTHING", "SECONDS_AN_HOUR", "SECONDS_A_DAY", "called", "day", "over_hours",
    "steady_mean",
]  # fmt: skip

NOTHING: FloatArray = np.zeros(24)


def called(kind: str, name: str) -> str:
    """A thing's kind and name for a label, said once: "main door", "quay door", "lights, aisle", "lights"."""
    bare = name.partition("[")[0]
    if kind == "door":
        return name if "door" in name else f"{name} door"
    return kind if bare in (kind, f"{kind}s", kind.removesuffix("s")) else f"{kind}, {name}"
