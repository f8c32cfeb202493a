"""The sun against a solar reference library, closed forms, and plain sense."""

from __future__ import annotations

import numpy as np
import pandas as pd
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from pvlib import atmosphere, clearsky, irradiance, solarposition

from coldbox.errors import OutOfValidity
from coldbox.physics import sun
from coldbox.physics.number import FloatArray

angles = st.floats(0.0, 360.0)
heights = st.floats(-90.0, 90.0)
fluxes = st.floats(0.0, 1200.0)


def moments(count: int, seed: int) -> pd.DatetimeIndex:
    """Random instants from 1950 to 2050."""
    seconds = np.random.default_rng(seed).integers(-631152000, 2556057600, count)
    return pd.to_datetime(seconds, unit="s", utc=True)


def apart(altitude_1: FloatArray, azimuth_1: FloatArray, altitude_2: FloatArray, azimuth_2: FloatArray) -> FloatArray:
    """Angle between two directions, degrees, exact where they are close."""
    h1, h2 = np.radians(altitude_1), np.radians(altitude_2)
    turn = np.radians(azimuth_1 - azimuth_2)
    squared = np.sin((h1 - h2) / 2) ** 2 + np.cos(h1) * np.cos(h2) * np.sin(turn / 2) ** 2
    return np.degrees(2.0 * np.arcsin(np.sqrt(squared)))


@pytest.mark.parametrize("latitude", [-89.0, -66.6, -33.9, -1.0, 0.0, 23.4, 43.0, 60.2, 78.2, 89.5])
def test_position_agrees_with_the_reference_library(latitude: float) -> None:
    longitude = (latitude * 7.7) % 360.0 - 180.0
    when = moments(400, seed=int(latitude * 10) + 5000)
    reference = solarposition.spa_python(when, latitude, longitude)
    hours = when.hour + when.minute / 60.0 + when.second / 3600.0
    ours = sun.position(
        latitude, longitude, when.month.to_numpy(float), when.day.to_numpy(float), hours.to_numpy(float),
        when.year.to_numpy(float),
    )  # fmt: skip
    distance = apart(ours.altitude, ours.azimuth, reference.elevation.to_numpy(), reference.azimuth.to_numpy())
    assert distance.max() < 0.02
    assert np.abs(ours.equation_of_time - reference.equation_of_time.to_numpy()).max() < 0.06
    assert np.all((ours.azimuth >= 0.0) & (ours.azimuth < 360.0))


def test_hours_run_over_midnight_into_the_next_day() -> None:
    late, early = sun.position(43.0, -8.0, 7, 21, 26.5), sun.position(43.0, -8.0, 7, 22, 2.5)
    assert late.altitude == pytest.approx(early.altitude, abs=1e-9)
    assert late.azimuth == pytest.approx(early.azimuth, abs=1e-9)


def test_the_clock_is_ahead_of_utc_eastward() -> None:
    # At 30° E under UTC+2 the clock shows sun time, but for the equation of time: 6 minutes on 21 July.
    at = sun.position(30.0, 30.0, 7, 21, sun.instants(2.0, 60))
    assert np.argmax(at.altitude) == pytest.approx(12 * 60 + 6, abs=2)


@pytest.mark.parametrize(("place", "year"), [((43.0, -8.0), 1949), ((91.0, 0.0), 2026), ((0.0, 181.0), 2026)])
def test_position_refuses_what_it_was_not_made_for(place: tuple[float, float], year: int) -> None:
    with pytest.raises(OutOfValidity):
        sun.position(*place, 7, 21, 12.0, year)


def test_days_are_counted_as_the_calendar_does() -> None:
    for year in (1952, 1999, 2000, 2026, 2028):
        days = pd.date_range(f"{year}-01-01", f"{year}-12-31")
        got = sun.day_of_year(days.month.to_numpy(float), days.day.to_numpy(float), float(year))
        assert np.array_equal(got, days.day_of_year.to_numpy())


def test_air_mass_and_extraterrestrial_agree_with_the_reference_library() -> None:
    altitude = np.linspace(0.0, 90.0, 181)
    reference = atmosphere.get_relative_airmass(90.0 - altitude, model="kastenyoung1989")
    assert sun.air_mass(altitude) == pytest.approx(reference, rel=1e-9)
    days = np.arange(1.0, 366.0)
    spencer = irradiance.get_extra_radiation(days, solar_constant=1367.0, method="spencer")
    assert sun.extraterrestrial(days) == pytest.approx(spencer, rel=4e-3)
    with pytest.raises(OutOfValidity):
        sun.air_mass(-0.5)


def test_incidence_and_ground_agree_with_the_reference_library() -> None:
    rng = np.random.default_rng(3)
    altitude, azimuth = rng.uniform(1, 90, 500), rng.uniform(0, 360, 500)
    facing, tilt = rng.uniform(0, 360, 500), rng.uniform(0, 179, 500)
    reference = irradiance.aoi_projection(tilt, facing, 90.0 - altitude, azimuth)
    assert sun.cos_incidence(altitude, azimuth, facing, tilt) == pytest.approx(reference, abs=1e-12)
    got = sun.on_surface(700.0, 120.0, altitude, azimuth, facing, tilt, 0.25)
    level = 700.0 * np.sin(np.radians(altitude)) + 120.0
    assert got.ground == pytest.approx(irradiance.get_ground_diffuse(tilt, level, albedo=0.25), abs=1e-9)
    even = sun.on_surface(700.0, 120.0, altitude, azimuth, facing, tilt, 0.25, overcast=True)
    assert even.sky == pytest.approx(irradiance.isotropic(tilt, 120.0), abs=1e-9)


