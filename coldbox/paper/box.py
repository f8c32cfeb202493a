"""The box and its day in words."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Literal

import numpy as np

from coldbox.account.entry import Load
from coldbox.project.model import Box, Project, Site
from coldbox.units import compass_point, show

MONTHS = (
    "January", "February", "March", "April", "May", "June",
    "July", "August", "September", "October", "November", "December",
)  # fmt: skip


def box_lines(load: Load, system: Literal["SI", "IP"]) -> Iterator[str]:
    """The box and what surrounds it, then the design day, a line each."""
    project = load.project
    yield _sizes(project.box, system) + _surroundings(project)
    if project.site is not None:
        yield _weather(project.site, system)


def _mean(value: object) -> float:
    return float(np.mean(np.asarray(value, dtype=float)))


def _sizes(box: Box, system: Literal["SI", "IP"]) -> str:

    def length(value: object) -> str:
        return show(_mean(value), "length", system)

    if box.length is None or box.width is None or box.height is None:
        return (
            f"Box of {show(_mean(box.volume), 'volume', system)}, floor {show(_mean(box.floor_area), 'area', system)}."
        )
    front = f" (front {compass_point(_mean(box.bearing))})" if box.bearing is not None else ""
    notch = ", L-shaped" if box.notch_length is not None else ""
    return (
        f"Box {length(box.width)} wide{front}, {length(box.length)} deep, {length(box.height)} high"
        f" {box.measured}{notch}, at {show(_mean(box.temperature), 'temperature', system)}"
        f" and {show(_mean(box.humidity), 'share', system)} humidity."
    )


def _surroundings(project: Project) -> str:
    groups: dict[str, list[str]] = {}
    for face in project.faces.values():
        groups.setdefault(face.neighbour, []).append(face.name)
    told = "; ".join(f"{', '.join(names)}: {neighbour}" for neighbour, names in groups.items())
    return f" Behind its faces: {told}."


def _weather(site: Site, system: Literal["SI", "IP"]) -> str:
    high = _mean(site.dry_bulb)
    low = high - _mean(site.daily_range)
    where = f"{site.place}, " if site.place else ""
    return (
        f"{where}{site.day} {MONTHS[site.month - 1]}, {show(high, 'temperature', system)} down to"
        f" {show(low, 'temperature', system)}, sky {site.sky}; clock UTC{site.clock:+g}."
    )
