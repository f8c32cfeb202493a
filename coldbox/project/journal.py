"""Unsaved work, kept outside the shared folder until it is saved: in the user's own state folder.

Each session keeps one journal for each file it edits, so two sessions never lose each other's. A journal names the
version of the file that its work began from, and is offered at the next opening when its session has ended.
"""

from __future__ import annotations

import builtins
import os
import time
import tomllib
from collections.abc import Mapping
from contextlib import suppress
from typing import Any

from coldbox.errors import ColdboxError, FileTrouble
from coldbox.project import holder as holders
from coldbox.project import whole
from coldbox.project.holder import Holder
from coldbox.project.matching import same
from coldbox.project.store import LIMIT_BYTES, Stamp, read
from coldbox.record import Record

_HALF_MADE_S = 86400.0
_ENDING = ".toml"
_SUM = b"# coldbox journal, sha256 "


class Journal(Record):
    """Work that a session left unsaved.

    `path` is the file it belongs to, `document` the project as TOML data, `stamp` the version of the file that the work
    began from (None: no file was there), `holder` the session, `when_ns` the time of its last edit, `instead_of` the
    name of the journal whose work it goes on with.
    """

    file: str
    path: str
    document: dict[str, Any]
    stamp: Stamp | None
    holder: Holder
    when_ns: int
    instead_of: str = ""

    def fits(self, now: Stamp | None) -> bool:
        """Whether the file still has the content that the work began from; else people must choose."""
        if now is None or self.stamp is None:
            return now is self.stamp
        return (now.size, now.sha256) == (self.stamp.size, self.stamp.sha256)


def write(
    path: str | os.PathLike[str],
    document: Mapping[str, Any],
    stamp: Stamp | None,
    instead_of: Journal | None = None,
) -> None:
    """Keep unsaved work, whole or not at all.

    path        the file it belongs to
    document    the project as TOML data
    stamp       the version of the file that the work began from; None when there was none
    instead_of  a journal that `find` gave and whose work this session goes on with: it goes when this one is there
    raises      FileTrouble; the journal before it is then still there
    """
    import tomli_w

    ours = holders.me()
    target = _target(path)
    facts: dict[str, Any] = {
        "path": target,
        "holder": dict(ours),
        "instead_of": "" if instead_of is None else os.path.basename(instead_of.file),
        **({} if stamp is None else {"stamp": dict(stamp)}),
        "document": document,
    }
    name = os.path.join(_folder(), f"{_of(target)}-{ours.session()}{_ENDING}")
    try:
        data = tomli_w.dumps(facts).encode("utf-8")
        os.makedirs(_folder(), mode=0o700, exist_ok=True)
        whole.replace(name, _sealed(data), lambda: None, previous=False, mode=0o600)
        whole.flush_folder(_folder())
    except UnicodeEncodeError:
        raise FileTrouble(os.fspath(path), "the text holds half a character, which UTF-8 cannot carry.") from None
    except OSError as error:
        reason = (error.strerror or "it cannot be written").lower()
        raise FileTrouble(name, f"unsaved work cannot be kept there: {reason}.") from None
    if instead_of is not None:
        with suppress(OSError):
            os.unlink(instead_of.file)


def find(path: str | os.PathLike[str]) -> Journal | None:
    """The latest work on a file that a session left unsaved when it ended; None when there is none.

    path    the file
    result  of sessions on hosts that cannot be asked, too; never of a session that is known to go on, and never what
            the file says already. Damaged journals count as none
    """
    found = _left(path)
    if not found:
        return None
    saved = None
    with suppress(ColdboxError, ValueError, RecursionError):
        saved = tomllib.loads(read(path)[0])
    unsaved = []
    for journal in found:
        if saved is None or not same(journal.document, saved):
            unsaved.append(journal)
        elif holders.gone(journal.holder):  # killed between the save and its end
            drop(path, journal)
    return max(unsaved, key=lambda journal: journal.when_ns, default=None)


def drop(path: str | os.PathLike[str], offered: Journal | None = None) -> None:
    """Forget the unsaved work of this session on a file: it is saved, or given up.

    path     the file
    offered  a journal that `find` gave and that is taken over or declined, forgotten too
    """
    name = os.path.join(_folder(), f"{_of(_target(path))}-{holders.me().session()}{_ENDING}")
    for left in (name, *(() if offered is None else (offered.file,))):
        with suppress(OSError):
            os.unlink(left)


def _left(path: str | os.PathLike[str]) -> list[Journal]:
    target, ours = _target(path), holders.me().session()
    try:
        entries = os.listdir(_folder())
    except OSError:
        return []
    _tidy(entries)
    entries = [name for name in entries if name.startswith(_of(target)) and name.endswith(_ENDING)]
    journals = [journal for name in entries if (journal := _read(os.path.join(_folder(), name))) is not None]
    gone_on_with = {journal.instead_of for journal in journals}
    found = []
    for journal in journals:
        if os.path.basename(journal.file) in gone_on_with:  # killed before it was taken away
            with suppress(OSError):
                os.unlink(journal.file)
        elif journal.path == target and journal.holder.session() != ours and holders.gone(journal.holder) is not False:
            found.append(journal)
    return found


def _tidy(entries: list[str]) -> None:
    """Take away what sessions killed in the middle of writing left half made."""
    for entry in entries:
        name = os.path.join(_folder(), entry)
        with suppress(OSError):
            if entry.startswith(".") and os.stat(name).st_mtime < time.time() - _HALF_MADE_S:
                os.unlink(name)


def _read(name: str) -> Journal | None:
    try:
        with builtins.open(name, "rb") as handle:
            when_ns = os.fstat(handle.fileno()).st_mtime_ns
            sealed = handle.read(4 * LIMIT_BYTES)
        _, _, data = sealed.partition(b"\n")
        if _sealed(data) != sealed:
            return None
        facts = tomllib.loads(data.decode("utf-8"))
        holder, document, stamp = holders.told(facts["holder"]), facts["document"], facts.get("stamp")
        if holder is None or not isinstance(document, dict):
            return None
        return Journal(
            file=name,
            path=facts["path"],
            document=document,
            stamp=None if stamp is None else Stamp(**stamp),
            holder=holder,
            when_ns=when_ns,
            instead_of=str(facts.get("instead_of", "")),
        )
    except (OSError, ValueError, KeyError, TypeError, RecursionError):
        return None


def _sealed(data: bytes) -> bytes:
    """With the sum of it in front: half a journal would read as a project with less in it."""
    from hashlib import sha256

    return _SUM + sha256(data).hexdigest().encode() + b"\n" + data


def _target(path: str | os.PathLike[str]) -> str:
    try:
        return whole.behind(os.fspath(path))
    except OSError:  # its folder went away: the work is kept all the same
        return os.path.abspath(path)


def _folder() -> str:
    state = os.environ.get("XDG_STATE_HOME", "")
    if not os.path.isabs(state):  # unset, empty, or relative, which the standard says to ignore
        state = os.path.join(os.path.expanduser("~"), ".local", "state")
    return os.path.join(state, "coldbox", "journal")


def _of(target: str) -> str:
    """What the journals of one file begin with."""
    from hashlib import sha256

    return sha256(os.fsencode(target)).hexdigest()[:20]
