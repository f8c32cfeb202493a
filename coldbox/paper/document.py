"""One document tree, whatever it is printed as: every face shows the same words and the same numbers."""

from __future__ import annotations

from typing import Literal

from coldbox.record import Record


class Heading(Record):
    """A title; level 1 is the document's own."""

    text: str
    level: int = 2


class Paragraph(Record):
    """Running text; `indent` steps to the right for what belongs to the line above."""

    text: str
    indent: int = 0


class Column(Record):
    """A column of a table; numbers stand to the right. `gives` marks the one that gives way when the line is full."""

    title: str
    align: Literal["left", "right"] = "left"
    gives: bool = False


class Table(Record):
    """Rows of cells, already as text; `totals` is the last row, set apart."""

    columns: tuple[Column, ...]
    rows: tuple[tuple[str, ...], ...]
    totals: tuple[str, ...] = ()


class Bars(Record):
    """The hours of a day as bars, (24,) figures in watts, with the figures at both ends as text."""

    label: str
    values: tuple[float, ...]
    lowest: str
    highest: str


class Line(Record):
    """One line of a curve; nan where there is none. `label` stands at its end, or where it leaves off."""

    label: str
    values: tuple[float, ...]


class Curve(Record):
    """Figures through time: lines over the same instants, and levels that they should keep to.

    `at` and the ticks are hours, `points` the instants of `at` that a table of few rows shows, by index.
    """

    unit: str
    at: tuple[float, ...]
    lines: tuple[Line, ...]
    levels: tuple[tuple[str, float], ...]
    ticks: tuple[tuple[float, str], ...]
    points: tuple[int, ...]


Block = Heading | Paragraph | Table | Bars | Curve


class Document(Record):
    """What is put before a reader."""

    title: str
    blocks: tuple[Block, ...]
