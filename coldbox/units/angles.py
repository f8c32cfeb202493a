"""Angles, compass points, latitudes and longitudes, from text."""

from __future__ import annotations

import re

from coldbox.units.numbers import read_number
from coldbox.units.refused import Refused

POINTS = ("N", "NNE", "NE", "ENE", "E", "ESE", "SE", "SSE", "S", "SSW", "SW", "WSW", "W", "WNW", "NW", "NNW")
_WORDS = {"north": "N", "east": "E", "south": "S", "west": "W"}
_SIDES = {"N": 1.0, "E": 1.0, "S": -1.0, "W": -1.0}
_MINUTES = r"(?a)° ?(\d{1,2}(?:\.\d+)?)' ?(?:(\d{1,2}(?:\.\d+)?)\")?"
_DEGREES = r"(?ai)(?:°|deg(?:rees?)?\.?)$"


def read_angle(text: str, kind: str, bare: bool) -> float:
    """Degrees: "180°", "SSW", "55.1° N", "55° 6' N"; south and west are negative.

    text: in the spelling of `plain`. kind: "angle", "bearing", "latitude" or "longitude". bare: whether a number
    without its sign is taken as degrees. Result: degrees. Errors: Refused. Source: our own grammar.
    Example: read_angle("14.7 W", "longitude", False) is -14.7.
    """
    point = _point(text)
    if point is not None and kind in ("angle", "bearing"):
        return point * 22.5
    value, end = read_number(text)
    rest = text[end:].strip()
    side, rest = _side(rest)
    minutes = re.fullmatch(_MINUTES, rest)
    if minutes:
        parts = float(minutes.group(1)) / 60.0 + float(minutes.group(2) or 0.0) / 3600.0
        if float(minutes.group(1)) >= 60.0 or float(minutes.group(2) or 0.0) >= 60.0:
            raise Refused("has more than 59 minutes or seconds of arc")
        value = value - parts if value < 0 or text[0] == "-" else value + parts
    elif rest and not re.fullmatch(_DEGREES, rest):
        raise Refused(f'has "{rest}" where degrees should stand')
    elif not rest and side is None and not bare:
        raise Refused("has no unit")
    return _signed(value, side, kind)


def _signed(value: float, side: str | None, kind: str) -> float:
    if side is None:
        return value
    if kind == "bearing" or (kind == "latitude") != (side in "NS") and kind != "angle":
        raise Refused(f'has "{side}" where it cannot stand')
    if value < 0.0:
        raise Refused(f'has both a minus and a "{side}"')
    return value * _SIDES[side]


def _point(text: str) -> int | None:
    word = text.upper()
    word = _WORDS.get(text.lower(), word)
    return POINTS.index(word) if word in POINTS else None


def _side(text: str) -> tuple[str | None, str]:
    last = text.rsplit(" ", 1)[-1].lower()
    if last in _WORDS:
        return _WORDS[last], text[: -len(last)].strip()
    if text[-1:].upper() in _SIDES and not text[-2:-1].isalpha():
        return text[-1].upper(), text[:-1].strip()
    return None, text
