"""From an empty folder to a saved, sized freezer, by keyboard alone; undone to nothing and done again."""

from __future__ import annotations

import tomllib

import pytest
from screens import Driven
from tours import IP, SI, build

from coldbox.account.load import load
from coldbox.project import store


@pytest.fixture(params=["SI", "IP"], scope="module")
def toured(request: pytest.FixtureRequest, tmp_path_factory: pytest.TempPathFactory) -> Driven:
    driven = Driven(tmp_path_factory.mktemp("tour"))
    build(driven, {"SI": SI, "IP": IP}[request.param], system=request.param)
    return driven


def test_the_tour_ends_in_a_saved_freezer_that_computes(toured: Driven) -> None:
    path = toured.shell.folder / "quay.toml"
    project = store.open(path)
    assert not toured.desk.dirty
    assert not toured.desk.problems
    assert float(project.box.temperature) == pytest.approx(-20.0, abs=0.01)
    assert {(door.name, door.face) for door in project.doors} == {("quay door", "front"), ("back door", "back")}
    assert [lot.name for lot in project.lots] == ["cod"]
    assert project.site is not None and project.site.place == "Halifax"
    answer = load(project)
    assert any(entry.group == "sun" for entry in answer.entries)
    assert answer.required_capacity_w == pytest.approx(float(toured.desk.load.required_capacity_w), rel=1e-12)
    assert 2000.0 < float(answer.required_capacity_w) < 8000.0


def test_what_is_typed_stands_in_the_file_as_it_was_typed(toured: Driven) -> None:
    said = tomllib.loads((toured.shell.folder / "quay.toml").read_text())
    assert said["doors"][0]["width"] in (SI["door"], IP["door"])
    assert said["box"]["temperature"] in (SI["temperature"], IP["temperature"])
    assert "# front to back" in (toured.shell.folder / "quay.toml").read_text()


def test_the_tour_is_undone_to_nothing_and_done_again(toured: Driven) -> None:
    done = toured.desk.document
    capacity = toured.desk.load.required_capacity_w
    steps = 0
    while "Nothing left" not in toured.press("u").shell.said:
        steps += 1
    assert steps > 15
    assert "doors" not in toured.desk.document and "lots" not in toured.desk.document
    assert toured.desk.document["box"]["temperature"] == "4 °C"
    for _ in range(steps):
        toured.press("r")
    assert toured.desk.document == done
    assert toured.desk.load.required_capacity_w == capacity
    assert "Nothing to redo" in toured.press("r").shell.said


def test_one_account_is_made_for_each_edit_and_none_for_moving(toured: Driven) -> None:
    before = toured.desk.accounts
    toured.press(*["left", "right", "up", "down"] * 3, "2", "down", "1", "?", "escape", "U", "U", "T")
    assert toured.desk.accounts == before
    toured.to_thing("box")
    toured._move_to("temperature")
    at = toured.desk.accounts
    toured.press("-")  # no value yet
    assert toured.desk.accounts == at
    toured.press("5")
    assert toured.desk.accounts == at + 1
    toured.press("enter")  # what was tried out is taken, not made again
    assert toured.desk.accounts == at + 1


def test_the_answer_is_in_sight_on_every_page_and_under_every_sheet(toured: Driven) -> None:
    for key in ("1", "2", "3", "4", "5", "6", "?", "escape", "f2", "escape", ":", "escape", "1", "enter", "enter"):
        toured.press(key)
        assert any(line.lstrip().startswith("needs ") for line in toured.lines()[-3:]), toured.screen
