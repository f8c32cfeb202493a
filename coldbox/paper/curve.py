"""A curve drawn in characters: braille dots, or plain ASCII where the terminal knows no more."""

from __future__ import annotations

from typing import Final

import numpy as np

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
    low, high = _range(curve)
    scale = _scale(low, high)
    left = max(len(text) for text in scale.values()) + 1
    marks = [f" {MARKS[number % len(MARKS)]} " if ascii_only else " " for number in range(len(curve.lines))]
    names = [(mark + line.label)[:WIDEST_LABEL] for mark, line in zip(marks, curve.lines, strict=True)]
    levels = [f" {label}"[:WIDEST_LABEL] for label, _ in curve.levels]
    right = max((len(name) for name in (*names, *levels)), default=0)
    across = max(width - left - 1 - right, 10)
    page = _page(curve, across, low, high, ascii_only=ascii_only)
    ends = _ends(curve, names, levels, low, high)
    rows = [
        f"{scale.get(row, ''):>{left}}|{''.join(page[row])}{ends.get(row, '')}"[:width].rstrip() for row in range(ROWS)
    ]
    return [f"{curve.unit:>{left}}", *rows, *_ticks(curve, left, across)]


def _range(curve: Curve) -> tuple[float, float]:
    values = [np.array(line.values) for line in curve.lines] + [np.array([level for _, level in curve.levels])]
    every = np.concatenate(values)
    every = every[np.isfinite(every)]
    low, high = (float(every.min()), float(every.max())) if len(every) else (0.0, 0.0)
    short = max(LEAST_RANGE - (high - low), 0.0) / 2.0
    return low - short, high + short


def _scale(low: float, high: float) -> dict[int, str]:
    """Round figures by the row they stand on."""
    step = 10.0 ** np.floor(np.log10((high - low) / 2.0))
    for more in (1.0, 2.0, 5.0, 10.0):
        if (high - low) / (step * more) <= 5.0:
            step *= more
            break
    places = max(0, int(-np.floor(np.log10(step) + 1e-9)))
    figures = np.arange(np.ceil(low / step - 1e-9), np.floor(high / step + 1e-9) + 1.0) * step
    return {_row(float(one), low, high, ROWS): f"{one + 0.0:.{places}f}" for one in figures}


def _row(value: float, low: float, high: float, rows: int) -> int:
    """The row of so many, from the top, that a value falls on."""
    return min(max(round((high - value) / (high - low) * (rows - 1)), 0), rows - 1)


def _page(curve: Curve, across: int, low: float, high: float, *, ascii_only: bool) -> list[list[str]]:
    page = [[" "] * across for _ in range(ROWS)]
    for _, level in curve.levels:
        page[_row(level, low, high, ROWS)] = [ASCII_LEVEL if ascii_only else LEVEL] * across
    if ascii_only:
        for number, line in enumerate(curve.lines):
            for column, row in _dots(curve, line.values, across, ROWS, low, high):
                page[row][column] = MARKS[number % len(MARKS)]
        return page
    bits = np.zeros((ROWS, across), dtype=int)
    for line in curve.lines:
        for column, row in _dots(curve, line.values, across * 2, ROWS * 4, low, high):
            bits[row // 4, column // 2] |= DOTS[row % 4][column % 2]
    for row, column in zip(*np.nonzero(bits), strict=True):
        page[row][column] = chr(BLANK + int(bits[row, column]))
    return page


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


def _ends(curve: Curve, names: list[str], levels: list[str], low: float, high: float) -> dict[int, str]:
    """Names by row, each as near to its line's end as there is room."""
    wanted = [(_row(value, low, high, ROWS), name) for name, (_, value) in zip(levels, curve.levels, strict=True)]
    for name, line in zip(names, curve.lines, strict=True):
        last = [value for value in line.values if np.isfinite(value)]
        if last:
            wanted.append((_row(last[-1], low, high, ROWS), name))
    found: dict[int, str] = {}
    for row, name in wanted:
        free = [one for one in range(ROWS) if one not in found]
        if free:
            found[min(free, key=lambda one: abs(one - row))] = name
    return found


def _ticks(curve: Curve, left: int, across: int) -> list[str]:
    """The clock under the page; what has no room is left out."""
    line = " " * (left + 1)
    whole = max(curve.at[-1] - curve.at[0], 1e-9)
    for hours, text in curve.ticks:
        start = left + 1 + round((hours - curve.at[0]) / whole * (across - 1))
        if start >= len(line) and start + len(text) <= left + 1 + across + 8:
            line = line.ljust(start) + text + " "
    return [line.rstrip()]
