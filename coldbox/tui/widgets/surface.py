"""The one widget: it shows frames, and repaints of a new frame only the cells that differ from the last."""

from __future__ import annotations

from rich.segment import Segment
from textual.geometry import Region
from textual.strip import Strip
from textual.widget import Widget

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
        self._rows: list[Row] = []

    def show(self, frame: Frame) -> None:
        """Repaint what differs from the frame shown before."""
        rows, before = frame.rows(), self._rows
        self._rows = rows
        if len(rows) != len(before) or not self.is_mounted:
            self.refreshed += len(rows)
            self.refresh()
            return
        changed = [
            Region(begin, y, end - begin, 1)
            for y, (row, old) in enumerate(zip(rows, before, strict=True))
            if row != old
            for begin, end in _differing(row, old)
        ]
        if changed:
            self.refreshed += len({region.y for region in changed})
            self.refresh(*changed)

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
        from coldbox.tui.plain import cells

        last = " "
        for cell in cells(text):
            last = cell or last
            made.append((last, style))
    return made
