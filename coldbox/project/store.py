"""Project files on disk: read within limits, written whole or not at all.

A server that several people use is the normal place for these files. So a save keeps mode and group, follows a link to
the file behind it, and leaves the version before it beside it as NAME.previous.
"""

from __future__ import annotations

import builtins
import errno
import os
import stat
from collections.abc import Mapping
from typing import TYPE_CHECKING

from coldbox.errors import BadProject, FileTrouble, Problem

if TYPE_CHECKING:
    from coldbox.project.model import Project

LIMIT_BYTES = 1_000_000  # the largest example is under 10 kB: more is no project file
PREVIOUS = ".previous"
_MARK = b"\xef\xbb\xbf"  # byte-order mark

_REASONS = {
    errno.EACCES: "you may not {do} it.",
    errno.EPERM: "you may not {do} it.",
    errno.EROFS: "it lies on a disk that cannot be written.",
    errno.ENOSPC: "the disk is full; the file is as it was.",
    errno.EDQUOT: "your share of the disk is full; the file is as it was.",
    errno.ENAMETOOLONG: "the name is too long.",
    errno.ELOOP: "it is a link that leads back to itself.",
    errno.ENOTDIR: "a part of that path is a file, not a folder.",
    errno.ENOENT: "there is no such folder.",
}


def _trouble(file: str, do: str, error: OSError) -> FileTrouble:
    said = _REASONS.get(error.errno or 0, (error.strerror or "it cannot be {do}").lower() + ".")
    return FileTrouble(file, said.format(do=do))


def _absent(file: str) -> FileTrouble:
    folder, name = os.path.split(file)
    try:
        there = [entry for entry in os.listdir(folder or ".") if entry.endswith(".toml")]
    except OSError:
        return FileTrouble(file, f'there is no folder "{folder}".')
    from difflib import get_close_matches  # only a name that is not there pays for it

    near = get_close_matches(name, there, n=1, cutoff=0.6) or get_close_matches(name + ".toml", there, n=1, cutoff=0.6)
    hint = f' Nearest: "{os.path.join(folder, near[0])}".' if near else ""
    return FileTrouble(file, f"there is no such file.{hint}")


def read_text(path: str | os.PathLike[str]) -> str:
    """The text of a project file.

    path    name of the file
    result  its text, a byte-order mark taken off, line ends as they are
    valid   a regular file of at most `LIMIT_BYTES` bytes, in UTF-8; the size is looked at before anything is read
    raises  FileTrouble (absent, a folder, not readable); BadProject (too large, not UTF-8)
    """
    file = os.fspath(path)
    if "\0" in file or not file:
        raise FileTrouble(repr(file), "is no name of a file.")
    try:
        about = os.stat(file)
        if stat.S_ISDIR(about.st_mode):
            raise FileTrouble(file, "is a folder. Write the name of a project file in it, such as box.toml.")
        if not stat.S_ISREG(about.st_mode):
            raise FileTrouble(file, "is a device or a pipe. Write the name of a project file.")
        if about.st_size > LIMIT_BYTES:
            raise _too_large(file, about.st_size)
        with builtins.open(file, "rb") as handle:
            data = handle.read(LIMIT_BYTES + 1)  # it may have grown since
    except FileNotFoundError:
        raise _absent(file) from None
    except OSError as error:
        raise _trouble(file, "read", error) from None
    if len(data) > LIMIT_BYTES:
        raise _too_large(file, len(data))
    try:
        return data.removeprefix(_MARK).decode("utf-8")
    except UnicodeDecodeError as error:
        line = data.count(b"\n", 0, error.start) + 1
        said = f"Byte 0x{data[error.start]:02x} is not UTF-8 text. Save the file as UTF-8."
        raise BadProject([Problem(said, file=file, line=line)]) from None


def _too_large(file: str, size: int) -> BadProject:
    said = f"The file has {size / 1e6:.1f} MB. A project file has at most {LIMIT_BYTES / 1e6:.0f} MB."
    return BadProject([Problem(said, file=file)])


