"""The documentation of the file format, out of the declarations: what `coldbox sources --fields` prints."""

from __future__ import annotations

from typing import NamedTuple

from coldbox.project.fields import FIELDS, TABLES
from coldbox.project.fields.declare import Field, Table
from coldbox.project.fields.examples import example
from coldbox.units import KINDS


class Row(NamedTuple):
    """One key, in words."""

    key: str
    kind: str  # "a length", "one of: white, light", "a list of tables: see [box.limits]"
    needed: str  # "required", or what holds when it is left out: "0 % (in full sun)", "the face's"
    bounds: str  # "0.02 m to 500 m", or ""
    help: str
    example: str  # a line of the file
    source: str  # key into the sources, or ""


class Section(NamedTuple):
    """One table, in words."""

    table: str  # "", "doors", "trip.stops"
    header: str  # as it stands in a file: "[[doors]]", "limits = [{ … }]"
    help: str
    rows: tuple[Row, ...]


def documentation(table: str | None = None, system: str = "SI") -> tuple[Section, ...]:
    """Every table with its keys, in the order in which a file is written.

    table   only this one and those inside it; None: all. "" or "top": the lines above the tables
    system  the units of the bounds, "SI" or "IP"
    result  sections; empty for a table that does not exist
    """
    wanted = None if table is None else table.strip().strip("[]")
    wanted = "" if wanted == "top" else wanted
    return tuple(
        Section(name, _header(declared), declared.help, tuple(_row(field, system) for field in FIELDS[name]))
        for name, declared in TABLES.items()
        if wanted is None or name == wanted or (wanted and name.startswith(f"{wanted}."))
    )


def as_rows(table: str | None = None) -> list[dict[str, object]]:
    """The same as plain rows: one per key, with its declared bounds in SI."""
    rows = []
    for section in documentation(table):
        for field, row in zip(FIELDS[section.table], section.rows, strict=True):
            rows.append({
                "table": section.table, "header": section.header, "key": field.key, "kind": field.kind,
                "kind_words": row.kind, "required": field.required, "default": field.default,
                "default_reason": field.default_reason, "low": field.low, "high": field.high, "bounds": row.bounds,
                "si_unit": KINDS[field.kind].si if field.kind in KINDS else "",
                "choices": list(field.choices), "label": field.label, "help": field.help, "example": row.example,
                "source": field.source,
            })  # fmt: skip
    return rows


def _header(table: Table) -> str:
    owner, _, key = table.name.rpartition(".")
    if not table.name:
        return "top of the file"
    if owner:
        inside = "{ … }" if table.form == "one" else "[{ … }, …]"
        return f"{key} = {inside}  in {_header(TABLES[owner]).partition('  ')[0]}"
    return {"one": f"[{table.name}]", "named": f"[{table.name}.NAME]", "list": f"[[{table.name}]]"}[table.form]


def _row(field: Field, system: str) -> Row:
    within = _bounds(field, system)
    return Row(field.key, _kind(field), _needed(field), within, field.help, example(field), field.source)


def _kind(field: Field) -> str:
    if field.structural:
        form = "a list of tables" if field.kind == "list" else "a table"
        return f"{form}: see {field.path}"
    if field.kind == "word":
        return f"{'any of' if field.many else 'one of'}: {', '.join(field.choices)}"
    if field.kind == "yes_no":
        return "true or false"
    if field.kind == "name":
        return "a name"
    if field.kind == "text":
        return "texts in a list" if field.many else "a text"
    label = KINDS[field.kind].label
    if field.many:
        label = f"three of {label} in a list" if field.many == "three" else f"{label}, or a list"
    return f"{label} or {KINDS[field.other_kind].label}" if field.other_kind else label


def _needed(field: Field) -> str:
    if field.required:
        return "required"
    if field.default is None:
        return field.default_reason
    return f"{field.default} ({field.default_reason})"


def _bounds(field: Field, system: str) -> str:
    if field.low is None or field.high is None or field.low == field.high:
        return ""
    from coldbox.project.values import bounds

    low, high = bounds(field, "IP" if system == "IP" else "SI")
    return f"{low} to {high}"
