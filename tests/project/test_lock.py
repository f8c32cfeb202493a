"""Who holds a file: told apart by process, start and host, never by a clock of theirs."""

from __future__ import annotations

import errno
import os
import subprocess
import sys
from pathlib import Path
from typing import Any

import pytest

from coldbox.project import holder as holders
from coldbox.project import lock
from coldbox.project.holder import Holder
from coldbox.project.lock import Held, Lock


def left_by(file: Path, **facts: Any) -> Holder:
    """A lock beside the file as another session would have left it."""
    other = holders.me().replace(**facts)
    (file.parent / f".{file.name}.lock").write_text(holders.written(other))
    return other


def ended_process() -> tuple[int, str]:
    """Number and start of a process that is no more."""
    done = subprocess.Popen([sys.executable, "-c", "input()"], stdin=subprocess.PIPE)
    start = holders._start(done.pid)
    done.communicate()
    assert start is not None
    return done.pid, start


def taken(file: Path) -> Lock:
    ours = lock.take(file)
    assert isinstance(ours, Lock) and ours.held
    return ours


def test_taken_held_and_released(tmp_path: Path) -> None:
    file = tmp_path / "a.toml"
    ours = taken(file)
    assert ours.before is None
    again = lock.take(file)
    assert isinstance(again, Held) and again.holder == ours.ours
    assert str(os.getpid()) in str(again) and ours.ours.user in str(again) and os.uname().nodename in str(again)
    assert ours.lost() is None
    ours.release()
    assert not os.listdir(tmp_path)
    taken(file)


def test_a_link_and_its_file_have_one_lock(tmp_path: Path) -> None:
    (tmp_path / "b.toml").symlink_to(tmp_path / "a.toml")
    taken(tmp_path / "a.toml")
    assert isinstance(lock.take(tmp_path / "b.toml"), Held)


def test_a_session_that_ended_is_recognised(tmp_path: Path) -> None:
    file = tmp_path / "a.toml"
    pid, start = ended_process()
    left_by(file, pid=pid, started=start, token="gone")
    ours = taken(file)
    assert ours.before is not None and ours.before.pid == pid
    assert os.listdir(tmp_path) == [".a.toml.lock"]


def test_of_two_who_clear_away_the_same_lock_the_quicker_one_keeps_its_own(tmp_path: Path) -> None:
    """The slower one has looked at the lock of the ended session, and comes when the quicker one's stands there."""
    file = tmp_path / "a.toml"
    ended = left_by(file, started="1", token="before")
    quicker = taken(file)
    lock._put_aside(str(tmp_path / ".a.toml.lock"), ended)
    assert holders.read(str(tmp_path / ".a.toml.lock")) == quicker.ours
    assert os.listdir(tmp_path) == [".a.toml.lock"]


def test_a_number_used_again_is_another_process(tmp_path: Path) -> None:
    left_by(tmp_path / "a.toml", started="1", token="before")
    assert taken(tmp_path / "a.toml").before is not None


@pytest.mark.parametrize(
    ("facts", "sure"),
    [
        ({}, False),
        ({"started": "1"}, True),
        ({"boot": "an earlier one"}, True),
        ({"boot": "an earlier one", "machine": ""}, None),
        ({"host": "lighthouse"}, None),
        ({"machine": "another", "started": "1"}, None),
        ({"space": "a container's", "started": "1"}, None),
        ({"started": ""}, False),
        ({"pid": 2**40}, True),
        ({"host": ""}, None),
    ],
)
def test_what_is_sure_about_a_holder(facts: dict[str, Any], sure: bool | None) -> None:
    assert holders.gone(holders.me().replace(**facts)) is sure


def test_one_that_waits_to_be_buried_has_ended() -> None:
    child = os.fork()
    if child == 0:
        os._exit(0)
    os.waitid(os.P_PID, child, os.WEXITED | os.WNOWAIT)
    assert holders.gone(holders.me().replace(pid=child, started="5")) is True
    os.waitpid(child, 0)


def test_another_host_is_only_hinted_at_by_the_clock_of_the_server(tmp_path: Path) -> None:
    file = tmp_path / "a.toml"
    left_by(file, host="lighthouse", machine="another", since="2199-01-01 00:00 UTC")
    side = tmp_path / ".a.toml.lock"
    os.utime(side, (0, os.stat(side).st_mtime - 7300))
    held = lock.take(file)
    assert isinstance(held, Held)
    assert held.quiet_s == pytest.approx(7300, abs=60)
    assert "lighthouse" in str(held) and "no sign of it for 2 h" in str(held)


