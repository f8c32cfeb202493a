"""One value of one field: from text, or from what TOML made of it, to SI, within its bounds."""

from __future__ import annotations

import math
from typing import Any, Literal

from coldbox.errors import ColdboxError, UnitProblem
from coldbox.project.fields import Field, example
from coldbox.project.raw import Entered
from coldbox.project.words import clean, fault_of, listed, nearest
from coldbox.units import KINDS, parse, show, what_to_write
from coldbox.units.clock import Rate, Spread

System = Literal["SI", "IP"]
MOST_VALUES = 100
_Found = tuple[object, str, Spread | None, str | None]  # value, the kind it was read as, spread, currency
_YES_NO = {"true": True, "false": False, "yes": True, "no": False}


class Wrong(ColdboxError):
    """A value that will not do: the sentence says what was found and what would do."""


def from_text(field: Field, text: str, system: System = "SI", *, option: bool = False) -> Entered:
    """The value of a field from text, as `--set` and the screens take it; words, counts and yes/no too.

    field   its declaration
    text    as somebody typed it; several values with ", " or ";" between them
    system  the units that bounds are told in
    option  whether it was typed with `--set`
    result  the value in SI, with no line
    raises  Wrong
    """
    return _entered(_read(field, text, system), text, None, option=option)


def from_toml(field: Field, value: object, source: str, line: int | None, system: System = "SI") -> Entered:
    """The value of a field from what TOML made of it.

    field   its declaration
    value   as tomllib gives it
    source  how it stands in the file; only of a value that is no text
    line    where it stands
    system  the units that bounds are told in
    result  the value in SI
    raises  Wrong
    """
    if isinstance(value, str):
        if field.kind in ("count", "yes_no"):
            raise Wrong(f'"{clean(value)}" is text. {advice(field)}')
        return _entered(_read(field, value, system), value, line)
    if isinstance(value, list) and field.many:
        for item in value[:MOST_VALUES]:
            if not isinstance(item, str):
                raise Wrong(f"{_shown(item, clean(plain(item)))} stands in a list of texts. {advice(field)}")
        return _entered(_several(field, value, system), ", ".join(value), line)
    return _entered(_bare(field, value, source, system), plain(value), line)


def _bare(field: Field, value: object, source: str, system: System) -> _Found:
    """A value of TOML that is no text."""
    shown = _shown(value, clean(source))
    if isinstance(value, bool):
        if field.kind == "yes_no":
            return value, "yes_no", None, None
        raise Wrong(f"{shown} is yes or no, not {_label(field)}. {advice(field)}")
    if isinstance(value, (int, float)) and not field.many:
        return _number(field, value, shown, system)
    if isinstance(value, (int, float, dict, list)):
        raise Wrong(f"{shown} stands where {_label(field)} is due. {advice(field)}")
    if field.kind in ("count", "number", "yes_no"):  # dates and clock times are the only kinds left
        raise Wrong(f"{shown} is a date or time, not {_label(field)}. {advice(field)}")
    raise Wrong(f'{shown} stands without quotes. Put it in quotes: {field.key} = "{shown}".')


def split(text: str) -> list[str]:
    """The parts of a text that holds several values: `;`, or a comma and a blank, stands between them."""
    return [part.strip() for part in text.replace(";", ", ").split(", ")]


def advice(field: Field) -> str:
    """What would do, as a sentence."""
    kind = KINDS.get(field.kind)
    if field.kind == "word":
        return f"Write {'any of ' if field.many else ''}{listed(field.choices)}."
    if field.kind == "yes_no":
        return f"Write true or false, without quotes: {field.key} = true."
    if field.kind == "count":
        return f"Write a whole number, without quotes: {field.key} = {max(int(field.low or 0), 1)}."
    if field.kind == "name":
        return f'Write a name in quotes: {field.key} = "…".'
    if field.kind == "text" or kind is None:
        return f'Write text in quotes: {field.key} = "…".'
    if field.many:
        return f"Write {'three' if field.many == 'three' else 'them'} in a list: {example(field)}."
    if field.other_kind:
        other = KINDS[field.other_kind]
        return f'Write {kind.label} or {other.label}, such as "{kind.examples[0]}" or "{other.examples[0]}".'
    return what_to_write(kind)


def bounds(field: Field, system: System = "SI") -> tuple[str, str]:
    """The lowest and highest value, as one would type them."""
    return _bound(field, field.low, system), _bound(field, field.high, system)


def _bound(field: Field, value: float | None, system: System) -> str:
    if value is None:
        return ""
    if field.kind in ("count", "month"):
        return str(int(value))
    if field.kind in ("rate", "daily_duration"):
        return show(Rate(value, "hour" if field.kind == "rate" else "day"), field.kind, system)
    return show(value, field.kind, system)


def _entered(found: _Found, text: str, line: int | None, *, option: bool = False) -> Entered:
    value, kind, spread, currency = found
    return Entered(value=value, text=text, line=line, spread=spread, option=option, currency=currency, kind=kind)


