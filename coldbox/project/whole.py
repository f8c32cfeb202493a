"""Files replaced whole or not at all, also when several processes on several hosts replace one at once.

Two savers never overwrite each other unseen, and it takes neither locks nor clocks. Each flushes its new text to disk
as a draft beside the file, renames it to a bid, removes every other bid, looks whether the file is still the expected
one, and renames its bid to the file. Of two that do this at once, the one that removed last either took the other's bid
away, whose rename then fails and who begins again, or came after its rename, and sees it when it looks. What a killed
process left behind goes the same way.
"""

from __future__ import annotations

import builtins
import errno
import os
import stat
import time
from collections.abc import Callable
from contextlib import suppress

PREVIOUS = ".previous"
_DRAFT = ".draft"
_TRIES = 40  # each waits longer than the one before, 5 s in all
_FORGOTTEN_NS = 3600 * 10**9  # a draft that old is nobody's any more, by the clock of the file server
_ACL = "system.posix_acl_access"


class Overtaken(OSError):
    """Others replaced the same file at the same moment, time and again."""


def behind(path: str) -> str:
    """The file that a name means: behind every link, also one that leads to a file that is not there yet.

    path    any name
    result  a name without links
    raises  OSError; `os.path.realpath` would take a link that cannot be read for a file, and a save would replace it
    """
    try:
        return os.path.realpath(path, strict=True)
    except FileNotFoundError:
        folder, name = os.path.split(path)
        try:
            leads = os.readlink(path)
        except FileNotFoundError:
            return os.path.join(os.path.realpath(folder or ".", strict=True), name)
        except OSError as error:
            if error.errno != errno.EINVAL:  # it is no link: it came to be this moment
                raise
            return os.path.realpath(path, strict=True)
        return behind(os.path.join(folder, leads))


def replace(
    target: str, data: bytes, check: Callable[[], None], *, previous: bool = True, mode: int = 0o666
) -> os.stat_result:
    """Put `data` in the place of a file.

    target    the file itself, not a link to it
    data      what it shall hold
    check     called when nobody else can come between any more; what it raises ends the save, the file as it was
    previous  whether what was there stays beside it as NAME.previous
    mode      of a file that is not there yet, less the mask of the process
    result    size, times and inode of the new file
    raises    OSError, and what `check` raises; the file is then as it was. Overtaken after some seconds of others

    The folder is not flushed here: see `flush_folder`.
    """
    for attempt in range(_TRIES):
        try:
            return _attempt(target, data, check, previous, mode)
        except (FileNotFoundError, FileExistsError):
            if not os.path.isdir(os.path.dirname(target) or "."):
                raise
        about = holds(target, data)
        if about is not None:  # it was done: a server's answer may get lost, and its second one says "no such file"
            return about
        time.sleep(0.006 * attempt * os.urandom(1)[0] / 255)
    raise Overtaken(errno.EBUSY, "others are saving it")


def _attempt(target: str, data: bytes, check: Callable[[], None], previous: bool, mode: int) -> os.stat_result:
    before = _present(target)
    folder, name = os.path.split(target)
    ours = _family(name)
    mark = ours + os.urandom(6).hex()
    draft, bid, kept = (os.path.join(folder, mark + ending) for ending in (_DRAFT, ".new", ".old"))
    try:
        about = _write_flushed(draft, data, target, before, mode)
        os.replace(draft, bid)
        _remove_others(folder, ours, mark, about.st_mtime_ns - _FORGOTTEN_NS)
        check()
        if before is None:
            _take_free_place(bid, target)
            return about
        if previous:
            _second_name(target, kept)
            os.replace(kept, target + PREVIOUS)
        if _moved(before, _present(target)):  # an editor, between the check and here
            raise FileExistsError(errno.EEXIST, "changed meanwhile")
        os.replace(bid, target)
        return about
    finally:
        for left in (draft, bid, kept):
            with suppress(OSError):
                os.unlink(left)


