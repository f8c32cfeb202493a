"""Product heat: the profile of a pull-down, the sum of a day, each breath counted once."""

from __future__ import annotations

import numpy as np
import pytest
from boxes import box_project, lot
from hypothesis import given
from hypothesis import strategies as st

from coldbox.account import product
from coldbox.errors import OutOfValidity
from coldbox.project.model import RespirationPoint
from coldbox.scene.build import build

A_DAY = 86400.0


def entries_of(project):
    return {entry.id: entry for entry in product.entries(build(project))}


@given(
    pulldown=st.floats(1800.0, 4 * A_DAY),
    factor=st.floats(0.5, 1.0),
    start=st.floats(0.0, 23.9),
    daily=st.floats(1.0, 1e5),
)
def test_a_days_intake_gives_off_all_its_heat_in_a_day_whatever_its_pulldown(pulldown, factor, start, daily):
    goods = lot(
        stored=0.0,
        arrives=daily / A_DAY,
        arrival_temperature=-10.0,
        pulldown=pulldown,
        chilling_factor=factor,
        arrival_time=start,
        composition=None,
        freezing_point=-2.0,
        specific_heat_above=3500.0,
        specific_heat_below=2000.0,
        latent_heat=250e3,
    )
    entry = entries_of(box_project(lots=[goods]))["lots.lot.intake"]
    assert entry.hours_w.sum() * 3600 == pytest.approx(daily * 2000.0 * 8.0, rel=1e-9)
    assert (entry.hours_w >= -1e-9).all()


def test_the_first_hour_draws_the_mean_over_the_chilling_rate_factor():
    elapsed = np.linspace(0.0, 36000.0, 1001)
    share = product.removed_share(elapsed, 36000.0, 0.67)
    assert share[0] == 0.0 and share[-1] == pytest.approx(1.0, rel=1e-12)
    rate = np.diff(share) / (elapsed[1] - elapsed[0]) * 36000.0
    assert rate.max() == pytest.approx(1 / 0.67, rel=1e-9)
    assert (np.diff(rate) <= 1e-9).all()


def test_an_even_pulldown_has_the_same_rate_throughout():
    hours = np.arange(11) * 3600.0
    assert product.removed_share(hours, 36000.0, 1.0) == pytest.approx(hours / 36000.0)


@pytest.mark.parametrize("factor", [0.49, 1.01])
def test_a_factor_the_profile_cannot_have_is_refused(factor):
    with pytest.raises(OutOfValidity):
        product.removed_share(np.array([0.0]), 3600.0, factor)


def test_the_hours_of_a_pulldown_longer_than_a_day_lie_over_yesterdays():
    goods = lot(stored=0.0, arrives=1000 / A_DAY, arrival_temperature=-8.0, pulldown=2 * A_DAY, chilling_factor=1.0)
    entry = entries_of(box_project(lots=[goods]))["lots.lot.intake"]
    assert np.ptp(entry.hours_w) < 1e-9 * entry.hours_w.max()


def living(**changes):
    points = (RespirationPoint(at_c=0.0, w_per_kg=0.02), RespirationPoint(at_c=20.0, w_per_kg=0.2))
    return lot(name="greens", respiration=points, freezing_point=-0.5, **changes)


def test_stored_produce_breathes_at_room_temperature_and_frozen_goods_do_not():
    cool = box_project(box={"temperature": 0.0}, lots=[living(stored=1000.0)])
    assert entries_of(cool)["lots.greens.respiration"].hours_w == pytest.approx(np.full(24, 20.0))
    frozen = box_project(box={"temperature": -18.0}, lots=[living(stored=1000.0)])
    assert "lots.greens.respiration" not in entries_of(frozen)


def test_todays_intake_breathes_between_what_it_would_warm_and_cold():
    def breath(**changes):
        project = box_project(box={"temperature": 0.0}, lots=[living(stored=0.0, **changes)])
        return entries_of(project)["lots.greens.respiration"].hours_w.sum() * 3600

    cooling = breath(arrives=1000 / A_DAY, arrival_temperature=20.0, pulldown=6 * 3600.0)
    assert 1000 * 0.02 * 6 * 3600 < cooling < 1000 * 0.2 * 6 * 3600


def test_transpiration_adds_water_and_takes_its_heat_from_the_goods():
    dry = living(stored=1000.0, transpiration=500e-12)
    entry = entries_of(box_project(box={"temperature": 2.0, "humidity": 0.9}, lots=[dry]))["lots.greens.transpiration"]
    assert entry.hours_w == pytest.approx(np.zeros(24), abs=1e-12)
    assert entry.latent_w[0] > 0
    assert entry.moisture_kg_per_day == pytest.approx(
        1000 * 500e-12 * 706.0 * 0.1 * A_DAY, rel=0.01
    )  # p_s(2 °C) 706 Pa


def test_packaging_comes_in_with_the_goods():
    wrapped = lot(
        stored=0.0, arrives=900 / A_DAY, arrival_temperature=-13.0, packaging="cardboard", packaging_mass=45.0
    )
    found = entries_of(box_project(lots=[wrapped]))
    entry = found["lots.lot.packaging"]
    heat = next(item.value for item in entry.inputs if item.key == "specific_heat_j_per_kgk")
    assert entry.hours_w.sum() * 3600 == pytest.approx(45.0 * heat * 5.0, rel=1e-9)


def test_draws_stay_apart():
    goods = lot(stored=0.0, arrives=np.array([[0.01], [0.02]]), arrival_temperature=np.array([[-10.0], [-8.0]]))
    together = entries_of(box_project(lots=[goods]))["lots.lot.intake"].hours_w
    for row, (arrives, warm) in enumerate([(0.01, -10.0), (0.02, -8.0)]):
        alone = entries_of(box_project(lots=[lot(stored=0.0, arrives=arrives, arrival_temperature=warm)]))
        assert together[row] == pytest.approx(alone["lots.lot.intake"].hours_w, rel=1e-12)
