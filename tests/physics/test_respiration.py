"""Heat of respiration: through the points, one factor per kelvin between them, and conversions from print."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.interpolate import interp1d

from coldbox.errors import OutOfValidity
from coldbox.physics import respiration

AT = [0.0, 5.0, 10.0, 20.0]
HEAT = [0.04, 0.07, 0.16, 0.45]


def test_goes_through_its_points() -> None:
    np.testing.assert_allclose(respiration.heat(AT, HEAT, np.array(AT)), HEAT, rtol=1e-12)


def test_agrees_with_an_interpolation_of_logarithms() -> None:
    at = np.linspace(-30.0, 35.0, 200)
    line = interp1d(AT, np.log(HEAT), fill_value="extrapolate")
    np.testing.assert_allclose(respiration.heat(AT, HEAT, at), np.exp(line(at)), rtol=1e-10)


@given(st.lists(st.floats(0.001, 1.0), min_size=2, max_size=6), st.floats(-14.0, 34.0), st.floats(1.0, 3.0))
def test_more_at_every_point_is_more_everywhere(heat: list[float], at: float, factor: float) -> None:
    places = [4.0 * i for i in range(len(heat))]
    at = min(at, places[-1] + 14.0)
    scaled = respiration.heat(places, [factor * one for one in heat], at)
    assert scaled == pytest.approx(factor * respiration.heat(places, heat, at), rel=1e-9)


def test_draws_in_the_points_broadcast() -> None:
    draws = [np.array([[0.03], [0.04]]), np.array([[0.1], [0.2]])]
    found = respiration.heat([0.0, 10.0], draws, np.array([0.0, 5.0, 10.0]))
    assert found.shape == (2, 3)
    assert found[1, 1] == pytest.approx(np.sqrt(0.04 * 0.2))


@pytest.mark.parametrize("at", [-30.1, 35.1, np.array([5.0, 40.0])])
def test_far_beyond_the_points_it_refuses(at: float) -> None:
    with pytest.raises(OutOfValidity, match="from -30 to 35 °C"):
        respiration.heat(AT, HEAT, at)


@pytest.mark.parametrize(
    ("at_c", "heat"), [([0.0], [0.1]), ([0.0, 0.0], [0.1, 0.2]), ([0.0, 5.0], [0.0, 0.2]), ([0.0, 5.0], [0.1])]
)
def test_points_that_make_no_line_are_refused(at_c: list[float], heat: list[float]) -> None:
    with pytest.raises(OutOfValidity):
        respiration.heat(at_c, heat, 1.0)


def test_heat_of_carbon_dioxide_near_the_handbook_of_agriculture() -> None:
    """61 kcal per tonne and day for each mg/(kg h)."""
    printed = 61.0 * 4186.8 / (1000.0 * 86400.0)
    assert respiration.from_carbon_dioxide(1.0) == pytest.approx(printed, rel=0.006)
    with pytest.raises(OutOfValidity):
        respiration.from_carbon_dioxide(-1.0)


def test_heat_of_carbon_dioxide_is_that_of_burning_sugar() -> None:
    """Glucose: 2803 kJ/mol for six molecules of carbon dioxide of 44.01 g."""
    assert pytest.approx(2803.0 / (6 * 44.01), rel=0.01) == respiration.J_PER_MG


@pytest.mark.parametrize(
    ("f", "g", "at", "mg"),
    # Carbon dioxide by the fit (coefficients from memory) against the rates of AH-66 (from memory), mg/(kg h).
    [
        (6.0803e-4, 2.6183, 0.0, 5.0),  # cabbage
        (6.0803e-4, 2.6183, 10.0, 18.0),
        (0.0027238, 2.5728, 10.0, 70.0),  # Brussels sprouts
        (7.056e-5, 3.033, 20.0, 27.0),  # grapes
        (3.6683e-4, 3.033, 20.0, 150.0),  # strawberries
        (2.0074e-4, 2.8350, 20.0, 35.0),  # tomatoes
    ],
)
def test_fitted_power_law_near_tabled_rates(f: float, g: float, at: float, mg: float) -> None:
    """Within a factor of 2.2: as far as sorts of one kind differ among themselves."""
    ratio = respiration.becker_fricke(f, g, at) / respiration.from_carbon_dioxide(mg)
    assert 1 / 2.2 < ratio < 2.2


def test_fitted_power_law_refuses_beyond_its_range() -> None:
    with pytest.raises(OutOfValidity):
        respiration.becker_fricke(1e-4, 3.0, -1.0)
    with pytest.raises(OutOfValidity):
        respiration.becker_fricke(1e-4, 3.0, np.array([0.0, 31.0]))
