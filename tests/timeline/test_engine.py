"""The engine as a whole: books that close, refinement, company of other draws, odd states, ice as heat comes."""

import math
from dataclasses import replace

import both_timelines
import chambers
import numpy as np
import pytest
import reference_timeline as ref
from hypothesis import given, settings
from hypothesis import strategies as st
from test_against_reference import MEAT, MEAT_K, SCENARIOS, panel

from coldbox.timeline import solver
from coldbox.timeline.types import Change, Plan, Signal, Watch

BOXES = {made.__name__: made for made in SCENARIOS}


def crossings(name, **finer):
    asked = BOXES[name]()
    trace = both_timelines.run(asked.box, asked.hours, list(asked.limits), list(asked.signals), **finer)
    assert trace.heat_balance_error < 1e-6
    return trace.crossed_s[:, 0]


@pytest.mark.parametrize("name", BOXES)
def test_half_the_step_and_half_the_cells_move_little(name):
    usual = crossings(name)
    finer = crossings(name, wall_cells=24, lot_cells=40, step_s=300.0)
    assert np.all(np.abs(finer - usual) <= np.maximum(0.005 * usual, 30.0)), (usual / 3600.0, finer / 3600.0)


# --- ice as heat comes


def still_box(conductance, *, coolants=(), lots=(), start_c=0.0, outside_c=35.0, **more):
    wall = chambers.wall(1.0 / conductance, 0.0)
    made = chambers.network(
        parts=(wall,), lots=lots, coolants=coolants, start_c=start_c, ratio=0.0, volume=0.05, **more
    )
    return made, chambers.Lasting(outside_c)


def test_printed_foam_box_melts_its_ice():
    """OpenStax College Physics, ch. 14.5 ex. 1: 0.950 m² of 25 mm, k 0.010, 0 and 35 °C: 13.3 W, 3.44 kg in 24 h.

    The ice of the book is all at 0 °C with nothing between it and the wall: so the exchange is large here.
    """
    conductance = 0.010 * 0.950 / 0.025
    ice = chambers.pack(mass=10.0, exchange=1e5, curve=chambers.ICE.replace(latent_heat=334e3))
    network, drivers = still_box(conductance, coolants=(ice,))
    plan = Plan(start_s=0.0, end_s=86400.0, signals=(Signal(what="pack frozen"),))
    trace = solver.run(network, drivers, plan)
    assert trace.heat_in[0] / 86400.0 == pytest.approx(13.3, rel=0.005)
    assert 10.0 * (1.0 - trace.last[0, 0]) == pytest.approx(3.44, rel=0.005)


def test_ice_is_spent_when_its_latent_heat_has_come():
    """Quasi-steady: the air sits between wall and ice, so m L = t ΔT / (1/UA + 1/exchange) to the last gram."""
    ice = chambers.pack(mass=4.0, whole_mass=4.0, exchange=5.0)
    network, drivers = still_box(0.8, coolants=(ice,), outside_c=30.0, start_c=30.0 * 0.8 / 5.8)
    plan = Plan(start_s=0.0, end_s=100 * 3600.0, signals=(Signal(what="air"),))
    trace = solver.run(network, drivers, plan)
    melts_over, latent = 0.01, 333_600.0  # the curve's least width: its middle is 5 mK below 0 °C
    heat = 4.0 * (latent + 2030.0 * melts_over)
    expected = heat / ((30.0 + 0.5 * melts_over) / (1.0 / 0.8 + 1.0 / 5.0))
    assert trace.spent_s[0, 0] == pytest.approx(expected, rel=5e-4)


def test_dry_ice_goes_by_its_heat_of_sublimation_and_its_gas():
    """At a steady air the wall's heat is what sublimes and what warms the gas: Q = ṁ (571 000 + 800 (T + 78.5))."""
    made = chambers.pack(name="dry ice", mass=50.0, whole_mass=50.0, exchange=3.0, sublimes=True)
    network, drivers = still_box(0.5, coolants=(made,), start_c=-60.0, outside_c=20.0)
    signals = (Signal(what="air"), Signal(what="pack mass"))
    hours = np.arange(0.0, 7 * 3600.0, 3600.0)
    trace = solver.run(network, drivers, Plan(start_s=0.0, end_s=hours[-1], signals=signals, times_s=tuple(hours)))
    air, left = trace.series[-1, 0, 0], trace.series[:, 1, 0]
    rate = (left[-2] - left[-1]) / 3600.0
    assert 0.5 * (20.0 - air) == pytest.approx(rate * (571_000.0 + 800.0 * (air + 78.5)), rel=2e-3)


# --- company and odd states


def varied(draws, rng):
    return 1.0 + 0.1 * rng.standard_normal(draws)


