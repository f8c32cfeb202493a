"""The inside of a box: its three sizes, and width and height of each face. Floats, or arrays of draws."""

from __future__ import annotations

from collections.abc import Iterable, Mapping

import numpy as np

from coldbox.physics.number import Number
from coldbox.project.model import FACES, Box, Construction, Face, Panel

_AXES = {"length": ("front", "back"), "width": ("left", "right"), "height": ("ceiling", "floor")}


def largest(values: Iterable[Number]) -> Number:
    """The largest of some numbers, draw by draw."""
    best: Number = 0.0
    for value in values:
        if isinstance(best, float) and isinstance(value, float):
            best = best if best >= value else value
        else:
            best = np.maximum(best, value)
    return best


def wall_thickness(
    box: Box, faces: Mapping[str, Face], cut: Iterable[tuple[str, str | None]], made: Mapping[str, Construction]
) -> dict[str, Number]:
    """How thick each face is: its thickest panel. `cut` names the face and the construction of each panel, m."""
    if box.thickness is not None:
        return dict.fromkeys(FACES, box.thickness)
    of: dict[str, list[Number]] = {name: [] for name in FACES}
    for name, construction in (*((face.name, face.construction) for face in faces.values()), *cut):
        if construction is not None and construction in made and name in of:
            of[name].append(made[construction].thickness)
    return {name: largest(values) for name, values in of.items()}


def inside(box: Box, thickness: Mapping[str, Number]) -> dict[str, Number | None]:
    """Length, width and height inside, m; None where the box has no such size."""
    found: dict[str, Number | None] = {}
    for axis, (one, other) in _AXES.items():
        size: Number | None = getattr(box, axis)
        if size is not None and box.measured == "outside":
            size = size - thickness[one] - thickness[other]
        found[axis] = size
    return found


def face_size(name: str, sizes: Mapping[str, Number | None]) -> tuple[Number | None, Number | None]:
    """Width and height of a face, m; of ceiling and floor along the front, and front to back."""
    across = sizes["length"] if name in ("left", "right") else sizes["width"]
    upward = sizes["length"] if name in ("ceiling", "floor") else sizes["height"]
    return across, upward


def cuts(panels: Iterable[Panel]) -> list[tuple[str, str | None]]:
    """Face and construction of each panel, as `wall_thickness` asks for them."""
    return [(panel.face, panel.construction) for panel in panels]
