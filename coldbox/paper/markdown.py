"""A document as Markdown. Text that came from a file is escaped: it stays text."""

from __future__ import annotations

import re
from math import isnan

from coldbox.paper.document import Bars, Block, Curve, Document, Heading, Paragraph, Table

_SPECIAL = re.compile(r"([\\`*_\[\]<>|#!])")


def render(document: Document) -> str:
    """The document as Markdown with pipe tables."""
    return "\n\n".join(_block(block) for block in document.blocks) + "\n"


def escape(text: str) -> str:
    """Text with everything that Markdown would read as a mark made plain."""
    return _SPECIAL.sub(r"\\\1", text)


def _block(block: Block) -> str:
    match block:
        case Heading():
            return f"{'#' * block.level} {escape(block.text)}"
        case Paragraph():
            return f"{'> ' if block.indent else ''}{escape(block.text)}"
        case Table():
            return _table(block)
        case Bars():
            rows = "\n".join(f"| {hour:02d} | {value:.0f} |" for hour, value in enumerate(block.values))
            return f"| hour | {escape(block.label)}, W |\n| ---: | ---: |\n{rows}"
        case Curve():
            return _curve(block)


def _curve(curve: Curve) -> str:
    """A few points of every line; the levels stand in the head."""
    levels = "".join(f"; {escape(label)}" for label, _ in curve.levels)
    heads = ["h", *(f"{escape(line.label)}, {escape(curve.unit)}" for line in curve.lines)]
    lines = [" | ".join(heads), " | ".join("---:" for _ in heads)]
    for point in curve.points:
        figures = (line.values[point] for line in curve.lines)
        lines.append(" | ".join((f"{curve.at[point]:g}", *("" if isnan(one) else f"{one:.1f}" for one in figures))))
    return f"Temperatures{levels}\n\n" + "\n".join(f"| {line} |" for line in lines)


def _table(table: Table) -> str:
    rule = " | ".join("---:" if column.align == "right" else "---" for column in table.columns)
    lines = [" | ".join(escape(column.title) for column in table.columns), rule]
    lines += [" | ".join(escape(cell) for cell in row) for row in table.rows]
    if table.totals:
        lines.append(" | ".join(f"**{escape(cell)}**" if cell else "" for cell in table.totals))
    return "\n".join(f"| {line} |" for line in lines)
