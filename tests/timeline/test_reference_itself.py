"""The reference that the engine is held against is itself held against closed forms, and against its own finer self.

A room of air whose heat is nothing beside that of its machine or its walls stands for surroundings that stay.
"""

import math

import numpy as np
import pytest
import reference_timeline as ref
from scipy.optimize import brentq
from scipy.special import erf, erfc, j0, j1

HOLDING = 1e7  # W/K from an air that stays to the room's: so much that the room is at its temperature


def room_at(celsius, **parts):
    """A dry room whose air a thin wall of no resistance holds at a temperature."""
    skin = ref.Layer(1e-3, 1e9, 1.0, 1.0, 1.0)
    wall = ref.Wall((skin,), ref.steady(celsius), 1.0, 1.0, outside_h=HOLDING, inside_h=HOLDING)
    return ref.Box(volume=1.0, start_c=celsius, humidity_ratio=0.0, walls=(wall,), **parts)


PLAIN = ref.Curve(point=-100.0, above=3600.0, below=3600.0)


def series(shape, biot, fourier, at):
    """(t - t_air) / (t_start - t_air) of a slab, cylinder or sphere at a share `at` of its radius."""
    total = 0.0
    for n in range(60):
        if shape == "slab":
            root = brentq(lambda z: z * math.sin(z) - biot * math.cos(z), n * math.pi, (n + 0.5) * math.pi)
            weight = 4.0 * math.sin(root) / (2.0 * root + math.sin(2.0 * root)) * math.cos(root * at)
        elif shape == "sphere":
            root = brentq(
                lambda z: z * math.cos(z) - (1.0 - biot) * math.sin(z), n * math.pi + 1e-9, (n + 1) * math.pi - 1e-12
            )
            weight = 4.0 * (math.sin(root) - root * math.cos(root)) / (2.0 * root - math.sin(2.0 * root))
            weight *= np.sinc(root * at / math.pi)
        else:
            low, high = (0.0 if n == 0 else _j1_zero(n)), _j1_zero(n + 1)
            root = brentq(lambda z: z * j1(z) - biot * j0(z), low + 1e-12, high - 1e-12)
            weight = 2.0 / root * j1(root) / (j0(root) ** 2 + j1(root) ** 2) * j0(root * at)
        total += weight * math.exp(-(root**2) * fourier)
    return total


def _j1_zero(n):
    guess = (n + 0.25) * math.pi
    return brentq(j1, guess - 0.8, guess + 0.8)


@pytest.mark.parametrize("shape", ["slab", "cylinder", "sphere"])
@pytest.mark.parametrize("biot", [0.05, 1.0, 50.0])
def test_bodies_follow_the_series(shape, biot):
    k, density, radius = 0.5, 1000.0, 0.1
    body = ref.Body(100.0, 0.0, shape, radius, density, biot * k / radius, PLAIN, (k, 0.0, 0.0))
    done = ref.run(room_at(20.0, bodies=(body,)), 24.0, signals=[("core", 0), ("surface", 0)])
    for name, at in (("core", 0.0), ("surface", 1.0)):
        for hour in (6, 12, 24):
            fourier = k / (density * 3600.0) * hour * 3600.0 / radius**2
            exact = 20.0 * (1.0 - series(shape, biot, fourier, at))
            assert done.series[name, 0][hour] == pytest.approx(exact, abs=0.01), (name, hour)


def test_a_lump_warms_by_the_exponential():
    pack = ref.Pack(5.0, -5.0, 2.0, ref.Curve(point=-100.0, above=2000.0, below=2000.0))
    done = ref.run(room_at(15.0, packs=(pack,)), 6.0, [ref.Limit(("pack", 0), 5.0)])
    assert done.crossed_s[0] == pytest.approx(10_000.0 / 2.0 * math.log(2.0), rel=1e-5)


def test_ice_melts_as_heat_comes():
    pack = ref.Pack(2.0, 0.0, 3.0, ref.Curve(point=0.0, above=4186.0, below=2100.0, latent=333_430.0, width=0.01))
    done = ref.run(room_at(20.0, packs=(pack,)), 6.0, signals=[("pack frozen", 0)])
    assert done.series["pack frozen", 0][3] == pytest.approx(
        1.0 - 3.0 * 20.0 * 3 * 3600.0 / (2.0 * 333_430.0), abs=5e-4
    )


