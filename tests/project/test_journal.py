"""Unsaved work: kept whole, outside the shared folder, found by the next session and by nobody too early."""

from __future__ import annotations

import os
import stat
import tomllib
from pathlib import Path
from typing import Any

import pytest
from hypothesis import HealthCheck, given, settings
from test_line_map import documents

from coldbox.errors import FileTrouble
from coldbox.project import holder as holders
from coldbox.project import journal, store
from coldbox.project.matching import same

DOCUMENT = {"format": 1, "box": {"temperature": "-18 °C", "limits": [{"above": "4 °C"}], "powered": True}}


@pytest.fixture(autouse=True)
def own_state(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    monkeypatch.setenv("XDG_STATE_HOME", str(tmp_path / "state"))
    return tmp_path / "state" / "coldbox" / "journal"


def left(monkeypatch: pytest.MonkeyPatch, file: Path, document: dict[str, Any], start: str, **more: Any) -> None:
    """Work left by a session that has ended."""
    ours = holders.me()
    with monkeypatch.context() as other:
        other.setattr(holders, "me", lambda: ours.replace(started=start, token=start))
        journal.write(file, document, store.stamp(file), **more)


def test_work_of_an_ended_session_is_found_until_dropped(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    file = tmp_path / "a.toml"
    file.write_text("format = 1\n")
    left(monkeypatch, file, DOCUMENT, "1")
    found = journal.find(file)
    assert found is not None
    assert found.document == DOCUMENT and found.path == str(file)
    assert found.stamp == store.stamp(file) and found.fits(store.stamp(file))
    assert journal.find(tmp_path / "b.toml") is None
    (tmp_path / "link.toml").symlink_to(file)
    assert journal.find(tmp_path / "link.toml") == found
    journal.drop(file)
    assert journal.find(file) == found, "it is another session's"
    journal.drop(file, found)
    assert journal.find(file) is None


def test_own_work_is_not_offered_to_oneself(tmp_path: Path) -> None:
    journal.write(tmp_path / "a.toml", DOCUMENT, None)
    assert journal.find(tmp_path / "a.toml") is None


def test_the_latest_of_several_is_found(tmp_path: Path, monkeypatch: pytest.MonkeyPatch, own_state: Path) -> None:
    file = tmp_path / "a.toml"
    for number in (1, 2, 3):
        left(monkeypatch, file, {"number": number}, str(number))
    for name in os.listdir(own_state):
        number = tomllib.loads((own_state / name).read_text("utf-8"))["document"]["number"]
        os.utime(own_state / name, ns=(0, 10**18 + (number % 3)))
    found = journal.find(file)
    assert found is not None and found.document == {"number": 2}
    journal.drop(file, found)
    found = journal.find(file)
    assert found is not None and found.document == {"number": 1}, "one does not hide the other for good"


def test_work_that_another_went_on_with_is_not_offered_again(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """Killed after the new journal was written and before the old one was gone."""
    file = tmp_path / "a.toml"
    left(monkeypatch, file, {"number": 1}, "1")
    first = journal.find(file)
    assert first is not None
    with monkeypatch.context() as other:
        other.setattr(os, "unlink", lambda *_: None)
        left(monkeypatch, file, {"number": 2}, "2", instead_of=first)
    os.utime(first.file)
    second = journal.find(file)
    assert second is not None and second.document == {"number": 2}
    left(monkeypatch, file, {"number": 3}, "3", instead_of=second)
    third = journal.find(file)
    assert third is not None and third.document == {"number": 3}
    journal.drop(file, third)
    assert journal.find(file) is None, "no older one comes up again"


def test_what_the_file_says_already_is_not_offered(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch, own_state: Path
) -> None:
    """Killed after the save and before the journal was gone."""
    file = tmp_path / "a.toml"
    left(monkeypatch, file, {"format": 1, "name": "a"}, "1")
    file.write_text('name = "a"  # the same\nformat = 1\n')
    assert journal.find(file) is None
    assert not os.listdir(own_state)


def test_it_fits_only_the_version_it_began_from(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    file = tmp_path / "a.toml"
    left(monkeypatch, file, DOCUMENT, "1")
    new = journal.find(file)
    assert new is not None and new.stamp is None and new.fits(None)
    file.write_text("format = 1\n")
    assert not new.fits(store.stamp(file))
    left(monkeypatch, file, DOCUMENT, "2")
    found = journal.find(file)
    assert found is not None
    os.utime(file, (0, 0))
    assert found.fits(store.stamp(file)), "times say nothing"
    file.write_text("format = 2\n")
    assert not found.fits(store.stamp(file))
    assert not found.fits(None)


def test_only_its_user_may_read_it(tmp_path: Path, own_state: Path) -> None:
    journal.write(tmp_path / "a.toml", DOCUMENT, None)
    (name,) = os.listdir(own_state)
    assert stat.S_IMODE((own_state / name).stat().st_mode) == 0o600
    assert stat.S_IMODE(own_state.stat().st_mode) == 0o700
    assert os.listdir(tmp_path) == ["state"], "nothing beside the project"


def test_a_damaged_journal_is_none(tmp_path: Path, monkeypatch: pytest.MonkeyPatch, own_state: Path) -> None:
    file = tmp_path / "a.toml"
    left(monkeypatch, file, DOCUMENT, "1")
    (name,) = os.listdir(own_state)
    whole = (own_state / name).read_bytes()
    for cut in range(0, len(whole), 7):
        (own_state / name).write_bytes(whole[:cut])
        assert journal.find(file) is None
    (own_state / name).write_bytes(whole.replace(b"-18", b"-19"))
    assert journal.find(file) is None
    (own_state / name).write_bytes(whole)
    assert journal.find(file) is not None


def test_a_journal_that_cannot_be_kept_says_so(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    (tmp_path / "in the way").write_text("")
    monkeypatch.setenv("XDG_STATE_HOME", str(tmp_path / "in the way"))
    with pytest.raises(FileTrouble, match="unsaved work cannot be kept"):
        journal.write(tmp_path / "a.toml", DOCUMENT, None)
    assert journal.find(tmp_path / "a.toml") is None
    journal.drop(tmp_path / "a.toml")


def test_without_a_state_folder_it_is_in_the_home(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv("HOME", str(tmp_path / "home"))
    for useless in ("", "not/absolute"):
        monkeypatch.setenv("XDG_STATE_HOME", useless)
        journal.write(tmp_path / "a.toml", DOCUMENT, None)
    assert len(os.listdir(tmp_path / "home" / ".local" / "state" / "coldbox" / "journal")) == 1


@settings(max_examples=60, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture])
@given(documents)
def test_any_document_comes_back_as_it_was(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch, document: dict[str, Any]
) -> None:
    left(monkeypatch, tmp_path / "a.toml", document, "1")
    found = journal.find(tmp_path / "a.toml")
    assert found is not None and same(found.document, document)
