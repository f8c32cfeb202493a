"""Air that comes in: through doors that open, cracks, by the table of air changes, or on purpose."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from coldbox.account.air_exchange import denser_volume, entry, exchange
from coldbox.account.entry import Entry, Input
from coldbox.account.shapes import SECONDS_A_DAY, SECONDS_AN_HOUR, called, day, over_hours, steady_mean
from coldbox.physics import doorway, moist_air
from coldbox.physics.number import FloatArray, Number
from coldbox.project.model import Door, Ventilation
from coldbox.scene import Air, Scene
from coldbox.scene.about import about
from coldbox.scene.draws import most
from coldbox.scene.openings import (
    closed_share,
    gaskets_say_it,
    leak_neighbour,
    open_share,
    table_changes_per_day,
)

SPENT = "upper bound: one opening exchanges more than the room holds, and what follows meets air no longer cold"


def entries(scene: Scene) -> list[Entry]:
    """Every infiltration entry, by the method the box asks for. The table's air changes hold openings and leakage."""
    fresh = [_ventilation(scene, one) for one in scene.project.ventilation]
    air = scene.project.box.air
    if air == "table":
        return [_by_table(scene), *fresh]
    if air == "rate":
        return [*_by_rate(scene), *fresh]
    return [*_through_doors(scene), *_leakage(scene), *fresh]


def _air_of(scene: Scene, name: str) -> Air:
    return scene.airs[name]


def _through_doors(scene: Scene) -> Iterator[Entry]:
    for door in scene.project.doors:
        share = open_share(door)
        if most(share) > 0.0:
            yield _traffic(scene, door, share)
        if most(door.gasket_leakage) > 0.0:
            yield _gasket(scene, door, share)


def _traffic(scene: Scene, door: Door, share: FloatArray) -> Entry:
    behind = _air_of(scene, door.neighbour)
    flow = doorway.doorway_flow(door.width, door.height, scene.room.density, behind.density)
    held_back = door.flow_factor * (1.0 - door.effectiveness)
    exchanged = day(door.count * flow * share * held_back)
    stood_open = over_hours(door.stood_open, door.hours).max(axis=-1, keepdims=True) * SECONDS_AN_HOUR
    longest = np.maximum(door.open_each, stood_open)
    spent = np.any(flow * longest * held_back > scene.body.volume)
    air = "outside air" if door.neighbour == "outdoors" else f"{door.neighbour} air"
    formula = "V fully open x open share x flow factor x (1 - protection), times the difference of the airs"
    return entry(
        behind,
        exchange(scene, behind, exchanged, denser_volume(scene, behind)),
        name=f"doors.{door.name}.traffic",
        label=f"{air}, {called('door', door.name)}",
        how=("doorway (Gosney-Olama)", "gosney-olama-1975", formula),
        inputs=(
            Input(key="width_m", label="width", value=door.width, kind="length"),
            Input(key="height_m", label="height", value=door.height, kind="length"),
            Input(key="count", label="doors", value=door.count, kind="count"),
            Input(key="open_flow_m3_per_s", label="V fully open, mean", value=steady_mean(day(flow)), kind="flow"),
            Input(key="open_share", label="open share, mean", value=steady_mean(share), kind="share"),
            Input(key="flow_factor", label="flow factor", value=door.flow_factor, kind="share"),
            Input(key="protection", label="protection", value=door.effectiveness, kind="share"),
        ),
        remark=SPENT if spent else "",
    )


def _gasket(scene: Scene, door: Door, share: FloatArray) -> Entry:
    behind = _air_of(scene, door.neighbour)
    outline = 2.0 * (door.width + door.height)
    flow = day(door.count * door.gasket_leakage * outline * (1.0 - share))
    return entry(
        behind,
        exchange(scene, behind, flow, scene.room.specific_volume),
        name=f"doors.{door.name}.gasket",
        label=f"{called('door', door.name)}, gasket",
        how=("gasket leakage", "as-given", "rate x outline x closed share, times the difference of the airs"),
        inputs=(
            Input(key="rate_m2_per_s", label="rate", value=door.gasket_leakage, kind="gasket_flow"),
            Input(key="outline_m", label="outline", value=outline, kind="length"),
            Input(key="closed_share", label="closed share, mean", value=steady_mean(day(1.0 - share)), kind="share"),
        ),
    )


