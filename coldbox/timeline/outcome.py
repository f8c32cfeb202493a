"""From a run of the engine to figures a reader asks for: limits, who first, coolants, the series, what is inside."""

from __future__ import annotations

from typing import Any, Final

import numpy as np

from coldbox.physics import constants, moist_air
from coldbox.physics.number import FloatArray
from coldbox.timeline.course import clock, middle
from coldbox.timeline.packs import GAS_CONSTANT
from coldbox.timeline.results import (
    BoolArray,
    CarbonDioxide,
    LimitResult,
    LotSeries,
    PackResult,
    PackSeries,
    Series,
)  # fmt: skip
from coldbox.timeline.runs import Run, Watched, last_beyond

HOUR_S: Final = 3600.0
PPM: Final = 1e6
ZERO_C: Final = float(constants.ZERO_CELSIUS)
NOTHING: Final = np.zeros(0)


class Outcome:
    """Reads one run. `series`: whether its figures through time were kept for all signals."""

    def __init__(self, run: Run, *, series: bool) -> None:
        self.run, self.trace, self.series = run, run.trace, series
        self.start_s = run.course.start_s
        self.draws = run.rig.draws

    # --- hours and clocks

    def hours(self, at_s: Any) -> FloatArray:
        """Hours from the start of instants on the course's clock; inf stays."""
        return np.asarray((np.asarray(at_s) - self.start_s) / HOUR_S)

    def clock(self, hours: float | None) -> str | None:
        """The wall clock so many hours after the start."""
        return None if hours is None else clock(self.start_s + HOUR_S * hours)

    # --- limits

    def limits(self, *, back: bool) -> tuple[LimitResult, ...]:
        """Every limit. back: also when it was last beyond, from the series."""
        return tuple(self._limit(one, back) for one in self.run.limits)

    def _limit(self, one: Watched, back: bool) -> LimitResult:
        trace, limit = self.trace, one.limit
        crossed = self.hours(trace.crossed_s[one.watch])
        returned = self.back(one) if back else None
        at, back_at = first_of(crossed), None if returned is None else first_of(returned)
        back_at = back_at or None  # 0: never beyond
        body = one.body
        extreme = trace.highest if limit.side == "above" else trace.lowest
        comes = body is not None and body.kind == "coming"
        start_c = middle(body.start_c if body is not None and comes else trace.first[one.signal])
        worst_c = float(extreme[one.signal, 0])
        return LimitResult(
            lot="box" if body is None else body.label,
            side=limit.side,
            where=limit.where if body is not None else "air",
            limit_c=middle(limit.limit_c),
            allowed_min=float(limit.allowed_s) / 60.0,
            crossed_at_h=at,
            at_clock=self.clock(at),
            start_c=start_c,
            end_c=self._end(one),
            worst_c=worst_c if np.isfinite(worst_c) else start_c,  # what is taken out as it begins is never seen
            beyond_min=float(trace.beyond_s[one.watch, 0]) / 60.0,
            back_at_h=back_at,
            back_clock=self.clock(back_at),
            crossed_draws_h=crossed,
            back_draws_h=returned,
        )

    def _end(self, one: Watched) -> float:
        """At the end of the run, or when it has gone."""
        if one.body is None or not self.series:
            return float(self.trace.last[one.signal, 0])
        there = np.flatnonzero(self._there(one.body.row))
        return float(self.trace.series[there[-1] if len(there) else -1, one.signal, 0])

    def back(self, one: Watched) -> FloatArray:
        """Hours at which a limit is last back within, (draw,): 0 where never beyond, inf where beyond at the end."""
        beyond = last_beyond(
            self.trace.times_s, self.trace.series[:, one.signal], one.limit.limit_c, one.limit.side
        )  # fmt: skip
        return np.maximum(self.hours(beyond), 0.0)

    # --- coolants and gas

    def packs(self) -> tuple[PackResult, ...]:
        """Every coolant of the project; the fittings of the box are none."""
        found = []
        network, state = self.run.rig.network.packs, self.trace.state
        for pack in self.run.project.packs:
            row = self.run.rig.pack_rows[pack.name]
            spent = self.hours(self.trace.spent_s[row])
            at = first_of(spent)
            left = max(float(state.pack_mass[network.order[row], 0]), 0.0)
            found.append(
                PackResult(
                    id=pack.name, left_kg=left, frozen=self._frozen(pack.name, left), spent_at_h=at,
                    spent_clock=self.clock(at), spent_draws_h=spent,
                )
            )  # fmt: skip
        return tuple(found)

    def _frozen(self, name: str, left_kg: float) -> float:
        if name in self.run.rig.dry_ice:
            return 1.0 if left_kg > 0.0 else 0.0
        key = ("pack frozen", name, "")
        return float(self.trace.last[self.run.signals[key], 0]) if key in self.run.signals else 0.0

    def carbon_dioxide(self) -> CarbonDioxide | None:
        """The most that dry ice brings into the box, and into a room around it while it stands there."""
        if not self.run.rig.dry_ice or not self.series:
            return None
        at = self.run.signals["carbon dioxide", "", ""]
        rooms, ppm = self.around()
        most = int(np.argmax(ppm)) if any(rooms) else None
        return CarbonDioxide(
            box_ppm=PPM * float(self.trace.highest[at, 0]),
            box_at_h=float(self.hours(self.trace.highest_at_s[at, 0])),
            around=None if most is None else rooms[most],
            around_ppm=None if most is None else float(ppm[most]),
            around_at_h=None if most is None else float(self.hours(self.trace.times_s[most])),
            gas_kg=float(self.trace.state.gas[0]),
        )

    def around(self) -> tuple[list[str], FloatArray]:
        """The room around at each instant, "" where its volume is not told, and its carbon dioxide, ppm.

        What leaves the box within an interval comes evenly: m' = out - n m, from nothing where the box has moved to.
        """
        times = self.trace.times_s
        gone = sum(self._sublimed(name) for name in self.run.rig.dry_ice)
        kelvin = self._signal("air", "", "air") + ZERO_C
        rig = self.run.rig
        whole = middle(rig.scene.body.volume) * float(rig.network.pressure[0]) / GAS_CONSTANT / kelvin
        left = np.maximum(gone - np.diff(self._signal("carbon dioxide", "", "") * whole), 0.0)
        names = [self._room(at) for at in times]
        ppm, mass = np.zeros(len(times)), 0.0
        for i, (out, step) in enumerate(zip(left, np.diff(times), strict=True), 1):
            room = self.run.project.neighbours.get(names[i])
            if room is None or room.volume is None or names[i] != names[i - 1]:
                mass = 0.0
            if room is None or room.volume is None:
                continue
            change = 0.0 if room.air_change is None else middle(room.air_change)
            stays = np.exp(-change * step)
            mass = mass * stays + out * ((1.0 - stays) / (change * step) if change > 0.0 else 1.0)
            filled = middle(room.volume) * float(rig.network.pressure[0])
            ppm[i] = PPM * min(mass * GAS_CONSTANT * (middle(room.temperature) + ZERO_C) / filled, 1.0)
        return names, ppm

    def _sublimed(self, name: str) -> FloatArray:
        """Dry ice that turns into gas between two instants, kg; what is carried in or out does not."""
        times, left = self.trace.times_s, self._signal("pack mass", name, "")
        before = left[:-1].copy()
        for change in sorted(self.run.rig.changes, key=lambda one: one.at_s):
            if change.what in ("pack in", "pack out") and change.row == self.run.rig.pack_rows[name]:
                at = np.flatnonzero((times[:-1] == change.at_s) & (change.at_s > self.start_s))
                carried = middle(change.mass)
                before[at] = before[at] + carried if change.what == "pack in" else np.maximum(before[at] - carried, 0.0)
        return np.asarray(before - left[1:])

    def _room(self, at_s: float) -> str:
        """The named room with a volume that the box stands in at an instant, else ""."""
        name = None
        for since, setting in self.run.course.settings:
            if since < at_s or since <= self.start_s:
                name = setting.neighbour if setting.neighbour is not None else name
        known = self.run.project.neighbours
        behind = [name] if name is not None else [face.neighbour for face in self.run.project.faces.values()]
        return next((one for one in behind if one in known and known[one].volume is not None), "")

    # --- through time

    def through_time(self) -> Series:
        """The run with every input at its middle; empty where it was not kept."""
        if not self.series:
            return Series(
                t_h=NOTHING, air_c=NOTHING, humidity=NOTHING, lots={}, packs={}, carbon_dioxide_ppm=None,
                around_ppm=None,
            )  # fmt: skip
        rooms, ppm = self.around() if self.run.rig.dry_ice else ([], NOTHING)
        air_c = self._signal("air", "", "air")
        pressure = float(self.run.rig.network.pressure[0])
        humidity = moist_air.relative_humidity(air_c, self._signal("humidity ratio", "", ""), pressure)
        return Series(
            t_h=self.hours(self.trace.times_s),
            air_c=air_c,
            humidity=np.minimum(humidity, 1.0),
            lots={
                body.label: LotSeries(
                    surface_c=self._signal("lot", body.label, "surface"),
                    mean_c=self._signal("lot", body.label, "mean"),
                    core_c=self._signal("lot", body.label, "core"),
                    there=self._there(body.row),
                )
                for body in self.run.rig.bodies
            },
            packs={
                pack.name: PackSeries(
                    left_kg=self._signal("pack mass", pack.name, ""),
                    frozen=self._signal("pack frozen", pack.name, ""),
                )
                for pack in self.run.project.packs
            },
            carbon_dioxide_ppm=PPM * self._signal("carbon dioxide", "", "") if self.run.rig.dry_ice else None,
            around_ppm=ppm if any(rooms) else None,
        )

    def _signal(self, *key: str) -> FloatArray:
        kind, name, where = key
        return np.array(self.trace.series[:, self.run.signals[kind, name, where], 0])

    def _there(self, row: int) -> BoolArray:
        """At which instants some of a body is in the box: what comes or goes at an instant counts from there on."""
        times = self.trace.times_s
        network = self.run.rig.network.lots
        mass = np.full(len(times), float(network.mass[network.order[row], 0]))
        for change in sorted(self.run.rig.changes, key=lambda one: one.at_s):
            if change.what in ("lot in", "lot out") and change.row == row:
                later = times > change.at_s
                if change.at_s <= self.start_s:
                    later[:] = True
                amount = middle(change.mass)
                mass[later] = mass[later] + amount if change.what == "lot in" else np.maximum(mass[later] - amount, 0.0)
        return np.asarray(mass > 1e-9)

    # --- in words

    def inside(self) -> tuple[str, ...]:
        """What is in the box at the start."""
        found = []
        for body in self.run.rig.bodies:
            if body.kind == "stored":
                found.append(body.label)
            elif body.kind == "intake" and body.arrived_s is not None:
                before = " the day before" if body.arrived_s < 0.0 else ""
                found.append(f"{body.label}, in since {clock(body.arrived_s % 86400.0)}{before}")
        return (*found, *(pack.name for pack in self.run.project.packs if self._packed(pack.name)))

    def _packed(self, name: str) -> bool:
        packs = self.run.rig.network.packs
        return float(packs.mass[packs.order[self.run.rig.pack_rows[name]], 0]) > 0.0

    def stopped(self) -> tuple[str, ...]:
        """What stops while there is no power."""
        return tuple(self.run.hours.life.stopped()) if self.run.project.box.powered else ()

    def notes(self) -> tuple[str, ...]:
        """What was assumed, held at an edge, or not watched."""
        return (*self.run.rig.assumed, *self.run.not_watched, *self.trace.notes)


def first_of(values: FloatArray) -> float | None:
    """The middle's figure; None where it is inf."""
    value = float(values[0])
    return value if np.isfinite(value) else None
