"""A curve drawn in characters: braille dots, or plain ASCII where the terminal knows no more."""

from __future__ import annotations

from typing import Final

import numpy as np
from numpy.typing import NDArray

from coldbox.paper.document import Curve
from coldbox.physics.number import FloatArray

ROWS: Final = 12
BLANK: Final = 0x2800
DOTS: Final = ((0x01, 0x08), (0x02, 0x10), (0x04, 0x20), (0x40, 0x80))  # bit of each dot, four rows of two
MARKS: Final = "*o+x#"  # in ASCII, one for each line
LEVEL, ASCII_LEVEL = "┄", "-"
LEAST_RANGE: Final = 1.0  # K; less is drawn as nearly level
WIDEST_LABEL: Final = 24


def drawn(curve: Curve, width: int, *, ascii_only: bool = False) -> list[str]:
    """Twelve rows with a scale on the left and names on the right, then the ticks; no line wider than `width`."""
    plot = Plot(curve, width, ROWS, ascii_only=ascii_only)
    rows = [
        f"{plot.scale.get(row, ''):>{plot.left}}|{''.join(plot.cells[row])}{plot.ends.get(row, '')}"[:width].rstrip()
        for row in range(ROWS)
    ]
    return [f"{curve.unit:>{plot.left}}", *rows, plot.ticks]


class Plot:
    """A curve laid out on rows of characters.

    `cells`: the characters by row and column; `owners`: the line that drew each, -1 for a level, -2 for nothing.
    `scale` and `ends`: what stands to the left and the right of a row. `left`: columns of the scale, `across`: of the
    cells.
    """

    def __init__(self, curve: Curve, width: int, rows: int, *, ascii_only: bool = False) -> None:
        self.curve, self.rows = curve, rows
        self.low, self.high = _range(curve)
        self.scale = _scale(self.low, self.high, rows)
        self.left = max(len(text) for text in self.scale.values()) + 1
        marks = [f" {MARKS[number % len(MARKS)]} " if ascii_only else " " for number in range(len(curve.lines))]
        names = [(mark + line.label)[:WIDEST_LABEL] for mark, line in zip(marks, curve.lines, strict=True)]
        levels = [f" {label}"[:WIDEST_LABEL] for label, _ in curve.levels]
        right = max((len(name) for name in (*names, *levels)), default=0)
        self.across = max(width - self.left - 1 - right, 10)
        self.cells, self.owners = self._page(ascii_only)
        self.ends = _ends(curve, names, levels, self.low, self.high, rows)
        self.ticks = _ticks(curve, self.left, self.across)

    def column(self, hours: float) -> int:
        """The column of the cells at which an instant stands."""
        at = self.curve.at
        whole = max(at[-1] - at[0], 1e-9)
        return min(max(round((hours - at[0]) / whole * (self.across - 1)), 0), self.across - 1)

    def row(self, value: float) -> int:
        """The row on which a figure stands."""
        return _row(value, self.low, self.high, self.rows)

    def _page(self, ascii_only: bool) -> tuple[list[list[str]], NDArray[np.int_]]:
        curve, rows, across = self.curve, self.rows, self.across
        page = [[" "] * across for _ in range(rows)]
        owners = np.full((rows, across), -2)
        for _, level in curve.levels:
            page[self.row(level)] = [ASCII_LEVEL if ascii_only else LEVEL] * across
            owners[self.row(level)] = -1
        bits = np.zeros((rows, across), dtype=int)
        down, over = (1, 1) if ascii_only else (4, 2)
        for number, line in enumerate(curve.lines):
            for column, row in _dots(curve, line.values, across * over, rows * down, self.low, self.high):
                owners[row // down, column // over] = number
                if ascii_only:
                    page[row][column] = MARKS[number % len(MARKS)]
                else:
                    bits[row // 4, column // 2] |= DOTS[row % 4][column % 2]
        for row, column in zip(*np.nonzero(bits), strict=True):
            page[row][column] = chr(BLANK + int(bits[row, column]))
        return page, owners


def _range(curve: Curve) -> tuple[float, float]:
    values = [np.array(line.values) for line in curve.lines] + [np.array([level for _, level in curve.levels])]
    every = np.concatenate(values)
    every = every[np.isfinite(every)]
    low, high = (float(every.min()), float(every.max())) if len(every) else (0.0, 0.0)
    short = max(LEAST_RANGE - (high - low), 0.0) / 2.0
    return low - short, high + short


def _scale(low: float, high: float, rows: int) -> dict[int, str]:
    """Round figures by the row they stand on."""
    step = 10.0 ** np.floor(np.log10((high - low) / 2.0))
    for more in (1.0, 2.0, 5.0, 10.0):
        if (high - low) / (step * more) <= 5.0:
            step *= more
            break
    places = max(0, int(-np.floor(np.log10(step) + 1e-9)))
    figures = np.arange(np.ceil(low / step - 1e-9), np.floor(high / step + 1e-9) + 1.0) * step
    return {_row(float(one), low, high, rows): f"{one + 0.0:.{places}f}" for one in figures}


def _row(value: float, low: float, high: float, rows: int) -> int:
    """The row of so many, from the top, that a value falls on."""
    return min(max(round((high - value) / (high - low) * (rows - 1)), 0), rows - 1)


def _dots(
    curve: Curve, values: tuple[float, ...], columns: int, rows: int, low: float, high: float
) -> list[tuple[int, int]]:
    """Column and row of each dot of a line, steep parts filled in."""
    at = np.array(curve.at)
    places: FloatArray = np.linspace(at[0], at[-1], columns)
    figures = np.interp(places, at, np.array(values))
    found: list[tuple[int, int]] = []
    before: int | None = None
    for column, figure in enumerate(figures):
        if not np.isfinite(figure):
            before = None
            continue
        row = _row(float(figure), low, high, rows)
        start = row if before is None or abs(row - before) < 2 else before + (1 if row > before else -1)
        found += [(column, one) for one in range(min(start, row), max(start, row) + 1)]
        before = row
    return found


def _ends(curve: Curve, names: list[str], levels: list[str], low: float, high: float, rows: int) -> dict[int, str]:
    """Names by row, each as near to its line's end as there is room."""
    wanted = [(_row(value, low, high, rows), name) for name, (_, value) in zip(levels, curve.levels, strict=True)]
    for name, line in zip(names, curve.lines, strict=True):
        last = [value for value in line.values if np.isfinite(value)]
        if last:
            wanted.append((_row(last[-1], low, high, rows), name))
    found: dict[int, str] = {}
    for row, name in wanted:
        free = [one for one in range(rows) if one not in found]
        if free:
            found[min(free, key=lambda one: abs(one - row))] = name
    return found


def _ticks(curve: Curve, left: int, across: int) -> str:
    """The clock under the page; what has no room is left out."""
    line = " " * (left + 1)
    whole = max(curve.at[-1] - curve.at[0], 1e-9)
    for hours, text in curve.ticks:
        start = left + 1 + round((hours - curve.at[0]) / whole * (across - 1))
        if start >= len(line) and start + len(text) <= left + 1 + across + 8:
            line = line.ljust(start) + text + " "
    return line.rstrip()
