"""The engine against the reference: when limits are reached, and how warm things are every hour.

Both are given the same box. A time to a limit agrees within 0.5 % or a minute, a temperature within 0.1 K.
"""

import math
from dataclasses import dataclass, replace

import both_timelines
import numpy as np
import pytest
import reference_timeline as ref

AIR = ("air",)
HUMID = ref.steady(0.012)


@dataclass(frozen=True)
class Scenario:
    """A box, how long it is looked at, the limits that must be reached and what is compared each hour."""

    box: ref.Box
    hours: float
    limits: tuple[ref.Limit, ...]
    signals: tuple[tuple, ...] = (AIR,)


def panel(area, thickness, outside_c, **changed):
    """Foam between steel sheets."""
    sheet = ref.Layer(0.6e-3, 50.0, 7850.0, 460.0, area)
    foam = ref.Layer(thickness, 0.024, 40.0, 1400.0, area)
    return ref.Wall((sheet, foam, sheet), outside_c, area * 1.03, area * 0.97, **changed)


def floor(area, outside_c=None):
    """Insulation under a slab of concrete."""
    foam, slab = ref.Layer(0.1, 0.035, 35.0, 1400.0, area), ref.Layer(0.12, 1.8, 2300.0, 900.0, area)
    return ref.Wall((foam, slab), outside_c or ref.steady(12.0), area, area, outside_h=1e3, inside_h=6.0)


def day(mean, swing, warmest=15.0):
    """A temperature through a day."""
    return lambda t: mean + swing * math.cos(2.0 * math.pi * (t / 3600.0 - warmest) / 24.0)


def leak(kg_per_h, outside_c, ratio=HUMID):
    return ref.Leak(kg_per_h / 3600.0, outside_c, ratio)


MEAT = ref.chen(0.72, 0.20, -1.0)
MEAT_K = (0.48, -0.85, 0.0)
BOX_OF_MEAT = ref.Body(1500.0, -20.0, "slab", 0.15, 950.0, 6.0, MEAT, MEAT_K)


def empty_cooler():
    outside = ref.steady(30.0)
    box = ref.Box(
        volume=30.0, start_c=3.0, humidity_ratio=0.8 * ref.saturated(3.0),
        walls=(panel(52.0, 0.08, outside), floor(12.0)), leaks=(leak(9.0, outside),),
    )  # fmt: skip
    return Scenario(box, 24.0, tuple(ref.Limit(AIR, x) for x in (5.0, 8.0, 15.0)))


def frozen_meat():
    outside = day(24.0, 5.0)
    box = ref.Box(
        volume=30.0, start_c=-20.0, humidity_ratio=ref.saturated(-20.0), walls=(panel(64.0, 0.12, outside),),
        bodies=(BOX_OF_MEAT,), leaks=(leak(5.0, outside),),
    )  # fmt: skip
    where = ("surface", "mean", "core")
    return Scenario(box, 72.0, tuple(ref.Limit((x, 0), -12.0) for x in where), (AIR, *((x, 0) for x in where)))


def thawing(curve, conductivity):
    """Small pieces in a poor box, through the freezing point and on."""
    outside = ref.steady(32.0)
    body = ref.Body(40.0, -10.0, "cylinder", 0.04, 1000.0, 9.0, curve, conductivity)
    box = ref.Box(
        volume=0.5, start_c=-10.0, humidity_ratio=ref.saturated(-10.0), walls=(panel(4.0, 0.05, outside),),
        bodies=(body,), leaks=(leak(0.5, outside),),
    )  # fmt: skip
    limits = tuple(ref.Limit(*x) for x in ((("surface", 0), -2.0), (("core", 0), -1.5), (("core", 0), 1.0)))
    return Scenario(box, 72.0, (*limits, ref.Limit(("mean", 0), 5.0)), (AIR, ("core", 0), ("surface", 0), ("mean", 0)))


def thawing_by_composition():
    return thawing(MEAT, MEAT_K)


