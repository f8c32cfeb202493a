"""A word beside a project file that says who is editing it.

It is advice for people, so that the second one opens to read or takes a copy. What guards the work itself is the stamp
that every save compares: a folder where no lock can be had costs nothing but the warning.
"""

from __future__ import annotations

import os
from contextlib import suppress

from coldbox.project import holder as holders
from coldbox.project import whole
from coldbox.project.holder import Holder
from coldbox.record import Record

_OLD_WORDS_S = 7 * 86400.0
_HALF_MADE_S = 60.0


class Held(Record):
    """Somebody else holds the file. `holder` is None when its lock cannot be read.

    `quiet_s` is how long its session has given no sign of life (it does so whenever it asks `Lock.lost`), by the clock
    of the file server alone; a hint, never a proof.
    """

    path: str
    holder: Holder | None
    quiet_s: float

    def __str__(self) -> str:
        who = "somebody whose lock cannot be read" if self.holder is None else str(self.holder)
        quiet = f"; no sign of it for {self.quiet_s / 3600:.0f} h" if self.quiet_s >= 3600 else ""
        return f"held by {who}{quiet}"


class Lock:
    """Our word beside a file.

    `held` is whether it stands there, `why` the reason when not. `before` is a session that ended without taking its
    word away, on whose place ours stands: its unsaved work may be in the journal.
    """

    def __init__(self, path: str, ours: Holder, *, held: bool, why: str = "", before: Holder | None = None) -> None:
        self.path, self.ours, self.held, self.why, self.before = path, ours, held, why, before

    def lost(self) -> Holder | None:
        """Who has taken the file over, None when nobody has. Ask now and then: asking is also our sign of life.

        A word that vanished without anybody having taken over is written again.
        """
        if not self.held:
            return None
        side, word = _side(self.path), _word(self.path, self.ours)
        for _ in range(2):
            there = _read(side)
            if there is not None and there.token == self.ours.token:
                with suppress(OSError):
                    os.utime(side)  # the file server's clock
                return None
            by = _read(word) or there
            if by is not None:
                with suppress(OSError):
                    os.unlink(word)
                self.held = False
                return by
            trouble = _written(side, self.ours)
            if not isinstance(trouble, FileExistsError):
                self.held = trouble is None
                self.why = "" if trouble is None else _reason(trouble)
                return None
        return None

    def release(self) -> None:
        """Take our word away; nothing happens to anybody else's."""
        if self.lost() is None and self.held:
            for name in (_side(self.path), _word(self.path, self.ours)):
                with suppress(OSError):
                    os.unlink(name)
            self.held = False


def take(path: str | os.PathLike[str]) -> Lock | Held:
    """Say that we edit a file, unless somebody else does.

    path    name of the file; behind a link, the file it leads to is meant. It need not be there yet
    result  our lock; or who holds the file. A lock whose session has surely ended is taken over without asking, and
            `before` names it. Where no lock can be written, one that is not `held` and says why
    """
    ours = holders.me()
    try:
        target = whole.behind(os.fspath(path))
    except OSError as error:
        return Lock(os.fspath(path), ours, held=False, why=_reason(error))
    side = _side(target)
    _tidy(target)
    before = None
    for _ in range(3):
        trouble = _written(side, ours)
        if trouble is None:
            return Lock(target, ours, held=True, before=before)
        if not isinstance(trouble, FileExistsError):
            return Lock(target, ours, held=False, why=_reason(trouble))
        there = _read(side)
        if there is None and not os.path.lexists(side):
            continue  # taken away this moment
        if there is None or holders.gone(there) is not True:
            return Held(path=target, holder=there, quiet_s=_quiet(side))
        before = there
        _put_aside(side, there)
    return Held(path=target, holder=_read(side), quiet_s=_quiet(side))


