"""A trip: its legs and stops on the same timeline, each with who comes nearest to a limit."""

from __future__ import annotations

from coldbox.project.model import Project
from coldbox.record import Record
from coldbox.timeline import legs, runs
from coldbox.timeline.legs import Part
from coldbox.timeline.network import Factors
from coldbox.timeline.outage import answers
from coldbox.timeline.outcome import HOUR_S, Outcome
from coldbox.timeline.results import LegResult, LimitResult, Series, Trip


def trip(
    project: Project, *, factors: Factors | None = None, go_on: runs.GoOn | None = None, series: bool = True
) -> Trip:
    """A trip from its departure to the end of its last leg or stop; arguments as for an outage.

    Raises BadProject where the project has no trip.
    """
    course, parts = legs.trip_course(project)
    run = runs.run(project, course, factors=factors, series=series, go_on=go_on)
    found = Outcome(run, series=series)
    given = answers(found, "trip")
    given["asked_h"] = given["horizon_h"]
    return Trip(**given, legs=tuple(_leg(part, found.start_s, given["trace"], given["limits"]) for part in parts))


class _Nearest(Record):
    """What comes nearest to its limit during a leg."""

    margin_k: float
    worst_c: float
    limit: LimitResult


def _leg(part: Part, start_s: float, through: Series, limits: tuple[LimitResult, ...]) -> LegResult:
    from_h, to_h = (part.from_s - start_s) / HOUR_S, (part.to_s - start_s) / HOUR_S
    during = (through.t_h >= from_h - 1e-9) & (through.t_h <= to_h + 1e-9)
    nearest: _Nearest | None = None
    for limit in limits if during.any() else ():
        if limit.lot == "box" or limit.where == "air":
            values = through.air_c[during]
        else:
            lot = through.lots[limit.lot]
            values = {"surface": lot.surface_c, "mean": lot.mean_c, "core": lot.core_c}[limit.where][during]
            values = values[lot.there[during]]
        if not len(values):
            continue
        worst = float(values.max() if limit.side == "above" else values.min())
        margin = limit.limit_c - worst if limit.side == "above" else worst - limit.limit_c
        if nearest is None or margin < nearest.margin_k:
            nearest = _Nearest(margin_k=margin, worst_c=worst, limit=limit)
    return LegResult(
        kind=part.kind,
        label=part.label,
        from_h=from_h,
        to_h=to_h,
        worst_c=None if nearest is None else nearest.worst_c,
        margin_k=None if nearest is None else nearest.margin_k,
        worst_lot=None if nearest is None else nearest.limit.lot,
        worst_where=None if nearest is None else nearest.limit.where,
        air_highest_c=float(through.air_c[during].max()) if during.any() else 0.0,
        heading=part.heading,
    )
