"""coldbox outage and coldbox trip as somebody types them."""

from __future__ import annotations

import csv
import json
from pathlib import Path
from typing import Any

import pytest

from coldbox.cli.main import main

ROOT = Path(__file__).parents[2]
PROJECTS = ROOT / "projects"
EXAMPLES = sorted(PROJECTS.glob("*.toml"))
FREEZER = str(PROJECTS / "net-loft-full.toml")
PARCEL = str(PROJECTS / "weekend-parcel.toml")
ROUND = str(PROJECTS / "island-round.toml")
FEW = ("--draws", "20")

each_example = pytest.mark.parametrize("file", EXAMPLES, ids=lambda file: file.stem)


@pytest.fixture(autouse=True)
def _plain_terminal(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv("COLUMNS", "80")


def typed(capsys: pytest.CaptureFixture[str], *words: str) -> tuple[int, str, str]:
    status = main(list(words))
    out, err = capsys.readouterr()
    assert "Traceback" not in out + err
    return status, out, err


def as_json(capsys: pytest.CaptureFixture[str], *words: str) -> Any:
    status, out, err = typed(capsys, *words, "--json")
    assert status in (0, 1) and not err
    return json.loads(out)


@each_example
def test_the_first_three_lines_answer(file: Path, capsys: pytest.CaptureFixture[str]) -> None:
    status, out, err = typed(capsys, "outage", str(file), *FEW)
    assert status in (0, 1) and not err
    how_long, who, how_sure = out.splitlines()[:3]
    assert how_long.startswith(("Holds ", "Does not hold"))
    assert who.startswith(("  first: ", "  nearest to its limit: ", "  nothing in it has a limit"))
    found = as_json(capsys, "outage", str(file), *FEW)
    if found["hold_h"] is not None and found["hold_h"] > 0.0:
        assert found["first"]["at_clock"] in how_long
        assert found["first"]["lot"] in who or found["first"]["where"] == "air"
    if who.startswith("  first: ") and "; then" not in who:
        assert "sure" in how_sure
    assert "% sure" in " ".join(out.splitlines()[1:5])
    assert max(map(len, out.splitlines())) <= 80


@each_example
def test_json_agrees_with_itself(file: Path, capsys: pytest.CaptureFixture[str]) -> None:
    found = as_json(capsys, "outage", str(file), *FEW)
    crossed = [one["crossed_at_h"] for one in found["limits"] if one["crossed_at_h"] is not None]
    assert found["hold_h"] == (min(crossed) if crossed else None)
    assert abs(found["heat_balance_error"]) < 1e-6
    assert found["spread"]["draws"] == 20 and len(found["spread"]["limits"]) == len(found["limits"])
    spread = found["spread"]
    known = [spread[key] for key in ("p10_h", "p50_h", "p90_h") if spread[key] is not None]
    assert known == sorted(known)
    trace = found["trace"]
    assert len(trace["t_h"]) == len(trace["air_c"]) and trace["t_h"] == sorted(trace["t_h"])


def test_the_same_seed_prints_the_same_digits(capsys: pytest.CaptureFixture[str]) -> None:
    words = ("outage", PARCEL, *FEW, "--seed", "9", "--json")
    one = typed(capsys, *words)
    assert typed(capsys, *words) == one
    assert typed(capsys, *words[:-2], "8", "--json")[1] != one[1]


def test_asked_sets_the_chance_and_the_status(capsys: pytest.CaptureFixture[str]) -> None:
    hold = as_json(capsys, "outage", FREEZER, "--draws", "0")["hold_h"]
    assert hold is not None
    status, out, _ = typed(capsys, "outage", FREEZER, *FEW, "--asked", f"{hold / 2:.0f} h")
    assert status == 0 and f"the asked {hold / 2:.0f} h: " in out
    status, out, _ = typed(capsys, "outage", FREEZER, *FEW, "--asked", f"{hold + 5:.0f} h")
    assert status == 1 and "sure" in out
    short = as_json(capsys, "outage", FREEZER, *FEW, "--asked", "1h")["spread"]["chance_of_asked"]
    assert short == 1.0


def test_power_back_in_time_is_no_failure(capsys: pytest.CaptureFixture[str]) -> None:
    hold = as_json(capsys, "outage", FREEZER, "--draws", "0")["hold_h"]
    back = f"outage.lasts={max(hold / 2, 1.0):.0f} h"
    words = ("outage", FREEZER, "--draws", "0", "--set", back, "--set", "machine.capacity=2 kW")
    found = as_json(capsys, *words, "--set", "outage.asked=160 h")
    assert found["power_back_h"] == pytest.approx(float(back.split("=")[1].split(maxsplit=1)[0]))
    assert found["hold_h"] is None
    assert typed(capsys, *words, "--asked", "160h")[0] == 0


def test_at_moves_the_start(capsys: pytest.CaptureFixture[str]) -> None:
    assert as_json(capsys, "outage", FREEZER, "--draws", "0", "--at", "22:30")["start_clock"] == "22:30"
    assert as_json(capsys, "trip", ROUND, "--draws", "0", "--at", "05:15")["start_clock"] == "05:15"


def test_without_draws(capsys: pytest.CaptureFixture[str]) -> None:
    _, out, _ = typed(capsys, "outage", FREEZER, "--draws", "0")
    assert "how sure: not looked into" in out.splitlines()[2]
    assert "spread" not in as_json(capsys, "outage", FREEZER, "--draws", "0")


@pytest.mark.parametrize(
    ("words", "says"),
    [
        (["--draws", "-1"], "draws will not do"),
        (["--draws", "999999999"], "draws will not do"),
        (["--seed", "-4"], "no seed"),
        (["--asked", "a while"], "outage.asked"),
        (["--at", "25 o'clock"], "outage.at"),
        (["--asked", "900 h"], "longer horizon"),
    ],
)
def test_bad_options_are_told(words: list[str], says: str, capsys: pytest.CaptureFixture[str]) -> None:
    status, out, err = typed(capsys, "outage", FREEZER, *words)
    assert status == 2 and not out and says in err


@pytest.mark.parametrize("words", [["--pulldown", "--recovery"], ["--draws", "many"]])
def test_bad_usage(words: list[str], capsys: pytest.CaptureFixture[str]) -> None:
    status, out, err = typed(capsys, "outage", FREEZER, *words)
    assert status == 2 and not out and err


@pytest.mark.parametrize(("command", "file"), [("outage", FREEZER), ("trip", ROUND)])
def test_defaults_are_listed(command: str, file: str, capsys: pytest.CaptureFixture[str]) -> None:
    status, out, err = typed(capsys, command, file, "--defaults")
    assert status == 0 and not err and "defaults used" in out.splitlines()[0]
    assert "spreads.foam" in out


def test_pulldown_and_recovery_answer_in_three_lines(capsys: pytest.CaptureFixture[str]) -> None:
    for words in (["--pulldown"], ["--recovery", "--set", "outage.lasts=30 h"]):
        for file in (FREEZER, str(PROJECTS / "long-quay-freezer.toml")):
            _, out, _ = typed(capsys, "outage", file, *FEW, *words)
            how_long, _, how_sure, *_ = out.splitlines()
            assert " 8 in 10): " in how_long and how_sure.startswith("  within the asked 24 h: ")


def test_a_trip_needs_legs(capsys: pytest.CaptureFixture[str]) -> None:
    status, out, err = typed(capsys, "trip", FREEZER)
    assert status == 2 and not out and "[trip]" in err


def test_a_trip_leg_by_leg(capsys: pytest.CaptureFixture[str]) -> None:
    found = as_json(capsys, "trip", ROUND, *FEW)
    legs = found["legs"]
    assert [leg["from_h"] for leg in legs[1:]] == pytest.approx([leg["to_h"] for leg in legs[:-1]])
    assert legs[-1]["to_h"] == pytest.approx(found["horizon_h"])
    _, out, _ = typed(capsys, "trip", ROUND, *FEW)
    assert "Leg by leg" in out and all(leg["label"] in out for leg in legs)
    assert out.splitlines()[0].startswith(("Keeps every limit", "Holds ", "Nothing has a limit", "Beyond"))


def test_pulldown_and_recovery(capsys: pytest.CaptureFixture[str]) -> None:
    _, out, err = typed(capsys, "outage", FREEZER, *FEW, "--pulldown")
    assert not err and out.startswith(("Cold ", "Not cold "))
    words = (*FEW, "--recovery", "--set", "outage.lasts=30 h")
    _, out, err = typed(capsys, "outage", FREEZER, *words)
    assert not err and out.startswith(("All back ", "Not all back "))
    found = as_json(capsys, "outage", FREEZER, *words)
    assert found["kind"] == "recovery" and found["power_back_h"] == pytest.approx(30.0)
    assert found["reached_h"] is None or found["reached_h"] >= 30.0


def test_csv_and_markdown(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    file = tmp_path / "trace.csv"
    _, out, err = typed(capsys, "outage", PARCEL, "--draws", "0", "--csv", str(file), "--markdown")
    assert not err and out.startswith("# Holds ") and "| clock |" in out
    rows = list(csv.reader(file.read_text(encoding="utf-8").splitlines()))
    assert rows[0][:3] == ["t_h", "clock", "air_c"] and len(rows) > 20
    assert "carbon_dioxide_ppm" in rows[0]


def test_other_units(capsys: pytest.CaptureFixture[str]) -> None:
    _, out, _ = typed(capsys, "outage", FREEZER, *FEW, "--units", "IP")
    assert "By the clock, °F" in out and "°C" not in out.split("Sources")[0].split("How it was")[0]


def test_dry_ice_is_told_by_outage_and_by_check(capsys: pytest.CaptureFixture[str]) -> None:
    found = as_json(capsys, "outage", PARCEL, "--draws", "0")
    assert found["carbon_dioxide"]["gas_kg"] > 0.0
    ids = {finding["id"] for finding in found["findings"]}
    status, out, _ = typed(capsys, "check", PARCEL, "--json")
    assert ids <= {finding["id"] for finding in json.loads(out)[0]["findings"]}


def test_load_says_how_sure_it_is(capsys: pytest.CaptureFixture[str]) -> None:
    found = as_json(capsys, "load", FREEZER, "--draws", "200", "--seed", "3")
    spread = found["spread"]
    assert spread["draws"] == 200 and spread["seed"] == 3
    assert spread["p10_w"] < spread["p50_w"] < spread["p90_w"]
    assert spread["middle_w"] == pytest.approx(found["required_capacity_w"] / (1.0 + found["safety"]))
    _, out, _ = typed(capsys, "load", FREEZER, "--draws", "200")
    assert "How sure" in out and "Without the safety allowance" in out
    assert "spread" not in as_json(capsys, "load", FREEZER)


# check


def test_check_tells_what_differs_from_the_library(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    shared = tmp_path / "shared"
    shared.mkdir()
    wall = 'r_value = "RSI 5"\nthickness = "100 mm"\n'
    (shared / "constructions.toml").write_text(f'["yard wall"]\ndate = "2026-03-01"\n{wall}', encoding="utf-8")
    file = tmp_path / "projects" / "yard.toml"
    file.parent.mkdir()
    box = """format = 1
[box]
length = "3 m"
width = "3 m"
height = "2.4 m"
temperature = "2 °C"
construction = "yard wall"
neighbour = "room"
[constructions."yard wall"]
library = "yard wall 2026-01-01"
"""
    file.write_text(box + wall.replace("5", "4"), encoding="utf-8")
    status, out, err = typed(capsys, "check", str(file))
    assert status == 0 and not err
    assert "yard wall 2026-03-01" in out


def test_check_says_when_an_outage_cannot_be_computed(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    text = Path(FREEZER).read_text(encoding="utf-8").replace('horizon = "168 h"', 'horizon = "168 h"\nlasts = "20 h"')
    file = tmp_path / "loft.toml"
    file.write_text(text, encoding="utf-8")
    status, out, err = typed(capsys, "check", str(file))
    assert status in (0, 1) and not err
    found = json.loads(typed(capsys, "check", str(file), "--json")[1])[0]["findings"]
    # Either the capacity that the load asks for is used, or it is said what is missing.
    assert all(finding["level"] in ("note", "caution", "danger") for finding in found)
