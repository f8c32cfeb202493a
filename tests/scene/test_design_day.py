"""Air, sky and sun of the design day, hour by hour of the wall clock, and the bearing nobody gave."""

import numpy as np
import psychrolib
import pytest
from boxes import box_project, construction, door, panel, site

from coldbox.account import transmission
from coldbox.physics import moist_air, sun
from coldbox.scene.bearing import POINTS, worst_bearing
from coldbox.scene.build import build
from coldbox.scene.weather import air_temperature, clock_ahead, mean_temperature, weather

SEA = 101325.0


def test_the_day_is_hottest_at_three_by_the_sun_and_coldest_at_five():
    # Clock and sun agree at 15° E on UTC+1: hours 14 and 15 share the peak, hours 4 and 5 the trough.
    day = air_temperature(site(longitude=15.0, clock=1.0, dry_bulb=32.0, daily_range=10.0))
    assert day[14] == day[15] == day.max() == pytest.approx(32.0 - 0.015 * 10.0)
    assert day[5] == pytest.approx(32.0 - 0.99 * 10.0)
    assert day.min() == pytest.approx(32.0 - 0.995 * 10.0)
    assert day.mean() == pytest.approx(mean_temperature(site(dry_bulb=32.0, daily_range=10.0)))


def test_the_wall_clock_shifts_the_day_by_what_it_is_ahead_of_the_sun():
    level = air_temperature(site(longitude=15.0, clock=1.0))
    assert np.allclose(np.roll(level, 1), air_temperature(site(longitude=15.0, clock=2.0)))
    assert np.allclose(np.roll(level, -3), air_temperature(site(longitude=15.0, clock=-2.0)))
    half = air_temperature(site(longitude=22.5, clock=1.0))
    # Half an hour off lies the exact mean over the shifted hour of straight lines between the table's hours.
    fine = np.interp((np.arange(2400) + 0.5) / 100 + 0.5, np.arange(26), np.r_[level_points(), level_points()[:2]])
    assert np.allclose(half, fine.reshape(24, 100).mean(axis=1), atol=1e-4)
    assert clock_ahead(site(longitude=22.5, clock=1.0)) == pytest.approx(-0.5)


def level_points():
    """Temperatures at full hours of sun time, from the table, not from the code's means."""
    below = [82, 87, 92, 96, 99, 100, 98, 93, 84, 71, 56, 39, 23, 11, 3, 0, 3, 10, 21, 34, 47, 58, 68, 76]
    return 32.0 - 9.0 * np.array(below) / 100.0


def test_the_air_keeps_its_water_until_it_cannot():
    dry = weather(site(humidity=0.45), SEA).air
    psychrolib.SetUnitSystem(psychrolib.SI)
    assert np.allclose(dry.humidity_ratio, psychrolib.GetHumRatioFromRelHum(32.0, 0.45, SEA), rtol=2e-3)
    assert np.ptp(dry.humidity_ratio) == 0.0
    damp = weather(site(humidity=0.9, daily_range=12.0), SEA).air
    saturated = damp.relative_humidity == 1.0
    assert saturated.any() and not saturated.all()
    assert np.all(damp.dew_point_c <= damp.temperature_c)
    assert np.allclose(damp.dew_point_c[saturated], damp.temperature_c[saturated])
    held = moist_air.saturation_humidity_ratio(damp.temperature_c, SEA)
    assert np.allclose(damp.humidity_ratio[saturated], held[saturated])


def test_a_wet_bulb_gives_the_same_day_as_the_humidity_it_stands_for():
    wet = moist_air.wet_bulb(32.0, moist_air.humidity_ratio(32.0, 0.45, SEA), SEA)
    one, other = weather(site(), SEA), weather(site(humidity=None, wet_bulb=wet), SEA)
    assert np.allclose(one.air.humidity_ratio, other.air.humidity_ratio, rtol=1e-6)


def test_pressure_follows_the_altitude():
    assert build(box_project()).pressure == pytest.approx(SEA)
    assert build(box_project(site={"altitude": 1500.0})).pressure == pytest.approx(84556, rel=1e-3)


