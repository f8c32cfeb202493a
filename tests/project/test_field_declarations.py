"""The declarations themselves: complete, sound, and in step with the records of the model."""

from __future__ import annotations

import math
import tomllib
from pathlib import Path

import pytest

from coldbox import units
from coldbox.project import model
from coldbox.project.fields import BY_KEY, FIELDS, TABLES, TOP_TABLES, Field, example, field
from coldbox.project.fields.documentation import as_rows, documentation
from coldbox.project.values import from_text
from coldbox.units.clock import Rate

ALL = [declared for fields in FIELDS.values() for declared in fields]
SOURCES = tomllib.loads((Path(__file__).parents[2] / "coldbox/tables/sources.toml").read_text("utf-8"))
WORDS = ("text", "name", "word", "yes_no", "hours", "month")
ids = pytest.mark.parametrize("declared", ALL, ids=lambda declared: declared.path)

RECORDS = {
    "": model.Project,
    "site": model.Site,
    "box": model.Box,
    "box.limits": model.Limit,
    "constructions": model.Construction,
    "constructions.layers": model.Layer,
    "neighbours": model.Neighbour,
    "faces": model.Face,
    "panels": model.Panel,
    "doors": model.Door,
    "lots": model.Lot,
    "lots.composition": model.Composition,
    "lots.respiration": model.RespirationPoint,
    "lots.limits": model.Limit,
    "packs": model.Pack,
    "people": model.People,
    "lights": model.Light,
    "motors": model.Motor,
    "trucks": model.Motor,
    "heaters": model.Heater,
    "ventilation": model.Ventilation,
    "quoted": model.Quoted,
    "machine": model.Machine,
    "outage": model.Outage,
    "outage.events": model.Event,
    "trip": model.Trip,
    "trip.legs": model.Leg,
    "trip.stops": model.Stop,
    "trip.stops.deliver": model.Delivery,
    "sizing": model.Sizing,
    "money": model.Money,
    "spreads": model.Spreads,
    "fit": model.Fit,
}
# A key that the model keeps under another name.
RENAMED = {
    "lots.safe_above": "safe_above_c",
    "lots.respiration.at": "at_c",
    "lots.respiration.heat": "w_per_kg",
    **{f"{table}.limits.{key}": "limit_c" for table in ("box", "lots") for key in ("above", "below")},
    **{f"{table}.limits.minutes": "allowed_s" for table in ("box", "lots")},
}
# Keys that the model keeps elsewhere: the box's words for all faces stand on each face; quoted figures become a
# construction; where values were copied from is an origin.
ELSEWHERE = {
    "format",
    "box.construction",
    "box.neighbour",
    "box.colour",
    *(f"{table}.{key}" for table in ("panels", "doors") for key in ("r_value", "u_value", "thickness")),
}
# Attributes that are worked out, and never typed.
DERIVED = {
    "": {"file", "origins", "spread_factors"},  # "spreads" is both the table and, in the model, every ± of the file
    "box.limits": {"side"},
    "lots.limits": {"side"},
    "constructions": {"name"},
    "constructions.layers": {"foam", "edge_psi"},
    "neighbours": {"name"},
    "faces": {"name"},
    "panels": {"weathered", "emissivity"},
    "doors": {"weathered", "emissivity"},
    "outage.events": {"after"},
    "money": {"currency"},
}
NAMELESS = {"outage.events"}  # they may have a name, which nothing refers to


@ids
def test_every_field_stands_in_the_model(declared: Field) -> None:
    if declared.path in ELSEWHERE or declared.key in ("notes", "library") and declared.table:
        return
    if declared.key == "name" and declared.table in NAMELESS:
        return
    assert RENAMED.get(declared.path, declared.key) in RECORDS[declared.table].names()


@pytest.mark.parametrize("table", list(RECORDS))
def test_every_attribute_of_the_model_has_a_field(table: str) -> None:
    typed = {RENAMED.get(declared.path, declared.key) for declared in FIELDS[table]}
    if not table:
        typed |= set(TOP_TABLES)
    assert set(RECORDS[table].names()) - typed == DERIVED.get(table, set())


