"""Values given for one run by key path (`--set "doors.main.width=1.2 m"`), put where the file would have them."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from coldbox.errors import Problem
from coldbox.project.fields import BY_KEY, TABLES, TOP_TABLES, Table
from coldbox.project.words import clean, fault_of_name, nearest

OPTION = "--set"
LONGEST_PATH = 300
_Made = list[tuple[dict[str, Any], str]]  # tables that were not there: parent and key


class Option(str):
    """The text of an option, standing in a document in place of the file's own value; `path` is what was asked for."""

    path: str


def named(table: Table, items: list[Any]) -> list[str]:
    """What each block of a list is called: its name, else what it is where that tells it from the others, else "".

    Names that break the rules of names count as none.
    """
    typed = [_word(item, "name") for item in items]
    if not table.named_after:
        return typed
    choices = BY_KEY[table.name][table.named_after].choices
    kinds = [name or _word(item, table.named_after, choices) for name, item in zip(typed, items, strict=True)]
    return [name or (kind if kinds.count(kind) == 1 else "") for name, kind in zip(typed, kinds, strict=True)]


def _word(item: Any, key: str, choices: tuple[str, ...] = ()) -> str:
    word = item.get(key) if isinstance(item, dict) else None
    if not isinstance(word, str) or fault_of_name(word) is not None or (choices and word not in choices):
        return ""
    return str(word)


def put(document: dict[str, Any], options: Mapping[str, str]) -> list[Problem]:
    """Put each option into the document as an `Option`.

    document  what TOML made of the file; changed in place
    options   text by key path: "box.temperature", "lots[2].stored", "heaters.floor heater.held_at"
    result    a problem for each path that leads nowhere, with the nearest that leads somewhere
    """
    problems = []
    for path, text in options.items():
        made: _Made = []
        try:
            _put(document, path.strip(), text, made)
        except _Nowhere as nowhere:
            for parent, key in reversed(made):
                del parent[key]
            problems.append(Problem(nowhere.sentence, file=OPTION, path=clean(path, LONGEST_PATH)))
    return problems


class _Nowhere(Exception):
    def __init__(self, sentence: str) -> None:
        self.sentence = sentence
        super().__init__(sentence)


def _put(document: dict[str, Any], path: str, text: str, made: _Made) -> None:
    head, rest = _head(path)
    node: Any = document
    table = ""
    if head in TOP_TABLES:
        node, rest, at = _enter(document, head, TABLES[head], rest, head, made)
        table = head
    else:
        at, rest = "", path
    while True:
        key, rest = _head(rest)
        declared = BY_KEY[table].get(key)
        if declared is None:
            raise _Nowhere(_unknown(table, at, key))
        inner = f"{table}.{key}" if declared.structural else "constructions" if key == "construction" and rest else ""
        if not inner:
            if rest:
                raise _Nowhere(f"{clean(f'{at}.{key}')} is a value; nothing stands inside it.")
            if isinstance(node, dict):
                option = Option(text)
                option.path = path
                node[key] = option
            return
        form = TABLES[inner]
        if inner == "constructions":
            form = form.replace(form="one")
        node, rest, at = _enter(node, key, form, rest, f"{at}.{key}", made)
        table = inner


def _head(path: str) -> tuple[str, str]:
    """The part before the first point or bracket, and the rest; the point goes, the bracket stays."""
    ends = [end for end in (path.find("."), path.find("[")) if end >= 0]
    if not ends:
        return path, ""
    end = min(ends)
    return path[:end], path[end + 1 :] if path[end] == "." else path[end:]


def _enter(parent: Any, key: str, table: Table, rest: str, at: str, made: _Made) -> tuple[Any, str, str]:
    """Into a table: the node to put into (None where the file is wrong there), what is left of the path, the way."""
    if not rest:
        which = {"one": "", "named": ".NAME", "list": "[1]"}[table.form]
        raise _Nowhere(f"{clean(at)} is a table. Name one of its keys, such as {_such_as(table, at, which)}.")
    if table.form == "one":
        return _node(parent, key, made), rest.removeprefix("."), at
    if table.form == "named":
        tables = _node(parent, key, made)
        names = [*(tables or ()), *table.only]
        name, rest = _name(names, rest, at, table)
        return _node(tables, name, made), rest, f"{at}.{name}"
    items = parent.get(key) if isinstance(parent, dict) else None
    items = items if isinstance(items, list) else []
    names = named(table, items)
    if rest.startswith("["):
        number, closing, left = rest[1:].partition("]")
        index = int(number) if closing and number.isascii() and number.isdecimal() and len(number) < 6 else 0
        if not 1 <= index <= len(items):
            there = f"there {'is' if len(items) == 1 else 'are'} {len(items) or 'none'}"
            raise _Nowhere(f"{clean(at)} is a list, counted from 1, and {there}.")
        name, rest = f"[{index}]", left.removeprefix(".")
        item, at = items[index - 1], f"{at}[{index}]"
    else:
        name, rest = _name([one for one in names if one], rest, at, table)
        item, at = items[names.index(name)], f"{at}.{name}"
    if not rest:
        raise _Nowhere(f"{clean(at)} is a table. Name one of its keys, such as {_such_as(table, at)}.")
    return item if isinstance(item, dict) else None, rest, at


def _such_as(table: Table, at: str, which: str = "") -> str:
    keys = list(BY_KEY[table.name])
    key = next((key for key in keys if key not in ("name", "notes", "library")), keys[0])
    return f"{clean(at)}{which}.{key}"


def _node(parent: Any, key: str, made: _Made) -> Any:
    """What stands under the key, made where nothing does; None where the file has something else there."""
    if not isinstance(parent, dict):
        return None
    if key not in parent:
        parent[key] = {}
        made.append((parent, key))
    node = parent[key]
    return node if isinstance(node, dict) else None


def _name(names: list[str], rest: str, at: str, table: Table) -> tuple[str, str]:
    """The longest of the names that the rest of a path begins with (names may hold points), and what follows it."""
    found = [name for name in names if rest == name or rest.startswith((f"{name}.", f"{name}["))]
    if found:
        name = max(found, key=len)
        return name, rest[len(name) :].removeprefix(".")
    name, _, left = rest.partition(".")
    if table.form == "named" and not table.only and fault_of_name(name) is None and left:
        return name, left
    near = nearest(name, names)
    has = f' Nearest: "{clean(at)}.{near}".' if near else f" There are: {', '.join(names)}." if names else ""
    raise _Nowhere(f'There is no "{clean(name)}" among the {clean(at)}.{has}')


def _unknown(table: str, at: str, key: str) -> str:
    known = [*BY_KEY[table], *(TOP_TABLES if not table else ())]
    near = nearest(key, known)
    where = f"{at}." if at else ""
    hint = f'Nearest: "{where}{near}".' if near else f"Known: {', '.join(where + one for one in known)}."
    return f'"{clean(key)}" is no key{f" of {clean(at)}" if at else ""}. {hint}'
