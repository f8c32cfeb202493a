"""Values for people, in SI or IP, with sensible digits."""

from __future__ import annotations

import math
from collections.abc import Callable
from typing import Any, Literal

import numpy as np

from coldbox.units.angles import POINTS
from coldbox.units.clock import Rate, Schedule, Span, Spread
from coldbox.units.clock_text import MONTHS
from coldbox.units.kinds import KINDS, Display, Kind

System = Literal["SI", "IP"]
FEET_ALONE_FROM = 100.0  # ft; beyond, inches say nothing
CLOSE = 1e-12


def show(
    value: object, kind: str, system: System = "SI", digits: int | None = None, *, currency: str | None = None
) -> str:
    """A value as a person would write it; `parse` reads it back.

    value: as the kind keeps it; an array of draws is shown from its lowest to its highest. kind: name of KINDS.
    system: "SI" or "IP". digits: significant ones, None for the kind's own. currency: of a price. Result: text.
    Errors: KeyError for a kind that does not exist. Source: our own. Example: show(0.1016, "length", "IP") is "4 in".
    """
    declared = KINDS[kind]
    if isinstance(value, np.ndarray):
        if value.size > 1:
            low, high = float(value.min()), float(value.max())
            if low != high:
                return f"{show(low, kind, system, digits)} to {show(high, kind, system, digits)}"
        value = float(value.flat[0])
    special = _SPECIAL.get(declared.reader)
    if special is not None:
        return special(value)
    if declared.name == "length" and system == "IP" and isinstance(value, (int, float)):
        return _feet_and_inches(float(value), digits or declared.digits)
    if declared.name == "duration" and digits is None:
        return show_duration(_float(value))
    number, unit = show_number(value, kind, system, digits)
    if declared.name == "resistance" and system == "IP":
        return f"R-{number}"
    if currency:
        return f"{number} {currency}{unit}"
    return f"{number}{unit}" if unit[:1] in ("/", "°") and unit[1:2] not in ("C", "F") else f"{number} {unit}".rstrip()


def show_number(value: object, kind: str, system: System = "SI", digits: int | None = None) -> tuple[str, str]:
    """Number and unit apart, for columns; the unit is one that `parse` takes as `bare`.

    value, kind, system, digits: as for `show`. Result: number text, unit text. Errors: KeyError for an unknown kind,
    TypeError for a kind without numbers. Source: our own. Example: show_number(3516.85, "power", "IP") is
    ("12 000", "Btu/h").
    """
    declared = KINDS[kind]
    ladder = declared.si_display if system == "SI" else declared.ip_display
    if isinstance(value, Rate):
        number, unit = _float(value.per_second), ladder[1 if value.basis == "day" else 0]
    else:
        number, unit = _float(value), ladder[0]
        for step in ladder[1:]:
            if declared.reader != "rate" and abs(number) >= step.start * (1.0 - CLOSE):
                unit = step
    shown = (number - unit.offset) / unit.factor
    return _thin(shown, declared, digits), unit.unit


def display_unit(kind: str, system: System = "SI") -> Display:
    """The unit that a field of this kind shows beside it: the first of its kind's displays."""
    declared = KINDS[kind]
    return (declared.si_display if system == "SI" else declared.ip_display)[0]


def show_spread(spread: Spread, kind: str, system: System = "SI") -> str:
    """The half-width as it would be typed behind the value: "± 2 K"; an even one says so."""
    of = "difference" if kind == "temperature" else kind
    declared = KINDS[of]
    width: object = (
        Rate(spread.half_width, "hour") if declared.reader in ("rate", "daily_duration") else spread.half_width
    )
    return f"± {show(width, of, system)}" + (" (evenly)" if spread.shape == "even" else "")


def thin(value: float, digits: int = 4) -> str:
    """A number with so many significant digits, without trailing zeros, thousands apart by a space.

    value: any. digits: significant, 1 or more; whole numbers keep all the digits before the point that a reader
    expects up to six. Result: text; "-0" never. Errors: none. Source: our own. Example: thin(4025.3) is "4 025".
    """
    if not math.isfinite(value):
        return "beyond numbers"
    if value == 0.0:
        return "0"
    size = math.floor(math.log10(abs(value)))
    if size < -4 or size >= 9:
        mantissa, _, exponent = f"{value:.{max(digits - 1, 0)}e}".partition("e")
        return f"{_no_zeros(mantissa)}e{int(exponent)}"
    rounded = round(value, digits - 1 - size)
    text = f"{rounded:.{max(digits - 1 - size, 0)}f}"
    whole, point, decimals = text.partition(".")
    return _no_zeros(f"{_grouped(whole)}{point}{decimals}")


