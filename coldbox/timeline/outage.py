"""An outage, a pull-down and a recovery: the same run with other power, asked other things."""

from __future__ import annotations

from typing import Any, Final

import numpy as np

from coldbox.errors import BadProject, Problem
from coldbox.physics.number import FloatArray
from coldbox.project.model import Project
from coldbox.timeline import events, runs
from coldbox.timeline.course import Course, middle
from coldbox.timeline.findings import findings
from coldbox.timeline.network import Factors, goods_kg
from coldbox.timeline.outcome import HOUR_S, Outcome, first_of
from coldbox.timeline.results import Kind, Outage
from coldbox.units import show

KWH: Final = 3.6e6


def outage(
    project: Project, *, factors: Factors | None = None, go_on: runs.GoOn | None = None, series: bool = True
) -> Outage:
    """How long a box holds without power, and who fails first.

    project: with or without draws in its numbers, the middle first. factors: what is no number of it. go_on: told the
    share done; False stops. series: whether to keep the middle's figures through time. Raises BadProject,
    OutOfValidity, Stopped.
    """
    planned = course(project)
    run = runs.run(project, planned, factors=factors, series=series, go_on=go_on)
    return Outage(**answers(Outcome(run, series=series), "outage"))


def recovery(
    project: Project, *, factors: Factors | None = None, go_on: runs.GoOn | None = None, series: bool = True
) -> Outage:
    """When the last lot is back within its limits after the outage. Arguments as for `outage`."""
    planned = course(project)
    back_s = events.power_back_s(planned)
    if back_s is None:
        text = 'A recovery needs the hour at which power is back: write how long the outage lasts, such as "12 h".'
        raise BadProject([Problem(text, file=project.file, path="outage.lasts")])
    horizon_s = planned.end_s - planned.start_s
    if back_s >= horizon_s:
        text = (
            f"Power is back after {show(back_s, 'duration')}, but it looks only {show(horizon_s, 'duration')} ahead:"
            " write a longer horizon."
        )
        raise BadProject([Problem(text, file=project.file, path="outage.horizon")])
    run = runs.run(project, planned, factors=factors, series=series, go_on=go_on)
    found = Outcome(run, series=series)
    given = answers(found, "recovery", back=True)
    back = _last(found, given)
    # Without limits, or with none of them broken, it is back when the power is.
    reached = np.maximum(back, given["power_back_h"])
    return Outage(**{**given, **_reached(found, reached)})


def pulldown(
    project: Project, *, factors: Factors | None = None, go_on: runs.GoOn | None = None, series: bool = True
) -> Outage:
    """When a box that starts warm is cold, with everything in it within its limits. Arguments as for `outage`.

    It starts as warm as what surrounds it, with the goods that are put in warm; its air is cold once within half the
    thermostat's band of its temperature.
    """
    if not project.box.powered:
        text = "Nothing cools this box: a pull-down needs a machine. Write powered = true."
        raise BadProject([Problem(text, file=project.file, path="box.powered")])
    powered = events.powered_course(project, middle(project.outage.horizon))
    run = runs.run(
        project, powered, factors=factors, warm=True, back_at_k=project.machine.band / 2.0, series=series, go_on=go_on,
    )  # fmt: skip
    found = Outcome(run, series=series)
    given = answers(found, "pulldown", back=True)
    assert run.reached is not None, "a pull-down watches the air"
    cold = found.hours(run.trace.crossed_s[run.reached])
    reached = np.maximum(cold, _last(found, given))
    given = {**given, "hold_h": None, "first": None, "hold_draws_h": None, "first_draws": None}
    return Outage(**{**given, **_reached(found, reached)})


def answers(found: Outcome, kind: Kind, *, back: bool = False) -> dict[str, Any]:
    """What every kind of run is asked, by the names of Outage."""
    run, trace = found.run, found.trace
    limits = found.limits(back=back)
    crossed = [one.crossed_draws_h for one in limits if one.crossed_draws_h is not None]
    hold = np.min(crossed, axis=0) if crossed else np.full(found.draws, np.inf)
    first = np.where(np.isfinite(hold), np.argmin(crossed, axis=0) if crossed else -1, -1)
    hold_h = first_of(hold)
    power_back = events.power_back_s(run.course)
    return {
        "kind": kind,
        "project": run.project,
        "start_clock_h": found.start_s / HOUR_S,
        "start_clock": found.clock(0.0),
        "horizon_h": (run.course.end_s - found.start_s) / HOUR_S,
        "asked_h": middle(run.project.outage.asked) / HOUR_S,
        "power_back_h": None if power_back is None else power_back / HOUR_S,
        "hold_h": hold_h,
        "first": None if hold_h is None else limits[int(first[0])],
        "limits": limits,
        "reached_h": None,
        "reached_clock": None,
        "draws": found.draws,
        "hold_draws_h": hold,
        "first_draws": first,
        "reached_draws_h": None,
        "spread": None,
        "heat_balance_error": trace.heat_balance_error,
        "trace": found.through_time(),
        "packs": found.packs(),
        "carbon_dioxide": found.carbon_dioxide(),
        "events": run.course.told,
        "inside": found.inside(),
        "stopped": found.stopped() if kind == "outage" else (),
        "notes": found.notes(),
        "findings": findings(found),
        "facts": {
            "goods_kg": goods_kg(run.rig),
            "heat_in_kwh": float(trace.heat_in[0]) / KWH,
            "machine_kwh": float(trace.machine_j[0]) / KWH,
            "frost_kg": float(trace.state.frost[0]),
            "steps": trace.steps,
        },
    }


def course(project: Project) -> Course:
    """What happens in a project's outage."""
    planned = project.outage
    lasts = None if planned.lasts is None else middle(planned.lasts)
    return events.outage_course(project, lasts_s=lasts, horizon_s=middle(planned.horizon))


def _last(found: Outcome, given: dict[str, Any]) -> FloatArray:
    """Hours at which the last limit is last back within, (draw,); 0 where none is ever broken."""
    back = [one.back_draws_h for one in given["limits"]]
    return np.max(back, axis=0) if back else np.zeros(found.draws)


def _reached(found: Outcome, reached: FloatArray) -> dict[str, Any]:
    at = first_of(reached)
    return {"reached_h": at, "reached_clock": found.clock(at), "reached_draws_h": reached}
