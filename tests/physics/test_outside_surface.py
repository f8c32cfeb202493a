"""The outside surface: films against a reference library, the balance against closed forms and plain sense."""

from __future__ import annotations

import math
from typing import Any

import CoolProp.CoolProp as coolprop
import ht
import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from coldbox.errors import NoRoot, OutOfValidity
from coldbox.physics import surface
from coldbox.physics.number import FloatArray
from coldbox.physics.periodic import Response, ThermalLayer, response, to_harmonics, to_hours

SIGMA = 5.670374419e-8
HOURS = np.arange(24) + 0.5
FOAM = response([ThermalLayer(thickness=0.1, conductivity=0.022, density=35.0, specific_heat=1400.0)], 0.13)
MASONRY = response([ThermalLayer(thickness=0.4, conductivity=1.7, density=2300.0, specific_heat=900.0)], 0.13)
DAY = 28.0 + 6.0 * np.cos((HOURS - 15.0) / 24.0 * 2.0 * np.pi)
SUN = 700.0 * np.maximum(0.0, np.sin((HOURS - 6.0) / 12.0 * np.pi))


def solved(panel: Response = FOAM, **changes: Any) -> surface.BalancedSurface:
    """A wall on a hot day, with some things different."""
    usual: dict[str, Any] = {
        "air_c": DAY, "sky_c": DAY - 14.0, "absorbed": 0.6 * SUN, "emissivity": 0.9, "sky_share": 0.5,
        "convection": 16.0, "room_c": -20.0,
    }  # fmt: skip
    return surface.balance(panel=panel, **{**usual, **changes})


def gained(got: surface.BalancedSurface, sky: FloatArray, sun: FloatArray, share: float, ground: FloatArray) -> Any:
    """What the outside surface receives, W/m², written out."""
    own = (got.surface_c + 273.15) ** 4
    radiation = share * ((sky + 273.15) ** 4 - own) + (1.0 - share) * ((ground + 273.15) ** 4 - own)
    return sun + got.emissivity * SIGMA * radiation + got.convection * (got.air_c - got.surface_c)


@pytest.mark.parametrize("panel", [FOAM, MASONRY])
@pytest.mark.parametrize("convection", [4.0, 16.0, 100.0])
def test_every_hour_balances(panel: Response, convection: float) -> None:
    got = solved(panel, convection=convection)
    entering = to_hours(panel.admittance * to_harmonics(got.surface_c + 20.0))
    assert gained(got, DAY - 14.0, 0.6 * SUN, 0.5, DAY) == pytest.approx(entering, abs=1e-6)
    assert got.into_w_per_m2 == pytest.approx(entering, abs=1e-9)
    assert got.inside_w_per_m2.mean() == pytest.approx(panel.u * (got.surface_c.mean() + 20.0), rel=1e-12)
    assert got.inside_w_per_m2.mean() == pytest.approx(got.into_w_per_m2.mean(), rel=1e-12)


def test_ground_of_its_own_temperature_counts() -> None:
    got = solved(ground_c=DAY + 12.0, sky_share=0.3)
    assert gained(got, DAY - 14.0, 0.6 * SUN, 0.3, DAY + 12.0) == pytest.approx(got.into_w_per_m2, abs=1e-6)


def test_without_radiation_it_is_the_closed_form() -> None:
    # ε = 0 and steady: T_s = (h T_a + α I + U T_i) / (h + U).
    got = solved(emissivity=0.0, air_c=30.0, absorbed=250.0)
    closed = (16.0 * 30.0 + 250.0 + FOAM.u * -20.0) / (16.0 + FOAM.u)
    assert got.surface_c == pytest.approx(np.full(24, closed), abs=1e-9)
    # and wave by wave: (h + Y) T = h T_a for each harmonic.
    waves = to_harmonics(solved(MASONRY, emissivity=0.0, absorbed=0.0, room_c=0.0).surface_c)
    assert waves == pytest.approx(16.0 * to_harmonics(DAY) / (16.0 + MASONRY.admittance), abs=1e-7)


