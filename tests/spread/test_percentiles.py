"""Percentiles, their sampling error, chances, and what moves an answer."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as some

from coldbox.spread.draws import Draws, hypercube_column
from coldbox.spread.influence import drivers
from coldbox.spread.inputs import Column
from coldbox.spread.percentiles import SHARES, at_share, chance, percentiles

figures = some.lists(some.floats(-1e6, 1e6), min_size=1, max_size=60)


@given(values=figures)
def test_percentiles_against_numpy(values: list[float]) -> None:
    found = percentiles(np.array(values))
    expected = np.quantile(values, SHARES)
    np.testing.assert_allclose([found.p10, found.p50, found.p90], expected, rtol=1e-12, atol=1e-9)
    assert found.p10 is not None and found.p90 is not None and found.p10 <= found.p90


@given(values=figures, beyond=some.integers(1, 30))
def test_beyond_the_horizon_there_is_no_figure(values: list[float], beyond: int) -> None:
    both = np.array(values + [np.inf] * beyond)
    rng = np.random.default_rng(beyond)
    found = percentiles(rng.permutation(both))
    for share, value in zip(SHARES, (found.p10, found.p50, found.p90), strict=True):
        place = share * (len(both) - 1)
        reaches = int(np.ceil(place - 1e-12))
        if reaches >= len(values):
            assert value is None
        else:
            capped = np.where(np.isinf(both), 1e9, both)
            assert value == pytest.approx(np.quantile(capped, share), rel=1e-9, abs=1e-6)


def test_all_beyond_the_horizon() -> None:
    found = percentiles(np.full(20, np.inf))
    assert (found.p10, found.p50, found.p90) == (None, None, None)
    assert (found.p10_error, found.p50_error, found.p90_error) == (None, None, None)
    assert chance(np.full(20, np.inf), 24.0).share == 1.0


def test_the_error_is_what_repeated_draws_show() -> None:
    """Of 95 in 100 independent samples the percentile lies within its error of the true one."""
    rng = np.random.default_rng(11)
    count, runs = 400, 1500
    truth = np.quantile(rng.gamma(4.0, 5.0, 2_000_000), SHARES)
    hits, errors = np.zeros(3), np.zeros(3)
    for _ in range(runs):
        found = percentiles(rng.gamma(4.0, 5.0, count))
        values, widths = (found.p10, found.p50, found.p90), (found.p10_error, found.p50_error, found.p90_error)
        hits += [abs(one - true) <= width for one, true, width in zip(values, truth, widths, strict=True)]
        errors += widths
    assert np.all(np.abs(hits / runs - 0.95) < 0.025), hits / runs


def test_hypercube_draws_come_at_least_as_close() -> None:
    def answer(seed: int) -> Any:
        parts = [hypercube_column(key, 200, seed) for key in ("a", "b", "c")]
        return percentiles(parts[0] * 4.0 + parts[1] + parts[2] ** 2)

    found = [answer(seed) for seed in range(300)]
    for key in ("p10", "p50", "p90"):
        values = np.array([getattr(one, key) for one in found])
        told = np.mean([getattr(one, f"{key}_error") for one in found])
        assert 1.96 * values.std() < told


@pytest.mark.parametrize("true", [0.5, 0.9, 0.98])
def test_the_error_of_a_chance(true: float) -> None:
    rng = np.random.default_rng(2)
    found = [chance((rng.random(500) < true) * 1.0, 0.5) for _ in range(2000)]
    within = np.mean([abs(one.share - true) <= one.error for one in found])
    assert within == pytest.approx(0.95, abs=0.035)


def test_certain_chances_keep_an_error() -> None:
    sure = chance(np.full(500, 30.0), 24.0)
    assert sure.share == 1.0 and 0.002 < sure.error < 0.006
    assert chance(np.full(500, 10.0), 24.0).share == 0.0
    assert chance(np.array([23.9, 24.0, 24.1, np.inf]), 24.0).share == 0.75


def test_at_share_of_one_figure() -> None:
    assert at_share(np.array([3.0]), 0.9) == 3.0
    assert at_share(np.array([np.inf]), 0.1) is None


def planted(count: int = 500, seed: int = 1) -> Draws:
    keys = [f"input.{letter}" for letter in "abcdefghij"]
    return Draws(
        project=None,  # type: ignore[arg-type]
        count=count,
        seed=seed,
        columns=tuple(Column(key=key, label=key, shape="normal", targets=()) for key in keys),
        ranks={key: hypercube_column(key, count, seed) for key in keys},
        values={},
        enthalpy=np.array(1.0),
        films=np.array(1.0),
    )


@pytest.mark.parametrize("seed", range(20))
def test_planted_drivers_are_found_in_order(seed: int) -> None:
    drawn = planted(seed=seed)
    answer = 20.0 + 8.0 * drawn.ranks["input.d"] - 3.0 * drawn.ranks["input.h"]
    found = drivers(drawn, answer)
    assert [one.key for one in found[:2]] == ["input.d", "input.h"]
    # The middle of the highest fifth less that of the lowest: 0.9 - 0.1 of the whole.
    by_chance = 3.0 * float(answer.std()) * np.sqrt(2.0 / 100.0)
    assert found[0].swing == pytest.approx(6.4, abs=by_chance)
    assert found[1].swing == pytest.approx(-2.4, abs=by_chance)
    assert found[0].at_lowest < 0.0 < found[0].at_highest
    assert len(found) <= 3


def test_what_does_nothing_is_not_named() -> None:
    assert drivers(planted(), np.full(500, 12.0)) == ()
    false = sum(len(drivers(planted(seed=seed), np.random.default_rng(seed).normal(size=500))) for seed in range(100))
    assert false <= 8  # of 1000 inputs without any effect


def test_drivers_beyond_the_horizon() -> None:
    drawn = planted()
    answer = 10.0 + 10.0 * drawn.ranks["input.c"]
    answer[answer > 18.0] = np.inf
    found = drivers(drawn, answer, 18.0)
    assert found[0].key == "input.c" and found[0].beyond
    assert drivers(drawn, np.full(500, np.inf), 18.0) == ()
    assert drivers(drawn, answer) == ()  # no horizon told: nothing to count them as


def test_too_few_draws_say_nothing() -> None:
    few = planted(count=4)
    assert drivers(few, np.arange(4.0)) == ()
