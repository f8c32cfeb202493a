"""Methods, tables, fields and checks as documents: where every number comes from."""

from __future__ import annotations

from collections.abc import Iterator, Mapping

import numpy as np

from coldbox.errors import UnknownName
from coldbox.paper.checks import CheckResult
from coldbox.paper.data import Json
from coldbox.paper.document import Block, Column, Document, Heading, Paragraph, Table
from coldbox.paper.load import source_words
from coldbox.project.fields import documentation as fields_documentation
from coldbox.tables.load import names, rows, sources, tables

LONG = 40  # a cell of a table row longer than this is cut; the row itself stands in the table's file


def overview(table: str | None) -> Document:
    """Methods and tables with their sources; or one table, row by row."""
    blocks = list(_one_table(table)) if table else list(_everything())
    return Document(title="sources", blocks=tuple(blocks))


def _everything() -> Iterator[Block]:
    yield Heading(text="Methods", level=1)
    for name, row in rows("methods").items():
        yield Paragraph(text=f"{name}: {row['gives']}. Holds for: {row['holds']}.")
        yield Paragraph(text=f"{source_words(str(row['source']))}: {row['where']}", indent=1)
    yield Heading(text="Tables")
    listed = tuple((table, str(len(names(table))), _table_sources(table)) for table in tables() if table != "methods")
    columns = (Column(title="table"), Column(title="rows", align="right"), Column(title="sources", gives=True))
    yield Table(columns=columns, rows=listed)
    yield Heading(text="Sources")
    for key in sources():
        yield Paragraph(text=f"{key}: {source_words(key)}")


def _table_sources(table: str) -> str:
    return ", ".join(sorted({str(row["source"]) for row in rows(table).values()}))


def _one_table(table: str) -> Iterator[Block]:
    yield Heading(text=f"Table {table}", level=1)
    for name, row in rows(table).items():
        values = ", ".join(f"{key} {_cut(value)}" for key, value in row.items() if key not in ("source", "where"))
        yield Paragraph(text=f"{name}: {values}")
        yield Paragraph(text=f"{row['source']}: {row.get('where', '')}", indent=1)


def _cut(value: object) -> str:
    text = str(value)
    return text if len(text) <= LONG else text[: LONG - 1] + "…"


def fields(table: str | None) -> Document:
    """Every key a project file may hold: the documentation of the file format."""
    return Document(title="fields", blocks=tuple(_fields(table)))


def _fields(table: str | None) -> Iterator[Block]:
    sections = fields_documentation.documentation(table)
    if not sections:
        raise UnknownName("tables of the project file", str(table), None)
    for number, section in enumerate(sections):
        yield Heading(text=f"{section.header}: {section.help}", level=1 if number == 0 else 2)
        for row in section.rows:
            bounds = f", {row.bounds}" if row.bounds else ""
            needed = "Required." if row.needed == "required" else f"If absent: {row.needed}."
            yield Paragraph(text=row.example, indent=1)
            yield Paragraph(text=f"{row.help} Takes {row.kind}{bounds}. {needed}", indent=2)


def checked(results: list[CheckResult]) -> Document:
    """Every check from outside: expected, computed, deviation, source."""
    failed = [result for result in results if not result.passed]
    head = f"{len(results)} checks from outside, {len(failed)} outside their tolerance"
    return Document(title=head, blocks=tuple(_checked_blocks(head, results)))


def _checked_blocks(head: str, results: list[CheckResult]) -> Iterator[Block]:
    yield Heading(text=head, level=1)
    for method in dict.fromkeys(result.method for result in results):
        yield Heading(text=method)
        columns = (
            Column(title="check", gives=True),
            Column(title="expected", align="right"),
            Column(title="computed", align="right"),
            Column(title="off by", align="right"),
            Column(title="kind, source", gives=True),
        )
        mine = [result for result in results if result.method == method]
        yield Table(columns=columns, rows=tuple(_check_row(result) for result in mine))


def _check_row(result: CheckResult) -> tuple[str, ...]:
    mark = "" if result.passed else " FAILS"
    return (
        result.id + mark,
        _plain(result.expected),
        _plain(result.computed),
        f"{result.deviation:.2g}",
        f"{result.kind} [{result.trust}] {result.source}, {result.where}",
    )


def _plain(value: object) -> str:
    if isinstance(value, float | int):
        return f"{value:.5g}"
    if isinstance(value, np.ndarray):
        return f"{value.size} figures"
    return _cut(value)


def sources_json(table: str | None) -> Json:
    """Sources as JSON, or the rows of one table."""
    return {key: _json(row) for key, row in (rows(table) if table else sources()).items()}


def _json(value: object) -> Json:
    if isinstance(value, Mapping):
        return {str(key): _json(item) for key, item in value.items()}
    if isinstance(value, list | tuple):
        return [_json(item) for item in value]
    return value if isinstance(value, bool | int | float) else str(value)


def fields_json(table: str | None) -> Json:
    """The field declarations as JSON."""
    return [_json(row) for row in fields_documentation.as_rows(table)]
