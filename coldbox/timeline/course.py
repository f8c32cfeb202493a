"""What happens in a run, whoever asked for it: an outage's events or a trip's legs and stops, on one clock.

Times are seconds after 00:00 of the first day, the wall clock's.
"""

from __future__ import annotations

from typing import Literal

import numpy as np

from coldbox.physics.number import Number
from coldbox.record import Record
from coldbox.timeline.results import Told
from coldbox.timeline.surroundings import Setting
from coldbox.units import show


class Happening(Record):
    """Goods or packs that come or go."""

    at_s: float
    what: Literal["goods in", "goods out", "pack in", "pack out"]
    name: str  # of the lot or the pack
    mass: Number | None = None  # kg; None: all of it
    temperature_c: Number | None = None  # of what comes


class Opening(Record):
    """A door that stands open."""

    door: str
    from_s: float
    to_s: float


class Course(Record):
    """All of a run."""

    start_s: float
    end_s: float
    settings: tuple[tuple[float, Setting], ...]  # from when; the first from the start
    power: tuple[tuple[float, bool], ...]  # from when the machine runs; the first from the start
    openings: tuple[Opening, ...]
    happenings: tuple[Happening, ...]
    told: tuple[Told, ...]
    going_on: tuple[str, ...]  # of doors, people, trucks, deliveries: what goes on without power
    daily_life: bool  # whether people, lamps and door traffic go by their hours while there is power

    def powered(self, at_s: float) -> bool:
        """Whether the machine runs at an instant."""
        on = self.power[0][1]
        for since, flag in self.power:
            if since <= at_s:
                on = flag
        return on

    def marks(self) -> list[float]:
        """Instants at which something jumps."""
        found = {at for at, _ in (*self.settings[1:], *self.power[1:])}
        for opening in self.openings:
            found |= {opening.from_s, opening.to_s}
        return sorted(at for at in found if self.start_s < at < self.end_s)


def middle(value: Number) -> float:
    """A figure with every input at its middle: draw 0."""
    return float(np.ravel(value)[0])


def clock(at_s: float) -> str:
    """The wall clock at an instant, with its day from the second on."""
    return show(at_s / 3600.0, "clock")


def told(at_s: float, start_s: float, text: str) -> Told:
    """Something that happens, in words."""
    return Told(at_h=(at_s - start_s) / 3600.0, clock=clock(at_s), text=text)
