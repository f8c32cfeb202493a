"""Moist air against two reference libraries and against itself: round trips, orders, floats as arrays."""

from __future__ import annotations

import numpy as np
import psychrolib
import pytest
from CoolProp.HumidAirProp import HAPropsSI
from hypothesis import example, given
from hypothesis import strategies as st

from coldbox.errors import OutOfValidity
from coldbox.physics import moist_air

P = 101325.0
psychrolib.SetUnitSystem(psychrolib.SI)
TEMPERATURES = [-40.0, -30.0, -20.0, -10.0, -5.0, -0.5, 0.5, 5.0, 10.0, 20.0, 30.0, 40.0, 50.0]
HUMIDITIES = [0.05, 0.3, 0.6, 0.9, 1.0]
PRESSURES = [101325.0, 80000.0]
STATES = [(t, rh, p) for t in TEMPERATURES for rh in HUMIDITIES for p in PRESSURES]

temperatures = st.floats(-40.0, 60.0)
humidities = st.floats(0.02, 1.0)
pressures = st.floats(60000.0, 105000.0)


@pytest.fixture(scope="module")
def table():
    t, rh, p = (np.array(column) for column in zip(*STATES, strict=True))
    return t, rh, p, moist_air.humidity_ratio(t, rh, p)


def test_saturation_pressure_is_the_librarys():
    t = np.linspace(-99.9, 199.9, 301)
    ours = moist_air.saturation_pressure(t)
    theirs = [psychrolib.GetSatVapPres(x) for x in t]
    np.testing.assert_allclose(ours, theirs, rtol=1e-12)


def test_humidity_ratio_is_the_librarys(table):
    t, rh, p, w = table
    np.testing.assert_allclose(w, [psychrolib.GetHumRatioFromRelHum(*state) for state in STATES], rtol=1e-10, atol=1e-7)


def test_enthalpy_volume_density_are_the_librarys(table):
    t, rh, p, w = table
    rows = list(zip(t, w, p, strict=True))
    theirs = [psychrolib.GetMoistAirEnthalpy(x, y) for x, y, _ in rows]
    np.testing.assert_allclose(moist_air.enthalpy(t, w), theirs, rtol=1e-12)
    # The library's own factor 1.607858 is 1/0.621945 rounded.
    theirs = [psychrolib.GetMoistAirVolume(*row) for row in rows]
    np.testing.assert_allclose(moist_air.specific_volume(t, w, p), theirs, rtol=2e-7)
    theirs = [psychrolib.GetMoistAirDensity(*row) for row in rows]
    np.testing.assert_allclose(moist_air.density(t, w, p), theirs, rtol=2e-7)


def test_dew_point_is_the_librarys(table):
    t, rh, p, w = table
    theirs = np.array([psychrolib.GetTDewPointFromHumRatio(x, y, z) for x, y, z in zip(t, w, p, strict=True)])
    # The library's humidity ratio has a floor of 1e-7 and its dew point a tolerance of 0.001 K.
    kept = w > 1e-6
    np.testing.assert_allclose(moist_air.dew_point(w, p)[kept], theirs[kept], atol=2e-3)


def test_wet_bulb_is_the_librarys(table):
    t, rh, p, w = table
    theirs = np.array([psychrolib.GetTWetBulbFromHumRatio(x, y, z) for x, y, z in zip(t, w, p, strict=True)])
    ours = moist_air.wet_bulb(t, w, p)
    # Near 0 °C wetted and iced bulb both satisfy the equations; the library takes whichever its bisection meets.
    kept = (np.abs(ours) > 1.5) & (w > 1e-6)
    assert kept.sum() > 90
    np.testing.assert_allclose(ours[kept], theirs[kept], atol=2e-3)


def test_real_gas_library():
    """Ideal gases against a real-gas library: within 1 % of water, 0.1 % of volume and 0.5 kJ/kg."""
    for t, rh in [(-20.0, 0.8), (-5.0, 0.9), (2.0, 0.85), (20.0, 0.5), (32.0, 0.6), (45.0, 0.3)]:
        w = moist_air.humidity_ratio(t, rh, P)
        known = ("T", t + 273.15, "P", P, "R", rh)
        assert w == pytest.approx(HAPropsSI("W", *known), rel=0.01)
        assert moist_air.specific_volume(t, w, P) == pytest.approx(HAPropsSI("Vda", *known), rel=1e-3)
        base = HAPropsSI("H", "T", 273.15, "P", P, "W", 0.0)
        assert moist_air.enthalpy(t, w) == pytest.approx(HAPropsSI("H", *known) - base, abs=500.0)
        assert moist_air.wet_bulb(t, w, P) == pytest.approx(HAPropsSI("B", *known) - 273.15, abs=0.15)
        assert moist_air.dew_point(w, P) == pytest.approx(HAPropsSI("D", *known) - 273.15, abs=0.1)


