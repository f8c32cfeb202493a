"""What a complete project holds: every name looked up, every default with its reason, nothing left open."""

from __future__ import annotations

import math
from pathlib import Path
from typing import Any

import pytest
from typed import BOXES, LEAST, SITE, project

from coldbox.project import store
from coldbox.project.model import FACES, Project
from coldbox.project.origins import declaration, defaults_used
from coldbox.project.resolve.surroundings import nearest_place
from coldbox.record import Record
from coldbox.tables import load
from coldbox.units.clock import Rate

OUTSIDE = LEAST.replace('"room"', '"outdoors"') + SITE
ON_GROUND = OUTSIDE + '[faces]\nfloor = { neighbour = "ground" }\n'
DOOR = '[[doors]]\nname = "main"\nwidth = "1 m"\nheight = "2 m"\n'


def _numbers(node: Any) -> list[float]:
    if isinstance(node, Record):
        return [number for _, value in node for number in _numbers(value)]
    if isinstance(node, Rate):
        return [float(node.per_second)]
    if isinstance(node, dict):
        return [number for value in node.values() for number in _numbers(value)]
    if isinstance(node, tuple):
        return [number for value in node for number in _numbers(value)]
    return [node] if isinstance(node, int | float) else []


@pytest.mark.parametrize("file", BOXES, ids=lambda file: file.stem)
def test_nothing_stays_open(file: Path) -> None:
    numbers = _numbers(store.open(file))
    assert len(numbers) > 100
    assert all(math.isfinite(number) for number in numbers)


@pytest.mark.parametrize("file", BOXES, ids=lambda file: file.stem)
def test_every_origin_has_what_its_kind_needs(file: Path) -> None:
    found = store.open(file)
    for path, origin in found.origins.items():
        if origin.kind == "typed":
            assert origin.line is not None, path
            if path not in ("name", "units") and not path.endswith((".kind", ".product")):
                first = origin.text.split(",")[0].strip()
                assert first in file.read_text(encoding="utf-8").split("\n")[origin.line - 1], path
        else:
            assert origin.text, path
            assert origin.reason, path
        assert declaration(path) is not None, path
    assert set(found.spreads) <= {path for path, origin in found.origins.items() if origin.kind in ("typed", "option")}


def test_the_least_file_computes_and_tells_its_defaults() -> None:
    used = {path: (shown, reason) for path, shown, reason in defaults_used(project(LEAST))}
    assert used["neighbours.room.temperature"] == ("24 °C", "an ordinary indoor room")
    assert used["box.humidity"][0] == "85 %"
    assert used["sizing.safety"][0] == "10 %"
    assert used["sizing.run_hours"][0] == "16 h"
    assert not any(path.startswith("site") for path in used)


def test_defaults_are_told_in_the_units_of_the_project() -> None:
    text = LEAST.replace("format = 1", 'format = 1\nunits = "IP"')
    used = {path: shown for path, shown, _ in defaults_used(project(text))}
    assert used["neighbours.room.temperature"].replace(" ", "").startswith("75.2")


def test_the_same_default_of_several_things_is_one_row() -> None:
    used = {path: shown for path, shown, _ in defaults_used(project(OUTSIDE))}
    assert used["faces.*.emissivity"] == "90 %"
    assert not any(path.startswith("faces.left") for path in used)


def test_what_only_an_outage_uses_can_be_left_out() -> None:
    everything = {path for path, _, _ in defaults_used(project(LEAST))}
    for_load = {path for path, _, _ in defaults_used(project(LEAST), for_load=True)}
    assert for_load < everything
    assert {path.partition(".")[0] for path in everything - for_load} <= {"outage", "spreads", "machine", "box"}


def test_faces_are_completed_with_what_the_box_says() -> None:
    found = project(
        OUTSIDE.replace(
            "[constructions]", 'colour = "dark"\n[constructions]\nother = { r_value = "RSI 2", thickness = "40 mm" }'
        )
        + '[faces]\nleft = { construction = "other", neighbour = "room", colour = "white" }\n'
    )
    assert tuple(found.faces) == FACES
    left = found.faces["left"]
    assert (left.construction, left.neighbour, left.colour) == ("other", "room", "white")
    for name in FACES:
        if name != "left":
            face = found.faces[name]
            assert (face.construction, face.neighbour, face.colour) == ("wall", "outdoors", "dark")


