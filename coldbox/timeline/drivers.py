"""What drives a box from hour to hour, for each step of the engine.

Within a clock hour everything stays as it is but for doors, power and moves, which are marks of the run; so the
conditions of an hour are made once and handed out again.
"""

from __future__ import annotations

from bisect import bisect_right

import numpy as np

from coldbox.physics.number import FloatArray, Number
from coldbox.timeline.course import Course
from coldbox.timeline.life import Life
from coldbox.timeline.network import Factors, Rig
from coldbox.timeline.surroundings import Around, surroundings
from coldbox.timeline.types import Conditions


class Hours:
    """The drivers of a course."""

    def __init__(self, rig: Rig, course: Course, factors: Factors, capacity_w: Number | None) -> None:
        self.rig, self.course = rig, course
        self.capacity = None if capacity_w is None else _flat(capacity_w)
        self.set_c = _flat(rig.scene.room.temperature_c)
        self.arounds: list[Around] = []
        known: dict[int, Around] = {}
        for _, setting in course.settings:
            if id(setting) not in known:
                known[id(setting)] = surroundings(rig.project, setting, rig.envelope, factors.films)
            self.arounds.append(known[id(setting)])
        first = course.settings[0][1]
        self.before = self.arounds[0]  # on normal days
        if course.daily_life and first.dry_bulb is not None:
            usual = first.replace(dry_bulb=None)
            self.before = surroundings(rig.project, usual, rig.envelope, factors.films)
        self.since = [since for since, _ in course.settings]
        self.life = Life(rig, course, self.capacity)
        self._made: dict[tuple[object, ...], Conditions] = {}
        self._films: dict[tuple[int, int], FloatArray] = {}

    def around(self, at_s: float) -> Around:
        """The surroundings at an instant."""
        return self.arounds[max(bisect_right(self.since, at_s) - 1, 0)]

    def during(self, start_s: float, end_s: float) -> Conditions:
        """Conditions of a step that lies within one hour and between two marks."""
        at = 0.5 * (start_s + end_s)
        which = max(bisect_right(self.since, at) - 1, 0)
        powered = self.course.powered(at)
        opened = tuple(one.door for one in self.course.openings if one.from_s <= at < one.to_s)
        hour = self.arounds[which].hour(at)
        key = (id(self.arounds[which]), hour, int(at // 3600.0) % 24, powered, opened)
        if key not in self._made:
            self._made[key] = self._make(self.arounds[which], hour, int(at // 3600.0) % 24, powered, opened)
        return self._made[key]

    def held(self, start_s: float, end_s: float) -> Conditions:
        """The walls' conditions of normal days, the room air held at its temperature whatever it takes."""
        return self._held(self.before, self.before.hour(0.5 * (start_s + end_s)))

    def mean_held(self) -> Conditions:
        """The same for the mean of the first day."""
        around = self.before
        made = self._held(around, 0)
        first = slice(0, 24)
        return made.replace(
            outside_c=around.outside_c[first].mean(axis=0),
            gain_w=around.gain_w[first].mean(axis=0),
        )

    def _held(self, around: Around, hour: int) -> Conditions:
        none = np.zeros((0, 1))
        return Conditions(
            outside_c=around.outside_c[hour],
            film=self._film(around, hour // 24),
            gain_w=around.gain_w[hour],
            extra=none,
            extra_c=none,
            leak=none,
            leak_c=none,
            leak_humidity_ratio=none,
            door_share=None,
            door_c=None,
            door_humidity_ratio=None,
            heat_w=np.zeros(1),
            moisture=np.zeros(1),
            capacity_w=np.full(1, np.inf),
            set_c=self.rig.network.start_c,
            warms=True,
        )

    def _film(self, around: Around, day_: int) -> FloatArray:
        """The same object for as long as it holds: that is how the engine knows."""
        return self._films.setdefault((id(around), day_), around.film[day_])

    def _make(self, around: Around, hour: int, clock: int, powered: bool, opened: tuple[str, ...]) -> Conditions:
        runs = powered and self.capacity is not None
        leaks = [
            (flow, around.airs[name][0][hour], around.airs[name][1][hour])
            for name, flow in self.life.leaks(around, clock, powered, bool(opened))
        ]
        leaks += self.life.fresh(around, hour, clock, powered)
        shares = self.life.door_shares(clock, powered, opened)
        where = [around.behind[f"doors.{door.name}"] for door in self.rig.project.doors]
        heat, water = self.life.inside(clock, powered)
        return Conditions(
            outside_c=around.outside_c[hour],
            film=self._film(around, hour // 24),
            gain_w=around.gain_w[hour],
            extra=around.extra,
            extra_c=around.extra_c[hour],
            leak=_stacked([flow for flow, _, _ in leaks]),
            leak_c=_stacked([air_c for _, air_c, _ in leaks]),
            leak_humidity_ratio=_stacked([ratio for _, _, ratio in leaks]),
            door_share=shares,
            door_c=None if shares is None else _stacked([around.airs[name][0][hour] for name in where]),
            door_humidity_ratio=None if shares is None else _stacked([around.airs[name][1][hour] for name in where]),
            heat_w=np.asarray(heat + around.glass_w[hour]),
            moisture=np.asarray(water),
            capacity_w=self.capacity if runs else None,
            set_c=self.set_c if runs else None,
        )


def _flat(value: Number) -> FloatArray:
    return np.ravel(np.asarray(value, dtype=np.float64))


def _stacked(rows: list[FloatArray]) -> FloatArray:
    if not rows:
        return np.zeros((0, 1))
    width = max(row.size for row in rows)
    return np.array([np.broadcast_to(row, (width,)) for row in rows])