def test_every_table_has_a_record_and_is_declared() -> None:
    assert set(RECORDS) == set(TABLES) == set(FIELDS)
    assert all(fields for fields in FIELDS.values())
    for table in TABLES:
        owner, _, key = table.rpartition(".")
        if owner:
            assert BY_KEY[owner][key].structural
    for declared in ALL:
        if declared.structural:
            assert declared.path in TABLES
            assert (declared.kind == "list") == (TABLES[declared.path].form == "list")


@ids
def test_a_field_is_said_in_full(declared: Field) -> None:
    assert declared.kind in units.KINDS or declared.kind in ("name", "table", "list")
    assert declared.label and declared.help.endswith((".", "].", "…].")) and "\n" not in declared.help
    assert declared.required == (not declared.default_reason), "required, or a reason for what holds instead"
    assert not (declared.required and declared.default)
    if declared.kind == "word":
        assert declared.choices
    if declared.kind in ("text", "name", "word", "yes_no", "hours", "list", "table"):
        assert declared.low is None and declared.high is None
    else:
        assert declared.low is not None and declared.high is not None and declared.low <= declared.high


@ids
def test_its_source_is_listed(declared: Field) -> None:
    assert not declared.source or declared.source in SOURCES
    if declared.default is not None and declared.kind not in ("word", "name", "count", "yes_no"):
        assert declared.source, "a figure as default has a source"


@ids
def test_its_default_can_be_typed(declared: Field) -> None:
    if declared.default is None:
        return
    read = from_text(declared, declared.default)  # raises when it does not read, or lies outside the bounds
    if declared.kind in units.KINDS and declared.kind not in WORDS and not declared.many:
        size = read.value.per_second if isinstance(read.value, Rate) else read.value
        assert isinstance(size, (int, float)) and math.isfinite(size)


@ids
def test_its_example_reads(declared: Field) -> None:
    from coldbox.project import codec

    line = example(declared)
    header = {"": "", "faces": "[faces.left]"}.get(declared.table)
    if header is None:
        header = _header(declared.table)
    top = "" if declared.path == "format" else "format = 1\n"
    text = f"{top}{line}\n" if not declared.table else f"{top}{header}\n{line}\n"
    _, problems = codec.read(text, "example.toml")
    mine = [str(problem) for problem in problems if "is missing" not in problem.text and "no [box]" not in problem.text]
    assert not mine


def _header(table: str) -> str:
    lines, path = [], ""
    for part in table.split("."):
        path = f"{path}.{part}" if path else part
        if TABLES[path].form == "named":
            lines.append(f"[{path}.a]")
        elif TABLES[path].form == "list":
            lines.append(f"[[{path.replace('constructions', 'constructions.a')}]]")
        else:
            lines.append(f"[{path}]")
    return "\n".join(lines)


def test_a_field_is_found_by_its_path() -> None:
    assert field("box.temperature").kind == "temperature"
    assert field("trip.stops.deliver.mass").table == "trip.stops.deliver"
    assert field("format").required
    with pytest.raises(KeyError):
        field("box.nonsense")


def test_the_documentation_has_every_key() -> None:
    sections = documentation()
    assert [section.table for section in sections] == list(TABLES)
    assert sum(len(section.rows) for section in sections) == len(ALL) == len(as_rows())
    for section in sections:
        for row in section.rows:
            assert row.kind and row.needed and row.help and row.example.startswith(f"{row.key} = ")
    doors = documentation("doors")
    assert [section.header for section in doors] == ["[[doors]]"]
    width = next(row for row in doors[0].rows if row.key == "width")
    assert (width.kind, width.needed, width.bounds) == ("a length", "required", "10 mm to 50 m")
    assert [section.table for section in documentation("[[trip]]")] == [
        "trip",
        "trip.legs",
        "trip.stops",
        "trip.stops.deliver",
    ]
    assert documentation("nothing") == ()
    assert next(row for row in documentation("doors", "IP")[0].rows if row.key == "width").bounds.endswith("ft")


def test_bounds_of_names_and_words_are_not_numbers() -> None:
    for row in as_rows():
        assert (row["low"] is None) == (row["high"] is None)
