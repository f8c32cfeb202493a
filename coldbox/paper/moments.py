"""A run through time on paper: a clock table, a curve, and the rows of a CSV."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Final, Literal

import numpy as np

from coldbox.paper.document import Block, Column, Curve, Line, Table
from coldbox.physics.number import FloatArray
from coldbox.record import Record
from coldbox.timeline.results import LimitResult, Outage
from coldbox.units import display_unit, show, show_number

System = Literal["SI", "IP"]

STEPS_H: Final = (1 / 12, 1 / 6, 0.25, 0.5, 1.0, 2.0, 3.0, 4.0, 6.0, 12.0, 24.0, 48.0, 96.0, 240.0)
MOST_REGULAR: Final = 9
MOST_ROWS: Final = 24
MOST_PLACES: Final = 3
MOST_PACKS: Final = 2
SAME_MINUTE_H: Final = 1.0 / 60.0


class _Track(Record):
    """Figures through time under a name; nan where there is nothing."""

    label: str
    values: FloatArray


def of_limits(found: Outage) -> list[LimitResult]:
    """The limits in the order in which they matter: the first crossed first, then as written."""
    return sorted(found.limits, key=lambda one: np.inf if one.crossed_at_h is None else one.crossed_at_h)


def clock_blocks(found: Outage, system: System) -> Iterator[Block]:
    """The temperatures by the clock with what happens, then the same as a curve."""
    yield _table(found, system)
    drawn = curve(found, system)
    if drawn is not None:
        yield drawn


def place_of(limit: LimitResult) -> str:
    """Whose and where: "cod surface", "air"."""
    return "air" if limit.lot == "box" or limit.where == "air" else f"{limit.lot} {limit.where}"


def _table(found: Outage, system: System) -> Table:
    told = _happens(found)
    at = _instants(found, sorted(told))
    tracks = _tracks(found)
    shown = [[_temperature(value, system) for value in _values(found, track, at)] for track in tracks]
    packs = list(found.trace.packs)[:MOST_PACKS]
    kilograms = [
        [
            show(_or_nothing(float(value), found.trace.packs[name].left_kg), "mass", system, 3)
            for value in np.interp(at, found.trace.t_h, found.trace.packs[name].left_kg)
        ]
        for name in packs
    ]
    frozen = {name: found.trace.packs[name].frozen for name in packs}
    for name, column in zip(packs, kilograms, strict=True):
        shares = np.interp(at, found.trace.t_h, frozen[name])
        if _melts(found, name):
            column[:] = [f"{100.0 * float(share):.0f} %" for share in shares]
    words = [", ".join(told.get(one, ())) for one in at]
    columns = (
        Column(title="clock"),
        *(Column(title=track.label, align="right") for track in tracks),
        *(Column(title=f"{name} frozen" if _melts(found, name) else name, align="right") for name in packs),
        Column(title="", gives=True),
    )
    clocks = [show(found.start_clock_h + one, "clock") for one in at]
    rows = tuple(zip(clocks, *shown, *kilograms, words, strict=True))
    return Table(columns=columns, rows=rows)


def _or_nothing(value: float, whole: FloatArray) -> float:
    """A mass, or 0 where less than a thousandth of the most is left."""
    return value if value >= 1e-3 * float(whole.max()) else 0.0


def _melts(found: Outage, name: str) -> bool:
    """Whether a coolant melts and stays, so that its frozen share tells more than its mass; dry ice goes."""
    left = found.trace.packs[name].left_kg
    return bool(np.ptp(left) <= 1e-9 * max(float(left.max()), 1e-12)) or found.carbon_dioxide is None


def _temperature(value: float, system: System) -> str:
    if not np.isfinite(value):
        return "-"
    unit = display_unit("temperature", system)
    return f"{round((value - unit.offset) / unit.factor, 1) + 0.0:.1f}"


def _tracks(found: Outage) -> list[_Track]:
    """The air, then what has limits, the first to be crossed first; without limits the goods' means."""
    series = found.trace
    chosen = list(dict.fromkeys((one.lot, one.where) for one in of_limits(found) if place_of(one) != "air"))
    chosen = chosen or [(name, "mean") for name in series.lots]
    tracks = [_Track(label="air", values=np.asarray(series.air_c))]
    for lot, where in chosen:
        if lot in series.lots and len(tracks) <= MOST_PLACES:
            one = series.lots[lot]
            values = np.where(one.there, getattr(one, f"{where}_c"), np.nan)
            tracks.append(_Track(label=f"{lot} {where}", values=values))
    return tracks


def tracks(found: Outage) -> list[tuple[str, FloatArray]]:
    """What is shown of a run through time: names and °C, nan where something is not there."""
    return [(track.label, track.values) for track in _tracks(found)]


