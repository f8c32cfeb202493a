"""What the cursor can stand on: the box and its place, its faces, and everything on them and in them."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from typing import Any, Final

from coldbox.project.fields import FIELDS, TABLES
from coldbox.project.model import FACES
from coldbox.project.setting import named
from coldbox.record import Record
from coldbox.tui.places import places

# Tables of a project that are one thing, with what they are called.
WHOLE: Final[Mapping[str, str]] = {
    "": "project", "site": "place and weather", "box": "box", "machine": "machine", "outage": "outage", "trip": "trip",
    "sizing": "sizing", "money": "money", "spreads": "usual spreads",
}  # fmt: skip
LISTS: Final = (
    "panels", "doors", "lots", "packs", "people", "lights", "motors", "trucks", "heaters", "ventilation", "quoted",
)  # fmt: skip
# What stands in a thing, one of it.
PARTS: Final[Mapping[str, str]] = {
    "box.limits": "limit", "constructions.layers": "layer", "lots.composition": "composition",
    "lots.respiration": "breathing", "lots.limits": "limit", "outage.events": "event", "trip.legs": "leg",
    "trip.stops": "stop", "trip.stops.deliver": "delivery", "constructions": "construction",
}  # fmt: skip


class Thing(Record):
    """Something with fields: its key path, the table that declares them, what it is called, the face it is on."""

    path: str
    table: str
    label: str
    face: str = ""


def things(document: Mapping[str, Any]) -> tuple[Thing, ...]:
    """Everything of a document that has fields, in the order of the file; what stands in a thing follows it."""
    inner = _parts(document)
    found: list[Thing] = []
    for one in _things(document):
        found += [one, *inner.pop(one.path, ())]
    return tuple(found)


def thing(document: Mapping[str, Any], path: str) -> Thing | None:
    """The thing of a key path; None where there is none."""
    return next((one for one in things(document) if one.path == path), None)


def on_face(document: Mapping[str, Any], face: str) -> tuple[Thing, ...]:
    """What is cut out of a face: its panels and doors."""
    return tuple(one for one in _things(document) if one.face == face and one.table in ("panels", "doors"))


def addable(document: Mapping[str, Any], one: Thing) -> tuple[tuple[str, str], ...]:
    """What can be added in a thing: for each the key path that `Desk.add` takes, and what one of it is called."""
    before = f"{one.path}." if one.path else ""
    there = {place.path for place in places(document)}
    return tuple(
        (before + field.key, PARTS[field.path])
        for field in FIELDS[one.table]
        if field.structural and (TABLES[field.path].form != "one" or before + field.key not in there)
    )


def doubles(one: Thing) -> bool:
    """Whether there may be several of its kind: it can be doubled, and it can go."""
    return one.table in ("constructions", "neighbours") or TABLES[one.table].form == "list"


def _parts(document: Mapping[str, Any]) -> dict[str, list[Thing]]:
    """What stands in a thing, by the key path of the thing at the top."""
    found: dict[str, list[Thing]] = {}
    top = ""  # the way of the thing at the top that comes before its parts
    labels: dict[str, str] = {}
    for place in places(document):
        nested = "." in place.table or place.path.endswith(".construction")
        if not nested:
            top = place.path
            labels[top] = place.name or WHOLE.get(place.table, f"{place.table} {place.number}")
            continue
        holder = max((path for path in labels if path and place.path.startswith(f"{path}.")), key=len, default="")
        number = f" {place.number}" if place.number else ""
        named = f" {place.name}" if place.name else ""
        labels[place.path] = f"{labels.get(holder, '')}: {PARTS[place.table]}{number}{named}"
        found.setdefault(top, []).append(Thing(path=place.path, table=place.table, label=labels[place.path]))
    return found


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
