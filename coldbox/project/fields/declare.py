"""What a declaration is: one input of the file, and one table of it."""

from __future__ import annotations

from typing import Literal, NamedTuple

from coldbox.record import Record

TRADE = "trade-practice"


class Field(NamedTuple):
    """One input: what it is called, what may be typed, and what holds when nothing is typed.

    `kind` is a kind of `units`, or "table" (an inline table) or "list" (a list of tables) for what has declarations of
    its own under `TABLE.KEY`. Bounds are SI and include their ends. `default` is text as one would type it; where it
    is None and the field is not required, `default_reason` says what holds instead.
    """

    table: str
    key: str
    kind: str
    label: str
    help: str
    low: float | None = None
    high: float | None = None
    required: bool = False
    default: str | None = None
    default_reason: str = ""
    choices: tuple[str, ...] = ()  # words it may be; of a reference, the words that are no names
    source: str = ""  # key into the sources: where the default, or the meaning, comes from
    refers: str = ""  # what a name refers to: a table of the file, a built-in table, or the shop library
    many: Literal["", "list", "three"] = ""  # several values: any number (one alone needs no list), or exactly three
    other_kind: str = ""  # a second kind that will do as well ("16:00" or "6 h")

    @property
    def path(self) -> str:
        """`table.key`, as problems and the documentation write it."""
        return f"{self.table}.{self.key}" if self.table else self.key

    @property
    def structural(self) -> bool:
        """Whether it holds tables with declarations of their own."""
        return self.kind in ("table", "list")


class Table(Record):
    """One table of the file.

    `form`: "one" `[box]`, "named" `[constructions.NAME]`, "list" `[[doors]]`. `limit`: how many blocks it may have.
    `only`: the only names a "named" table may have. `named_after`: the key that names a thing without a name.
    """

    name: str
    form: Literal["one", "named", "list"]
    help: str
    limit: int = 500
    only: tuple[str, ...] = ()
    named_after: str = ""


def name(table: str, help: str = "What it is called; unique in its table, printed in every result.") -> Field:
    """The `name` of a thing that stands in a list."""
    return Field(table, "name", "name", "name", help, default_reason="numbered, or after what it is")


def notes(table: str) -> Field:
    """The `notes` that every table takes."""
    return Field(table, "notes", "text", "notes", "Free text for whoever reads the file.", default_reason="none")


def library(table: str, what: str) -> Field:
    """Where values were copied from."""
    return Field(
        table,
        "library",
        "text",
        "shop library",
        f'{what} of the shop library its values were copied from, with the date: "NAME 2026-03-02".',
        default_reason="none",
        refers="shop library",
    )