def test_asking_is_a_sign_of_life(tmp_path: Path) -> None:
    ours = taken(tmp_path / "a.toml")
    os.utime(tmp_path / ".a.toml.lock", (0, 0))
    assert ours.lost() is None
    held = lock.take(tmp_path / "a.toml")
    assert isinstance(held, Held) and held.quiet_s < 60


def test_take_over_leaves_a_word_even_when_the_taker_is_gone(tmp_path: Path) -> None:
    first = taken(tmp_path / "a.toml")
    second = lock.take_over(tmp_path / "a.toml")
    assert second.held and second.before == first.ours
    second.release()
    third = taken(tmp_path / "a.toml")
    assert first.lost() == second.ours
    assert first.lost() is None and not first.held
    first.release()
    assert third.lost() is None
    third.release()
    assert not os.listdir(tmp_path)


def test_release_leaves_the_lock_of_another_alone(tmp_path: Path) -> None:
    first = taken(tmp_path / "a.toml")
    second = lock.take_over(tmp_path / "a.toml")
    first.release()
    assert second.lost() is None and second.held


def test_a_lock_that_somebody_deleted_comes_back(tmp_path: Path) -> None:
    ours = taken(tmp_path / "a.toml")
    os.unlink(tmp_path / ".a.toml.lock")
    assert ours.lost() is None
    assert os.listdir(tmp_path) == [".a.toml.lock"]


@pytest.mark.parametrize(
    "text",
    ["", "pid = 0", "pid = true", "pid = 3\nhost = 4", "\xff", "[[[[", "x = " + "[" * 3000, "pid = -1", "a" * 9000],
)
def test_a_lock_that_cannot_be_read_is_somebodys(tmp_path: Path, text: str) -> None:
    (tmp_path / ".a.toml.lock").write_bytes(text.encode("latin-1"))
    held = lock.take(tmp_path / "a.toml")
    assert isinstance(held, Held) and held.holder is None
    assert "cannot be read" in str(held)
    assert lock.take_over(tmp_path / "a.toml").held


def test_a_holder_prints_as_one_harmless_line() -> None:
    shown = str(holders.me().replace(host="a\x1b[2J\n" * 30, user="b\u202e"))
    assert shown.isprintable() and len(shown) < 250


@pytest.mark.parametrize("reason", [errno.EROFS, errno.EACCES, errno.ENOLCK, errno.ENOSPC])
def test_a_folder_without_locks_says_unlocked(tmp_path: Path, monkeypatch: pytest.MonkeyPatch, reason: int) -> None:
    def refused(*_: Any) -> int:
        raise OSError(reason, os.strerror(reason))

    monkeypatch.setattr(os, "open", refused)
    for ours in (lock.take(tmp_path / "a.toml"), lock.take_over(tmp_path / "a.toml")):
        assert isinstance(ours, Lock) and not ours.held
        assert os.strerror(reason).lower() in ours.why
        assert ours.lost() is None
        ours.release()
    assert not os.listdir(tmp_path)


def test_a_folder_that_is_not_there_says_unlocked(tmp_path: Path) -> None:
    ours = lock.take(tmp_path / "nowhere" / "a.toml")
    assert isinstance(ours, Lock) and not ours.held


def test_without_hard_links_a_lock_is_made_exclusively(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    def refused(*_: Any) -> None:
        raise OSError(errno.EPERM, "Operation not permitted")

    monkeypatch.setattr(os, "link", refused)
    taken(tmp_path / "a.toml")
    assert isinstance(lock.take(tmp_path / "a.toml"), Held)


def test_left_overs_go_after_their_time(tmp_path: Path) -> None:
    names = {".a.toml.lock-0123": 3600, ".a.toml.lock-4567": 1, ".a.toml.taken-01": 9 * 86400, ".a.toml.taken-02": 3600}
    for name, age in names.items():
        (tmp_path / name).write_text("")
        os.utime(tmp_path / name, (0, os.stat(tmp_path / name).st_mtime - age))
    taken(tmp_path / "a.toml").release()
    assert sorted(os.listdir(tmp_path)) == [".a.toml.lock-4567", ".a.toml.taken-02"]