def thawing_by_quoted_heats():
    return thawing(ref.Curve(point=-1.0, above=3500.0, below=1900.0, latent=240e3, width=0.1), (0.48, -0.9, 0.0))


def ice_pack():
    outside = ref.steady(30.0)
    fish = ref.Body(12.0, 1.0, "slab", 0.05, 1000.0, 12.0, ref.chen(0.8, 0.17, -0.9), (0.55, -0.9, 0.0))
    box = ref.Box(
        volume=0.04, start_c=1.0, humidity_ratio=ref.saturated(0.5), walls=(panel(1.2, 0.04, outside),),
        bodies=(fish,), packs=(ref.Pack(3.0, -18.0, 4.0),), leaks=(leak(0.05, outside),),
    )  # fmt: skip
    return Scenario(
        box, 36.0, (ref.Limit(AIR, 5.0), ref.Limit(("mean", 0), 4.0), ref.Limit(("pack", 0), 0.5)),
        (AIR, ("mean", 0), ("pack", 0)),
    )  # fmt: skip


def pack_with_a_melting_range():
    outside = ref.steady(43.0)
    medium = ref.Curve(point=5.0, above=2200.0, below=2000.0, latent=200e3, width=3.0)
    vials = ref.Body(
        4.0, 4.0, "slab", 0.03, 900.0, 8.0, ref.Curve(point=-50.0, above=3900.0, below=2000.0), (0.6, 0, 0)
    )
    box = ref.Box(
        volume=0.03, start_c=4.0, humidity_ratio=ref.saturated(2.0), walls=(panel(0.9, 0.06, outside),),
        bodies=(vials,), packs=(ref.Pack(5.0, 3.5, 5.0, medium, frozen=0.9),), leaks=(leak(0.01, outside),),
    )  # fmt: skip
    return Scenario(
        box, 72.0, (ref.Limit(AIR, 8.0), ref.Limit(("core", 0), 8.0), ref.Limit(("pack", 0), 4.9)),
        (AIR, ("core", 0), ("pack", 0)),
    )  # fmt: skip


def dry_ice_spent_midway():
    outside = ref.steady(22.0)
    samples = ref.Body(6.0, -60.0, "sphere", 0.06, 950.0, 8.0, MEAT, MEAT_K)
    box = ref.Box(
        volume=0.05, start_c=-60.0, humidity_ratio=1e-6, walls=(panel(1.4, 0.05, outside),), bodies=(samples,),
        packs=(ref.Pack(8.0, -78.5, 2.5, sublimes=True),), leaks=(leak(0.3, outside),),
    )  # fmt: skip
    return Scenario(
        box, 72.0, (ref.Limit(("surface", 0), -40.0), ref.Limit(("core", 0), -18.0), ref.Limit(AIR, -10.0)),
        (AIR, ("core", 0), ("pack mass", 0), ("carbon dioxide",)),
    )  # fmt: skip


def door_stood_open():
    outside = ref.steady(28.0)
    door = ref.Door(1.0, 2.0, lambda t: 0.8 * (7200.0 <= t < 7800.0), outside, HUMID)
    milk = ref.Body(400.0, 4.0, "slab", 0.1, 1030.0, 7.0, ref.Curve(-0.5, 3900.0, 2000.0, 290e3, 0.1), (0.56, 0, 0))
    box = ref.Box(
        volume=25.0, start_c=4.0, humidity_ratio=0.8 * ref.saturated(4.0),
        walls=(panel(50.0, 0.08, outside), floor(10.0)), bodies=(milk,), doors=(door,), leaks=(leak(4.0, outside),),
        marks=(7200.0, 7800.0),
    )  # fmt: skip
    return Scenario(
        box, 24.0, (ref.Limit(AIR, 12.0), ref.Limit(("surface", 0), 7.0), ref.Limit(("mean", 0), 7.0)),
        (AIR, ("surface", 0), ("mean", 0)),
    )  # fmt: skip