def test_an_inline_construction_stands_under_its_owners_path() -> None:
    text = LEAST + (
        '[faces]\nceiling = { construction = { layers = [{ material = "PIR foam", thickness = "60 mm" }] } }\n'
        '[[panels]]\nname = "window"\nface = "left"\nwidth = "1 m"\nheight = "1 m"\n'
        'u_value = "1.1 W/m²K"\nthickness = "24 mm"\n'
    )
    found = project(text)
    assert found.faces["ceiling"].construction == "faces.ceiling.construction"
    assert found.constructions["faces.ceiling.construction"].thickness == pytest.approx(0.06)
    assert found.panels[0].construction == "panels.window"
    assert found.constructions["panels.window"].u_value == pytest.approx(1.1)


def test_a_typed_conductivity_holds_as_it_is_and_a_tables_changes_with_temperature() -> None:
    layers = '{ layers = [{ material = "PIR foam", thickness = "60 mm"%s }] }'
    wall = '{ r_value = "RSI 4", thickness = "80 mm" }'
    (of_table,) = project(LEAST.replace(wall, layers % "")).constructions["wall"].layers
    (typed,) = project(LEAST.replace(wall, layers % ', conductivity = "0.03 W/mK"')).constructions["wall"].layers
    assert of_table.temperature_factor > 0
    assert (typed.conductivity, typed.temperature_factor) == (0.03, 0.0)
    assert typed.density == of_table.density
    assert of_table.foam
    assert typed.foam


def test_a_material_of_ones_own_needs_no_table() -> None:
    own = (
        'layers = [{ material = "seaweed mat", thickness = "60 mm", conductivity = "0.045 W/mK", density = "80 kg/m³", '
    )
    text = LEAST.replace('r_value = "RSI 4", thickness = "80 mm"', own + 'specific_heat = "1.8 kJ/kgK" }]')
    (layer,) = project(text).constructions["wall"].layers
    assert (layer.conductivity, layer.density, layer.foam) == (0.045, 80.0, True)


def test_an_air_space_has_an_emissivity_and_no_conductivity() -> None:
    text = LEAST.replace(
        'r_value = "RSI 4", thickness = "80 mm"',
        'layers = [{ material = "air space", thickness = "20 mm", emissivity = "5 %" }]',
    )
    (layer,) = project(text).constructions["wall"].layers
    assert layer.conductivity is None
    assert layer.emissivity == pytest.approx(0.05)


def test_a_panels_height_is_its_faces() -> None:
    one = '[[panels]]\nname = "%s"\nface = "%s"\nwidth = "%s"\n'
    panels = one % ("a", "left", "1 m") + one % ("b", "ceiling", "2 m")
    wall, ceiling = project(LEAST + panels).panels
    assert (wall.height, ceiling.height) == (2.4, 3.0)
    outside = LEAST.replace("height =", 'measured = "outside"\nheight =')
    wall, ceiling = project(outside + panels).panels
    assert wall.height == pytest.approx(2.4 - 2 * 0.08)
    assert ceiling.area == pytest.approx(2 * (3.0 - 2 * 0.08))


def test_what_protects_a_door_multiplies_what_it_lets_through() -> None:
    one = project(LEAST + DOOR + 'protection = "strip curtain"\n').doors[0].effectiveness
    other = project(LEAST + DOOR + 'protection = "vestibule"\n').doors[0].effectiveness
    both = project(LEAST + DOOR + 'protection = ["strip curtain", "vestibule"]\n').doors[0]
    assert 1 - both.effectiveness == pytest.approx((1 - one) * (1 - other))
    typed = project(LEAST + DOOR + 'protection = "strip curtain"\neffectiveness = "50 %"\n').doors[0]
    assert typed.effectiveness == 0.5
    bare = project(LEAST + DOOR).doors[0]
    assert (bare.protection, bare.effectiveness) == ((), 0.0)
    assert project(LEAST + DOOR + 'protection = "air curtain"\n').doors[0].protection_power > 0


