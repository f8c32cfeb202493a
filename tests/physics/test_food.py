"""Enthalpy of food: continuous, rising, invertible, one model with its ice and slope; worked examples from print."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from coldbox.errors import OutOfValidity
from coldbox.physics import food

BEEF = {"water": 0.5821, "protein": 0.1748, "freezing_point_c": -1.7}
WATER = {"specific_heat_above": 4187.0, "specific_heat_below": 2100.0, "latent_heat": 334e3, "freezing_point_c": 0.0}

foods = st.fixed_dictionaries(
    {
        "water": st.floats(0.15, 0.97),
        "protein": st.floats(0.0, 0.25),
        "freezing_point_c": st.floats(-15.0, -0.05),
        "specific_heat_above": st.floats(1500.0, 4200.0),
    }
)
figures = st.fixed_dictionaries(
    {
        "specific_heat_above": st.floats(1000.0, 4300.0),
        "specific_heat_below": st.floats(600.0, 2500.0),
        "latent_heat": st.floats(0.0, 334e3),
        "freezing_point_c": st.floats(-20.0, 5.0),
    }
)


def test_heat_of_freezing_150_kg_of_beef_as_printed() -> None:
    heat = 150.0 * (food.enthalpy(10.0, **BEEF) - food.enthalpy(-20.0, **BEEF))
    assert heat / 1e6 == pytest.approx(34.737, abs=0.001)


def test_reference_is_minus_40() -> None:
    assert food.enthalpy(-40.0, **BEEF) == 0.0
    assert food.quoted_enthalpy(-40.0, **WATER) == 0.0


@given(foods)
def test_continuous_through_freezing(one: dict[str, float]) -> None:
    point = one["freezing_point_c"]
    below, at, above = (food.enthalpy(point + step, **one) for step in (-1e-7, 0.0, 1e-7))
    assert below <= at <= above
    assert above - below < 1.0  # J/kg: no step


@given(foods, st.floats(-44.0, 99.0))
def test_apparent_heat_capacity_is_the_slope(one: dict[str, float], at: float) -> None:
    step = 1e-4
    if abs(at - one["freezing_point_c"]) < 2 * step:
        return
    slope = (food.enthalpy(at + step, **one) - food.enthalpy(at - step, **one)) / (2 * step)
    assert food.apparent_heat_capacity(at, **one) == pytest.approx(slope, rel=1e-5)


@given(foods, st.floats(-44.0, -0.1), st.floats(-44.0, -0.1))
def test_enthalpy_falls_by_the_fusion_of_what_freezes(one: dict[str, float], first: float, second: float) -> None:
    """h less fusion x unfrozen water is a straight line in temperature: the frozen food's sensible heat."""
    point = one["freezing_point_c"]
    known = {name: one[name] for name in ("water", "protein", "freezing_point_c")}

    def sensible(at: float) -> float:
        cold = min(at, point)
        return float(food.enthalpy(cold, **one) + food.FUSION * food.ice_fraction(cold, **known))

    solids = 1.0 - one["water"]
    expected = 1000.0 * (1.55 + 1.26 * solids) * (min(first, point) - min(second, point))
    assert sensible(first) - sensible(second) == pytest.approx(expected, abs=1e-3)


@given(foods)
def test_enthalpy_rises_and_its_inverse_gives_the_temperature_back(one: dict[str, float]) -> None:
    at = np.linspace(-45.0, 100.0, 600)
    heat = food.enthalpy(at, **one)
    assert np.all(np.diff(heat) > 0.0)
    np.testing.assert_allclose(food.temperature(heat, **one), at, atol=1e-9)


@given(figures)
def test_quoted_curve_rises_and_its_inverse_gives_the_temperature_back(one: dict[str, float]) -> None:
    at = np.linspace(-90.0, 100.0, 700)
    heat = food.quoted_enthalpy(at, **one)
    assert np.all(np.diff(heat) > 0.0)
    np.testing.assert_allclose(food.quoted_temperature(heat, **one), at, atol=1e-9)


@given(figures, st.floats(5.0, 90.0), st.floats(-85.0, -20.2))
def test_quoted_curve_sums_to_what_the_trade_adds_up(one: dict[str, float], warm: float, cold: float) -> None:
    heat = food.quoted_enthalpy(warm, **one) - food.quoted_enthalpy(cold, **one)
    point = one["freezing_point_c"]
    by_hand = (
        one["specific_heat_above"] * (warm - point) + one["latent_heat"] + one["specific_heat_below"] * (point - cold)
    )
    assert heat == pytest.approx(by_hand, rel=1e-12)


