"""Sentences about tables and keys in the wrong place: what was found, and what would do."""

from __future__ import annotations

from typing import Any

from coldbox.project.fields import BY_KEY, TABLES, TOP_TABLES, Table, declared_in, example
from coldbox.project.values import plain
from coldbox.project.words import clean, nearest


def what(value: Any) -> str:
    """A value in the wrong place, as a sentence begins with it."""
    if isinstance(value, dict):
        return "A table"
    if isinstance(value, list):
        return "A list"
    return f'"{clean(value)}"' if isinstance(value, str) else clean(plain(value))


def no_table(value: Any, table: Table, path: str, key: str = "") -> str:
    """About a value where a table is due: an item of a list, or (with `key`) what stands under a name."""
    head = f"{what(value)} stands where a table is due."
    if key in BY_KEY[table.name]:
        return f"{head} The keys of one stand under its name: write [{table.name}.NAME], then {key} below it."
    if table.form == "named":
        return f"{head} Write [{path}] and its keys below it."
    if "." in path or "[" in path:
        return f"{head} Write {{ {_such_as(table)} }}."
    return f"{head} Write [[{path}]] and its keys below it."


def wrong_form(table: Table, value: Any, path: str) -> str:
    """About something that does not have the form of its table."""
    top, word = "." not in table.name, path.rpartition(".")[2]
    if table.form == "list":
        if isinstance(value, dict) and top:
            return f"There may be several {path}: write [[{path}]], with two brackets."
        due = f"[[{path}]] and its keys below it" if top else f"{word} = [{{ {_such_as(table)} }}]"
        return f"{what(value)} stands where a list of tables is due. Write {due}."
    if isinstance(value, list) and top and table.form == "one":
        return f"There is only one {path}: write [{path}], with one bracket."
    name = "" if table.form == "one" else ".NAME"
    due = f"[{path}{name}] and its keys below it" if top else f"{word} = {{ {_such_as(table)} }}"
    return f"{what(value)} stands where a table is due. Write {due}."


def unknown(table: str, word: str, value: Any, path: str) -> str:
    """About a key that nobody declared, with the nearest that somebody did."""
    found = clean(word)
    if not table and isinstance(value, (dict, list)):
        near = nearest(word, TOP_TABLES)
        if near is None:
            return f"[{found}] is no table of a project. They are: {', '.join(TOP_TABLES)}."
        header = {"one": f"[{near}]", "named": f"[{near}.NAME]", "list": f"[[{near}]]"}[TABLES[near].form]
        return f"[{found}] is no table of a project. Nearest: {header}."
    sentence = f'"{found}" is no key {f"of {path}" if table else "above the tables"}.'
    known = BY_KEY[table] if table else (*BY_KEY[""], *TOP_TABLES)
    elsewhere = declared_in(word)
    near = nearest(word, known, 0.8 if elsewhere else 0.55)
    if near:
        return f'{sentence} Nearest: "{near}".'
    if elsewhere:
        return f"{sentence} It belongs to {elsewhere}."
    return f"{sentence} They are: {', '.join(BY_KEY[table])}."


def unknown_name(word: str, names: tuple[str, ...], path: str) -> str:
    """About a table whose name is not among the only ones there are."""
    near = nearest(word, names)
    hint = f'Nearest: "{near}".' if near else f"They are: {', '.join(names)}."
    return f'"{clean(word)}" is none of the {path}. {hint}'


def _such_as(table: Table) -> str:
    fields = [field for field in BY_KEY[table.name].values() if field.key != "name"]
    return example(next((field for field in fields if field.required), fields[0]))
