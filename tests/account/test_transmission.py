"""Heat through the envelope: against plain arithmetic, a fine transient solution, and what must always hold."""

import numpy as np
import pytest
from boxes import box_project, construction, door, layer, neighbour, panel
from draws import drawn
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.linalg import solve_banded

from coldbox.account import transmission
from coldbox.account.transmission import envelope
from coldbox.physics import sun
from coldbox.record import Record
from coldbox.scene import body as bodies
from coldbox.scene.build import build

SIGMA = 5.670374419e-8
MASONRY = construction("masonry", layer("brick"), layer(thickness=0.08), layer("concrete", thickness=0.05))


def by_id(scene):
    return {one.id: one for one in transmission.entries(scene)}


def given_input(entry, key):
    return next(one.value for one in entry.inputs if one.key == key)


def surface_of(scene, name):
    return next(one for one in scene.body.surfaces if one.id == name)


# ---- plain arithmetic


def test_a_wall_to_a_room_passes_ua_times_the_difference():
    wall = construction("wall", layer(thickness=0.1, conductivity=0.025))
    project = box_project(site=None, every_face={"neighbour": "room", "construction": "wall"}, constructions=[wall])
    front = by_id(build(project))["front"]
    inner, outer = 4.0 * 2.4, 4.2 * 2.6
    layers = inner + 0.5 * 0.54 * 0.1 * 2 * (4.0 + 2.4) + 0.15 / 3 * 0.01 * 4
    ua = 1.0 / (0.13 / inner + 4.0 / layers + 0.13 / outer)
    assert front.hours_w == pytest.approx(np.full(24, ua * 42.0), rel=1e-12)
    assert front.latent_w.max() == front.moisture_kg_per_day == 0.0
    assert given_input(front, "u_w_per_m2k") == pytest.approx(ua / inner)


def test_a_colder_neighbour_takes_heat_away():
    project = box_project(site=None, every_face={"neighbour": "room"}, faces={"left": {"neighbour": "deep"}},
                          neighbours=[neighbour("deep", temperature=-40.0)])  # fmt: skip
    assert by_id(build(project))["left"].hours_w.max() < 0.0


def test_k_times_the_mean_area_times_the_difference():
    project = box_project(box={"k_value": 0.38, "thickness": 0.08, "temperature": 4.0}, site=None,
                          every_face={"construction": None, "neighbour": "room"})  # fmt: skip
    scene = build(project)
    total = sum(one.hours_w for one in transmission.entries(scene))
    mean = np.sqrt(scene.body.inside_area * scene.body.outside_area)
    assert total == pytest.approx(np.full(24, 0.38 * mean * 20.0), rel=1e-12)
    ua, k_value = transmission.conductance(scene)
    assert (ua, k_value) == (pytest.approx(0.38 * mean), pytest.approx(0.38))


# ---- through the day


def test_the_days_mean_is_ua_times_the_mean_surface_less_the_room():
    project = box_project(every_face={"construction": "masonry"}, constructions=[MASONRY], box={"allowance": 0.05},
                          doors=[door()])  # fmt: skip
    scene = build(project)
    for name, entry in by_id(scene).items():
        if not name.startswith("sun."):
            one = surface_of(scene, name)
            inside = 1.0 / (one.inside_film / one.area + one.resistance / one.effective_area) + one.extra_w_per_k
            expected = inside * (given_input(entry, "surface_mean_c") + 18.0)
            assert entry.hours_w.mean() == pytest.approx(expected, rel=1e-9)


