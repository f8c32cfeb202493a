"""Projects side by side: their results, then every input that differs."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Literal

import numpy as np

from coldbox.account.entry import GROUPS, Load
from coldbox.paper.data import Json
from coldbox.paper.document import Block, Column, Document, Heading, Paragraph, Table
from coldbox.paper.load import GROUP_WORDS, figure
from coldbox.project.model import Origin, Project

System = Literal["SI", "IP"]

RESULTS = (
    ("required capacity", "required_capacity_w", "power"),
    ("peak hour, demand", "peak_w", "power"),
    ("daily heat", "daily_heat_j", "energy"),
    ("frost a day", "frost_kg_per_day", "mass"),
    ("UA", "ua_w_per_k", "point_transmittance"),
    ("K", "k_w_per_m2k", "transmittance"),
)


def document(heads: list[str], loads: list[Load], system: System) -> Document:
    """The comparison; the first project is what the others are held against."""
    return Document(title=" / ".join(heads), blocks=tuple(_blocks(heads, loads, system)))


def _blocks(heads: list[str], loads: list[Load], system: System) -> Iterator[Block]:
    yield Heading(text=" / ".join(heads), level=1)
    columns = (Column(title="", gives=True), *(Column(title=head, align="right", gives=True) for head in heads))
    yield Table(columns=columns, rows=tuple(_result_rows(loads, system)))
    yield Heading(text="What differs")
    rows = tuple(differences([load.project for load in loads]))
    if rows:
        keys = (Column(title="key", gives=True), *(Column(title=head, gives=True) for head in heads))
        yield Table(columns=keys, rows=rows)
    else:
        yield Paragraph(text="No input differs.")


def _result_rows(loads: list[Load], system: System) -> Iterator[tuple[str, ...]]:
    for label, name, kind in RESULTS:
        values = [float(np.mean(getattr(load, name))) for load in loads]
        yield (label, *(_held_against(value, values[0], kind, system) for value in values))
    yield ("governs", *(load.governs for load in loads))
    for group in GROUPS:
        sums = [sum(float(entry.hours_w.sum()) for entry in load.entries if entry.group == group) for load in loads]
        if any(sums):
            texts = [_held_against(value * 3600.0, sums[0] * 3600.0, "energy", system) for value in sums]
            yield (f"{GROUP_WORDS[group]}, a day", *texts)
    yield ("peak hour", *(f"{load.peak_hour}-{load.peak_hour + 1}" for load in loads))


def _held_against(value: float, first: float, kind: str, system: System) -> str:
    text = figure(value, kind, system)
    if first == 0.0 or abs(value / first - 1.0) < 0.0005:
        return text
    return f"{text} ({value / first - 1.0:+.0%})".replace("%", " %")


def differences(projects: list[Project]) -> Iterator[tuple[str, ...]]:
    """Rows of key path and each project's own text, for every input that somebody set and that is not the same in all.

    What only follows from it (a construction's layers out of the library, a default) is not listed.
    """
    paths = dict.fromkeys(
        path for project in projects for path, origin in project.origins.items() if _set(path, origin)
    )
    for path in paths:
        row = [_text(project, path) for project in projects]
        if len(set(row)) > 1:
            yield (path, *row)


def _set(path: str, origin: Origin) -> bool:
    told = ("name", "notes", "customer", "by", "format")
    return origin.kind in ("typed", "option") and path not in told and not path.endswith((".notes", ".library"))


def _text(project: Project, path: str) -> str:
    origin = project.origins.get(path)
    return origin.text if origin is not None and origin.text else "-"


def as_json(heads: list[str], loads: list[Load]) -> dict[str, Json]:
    """The comparison as JSON: results by project, and the inputs that differ."""
    results: list[Json] = [
        {"name": head, **{name: float(np.mean(getattr(load, name))) for _, name, _ in RESULTS}, "governs": load.governs}
        for head, load in zip(heads, loads, strict=True)
    ]
    rows: list[Json] = [
        {"key": row[0], "values": list(row[1:])} for row in differences([load.project for load in loads])
    ]
    return {"results": results, "differs": rows}
