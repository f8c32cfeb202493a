"""Temperature scales: a level has a zero point, a difference has none."""

from __future__ import annotations

from coldbox.units.atoms import DEGREE_F
from coldbox.units.refused import Refused

ABSOLUTE_ZERO_C = -273.15

# One degree in kelvin, and 0 of the scale in °C.
_SCALES: dict[str, tuple[float, float]] = {
    "c": (1.0, 0.0),
    "celsius": (1.0, 0.0),
    "f": (DEGREE_F, -32.0 * DEGREE_F),
    "fahrenheit": (DEGREE_F, -32.0 * DEGREE_F),
    "k": (1.0, ABSOLUTE_ZERO_C),
    "kelvin": (1.0, ABSOLUTE_ZERO_C),
    "kelvins": (1.0, ABSOLUTE_ZERO_C),
}
_DIRECT = {"°C": _SCALES["c"], "°F": _SCALES["f"], "K": _SCALES["k"]}


def scale(unit: str) -> tuple[float, float] | None:
    """One degree in kelvin and the scale's 0 in °C; None when the text is no temperature scale.

    unit: "°C", "C", "deg F", "° C", "degrees celsius", "K" … Result: K, °C. Errors: Refused where the scale is left
    out. Source: definitions of the Celsius and Fahrenheit scales. Example: scale("°F") is (5/9, -17.777…).
    """
    known = _DIRECT.get(unit)
    if known is not None:
        return known
    word = unit.casefold().replace(" ", "")
    for mark in ("degrees", "degree", "deg.", "deg", "°"):
        if word.startswith(mark) or word.endswith(mark):
            word = word.removeprefix(mark).removesuffix(mark)
            if not word:
                raise Refused("has degrees without their scale (write °C or °F)")
            break
    return _SCALES.get(word)
