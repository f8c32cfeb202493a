"""Project files on disk: what is refused, and that a save is whole or nothing."""

from __future__ import annotations

import errno
import os
import stat
from pathlib import Path
from typing import Any

import pytest
from typed import LEAST

from coldbox.errors import BadProject, FileTrouble
from coldbox.project import store


def test_text_comes_as_it_is_without_its_mark(tmp_path: Path) -> None:
    file = tmp_path / "a.toml"
    file.write_bytes(b'\xef\xbb\xbfformat = 1\r\nname = "K\xc3\xbchl"\r\n')
    assert store.read_text(file) == 'format = 1\r\nname = "Kühl"\r\n'


def test_a_missing_file_is_told_with_the_nearest_name(tmp_path: Path) -> None:
    (tmp_path / "quay.toml").write_text("format = 1\n")
    with pytest.raises(FileTrouble) as told:
        store.read_text(tmp_path / "quai.toml")
    assert "quay.toml" in str(told.value)
    with pytest.raises(FileTrouble) as told:
        store.read_text(tmp_path / "quay")
    assert "quay.toml" in told.value.reason
    with pytest.raises(FileTrouble) as told:
        store.read_text(tmp_path / "nowhere" / "quay.toml")
    assert "folder" in told.value.reason


def test_folders_and_devices_are_no_project_files(tmp_path: Path) -> None:
    with pytest.raises(FileTrouble, match="folder"):
        store.read_text(tmp_path)
    with pytest.raises(FileTrouble, match="device"):
        store.read_text("/dev/zero")
    os.mkfifo(tmp_path / "pipe")
    with pytest.raises(FileTrouble, match="pipe"):
        store.read_text(tmp_path / "pipe")
    for name in ("", "a\0b"):
        with pytest.raises(FileTrouble):
            store.read_text(name)
    loop = tmp_path / "loop"
    loop.symlink_to(loop)
    with pytest.raises(FileTrouble, match="link"):
        store.read_text(loop)


