"""Sun on walls, roofs and glass: both methods, on both sides of the equator."""

import numpy as np
import pytest
from boxes import box_project, door, panel
from hypothesis import given, settings
from hypothesis import strategies as st

from coldbox.account import transmission
from coldbox.physics import sun
from coldbox.scene import body as bodies
from coldbox.scene.build import build

COLOURS = ("white", "light", "medium", "dark")


def by_id(project):
    return {one.id: one for one in transmission.entries(build(project))}


def test_glass_lets_in_its_share_of_what_falls_on_it():
    project = box_project(panels=[panel("window", width=1.2, height=0.8, solar_gain=0.55, shade=0.2)])
    scene = build(project)
    day = scene.weather.sun
    falls = sun.day_on_surface(
        day.beam_normal, day.diffuse_horizontal, day.altitude, day.azimuth, 180.0, 90.0, 0.2
    ).total
    lit = by_id(project)["sun.panels.window"]
    assert lit.hours_w == pytest.approx(0.55 * 0.8 * 0.96 * falls, rel=1e-12)
    assert lit.group == "sun"
    assert "absorptance" not in {one.key for one in lit.inputs}


def test_glass_is_cut_out_of_its_face_and_counted_once():
    bare, glazed = by_id(box_project()), by_id(box_project(panels=[panel("window", solar_gain=0.5)]))
    # What the rest of the wall gets falls by its area; through the glass nothing is absorbed outside as well.
    assert glazed["sun.front"].daily_j < bare["sun.front"].daily_j
    assert glazed["sun.front"].daily_j == pytest.approx(bare["sun.front"].daily_j * (9.6 - 1.0) / 9.6, rel=0.01)


@settings(max_examples=30, deadline=None)
@given(st.floats(0.0, 0.9), st.sampled_from(["hourly", "allowance"]), st.floats(0.0, 360.0), st.floats(-60.0, 60.0))
def test_darker_or_less_shaded_is_never_less_sun(shade, way, bearing, latitude):
    daily = []
    for colour in COLOURS:
        looks = {"colour": colour, "shade": shade}
        project = box_project(site={"latitude": latitude}, box={"sun": way, "bearing": bearing}, every_face=looks)
        daily.append({name: one.daily_j for name, one in by_id(project).items() if one.group == "sun"})
    for lighter, darker in zip(daily, daily[1:], strict=False):
        for name in {**lighter, **darker}:
            assert darker.get(name, 0.0) >= lighter.get(name, 0.0) - 1e-6
    unshaded = by_id(box_project(site={"latitude": latitude}, box={"sun": way, "bearing": bearing},
                                 every_face={"colour": "dark"}))  # fmt: skip
    for name, heat in daily[-1].items():
        assert unshaded[name].daily_j >= heat - 1e-6


def test_sun_adds_to_what_passes_without_it_and_to_nothing_else():
    lit = by_id(box_project(every_face={"colour": "dark"}))
    shaded = by_id(box_project(every_face={"colour": "dark", "shade": 1.0}))
    for name in ("front", "right", "back", "left", "ceiling"):
        assert np.allclose(lit[name].hours_w, shaded[name].hours_w, atol=1e-4)
        assert lit[f"sun.{name}"].daily_j > 0.0
        assert f"sun.{name}" not in shaded
    assert "sun.floor" not in lit


def test_each_wall_has_its_sun_at_its_time_of_day():
    found = by_id(box_project(every_face={"colour": "dark"}))
    # The clock is an hour ahead of the sun: noon is a little after 13:00.
    peaks = {name: int(found[f"sun.{name}"].hours_w.argmax()) for name in ("right", "ceiling", "front", "left")}
    assert 7 <= peaks["right"] <= 10 < peaks["ceiling"] <= 14 < peaks["left"] <= 18
    assert 12 <= peaks["front"] <= 14


def test_south_of_the_equator_the_north_wall_is_the_sunny_one():
    north, south = (
        by_id(box_project(every_face={"colour": "dark"}, site={"latitude": latitude, "month": month}))
        for latitude, month in ((45.0, 6), (-45.0, 12))
    )
    assert north["sun.front"].daily_j > 1.5 * north["sun.back"].daily_j
    assert south["sun.back"].daily_j > 1.5 * south["sun.front"].daily_j


def test_under_cloud_all_walls_alike_and_under_no_sun_none():
    found = by_id(box_project(site={"sky": "overcast"}, every_face={"colour": "dark"}))
    walls = [found[f"sun.{name}"].daily_j / area for name, area in
             (("front", 9.6), ("back", 9.6), ("left", 7.2), ("right", 7.2))]  # fmt: skip
    assert max(walls) < 1.02 * min(walls)
    assert found["sun.front"].source == "kasten-czeplak-1980"
    assert not [name for name in by_id(box_project(site={"sky": "none"})) if name.startswith("sun.")]


# ---- the handbook's added degrees


@pytest.mark.parametrize(("latitude", "front", "back"), [(55.1, 3.0, None), (-33.0, None, 3.0)])
def test_added_degrees_are_the_tables_mirrored_south_of_the_equator(latitude, front, back):
    project = box_project(site={"latitude": latitude}, box={"sun": "allowance"}, every_face={"colour": "dark"})
    scene, found = build(project), by_id(project)
    ua = {one.id: bodies.conductance(one) for one in scene.body.surfaces}
    for name, added in (("front", front), ("back", back), ("right", 5.0), ("left", 5.0), ("ceiling", 11.0)):
        if added is None:
            assert f"sun.{name}" not in found
        else:
            assert found[f"sun.{name}"].hours_w == pytest.approx(np.full(24, ua[name] * added))
            assert found[f"sun.{name}"].source == "ashrae-r-loads"


def test_added_degrees_replace_every_term_of_sun_and_sky():
    for sky in ("clear", "none"):
        project = box_project(box={"sun": "allowance"}, site={"sky": sky}, doors=[door("glass", solar_gain=0.5)])
        scene, found = build(project), by_id(project)
        for one in scene.body.surfaces:
            expected = bodies.conductance(one) * (scene.weather.air.temperature_c + 18.0)
            assert found[one.id].hours_w == pytest.approx(expected)
    assert not [name for name in found if name.startswith("sun.")]


def test_a_wall_between_two_directions_takes_the_larger():
    for bearing, expected in ((135.0, 4.0), (225.0, 4.0), (45.0, 4.0), (180.0, 3.0), (0.0, None), (20.0, None)):
        found = by_id(box_project(box={"sun": "allowance", "bearing": bearing}, every_face={"colour": "medium"}))
        added = (
            [one.value for one in found["sun.front"].inputs if one.key == "added_k"] if "sun.front" in found else [None]
        )
        assert added == [expected]


def test_both_methods_agree_on_the_size_of_it():
    # The handbook's degrees stand for the day's mean of the sun and sky together; both must lie in one range.
    hourly, allowed = (
        by_id(box_project(box={"sun": way}, every_face={"colour": "medium"})) for way in ("hourly", "allowance")
    )
    for name in ("ceiling", "left", "right", "front"):
        added = [one.daily_j for one in (hourly[f"sun.{name}"], allowed[f"sun.{name}"])]
        assert 0.4 < added[0] / added[1] < 2.5
