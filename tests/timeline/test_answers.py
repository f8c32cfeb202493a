"""What a run says beside its hours: warm starts, power that comes back, gas, goods of today."""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest
from support.boxes_in_a_kitchen import box, outage

import coldbox
from coldbox.errors import BadProject
from coldbox.spread import hold

PROJECTS = Path(__file__).parents[2] / "projects"
ROOM = """
[[packs]]
name = "blocks"
kind = "dry ice"
mass = "4 kg"
place = "above"
[neighbours.van]
temperature = "24 °C"
volume = "9 m³"
air_change = "2/h"
"""
IN_THE_VAN = 'at = "0 h", what = "moved", neighbour = "van"'


def events(*lines: str) -> str:
    return "events = [" + ", ".join(f"{{ {line} }}" for line in lines) + "]\n"


def test_a_pulldown_begins_with_goods_as_warm_as_they_come() -> None:
    """Living goods too: they are put in as it begins and have not stood in the heat before."""
    project = coldbox.open(PROJECTS / "greens-hall.toml")
    found = hold.run(project, "pulldown", count=0)
    told = {lot.name: lot.arrival_temperature for lot in project.lots if lot.arrival_temperature is not None}
    assert told.keys() >= {"lettuce", "strawberries", "herb mix"}
    for name, arrival_c in told.items():
        assert found.trace.lots[name].core_c[0] == pytest.approx(arrival_c, abs=1e-6)


def test_a_pulldown_says_whether_the_machine_can_hold() -> None:
    small, enough = (
        hold.run(
            coldbox.open(PROJECTS / "net-loft-full.toml", {"machine.capacity": power, "outage.horizon": "24 h"}),
            "pulldown",
            count=0,
        )
        for power in ("100 W", "2 kW")
    )
    assert small.reached_h is None and enough.reached_h is not None
    assert small.facts["machine_w"] == 100.0 and enough.facts["machine_w"] == 2000.0
    load = coldbox.load(coldbox.open(PROJECTS / "net-loft-full.toml", {"machine.capacity": "2 kW"}))
    assert enough.facts["day_puts_in_w"] == pytest.approx(float(load.counted_daily_j) / 86400.0)
    assert 100.0 < enough.facts["day_puts_in_w"] < 2000.0


def test_power_that_is_back_beyond_the_horizon_is_no_recovery(tmp_path: Path) -> None:
    with pytest.raises(BadProject, match="back after 30 h, but it looks only 24 h ahead"):
        outage(tmp_path, more='lasts = "30 h"\n', kind="recovery", horizon="24 h")
    found = outage(tmp_path, more='lasts = "10 h"\n', kind="recovery", horizon="24 h")
    assert found.reached_h == pytest.approx(10.0)  # nothing was beyond a limit: back when the power is


def test_recovery_ends_when_the_last_limit_is_kept_again(tmp_path: Path) -> None:
    found = outage(tmp_path, more='lasts = "40 h"\n', kind="recovery", horizon="160 h", limit="-14 °C")
    back = found.limits[0].back_at_h
    assert back is not None and found.reached_h == back > 40.0
    mean = np.interp(back, found.trace.t_h, found.trace.lots["food"].mean_c)
    assert mean == pytest.approx(-14.0, abs=0.05)
    assert any("the load asks for" in note for note in found.notes)


def test_power_back_by_an_event_takes_the_machine_of_the_load(tmp_path: Path) -> None:
    lines = events('at = "2 h", what = "power off", lasts = "3 h"')
    found = outage(tmp_path, more=lines, horizon="24 h")
    assert found.power_back_h == pytest.approx(5.0)
    assert any("the load asks for" in note for note in found.notes)


@pytest.mark.parametrize("powered", ["true", "false"])
def test_dry_ice_that_is_carried_out_is_no_gas(tmp_path: Path, powered: str) -> None:
    out = 'at = "4 h", what = "pack out", pack = "blocks"'
    gone, kept = (
        outage(tmp_path, more=events(IN_THE_VAN, *more) + ROOM, horizon="24 h", powered=powered).trace
        for more in ([out], [])
    )
    assert gone.around_ppm is not None and kept.around_ppm is not None
    before = gone.t_h <= 4.0
    np.testing.assert_allclose(gone.around_ppm[before], kept.around_ppm[before], rtol=0.02, atol=1.0)
    assert gone.around_ppm.max() <= 1.05 * kept.around_ppm.max()


def test_dry_ice_that_comes_gives_gas_at_once(tmp_path: Path) -> None:
    lines = events(IN_THE_VAN, 'at = "4 h", what = "pack in", pack = "blocks"')
    found = outage(tmp_path, more=lines + ROOM, horizon="24 h").trace
    assert found.around_ppm is not None
    after = found.around_ppm[found.t_h > 4.0]
    assert np.all(found.around_ppm[found.t_h <= 4.0] == 0.0) and after[0] > 0.0


def test_gas_around_settles_at_what_comes_over_what_is_changed(tmp_path: Path) -> None:
    """Steady: share = gas given off (m³/h, ideal gas) / fresh air (m³/h)."""
    more = events(IN_THE_VAN) + ROOM.replace("4 kg", "40 kg")
    found = outage(tmp_path, more=more, horizon="24 h").trace
    assert found.around_ppm is not None
    left = found.packs["blocks"].left_kg
    late = (found.t_h >= 6.0) & (found.t_h <= 9.0) & (left > 1.0)
    assert late.sum() > 5
    per_h = -np.polyfit(found.t_h[late], left[late], 1)[0]
    volume = per_h / 44.01e-3 * 8.314462618 * 297.15 / 101325.0
    assert np.mean(found.around_ppm[late]) == pytest.approx(1e6 * volume / 18.0, rel=0.05)


def test_todays_goods_get_the_guidance_too() -> None:
    found = hold.run(coldbox.open(PROJECTS / "cookhouse-cooler.toml", {"outage.horizon": "24 h"}), count=0)
    told = [one.text for one in found.findings if one.id == "food-guidance"]
    assert any(text.startswith("milk and cream, today's") for text in told)
    assert any(text.startswith("milk and cream will have") for text in told)


def test_goods_still_warm_are_named_and_not_counted() -> None:
    found = hold.run(coldbox.open(PROJECTS / "greens-hall.toml", {"outage.horizon": "24 h"}), count=0)
    told = [one.text for one in found.findings if one.id == "still-warm"]
    assert len(told) == 1 and "lettuce, today's; strawberries" in told[0]
    assert not any(one.lot in ("lettuce, today's", "strawberries") and one.side == "above" for one in found.limits)


def test_goods_in_since_the_day_before_say_so() -> None:
    found = hold.run(coldbox.open(PROJECTS / "block-house-freezing.toml", {"outage.horizon": "24 h"}), count=0)
    assert any(one.endswith("in since 15:00 the day before") for one in found.inside)


def test_books_of_living_goods_close_in_every_draw(tmp_path: Path) -> None:
    """Draws that need fewer rounds in a step than others book the heat they took, not that of a later round."""
    file = tmp_path / "box.toml"
    changes = {
        "product": "strawberries",
        "stored": "3000 kg",
        "start": "5 °C",
        "wall": "300 mm",
        "limit": "8 °C",
        "ice": "1 kg",
    }
    file.write_text(box(**changes, horizon="24 h"), encoding="utf-8")
    assert hold.run(coldbox.open(file), count=6).heat_balance_error < 1e-9
