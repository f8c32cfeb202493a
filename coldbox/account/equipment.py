"""What the refrigeration itself and the fittings put into the room: fans, defrost, heaters, air-curtain motors."""

from __future__ import annotations

import numpy as np

from coldbox.account.entry import Entry, Input
from coldbox.account.shapes import NOTHING, SECONDS_A_DAY, called, day, over_hours, steady_mean
from coldbox.physics.number import Number
from coldbox.project.model import Door, Heater
from coldbox.scene import Scene
from coldbox.scene.draws import most


def entries(scene: Scene, others: list[Entry]) -> list[Entry]:
    """Every entry of the group equipment; `others` is the rest of the account, for what is a declared share of it."""
    project = scene.project
    fixed = [
        *(_door_heater(door) for door in project.doors if most(door.heater) > 0),
        *(_curtain(door) for door in project.doors if most(door.protection_power) > 0),
        *(_heater(heater) for heater in project.heaters if heater.power is not None),
    ]
    rest = _rest([*others, *fixed])
    unit = [_fans(scene, rest), _defrost(scene, rest)]
    return [*fixed, *(entry for entry in unit if entry is not None)]


def _rest(entries: list[Entry]) -> Number:
    """Mean heat of the rest of the load, positive entries, W, float or (draws, 1)."""
    total = NOTHING
    for entry in entries:
        total = total + np.maximum(entry.hours_w, 0.0)
    return steady_mean(total)


def _fans(scene: Scene, rest: Number) -> Entry | None:
    """Fans run all day but for the defrosts; before any are named they are a declared share of the rest.

    Where the room's own air thaws the coil it is they that bring it there: they run on.
    """
    machine = scene.project.machine
    if most(machine.fans) > 0:
        stopped = 0.0 if machine.defrost == "air" else defrost_seconds(scene)
        watts = machine.fans * machine.fan_power * (1.0 - stopped / SECONDS_A_DAY)
        return _steady(
            "fans",
            f"fans, {float(np.mean(machine.fans)):g}",
            watts,
            ("as given", "as-given", "n P, all day" if machine.defrost == "air" else "n P, stopped while it defrosts"),
            (
                Input(key="fans", label="n", value=machine.fans, kind="count"),
                Input(key="fan_power_w", label="P of one", value=machine.fan_power, kind="power"),
                Input(key="stopped_s_per_day", label="stopped a day", value=stopped, kind="duration"),
            ),
        )
    if most(machine.fan_share) <= 0:
        return None
    return _steady(
        "fans",
        "fans, declared share",
        machine.fan_share * rest,
        ("declared share", "trade-practice", "share x mean of the rest"),
        (
            Input(key="share", label="share", value=machine.fan_share, kind="share"),
            Input(key="rest_w", label="mean of the rest", value=rest, kind="power"),
        ),
        remark="until fans are named in [machine]",
    )


def defrost_seconds(scene: Scene) -> Number:
    """Time the coil spends defrosting a day, s."""
    machine = scene.project.machine
    return 0.0 if machine.defrost == "none" else len(machine.defrost_at) * machine.defrost_time


def defrost_energy(scene: Scene) -> Number | None:
    """Energy of the defrost heaters a day, J; None while their power is not known."""
    power = scene.project.machine.defrost_power
    return None if power is None else power * defrost_seconds(scene)


def _defrost(scene: Scene, rest: Number) -> Entry | None:
    machine = scene.project.machine
    if machine.defrost in ("none", "air"):
        return None
    energy = defrost_energy(scene)
    label = f"defrost, {len(machine.defrost_at)} a day, {machine.defrost}"
    if energy is not None and machine.defrost_power is not None:
        return _steady(
            "defrost",
            label,
            machine.defrost_to_room * energy / SECONDS_A_DAY,
            ("as given", "as-given", "share x n P time, spread over the day"),
            (
                Input(key="defrosts_per_day", label="n", value=len(machine.defrost_at), kind="count"),
                Input(key="defrost_power_w", label="P", value=machine.defrost_power, kind="power"),
                Input(key="defrost_time_s", label="time", value=machine.defrost_time, kind="duration"),
                Input(key="to_room", label="share to the room", value=machine.defrost_to_room, kind="share"),
            ),
            defrost=True,
        )
    return _steady(
        "defrost",
        "defrost, declared share",
        machine.defrost_share * rest,
        ("declared share", "trade-practice", "share x mean of the rest"),
        (
            Input(key="share", label="share", value=machine.defrost_share, kind="share"),
            Input(key="rest_w", label="mean of the rest", value=rest, kind="power"),
        ),
        remark="until defrost_power is named in [machine]",
        defrost=True,
    )


def _door_heater(door: Door) -> Entry:
    watts = door.count * door.heater * door.heater_to_room
    return _steady(
        f"doors.{door.name}.heater",
        f"{called('door', door.name)} heater",
        watts,
        ("as given", "as-given", "n P x share to the room"),
        (
            Input(key="count", label="n", value=door.count, kind="count"),
            Input(key="heater_w", label="P", value=door.heater, kind="power"),
            Input(key="to_room", label="share to the room", value=door.heater_to_room, kind="share"),
        ),
    )


def _curtain(door: Door) -> Entry:
    """The motor of an air curtain runs while the door is open."""
    open_share = over_hours(door.passages, door.hours) * door.open_each + over_hours(door.stood_open, door.hours)
    return Entry(
        id=f"doors.{door.name}.curtain",
        group="equipment",
        label=f"{called('door', door.name)}, air curtain",
        sensible_w=day(door.count * door.protection_power * open_share),
        latent_w=NOTHING,
        moisture_kg_per_day=0.0,
        method="as given",
        source="as-given",
        formula="n P x open share",
        inputs=(
            Input(key="count", label="n", value=door.count, kind="count"),
            Input(key="power_w", label="P", value=door.protection_power, kind="power"),
            Input(key="open_share", label="open share, mean", value=steady_mean(open_share), kind="share"),
        ),
    )


def _heater(heater: Heater) -> Entry:
    power = 0.0 if heater.power is None else heater.power
    return Entry(
        id=f"heaters.{heater.name}",
        group="equipment",
        label=called(f"{heater.kind} heater", heater.name),
        sensible_w=day(power * heater.to_room * heater.hours.shares()),
        latent_w=NOTHING,
        moisture_kg_per_day=0.0,
        method="as given",
        source="as-given",
        formula="P x share to the room over its hours",
        inputs=(
            Input(key="power_w", label="P", value=power, kind="power"),
            Input(key="to_room", label="share to the room", value=heater.to_room, kind="share"),
            Input(key="hours_per_day", label="hours a day", value=heater.hours.hours_per_day(), kind="number"),
        ),
    )


def _steady(
    name: str,
    label: str,
    watts: Number,
    how: tuple[str, str, str],
    inputs: tuple[Input, ...],
    *,
    remark: str = "",
    defrost: bool = False,
) -> Entry:
    method, source, formula = how
    return Entry(
        id=name,
        group="equipment",
        label=label,
        sensible_w=day(watts),
        latent_w=NOTHING,
        moisture_kg_per_day=0.0,
        method=method,
        source=source,
        formula=formula,
        inputs=inputs,
        remark=remark,
        defrost=defrost,
    )