def test_a_draw_does_not_feel_the_others():
    """The first draw sets the pace; whoever else is in a block changes no digit."""
    rng = np.random.default_rng(3)
    films, heats, masses = 8.0 * varied(6, rng), 240e3 * varied(6, rng), 2.0 * varied(6, rng)

    def crossed(rows):
        lot = chambers.lot(
            film=films[rows], start_c=-5.0, mass=20.0, curve=chambers.quoted(latent=heats[rows]),
        )  # fmt: skip
        ice = chambers.pack(mass=masses[rows], whole_mass=masses[rows], exchange=4.0)
        network, drivers = still_box(2.0, coolants=(ice,), lots=(lot,), start_c=-5.0, draws=len(rows))
        signals = (Signal(what="lot", where="surface"), Signal(what="lot", where="core"))
        watches = tuple(Watch(signal=i, side="above", limit=limit) for i in (0, 1) for limit in (-2.0, 1.0, 8.0))
        plan = Plan(start_s=0.0, end_s=72 * 3600.0, signals=signals, watches=watches)
        return solver.run(network, drivers, plan).crossed_s

    together, apart = crossed([0, 1, 2, 3, 4, 5]), crossed([0, 4])
    assert np.isfinite(together).all()
    assert np.array_equal(together[:, [0, 4]], apart)


@settings(max_examples=40, deadline=None)
@given(
    start=st.floats(-30.0, 20.0), outside=st.floats(-30.0, 45.0), size=st.sampled_from([1e-4, 0.02, 0.3, 2.0]),
    film=st.sampled_from([0.01, 5.0, 1e4]), mass=st.sampled_from([0.0, 1e-6, 50.0, 1e5]), point=st.floats(-5.0, -0.01),
    chen=st.booleans(), at_point=st.booleans(), ice=st.sampled_from([0.0, 0.5, 20.0]), frozen=st.floats(0.0, 1.0),
)  # fmt: skip
def test_books_close_and_nothing_is_lost_in_odd_boxes(
    start, outside, size, film, mass, point, chen, at_point, ice, frozen
):
    curve = chambers.chen(point=point) if chen else chambers.quoted(point=point)
    lot = chambers.lot(
        half_thickness=size, film=film, mass=mass, start_c=point if at_point else start, curve=curve,
    )  # fmt: skip
    coolants = (chambers.pack(mass=ice, whole_mass=max(ice, 1.0), frozen=frozen, start_c=min(start, 0.0)),)
    wall = chambers.wall(0.2, 5e4, radiating=4.0, cells=6)
    network = chambers.network(parts=(wall,), lots=(lot,), coolants=coolants, start_c=start, ratio=0.001)
    drivers = chambers.Lasting(outside, film=80.0, gain_w=900.0)
    signals = (Signal(what="air"), *(Signal(what="lot", where=x) for x in ("surface", "mean", "core")))
    changes = [
        Change(at_s=7200.0, what="pack in", row=0, mass=1.0, temperature_c=-10.0),
        Change(at_s=7200.0, what="lot out", row=0, mass=mass / 2.0),
        Change(at_s=7200.0, what="lot in", row=0, mass=3.0, temperature_c=4.0),
    ]
    plan = Plan(start_s=0.0, end_s=24 * 3600.0, signals=signals, changes=changes)
    trace = solver.run(network, drivers, plan)
    assert trace.heat_balance_error < 1e-6
    for figures in (trace.last, trace.lowest, trace.highest):
        assert np.isfinite(figures).all()
    # Everything stays between the coldest and the warmest that is there; the sun-lit surface may warm the box beyond
    # the outside air, by what it absorbs over its film at most.
    coldest = min(start, outside, lot.start_c, -10.0, point) - 15.0
    warmest = max(start, outside, lot.start_c, 4.0) + 900.0 / 80.0 + 1.0
    assert coldest <= trace.lowest.min() and trace.highest.max() <= warmest


def test_thirty_days_are_no_trouble():
    outside = ref.steady(25.0)
    body = ref.Body(2000.0, -20.0, "slab", 0.3, 950.0, 6.0, MEAT, MEAT_K)
    box = ref.Box(
        volume=30.0,
        start_c=-20.0,
        humidity_ratio=ref.saturated(-20.0),
        walls=(panel(60.0, 0.2, outside),),
        bodies=(body,),
    )
    trace = both_timelines.run(box, 720.0, [ref.Limit(("mean", 0), -1.5), ref.Limit(("air",), 60.0)], [("air",)])
    assert trace.heat_balance_error < 1e-6
    assert 0.0 < trace.crossed_s[0, 0] < math.inf
    assert trace.crossed_s[1, 0] == math.inf
    assert trace.steps < 5000


def test_over_the_limit_from_the_start_is_crossed_at_once():
    lot = chambers.lot(start_c=9.0)
    network, drivers = still_box(2.0, lots=(lot,), start_c=9.0, outside_c=30.0)
    signals = (Signal(what="lot", where="mean"),)
    watches = (
        Watch(signal=0, side="above", limit=8.0),
        Watch(signal=0, side="above", limit=8.0, allowed_s=1800.0),
        Watch(signal=0, side="below", limit=10.0),
    )
    plan = Plan(start_s=500.0, end_s=36_000.0, signals=signals, watches=watches)
    trace = solver.run(network, drivers, plan)
    assert trace.crossed_s[:, 0] == pytest.approx([500.0, 2300.0, 500.0])


def test_steps_stay_few_where_nothing_happens():
    """Work, not time: an hour in six steps once everything is slow."""
    asked = BOXES["frozen_meat"]()
    slow = replace(asked.box.bodies[0], mass=20_000.0)
    box = replace(asked.box, bodies=(slow,))
    trace = both_timelines.run(box, 72.0, list(asked.limits), list(asked.signals))
    assert trace.steps <= 72 * 6 + 120