def _read(field: Field, text: str, system: System) -> _Found:
    return _several(field, split(text), system) if field.many else _one(field, text, system)


def _several(field: Field, parts: list[str], system: System) -> _Found:
    if field.many == "three" and len(parts) != 3:
        raise Wrong(f"There {'is one value' if len(parts) == 1 else f'are {len(parts)} values'} here. {advice(field)}")
    if len(parts) > MOST_VALUES:
        raise Wrong(f"There are {len(parts)} values here; {MOST_VALUES} are the most that make sense.")
    found = [_one(field, part, system) for part in parts]
    if any(one[2] is not None for one in found):
        raise Wrong("A value in a list takes no ±. Write it without.")
    return tuple(one[0] for one in found), field.kind, None, None


def _one(field: Field, text: str, system: System) -> _Found:
    kind = field.kind
    if kind in ("text", "name"):
        fault = fault_of(field, text)
        if fault is not None:
            raise Wrong(f'"{clean(text)}" {fault}')
        return text, kind, None, None
    if kind == "word":
        return _choice(field, text), kind, None, None
    if kind == "yes_no":
        answer = _YES_NO.get(text.strip().lower())
        if answer is None:
            raise Wrong(f'"{clean(text)}" is neither yes nor no. Write true or false.')
        return answer, kind, None, None
    return _quantity(field, text, system)


def _choice(field: Field, text: str) -> str:
    if text in field.choices:
        return text
    word = " ".join(text.split()).casefold()
    for choice in field.choices:
        if choice.casefold() == word:
            return choice
    near = nearest(text, field.choices)
    hint = f' Nearest: "{near}".' if near and len(field.choices) > 4 else ""
    raise Wrong(f'"{clean(text)}" is not among the words for this.{hint} {advice(field)}')


def _quantity(field: Field, text: str, system: System) -> _Found:
    if field.table == "spreads":  # half-widths are often written with their sign
        text = text.strip().removeprefix("±").removeprefix("+/-")
    try:
        reading = parse(text, f"{field.kind}|{field.other_kind}" if field.other_kind else field.kind)
    except UnitProblem as problem:
        raise Wrong(f'"{clean(text)}" {problem.advice}') from None
    _check(field, reading.value, reading.kind, f'"{clean(text)}"', system)
    return reading.value, reading.kind, reading.spread, reading.currency


def _number(field: Field, value: int | float, shown: str, system: System) -> _Found:
    """A bare number: right for a count or a plain number, else the sentence about its missing unit."""
    kind = field.kind
    if isinstance(value, float) and not math.isfinite(value):
        raise Wrong(f"{shown} is no number to compute with. {advice(field)}")
    if kind == "count":
        if isinstance(value, float):
            raise Wrong(f"{shown} is not a whole number. {advice(field)}")
        _check(field, value, kind, shown, system)
        return value, kind, None, None
    if kind in ("number", "month"):
        if isinstance(value, float) and kind == "month":
            raise Wrong(f"{shown} is not a month. {advice(field)}")
        _check(field, value, kind, shown, system)
        return (value if kind == "month" else float(value)), kind, None, None
    if kind in ("text", "name", "word"):
        raise Wrong(f"{shown} is a number where {_label(field)} is due. {advice(field)}")
    try:
        parse(shown, kind)
    except UnitProblem as problem:
        raise Wrong(f"{shown} {problem.advice}") from None
    raise Wrong(f"{shown} is a bare number. {advice(field)}")


def _check(field: Field, value: Any, kind: str, shown: str, system: System) -> None:
    """Whether a value is finite and within the bounds of its field."""
    size = value.per_second if isinstance(value, Rate) else value
    if not isinstance(size, (int, float)):
        return  # hours: they carry no size
    if isinstance(size, float) and not math.isfinite(size):
        raise Wrong(f"{shown} is no number to compute with. {advice(field)}")
    if kind != field.kind:
        if size < 0:
            raise Wrong(f"{shown} is below zero. {advice(field)}")
        return
    low, high = field.low, field.high
    if low is not None and high is not None and not low <= size <= high:
        label = "a whole number" if field.kind == "count" else _label(field)
        lowest, highest = bounds(field, system)
        if low == high:
            raise Wrong(f"{shown} will not do. Write {field.key} = {lowest}.")
        raise Wrong(f"{shown} is too {'low' if size < low else 'high'}. Write {label} from {lowest} to {highest}.")


def _label(field: Field) -> str:
    if field.many:
        return "a list of texts"
    if field.kind == "name":
        return "a name"
    kind = KINDS.get(field.kind)
    return kind.label if kind is not None else "text"


def _shown(value: object, source: str) -> str:
    """How a value that is no text is named in a sentence."""
    if isinstance(value, dict):
        return "A table"
    if isinstance(value, list):
        return "A list"
    return source


def plain(value: object) -> str:
    """A value as somebody would have typed it, quotes apart."""
    if isinstance(value, list):
        return ", ".join(str(item) for item in value)
    return str(value).lower() if isinstance(value, bool) else str(value)