def transient(scene, one, absorbed):
    """Hourly means of heat into the room through one outdoor wall, W/m² of plane wall: implicit finite volumes,
    marched until the day repeats."""
    step = 60.0
    cells = [1 if sheet.resistance < 1e-3 else 12 for sheet in one.sheets]
    parts = list(zip(one.sheets, cells, strict=True))
    resistance = np.concatenate([np.full(count, sheet.resistance / count) for sheet, count in parts])
    capacity = np.concatenate([np.full(count, sheet.heat_capacity / count) for sheet, count in parts])
    between = 1.0 / (0.5 * (resistance[:-1] + resistance[1:]))
    inward = 1.0 / (0.5 * resistance[-1] + one.inside_film)
    outward = 1.0 / (0.5 * resistance[0])
    weather, room = scene.weather, scene.room.temperature_c
    convection = 4.0 + 4.0 * weather.wind
    share = 0.5 * (1.0 + np.cos(np.radians(one.tilt)))
    t, last = np.full(len(capacity), 10.0), None
    for _ in range(40):
        hours = np.empty(24)
        for hour in range(24):
            air, sky, sun = weather.air.temperature_c[hour], weather.sky_c[hour], absorbed[hour]
            gained = sun + one.emissivity * SIGMA * (share * (sky + 273.15) ** 4 + (1 - share) * (air + 273.15) ** 4)
            gained += convection * air
            mean = 0.0
            for _ in range(round(3600 / step)):
                # The balance of the surface, linear about the outermost cell, in series with half of that cell.
                emitted = one.emissivity * SIGMA * (t[0] + 273.15) ** 4
                film = 4 * emitted / (t[0] + 273.15) + convection
                level = t[0] + (gained - emitted - convection * t[0]) / film
                outer = 1.0 / (1.0 / film + 1.0 / outward)
                diagonal = capacity / step
                diagonal[:-1] += between
                diagonal[1:] += between
                diagonal[0] += outer
                diagonal[-1] += inward
                right = capacity / step * t
                right[0] += outer * level
                right[-1] += inward * room
                band = np.zeros((3, len(t)))
                band[0, 1:], band[1], band[2, :-1] = -between, diagonal, -between
                t = solve_banded((1, 1), band, right)
                mean += inward * (t[-1] - room) * step / 3600
            hours[hour] = mean
        if last is not None and np.abs(hours - last).max() < 1e-3:
            return hours
        last = hours
    raise AssertionError("the day does not repeat")


@pytest.mark.parametrize("made", ["masonry", "pir100"])
def test_hour_by_hour_as_a_fine_transient_solution(made):
    scene = build(box_project(box={"bearing": 247.5}, every_face={"construction": made, "colour": "dark"},
                              constructions=[MASONRY]))  # fmt: skip
    one = surface_of(scene, "front")
    scale = one.effective_area
    # A plane wall: the film carried to the layers' area, the outside balance to its own.
    plane = one.replace(inside_film=one.inside_film * scale / one.area, area=1.0, effective_area=1.0, outside_area=1.0)
    lone = scene.replace(body=scene.body.replace(surfaces=(plane,)))
    found = by_id(lone)
    ours = sum(entry.hours_w for entry in found.values())
    weather = scene.weather
    light = sun.day_on_surface(weather.sun.beam_normal, weather.sun.diffuse_horizontal, weather.sun.altitude,
                               weather.sun.azimuth, one.azimuth, 90.0, 0.2).total  # fmt: skip
    expected = transient(scene, plane, one.absorptance * light)
    swing = np.ptp(expected)
    assert ours.mean() == pytest.approx(expected.mean(), rel=2e-3)
    # Steps of the hourly driving show in a light panel; a wave of hourly means rounds them off.
    assert np.abs(ours - expected).max() < 0.06 * swing


def test_masonry_delays_and_flattens_where_a_panel_follows():
    light, heavy = (
        by_id(build(box_project(every_face={"construction": name}, constructions=[MASONRY])))["back"].hours_w
        for name in ("pir100", "masonry")
    )
    assert 14 <= light.argmax() <= 17
    assert heavy.argmax() >= 19 or heavy.argmax() <= 6
    assert np.ptp(heavy) / heavy.mean() < 0.4 * np.ptp(light) / light.mean()


def test_a_roof_cools_the_room_under_a_clear_night_sky():
    project = box_project(box={"temperature": 21.0}, site={"wind": 0.5}, doors=[])
    ceiling = by_id(build(project))["ceiling"]
    assert ceiling.hours_w.min() < 0.0 < ceiling.hours_w.max()
    still = by_id(build(project.replace(site=project.site.replace(sky="none"))))["ceiling"]
    assert still.hours_w.min() > ceiling.hours_w.min()


