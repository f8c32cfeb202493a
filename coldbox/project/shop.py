"""The shop library: the shop's own constructions, doors, packs, goods and places, in files that people edit by hand.

Each file holds one `["name"]` block per row, with the keys that the same thing has in a project file and the `date` of
its last change. A file is read when something in it is first asked for.
"""

from __future__ import annotations

import datetime
import os
import re
import tomllib
from collections.abc import Iterator, Mapping
from typing import Any, Literal

from coldbox.errors import BadProject, Problem, UnknownName
from coldbox.project import fields, values
from coldbox.project.raw import Block, Entered, Raw
from coldbox.project.words import nearest
from coldbox.record import Record

FOLDER = "shared"
TABLES: Mapping[str, str] = {
    "constructions": "constructions",
    "doors": "doors",
    "packs": "packs",
    "goods": "lots",
    "places": "site",
}
"""The files of the library, and the table of the project file that their rows are like."""

_HEAD = re.compile(r'^\[(?:"([^"\\\n]+)"|([A-Za-z0-9_-]+))\][ \t]*(?:#.*)?\r?$', re.MULTILINE)
_DATED = re.compile(r"^(.*\S)\s+(\d{4}-\d{2}-\d{2})$")


def without_date(name: str) -> str:
    """The name in "NAME 2026-03-02"."""
    match = _DATED.match(name.strip())
    return match.group(1) if match else name.strip()


def date_of(name: str) -> str:
    """The date in "NAME 2026-03-02"; nothing where there is none."""
    match = _DATED.match(name.strip())
    return match.group(2) if match else ""


class Library:
    """The rows of one library folder, by table and name. `problems` are those found in its files so far."""

    def __init__(self, folder: str | None) -> None:
        self.folder = folder
        self.problems: list[Problem] = []
        self._files: dict[str, _File] = {}

    def row(self, table: str, name: str) -> Block:
        """One row, as a block of the project file would say it; the name may carry a date. Raises UnknownName."""
        file, plain = self._file(table), without_date(name)
        found = file.row(plain)
        if found is None:
            raise UnknownName(f"{table} of the shop library", plain, nearest(plain, file.parts))
        return found

    def names(self, table: str) -> tuple[str, ...]:
        """The names of a table's rows."""
        return tuple(self._file(table).parts)

    def dated(self, table: str, row: Block) -> str:
        """What a project writes as `library` when it copies this row: "NAME 2026-03-02"."""
        return f"{row.name} {self._file(table).dates[row.name]}".strip()

    def said(self, table: str, row: Block) -> str:
        """Where a value of this row came from, in words."""
        return f"shop library, {self.dated(table, row)}"

    def _file(self, table: str) -> _File:
        if table not in self._files:
            self._files[table] = self._opened(table)
        return self._files[table]

    def _opened(self, table: str) -> _File:
        from coldbox.project.store import read_text

        name = "" if self.folder is None else os.path.join(self.folder, f"{table}.toml")
        text = ""
        if name and os.path.exists(name):
            try:
                text = read_text(name)
            except BadProject as trouble:
                self.problems.extend(trouble.problems)
        return _File(TABLES[table], name, text, self.problems)


class _File:
    """One file of the library. Only rows that are asked for are read, since a shop may have hundreds."""

    def __init__(self, like: str, file: str, text: str, problems: list[Problem]) -> None:
        self.like, self.file, self.text, self.problems = like, file, text, problems
        self.dates: dict[str, str] = {}
        self.parts: dict[str, Any] = _parts(text) or self._whole()
        self._blocks: dict[str, Block | None] = {}

    def _whole(self) -> dict[str, Any]:
        """Every row by name, read at once: for files that are not plainly one block after the other."""
        try:
            return tomllib.loads(self.text)
        except (tomllib.TOMLDecodeError, RecursionError) as trouble:
            where = re.search(r"line (\d+)", str(trouble))
            said = f"This file of the shop library is no TOML: {str(trouble) or 'brackets stand too deep'}."
            self.problems.append(Problem(said, file=self.file, line=int(where.group(1)) if where else None))
            return {}

    def row(self, name: str) -> Block | None:
        if name not in self._blocks:
            self._blocks[name] = self._read(name)
        return self._blocks[name]

    def _read(self, name: str) -> Block | None:
        given = self.parts.get(name)
        if isinstance(given, str):
            try:
                given = tomllib.loads(given)[name]
            except (tomllib.TOMLDecodeError, RecursionError):
                self.parts = self._whole()
                given = self.parts.get(name)
        if given is None:
            return None
        reading = _Reading(self.file, self.text, self.problems)
        if not isinstance(given, dict):
            reading.problem((name,), f'A row of the library is a table: ["{name}"] and its keys under it.')
            return None
        keys = dict(given)
        self.dates[name] = reading.date(name, keys.pop("date", None))
        return reading.block(self.like, (name,), keys, name)


def _parts(text: str) -> dict[str, Any] | None:
    """The text of each row by its name; None where the file is not plainly one block after the other."""
    heads = list(_HEAD.finditer(text))
    names = [head.group(1) or head.group(2) for head in heads]
    if not heads or len(set(names)) < len(names) or len(heads) < text.count("\n[") + text.startswith("["):
        return None
    if any(line.strip() and not line.lstrip().startswith("#") for line in text[: heads[0].start()].split("\n")):
        return None
    ends = [*(head.start() for head in heads[1:]), len(text)]
    return {name: text[head.start() : end] for name, head, end in zip(names, heads, ends, strict=True)}


