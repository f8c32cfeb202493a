"""Heat that living produce gives off."""

from __future__ import annotations

import math
from collections.abc import Sequence
from typing import Final

import numpy as np

from coldbox.errors import OutOfValidity
from coldbox.physics.number import FloatArray, Number

ABOVE_K: Final = 15.0  # how far the line through the last two points is followed
BELOW_K: Final = 30.0  # and that through the first two: towards less heat, until what lives freezes
J_PER_MG: Final = 10.7  # heat per mg of carbon dioxide given off
BECKER_FRICKE_LOW_C: Final = 0.0
BECKER_FRICKE_HIGH_C: Final = 30.0


def heat(at_c: Sequence[Number] | FloatArray, w_per_kg: Sequence[Number] | FloatArray, temperature_c: Number) -> Number:
    """Heat of respiration between measured points, W/kg.

    ln w is a straight line in temperature between neighbouring points (so w grows by one factor per kelvin), and the
    outermost two lines are followed beyond the points, 30 K down and 15 K up.

    at_c: two temperatures or more, rising, °C. w_per_kg: the heat at each, above 0, W/kg. Each is one number or an
    array that broadcasts with temperature_c, °C. Result: their common shape.
    Valid from 30 K below the first to 15 K above the last point; raises OutOfValidity beyond, for points that do not
    rise, and for a heat not above 0.
    Source: exponential growth with temperature, the usual form between rates tabled in USDA Agriculture Handbook 66.

    >>> round(float(heat([0.0, 10.0], [0.01, 0.04], 5.0)), 4)
    0.02
    """
    _check(at_c, w_per_kg)
    low, high = at_c[0] - BELOW_K, at_c[-1] + ABOVE_K
    beyond = np.greater(np.maximum(low - temperature_c, temperature_c - high), 1e-9)
    if beyond.any():
        worst = float(np.broadcast_to(temperature_c, beyond.shape)[beyond].flat[0])
        raise OutOfValidity(
            "temperature", worst, float(np.max(low)), float(np.min(high)), "°C", "Respiration by these points"
        )
    logs = [math.log(value) if isinstance(value, float) else np.log(value) for value in w_per_kg]
    slopes = [(logs[i + 1] - logs[i]) / (at_c[i + 1] - at_c[i]) for i in range(len(at_c) - 1)]
    line = logs[0] + slopes[0] * (temperature_c - at_c[0])
    for i in range(1, len(slopes)):
        line = line + (slopes[i] - slopes[i - 1]) * np.maximum(temperature_c - at_c[i], 0.0)
    result: Number = np.exp(line)
    return result


def from_carbon_dioxide(mg_per_kg_h: Number) -> Number:
    """Heat of respiration from the carbon dioxide given off, W/kg.

    w = 10.7 J/mg · r / 3600 s

    mg_per_kg_h: r, mg of carbon dioxide per kg and hour, any shape. Result: the same shape.
    Valid for respiration of sugars; raises OutOfValidity for a negative rate.
    Source: ASHRAE Handbook, Refrigeration, chapter Thermal properties of foods; USDA Agriculture Handbook 66 has
    61 kcal per tonne and day for each mg/(kg h), which is 0.5 % less.
    """
    if np.any(np.less(mg_per_kg_h, 0.0)):
        raise OutOfValidity(
            "carbon dioxide", float(np.min(mg_per_kg_h)), 0.0, np.inf, "mg/(kg h)", "Heat of respiration"
        )
    return J_PER_MG / 3600.0 * mg_per_kg_h


def becker_fricke(f: Number, g: Number, temperature_c: Number) -> Number:
    """Heat of respiration by a fitted power law, W/kg.

    w = 10.7/3600 · f (9 t / 5 + 32)^g

    f, g: coefficients of the commodity. temperature_c: t, °C. All broadcast; so does the result.
    Valid from 0 to 30 °C; raises OutOfValidity beyond.
    Source: Becker, Misra and Fricke (1996); ASHRAE Handbook, Refrigeration, chapter Thermal properties of foods, from
    memory.

    >>> round(1000 * float(becker_fricke(5.6871e-4, 2.5977, 0.0)), 1)
    13.7
    """
    if np.any(np.less(temperature_c, BECKER_FRICKE_LOW_C)) or np.any(np.greater(temperature_c, BECKER_FRICKE_HIGH_C)):
        low = np.any(np.less(temperature_c, BECKER_FRICKE_LOW_C))
        worst = float(np.min(temperature_c) if low else np.max(temperature_c))
        raise OutOfValidity(
            "temperature", worst, BECKER_FRICKE_LOW_C, BECKER_FRICKE_HIGH_C, "°C", "Becker, Misra and Fricke (1996)"
        )
    return from_carbon_dioxide(f * (np.multiply(temperature_c, 1.8) + 32.0) ** g)


def _check(at_c: Sequence[Number] | FloatArray, w_per_kg: Sequence[Number] | FloatArray) -> None:
    """Raises OutOfValidity unless there are two points or more, temperatures rise and every heat is above 0."""
    name = "Respiration by points"
    if len(at_c) < 2 or len(at_c) != len(w_per_kg):
        raise OutOfValidity("the number of points", float(min(len(at_c), len(w_per_kg))), 2.0, np.inf, "", name)
    for i in range(1, len(at_c)):
        step = at_c[i] - at_c[i - 1]
        if not (step > 0.0 if isinstance(step, float) else np.all(step > 0.0)):
            raise OutOfValidity("the step from point to point", float(np.min(step)), 0.0, np.inf, "K", name)
    for value in w_per_kg:
        if not (value > 0.0 if isinstance(value, float) else np.all(np.greater(value, 0.0))):
            raise OutOfValidity("the heat at a point", float(np.min(value)), 0.0, np.inf, "W/kg", name)
