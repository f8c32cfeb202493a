"""Floors: the year drives them, never the design day; a heater's plane is warmed once and paid for once."""

import math

import numpy as np
import pytest
from boxes import box_project, construction, heater, layer, neighbour
from hypothesis import given
from hypothesis import strategies as st

from coldbox.account import transmission
from coldbox.scene import floor as floors
from coldbox.scene.build import build
from coldbox.scene.floor import floor
from coldbox.units.clock import Schedule, Span

SLAB = construction("slab", layer("concrete", thickness=0.12), layer(), layer("concrete", thickness=0.08))


def ground(**changes):
    lies = {"neighbour": "ground", "construction": "slab", **changes.pop("lies", {})}
    return box_project(faces={"floor": lies}, constructions=[SLAB], **changes)


def of(project):
    scene = build(project)
    return floor(scene, next(one for one in scene.body.surfaces if one.id == "floor"))


def entry(project):
    return next(one for one in transmission.entries(build(project)) if one.id == "floor")


def test_a_slab_by_the_standard_worked_by_hand():
    # 3 x 4 m, clay: B' = 24/14 m, d_t = 0.3 + 1.5 (0.10 + R + 0.04); July, the warmest month, swing 9 K.
    layers = 0.2 / 1.7 + 0.1 / 0.022
    thick = 0.3 + 1.5 * (0.10 + layers + 0.04)
    u = 1.5 / (0.457 * 24.0 / 14.0 + thick)
    depth = math.sqrt(3.15e7 * 1.5 / (math.pi * 3e6))
    wave = 0.37 * 14.0 * 1.5 * math.log(depth / thick + 1.0)
    lag = 1.5 - 0.42 * math.log(depth / (thick + 1.0))
    expected = 12.0 * u * (9.0 + 18.0) + wave * 9.0 * math.cos(math.pi / 6 * (0.0 - lag))
    found = of(ground())
    assert found.heat_w == pytest.approx(np.full(24, expected), rel=1e-9)
    assert found.ua == pytest.approx(12.0 * u)


def test_the_design_day_does_not_reach_under_the_floor():
    cool, hot = (of(ground(site={"dry_bulb": at, "daily_range": 15.0})).heat_w for at in (20.0, 45.0))
    assert np.array_equal(cool, hot)


def test_the_wave_is_highest_after_the_warmest_month_of_its_hemisphere():
    for latitude, warmest in ((55.0, 7), (-34.0, 1)):
        heat = [of(ground(site={"latitude": latitude, "month": month, "day": 15})).heat_w[0] for month in range(1, 13)]
        assert (int(np.argmax(heat)) + 1 - warmest) % 12 in (1, 2)
        year = of(ground(site={"latitude": latitude, "yearly_swing": 0.0})).heat_w[0]
        assert np.mean(heat) == pytest.approx(year, rel=1e-9)


def test_joints_and_allowance_lie_beside_the_layers_and_the_ground_behind_both():
    plain, more = of(ground()), of(ground(box={"allowance": 0.2}))
    assert plain.heat_w[0] < more.heat_w[0] < 1.2 * plain.heat_w[0]


def test_a_slab_with_no_edge_outdoors_meets_its_own_ground():
    inside = of(ground(lies={"exposed_edge": 0.0}))
    layers = 0.2 / 1.7 + 0.1 / 0.022
    assert inside.heat_w == pytest.approx(np.full(24, 12.0 * 27.0 / (0.3 / 1.5 + 0.14 + layers)))
    assert "no edge" in inside.remark
    assert of(ground(lies={"exposed_edge": 5.0})).heat_w[0] < of(ground()).heat_w[0]


def test_the_middle_of_a_large_freezers_slab_freezes_and_a_heater_is_what_would_do():
    large = {"length": 30.0, "width": 40.0, "height": 6.0}
    facts = transmission.facts(build(ground(box=large)))
    assert (
        facts["under_floor_centre_c"]
        < 2.0
        < transmission.facts(build(ground(box={"temperature": 4.0})))["under_floor_centre_c"]
    )
    assert facts["under_floor_centre_c"] < facts["under_floor_c"]
    assert "underfloor_heater_w" not in facts


# ---- heaters


