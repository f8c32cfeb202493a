"""One step up or down from a value, in the unit it is typed in: a round amount of its own size."""

from __future__ import annotations

import math
import re
from typing import Final

from coldbox.project.fields import Field
from coldbox.project.origins import declaration
from coldbox.project.values import System
from coldbox.tui.document import Refused
from coldbox.units import KINDS, show

_NUMBER: Final = re.compile(r"[-+−]?\d+(?:[.,]\d+)?")
_WHOLE: Final = {"temperature": 1.0, "difference": 1.0, "angle": 5.0, "share": 5.0}  # in the unit that is typed
LEAST: Final = 1e-6


def stepped(path: str, text: str, steps: int, system: System) -> str:
    """The text with its number some steps up or down.

    path   of the field; text: as it is typed; steps: how many, below 0 downwards.
    A word goes to the next of its choices, a clock by a quarter of an hour. Raises Refused where there is no way on.
    """
    field = declaration(path)
    if field is None or field.structural:
        raise Refused("This has no steps.")
    if field.kind == "yes_no":
        return "no" if text in ("yes", "true") else "yes"
    if field.choices and not field.many:
        at = field.choices.index(text) if text in field.choices else -1
        return field.choices[(at + steps) % len(field.choices)]
    if field.kind in ("clock",) or re.fullmatch(r"\d\d?:\d\d", text):
        hours, _, minutes = text.partition(":")
        total = (int(hours) * 60 + int(minutes[:2] or 0) + 15 * steps) % 1440
        return f"{total // 60:02d}:{total % 60:02d}"
    found = _NUMBER.search(text)
    if found is None or field.many:
        text = _usual(field, system)
        found = _NUMBER.search(text)
    if found is None:
        raise Refused("This has no steps: type a value.")
    number = float(found.group().replace("−", "-").replace(",", "."))
    step = _WHOLE.get(field.kind) or (1.0 if field.kind == "count" else _size(number))
    moved = number + step * steps
    if field.kind == "count":
        moved = max(moved, field.low or 0.0)
    return f"{text[: found.start()]}{_written(moved, step)}{text[found.end() :]}"


def _usual(field: Field, system: System) -> str:
    """A place to begin from where nothing stands: the default, or the lowest that will do."""
    if field.default:
        return field.default
    if field.low is not None and field.kind in KINDS and not field.many:
        return show(field.low, field.kind, system)
    return ""


def _size(number: float) -> float:
    """A round step of about a twentieth of a number."""
    if abs(number) < LEAST:
        return 0.1
    power = math.floor(math.log10(abs(number) / 20.0))
    first = abs(number) / 20.0 / 10.0**power
    return float((1.0 if first < 2.0 else 2.0 if first < 5.0 else 5.0) * 10.0**power)


def _written(number: float, step: float) -> str:
    digits = max(-math.floor(math.log10(step) + 1e-9), 0)
    return f"{round(number, digits) + 0.0:.{digits}f}"
