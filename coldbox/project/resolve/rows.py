"""Rows of the built-in tables as a project needs them."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from coldbox.errors import UnknownName
from coldbox.project.resolve.reader import Reader
from coldbox.tables import load

NOTHING: Mapping[str, Any] = {}


def row(table: str, name: str) -> Mapping[str, Any]:
    """One row; raises UnknownName."""
    found: Mapping[str, Any] = load.row(table, name)
    return found


def row_or_problem(reader: Reader, key: str, table: str, name: str, otherwise: str = "") -> Mapping[str, Any]:
    """The row that `key` names, or a problem with the nearest name, and an empty row."""
    try:
        return row(table, name)
    except UnknownName as unknown:
        near = f' Nearest: "{unknown.nearest}".' if unknown.nearest else ""
        more = f" {otherwise}" if otherwise else ""
        reader.problem(key, f'There is no "{name}" among the {table}.{near}{more}')
        return NOTHING


def by_room(table: str, temperature: float) -> tuple[str, Mapping[str, Any]]:
    """The row of a table of bands for a room temperature: the first whose `up_to_c` is not below it."""
    rows = load.rows(table)
    for name, found in rows.items():
        if not temperature > found["up_to_c"]:
            return name, found
    return name, found  # warmer than every band: the warmest
