"""Goods as bodies, held against series solutions, lumped decay, moving fronts and printed examples."""

from __future__ import annotations

import chambers
import numpy as np
import pytest
from scipy.optimize import brentq
from scipy.special import erf, erfc, j0, j1

from coldbox.physics import food
from coldbox.timeline import bodies, curves, solver
from coldbox.timeline.types import ConductivityPart, Plan, Signal, Watch

PLACES = ("core", "surface", "mean")
DENSITY, HEAT, K = 1000.0, 3600.0, 0.5


def in_a_stream(lot, air_c, end_s, *, step_s=60.0, cells=20, times_s=(), watches=(), signals=None):
    """A lot alone in air that is held at one temperature."""
    box = chambers.network(lots=(lot,), start_c=air_c, cells=cells)
    drivers = chambers.Lasting(air_c, count=0, **chambers.held(air_c))
    signals = tuple(Signal(what="lot", where=where) for where in PLACES) if signals is None else signals
    plan = Plan(start_s=0.0, end_s=end_s, step_s=step_s, signals=signals, times_s=times_s, watches=watches)
    trace = solver.run(box, drivers, plan)
    assert trace.heat_balance_error < 1e-6
    return trace


def roots(shape, biot, count=60):
    """Eigenvalues of a body with a film, by bracketing in each branch."""
    if shape == "slab":
        branches = [(i * np.pi, i * np.pi + np.pi / 2) for i in range(count)]
        return [brentq(lambda z: z * np.sin(z) - biot * np.cos(z), low + 1e-12, high) for low, high in branches]
    if shape == "sphere":
        branches = [(i * np.pi, (i + 1) * np.pi) for i in range(count)]
        return [
            brentq(lambda z: (1 - biot) * np.sin(z) - z * np.cos(z), low + 1e-9, high - 1e-12) for low, high in branches
        ]
    grid = np.linspace(1e-9, count * np.pi, 40000)
    value = grid * j1(grid) - biot * j0(grid)
    changes = np.nonzero(value[:-1] * value[1:] < 0)[0]
    return [brentq(lambda z: z * j1(z) - biot * j0(z), grid[i], grid[i + 1]) for i in changes]


def series(shape, biot, fourier):
    """Core, surface and mean of (T - T_air) / (T_start - T_air): the textbook series with all its terms."""
    core = surface = mean = 0.0
    for z in roots(shape, biot):
        decay = np.exp(-z * z * fourier)
        if shape == "slab":
            c = 4 * np.sin(z) / (2 * z + np.sin(2 * z))
            at_surface, over = np.cos(z), np.sin(z) / z
        elif shape == "cylinder":
            c = 2 / z * j1(z) / (j0(z) ** 2 + j1(z) ** 2)
            at_surface, over = j0(z), 2 * j1(z) / z
        else:
            c = 4 * (np.sin(z) - z * np.cos(z)) / (2 * z - np.sin(2 * z))
            at_surface, over = np.sin(z) / z, 3 * (np.sin(z) - z * np.cos(z)) / z**3
        core, surface, mean = core + c * decay, surface + c * decay * at_surface, mean + c * decay * over
    return np.array([core, surface, mean])


def test_first_roots_are_the_printed_ones():
    """One-term coefficients of a slab as heat-transfer books table them: so the series is theirs."""
    for biot, z1, c1 in ((0.1, 0.3111, 1.0161), (1.0, 0.8603, 1.1191), (10.0, 1.4289, 1.2620), (50.0, 1.5400, 1.2727)):
        z = roots("slab", biot, 1)[0]
        assert z == pytest.approx(z1, abs=6e-5)
        assert 4 * np.sin(z) / (2 * z + np.sin(2 * z)) == pytest.approx(c1, abs=6e-5)