class _Reading:
    """One library file being turned into blocks; the line of a value is looked for only when it is wrong."""

    def __init__(self, file: str, text: str, problems: list[Problem]) -> None:
        self.file, self.text, self.problems = file, text, problems

    def problem(self, key: tuple[str | int, ...], said: str) -> None:
        from coldbox.project.linemap import LineMap

        path = ".".join(str(part) for part in key)
        self.problems.append(Problem(said, file=self.file, line=LineMap(self.text).line(key), path=path))

    def date(self, name: str, found: object) -> str:
        if isinstance(found, datetime.date):
            return found.isoformat()
        if isinstance(found, str) and date_of(f"x {found}"):
            return found
        self.problem((name,), 'A row of the library says when it was last changed: date = "2026-03-02".')
        return ""

    def block(self, table: str, key: tuple[str | int, ...], given: Mapping[str, Any], name: str = "") -> Block:
        found: dict[str, Entered] = {}
        children: dict[str, tuple[Block, ...]] = {}
        for word, value in given.items():
            here = (*key, word)
            field = fields.BY_KEY[table].get(word)
            if field is None or word in ("name", "library"):
                near = nearest(word, fields.BY_KEY[table])
                hint = f' Nearest: "{near}".' if near else ""
                self.problem(here, f'"{word}" is no key of a row like this.{hint}')
            elif word == "construction" and isinstance(value, dict):
                children[word] = (self.block("constructions", here, value),)
            elif field.structural:
                below = self._below(f"{table}.{word}", here, value, field.kind)
                if below is not None:
                    children[word] = below
            else:
                entered = self._value(field, here, value)
                if entered is not None:
                    found[word] = entered
        path = ".".join(str(part) for part in key)
        return Block(table=table, path=path, name=name, line=None, values=found, children=children)

    def _below(self, table: str, key: tuple[str | int, ...], value: Any, kind: str) -> tuple[Block, ...] | None:
        rows = [value] if kind == "table" else value
        if not isinstance(rows, list) or not all(isinstance(row, dict) for row in rows):
            self.problem(key, "A table stands here, or a list of them.")
            return None
        return tuple(
            self.block(table, key if kind == "table" else (*key, number), row) for number, row in enumerate(rows)
        )

    def _value(self, field: fields.Field, key: tuple[str | int, ...], value: Any) -> Entered | None:
        try:
            return values.from_toml(field, value, str(value), None)
        except values.Wrong as wrong:
            self.problem(key, str(wrong))
            return None


def library(near: str | os.PathLike[str]) -> Library:
    """The library for a project file: `shared/` beside its folder, or above it in the same checkout, else the one
    that comes with the program.

    near    the project file
    result  the library; nothing of it is read yet
    """
    return Library(next(_folders(os.path.abspath(os.fspath(near))), None))


def _folders(file: str) -> Iterator[str]:
    above = [os.path.dirname(file)]
    while os.path.dirname(above[-1]) != above[-1]:
        above.append(os.path.dirname(above[-1]))
    # Higher than the checkout nothing is this shop's; without a checkout, no higher than the folder around it.
    top = next((at for at, folder in enumerate(above) if os.path.exists(os.path.join(folder, ".git"))), 1)
    program = os.path.dirname(os.path.dirname(os.path.dirname(os.path.abspath(__file__))))
    for folder in (*above[: top + 1], program):
        candidate = os.path.join(folder, FOLDER)
        if any(os.path.isfile(os.path.join(candidate, f"{table}.toml")) for table in TABLES):
            yield candidate


class Difference(Record):
    """A copied library value that is no longer what the library says."""

    kind: Literal["moved on", "changed here", "gone"]
    path: str
    line: int | None
    text: str


def differences(raw: Raw, library: Library) -> list[Difference]:
    """What was copied from the library and differs from it now, in the order of the file.

    Another date there: it moved on. The same date and other values: changed here. No such row: gone.
    """
    found = []
    for table, like in TABLES.items():
        for block in raw.blocks.get(like, ()):
            entered = block.values.get("library")
            if entered is None or not isinstance(entered.value, str):
                continue
            difference = _difference(block, entered, table, library)
            if difference is not None:
                found.append(difference)
    return sorted(found, key=lambda one: one.line or 0)


def _difference(block: Block, entered: Entered, table: str, library: Library) -> Difference | None:
    name = str(entered.value)
    path = f"{block.path}.library"
    try:
        row = library.row(table, name)
    except UnknownName:
        text = f'The shop library no longer has "{without_date(name)}"; the values here hold.'
        return Difference(kind="gone", path=path, line=entered.line, text=text)
    there = _plain(row)
    here = {key: value for key, value in _plain(block).items() if key in there}
    if not here:
        return None  # nothing was copied: it is looked up at every run
    changed = [key for key in there if here.get(key) != there[key]]
    listed = ", ".join(changed)
    if date_of(name) != date_of(library.dated(table, row)):
        what = f"differs there in {listed}" if changed else "has the same values there"
        text = f'"{library.dated(table, row)}" is in the shop library now; {what}. The values here hold.'
        return Difference(kind="moved on", path=path, line=entered.line, text=text)
    if changed:
        text = f'{listed} {"is" if len(changed) == 1 else "are"} not as in "{name}" of the shop library.'
        return Difference(kind="changed here", path=path, line=entered.line, text=text)
    return None


def _plain(block: Block) -> dict[str, Any]:
    """Values of a block, those of its children among them, without names and notes."""
    plain: dict[str, Any] = {
        key: (entered.value, entered.spread)
        for key, entered in block.values.items()
        if key not in ("name", "notes", "library")
    }
    for key, blocks in block.children.items():
        plain[key] = [_plain(one) for one in blocks]
    return plain
