"""Every row of every built-in table: sound, sourced, and named once."""

from __future__ import annotations

import tomllib
from collections import Counter
from pathlib import Path

import pytest

from coldbox.tables import columns, load

TABLES = (*load.tables(), "sources")


def test_every_file_has_its_declaration_and_every_declaration_its_file():
    assert {file.stem for file in Path(load.FOLDER).glob("*.toml")} == set(TABLES)


@pytest.mark.parametrize("table", TABLES)
def test_every_row_is_sound(table):
    """`rows` checks each row against its declaration and its source; a table is never empty."""
    assert load.rows(table)


@pytest.mark.parametrize("table", TABLES)
def test_a_single_row_reads_as_in_the_whole_table(table):
    """The text search for one row finds exactly what the whole file holds, row for row."""
    text = (Path(load.FOLDER) / f"{table}.toml").read_text(encoding="utf-8")
    assert load.names(table) == tuple(tomllib.loads(text))
    for name, values in load.rows(table).items():
        assert load.row(table, name) == values


@pytest.mark.parametrize("table", TABLES)
def test_names_and_other_names_are_unique(table):
    spoken = [name for row in load.rows(table).values() for name in row.get("also", ())]
    assert set(spoken) == set(load.aliases(table))
    twice = [name for name, count in Counter([*load.names(table), *spoken]).items() if count > 1]
    assert not twice
    assert all(name == name.strip() and name for name in (*load.names(table), *spoken))


@pytest.mark.parametrize("table", load.tables())
def test_number_columns_read_off_the_text_agree_with_the_rows(table):
    numbers = [name for name, column in columns.COLUMNS[table].items() if column.kind == "number"]
    for column in numbers:
        parsed = {name: row[column] for name, row in load.rows(table).items() if column in row}
        assert load.figures(table, column) == parsed


def test_every_source_says_how_it_was_read():
    assert all(row["read"] in ("print", "copy", "memory") for row in load.sources().values())


@pytest.mark.parametrize("table", load.tables())
def test_a_row_from_a_source_nobody_read_says_so(table):
    """The reader sees from the row itself, or from its source, that a figure is remembered."""
    hidden = [
        name
        for name, row in load.rows(table).items()
        if "memory" in row["where"] + row.get("note", "") and load.source(row["source"])["read"] == "print"
    ]
    assert not hidden
