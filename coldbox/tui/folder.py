"""The projects of a folder with what they come to: names at once, figures one by one as they are ready."""

from __future__ import annotations

import os
from collections.abc import Iterable
from pathlib import Path
from typing import TYPE_CHECKING

from coldbox.errors import BadProject, ColdboxError
from coldbox.record import Record
from coldbox.tui.aside import Aside

if TYPE_CHECKING:
    from multiprocessing.connection import Connection

    from coldbox.scene.finding import Finding


class Entry(Record):
    """One project of the list. Figures are empty until they are known; `broken` says why there are none."""

    path: Path
    name: str
    capacity: str = ""
    hold: str = ""
    findings: str = ""
    broken: str = ""


class Folder:
    """The projects of a folder, and of `projects` in it. Listing reads no file: hundreds open at once.

    The figures come from a process of their own: a hold time takes longer than a key may wait.
    """

    def __init__(self, folder: Path) -> None:
        found = [*_projects(folder), *_projects(folder / "projects")]
        self.entries = [Entry(path=path, name=path.stem) for path in found]
        self.busy = bool(found)  # whether figures are still to come
        self._aside: Aside | None = None

    def tick(self) -> bool:
        """Takes in the figures that have come; whether there were any. The first call starts the process."""
        if not self.busy:
            return False
        self._aside = self._aside or Aside(work, self.entries)
        news = False
        try:
            while self._aside is not None and self._aside.pipe.poll():
                at, entry = self._aside.pipe.recv()
                if entry is None:
                    self.stop()
                else:
                    self.entries[at] = entry
                news = True
        except (EOFError, OSError):
            self.stop()
        return news

    def stop(self) -> None:
        """No more figures; the process ends."""
        self.busy = False
        if self._aside is not None:
            self._aside.end()
        self._aside = None


def work(pipe: Connection, entries: list[Entry]) -> None:
    """What the process does: first what each project needs, which is quick, then how long each holds."""
    for at, entry in enumerate(entries):
        entries[at] = _computed(entry)
        pipe.send((at, entries[at]))
    for at, entry in enumerate(entries):
        if not entry.broken:
            pipe.send((at, _with_hold(entry)))
    pipe.send((-1, None))


def _projects(folder: Path) -> list[Path]:
    try:
        names = sorted(entry.name for entry in os.scandir(folder) if entry.name.endswith(".toml"))
    except OSError:
        return []
    own = {"pyproject.toml"}
    return [folder / name for name in names if name not in own and not name.startswith(".")]


def _computed(entry: Entry) -> Entry:
    from coldbox.account.load import load
    from coldbox.project import store
    from coldbox.units import show

    try:
        project = store.open(entry.path)
        account = load(project)
    except BadProject as bad:
        return entry.replace(broken=bad.problems[0].text if bad.problems else "cannot be read")
    except ColdboxError as error:
        return entry.replace(broken=str(error).strip().splitlines()[-1].strip())
    return entry.replace(
        capacity=show(float(account.required_capacity_w), "power", project.units, 3), findings=_worst(account.findings)
    )


def _with_hold(entry: Entry) -> Entry:
    from coldbox.account.load import load
    from coldbox.project import store
    from coldbox.spread import hold

    try:
        project = store.open(entry.path)
        kept = hold.run(project, count=0)
        found = (*load(project).findings, *kept.findings)
    except ColdboxError:
        return entry.replace(hold="-")
    return entry.replace(hold=_held(kept.hold_h, kept.horizon_h, bool(kept.limits)), findings=_worst(found))


def _worst(findings: Iterable[Finding]) -> str:
    """How many findings of the worst level, leaving out what is told of every box."""
    found: list[str] = [one.level for one in findings if not one.standing]
    worst = next((level for level in ("danger", "caution", "note") if level in found), "")
    count = found.count(worst)
    return f"{count} {worst}{'s' if count > 1 else ''}" if worst else "none"


def _held(hold_h: float | None, horizon_h: float, limited: bool) -> str:
    if not limited:
        return "no limit"
    return f"> {horizon_h:.0f} h" if hold_h is None else f"{hold_h:.0f} h" if hold_h >= 10.0 else f"{hold_h:.1f} h"
