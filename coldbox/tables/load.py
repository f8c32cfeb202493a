"""Rows of the built-in tables, each checked when it is first asked for.

Parsing a whole table costs ten milliseconds and more, a row less than one: a look-up finds the row's block in the text
and parses only that. So in these files a line that starts with `[` at its very beginning is always the head of a row.
"""

from __future__ import annotations

import os
import tomllib
from collections.abc import Mapping
from functools import cache
from types import MappingProxyType
from typing import TYPE_CHECKING, Any

from coldbox.errors import TableFault, UnknownName
from coldbox.tables import columns

if TYPE_CHECKING:
    from pathlib import Path  # with all it imports it costs six milliseconds

Row = Mapping[str, Any]  # what each column holds is declared in `columns` and checked before anybody sees the row

FOLDER = os.path.dirname(__file__)


def row(table: str, name: str, folder: str | Path = FOLDER) -> Row:
    """One row of a table, by its name or another name it goes by (`also`).

    table: file name without its ending. name: as written there. Returns the columns, numbers as float, read-only.
    Raises UnknownName with the nearest name; TableFault where the row breaks its declaration or has no known source.
    Example: row("materials", "PIR foam")["conductivity"]
    """
    return _row(table, name, folder)


def rows(table: str, folder: str | Path = FOLDER) -> Mapping[str, Row]:
    """Every row of a table by name, in the order of the file. Raises UnknownName and TableFault as `row` does."""
    return _rows(table, folder)


def names(table: str, folder: str | Path = FOLDER) -> tuple[str, ...]:
    """The names of a table's rows, in the order of the file; parses nothing. Raises UnknownName."""
    return tuple(_blocks(table, folder))


def aliases(table: str, folder: str | Path = FOLDER) -> Mapping[str, str]:
    """Other names of a table's rows, each with the name of its row. Raises UnknownName."""
    return _aliases(table, folder)


def figures(table: str, column: str, folder: str | Path = FOLDER) -> Mapping[str, float]:
    """One number column of a whole table by row name, read off the text without parsing it or checking the rows.

    For searches over a long table, such as the nearest place. Rows without the column are left out.
    """
    found: dict[str, float] = {}
    text, wanted = "\n" + _text(table, folder), f"\n{column} = "
    at = text.find(wanted)
    while at >= 0:
        head = text.rfind("\n[", 0, at) + 1
        name = _name(text[head : text.find("\n", head)])
        start = at + len(wanted)
        end = text.find("\n", start)
        found[name] = float(text[start : len(text) if end < 0 else end].partition("#")[0])
        at = text.find(wanted, start)
    return found


def source(key: str, folder: str | Path = FOLDER) -> Row:
    """Title, place and how it was read of a source. Raises UnknownName."""
    return _row("sources", key, folder)


def sources(folder: str | Path = FOLDER) -> Mapping[str, Row]:
    """Every source by its key."""
    return _rows("sources", folder)


def tables() -> tuple[str, ...]:
    """The names of the built-in tables."""
    return tuple(columns.COLUMNS)


@cache
def _text(table: str, folder: str | Path) -> str:
    if table != "sources" and table not in columns.COLUMNS:
        raise UnknownName("tables", table, _nearest(table, tables()))
    try:
        with open(os.path.join(folder, f"{table}.toml"), encoding="utf-8") as file:
            return file.read()
    except OSError as trouble:
        raise TableFault(table, "all", f"cannot be read: {trouble.strerror}") from trouble


@cache
def _row(table: str, name: str, folder: str | Path) -> Row:
    block = _block(table, name, folder)
    if block is None:
        other = _aliases(table, folder).get(name)
        if other is not None:
            return _row(table, other, folder)
        known = (*names(table, folder), *_aliases(table, folder))
        raise UnknownName(table, name, _nearest(name, known))
    try:
        values = _plain(block)
        return _checked(table, name, tomllib.loads(block)[name] if values is None else values, folder)
    except tomllib.TOMLDecodeError as trouble:
        raise TableFault(table, name, f"cannot be read: {trouble}") from trouble


def _plain(block: str) -> dict[str, Any] | None:
    """The values of a row, each on a line of its own, as TOML has them; None where a line is anything else.

    Most lines hold one text or one number, and tomllib takes thirty times as long for them.
    """
    values: dict[str, Any] = {}
    for line in block.split("\n")[1:]:
        if not line or line[0] == "#":
            continue
        key, _, text = line.partition(" = ")
        if not key.isidentifier() or not text or key in values:
            return None
        if text[0] == text[-1] == '"' and len(text) > 1 and '"' not in text[1:-1] and "\\" not in text:
            values[key] = text[1:-1]
        elif _is_number(text):
            values[key] = float(text) if "." in text else int(text)
        elif text[0] == "[" and text[-1] == "]":
            values[key] = tomllib.loads(line)[key]
        elif text in ("true", "false"):
            values[key] = text == "true"
        else:
            return None
    return values


@cache
def _rows(table: str, folder: str | Path) -> Mapping[str, Row]:
    return MappingProxyType({name: _row(table, name, folder) for name in names(table, folder)})


@cache
def _aliases(table: str, folder: str | Path) -> Mapping[str, str]:
    found: dict[str, str] = {}
    head = ""
    for line in _text(table, folder).split("\n"):
        if line.startswith("["):
            head = _name(line)
        elif line.startswith("also = "):
            found.update(dict.fromkeys(tomllib.loads(line)["also"], head))
    return MappingProxyType(found)


def _is_number(text: str) -> bool:
    """Whether a text is a plain TOML number: digits, perhaps a minus, perhaps decimals."""
    whole, point, decimals = text.removeprefix("-").partition(".")
    plain = text.isascii() and whole.isdigit() and (whole == "0" or whole[0] != "0")
    return plain and (decimals.isdigit() if point else True)


def _block(table: str, name: str, folder: str | Path) -> str | None:
    """The text of one row with its head, or None."""
    return _blocks(table, folder).get(name)


@cache
def _blocks(table: str, folder: str | Path) -> Mapping[str, str]:
    """The text of every row with its head, by name."""
    parts = ("\n" + _text(table, folder)).split("\n[")[1:]
    return {part[: part.find("]\n")].strip('"'): f"[{part}" for part in parts}


def _name(head: str) -> str:
    return head.strip().removeprefix("[").removesuffix("]").strip('"')


def _checked(table: str, name: str, values: object, folder: str | Path) -> Row:
    """The row as callers get it, if it keeps to the declaration of its table."""
    if not isinstance(values, dict):
        raise TableFault(table, name, "is no row")
    declared = columns.SOURCES if table == "sources" else {**columns.COMMON, **columns.COLUMNS[table]}
    also = values.pop("also", None)
    fault = columns.row_fault(declared, values) or (columns.also_fault(also) if also is not None else "")
    if fault:
        raise TableFault(table, name, fault)
    for key in ("source", "monthly_source"):
        if key in values and _block("sources", values[key], folder) is None:
            raise TableFault(table, name, f'{key} "{values[key]}" is not in sources.toml')
    row = columns.cleaned(declared, values)
    return MappingProxyType(row if also is None else {**row, "also": tuple(also)})


def _nearest(name: str, known: tuple[str, ...]) -> str | None:
    import difflib  # only a look-up that failed pays for it

    by_small = {one.casefold(): one for one in known}
    close = difflib.get_close_matches(name.casefold(), by_small, n=1, cutoff=0.5)
    if close:
        return by_small[close[0]]
    within = [one for one in known if name.casefold() in one.casefold() or one.casefold() in name.casefold()]
    return within[0] if within else None