def sun_on_a_roof():
    """A truck that stands in the yard: its roof absorbs and radiates, from midnight on."""
    outside = day(26.0, 7.0)
    roof = panel(
        16.0, 0.07, outside, outside_h=10.0,
        sun=lambda t: 0.7 * max(0.0, 900.0 * math.sin(math.pi * (t / 3600.0 - 6) / 12)),
        emissivity=0.9, sky_c=day(6.0, 6.0), ground_c=outside, sky_share=1.0,
    )  # fmt: skip
    front = panel(
        12.0, 0.07, outside, outside_h=10.0,
        sun=lambda t: 0.5 * max(0.0, 600.0 * math.sin(math.pi * (t / 3600.0 - 6) / 7)),
        emissivity=0.9, sky_c=day(6.0, 6.0), ground_c=day(30.0, 12.0), sky_share=0.5,
    )  # fmt: skip
    milk = ref.Body(
        1500.0, 4.0, "cylinder", 0.12, 1030.0, 8.0, ref.Curve(-0.5, 3900.0, 2000.0, 290e3, 0.1), (0.56, 0, 0)
    )
    box = ref.Box(
        volume=30.0, start_c=4.0, humidity_ratio=0.8 * ref.saturated(4.0),
        walls=(roof, front, panel(40.0, 0.07, outside)), bodies=(milk,), leaks=(leak(6.0, outside),),
        marks=(6 * 3600.0, 13 * 3600.0, 18 * 3600.0, 30 * 3600.0, 37 * 3600.0, 42 * 3600.0),
    )  # fmt: skip
    return Scenario(
        box, 18.0, (ref.Limit(AIR, 8.0), ref.Limit(AIR, 9.5), ref.Limit(("mean", 0), 7.0)), (AIR, ("mean", 0))
    )


def heavy_walls():
    """Insulation inside of a wall of brick, and a concrete ceiling without any."""
    outside = day(22.0, 8.0)
    brick, foam = ref.Layer(0.24, 0.7, 1700.0, 840.0, 60.0), ref.Layer(0.1, 0.03, 30.0, 1400.0, 58.0)
    plaster = ref.Layer(0.015, 0.8, 1800.0, 1000.0, 57.0)
    wall = ref.Wall((brick, foam, plaster), outside, 62.0, 57.0)
    ceiling = ref.Wall(
        (ref.Layer(0.2, 1.8, 2300.0, 900.0, 12.0),), ref.steady(18.0), 12.0, 12.0, outside_h=6.0, inside_h=6.0
    )
    box = ref.Box(
        volume=40.0, start_c=6.0, humidity_ratio=0.8 * ref.saturated(6.0), walls=(wall, ceiling, floor(14.0)),
        leaks=(leak(6.0, outside, ref.steady(0.009)),),
    )  # fmt: skip
    return Scenario(box, 48.0, tuple(ref.Limit(AIR, x) for x in (8.0, 10.0, 12.0)))


def living_goods():
    outside = ref.steady(25.0)
    rates = ((0.0, 0.02), (5.0, 0.04), (10.0, 0.08), (20.0, 0.25))
    berries = ref.Body(2000.0, 2.0, "slab", 0.2, 600.0, 5.0, ref.chen(0.9, 0.01, -0.8), (0.4, 0, 0), respiration=rates)
    box = ref.Box(
        volume=40.0, start_c=2.0, humidity_ratio=0.9 * ref.saturated(2.0), walls=(panel(70.0, 0.08, outside),),
        bodies=(berries,), leaks=(leak(6.0, outside),),
    )  # fmt: skip
    return Scenario(
        box, 48.0, (ref.Limit(("core", 0), 8.0), ref.Limit(("mean", 0), 10.0), ref.Limit(AIR, 10.0)),
        (AIR, ("core", 0), ("mean", 0)),
    )  # fmt: skip


