"""From a scene to the engine's network: walls, bodies of goods, coolants, doors, the room air."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any, Final, Literal

import numpy as np

from coldbox.physics.number import FloatArray, Number
from coldbox.project.draw import numeric_paths
from coldbox.project.model import Lot, Project
from coldbox.record import Record
from coldbox.scene import Scene
from coldbox.scene import air as airs
from coldbox.timeline import bodies, packs, walls
from coldbox.timeline.course import Course, clock, middle
from coldbox.timeline.envelope import Envelope, envelope
from coldbox.timeline.stock import Unknown, fittings_part, lot_part, pack_part, sublimes
from coldbox.timeline.surroundings import faces_sky
from coldbox.timeline.types import Change, DoorPart, Doors, LotPart, Network, PackPart

DAY_S: Final = 86400.0
MOST_ROWS: Final = 40  # bodies beside those of the start; what comes later joins the last of its lot


class Factors(Record):
    """What is not a number of the project and may yet be unsure; each a figure or (draws, 1)."""

    enthalpy: Number = 1.0  # on all heat contents of goods
    films: Number = 1.0  # on the conductance of all films


class Body(Record):
    """A body of goods: some of a lot that came at one time."""

    lot: Lot
    label: str
    kind: Literal["stored", "intake", "coming"]
    row: int  # among the network's lots, as handed in
    mass: Number  # kg, at the start or when it comes
    start_c: Number  # at the start, or when it comes
    arrived_s: float | None  # intake: when; coming: when it comes


class Rig(Record):
    """A network with the names of its rows."""

    project: Project
    scene: Scene
    network: Network
    envelope: Envelope
    bodies: tuple[Body, ...]
    pack_rows: Mapping[str, int]
    dry_ice: tuple[str, ...]  # packs that sublime
    changes: tuple[Change, ...]
    assumed: tuple[str, ...]
    lot_parts: tuple[LotPart, ...]

    @property
    def draws(self) -> int:
        return self.network.draws


def draws_of(project: Project, factors: Factors) -> int:
    """How many draws the numbers of a project hold; 1 where none is an array. Raises ValueError where they differ."""
    sizes = {int(np.size(value)) for value in (*numeric_paths(project).values(), factors.enthalpy, factors.films)}
    sizes.discard(1)
    if len(sizes) > 1:
        raise ValueError(f"numbers with different counts of draws: {sorted(sizes)}")
    return sizes.pop() if sizes else 1


def rig(
    project: Project, scene: Scene, course: Course, *, draws: int, factors: Factors, start_c: Number,
    stock: Literal["usual", "warm"],
) -> Rig:  # fmt: skip
    """The network of a project for a course.

    scene: of the project as it stands at the start. start_c: of the room air. stock: "usual", with today's goods
    inside; "warm", only goods whose start temperature or arrival temperature is told, at that.
    """
    unknown = Unknown()
    made = envelope(scene, faces_sky(project, [setting for _, setting in course.settings]), factors.films)
    inside = _inside(project, course) if stock == "usual" else _warm(project)
    coming, changes = _comings(project, course, inside)
    all_bodies = [*inside, *coming]
    parts = [
        lot_part(
            body.lot,
            body.label,
            body.mass if body.kind != "coming" else 0.0 * np.asarray(body.mass),
            _whole(body.lot),
            body.start_c,
            unknown,
            enthalpy=factors.enthalpy,
            films=factors.films,
        )
        for body in all_bodies
    ]
    coolants = _coolants(scene, course, start_c, factors.films)
    dry_ice = tuple(pack.name for pack in project.packs if sublimes(pack))
    rows = {part.name: place for place, part in enumerate(coolants)}
    room = scene.room
    humid = room if start_c is room.temperature_c else _as_moist(scene, start_c)
    network = Network(
        draws=draws,
        walls=walls.stack([one.part for one in made.stretches], draws),
        lots=bodies.stack(parts, draws),
        packs=packs.stack(coolants, draws),
        doors=_doors(project, draws),
        volume=_each(scene.body.volume, draws),
        pressure=_each(scene.pressure, draws),
        start_c=_each(start_c, draws),
        start_humidity_ratio=_each(humid.humidity_ratio, draws),
    )
    return Rig(
        project=project,
        scene=scene,
        network=network,
        envelope=made,
        bodies=tuple(all_bodies),
        pack_rows=rows,
        dry_ice=dry_ice,
        changes=(*changes, *_pack_changes(project, course, rows, start_c)),
        assumed=tuple(unknown.said),
        lot_parts=tuple(parts),
    )


def _each(value: Number, draws: int) -> FloatArray:
    flat = np.ravel(np.asarray(value, dtype=np.float64))
    return np.array(np.broadcast_to(flat, (draws,)))


def _as_moist(scene: Scene, start_c: Number) -> Any:
    return airs.state(start_c, scene.room.relative_humidity, scene.pressure)


def _whole(lot: Lot) -> Number:
    """What the number of pieces belongs to: what is stored, else a day's intake."""
    return lot.stored if _some(lot.stored) else lot.arrives * DAY_S


def _some(mass: Number) -> bool:
    return bool(np.any(np.greater(mass, 0.0)))


