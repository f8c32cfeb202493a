"""Each command as a newcomer types it: what comes on which stream, with which exit status."""

from __future__ import annotations

import csv
import json
import os
from pathlib import Path
from typing import Any

import pytest

from coldbox import __version__
from coldbox.cli.main import COMMANDS, main
from coldbox.project.fields import FIELDS

ROOT = Path(__file__).parents[2]
EXAMPLES = sorted((ROOT / "projects").glob("*.toml"))
FREEZER = str(ROOT / "projects" / "long-quay-freezer.toml")
TUB = str(ROOT / "projects" / "herring-tub.toml")
COOLER = str(ROOT / "projects" / "cookhouse-cooler.toml")  # in IP units
DANGER = """format = 1
[box]
length = "4 m"
width = "3 m"
height = "2.5 m"
temperature = "-20 °C"
construction = "pir150"
neighbour = "room"
[[lots]]
product = "lettuce"
stored = "500 kg"
"""

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
    status, out, err = typed(capsys, *words)
    assert status in (0, 1) and not err
    return json.loads(out)


# Asking for help


def test_nothing_typed_shows_the_commands(capsys: pytest.CaptureFixture[str]) -> None:
    status, out, err = typed(capsys)
    assert status == 2 and not out
    assert all(name in err for name in COMMANDS)
    status, out, err = typed(capsys, "--help")
    assert status == 0 and not err
    assert all(line in out for line in COMMANDS.values())
    assert "Exit status" in out
    assert typed(capsys, "--version")[1] == f"coldbox {__version__}\n"


@pytest.mark.parametrize("command", COMMANDS)
def test_each_command_has_help_with_examples(command: str, capsys: pytest.CaptureFixture[str]) -> None:
    status, out, err = typed(capsys, command, "--help")
    assert status == 0 and not err
    assert f"usage: coldbox {command}" in out
    assert f"examples:\n  coldbox {command}" in out
    assert max(map(len, out.splitlines())) <= 80


@pytest.mark.parametrize(
    "words", [["laod"], ["--nonsense"], ["load"], ["load", "a", "b"], ["load", TUB, "--units", "X"]]
)
def test_bad_usage(words: list[str], capsys: pytest.CaptureFixture[str]) -> None:
    status, out, err = typed(capsys, *words)
    assert status == 2 and not out and err
    if words == ["laod"]:
        assert 'Nearest: "load".' in err


# load


@each_example
def test_load_answers_first(file: Path, capsys: pytest.CaptureFixture[str]) -> None:
    status, out, err = typed(capsys, "load", str(file))
    assert status == 0 and not err
    first = out.splitlines()[0]
    if "powered = false" in file.read_text(encoding="utf-8"):
        assert " come in, " in first and first.endswith(" a day")
    else:
        assert "needs " in first and first.endswith(" of refrigeration")
    assert "Sources" in out and "biggest: " in out


