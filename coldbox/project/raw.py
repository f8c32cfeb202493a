"""What a file says, read and checked field by field, before names are looked up and defaults filled in."""

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


class Block(Record):
    """One table of the file: `table` names its declarations ("doors", "outage.events"), `path` its place."""

    table: str
    path: str  # "doors.main", "box", "constructions.pir100", "outage.events[2]"
    name: str
    line: int | None
    values: Mapping[str, Entered]
    children: Mapping[str, tuple[Block, ...]]  # by key: layers, limits, respiration, events, legs, stops, deliver,
    # composition (one block), and "construction" (one block) where a panel, door or face holds its own inline


class Raw(Record):
    """A whole file: by top-level table its blocks in order ("box" has one; "" the top-level keys)."""

    file: str
    text: str
    blocks: Mapping[str, tuple[Block, ...]]
