"""The desk without any screen: what is typed, what it comes to, and the way back and forth."""

from __future__ import annotations

import copy
import tomllib
from pathlib import Path

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from coldbox.errors import BadProject, ColdboxError
from coldbox.project import fresh, journal, store
from coldbox.project.fields import FIELDS
from coldbox.project.origins import declaration
from coldbox.tui import document as documents
from coldbox.tui import sheet, things
from coldbox.tui.desk import Desk, Refusal, Understood
from coldbox.tui.steps import stepped

PROJECTS = Path(__file__).parents[2] / "projects"
EXAMPLES = sorted(PROJECTS.glob("*.toml"))


@pytest.fixture(autouse=True)
def _own_state(tmp_path_factory: pytest.TempPathFactory, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv("XDG_STATE_HOME", str(tmp_path_factory.mktemp("state")))


def desk_on(folder: Path, example: str = "long-quay-freezer") -> Desk:
    file = folder / "box.toml"
    file.write_bytes((PROJECTS / f"{example}.toml").read_bytes())
    return Desk.open(str(file), hold=False)


def told(found: object) -> str:
    assert isinstance(found, Understood | Refusal)
    return found.text


def test_a_tour_from_nothing_to_a_sized_freezer_and_back(tmp_path: Path) -> None:
    """Two doors, goods, sun and a limit, in feet and in metres; undone to nothing, redone, saved."""
    for system, numbers in (("SI", ("5 m", "-20 °C", "900 mm")), ("IP", ("16' 6\"", "-4 F", "36 in"))):
        path = fresh.create(f"freezer {system}", None, tmp_path)
        desk = Desk.open(str(path), hold=False)
        start = desk.document
        length, cold, door = numbers
        assert desk.load is not None
        before = desk.load.required_capacity_w
        for where, text in (
            ("units", system), ("box.length", length), ("box.temperature", cold), ("box.construction", "pir150"),
            ("site.place", "Halifax"), ("box.neighbour", "outdoors"), ("box.bearing", "S"), ("box.colour", "medium"),
        ):  # fmt: skip
            assert isinstance(desk.set(where, text), Understood), (where, text, desk.set(where, text))
        for _ in range(2):
            made = desk.add("doors", "front")
            assert isinstance(desk.set(f"{made}.width", door), Understood)
        lot = desk.add("lots")
        assert isinstance(desk.set(f"{lot}.product", "cod"), Understood)
        assert isinstance(desk.set("faces.left.neighbour", "room"), Understood)
        assert not desk.problems and desk.dirty
        assert desk.load.required_capacity_w > before
        ids = {entry.id for entry in desk.load.entries}
        assert {"doors.door.traffic", "doors.door 2.traffic", "sun.ceiling"} <= ids and "sun.left" not in ids
        last, count = desk.document, 0
        while desk.undo():
            count += 1
        assert desk.document == start and not desk.dirty and desk.load.required_capacity_w == before
        while desk.redo():
            count -= 1
        assert count == 0 and desk.document == last
        desk.save()
        assert not desk.dirty and tomllib.loads(path.read_text(encoding="utf-8")) == last
        assert "# The least that computes" in path.read_text(encoding="utf-8")
        desk.close()


def test_a_wrong_entry_is_answered_and_changes_nothing(tmp_path: Path) -> None:
    desk = desk_on(tmp_path)
    before, account = desk.document, desk.load
    for path, text, says in (
        ("box.temperature", "cold", "temperature"),
        ("box.temperature", "9000 °C", "°C"),
        ("box.length", "3 kg", "length"),
        ("doors.quay door.width", "", ""),
        ("doors.nobody.width", "1 m", "nobody"),
        ("box.colour", "mauve", "white"),
        ("lots.store.product", "unicorn", "unicorn"),
    ):
        found = desk.set(path, text)
        assert isinstance(found, Refusal) and says in found.text, (path, text, found)
    assert desk.document is before and desk.load is account and not desk.dirty


def test_a_bare_number_takes_the_unit_beside_the_field(tmp_path: Path) -> None:
    desk = desk_on(tmp_path)
    desk.set("box.temperature", "-21")
    assert desk.shown("box.temperature") == "-21 °C"
    desk.system = "IP"
    desk.set("box.temperature", "-4")
    assert desk.shown("box.temperature") == "-4 °F"


def test_what_was_understood_is_told(tmp_path: Path) -> None:
    desk = desk_on(tmp_path)
    assert told(desk.set("box.temperature", "0 F")) == "-17.8 °C"
    assert told(desk.set("doors.quay door.width", "4 ft")) == "1.219 m"


def test_a_problem_elsewhere_keeps_the_last_account(tmp_path: Path) -> None:
    desk = desk_on(tmp_path)
    account = desk.load
    desk.remove("doors.quay door.width")
    assert desk.problems and desk.load is account
    desk.undo()
    assert not desk.problems


def test_the_account_is_made_once_for_each_change(tmp_path: Path) -> None:
    desk = desk_on(tmp_path)
    before = desk.accounts
    desk.set("box.temperature", "-22 °C")
    desk.set("box.temperature", "nonsense")
    desk.undo()
    assert desk.accounts == before + 2


@pytest.mark.parametrize("file", EXAMPLES, ids=lambda file: file.stem)
def test_every_thing_has_its_fields(file: Path, tmp_path: Path) -> None:
    desk = desk_on(tmp_path, file.stem)
    for thing in things.things(desk.document):
        found = sheet.lines(desk, thing)
        assert [line.key for line in found] == [one.key for one in FIELDS[thing.table] if not one.structural]
        assert all(line.label and line.help for line in found)
        assert things.thing(desk.document, thing.path) == thing
    box = {line.key: line for line in sheet.lines(desk, things.Thing(path="box", table="box", label="box"))}
    assert box["temperature"].origin == "typed" and box["temperature"].shown
    assert box["sun"].origin == "default" and box["sun"].reason


@pytest.mark.parametrize("table", documents.ADDABLE)
def test_what_is_added_computes_and_goes_again(table: str, tmp_path: Path) -> None:
    desk = desk_on(tmp_path)
    start = desk.document
    made = desk.add(table, "left")
    assert not desk.problems, desk.problems
    twin = desk.duplicate(made)
    assert twin != made and not desk.problems
    desk.remove(twin)
    desk.remove(made)
    assert desk.document == start


def test_a_face_is_written_when_it_says_something_and_goes_when_it_does_not(tmp_path: Path) -> None:
    desk = desk_on(tmp_path, "cookhouse-cooler")
    start = copy.deepcopy(desk.document)
    desk.set("faces.right.shade", "50 %")
    assert desk.document["faces"]["right"]["shade"] == "50 %"
    desk.remove("faces.right.shade")
    assert desk.document == start


@pytest.mark.parametrize(
    ("path", "text", "steps", "expected"),
    [
        ("box.temperature", "-18 °C", 1, "-17 °C"),
        ("box.temperature", "0 F", -2, "-2 F"),
        ("box.length", "3 m", 1, "3.1 m"),
        ("box.length", "900 mm", -1, "880 mm"),
        ("lots.x.stored", "1200 kg", 1, "1250 kg"),
        ("doors.x.count", "1", -3, "1"),
        ("outage.at", "14:00", 3, "14:45"),
        ("outage.at", "23:50", 1, "00:05"),
        ("box.colour", "white", 1, "light"),
        ("box.powered", "true", 1, "no"),
        ("constructions.a.layers[1].conductivity", "0.022 W/mK ± 10 %", 1, "0.023 W/mK ± 10 %"),
    ],
)
def test_steps(path: str, text: str, steps: int, expected: str) -> None:
    field = declaration(path)
    assert field is not None
    assert stepped(field, text, steps, "SI", field.choices) == expected


# Saving beside others


def test_a_file_changed_by_an_editor_is_not_overwritten(tmp_path: Path) -> None:
    desk = desk_on(tmp_path)
    desk.set("box.temperature", "-22 °C")
    file = Path(desk.path)
    theirs = file.read_text(encoding="utf-8").replace("Long Quay freezer", "Their freezer")
    file.write_text(theirs, encoding="utf-8")
    assert desk.moved_on()
    with pytest.raises(store.ChangedUnderneath) as told:
        desk.save()
    assert file.read_text(encoding="utf-8") == theirs and desk.dirty
    desk.save(over=told.value.found)
    assert "-22 °C" in file.read_text(encoding="utf-8") and not desk.dirty


def test_the_second_opens_to_read(tmp_path: Path) -> None:
    desk = desk_on(tmp_path)
    second = Desk.open(desk.path, hold=False)
    assert second.read_only and second.held_by
    with pytest.raises(ColdboxError):
        second.save()
    desk.close()
    second.close()
    assert not Desk.open(desk.path, hold=False).read_only


def test_unsaved_work_is_offered_again(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    desk = desk_on(tmp_path)
    desk.set("box.temperature", "-25 °C")
    desk.write_journal()
    found = []
    monkeypatch.setattr(journal, "find", lambda _: found[0] if found else None)
    left = journal.Journal(file="", path=desk.path, document=desk.document, stamp=desk._stamp, holder=None, when_ns=0)
    desk.close(keep_journal=True)
    found.append(left)
    again = Desk.open(desk.path, hold=False)
    assert again.left_behind is not None and again.shown("box.temperature") != "-25 °C"
    again.resume()
    assert again.shown("box.temperature") == "-25 °C" and again.dirty


# Anything at all

WORDS = st.one_of(
    st.sampled_from(["3 m", "-18 °C", "white", "", "nan", "1e400 m", "200 kg", "true", "14:00", "50 %", "x" * 400]),
    st.sampled_from(["\x1b[2J", "\u202e", "3", "0.3/h"]),
    st.text(max_size=20),
)  # fmt: skip


@settings(max_examples=60, deadline=None, suppress_health_check=list(HealthCheck))
@given(data=st.data())
def test_nothing_typed_is_lost_or_raises(data: st.DataObject, tmp_path: Path) -> None:
    desk = desk_on(tmp_path)
    kept = [desk.document]
    for _ in range(data.draw(st.integers(1, 6))):
        thing = data.draw(st.sampled_from(things.things(desk.document)))
        line = data.draw(st.sampled_from(sheet.lines(desk, thing)))
        match data.draw(st.sampled_from(["set", "raise", "add", "copy", "remove"])):
            case "set":
                desk.set(line.path, data.draw(WORDS))
            case "raise":
                desk.raised(line.path, data.draw(st.integers(-3, 3)))
            case "add":
                desk.add(data.draw(st.sampled_from(documents.ADDABLE)), "left")
            case "copy" if thing.table in things.LISTS:
                desk.duplicate(thing.path)
            case "remove" if thing.table in things.LISTS:
                desk.remove(thing.path)
        if desk.document is not kept[-1]:
            kept.append(desk.document)
    last = desk.document
    states = [desk.document]
    while desk.undo():
        states.append(desk.document)
    assert states == kept[::-1]
    while desk.redo():
        pass
    assert desk.document == last


def test_who_takes_the_file_over_is_told_to_the_first(tmp_path: Path) -> None:
    desk = desk_on(tmp_path)
    assert desk.lost() == "" and not desk.read_only
    second = Desk.open(desk.path, hold=False)
    second.take_over()
    assert "taken over by" in desk.lost() and desk.read_only
    with pytest.raises(ColdboxError, match="read only"):
        desk.save()
    desk.close()
    assert second.lost() == "" and not second.read_only, "the first took only its own word away"
    second.close()


def test_a_file_that_broke_meanwhile_is_refused_and_the_work_stays(tmp_path: Path) -> None:
    desk = desk_on(tmp_path)
    desk.set("box.temperature", "-22 °C")
    before = desk.document
    Path(desk.path).write_text("[box\n", encoding="utf-8")
    with pytest.raises(BadProject):
        desk.reload()
    assert desk.document is before and desk.dirty and desk.moved_on()
    desk.close()
