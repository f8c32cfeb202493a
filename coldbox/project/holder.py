"""Which session holds something: written down by one process, judged by another, perhaps on another host."""

from __future__ import annotations

import builtins
import os
import time
import tomllib

from coldbox.project.words import clean
from coldbox.record import Record

_LONGEST = 4096  # bytes of a holder's file that are read; ours have 400
_BOOT = "/proc/sys/kernel/random/boot_id"
_MACHINE = "/etc/machine-id"
_SPACE = "/proc/self/ns/pid"


class Holder(Record):
    """One process. Empty text stands for what its system does not tell.

    `started` is the process's start as its kernel counts it, so that a number used again is not taken for it.
    `machine`, `boot` and `space` tell whether a process number means the same process to us as to it.
    """

    host: str
    user: str
    pid: int
    started: str
    machine: str = ""
    boot: str = ""
    space: str = ""
    since: str = ""
    token: str = ""

    def __str__(self) -> str:
        return f"{clean(self.user, 40)} on {clean(self.host, 60)} (process {self.pid}, since {clean(self.since, 40)})"

    def session(self) -> str:
        """The same for one process always, another for every other; letters that a file name may hold."""
        from hashlib import sha256

        facts = "\n".join((self.host, self.machine, self.boot, self.space, str(self.pid), self.started))
        return sha256(facts.encode("utf-8", "replace")).hexdigest()[:12]


def me() -> Holder:
    """This process, now, with a token that no other holder has."""
    return Holder(
        host=os.uname().nodename,
        user=_user(),
        pid=os.getpid(),
        started=_start(os.getpid()) or "",
        machine=_line(_MACHINE),
        boot=_line(_BOOT),
        space=_space(),
        since=time.strftime("%Y-%m-%d %H:%M UTC", time.gmtime()),
        token=os.urandom(8).hex(),
    )


def gone(holder: Holder) -> bool | None:
    """Whether a process has ended: True and False are sure; None cannot be told from here.

    holder  as it wrote itself down

    A process is looked for by its number and its start, where both mean the same to us as to it: on the same host, not
    restarted since, not in another container. Of other hosts nothing is sure.
    """
    here = me()
    if not holder.host or (holder.host, holder.machine) != (here.host, here.machine):
        return None
    if holder.boot != here.boot:
        return True if holder.machine and holder.boot and here.boot else None
    if holder.space != here.space:
        return None
    try:
        os.kill(holder.pid, 0)
    except PermissionError:
        pass  # it is there, and somebody else's
    except (OSError, OverflowError):
        return True
    start = _start(holder.pid)
    if start is None or not holder.started:
        return False  # there is one of that number, and no more can be seen
    return start != holder.started


def written(holder: Holder) -> str:
    """A holder as text that `told` reads back."""
    import tomli_w  # only who takes a lock or writes a journal pays for it

    return tomli_w.dumps(dict(holder))


def told(facts: object) -> Holder | None:
    """A holder from what TOML made of its text; None when it is none."""
    if not isinstance(facts, dict) or type(facts.get("pid")) is not int or facts["pid"] <= 0:
        return None
    words = {name: facts.get(name, "") for name in Holder.names() if name != "pid"}
    if not all(isinstance(word, str) for word in words.values()):
        return None
    return Holder(pid=facts["pid"], **words)


def read(name: str) -> Holder | None:
    """The holder that a small file names; None when it names none.

    name    of the file
    raises  OSError
    """
    with builtins.open(name, "rb") as handle:
        data = handle.read(_LONGEST)
    try:
        return told(tomllib.loads(data.decode("utf-8")))
    except (ValueError, RecursionError):
        return None


def _user() -> str:
    import pwd

    try:
        return pwd.getpwuid(os.getuid()).pw_name
    except KeyError:
        return f"user {os.getuid()}"


def _start(pid: int) -> str | None:
    """When a process started, in ticks since the boot; "ended" for one that only waits to be buried; None unseen."""
    try:
        with builtins.open(f"/proc/{pid}/stat", encoding="ascii", errors="replace") as handle:
            fields = handle.read().rpartition(")")[2].split()
        return "ended" if fields[0] in "ZX" else fields[19]
    except (OSError, IndexError):
        return None


def _line(name: str) -> str:
    try:
        with builtins.open(name, encoding="ascii", errors="replace") as handle:
            return handle.readline(200).strip()
    except OSError:
        return ""


def _space() -> str:
    try:
        return os.readlink(_SPACE)
    except OSError:
        return ""
