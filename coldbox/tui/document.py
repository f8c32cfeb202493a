"""A project as TOML data, changed value by value and thing by thing; never in place: each change gives another one."""

from __future__ import annotations

import math
from collections.abc import Mapping
from typing import Any, Final

from coldbox.project import setting, values
from coldbox.project.fields import BY_KEY, TABLES, Field
from coldbox.tui.least import called, free_name, least
from coldbox.tui.places import (
    Document,
    Keys,
    Refused,
    copied,
    field_of,
    inside,
    keys_of_block,
    keys_of_value,
    made_for,
    places,
    table_of,
)
from coldbox.units import KINDS, display_unit

__all__ = [
    "ADDABLE", "Document", "Refused", "System", "block_at", "field_at", "moved", "shown", "typed", "with_copy",
    "with_data", "with_event", "with_new", "with_value", "without",
]  # fmt: skip

System = values.System

ADDABLE: Final = (
    "doors", "panels", "lots", "packs", "people", "lights", "motors", "trucks", "heaters", "ventilation",
)  # fmt: skip
"""The lists that a new thing is added to from the box as it is drawn. Lists in a thing go by their key path."""


def value_at(document: Mapping[str, Any], path: str) -> Any:
    """What the document says under a key path; None where it says nothing."""
    keys = keys_of_value(document, path)
    return None if keys is None else inside(document, keys)


def block_at(document: Mapping[str, Any], path: str) -> Mapping[str, Any]:
    """What the document says of a thing or a table of its own ("box", "doors.main", "faces.left"); empty: nothing."""
    keys = keys_of_block(document, path)
    found = None if keys is None else inside(document, keys)
    return found if isinstance(found, dict) else {}


def field_at(document: Mapping[str, Any], path: str) -> Field:
    """The declaration of the value under a key path. Raises Refused where there is none."""
    _, keys = made_for(document, path)
    field = field_of(keys)
    if field is None or field.structural:
        raise Refused(f"There is no field {path}.")
    return field


def with_value(document: Document, path: str, text: str, system: System) -> Document:
    """The document with a value as somebody typed it. A bare number takes the unit that is shown beside its field.

    A thing that gets another name keeps it wherever the file speaks of it. Raises Refused in words: what was found,
    what would do.
    """
    changed, keys = made_for(document, path)
    field = field_of(keys)
    if field is None or field.structural:
        raise Refused(f"There is no field {path}.")
    value = typed(field, text, system)
    if field.key == "name" and field.table:
        _rename(document, changed, keys, value)
    inside(changed, keys[:-1])[keys[-1]] = value
    return changed


def with_data(document: Document, path: str, data: Any) -> Document:
    """The document with a value as the file writes it. Raises Refused where the path leads nowhere."""
    changed, keys = made_for(document, path)
    inside(changed, keys[:-1])[keys[-1]] = data
    return changed


def moved(before: Document, after: Document, path: str) -> str:
    """The key path of a value after a change: another one where it was the name of its thing that changed."""
    thing, _, key = path.rpartition(".")
    if key != "name" or not thing:
        return path
    keys = keys_of_block(before, thing)
    found = (one.path for one in places(after) if keys_of_block(after, one.path) == keys)
    return f"{next(found, thing)}.name"


def without(document: Document, path: str) -> Document:
    """The document without a value or a thing; tables that are left empty go too. Raises Refused for what must stay."""
    changed: Document = copied(document)
    keys = keys_of_block(document, path) if path else None
    if keys is None:
        keys = keys_of_value(document, path)
        if keys is None:
            _refuse_missing(document, path)
            return document
    elif path in ("box", ""):
        raise Refused("The box stays: everything else stands on it or in it.")
    holder = inside(changed, keys[:-1])
    del holder[keys[-1]]
    keys = keys[:-1]
    while keys and keys != ("box",) and not inside(changed, keys):
        if isinstance(keys[-1], int) or (len(keys) == 2 and keys[0] in ("constructions", "neighbours")):
            break  # a thing that says nothing any more still counts as one
        del inside(changed, keys[:-1])[keys[-1]]
        keys = keys[:-1]
    return changed


def with_new(document: Document, table: str, face: str = "") -> tuple[Document, str]:
    """The document with a new thing, and its key path; on that face where it can stand on one.

    table: a list at the top ("doors"), a table of names ("constructions"), or the key path of a list in a thing
    ("lots.cod.limits", "outage.events"). Raises Refused where there is no such list.
    """
    changed, keys = _made_for_list(document, table)
    kind = table_of(keys)
    form = TABLES[kind].form if kind in TABLES else "one"
    if kind not in TABLES or (form == "one" and "." not in kind) or TABLES[kind].only:
        raise Refused(f"Nothing can be added to {table}.")
    given = least(document, kind)
    if face and "face" in BY_KEY[kind] and (BY_KEY[kind]["face"].required or face != "front"):
        given["face"] = face
    holder, key = inside(changed, keys[:-1]), keys[-1]
    before = inside(document, keys)
    if before is not None and not isinstance(before, list if form == "list" else dict):
        raise Refused(
            f"What the file has under {table} is no {'list' if form == 'list' else 'table'}. Mend that first."
        )
    if form == "one":
        if before is not None:
            raise Refused(f"There is {table} already.")
        holder[key] = given
        return changed, table
    if form == "named":
        names = dict(before or {})
        name = free_name(kind, set(names))
        holder[key] = {**names, name: given}
        return changed, f"{table}.{name}"
    items = list(before or ())
    named = "name" in BY_KEY[kind] and kind != "outage.events"
    if named:
        given = {"name": free_name(kind, _taken(kind, items)), **given}
    holder[key] = [*items, given]
    return changed, f"{table}.{given['name']}" if named else f"{table}[{len(items) + 1}]"