def test_a_melting_front_goes_in_as_neumann_found():
    """Thick ice at -10 °C whose surface is brought to 10 °C: temperatures on both sides of the front by erf."""
    c_ice, c_water, k_ice, k_water, latent, density = 2000.0, 4000.0, 2.0, 0.6, 300e3, 1000.0
    a_ice, a_water = k_ice / density / c_ice, k_water / density / c_water
    ratio = math.sqrt(a_water / a_ice)

    def balance(x):
        thawed = k_water * 10.0 * math.exp(-(x**2)) / (math.sqrt(math.pi * a_water) * erf(x))
        frozen = k_ice * 10.0 * math.exp(-((x * ratio) ** 2)) / (math.sqrt(math.pi * a_ice) * erfc(x * ratio))
        return thawed - frozen - density * latent * x * math.sqrt(a_water)

    front = brentq(balance, 1e-3, 3.0)
    curve = ref.Curve(point=0.0, above=c_water, below=c_ice, latent=latent, width=0.02)
    body = ref.Body(100.0, -10.0, "slab", 0.6, density, 1e6, curve, (k_water, k_water - k_ice, 0.0))
    done = ref.run(room_at(10.0, bodies=(body,)), 4.0, signals=[("nodes", 0)], per_body=240, rtol=1e-5)
    depth = 0.6 * (1.0 - ref.radii(240))
    t = 4 * 3600.0
    exact = np.where(
        depth < 2.0 * front * math.sqrt(a_water * t),
        10.0 * (1.0 - erf(depth / (2.0 * math.sqrt(a_water * t))) / erf(front)),
        -10.0 + 10.0 * erfc(depth / (2.0 * math.sqrt(a_ice * t))) / erfc(front * ratio),
    )
    assert np.max(np.abs(done.series["nodes", 0][-1] - exact)) < 0.12
    assert np.sqrt(np.mean((done.series["nodes", 0][-1] - exact) ** 2)) < 0.03


def test_a_wall_of_concrete_follows_the_series():
    """Kept at a temperature outside, no heat through its inside: half of a slab."""
    layer = ref.Layer(0.2, 1.8, 2300.0, 900.0, 10.0)
    wall = ref.Wall((layer,), ref.steady(30.0), 10.0, 10.0, outside_h=9.0, inside_h=1e-9)
    box = ref.Box(volume=10.0, start_c=10.0, humidity_ratio=0.0, walls=(wall,), wall_start_c=(10.0,))
    done = ref.run(box, 12.0, signals=[("wall", 0)])
    fourier = 1.8 / (2300.0 * 900.0) * 12 * 3600.0 / 0.2**2
    exact = 30.0 - 20.0 * series("slab", 9.0 * 0.2 / 1.8, fourier, 0.0)
    assert done.series["wall", 0][-1] == pytest.approx(exact, abs=0.01)


def test_a_roof_radiates_until_it_balances():
    """Only the fourth power and the sun: the surface settles where they balance."""
    layer = ref.Layer(1e-3, 50.0, 7800.0, 460.0, 5.0)
    insulation = ref.Layer(0.1, 1e-6, 30.0, 1400.0, 5.0)
    roof = ref.Wall(
        (layer, insulation), ref.steady(20.0), 5.0, 5.0, outside_h=0.0, sun=ref.steady(500.0), emissivity=0.9,
        sky_c=ref.steady(0.0), ground_c=ref.steady(20.0), sky_share=0.8,
    )  # fmt: skip
    nodes = ref._Nodes(ref.Box(volume=1.0, start_c=20.0, humidity_ratio=0.0, walls=(roof,)), 8, 2)
    seen = 0.8 * 273.15**4 + 0.2 * 293.15**4
    assert nodes.start()[0] == pytest.approx((seen + 500.0 / (0.9 * 5.670374419e-8)) ** 0.25 - 273.15, abs=0.01)


def test_a_cooler_of_everything_converges_and_keeps_its_books():
    curve = ref.chen(0.72, 0.18, -1.0)
    goods = ref.Body(300.0, -18.0, "slab", 0.06, 900.0, 7.0, curve, (0.5, -0.9, 0.0))
    wall = ref.Wall((ref.Layer(0.1, 0.024, 40.0, 1400.0, 60.0),), ref.steady(28.0), 62.0, 58.0, inside_h=8.0)
    box = ref.Box(
        volume=30.0, start_c=-18.0, humidity_ratio=ref.saturated(-18.0), walls=(wall,), bodies=(goods,),
        packs=(ref.Pack(5.0, -20.0, 4.0), ref.Pack(6.0, -78.5, 2.0, sublimes=True)),
        leaks=(ref.Leak(0.004, ref.steady(28.0), ref.steady(0.012)),),
        doors=(ref.Door(1.0, 2.0, lambda t: float(7200.0 <= t < 7800.0), ref.steady(28.0), ref.steady(0.012)),),
        marks=(7200.0, 7800.0),
    )  # fmt: skip
    limits = [ref.Limit(("surface", 0), -12.0), ref.Limit(("mean", 0), -5.0)]
    usual = ref.run(box, 24.0, limits, [("air",), ("core", 0)])
    finer = ref.run(box, 24.0, limits, [("air",), ("core", 0)], per_layer=60, per_body=150, rtol=1e-8)
    assert usual.crossed_s == pytest.approx(finer.crossed_s, rel=5e-4)
    for signal in usual.series:
        assert np.max(np.abs(usual.series[signal] - finer.series[signal])) < 0.01
    assert usual.heat_in == pytest.approx(usual.stored, rel=1e-5)
