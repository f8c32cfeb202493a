"""How long doors stand open, where leaking air comes from, and the table of air changes."""

from __future__ import annotations

import numpy as np

from coldbox.errors import OutOfValidity
from coldbox.physics import doorway
from coldbox.physics.number import FloatArray, Number
from coldbox.project.model import Door
from coldbox.scene.draws import most
from coldbox.scene.hours import day, over_hours
from coldbox.scene.types import Scene
from coldbox.tables.load import row, rows


def open_share(door: Door) -> FloatArray:
    """Share of each clock hour that one such door stands open, (24,) or (draws, 24). Raises OutOfValidity above 1."""
    passages, stood_open = over_hours(door.passages, door.hours), over_hours(door.stood_open, door.hours)
    return day(doorway.open_share(passages, door.open_each, stood_open))


def leak_neighbour(scene: Scene) -> str:
    """Where leaking air comes from: the richest air behind a door; without doors, behind any face."""
    doors = [door.neighbour for door in scene.project.doors if door.neighbour in scene.airs]
    faces = [face.neighbour for face in scene.project.faces.values() if face.neighbour in scene.airs]
    names = doors or faces
    if not names:
        return ""
    return max(dict.fromkeys(names), key=lambda name: float(np.mean(scene.airs[name].enthalpy)))


def closed_share(scene: Scene) -> FloatArray:
    """Share of each hour in which every door is shut, doors opening apart from each other."""
    closed = day(1.0)
    for door in scene.project.doors:
        closed = closed * (1.0 - open_share(door)) ** door.count
    return closed


def gaskets_say_it(scene: Scene) -> bool:
    """Whether leakage is told by the doors' gaskets: then a default rate for the whole box would count it twice."""
    origin = scene.project.origins.get("box.leakage")
    told = any(most(door.gasket_leakage) > 0.0 for door in scene.project.doors)
    return told and origin is not None and origin.kind == "default"


def table_changes_per_day(volume: Number, room_c: Number, use: str) -> Number:
    """Average air changes in 24 h by room volume, openings and leakage together; straight on logarithmic axes.

    volume: m³. room_c: °C; above and below 0 °C have columns of their own. use: light, average, heavy.
    Raises OutOfValidity for a volume outside the table. Source: ASHRAE Handbook, Refrigeration, Refrigerated-facility
    loads, average air changes per 24 hours (from memory).
    """
    table = list(rows("air_changes").values())
    sizes = np.array([float(str(one["volume"])) for one in table])
    if np.any(np.less(volume, sizes[0])) or np.any(np.greater(volume, sizes[-1])):
        worst = float(np.min(volume)) if np.any(np.less(volume, sizes[0])) else float(np.max(volume))
        raise OutOfValidity("the room's volume", worst, sizes[0], sizes[-1], "m³", "The table of air changes")
    size = np.log(volume)
    above, below = (
        np.exp(np.interp(size, np.log(sizes), np.log([float(str(one[column])) for one in table])))
        for column in ("above_zero", "below_zero")
    )
    return np.where(np.less(room_c, 0.0), below, above) * float(str(row("air_use", use)["factor"]))