@given(st.floats(-30.0, 10.0), st.floats(1.0, 12.0), st.floats(0.0, 25.0))
def test_what_a_heater_gives_goes_to_the_room_or_to_the_ground(room, held, year):
    project = ground(box={"temperature": room, "length": 10.0, "width": 12.0}, site={"ground_temperature": year})
    idle, warm = of(project), of(project.replace(heaters=(heater(held_at=held),)))
    above = (0.10 if year >= room else 0.17) + 0.1 / 0.022 + 0.08 / 1.7
    assert idle.above == pytest.approx(above)
    if idle.plane_c >= held:
        assert warm.heater_w == 0.0
        assert warm.heat_w == pytest.approx(idle.heat_w)
    else:
        assert warm.plane_c == pytest.approx(held)
        assert warm.heat_w == pytest.approx(np.full(24, 120.0 * (held - room) / above))
        # The ground gives what it gave, less what the warmer plane holds back.
        held_back = 120.0 * (held - idle.plane_c) / (1.0 / idle.u - above)
        assert warm.heater_w == pytest.approx(warm.heat_w[0] - idle.heat_w[0] + held_back)
        assert warm.heater_w > 0.0


def test_only_what_passes_to_the_room_is_an_entry_and_the_watts_are_a_fact():
    project = ground(box={"length": 10.0, "width": 12.0}, heaters=[heater(held_at=6.0)])
    scene = build(project)
    assert [one.id for one in transmission.entries(scene)].count("floor") == 1
    facts = transmission.facts(scene)
    assert 0.0 < facts["underfloor_heater_w"] != entry(project).hours_w[0]
    assert "heater on" in entry(project).label
    assert "heater idle" in entry(project.replace(heaters=(heater(held_at=1.0),),
                                                  box=project.box.replace(temperature=5.0))).label  # fmt: skip
    assert floors.heaters(build(ground(heaters=[heater(power=100.0)]))) == []


def test_a_heater_that_is_switched_off_by_the_clock_lets_the_floor_be():
    half = heater(held_at=6.0, hours=Schedule((Span(6.0, 18.0, 1.0),)))
    large = {"length": 10.0, "width": 12.0}
    idle, always, timed = (of(ground(box=large, heaters=list(held))) for held in ((), (heater(held_at=6.0),), (half,)))
    assert np.array_equal(timed.heat_w[:6], idle.heat_w[:6])
    assert np.array_equal(timed.heat_w[6:18], always.heat_w[6:18])
    assert timed.heater_w == pytest.approx(always.heater_w / 2)


@pytest.mark.parametrize("under", ["void", "road", "outdoors", "room"])
def test_a_heater_warms_any_floor_from_beneath_its_insulation(under):
    faces = {"floor": {"neighbour": under, "construction": "slab"}}
    project = box_project(faces=faces, constructions=[SLAB], neighbours=[neighbour(temperature=-10.0)],
                          site={"dry_bulb": 0.0, "ground_temperature": -5.0})  # fmt: skip
    idle = next(one for one in transmission.entries(build(project)) if one.id == "floor")
    found = of(project.replace(heaters=(heater(held_at=5.0),)))
    assert found.heat_w.min() > idle.hours_w.max()
    assert found.plane_c == pytest.approx(5.0)
    assert found.heater_w > 0.0


# ---- voids


def test_a_void_lies_between_the_ground_and_the_day():
    def void(**site):
        return of(box_project(faces={"floor": {"neighbour": "void"}}, site=site))

    found = void()
    outdoors = build(box_project()).weather.air.temperature_c
    assert 9.0 - 10.0 < found.driven_by_c < outdoors.mean()
    assert void(dry_bulb=40.0).heat_w.mean() > found.heat_w.mean()
    assert void(ground_temperature=20.0).heat_w.mean() > found.heat_w.mean()
    assert np.ptp(found.heat_w) > 0.0
    # In the year's mean, ground and air at one temperature, it is the standard's U.
    even = void(dry_bulb=9.0, daily_range=0.0)
    assert even.heat_w == pytest.approx(np.full(24, even.ua * 27.0), rel=1e-9)
    assert "vents" in found.remark


def test_a_void_without_an_edge_outdoors_is_as_cold_as_the_ground():
    found = of(box_project(faces={"floor": {"neighbour": "void", "exposed_edge": 0.0}}))
    assert found.driven_by_c == 9.0
    assert found.heat_w == pytest.approx(np.full(24, found.ua * 27.0))
