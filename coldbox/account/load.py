"""The load: every entry of the day, their sum, and the capacity it asks for."""

from __future__ import annotations

import numpy as np

from coldbox.account import equipment, findings, frost, infiltration, internal, product, quoted, transmission
from coldbox.account.capacity import capacity
from coldbox.account.entry import Entry, Load
from coldbox.account.shapes import NOTHING
from coldbox.physics.number import FloatArray, Number
from coldbox.project.model import Project
from coldbox.scene import Scene
from coldbox.scene.build import build


def load(project: Project, *, enthalpy: Number = 1.0) -> Load:
    """The account of one design day and the required refrigeration capacity.

    project: complete, its numbers floats or arrays (draws, 1). enthalpy: factor on the heat contents of goods, for
    draws: no number of a project says how unsure the model is. Raises BadProject where a quoted figure replaces
    nothing, OutOfValidity where a method does not hold for this box.
    """
    scene = build(project)
    envelope = transmission.envelope(scene)
    entries = _account(scene, envelope, enthalpy)
    sized = capacity(project, entries, envelope.ua_w_per_k)
    frost_kg = frost.frost_kg_per_day(scene, entries)
    hours_w = _sum(entries)
    return Load(
        project=project,
        entries=tuple(entries),
        hours_w=hours_w,
        daily_heat_j=hours_w.sum(axis=-1) * 3600.0,
        counted_daily_j=sized.counted_daily_j,
        cold_w=sized.cold_w,
        run_hours=_flat(project.sizing.run_hours / 3600.0),
        safety=_flat(project.sizing.safety),
        peak_hour=sized.peak_hour,
        peak_w=sized.peak_w,
        by_daily_w=sized.by_daily_w,
        by_peak_w=sized.by_peak_w,
        by_atp_w=sized.by_atp_w,
        required_capacity_w=sized.required_w,
        governs=sized.governs,
        frost_kg_per_day=_flat(frost_kg),
        ua_w_per_k=_flat(envelope.ua_w_per_k),
        k_w_per_m2k=_flat(envelope.k_w_per_m2k),
        facts={key: _flat(value) for key, value in {**envelope.facts, **frost.facts(scene, frost_kg)}.items()},
        findings=findings.findings(scene, envelope, entries, sized),
    )


def _account(scene: Scene, envelope: transmission.Envelope, enthalpy: Number) -> list[Entry]:
    """All entries of the day, quoted figures in their places."""
    others = [
        *envelope.entries,
        *infiltration.entries(scene),
        *product.entries(scene, enthalpy),
        *internal.entries(scene),
    ]
    rest = quoted.put_in_place(scene, others)[0]
    return quoted.apply(scene, [*others, *equipment.entries(scene, rest)])


def _sum(entries: list[Entry]) -> FloatArray:
    total = NOTHING
    for entry in entries:
        total = total + entry.sensible_w + entry.latent_w
    return total


def _flat(value: Number) -> Number:
    """A steady figure without its hour axis: float or (draws,)."""
    return value[..., 0] if isinstance(value, np.ndarray) and value.ndim > 1 else value
