"""Clock times, hours of the day, months and offsets from UTC, from text."""

from __future__ import annotations

import re
from functools import lru_cache

from coldbox.units.clock import ALWAYS, NEVER, Schedule, Span
from coldbox.units.numbers import read_number
from coldbox.units.refused import Refused

_CLOCK = r"(?a)(\d{1,2})(?::(\d{2}))? ?(?:([aApP])\.?[mM]\.?)?"
_DAY_FIRST = r"(?ai)day (\d{1,3}),? +(?:at )?"
_DAY_LAST = r"(?ai),? +(?:on )?day (\d{1,3})$"
_OFFSET = r"(?ai)(?:UTC|GMT) ?(?:([+-]) ?(\d{1,2})(?::(\d{2})|\.(\d{1,2}))?)?"
_STRETCH = r"(?ai) ?(?:-+| to ) ?"
MONTHS = (
    "January",
    "February",
    "March",
    "April",
    "May",
    "June",
    "July",
    "August",
    "September",
    "October",
    "November",
    "December",
)
LONGEST_DAY = 31  # days that a time line may have
MOST_STRETCHES = 24


def read_clock(text: str) -> float:
    """Hours since midnight of the first day: "14:00" is 14.0, "day 2 06:00" is 30.0, "2:30 pm" is 14.5."""
    day = 1
    first = last = None
    if "day" in text.lower():
        first, last = re.match(_DAY_FIRST, text), re.search(_DAY_LAST, text)
    if first:
        day, text = int(first.group(1)), text[first.end() :]
    elif last:
        day, text = int(last.group(1)), text[: last.start()]
    if not 1 <= day <= LONGEST_DAY:
        raise Refused(f"has a day that is not between 1 and {LONGEST_DAY}")
    return _time_of_day(text.strip()) + 24.0 * (day - 1)


def _time_of_day(text: str) -> float:
    match = re.fullmatch(_CLOCK, text)
    if match is None or (match.group(2) is None and match.group(3) is None):
        raise Refused("is not a clock time with hours and minutes")
    hours, minutes, half = int(match.group(1)), int(match.group(2) or 0), match.group(3)
    if half is not None:
        if not 1 <= hours <= 12:
            raise Refused("has an hour that no clock shows with am or pm")
        hours = hours % 12 + (12 if half in "pP" else 0)
    if minutes > 59 or hours > 24 or (hours == 24 and minutes):
        raise Refused("has a time that no clock shows")
    return hours + minutes / 60.0


@lru_cache(maxsize=256)
def read_hours(text: str) -> Schedule:
    """Stretches of the day with their shares: "06:00-18:00, 20:00-22:00 50 %", "always", "never"."""
    word = text.lower()
    if word == "never":
        return NEVER
    if word == "always":
        return ALWAYS
    if word.startswith("always "):
        return _schedule([Span(0.0, 24.0, _share(text[7:]))])
    parts = re.split(r"[,;]|\band\b", text) if "," in text or ";" in text or "and" in text else [text]
    if len(parts) > MOST_STRETCHES:
        raise Refused(f"has more than {MOST_STRETCHES} stretches")
    spans: list[Span] = []
    for part in parts:
        spans.extend(_stretch(part.strip()))
    return _schedule(spans)


def _stretch(text: str) -> list[Span]:
    if not text:
        raise Refused("has a comma with no hours beside it")
    ends = re.split(_STRETCH, text, maxsplit=1)
    if len(ends) != 2:
        raise Refused("has no two clock times with a - between them")
    start = _time_of_day(ends[0].strip())
    until = re.match(_CLOCK, ends[1])
    if until is None:
        raise Refused("has no two clock times with a - between them")
    end = _time_of_day(until.group().strip())
    rest = ends[1][until.end() :].strip()
    share = _share(rest.removeprefix("at ")) if rest else 1.0
    if start == end:
        raise Refused('begins and ends at the same time (write "always" for the whole day)')
    if start < end:
        return [Span(start, end, share)]
    late = [Span(start, 24.0, share)] if start < 24.0 else []
    return [*late, Span(0.0, end, share)] if end > 0.0 else late


def _share(text: str) -> float:
    try:
        value, end = read_number(text)
    except Refused:
        value, end = -1.0, 0
    if text[end:].strip() != "%" or not 0.0 <= value <= 100.0:
        raise Refused(f'has "{text.strip()}" where a share from 0 % to 100 % should stand')
    return value / 100.0


def _schedule(spans: list[Span]) -> Schedule:
    spans.sort()
    for before, after in zip(spans, spans[1:], strict=False):
        if after.start_h < before.end_h:
            raise Refused("has stretches that overlap")
    return Schedule(tuple(spans))


def read_utc_offset(text: str) -> float:
    """Hours ahead of UTC: "UTC+2" is 2.0, "UTC-3:30" is -3.5."""
    match = re.fullmatch(_OFFSET, text)
    if match is None:
        raise Refused("is not an offset from UTC")
    sign, hours, minutes, decimals = match.groups()
    if minutes and int(minutes) > 59:
        raise Refused("has minutes that no clock shows")
    value = int(hours or 0) + int(minutes or 0) / 60.0 + (float("0." + decimals) if decimals else 0.0)
    value = -value if sign == "-" else value
    if not -12.0 <= value <= 14.0:
        raise Refused("is an offset that no clock has (they run from UTC-12 to UTC+14)")
    return value


def read_month(text: str) -> int:
    """Number of a month, by its name, its first three letters or more, or its number."""
    if text.isascii() and text.isdigit() and len(text) <= 2:
        if 1 <= int(text) <= 12:
            return int(text)
    elif len(text) >= 3:
        small = text.lower().rstrip(".")
        for number, month in enumerate(MONTHS, 1):
            if month.lower().startswith(small):
                return number
    raise Refused("is not a month")
