"""What happens over time, an outage or a trip, and how the answer is asked for."""

from __future__ import annotations

import math
import os
from collections.abc import Iterable, Mapping
from typing import Any

from coldbox.project.model import (
    Box,
    Delivery,
    Event,
    Fit,
    Leg,
    Machine,
    Money,
    Outage,
    Sizing,
    Spreads,
    Stop,
    Trip,
)
from coldbox.project.raw import Block
from coldbox.project.resolve.body import listed
from coldbox.project.resolve.inside import usual_run_hours
from coldbox.project.resolve.reader import Reader, Work, hint
from coldbox.project.resolve.surroundings import Behind

DAY_S = 86400.0
_WANTS = {
    "door open": ("door", "lasts"),
    "goods in": ("lot", "mass"),
    "goods out": ("lot",),
    "pack in": ("pack",),
    "pack out": ("pack",),
    "moved": (),
    "power on": (),
    "power off": (),
}
_MAY = {
    "goods in": ("temperature",),
    "goods out": ("mass",),
    "moved": ("neighbour", "heading", "shade"),
    "power on": ("lasts",),
    "power off": ("lasts",),
}


class Things:
    """The names that events and stops may mean, by key."""

    def __init__(self, **names: Iterable[str]) -> None:
        self.names = {key: tuple(values) for key, values in names.items()}

    def one(self, reader: Reader, key: str, what: str, *, only: bool = False) -> str | None:
        """The name typed, if there is such a thing; with `only`, the only one there is when none was typed."""
        there = self.names[what]
        name = reader.given(key)
        if isinstance(name, str):
            if name not in there:
                known = f" There are: {', '.join(there)}." if there else f" The file has no {what} at all."
                reader.problem(key, f'There is no "{name}" among the {what}.{hint(name, there) or known}')
            return name
        if only and len(there) == 1:
            return str(reader.fall(key, there[0], there[0], "the only one"))
        if only:
            reader.missing(key, f"Write which of the {what} it is." if there else f"The file has no {what}.")
        return None


def outage(work: Work, block: Block | None, things: Things, behind: Behind) -> Outage:
    """The outage asked about; without one in the file, the usual question."""
    reader = Reader(work, "outage", "outage", block)
    asked = reader.value("asked")
    if reader.has("horizon") or not asked > reader.quiet("horizon"):
        horizon = reader.value("horizon")
        if asked > horizon:
            reader.problem(
                "asked",
                f"It asks for {asked / 3600:g} h but looks only {horizon / 3600:g} h ahead: write a longer horizon.",
            )
    else:
        horizon = reader.fall("horizon", asked, f"{asked / 3600:g} h", "as long as asked")
    return Outage(
        at=reader.value("at"),
        lasts=reader.given("lasts"),
        asked=asked,
        horizon=horizon,
        going_on=listed(reader.given("going_on")),
        dry_bulb=reader.given("dry_bulb"),
        events=tuple(_event(event, things, behind) for event in reader.children("events", "outage.events")),
    )


def _event(reader: Reader, things: Things, behind: Behind) -> Event:
    what = reader.given("what")
    wants = _WANTS.get(what, ())
    may = (*wants, *_MAY.get(what, ()))
    keys = ("door", "lot", "pack", "mass", "temperature", "neighbour", "heading", "shade", "lasts")
    found: dict[str, Any] = dict.fromkeys(keys)
    for key in keys:
        if key not in may:
            if reader.has(key) and what in _WANTS:
                reader.problem(key, f'"{what}" has no use for {key}: take it away.')
        elif key in ("door", "lot", "pack"):
            found[key] = things.one(reader, key, f"{key}s", only=True)
        elif key in wants:
            found[key] = reader.need(key, _SUCH[key])
        else:
            found[key] = reader.given(key)
    if what == "moved" and all(found[key] is None for key in ("neighbour", "heading", "shade")):
        reader.missing("neighbour", "Write where the box is moved to: a neighbour, or a new heading or shade.")
    if found["neighbour"] is not None:
        found["neighbour"] = behind.check(reader, found["neighbour"])
    entered = reader.typed.get("at")
    at = reader.given("at")
    after = entered is not None and entered.kind == "duration"
    at = 0.0 if at is None else at / 3600.0 if after else at
    return Event(at=at, after=after, what=what or "", **found)


_SUCH = {
    "lasts": 'Write how long the door stays open, such as "10 min".',
    "mass": 'Write how much comes in, such as "200 kg".',
}