@pytest.mark.parametrize("biot", [0.05, 0.2, 1.0, 5.0, 50.0])
@pytest.mark.parametrize("shape", ["slab", "cylinder", "sphere"])
def test_series_at_core_surface_and_mean(shape, biot):
    size = 0.04
    decays = roots(shape, biot, 1)[0] ** 2
    fouriers = np.array([0.2, 0.5, 1.0, 2.0]) / decays + 0.03
    lot = chambers.lot(
        shape=shape, half_thickness=size, density=DENSITY, film=biot * K / size, curve=chambers.sensible(HEAT),
        conductivity=ConductivityPart(warm=K, linear=0.0, square=0.0), start_c=20.0,
    )  # fmt: skip
    scale = size**2 * DENSITY * HEAT / K
    times = tuple(float(value) for value in fouriers * scale)
    trace = in_a_stream(lot, 0.0, times[-1], step_s=0.01 * scale / decays, times_s=times)
    for i, fourier in enumerate(fouriers):
        assert trace.series[i, :, 0] / 20.0 == pytest.approx(series(shape, biot, fourier), abs=0.005)


@pytest.mark.parametrize("shape", ["slab", "cylinder", "sphere"])
def test_error_of_the_series_falls_with_cells_and_steps(shape):
    """By half and more as cells double and steps shrink: an error in a coefficient would stay."""
    size, biot = 0.04, 5.0
    lot = chambers.lot(
        shape=shape, half_thickness=size, film=biot * K / size, start_c=20.0,
        conductivity=ConductivityPart(warm=K, linear=0.0, square=0.0),
    )  # fmt: skip
    at = 0.25 * size**2 * DENSITY * HEAT / K
    errors = [
        np.abs(in_a_stream(lot, 0.0, at, step_s=at / steps, cells=cells).last[:, 0] / 20.0 - series(shape, biot, 0.25))
        for cells, steps in ((10, 100), (20, 400), (40, 1600))
    ]
    assert np.max(errors[1]) < 0.5 * np.max(errors[0])
    assert np.max(errors[2]) < 0.5 * np.max(errors[1])


@pytest.mark.parametrize(
    ("diameter", "density", "heat", "k", "film", "start", "air", "seconds", "expected"),
    [
        (0.05, 7800.0, 460.0, 35.0, 10.0, 450.0, 100.0, 5819.0, 150.0),
        (0.0508, 7849.0, 460.6, 43.3, 11.36, 699.9 - 273.15, 394.3 - 273.15, 3600.0, 474.6 - 273.15),
    ],
)
def test_printed_steel_balls(diameter, density, heat, k, film, start, air, seconds, expected):
    """Lumped examples of two textbooks (Holman, Ex. 4.1; Geankoplis, Ex. 5.2-1): balls of small Biot numbers."""
    lot = chambers.lot(
        shape="sphere", half_thickness=diameter / 2, density=density, film=film, start_c=start,
        curve=chambers.sensible(heat), conductivity=ConductivityPart(warm=k, linear=0.0, square=0.0),
    )  # fmt: skip
    # Only differences matter, and room air of 100 °C would be steam: all temperatures count from the bath's.
    trace = in_a_stream(lot.replace(start_c=start - air), 0.0, seconds, step_s=10.0)
    assert trace.last[2, 0] + air == pytest.approx(expected, abs=0.5)


def test_printed_half_space():
    """Ground freezing from above (Geankoplis, Ex. 5.3-1): surface -5.2 °C with the exact error function."""
    film, k, diffusivity, at = 11.36, 0.865, 4.65e-7, 5 * 3600.0
    lot = chambers.lot(
        half_thickness=0.8, density=1000.0, film=film, start_c=15.6,
        curve=chambers.sensible(k / (1000.0 * diffusivity)),
        conductivity=ConductivityPart(warm=k, linear=0.0, square=0.0),
    )  # fmt: skip
    beta = film * np.sqrt(diffusivity * at) / k
    exact = 15.6 + (1.0 - np.exp(beta**2) * erfc(beta)) * (-17.8 - 15.6)
    assert exact == pytest.approx(-5.2, abs=0.05)
    trace = in_a_stream(lot, -17.8, at, cells=120)
    assert trace.last[1, 0] == pytest.approx(exact, abs=0.05)