def test_skies():
    clear, overcast, none = (weather(site(sky=sky), SEA) for sky in ("clear", "overcast", "none"))
    assert np.all(clear.sky_c < clear.air.temperature_c - 5.0)
    assert np.array_equal(overcast.sky_c, overcast.air.temperature_c)
    assert np.array_equal(none.sky_c, none.air.temperature_c) and none.sun is None
    assert not overcast.sun.beam_normal.any()
    whole = clear.sun.beam_normal * np.sin(np.radians(clear.sun.altitude).clip(0)) + clear.sun.diffuse_horizontal
    assert np.allclose(overcast.sun.diffuse_horizontal, 0.25 * whole)


def test_three_instants_an_hour_are_near_sixty():
    place = site()
    made = weather(place, SEA).sun
    fine_at = sun.instants(place.clock, 60)
    stands = sun.position(place.latitude, place.longitude, 7, 21, fine_at)
    beam, diffuse = sun.clear_sky(place.tau_beam, place.tau_diffuse, 202, stands.altitude)
    for azimuth, tilt in ((0.0, 0.0), (90.0, 90.0), (200.0, 90.0), (300.0, 90.0)):
        ours = sun.day_on_surface(
            made.beam_normal, made.diffuse_horizontal, made.altitude, made.azimuth, azimuth, tilt, 0.2
        ).total
        fine = sun.day_on_surface(beam, diffuse, stands.altitude, stands.azimuth, azimuth, tilt, 0.2).total
        assert np.allclose(ours, fine, atol=4.0)
        assert ours.sum() == pytest.approx(fine.sum(), rel=2e-3)


def test_the_sun_stands_highest_when_the_clock_says_so():
    # 14.7° E on UTC+2 in late July: noon by the sun is 12:00 + 61 min + 6 min of the equation of time.
    day = weather(site(), SEA).sun
    noon = (int(day.altitude.argmax()) + 0.5) / 3
    assert noon == pytest.approx(13.12, abs=0.2)
    assert day.azimuth[day.altitude.argmax()] == pytest.approx(180.0, abs=4.0)
    south = weather(site(latitude=-33.9, month=1), SEA).sun
    assert min(south.azimuth[south.altitude.argmax()], 360 - south.azimuth[south.altitude.argmax()]) < 12.0


# ---- the bearing


def peak_of_sun(scene):
    total = sum(one.hours_w for one in transmission.entries(scene) if one.group == "sun")
    return total.max()


@pytest.mark.parametrize("place", [{}, {"latitude": -33.9, "longitude": 18.4, "month": 1}, {"latitude": 1.0}])
def test_the_chosen_bearing_is_the_worst_of_sixteen(place):
    glass = construction("glass", u_value=1.5, thickness=0.03)
    project = box_project(
        site=place,
        box={"bearing": None},
        faces={"left": {"shade": 1.0}, "back": {"colour": "dark"}, "floor": {"neighbour": "void"}},
        panels=[panel("window", face="right", construction="glass", solar_gain=0.4)],
        constructions=[glass],
    )
    scene = build(project)
    peaks = []
    for point in range(POINTS):
        there = build(project.replace(box=project.box.replace(bearing=22.5 * point)))
        peaks.append(peak_of_sun(there))
    assert peak_of_sun(scene) >= 0.995 * max(peaks)
    assert max(peaks) > 1.2 * min(peaks)
    assert transmission.facts(scene)["bearing_deg"] == worst_bearing(scene.body, scene.weather)
    lit = next(one for one in transmission.entries(scene) if one.id == "sun.panels.window")
    assert "worst of 16" in lit.remark


def test_no_bearing_is_made_up_without_sun_or_without_walls_outdoors():
    assert build(box_project(site={"sky": "none"}, box={"bearing": None})).body.surfaces[0].azimuth is None
    inside = build(box_project(box={"bearing": None}, every_face={"neighbour": "room"}))
    assert {one.azimuth for one in inside.body.surfaces} == {None}


def test_neighbours_have_their_airs():
    scene = build(box_project(doors=[door(neighbour="room")]))
    assert scene.airs["room"].temperature_c == 24.0
    assert scene.airs["road"] is scene.airs["void"] is scene.airs["outdoors"]
    assert build(box_project(site=None, every_face={"neighbour": "room"})).airs.keys() == {"room"}
