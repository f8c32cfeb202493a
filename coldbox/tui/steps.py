"""One step up or down from a value, in the unit it is typed in: a round amount of its own size."""

from __future__ import annotations

import math
import re
from collections.abc import Sequence
from typing import Final

from coldbox.errors import UnitProblem
from coldbox.project import values
from coldbox.project.fields import Field
from coldbox.project.values import System
from coldbox.project.words import clean
from coldbox.tui.places import Refused
from coldbox.units import KINDS, compass_point, parse, show, show_clock, thin
from coldbox.units.clock_text import MONTHS

_BLANK: Final = "[ \u00a0\u2009\u202f]"
# A dash behind a letter, as in R-25, is no sign.
_NUMBER: Final = re.compile(
    rf"(?:(?<![A-Za-z])[-+\u2212])?(?:\d{{1,3}}(?:{_BLANK}\d{{3}})+(?!\d)(?:[.,]\d+)?|\d+(?:[.,]\d+)?|[.,]\d+)"
)
# Fractions, feet with inches, hours with minutes, powers of ten.
_MIXED: Final = re.compile(r"[½¼¾⅛⅜⅝⅞⅓⅔]|\d\s*[/⁄∕]\s*\d|\d\s*(?:['′’]|ft|feet|h)\s*\d|\d[eE][-+]?\d")
_WHOLE: Final = {"temperature": 1.0, "difference": 1.0, "latitude": 1.0, "longitude": 1.0, "bearing": 5.0}
_POINT_DEGREES: Final = 22.5
_QUARTER_H: Final = 0.25
_FEW_PERCENT: Final = 20.0
_LEAST: Final = 1e-6
_MOST_STEPS: Final = 10_000


def stepped(field: Field, text: str, steps: int, system: System, choices: Sequence[str] = ()) -> str:
    """The text with its number some steps up or down.

    field    its declaration
    text     as it is typed; empty: the default, or the lowest that will do, is where it begins
    steps    how many, below 0 downwards
    choices  what may be picked, for words and names: the next of them
    result   the new text, in the unit of the old one. Raises Refused where there is no way on
    """
    steps = max(-_MOST_STEPS, min(steps, _MOST_STEPS))
    if field.kind == "yes_no":
        return ("yes" if steps > 0 else "no") if not text else "no" if text in ("yes", "true") else "yes"
    if field.many or field.structural or field.kind == "hours":
        raise Refused("Several values stand here: type them.")
    if choices:
        return _next(choices, text, steps)
    if field.kind in ("text", "name", "word"):
        raise Refused("This has no steps: type it.")
    text = text if _number(text, field) else _begin(field, system)
    kind = _kind(field, text)
    if kind == "clock":
        return _clock(text, steps)
    if kind == "month":
        return MONTHS[(int(_parsed(text, kind)) - 1 + steps) % 12]
    if kind == "utc_offset":
        return show(min(max(_parsed(text, kind) + steps, -12.0), 14.0), kind, system)
    if kind == "bearing" and not text[:1].isdigit():
        return compass_point((_parsed(text, kind) + _POINT_DEGREES * steps) % 360.0)
    if _MIXED.search(text):
        text = _plainly(text, kind, system)
    found = _NUMBER.search(text)
    if found is None:
        raise Refused("This has no steps: type a value.")
    number = float(re.sub(_BLANK, "", found.group()).replace("\u2212", "-").replace(",", "."))
    moved, digits = number, 0
    for _ in range(abs(steps)):
        step = _step(field, kind, text, moved, steps > 0)
        moved += math.copysign(step, steps)
        digits = max(-math.floor(math.log10(step) + 1e-9), 0)
        moved = round(moved, digits + 2)
    if kind == "bearing":
        moved %= 360.0
    if field.kind == "count":
        moved = min(max(moved, field.low or 0.0), field.high or math.inf)
    return f"{text[: found.start()]}{_written(moved, max(digits, _decimals(found.group())))}{text[found.end() :]}"


def _next(choices: Sequence[str], text: str, steps: int) -> str:
    if text not in choices:
        if text:
            raise Refused(f'"{clean(text)}" is none of those to pick from: pick one.')
        return choices[0 if steps > 0 else -1]
    return choices[(choices.index(text) + steps) % len(choices)]


def _kind(field: Field, text: str) -> str:
    """The kind a text is read as, where a field takes two."""
    try:
        return values.from_text(field, text).kind or field.kind
    except values.Wrong:
        return field.kind


def _number(text: str, field: Field) -> bool:
    """Whether there is a value to step from."""
    try:
        values.from_text(field, text)
    except values.Wrong:
        return False
    return True


def _begin(field: Field, system: System) -> str:
    """A place to begin from where nothing stands: the default, or a value that will do."""
    if field.default and _number(field.default, field):
        return field.default
    kind = KINDS.get(field.kind)
    examples = kind.examples if kind is not None else ()
    for text in (*(examples[1:2] if system == "IP" else ()), *examples):
        if _number(text, field):
            return text
    low, _ = values.bounds(field, system)
    return low


def _parsed(text: str, kind: str) -> float:
    try:
        value = parse(text, kind).value
    except UnitProblem as problem:
        raise Refused(str(problem)) from None
    if not isinstance(value, (int, float)):
        raise Refused("This has no steps: type a value.")
    return float(value)


def _clock(text: str, steps: int) -> str:
    hours = _parsed(text, "clock")
    day = 24.0 * (hours // 24.0)
    return show_clock(day + (hours - day + _QUARTER_H * steps) % 24.0)


def _plainly(text: str, kind: str, system: System) -> str:
    """Feet with inches, hours with minutes, fractions and powers of ten: in one unit, as they are shown."""
    feet = kind == "length" and any(mark in text for mark in ("'", '"', "′", "″", "ft", "in", "feet"))
    value = _parsed(text.partition("±")[0].strip(), kind)
    if kind == "length" and (feet or system == "IP"):
        return f"{thin(value / 0.0254, 6)} in"
    if kind == "duration":
        return f"{thin(value / 60.0, 6)} min"
    return show(value, kind, system)


def _step(field: Field, kind: str, text: str, number: float, up: bool) -> float:
    if kind == "count":
        return 1.0
    if kind in _WHOLE and field.kind != "number":
        return _WHOLE[kind]
    if kind == "share" and "%" in text:
        return 5.0 if abs(number) > _FEW_PERCENT or (abs(number) == _FEW_PERCENT and up) else 1.0
    return _size(number, up)


def _size(number: float, up: bool) -> float:
    """A round step of about a twentieth of a number; the step down is the one that leads up again."""
    if abs(number) < _LEAST:
        return 1.0
    away = up == (number > 0)
    share = abs(number) / 20.0 * (1.0 + 1e-9 if away else 1.0 - 1e-9)
    power = math.floor(math.log10(share))
    first = share / 10.0**power
    return float((1.0 if first < 2.0 else 2.0 if first < 5.0 else 5.0) * 10.0**power)


def _decimals(number: str) -> int:
    _, point, decimals = number.replace(",", ".").partition(".")
    return len(decimals) if point else 0


def _written(number: float, digits: int) -> str:
    text = f"{round(number, digits) + 0.0:.{digits}f}"
    return text.rstrip("0").rstrip(".") if "." in text else text
