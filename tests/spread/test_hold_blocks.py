"""Blocks of draws put together, with an engine that is a formula: what comes in comes out, once, in order."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest
import runs_by_hand as by_hand

from coldbox.errors import Stopped
from coldbox.project.model import Project
from coldbox.spread import hold
from coldbox.spread.draws import draws
from coldbox.timeline.results import Outage

PROJECT = by_hand.outage().project


def formula(project: Project, *, factors: Any = None, go_on: Any = None, series: bool = True) -> Outage:
    """Hours that fall with leakage and rise with the heat content of the goods; beyond 24 h nothing is crossed."""
    films = 1.0 if factors is None else np.ravel(factors.films)
    enthalpy = 1.0 if factors is None else np.ravel(factors.enthalpy)
    leak = np.ravel(project.box.leakage.per_second) * 3600.0
    hours = np.asarray(30.0 * enthalpy / (films**0.5) - 40.0 * leak + 0.0 * leak)
    hours = np.where(hours > 24.0, np.inf, hours)
    if go_on is not None:
        for share in (0.5, 1.0):
            if not go_on(share):
                raise Stopped
    first, core = by_hand.outage().limits
    middle = float(hours[0])
    return by_hand.outage(
        project=project,
        hold_h=middle if np.isfinite(middle) else None,
        draws=len(hours),
        hold_draws_h=hours,
        first_draws=np.where(np.isfinite(hours), 0, -1),
        limits=(first.replace(crossed_draws_h=hours), core.replace(crossed_draws_h=np.full(len(hours), np.inf))),
        packs=(by_hand.outage().packs[0].replace(spent_draws_h=2.0 * hours),),
        heat_balance_error=1e-9 * len(hours) + (0.0 if series else 1e-8),
        notes=("series kept",) if series else ("no series",),
        spread=None,
    )


@pytest.fixture(autouse=True)
def _formula(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(hold, "engine", lambda _kind: formula)


def test_blocks_change_no_digit() -> None:
    whole = hold.run(PROJECT, count=97, seed=3)
    for block in (1, 7, 50, 97, 1000):
        other = hold.run(PROJECT, count=97, seed=3, block=block)
        assert np.array_equal(whole.hold_draws_h, other.hold_draws_h)
        assert np.array_equal(whole.limits[0].crossed_draws_h, other.limits[0].crossed_draws_h)
        assert np.array_equal(whole.packs[0].spent_draws_h, other.packs[0].spent_draws_h)
        assert whole.spread == other.spread and whole.hold_h == other.hold_h
        assert np.shape(other.first_draws) == (97,)


def test_draws_meet_the_engine_as_they_were_made() -> None:
    found = hold.run(PROJECT, count=40, seed=5, block=16)
    made = draws(PROJECT, 40, 5)
    leak = made.values["box.leakage"] * 3600.0
    expected = 30.0 * made.enthalpy / made.films**0.5 - 40.0 * leak
    expected = np.where(expected > 24.0, np.inf, expected)
    np.testing.assert_allclose(found.hold_draws_h, expected[1:], rtol=1e-12)
    assert found.hold_h == pytest.approx(expected[0])
    assert found.project is PROJECT and found.draws == 40


def test_the_spread_says_what_the_draws_say() -> None:
    found = hold.run(PROJECT, count=500, seed=1)
    spread, hours = found.spread, found.hold_draws_h
    assert hours is not None
    finite = np.where(np.isinf(hours), 1e9, hours)
    assert spread.hours.p10 == pytest.approx(np.quantile(finite, 0.1))
    assert spread.never.share == np.mean(np.isinf(hours)) > 0.1
    assert spread.hours.p90 is None
    assert spread.asked.share == np.mean(hours >= 16.0)
    assert spread.first_shares == (1.0 - spread.never.share, 0.0)
    assert spread.limits[0] == spread.hours and spread.limits[1].p10 is None
    assert [one.key for one in spread.drivers[:2]] == ["box.leakage", "spreads.films"] or [
        one.key for one in spread.drivers[:2]
    ] == ["box.leakage", "spreads.enthalpy"]
    assert spread.drivers[0].at_lowest > 0.0 > spread.drivers[0].at_highest


def test_asked_beyond_the_horizon_has_no_chance(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(hold, "engine", lambda _kind: lambda *a, **k: formula(*a, **k).replace(asked_h=60.0))
    assert hold.run(PROJECT, count=20).spread.asked is None


def test_no_draws_no_spread() -> None:
    found = hold.run(PROJECT, count=0)
    assert found.spread is None and found.draws == 1


def test_progress_runs_from_nothing_to_all() -> None:
    told: list[float] = []

    def go_on(share: float) -> bool:
        told.append(share)
        return True

    hold.run(PROJECT, count=60, block=20, go_on=go_on)
    assert told == sorted(told) and len(told) == 6 and told[-1] == pytest.approx(1.0)


def test_it_stops_at_once_when_told() -> None:
    calls: list[float] = []

    def go_on(share: float) -> bool:
        calls.append(share)
        return len(calls) < 3

    with pytest.raises(Stopped):
        hold.run(PROJECT, count=100, block=10, go_on=go_on)
    assert len(calls) == 3


def test_the_worst_balance_and_every_note_are_kept() -> None:
    found = hold.run(PROJECT, count=25, block=10)
    assert found.heat_balance_error == pytest.approx(21e-9)
    assert found.notes == ("series kept", "no series")


def test_one_figure_for_all_draws_is_theirs_all(monkeypatch: pytest.MonkeyPatch) -> None:
    def steady(*a: Any, **k: Any) -> Outage:
        return formula(*a, **k).replace(hold_draws_h=np.array([5.0]), first_draws=None)

    monkeypatch.setattr(hold, "engine", lambda _kind: steady)
    found = hold.run(PROJECT, count=12, block=5)
    assert found.hold_draws_h is not None and found.hold_draws_h.tolist() == [5.0] * 12
    assert found.spread.first_shares == (0.0, 0.0)


def test_back_within_the_limit_is_the_answer_of_a_recovery(monkeypatch: pytest.MonkeyPatch) -> None:
    def back(*a: Any, **k: Any) -> Outage:
        found = formula(*a, **k)
        hours = found.hold_draws_h
        limits = tuple(one.replace(back_draws_h=hours) for one in found.limits)
        return found.replace(kind="recovery", reached_draws_h=hours, limits=limits, hold_draws_h=None)

    monkeypatch.setattr(hold, "engine", lambda _kind: back)
    spread = hold.run(PROJECT, "recovery", count=200).spread
    hours = hold.run(PROJECT, "recovery", count=200).reached_draws_h
    assert hours is not None
    assert spread.asked.share == np.mean(hours <= 16.0)  # by then it is back
    assert spread.limits[1] == spread.hours
