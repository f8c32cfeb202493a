"""The projects of a folder with what they come to: names at once, figures one by one as somebody asks."""

from __future__ import annotations

import os
from pathlib import Path

from coldbox.errors import BadProject, ColdboxError
from coldbox.record import Record


class Entry(Record):
    """One project of the list. Figures are empty until they are known; `broken` says why there are none."""

    path: Path
    name: str
    capacity: str = ""
    hold: str = ""
    findings: str = ""
    broken: str = ""


class Folder:
    """The projects of a folder, and of `projects` in it. Listing reads no file: hundreds open at once."""

    def __init__(self, folder: Path) -> None:
        found = [*_projects(folder), *_projects(folder / "projects")]
        self.entries = [Entry(path=path, name=path.stem) for path in found]
        self._next = 0

    @property
    def busy(self) -> bool:
        """Whether figures are still to come."""
        return self._next < len(self.entries)

    def tick(self) -> bool:
        """Computes the next project; whether there was one. First all capacities, cheap, are told, then it is done."""
        if not self.busy:
            return False
        self.entries[self._next] = _computed(self.entries[self._next])
        self._next += 1
        return True

    def stop(self) -> None:
        """No more figures."""
        self._next = len(self.entries)


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
    from coldbox.spread import hold
    from coldbox.units import show

    try:
        project = store.open(entry.path)
        account = load(project)
    except BadProject as bad:
        return entry.replace(broken=bad.problems[0].text if bad.problems else "cannot be read")
    except ColdboxError as error:
        return entry.replace(broken=str(error).strip().splitlines()[-1].strip())
    found = [one for one in account.findings if not one.standing]
    try:
        kept = hold.run(project, count=0)
        found += [one for one in kept.findings if not one.standing]
        held = _held(kept.hold_h, kept.horizon_h, bool(kept.limits))
    except ColdboxError:
        held = "-"
    worst = next((level for level in ("danger", "caution", "note") if any(one.level == level for one in found)), "")
    count = sum(one.level == worst for one in found)
    return entry.replace(
        capacity=show(float(account.required_capacity_w), "power", project.units, 3),
        hold=held,
        findings=f"{count} {worst}" if worst else "none",
    )


def _held(hold_h: float | None, horizon_h: float, limited: bool) -> str:
    if not limited:
        return "no limit"
    return f"> {horizon_h:.0f} h" if hold_h is None else f"{hold_h:.0f} h" if hold_h >= 10.0 else f"{hold_h:.1f} h"