def test_a_night_roof_in_still_air_reaches_its_root() -> None:
    # An insulated roof that only radiates to the sky and meets the air: a root found by bisection, not by our code.
    low, high = -40.0, 20.0
    for _ in range(200):
        middle = 0.5 * (low + high)
        left = 0.9 * SIGMA * (263.15**4 - (middle + 273.15) ** 4) + 5.0 * (12.0 - middle) - 1e-6 * middle
        low, high = (middle, high) if left > 0.0 else (low, middle)
    got = solved(
        response([1e6], 0.13), air_c=12.0, sky_c=-10.0, absorbed=0.0, sky_share=1.0, convection=5.0, room_c=0.0
    )
    assert got.surface_c == pytest.approx(np.full(24, low), abs=1e-6)
    assert low < 12.0


def test_equal_temperatures_carry_nothing() -> None:
    got = solved(MASONRY, air_c=4.0, sky_c=4.0, absorbed=0.0, room_c=4.0)
    assert np.abs(got.inside_w_per_m2).max() < 1e-9
    assert got.sol_air_c == pytest.approx(np.full(24, 4.0), abs=1e-9)


def test_sol_air_is_air_without_sun_and_sky_and_drives_the_same_heat() -> None:
    plain = solved(sky_c=DAY, absorbed=0.0)
    assert plain.sol_air_c == pytest.approx(DAY, abs=1e-8)
    sunny = solved(response([4.0], 0.13))
    again = solved(response([4.0], 0.13), air_c=sunny.sol_air_c, sky_c=sunny.sol_air_c, absorbed=0.0)
    assert again.inside_w_per_m2 == pytest.approx(sunny.inside_w_per_m2, rel=0.01)


def test_draws_and_surfaces_are_the_single_ones() -> None:
    rng = np.random.default_rng(4)
    thickness = rng.uniform(0.05, 0.2, (3, 3000, 1))
    layer = ThermalLayer(thickness=thickness, conductivity=0.022, density=35.0, specific_heat=1400.0)
    panel = response([layer], 0.13)
    air = DAY + rng.normal(size=(3000, 1))
    share = np.array([1.0, 0.5, 0.5]).reshape(3, 1, 1)
    film = rng.uniform(4.0, 20.0, (3000, 1))
    got = solved(panel, air_c=air, sky_c=air - 10.0, sky_share=share, convection=film)
    assert got.surface_c.shape == got.sol_air_c.shape == (3, 3000, 24)
    for i, j in ((0, 0), (1, 1500), (2, 2999)):
        alone = solved(
            response([layer.replace(thickness=float(thickness[i, j, 0]))], 0.13),
            air_c=air[j], sky_c=air[j] - 10.0, sky_share=float(share[i, 0, 0]), convection=float(film[j, 0]),
        )  # fmt: skip
        assert got.surface_c[i, j] == pytest.approx(alone.surface_c, abs=1e-8)
        assert got.inside_w_per_m2[i, j] == pytest.approx(alone.inside_w_per_m2, abs=1e-8)


def test_pieces_make_the_whole(monkeypatch: pytest.MonkeyPatch) -> None:
    air = DAY + np.linspace(-5.0, 5.0, 777)[:, None]
    share = np.array([1.0, 0.5]).reshape(2, 1, 1)
    found = []
    for rows in (50, 100_000):
        monkeypatch.setattr(surface, "_ROWS", rows)
        found.append(solved(air_c=air, sky_share=share))
    assert np.allclose(found[0].surface_c, found[1].surface_c, atol=1e-9)
    assert np.allclose(found[0].inside_w_per_m2, found[1].inside_w_per_m2, atol=1e-9)


@pytest.mark.parametrize(("panel", "rounds"), [(FOAM, 7), (MASONRY, 9)])
def test_few_rounds_are_enough(monkeypatch: pytest.MonkeyPatch, panel: Response, rounds: int) -> None:
    monkeypatch.setattr(surface, "_ROUNDS", rounds)
    solved(panel)
    solved(panel, absorbed=0.9 * SUN, sky_share=1.0)


