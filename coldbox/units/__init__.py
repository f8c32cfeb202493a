"""Text to values and back; nothing else in the tool knows units. SI floats inside, people's units outside."""

from coldbox.units.clock import ALWAYS, NEVER, Rate, Schedule, Span, Spread
from coldbox.units.grammar import Reading, parse, what_to_write
from coldbox.units.kinds import KINDS, Display, Kind
from coldbox.units.show import (
    compass_point,
    display_unit,
    show,
    show_clock,
    show_duration,
    show_hours,
    show_number,
    show_spread,
    thin,
)

__all__ = [
    "ALWAYS",
    "KINDS",
    "NEVER",
    "Display",
    "Kind",
    "Rate",
    "Reading",
    "Schedule",
    "Span",
    "Spread",
    "compass_point",
    "display_unit",
    "parse",
    "show",
    "show_clock",
    "show_duration",
    "show_hours",
    "show_number",
    "show_spread",
    "thin",
    "what_to_write",
]