@each_example
@pytest.mark.parametrize("columns", ["60", "80", "120"])
def test_no_line_is_longer_than_the_terminal(
    file: Path, columns: str, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setenv("COLUMNS", columns)
    commands = [["load", str(file), "--how"], ["load", str(file), "--defaults"], ["check", str(file)]]
    commands += [["load", str(file), "--units", "IP"], ["compare", str(file), TUB]]
    for words in commands:
        _, out, _ = typed(capsys, *words)
        too_long = [line for line in out.splitlines() if len(line) > int(columns)]
        assert not too_long, (words[0], too_long[:3])


@pytest.mark.parametrize("columns", ["60", "80", "120"])
def test_sources_keep_to_the_terminal(
    columns: str, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setenv("COLUMNS", columns)
    for words in (["sources"], ["sources", "soils"], ["sources", "--fields"]):
        _, out, _ = typed(capsys, *words)
        assert not [line for line in out.splitlines() if len(line) > int(columns)], words


CONTRACT = {
    "required_capacity_w": float, "governs": str, "daily_heat_kwh": float, "run_hours": float, "safety": float,
    "peak": dict, "hours_w": list, "entries": list, "credited_cold_w": float, "frost_kg_per_day": float,
    "ua_w_per_k": float, "k_w_per_m2k": float, "findings": list,
}  # fmt: skip
ENTRY = {
    "id": str, "group": str, "label": str, "peak_w": float, "daily_kwh": float, "sensible_w": float,
    "latent_w": float, "method": str, "source": str, "inputs": dict, "hours_w": list,
}  # fmt: skip


@each_example
def test_the_json_has_the_keys_that_others_rely_on(file: Path, capsys: pytest.CaptureFixture[str]) -> None:
    told = as_json(capsys, "load", str(file), "--json")
    for key, kind in CONTRACT.items():
        assert isinstance(told[key], kind), key
    assert len(told["hours_w"]) == 24
    assert set(told["peak"]) == {"hour", "heat_w"}
    assert told["governs"] in ("daily", "peak", "atp")
    assert told["entries"]
    for entry in told["entries"]:
        for key, kind in ENTRY.items():
            assert isinstance(entry[key], kind), key
        assert len(entry["hours_w"]) == 24
        assert all(isinstance(value, float) for value in entry["inputs"].values())
    for found in told["findings"]:
        assert {"level", "id", "text", "rule"} <= set(found)
        assert found["level"] in ("note", "caution", "danger")


def test_json_is_si_whatever_is_shown(capsys: pytest.CaptureFixture[str]) -> None:
    assert as_json(capsys, "load", COOLER, "--json") == as_json(capsys, "load", COOLER, "--json", "--units", "IP")
    told = as_json(capsys, "load", COOLER, "--json")
    shown = typed(capsys, "load", COOLER)[1]
    assert "Btu/h" in shown
    assert "°F" in shown
    metric = typed(capsys, "load", COOLER, "--units", "SI")[1]
    assert "Btu" not in metric
    assert f"{told['required_capacity_w'] / 1000:.2f}"[:4] in metric.splitlines()[0]


def test_how_tells_formulas_and_inputs(capsys: pytest.CaptureFixture[str]) -> None:
    plain, how = (typed(capsys, "load", FREEZER, *more)[1] for more in ([], ["--how"]))
    assert len(how) > 2 * len(plain)
    assert "share of it" in how or "t_room" in how
    assert "V fully open x open share" in " ".join(how.split())


def test_defaults_are_listed_with_their_reasons(capsys: pytest.CaptureFixture[str]) -> None:
    _, out, _ = typed(capsys, "load", TUB, "--defaults")
    assert "box.air" in out
    assert "the closer method" in out
    count = int(out.split(":")[1].split()[0])
    account = typed(capsys, "load", TUB)[1]
    assert f"{count} defaults used" in account


def test_markdown_has_the_same_account(capsys: pytest.CaptureFixture[str]) -> None:
    status, out, _ = typed(capsys, "load", TUB, "--markdown")
    assert status == 0
    assert out.startswith("# ")
    told = as_json(capsys, "load", TUB, "--json")
    for entry in told["entries"]:
        assert f"| {entry['label']} |" in out


def test_csv_has_every_hour_of_every_entry(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    out = tmp_path / "hours.csv"
    assert typed(capsys, "load", FREEZER, "--csv", str(out))[0] == 0
    told = as_json(capsys, "load", FREEZER, "--json")
    with out.open(encoding="utf-8", newline="") as file:
        rows = list(csv.DictReader(file))
    assert [row["hour"] for row in rows] == [str(hour) for hour in range(24)]
    for entry in told["entries"]:
        assert [float(row[f"{entry['id']}_w"]) for row in rows] == entry["hours_w"]
    assert [float(row["all_w"]) for row in rows] == told["hours_w"]


def test_set_changes_one_input_for_this_run(capsys: pytest.CaptureFixture[str]) -> None:
    before = Path(TUB).read_bytes()
    plain = as_json(capsys, "load", TUB, "--json")
    colder = as_json(capsys, "load", TUB, "--json", "--set", "box.temperature=-5 °C", "--set", "box.leakage = 0/h")
    assert colder["daily_heat_kwh"] > plain["daily_heat_kwh"]
    assert "leakage" in {entry["id"] for entry in plain["entries"]}
    assert "leakage" not in {entry["id"] for entry in colder["entries"]}
    assert Path(TUB).read_bytes() == before


@pytest.mark.parametrize(
    ("pair", "head", "words"),
    [
        ("box.temperatur=3 °C", "--set  box.temperatur", "Nearest: "),
        ("box.temperature=3", "--set  box.temperature", "has no unit"),
        ("box.temperature", "--set", "has no value"),
        ("doors.nothing.width=1 m", "--set  doors.nothing", ""),
    ],
)
def test_a_wrong_set_is_told_like_a_wrong_line(
    pair: str, head: str, words: str, capsys: pytest.CaptureFixture[str]
) -> None:
    status, out, err = typed(capsys, "load", TUB, "--set", pair)
    assert status == 2 and not out
    assert err.startswith(head)
    assert words in err


def test_a_danger_of_this_box_is_exit_status_1(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    file = tmp_path / "a.toml"
    file.write_text(DANGER, encoding="utf-8")
    for command in ("load", "check"):
        status, out, err = typed(capsys, command, str(file))
        assert status == 1 and not err
        assert "DANGER" in out
    assert typed(capsys, "check", str(file), TUB)[0] == 1
    assert typed(capsys, "load", FREEZER)[0] == 0  # a standing caution about dry ice is none of this box


# check, compare, sources, new


@each_example
def test_check_of_an_example_finds_no_error(file: Path, capsys: pytest.CaptureFixture[str]) -> None:
    status, out, err = typed(capsys, "check", str(file))
    assert status == 0 and not err
    assert "no errors" in " ".join(out.split())
    told = as_json(capsys, "check", str(file), "--json")
    assert [one["file"] for one in told] == [str(file)]


def test_compare_shows_results_and_what_differs(capsys: pytest.CaptureFixture[str]) -> None:
    status, out, _ = typed(capsys, "compare", FREEZER, "--set", "box.temperature=-25 °C")
    assert status == 0
    assert "required capacity" in out
    assert "box.temperature" in out
    told = as_json(capsys, "compare", FREEZER, "--set", "box.temperature=-25 °C", "--json")
    assert [result["name"] for result in told["results"]] == ["as it is", "with --set"]
    assert told["results"][1]["required_capacity_w"] > told["results"][0]["required_capacity_w"]
    assert {"key": "box.temperature", "values": ["-20 °C", "-25 °C"]} in told["differs"]
    same = typed(capsys, "compare", TUB, TUB)
    assert same[0] == 0
    assert "No input differs." in same[1]
    assert typed(capsys, "compare", TUB)[0] == 2
    assert typed(capsys, "compare", *[TUB] * 7)[0] == 2


def test_sources_documents_every_field(capsys: pytest.CaptureFixture[str]) -> None:
    _, out, _ = typed(capsys, "sources", "--fields")
    for fields in FIELDS.values():
        for field in fields:
            assert f"{field.key} = " in out
    told = as_json(capsys, "sources", "--fields", "--json")
    assert {(one["table"], one["key"]) for one in told} == {
        (field.table, field.key) for fields in FIELDS.values() for field in fields
    }
    one = typed(capsys, "sources", "--fields", "doors")[1]
    assert "[[doors]]" in one
    assert "[box]" not in one


def test_sources_of_methods_tables_and_rows(capsys: pytest.CaptureFixture[str]) -> None:
    _, out, _ = typed(capsys, "sources")
    assert "Methods" in out
    assert "foods" in out
    assert "ISO 13370" in out
    _, out, _ = typed(capsys, "sources", "foods")
    assert "lettuce" in out
    for words in (["sources", "nosuch"], ["sources", "--fields", "nosuch"], ["sources", "--fields", "--checked"]):
        status, out, err = typed(capsys, *words)
        assert status == 2 and not out and err


def test_new_writes_a_project_that_loads(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    monkeypatch.chdir(tmp_path)
    status, out, err = typed(capsys, "new", "shed")
    assert status == 0 and not err
    assert out.startswith("shed.toml: written.")
    assert typed(capsys, "load", "shed.toml")[0] == 0
    again = typed(capsys, "new", "shed")
    assert again[0] == 2
    assert "already there" in again[2]
    assert typed(capsys, "new", "quay shed", "--like", "long-quay-freezer")[0] == 0
    copy, example = (as_json(capsys, "load", file, "--json") for file in ("quay shed.toml", FREEZER))
    assert copy["name"] == "quay shed"
    assert copy["required_capacity_w"] == example["required_capacity_w"]
    assert typed(capsys, "new", "other", "--like", "shed.toml")[0] == 0
    for words in (["a/b"], ["../x"], ["x", "--like", "nosuch"], ["", "--like", "shed"]):
        status, out, err = typed(capsys, "new", *words)
        assert status == 2 and not out and err
    assert sorted(os.listdir(tmp_path)) == ["other.toml", "quay shed.toml", "shed.toml"]


def test_a_fault_of_the_program_is_one_line_and_status_3(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str], tmp_path: Path
) -> None:
    import tempfile

    monkeypatch.setattr(tempfile, "tempdir", str(tmp_path))
    monkeypatch.setattr("coldbox.account.load.build", lambda _: 1 / 0)
    status, out, err = typed(capsys, "load", TUB)
    assert status == 3 and not out
    assert err.count("\n") == 1
    report = Path(err.rsplit(" ", 1)[1].strip())
    assert report.parent == tmp_path
    assert "ZeroDivisionError" in report.read_text(encoding="utf-8")
