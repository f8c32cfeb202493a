"""Text to value: one strict reading, or one sentence that says what was found and what would do.

The kind of the field decides what a text means: "9 °C" is a level in one field and a difference in another, "2.5 ton"
is refrigeration in one and refused in another. Units come from the whitelist alone.
"""

from __future__ import annotations

import math
import re
from collections.abc import Callable

from coldbox.errors import UnitProblem
from coldbox.record import Record
from coldbox.units import words
from coldbox.units.clock import Rate, Schedule, Spread
from coldbox.units.clock_text import read_clock, read_hours, read_month, read_utc_offset
from coldbox.units.kinds import KINDS, Kind
from coldbox.units.numbers import read_number
from coldbox.units.plain import plain
from coldbox.units.quantities import READ_ONE, Part, read_quantity
from coldbox.units.refused import Refused, quoted

LONGEST = 120  # signs of a quantity
LONGEST_LIST = 600  # of a row of stretches, words or shares
LONGEST_TEXT = 4000  # of a note

Value = float | int | bool | str | Rate | Schedule | tuple[object, ...]


class Reading(Record):
    """What a text says."""

    value: Value  # in SI, as its kind keeps it
    kind: str  # the one that was read, where several would do
    spread: Spread | None = None
    currency: str | None = None

    @property
    def understood(self) -> str:
        """How it was read, in SI, for saying it back."""
        from coldbox.units.show import show, show_spread

        text = show(self.value, self.kind, currency=self.currency)
        return text if self.spread is None else f"{text} {show_spread(self.spread, self.kind)}"


def parse(text: str, kind: str, *, bare: str | None = None) -> Reading:
    """The value that a text holds, in the way its kind is kept.

    text: what was typed. kind: a name of KINDS, or several with "|" between ("clock|duration"). bare: the unit that a
    number without one takes, None where that is an error. Result: Reading. Errors: UnitProblem. Source: our own
    grammar, the factors of `atoms`. Example: parse("0.022 W/mK ± 10 %", "conductivity").value is 0.022.
    """
    if "|" in kind:
        return _any_of(text, kind.split("|"), bare)
    wanted = KINDS[kind]
    try:
        return _READERS[wanted.reader](text, wanted, bare)
    except Refused as refused:
        raise UnitProblem(quoted(text), f"{refused.reason}. {what_to_write(wanted)}") from None


def what_to_write(kind: Kind) -> str:
    """The sentence "Write a length, such as …", with the kind's own examples."""
    return f"Write {kind.label}, such as {_listed(kind.examples)}."


def _listed(examples: tuple[str, ...]) -> str:
    shown = [f"{example}" if '"' in example else f'"{example}"' for example in examples]
    return shown[0] if len(shown) == 1 else f"{', '.join(shown[:-1])} or {shown[-1]}"


def _any_of(text: str, kinds: list[str], bare: str | None) -> Reading:
    problems = []
    for kind in kinds:
        try:
            return parse(text, kind, bare=bare)
        except UnitProblem as problem:
            problems.append(problem)
    reason = next((p.advice for p in problems if "has a unit" not in p.advice), problems[0].advice)
    labels = " or ".join(f"{KINDS[kind].label} such as {_listed(KINDS[kind].examples[:1])}" for kind in kinds)
    raise UnitProblem(problems[0].found, f"{reason.partition('. Write ')[0]}. Write {labels}.")


def _checked(text: str, longest: int = LONGEST) -> str:
    if len(text) > longest:
        raise Refused(f"… is too long ({len(text)} signs; {longest} are enough)")
    text = plain(text)
    if not text:
        raise Refused("is empty")
    return text


# Quantities: a number with a unit, alone, with ± or as a range.


def _numeric(read: Callable[[str, Kind, str | None], Part]) -> Callable[[str, Kind, str | None], Reading]:
    """A reader of a whole text from a reader of one number with its unit."""

    def reader(text: str, kind: Kind, bare: str | None) -> Reading:
        text = _checked(text)
        if "±" in text:
            part, spread = _with_half_width(text, kind, bare, read)
        elif " to " in text:
            part, spread = _range(text, kind, bare, read)
        else:
            part, spread = read(text, kind, bare), None
        value = part.value
        if not math.isfinite(value):
            raise Refused("is too large a number")
        if kind.reader in ("rate", "daily_duration"):
            return Reading(value=Rate(value, "day" if part.per_day else "hour"), kind=kind.name, spread=spread)
        return Reading(value=value, kind=kind.name, spread=spread)

    return reader


