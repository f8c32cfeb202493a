"""A project as TOML data, changed value by value and thing by thing; never in place: each change gives another one."""

from __future__ import annotations

import copy
import math
import tomllib
from collections.abc import Mapping
from typing import Any, Final

from coldbox.errors import ColdboxError
from coldbox.project import setting, values
from coldbox.project.fields import BY_KEY, TABLES, Field, example
from coldbox.project.origins import declaration
from coldbox.units import KINDS, display_unit

Document = dict[str, Any]
System = values.System

# What a new thing says, where the first example of each required field would not make sense beside the others.
NEW: Final[Mapping[str, Mapping[str, Any]]] = {
    "doors": {"width": "0.9 m", "height": "2 m", "passages": "10/h"},
    "panels": {"width": "1 m", "height": "1 m"},
    "lots": {"product": "milk", "stored": "200 kg"},
    "packs": {"kind": "ice", "mass": "5 kg"},
    "people": {"count": 1, "hours": "07:00-17:00"},
    "lights": {"power": "40 W", "hours": "06:00-18:00"},
    "motors": {"power": "500 W"},
    "trucks": {"power": "2 kW", "hours": "07:00-17:00 20 %"},
    "heaters": {"kind": "drain", "power": "100 W"},
    "ventilation": {"flow": "100 m³/h"},
}  # fmt: skip
ADDABLE: Final = tuple(NEW)


class Refused(ColdboxError):
    """A change that will not do, in words."""


def value_at(document: Mapping[str, Any], path: str) -> Any:
    """What the document says under a key path; None where it says nothing."""
    place = _place(document, path)
    return None if place is None else place[0].get(place[1])


def block_at(document: Mapping[str, Any], path: str) -> Mapping[str, Any]:
    """What the document says of a thing or a table of its own ("box", "doors.main", "faces.left"); empty: nothing."""
    table, _, name = path.partition(".")
    inside = document.get(table.partition("[")[0])
    if isinstance(inside, list):
        place, index = _index(dict(document), path)
        found = document[place][index]
    elif name and isinstance(inside, dict):
        found = inside.get(name)
    else:
        found = inside
    return found if isinstance(found, dict) else {}


def with_value(document: Document, path: str, text: str, system: System) -> Document:
    """The document with a value as somebody typed it. A bare number takes the unit that is shown beside its field.

    Raises Refused in words: what was found, what would do.
    """
    field = declaration(path)
    if field is None or field.structural:
        raise Refused(f"There is no field {path}.")
    value = _typed(field, text, system)
    changed = copy.deepcopy(document)
    problems = setting.put(changed, {path: ""})
    if problems:
        raise Refused(problems[0].text)
    node, key = _option(changed)
    node[key] = value
    return changed


def without(document: Document, path: str) -> Document:
    """The document without a value or a thing; tables that are left empty go too."""
    changed = copy.deepcopy(document)
    if _thing(path):
        _remove_thing(changed, path)
        return changed
    place = _place(changed, path)
    if place is not None:
        place[0].pop(place[1], None)
        _prune(changed, path)
    return changed


def with_new(document: Document, table: str, face: str = "") -> tuple[Document, str]:
    """The document with a new thing in a list, and its key path; on that face where it can stand on one."""
    changed = copy.deepcopy(document)
    given = dict(NEW.get(table, {}))
    for field in BY_KEY[table].values():
        if field.required and field.key not in given:
            given[field.key] = tomllib.loads(example(field))[field.key]
    if face and "face" in BY_KEY[table] and (BY_KEY[table]["face"].required or face != "front"):
        given["face"] = face
    items = changed.setdefault(table, [])
    name = _free(table, items, _called(table))
    items.append({"name": name, **given})
    return changed, f"{table}.{name}"


def with_event(document: Document, event: Mapping[str, Any]) -> Document:
    """The document with one more thing that happens in the outage."""
    changed = copy.deepcopy(document)
    outage = changed.setdefault("outage", {})
    outage.setdefault("events", []).append(dict(event))
    return changed


def with_copy(document: Document, path: str) -> tuple[Document, str]:
    """The document with the thing once more, under a name of its own, and its key path."""
    changed = copy.deepcopy(document)
    table, index = _index(changed, path)
    items = changed[table]
    twin = copy.deepcopy(items[index])
    twin["name"] = _free(table, items, str(twin.get("name") or setting.named(TABLES[table], items)[index] or table))
    items.insert(index + 1, twin)
    return changed, f"{table}.{twin['name']}"


def shown(value: Any) -> str:
    """A value of the document as one would type it."""
    if isinstance(value, list):
        return ", ".join(str(one) for one in value)
    if isinstance(value, bool):
        return "yes" if value else "no"
    return str(value)


# Values


