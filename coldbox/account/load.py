"""The load: every entry of the day, their sum, and the capacity it asks for."""

from __future__ import annotations

import numpy as np

from coldbox.account import equipment, findings, frost, infiltration, internal, product, quoted, transmission
from coldbox.account.capacity import capacity
from coldbox.account.entry import Entry, Load
from coldbox.project.model import Project
from coldbox.scene import Scene
from coldbox.scene.build import build


def load(project: Project) -> Load:
    """The account of one design day and the required refrigeration capacity.

    project: complete, its numbers floats or arrays (draws, 1). Raises BadProject where a quoted figure replaces
    nothing, OutOfValidity where a method does not hold for this box.
    """
    scene = build(project)
    envelope = transmission.envelope(scene)
    entries = _account(scene, envelope)
    sized = capacity(project, entries, envelope.ua_w_per_k)
    frost_kg = frost.frost_kg_per_day(scene, entries)
    hours_w = np.sum([np.broadcast_to(entry.hours_w, _shape(entries)) for entry in entries], axis=0)
    return Load(
        project=project,
        entries=tuple(entries),
        hours_w=hours_w,
        daily_heat_j=hours_w.sum(axis=-1) * 3600.0,
        counted_daily_j=sized.counted_daily_j,
        cold_w=sized.cold_w,
        run_hours=project.sizing.run_hours / 3600.0,
        safety=project.sizing.safety,
        peak_hour=sized.peak_hour,
        peak_w=sized.peak_w,
        by_daily_w=sized.by_daily_w,
        by_peak_w=sized.by_peak_w,
        by_atp_w=sized.by_atp_w,
        required_capacity_w=sized.required_w,
        governs=sized.governs,
        frost_kg_per_day=frost_kg,
        ua_w_per_k=envelope.ua_w_per_k,
        k_w_per_m2k=envelope.k_w_per_m2k,
        facts={**envelope.facts, **frost.facts(scene, frost_kg)},
        findings=findings.findings(scene, envelope, entries, sized),
    )


def _account(scene: Scene, envelope: transmission.Envelope) -> list[Entry]:
    """All entries of the day, quoted figures in their places."""
    others = [
        *envelope.entries,
        *infiltration.entries(scene),
        *product.entries(scene),
        *internal.entries(scene),
    ]
    rest = quoted.put_in_place(scene, others)[0]
    return quoted.apply(scene, [*others, *equipment.entries(scene, rest)])


def _shape(entries: list[Entry]) -> tuple[int, ...]:
    return np.broadcast_shapes((24,), *(entry.hours_w.shape for entry in entries))
