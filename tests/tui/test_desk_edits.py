"""Random edits of every example: what was done is undone, what was undone is done again, and only words are raised."""

from __future__ import annotations

from pathlib import Path
from typing import Any

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from coldbox.errors import BadProject
from coldbox.project import codec
from coldbox.project.fields import BY_KEY, FIELDS, Field
from coldbox.project.raw import Entered
from coldbox.project.values import Wrong, from_text
from coldbox.tui import sheet, steps, things
from coldbox.tui.desk import Desk, Refusal, Understood
from coldbox.tui.document import ADDABLE, Refused
from coldbox.units import KINDS

PROJECTS = Path(__file__).parents[2] / "projects"
TEXTS = {file.stem: file.read_text(encoding="utf-8") for file in sorted(PROJECTS.glob("*.toml"))}
JUNK = (
    "", " ", "-", "0", "-1", "1e400", "nan", "inf", "abc", "500 cfm", "12", "3,5", "4 in", "-40 °F", "10**10", "\x00",
    "\x1b[31m", "é" * 500, "1;2;3", "1, 2, 3", "[1]", "{a=1}", "=", "'", '"', "true", "50 %", "20/h", "07:00-17:00",
    "99:99", "1:2:3", "²", "٣", "− 5 °C", "± 2 K", "5 ± 2 K", "day 2 06:00", "\ud800", "1 m\n2 m", "room", "R-25",
    "3 1/2 in", "½", "5' 6\"", "2 h 30 min", "name", "width", "a.b", "[2]", "door 2", "notes",
)  # fmt: skip
LISTS = (*ADDABLE, "constructions", "neighbours", "box.limits", "outage.events", "trip.legs", "trip.stops", "quoted")
NOWHERE = ("", "nothing", "faces", "box", "box.length", "doors[9]", "lots.nobody.limits", "faces.roof.colour")


def words(field: Field, line: sheet.Line) -> st.SearchStrategy[str]:
    """What somebody might type into a field: what will do, what stands there, what never will."""
    kind = KINDS.get(field.kind)
    good = [*(kind.examples if kind is not None else ()), *line.choices[:20], line.shown]
    return st.one_of(st.sampled_from(good), st.sampled_from(good), st.sampled_from(JUNK), st.text(max_size=12))


def edit(desk: Desk, data: st.DataObject) -> None:
    """One thing a user may do."""
    found = things.things(desk.document)
    thing = data.draw(st.sampled_from(found))
    lines = sheet.lines(desk, thing)
    line = data.draw(st.sampled_from(lines))
    inside = [path for path, _ in things.addable(desk.document, thing)]
    act = data.draw(st.sampled_from(["set", "set", "set", "try", "raise", "add", "copy", "remove", "back", "units"]))
    try:
        match act:
            case "set" | "try":
                text = data.draw(words(BY_KEY[thing.table][line.key], line))
                (desk.set if act == "set" else desk.try_out)(line.path, text)
            case "raise":
                desk.raised(line.path, data.draw(st.sampled_from([1, -1, 7, -7, 10**9])))
            case "add":
                desk.add(
                    data.draw(st.sampled_from([*LISTS, *inside, *NOWHERE])), data.draw(st.sampled_from(["", "left"]))
                )
            case "copy":
                desk.duplicate(data.draw(st.sampled_from([thing.path, *NOWHERE])))
            case "remove":
                desk.remove(data.draw(st.sampled_from([thing.path, line.path, *NOWHERE])))
            case "back":
                desk.back(data.draw(st.sampled_from([line.path, *NOWHERE])))
            case _:
                desk.system = "IP" if desk.system == "SI" else "SI"
    except Refused as refused:
        assert str(refused)


def on(folder: Path, text: str) -> Desk:
    file = folder / "box.toml"
    file.write_text(text, encoding="utf-8")
    return Desk(str(file), text, None, hold=False)


@settings(max_examples=40, deadline=None, suppress_health_check=list(HealthCheck))
@given(data=st.data())
def test_undo_and_redo_are_each_others_way_back(data: st.DataObject, tmp_path: Path) -> None:
    desk = on(tmp_path, TEXTS[data.draw(st.sampled_from(sorted(TEXTS)))])
    for _ in range(data.draw(st.integers(1, 8))):
        before, good = desk.document, desk.load
        edit(desk, data)
        desk.drop_trial()
        after = desk.document
        assert desk.load is not None, "the last good account stays"
        assert desk.problems or desk.load is not good or after is before
        if after is not before:
            assert desk.undo() and desk.document is before
            assert desk.redo() and desk.document is after
            if data.draw(st.booleans()):
                desk.undo()


