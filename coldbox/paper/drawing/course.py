"""Temperatures against time, with the limits, where the first is crossed, and how unsure that is."""

from __future__ import annotations

from typing import Final, Literal

import numpy as np

from coldbox.paper import curve as curves
from coldbox.paper import moments
from coldbox.paper.drawing.canvas import Canvas
from coldbox.record import Record
from coldbox.timeline.results import Outage, Trip
from coldbox.units import show

System = Literal["SI", "IP"]
STYLES: Final = ("dim", "curve", "shade3", "shade1", "band")
LEAST_ROWS: Final = 4


class Course(Record):
    """The drawing, and what is needed to walk along it."""

    canvas: Canvas
    left: int  # the first column of the curve
    across: int  # its columns
    reads: str  # what holds at the cursor


def course(
    found: Outage,
    width: int,
    height: int,
    *,
    at_h: float | None = None,
    system: System = "SI",
    ascii_only: bool = False,
) -> Course | None:
    """A run as a drawing. at_h: the hour the cursor is at; None: no cursor. None where nothing was kept of the run."""
    drawn = moments.curve(found, system)
    strip = 2 if isinstance(found, Trip) else 0
    rows = height - 3 - strip
    if drawn is None or rows < LEAST_ROWS or width < 30:
        return None
    canvas = Canvas(width, height, ascii_only=ascii_only)
    plot = curves.Plot(drawn, width, rows, ascii_only=ascii_only)
    left = plot.left + 1
    canvas.text(0, 0, f"{drawn.unit:>{plot.left}}", "dim")
    for row in range(rows):
        y = row + 1
        canvas.text(0, y, f"{plot.scale.get(row, ''):>{plot.left}}{'|' if ascii_only else '│'}", "dim")
        for column, letter in enumerate(plot.cells[row]):
            owner = int(plot.owners[row, column])
            style = "limit" if owner == -1 else STYLES[owner % len(STYLES)] if owner >= 0 else "text"
            canvas.text(left + column, y, letter, style)
        canvas.text(left + plot.across, y, plot.ends.get(row, ""), "limit" if _of_limit(plot, row) else "text")
    _crossing(canvas, found, plot, left)
    canvas.text(0, rows + 1, plot.ticks, "dim")
    _band(canvas, found, plot, left, rows + 2)
    if isinstance(found, Trip):
        _legs(canvas, found, plot, left, rows + 3)
    if at_h is not None:
        x = left + plot.column(at_h)
        for row in range(rows):
            canvas.text(x, row + 1, _letter(plot, row, plot.column(at_h), ascii_only), "cursor")
    return Course(canvas=canvas, left=left, across=plot.across, reads=_reads(found, at_h, system))


def _letter(plot: curves.Plot, row: int, column: int, ascii_only: bool) -> str:
    there = plot.cells[row][column]
    return there if there != " " else ":" if ascii_only else "┆"


def _of_limit(plot: curves.Plot, row: int) -> bool:
    return plot.ends.get(row, "").strip() in {label for label, _ in plot.curve.levels}


def _crossing(canvas: Canvas, found: Outage, plot: curves.Plot, left: int) -> None:
    """A mark where the first limit is crossed."""
    if found.first is None or found.hold_h is None or found.kind == "pulldown":
        return
    level = moments.limit_level(found.first, found.project.units)[1]
    line = next((one for one in plot.curve.levels if abs(one[1] - level) < 1e-6), None)
    row = plot.row(line[1]) if line is not None else None
    if row is None:  # shown in the other units
        row = next((plot.row(one[1]) for one in plot.curve.levels), None)
    if row is not None:
        canvas.text(left + plot.column(found.hold_h), row + 1, "X", "wrong")


def _band(canvas: Canvas, found: Outage, plot: curves.Plot, left: int, y: int) -> None:
    """Under the hours: from the short hold to the long, eight of ten draws between them."""
    spread = found.spread
    if spread is None or spread.hours.p10 is None:
        return
    end = plot.curve.at[-1]
    low, high = plot.column(spread.hours.p10), plot.column(end if spread.hours.p90 is None else spread.hours.p90)
    canvas.text(
        left + low, y, "├" + "─" * max(high - low - 1, 0) + ("┤" if spread.hours.p90 is not None else "→"), "band"
    )
    if spread.hours.p50 is not None:
        canvas.text(left + plot.column(spread.hours.p50), y, "┼", "band")
    words = "8 in 10 draws"
    x = left + high + 2
    canvas.text(x if x + len(words) <= canvas.width else max(left + low - len(words) - 1, 0), y, words, "dim")


def _legs(canvas: Canvas, found: Trip, plot: curves.Plot, left: int, y: int) -> None:
    """The trip as a strip: a stretch for each leg, stops filled."""
    for number, leg in enumerate(found.legs):
        x, end = left + plot.column(leg.from_h), left + plot.column(leg.to_h)
        letter, style = ("█", "door") if leg.kind == "stop" else ("─", "line")
        canvas.text(x, y, letter * max(end - x, 1), style)
        if number == 0 or leg.kind == "leg":
            canvas.text(x, y + 1, leg.label, "dim", max(end - x - 1, 0))


def _reads(found: Outage, at_h: float | None, system: System) -> str:
    """What the curve says at an hour, in words."""
    series = found.trace
    if at_h is None or not len(series.t_h):
        return ""
    parts = [show(found.start_clock_h + at_h, "clock")]
    for label, values in moments.tracks(found):
        value = float(np.interp(at_h, series.t_h, values))
        if np.isfinite(value):
            parts.append(f"{label} {show(value, 'temperature', system)}")
    for name, pack in series.packs.items():
        if found.carbon_dioxide is not None and name in series.packs:
            parts.append(f"{name} {show(float(np.interp(at_h, series.t_h, pack.left_kg)), 'mass', system, 3)}")
        else:
            parts.append(f"{name} {100.0 * float(np.interp(at_h, series.t_h, pack.frozen)):.0f} % frozen")
    return "  ".join(parts)
