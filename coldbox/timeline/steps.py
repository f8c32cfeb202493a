"""Where the steps of a run end: on every event, whole hour and instant asked for; short while things change fast.

A step of the implicit scheme errs by half of what the rates change in it. What is watched in the first draw, the
middle of all, tells how long the next step may be; all draws take it, so a draw's figures do not depend on the others.
"""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence
from typing import Final

import numpy as np

from coldbox.errors import OutOfValidity
from coldbox.physics.number import FloatArray
from coldbox.timeline.types import Plan, Signal

HOUR_S: Final = 3600.0
HALVINGS: Final = 4  # the shortest step is this often half of the longest; the first after a jump is so short
RATE_ERROR: Final = 0.001  # of the rate with which something lately changed
RATE_SLIGHT: Final = 0.001 / HOUR_S  # K/s, an error of the rate that never matters
SLIGHT_K: Final = 0.0003  # an error of one step that never matters
AIR_SLIGHT_K: Final = 0.001  # of the air, which feels what is taken from the start of a step
FORGETS_S: Final = 2.0 * HOUR_S  # how long a fast change counts as lately
TOUCHING_S: Final = 1e-6  # instants nearer than this are one


class Pace:
    """Steps of a plan, one after the other; `paced` are the signals whose figures it will be told.

    Raises OutOfValidity for a step that is not above 0 or an end before the start.
    """

    def __init__(self, plan: Plan, paced: Sequence[Signal] = ()) -> None:
        start, end = plan.start_s, plan.end_s
        if not plan.step_s > 0.0:
            raise OutOfValidity("the step", plan.step_s, 0.0, math.inf, "s", "The timeline")
        if not (math.isfinite(start) and start <= end < math.inf):
            raise OutOfValidity("the end less the start", end - start, 0.0, math.inf, "s", "The timeline")
        self._start, self._now, self._end = start, start, end
        self._stops = list(_stops(plan))
        self._lengths = [plan.step_s / 2**i for i in range(HALVINGS + 1)]
        self._slight = np.array([AIR_SLIGHT_K if one.what == "air" else SLIGHT_K for one in paced])
        self._restart()

    def _restart(self) -> None:
        self._level = HALVINGS
        self._held = 0  # steps at this level
        self._step, self._alike = 0.0, 0
        self._before: FloatArray | None = None  # watched figures when the last step ended
        self._rates: FloatArray | None = None
        self._lately: FloatArray | None = None

    @property
    def share(self) -> float:
        """How much of the plan's time is done, 0..1."""
        return (self._now - self._start) / (self._end - self._start) if self._end > self._start else 1.0

    def next(self) -> float | None:
        """The end of the next step, s; None: the plan is done."""
        if not self._stops:
            return None
        wanted = self._lengths[self._level]
        stop, left = self._stops[0][0], self._stops[0][0] - self._now
        # Few different lengths: whole wanted steps, the rest of the way in equal ones.
        count = 2.0 if left >= 2.0 * wanted else math.ceil(left / wanted - 1e-9)
        return stop if count <= 1 else self._now + (wanted if left >= 2.0 * wanted else left / count)

    def took(self, end_s: float, figures: FloatArray) -> None:
        """Tells that a step ended here with these watched figures (figure,) of the first draw."""
        step, self._now = end_s - self._now, end_s
        self._weigh(step, figures)
        if self._stops and end_s >= self._stops[0][0] - TOUCHING_S and self._stops.pop(0)[1]:
            self._restart()

    def begin(self, figures: FloatArray) -> None:
        """Tells the watched figures at the start, and after something came or went."""
        self._before = figures

    def _weigh(self, step: float, figures: FloatArray) -> None:
        before, rates, lately = self._before, self._rates, self._lately
        self._before = figures
        if before is None or not len(figures):
            self._wish(self._level - 1)
            return
        self._rates = now = (figures - before) / step
        size = np.abs(now)
        self._lately = size if lately is None else np.maximum(size, lately * math.exp(-step / FORGETS_S))
        # After a step of another length what follows at once, the air, lags by another bit: that is no change of rate.
        self._alike = self._alike + 1 if math.isclose(step, self._step, rel_tol=1e-6) else 0
        self._step = step
        if rates is None or self._alike < 2:
            return
        allowed = RATE_ERROR * self._lately + np.maximum(RATE_SLIGHT, self._slight / step)
        much = float(np.max(0.5 * np.abs(now - rates) / allowed))
        self._wish(self._level + math.ceil(math.log2(max(much, 1e-3)) - 1e-9))

    def _wish(self, level: int) -> None:
        """Shorter at once, longer by one level after two steps that would have allowed it."""
        if level >= self._level:
            self._level, self._held = min(level, HALVINGS), 0
            return
        self._held += 1
        if self._held >= 2:
            self._level, self._held = max(self._level - 1, 0), 0


def _stops(plan: Plan) -> Iterator[tuple[float, bool]]:
    """Instants on which a step must end, and whether something jumps there, by time."""
    start, end = plan.start_s, plan.end_s
    sharp = {*plan.marks, *(change.at_s for change in plan.changes)}
    hours = (HOUR_S * i for i in range(math.floor(start / HOUR_S) + 1, math.ceil(end / HOUR_S)))
    found: list[tuple[float, bool]] = []
    for instant, jumps in sorted(
        {*((at, True) for at in sharp), *((at, False) for at in (*hours, *plan.times_s, end))}
    ):
        if not start + TOUCHING_S < instant <= end:
            continue
        if found and instant - found[-1][0] < TOUCHING_S:
            found[-1] = (found[-1][0], found[-1][1] or jumps)
        else:
            found.append((instant, jumps))
    return iter(found)