def test_looser_tolerance_is_kept() -> None:
    exact, loose = solved(MASONRY), solved(MASONRY, tolerance_k=1e-3)
    assert 0.0 < np.abs(exact.surface_c - loose.surface_c).max() < 1e-3


def test_what_cannot_balance_is_said() -> None:
    with pytest.raises(NoRoot):
        solved(tolerance_k=0.0)
    for change in (
        {"emissivity": 1.2},
        {"emissivity": -0.1},
        {"convection": 0.0},
        {"absorbed": np.full(24, np.nan)},
        {"absorbed": np.append(SUN[1:], -1.0)},
        {"air_c": math.nan},
        {"sky_c": -200.0},
        {"room_c": np.array([[4.0], [900.0]])},
    ):
        with pytest.raises(OutOfValidity):
            solved(**change)


@given(st.floats(0.0, 0.9), st.floats(0.01, 0.1), st.floats(4.0, 60.0), st.booleans())
@settings(max_examples=60, deadline=None)
def test_darker_is_never_cooler(absorptance: float, more: float, convection: float, heavy: bool) -> None:
    panel = MASONRY if heavy else FOAM
    light = solved(panel, absorbed=absorptance * SUN, convection=convection)
    dark = solved(panel, absorbed=(absorptance + more) * SUN, convection=convection)
    assert dark.inside_w_per_m2.sum() > light.inside_w_per_m2.sum()
    # A day of 24 values has no wave shorter than two hours: where the sun rises within one, the curve ripples a little.
    assert np.all(dark.surface_c >= light.surface_c - 0.002 * more * SUN.max())
    assert np.all(dark.inside_w_per_m2 >= light.inside_w_per_m2 - 5e-4 * more * SUN.max())


@given(st.floats(0.2, 8.0), st.floats(0.05, 3.0), st.floats(-30.0, 10.0), st.floats(0.0, 1.0), st.floats(4.0, 60.0))
@settings(max_examples=60, deadline=None)
def test_more_resistance_never_more_heat_through_a_warm_surface(
    resistance: float, more: float, room: float, share: float, convection: float
) -> None:
    def daily(r: float) -> float:
        panel = response([0.5 * r, ThermalLayer(
            thickness=0.1, conductivity=0.1 / (0.5 * r), density=900.0, specific_heat=900.0)], 0.13)  # fmt: skip
        got = solved(panel, room_c=room, sky_share=share, convection=convection, sky_c=DAY - 4.0)
        return float(got.inside_w_per_m2.sum())

    assert daily(resistance + more) <= daily(resistance) + 1e-9


# Films ---------------------------------------------------------------------------------------------------------------


def gas(kelvin: float) -> tuple[float, float, float]:
    """Kinematic viscosity, conductivity and Prandtl number of dry air at one atmosphere, from the reference library."""
    at = ("T", kelvin, "P", 101325.0, "Air")
    return (
        coolprop.PropsSI("V", *at) / coolprop.PropsSI("D", *at),
        coolprop.PropsSI("L", *at),
        coolprop.PropsSI("PRANDTL", *at),
    )


@pytest.mark.parametrize("mean_c", [-35.0, 0.0, 25.0, 50.0])
@pytest.mark.parametrize("difference", [0.5, 4.0, 15.0])
def test_natural_convection_agrees_with_the_reference_libraries(mean_c: float, difference: float) -> None:
    kelvin, length = mean_c + 273.15, 1.2
    viscosity, conductivity, prandtl = gas(kelvin)
    grashof = 9.80665 / kelvin * difference * length**3 / viscosity**2
    expected = {
        "vertical": ht.Nu_vertical_plate_Churchill(prandtl, grashof),
        "unstable": ht.Nu_horizontal_plate_McAdams(prandtl, grashof, buoyancy=True),
        "stable": ht.Nu_horizontal_plate_McAdams(prandtl, grashof, buoyancy=False),
    }
    for facing in ("vertical", "unstable", "stable"):
        got = surface.natural_convection(-difference, length, facing, mean_c)  # type: ignore[arg-type]
        assert got == pytest.approx(expected[facing] * conductivity / length, rel=0.02), facing