def test_joints_bring_their_heat_with_the_surface():
    joined = construction("joined", edge_loss=0.03)
    with_, without = (
        by_id(build(box_project(every_face={"construction": name}, constructions=[joined], site={"sky": "none"})))[
            "back"
        ]
        for name in ("joined", "pir100")
    )
    extra = 0.03 * 2 * (4.0 + 2.4)
    assert with_.hours_w.mean() - without.hours_w.mean() == pytest.approx(
        extra * (given_input(with_, "surface_mean_c") + 18.0), rel=0.01
    )


def test_air_under_a_vehicle_is_outdoor_air_out_of_sun_and_sky():
    scene = build(box_project(faces={"floor": {"neighbour": "road", "colour": "dark"}}))
    found = by_id(scene)
    one = surface_of(scene, "floor")
    assert "sun.floor" not in found
    expected = (bodies.conductance(one)) * (scene.weather.air.temperature_c.mean() + 18.0)
    assert found["floor"].hours_w.mean() == pytest.approx(expected, rel=1e-9)
    assert found["floor"].hours_w.max() > 1.05 * expected


# ---- what must always hold


def test_nothing_passes_where_all_is_equal():
    even = box_project(
        site={"sky": "none", "dry_bulb": 20.0, "daily_range": 0.0, "ground_temperature": 20.0, "yearly_swing": 0.0},
        box={"temperature": 20.0, "allowance": 0.1},
        faces={"left": {"neighbour": "room"}, "floor": {"neighbour": "ground"}, "right": {"construction": "masonry"}},
        neighbours=[neighbour(temperature=20.0)],
        constructions=[MASONRY],
        doors=[door(), door("glass", solar_gain=0.5)],
    )
    for under in ("ground", "void", "road", "outdoors"):
        faces = {**even.faces, "floor": even.faces["floor"].replace(neighbour=under)}
        for way in ("hourly", "allowance"):
            scene = build(even.replace(faces=faces, box=even.box.replace(sun=way)))
            for entry in transmission.entries(scene):
                assert entry.group == "transmission"
                assert np.abs(entry.hours_w).max() < 1e-8


@settings(max_examples=40, deadline=None)
@given(
    st.floats(0.03, 0.15), st.floats(1.05, 2.0), st.floats(-30.0, 15.0),
    st.sampled_from(["outdoors", "room", "ground"]), st.sampled_from(["hourly", "allowance"]),
    st.floats(0.0, 0.006), st.booleans(),
)  # fmt: skip
def test_more_insulation_never_lets_more_in(thickness, more, room, behind, way, factor, masonry):
    daily = []
    for thick in (thickness, thickness * more):
        foam = layer(thickness=thick, temperature_factor=factor)
        made = construction("wall", *([layer("brick")] if masonry else []), foam)
        project = box_project(
            box={"temperature": room, "sun": way}, every_face={"construction": "wall"},
            faces={"floor": {"neighbour": behind}}, constructions=[made],
            site={"dry_bulb": 40.0, "ground_temperature": 18.0},
        )  # fmt: skip
        daily.append({name: entry.daily_j for name, entry in by_id(build(project)).items()})
    for name, heat in daily[0].items():
        assert daily[1][name] <= heat * (1 + 1e-9) + 1e-6


def test_order_changes_nothing_and_equal_doors_count():
    doors = [door("a"), door("b", width=1.2, solar_gain=0.3), door("c", face="left")]
    panels = [panel("w", face="back"), panel("v", face="ceiling", neighbour="room")]
    one = by_id(build(box_project(doors=doors, panels=panels)))
    other = by_id(build(box_project(doors=doors[::-1], panels=panels[::-1])))
    assert one.keys() == other.keys()
    for name, entry in one.items():
        assert np.allclose(entry.hours_w, other[name].hours_w, rtol=1e-9)
    pair = by_id(build(box_project(doors=[door(count=2)])))["doors.main"].hours_w
    single = by_id(build(box_project(doors=[door()])))["doors.main"].hours_w
    assert np.allclose(pair, 2.0 * single, rtol=1e-9)


def test_sensible_and_latent_make_the_whole_and_inputs_are_named():
    for entry in transmission.entries(build(box_project(doors=[door()], faces={"floor": {"neighbour": "ground"}}))):
        assert np.array_equal(entry.sensible_w + entry.latent_w, entry.hours_w)
        assert entry.hours_w.shape == (24,)
        assert entry.method and entry.source and entry.formula
        assert len({one.key for one in entry.inputs}) == len(entry.inputs)


