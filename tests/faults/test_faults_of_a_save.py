"""A fault at every system call of a save: the file is always the old one or the new one, whole."""

from __future__ import annotations

import errno
import os
import resource
import signal
from collections.abc import Callable, Iterator
from contextlib import contextmanager, suppress
from pathlib import Path
from typing import Any

import pytest

from coldbox.errors import FileTrouble
from coldbox.project import store

OLD = "format = 1\n" + "# old\n" * 800
NEW = "format = 1\n" + "# new\n" * 900
CALLS = [
    "open", "write", "fsync", "fstat", "close", "stat", "access", "link", "replace", "unlink", "listdir", "fchown",
    "fchmod", "getxattr", "setxattr", "removexattr", "lstat", "readlink",
]  # fmt: skip
SHORT, KILL = "short", "kill"
# `after`: the call has done its work, and fails or is the last one all the same, as on a network.
FAULTS = [
    (errno.EIO, False), (errno.EIO, True), (errno.ENOSPC, False), (errno.ENOENT, False), (errno.ENOENT, True),
    (SHORT, False), (KILL, False), (KILL, True),
]  # fmt: skip


class Calls:
    """Counts the system calls made through `os`, and spoils one of them."""

    def __init__(self, spoilt: int, fault: int | str, after: bool) -> None:
        self.spoilt, self.fault, self.after = spoilt, fault, after
        self.made: list[str] = []

    def wrapped(self, name: str, real: Callable[..., Any]) -> Callable[..., Any]:
        def call(*arguments: Any, **more: Any) -> Any:
            self.made.append(name)
            if len(self.made) != self.spoilt:
                return real(*arguments, **more)
            if self.fault == KILL:
                if self.after:
                    real(*arguments, **more)
                os.kill(os.getpid(), signal.SIGKILL)
            if self.fault == SHORT:
                return real(arguments[0], arguments[1][:7]) if name == "write" else real(*arguments, **more)
            if name == "close" or self.after:  # a failed close closes all the same; other calls may fail when done
                real(*arguments, **more)
            raise OSError(self.fault, os.strerror(int(self.fault)))

        return call


@contextmanager
def spoiling(spoilt: int, fault: int | str, after: bool = False) -> Iterator[Calls]:
    calls = Calls(spoilt, fault, after)
    real = {name: getattr(os, name) for name in CALLS}
    for name, function in real.items():
        setattr(os, name, calls.wrapped(name, function))
    try:
        yield calls
    finally:
        for name, function in real.items():
            setattr(os, name, function)


def save(file: Path, expected: store.Stamp | None) -> str:
    try:
        store.save(file, NEW, expected)
    except store.ChangedUnderneath:
        return "changed"
    except FileTrouble as trouble:
        return "saved" if trouble.reason.startswith("is saved") else "refused"
    return "saved"


def in_a_child(work: Callable[[], str]) -> str | None:
    """What the work says; None when it was killed."""
    inward, outward = os.pipe()
    child = os.fork()
    if child == 0:
        with suppress(BaseException):
            os.write(outward, work().encode())
        os._exit(0)
    os.close(outward)
    said = os.read(inward, 100).decode()
    os.close(inward)
    status = os.waitpid(child, 0)[1]
    assert os.WIFSIGNALED(status) or said, "the work broke with something else than FileTrouble"
    return None if os.WIFSIGNALED(status) else said


def number_of_calls(file: Path, expected: store.Stamp | None) -> list[str]:
    with spoiling(0, 0) as calls:
        assert save(file, expected) == "saved"
    return calls.made