def _inside(project: Project, course: Course) -> list[Body]:
    """What is in the box at the start: what is stored, and the last intake before the start."""
    room = project.box.temperature
    found: list[Body] = []
    for lot in project.lots:
        told = lot.start_temperature
        both = _some(lot.stored) and _some(lot.arrives)
        if _some(lot.stored):
            start = room if told is None else told
            found.append(_body(lot, lot.name, "stored", len(found), lot.stored, start, None))
        if _some(lot.arrives):
            arrived = 3600.0 * lot.arrival_time
            if arrived > course.start_s:
                arrived -= DAY_S
            warm = told if told is not None else lot.arrival_temperature
            assert warm is not None, "what arrives has a temperature"
            label = f"{lot.name}, today's" if both else lot.name
            found.append(_body(lot, label, "intake", len(found), lot.arrives * DAY_S, warm, arrived))
    return found


def _warm(project: Project) -> list[Body]:
    """For a pull-down: goods that are put in warm, as warm as they are told to be."""
    found: list[Body] = []
    for lot in project.lots:
        start = lot.start_temperature
        mass = lot.stored
        if _some(lot.arrives) and lot.arrival_temperature is not None:
            mass, start = lot.arrives * DAY_S, lot.arrival_temperature
        if start is not None and _some(mass):
            found.append(_body(lot, lot.name, "stored", len(found), mass, start, None))
    return found


def _body(
    lot: Lot, label: str, kind: Literal["stored", "intake", "coming"], row: int, mass: Number, start_c: Number,
    arrived_s: float | None,
) -> Body:  # fmt: skip
    return Body(lot=lot, label=label, kind=kind, row=row, mass=mass, start_c=start_c, arrived_s=arrived_s)


def _comings(project: Project, course: Course, inside: list[Body]) -> tuple[list[Body], list[Change]]:
    """Bodies that come later, and all that comes and goes of goods. What goes is taken from the oldest first."""
    lots = {lot.name: lot for lot in project.lots}
    found: list[Body] = []
    changes: list[Change] = []
    there: dict[str, list[tuple[int, Number]]] = {name: [] for name in lots}
    for body in inside:
        there[body.lot.name].append((body.row, body.mass))
    for one in sorted(course.happenings, key=lambda happening: happening.at_s):
        if one.what == "goods in":
            lot = lots[one.name]
            assert one.mass is not None, "what comes has a mass"
            warm = one.temperature_c
            if warm is None:
                warm = next(
                    at
                    for at in (lot.arrival_temperature, lot.start_temperature, project.box.temperature)
                    if at is not None
                )
            before = [body.row for body in found if body.lot.name == one.name]
            row = before[-1] if before and len(found) >= MOST_ROWS else len(inside) + len(found)
            if row == len(inside) + len(found):
                label = f"{lot.name}, in at {clock(one.at_s)}"
                found.append(_body(lot, label, "coming", row, one.mass, warm, one.at_s))
            there[one.name].append((row, one.mass))
            changes.append(Change(at_s=one.at_s, what="lot in", row=row, mass=one.mass, temperature_c=warm))
        elif one.what == "goods out":
            left: Number = np.inf if one.mass is None else one.mass
            kept: list[tuple[int, Number]] = []
            for row, mass in there[one.name]:
                taken = np.minimum(mass, left)
                if _some(taken):
                    changes.append(Change(at_s=one.at_s, what="lot out", row=row, mass=taken))
                left = left - taken
                kept.append((row, mass - taken))
            there[one.name] = kept
    return found, changes


def _pack_changes(project: Project, course: Course, rows: Mapping[str, int], room_c: Number) -> list[Change]:
    found: list[Change] = []
    by_name = {pack.name: pack for pack in project.packs}
    for one in course.happenings:
        if one.what not in ("pack in", "pack out"):
            continue
        pack = by_name[one.name]
        start = room_c if pack.start_temperature is None else pack.start_temperature
        found.append(
            Change(
                at_s=one.at_s,
                what="pack in" if one.what == "pack in" else "pack out",
                row=rows[one.name],
                mass=pack.mass * pack.count if one.what == "pack in" else np.inf,
                temperature_c=start,
                frozen=pack.frozen,
            )
        )
    return found


def _coolants(scene: Scene, course: Course, start_c: Number, films: Number) -> list[PackPart]:
    """Coolants and the fittings; what an event or a stop brings is not there before."""
    project, body = scene.project, scene.body
    later = {one.name for one in course.happenings if one.what == "pack in"}
    found = [
        pack_part(pack, start_c, body.inside_area, body.floor_area, there=pack.name not in later, films=films)
        for pack in project.packs
    ]
    if _some(project.box.fittings):
        found.append(fittings_part(project.box.fittings, start_c, films))
    return found


def _doors(project: Project, draws: int) -> Doors:
    """One row a door; equal ones share it, and their number is in the share that stands open."""
    parts = [DoorPart(name=door.name, width=door.width, height=door.height) for door in project.doors]
    return Doors(
        labels=tuple(part.name for part in parts),
        width=_stacked([part.width for part in parts], draws),
        height=_stacked([part.height for part in parts], draws),
    )


def _stacked(values: list[Number], draws: int) -> FloatArray:
    return np.array([_each(value, draws) for value in values]).reshape(len(values), draws)


def goods_kg(found: Rig) -> float:
    """Goods in the box at the start, with all inputs at their middle."""
    return sum(middle(body.mass) for body in found.bodies if body.kind != "coming")
