"""What a careful colleague would say about this box before anything is bought or loaded. Advice, never approval."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from coldbox.account import cautions, envelope_findings, goods_findings
from coldbox.account.capacity import Capacity
from coldbox.account.entry import Entry, Figure, Finding
from coldbox.account.transmission import Envelope
from coldbox.scene import Scene

ORDER = {"danger": 0, "caution": 1, "note": 2}


def findings(scene: Scene, envelope: Envelope, entries: list[Entry], sized: Capacity) -> tuple[Finding, ...]:
    """Every finding that needs no timeline, in order of danger, this box's own before the standing ones."""
    found = [
        *envelope_findings.findings(scene, envelope),
        *goods_findings.findings(scene),
        *_sizing(scene, entries, sized),
        *cautions.standing(scene),
    ]
    return tuple(sorted(found, key=lambda finding: (ORDER[finding.level], finding.standing)))


def _sizing(scene: Scene, entries: list[Entry], sized: Capacity) -> Iterator[Finding]:
    yield from _running_hours(scene)
    yield from _transport(sized)
    for entry in entries:
        if "upper bound" in entry.remark:
            yield Finding(
                level="note", id="open-long", text=f"{entry.label}: {entry.remark}", rule="", path=f"{entry.id}"
            )


def longest_run_hours(scene: Scene) -> float:
    """The most hours a day a coil may run and still keep clear of frost, by how it defrosts; trade practice."""
    from coldbox.tables.load import rows

    defrost = scene.project.machine.defrost
    return max(float(str(one["highest"])) for one in rows("run_hours").values() if one["defrost"] == defrost)


def _running_hours(scene: Scene) -> Iterator[Finding]:
    hours = float(np.max(scene.project.sizing.run_hours)) / 3600.0
    most = longest_run_hours(scene)
    if hours > most + 1e-9:
        yield Finding(
            level="caution",
            id="running-hours",
            text=(
                f"sized to run {hours:g} h a day; with defrost {scene.project.machine.defrost} the trade allows about"
                f" {most:g} h, the rest is for defrost and for the day that is hotter than the design day"
            ),
            rule="common trade practice",
            path="sizing.run_hours",
        )


def _transport(sized: Capacity) -> Iterator[Finding]:
    if sized.by_atp_w is None or sized.governs == "atp":
        return
    yield Finding(
        level="note",
        id="atp-exceeded",
        text=(
            "the ATP rule alone would ask for ",
            Figure(value=float(np.mean(sized.by_atp_w)), kind="power", digits=3),
            "; this day, with its doors and goods, asks for ",
            Figure(value=float(np.mean(sized.required_w)), kind="power", digits=3),
        ),
        rule="ATP, annex 1",
        path="box.rules",
    )
