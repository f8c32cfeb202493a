"""What the cursor can stand on: the box and its place, its faces, and everything on them and in them."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from typing import Any, Final

from coldbox.project.fields import TABLES
from coldbox.project.model import FACES
from coldbox.project.setting import named
from coldbox.record import Record

# Tables of a project that are one thing, with what they are called.
WHOLE: Final[Mapping[str, str]] = {
    "": "project", "site": "place and weather", "box": "box", "machine": "machine", "outage": "outage", "trip": "trip",
    "sizing": "sizing", "money": "money", "spreads": "usual spreads",
}  # fmt: skip
LISTS: Final = (
    "panels", "doors", "lots", "packs", "people", "lights", "motors", "trucks", "heaters", "ventilation", "quoted",
)  # fmt: skip


class Thing(Record):
    """Something with fields: its key path, the table that declares them, what it is called, the face it is on."""

    path: str
    table: str
    label: str
    face: str = ""


def things(document: Mapping[str, Any]) -> tuple[Thing, ...]:
    """Everything of a document that has fields, in the order of the file."""
    return tuple(_things(document))


def thing(document: Mapping[str, Any], path: str) -> Thing | None:
    """The thing of a key path; None where there is none."""
    return next((one for one in _things(document) if one.path == path), None)


def on_face(document: Mapping[str, Any], face: str) -> tuple[Thing, ...]:
    """What is cut out of a face: its panels and doors."""
    return tuple(one for one in _things(document) if one.face == face and one.table in ("panels", "doors"))


def _things(document: Mapping[str, Any]) -> Iterator[Thing]:
    for table, label in WHOLE.items():
        yield Thing(path=table, table=table, label=label)
    for face in FACES:
        yield Thing(path=f"faces.{face}", table="faces", label=face, face=face)
    for table in ("constructions", "neighbours"):
        inside = document.get(table)
        for name in inside if isinstance(inside, dict) else ():
            yield Thing(path=f"{table}.{name}", table=table, label=str(name))
    for table in LISTS:
        items = document.get(table)
        if isinstance(items, list):
            for index, (item, name) in enumerate(zip(items, named(TABLES[table], items), strict=True)):
                face = item.get("face", "front") if isinstance(item, dict) and table in ("doors", "panels") else ""
                path = f"{table}.{name}" if name else f"{table}[{index + 1}]"
                yield Thing(path=path, table=table, label=name or f"{table} {index + 1}", face=str(face))
