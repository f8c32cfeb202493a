"""Values given for one run by key path: they stand in for the file's, and are checked like them."""

from __future__ import annotations

from pathlib import Path

import pytest

from coldbox.project import codec
from coldbox.project.raw import Block, Raw

FREEZER = (Path(__file__).parent / "boxes/walk-in-freezer.toml").read_text("utf-8")
ROUND = (Path(__file__).parent / "boxes/delivery-round.toml").read_text("utf-8")
LEAST = 'format = 1\n[box]\ntemperature = "4 °C"\n'


def with_option(text: str, path: str, value: str) -> Raw:
    raw, problems = codec.read(text, "x.toml", {path: value})
    assert problems == []
    return raw


def sentence(text: str, path: str, value: str) -> str:
    _, problems = codec.read(text, "x.toml", {path: value})
    assert len(problems) == 1, problems
    assert str(problems[0]).startswith(f"--set  {path}".rstrip() + "\n")
    assert problems[0].line is None
    return problems[0].text


def all_blocks(blocks: tuple[Block, ...]) -> list[Block]:
    return [block for one in blocks for block in (one, *all_blocks(sum(one.children.values(), ())))]


def value_at(raw: Raw, path: str) -> object:
    for block in all_blocks(sum(raw.blocks.values(), ())):
        for key, entered in block.values.items():
            if (f"{block.path}.{key}" if block.path else key) == path:
                assert entered.option and entered.line is None
                return entered.value
    raise AssertionError(f"{path} is not there")


@pytest.mark.parametrize(
    ("text", "path", "typed", "there", "value"),
    [
        (FREEZER, "doors.main.width", "1.2 m", "", 1.2),
        (FREEZER, "doors[1].width", "1.2 m", "doors.main.width", 1.2),
        (FREEZER, "doors.main.count", "3", "", 3),
        (FREEZER, "box.powered", "no", "", False),
        (FREEZER, "box.temperature", " -20 °C ", "", -20.0),
        (FREEZER, "units", "IP", "", "IP"),
        (FREEZER, "lots[2].stored", "5 kg", "lots.peas.stored", 5.0),
        (FREEZER, "heaters.floor heater.held_at", "8 °C", "", 8.0),
        (FREEZER, "constructions.pir100.layers[2].thickness", "150 mm", "", 0.15),
        (FREEZER, "outage.events[1].at", "6 h", "", 6 * 3600.0),
        (FREEZER, "machine.defrost_at", "04:00, 16:00", "", (4.0, 16.0)),
        (FREEZER, "lots.cod.piece", "1 m; 0,5 m; 2 m", "", (1.0, 0.5, 2.0)),
        (FREEZER, "lots.cod.limits[1].above", "-15 °C", "", -15.0),
        (FREEZER, "faces.left.colour", "dark", "", "dark"),
        (FREEZER, "neighbours.hall.temperature", "20 °C", "", 20.0),
        (FREEZER, "people[1].count", "4", "", 4),
        (FREEZER, "money.tariff", "0.36 EUR/kWh", "", pytest.approx(1e-7)),
        (ROUND, "lots.milk.stored", "700 kg", "", 700.0),
        (ROUND, "trip.legs.to the bakery.lasts", "1 h", "", 3600.0),
        (ROUND, "trip.stops[2].deliver[1].mass", "10 kg", "", 10.0),
    ],
)
def test_a_value_is_put_where_the_path_says(text: str, path: str, typed: str, there: str, value: object) -> None:
    assert value_at(with_option(text, path, typed), there or path) == value


def test_names_with_points_are_found() -> None:
    """Of two names that a path may begin with, the longer one is meant."""
    text = f'{LEAST}[constructions."pir 0"]\nr_value = "RSI 4"\n[constructions."pir 0.1 m"]\nr_value = "RSI 4"\n'
    raw = with_option(text, "constructions.pir 0.1 m.thickness", "100 mm")
    assert value_at(raw, "constructions.pir 0.1 m.thickness") == 0.1