def _typed(field: Field, text: str, system: System) -> Any:
    """The text as the file writes it: numbers for counts, true and false, lists, and text with its unit."""
    text = text.strip()
    try:
        entered = values.from_text(field, text, system)
    except values.Wrong as wrong:
        declared = KINDS.get(field.kind)
        if declared is None or not declared.si_display or not _bare(text):
            raise Refused(str(wrong)) from None
        unit = display_unit(field.kind, system).unit
        text = f"{text} {unit}"
        try:
            entered = values.from_text(field, text, system)
        except values.Wrong as still:
            raise Refused(str(still)) from None
    if field.many and field.kind not in ("count", "yes_no"):
        parts = values.split(text)
        return parts if len(parts) > 1 or field.many == "three" else parts[0]
    if field.kind in ("count", "yes_no"):
        return entered.value
    if field.key == "format":
        return int(float(text))
    return text


def _bare(text: str) -> bool:
    """Whether a text is a number and nothing else."""
    try:
        return math.isfinite(float(text.replace(",", ".").replace(" ", "")))
    except ValueError:
        return False


# Places


def _option(node: Any) -> tuple[Any, Any]:
    """Where `setting.put` has just put its mark."""
    items = node.items() if isinstance(node, dict) else enumerate(node) if isinstance(node, list) else ()
    for key, value in items:
        if isinstance(value, setting.Option):
            return node, key
        if isinstance(value, dict | list):
            found = _option(value)
            if found[0] is not None:
                return found
    return None, None


def _place(document: Mapping[str, Any], path: str) -> tuple[Any, Any] | None:
    """The table and the key of a path in this very document; None where it leads nowhere."""
    marked = copy.deepcopy(dict(document))
    if setting.put(marked, {path: ""}):
        return None
    found, steps = _steps(marked, ())
    if not found:
        return None
    node: Any = document
    for step in steps[:-1]:
        try:
            node = node[step]
        except (KeyError, IndexError, TypeError):
            return {}, steps[-1]
    return node, steps[-1]


def _steps(node: Any, way: tuple[Any, ...]) -> tuple[bool, tuple[Any, ...]]:
    items = node.items() if isinstance(node, dict) else enumerate(node) if isinstance(node, list) else ()
    for key, value in items:
        if isinstance(value, setting.Option):
            return True, (*way, key)
        if isinstance(value, dict | list):
            found, steps = _steps(value, (*way, key))
            if found:
                return True, steps
    return False, ()


def _thing(path: str) -> bool:
    """Whether a path names a thing ("doors.main", "faces.left") and no value in it."""
    head, _, rest = path.partition(".")
    if "[" in head:
        return path.endswith("]")
    return head in TABLES and TABLES[head].form != "one" and bool(rest) and declaration(path) is None


def _index(document: Document, path: str) -> tuple[str, int]:
    """The list that a thing stands in, and its place there."""
    table, _, name = path.partition(".")
    if "[" in table:
        table, _, number = table.partition("[")
        return table, int(number.rstrip("]")) - 1
    items = document.get(table)
    names = setting.named(TABLES[table], items) if isinstance(items, list) else []
    if name not in names:
        raise Refused(f'There is no "{name}" among the {table}.')
    return table, names.index(name)


def _remove_thing(document: Document, path: str) -> None:
    table, _, name = path.partition(".")
    if table in TABLES and TABLES[table].form == "named":
        tables = document.get(table, {})
        if name not in tables:
            raise Refused("The box keeps its six faces; only what is said of one can go." if table == "faces" else
                          f'There is no "{name}" among the {table}.')  # fmt: skip
        del tables[name]
        if not tables:
            del document[table]
        return
    table, index = _index(document, path)
    del document[table][index]
    if not document[table]:
        del document[table]


def _prune(document: Document, path: str) -> None:
    """Takes out the face, or the table, that the last value has left."""
    table, _, rest = path.partition(".")
    inside = document.get(table)
    if table not in TABLES or table == "box" or not isinstance(inside, dict):
        return
    if TABLES[table].form == "named":
        name = rest.rpartition(".")[0]
        if inside.get(name) == {}:
            del inside[name]
    if not inside:
        del document[table]


# Names


def _called(table: str) -> str:
    return {"people": "people", "ventilation": "fresh air"}.get(table, table.removesuffix("s"))


def _free(table: str, items: list[Any], wanted: str) -> str:
    taken = {str(name) for name in setting.named(TABLES[table], items) if name}
    taken |= {str(item["name"]) for item in items if isinstance(item, dict) and "name" in item}
    stem = wanted.rstrip("0123456789").rstrip() or wanted
    if wanted not in taken:
        return wanted
    number = 2
    while f"{stem} {number}" in taken:
        number += 1
    return f"{stem} {number}"