def test_natural_convection_stays_in_its_range() -> None:
    assert surface.natural_convection(0.0, 1.0, "stable", 10.0) == 0.0
    with pytest.raises(OutOfValidity):
        surface.natural_convection(np.array([1.0, 30.0]), 6.0, "stable", 10.0)
    with pytest.raises(OutOfValidity):
        surface.natural_convection(1.0, 0.0, "vertical", 10.0)
    with pytest.raises(ValueError, match="sideways"):
        surface.natural_convection(1.0, 1.0, "sideways", 10.0)  # type: ignore[arg-type]


@pytest.mark.parametrize("facing", ["vertical", "unstable", "stable"])
def test_natural_films_carry_one_heat(facing: Any) -> None:
    got = surface.natural_films(np.array([30.0, 8.0]), -20.0, np.array([4.0, 0.5]), 1.1, facing, 0.9, 0.9)
    through = (got.outside_surface_c - got.inside_surface_c) / np.array([4.0, 0.5])
    assert through == pytest.approx((np.array([30.0, 8.0]) - got.outside_surface_c) / got.outside_film, rel=1e-7)
    assert through == pytest.approx((got.inside_surface_c + 20.0) / got.inside_film, rel=1e-7)
    own, air = got.inside_surface_c + 273.15, 253.15
    convection = surface.natural_convection(own - air, 1.1, facing, 0.5 * (own + air) - 273.15)
    radiation = 0.9 * SIGMA * (own**4 - air**4) / (own - air)
    assert 1.0 / got.inside_film == pytest.approx(convection + radiation, rel=1e-6)
    even = surface.natural_films(5.0, 5.0, 1.0, 1.0, facing, 0.9, 0.9)
    assert float(even.inside_surface_c) == float(even.outside_surface_c) == 5.0


def test_standard_films_come_out_of_wind_and_radiation() -> None:
    # ISO 6946: R_se 0.04 stands for 4 m/s, ε 0.9, 10 °C mean.
    assert 1.0 / (surface.wind_convection(4.0) + surface.radiative(0.9, 10.0)) == pytest.approx(0.04, abs=0.001)
    with pytest.raises(OutOfValidity):
        surface.wind_convection(-1.0)


def test_clear_sky_is_colder_than_air_and_near_another_formula() -> None:
    air, dew = np.array([35.0, 25.0, 10.0, -5.0]), np.array([10.0, 20.0, 2.0, -8.0])
    sky = surface.sky_temperature(air, dew, 22.0)
    assert np.all(sky < air)
    other = (air + 273.15) * (0.741 + 0.0062 * dew) ** 0.25 - 273.15  # Berdahl and Fromberg 1982, at night
    assert sky == pytest.approx(other, abs=3.0)
    assert surface.sky_temperature(20.0, 10.0, 0.5) > surface.sky_temperature(20.0, 10.0, 12.5)
    assert surface.sky_temperature(20.0, 11.0, 6.0) > surface.sky_temperature(20.0, 10.0, 6.0)
    for dew_point in (-45.0, 40.0, math.nan):
        with pytest.raises(OutOfValidity):
            surface.sky_temperature(40.0, dew_point, 0.0)


def test_views_and_sweating() -> None:
    assert surface.sky_view(np.array([0.0, 90.0, 180.0])) == pytest.approx([1.0, 0.5, 0.0])
    assert surface.steady_surface(25.0, -20.0, 1e9, 0.13) == pytest.approx(25.0)
    assert surface.steady_surface(25.0, -20.0, 0.0, 0.13) == pytest.approx(-20.0)
    with pytest.raises(OutOfValidity):
        surface.steady_surface(25.0, -20.0, -1.0, 0.13)
    with pytest.raises(OutOfValidity):
        surface.sol_air(30.0, 300.0, 0.0)