@pytest.mark.parametrize(("fault", "after"), FAULTS, ids=str)
@pytest.mark.parametrize("there", [True, False], ids=["replaced", "new"])
def test_a_fault_at_every_call(folder: Path, there: bool, fault: int | str, after: bool) -> None:
    file = folder / "real" / "a.toml"
    file.parent.mkdir()
    link = folder / "a.toml"
    link.symlink_to(file)

    def fresh() -> store.Stamp | None:
        for name in os.listdir(file.parent):
            os.unlink(file.parent / name)
        if there:
            file.write_text(OLD)
        return store.stamp(link)

    made = number_of_calls(link, fresh())
    assert {"open", "write", "fsync", "unlink", "listdir", "replace" if there else "link"} <= set(made)
    for spoilt in range(1, len(made) + 1):
        expected = fresh()

        def work(spoilt: int = spoilt, expected: store.Stamp | None = expected) -> str:
            with spoiling(spoilt, fault, after):
                return save(link, expected)

        said = in_a_child(work)
        where = f"{fault} at call {spoilt}, {made[spoilt - 1]}"
        text = file.read_text() if file.exists() else None
        assert text in ((OLD if there else None), NEW), where
        if said == "saved":
            assert text == NEW, where
        if said == "refused" and not after:
            assert text == (OLD if there else None), where
        assert said != "changed" or text == OLD or not there, f"{where}: took its own text for somebody else's"
        previous = file.parent / "a.toml.previous"
        assert not previous.exists() or previous.read_text() == OLD, where
        if said is not None and made[spoilt - 1] != "unlink":
            assert not [name for name in os.listdir(file.parent) if name.startswith(".")], f"{where}: left-overs"
        assert link.is_symlink()
        assert save(link, store.stamp(link)) == "saved", f"{where}: the next save does not go through"
        assert file.read_text() == NEW
    for name in os.listdir(file.parent):
        if name.endswith(".draft"):  # somebody may be at work on it, for an hour
            os.utime(file.parent / name, (0, 0))
    store.save(link, NEW + "# more\n", store.stamp(link))
    assert sorted(os.listdir(file.parent)) == ["a.toml", "a.toml.previous"], "a killed save left something for good"


@pytest.mark.parametrize("room", [0, 1, 1000, len(NEW) - 1])
def test_a_disk_that_fills_in_the_middle(tmp_path: Path, room: int) -> None:
    """A real one: the kernel takes `room` bytes and no more."""
    file = tmp_path / "a.toml"
    file.write_text(OLD)
    expected = store.stamp(file)

    def work() -> str:
        resource.setrlimit(resource.RLIMIT_FSIZE, (room, resource.RLIM_INFINITY))
        return save(file, expected)

    assert in_a_child(work) == "refused"
    assert file.read_text() == OLD
    assert os.listdir(tmp_path) == ["a.toml"]


def test_the_power_may_go_between_any_two_writes(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """Text is on disk before it gets the file's name, and the name before the save is said to be done."""
    file = tmp_path / "a.toml"
    file.write_text(OLD)
    expected = store.stamp(file)
    course: list[str] = []
    names: dict[int, str] = {}
    real_open, real_fsync, real_replace, real_write = os.open, os.fsync, os.replace, os.write

    def opened(name: Any, *rest: Any) -> int:
        handle = real_open(name, *rest)
        names[handle] = os.fspath(name)
        return handle

    def written(handle: int, data: Any) -> int:
        course.append(f"write {names[handle]}")
        return real_write(handle, data)

    def flushed(handle: int) -> None:
        course.append(f"flush {names[handle]}")
        real_fsync(handle)

    def replaced(source: str, target: str) -> None:
        course.append(f"name {source} {target}")
        real_replace(source, target)

    monkeypatch.setattr(os, "open", opened)
    monkeypatch.setattr(os, "write", written)
    monkeypatch.setattr(os, "fsync", flushed)
    monkeypatch.setattr(os, "replace", replaced)
    store.save(file, NEW, expected)
    named = next(step for step in course if step.endswith(f" {file}"))
    fresh = next(step.split()[1] for step in course if step.startswith("write"))
    assert course.index(f"flush {fresh}") < course.index(named)
    assert course[-1] == f"flush {tmp_path}"
    assert max(index for index, step in enumerate(course) if step.startswith("write")) < course.index(f"flush {fresh}")


def test_an_editor_that_writes_between_look_and_rename_is_seen(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    file = tmp_path / "a.toml"
    file.write_text(OLD)
    expected = store.stamp(file)
    real = os.link

    def slow(*names: Any) -> None:
        if file.read_text() == OLD:
            file.write_text("by the editor\n")
        real(*names)

    monkeypatch.setattr(os, "link", slow)
    with pytest.raises(store.ChangedUnderneath):
        store.save(file, NEW, expected)
    assert file.read_text() == "by the editor\n"
