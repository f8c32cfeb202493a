"""Two real processes on one project, in all orders of open, save, close and crash; and four that save at once."""

from __future__ import annotations

import os
import tomllib
from collections.abc import Iterator
from itertools import combinations
from pathlib import Path

import editing
import pytest
from editing import Desk, process

from coldbox.project import journal, store

OPEN, SAVE, CLOSE, CRASH = "open", "save", "close", "crash"
COURSES = [(OPEN, SAVE, CLOSE), (OPEN, SAVE, CRASH), (OPEN, SAVE, SAVE, CLOSE), (OPEN, CRASH)]
WORLDS: dict[str, tuple[str, ...]] = {
    "one host": (),
    "two hosts, clocks an hour apart": ("other host",),
    "no hard links": ("no links",),
    "no locks": ("no locks",),
}


def orders(one: int, other: int) -> Iterator[str]:
    """Every way to put so many steps of A and so many of B one after the other."""
    for places in combinations(range(one + other), one):
        yield "".join("A" if index in places else "B" for index in range(one + other))


@pytest.fixture(autouse=True)
def own_state(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv("XDG_STATE_HOME", str(tmp_path / "state"))


class Day:
    """One order of events, and what must come of each: whoever has not seen the latest version may not replace it."""

    def __init__(self, file: Path, desks: dict[str, Desk], courses: dict[str, tuple[str, ...]]) -> None:
        self.file, self.desks = file, desks
        file.write_text(editing.TEXT)
        self.courses = {who: list(course) for who, course in courses.items()}
        for desk in desks.values():
            desk("begin", str(file))
        world = desks["B"].conditions
        self.same_host = "other host" not in world
        self.locks = "no locks" not in world
        self.version = 0  # on disk
        self.knows: dict[str, int] = {}
        self.locked_by: str | None = None
        self.left_by: str | None = None

    def step(self, who: str) -> None:
        what = self.courses[who].pop(0)
        getattr(self, what)(who)
        document = tomllib.loads(self.file.read_text())
        assert editing.count(document) == self.version, f"{who} {what}"
        assert "# by hand" in self.file.read_text()

    def open(self, who: str) -> None:
        said = self.desks[who]("open")
        self.knows[who] = self.version
        if who == "B" and not self.locks:
            assert said == "unlocked"
        elif self.locked_by is not None:
            assert said.startswith("held by ") and f"(process {self.pid(self.locked_by)}," in said
        elif self.left_by is not None and not self.same_host:
            assert said.startswith("held by ")  # whether a process of another host lives nobody can say
        else:
            expected = "ours" if self.left_by is None else f"ours after {self.pid(self.left_by)}"
            assert said == expected
            self.locked_by, self.left_by = who, None

    def save(self, who: str) -> None:
        if self.knows[who] == self.version:
            assert self.desks[who]("save", self.version + 1) == "saved"
            self.version += 1
            self.knows[who] = self.version
        else:
            assert self.desks[who]("save", 1000) == "changed"

    def close(self, who: str) -> None:
        assert self.desks[who]("close") == "closed"
        if self.locked_by == who:
            self.locked_by = None

    def crash(self, who: str) -> None:
        self.desks[who].crash()
        if self.locked_by == who:
            self.locked_by, self.left_by = None, who

    def pid(self, who: str) -> int | None:
        return self.desks[who].process.pid


PAIRS = [(first, second, world) for world in list(WORLDS)[:2] for first in COURSES[:3] for second in COURSES]
PAIRS += [(first, second, world) for world in list(WORLDS)[2:] for first in COURSES[:2] for second in COURSES[:2]]


@pytest.mark.parametrize(
    ("first", "second", "world"), PAIRS, ids=[f"{'-'.join(a)}, {'-'.join(b)}, {world}" for a, b, world in PAIRS]
)
def test_all_orders(folder: Path, first: tuple[str, ...], second: tuple[str, ...], world: str) -> None:
    desks = {"A": Desk(), "B": Desk(WORLDS[world])}
    for number, order in enumerate(orders(len(first), len(second))):
        day = Day(folder / f"{number}.toml", desks, {"A": first, "B": second})
        for who in order:
            day.step(who)
        for who, desk in desks.items():
            if not desk.process.is_alive():
                desks[who] = Desk(desk.conditions)
    for desk in desks.values():
        desk.crash()


@pytest.mark.parametrize("world", WORLDS)
def test_four_at_once_lose_no_save(folder: Path, world: str) -> None:
    """Each adds one to the number in the file, again and again: in the end nothing is missing."""
    file = folder / "a.toml"
    file.write_text(editing.TEXT)
    people = [process(editing.add_up, str(file), 15, WORLDS[world] if number % 2 else ()) for number in range(4)]
    for one in people:
        one.join(60)
        assert one.exitcode == 0
    assert editing.count(tomllib.loads(file.read_text())) == 60
    assert sorted(name for name in os.listdir(folder) if "lock" not in name) == ["a.toml", "a.toml.previous"]


def test_taking_over_is_said_to_both(tmp_path: Path) -> None:
    file = tmp_path / "a.toml"
    file.write_text(editing.TEXT)
    first, second = Desk(), Desk()
    first("begin", str(file)), second("begin", str(file))
    assert first("open") == "ours"
    assert second("open").startswith("held by ")
    assert first("lost") == "nobody"
    assert second("take_over").endswith(f"{first.process.pid}")
    assert second("close") == "closed"  # before the first one looks
    assert first("lost") == str(second.process.pid)
    assert first("close") == "closed"
    assert sorted(os.listdir(tmp_path)) == ["a.toml"]
    for desk in (first, second):
        desk.crash()


def test_unsaved_work_of_one_who_was_killed_is_offered_to_the_next(tmp_path: Path) -> None:
    file = tmp_path / "a.toml"
    file.write_text(editing.TEXT)
    first = Desk()
    first("begin", str(file))
    first("open")
    first("edit", 7)
    assert journal.find(file) is None, "its session goes on"
    first.crash()
    left = journal.find(file)
    assert left is not None and editing.count(left.document) == 7
    assert left.fits(store.stamp(file))
    file.write_text(editing.TEXT + "# another\n")
    assert not left.fits(store.stamp(file))
    journal.drop(file, left)
    assert journal.find(file) is None