@settings(max_examples=30, deadline=None, suppress_health_check=list(HealthCheck))
@given(data=st.data())
def test_a_damaged_file_can_be_edited_or_is_refused_in_words(data: st.DataObject, tmp_path: Path) -> None:
    """A line cut out, doubled or filled with something else: the desk opens it, or says what is wrong."""
    rows = TEXTS[data.draw(st.sampled_from(sorted(TEXTS)))].split("\n")
    for _ in range(data.draw(st.integers(1, 3))):
        at = data.draw(st.integers(0, len(rows) - 1))
        head = rows[at].partition("=")[0].rstrip()
        value = data.draw(
            st.sampled_from(["3", "true", "[]", "{}", "[1]", '["a"]', "2026-03-02", '"x"', "[[]]", "1e3"])
        )
        rows[at] = data.draw(st.sampled_from(["", rows[at] * 2, f"{head or 'doors'} = {value}", "[box", "doors = 1"]))
    try:
        desk = on(tmp_path, "\n".join(rows))
    except BadProject as bad:
        assert bad.problems
        return
    for _ in range(3):
        edit(desk, data)
    while desk.undo():
        pass
    assert not desk.dirty


@pytest.mark.parametrize(
    "text",
    [
        "a = 1" + ".1" * 9,
        "a" + ".a" * 5000 + " = 1",
        "x = " + "[" * 3000,
        "\ufeff" + TEXTS["herring-tub"],
        "",
        "x = 1e",
    ],
    ids=["number", "deep key", "deep list", "byte-order mark", "empty", "half a number"],
)
def test_files_that_are_no_project_are_told(text: str, tmp_path: Path) -> None:
    file = tmp_path / "box.toml"
    file.write_text(text, encoding="utf-8")
    try:
        desk = Desk.open(str(file), hold=False)
    except BadProject as bad:
        assert bad.problems[0].text
        return
    assert desk.problems or desk.load is not None
    things.things(desk.document)
    desk.close()


def reads(field: Field, text: str) -> bool:
    try:
        from_text(field, text)
    except Wrong:
        return False
    return True


STEPPED = [
    (field, text)
    for fields in FIELDS.values()
    for field in fields
    if not (field.structural or field.many or field.kind in ("hours", "text", "name"))
    for text in (field.default, *(KINDS[field.kind].examples if field.kind in KINDS else ()))
    if text and reads(field, text)
]


@pytest.mark.parametrize(("field", "text"), STEPPED, ids=[f"{field.path}={text}" for field, text in STEPPED])
def test_a_step_down_is_the_way_back_from_a_step_up(field: Field, text: str) -> None:
    value = from_text(field, text).value
    up = steps.stepped(field, text, 1, "SI", field.choices)
    down = steps.stepped(field, up, -1, "SI", field.choices)
    if not reads(field, up):
        return  # beyond the bounds of the field: the desk says so
    raised, back = from_text(field, up).value, from_text(field, down).value
    assert raised != value or field.high == value
    if isinstance(value, float) and value not in (0.0, raised):  # from nothing, a step goes to some
        assert back == pytest.approx(value, rel=1e-9, abs=1e-9)
        assert field.kind in ("bearing", "clock", "latitude", "longitude") or raised > value


@pytest.mark.parametrize(
    ("path", "text", "step", "expected"),
    [
        ("box.length", "5' 6\"", 1, "68 in"),
        ("box.length", "3 1/2 in", 1, "3.6 in"),
        ("box.length", "40 mm", -1, "39 mm"),
        ("box.length", "39 mm", 2, "42 mm"),
        ("box.length", "100 mm", -1, "98 mm"),
        ("lots.stored", "1 200 kg", 1, "1250 kg"),
        ("constructions.r_value", "R-25", 1, "R-26"),
        ("box.bearing", "SSW", 1, "SW"),
        ("box.bearing", "355°", 1, "0°"),
        ("site.month", "December", 1, "January"),
        ("site.clock", "UTC-3", 1, "UTC-2"),
        ("outage.lasts", "2 h 30 min", 1, "155 min"),
        ("outage.events.at", "6 h", 1, "6.2 h"),
        ("outage.events.at", "day 2 06:00", 1, "06:15 day 2"),
        ("box.humidity", "20 %", -1, "19 %"),
        ("box.humidity", "20 %", 1, "25 %"),
        ("box.leakage", "0.3/h ± 50 %", -1, "0.29/h ± 50 %"),
        ("box.fittings", "0 kg", 1, "1 kg"),
        ("money.tariff", "0.30 EUR/kWh", 1, "0.31 EUR/kWh"),
    ],
)
def test_steps_keep_the_unit_as_it_is_typed(path: str, text: str, step: int, expected: str) -> None:
    table, _, key = path.rpartition(".")
    assert steps.stepped(BY_KEY[table][key], text, step, "SI") == expected


