"""The fields of one thing, a line each: what stands there, where it comes from, what would do."""

from __future__ import annotations

from typing import TYPE_CHECKING, Any

from coldbox.project import values
from coldbox.project.fields import FIELDS, Field
from coldbox.record import Record
from coldbox.tables import load
from coldbox.tui.document import block_at, shown
from coldbox.tui.understood import of_field

if TYPE_CHECKING:
    from coldbox.tui.desk import Desk
    from coldbox.tui.things import Thing


class Line(Record):
    """One field as the sheet shows it."""

    key: str
    path: str
    label: str
    shown: str
    origin: str  # typed, default, library, table; "" where nothing stands
    reason: str  # of a default: why this one
    understood: str  # the same in the units of the screen; "" where that says nothing new
    usual_range: str
    help: str
    source: str
    choices: tuple[str, ...]


def lines(desk: Desk, thing: Thing) -> list[Line]:
    """Every field of a thing that holds a value, in the order of the file."""
    block = block_at(desk.document, thing.path) if thing.path else desk.document
    return [_line(desk, thing, field, block.get(field.key)) for field in FIELDS[thing.table] if not field.structural]


def _line(desk: Desk, thing: Thing, field: Field, value: Any) -> Line:
    path = f"{thing.path}.{field.key}" if thing.path else field.key
    origin = None if desk.project is None else desk.project.origins.get(path)
    inline = isinstance(value, dict)
    text = "" if value is None or inline else shown(value)
    kind = "typed" if value is not None else "" if origin is None else origin.kind
    if block_library(block_at(desk.document, thing.path) if thing.path else {}) and value is not None:
        kind = "library"
    if value is None and origin is not None:
        text = origin.text
    low, high = values.bounds(field, desk.system)
    return Line(
        key=field.key,
        path=path,
        label=field.label,
        shown="of its own, in the file" if inline else text,
        origin="default" if kind == "option" else kind,
        reason=origin.reason if origin is not None and value is None else field.default_reason,
        understood=of_field(field, text, desk.system) if text and not field.many else "",
        usual_range=f"{low} to {high}" if low and high else low or high,
        help=field.help,
        source=field.source,
        choices=choices(desk, field),
    )


def block_library(block: Any) -> bool:
    """Whether the values of a thing were copied from the shop library."""
    return bool(block.get("library"))


def choices(desk: Desk, field: Field) -> tuple[str, ...]:
    """What may be picked: the words of the field, and the names that it may refer to."""
    if field.kind == "yes_no":
        return ("yes", "no")
    if field.many:
        return ()
    found = list(field.choices)
    if field.refers in ("constructions", "neighbours", "doors", "lots", "packs"):
        inside = desk.document.get(field.refers, {})
        names = list(inside) if isinstance(inside, dict) else [one.get("name", "") for one in inside]
        found += [str(name) for name in names if name]
    if field.refers in ("foods", "materials", "weather", "packs"):
        found += sorted(load.names(field.refers))
    if field.refers == "constructions":
        found += sorted(desk.library.names("constructions"))
    return tuple(dict.fromkeys(found))
