"""Conduction through the day: closed forms, an independent fine solution, and the exact mean."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.integrate import solve_ivp

from coldbox.errors import OutOfValidity
from coldbox.physics import periodic
from coldbox.physics.number import FloatArray
from coldbox.physics.periodic import ThermalLayer, response, through_day

CONCRETE = ThermalLayer(thickness=0.20, conductivity=1.7, density=2300.0, specific_heat=900.0)
FOAM = ThermalLayer(thickness=0.12, conductivity=0.022, density=35.0, specific_heat=1400.0)
STEEL = ThermalLayer(thickness=0.0006, conductivity=50.0, density=7800.0, specific_heat=470.0)
OMEGA = 2.0 * np.pi / 86400.0 * np.arange(13)

layers_of = st.lists(
    st.one_of(
        st.floats(0.0, 3.0),
        st.builds(
            ThermalLayer,
            thickness=st.floats(1e-4, 1.0),
            conductivity=st.floats(0.01, 60.0),
            density=st.floats(10.0, 8000.0),
            specific_heat=st.floats(300.0, 4200.0),
        ),
    ),
    min_size=1,
    max_size=5,
)


def test_harmonics_are_those_of_the_fast_transform() -> None:
    hours = np.random.default_rng(1).normal(size=(3, 5, 24))
    assert periodic.to_harmonics(hours) == pytest.approx(np.fft.rfft(hours), abs=1e-12)
    assert periodic.to_hours(np.fft.rfft(hours)) == pytest.approx(hours, abs=1e-12)


@pytest.mark.parametrize("layer", [CONCRETE, FOAM, STEEL])
def test_one_layer_agrees_with_the_closed_form(layer: ThermalLayer) -> None:
    film = 0.13
    x = np.sqrt(1j * OMEGA[1:] * layer.resistance * layer.heat_capacity)
    # Inside air at rest: T_s = q (R sinh x / x + film cosh x) for the heat q that leaves into it.
    closed = 1.0 / (layer.resistance * np.sinh(x) / x + film * np.cosh(x))
    got = response([layer], film)
    assert got.transfer[1:12] == pytest.approx(closed[:-1], rel=1e-9)
    assert got.transfer[12] == pytest.approx(closed[-1].real, rel=1e-9)
    admitted = closed * (np.cosh(x) + film * x * np.sinh(x) / layer.resistance)
    assert got.admittance[1:12] == pytest.approx(admitted[:-1], rel=1e-9)


def test_layers_agree_with_the_product_of_their_matrices() -> None:
    layers, film = [STEEL, 0.1, FOAM, CONCRETE], 0.17
    for k in range(1, 12):
        matrix = np.array([[1, film], [0, 1]], complex)
        for layer in reversed(layers):
            if isinstance(layer, float):
                own = np.array([[1, layer], [0, 1]], complex)
            else:
                x = np.sqrt(1j * OMEGA[k] * layer.resistance * layer.heat_capacity)
                slope = x / layer.resistance
                own = np.array([[np.cosh(x), np.sinh(x) / slope], [np.sinh(x) * slope, np.cosh(x)]])
            matrix = own @ matrix
        got = response(layers, film)
        assert got.transfer[k] == pytest.approx(1.0 / matrix[0, 1], rel=1e-9)
        assert got.admittance[k] == pytest.approx(matrix[1, 1] / matrix[0, 1], rel=1e-9)


def fine_solution(layers: list[ThermalLayer], film: float, swing: int, cells: int = 60) -> FloatArray:
    """Heat into a room at 0 °C, hourly means of a settled day, outside surface cos(2π swing t / 24 h): finite volumes
    in space, a stiff integrator in time."""
    widths = np.concatenate([np.full(cells, layer.thickness / cells) for layer in layers])
    k = np.concatenate([np.full(cells, layer.conductivity) for layer in layers])
    stored = np.concatenate([np.full(cells, layer.density * layer.specific_heat) for layer in layers]) * widths
    half = widths / (2.0 * k)
    links = 1.0 / np.concatenate([[half[0]], half[:-1] + half[1:], [half[-1] + film]])
    rate = 2.0 * np.pi * swing / 86400.0
    count = len(widths)
    jacobian = np.diag(-(links[:-1] + links[1:])) + np.diag(links[1:-1], 1) + np.diag(links[1:-1], -1)
    jacobian /= stored[:, None]
    drive = np.zeros(count)
    drive[0] = links[0] / stored[0]
    # One more state gathers the heat that has left into the room.
    big = np.zeros((count + 1, count + 1))
    big[:count, :count], big[count, count - 1] = jacobian, links[-1]
    # It starts from the wave that stays (of the same finite volumes), and is stepped through one day.
    start = np.linalg.solve(1j * rate * np.eye(count) - jacobian, drive).real

    def slope(t: float, y: FloatArray) -> FloatArray:
        out = big @ y
        out[:count] += drive * np.cos(rate * t)
        return out

    solved = solve_ivp(
        slope, (0.0, 86400.0), np.append(start, 0.0), "Radau", np.arange(25) * 3600.0, rtol=1e-7, atol=1e-7, jac=big
    )
    return np.asarray(np.diff(solved.y[-1]) / 3600.0)


@pytest.mark.parametrize(("layers", "swing"), [([CONCRETE], 1), ([FOAM], 1), ([CONCRETE, FOAM], 1), ([FOAM], 3)])
def test_agrees_with_a_fine_transient_solution(layers: list[ThermalLayer], swing: int) -> None:
    film = 0.13
    edges = np.arange(25) * 2.0 * np.pi * swing / 24.0
    surface = np.diff(np.sin(edges)) / (edges[1] - edges[0])  # hourly means of the cosine
    got = through_day(response(layers, film).transfer, surface, 0.0)
    want = fine_solution(layers, film, swing)
    assert got == pytest.approx(want, abs=2e-3 * np.abs(want).max())


def test_lumped_capacity_has_its_lag() -> None:
    # Resistance, heat store without resistance, resistance: one time constant R1 R2 C / (R1 + R2).
    store = ThermalLayer(thickness=1e-9, conductivity=1e9, density=1e9, specific_heat=40000.0)
    got = response([0.5, store], 0.3)
    closed = 1.0 / (0.8 + 1j * OMEGA * 40000.0 * 0.5 * 0.3)
    assert got.transfer[:12] == pytest.approx(closed[:12], rel=1e-9)
    factor, lag = periodic.decrement_and_lag(got)
    assert factor == pytest.approx(abs(closed[1]) * 0.8, rel=1e-9)
    assert lag == pytest.approx(np.arctan(OMEGA[1] * 40000.0 * 0.15 / 0.8) * 24.0 / (2.0 * np.pi), rel=1e-9)


def test_a_very_thick_wall_neither_overflows_nor_answers() -> None:
    got = response([CONCRETE.replace(thickness=60.0)], 0.13)
    assert np.all(np.isfinite(got.transfer)) and np.all(np.isfinite(got.admittance))
    assert np.abs(got.transfer[1:]).max() < 1e-30
    # What enters is that of a half-space: sqrt(i ω k ρ c).
    assert got.admittance[1:12] == pytest.approx(np.sqrt(1j * OMEGA[1:12] * 1.7 * 2300.0 * 900.0), rel=1e-9)


def test_fastest_wave_stays_real() -> None:
    surface = np.where(np.arange(24) % 2 == 0, 1.0, -1.0)
    heat = through_day(response([FOAM], 0.13).transfer, surface, 0.0)
    assert heat[::2] == pytest.approx(-heat[1::2], abs=1e-15)
    assert response([CONCRETE], 0.13).transfer[12].imag == 0.0


@given(layers_of, st.floats(0.04, 0.3), st.lists(st.floats(-40.0, 70.0), min_size=24, max_size=24), st.floats(-40, 30))
@settings(max_examples=150, deadline=None)
def test_the_mean_is_exactly_the_steady_one(
    layers: list[ThermalLayer | float], film: float, hours: list[float], room: float
) -> None:
    panel = response(layers, film)
    resistance = film + sum(layer if isinstance(layer, float) else layer.resistance for layer in layers)
    assert panel.u == pytest.approx(1.0 / resistance, rel=1e-12)
    heat = through_day(panel.transfer, np.array(hours), room)
    steady = (np.mean(hours) - room) / resistance
    assert heat.mean() == pytest.approx(steady, rel=1e-9, abs=1e-9)


@given(layers_of, st.floats(0.04, 0.3))
@settings(max_examples=150, deadline=None)
def test_layers_only_flatten(layers: list[ThermalLayer | float], film: float) -> None:
    panel = response(layers, film)
    assert np.all(np.abs(panel.transfer) <= panel.u * (1.0 + 1e-9))
    assert np.all(panel.admittance.real >= panel.u * (1.0 - 1e-9))


@given(layers_of, st.floats(0.01, 2.0), st.floats(-30.0, 0.0))
@settings(max_examples=100, deadline=None)
def test_more_resistance_never_more_daily_heat(layers: list[ThermalLayer | float], more: float, room: float) -> None:
    surface = 25.0 + 10.0 * np.sin(np.arange(24) / 24.0 * 2.0 * np.pi)
    before = through_day(response(layers, 0.13).transfer, surface, room).sum()
    after = through_day(response([*layers, more], 0.13).transfer, surface, room).sum()
    assert after <= before + 1e-9


def test_areas_of_films_and_layers_give_the_conductance_of_the_panel() -> None:
    inside, layers, outside = 10.0, 11.5, 13.0
    panel = response([FOAM], 0.13, layers_area=layers / outside, inside_area=inside / outside, beside=0.02)
    whole = 1.0 / (FOAM.resistance / layers + 0.13 / inside) + 0.02 * outside
    assert panel.u * outside == pytest.approx(whole, rel=1e-12)
    assert panel.transfer[0] * outside == pytest.approx(whole, rel=1e-12)
    x = np.sqrt(1j * OMEGA[1:12] * FOAM.resistance * FOAM.heat_capacity)
    slab, film = FOAM.resistance * outside / layers, 0.13 * outside / inside
    closed = 1.0 / (slab * np.sinh(x) / x + film * np.cosh(x)) + 0.02
    assert panel.transfer[1:12] == pytest.approx(closed, rel=1e-9)


def test_series_and_closed_form_meet() -> None:
    xx = 1j * np.linspace(2e-4, 9e-4, 13)
    for series, closed in zip(periodic._layer(xx, 0.0), periodic._layer(xx, 1e9), strict=True):
        assert np.abs(series / closed - 1.0).max() < 1e-13
    x = np.sqrt(xx)
    assert periodic._layer(xx, 1e9)[1] == pytest.approx(1.0 / np.cosh(x), rel=1e-14)


def test_pieces_make_the_whole(monkeypatch: pytest.MonkeyPatch) -> None:
    thickness = np.linspace(0.05, 0.2, 2 * 777).reshape(2, 777, 1)
    surface = np.random.default_rng(5).uniform(-5.0, 40.0, (777, 24))
    found = []
    for rows in (50, 100_000):
        monkeypatch.setattr(periodic, "_ROWS", rows)
        panel = response([STEEL, FOAM.replace(thickness=thickness)], 0.13)
        found.append((panel.transfer, panel.admittance, through_day(panel.transfer, surface, -20.0)))
    for piecewise, whole in zip(*found, strict=True):
        assert np.allclose(piecewise, whole, rtol=1e-12, atol=1e-12)


def test_stacked_draws_are_the_single_ones() -> None:
    rng = np.random.default_rng(2)
    thickness = rng.uniform(0.05, 0.2, (3, 4000, 1))
    film = rng.uniform(0.1, 0.2, (4000, 1))
    surface = rng.uniform(-5.0, 40.0, (3, 1, 24))
    stacked = response([STEEL, FOAM.replace(thickness=thickness), 0.05], film)
    heat = through_day(stacked.transfer, surface, -20.0)
    assert heat.shape == (3, 4000, 24)
    for i, j in ((0, 0), (1, 1777), (2, 3999)):
        one = response([STEEL, FOAM.replace(thickness=float(thickness[i, j, 0])), 0.05], float(film[j, 0]))
        assert stacked.transfer[i, j] == pytest.approx(one.transfer, rel=1e-12)
        assert stacked.admittance[i, j] == pytest.approx(one.admittance, rel=1e-12)
        assert heat[i, j] == pytest.approx(through_day(one.transfer, surface[i, 0], -20.0), rel=1e-9)


@pytest.mark.parametrize("layers", [[0.0], [-1.0], [float("nan")], [FOAM.replace(density=-3.0)]])
def test_impossible_panels_are_refused(layers: list[ThermalLayer | float]) -> None:
    with pytest.raises(OutOfValidity):
        response(layers, 0.0)


def test_a_wave_of_no_harmonic_is_refused() -> None:
    with pytest.raises(OutOfValidity):
        periodic.decrement_and_lag(response([FOAM], 0.13), 12)
