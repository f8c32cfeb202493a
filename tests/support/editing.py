"""A person at work on a project file, in a process of its own: opens, edits, saves, closes, or is killed.

What it does is acknowledged through a pipe when it is done, so that whoever kills it knows what must not be lost.
"""

from __future__ import annotations

import errno
import multiprocessing
import os
import random
import sys
import time
import tomllib
from collections.abc import Callable, Iterator
from contextlib import contextmanager
from multiprocessing.connection import Connection
from types import ModuleType
from typing import Any

from coldbox.project import holder, journal, lock, store
from coldbox.project.revise import revised

PLACES = multiprocessing.get_context("forkserver")  # a start takes milliseconds: everything is imported once
PLACES.set_forkserver_preload(["editing", "difflib", "hashlib", "pwd", "tomli_w"])

TEXT = """\
format = 1
name = "shed"   # by hand
[box]
notes = "0"     # counts the edits
"""


def count(document: dict[str, Any]) -> int:
    """How many edits a document has seen."""
    return int(document["box"]["notes"])


def with_count(document: dict[str, Any], number: int) -> dict[str, Any]:
    return {**document, "box": {**document["box"], "notes": str(number)}}


class Editor:
    """One session."""

    def __init__(self, path: str) -> None:
        self.path = path
        self.lock: lock.Lock | lock.Held | None = None
        self.text, self.stamp, self.document = "", None, {}

    def open(self) -> str:
        """Who edits, as `take` says it: "ours", "ours after NAME", "held by …", "unlocked"."""
        self.lock = lock.take(self.path)
        self.read()
        if isinstance(self.lock, lock.Held):
            return str(self.lock)
        if not self.lock.held:
            return "unlocked"
        return "ours" if self.lock.before is None else f"ours after {self.lock.before.pid}"

    def read(self) -> str:
        self.text, self.stamp = store.read(self.path)
        self.document = tomllib.loads(self.text)
        return str(count(self.document))

    def edit(self, number: int) -> str:
        """An edit that the journal knows when this returns."""
        after = with_count(self.document, number)
        self.text, self.document = revised(self.text, self.document, after).text, after
        journal.write(self.path, self.document, self.stamp)
        return str(number)

    def save(self, number: int | None = None) -> str:
        if number is not None:
            after = with_count(self.document, number)
            self.text, self.document = revised(self.text, self.document, after).text, after
        try:
            self.stamp = store.save(self.path, self.text, self.stamp)
        except store.ChangedUnderneath:
            return "changed"
        journal.drop(self.path)
        return "saved"

    def lost(self) -> str:
        assert isinstance(self.lock, lock.Lock)
        by = self.lock.lost()
        return "nobody" if by is None else str(by.pid)

    def take_over(self) -> str:
        self.lock = lock.take_over(self.path)
        assert self.lock.held and self.lock.before is not None
        return f"after {self.lock.before.pid}"

    def close(self) -> str:
        if isinstance(self.lock, lock.Lock):
            self.lock.release()
        return "closed"


def serve(pipe: Connection, conditions: tuple[str, ...]) -> None:
    """Do what the pipe says: begin on another file, or a method of `Editor`."""
    for condition in conditions:
        CONDITIONS[condition]()
    editor = Editor("")
    while True:
        try:
            call, *arguments = pipe.recv()
        except EOFError:
            return
        if call == "begin":
            editor = Editor(*arguments)
        pipe.send("begun" if call == "begin" else getattr(editor, call)(*arguments))


def work_on(pipe: Connection, path: str, seed: int) -> None:
    """Edit and save as fast as it goes until killed; each begun and each finished step is told."""
    draw = random.Random(seed)
    editor = Editor(path)
    editor.open()
    left = journal.find(path)
    if left is not None:
        editor.text = revised(editor.text, editor.document, left.document).text
        editor.document = left.document
    number = count(editor.document)
    pipe.send(("found", number))
    if left is not None:
        journal.write(path, editor.document, editor.stamp, left)
    while True:
        number += 1
        pipe.send(("begun", number))
        editor.edit(number)
        pipe.send(("kept", number))
        if draw.random() < 0.4:
            editor.save()
            pipe.send(("saved", number))


def add_up(path: str, times: int, conditions: tuple[str, ...]) -> None:
    """Add one to the number in the file, so many times, as everybody must who is told that it changed meanwhile."""
    for condition in conditions:
        CONDITIONS[condition]()
    editor = Editor(path)
    for turn in range(times):
        while True:
            editor.read()
            mine = {**editor.document, "name": f"{os.getpid()} {turn}"}  # no two write the same text
            editor.text, editor.document = revised(editor.text, editor.document, mine).text, mine
            if editor.save(count(editor.document) + 1) == "saved":
                break


@contextmanager
def _seen_by_new_processes() -> Iterator[None]:
    """Our import path, and no main module: a new process would begin by importing the whole of pytest."""
    main, search = sys.modules["__main__"], os.environ.get("PYTHONPATH")
    sys.modules["__main__"] = ModuleType("__main__")
    os.environ["PYTHONPATH"] = os.pathsep.join(sys.path)
    try:
        yield
    finally:
        sys.modules["__main__"] = main
        os.environ.pop("PYTHONPATH")
        if search is not None:
            os.environ["PYTHONPATH"] = search


def process(target: Callable[..., None], *arguments: Any) -> multiprocessing.process.BaseProcess:
    """A process that does `target`, in our environment."""
    state = os.environ["XDG_STATE_HOME"]  # a test sets it; the server that forks has an older environment
    with _seen_by_new_processes():
        started = PLACES.Process(target=_in_state, args=(state, target, *arguments), daemon=True)
        started.start()
    return started


def _in_state(state: str, target: Callable[..., None], *arguments: Any) -> None:
    os.environ["XDG_STATE_HOME"] = state
    target(*arguments)


class Desk:
    """An `Editor` in a process of its own, called from here; `conditions` make its world worse."""

    def __init__(self, conditions: tuple[str, ...] = ()) -> None:
        self.conditions = conditions
        self.pipe, there = PLACES.Pipe()
        self.process = process(serve, there, conditions)
        there.close()

    def __call__(self, call: str, *arguments: Any) -> str:
        self.pipe.send((call, *arguments))
        return str(self.pipe.recv())

    def crash(self) -> None:
        self.process.kill()
        self.process.join()
        self.pipe.close()


def _other_host() -> None:
    """Another machine, whose clock is an hour ahead, also where it writes the time of a file."""
    mine, now = holder.me, time.time
    holder.me = lambda: mine().replace(host="lighthouse", machine="another", boot="another")
    time.time = lambda: now() + 3600
    replace = os.replace

    def replace_an_hour_ahead(source: str, target: str) -> None:
        replace(source, target)
        if str(target).endswith(".toml"):
            about = os.stat(target)
            os.utime(target, ns=(about.st_atime_ns, about.st_mtime_ns + 3600 * 10**9))

    os.replace = replace_an_hour_ahead  # type: ignore[assignment]


def _no_links() -> None:
    def refused(*_: Any, **__: Any) -> None:
        raise OSError(errno.ENOTSUP, "Operation not supported")

    os.link = refused


def _no_locks() -> None:
    """A folder in which only names that a save uses can be made."""
    make = os.open

    def refused(name: Any, flags: int, *rest: Any, **more: Any) -> int:
        if flags & os.O_CREAT and ".lock" in str(name):
            raise OSError(errno.ENOLCK, "No locks available")
        return make(name, flags, *rest, **more)

    os.open = refused


CONDITIONS = {"other host": _other_host, "no links": _no_links, "no locks": _no_locks}