def _thin(value: float, kind: Kind, digits: int | None) -> str:
    if digits is None and kind.reader in ("temperature", "difference", "angle"):
        return _no_zeros(f"{round(value, 1) + 0.0:.1f}")
    return thin(value, kind.digits if digits is None else digits)


def _no_zeros(text: str) -> str:
    return text.rstrip("0").rstrip(".") if "." in text else text


def _grouped(whole: str) -> str:
    sign, figures = ("-", whole[1:]) if whole.startswith("-") else ("", whole)
    return sign + f"{int(figures):,}".replace(",", " ")


def _float(value: object) -> float:
    if isinstance(value, np.ndarray):
        return float(value.flat[0])
    if isinstance(value, (int, float)):
        return float(value)
    raise TypeError(f"no number: {type(value).__name__}")


def _feet_and_inches(metres: float, digits: int) -> str:
    inches = metres / 0.0254
    if abs(inches) < 12.0 - 1e-9:
        return f"{thin(inches, digits)} in"
    sign, inches = ("-" if inches < 0 else ""), abs(inches)
    if inches >= 12.0 * FEET_ALONE_FROM:
        return f"{sign}{thin(inches / 12.0, digits)} ft"
    decimals = 1 if digits <= 4 else digits - 2
    feet, rest = divmod(round(inches, decimals), 12.0)
    small = _no_zeros(f"{rest:.{decimals}f}")
    return f"{sign}{int(feet)} ft" + (f" {small} in" if small != "0" else "")


def show_clock(hours: float) -> str:
    """Clock time with its day from the second on: 14.0 is "14:00", 32.33 is "08:20 day 2"."""
    minutes = round(hours * 60.0)
    day, minutes = divmod(minutes, 1440)
    text = f"{minutes // 60:02d}:{minutes % 60:02d}"
    return f"{text} day {day + 1}" if day else text


def show_duration(seconds: float) -> str:
    """Seconds below two minutes, minutes below an hour and a half, else hours and minutes."""
    if abs(seconds) < 120.0 - 0.05:
        return f"{thin(seconds, 4)} s"
    sign, seconds = ("-" if seconds < 0 else ""), abs(seconds)
    if seconds < 5400.0 - 3.0:
        return f"{sign}{thin(seconds / 60.0, 3)} min"
    hours, minutes = divmod(round(seconds / 60.0), 60)
    return f"{sign}{_grouped(str(hours))} h" + (f" {minutes} min" if minutes else "")


def show_hours(schedule: Schedule) -> str:
    """Stretches of the day as they are typed; the two halves of one past midnight are joined again."""
    spans = list(schedule.spans)
    if not spans:
        return "never"
    if len(spans) == 1 and spans[0][:2] == (0.0, 24.0):
        return "always" if spans[0].share == 1.0 else f"always {_percent(spans[0].share)}"
    first, last = spans[0], spans[-1]
    if len(spans) > 1 and first.start_h == 0.0 and last.end_h == 24.0 and first.share == last.share:
        spans = [*spans[1:-1], Span(last.start_h, first.end_h, first.share)]
    return ", ".join(
        f"{_of_day(start)}-{_of_day(end)}" + (f" {_percent(share)}" if share != 1.0 else "")
        for start, end, share in spans
    )


def _of_day(hours: float) -> str:
    minutes = round(hours * 60.0)
    return f"{minutes // 60:02d}:{minutes % 60:02d}"


def _percent(share: float) -> str:
    return f"{thin(share * 100.0, 4)} %"


def show_utc_offset(hours: float) -> str:
    """ "UTC+2", "UTC-3:30", "UTC"."""
    minutes = round(abs(hours) * 60.0)
    if not minutes:
        return "UTC"
    return f"UTC{'-' if hours < 0 else '+'}{minutes // 60}" + (f":{minutes % 60:02d}" if minutes % 60 else "")


def compass_point(degrees: float) -> str:
    """The nearest of the 16 compass points."""
    return POINTS[round(degrees / 22.5) % 16]


def _show_count(value: object) -> str:
    number = _float(value)
    return _grouped(str(int(number))) if number == int(number) else thin(number)


_SPECIAL: dict[str, Callable[[Any], str]] = {
    "count": _show_count,
    "clock": lambda value: show_clock(_float(value)),
    "hours": lambda value: show_hours(value) if isinstance(value, Schedule) else str(value),
    "utc_offset": lambda value: show_utc_offset(_float(value)),
    "month": lambda value: MONTHS[int(_float(value)) - 1],
    "word": str,
    "text": str,
    "words": lambda value: ", ".join(value) if isinstance(value, (tuple, list)) else str(value),
    "yes_no": lambda value: "yes" if value else "no",
    "composition": lambda value: ", ".join(f"{name} {_percent(_float(share))}" for name, share in value),
}
