"""Required capacity from an account: daily heat over the running hours, or the peak hour, whichever is larger."""

from __future__ import annotations

from functools import reduce
from typing import Literal

import numpy as np

from coldbox.account.entry import Entry
from coldbox.physics.number import FloatArray, Number
from coldbox.project.model import Project
from coldbox.record import Record

ATP_LOWEST_C = {"a": 0.0, "b": -10.0, "c": -20.0, "d": 0.0, "e": -10.0, "f": -20.0}
ATP_OUTSIDE_C = 30.0
ATP_APART, ATP_TOGETHER = 1.75, 1.35


class Capacity(Record):
    """The candidates side by side; scalars or (draws,)."""

    counted_daily_j: Number
    cold_w: Number
    peak_hour: int
    peak_w: Number
    by_daily_w: Number
    by_peak_w: Number
    by_atp_w: Number | None
    required_w: Number
    governs: Literal["daily", "peak", "atp"]


def capacity(project: Project, entries: list[Entry], ua_w_per_k: Number) -> Capacity:
    """The required capacity.

    max(daily heat / running hours, peak demand) x (1 + safety). The peak demand is taken without defrost heat: the
    coil is off while it defrosts, and what the defrost leaves behind is in the daily heat that the running hours carry
    away. Negative entries count only with `credit_cold`. A box with an ATP class also needs what the agreement asks at
    least: 1.75 (1.35 where unit and body were tested together) times the heat through the walls at +30 °C outside and
    the lowest temperature of its class. That rule knows no doors and no warm goods, so it never lowers the answer.

    ua_w_per_k: W/K, float or (draws, 1). Result in W and J a day.
    Source: trade practice for running hours and safety; ATP, annex 1.
    """
    counted, cold, peak_demand = _sums(project, entries)
    peak_w = peak_demand.max(axis=-1)
    daily_j = counted.sum(axis=-1) * 3600.0
    margin = 1.0 + _flat(project.sizing.safety)
    # With credit for the cold the sums may fall below nothing: others then keep the box cold, and it needs no machine.
    by_daily = np.maximum(daily_j, 0.0) / _flat(project.sizing.run_hours) * margin
    by_peak = np.maximum(peak_w, 0.0) * margin
    by_atp = _atp(project, ua_w_per_k)
    candidates: dict[Literal["daily", "peak", "atp"], Number] = {"daily": by_daily, "peak": by_peak}
    if by_atp is not None:
        candidates["atp"] = by_atp
    return Capacity(
        counted_daily_j=daily_j,
        cold_w=0.0 - cold.mean(axis=-1),
        peak_hour=_first_of_the_highest(peak_demand.reshape(-1, 24).mean(axis=0)),
        peak_w=peak_w,
        by_daily_w=by_daily,
        by_peak_w=by_peak,
        by_atp_w=by_atp,
        required_w=reduce(np.maximum, candidates.values()),
        governs=max(candidates, key=lambda name: float(np.mean(candidates[name]))),
    )


def _first_of_the_highest(hours: FloatArray) -> int:
    """The first hour that reaches the highest figure; rounding does not choose among equal hours."""
    highest = float(hours.max())
    return int(np.argmax(hours >= highest - 1e-9 * max(abs(highest), 1.0)))


def _sums(project: Project, entries: list[Entry]) -> tuple[FloatArray, FloatArray, FloatArray]:
    """What counts, hour by hour; the negative entries; and what counts without defrost heat. Each (…, 24)."""
    counted = np.zeros(24)
    cold = np.zeros(24)
    demand = np.zeros(24)
    for entry in entries:
        watts = entry.hours_w
        below = np.minimum(watts, 0.0)
        takes = watts if project.box.credit_cold else watts - below
        cold = cold + below
        counted = counted + takes
        if not entry.defrost:
            demand = demand + takes
    return counted, cold, demand


def _flat(value: Number) -> Number:
    """A steady figure without its hour axis: float or (draws,)."""
    return value[..., 0] if isinstance(value, np.ndarray) else value


def _atp(project: Project, ua_w_per_k: Number) -> Number | None:
    classes = [rule.removeprefix("atp-") for rule in project.box.rules if rule.startswith("atp-")]
    if not classes:
        return None
    factor = ATP_TOGETHER if project.sizing.tested_with_unit else ATP_APART
    coldest = min(ATP_LOWEST_C[name] for name in classes)
    return factor * _flat(ua_w_per_k) * (ATP_OUTSIDE_C - coldest)
