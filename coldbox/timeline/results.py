"""What an outage, a trip, a pull-down or a recovery comes to: plain figures, none of them nan.

Hours (`_h`) count from the start of the run: the loss of power, or the departure. `clock` texts are the wall clock's,
"08:20 day 2", day 1 being that of the start. Where a project holds draws, draw 0 has every input at its middle and
gives the single figures; `_draws` arrays hold all draws, draw 0 first, inf beyond the horizon.
"""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any, Literal

import numpy as np

from coldbox.physics.number import FloatArray, Number
from coldbox.project.model import Project
from coldbox.record import Record
from coldbox.scene.finding import Finding

BoolArray = np.ndarray[tuple[Any, ...], np.dtype[np.bool_]]
IntArray = np.ndarray[tuple[Any, ...], np.dtype[np.int_]]
Kind = Literal["outage", "pulldown", "recovery", "trip"]


class LimitResult(Record):
    """One limit of one lot, or of the box, and how it fared."""

    lot: str  # the lot's name, or "box"
    side: Literal["above", "below"]
    where: Literal["surface", "mean", "core", "air"]
    limit_c: float
    allowed_min: float
    crossed_at_h: float | None  # when its minutes are used up; None: not within the run
    at_clock: str | None
    start_c: float  # at that place, at the start (or when it comes)
    end_c: float  # at that place, at the end (or when it has gone)
    worst_c: float  # the furthest towards the limit, or beyond it
    beyond_min: float  # spent beyond the limit in sum
    back_at_h: float | None = None  # pull-down, recovery: last back within the limit; None: not within the run
    back_clock: str | None = None
    crossed_draws_h: FloatArray | None = None  # (draws,)
    back_draws_h: FloatArray | None = None  # (draws,)


class LotSeries(Record):
    """A lot through time; where `there` is false it is not in the box and its temperatures mean nothing."""

    surface_c: FloatArray
    mean_c: FloatArray
    core_c: FloatArray
    there: BoolArray


class PackSeries(Record):
    """A coolant through time."""

    left_kg: FloatArray  # all of it, melted or not; of dry ice what has not become gas
    frozen: FloatArray  # share of it still frozen (of dry ice: of what there was)


class Series(Record):
    """The run with all inputs at their middle, one figure an instant, (time,)."""

    t_h: FloatArray
    air_c: FloatArray
    humidity: FloatArray  # relative, 0..1, over ice below 0 °C
    lots: Mapping[str, LotSeries]
    packs: Mapping[str, PackSeries]
    carbon_dioxide_ppm: FloatArray | None  # in the box, by volume; None: no dry ice
    around_ppm: FloatArray | None  # in the room or cab around; None: no dry ice, or its volume is not told


class PackResult(Record):
    """What is left of a coolant at the end."""

    id: str
    left_kg: float
    frozen: float  # share of `left_kg`; of dry ice 1 while there is any
    spent_at_h: float | None  # all melted, or all gas; None: not within the run
    spent_clock: str | None
    spent_draws_h: FloatArray | None = None  # (draws,)


class CarbonDioxide(Record):
    """The most carbon dioxide that dry ice brings, ppm by volume."""

    box_ppm: float
    box_at_h: float
    around: str | None  # name of what is around, where its volume is told
    around_ppm: float | None
    around_at_h: float | None
    gas_kg: float  # turned into gas within the run


class Told(Record):
    """Something that happens, in words."""

    at_h: float
    clock: str
    text: str  # "power off", "main open for 10 min"


class LegResult(Record):
    """A leg or a stop of a trip."""

    kind: Literal["leg", "stop"]
    label: str
    from_h: float
    to_h: float
    worst_c: float | None  # nearest to its limit of all that is limited; None: nothing is
    margin_k: float | None  # from there to its limit; below 0: beyond
    worst_lot: str | None  # whose that is
    worst_where: str | None
    air_highest_c: float
    heading: float | None = None  # degrees, of travel


class Outage(Record):
    """A run of the timeline and its answers."""

    kind: Kind
    project: Project
    start_clock_h: float
    start_clock: str
    horizon_h: float  # how long the run looked ahead
    asked_h: float
    power_back_h: float | None  # may lie beyond the run; None: not told, or never cooled
    hold_h: float | None  # until the first limit is crossed; None: none within the run
    first: LimitResult | None
    limits: tuple[LimitResult, ...]
    reached_h: float | None  # pull-down: air at its temperature and every limit kept; recovery: all back; else None
    reached_clock: str | None
    draws: int  # 1 without spreads
    hold_draws_h: FloatArray | None  # (draws,)
    first_draws: IntArray | None  # (draws,) which of `limits` is crossed first; -1: none
    reached_draws_h: FloatArray | None  # (draws,)
    spread: Any  # filled in by whoever made the draws; else None
    heat_balance_error: float
    trace: Series
    packs: tuple[PackResult, ...]
    carbon_dioxide: CarbonDioxide | None
    events: tuple[Told, ...]
    inside: tuple[str, ...]  # what is in the box at the start, in words
    stopped: tuple[str, ...]  # what stops without power
    notes: tuple[str, ...]
    findings: tuple[Finding, ...]
    facts: Mapping[str, Number]  # further results by key with unit

    @property
    def deadline_h(self) -> float:
        """When limits no longer matter: power is back, or the asked time is over."""
        return self.asked_h if self.power_back_h is None else self.power_back_h

    @property
    def fails(self) -> bool:
        """Whether a limit is crossed before power is back or the asked time is over."""
        return self.hold_h is not None and self.hold_h < self.deadline_h


class Trip(Outage):
    """A trip: the same, with its legs and stops in order."""

    legs: tuple[LegResult, ...]
