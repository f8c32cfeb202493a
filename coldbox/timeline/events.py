"""An outage's events as a course: clock times or hours after the power goes, told in words."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Final, Literal

import numpy as np

from coldbox.project.model import Event, Project
from coldbox.timeline.course import Course, Happening, Opening, clock, middle, told
from coldbox.timeline.results import Told
from coldbox.timeline.surroundings import Setting
from coldbox.units import show

DAY_S: Final = 86400.0


def outage_course(project: Project, *, lasts_s: float | None, horizon_s: float) -> Course:
    """The course of an outage that begins at its hour. lasts_s: when power is back; None: not by itself."""
    outage = project.outage
    start = 3600.0 * outage.at
    end = start + horizon_s
    first = Setting(dry_bulb=outage.dry_bulb)
    settings: list[tuple[float, Setting]] = [(start, first)]
    switches: list[tuple[float, bool]] = []
    openings: list[Opening] = []
    happenings: list[Happening] = []
    said: list[tuple[float, str]] = []
    powered = project.box.powered
    if powered:
        said.append((start, "power off"))
        if lasts_s is not None:
            switches.append((start + lasts_s, True))
            said.append((start + lasts_s, "power back"))
    for event in sorted(outage.events, key=lambda one: _instant(one, start)):
        at = _instant(event, start)
        if at > end:
            continue
        lasts = None if event.lasts is None else middle(event.lasts)
        said.append((at, _words(event, lasts)))
        if event.what == "door open":
            assert event.door is not None and lasts is not None, "a door that opens has a name and a time"
            openings.append(Opening(door=event.door, from_s=at, to_s=at + lasts))
        elif event.what in ("power on", "power off"):
            on = event.what == "power on"
            switches.append((at, on))
            if lasts is not None:
                switches.append((at + lasts, not on))
                said.append((at + lasts, "power off" if on else "power back"))
        elif event.what == "moved":
            settings.append((at, _moved(settings[-1][1], event)))
        else:
            happenings.append(_happening(event, at))
    if "deliveries" in outage.going_on:
        for delivery in _deliveries(project, start, end):
            happenings.append(delivery)
            said.append((delivery.at_s, f"{delivery.name} comes in"))
    return Course(
        start_s=start,
        end_s=end,
        settings=tuple(settings),
        power=_power(start, switches) if powered else ((start, False),),
        openings=tuple(openings),
        happenings=tuple(sorted(happenings, key=lambda one: one.at_s)),
        told=_told(said, start, end),
        going_on=outage.going_on,
        daily_life=True,
    )


def powered_course(project: Project, horizon_s: float) -> Course:
    """The course of a pull-down: power from the start, nothing else happening."""
    start = 3600.0 * project.outage.at
    return Course(
        start_s=start,
        end_s=start + horizon_s,
        settings=((start, Setting(dry_bulb=project.outage.dry_bulb)),),
        power=((start, True),),
        openings=(),
        happenings=(),
        told=(told(start, start, "power on"),),
        going_on=(),
        daily_life=True,
    )


def power_back_s(course: Course) -> float | None:
    """When power is back for good, seconds after the start; None: not within the run, or never gone."""
    back: float | None = None
    for at, on in course.power[1:]:
        back = (at - course.start_s if back is None else back) if on else None
    return back


def _instant(event: Event, start_s: float) -> float:
    """Seconds on the course's clock. A clock time before the start is that of the next day."""
    if event.after:
        return start_s + 3600.0 * event.at
    at = 3600.0 * event.at
    return at if at >= start_s else at + DAY_S


def _power(start_s: float, switches: list[tuple[float, bool]]) -> tuple[tuple[float, bool], ...]:
    """Switches in order; of two at one instant the later written wins."""
    found: dict[float, bool] = {start_s: False}
    for at, on in sorted(switches, key=lambda one: one[0]):
        found[at] = on
    return tuple(found.items())


def _moved(before: Setting, event: Event) -> Setting:
    return before.replace(
        neighbour=before.neighbour if event.neighbour is None else event.neighbour,
        bearing=before.bearing if event.heading is None else middle(event.heading),
        shade=before.shade if event.shade is None else middle(event.shade),
    )


def _happening(event: Event, at_s: float) -> Happening:
    kinds: dict[str, Literal["goods in", "goods out", "pack in", "pack out"]] = {
        "goods in": "goods in", "goods out": "goods out", "pack in": "pack in", "pack out": "pack out",
    }  # fmt: skip
    name = event.lot if event.what.startswith("goods") else event.pack
    assert name is not None, "what comes and goes has a name"
    return Happening(at_s=at_s, what=kinds[event.what], name=name, mass=event.mass, temperature_c=event.temperature)


def _deliveries(project: Project, start_s: float, end_s: float) -> Iterator[Happening]:
    """What arrives each day while deliveries go on."""
    for lot in project.lots:
        if not np.any(np.greater(lot.arrives, 0.0)):
            continue
        at = 3600.0 * lot.arrival_time
        while at <= end_s:
            if at > start_s:
                yield Happening(
                    at_s=at,
                    what="goods in",
                    name=lot.name,
                    mass=lot.arrives * DAY_S,
                    temperature_c=lot.arrival_temperature,
                )
            at += DAY_S


def _words(event: Event, lasts: float | None) -> str:
    how_long = "" if lasts is None else f" for {show(lasts, 'duration')}"
    mass = "" if event.mass is None else f" {show(middle(event.mass), 'mass')}"
    if event.what == "door open":
        return f"{event.door} open{how_long}"
    if event.what == "moved":
        where = [] if event.neighbour is None else [f"to {event.neighbour}"]
        if event.heading is not None:
            where.append(f"facing {show(middle(event.heading), 'angle')}")
        if event.shade is not None:
            where.append(f"shade {show(middle(event.shade), 'share')}")
        return f"moved {', '.join(where)}"
    if event.what.startswith("power"):
        return f"{event.what}{how_long}"
    name = event.lot or event.pack or ""
    return f"{name}{mass} {'in' if event.what.endswith('in') else 'out'}"


def _told(said: list[tuple[float, str]], start_s: float, end_s: float) -> tuple[Told, ...]:
    return tuple(told(at, start_s, text) for at, text in sorted(said, key=lambda one: one[0]) if at <= end_s)


def clock_of(start_s: float, hours: float) -> str:
    """The wall clock so many hours after the start."""
    return clock(start_s + 3600.0 * hours)
