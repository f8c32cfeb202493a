"""One test for each place where heat could be counted twice."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

import boxes
import numpy as np
import pytest
import random_boxes as rb
from hypothesis import given, settings
from hypothesis import strategies as st

import coldbox
from coldbox.account.entry import Load
from coldbox.errors import BadProject
from coldbox.units.clock import ALWAYS, Rate

SIGMA, ZERO = 5.670374419e-8, 273.15


def heat(load: Load) -> dict[str, float]:
    """Mean watts by entry."""
    return {entry.id: float(entry.hours_w.mean()) for entry in load.entries}


def given_by(load: Load, name: str) -> dict[str, Any]:
    """The inputs of an entry."""
    entry = next(one for one in load.entries if one.id == name)
    return {item.key: item.value for item in entry.inputs}


def indoors(text: str = "", box: str = "", **machine: Any) -> Load:
    """A small cooler in a room, as a file, with more text behind it."""
    more = "".join(f"{key} = {value}\n" for key, value in {"defrost": '"none"', **machine}.items())
    return coldbox.load(
        rb.project(
            f'format = 1\n[box]\nlength = "4 m"\nwidth = "3 m"\nheight = "2.5 m"\ntemperature = "2 °C"\n'
            f'construction = "wall"\nneighbour = "room"\n{box}\n[constructions.wall]\nr_value = "RSI 4"\n'
            f'thickness = "100 mm"\n[machine]\n{more}{text}'
        )
    )


DOOR = '[[doors]]\nname = "main"\nwidth = "900 mm"\nheight = "2 m"\npassages = "20/h"\n'
GASKET = 'gasket_leakage = "0.5 m³/h per m"\n'


# Doors and air change


@pytest.mark.parametrize("way", ["table", "rate"])
def test_air_changes_hold_openings_and_leakage(way: str) -> None:
    box = f'air = "{way}"\nair_change = "12/day"\nleakage = "0.5/h"\n'
    closed, open_ = indoors(box=box), indoors(DOOR + GASKET, box)
    air = [entry.id for entry in open_.entries if entry.group == "infiltration"]
    assert air == ["air_change"]
    assert heat(open_)["air_change"] == heat(closed)["air_change"]
    by_doors = {entry.id for entry in indoors(DOOR + GASKET).entries if entry.group == "infiltration"}
    assert by_doors == {"doors.main.traffic", "doors.main.gasket"}


def test_the_gaskets_figure_replaces_the_default_leakage_and_not_one_that_was_typed() -> None:
    assert "leakage" in heat(indoors(DOOR))
    assert "leakage" not in heat(indoors(DOOR + GASKET))
    both = heat(indoors(DOOR + GASKET, 'leakage = "0.1/h"'))
    assert both["leakage"] > 0.0
    assert both["doors.main.gasket"] > 0.0


def test_what_leaks_leaks_while_the_door_is_shut() -> None:
    """An hour in which the door always stands open has traffic alone."""
    busy = DOOR.replace("20/h", "240/h") + 'open_each = "15 s"\nhours = "always"\n'
    assert heat(indoors(busy))["leakage"] == pytest.approx(0.0, abs=1e-9)
    assert heat(indoors(busy + GASKET))["doors.main.gasket"] == pytest.approx(0.0, abs=1e-9)


def test_what_freezes_brings_its_fusion_once() -> None:
    """Sensible and latent of the doorway together are the flow of dry air times the enthalpies, ice where it ends."""
    load = coldbox.load(
        boxes.box_project(
            site=None,
            every_face={"neighbour": "room"},
            box={"leakage": Rate(0.0, "hour")},
            doors=[boxes.door(neighbour="room", passages=Rate(30 / 3600, "hour"), hours=ALWAYS)],
        )
    )
    entry = next(one for one in load.entries if one.id == "doors.main.traffic")
    water = entry.moisture_kg_per_day / 86400.0
    melted = entry.latent_w.mean() / water
    assert 2.83e6 < melted < 2.95e6  # evaporation near 2.5 MJ/kg and fusion 0.334 MJ/kg, once each, and some cooling
    frost_entries = [one.id for one in load.entries if "frost" in one.id or "melt" in one.id]
    assert not frost_entries
    assert load.frost_kg_per_day == pytest.approx(entry.moisture_kg_per_day)


# The outside surface


@given(wind=st.floats(0.5, 10.0), room=st.floats(-30.0, 10.0), air=st.floats(15.0, 40.0))
@settings(max_examples=25, deadline=None)
def test_one_film_outside_and_one_inside(wind: float, room: float, air: float) -> None:
    """On a day without sun, sky or swing, a panel's heat balances one outside film: 4 + 4 v and radiation."""
    project = boxes.box_project(
        site={"sky": "none", "dry_bulb": air, "daily_range": 0.0, "wind": wind}, box={"temperature": room}
    )
    load = coldbox.load(project)
    for name in ("front", "ceiling"):
        watts, panel = heat(load)[name], given_by(load, name)
        across = panel["resistance_m2k_per_w"] / panel["effective_area_m2"]
        surface = room + watts * (across + panel["inside_film_m2k_per_w"] / panel["area_m2"])
        outside = _outside_area(project, name)
        from_air = (4.0 + 4.0 * wind) * (air - surface)
        radiated = 0.9 * SIGMA * ((air + ZERO) ** 4 - (surface + ZERO) ** 4)
        assert outside * (from_air + radiated) == pytest.approx(watts, rel=1e-6, abs=1e-6)