def test_the_sky_of_a_wall_follows_its_ratio_to_the_horizontal() -> None:
    # Facing the sun at the horizon Y = 0.55 + 0.437 + 0.313 = 1.3; square to it 0.55; behind it never below 0.45.
    for turned, ratio in ((0.0, 1.3), (90.0, 0.55), (180.0, 0.45)):
        assert sun.on_surface(0.0, 100.0, 1e-9, 0.0, turned, 90.0, 0.0).sky == pytest.approx(100.0 * ratio)
    assert sun.on_surface(0.0, 100.0, 30.0, 0.0, 77.0, 0.0, 0.9).total == pytest.approx(100.0)


def test_clear_sky_lies_near_another_model_of_it() -> None:
    # A plausible summer sky: another published model of the same sky (Ineichen, turbidity 3) within 15 %.
    altitude = np.array([20.0, 40.0, 60.0, 80.0])
    reference = clearsky.ineichen(
        90.0 - altitude, atmosphere.get_relative_airmass(90.0 - altitude), 3.0, dni_extra=1330
    )
    beam, diffuse = sun.clear_sky(0.36, 2.35, 180.0, altitude)
    level = beam * np.sin(np.radians(altitude)) + diffuse
    assert level == pytest.approx(reference["ghi"], rel=0.10)
    assert beam == pytest.approx(reference["dni"], rel=0.15)


def test_night_is_dark_and_a_floor_sees_no_sun() -> None:
    beam, diffuse = sun.clear_sky(0.4, 2.2, 202.0, np.array([-90.0, -5.0, 0.0, 40.0]))
    assert np.all(beam[:3] == 0.0) and np.all(diffuse[:3] == 0.0) and beam[3] > 500.0
    floor = sun.on_surface(900.0, 100.0, 50.0, 180.0, 180.0, 180.0, 0.5)
    assert float(floor.total) == pytest.approx(0.0, abs=1e-9)
    assert sun.overcast_sky(800.0, 100.0, 30.0) == pytest.approx(0.25 * 500.0)


@pytest.mark.parametrize("tau", [(0.0, 2.0), (0.4, -1.0), (6.0, 2.0)])
def test_clear_sky_refuses_impossible_depths(tau: tuple[float, float]) -> None:
    with pytest.raises(OutOfValidity):
        sun.clear_sky(*tau, 202.0, 45.0)


def test_hour_means_are_those_of_a_fine_series() -> None:
    walls = np.arange(0.0, 360.0, 45.0)[:, None]

    def day(per_hour: int) -> FloatArray:
        at = sun.position(43.0, -8.0, 3, 21, sun.instants(1.0, per_hour))
        sky = sun.clear_sky(0.4, 2.2, 80.0, at.altitude)
        return sun.day_on_surface(*sky, at.altitude, at.azimuth, walls, 90.0, 0.2).total

    assert np.abs(day(6) - day(120)).max() < 1.5
    assert np.abs(day(1) - day(120)).max() > 20.0  # one instant an hour would not do


def test_a_day_is_the_mean_of_its_instants_for_draws_and_surfaces() -> None:
    at = sun.position(43.0, -8.0, 7, 21, sun.instants(2.0))
    depth = np.array([[0.35], [0.5]])
    beam, diffuse = sun.clear_sky(depth, 2.2, 202.0, at.altitude)
    facing, tilt = np.array([0.0, 120.0, 240.0]).reshape(3, 1, 1), np.array([90.0, 45.0, 0.0]).reshape(3, 1, 1)
    day = sun.day_on_surface(beam, diffuse, at.altitude, at.azimuth, facing, tilt, np.array([[0.2], [0.3]]))
    assert day.total.shape == (3, 2, 24)
    for i, j in ((0, 0), (1, 1), (2, 0)):
        one = sun.on_surface(
            beam[j], diffuse[j], at.altitude, at.azimuth, float(facing[i, 0, 0]), float(tilt[i, 0, 0]), (0.2, 0.3)[j]
        )
        for part in ("beam", "sky", "ground"):
            assert getattr(day, part)[i, j] == pytest.approx(sun.hour_means(getattr(one, part)), abs=1e-9)


@given(angles, angles, heights, st.floats(0.0, 180.0), fluxes, fluxes, st.floats(0.0, 1.0), st.booleans())
@settings(max_examples=200, deadline=None)
def test_no_surface_gets_less_than_nothing(
    azimuth: float, facing: float, altitude: float, tilt: float, beam: float, diffuse: float, ground: float, cloud: bool
) -> None:
    got = sun.on_surface(beam, diffuse, altitude, azimuth, facing, tilt, ground, overcast=cloud)
    assert min(float(got.beam), float(got.sky), float(got.ground)) >= 0.0
    assert float(got.beam) <= beam + 1e-9
    brighter = sun.on_surface(beam, diffuse, altitude, azimuth, facing, tilt, min(1.0, ground + 0.1), overcast=cloud)
    assert float(brighter.total) >= float(got.total)


# The exponents were fitted to real skies: with the sun on the horizon a depth of 1 turns the order around.
@given(st.floats(0.15, 0.7), st.floats(1.2, 3.0), st.floats(10.0, 90.0), st.integers(1, 365))
@settings(max_examples=200, deadline=None)
def test_a_hazier_sky_lets_less_beam_through(depth: float, diffuse_depth: float, altitude: float, day: int) -> None:
    beam, diffuse = sun.clear_sky(depth, diffuse_depth, float(day), altitude)
    hazier, _ = sun.clear_sky(depth * 1.1, diffuse_depth, float(day), altitude)
    outside = float(sun.extraterrestrial(float(day)))
    assert 0.0 <= float(hazier) <= float(beam) < outside
    assert 0.0 < float(diffuse) < outside
