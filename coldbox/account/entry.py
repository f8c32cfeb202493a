"""What an account is made of: entries, findings, and the load they sum to."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Literal

from coldbox.physics.number import FloatArray, Number
from coldbox.project.model import Project
from coldbox.record import Record
from coldbox.scene.finding import Figure, Finding, Text

__all__ = ["GROUPS", "Entry", "Figure", "Finding", "Group", "Input", "Load", "Text"]

GROUPS = ("transmission", "sun", "infiltration", "product", "internal", "equipment")
Group = Literal["transmission", "sun", "infiltration", "product", "internal", "equipment"]


class Input(Record):
    """One number an entry was computed from. `key` ends in its SI unit (`area_m2`); `kind` is a kind of `units`."""

    key: str
    label: str
    value: Number
    kind: str


class Entry(Record):
    """One line of the account: watts through 24 clock hours, and how they came about. Heat into the box is positive."""

    id: str  # "front", "sun.front", "doors.main.traffic", "lots.cod.intake", "fans" …
    group: Group
    label: str
    sensible_w: FloatArray  # (24,) or (draws, 24)
    latent_w: FloatArray  # same shape; where moisture freezes, with its fusion
    moisture_kg_per_day: Number  # water brought into the air of the box
    method: str  # the published method's usual name
    source: str  # key into tables/sources.toml
    formula: str  # in symbols, "U A (t_o - t_i)"
    inputs: tuple[Input, ...]
    remark: str = ""
    defrost: bool = False  # spread over the running hours; never part of the peak demand

    @property
    def hours_w(self) -> FloatArray:
        """Sensible and latent together, (24,) or (draws, 24)."""
        return self.sensible_w + self.latent_w

    @property
    def daily_j(self) -> Number:
        """Heat of the day, J, float or (draws,)."""
        total = self.hours_w.sum(axis=-1) * 3600.0
        return float(total) if total.ndim == 0 else total


class Load(Record):
    """The account of one day and the capacity it asks for; scalars, or (draws,) arrays when the project holds draws."""

    project: Project
    entries: tuple[Entry, ...]
    hours_w: FloatArray  # (…, 24) sum of all entries, negative ones too
    daily_heat_j: Number  # of hours_w
    counted_daily_j: Number  # what the capacity counts: the positive entries, or all with credit_cold
    cold_w: Number  # mean of what negative entries take off, W, zero or more
    run_hours: Number  # hours a day
    safety: Number
    peak_hour: int
    peak_w: Number  # demand of the peak hour without defrost heat, before safety
    by_daily_w: Number  # counted daily heat / running hours x (1 + safety)
    by_peak_w: Number  # peak x (1 + safety)
    by_atp_w: Number | None  # the transport rule, for a box that asks for an ATP class
    required_capacity_w: Number
    governs: Literal["daily", "peak", "atp"]
    frost_kg_per_day: Number
    ua_w_per_k: Number
    k_w_per_m2k: Number
    facts: Mapping[str, Number]  # further results by key with unit: floor heater, temperature under the slab …
    findings: tuple[Finding, ...]
