"""Results as plain data: the JSON of the contract, always SI, and series for a CSV."""

from __future__ import annotations

from collections.abc import Iterable, Iterator
from typing import TYPE_CHECKING, Any

import numpy as np

from coldbox.account.entry import Entry, Finding, Load
from coldbox.physics.number import Number

if TYPE_CHECKING:  # each command loads only its own half
    from coldbox.spread.capacity import CapacitySpread
    from coldbox.spread.hold import HoldSpread
    from coldbox.spread.influence import Driver
    from coldbox.timeline.results import LimitResult, Outage, Series, Trip

Json = None | bool | int | float | str | list["Json"] | dict[str, "Json"]


def load_json(load: Load, spread: CapacitySpread | None = None) -> dict[str, Json]:
    """The load as the contract's JSON object; keys end in their unit. For a load without draws, beside its spread."""
    return {
        "name": load.project.name,
        "required_capacity_w": _number(load.required_capacity_w),
        "governs": load.governs,
        "daily_heat_kwh": _number(load.daily_heat_j) / 3.6e6,
        "counted_daily_heat_kwh": _number(load.counted_daily_j) / 3.6e6,
        "run_hours": _number(load.run_hours),
        "safety": _number(load.safety),
        "by_daily_w": _number(load.by_daily_w),
        "by_peak_w": _number(load.by_peak_w),
        "by_atp_w": None if load.by_atp_w is None else _number(load.by_atp_w),
        "peak": {"hour": load.peak_hour, "heat_w": _number(load.peak_w)},
        "hours_w": _list(load.hours_w),
        "entries": [_entry(entry, load.peak_hour) for entry in load.entries],
        "credited_cold_w": _number(load.cold_w) if load.project.box.credit_cold else 0.0,
        "uncredited_cold_w": 0.0 if load.project.box.credit_cold else _number(load.cold_w),
        "frost_kg_per_day": _number(load.frost_kg_per_day),
        "ua_w_per_k": _number(load.ua_w_per_k),
        "k_w_per_m2k": _number(load.k_w_per_m2k),
        "facts": {key: _number(value) for key, value in load.facts.items()},
        **({} if spread is None else {"spread": _capacity_spread(spread)}),
        "findings": [finding_json(finding) for finding in load.findings],
    }


def _capacity_spread(spread: CapacitySpread) -> dict[str, Json]:
    """Without the safety allowance: it stands for the same thing."""
    found = spread.required_w
    return {
        "draws": found.draws,
        "seed": spread.seed,
        "p10_w": found.p10,
        "p50_w": found.p50,
        "p90_w": found.p90,
        "p10_error_w": found.p10_error,
        "p50_error_w": found.p50_error,
        "p90_error_w": found.p90_error,
        "middle_w": spread.middle_w,
        "drivers": [_driver(one, "w") for one in spread.drivers],
    }


def _driver(driver: Driver, unit: str) -> dict[str, Json]:
    """An input that moves the answer: its mean where the input is lowest and highest, less the mean of all."""
    return {
        "key": driver.key,
        "label": driver.label,
        f"at_lowest_{unit}": driver.at_lowest,
        f"at_highest_{unit}": driver.at_highest,
    }


def outage_json(found: Outage) -> dict[str, Json]:
    """An outage, pull-down or recovery as the contract's JSON object; what lies beyond the horizon is null."""
    spread: HoldSpread | None = found.spread
    gas = found.carbon_dioxide
    return {
        "name": found.project.name,
        "kind": found.kind,
        "hold_h": found.hold_h,
        "horizon_h": found.horizon_h,
        "asked_h": found.asked_h,
        "power_back_h": found.power_back_h,
        "start_clock": found.start_clock,
        "reached_h": found.reached_h,
        "reached_clock": found.reached_clock,
        "first": None if found.first is None else _first(found.first),
        "limits": [_limit(one) for one in found.limits],
        **({} if spread is None else {"spread": _hold_spread(spread)}),
        "heat_balance_error": found.heat_balance_error,
        "packs": [
            {"id": one.id, "left_kg": one.left_kg, "frozen": one.frozen, "spent_at_h": one.spent_at_h}
            for one in found.packs
        ],
        "carbon_dioxide": None if gas is None else {key: _plain(value) for key, value in gas},
        "events": [{"at_h": one.at_h, "clock": one.clock, "text": one.text} for one in found.events],
        "inside": list(found.inside),
        "stopped": list(found.stopped),
        "notes": list(found.notes),
        "facts": {key: _number(value) for key, value in found.facts.items()},
        "trace": _trace(found.trace),
        "findings": [finding_json(finding) for finding in found.findings],
    }


def trip_json(found: Trip) -> dict[str, Json]:
    """A trip as the contract's JSON object: an outage's keys, and its legs and stops."""
    legs: list[Json] = [
        {
            "kind": leg.kind,
            "label": leg.label,
            "from_h": leg.from_h,
            "to_h": leg.to_h,
            "worst_c": leg.worst_c,
            "margin_k": leg.margin_k,
            "worst_lot": leg.worst_lot,
            "worst_where": leg.worst_where,
            "air_highest_c": leg.air_highest_c,
            "heading_deg": leg.heading,
        }
        for leg in found.legs
    ]
    return {**outage_json(found), "legs": legs}


