"""The one widget: it shows frames, and repaints of a new frame only the cells that differ from the last."""

from __future__ import annotations

from rich.segment import Segment
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
        self._width = 0
        self._painted = False  # whether the toolkit has painted this surface
        self._cursor = (0, 0)

    def show(self, frame: Frame) -> None:
        """Paint what differs from the frame shown before.

        The toolkit repaints a line from its beginning; over a slow line that is ten times what has changed. So only
        the first picture of each size goes its way, and what follows straight to the terminal.
        """
        rows, before = frame.rows(), self._rows
        self._rows = rows
        driver = self.app._driver
        if len(rows) != len(before) or frame.width != self._width or not self._painted or driver is None:
            self._width = frame.width
            self.refreshed += len(rows)
            self.refresh()
            return
        console, written = self.app.console, []
        for y, (row, old) in enumerate(zip(rows, before, strict=True)):
            if row != old:
                self.refreshed += 1
                strip = self._strip(row)
                for begin, end in _differing(row, old):
                    written.append(f"\x1b[{y + 1};{begin + 1}H{strip.crop(begin, end).render(console)}")
        x, y = self.app.cursor_position
        if written or (x, y) != self._cursor:
            self._cursor = (x, y)
            driver.write(f"{''.join(written)}\x1b[{y + 1};{x + 1}H")
            driver.flush()

    def wear(self, look: Look) -> None:
        """Another theme."""
        self.look = look
        self.refresh()

    def render_line(self, y: int) -> Strip:
        """A line of the last frame."""
        if y >= len(self._rows):
            return Strip.blank(self.size.width, self.look.style("text"))
        self._painted = True
        return self._strip(self._rows[y])

    def _strip(self, row: Row) -> Strip:
        style = self.look.style
        return Strip([Segment(run.text, style(run.style)) for run in row])


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