def test_a_file_too_large_is_refused_before_it_is_read(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    file = tmp_path / "big.toml"
    with file.open("wb") as handle:
        handle.truncate(5_000_000)
    monkeypatch.setattr("builtins.open", lambda *_: pytest.fail("it was opened"))
    with pytest.raises(BadProject) as told:
        store.read_text(file)
    assert str(told.value) == f"{file}\n    The file has 5.0 MB. A project file has at most 1 MB."


def test_bytes_that_are_no_text_are_told_with_their_line(tmp_path: Path) -> None:
    file = tmp_path / "latin.toml"
    file.write_bytes(b'format = 1\n\nname = "K\xfchl"\n')
    with pytest.raises(BadProject) as told:
        store.read_text(file)
    (problem,) = told.value.problems
    assert problem.line == 3
    assert "0xfc" in problem.text


def test_a_save_replaces_the_file_and_keeps_the_one_before(tmp_path: Path) -> None:
    file = tmp_path / "a.toml"
    store.write_text(file, "one\n")
    assert not (tmp_path / "a.toml.previous").exists()
    store.write_text(file, "two\n")
    store.write_text(file, "three\n")
    store.write_text(file, "three\n")  # the same again is no save: it would lose what was before
    assert file.read_text() == "three\n"
    assert (tmp_path / "a.toml.previous").read_text() == "two\n"
    assert sorted(os.listdir(tmp_path)) == ["a.toml", "a.toml.previous"]


def test_a_save_keeps_mode_and_group(tmp_path: Path) -> None:
    file = tmp_path / "a.toml"
    file.write_text("one\n")
    file.chmod(0o664)
    group = next((one for one in os.getgroups() if one != os.getegid()), 12345 if os.geteuid() == 0 else os.getegid())
    os.chown(file, -1, group)
    store.write_text(file, "two\n")
    about = file.stat()
    assert stat.S_IMODE(about.st_mode) == 0o664
    assert about.st_gid == group


def test_rights_of_a_group_that_cannot_be_kept_are_not_given_to_another(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    file = tmp_path / "a.toml"
    file.write_text("one\n")
    file.chmod(0o664)

    def refused(*_: Any) -> None:
        raise PermissionError(errno.EPERM, "not a member")

    monkeypatch.setattr(os, "fchown", refused)
    store.write_text(file, "two\n")
    assert stat.S_IMODE(file.stat().st_mode) == 0o644


def test_a_new_file_has_the_usual_mode(tmp_path: Path) -> None:
    usual = tmp_path / "usual"
    usual.write_text("")
    store.write_text(tmp_path / "a.toml", "one\n")
    assert (tmp_path / "a.toml").stat().st_mode == usual.stat().st_mode


def test_a_save_goes_through_a_link_to_the_file_behind_it(tmp_path: Path) -> None:
    (tmp_path / "real").mkdir()
    file, link = tmp_path / "real" / "a.toml", tmp_path / "link.toml"
    file.write_text("one\n")
    link.symlink_to(file)
    store.write_text(link, "two\n")
    assert link.is_symlink()
    assert file.read_text() == "two\n"
    assert (tmp_path / "real" / "a.toml.previous").read_text() == "one\n"


@pytest.mark.parametrize("call", ["write", "fsync", "replace", "link", "fchmod"])
def test_what_fails_on_the_way_leaves_the_file_as_it_was(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch, call: str
) -> None:
    file = tmp_path / "a.toml"
    file.write_text("one\n")

    def full(*_: Any, **__: Any) -> None:
        raise OSError(errno.ENOSPC, "No space left on device")

    monkeypatch.setattr(os, call, full)
    if call == "link":  # a file system without links copies instead
        store.write_text(file, "two\n")
        assert (tmp_path / "a.toml.previous").read_text() == "one\n"
        return
    with pytest.raises(FileTrouble, match="disk is full"):
        store.write_text(file, "two\n")
    assert file.read_text() == "one\n"
    assert os.listdir(tmp_path) == ["a.toml"]


def test_an_interrupted_save_leaves_nothing_behind(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    def stopped(*_: Any) -> None:
        raise KeyboardInterrupt

    monkeypatch.setattr(os, "fsync", stopped)
    with pytest.raises(KeyboardInterrupt):
        store.write_text(tmp_path / "a.toml", "one\n")
    assert os.listdir(tmp_path) == []


def test_what_cannot_be_written_is_told(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    with pytest.raises(FileTrouble, match="folder"):
        store.write_text(tmp_path / "nowhere" / "a.toml", "one\n")
    with pytest.raises(FileTrouble, match="half a character"):
        store.write_text(tmp_path / "a.toml", "\ud800")
    with pytest.raises(FileTrouble, match="MB"):
        store.write_text(tmp_path / "a.toml", "x" * 1_000_001)
    with pytest.raises(FileTrouble, match="not a file"):
        store.write_text(tmp_path, "one\n")
    file = tmp_path / "kept.toml"
    file.write_text("one\n")
    monkeypatch.setattr(os, "access", lambda *_: False)
    with pytest.raises(FileTrouble, match="write-protected"):
        store.write_text(file, "two\n")


def test_a_file_opens_as_a_complete_project(tmp_path: Path) -> None:
    file = tmp_path / "least.toml"
    file.write_text(LEAST, encoding="utf-8")
    project = store.open(file, {"box.temperature": "-20 °C"})
    assert project.file == str(file)
    assert project.name == "least"
    assert project.box.temperature == -20
    assert project.origins["box.temperature"].kind == "option"


def test_a_stamp_tells_versions_apart_by_content_and_not_by_time(tmp_path: Path) -> None:
    file = tmp_path / "a.toml"
    assert store.stamp(file) is None
    file.write_text("one\n")
    text, first = store.read(file)
    assert text == "one\n" and store.stamp(file) == first
    assert not store.moved_on(file, first)
    os.utime(file, (0, 0))
    assert not store.moved_on(file, first), "touched only"
    store.save(file, "two\n", first)
    about = file.stat()
    assert store.moved_on(file, first)
    second = store.stamp(file)
    file.write_text("six\n")  # as long, in place, and its time put back
    os.utime(file, ns=(about.st_atime_ns, about.st_mtime_ns))
    with pytest.raises(store.ChangedUnderneath):
        store.save(file, "three\n", second)
    file.unlink()
    assert store.moved_on(file, second)
    assert not store.moved_on(file, None)


def test_a_stamp_is_of_a_file_only(tmp_path: Path) -> None:
    os.mkfifo(tmp_path / "pipe")
    for name in ("pipe", ""):
        with pytest.raises(FileTrouble):
            store.stamp(tmp_path / name)


def test_a_save_over_another_version_is_refused_and_leaves_three_ways_on(tmp_path: Path) -> None:
    file = tmp_path / "a.toml"
    file.write_text("one\n")
    opened = store.stamp(file)
    file.write_text("theirs\n")
    with pytest.raises(store.ChangedUnderneath) as told:
        store.save(file, "mine\n", opened)
    assert "somebody changed it" in str(told.value)
    assert file.read_text() == "theirs\n"
    assert store.save(tmp_path / "b.toml", "mine\n", None) == store.stamp(tmp_path / "b.toml")  # save as
    text, stamp = store.read(file)  # theirs
    assert text == "theirs\n" and stamp == told.value.found
    assert store.save(file, "mine\n", told.value.found) == store.stamp(file)  # mine
    assert file.read_text() == "mine\n"
    assert (tmp_path / "a.toml.previous").read_text() == "theirs\n"


def test_a_file_that_came_or_went_is_a_change(tmp_path: Path) -> None:
    file = tmp_path / "a.toml"
    file.write_text("theirs\n")
    with pytest.raises(store.ChangedUnderneath, match="already a file"):
        store.save(file, "mine\n", None)
    opened = store.stamp(file)
    file.unlink()
    with pytest.raises(store.ChangedUnderneath, match="no longer there") as told:
        store.save(file, "mine\n", opened)
    assert told.value.found is None
    store.save(file, "mine\n", told.value.found)
    assert file.read_text() == "mine\n"


def test_the_same_text_is_no_conflict(tmp_path: Path) -> None:
    """Both did the same: nobody's work is lost."""
    file = tmp_path / "a.toml"
    file.write_text("same\n")
    assert store.save(file, "same\n", None) == store.stamp(file)


def test_a_link_to_a_file_that_is_not_there_yet_is_kept(tmp_path: Path) -> None:
    (tmp_path / "real").mkdir()
    link = tmp_path / "a.toml"
    link.symlink_to("real/b.toml")
    store.save(link, "one\n", None)
    assert link.is_symlink() and (tmp_path / "real" / "b.toml").read_text() == "one\n"


def access_list() -> bytes:
    """As the kernel packs it: owner rw, user 12345 rw, group r, mask rw, others nothing."""
    entries = [(1, 6, 0xFFFFFFFF), (2, 6, 12345), (4, 4, 0xFFFFFFFF), (0x10, 6, 0xFFFFFFFF), (0x20, 0, 0xFFFFFFFF)]
    return (2).to_bytes(4, "little") + b"".join(
        tag.to_bytes(2, "little") + rights.to_bytes(2, "little") + who.to_bytes(4, "little")
        for tag, rights, who in entries
    )


def test_an_access_list_is_kept(tmp_path: Path) -> None:
    file = tmp_path / "a.toml"
    file.write_text("one\n")
    packed = access_list()
    try:
        os.setxattr(file, "system.posix_acl_access", packed)
    except (OSError, AttributeError):
        pytest.skip("no access lists here")
    store.write_text(file, "two\n")
    assert os.getxattr(file, "system.posix_acl_access") == packed
    assert stat.S_IMODE(file.stat().st_mode) == 0o660


def test_a_list_that_the_folder_hands_down_opens_nothing(tmp_path: Path) -> None:
    file = tmp_path / "a.toml"
    file.write_text("one\n")
    file.chmod(0o640)
    packed = access_list()
    try:
        os.setxattr(tmp_path, "system.posix_acl_default", packed)
    except (OSError, AttributeError):
        pytest.skip("no access lists here")
    store.write_text(file, "two\n")
    with pytest.raises(OSError):
        os.getxattr(file, "system.posix_acl_access")
    assert stat.S_IMODE(file.stat().st_mode) == 0o640
