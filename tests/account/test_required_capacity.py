"""The required capacity and what may not be counted twice."""

from __future__ import annotations

import numpy as np
import pytest
from boxes import box_project
from hypothesis import given
from hypothesis import strategies as st

from coldbox.account.capacity import capacity
from coldbox.account.entry import Entry
from coldbox.project.model import Sizing


def entry(name, hours, *, defrost=False):
    return Entry(
        id=name, group="internal", label=name, sensible_w=np.asarray(hours, float), latent_w=np.zeros(24),
        moisture_kg_per_day=0.0, method="as given", source="as-given", formula="", inputs=(), defrost=defrost,
    )  # fmt: skip


def project(**changes):
    box = {key: value for key, value in changes.items() if key in ("credit_cold", "rules")}
    sizing = {"run_hours": 18 * 3600.0, "safety": 0.1, "tested_with_unit": False}
    sizing |= {key: value for key, value in changes.items() if key in sizing}
    return box_project(box=box, sizing=Sizing(**sizing))


def test_daily_heat_over_running_hours_governs_a_flat_day():
    sized = capacity(project(), [entry("flat", np.full(24, 1000.0))], 10.0)
    assert sized.required_w == pytest.approx(1000.0 * 24 / 18 * 1.1) == pytest.approx(sized.by_daily_w)
    assert sized.governs == "daily"


def test_the_peak_hour_governs_a_peaked_day():
    hours = np.full(24, 100.0)
    hours[15] = 5000.0
    sized = capacity(project(), [entry("peaked", hours)], 10.0)
    assert sized.governs == "peak" and sized.peak_hour == 15
    assert sized.required_w == pytest.approx(5500.0)


def test_defrost_heat_is_in_the_daily_heat_and_never_in_the_peak():
    flat = entry("flat", np.full(24, 1000.0))
    thaw = entry("defrost", np.full(24, 300.0), defrost=True)
    sized = capacity(project(), [flat, thaw], 10.0)
    assert sized.peak_w == pytest.approx(1000.0)
    assert sized.by_daily_w == pytest.approx(1300.0 * 24 / 18 * 1.1)


def test_cold_is_credited_only_on_request():
    hours = np.full(24, 1000.0)
    cold = entry("freezer next door", np.full(24, -200.0))
    without = capacity(project(), [entry("warm", hours), cold], 10.0)
    with_it = capacity(project(credit_cold=True), [entry("warm", hours), cold], 10.0)
    assert without.peak_w == pytest.approx(1000.0) and with_it.peak_w == pytest.approx(800.0)
    assert without.cold_w == pytest.approx(200.0) == pytest.approx(with_it.cold_w)


def test_a_box_that_others_keep_cold_needs_no_machine():
    sized = capacity(project(credit_cold=True), [entry("freezer next door", np.full(24, -200.0))], 10.0)
    assert sized.required_w == sized.by_daily_w == sized.by_peak_w == 0.0


@pytest.mark.parametrize(("rule", "outside_less_class"), [("atp-a", 30.0), ("atp-b", 40.0), ("atp-c", 50.0)])
@pytest.mark.parametrize(("together", "factor"), [(False, 1.75), (True, 1.35)])
def test_the_transport_rule_asks_for_its_multiple_of_the_walls(rule, outside_less_class, together, factor):
    sized = capacity(project(rules=(rule,), tested_with_unit=together), [entry("flat", np.full(24, 100.0))], 12.0)
    assert sized.governs == "atp"
    assert sized.required_w == pytest.approx(factor * 12.0 * outside_less_class)


def test_the_transport_rule_never_lowers_what_the_day_asks():
    sized = capacity(project(rules=("atp-c",)), [entry("busy", np.full(24, 5000.0))], 12.0)
    assert sized.governs == "daily" and sized.by_atp_w == pytest.approx(1.75 * 12.0 * 50.0)
    assert sized.required_w == pytest.approx(sized.by_daily_w)


@given(
    hours=st.lists(st.floats(0.0, 1e4), min_size=24, max_size=24),
    run=st.floats(10.0, 24.0),
    safety=st.floats(0.0, 0.5),
)
def test_it_is_the_larger_of_the_two_and_never_less_than_the_mean(hours, run, safety):
    sized = capacity(project(run_hours=run * 3600.0, safety=safety), [entry("any", hours)], 10.0)
    assert sized.required_w == pytest.approx(max(sized.by_daily_w, sized.by_peak_w))
    assert sized.required_w >= np.mean(hours) * (1 + safety) - 1e-9


def test_draws_are_sized_one_by_one():
    hours = np.stack([np.full(24, 500.0), np.full(24, 900.0)])
    many = capacity(project(), [entry("two", hours)], np.array([[10.0], [12.0]]))
    one = capacity(project(), [entry("one", hours[1])], 12.0)
    assert many.required_w.shape == (2,)
    assert many.required_w[1] == pytest.approx(one.required_w)