def pull_down():
    """A machine at its limit, then at its set point, while warm goods come down to it."""
    outside = day(28.0, 6.0)
    goods = ref.Body(800.0, 18.0, "cylinder", 0.08, 1000.0, 12.0, ref.chen(0.87, 0.02, -0.8), (0.55, -0.9, 0.0))
    box = ref.Box(
        volume=35.0, start_c=20.0, humidity_ratio=0.6 * ref.saturated(20.0),
        walls=(panel(62.0, 0.08, outside), floor(14.0)), bodies=(goods,), leaks=(leak(6.0, outside),),
        machine=lambda _: (2200.0, 3.0),
    )  # fmt: skip
    signals = (AIR, ("core", 0), ("mean", 0), ("surface", 0))
    below = [ref.Limit(*x, above=False) for x in ((AIR, 8.0), (AIR, 3.1), (("mean", 0), 8.0), (("core", 0), 5.0))]
    return Scenario(box, 36.0, tuple(below), signals)


def freezing_down():
    """A blast that is stronger than it need be: goods go through their freezing point from above."""
    outside = ref.steady(20.0)
    goods = ref.Body(200.0, 8.0, "slab", 0.04, 1050.0, 25.0, MEAT, MEAT_K)
    box = ref.Box(
        volume=20.0, start_c=-25.0, humidity_ratio=ref.saturated(-25.0), walls=(panel(45.0, 0.12, outside),),
        bodies=(goods,), machine=lambda _: (9000.0, -30.0),
    )  # fmt: skip
    below = [ref.Limit(*x, above=False) for x in ((("surface", 0), -5.0), (("core", 0), -5.0), (("core", 0), -18.0))]
    return Scenario(box, 24.0, tuple(below), (AIR, ("core", 0), ("surface", 0), ("mean", 0)))


def water_settling():
    """Much wet air into a box whose goods stay cold."""
    outside = ref.steady(32.0)
    goods = ref.Body(1000.0, -15.0, "slab", 0.1, 950.0, 8.0, MEAT, MEAT_K)
    box = ref.Box(
        volume=30.0, start_c=-15.0, humidity_ratio=ref.saturated(-15.0), walls=(panel(62.0, 0.1, outside),),
        bodies=(goods,), leaks=(leak(40.0, outside, ref.steady(0.022)),), moisture=ref.steady(0.2 / 3600.0),
        heat=ref.steady(60.0),
    )  # fmt: skip
    return Scenario(
        box, 36.0, (ref.Limit(AIR, -5.0), ref.Limit(("surface", 0), -5.0), ref.Limit(("mean", 0), -3.0)),
        (AIR, ("surface", 0), ("core", 0)),
    )  # fmt: skip


def moved():
    """From a cool hall into the sun, and into a cold store."""
    marks = (4 * 3600.0, 10 * 3600.0)

    def outside(t):
        return 15.0 if t < marks[0] else 38.0 if t < marks[1] else -5.0

    goods = ref.Body(60.0, 2.0, "slab", 0.08, 1000.0, 8.0, ref.chen(0.85, 0.04, -0.6), (0.5, -0.9, 0.0))
    box = ref.Box(
        volume=1.0, start_c=2.0, humidity_ratio=0.8 * ref.saturated(2.0), walls=(panel(6.0, 0.05, outside),),
        bodies=(goods,), leaks=(leak(1.0, outside, ref.steady(0.002)),), marks=marks,
    )  # fmt: skip
    return Scenario(
        box, 30.0, (ref.Limit(AIR, 10.0), ref.Limit(("mean", 0), 6.0), ref.Limit(("surface", 0), 8.0)),
        (AIR, ("core", 0), ("surface", 0)),
    )  # fmt: skip