def test_quoted_heat_capacity_is_the_slope() -> None:
    for at in (-30.0, -0.05, 20.0):
        step = 1e-5
        slope = (food.quoted_enthalpy(at + step, **WATER) - food.quoted_enthalpy(at - step, **WATER)) / (2 * step)
        assert food.quoted_heat_capacity(at, **WATER) == pytest.approx(slope, rel=1e-6)


def test_both_curves_agree_on_lean_meat() -> None:
    """From 10 to -30 °C within 5 %, once the handbook's sum freezes no more water than Chen does."""
    lean = {"water": 0.75, "protein": 0.2, "freezing_point_c": -1.5}
    chen = food.enthalpy(10.0, **lean) - food.enthalpy(-30.0, **lean)
    quoted = {
        "specific_heat_above": food.chen_unfrozen_specific_heat(0.75),
        "specific_heat_below": food.frozen_specific_heat(0.75),
        "latent_heat": food.latent_heat(food.ice_fraction(-30.0, **lean)),
        "freezing_point_c": -1.5,
    }
    summed = food.quoted_enthalpy(10.0, **quoted) - food.quoted_enthalpy(-30.0, **quoted)
    assert chen == pytest.approx(summed, rel=0.05)


def test_draws_and_hours_broadcast() -> None:
    rng = np.random.default_rng(1)
    water = rng.uniform(0.6, 0.9, (50, 1))
    hours = np.linspace(-30.0, 20.0, 24)
    point = rng.uniform(-3.0, -0.5, (50, 1))
    batch = food.enthalpy(hours, water=water, protein=0.1, freezing_point_c=point)
    assert batch.shape == (50, 24)
    single = food.enthalpy(float(hours[5]), water=float(water[7, 0]), protein=0.1, freezing_point_c=float(point[7, 0]))
    assert batch[7, 5] == pytest.approx(single, rel=1e-14)


def test_no_ice_above_freezing_and_never_more_than_can_freeze() -> None:
    ice = food.ice_fraction(np.linspace(-45.0, 20.0, 500), **BEEF)
    assert np.all(ice[np.linspace(-45.0, 20.0, 500) >= -1.7] == 0.0)
    assert np.all(np.diff(ice) <= 0.0)
    assert ice.max() < 0.5821 - 0.4 * 0.1748


@pytest.mark.parametrize("at", [-46.0, 101.0, np.array([0.0, -60.0]), float("inf")])
def test_outside_its_range_chen_refuses(at: float) -> None:
    for method in (food.enthalpy, food.apparent_heat_capacity, food.ice_fraction):
        with pytest.raises(OutOfValidity, match=r"Chen \(1985\) holds for temperature from -45 to 100 °C"):
            method(at, **BEEF)


@pytest.mark.parametrize("change", [{"freezing_point_c": 0.0}, {"freezing_point_c": -21.0}, {"water": 0.05}])
def test_a_food_chen_does_not_describe_is_refused(change: dict[str, float]) -> None:
    with pytest.raises(OutOfValidity):
        food.enthalpy(-5.0, **{**BEEF, **change})


def test_an_enthalpy_outside_the_curve_is_refused() -> None:
    with pytest.raises(OutOfValidity):
        food.temperature(9e5, **BEEF)
    with pytest.raises(OutOfValidity):
        food.quoted_temperature(-2e5, **WATER)
    with pytest.raises(OutOfValidity):
        food.quoted_enthalpy(-91.0, **WATER)


def test_fatty_food_takes_its_components() -> None:
    """Cheddar: the handbook's table prints 2.77 kJ/kgK (from memory); Chen's short equation gives 2.58."""
    cheddar = {"water": 0.3675, "protein": 0.249, "fat": 0.3314, "carbohydrate": 0.0128, "fibre": 0.0, "ash": 0.0393}
    assert food.unfrozen_specific_heat(**cheddar) == pytest.approx(2770.0, rel=0.01)
    half = {**cheddar, "water": np.array([0.3675, 0.6])}
    found = food.unfrozen_specific_heat(**half)
    assert found[0] == food.unfrozen_specific_heat(**cheddar)
    assert found[1] == food.chen_unfrozen_specific_heat(0.6)