def _leakage(scene: Scene) -> Iterator[Entry]:
    rate = scene.project.box.leakage.per_second
    name = leak_neighbour(scene)
    if not (most(rate) > 0.0 and name) or gaskets_say_it(scene):
        return
    closed = closed_share(scene)
    yield _changes(
        scene,
        "leakage",
        "leakage, all doors shut",
        name,
        day(rate * closed),
        ("leakage rate", "as-given"),
        (
            Input(key="changes_per_h", label="air changes an hour", value=rate * SECONDS_AN_HOUR, kind="number"),
            Input(key="volume_m3", label="volume", value=scene.body.volume, kind="volume"),
            Input(key="closed_share", label="closed share, mean", value=steady_mean(closed), kind="share"),
        ),
    )


def _by_rate(scene: Scene) -> Iterator[Entry]:
    change = scene.project.box.air_change
    name = leak_neighbour(scene)
    if change is None or not name:
        return
    yield _changes(
        scene,
        "air_change",
        "air change, as given",
        name,
        day(change.per_second),
        ("air-change rate", "as-given"),
        (
            Input(key="changes_per_day", label="changes a day", value=change.per_second * SECONDS_A_DAY, kind="number"),
            Input(key="volume_m3", label="volume", value=scene.body.volume, kind="volume"),
        ),
    )


def _by_table(scene: Scene) -> Entry:
    use = scene.project.box.use
    with about(scene.project, "box.air", 'Write air = "doors", or air = "rate" with an air_change.'):
        per_day = table_changes_per_day(scene.body.volume, scene.room.temperature_c, use)
    return _changes(
        scene,
        "air_change",
        f"air changes by volume, {use} use",
        leak_neighbour(scene),
        day(per_day / SECONDS_A_DAY),
        ("air-change table", "ashrae-r-loads"),
        (
            Input(key="changes_per_day", label="changes a day", value=per_day, kind="number"),
            Input(key="volume_m3", label="volume", value=scene.body.volume, kind="volume"),
        ),
    )


def _changes(
    scene: Scene,
    name: str,
    label: str,
    neighbour: str,
    changes: FloatArray,
    how: tuple[str, str],
    inputs: tuple[Input, ...],
) -> Entry:
    """An entry of air changes, 1/s in each hour, of the air behind a neighbour."""
    behind, room = _air_of(scene, neighbour), scene.room
    method, source = how
    brought = doorway.air_change_heat(
        scene.body.volume, changes, room.specific_volume, behind.temperature_c, behind.humidity_ratio,
        room.temperature_c, room.humidity_ratio,
    )  # fmt: skip
    return entry(
        behind,
        brought,
        name=name,
        label=label,
        how=(method, source, "changes x volume, times the difference of the airs"),
        inputs=inputs,
        remark=f"air from {neighbour}",
    )


def _ventilation(scene: Scene, fresh: Ventilation) -> Entry:
    behind, room = _air_of(scene, fresh.neighbour), scene.room
    dried: Number | None = None
    if fresh.dried_to is not None:
        dried = moist_air.saturation_humidity_ratio(fresh.dried_to, scene.pressure)
    brought = doorway.ventilation_heat(
        day(fresh.flow * fresh.hours.shares()), behind.specific_volume, behind.temperature_c, behind.humidity_ratio,
        room.temperature_c, room.humidity_ratio, fresh.recovery, dried,
    )  # fmt: skip
    if dried is not None:
        behind = behind.replace(humidity_ratio=np.minimum(behind.humidity_ratio, dried))
    return entry(
        behind,
        brought,
        name=f"ventilation.{fresh.name}",
        label=called("fresh air", fresh.name),
        how=("ventilation", "ashrae-f-psychrometrics", "rho V (h_outside - h_room) x (1 - recovery)"),
        inputs=(
            Input(key="flow_m3_per_s", label="V", value=fresh.flow, kind="flow"),
            Input(key="recovery", label="recovery", value=fresh.recovery, kind="share"),
            Input(key="hours_per_day", label="hours a day", value=fresh.hours.hours_per_day(), kind="number"),
        ),
    )