def test_a_place_gives_what_is_not_typed() -> None:
    text = LEAST.replace('"room"', '"outdoors"') + '[site]\nplace = "Copenhagen"\ndry_bulb = "30 °C"\n'
    site = project(text).site
    assert site is not None
    assert site.dry_bulb == 30.0
    assert site.latitude == pytest.approx(55.6, abs=0.3)
    assert (site.clock, site.humidity) == (2.0, None)
    assert site.wet_bulb is not None
    assert 5 < site.ground_temperature < 12


def test_the_clock_comes_by_longitude_and_is_said() -> None:
    for longitude, clock in (("14.7° E", 1.0), ("64° W", -4.0), ("0°", 0.0), ("179° W", -12.0)):
        found = project(OUTSIDE.replace("14.7° E", longitude))
        assert found.site is not None
        assert found.site.clock == clock
        assert found.origins["site.clock"].kind == "default"
        assert "longitude" in found.origins["site.clock"].reason


def test_the_hottest_month_is_that_of_the_hemisphere() -> None:
    north, south = project(OUTSIDE).site, project(OUTSIDE.replace("55.1° N", "33° S")).site
    assert north is not None
    assert south is not None
    assert (north.month, south.month) == (7, 1)


def test_ground_takes_the_year_of_the_nearest_place() -> None:
    found = project(ON_GROUND)
    assert "Copenhagen" in found.origins["site.ground_temperature"].reason
    assert "site.ground_temperature" not in project(OUTSIDE).origins
    typed = project(ON_GROUND.replace("[site]", '[site]\nground_temperature = "11 °C"\nyearly_swing = "8 K"'))
    assert typed.site is not None
    assert (typed.site.ground_temperature, typed.site.yearly_swing) == (11.0, 8.0)


@pytest.mark.parametrize(("north", "east"), [(1.0, 0.0), (0.0, 1.5), (-1.2, 1.0)])
def test_the_distance_to_a_place_is_that_of_the_great_circle(north: float, east: float) -> None:
    row = load.row("weather", "Copenhagen")
    name, km = nearest_place(row["latitude"] + north, row["longitude"] + east)
    here, there = math.radians(row["latitude"]), math.radians(row["latitude"] + north)
    cosine = math.sin(here) * math.sin(there) + math.cos(here) * math.cos(there) * math.cos(math.radians(east))
    assert name == "Copenhagen"
    assert km == pytest.approx(6371.0 * math.acos(cosine), rel=1e-6)  # law of cosines on the sphere


def test_only_ground_needs_no_design_day() -> None:
    text = (
        LEAST
        + '[faces]\nfloor = { neighbour = "ground", exposed_edge = "0 m" }\n[site]\nground_temperature = "12 °C"\n'
    )
    found = project(text)
    assert found.site is not None
    assert found.site.ground_temperature == 12.0
    assert not [
        path for path, _, _ in defaults_used(found) if path in ("site.wind", "site.sky", "site.clock", "site.dry_bulb")
    ]


def test_no_bearing_in_the_sun_is_the_worst_and_said() -> None:
    assert project(OUTSIDE).origins["box.bearing"].text == "the worst of 16"
    assert "box.bearing" not in project(LEAST).origins
    assert project(OUTSIDE.replace("height =", 'bearing = "SW"\nheight =')).box.bearing == 225.0


@pytest.mark.parametrize(
    ("room", "defrost", "hours", "humidity"),
    [("-20 °C", "electric", 18, 0.85), ("3 °C", "air", 16, 0.85), ("12 °C", "none", 20, 0.7)],
)
def test_room_and_defrost_give_running_hours_and_humidity(
    room: str, defrost: str, hours: float, humidity: float
) -> None:
    found = project(LEAST.replace("4 °C", room))
    assert found.machine.defrost == defrost
    assert found.sizing.run_hours == hours * 3600
    assert found.box.humidity == humidity
    assert (found.machine.defrost_share > 0) == (defrost == "electric")
    assert bool(found.machine.defrost_at) == (defrost != "none")
    assert found.machine.fan_share > 0


