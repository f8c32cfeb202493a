"""A document as plain text, 80 columns wide unless told otherwise."""

from __future__ import annotations

import re
import textwrap
from collections.abc import Iterator

from coldbox.paper.document import Bars, Block, Curve, Document, Heading, Paragraph, Table

STEPS = "▁▂▃▄▅▆▇█"
ASCII_STEPS = "_.-=+*%#"
GAP = "  "
UNIT_BEHIND = r"(?<=\d) (?=(?:%|°C|°F|[kM]?W|kWh|Btu|kg|g|lb|mm|m|m²|m³|ft|min|h|K|ppm)(?:[^\w]|$))"
NO_BREAK = "\N{NO-BREAK SPACE}"
NARROWEST = 8  # a column that gives way keeps this much


def render(document: Document, *, width: int = 80, ascii_only: bool = False) -> str:
    """The document as text, no line longer than `width` but for a single word that is."""
    lines: list[str] = []
    for block in document.blocks:
        lines += _block(block, width, ascii_only)
    return "\n".join(line.rstrip() for line in lines) + "\n"


def _block(block: Block, width: int, ascii_only: bool) -> list[str]:
    match block:
        case Heading():
            return ([] if block.level == 1 else [""]) + textwrap.wrap(block.text, width)
        case Paragraph():
            first = "  " * block.indent
            later = first + "  " * min(block.indent, 1)
            lines = textwrap.wrap(_bound(block.text), width, initial_indent=first, subsequent_indent=later)
            return [line.replace(NO_BREAK, " ") for line in lines]
        case Table():
            return _table(block, width)
        case Bars():
            return _bars(block, width, ascii_only)
        case Curve():
            from coldbox.paper import curve

            return curve.drawn(block, width, ascii_only=ascii_only)


def _bound(text: str) -> str:
    """Text in which a figure and the unit behind it stay on one line."""
    return re.sub(UNIT_BEHIND, NO_BREAK, text)


def _table(table: Table, width: int) -> list[str]:
    titles = tuple(column.title for column in table.columns)
    rows = [titles, *table.rows] if any(titles) else list(table.rows)
    if table.totals:
        rows.append(table.totals)
    body = rows[1:] if any(titles) else rows
    widths = [
        max(*(len(word) for word in title.split()), *(len(row[index]) for row in body), 0, 0)
        for index, title in enumerate(titles)
    ]
    spare = width - 1 - sum(widths) - len(GAP) * (len(widths) - 1)
    giving = [index for index, column in enumerate(table.columns) if column.gives]
    while spare < 0 and any(widths[index] > NARROWEST for index in giving):
        widest = max(giving, key=lambda index: widths[index])
        widths[widest] -= 1
        spare += 1
    return list(_table_lines(table, rows, widths))


def _table_lines(table: Table, rows: list[tuple[str, ...]], widths: list[int]) -> Iterator[str]:
    for row in rows:
        cells = [_cell_lines(cell, size) for cell, size in zip(row, widths, strict=True)]
        for level in range(max(len(cell) for cell in cells)):
            parts = []
            for cell, size, column in zip(cells, widths, table.columns, strict=True):
                text = cell[level] if level < len(cell) else ""
                parts.append(text.rjust(size) if column.align == "right" else text.ljust(size))
            yield " " + GAP.join(parts)


def _cell_lines(cell: str, size: int) -> list[str]:
    if len(cell) <= size:
        return [cell]
    room = size - 1 if size > NARROWEST else size
    cell = " ".join(part for word in cell.split(" ") for part in _at_dots(word, room))
    return textwrap.wrap(cell, size, subsequent_indent=" " if size > NARROWEST else "", break_on_hyphens=False) or [""]


def _at_dots(word: str, room: int) -> Iterator[str]:
    """A word in pieces of at most `room`, cut before a dot where there is one: a key path stays readable."""
    while len(word) > room and (dot := word.rfind(".", 1, room + 1)) > 0:
        yield word[:dot]
        word = word[dot:]
    yield word


def _bars(bars: Bars, width: int, ascii_only: bool) -> list[str]:
    steps = ASCII_STEPS if ascii_only else STEPS
    each = 2 if width >= 72 else 1
    top = max(*bars.values, 1e-9)
    marks = [steps[min(int(max(value, 0.0) / top * len(steps)), len(steps) - 1)] * each for value in bars.values]
    scale = "".join(f"{hour:<{6 * each}}" for hour in (0, 6, 12, 18))
    head = f" {bars.label} "
    below = f"{' ' * len(head)}{scale.rstrip()}  {bars.lowest} to {bars.highest}"
    return [f"{head}{''.join(marks)}", below if len(below) <= width else below[:width].rstrip()]
