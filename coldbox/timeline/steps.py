"""Where the steps of a run end: on every event, whole hour and instant asked for; short after whatever jumps."""

from __future__ import annotations

import math
from typing import Final

from coldbox.errors import OutOfValidity
from coldbox.timeline.types import Plan

HOUR_S: Final = 3600.0
# After a jump a step is at most this share of the longest step, until so many longest steps have passed.
RAMP: Final = ((1.0 / 16.0, 1.0), (1.0 / 8.0, 3.0), (1.0 / 4.0, 6.0), (1.0 / 2.0, 12.0))
TOUCHING_S: Final = 1e-6  # instants nearer than this are one


def ends(plan: Plan) -> list[float]:
    """Ends of all steps of a plan, rising, the last its end; none for a plan that ends where it starts.

    Raises OutOfValidity for a step that is not above 0 or an end before the start.
    """
    start, end = plan.start_s, plan.end_s
    if not plan.step_s > 0.0:
        raise OutOfValidity("the step", plan.step_s, 0.0, math.inf, "s", "The timeline")
    if not (math.isfinite(start) and start <= end < math.inf):
        raise OutOfValidity("the end less the start", end - start, 0.0, math.inf, "s", "The timeline")
    sharp = {start, *plan.marks, *(change.at_s for change in plan.changes)}
    hours = (HOUR_S * i for i in range(math.floor(start / HOUR_S) + 1, math.ceil(end / HOUR_S)))
    stops: list[tuple[float, bool]] = []
    for instant, jumps in sorted(
        {*((at, True) for at in sharp), *((at, False) for at in (*hours, *plan.times_s, end))}
    ):
        if not start + TOUCHING_S < instant <= end:
            continue
        if stops and instant - stops[-1][0] < TOUCHING_S:
            stops[-1] = (stops[-1][0], stops[-1][1] or jumps)
        else:
            stops.append((instant, jumps))
    return _cut(start, stops, plan.step_s)


def _cut(start: float, stops: list[tuple[float, bool]], longest: float) -> list[float]:
    found: list[float] = []
    now, jumped = start, start
    for stop, jumps in stops:
        while now < stop:
            wanted = longest * next((share for share, until in RAMP if now - jumped < until * longest - 1e-9), 1.0)
            left = stop - now
            # Few different lengths: whole wanted steps, the rest of the way in equal ones.
            now = now + wanted if left >= 2.0 * wanted else _equal(found, now, stop, wanted)
            found.append(now)
        if jumps:
            jumped = stop
    return found


def _equal(found: list[float], now: float, stop: float, wanted: float) -> float:
    """All but the last of the equal steps up to `stop`; gives `stop`."""
    count = math.ceil((stop - now) / wanted - 1e-9)
    found.extend(now + (stop - now) * i / count for i in range(1, count))
    return stop
