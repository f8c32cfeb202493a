"""Odd boxes and odd events: each an answer or a clear problem, never nan, never a hang."""

from __future__ import annotations

import math
from pathlib import Path
from typing import Any

import numpy as np
import pytest
from support.boxes_in_a_kitchen import outage

from coldbox.errors import ColdboxError
from coldbox.paper.data import outage_json
from coldbox.timeline.results import Outage

DOOR = """
[[doors]]
name = "lid"
face = "front"
width = "0.5 m"
height = "0.6 m"
"""


def finite(found: Outage) -> Outage:
    """The same, once no figure of it was found to be nan or inf."""

    def look(value: Any, at: str) -> None:
        if isinstance(value, dict):
            for key, one in value.items():
                look(one, f"{at}.{key}")
        elif isinstance(value, list):
            for one in value:
                look(one, at)
        elif isinstance(value, float):
            assert math.isfinite(value), at

    look(outage_json(found), "")
    return found


def events(*lines: str) -> str:
    return "events = [" + ", ".join(f"{{ {line} }}" for line in lines) + "]\n"


def test_horizon_never_reached(tmp_path: Path) -> None:
    found = finite(outage(tmp_path, wall="300 mm", horizon="24 h"))
    assert found.hold_h is None and found.first is None
    assert found.limits[0].crossed_at_h is None


def test_over_the_limit_from_the_start(tmp_path: Path) -> None:
    found = finite(outage(tmp_path, start="-10 °C", horizon="24 h"))
    assert found.hold_h == 0.0 and found.first is not None and found.first.at_clock == "14:00"


def test_goods_of_no_mass(tmp_path: Path) -> None:
    found = finite(outage(tmp_path, stored="0 kg", horizon="24 h"))
    assert found.hold_h is None and found.limits == ()


def test_thirty_days(tmp_path: Path) -> None:
    found = finite(outage(tmp_path, horizon="720 h", limit="20 °C"))
    assert found.hold_h is not None and 72.0 < found.hold_h < 720.0
    assert found.trace.air_c[-1] == pytest.approx(24.0, abs=0.5)


@pytest.mark.parametrize("start", ["-1 °C", "-1.7 °C", "0 °C", "-1.71 °C"])
def test_melting_at_the_start_temperature(tmp_path: Path, start: str) -> None:
    found = finite(outage(tmp_path, start=start, temperature="-2 °C", limit="2 °C", horizon="96 h"))
    surface = found.trace.lots["food"].surface_c[1:]
    assert np.all(np.diff(surface) >= -1e-6)


@pytest.mark.parametrize(("piece", "pieces"), [(["2 mm", "2 mm", "2 mm"], 100_000), (["1 m", "0.9 m", "1 m"], 1)])
def test_tiny_and_huge_bodies(tmp_path: Path, piece: list[str], pieces: int) -> None:
    found = finite(outage(tmp_path, piece=piece, pieces=pieces, stored="90 kg", horizon="48 h"))
    assert found.hold_h is not None and found.hold_h > 1.0


def test_events_at_one_instant(tmp_path: Path) -> None:
    lines = events(
        'at = "16:00", what = "door open", door = "lid", lasts = "10 min"',
        'at = "2 h", what = "goods out", lot = "food", mass = "20 kg"',
        'at = "16:00", what = "goods in", lot = "food", mass = "20 kg", temperature = "-10 °C"',
        'at = "2 h", what = "pack in", pack = "ice"',
        'at = "16:00", what = "power on", lasts = "1 h"',
    )
    found = finite(outage(tmp_path, more=lines + DOOR, ice="2 kg", horizon="24 h"))
    assert {one.text.split()[0] for one in found.events if one.at_h == 2.0} == {"lid", "food", "ice", "power"}
    assert any("the load asks for" in note for note in found.notes)


def test_all_goods_taken_out(tmp_path: Path) -> None:
    lines = events('at = "1 h", what = "goods out", lot = "food"')
    found = finite(outage(tmp_path, more=lines, horizon="48 h"))
    assert found.hold_h is None
    assert not found.trace.lots["food"].there[-1] and found.trace.air_c[-1] > 10.0


def test_events_outside_the_run_do_nothing(tmp_path: Path) -> None:
    lines = events('at = "30 h", what = "door open", door = "lid", lasts = "10 min"')
    plain = outage(tmp_path, more=DOOR, horizon="24 h")
    later = finite(outage(tmp_path, more=lines + DOOR, horizon="24 h"))
    assert np.array_equal(later.trace.air_c, plain.trace.air_c)


@pytest.mark.parametrize("at", ["14:00", "0 h", "24 h", "day 2 14:00"])
def test_an_event_at_either_end(tmp_path: Path, at: str) -> None:
    lines = events(
        f'at = "{at}", what = "door open", door = "lid", lasts = "10 min"',
        f'at = "{at}", what = "goods out", lot = "food", mass = "150 kg"',
    )
    finite(outage(tmp_path, more=lines + DOOR, horizon="24 h"))


def test_a_clock_before_the_start_is_the_next_day(tmp_path: Path) -> None:
    lines = events('at = "13:00", what = "door open", door = "lid", lasts = "10 min"')
    found = finite(outage(tmp_path, more=lines + DOOR, horizon="24 h"))
    assert [one.at_h for one in found.events if one.text.startswith("lid")] == [23.0]


def test_dry_ice_spent_midway(tmp_path: Path) -> None:
    more = (
        DOOR
        + """
[[packs]]
name = "blocks"
kind = "dry ice"
mass = "4 kg"
place = "above"
"""
    )
    found = finite(outage(tmp_path, more=more, horizon="72 h"))
    spent = found.packs[-1]
    assert (
        spent.spent_at_h is not None and 1.0 < spent.spent_at_h < 72.0 and spent.left_kg == pytest.approx(0.0, abs=1e-6)
    )
    assert found.carbon_dioxide is not None and found.carbon_dioxide.gas_kg == pytest.approx(4.0, rel=1e-6)


@pytest.mark.parametrize(
    "changes",
    [
        {"limit": "-300 °C"},
        {"wall": "0 mm"},
        {"around": "400 °C"},
        {"at": "yesterday"},
        {"horizon": "0 h"},
        {"horizon": "-5 h"},
        {"minutes": "-1 min"},
    ],
)
def test_nonsense_is_a_clear_problem(tmp_path: Path, changes: dict[str, str]) -> None:
    with pytest.raises(ColdboxError) as told:
        outage(tmp_path, **changes)
    assert "box.toml" in str(told.value) and len(str(told.value)) > 30
