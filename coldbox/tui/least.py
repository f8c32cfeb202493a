"""What a new thing says: the least that computes, with words of the project it comes into where it needs some."""

from __future__ import annotations

import tomllib
from collections.abc import Mapping
from typing import Any, Final

from coldbox.project import setting, values
from coldbox.project.fields import BY_KEY, FIELDS, TABLES, example
from coldbox.project.fields import field as declared
from coldbox.units import show

# Where the first example of each required field would not do, or not make sense beside the others.
_SAYS: Final[Mapping[str, Mapping[str, Any]]] = {
    "constructions": {"layers": [{"material": "PIR foam", "thickness": "100 mm"}]},
    "doors": {"width": "0.9 m", "height": "2 m", "passages": "10/h"},
    "panels": {"width": "1 m", "height": "1 m"},
    "lots": {"product": "milk", "stored": "200 kg"},
    "packs": {"kind": "ice", "mass": "5 kg"},
    "people": {"count": 1, "hours": "07:00-17:00"},
    "lights": {"power": "40 W", "hours": "06:00-18:00"},
    "motors": {"power": "500 W"},
    "trucks": {"power": "2 kW", "hours": "07:00-17:00 20 %"},
    "heaters": {"kind": "drain", "power": "100 W"},
    "ventilation": {"flow": "100 m³/h"},
    "trip.legs": {"lasts": "1 h"},
    "trip.stops": {"lasts": "15 min"},
    "trip.stops.deliver": {"mass": "10 kg"},
}  # fmt: skip
_OPEN: Final = {"at": "2 h", "what": "door open", "lasts": "10 min"}
_ABOVE_ROOM_K: Final = 6.0


def least(document: Mapping[str, Any], table: str) -> dict[str, Any]:
    """What a new thing of a table says, its name apart.

    document: the project it comes into. table: the one that declares it ("doors", "lots.limits").
    """
    if table.endswith(".limits"):
        return {"above": _warmer(document)}
    if table == "outage.events":
        door = next(iter(called(document, "doors")), "")
        return {**_OPEN, "door": door} if door else {"at": "2 h", "what": "power on"}
    given = dict(_SAYS.get(table, {}))
    for field in FIELDS[table]:
        if not field.required or field.key in given:
            continue
        names = called(document, field.refers) if field.refers in TABLES else []
        given[field.key] = names[0] if names else tomllib.loads(example(field))[field.key]
    if table == "lots.composition":
        given.update(tomllib.loads(example(declared("lots.composition")))["composition"])
    return given


def called(document: Mapping[str, Any], table: str) -> list[str]:
    """The names of what stands in a list or a table of names at the top of the document."""
    node = document.get(table)
    if isinstance(node, dict):
        return [str(name) for name in node]
    return [name for name in setting.named(TABLES[table], node) if name] if isinstance(node, list) else []


def free_name(table: str, taken: set[str], wanted: str = "") -> str:
    """A name that is not taken: the one wanted, else that with a number."""
    wanted = wanted or _USUAL.get(table, table.rpartition(".")[2].removesuffix("s"))
    if wanted not in taken:
        return wanted
    stem = wanted.rstrip("0123456789").rstrip() or wanted
    number = 2
    while f"{stem} {number}" in taken:
        number += 1
    return f"{stem} {number}"


_USUAL: Final = {"people": "people", "ventilation": "fresh air"}


def _warmer(document: Mapping[str, Any]) -> str:
    """A limit some degrees above the room, in the units of the project."""
    box = document.get("box")
    text = box.get("temperature") if isinstance(box, dict) else None
    system: values.System = "IP" if document.get("units") == "IP" else "SI"
    try:
        room = values.from_text(BY_KEY["box"]["temperature"], str(text)).value
    except values.Wrong:
        room = None
    return show((room if isinstance(room, float) else 4.0) + _ABOVE_ROOM_K, "temperature", system)
