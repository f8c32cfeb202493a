"""A trip as a course: legs and stops in order, with what is delivered at each stop."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Literal

from coldbox.errors import BadProject, Problem
from coldbox.project.model import Leg, Project, Stop, Trip
from coldbox.record import Record
from coldbox.timeline.course import Course, Happening, Opening, middle, told
from coldbox.timeline.results import Told
from coldbox.timeline.surroundings import Setting
from coldbox.units import show


class Part(Record):
    """A leg or a stop with its hours."""

    kind: Literal["leg", "stop"]
    label: str
    from_s: float
    to_s: float
    heading: float | None  # degrees of travel, or as it stands; None: the worst


def trip_of(project: Project) -> Trip:
    """The trip of a project. Raises BadProject where it has none."""
    if project.trip is None or not project.trip.legs:
        text = 'No trip in this file. Write [trip] with legs = [{ lasts = "50 min" }].'
        raise BadProject([Problem(text, file=project.file, path="trip")])
    return project.trip


def trip_course(project: Project) -> tuple[Course, tuple[Part, ...]]:
    """The course of a trip, and its parts. The front of a truck looks back along its way.

    At a stop the door opens at once; what is delivered leaves and what is put in comes when it shuts. A stop without
    a heading stands as the vehicle drove, and in the same outdoor air.
    """
    trip = trip_of(project)
    at = start = 3600.0 * trip.starts
    parts: list[Part] = []
    settings: list[tuple[float, Setting]] = []
    power: list[tuple[float, bool]] = []
    openings: list[Opening] = []
    happenings: list[Happening] = []
    said: list[Told] = []
    leg = trip.legs[0]
    for number, one in enumerate(_in_order(trip), 1):
        end = at + middle(one.lasts)
        if isinstance(one, Leg):
            leg = one
            kind: Literal["leg", "stop"] = "leg"
            setting = _driving(trip, one, at, end)
            said.append(told(at, start, f"leaves, {one.name}"))
        else:
            kind, setting = "stop", _standing(trip, leg, one, settings[-1][1], at, end)
            said.append(told(at, start, f"stands, {one.name}"))
            shuts = at + middle(one.open_for)
            if one.open is not None and shuts > at:
                openings.append(Opening(door=one.open, from_s=at, to_s=shuts))
                said.append(told(at, start, f"{one.open} open for {show(shuts - at, 'duration')}"))
            for part in one.deliver:
                happenings.append(Happening(at_s=shuts, what="goods out", name=part.lot, mass=part.mass))
                said.append(told(shuts, start, f"{part.lot} {show(middle(part.mass), 'mass')} out"))
            if one.pack is not None:
                happenings.append(Happening(at_s=shuts, what="pack in", name=one.pack))
                said.append(told(shuts, start, f"{one.pack} in"))
        heading = None if setting.bearing is None else (setting.bearing + 180.0) % 360.0
        parts.append(Part(kind=kind, label=one.name or f"{kind} {number}", from_s=at, to_s=end, heading=heading))
        settings.append((at, setting))
        power.append((at, bool(one.power) and project.box.powered))
        at = end
    course = Course(
        start_s=start,
        end_s=at,
        settings=tuple(settings),
        power=tuple(power),
        openings=tuple(openings),
        happenings=tuple(happenings),
        told=tuple(said),
        going_on=(),
        daily_life=False,
    )
    return course, tuple(parts)


def _in_order(trip: Trip) -> Iterator[Leg | Stop]:
    """Each leg, then the stops that follow it: those that name it, and the one of its number."""
    for place, leg in enumerate(trip.legs):
        yield leg
        for number, stop in enumerate(trip.stops):
            if stop.after == leg.name or (stop.after is None and number == place):
                yield stop


def _driving(trip: Trip, leg: Leg, from_s: float, to_s: float) -> Setting:
    return Setting(
        bearing=None if leg.heading is None else (middle(leg.heading) + 180.0) % 360.0,
        worst_h=(from_s / 3600.0, to_s / 3600.0),
        shade=middle(leg.shade),
        speed=middle(leg.speed),
        dry_bulb=leg.dry_bulb if leg.dry_bulb is not None else trip.dry_bulb,
    )


def _standing(trip: Trip, leg: Leg, stop: Stop, before: Setting, from_s: float, to_s: float) -> Setting:
    bearing = before.bearing
    if stop.heading is not None:
        bearing = (middle(stop.heading) + 180.0) % 360.0
    return Setting(
        bearing=bearing,
        worst_h=(from_s / 3600.0, to_s / 3600.0),
        shade=middle(stop.shade),
        speed=0.0,
        dry_bulb=leg.dry_bulb if leg.dry_bulb is not None else trip.dry_bulb,
    )