def trip(work: Work, block: Block | None, things: Things, stored: Mapping[str, float]) -> Trip | None:
    """The trip, leg by leg. `stored` is how much there is of each lot, kg."""
    if block is None:
        return None
    reader = Reader(work, "trip", "trip", block)
    readers = reader.children("legs", "trip.legs")
    legs = tuple(_leg(one, _title(one, f"leg {number}")) for number, one in enumerate(readers, 1))
    if not legs and not work.said_about("trip.legs"):
        reader.missing("legs", 'Write what is driven: legs = [{ lasts = "50 min" }].')
    known = Things(legs=[leg.name for leg in legs], **things.names)
    stops = []
    for number, one in enumerate(reader.children("stops", "trip.stops"), 1):
        after = known.one(one, "after", "legs")
        if after is None and number > len(legs) and legs:
            one.missing(
                "after", f"Stop {number} follows leg {number}, and there are {len(legs)} legs: write after which."
            )
        stops.append(_stop(one, _title(one, f"stop {number}"), after, known))
    left = dict(stored)
    for one, stop in zip(reader.children("stops", "trip.stops"), stops, strict=True):
        for part in stop.deliver:
            left[part.lot] = left.get(part.lot, math.inf) - float(part.mass)
            if left[part.lot] < -1e-9 * max(1.0, stored.get(part.lot, 0.0)):
                one.problem("deliver", f"More {part.lot} leaves than there is: {stored[part.lot]:g} kg are stored.")
                left[part.lot] = math.inf
    return Trip(starts=reader.value("starts"), dry_bulb=reader.given("dry_bulb"), legs=legs, stops=tuple(stops))


def _title(reader: Reader, otherwise: str) -> str:
    block = reader.block
    return otherwise if block is None or block.name == block.path or not block.name else block.name


def _leg(reader: Reader, name: str) -> Leg:
    return Leg(
        name=name,
        lasts=reader.need("lasts", 'Write how long it is driven, such as "50 min".'),
        heading=reader.fall("heading", None, "the worst", "not given"),
        speed=reader.value("speed"),
        dry_bulb=reader.given("dry_bulb"),
        shade=reader.value("shade"),
        power=reader.value("power"),
    )


def _stop(reader: Reader, name: str, after: str | None, known: Things) -> Stop:
    lasts = reader.need("lasts", 'Write how long it stands, such as "15 min".')
    door = known.one(reader, "open", "doors")
    open_for = (reader.value if door else reader.quiet)("open_for")
    if reader.has("open_for") and not reader.has("open"):
        reader.missing("open", 'open_for says how long a door stands open: write which, such as open = "rear".')
    if open_for > lasts:
        reader.problem("open_for", f"A stop of {lasts / 60:g} min cannot have its door open for {open_for / 60:g} min.")
    deliver = []
    for part in reader.children("deliver", "trip.stops.deliver"):
        lot, mass = known.one(part, "lot", "lots"), part.given("mass")
        if lot is not None and mass is not None:
            deliver.append(Delivery(lot=lot, mass=mass))
    return Stop(
        name=name,
        after=after,
        lasts=lasts,
        open=door,
        open_for=open_for,
        deliver=tuple(deliver),
        pack=known.one(reader, "pack", "packs"),
        heading=reader.given("heading"),
        shade=reader.value("shade"),
        power=reader.value("power"),
    )


def sizing(work: Work, block: Block | None, box: Box, machine: Machine) -> Sizing:
    """Running hours by room and defrost, and the safety."""
    reader = Reader(work, "sizing", "sizing", block)
    hours, why = usual_run_hours(machine.defrost, float(box.temperature))
    atp = any(rule.startswith("atp-") for rule in box.rules)
    return Sizing(
        run_hours=reader.fall("run_hours", hours * 3600.0, f"{hours:g} h", why),
        safety=reader.value("safety"),
        tested_with_unit=(reader.value if atp else reader.quiet)("tested_with_unit"),
    )


def money(work: Work, block: Block | None) -> Money:
    """Prices, all in one currency."""
    reader = Reader(work, "money", "money", block)
    takes = reader.quiet if block is None else reader.value
    seen: dict[str, str] = {}
    for key, entered in reader.typed.items():
        if entered.currency:
            seen.setdefault(entered.currency, key)
    if len(seen) > 1:
        first, second = list(seen)[:2]
        reader.problem(seen[second], f"This is in {second} and {seen[first]} in {first}: write both in one currency.")
    return Money(
        currency=next(iter(seen), None),
        tariff=reader.given("tariff"),
        insulation_cost=reader.given("insulation_cost"),
        years=takes("years"),
        interest=takes("interest"),
    )


def spreads(work: Work, block: Block | None) -> Spreads:
    reader = Reader(work, "spreads", "spreads", block)
    return Spreads(**{key: reader.value(key) for key in Spreads.names()})


def fit(work: Work, block: Block | None) -> Fit | None:
    if block is None:
        return None
    reader = Reader(work, "fit", "fit", block)
    return Fit(
        on=reader.value("on"),
        file=os.fspath(reader.given("file") or ""),
        date=reader.given("date") or "",
        hash=reader.given("hash") or "",
        conductance=reader.given("conductance"),
        leakage=reader.given("leakage"),
        heat_capacity=reader.given("heat_capacity"),
    )