@pytest.mark.parametrize("changes", [
    {"faces": {"floor": {"neighbour": "ground"}}},
    {"faces": {"floor": {"neighbour": "void"}}, "box": {"sun": "allowance"}},
    {"faces": {"floor": {"neighbour": "road"}}, "box": {"k_value": 0.4, "thickness": 0.08},
     "every_face": {"construction": None}},
    {"box": {"bearing": None, "films": "natural", "allowance": 0.05}, "faces": {"left": {"neighbour": "room"}}},
])  # fmt: skip
def test_draws_at_once_equal_the_same_boxes_one_by_one(changes):
    project = box_project(doors=[door(), door("glass", solar_gain=0.4)], constructions=[MASONRY], **changes)
    many = drawn(project, 3, 0.02)
    if project.box.bearing is None:
        # One bearing is chosen for all draws: held apart here.
        many = many.replace(box=many.box.replace(bearing=many.outage.asked / 86400.0 * 45.0))
    together = envelope(build(many))
    for draw in range(3):
        alone = envelope(build(picked(many, draw)))
        assert len(alone.entries) == len(together.entries)
        for one, all_ in zip(alone.entries, together.entries, strict=True):
            assert one.id == all_.id
            assert np.allclose(one.hours_w, np.broadcast_to(all_.hours_w, (3, 24))[draw], rtol=1e-6, atol=1e-5)
        assert alone.ua_w_per_k == pytest.approx(np.ravel(together.ua_w_per_k)[draw])
        for one, all_ in zip(alone.surfaces, together.surfaces, strict=True):
            assert one.over_dew_point_k == pytest.approx(np.ravel(all_.over_dew_point_k)[draw], abs=1e-4)


def picked(thing, draw):
    """The same record with the value of one draw everywhere."""
    if isinstance(thing, np.ndarray):
        return float(thing[draw, 0])
    if isinstance(thing, Record):
        return type(thing)(**{name: picked(value, draw) for name, value in thing})
    if isinstance(thing, dict):
        return {key: picked(value, draw) for key, value in thing.items()}
    if type(thing) is tuple:
        return tuple(picked(value, draw) for value in thing)
    return thing


# ---- the outsides


def test_a_surface_sweats_below_the_dew_point_of_the_air_behind():
    thin = construction("thin", layer(thickness=0.01, conductivity=0.03))
    damp = neighbour("damp", temperature=24.0, humidity=0.8)
    project = box_project(site=None, every_face={"neighbour": "damp"}, faces={"left": {"construction": "thin"}},
                          constructions=[thin], neighbours=[damp])  # fmt: skip
    found = {one.id: one for one in envelope(build(project)).surfaces}
    scene = build(project)
    one = surface_of(scene, "left")
    drop = bodies.conductance(one) * 0.13 / one.outside_area * 42.0
    assert found["left"].coldest_c == pytest.approx(24.0 - drop)
    assert found["left"].dew_point_c == pytest.approx(20.3, abs=0.1)
    assert found["left"].over_dew_point_k == pytest.approx(24.0 - drop - found["left"].dew_point_c)
    assert found["left"].over_dew_point_k < 0.0 < found["right"].over_dew_point_k


def test_outdoors_the_outside_follows_the_solved_balance():
    found = {one.id: one for one in envelope(build(box_project(every_face={"colour": "dark"}))).surfaces}
    assert found["ceiling"].warmest_c > 55.0
    assert 32.0 < found["back"].warmest_c < 45.0
    assert found["ceiling"].coldest_c < found["back"].coldest_c < 23.2


def test_by_added_degrees_the_outside_lies_below_the_air_by_the_winds_film():
    project = box_project(box={"sun": "allowance"})
    scene = build(project)
    found = {one.id: one for one in envelope(scene).surfaces}["back"]
    one = surface_of(scene, "back")
    assert one.outside_film < 0.5 * one.inside_film
    air = scene.weather.air.temperature_c
    drop = bodies.conductance(one) * one.outside_film / one.outside_area
    assert found.coldest_c == pytest.approx((air - drop * (air + 18.0)).min())
    assert found.over_dew_point_k == pytest.approx((air - drop * (air + 18.0) - scene.weather.air.dew_point_c).min())
