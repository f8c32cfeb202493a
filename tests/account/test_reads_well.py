"""What a newcomer stumbles over: boxes nothing cools, a unit alone on a line, key paths cut in a word."""

from __future__ import annotations

import json
import re
from pathlib import Path

import pytest

from coldbox.account.load import load
from coldbox.cli.main import main
from coldbox.paper import text
from coldbox.paper.document import Column, Document, Paragraph, Table
from coldbox.project import store

PROJECTS = Path(__file__).parents[2] / "projects"


def told(capsys: pytest.CaptureFixture[str], *words: str) -> str:
    main(list(words))
    return capsys.readouterr().out


def test_a_box_that_nothing_cools_is_sold_no_refrigeration(capsys: pytest.CaptureFixture[str]) -> None:
    tub = str(PROJECTS / "herring-tub.toml")
    page = told(capsys, "load", tub)
    watts = json.loads(told(capsys, "load", tub, "--json"))["hours_w"]
    assert page.startswith(f"Herring tub, 0 °C: {sum(watts) / 24:.1f} W come in")
    for word in ("refrigeration", "coil", "governs", "+ 10 %"):
        assert word not in page.partition("What to watch for")[0]


@pytest.mark.parametrize("width", [60, 72, 80, 120])
def test_no_line_begins_with_a_unit(width: int) -> None:
    figures = " ".join(f"about {n} °C and {n} kW of {n} m², {n} %;" for n in range(40))
    lines = text.render(Document(title="", blocks=(Paragraph(text=figures, indent=1),)), width=width).splitlines()
    assert not [line for line in lines if re.match(r" *(°C|kW|m²|%)", line)]
    assert " ".join(" ".join(lines).split()) == figures and all(len(line) <= width for line in lines)


def test_key_paths_break_before_a_dot() -> None:
    columns = (Column(title="key", gives=True), Column(title="value"))
    rows = (("neighbours.kitchen.temperature", "x" * 52),)
    page = text.render(Document(title="", blocks=(Table(columns=columns, rows=rows),)), width=80)
    assert [line.split()[0] for line in page.splitlines()[1:]] == ["neighbours.kitchen", ".temperature"]


def test_equal_doors_are_called_doors_once() -> None:
    labels = [one.label for one in load(store.open(str(PROJECTS / "quayside-display.toml"), {})).entries]
    assert "glass doors, leaf" in labels and not [label for label in labels if "doors door" in label]


def test_two_limits_of_a_lot_are_one_caution() -> None:
    found = load(store.open(str(PROJECTS / "milk-van.toml"), {})).findings
    (only,) = [one for one in found if one.id == "limit-above-guidance"]
    assert "milk may warm to 8 °C" in only.words()