def test_pressure_at_altitude_is_the_librarys():
    z = np.array([-400.0, 0.0, 500.0, 1600.0, 3640.0, 10000.0])
    np.testing.assert_allclose(
        moist_air.pressure_at_altitude(z), [psychrolib.GetStandardAtmPressure(x) for x in z], rtol=1e-12
    )


@given(t=temperatures, rh=humidities, p=pressures)
def test_dew_point_below_wet_bulb_below_dry_bulb(t, rh, p):
    w = moist_air.humidity_ratio(t, rh, p)
    wet, dew = moist_air.wet_bulb(t, w, p), moist_air.dew_point(w, p)
    assert wet <= t
    # Between the iced and the wetted bulb at 0 °C the wet bulb stays at or above the frost point.
    assert dew <= wet + 1e-6


@given(t=temperatures, rh=humidities, p=pressures)
@example(t=0.0, rh=0.99999, p=60000.0)
def test_there_and_back(t, rh, p):
    w = moist_air.humidity_ratio(t, rh, p)
    assert moist_air.relative_humidity(t, w, p) == pytest.approx(rh, rel=1e-12)
    # At 0 °C the curves over ice and over water lie 1e-4 apart, and what falls between them is 0 °C.
    gap = 1.2e-4
    assert moist_air.saturation_humidity_ratio(moist_air.dew_point(w, p), p) == pytest.approx(w, rel=gap)
    wet = moist_air.wet_bulb(t, w, p)
    assert moist_air.humidity_ratio_from_wet_bulb(t, wet, p) == pytest.approx(
        w, rel=gap if abs(wet) < 2e-3 else 1e-7, abs=1e-10
    )


@given(dew=st.floats(-99.0, 150.0))
def test_dew_point_inverts_saturation(dew):
    assert moist_air.dew_point(moist_air.saturation_humidity_ratio(dew, 1e6), 1e6) == pytest.approx(dew, abs=1e-9)


def test_saturated_air_is_at_its_dew_point_and_wet_bulb():
    t = np.array([-30.0, -0.001, 0.0, 0.001, 15.0, 40.0])
    w = moist_air.saturation_humidity_ratio(t, P)
    np.testing.assert_allclose(moist_air.dew_point(w, P), t, atol=1e-9)
    np.testing.assert_allclose(moist_air.wet_bulb(t, w, P), t, atol=1e-6)


def test_floats_and_arrays_agree():
    for t in TEMPERATURES:
        w = moist_air.humidity_ratio(t, 0.7, P)
        for value, many in (
            (w, moist_air.humidity_ratio(np.array([t]), 0.7, P)),
            (moist_air.dew_point(w, P), moist_air.dew_point(np.array([w, 0.01]), P)),
            (moist_air.wet_bulb(t, w, P), moist_air.wet_bulb(np.array([t]), w, P)),
            (moist_air.density(t, w, P), moist_air.density(np.array([t]), w, P)),
        ):
            assert isinstance(value, float)
            assert value == pytest.approx(many[0], rel=1e-12, abs=1e-12)


def test_shapes_broadcast():
    draws, hours = np.full((5, 1), 0.6), np.linspace(-5.0, 30.0, 24)
    w = moist_air.humidity_ratio(hours, draws, P)
    for found in (w, moist_air.dew_point(w, P), moist_air.wet_bulb(hours, w, P), moist_air.enthalpy(hours, w)):
        assert found.shape == (5, 24)
        assert np.isfinite(found).all()


@pytest.mark.parametrize(
    "call",
    [
        lambda: moist_air.saturation_pressure(-101.0),
        lambda: moist_air.saturation_pressure(np.array([20.0, 201.0])),
        lambda: moist_air.saturation_pressure(float("nan")),
        lambda: moist_air.saturation_pressure(np.array([20.0, np.nan])),
        lambda: moist_air.humidity_ratio(20.0, 1.01, P),
        lambda: moist_air.humidity_ratio(20.0, np.array([0.5, -0.1]), P),
        lambda: moist_air.humidity_ratio(120.0, 1.0, P),
        lambda: moist_air.dew_point(0.0, P),
        lambda: moist_air.wet_bulb(20.0, 0.02, P),
        lambda: moist_air.humidity_ratio_from_wet_bulb(20.0, 21.0, P),
        lambda: moist_air.humidity_ratio_from_wet_bulb(40.0, 5.0, P),
        lambda: moist_air.relative_humidity(20.0, -0.001, P),
        lambda: moist_air.pressure_at_altitude(20000.0),
    ],
)
def test_outside_its_range_it_refuses(call):
    with pytest.raises(OutOfValidity):
        call()