def take_over(path: str | os.PathLike[str]) -> Lock:
    """Put our word in the place of whoever's is there, and leave a word for that session: its next `lost` names us.

    path    name of the file
    result  our lock, `before` the one taken over; not `held` where none can be written
    """
    ours = holders.me()
    try:
        target = whole.behind(os.fspath(path))
    except OSError as error:
        return Lock(os.fspath(path), ours, held=False, why=_reason(error))
    side = _side(target)
    there = _read(side)
    if there is not None and holders.gone(there) is not True:
        _written(_word(target, there), ours)
    working = f"{side}-{ours.token}"
    trouble = _written(working, ours)
    if trouble is None:
        try:
            os.replace(working, side)
        except OSError as error:
            trouble = error
            with suppress(OSError):
                os.unlink(working)
    if trouble is not None:
        return Lock(target, ours, held=False, why=_reason(trouble), before=there)
    return Lock(target, ours, held=True, before=there)


def _side(target: str) -> str:
    folder, name = os.path.split(target)
    return os.path.join(folder, f".{name}.lock")


def _word(target: str, session: Holder) -> str:
    """The name of the word for a session that was taken over."""
    folder, name = os.path.split(target)
    token = "".join(sign for sign in session.token if sign.isalnum())[:32]
    return os.path.join(folder, f".{name}.taken-{token}")


def _read(name: str) -> Holder | None:
    try:
        return holders.read(name)
    except OSError:
        return None


def _written(name: str, ours: Holder) -> OSError | None:
    """Make a file that was not there and names us, with its whole content from the first moment; what stood in the way.

    The link is what is exclusive, on every kind of server. Where there are no links the file is made exclusively, and
    for a moment is empty.
    """
    data = holders.written(ours).encode("utf-8", "replace")
    working = f"{name}-{os.urandom(6).hex()}"
    try:
        _make(working, data)
        try:
            os.link(working, name)
        except FileExistsError:
            raise
        except OSError:
            _make(name, data)
    except OSError as error:
        return error
    finally:
        with suppress(OSError):
            os.unlink(working)
    return None


def _make(name: str, data: bytes) -> None:
    handle = os.open(name, os.O_WRONLY | os.O_CREAT | os.O_EXCL | getattr(os, "O_NOFOLLOW", 0), 0o644)
    try:
        if os.write(handle, data) != len(data):
            raise OSError("the disk is full")
    except OSError:
        os.unlink(name)
        raise
    finally:
        os.close(handle)


def _put_aside(side: str, stale: Holder) -> None:
    """Take away the word of a session that ended. Another taker may have been quicker: its word is put back."""
    aside = f"{side}-{os.urandom(6).hex()}"
    try:
        os.rename(side, aside)
        there = _read(aside)
        if there is not None and there.token != stale.token:
            os.link(aside, side)
    except OSError:
        pass  # gone already, or a third one stands there now
    finally:
        with suppress(OSError):
            os.unlink(aside)


def _quiet(side: str) -> float:
    """How long nobody has touched a lock, s."""
    try:
        return max(0.0, _server_time(side) - os.stat(side).st_mtime)
    except OSError:
        return 0.0


def _server_time(side: str) -> float:
    """The time of a new file, s: one clock, the file server's, judges all hosts, whose own may be hours off."""
    probe = f"{side}-{os.urandom(6).hex()}"
    _make(probe, b"")
    try:
        return os.stat(probe).st_mtime
    finally:
        os.unlink(probe)


def _tidy(target: str) -> None:
    """Take away old words for sessions that never came back, and what killed sessions left half made."""
    side = _side(target)
    folder, lock = os.path.split(side)
    taken = lock.removesuffix(".lock") + ".taken-"
    ages = {f"{lock}-": _HALF_MADE_S, taken: _OLD_WORDS_S}
    try:
        found = [(name, age) for name in os.listdir(folder) for start, age in ages.items() if name.startswith(start)]
        now = _server_time(side) if found else 0.0
        for name, age in found:
            with suppress(OSError):
                if now - os.stat(os.path.join(folder, name)).st_mtime > age:
                    os.unlink(os.path.join(folder, name))
    except OSError:
        return


def _reason(error: OSError) -> str:
    return f"no lock can be written here: {(error.strerror or str(error)).lower()}."