def test_printed_butter():
    """Butter with one face to warm air (Geankoplis, Ex. 5.3-2), figures read off a chart: within 0.4 K."""
    lot = chambers.lot(
        half_thickness=0.0462, density=998.0, film=8.52, start_c=277.6 - 273.15, curve=chambers.sensible(2300.0),
        conductivity=ConductivityPart(warm=0.197, linear=0.0, square=0.0),
    )  # fmt: skip
    trace = in_a_stream(lot, 297.1 - 273.15, 5 * 3600.0)
    assert trace.last[1, 0] + 273.15 == pytest.approx(292.2, abs=0.4)
    assert trace.last[0, 0] + 273.15 == pytest.approx(287.4, abs=0.4)


def neumann(stefan_number):
    """Root of λ exp(λ²) erf(λ) = St/√π, one phase."""
    return brentq(lambda x: x * np.exp(x * x) * erf(x) - stefan_number / np.sqrt(np.pi), 1e-6, 3.0)


@pytest.mark.parametrize(("warm_side", "stefan_number"), [(True, 0.1), (False, 0.1), (False, 0.5)])
def test_neumann_front(warm_side, stefan_number):
    """One phase at its melting point, the face suddenly held beyond it: heat taken up is 2 k ΔT λ-law over time.

    Flux into the face is k ΔT / (erf(λ) √(π α t)), its integral 2 k ΔT √t / (erf(λ) √(π α)).
    """
    heat, latent, k, thickness = 2000.0, 200e3, 1.0, 0.2
    drive = stefan_number * latent / heat * (1.0 if warm_side else -1.0)
    curve = chambers.quoted(above=heat, below=heat, latent=latent, point=0.0, over=0.02)
    start = -0.0201 if warm_side else 0.0001
    lot = chambers.lot(
        half_thickness=thickness, film=1e7, start_c=start, curve=curve, mass=1.0,
        conductivity=ConductivityPart(warm=k, linear=0.0, square=0.0),
    )  # fmt: skip
    diffusivity = k / (DENSITY * heat)
    root = neumann(stefan_number)
    end = (0.7 * thickness / (2 * root)) ** 2 / diffusivity  # the front has come 70 % of the way
    trace = in_a_stream(lot, drive, end, step_s=end / 500, cells=40)
    per_area = trace.stored[0] * DENSITY * thickness
    exact = 2 * k * drive * np.sqrt(end) / (erf(root) * np.sqrt(np.pi * diffusivity))
    assert per_area == pytest.approx(exact, rel=0.02)


def test_stefan_ice_growth():
    """Quasi-steady ice: 10 cm of it at -10 °C takes 27.4 to 27.5 h by the formula; sensible heat adds a little."""
    latent, k = 3.36e5, 1.7
    curve = chambers.quoted(above=4200.0, below=20.0, latent=latent, point=0.0, over=0.01)
    lot = chambers.lot(
        half_thickness=0.2, film=1e7, start_c=0.0, curve=curve, mass=1.0,
        conductivity=ConductivityPart(warm=k, linear=0.0, square=0.0),
    )  # fmt: skip
    trace = in_a_stream(lot, -10.0, 27.45 * 3600.0, cells=40, step_s=120.0)
    assert -trace.stored[0] * DENSITY * 0.2 == pytest.approx(0.1 * DENSITY * latent, rel=0.01)


PLANK = [
    # Geankoplis, Ex. 5.5-2: beef slab; Earle, ch. 6: slab between plates in cartons, and bare.
    ("beef", 0.0635, 1057.0, 1.038, 251.3e3, 270.4 - 273.15, 244.3 - 273.15, 17.0, 23940.0),
    ("between plates in cartons", 0.1, 1090.0, 1.6, 2.56e5, -2.0, -34.0, 60.0, 14079.0),
    ("between plates", 0.1, 1090.0, 1.6, 2.56e5, -2.0, -34.0, 1e6, 6812.0),
]


