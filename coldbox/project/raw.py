"""What a file says, read and checked field by field, before names are looked up and defaults filled in.

A value is what `units.parse` gives for its kind (SI; Rate, Schedule), and besides: a word or name is its text, a count
an int, a month 1 to 12, yes/no a bool; a field that takes several values (`Field.many`) is a tuple of them, also where
only one was typed.
"""

from __future__ import annotations

from collections.abc import Mapping

from coldbox.record import Record
from coldbox.units.clock import Spread


class Entered(Record):
    """One value somebody typed (in the file, or with --set): `value` in SI as `units.parse` gives it."""

    value: object
    text: str
    line: int | None
    spread: Spread | None
    option: bool  # typed with --set, not in the file
    currency: str | None
    kind: str = ""  # the kind it was read as: tells "16:00" (clock) from "6 h" (duration) where both will do


class Block(Record):
    """One table of the file: `table` names its declarations ("doors", "outage.events"), `path` its place.

    A thing without a name is called after what it is ("milk", the product of a lot) while that tells it from the
    others; else by its number, and then name and path are the same: "doors[1]".
    """

    table: str
    path: str  # "doors.main", "box", "constructions.pir100", "outage.events[2]"
    name: str
    line: int | None
    values: Mapping[str, Entered]
    children: Mapping[str, tuple[Block, ...]]  # by key: layers, limits, respiration, events, legs, stops, deliver,
    # composition (one block), and "construction" (one block) where a panel, door or face holds its own inline


class Raw(Record):
    """A whole file: by top-level table its blocks in order ("box" has one; "" the top-level keys).

    Tables that the file lacks are lacking here too. What was wrong is left out and stands among the problems, which
    are complete for single fields: kinds, bounds, choices, missing keys, names used twice. What needs two fields, or
    a table beside the file, is checked by `resolve`.
    """

    file: str
    text: str
    blocks: Mapping[str, tuple[Block, ...]]
