"""Panels against closed forms and textbooks; the tables of the standards are cases in tests/published."""

from __future__ import annotations

import numpy as np
import pytest
from CoolProp.CoolProp import PropsSI
from ht.conv_free_enclosed import Nu_Nusselt_Rayleigh_Hollands
from hypothesis import given
from hypothesis import strategies as st

from coldbox.errors import OutOfValidity
from coldbox.physics import panel

positive = st.floats(0.01, 10.0)


def test_whole_wall_with_its_interfaces():
    """Dutta, ex. 2.1: cement 60 mm, cork 100 mm, brick 250 mm between faces at -15 and 30 °C."""
    layers = panel.layer_resistance(np.array([0.06, 0.10, 0.25]), np.array([0.72, 0.043, 0.70]))
    total = layers.sum()
    assert 45.0 / total == pytest.approx(16.27, abs=0.005)
    np.testing.assert_allclose(layers / total, [0.030, 0.841, 0.129], atol=6e-4)
    depth = np.cumsum(layers)[:2]
    np.testing.assert_allclose(panel.temperature_inside_wall(-15.0, 30.0, depth, total), [-13.6, 24.2], atol=0.06)


@given(inside=positive, outside=positive, layers=positive, area=positive)
def test_equal_areas_make_a_plane_wall(inside, outside, layers, area):
    whole = panel.conductance(area, area, area, layers, inside, outside)
    assert whole == pytest.approx(area * panel.u_value(layers, inside, outside), rel=1e-12)


@given(layers=positive, more=positive)
def test_more_insulation_passes_less(layers, more):
    assert panel.conductance(1.0, 1.2, 1.4, layers + more, 0.13, 0.04) < panel.conductance(
        1.0, 1.2, 1.4, layers, 0.13, 0.04
    )


def test_two_grey_plates_exchange_what_the_law_says():
    """The linearised film times a small difference is the fourth-power law."""
    warm, cold, e1, e2 = 283.15 + 0.5, 283.15 - 0.5, 0.9, 0.05
    exact = 5.670374419e-8 * (warm**4 - cold**4) / (1 / e1 + 1 / e2 - 1)
    ours = panel.effective_emissivity(e1, e2) * panel.black_film(10.0) * (warm - cold)
    assert ours == pytest.approx(exact, rel=1e-5)


def test_moving_air_in_a_space_against_a_heat_transfer_library():
    """Heat rising through a flat space: the standard's constant within 30 % of Hollands' correlation."""
    for thickness in (0.025, 0.05, 0.1):
        rayleigh = 9.81 / 283.15 * 5.0 * thickness**3 / (1.42e-5 * 2.0e-5)
        nusselt = Nu_Nusselt_Rayleigh_Hollands(Pr=0.71, Gr=rayleigh / 0.71)
        ours = 1.0 / panel.airspace_resistance(thickness, "up", 0.0)
        assert ours == pytest.approx(nusselt * 0.025 / thickness, rel=0.30)


def test_still_air_conducts_as_air_does():
    conductivity = PropsSI("L", "T", 283.15, "P", 101325.0, "Air")
    assert 0.005 / panel.airspace_resistance(0.005, "down", 0.0) == pytest.approx(conductivity, rel=0.01)


@pytest.mark.parametrize("direction", ["up", "horizontal", "down"])
def test_spaces_grow_no_worse_with_thickness_and_foil(direction):
    thickness = np.linspace(0.002, 0.3, 60)
    plain = panel.airspace_resistance(thickness, direction, 0.82)
    assert (np.diff(plain) >= -1e-12).all()
    assert (panel.airspace_resistance(thickness, direction, 0.05) > plain).all()
    assert (panel.airspace_resistance(thickness, direction, 0.82, difference_k=15.0) <= plain).all()
    # At 5 K the two laws of convection meet within 4 %: 1.25 against 0.73 times the cube root of 5, and their like.
    meeting = panel.airspace_resistance(thickness, direction, 0.0, difference_k=np.array([[5.0], [5.0 + 1e-9]]))
    np.testing.assert_allclose(meeting[0], meeting[1], rtol=0.04)


def test_air_under_a_warm_lid_calms_with_depth():
    """Downwards convection falls with the power 0.44 of the depth, once it outweighs conduction."""
    shallow, deep = (1.0 / panel.airspace_resistance(depth, "down", 0.0, difference_k=9.0) for depth in (0.1, 0.3))
    assert shallow / deep == pytest.approx(3.0**0.44, rel=1e-9)


def test_directions_rank_as_they_should():
    films = [panel.inside_film(way) for way in ("up", "horizontal", "down")]
    assert films == sorted(films)
    spaces = [panel.airspace_resistance(0.05, way, 0.82) for way in ("up", "horizontal", "down")]
    assert spaces == sorted(spaces)


def test_wind_and_polish_on_the_outside():
    winds = panel.outside_film(np.array([0.0, 1.0, 4.0, 20.0]))
    assert (np.diff(winds) < 0.0).all()
    assert panel.outside_film(0.0, emissivity=0.05) > panel.outside_film(0.0)


def test_foam_multipliers():
    assert panel.foam_conductivity(0.022, 0.0, -10.0) == pytest.approx(0.022)
    assert panel.foam_conductivity(0.022, 0.005, 10.0, 1.2, 1.1) == pytest.approx(0.022 * 1.32)
    assert panel.foam_conductivity(0.022, 0.005, 0.0) < 0.022
    # Going there and coming back by the conversion is where one began.
    there = panel.foam_conductivity(0.022, 0.005, 35.0)
    assert there * np.exp(0.005 * (10.0 - 35.0)) == pytest.approx(0.022, rel=1e-12)


def test_evacuated_panels_creep_around_their_edges():
    """EN 17140 gives a panel λ_core + ψ d 2 (l + w) / (l w) for it: what its own outline adds to its conductance."""
    core, psi, thickness, length, width = 0.0042, 0.008, 0.025, 1.0, 0.6
    area = length * width
    by_conductivity = (core + psi * thickness * 2.0 * (length + width) / area) / thickness * area
    by_outline = core / thickness * area + panel.evacuated_extra(psi, 2.0 * (length + width))
    assert by_conductivity == pytest.approx(by_outline, rel=1e-12)
    assert panel.bridges(0.02, 10.0, 0.1, 3.0) == pytest.approx(0.5)


def test_draws_and_hours_broadcast():
    draws, hours = np.full((4, 1), 0.9), np.linspace(0.0, 20.0, 24)
    assert panel.outside_film(hours, draws).shape == (4, 24)
    assert panel.airspace_resistance(np.full((4, 1), 0.02), "up", 0.8, hours).shape == (4, 24)
    assert panel.conductance(10.0, np.full((4, 1), 11.0), 12.0, 4.0, 0.13, np.full(24, 0.04)).shape == (4, 24)


@pytest.mark.parametrize(
    "call",
    [
        lambda: panel.foam_conductivity(0.022, 0.005, -80.0),
        lambda: panel.layer_resistance(0.1, np.array([0.02, 0.0])),
        lambda: panel.effective_emissivity(0.0, 0.9),
        lambda: panel.inside_film("up", 1.2),
        lambda: panel.outside_film(-1.0),
        lambda: panel.outside_film(np.array([1.0, np.nan])),
        lambda: panel.airspace_resistance(0.4, "up", 0.8),
        lambda: panel.airspace_resistance(np.array([0.01, 0.0]), "up", 0.8),
        lambda: panel.temperature_inside_wall(0.0, 1.0, 1.0, 0.0),
    ],
)
def test_outside_its_range_it_refuses(call):
    with pytest.raises(OutOfValidity):
        call()