def _outside_area(project: Any, name: str) -> float:
    box, thick = project.box, project.constructions["pir100"].thickness
    across, deep, high = (size + 2.0 * thick for size in (box.width, box.length, box.height))
    return float(across * high if name == "front" else across * deep)


def test_the_sun_of_glass_passes_through_and_warms_nothing_on_its_way() -> None:
    def load(gain: float, sky: str = "clear") -> Load:
        window = boxes.panel("window", width=1.0, height=1.2, solar_gain=gain, shade=0.25, construction="glass")
        glass = boxes.construction("glass", u_value=1.1, thickness=0.024)
        return coldbox.load(boxes.box_project(panels=[window], constructions=[glass], site={"sky": sky}))

    third, two_thirds = load(0.3), load(0.6)
    assert heat(two_thirds)["sun.panels.window"] == pytest.approx(2.0 * heat(third)["sun.panels.window"], rel=1e-12)
    assert heat(two_thirds)["panels.window"] == pytest.approx(heat(third)["panels.window"], rel=1e-12)
    peak = given_by(third, "sun.panels.window")["peak_irradiance_w_per_m2"]
    hottest = max(next(one for one in third.entries if one.id == "sun.panels.window").hours_w)
    assert hottest == pytest.approx(0.3 * 0.75 * 1.2 * peak, rel=1e-12)


def test_added_degrees_replace_the_sun_and_leave_no_other() -> None:
    load = coldbox.load(boxes.box_project(box={"sun": "allowance"}))
    suns = [entry for entry in load.entries if entry.group == "sun"]
    assert suns
    assert {entry.method for entry in suns} == {"allowance (ASHRAE)"}
    for entry in suns:
        wall = next(one for one in load.entries if one.id == entry.id.removeprefix("sun."))
        of = given_by(load, entry.id)
        assert heat(load)[entry.id] == pytest.approx(of["ua_w_per_k"] * of["added_k"])
        mean = given_by(load, wall.id)["outdoor_mean_c"] - -18.0  # no sky in it, and no sun
        assert heat(load)[wall.id] == pytest.approx(of["ua_w_per_k"] * mean)


# Floors


def test_a_floor_heater_warms_the_floor_once_and_its_watts_are_no_entry() -> None:
    def load(*heaters: Any) -> Load:
        return coldbox.load(boxes.box_project(faces={"floor": {"neighbour": "ground"}}, heaters=list(heaters)))

    idle, held = load(), load(boxes.heater(held_at=15.0))
    assert {entry.id for entry in held.entries} == {entry.id for entry in idle.entries}
    assert held.facts["underfloor_heater_w"] > 0.0
    assert held.facts["under_floor_c"] == pytest.approx(15.0)
    floor = given_by(held, "floor")
    above = floor["inside_film_m2k_per_w"] + floor["resistance_m2k_per_w"]
    assert heat(held)["floor"] < 33.0 * floor["area_m2"] / above * 1.05  # from 15 °C through the insulation
    changed = {name for name, watts in heat(held).items() if watts != pytest.approx(heat(idle)[name], rel=1e-12)}
    assert changed == {"floor"}
    assert float(held.hours_w.mean() - idle.hours_w.mean()) == pytest.approx(heat(held)["floor"] - heat(idle)["floor"])


# Goods


def test_todays_intake_and_what_is_stored_breathe_once_each() -> None:
    def breathing(stored: int, arrives: int, hours: int = 10, warm: int = 20) -> float:
        lot = (
            f'[[lots]]\nname = "greens"\nproduct = "lettuce"\nstored = "{stored} kg"\narrives = "{arrives} kg/day"\n'
            f'arrival_temperature = "{warm} °C"\npulldown = "{hours} h"\n'
        )
        return heat(indoors(lot)).get("lots.greens.respiration", 0.0)

    assert breathing(800, 500) == pytest.approx(breathing(800, 0) + breathing(0, 500), rel=1e-12)
    # What arrives at room temperature and cools for a whole day breathes like as much that is stored: not twice.
    assert breathing(0, 500, hours=24, warm=2) == pytest.approx(breathing(500, 0), rel=1e-9)
    assert breathing(0, 500, hours=12, warm=2) == pytest.approx(0.5 * breathing(500, 0), rel=1e-9)


