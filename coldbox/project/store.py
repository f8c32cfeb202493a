"""Project files on disk: read within limits, written whole or not at all.

A server that several people use is the normal place for these files. So a save keeps mode and group, follows a link to
the file behind it, and leaves the version before it beside it as NAME.previous.
"""

from __future__ import annotations

import builtins
import errno
import os
import stat as stat_of
from collections.abc import Callable, Mapping
from typing import TYPE_CHECKING

from coldbox.errors import BadProject, FileTrouble, Problem
from coldbox.project import whole
from coldbox.record import Record

if TYPE_CHECKING:
    from coldbox.project.model import Project

LIMIT_BYTES = 1_000_000  # the largest example is under 10 kB: more is no project file
PREVIOUS = whole.PREVIOUS
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
    """The text of a project file, as `read` gives it."""
    return read(path)[0]


def read(path: str | os.PathLike[str]) -> tuple[str, Stamp]:
    """The text of a project file, and which version it is.

    path    name of the file
    result  its text, a byte-order mark taken off, line ends as they are; the stamp of the very bytes it was read from
    valid   a regular file of at most `LIMIT_BYTES` bytes, in UTF-8; the size is looked at before anything is read
    raises  FileTrouble (absent, a folder, not readable); BadProject (too large, not UTF-8)
    """
    file = os.fspath(path)
    if "\0" in file or not file:
        raise FileTrouble(repr(file), "is no name of a file.")
    try:
        about = os.stat(file)
        if stat_of.S_ISDIR(about.st_mode):
            raise FileTrouble(file, "is a folder. Write the name of a project file in it, such as box.toml.")
        if not stat_of.S_ISREG(about.st_mode):
            raise FileTrouble(file, "is a device or a pipe. Write the name of a project file.")
        if about.st_size > LIMIT_BYTES:
            raise _too_large(file, about.st_size)
        with builtins.open(file, "rb") as handle:
            data = handle.read(LIMIT_BYTES + 1)  # it may have grown since
            about = os.fstat(handle.fileno())
    except FileNotFoundError:
        raise _absent(file) from None
    except OSError as error:
        raise _trouble(file, "read", error) from None
    if len(data) > LIMIT_BYTES:
        raise _too_large(file, len(data))
    try:
        return data.removeprefix(_MARK).decode("utf-8"), _stamp(about, data)
    except UnicodeDecodeError as error:
        line = data.count(b"\n", 0, error.start) + 1
        said = f"Byte 0x{data[error.start]:02x} is not UTF-8 text. Save the file as UTF-8."
        raise BadProject([Problem(said, file=file, line=line)]) from None


def _too_large(file: str, size: int) -> BadProject:
    said = f"The file has {size / 1e6:.1f} MB. A project file has at most {LIMIT_BYTES / 1e6:.0f} MB."
    return BadProject([Problem(said, file=file)])


class Stamp(Record):
    """Which version of a file it was: `sha256` of its bytes decides; the rest tells quickly that nothing moved."""

    mtime_ns: int
    size: int
    inode: int
    sha256: str


class ChangedUnderneath(FileTrouble):
    """The file is not the one that was opened; `found` is what is there now, None when nothing is.

    Whoever asked has three ways on. Mine: `save(path, text, error.found)`, which keeps theirs as NAME.previous. Theirs:
    `read(path)`. Save as: `save(other, text, None)`.
    """

    def __init__(self, file: str, found: Stamp | None, expected: Stamp | None) -> None:
        self.found = found
        if found is None:
            said = "it is no longer there: somebody moved or deleted it. Save it again, or under another name."
        elif expected is None:
            said = "there is already a file of that name. Write another name, or say that yours shall replace it."
        else:
            said = "somebody changed it since you opened it. Keep yours, take theirs, or save under another name."
        super().__init__(file, said)


def stamp(path: str | os.PathLike[str]) -> Stamp | None:
    """Which version of a file is there now; None when there is no such file.

    path    name of the file; behind a link, the file it leads to counts
    raises  FileTrouble (not readable, no regular file)
    """
    file = os.fspath(path)
    try:
        if not stat_of.S_ISREG(os.stat(file).st_mode):  # opening a pipe would wait
            raise FileTrouble(file, "is not a file that can be written.")
        with builtins.open(file, "rb") as handle:
            data = handle.read(LIMIT_BYTES + 1)
            return _stamp(os.fstat(handle.fileno()), data)
    except FileNotFoundError:
        return None
    except OSError as error:
        raise _trouble(file, "read", error) from None


