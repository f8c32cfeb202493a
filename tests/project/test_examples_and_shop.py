"""The example projects and the shop library that the checkout ships with."""

from __future__ import annotations

from pathlib import Path

import pytest

from coldbox.project import codec, shop, store
from coldbox.units import parse

HERE = Path(__file__).resolve().parents[2]
EXAMPLES = sorted((HERE / "projects").glob("*.toml"))


@pytest.mark.parametrize("file", EXAMPLES, ids=lambda file: file.stem)
def test_example_opens(file: Path) -> None:
    project = store.open(str(file))
    assert project.name
    assert project.origins


def test_the_examples_show_both_systems_and_every_kind_of_box() -> None:
    projects = [store.open(str(file)) for file in EXAMPLES]
    assert len(projects) >= 8
    assert {project.units for project in projects} == {"SI", "IP"}
    assert {project.box.powered for project in projects} == {True, False}
    assert any(project.trip for project in projects)
    assert any(project.box.notch_corner for project in projects)
    assert any(project.box.measured == "outside" for project in projects)
    assert any(project.box.k_value for project in projects)


@pytest.mark.parametrize("file", EXAMPLES, ids=lambda file: file.stem)
def test_what_an_example_copied_from_the_library_is_what_stands_there(file: Path) -> None:
    library = shop.library(str(file))
    raw, problems = codec.read(store.read_text(str(file)), str(file))
    assert not problems
    assert not shop.differences(raw, library)


@pytest.mark.parametrize("table", sorted(shop.TABLES))
def test_library_rows_are_read_and_dated(table: str) -> None:
    library = shop.library(str(EXAMPLES[0]))
    names = library.names(table)
    assert names
    assert not library.problems
    for name in names:
        assert shop.date_of(library.dated(table, library.row(table, name)))


def test_the_two_rooms_of_the_block_house_agree_on_their_wall() -> None:
    meat, freezing = (store.open(str(HERE / "projects" / f"block-house-{name}.toml")) for name in ("meat", "freezing"))
    assert meat.neighbours["freezing"].temperature == freezing.box.temperature
    assert freezing.neighbours["meat"].temperature == meat.box.temperature
    assert meat.faces["left"].construction == freezing.faces["right"].construction == "pir150"
    assert parse("-25 °C", "temperature").value == freezing.box.temperature