def _values(found: Outage, track: _Track, at: list[float]) -> FloatArray:
    """Figures at some instants: straight between those of the series, of which one without a figure has none."""
    return np.asarray(np.interp(at, found.trace.t_h, track.values))


def _happens(found: Outage) -> dict[float, list[str]]:
    """What happens, by hour: the events, then each limit crossed, each coolant spent."""
    told: dict[float, list[str]] = {}

    def tell(hours: float, text: str) -> None:
        near = next((one for one in told if abs(one - hours) < SAME_MINUTE_H), hours)
        told.setdefault(near, []).append(text)

    for event in found.events:
        tell(event.at_h, event.text)
    for limit in found.limits:
        if limit.crossed_at_h is not None and found.kind != "pulldown":
            tell(limit.crossed_at_h, f"{place_of(limit)} over" if limit.side == "above" else f"{place_of(limit)} under")
        if limit.back_at_h is not None:
            tell(limit.back_at_h, f"{place_of(limit)} back")
    for pack in found.packs:
        if pack.spent_at_h is not None and found.kind != "pulldown":
            tell(pack.spent_at_h, f"{pack.id} spent")
    return told


def _instants(found: Outage, told: list[float]) -> list[float]:
    """Even hours of the clock, and whatever happens; where too much does, what happens first."""
    whole = float(found.trace.t_h[-1])
    step = next((one for one in STEPS_H if whole / one <= MOST_REGULAR), STEPS_H[-1])
    start = found.start_clock_h
    first = np.floor(start / step + 1e-9) + 1.0
    regular = [float(one) - start for one in np.arange(first * step, start + whole - 1e-9, step)]
    told = [one for one in told if 0.0 <= one <= whole][:MOST_ROWS]
    fixed = sorted({0.0, *told, whole})
    regular = [one for one in regular if min(abs(one - other) for other in fixed) >= step / 8.0]
    return sorted({*fixed, *regular[: max(MOST_ROWS - len(fixed), 0)]})


def curve(found: Outage, system: System) -> Curve | None:
    """The temperatures through time with the limits; None where there is too little to draw."""
    series = found.trace
    if len(series.t_h) < 3:
        return None
    unit = display_unit("temperature", system)
    tracks = _tracks(found)[: 1 + MOST_PLACES]
    firm = [one for one in of_limits(found) if place_of(one) in {track.label for track in tracks}]
    levels = list(dict.fromkeys(limit_level(one, system) for one in firm))[:MOST_PLACES]
    at = _instants(found, [])
    points = tuple(int(np.argmin(np.abs(series.t_h - one))) for one in at)
    return Curve(
        unit=unit.unit,
        at=tuple(float(one) for one in series.t_h),
        lines=tuple(
            Line(label=track.label, values=tuple(float(one) for one in (track.values - unit.offset) / unit.factor))
            for track in tracks
        ),
        levels=tuple((label, (level - unit.offset) / unit.factor) for label, level in levels),
        ticks=tuple((one, show(found.start_clock_h + one, "clock")) for one in at[:-1]),
        points=tuple(dict.fromkeys(points)),
    )


def limit_level(limit: LimitResult, system: System) -> tuple[str, float]:
    """A limit as a level of the curve: its name, and °C."""
    number, unit = show_number(limit.limit_c, "temperature", system)
    return f"limit {number} {unit}", limit.limit_c


def series_rows(found: Outage) -> Iterator[list[str]]:
    """Rows of a CSV: a header, then an instant a row, always SI; empty where there is nothing."""
    from coldbox.paper.data import cell

    series = found.trace
    heads: list[str] = ["t_h", "clock", "air_c", "humidity"]
    columns: list[FloatArray] = [np.asarray(series.air_c), np.asarray(series.humidity)]
    for name, lot in series.lots.items():
        for where in ("surface", "mean", "core"):
            heads.append(f"{name} {where}_c")
            columns.append(np.where(lot.there, getattr(lot, f"{where}_c"), np.nan))
    for name, pack in series.packs.items():
        heads += [f"{name} left_kg", f"{name} frozen"]
        columns += [np.asarray(pack.left_kg), np.asarray(pack.frozen)]
    for head, ppm in (("carbon_dioxide_ppm", series.carbon_dioxide_ppm), ("around_ppm", series.around_ppm)):
        if ppm is not None:
            heads.append(head)
            columns.append(np.asarray(ppm))
    yield [cell(head) for head in heads]
    for row, hours in enumerate(series.t_h):
        figures = [float(column[row]) for column in columns]
        clock = show(found.start_clock_h + float(hours), "clock")
        yield [repr(float(hours)), clock, *(repr(one) if np.isfinite(one) else "" for one in figures)]
