"""The unfolded box: nothing overlaps, everything can be reached, the figures are those of the account."""

from __future__ import annotations

import unicodedata
from pathlib import Path

import numpy as np
import pytest

import coldbox
from coldbox.account.entry import Load
from coldbox.paper.drawing.canvas import Canvas, Place, cells
from coldbox.paper.drawing.carton import LEAST, carton, inside, of_face
from coldbox.paper.drawing.day import GROUPS, day_bars
from coldbox.project.model import FACES
from coldbox.units import show

EXAMPLES = sorted((Path(__file__).parents[2] / "projects").glob("*.toml"))
SIZES = ((50, 20), (44, 14), (90, 36), (130, 50), (40, 12), (20, 5))

each_example = pytest.mark.parametrize("file", EXAMPLES, ids=lambda file: file.stem)


def account(file: Path) -> Load:
    return coldbox.load(coldbox.open(file))


def overlaps(one: Place, other: Place) -> bool:
    return (
        one.x < other.x + other.width
        and other.x < one.x + one.width
        and one.y < other.y + other.height
        and other.y < one.y + one.height
    )


@each_example
@pytest.mark.parametrize("size", SIZES)
def test_lines_fit_and_things_are_reached(file: Path, size: tuple[int, int]) -> None:
    load = account(file)
    wide, high = size
    drawing = carton(load.project, load, wide, high)
    rows = drawing.canvas.rows()
    assert len(rows) == high and all(sum(len(span.text) for span in row) == wide for row in rows)
    for place in drawing.places.values():
        assert place.x >= 0 and place.x + place.width <= wide and place.y >= 0 and place.y + place.height <= high
    if high < 14:
        return
    assert {f"faces.{face}" for face in FACES} <= set(drawing.places)
    things = [path for path in drawing.places if path.split(".")[0] not in ("faces", "doors", "panels")]
    for at, path in enumerate(things):
        for other in things[at + 1 :]:
            assert not overlaps(drawing.places[path], drawing.places[other]), (path, other)
    for door in load.project.doors:
        place = drawing.places.get(f"doors.{door.name}")
        face = drawing.places[f"faces.{door.face}"]
        if place is not None:
            assert face.x < place.x and place.x + place.width < face.x + face.width


@each_example
def test_figures_are_those_of_the_account(file: Path) -> None:
    load = account(file)
    drawing = carton(load.project, load, 160, 50)
    lines = drawing.canvas.lines()
    for face in FACES:
        place = drawing.places[f"faces.{face}"]
        told = "".join(lines[place.y + 1][place.x : place.x + place.width])
        watts, area = of_face(load, face)
        own = [entry for entry in load.entries if entry.id in (face, f"sun.{face}")]
        assert watts == pytest.approx(sum(entry.hours_w[load.peak_hour] for entry in own))
        assert show(watts, "power", "SI", 3) in told
        assert area > 0.0


@each_example
def test_what_is_inside_is_drawn_where_there_is_room(file: Path) -> None:
    load = account(file)
    drawing = carton(load.project, load, 160, 60)
    assert {path for path, _ in inside(load.project, "SI")} <= set(drawing.places)
    assert {f"doors.{door.name}" for door in load.project.doors} <= set(drawing.places)


@each_example
def test_plain_terminals_get_plain_letters(file: Path) -> None:
    load = account(file)
    for made in (
        carton(load.project, load, 60, 22, ascii_only=True).canvas, day_bars(load, 60, 12, ascii_only=True),
    ):  # fmt: skip
        assert "".join(made.lines()).isascii()
        assert all(sum(len(span.text) for span in row) == 60 for row in made.rows())


@each_example
def test_bars_stand_as_high_as_their_hours(file: Path) -> None:
    load = account(file)
    lines = day_bars(load, 80, 30).lines()
    rows = 27
    letters = {character for _, character, _ in GROUPS}
    positive = np.maximum(
        [sum((e.hours_w for e in load.entries if e.group == group), np.zeros(24)) for group, _, _ in GROUPS], 0.0
    ).sum(axis=0)  # fmt: skip
    left = len(show(float(positive.max()), "power", "SI", 3)) + 1
    each = (80 - left) // 24
    for hour in range(24):
        tall = sum(line[left + hour * each : left + hour * each + 1] in letters for line in lines[:rows] if line)
        assert tall == pytest.approx(positive[hour] / positive.max() * rows, abs=1.0)


def test_small_rooms_get_a_list() -> None:
    load = account(EXAMPLES[0])
    drawing = carton(load.project, load, LEAST[0] - 1, 30)
    assert drawing.places["faces.front"].height == 1
    assert drawing.canvas.lines()[0].startswith("front")


def test_hostile_names_stay_inert() -> None:
    load = account(EXAMPLES[0])
    project = load.project
    name = "a\x1b[2J\u202e漢字e\u0301\u200b"
    lot = project.lots[0].replace(name=name)
    drawing = carton(project.replace(lots=(lot,)), load, 90, 30)
    text = "\n".join(drawing.canvas.lines())
    assert "漢字" in text
    assert not any(unicodedata.category(letter) in ("Cc", "Cf") for letter in text if letter != "\n")
    assert cells("漢") == ["漢漢"] and cells("e\u0301") == ["e"]


def test_lines_join_where_they_meet() -> None:
    canvas = Canvas(7, 3)
    canvas.frame(0, 0, 4, 3)
    canvas.frame(3, 0, 4, 3)
    assert canvas.lines() == ["┌──┬──┐", "│  │  │", "└──┴──┘"]
