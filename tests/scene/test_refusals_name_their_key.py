"""A method that does not hold says which line of which file asked for it, and what would do."""

from __future__ import annotations

from pathlib import Path

import pytest

from coldbox.account.load import load
from coldbox.errors import BadProject, OutOfValidity, Problem
from coldbox.project import store
from coldbox.scene.about import about

ROOM = """format = 1
name = "hall"
[box]
length = "{length}"
width = "20 m"
height = "{height}"
temperature = "{room}"
construction = "wall"
neighbour = "yard"
films = "{films}"
air = "{air}"
[neighbours.yard]
temperature = "30 °C"
[constructions.wall]
layers = [{{ material = "PIR foam", thickness = "100 mm" }}]
"""
USUAL = {"length": "10 m", "height": "5 m", "room": "2 °C", "films": "standard", "air": "doors"}
LETTUCE = """[[lots]]
name = "greens"
product = "lettuce"
arrives = "100 kg/day"
arrival_temperature = "{warm}"
"""
PLACE = """[site]
place = "Halifax"
dry_bulb = "{air}"
humidity = "{damp}"
sky = "{sky}"
"""


def problem_of(tmp_path: Path, text: str) -> Problem | None:
    file = tmp_path / "hall.toml"
    file.write_text(text, encoding="utf-8")
    try:
        load(store.open(str(file), {}))
    except BadProject as refused:
        (only,) = refused.problems
        assert only.file == str(file) and only.line is not None
        assert only.path.rpartition(".")[2] in text.splitlines()[only.line - 1]
        return only
    return None


@pytest.mark.parametrize(
    ("changed", "more", "path", "word"),
    [
        ({"films": "natural", "height": "19 m", "room": "-30 °C"}, "", "box.films", 'films = "standard"'),
        ({"air": "table", "length": "90 m"}, "", "box.air", 'air = "doors"'),
        ({}, LETTUCE.format(warm="48 °C"), "lots.greens.arrival_temperature", "Bring it in cooler"),
        ({"room": "-44 °C"}, LETTUCE.format(warm="-50 °C"), "lots.greens.arrival_temperature", "within that range"),
        ({"room": "-50 °C"}, LETTUCE.format(warm="-40 °C"), "box.temperature", "greens"),
        ({}, PLACE.format(air="43 °C", damp="80 %", sky="clear"), "site.humidity", 'sky = "overcast"'),
    ],
)
def test_the_key_its_line_and_a_way_out(
    tmp_path: Path, changed: dict[str, str], more: str, path: str, word: str
) -> None:
    found = problem_of(tmp_path, ROOM.format(**{**USUAL, **changed}) + more)
    assert found is not None and found.path == path and word in found.text
    assert "  " not in found.text and " ;" not in found.text


@pytest.mark.parametrize(
    ("changed", "more"),
    [
        ({"films": "standard", "height": "19 m", "room": "-30 °C"}, ""),
        ({"air": "doors", "length": "90 m"}, ""),
        ({}, LETTUCE.format(warm="30 °C")),
        ({}, PLACE.format(air="43 °C", damp="80 %", sky="overcast")),
    ],
)
def test_the_way_out_works(tmp_path: Path, changed: dict[str, str], more: str) -> None:
    assert problem_of(tmp_path, ROOM.format(**{**USUAL, **changed}) + more) is None


def test_a_refusal_of_something_else_passes_through(tmp_path: Path) -> None:
    file = tmp_path / "hall.toml"
    file.write_text(ROOM.format(**USUAL), encoding="utf-8")
    project = store.open(str(file), {})
    dry = about(project, "site.humidity", "Write drier air.", quantity="the dew point")
    with pytest.raises(OutOfValidity, match="the wind"), dry:
        raise OutOfValidity("the wind", 40.0, 0.0, 30.0, "m/s", "Outside film")
    with pytest.raises(ZeroDivisionError), about(project, "box.films", "Write another."):
        raise ZeroDivisionError
