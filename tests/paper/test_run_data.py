"""JSON and CSV of an outage and a trip: the keys of the contract, null for what lies beyond, no nan."""

from __future__ import annotations

import csv
import io
import json
from typing import Any

import numpy as np
import runs_by_hand as by_hand

from coldbox.paper import data, moments
from coldbox.spread.percentiles import Chance, percentiles


def as_read(value: Any) -> Any:
    return json.loads(json.dumps(value, allow_nan=False))


OUTAGE = {
    "hold_h", "horizon_h", "start_clock", "first", "limits", "spread", "heat_balance_error", "trace", "packs",
    "findings",
}  # fmt: skip


def test_outage_has_the_keys_of_the_contract() -> None:
    found = as_read(data.outage_json(by_hand.outage()))
    assert found.keys() >= OUTAGE
    assert found["first"].keys() == {"lot", "side", "where", "limit_c", "at_h", "at_clock"}
    assert found["first"]["at_h"] == found["hold_h"]
    limit = found["limits"][0]
    assert limit.keys() >= {
        "lot", "side", "where", "limit_c", "allowed_min", "crossed_at_h", "at_clock", "start_c", "end_c",
    }  # fmt: skip
    assert found["limits"][1]["crossed_at_h"] is None and found["limits"][1]["at_clock"] is None
    spread = found["spread"]
    assert spread.keys() >= {"draws", "p10_h", "p50_h", "p90_h", "never_share", "chance_of_asked", "drivers"}
    assert spread["chance_of_asked"] == 0.84 and spread["limits"][1]["p10_h"] is None
    assert spread["drivers"][0] == {
        "key": "box.leakage", "label": "leakage", "at_lowest_h": 2.5, "at_highest_h": -2.7,
    }  # fmt: skip
    assert found["packs"] == [{"id": "ice", "left_kg": 14.4, "frozen": 0.0, "spent_at_h": 38.8}]
    trace = found["trace"]
    assert trace.keys() >= {"t_h", "air_c", "lots"}
    assert len(trace["t_h"]) == len(trace["air_c"]) == len(trace["lots"]["cod"]["core_c"])


def test_beyond_the_horizon_is_null() -> None:
    never = by_hand.spread(hours=percentiles(np.full(500, np.inf)), never=Chance(share=1.0, error=0.004), asked=None)
    found = as_read(data.outage_json(by_hand.outage(hold_h=None, first=None, spread=never)))
    assert found["hold_h"] is None and found["first"] is None
    spread = found["spread"]
    assert (spread["p10_h"], spread["p50_h"], spread["p90_h"], spread["chance_of_asked"]) == (None,) * 4


def test_without_draws_there_is_no_spread() -> None:
    assert "spread" not in data.outage_json(by_hand.outage(spread=None))


def test_carbon_dioxide() -> None:
    found = as_read(data.outage_json(by_hand.dry_ice()))
    assert found["carbon_dioxide"]["box_ppm"] == 70_000.0 and found["carbon_dioxide"]["around"] == "cab"
    assert len(found["trace"]["carbon_dioxide_ppm"]) == len(found["trace"]["t_h"])
    assert found["findings"][0]["level"] == "danger"


def test_trip_has_its_legs_and_what_left_is_null() -> None:
    found = as_read(data.trip_json(by_hand.trip()))
    assert found.keys() >= OUTAGE | {"legs"}
    assert [leg["kind"] for leg in found["legs"]] == ["leg", "stop", "leg"]
    assert found["legs"][0].keys() >= {"kind", "label", "from_h", "to_h", "worst_c", "margin_k"}
    assert found["legs"][2]["worst_c"] is None
    surface = found["trace"]["lots"]["cod"]["surface_c"]
    assert surface[0] == -18.0 and surface[-1] is None


def test_csv_rows() -> None:
    found = by_hand.trip()
    rows = list(csv.reader(io.StringIO(data.csv_text(moments.series_rows(found)))))
    head, first, last = rows[0], rows[1], rows[-1]
    assert len(rows) == len(found.trace.t_h) + 1 and {len(row) for row in rows} == {len(head)}
    assert head[:4] == ["t_h", "clock", "air_c", "humidity"]
    assert first[head.index("cod surface_c")] == "-18.0" and last[head.index("cod surface_c")] == ""
    assert first[1] == "14:00" and last[1] == "14:00 day 3"


def test_csv_names_start_no_formula() -> None:
    lots = dict(by_hand.series().lots)
    named = by_hand.series().replace(lots={"=cmd()": lots["cod"]})
    rows = list(csv.reader(io.StringIO(data.csv_text(moments.series_rows(by_hand.outage(trace=named))))))
    assert not any(name.startswith("=") for name in rows[0])
