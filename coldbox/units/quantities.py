"""One number with its unit, read as the kind of the field wants it: no spread, no range."""

from __future__ import annotations

import math
import re
from collections.abc import Callable
from typing import NamedTuple

from coldbox.units.angles import read_angle
from coldbox.units.atoms import NONE, TIME, TON_OF_WHAT, Dims
from coldbox.units.kinds import KINDS, R_VALUE, Kind, kind_of_dims
from coldbox.units.numbers import read_number
from coldbox.units.plain import plain
from coldbox.units.refused import Refused
from coldbox.units.temperatures import ABSOLUTE_ZERO_C, scale
from coldbox.units.unit_text import unit


class Part(NamedTuple):
    """A number with its unit, read: the value, and the unit text to lend to a bare number beside it."""

    value: float
    unit: str
    per_day: bool = False


_R_FIRST = r"(?i)r(si)?(?:-value)?[ -]*(?=[0-9.])"
_R_PER_INCH = r"(?i)(?:r[ -]*)([0-9.]+) ?(?:/|per ) ?in(?:ch|\.)?"


def read_quantity(text: str, kind: Kind, bare: str | None) -> Part:
    """A number with a unit of the kind's dimension, R-values and "5 ft 6 in" among them.

    text: in the spelling of `plain`. kind: what is wanted. bare: the unit of a number without one, or None. Result:
    Part. Errors: Refused. Source: our own grammar. Example: read_quantity("4 in", KINDS["length"], None).value is
    0.1016.
    """
    if text[0] in "Rr":
        return _r_value(text, kind)
    value, end = read_number(text)
    written = text[end:].strip()
    if not written:
        if bare is None:
            raise Refused("has no unit")
        if bare in ("R", "RSI"):
            return Part(value * (R_VALUE if bare == "R" else 1.0), bare)
        written = plain(bare)
    several = kind.compound and any(sign in "0123456789" for sign in written)
    try:
        factor, dims = unit(written)
        if dims != kind.dims:
            raise Refused(_wrong_kind(written, kind, dims))
    except Refused as whole:
        if not several:
            raise
        try:
            return Part(_compound(text, kind), "")
        except Refused as parts:
            raise (parts if '"' in whole.reason else whole) from None
    return Part(value * factor / kind.scale, written)


def _r_value(text: str, kind: Kind) -> Part:
    if kind.name == "conductivity":
        match = re.fullmatch(_R_PER_INCH, text)
        if match and match.group(1).count(".") <= 1 and match.group(1) != "." and float(match.group(1)) > 0.0:
            return Part(0.0254 / (float(match.group(1)) * R_VALUE), "")
    start = re.match(_R_FIRST, text)
    if start is None:
        raise Refused("does not begin with a number")
    if kind.name != "resistance":
        raise Refused(f"is a thermal resistance, not {kind.label}")
    value, end = read_number(text, start.end())
    if text[end:].strip():
        return _r_with_unit(value, text[end:].strip(), start.group(1) is not None)
    return Part(value, "RSI") if start.group(1) else Part(value * R_VALUE, "R")


def _r_with_unit(value: float, written: str, metric: bool) -> Part:
    """ "RSI 4.4 m²K/W": the unit is said twice, and must be the same one."""
    factor, dims = unit(written)
    if dims != KINDS["resistance"].dims or not math.isclose(factor, 1.0 if metric else R_VALUE, rel_tol=1e-9):
        raise Refused("says its unit twice, and not the same one")
    return Part(value * factor, written)


_COMPOUND_UNIT = r"[ ]?([A-Za-z]+\.?|'|\")[ ]?(?:-(?=[0-9 ]))?,?[ ]?"


def _compound(text: str, kind: Kind) -> float:
    """Several units in a row, each smaller than the one before: 5' 6", 1 h 30 min, 5 lb 3 oz."""
    sign = -1.0 if text[0] == "-" else 1.0
    place = 1 if text[0] in "+-" else 0
    total, larger = 0.0, math.inf
    while place < len(text):
        value, end = read_number(text, place)
        if value < 0.0:
            raise Refused("has a minus in the middle")
        match = re.compile(_COMPOUND_UNIT).match(text, end)
        if match is None:
            raise Refused("has a number without a unit in it")
        factor, dims = unit(match.group(1))
        if dims != kind.dims:
            raise Refused(_wrong_kind(match.group(1), kind, dims))
        if not value * factor < larger or factor >= larger:
            raise Refused("has parts that do not grow smaller")
        total, larger, place = total + value * factor, factor, match.end()
    return sign * total / kind.scale