def test_what_is_copied_from_the_shop_library_is_told_and_has_a_way_back(tmp_path: Path) -> None:
    desk = on(tmp_path, TEXTS["long-quay-freezer"])
    path = "constructions.pir150.layers[2].thickness"
    assert line(desk, path).origin == "library"
    desk.set(path, "120 mm")
    assert line(desk, path).origin == "typed"
    assert desk.back(path) == "148.8 mm" and line(desk, path).origin == "library"
    desk.undo()
    assert line(desk, path).shown == "120 mm"


def test_what_is_only_looked_up_there_comes_back_when_the_hands_value_goes(tmp_path: Path) -> None:
    desk = on(tmp_path, TEXTS["cookhouse-cooler"])
    lot = desk.add("lots")
    assert isinstance(desk.set(f"{lot}.library", "quay boxes"), Understood), "it is among those to pick from"
    assert "quay boxes" in line(desk, f"{lot}.library").choices
    desk.set(f"{lot}.packaging_mass", "10 kg")
    desk.remove(f"{lot}.product")
    assert not desk.problems
    assert (line(desk, f"{lot}.product").origin, line(desk, f"{lot}.product").shown) == ("library", "frozen fish")
    desk.set(f"{lot}.product", "cod")
    assert line(desk, f"{lot}.product").origin == "typed"
    assert desk.back(f"{lot}.product") == "frozen fish"


def test_a_new_name_goes_wherever_the_thing_is_spoken_of(tmp_path: Path) -> None:
    desk = on(tmp_path, TEXTS["island-round"])
    found = desk.set("lots.fish.name", "catch")
    assert isinstance(found, Understood) and found.path == "lots.catch.name" and not desk.problems
    assert desk.shown("trip.stops.north shop.deliver[1].lot") == "catch"
    taken = desk.set("lots.catch.name", "ice cream")
    assert isinstance(taken, Refusal) and "taken" in taken.text


@pytest.mark.parametrize("stem", sorted(TEXTS))
def test_lists_in_things_can_be_added_to_doubled_and_emptied(stem: str, tmp_path: Path) -> None:
    desk = on(tmp_path, TEXTS[stem])
    start = desk.document
    for thing in things.things(start):
        for path, word in things.addable(start, thing):
            made = desk.add(path)
            assert word in next(one.label for one in things.things(desk.document) if one.path == made)
            if not path.endswith(".composition"):
                twin = desk.duplicate(made)
                assert twin != made
                desk.remove(twin)
            desk.remove(made)
            assert desk.document == start, (path, made)


def test_a_door_never_begins_in_a_floor_on_the_ground(tmp_path: Path) -> None:
    desk = on(tmp_path, TEXTS["long-quay-freezer"])
    made = desk.add("doors", "floor")
    assert not desk.problems and desk.shown(f"{made}.face") == "front"


def line(desk: Desk, path: str) -> sheet.Line:
    thing = things.thing(desk.document, path.rpartition(".")[0])
    assert thing is not None
    return next(one for one in sheet.lines(desk, thing) if one.path == path)


def test_one_key_reads_one_value_and_makes_one_account(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """The work of a key is counted, not timed: what did not change is not read again."""
    desk = on(tmp_path, TEXTS["greens-hall"])
    read = []
    real = codec.from_toml

    def counted(field: Field, value: object, *rest: Any) -> Any:
        if isinstance(value, str):
            read.append(field.path)
        return real(field, value, *rest)

    monkeypatch.setattr(codec, "from_toml", counted)
    before = desk.accounts
    desk.try_out("box.temperature", "3.1 °C")
    desk.set("box.temperature", "3.1 °C")
    desk.undo()
    assert read == ["box.temperature"]
    assert desk.accounts == before + 2


def test_what_was_read_of_one_field_is_not_taken_for_another() -> None:
    known: dict[codec.Known, Entered] = {}
    document = {"format": 1, "box": {"length": "70 m", "width": "70 m", "height": "70 m", "temperature": "3 °C"}}
    for _ in range(2):
        _, problems = codec.of_document(document, "box.toml", known)
        assert [one.path for one in problems] == ["box.height"], "70 m is too high, and not too long"


def test_an_edit_after_an_undo_ends_the_way_forth(tmp_path: Path) -> None:
    desk = on(tmp_path, TEXTS["greens-hall"])
    desk.set("box.temperature", "3 °C")
    desk.undo()
    desk.set("box.temperature", "5 °C")
    assert not desk.redo() and desk.shown("box.temperature") == "5 °C"