def holds(target: str, data: bytes) -> os.stat_result | None:
    """Size, times and inode of a file that holds exactly `data`; None of another, or none.

    target  the file
    data    what it may hold
    raises  OSError
    """
    try:
        with builtins.open(target, "rb") as handle:
            about = os.fstat(handle.fileno())
            return about if about.st_size == len(data) and handle.read(len(data) + 1) == data else None
    except FileNotFoundError:
        return None


def _family(name: str) -> str:
    """What the working names of one file begin with; of one length, however long the name is."""
    from hashlib import sha256

    return f".coldbox-{sha256(os.fsencode(name)).hexdigest()[:12]}-"


def _remove_others(folder: str, ours: str, mark: str, drafts_before_ns: int) -> None:
    for entry in os.listdir(folder or "."):
        if entry.startswith(ours) and not entry.startswith(mark):
            name = os.path.join(folder, entry)
            with suppress(FileNotFoundError, PermissionError):
                if not entry.endswith(_DRAFT) or os.stat(name).st_mtime_ns < drafts_before_ns:
                    os.unlink(name)


def _present(target: str) -> os.stat_result | None:
    try:
        return os.stat(target)
    except FileNotFoundError:
        return None


def _moved(before: os.stat_result, now: os.stat_result | None) -> bool:
    return now is None or (before.st_ino, before.st_size, before.st_mtime_ns) != (
        now.st_ino,
        now.st_size,
        now.st_mtime_ns,
    )


def _take_free_place(bid: str, target: str) -> None:
    """Give a new file its name, unless the name was taken meanwhile."""
    try:
        os.link(bid, target)
    except (FileExistsError, FileNotFoundError):
        raise
    except OSError:  # a file system without hard links
        if os.path.lexists(target):
            raise FileExistsError(errno.EEXIST, "made meanwhile") from None
        os.replace(bid, target)


def _write_flushed(
    name: str, data: bytes, target: str, like: os.stat_result | None, mode: int = 0o600
) -> os.stat_result:
    """A new file with `data`, on disk when this returns; `like`, of `target`, gives mode and group."""
    flags = os.O_WRONLY | os.O_CREAT | os.O_EXCL | getattr(os, "O_NOFOLLOW", 0)
    handle = os.open(name, flags, mode if like is None else 0o600)
    try:
        if like is not None:
            _dress(handle, target, like)
        view = memoryview(data)
        while view:
            view = view[os.write(handle, view) :]
        os.fsync(handle)
        return os.fstat(handle)
    finally:
        os.close(handle)


def _dress(handle: int, target: str, like: os.stat_result) -> None:
    mode = stat.S_IMODE(like.st_mode)
    group_kept = True
    try:
        os.fchown(handle, like.st_uid if os.geteuid() == 0 else -1, like.st_gid)
    except PermissionError:
        # Not a member of that group: its rights must not pass to ours, which then counts as everybody else.
        mode = (mode & ~0o070) | ((mode & 0o007) << 3)
        group_kept = False
    os.fchmod(handle, mode)
    _dress_access_list(handle, target, group_kept)


def _dress_access_list(handle: int, target: str, group_kept: bool) -> None:
    """The access list of the file before, where there are such lists; none, where it had none."""
    if not hasattr(os, "getxattr"):
        return
    try:
        access = os.getxattr(target, _ACL)
    except OSError:
        access = None
    with suppress(OSError):  # a list that cannot be set leaves the mode, which allows no more than the list did
        if access is not None and group_kept:
            os.setxattr(handle, _ACL, access)
        else:
            os.removexattr(handle, _ACL)  # the folder may have handed one down


def _second_name(target: str, kept: str) -> None:
    try:
        os.link(target, kept)
    except FileNotFoundError:
        raise
    except OSError:  # a file system without hard links: a copy
        with builtins.open(target, "rb") as handle:
            data = handle.read()
        _write_flushed(kept, data, target, os.stat(target))


def flush_folder(folder: str) -> None:
    """Bring the names in a folder to disk.

    folder  its name; "" is the one we stand in
    raises  OSError, but not where the file system flushes no folders
    """
    handle = os.open(folder or ".", os.O_RDONLY)
    try:
        os.fsync(handle)
    except OSError as error:
        if error.errno not in {errno.EINVAL, errno.ENOTSUP}:
            raise
    finally:
        os.close(handle)