def _wrong_kind(written: str, kind: Kind, dims: Dims) -> str:
    if "ton" in written.lower() and re.search(r"\btons?\b", written, re.IGNORECASE) and "refrig" not in written:
        return TON_OF_WHAT
    if kind.dims == TIME and written == "m":
        return 'has "m", which is metres (write "min" for minutes)'
    other = kind_of_dims(dims)
    return f"is {other.label}, not {kind.label}" if other else f'has a unit that does not fit, "{written}"'


def _temperature(text: str, kind: Kind, bare: str | None) -> Part:
    value, end = read_number(text)
    written = text[end:].strip() or plain(bare or "")
    if not written:
        raise Refused("has no unit")
    known = scale(written)
    if known is None:
        raise Refused(_not_a_scale(written, kind))
    degree, zero = known
    if kind.reader == "difference":
        return Part(value * degree, written)
    level = value * degree + zero
    if level < ABSOLUTE_ZERO_C - 1e-9:
        raise Refused("is colder than anything can be")
    return Part(level, written)


def _not_a_scale(written: str, kind: Kind) -> str:
    dims = unit(written)[1]
    if dims == kind.dims:
        return f'has a unit that is not a temperature scale here, "{written}"'
    return _wrong_kind(written, kind, dims)


def _share(text: str, _kind: Kind, bare: str | None) -> Part:
    value, end = read_number(text)
    written = " ".join(text[end:].split()).casefold() or (bare or "")
    if written in ("%", "%rh", "% rh", "percent", "per cent", "pct", "points", "%-points", "% points"):
        return Part(value / 100.0, "%")
    if not written:
        raise Refused("has no unit")
    raise Refused(f'has "{written}" where % should stand')


_COUNTED = r"(?i)(?:passages?|openings?|times|cycles|air ?changes?|changes|ac(?=/)|x(?=/| ))(?= ?/| per| an? ) ?"


def _rate(text: str, kind: Kind, bare: str | None) -> Part:
    value, end = read_number(text)
    written = text[end:].strip() or plain(bare or "")
    if not written:
        raise Refused("has no unit")
    if written.casefold() in ("ach", "air changes", "air changes an hour"):
        written = "/h"
    if not written.startswith(("/", "1/")):
        written = re.sub(_COUNTED, "", written, count=1)
    if not written.startswith(("/", "1/", "per ", "a ", "an ")) and "^-1" not in written:
        raise Refused(f'has "{written}" where "/h" or "/day" should stand')
    factor, dims = unit(written if written[0] != "a" else "/" + written.split(" ", 1)[1])
    if dims != kind.dims:
        raise Refused(_wrong_kind(written, kind, dims))
    return Part(value * factor, written, per_day=factor < 1.0 / 43200.0)


def _daily_duration(text: str, kind: Kind, bare: str | None) -> Part:
    value, end = read_number(text)
    written = text[end:].strip() or plain(bare or "")
    if " " in written or "per" in written:
        written = re.sub(r" ?\bper\b ?| an? ", "/", written)
    upper, stroke, lower = written.partition("/")
    if not stroke:
        raise Refused("has no unit" if not written else "does not say per what")
    (above, of), (below, per) = unit(upper.strip()), unit(lower.strip())
    if of != TIME or per != TIME:
        raise Refused(f'has a unit that does not fit, "{written}"')
    return Part(value * above / below / kind.scale, written, per_day=below > 43200.0)


_RATIOS = {"kg/kg": 1.0, "lb/lb": 1.0, "g/kg": 1e-3, "gr/lb": 1 / 7000, "grains/lb": 1 / 7000}


def _humidity_ratio(text: str, kind: Kind, bare: str | None) -> Part:
    value, end = read_number(text)
    written = text[end:].strip() or plain(bare or "")
    factor = _RATIOS.get(written.replace(" ", ""))
    if factor is not None:
        return Part(value * factor, written)
    if not written:
        raise Refused("has no unit")
    dims = unit(written)[1]
    raise Refused(_wrong_kind(written, kind, dims) if dims != NONE else f'has a unit that does not fit, "{written}"')


def _number(text: str, _kind: Kind, _bare: str | None) -> Part:
    value, end = read_number(text)
    if text[end:].strip():
        raise Refused(f'has "{text[end:].strip()}" behind a plain number')
    return Part(value, "")


def _angle(text: str, kind: Kind, bare: str | None) -> Part:
    return Part(read_angle(text, kind.name, bare is not None), "°")


READ_ONE: dict[str, Callable[[str, Kind, str | None], Part]] = {
    "quantity": read_quantity,
    "temperature": _temperature,
    "difference": _temperature,
    "rate": _rate,
    "daily_duration": _daily_duration,
    "share": _share,
    "number": _number,
    "humidity_ratio": _humidity_ratio,
    "angle": _angle,
}