def _with_half_width(
    text: str, kind: Kind, bare: str | None, read: Callable[[str, Kind, str | None], Part]
) -> tuple[Part, Spread]:
    left, _, right = (part.strip() for part in text.partition("±"))
    if not left or not right or "±" in right or " to " in text:
        raise Refused("has a ± that cannot be read")
    if right.endswith("%") and kind.reader != "share":
        middle = read(left, kind, bare)
        if kind.reader == "temperature":
            raise Refused("has a ± in %, which says nothing about a temperature (write it in K or °F)")
        half, end = read_number(right)
        half = half / 100.0 * abs(middle.value)
        if right[end:].strip() != "%":
            raise Refused("has a ± that cannot be read")
    else:
        of = KINDS["difference"] if kind.reader == "temperature" else kind
        read_half = READ_ONE.get(of.reader, read)
        number, end = read_number(right)
        if _needs_unit(left) and not right[end:].strip() and bare is None and not _unitless(kind):
            raise Refused("has no unit")
        if not _needs_unit(left) or not right[end:].strip() or _unitless(kind):
            middle = read(left, kind, bare)
            half = read_half(right, of, _lent(middle.unit)).value
        else:  # "0.022 ± 0.002 W/mK"
            middle = read(left, kind, right[end:].strip())
            half = read_half(right, of, None).value
        if number < 0:
            raise Refused("has a ± below zero")
    if not math.isfinite(half) or half < 0.0:
        raise Refused("has a ± that cannot be read")
    return middle, Spread("normal", half)


def _range(
    text: str, kind: Kind, bare: str | None, read: Callable[[str, Kind, str | None], Part]
) -> tuple[Part, Spread]:
    left, _, right = text.partition(" to ")
    if " to " in right:
        raise Refused("has more than one range")
    high = read(right.strip(), kind, bare)
    low = read(left.strip(), kind, _lent(high.unit)) if _needs_unit(left.strip()) else read(left.strip(), kind, bare)
    if not low.value < high.value:
        raise Refused("has a range whose second number is not the larger one")
    half = (high.value - low.value) / 2.0
    return high._replace(value=low.value + half), Spread("even", half)


def _lent(unit_text: str) -> str | None:
    return unit_text or None


def _needs_unit(text: str) -> bool:
    """Whether a text is a number and nothing else."""
    try:
        return read_number(text)[1] == len(text)
    except Refused:
        return False


def _unitless(kind: Kind) -> bool:
    return kind.reader in ("number", "count")


# Prices.

_CURRENCY = r"(?<![A-Za-z])([A-Z]{3})(?![A-Za-z])|€"
_NO_CURRENCY = frozenset({"BTU", "MBH", "CFM", "RSI"})


def _price(text: str, kind: Kind, bare: str | None) -> Reading:
    text = _checked(text)
    if bare is not None and _needs_unit(text):
        text = f"{text} {plain(bare)}"
    found = [match for match in re.finditer(_CURRENCY, text) if match.group() not in _NO_CURRENCY]
    if any(sign in text for sign in "$£¥"):
        raise Refused("has a sign that several currencies share (write the three letters, such as USD)")
    if not found:
        raise Refused("names no currency by its three capital letters")
    if len({match.group() for match in found}) > 1:
        raise Refused("names two currencies")
    currency = found[0].group(1) or "EUR"
    rest = re.sub(_CURRENCY, lambda match: match.group() if match.group() in _NO_CURRENCY else " ", text)
    rest = re.sub(r" +", " ", rest).strip()
    if "per " not in rest and "/" not in rest:
        raise Refused("does not say per what")
    reading = _PRICED(rest, kind, None)
    return reading.replace(currency=currency)


_PRICED = _numeric(read_quantity)


# Times, angles, words.


def _plain_reader(read: Callable[[str], Value], longest: int = LONGEST) -> Callable[[str, Kind, str | None], Reading]:
    def reader(text: str, kind: Kind, _bare: str | None) -> Reading:
        return Reading(value=read(_checked(text, longest)), kind=kind.name)

    return reader


def _text(text: str, kind: Kind, _bare: str | None) -> Reading:
    return Reading(value=words.read_text(text, LONGEST_TEXT), kind=kind.name)


_READERS: dict[str, Callable[[str, Kind, str | None], Reading]] = {
    **{name: _numeric(read) for name, read in READ_ONE.items()},
    "price": _price,
    "count": _plain_reader(words.read_count),
    "clock": _plain_reader(read_clock),
    "hours": _plain_reader(read_hours, LONGEST_LIST),
    "utc_offset": _plain_reader(read_utc_offset),
    "month": _plain_reader(read_month),
    "word": _plain_reader(words.read_word),
    "words": _plain_reader(words.read_words, LONGEST_LIST),
    "yes_no": _plain_reader(words.read_yes_no),
    "composition": _plain_reader(words.read_composition, LONGEST_LIST),
    "text": _text,
}
