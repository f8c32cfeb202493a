"""The one file that knows pint: quantities handed in from Python, and units outside the whitelist.

pint is never given a whole text: it reads "500 cfm" as centifermi. It is asked for a unit's size alone, only for
units written as whole words, and its answer counts only when its dimension is the field's.
"""

from __future__ import annotations

import math
import re
from functools import lru_cache
from typing import Any

import pint

from coldbox.errors import UnitProblem
from coldbox.units.atoms import BTU, Dims
from coldbox.units.grammar import Reading, parse, what_to_write
from coldbox.units.kinds import KINDS, Kind
from coldbox.units.numbers import read_number
from coldbox.units.plain import plain
from coldbox.units.refused import Refused, quoted
from coldbox.units.temperatures import ABSOLUTE_ZERO_C

_BASES = ("[length]", "[mass]", "[time]", "[temperature]")
_WORDS_ONLY = re.compile(r"[a-z]{4,20}(?: ?(?:\^[2-4]|[*/]) ?[a-z]{4,20}| ?\^[2-4]){0,5}", re.ASCII)
_NUMERIC = ("quantity", "temperature", "difference", "humidity_ratio", "share", "number")


@lru_cache(maxsize=1)
def registry() -> pint.UnitRegistry[Any]:
    """pint's units, with the Btu of the International Table and the ton of refrigeration as this tool defines them."""
    units: pint.UnitRegistry[Any] = pint.UnitRegistry(on_redefinition="ignore")
    units.define(f"british_thermal_unit = {BTU!r} * joule = Btu = BTU")
    units.define("ton_of_refrigeration = 12000 * british_thermal_unit / hour = refrigeration_ton = ton_TR")
    return units


def from_quantity(quantity: Any, kind: str) -> float:
    """A pint quantity, of any registry, as this tool keeps that kind.

    quantity: a pint.Quantity of one number. kind: name of KINDS. Result: float in the kind's own unit (°C for a
    temperature). Validity: kinds that are plain quantities. Errors: UnitProblem where the dimension is another, the
    kind has no unit, or the number is not finite. Source: pint, with the Btu and the ton of `registry`.
    Example: from_quantity(ureg.Quantity(4, "inch"), "length") is 0.1016.
    """
    wanted = KINDS[kind]
    units = registry()
    text = quoted(f"{quantity:~}" if hasattr(quantity, "units") else repr(quantity))
    if wanted.reader not in _NUMERIC or not hasattr(quantity, "units"):
        raise UnitProblem(text, f"is not {wanted.label}. {what_to_write(wanted)}")
    try:
        own = units.Quantity(float(quantity.magnitude), units.parse_units(str(quantity.units)))
        value = _kept(own, wanted)
    except (pint.PintError, TypeError, ValueError):
        raise UnitProblem(text, f"is not {wanted.label}. {what_to_write(wanted)}") from None
    if not math.isfinite(value):
        raise UnitProblem(text, f"is not a number that can be computed with. {what_to_write(wanted)}")
    return value


def _kept(quantity: Any, kind: Kind) -> float:
    if kind.reader == "temperature":
        level = float(quantity.to("kelvin").magnitude)
        if level < 0.0:
            raise ValueError("below absolute zero")
        return level + ABSOLUTE_ZERO_C
    if kind.reader == "difference" and quantity.units in (quantity._REGISTRY.degC, quantity._REGISTRY.degF):
        raise ValueError("a level, where a difference is wanted")
    if dims_of(quantity) != kind.dims:
        raise ValueError("another dimension")
    return float(quantity.to_base_units().to(_base_unit(kind.dims)).magnitude) / kind.scale


def dims_of(quantity: Any) -> Dims | None:
    """Exponents of metre, kilogram, second and kelvin; None where pint finds another base among them."""
    found = dict(quantity.dimensionality)
    exponents = [found.pop(base, 0) for base in _BASES]
    if found or any(one != int(one) for one in exponents):
        return None
    return (int(exponents[0]), int(exponents[1]), int(exponents[2]), int(exponents[3]))


def _base_unit(dims: Dims) -> str:
    return f"meter**{dims[0]} * kilogram**{dims[1]} * second**{dims[2]} * kelvin**{dims[3]}"


def parse_with_pint(text: str, kind: str) -> Reading:
    """As `parse`, and where the whitelist does not know the unit, pint is asked for it.

    text: what was typed. kind: name of KINDS. Result: Reading without spread for what pint knew. Validity: units
    written as whole words ("2 furlong", "3 acre * foot"), since abbreviations are what pint reads wrong. Errors:
    UnitProblem, the whitelist's own where pint cannot help. Source: pint. Example: parse_with_pint("2 rod",
    "length") stays refused (too short a word); parse_with_pint("2 furlong", "length").value is 402.336….
    """
    try:
        return parse(text, kind)
    except UnitProblem:
        wanted = KINDS[kind]
        factor = None
        if wanted.reader == "quantity" and len(text) <= 120:
            factor = _word_factor(text, wanted)
        if factor is None:
            raise
        return Reading(value=factor / wanted.scale, kind=kind)


def _word_factor(text: str, kind: Kind) -> float | None:
    written = plain(text)
    try:
        value, end = read_number(written)
    except Refused:
        return None
    unit_words = written[end:].strip()
    if not _WORDS_ONLY.fullmatch(unit_words):
        return None
    try:
        one = registry().Quantity(1.0, registry().parse_units(unit_words.replace("^", "**")))
        size = float(one.to(_base_unit(kind.dims)).magnitude)
    except (pint.PintError, TypeError, ValueError, AttributeError):
        return None
    return value * size if math.isfinite(value * size) else None