def _stamp(about: os.stat_result, data: bytes) -> Stamp:
    from hashlib import sha256

    return Stamp(mtime_ns=about.st_mtime_ns, size=about.st_size, inode=about.st_ino, sha256=sha256(data).hexdigest())


def _other(now: Stamp | None, known: Stamp | None) -> bool:
    """Whether the content differs. Times alone say nothing: a copy, a touch, another host's clock."""
    if now is None or known is None:
        return now is not known
    return (now.size, now.sha256) != (known.size, known.sha256)


def moved_on(path: str | os.PathLike[str], known: Stamp | None) -> bool:
    """Whether a file is another than the one known: cheap enough to ask every second.

    path    name of the file
    known   its stamp when it was read; None when there was none
    raises  FileTrouble
    """
    try:
        about = os.stat(path)
    except OSError:
        return _other(stamp(path), known)
    if known is not None and (about.st_mtime_ns, about.st_size, about.st_ino) == (
        known.mtime_ns,
        known.size,
        known.inode,
    ):
        return False
    return _other(stamp(path), known)


def save(path: str | os.PathLike[str], text: str, expected: Stamp | None) -> Stamp:
    """Save a project whole or not at all, and never over somebody else's work.

    path      name of the file; behind a link, the file it leads to is written
    text      what it shall hold, written as UTF-8
    expected  the stamp of the version that `text` was made from; None for a file that is not there yet
    result    the stamp of the new version
    raises    ChangedUnderneath when another version is there, unless it is this very text; FileTrouble. The file is
              then as it was, unless the sentence says that it is saved

    What was there stays beside it as NAME.previous. A kill at any moment leaves the old file or the new one.
    """
    file = os.fspath(path)
    data = _encoded(file, text)

    def check() -> None:
        found = stamp(file)
        if _other(found, expected):
            raise ChangedUnderneath(file, found, expected)

    return _write(file, data, check)


def write_text(path: str | os.PathLike[str], text: str) -> None:
    """Write a file whole or not at all, whatever is there.

    path    name of the file; behind a link, the file it leads to is written
    text    what it shall hold, written as UTF-8
    raises  FileTrouble; the file is then as it was, unless the sentence says that it is saved

    The new text is flushed to disk under another name in the same folder, then takes the file's place, with its mode
    and group. What was there stays beside it as NAME.previous. A text that is already there is not written again.
    """
    file = os.fspath(path)
    _write(file, _encoded(file, text), lambda: None)


def _encoded(file: str, text: str) -> bytes:
    try:
        data = text.encode("utf-8")
    except UnicodeEncodeError:
        raise FileTrouble(file, "the text holds half a character, which UTF-8 cannot carry.") from None
    if len(data) > LIMIT_BYTES:
        raise FileTrouble(file, f"the text has {len(data) / 1e6:.1f} MB, more than a project file may have.")
    return data


def _write(file: str, data: bytes, check: Callable[[], None]) -> Stamp:
    try:
        target = whole.behind(file)
        there = _writable(file, target, data)
        about = there or whole.replace(target, data, check)
    except whole.Overtaken:
        raise FileTrouble(file, "others are saving it at this moment. Try again.") from None
    except OSError as error:
        raise _trouble(file, "write", error) from None
    try:
        whole.flush_folder(os.path.dirname(target))
    except OSError as error:
        reason = (error.strerror or "no reason given").lower()
        raise FileTrouble(file, f"is saved, but the disk did not confirm it ({reason}). Save again.") from None
    return _stamp(about, data)


def _writable(shown: str, target: str, data: bytes) -> os.stat_result | None:
    """Refuse what cannot be written; of a file that holds this very text, size, times and inode."""
    try:
        before = os.stat(target)
    except FileNotFoundError:
        return None
    if not stat_of.S_ISREG(before.st_mode):
        raise FileTrouble(shown, "is not a file that can be written.")
    if not os.access(target, os.W_OK):
        raise FileTrouble(shown, "is write-protected.")
    return whole.holds(target, data) if before.st_size == len(data) else None


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
