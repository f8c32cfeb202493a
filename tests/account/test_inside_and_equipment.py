"""People, lights, motors, fans, defrost: each once, where it belongs."""

from __future__ import annotations

import numpy as np
import pytest
from boxes import box_project, door, heater, light, machine, motor, people

from coldbox.account import equipment, internal
from coldbox.scene.build import build
from coldbox.units.clock import ALWAYS, Rate, Schedule, Span


def internal_of(project):
    return {entry.id: entry for entry in internal.entries(build(project))}


def equipment_of(project, others=()):
    return {entry.id: entry for entry in equipment.entries(build(project), list(others))}


def test_two_people_a_quarter_of_their_hours():
    hours = Schedule((Span(7.0, 17.0, 0.25),))
    entry = internal_of(box_project(people=[people(count=2, hours=hours)]))["people.people"]
    assert entry.hours_w[12] == pytest.approx(2 * 0.25 * (272 + 6 * 18), rel=1e-9)
    assert entry.hours_w[[6, 17]] == pytest.approx([0.0, 0.0])
    assert (entry.latent_w >= 0).all() and (entry.sensible_w >= 0).all()


def test_what_a_motor_leaves_inside_by_its_place():
    motors = [motor(name=place, place=place, power=1000.0) for place in ("inside", "load only", "motor only")]
    found = internal_of(box_project(motors=motors))
    inside, shaft, losses = (found[f"motors.{place}"].hours_w[0] for place in ("inside", "load only", "motor only"))
    assert inside == pytest.approx(1000.0)
    assert shaft + losses == pytest.approx(1000.0)
    assert losses < shaft


def test_lights_by_count_and_hours():
    entry = internal_of(box_project(lights=[light(count=2, hours=Schedule((Span(6.0, 18.0, 1.0),)))]))["lights.lights"]
    assert entry.hours_w.sum() == pytest.approx(2 * 40.0 * 12)


def test_fans_stop_while_it_defrosts():
    unit = machine(
        fans=3, fan_power=110.0, defrost="electric", defrost_at=(5.0, 11.0, 17.0, 23.0), defrost_time=1500.0,
        defrost_power=2400.0,
    )  # fmt: skip
    found = equipment_of(box_project(machine=unit))
    assert found["fans"].hours_w.sum() == pytest.approx(330.0 * (24 - 4 * 1500 / 3600))
    assert found["defrost"].hours_w.sum() * 3600 == pytest.approx(0.5 * 2400.0 * 4 * 1500.0)
    assert found["defrost"].defrost and not found["fans"].defrost


def test_shares_are_of_the_rest_and_give_way_to_own_figures():
    lit = internal.entries(build(box_project(lights=[light(power=1000.0, hours=ALWAYS)])))
    declared = equipment_of(
        box_project(machine=machine(fan_share=0.1, defrost="electric", defrost_power=None, defrost_share=0.05)), lit
    )
    assert declared["fans"].hours_w == pytest.approx(np.full(24, 100.0))
    assert declared["defrost"].hours_w == pytest.approx(np.full(24, 50.0))
    own = equipment_of(box_project(machine=machine(fans=1, fan_power=90.0)), lit)
    assert own["fans"].hours_w == pytest.approx(np.full(24, 90.0)) and "defrost" not in own


def test_a_door_heater_a_drain_heater_and_the_motor_of_an_air_curtain():
    curtained = door(
        heater=180.0, count=2, protection_power=300.0, passages=Rate(20 / 3600, "hour"), open_each=18.0, hours=ALWAYS
    )
    found = equipment_of(
        box_project(doors=[curtained], heaters=[heater("drain", kind="drain", power=60.0, to_room=0.4)])
    )
    assert found["doors.main.heater"].hours_w[0] == pytest.approx(2 * 180.0 * 0.5)
    assert found["doors.main.curtain"].hours_w[0] == pytest.approx(2 * 300.0 * 0.1)
    assert found["heaters.drain"].hours_w[0] == pytest.approx(24.0)
