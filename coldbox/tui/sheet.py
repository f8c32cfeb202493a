"""The fields of one thing, a line each: what stands there, where it comes from, what would do."""

from __future__ import annotations

from typing import TYPE_CHECKING, Any, Final

from coldbox.errors import UnknownName
from coldbox.project import values
from coldbox.project.fields import FIELDS, Field
from coldbox.project.raw import Block, Entered
from coldbox.project.shop import TABLES, date_of
from coldbox.record import Record
from coldbox.tables import load
from coldbox.tui.document import shown, typed
from coldbox.tui.least import called
from coldbox.tui.places import Keys, Refused, field_of, inside, keys_of_block, made_for, places
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
    keys = keys_of_block(desk.document, thing.path)
    block = None if keys is None else inside(desk.document, keys)
    row = None if keys is None else _row(desk, keys)
    return [
        _line(desk, thing, field, (block or {}).get(field.key), row)
        for field in FIELDS[thing.table]
        if not field.structural
    ]


def _line(desk: Desk, thing: Thing, field: Field, value: Any, row: Block | None) -> Line:
    path = f"{thing.path}.{field.key}" if thing.path else field.key
    origin = None if desk.project is None else desk.project.origins.get(path)
    inline = isinstance(value, dict)
    text = "" if value is None or inline else shown(value)
    kind, reason = "typed", field.default_reason
    if value is None:
        if origin is not None and origin.kind in ("typed", "option"):  # of the last project that was whole
            origin = None
        kind = "" if origin is None else origin.kind
        text = "" if origin is None else origin.text
        reason = field.default_reason if origin is None else origin.reason
    elif row is not None and _same(field, text, row.values.get(field.key)):
        kind, reason = "library", "shop library"
    low, high = values.bounds(field, desk.system)
    return Line(
        key=field.key,
        path=path,
        label=field.label,
        shown="of its own, in the file" if inline else text,
        origin=kind,
        reason=reason,
        understood=of_field(field, text, desk.system) if text and not field.many else "",
        usual_range=f"{low} to {high}" if low and high else low or high,
        help=field.help,
        source=field.source,
        choices=choices(desk, field),
    )


# Copied from the shop library

_FILES: Final = {table: file for file, table in TABLES.items()}


def library_value(desk: Desk, path: str) -> Any:
    """What the shop library has for a value that was copied from it; None for any other."""
    try:
        _, keys = made_for(desk.document, path)
    except Refused:
        return None
    field, row = field_of(keys), _row(desk, keys[:-1])
    entered = None if row is None or field is None else row.values.get(field.key)
    if entered is None or field is None:
        return None
    return typed(field, entered.text, desk.system)


def _row(desk: Desk, keys: Keys) -> Block | None:
    """The row, or the part of one, that the values of a table were copied from; None where they were not."""
    if not keys or keys[0] not in _FILES:
        return None
    own = 1 if keys[0] == "site" else 2
    thing = inside(desk.document, keys[:own])
    name = thing.get("library") if isinstance(thing, dict) else None
    if not isinstance(name, str) or not date_of(name):
        return None
    try:
        row: Block | None = desk.shelf.row(_FILES[keys[0]], name)
    except UnknownName:
        return None
    for key in keys[own:]:
        if isinstance(key, int):
            continue
        at = next((one for one in keys[keys.index(key) + 1 :][:1] if isinstance(one, int)), 0)
        below = row.children.get(key, ()) if row is not None else ()
        row = below[at] if at < len(below) else None
    return row


def _same(field: Field, text: str, entered: Entered | None) -> bool:
    if entered is None:
        return False
    try:
        return bool(values.from_text(field, text).value == entered.value)
    except values.Wrong:
        return False


# To pick from


def choices(desk: Desk, field: Field) -> tuple[str, ...]:
    """What may be picked: the words of the field, and the names that it may refer to."""
    if field.kind == "yes_no":
        return ("yes", "no")
    if field.many:
        return ()
    found = list(field.choices)
    if field.refers in ("constructions", "neighbours", "doors", "lots", "packs"):
        found += called(desk.document, field.refers)
    elif field.refers == "trip.legs":
        found += [one.name for one in places(desk.document) if one.table == "trip.legs" and one.name]
    elif field.refers in ("foods", "materials", "weather"):
        found += sorted(load.names(field.refers))
    if field.refers == "constructions":
        found += sorted(desk.shelf.names("constructions"))
    if field.refers == "shop library" and field.table in _FILES:
        found += sorted(desk.shelf.names(_FILES[field.table]))
    return tuple(dict.fromkeys(found))
