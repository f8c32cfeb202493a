"""What goes on in and around a room by the clock: door traffic, leaks, people, lamps, motors, the machine's own heat.

Without power stop: people, lamps, motors, heaters, fans, ventilation, air curtains and fast doors; door traffic and
trucks too, unless they go on. Leakage goes on, from the richest air behind a door, as in the account; it counts while
no door stands open. A room whose air change is a table's or a rate's, which holds its door traffic, is left with its
leakage while the doors stay shut.
"""

from __future__ import annotations

from collections.abc import Sequence
from typing import Final

import numpy as np

from coldbox.physics import moist_air
from coldbox.physics.number import FloatArray, Number
from coldbox.project.model import Door, Motor, Ventilation
from coldbox.scene.hours import SECONDS_A_DAY, day
from coldbox.scene.inside import heat_of_a_person, share_inside
from coldbox.scene.openings import closed_share, gaskets_say_it, open_share, table_changes_per_day
from coldbox.tables import load
from coldbox.timeline.course import Course
from coldbox.timeline.network import Rig
from coldbox.timeline.surroundings import Around

EVAPORATION: Final = 2.5e6  # J/kg near 0 °C, moist-air tables: what turns people's latent heat into water


class Life:
    """The daily life of one box; figures by the hour are (24, draw or 1)."""

    def __init__(self, rig: Rig, course: Course, capacity_w: FloatArray | None) -> None:
        scene, project = rig.scene, rig.project
        self.scene, self.project, self.course, self.runs = scene, project, course, capacity_w is not None
        self.open_shares = [_rows(open_share(door)) for door in project.doors]
        self.closed = _rows(closed_share(scene))
        self.fills = _flat(scene.body.volume / scene.room.specific_volume)  # kg dry air that fill the room
        self.per_m3 = _flat(1.0 / scene.room.specific_volume)
        room_c = scene.room.temperature_c
        each, latent_each, _ = heat_of_a_person(room_c)
        present = [one.count * one.hours.shares() for one in project.people]
        self.people = _sum([(each - latent_each) * there for there in present])
        self.breath = _sum([latent_each / EVAPORATION * there for there in present])
        self.lamps = _sum([one.power * one.count * one.hours.shares() for one in project.lights])
        self.motors = _sum([_motor(one) for one in project.motors])
        self.trucks = _sum([_motor(one) for one in project.trucks])
        self.heaters = _sum([one.power * one.to_room * one.hours.shares() for one in project.heaters if one.power])
        self.at_doors = _sum([door.heater * door.count * door.heater_to_room for door in project.doors])
        self.curtains = _sum([door.protection_power * door.count * open_share(door) for door in project.doors])
        machine = project.machine
        fans: Number = machine.fans * machine.fan_power
        if capacity_w is not None and not np.any(np.greater(fans, 0.0)):
            # A capacity that was asked for holds its fans' declared share.
            fans = capacity_w * _flat(machine.fan_share / (1.0 + machine.fan_share))
        self.fans = _flat(fans)

    def traffic(self, powered: bool) -> bool:
        """Whether doors open by their hours."""
        return self.course.daily_life and (powered or "doors" in self.course.going_on)

    def door_shares(self, clock: int, powered: bool, opened: Sequence[str]) -> FloatArray | None:
        """Share of the fully open flow through each door, (door, draw or 1); None: all shut."""
        found: list[FloatArray] = []
        traffic = self.traffic(powered) and self.project.box.air == "doors"
        for door, shares in zip(self.project.doors, self.open_shares, strict=True):
            share = door.count * shares[clock] if traffic else np.zeros(1)
            share = share + float(opened.count(door.name))
            held_back = door.effectiveness if powered else unpowered_effectiveness(door)
            found.append(np.asarray(share * _flat(door.flow_factor * (1.0 - held_back))))
        if not any(np.any(share) for share in found):
            return None
        width = max(share.size for share in found)
        return np.array([np.broadcast_to(share, (width,)) for share in found])

    def leaks(self, around: Around, clock: int, powered: bool, open_now: bool) -> list[tuple[str, FloatArray]]:
        """Where air leaks in from, and how much: kg dry air per s, (draw or 1,)."""
        box, found = self.project.box, dict[str, FloatArray]()

        def add(name: str, flow: FloatArray) -> None:
            if name and np.any(flow):
                found[name] = found[name] + flow if name in found else flow

        traffic = self.traffic(powered)
        if box.air == "table" and traffic:
            changes = table_changes_per_day(self.scene.body.volume, self.scene.room.temperature_c, box.use)
            add(around.leak, _flat(changes) / SECONDS_A_DAY * self.fills)
        elif box.air == "rate" and traffic and box.air_change is not None:
            add(around.leak, _flat(box.air_change.per_second) * self.fills)
        else:
            by_hours = traffic and box.air == "doors"
            shut = np.zeros(1) if open_now else self.closed[clock] if by_hours else np.ones(1)
            if not gaskets_say_it(self.scene):
                add(around.leak, _flat(box.leakage.per_second) * self.fills * shut)
            for door, shares in zip(self.project.doors, self.open_shares, strict=True):
                gap = door.count * door.gasket_leakage * 2.0 * (door.width + door.height)
                closed = 1.0 - shares[clock] if by_hours else np.ones(1)
                add(around.behind[f"doors.{door.name}"], np.asarray(_flat(gap) * self.per_m3 * closed))
        return list(found.items())

    def fresh(
        self, around: Around, hour: int, clock: int, powered: bool
    ) -> list[tuple[FloatArray, FloatArray, FloatArray]]:
        """Air brought in on purpose: kg dry air per s, °C and kg/kg of each."""
        if not powered:
            return []
        return [self._fresh(one, around, hour, clock) for one in self.project.ventilation]

    def _fresh(
        self, one: Ventilation, around: Around, hour: int, clock: int
    ) -> tuple[FloatArray, FloatArray, FloatArray]:
        air_c, ratio = around.airs[one.neighbour][0][hour], around.airs[one.neighbour][1][hour]
        pressure = _flat(self.scene.pressure)
        flow = _flat(one.flow * (1.0 - one.recovery)) * float(one.hours.shares()[clock])
        if one.dried_to is not None:
            ratio = np.minimum(ratio, moist_air.saturation_humidity_ratio(_flat(one.dried_to), pressure))
        return np.asarray(flow / moist_air.specific_volume(air_c, ratio, pressure)), air_c, np.asarray(ratio)

    def inside(self, clock: int, powered: bool) -> tuple[FloatArray, FloatArray]:
        """Heat to the room air, W, and water into it, kg/s, (draw or 1,)."""
        going_on = self.course.going_on
        heat, water = np.zeros(1), np.zeros(1)
        if powered:
            heat = heat + self.heaters[clock] + self.at_doors[clock]
            if self.runs:
                heat = heat + self.fans
        if not self.course.daily_life:
            return heat, water
        if powered:
            heat = heat + self.lamps[clock] + self.motors[clock] + self.curtains[clock]
        if powered or "trucks" in going_on:
            heat = heat + self.trucks[clock]
        if powered or "people" in going_on:
            heat, water = heat + self.people[clock], water + self.breath[clock]
        return heat, water

    def stopped(self) -> list[str]:
        """What is there and stops without power, in words."""
        project, going_on = self.project, self.course.going_on
        machine = "the machine" if project.box.powered else ""
        fans = "fans" if np.any(self.fans) else ""
        there = {
            machine: bool(machine),
            fans: bool(fans),
            "defrost": project.box.powered and project.machine.defrost not in ("none", "air"),
            "lamps": bool(project.lights),
            "motors": bool(project.motors),
            "heaters": bool(project.heaters) or bool(np.any(self.at_doors)),
            "ventilation": bool(project.ventilation),
            "air curtains": bool(np.any(self.curtains)),
            "people": bool(project.people) and "people" not in going_on,
            "trucks": bool(project.trucks) and "trucks" not in going_on,
            "door traffic": any(np.any(shares) for shares in self.open_shares) and "doors" not in going_on,
            "deliveries": any(np.any(lot.arrives) for lot in project.lots) and "deliveries" not in going_on,
        }
        return [name for name, flag in there.items() if flag and name]


def unpowered_effectiveness(door: Door) -> Number:
    """Share of the air that a doorway's protection holds back without power; what needs power protects nothing."""
    held = [load.row("protection", name) for name in door.protection]
    if all(bool(row["works_without_power"]) for row in held):
        return door.effectiveness
    let_through = 1.0
    for row in held:
        if row["works_without_power"]:
            let_through *= 1.0 - float(str(row["effectiveness"]))
    return np.minimum(1.0 - let_through, door.effectiveness)


def _motor(motor: Motor) -> Number:
    return motor.power * share_inside(motor)[0] * motor.count * motor.hours.shares()


def _flat(value: Number) -> FloatArray:
    return np.ravel(np.asarray(value, dtype=np.float64))


def _rows(value: Number) -> FloatArray:
    return np.ascontiguousarray(np.atleast_2d(day(value)).T)


def _sum(values: Sequence[Number]) -> FloatArray:
    return _rows(sum(values, 0.0))