def write_text(path: str | os.PathLike[str], text: str) -> None:
    """Write a project file whole or not at all.

    path    name of the file; behind a link, the file it leads to is written
    text    what it shall hold, written as UTF-8
    raises  FileTrouble; the file is then as it was

    The new text is flushed to disk under another name in the same folder, then takes the file's place, with its mode
    and group. What was there stays beside it as NAME.previous. A text that is already there is not written again.
    """
    file = os.fspath(path)
    try:
        data = text.encode("utf-8")
    except UnicodeEncodeError:
        raise FileTrouble(file, "the text holds half a character, which UTF-8 cannot carry.") from None
    if len(data) > LIMIT_BYTES:
        raise FileTrouble(file, f"the text has {len(data) / 1e6:.1f} MB, more than a project file may have.")
    try:
        _replace(os.path.realpath(file, strict=False), file, data)
    except OSError as error:
        raise _trouble(file, "write", error) from None


def _replace(target: str, shown: str, data: bytes) -> None:
    try:
        before = os.stat(target)
    except FileNotFoundError:
        before = None
    if before is not None:
        if not stat.S_ISREG(before.st_mode):
            raise FileTrouble(shown, "is not a file that can be written.")
        if not os.access(target, os.W_OK):
            raise FileTrouble(shown, "is write-protected.")
        if before.st_size == len(data) and _same(target, data):
            return
    folder, name = os.path.split(target)
    mark = os.urandom(6).hex()
    fresh, kept = os.path.join(folder, f".coldbox-{mark}.new"), os.path.join(folder, f".coldbox-{mark}.old")
    try:
        _write_flushed(fresh, data, before)
        if before is not None:
            _second_name(target, kept)
            os.replace(kept, os.path.join(folder, name + PREVIOUS))
        os.replace(fresh, target)
    finally:
        for left in (fresh, kept):
            if os.path.lexists(left):
                os.unlink(left)
    _flush_folder(folder)


def _same(target: str, data: bytes) -> bool:
    with builtins.open(target, "rb") as handle:
        return handle.read() == data


def _write_flushed(name: str, data: bytes, like: os.stat_result | None) -> None:
    """A new file with `data`, on disk when this returns; `like` gives mode and group, else the usual ones."""
    mode = 0o666 if like is None else 0o600
    handle = os.open(name, os.O_WRONLY | os.O_CREAT | os.O_EXCL | getattr(os, "O_NOFOLLOW", 0), mode)
    try:
        if like is not None:
            _dress(handle, like)
        view = memoryview(data)
        while view:
            view = view[os.write(handle, view) :]
        os.fsync(handle)
    finally:
        os.close(handle)


def _dress(handle: int, like: os.stat_result) -> None:
    mode = stat.S_IMODE(like.st_mode)
    try:
        os.fchown(handle, like.st_uid if os.geteuid() == 0 else -1, like.st_gid)
    except PermissionError:
        # Not a member of that group: its rights must not pass to ours, which then counts as everybody else.
        mode = (mode & ~0o070) | ((mode & 0o007) << 3)
    os.fchmod(handle, mode)


def _second_name(target: str, kept: str) -> None:
    try:
        os.link(target, kept)
    except OSError:  # a file system without hard links: a copy
        with builtins.open(target, "rb") as handle:
            data = handle.read()
        _write_flushed(kept, data, os.stat(target))


def _flush_folder(folder: str) -> None:
    handle = os.open(folder or ".", os.O_RDONLY)
    try:
        os.fsync(handle)
    except OSError as error:
        if error.errno not in {errno.EINVAL, errno.ENOTSUP}:  # some file systems flush no folders
            raise
    finally:
        os.close(handle)


def open(path: str | os.PathLike[str], options: Mapping[str, str] = {}) -> Project:  # noqa: A001, B006  never written to
    """A project file, read, checked and complete.

    path     name of the file
    options  values for this run, by key path, as one would type them: {"box.temperature": "-20 °C"}
    result   the project, every name looked up and every default filled in
    raises   FileTrouble; BadProject with every problem found
    example  open("projects/quay.toml", {"doors.main.passages": "30/h"})
    """
    from coldbox.project import codec, shop
    from coldbox.project.resolve import resolve

    text = read_text(path)
    raw, problems = codec.read(text, os.fspath(path), options)
    return resolve(raw, problems, shop.library(path))
