"""The one widget: it shows frames, and repaints of a new frame only the cells that differ from the last."""

from __future__ import annotations

import os
from collections.abc import Mapping

from rich.color import ColorSystem
from rich.segment import Segment
from textual.strip import Strip
from textual.widget import Widget

from coldbox.tui import plain
from coldbox.tui.frame import Frame, Run
from coldbox.tui.looks import Look

Row = tuple[Run, ...]


class Surface(Widget):
    """Lines of text that fill the screen."""

    DEFAULT_CSS = "Surface { width: 100%; height: 100%; background: ansi_default; }"

    def __init__(self, look: Look) -> None:
        super().__init__()
        self.look = look
        self.refreshed = 0  # lines repainted so far, for the tests of thrift
        self.written = 0  # bytes sent for them
        self._rows: list[Row] = []
        self._colours = colours(os.environ)

    def show(self, frame: Frame) -> None:
        """Repaint what differs from the frame shown before."""
        rows, before = frame.rows(), self._rows
        self._rows = rows
        if len(rows) != len(before) or not self.is_mounted:
            self.refreshed += len(rows)
            self.refresh()
            return
        changed = [
            (y, begin, end)
            for y, (row, old) in enumerate(zip(rows, before, strict=True))
            if row != old
            for begin, end in _differing(row, old)
        ]
        if changed:
            self.refreshed += len({y for y, _, _ in changed})
            self._write(changed, frame.cursor)

    def _write(self, changed: list[tuple[int, int, int]], cursor: tuple[int, int] | None) -> None:
        """Send the cells that differ, and nothing else, down the line.

        The toolkit would write each line from its first column on: five times as much over a thin line. It still
        paints the whole screen where it must, at the start and at another size.
        """
        driver = self.app._driver
        if driver is None:
            return
        parts = []
        for y, begin, end in changed:
            parts.append(f"\x1b[{y + 1};{begin + 1}H")
            for text, style in _stretches(self._rows[y], begin, end):
                parts.append(self.look.style(style).render(text, color_system=self._colours))
        if cursor is not None:
            parts.append(f"\x1b[{cursor[1] + 1};{cursor[0] + 1}H")
        written = "".join(parts)
        self.written += len(written.encode())
        driver.write(written)
        driver.flush()

    def wear(self, look: Look) -> None:
        """Another theme."""
        self.look = look
        self.refresh()

    def render_line(self, y: int) -> Strip:
        """A line of the last frame."""
        if y >= len(self._rows):
            return Strip.blank(self.size.width, self.look.style("text"))
        style = self.look.style
        return Strip([Segment(run.text, style(run.style)) for run in self._rows[y]])


def _stretches(row: Row, begin: int, end: int) -> list[tuple[str, str]]:
    """Text and style of the cells from one column to another; a wide character has an empty cell after it."""
    found: list[tuple[str, str]] = []
    place = 0
    for run in row:
        shown = plain.cells(run.text)
        inside = "".join(shown[max(begin - place, 0) : max(end - place, 0)])
        if inside:
            found.append((inside, run.style))
        place += len(shown)
    return found


def colours(environment: Mapping[str, str]) -> ColorSystem:
    """How many colours a terminal is trusted to have."""
    many = "256" in environment.get("TERM", "") or environment.get("COLORTERM", "")
    return ColorSystem.EIGHT_BIT if many else ColorSystem.STANDARD


def _differing(row: Row, old: Row) -> list[tuple[int, int]]:
    """The columns from the first to the last cell in which two lines differ, in two stretches if far apart."""
    new_cells, old_cells = _cells(row), _cells(old)
    if len(new_cells) != len(old_cells):
        return [(0, max(len(new_cells), len(old_cells)))]
    differ = [at for at, (one, other) in enumerate(zip(new_cells, old_cells, strict=True)) if one != other]
    stretches = [[differ[0], differ[0] + 1]] if differ else []
    for at in differ[1:]:
        if at - stretches[-1][1] < NEAR:
            stretches[-1][1] = at + 1
        else:
            stretches.append([at, at + 1])
    return [(begin, end) for begin, end in stretches]


NEAR = 12  # cells: to move the cursor over fewer costs the line more than to write them again


def _cells(row: Row) -> list[tuple[str, str]]:
    """Cells with their styles; a wide character's second cell repeats it, so that it is never half repainted."""
    made: list[tuple[str, str]] = []
    for text, style in row:
        if text.isascii():
            made.extend((character, style) for character in text)
            continue
        last = " "
        for cell in plain.cells(text):
            last = cell or last
            made.append((last, style))
    return made
