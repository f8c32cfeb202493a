"""Where a key path leads in a document, and every table that stands in one."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from typing import Any

from coldbox.errors import ColdboxError
from coldbox.project import setting
from coldbox.project.fields import BY_KEY, FIELDS, TABLES, TOP_TABLES, Field
from coldbox.record import Record

Document = dict[str, Any]
Keys = tuple[Any, ...]  # of dictionaries and lists, from the top of the document down


class Refused(ColdboxError):
    """A change that will not do, in words."""


class Place(Record):
    """One table that stands in a document: its key path, the table that declares its keys, what it says."""

    path: str
    table: str
    name: str  # its own, "" where it has none
    number: int  # in its list, from 1; 0 where it stands in none
    block: Mapping[str, Any]


def copied(node: Any) -> Any:
    """The same data once more, down to the values, which are never changed in place."""
    if isinstance(node, dict):
        return {key: copied(inside) for key, inside in node.items()}
    return [copied(inside) for inside in node] if isinstance(node, list) else node


def made_for(document: Mapping[str, Any], path: str) -> tuple[Document, Keys]:
    """A copy of the document with the tables that the path of a value needs, and the keys that lead to the value.

    Raises Refused where the path leads nowhere. What stands under the last key is not the document's own any more.
    """
    changed = copied(dict(document))
    problems = setting.put(changed, {path: ""})
    if problems:
        raise Refused(problems[0].text)
    keys = _keys_of_mark(changed)
    if keys is None:
        raise Refused(f"What the file has on the way to {path} is no table. Mend that first.")
    return changed, keys


def keys_of_value(document: Mapping[str, Any], path: str) -> Keys | None:
    """The keys that lead to a value; None where there is none yet."""
    try:
        _, keys = made_for(document, path)
    except Refused:
        return None
    block = inside(document, keys[:-1])
    return keys if isinstance(block, dict) and keys[-1] in block else None


def keys_of_block(document: Mapping[str, Any], path: str) -> Keys | None:
    """The keys that lead to a table such as "box", "doors.main", "lots.cod.limits[1]"; None where it does not stand."""
    if not path:
        return ()
    try:
        _, keys = made_for(document, f"{path}.notes")
    except Refused:
        return None
    return keys[:-1] if isinstance(inside(document, keys[:-1]), dict) else None


def inside(document: Any, keys: Sequence[Any]) -> Any:
    """What stands under the keys; None where nothing does."""
    for key in keys:
        try:
            document = document[key]
        except (KeyError, IndexError, TypeError):
            return None
    return document


def field_of(keys: Sequence[Any]) -> Field | None:
    """The declaration of the value that keys lead to."""
    return BY_KEY.get(table_of(keys[:-1]), {}).get(str(keys[-1]))


def table_of(keys: Sequence[Any]) -> str:
    """The table that declares what stands under keys: "doors" of ("doors", 0), "constructions" of one in place."""
    table, at = "", 0
    while at < len(keys):
        word = str(keys[at])
        table = "constructions" if table and word == "construction" else f"{table}.{word}" if table else word
        form = TABLES[table].form if table in TABLES and word != "construction" else "one"
        at += 1 if form == "one" else 2
    return table


def places(document: Mapping[str, Any]) -> Iterator[Place]:
    """Every table of the document, each before those that stand in it; what has not the form of one is left out."""
    yield Place(path="", table="", name="", number=0, block=document)
    for table in TOP_TABLES:
        yield from _under(table, table, document.get(table))


def _under(table: str, path: str, node: Any) -> Iterator[Place]:
    form = TABLES[table].form
    if form == "one" and isinstance(node, dict):
        yield from _block(Place(path=path, table=table, name="", number=0, block=node))
    elif form == "named" and isinstance(node, dict):
        for name, block in node.items():
            if isinstance(block, dict):
                yield from _block(Place(path=f"{path}.{name}", table=table, name=str(name), number=0, block=block))
    elif form == "list" and isinstance(node, list):
        for number, (block, name) in enumerate(zip(node, setting.named(TABLES[table], node), strict=True), 1):
            here = f"{path}.{name}" if name else f"{path}[{number}]"
            if isinstance(block, dict):
                yield from _block(Place(path=here, table=table, name=name, number=number, block=block))


def _block(place: Place) -> Iterator[Place]:
    yield place
    for field in FIELDS[place.table]:
        node = place.block.get(field.key)
        path = f"{place.path}.{field.key}"
        if field.structural:
            yield from _under(f"{place.table}.{field.key}", path, node)
        elif field.key == "construction" and isinstance(node, dict):
            yield from _block(Place(path=path, table="constructions", name="", number=0, block=node))


def _keys_of_mark(node: Any) -> Keys | None:
    """The keys that lead to the mark of `setting.put`."""
    items = node.items() if isinstance(node, dict) else enumerate(node)
    for key, value in items:
        if isinstance(value, setting.Option):
            return (key,)
        if isinstance(value, dict | list):
            found = _keys_of_mark(value)
            if found is not None:
                return (key, *found)
    return None
