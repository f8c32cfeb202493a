"""TOML data as text, laid out as the examples are: keys in the order of their declarations, lists of things as blocks.

`tomli_w` writes every key and every plain value; where they stand is decided here, since alone it would write short
lists of tables in one line and move tables about.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from typing import Any

from coldbox.project.fields import BY_KEY, TABLES, TOP_TABLES
from coldbox.project.linemap import Key

_WIDE = 100  # characters; a longer list of tables is written with an item to a line
_INDENT = "  "


def literal(value: Any) -> str:
    """A value as it stands after `=`: in one line, but for a long list of tables."""
    if isinstance(value, dict):
        inside = ", ".join(f"{word(key)} = {literal(item)}" for key, item in value.items())
        return f"{{ {inside} }}" if inside else "{}"
    if isinstance(value, list):
        items = [literal(item) for item in value]
        flat = f"[{', '.join(items)}]"
        if len(flat) <= _WIDE or not all(isinstance(item, dict) for item in value):
            return flat
        return "[\n" + "".join(f"{_INDENT}{item},\n" for item in items) + "]"
    return _dumped({"x": value})[len("x = ") : -1]


def word(key: str) -> str:
    """One part of a key, in quotes where it needs them."""
    return _dumped({key: 1})[: -len(" = 1\n")]


def _dumped(pair: Mapping[str, Any]) -> str:
    import tomli_w  # only who writes pays for it

    return tomli_w.dumps(pair)


def header(path: Key) -> str:
    """The name of a table as it stands in brackets; of a thing in a list, that of the list."""
    return ".".join(word(part) for part in path if isinstance(part, str))


def table_of(path: Key) -> str:
    """The table whose declarations hold at a place in a document: "lots.limits" for ("lots", 0, "limits", 1)."""
    table, after_named = "", False
    for part in path:
        if isinstance(part, int) or after_named:
            after_named = False
            continue
        table = f"{table}.{part}" if table else part
        after_named = table in TABLES and TABLES[table].form == "named"
    return table


def ranks(path: Key) -> dict[str, int]:
    """The place of each declared key in the table at `path`; a named table's names have none."""
    table = table_of(path)
    if not path:
        return {key: rank for rank, key in enumerate((*BY_KEY[""], *TOP_TABLES))}
    if table in TABLES and TABLES[table].form == "named" and len(path) == 1:
        return {key: rank for rank, key in enumerate(TABLES[table].only)}
    return {key: rank for rank, key in enumerate(BY_KEY.get(table, ()))}


def in_order(path: Key, keys: Iterable[str]) -> list[str]:
    """Keys of the table at `path` in the order of the declarations, then those that have none as they come."""
    rank = ranks(path)
    return sorted(keys, key=lambda key: rank.get(key, len(rank)))


def stands_alone(path: Key, value: Any) -> bool:
    """Whether a new value gets a header of its own: top tables, long named things, and lists of things that belong to
    one table ([[doors]], [[outage.events]]). What belongs to one of many stays in it, in line.
    """
    if isinstance(value, list):
        things = bool(value) and all(isinstance(item, dict) for item in value)
        alone = len(path) == 1 or (len(path) == 2 and path[0] in TABLES and TABLES[str(path[0])].form == "one")
        return things and alone
    if isinstance(value, dict):
        return len(path) == 1 or (len(path) == 2 and isinstance(path[1], str) and len(literal(value)) > _WIDE)
    return False


def blocks(path: Key, value: Any) -> list[str]:
    """What stands alone, as text: a block for each header, each ending with a line end.

    path   its place in the document
    value  a table, or a list of tables
    """
    if isinstance(value, list):
        return [block for item in value for block in _table(path, f"[[{header(path)}]]\n", item, in_list=True)]
    return _table(path, f"[{header(path)}]\n", value)


def document(whole: Mapping[str, Any]) -> str:
    """A whole document, for a file that is new or cannot be revised."""
    return "\n".join(_table((), "", whole))


def _table(path: Key, head: str, table: Mapping[str, Any], *, in_list: bool = False) -> list[str]:
    own, below = head, []
    for key in in_order(path, table):
        inside = (*path, key)
        if not in_list and stands_alone(inside, table[key]):
            below += blocks(inside, table[key])
        else:
            own += f"{word(key)} = {literal(table[key])}\n"
    only_below = path and not own.removeprefix(head) and below and not in_list
    return below if only_below else [own, *below] if own else below