@pytest.mark.parametrize(("what", "size", "density", "k", "latent", "point", "air", "film", "printed"), PLANK)
def test_printed_freezing_times(what, size, density, k, latent, point, air, film, printed):
    """Plank's assumptions handed to the engine: no sensible heat, all frozen when the core has frozen."""
    curve = chambers.quoted(above=3500.0, below=20.0, latent=latent, point=point, over=0.01)
    lot = chambers.lot(
        half_thickness=size / 2, density=density, film=film, start_c=point, curve=curve,
        conductivity=ConductivityPart(warm=k, linear=0.0, square=0.0),
    )  # fmt: skip
    watch = Watch(signal=0, side="below", limit=point - 0.02)
    trace = in_a_stream(lot, air, 1.5 * printed, cells=40, step_s=printed / 400, watches=(watch,))
    assert trace.crossed_s[0, 0] == pytest.approx(printed, rel=0.02), what


def test_freezing_takes_longer_with_the_heat_above_and_below():
    """Earle's improved enthalpy: times as 3.23 : 2.56 from +10 to about -18 °C; the engine within 15 % of that rule."""
    curve = chambers.quoted(above=3220.0, below=1670.0, latent=2.56e5, point=-2.0, over=0.1)
    lot = chambers.lot(
        half_thickness=0.05, density=1090.0, film=60.0, start_c=10.0, curve=curve,
        conductivity=ConductivityPart(warm=1.6, linear=0.0, square=0.0),
    )  # fmt: skip
    watch = Watch(signal=2, side="below", limit=-18.0)
    trace = in_a_stream(lot, -34.0, 8 * 3600.0, watches=(watch,))
    assert trace.crossed_s[0, 0] / 3600 == pytest.approx(4.93, rel=0.15)


@pytest.mark.parametrize("chen", [True, False])
def test_curves_are_those_of_the_goods(chen):
    """Heat content, temperature and slope against the published formulas, and there and back."""
    part = chambers.chen() if chen else chambers.quoted()
    (curve,) = curves.stack([part], 1)
    at = np.array([-35.0, -18.0, -5.0, -1.5, -1.06, -1.02, -1.0, -0.5, 0.0, 4.0, 30.0])
    figures = {"water": 0.8, "protein": 0.18, "freezing_point_c": -1.0, "specific_heat_above": 3600.0}
    if not chen:
        figures = {
            "specific_heat_above": 3600.0, "specific_heat_below": 1900.0, "latent_heat": 250e3,
            "freezing_point_c": -1.0,
        }  # fmt: skip
    enthalpy = food.enthalpy if chen else food.quoted_enthalpy
    slope_of = food.apparent_heat_capacity if chen else food.quoted_heat_capacity
    content = np.array([curves.content(curve, 0, value)[0] for value in at])
    quoted_extra = 0.0 if chen else np.where(at < -1.0, 1900.0 * np.maximum((at + 1.0), -0.1), 0.0)
    expected = enthalpy(at, **figures) - enthalpy(-1.0, **figures)
    assert content == pytest.approx(expected, abs=1e-6 if chen else 200.0)
    assert chen or np.all(np.abs(content - expected) <= np.abs(quoted_extra) + 1e-6)
    work = curves.Melting(curve, (1, len(at)))
    found, potential, slope = np.empty((1, len(at))), np.empty((1, len(at))), np.empty((1, len(at)))
    work.update(content[None], found, potential, slope)
    assert found[0] == pytest.approx(at, abs=1e-9)
    assert potential[0] == pytest.approx(at + 1.0, abs=1e-9)
    inner = at != -1.0
    assert slope[0][inner] == pytest.approx(slope_of(at[inner], **figures), rel=2e-3)