def test_an_option_mends_what_the_file_has_wrong_or_lacks() -> None:
    with_option('format = 1\n[box]\ntemperature = "cold"\n', "box.temperature", "4 °C")
    with_option("format = 1\n[box]\n", "box.temperature", "4 °C")
    with_option('[box]\ntemperature = "4 °C"\n', "format", "1")


def test_everything_around_it_stays() -> None:
    plain, _ = codec.read(FREEZER, "x.toml")
    changed = with_option(FREEZER, "doors.main.width", "1.2 m")
    before, after = plain.blocks["doors"], changed.blocks["doors"]
    assert before[1] == after[1]
    assert {k: v for k, v in before[0].values.items() if k != "width"} == {
        k: v for k, v in after[0].values.items() if k != "width"
    }
    assert changed.text == FREEZER


@pytest.mark.parametrize(
    ("path", "words"),
    [
        ("doors.mian.width", 'Nearest: "doors.main"'),
        ("doors.main.widht", 'Nearest: "doors.main.width"'),
        ("box.tempreature", 'Nearest: "box.temperature"'),
        ("unit", 'Nearest: "units"'),
        ("dors.main.width", 'Nearest: "doors"'),
        ("doors[3].width", "there are 2"),
        ("doors[0].width", "there are 2"),
        ("doors[x].width", "there are 2"),
        ("doors[1", "there are 2"),
        ("panels[1].width", "there are none"),
        ("outage.events[9].at", "there are 2"),
        ("faces.lefft.colour", 'Nearest: "faces.left"'),
        ("box", "box is a table. Name one of its keys, such as box.length"),
        ("doors", "doors[1].face"),
        ("doors.main", "doors.main.face"),
        ("constructions", "constructions.NAME.layers"),
        ("lots.cod.limits", "lots.cod.limits[1].above"),
        ("box.width.x", "is a value"),
        ("box.", "box is a table"),
        ("", "is no key"),
        (".", "is no key"),
    ],
)
def test_a_path_that_leads_nowhere(path: str, words: str) -> None:
    assert words in sentence(FREEZER, path, "3 m")


@pytest.mark.parametrize(
    ("path", "typed", "words"),
    [
        ("doors.main.width", "90", '"90" has no unit. Write a length, such as "900 mm" or "36 in".'),
        ("doors.main.width", "90 m", "too high"),
        ("doors.main.count", "2.5", "whole number"),
        ("box.powered", "perhaps", "neither yes nor no"),
        ("box.colour", "whit", 'Nearest: "white"'),
        ("box.temperature", "nan", "nan"),
        ("lots.cod.piece", "1 m, 2 m", "2 values"),
        ("name", "a\x1b[2Jb", "cannot be printed"),
        ("name", "x" * 5000, "5000 characters"),
    ],
)
def test_a_value_that_will_not_do(path: str, typed: str, words: str) -> None:
    text = sentence(FREEZER, path, typed)
    assert words in text and text.isprintable()


def test_a_path_that_leads_nowhere_leaves_no_trace() -> None:
    raw, problems = codec.read(LEAST, "x.toml", {"trip.legs[1].lasts": "1 h", "neighbours.hall.x": "1"})
    assert len(problems) == 2
    assert set(raw.blocks) == {"", "box"}


def test_options_and_the_file_are_told_together() -> None:
    _, problems = codec.read(f'{LEAST}length = "3"\n', "x.toml", {"box.width": "4", "box.hight": "2 m"})
    assert [(problem.file, problem.line, problem.path) for problem in problems] == [
        ("--set", None, "box.hight"),
        ("--set", None, "box.width"),
        ("x.toml", 4, "box.length"),
    ]


def test_an_option_for_a_file_that_is_wrong_there() -> None:
    _, problems = codec.read('format = 1\nbox = "x"\n', "x.toml", {"box.width": "4 m"})
    assert [problem.path for problem in problems] == ["box"]