def _made_for_list(document: Document, table: str) -> tuple[Document, Keys]:
    """A copy of the document with the tables around a list, and the keys that lead to it."""
    parent, _, word = table.rpartition(".")
    if not parent:
        changed: Document = copied(document)
        return changed, (word,)
    changed, keys = made_for(document, f"{parent}.notes")
    block, notes = inside(changed, keys[:-1]), inside(document, keys)
    if notes is None:
        del block["notes"]
    else:
        block["notes"] = notes
    return changed, (*keys[:-1], word)


def with_event(document: Document, event: Mapping[str, Any]) -> Document:
    """The document with one more thing that happens in the outage."""
    changed: Document = copied(document)
    outage = changed.setdefault("outage", {})
    outage.setdefault("events", []).append(dict(event))
    return changed


def with_copy(document: Document, path: str) -> tuple[Document, str]:
    """The document with the thing once more, under a name of its own, and its key path. Raises Refused."""
    changed: Document = copied(document)
    keys = keys_of_block(document, path)
    if not keys or len(keys) < 2 or TABLES[table_of(keys)].form == "one" or keys[0] == "faces":
        _refuse_missing(document, path)
        raise Refused("Only a thing of which there may be several can be doubled.")
    kind = table_of(keys)
    twin = copied(inside(document, keys))
    holder, key = inside(changed, keys[:-1]), keys[-1]
    if isinstance(holder, dict):
        name = free_name(kind, set(holder), str(key))
        holder[name] = twin
        return changed, f"{kind}.{name}"
    own = setting.named(TABLES[kind], holder)[key]
    stem = path.removesuffix(f".{own}") if own else path.rpartition("[")[0]
    holder.insert(key + 1, twin)
    if "name" not in BY_KEY[kind] or not own:
        return changed, f"{stem}[{key + 2}]"
    twin["name"] = free_name(kind, _taken(kind, inside(document, keys[:-1])), own)
    return changed, f"{stem}.{twin['name']}"


def shown(value: Any) -> str:
    """A value of the document as one would type it."""
    if isinstance(value, list):
        return ", ".join(str(one) for one in value)
    if isinstance(value, bool):
        return "yes" if value else "no"
    return str(value)


# Values


def typed(field: Field, text: str, system: System) -> Any:
    """The text as the file writes it: numbers for counts, true and false, lists, and text with its unit."""
    text = text.strip()
    try:
        entered = values.from_text(field, text, system)
    except values.Wrong as wrong:
        declared = KINDS.get(field.kind)
        if declared is None or not declared.si_display or not _bare(text):
            raise Refused(str(wrong)) from None
        text = f"{text} {display_unit(field.kind, system).unit}"
        try:
            entered = values.from_text(field, text, system)
        except values.Wrong as still:
            raise Refused(str(still)) from None
    if field.many and field.kind not in ("count", "yes_no"):
        parts = values.split(text)
        return parts if len(parts) > 1 or field.many == "three" else parts[0]
    if field.kind in ("count", "yes_no"):
        return entered.value
    return text


def _bare(text: str) -> bool:
    """Whether a text is a number and nothing else."""
    try:
        return math.isfinite(float(text.replace(",", ".").replace(" ", "").replace("−", "-")))
    except ValueError:
        return False


# Names


def _taken(kind: str, items: list[Any]) -> set[str]:
    taken = {str(name) for name in setting.named(TABLES[kind], items) if name}
    return taken | {str(item["name"]) for item in items if isinstance(item, dict) and "name" in item}


def _rename(document: Document, changed: Document, keys: Keys, name: str) -> None:
    """Gives a thing's new name to whatever speaks of it. Raises Refused for a name that another has."""
    kind, items, at = table_of(keys[:-1]), inside(document, keys[:-2]), keys[-2]
    if not isinstance(items, list):
        return
    before = setting.named(TABLES[kind], items)[at]
    others = _taken(kind, [item for index, item in enumerate(items) if index != at])
    if name in others:
        raise Refused(f'"{name}" is taken among the {kind.replace(".", " ")}. Give this one another name.')
    if not before or before in others:
        return
    for place in places(document):
        for word, field in BY_KEY[place.table].items():
            if field.refers == kind and place.block.get(word) == before:
                where = keys_of_block(document, place.path)
                if where is not None:
                    inside(changed, where)[word] = name


def _refuse_missing(document: Document, path: str) -> None:
    """Says in words why there is nothing under a path; nothing is said of a value that is not there."""
    head, _, name = path.partition(".")
    if head == "faces" and name in TABLES["faces"].only:
        raise Refused("The box keeps its six faces; only what is said of one can go.")
    if head in TABLES and TABLES[head].form != "one" and name:
        names = called(document, head)
        if not any(name == one or name.startswith((f"{one}.", f"{one}[")) for one in names) and head != "faces":
            raise Refused(f'There is no "{name}" among the {head}.')