@pytest.mark.parametrize("curve", [chambers.chen(), chambers.quoted()])
def test_potential_is_the_integral_of_the_conductivity(curve):
    """By quadrature over k, between temperatures on either side of the freezing point; and the two ways to it agree."""
    part = ConductivityPart(warm=0.5, linear=-1.1, square=0.3)
    lots = bodies.stack([chambers.lot(curve=curve, conductivity=part)], 1)
    at = np.array([-30.0, -18.0, -5.0, -1.5, -1.05, -0.5, 6.0])
    work = curves.Melting(lots.curves[0], (1, len(at)), lots.conductivity)
    potential, _ = work.at(at)
    for value, found in zip(at, potential[0], strict=True):
        grid = np.linspace(-1.0, value, 20001)
        middle = 0.5 * (grid[1:] + grid[:-1])
        if curve.chen:
            past = np.where(middle < -1.0, -1.0 / middle, 1.0) - 1.0
            k = 0.5 - 1.1 * past + 0.3 * past**2
        else:
            k = np.where(middle > -1.0, 0.5, np.where(middle > -1.1, 0.5 * (0.5 + 1.9), 1.9))
        assert found == pytest.approx(np.sum(k * np.diff(grid)), rel=1e-4)
    content = np.array([curves.content(lots.curves[0], 0, value)[0] for value in at])
    updated = np.empty((3, 1, len(at)))
    work.update(content[None], *updated)
    assert updated[1] == pytest.approx(potential, rel=1e-9)


def test_respiration_warms_by_its_rate():
    """A living lot shut off from the air: dh/dt = w(T), log-linear between points, exactly integrable."""
    lot = chambers.lot(film=1e-9, start_c=5.0, respiration_at_c=(0.0, 10.0), respiration_w_per_kg=(0.02, 0.08))
    trace = in_a_stream(lot, 5.0, 48 * 3600.0)
    slope = np.log(4.0) / 10.0
    start = 0.02 * np.exp(slope * 5.0)
    exact = 5.0 - np.log(1.0 - slope * start * 48 * 3600.0 / HEAT) / slope
    assert trace.last[2, 0] == pytest.approx(exact, abs=0.01)
    assert trace.heat_in[0] == pytest.approx(100.0 * HEAT * (trace.last[2, 0] - 5.0), rel=1e-6)


def test_runaway_respiration_is_said_and_stays_finite():
    lot = chambers.lot(film=1e-9, start_c=30.0, respiration_at_c=(0.0, 10.0), respiration_w_per_kg=(0.02, 0.08))
    trace = in_a_stream(lot, 30.0, 30 * 86400.0)
    assert np.isfinite(trace.last).all()
    assert trace.notes and "respiration of goods" in trace.notes[0]


@pytest.mark.parametrize("start", [-18.0, -1.0, 3.0])
@pytest.mark.parametrize("curve", [chambers.chen(), chambers.quoted(), chambers.quoted(over=0.01)])
@pytest.mark.parametrize("air", [-40.0, 25.0])
@pytest.mark.parametrize(("size", "film"), [(0.001, 50.0), (0.003, 500.0), (0.05, 10.0), (0.05, 1e6), (0.4, 5.0)])
def test_temperatures_are_monotone_through_melting(start, curve, air, size, film):
    """From one temperature and with air that stays, every place only nears the air, whatever the step."""
    lot = chambers.lot(
        half_thickness=size, film=film, start_c=start, curve=curve,
        conductivity=ConductivityPart(warm=0.5, linear=-1.2 if curve.chen else -1.0, square=0.0),
    )  # fmt: skip
    trace = in_a_stream(lot, air, 12 * 3600.0, step_s=600.0, times_s=tuple(600.0 * i for i in range(73)))
    series = trace.series[:, :, 0]
    sign = np.sign(air - start)
    assert np.all(np.diff(series, axis=0) * sign >= -1e-9)
    assert np.all(sign * (air - series) >= -1e-9)
