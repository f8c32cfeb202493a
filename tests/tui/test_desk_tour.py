"""From an empty folder to a sized freezer and its hold time by calls of the desk alone, in SI and in IP units.

The same box is typed in both: whatever it comes to must be the same.
"""

from __future__ import annotations

import time
from pathlib import Path

import pytest

from coldbox.project import fresh, store
from coldbox.spread import hold
from coldbox.tui.desk import Desk, Understood

SI = {
    "length": "6 m", "width": "5 m", "height": "3 m", "cold": "-20 °C", "wide": "1.2 m", "high": "2.4 m",
    "narrow": "900 mm", "arrives": "900 kg/day", "warm": "-12 °C", "stored": "2000 kg", "limit": "-16 °C",
    "foam": "150 mm", "wind": "4 m/s", "lamp": "200 W",
}  # fmt: skip
IP = {
    "length": "236.2204724 in", "width": "16.40419948 ft", "height": "9.842519685 ft", "cold": "-4 °F",
    "wide": "3.937007874 ft", "high": "7.874015748 ft", "narrow": "35.43307087 in", "arrives": "1984.160358 lb/day",
    "warm": "10.4 °F", "stored": "4409.24524 lb", "limit": "3.2 °F", "foam": "5.905511811 in",
    "wind": "8.947745884 mph", "lamp": "682.4283266 Btu/h",
}  # fmt: skip


@pytest.fixture(autouse=True)
def _own_state(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv("XDG_STATE_HOME", str(tmp_path / "state"))


def say(desk: Desk, path: str, text: str) -> str:
    found = desk.set(path, text)
    assert isinstance(found, Understood), (path, text, found)
    assert not desk.problems, (path, text, desk.problems)
    return found.path


def build(desk: Desk, units: str) -> None:
    """What a newcomer would type, thing by thing."""
    typed = {"SI": SI, "IP": IP}[units]
    desk.system = "IP" if units == "IP" else "SI"
    say(desk, "units", units)
    for key in ("length", "width", "height"):
        say(desk, f"box.{key}", typed[key])
    say(desk, "box.temperature", typed["cold"])
    wall = desk.add("constructions")
    say(desk, f"{wall}.layers[1].thickness", typed["foam"])
    sheet = desk.duplicate(f"{wall}.layers[1]")
    say(desk, f"{sheet}.material", "steel sheet")
    say(desk, f"{sheet}.thickness", "0.6 mm")
    say(desk, "box.construction", wall.partition(".")[2])
    say(desk, "site.place", "Halifax")
    say(desk, "site.wind", typed["wind"])
    say(desk, "box.neighbour", "outdoors")
    say(desk, "box.bearing", "S")
    say(desk, "faces.floor.neighbour", "ground")
    say(desk, "faces.left.shade", "40 %")
    front = say(desk, f"{desk.add('doors', 'front')}.name", "quay door").removesuffix(".name")
    back = desk.add("doors", "back")
    for door, wide in ((front, "wide"), (back, "narrow")):
        say(desk, f"{door}.width", typed[wide])
        say(desk, f"{door}.height", typed["high"])
    say(desk, f"{front}.protection", "strip curtain")
    say(desk, f"{desk.add('lights')}.power", typed["lamp"])
    fish = say(desk, f"{desk.add('lots')}.name", "fish").removesuffix(".name")
    say(desk, f"{fish}.product", "frozen fish")
    say(desk, f"{fish}.stored", typed["stored"])
    before = desk.load
    assert isinstance(desk.set(f"{fish}.arrives", typed["arrives"]), Understood)
    # How warm? It says so, and what held before stays in sight meanwhile.
    assert [one.path for one in desk.problems] == [f"{fish}.arrival_temperature"] and desk.load is before
    say(desk, f"{fish}.arrival_temperature", typed["warm"])
    say(desk, f"{desk.add(f'{fish}.limits')}.above", typed["limit"])
    say(desk, "outage.at", "12:00")
    desk.add("outage.events")


def on_new(folder: Path, units: str, *, hold: bool = False) -> Desk:
    return Desk.open(str(fresh.create(f"quay {units}", None, folder)), hold=hold)


def test_both_unit_systems_come_to_the_same_capacity_and_hold_time(tmp_path: Path) -> None:
    capacities, times = [], []
    for units in ("SI", "IP"):
        desk = on_new(tmp_path, units)
        build(desk, units)
        assert desk.load is not None and desk.project is not None
        assert [(door.name, door.face) for door in desk.project.doors] == [("quay door", "front"), ("door", "back")]
        assert {"sun.ceiling", "doors.quay door.traffic", "doors.door.traffic"} <= {one.id for one in desk.load.entries}
        capacities.append(float(desk.load.required_capacity_w))
        kept = hold.run(desk.project, count=0)
        assert kept.hold_h is not None
        times.append(kept.hold_h)
        desk.close()
    assert capacities[0] == pytest.approx(capacities[1], rel=1e-7)
    assert times[0] == pytest.approx(times[1], rel=1e-6)
    assert capacities[0] > 2000.0 and times[0] > 1.0


@pytest.mark.parametrize("units", ["SI", "IP"])
def test_the_way_back_to_nothing_and_forth_again(units: str, tmp_path: Path) -> None:
    desk = on_new(tmp_path, units)
    start, capacity = desk.document, desk.load and desk.load.required_capacity_w
    build(desk, units)
    last, made = desk.document, desk.load and desk.load.required_capacity_w
    steps = 0
    while desk.undo():
        steps += 1
    assert desk.document == start and not desk.dirty
    assert desk.load is not None and desk.load.required_capacity_w == capacity
    for _ in range(steps):
        assert desk.redo()
    assert not desk.redo()
    assert desk.document == last and desk.load.required_capacity_w == made
    desk.save()
    assert not desk.dirty
    assert store.open(desk.path).doors == (desk.project and desk.project.doors)
    desk.close()


def test_the_hold_time_comes_from_a_process_of_its_own_and_goes_stale(tmp_path: Path) -> None:
    """Edits come faster than answers: the last of them is what is answered, first without its spread."""
    desk = on_new(tmp_path, "SI", hold=True)
    try:
        build(desk, "SI")
        assert desk.busy and desk.hold.outage is None
        _wait(desk, lambda: desk.hold.outage is not None)
        first = desk.hold.outage
        assert first is not None and first.hold_h is not None and not desk.hold_stale
        assert desk.project is not None
        assert first.hold_h == pytest.approx(hold.run(desk.project, count=0).hold_h)
        assert desk.hold_words().startswith("holds ")
        for cold in ("-22 °C", "-24 °C", "-26 °C"):
            say(desk, "box.temperature", cold)
        assert desk.hold_stale and desk.hold_words().startswith("was: ")
        _wait(desk, lambda: not desk.hold_stale)
        colder = desk.hold.outage
        assert colder is not None and colder.hold_h is not None and colder.hold_h > first.hold_h
    finally:
        desk.close()
    assert not desk.busy


def _wait(desk: Desk, done: object) -> None:
    assert callable(done)
    until = time.monotonic() + 60.0
    while not done():
        desk.tick()
        assert time.monotonic() < until, "no answer came"
        time.sleep(0.01)