def test_frozen_goods_do_not_breathe() -> None:
    frozen = (
        'format = 1\n[box]\nlength = "4 m"\nwidth = "3 m"\nheight = "2.5 m"\ntemperature = "-20 °C"\n'
        'construction = "pir150"\nneighbour = "room"\n[[lots]]\nname = "greens"\nproduct = "lettuce"\n'
        'stored = "500 kg"\n'
    )
    assert "lots.greens.respiration" not in heat(coldbox.load(rb.project(frozen)))


def test_what_transpires_takes_as_much_as_it_brings() -> None:
    load = indoors('[[lots]]\nname = "greens"\nproduct = "lettuce"\nstored = "500 kg"\n', 'humidity = "80 %"')
    entry = next(one for one in load.entries if one.id == "lots.greens.transpiration")
    assert entry.moisture_kg_per_day > 0.0
    np.testing.assert_allclose(entry.sensible_w, -entry.latent_w)


# Fans, defrost, printed figures


def test_own_fans_and_defrost_replace_the_declared_shares() -> None:
    shares = indoors(DOOR, defrost='"electric"', fan_share='"9 %"', defrost_share='"7 %"')
    figures = {"fans": 2, "fan_power": '"100 W"', "defrost_power": '"2 kW"', "defrost_at": '["04:00", "16:00"]'}
    own = indoors(DOOR, defrost='"electric"', defrost_time='"30 min"', **figures)
    rest = sum(watts for name, watts in heat(shares).items() if name not in ("fans", "defrost"))
    assert heat(shares)["fans"] == pytest.approx(0.09 * rest)
    assert heat(shares)["defrost"] == pytest.approx(0.07 * rest)
    assert heat(own)["fans"] == pytest.approx(2 * 100.0 * 23.0 / 24.0)  # they stop while it defrosts
    assert heat(own)["defrost"] == pytest.approx(2000.0 / 24.0 * 0.5)
    ids = [entry.id for entry in own.entries]
    assert ids.count("fans") == ids.count("defrost") == 1
    others = {name: watts for name, watts in heat(own).items() if name not in ("fans", "defrost")}
    assert others == pytest.approx({name: heat(shares)[name] for name in others})


def test_a_share_beside_own_figures_is_refused() -> None:
    with pytest.raises(BadProject, match="machine.fan_share"):
        indoors(fans=2, fan_power='"100 W"', fan_share='"9 %"')
    with pytest.raises(BadProject, match="machine.defrost_share"):
        indoors(defrost='"electric"', defrost_power='"2 kW"', defrost_share='"9 %"')


def test_frost_melts_at_the_expense_of_the_rated_defrost() -> None:
    """What it takes to melt the frost is a fact beside the account; the rated figure alone is in it."""
    wet = 'humidity = "60 %"\nleakage = "2/h"'
    load = indoors(DOOR, wet, defrost='"electric"', defrost_power='"2 kW"')
    assert load.facts["frost_melting_kwh_per_day"] > 0.0
    assert [entry.id for entry in load.entries if entry.group == "equipment" and entry.id != "fans"] == ["defrost"]
    assert load.facts["defrost_left_after_melt_kwh_per_day"] == pytest.approx(
        load.facts["defrost_heater_kwh_per_day"] - load.facts["frost_melting_kwh_per_day"]
    )


@pytest.mark.parametrize("replaces", [["infiltration"], ["doors.main"], ["leakage", "front"], ["transmission"]])
def test_a_printed_figure_stands_in_for_what_it_replaces(replaces: list[str]) -> None:
    quoted = (
        f'[[quoted]]\nname = "as printed"\ngroup = "internal"\npower = "321 W"\nsource = "p. 3"\n'
        f"replaces = {replaces}\n"
    )
    plain, printed = indoors(DOOR), indoors(DOOR + quoted.replace("'", '"'))
    gone = set(heat(plain)) - set(heat(printed)) - {"fans", "defrost"}
    assert gone
    for name in gone:
        group = next(entry.group for entry in plain.entries if entry.id == name)
        assert any(word in (name, group) or name.startswith(f"{word}.") for word in replaces)
    kept = {name: watts for name, watts in heat(plain).items() if name not in gone and name != "fans"}
    fans = heat(printed).get("fans", 0.0)
    assert float(printed.hours_w.mean()) == pytest.approx(sum(kept.values()) + 321.0 + fans)
    of: Mapping[str, Any] = given_by(printed, "quoted.as printed")
    assert of["instead_of_w"] == pytest.approx(sum(heat(plain)[name] for name in gone))
