"""ONE declaration per input of the file format; reading, messages, `--set`, documentation and screens all use it."""

from __future__ import annotations

from collections.abc import Mapping

from coldbox.project.fields import answer, box, course, goods, inside, openings, place
from coldbox.project.fields.declare import Field, Table

__all__ = ["BY_KEY", "FIELDS", "TABLES", "TOP_TABLES", "Field", "Table", "declared_in", "example", "field"]

_ORDER = (
    "", "site", "box", "box.limits", "constructions", "constructions.layers", "neighbours", "faces", "panels", "doors",
    "lots", "lots.composition", "lots.respiration", "lots.limits", "packs", "people", "lights", "motors", "trucks",
    "heaters", "ventilation", "quoted", "machine", "outage", "outage.events", "trip", "trip.legs", "trip.stops",
    "trip.stops.deliver", "sizing", "money", "spreads", "fit",
)  # fmt: skip
_PARTS = (place, box, openings, goods, inside, course, answer)


def _by_key() -> dict[str, dict[str, Field]]:
    grouped: dict[str, dict[str, Field]] = {table: {} for table in _ORDER}
    for part in _PARTS:
        for declared in part.FIELDS:
            grouped[declared.table][declared.key] = declared
    return grouped


def _tables() -> dict[str, Table]:
    declared = {table.name: table for part in _PARTS for table in part.TABLES}
    return {name: declared[name] for name in _ORDER}


BY_KEY: Mapping[str, Mapping[str, Field]] = _by_key()
"""By table, then key; tables and keys in the order in which a new file is written."""

FIELDS: Mapping[str, tuple[Field, ...]] = {table: tuple(keys.values()) for table, keys in BY_KEY.items()}
"""The same by table."""

TABLES: Mapping[str, Table] = _tables()
"""Every table, in the same order."""

TOP_TABLES: tuple[str, ...] = tuple(name for name in _ORDER if name and "." not in name)
"""The tables that stand at the top of a file."""


def field(path: str) -> Field:
    """The declaration of `table.key` ("box.temperature", "lots.limits.above", "format").

    Raises KeyError for what is not declared.
    """
    table, _, key = path.rpartition(".")
    return BY_KEY[table][key]


def declared_in(key: str) -> str:
    """The tables that have a key of this name, as a file writes them ("[sizing]"); "" for none, or for many."""
    headers = {"one": "[{}]", "named": "[{}.NAME]", "list": "[[{}]]"}
    found = [headers[TABLES[name].form].format(name) for name in TOP_TABLES if key in BY_KEY[name]]
    return " or ".join(found) if len(found) < 4 else ""


def example(declared: Field) -> str:
    """The key with a value that will do, as a line of the file: `width = "900 mm"`."""
    from coldbox.project.fields import examples

    return examples.example(declared)