def _first(limit: LimitResult) -> dict[str, Json]:
    return {
        "lot": limit.lot,
        "side": limit.side,
        "where": limit.where,
        "limit_c": limit.limit_c,
        "at_h": limit.crossed_at_h,
        "at_clock": limit.at_clock,
    }


def _limit(limit: LimitResult) -> dict[str, Json]:
    return {
        "lot": limit.lot,
        "side": limit.side,
        "where": limit.where,
        "limit_c": limit.limit_c,
        "allowed_min": limit.allowed_min,
        "crossed_at_h": limit.crossed_at_h,
        "at_clock": limit.at_clock,
        "start_c": limit.start_c,
        "end_c": limit.end_c,
        "worst_c": limit.worst_c,
        "beyond_min": limit.beyond_min,
        "back_at_h": limit.back_at_h,
        "back_clock": limit.back_clock,
    }


def _hold_spread(spread: HoldSpread) -> dict[str, Json]:
    hours = spread.hours
    return {
        "draws": spread.draws,
        "seed": spread.seed,
        "p10_h": hours.p10,
        "p50_h": hours.p50,
        "p90_h": hours.p90,
        "p10_error_h": hours.p10_error,
        "p50_error_h": hours.p50_error,
        "p90_error_h": hours.p90_error,
        "never_share": spread.never.share,
        "chance_of_asked": None if spread.asked is None else spread.asked.share,
        "chance_error": None if spread.asked is None else spread.asked.error,
        "limits": [
            {"p10_h": one.p10, "p50_h": one.p50, "p90_h": one.p90, "first_share": share}
            for one, share in zip(spread.limits, spread.first_shares, strict=True)
        ],
        "drivers": [_driver(one, "h") for one in spread.drivers],
        "not_drawn": list(spread.left_out),
    }


def _trace(series: Series) -> dict[str, Json]:
    lots: dict[str, Json] = {}
    for name, lot in series.lots.items():
        lots[name] = {
            key: [float(one) if there else None for one, there in zip(values, lot.there, strict=True)]
            for key, values in (("surface_c", lot.surface_c), ("mean_c", lot.mean_c), ("core_c", lot.core_c))
        }
    trace: dict[str, Json] = {
        "t_h": _list(series.t_h),
        "air_c": _list(series.air_c),
        "humidity": _list(series.humidity),
        "lots": lots,
        "packs": {
            name: {"left_kg": _list(pack.left_kg), "frozen": _list(pack.frozen)} for name, pack in series.packs.items()
        },
    }
    for key, ppm in (("carbon_dioxide_ppm", series.carbon_dioxide_ppm), ("around_ppm", series.around_ppm)):
        if ppm is not None:
            trace[key] = _list(ppm)
    return trace


def _plain(value: Any) -> Json:
    return value if value is None or isinstance(value, str) else float(value)


def _entry(entry: Entry, peak_hour: int) -> dict[str, Json]:
    hours = entry.hours_w
    return {
        "id": entry.id,
        "group": entry.group,
        "label": entry.label,
        "peak_w": float(hours[peak_hour]),
        "daily_kwh": float(hours.sum()) / 1000.0,
        "sensible_w": float(entry.sensible_w[peak_hour]),
        "latent_w": float(entry.latent_w[peak_hour]),
        "moisture_kg_per_day": _number(entry.moisture_kg_per_day),
        "method": entry.method,
        "source": entry.source,
        "formula": entry.formula,
        "inputs": {item.key: _number(item.value) for item in entry.inputs},
        "remark": entry.remark,
        "hours_w": _list(hours),
    }


def finding_json(finding: Finding) -> dict[str, Json]:
    """A finding as JSON: level, id, text, rule, path, standing."""
    return {
        "level": finding.level,
        "id": finding.id,
        "text": finding.words(),
        "rule": finding.rule,
        "path": finding.path,
        "standing": finding.standing,
    }


def _number(value: Number) -> float:
    return float(value) if isinstance(value, (int, float)) else float(np.asarray(value).reshape(-1)[0])


def _list(values: np.ndarray[tuple[int, ...], np.dtype[np.float64]]) -> list[Json]:
    return [float(value) for value in values]


def load_series(load: Load) -> Iterator[list[str]]:
    """Rows of a CSV: a header, then an hour a row with every entry's watts."""
    yield ["hour", *(cell(f"{entry.id}_w") for entry in load.entries), "all_w"]
    for hour in range(24):
        watts = [entry.hours_w[hour] for entry in load.entries]
        yield [str(hour), *(repr(float(value)) for value in watts), repr(float(load.hours_w[hour]))]


def csv_text(rows: Iterable[list[str]]) -> str:
    """Rows as CSV text after RFC 4180."""
    import csv
    import io

    page = io.StringIO(newline="")
    csv.writer(page).writerows(rows)
    return page.getvalue()


def cell(text: str) -> str:
    """A text cell that no spreadsheet takes for a formula."""
    return f"'{text}" if text[:1] in ("=", "+", "-", "@", "\t", "\r") else text