def test_shares_of_fans_and_defrost_end_where_figures_are_given() -> None:
    text = (
        LEAST.replace("4 °C", "-20 °C")
        + '[machine]\nfans = 2\nfan_power = "90 W"\ndefrost_power = "2 kW"\ndefrost_at = ["06:00", "18:00"]\n'
    )
    machine = project(text).machine
    assert (machine.fan_share, machine.defrost_share, machine.defrost_at) == (0.0, 0.0, (6.0, 18.0))


def test_a_box_that_nothing_cools_has_no_fans_and_starts_as_wanted() -> None:
    text = LEAST.replace("height =", "powered = false\nheight =") + (
        '[[packs]]\nkind = "ice"\nmass = "1 kg"\n[[lots]]\nproduct = "milk"\nstored = "5 kg"\n'
    )
    found = project(text)
    assert (found.machine.fan_share, found.machine.defrost) == (0.0, "none")
    assert found.lots[0].start_temperature == 4.0
    assert found.packs[0].start_temperature == 0.0  # frozen, so not warmer than it melts


def test_a_lot_takes_what_its_product_says_and_what_is_typed_wins() -> None:
    lot = '[[lots]]\nproduct = "strawberries"\nstored = "10 kg"\n'
    found = project(LEAST + lot).lots[0]
    assert found.name == "strawberries"
    assert found.composition is not None
    assert found.composition.water == pytest.approx(0.9157)
    assert len(found.respiration) >= 2
    assert found.start_temperature is None
    typed = project(
        LEAST
        + lot
        + 'freezing_point = "-1.5 °C"\n'
        + 'respiration = [{ at = "20 °C", heat = "0.4 W/kg" }, { at = "0 °C", heat = "0.05 W/kg" }]\n'
    )
    assert typed.lots[0].freezing_point == -1.5
    assert [point.at_c for point in typed.lots[0].respiration] == [0.0, 20.0]


def test_packaging_is_told_by_the_day_or_in_all() -> None:
    arrives = (
        LEAST
        + '[[lots]]\nproduct = "milk"\narrives = "100 kg/day"\narrival_temperature = "8 °C"\npackaging = "plastic"\n'
    )
    assert project(arrives + 'packaging_mass = "5 kg/day"\n').lots[0].packaging_mass == pytest.approx(5.0)
    stored = LEAST + '[[lots]]\nproduct = "milk"\nstored = "100 kg"\npackaging = "plastic"\npackaging_mass = "5 kg"\n'
    assert project(stored).lots[0].packaging_mass == 5.0


def test_things_without_a_name_are_called_after_what_they_are() -> None:
    found = project(
        LEAST
        + '[[doors]]\nwidth = "1 m"\nheight = "2 m"\n[[lights]]\npower = "40 W"\n'
        + '[[people]]\ncount = 1\nhours = "always"\n'
    )
    assert (found.doors[0].name, found.lights[0].name, found.people[0].name) == ("door", "lights", "people")
    two = project(LEAST + 2 * '[[doors]]\nwidth = "1 m"\nheight = "1 m"\n')
    assert [door.name for door in two.doors] == ["door 1", "door 2"]


def test_an_event_at_a_duration_counts_from_the_loss_of_power() -> None:
    text = (
        LEAST
        + DOOR
        + (
            '[outage]\nevents = [{ at = "6 h", what = "door open", lasts = "5 min" },'
            ' { at = "day 2 06:00", what = "power on" }]\n'
        )
    )
    first, second = project(text).outage.events
    assert (first.at, first.after, first.door) == (6.0, True, "main")
    assert (second.at, second.after) == (30.0, False)


def test_a_horizon_reaches_as_far_as_is_asked() -> None:
    assert project(LEAST + '[outage]\nasked = "100 h"\n').outage.horizon == 100 * 3600
    assert project(LEAST).outage.horizon == 72 * 3600


def test_two_rooms_that_name_each_other_are_no_cycle() -> None:
    found: Project = project(LEAST + '[neighbours]\nfreezer = { temperature = "-18 °C", project = "freezer" }\n')
    assert found.neighbours["freezer"].project == "freezer"
