"""Reading one block of a file: what was typed, else its default, and where each value came from."""

from __future__ import annotations

import math
from collections.abc import Iterable, Mapping
from typing import Any

from coldbox.errors import Problem, UnknownName
from coldbox.project import fields
from coldbox.project.model import Origin
from coldbox.project.raw import Block, Entered
from coldbox.project.shop import Library, without_date
from coldbox.project.words import nearest
from coldbox.units import parse
from coldbox.units.clock import Spread

_defaults: dict[tuple[str, str], tuple[Any, Origin] | None] = {}


def declared_default(table: str, key: str) -> tuple[Any, Origin] | None:
    """The default that the field's declaration gives, read, with its origin; None where it declares none."""
    where = (table, key)
    if where not in _defaults:
        field = fields.BY_KEY[table][key]
        if field.default is None:
            _defaults[where] = None
        else:
            origin = Origin(kind="default", text=field.default, reason=field.default_reason)
            _defaults[where] = _read(field.default, field), origin
    return _defaults[where]


def _read(text: str, field: fields.Field) -> Any:
    if field.many:
        return tuple(parse(part.strip(), field.kind).value for part in text.split(","))
    return parse(text, field.kind).value


def hint(name: str, names: Iterable[str]) -> str:
    """A sentence with the nearest of the names, and the blank before it; nothing when none is close."""
    near = nearest(name, names)
    return f' Nearest: "{near}".' if near else ""


class Work:
    """What is gathered while a project is resolved."""

    __slots__ = ("file", "library", "origins", "problems", "spreads")

    def __init__(self, file: str, problems: list[Problem], library: Library) -> None:
        self.file, self.problems, self.library = file, problems, library
        self.origins: dict[str, Origin] = {}
        self.spreads: dict[str, Spread] = {}

    def problem(self, text: str, path: str, line: int | None) -> None:
        self.problems.append(Problem(text, file=self.file, line=line, path=path))

    def said(self, path: str) -> bool:
        """Whether a problem of this key path is known already."""
        return any(problem.path == path for problem in self.problems)

    def said_about(self, path: str) -> bool:
        """Whether a problem of this key path, or of something under it, is known already."""
        return any(problem.path.startswith(path) for problem in self.problems)


class Reader:
    """One block: `typed` by a hand, `beneath` from the shop library, then table rows and declared defaults.

    Every value that is taken leaves its origin, and its spread, under the block's key path.
    """

    __slots__ = ("beneath", "block", "line", "path", "source", "table", "typed", "under", "work")

    def __init__(self, work: Work, table: str, path: str, block: Block | None) -> None:
        self.work, self.table, self.path, self.block = work, table, path, block
        self.typed: Mapping[str, Entered] = block.values if block is not None else {}
        self.line = block.line if block is not None else None
        self.beneath: Mapping[str, Entered] = {}
        self.under: Block | None = None
        self.source = ""

    def on(self, beneath: Block | None, source: str) -> Reader:
        """The same block with a row of the shop library under it."""
        if beneath is not None:
            self.under, self.beneath, self.source = beneath, beneath.values, source
        return self

    def on_library(self, table: str, copied: bool) -> Reader:
        """The same block, with the row under it that its key `library` names, unless its values were copied.

        A copied value says which date it was copied on; it then computes the same wherever, and whenever.
        """
        name = self.given("library")
        if not isinstance(name, str):
            return self
        if copied and without_date(name) != name:
            return self
        library = self.work.library
        try:
            row = library.row(table, name)
        except UnknownName as unknown:
            near = f' Nearest: "{unknown.nearest}".' if unknown.nearest else ""
            self.problem("library", f'The shop library has no "{without_date(name)}" among its {table}.{near}')
            return self
        return self.on(row, library.said(table, row))

    def at(self, key: str) -> str:
        """The key path of a key; those above every table stand alone."""
        return f"{self.path}.{key}" if self.path else key

    def has(self, key: str) -> bool:
        return key in self.typed or key in self.beneath

    def children(self, key: str, table: str) -> tuple[Reader, ...]:
        """Readers of the blocks under this one; those of the library where the block has none of its own."""
        own = self.block.children.get(key, ()) if self.block is not None else ()
        if own:
            return tuple(Reader(self.work, table, one.path, one) for one in own)
        beneath = self.under.children.get(key, ()) if self.under is not None else ()
        return tuple(
            Reader(self.work, table, f"{self.path}.{key}[{number}]", None).on(one, self.source)
            for number, one in enumerate(beneath, 1)
        )

    def given(self, key: str) -> Any:
        """The value typed, or of the library; None when there is none. Nothing is filled in."""
        entered = self.typed.get(key)
        path = self.at(key)
        if entered is not None:
            kind: Any = "option" if entered.option else "typed"
            self.work.origins[path] = Origin(kind=kind, text=entered.text, line=entered.line)
        else:
            entered = self.beneath.get(key)
            if entered is None:
                return None
            self.work.origins[path] = Origin(kind="library", text=entered.text, reason=self.source)
        if entered.spread is not None:
            self.work.spreads[path] = entered.spread
        return entered.value

    def value(self, key: str) -> Any:
        """The value given, else the declared default; None where there is neither."""
        if key in self.typed or key in self.beneath:
            return self.given(key)
        default = declared_default(self.table, key)
        if default is None:
            return None
        self.work.origins[self.at(key)] = default[1]
        return default[0]

    def quiet(self, key: str) -> Any:
        """The value given, else the declared default, which is not written down: here it has no effect."""
        if key in self.typed or key in self.beneath:
            return self.given(key)
        default = declared_default(self.table, key)
        return None if default is None else default[0]

    def fall(self, key: str, value: Any, text: str, reason: str, kind: Any = "default") -> Any:
        """The value given, else this one, which is written down with its text and reason."""
        if key in self.typed or key in self.beneath:
            return self.given(key)
        if value is not None or text:
            self.work.origins[self.at(key)] = Origin(kind=kind, text=text, reason=reason)
        return value

    def need(self, key: str, advice: str) -> Any:
        """The value given; where there is none a problem, and nan so that reading can go on."""
        if key in self.typed or key in self.beneath:
            return self.given(key)
        self.missing(key, advice)
        return math.nan

    def missing(self, key: str, advice: str) -> None:
        """A problem that this key is not there, unless it is known why: typed wrongly, or no library row."""
        path = self.at(key)
        if not self.work.said(path) and not self.work.said(self.at("library")):
            self.work.problem(f"{key} is missing. {advice}", path, self.line)

    def problem(self, key: str, text: str) -> None:
        """Something wrong with the value of this key (or, with "", with the whole block)."""
        entered = self.typed.get(key)
        line = entered.line if entered is not None else self.line
        self.work.problem(text, self.at(key) if key else self.path, line)

    def text(self, key: str) -> str:
        """What was typed for this key, or in the library."""
        entered = self.typed.get(key) or self.beneath.get(key)
        return entered.text if entered is not None else ""
