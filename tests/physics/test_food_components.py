"""Components of food against reference data of water and ice, and Levy's mixing against what defines it."""

from __future__ import annotations

import CoolProp.CoolProp as reference
import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from coldbox.errors import OutOfValidity
from coldbox.physics import food_components as parts

LEAN = {"water": 0.75, "protein": 0.21, "fat": 0.03, "carbohydrate": 0.0, "fibre": 0.0, "ash": 0.01}


@pytest.mark.parametrize("at", [1.0, 10.0, 20.0, 40.0, 60.0, 80.0])
def test_water_is_liquid_water(at: float) -> None:
    found = parts.choi_okos("water", at)
    state = ("T", at + 273.15, "P", 101325.0, "Water")
    assert found.specific_heat == pytest.approx(reference.PropsSI("Cpmass", *state), rel=0.01)
    assert found.density == pytest.approx(reference.PropsSI("Dmass", *state), rel=0.006)
    assert found.conductivity == pytest.approx(reference.PropsSI("conductivity", *state), rel=0.03)


@pytest.mark.parametrize(
    ("at", "heat", "density", "conductivity"),
    [(0.0, 2097.0, 916.7, 2.16), (-10.0, 2027.0, 918.7, 2.26), (-20.0, 1957.0, 920.3, 2.37)],
)
def test_ice_is_ice(at: float, heat: float, density: float, conductivity: float) -> None:
    """IAPWS-06 (heat, density) and Slack's review (conductivity), from memory."""
    found = parts.choi_okos("ice", at)
    assert found.specific_heat == pytest.approx(heat, rel=0.02)
    assert found.density == pytest.approx(density, rel=0.002)
    assert found.conductivity == pytest.approx(conductivity, rel=0.04)


def test_densities_at_20_c_as_printed() -> None:
    printed = {"water": 995.74, "protein": 1319.53, "fat": 917.23, "carbohydrate": 1592.89, "ash": 2418.18}
    for name, value in printed.items():
        assert parts.choi_okos(name, 20.0).density == pytest.approx(value, abs=0.02)  # type: ignore[arg-type]


def test_water_below_zero_is_supercooled_and_arrays_go_through_zero() -> None:
    at = np.array([-10.0, 0.0, 10.0])
    heat = parts.choi_okos("water", at).specific_heat
    assert heat[0] == pytest.approx(1000 * (4.0817 + 0.053062 + 0.099516))
    assert heat[1] == pytest.approx(4176.2)


@pytest.mark.parametrize("at", [-41.0, 151.0, np.array([20.0, 200.0]), float("inf")])
def test_outside_the_fit_it_refuses(at: float) -> None:
    with pytest.raises(OutOfValidity, match=r"Choi and Okos \(1986\)"):
        parts.choi_okos("fat", at)


conductivities = st.floats(0.02, 5.0)
shares = st.floats(0.0, 1.0)


@given(conductivities, conductivities, shares)
def test_levy_does_not_mind_which_is_first(first: float, second: float, share: float) -> None:
    assert parts.levy(first, second, share) == pytest.approx(parts.levy(second, first, 1.0 - share), rel=1e-9)


@given(conductivities, conductivities, shares)
def test_levy_lies_within_what_any_mixture_can_be(first: float, second: float, share: float) -> None:
    """Hashin and Shtrikman's bounds: the two Maxwell-Eucken mixtures, one component dispersed in the other."""

    def maxwell(dispersed: float, around: float, amount: float) -> float:
        ratio = dispersed / around
        return around * (2 + ratio + 2 * (ratio - 1) * amount) / (2 + ratio - (ratio - 1) * amount)

    one, other = maxwell(first, second, share), maxwell(second, first, 1.0 - share)
    found = parts.levy(first, second, share)
    assert min(one, other) * (1 - 1e-9) <= found <= max(one, other) * (1 + 1e-9)


@given(conductivities, conductivities)
def test_levy_of_one_alone_is_that_one(first: float, second: float) -> None:
    assert parts.levy(first, second, 0.0) == pytest.approx(second, rel=1e-12)
    assert parts.levy(first, second, 1.0) == pytest.approx(first, rel=1e-9)


def test_levy_refuses_what_is_no_mixture() -> None:
    with pytest.raises(OutOfValidity):
        parts.levy(0.0, 1.0, 0.5)
    with pytest.raises(OutOfValidity):
        parts.levy(1.0, 1.0, 1.2)


def test_freezing_raises_conductivity_and_lowers_density() -> None:
    thawed = parts.conductivity(**LEAN, ice=0.0, temperature_c=0.0)
    frozen = parts.conductivity(**LEAN, ice=0.6, temperature_c=-20.0)
    assert 0.4 < thawed < 0.55  # lean meat in general tables 0.45 to 0.5 W/mK
    assert 1.0 < frozen < 1.6  # and 1.1 to 1.6 frozen
    assert parts.density(**LEAN, ice=0.6, temperature_c=-20.0) < parts.density(**LEAN, ice=0.0, temperature_c=0.0)


def test_pure_water_and_pure_ice_are_themselves() -> None:
    pure = {"water": 1.0, "protein": 0.0, "fat": 0.0, "carbohydrate": 0.0, "fibre": 0.0, "ash": 0.0}
    assert parts.conductivity(**pure, ice=0.0, temperature_c=20.0) == parts.choi_okos("water", 20.0).conductivity
    assert parts.conductivity(**pure, ice=1.0, temperature_c=-20.0) == parts.choi_okos("ice", -20.0).conductivity
    assert parts.density(**pure, ice=1.0, temperature_c=-20.0) == pytest.approx(parts.choi_okos("ice", -20.0).density)