def goods_taken_out():
    """Half of it goes, later all; other goods come warm into a place that was empty."""
    outside = ref.steady(30.0)
    stays = replace(BOX_OF_MEAT, mass=600.0, start_c=-18.0)
    comes = ref.Body(0.0, 5.0, "slab", 0.1, 1000.0, 8.0, ref.chen(0.85, 0.04, -0.6), (0.5, -0.9, 0.0))
    box = ref.Box(
        volume=20.0, start_c=-18.0, humidity_ratio=ref.saturated(-18.0), walls=(panel(45.0, 0.1, outside),),
        bodies=(stays, comes), leaks=(leak(3.0, outside),),
        moves=(ref.Move(3 * 3600.0, 0, 300.0), ref.Move(5 * 3600.0, 1, 200.0, comes_at_c=5.0)),
    )  # fmt: skip
    return Scenario(
        box, 36.0, (ref.Limit(("surface", 0), -12.0), ref.Limit(("mean", 0), -5.0), ref.Limit(("mean", 0), -10.0)),
        (AIR, ("mean", 0), ("core", 0)),
    )  # fmt: skip


def of_one_temperature():
    """So small and so good a conductor that only the film counts."""
    outside = ref.steady(25.0)
    cans = ref.Body(50.0, 3.0, "sphere", 0.01, 2700.0, 2.0, ref.Curve(-100.0, 900.0, 900.0), (200.0, 0, 0))
    box = ref.Box(
        volume=0.2,
        start_c=3.0,
        humidity_ratio=0.7 * ref.saturated(3.0),
        walls=(panel(2.0, 0.04, outside),),
        bodies=(cans,),
    )
    return Scenario(box, 24.0, (ref.Limit(("mean", 0), 8.0), ref.Limit(("core", 0), 15.0)), (AIR, ("core", 0)))


def of_no_film():
    """So thick and so bad a conductor that the film does not count."""
    outside = ref.steady(25.0)
    bale = ref.Body(300.0, 0.0, "slab", 0.25, 300.0, 500.0, ref.Curve(-100.0, 1800.0, 1800.0), (0.08, 0, 0))
    box = ref.Box(
        volume=3.0,
        start_c=0.0,
        humidity_ratio=0.7 * ref.saturated(0.0),
        walls=(panel(12.0, 0.06, outside),),
        bodies=(bale,),
    )
    return Scenario(
        box, 72.0, (ref.Limit(("surface", 0), 5.0), ref.Limit(("mean", 0), 3.0), ref.Limit(("surface", 0), 10.0)),
        (AIR, ("mean", 0), ("core", 0), ("surface", 0)),
    )  # fmt: skip


SCENARIOS = (
    empty_cooler, frozen_meat, thawing_by_composition, thawing_by_quoted_heats, ice_pack, pack_with_a_melting_range,
    dry_ice_spent_midway, door_stood_open, sun_on_a_roof, heavy_walls, living_goods, pull_down, freezing_down,
    water_settling, moved, goods_taken_out, of_one_temperature, of_no_film,
)  # fmt: skip


@pytest.mark.parametrize("scenario", SCENARIOS, ids=lambda made: made.__name__)
def test_engine_agrees(scenario):
    asked = scenario()
    reference = ref.run(asked.box, asked.hours, asked.limits, asked.signals, per_layer=16, per_body=40, rtol=1e-6)
    engine = both_timelines.run(asked.box, asked.hours, list(asked.limits), list(asked.signals))
    assert engine.heat_balance_error < 1e-6
    for i, limit in enumerate(asked.limits):
        expected, found = reference.crossed_s[i], float(engine.crossed_s[i, 0])
        assert 60.0 < expected < math.inf, f"{limit} tells nothing"
        assert abs(found - expected) <= max(60.0, 0.005 * expected), (limit, found / 3600.0, expected / 3600.0)
    for i, what in enumerate(asked.signals):
        # Hour 0 is left out: there the engine's surface already feels the air, the reference's not yet.
        off = np.abs(engine.series[1:, i, 0] - reference.series[what][1:])
        allowed = {"carbon dioxide": 0.01, "pack mass": 0.005 * asked.box.packs[0].mass if asked.box.packs else 0.0}
        assert np.max(off) <= allowed.get(what[0], 0.1), (what, int(np.argmax(off)), float(np.max(off)))
