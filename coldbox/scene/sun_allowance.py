"""The handbook's added degrees, which stand for the sun on a surface all day long."""

from __future__ import annotations

import numpy as np

from coldbox.physics.number import Number
from coldbox.scene.types import Scene, Surface
from coldbox.tables import load

# A wall between two of the table's directions takes the larger figure: it counts for a direction up to this far off.
_REACH = 67.5
_EAST, _WEST = 90.0, 270.0


def added_degrees(scene: Scene, one: Surface) -> Number:
    """Degrees that stand for the sun on a surface, K; none on floors, in full shade, or under a sky without sun.

    Walls by east, the equator's side (south of the equator the north wall) and west, roofs by their own column, by
    the colour's class; times (1 - shade). They replace sun and sky all day long.
    Source: ASHRAE Handbook, Refrigeration, Refrigerated-facility loads, allowance for sun effect (from memory).
    """
    site = scene.project.site
    if site is None or site.sky != "clear" or one.face == "floor":
        return 0.0
    row = load.row("sun_allowance", str(load.row("colours", _colour(scene, one))["allowance"]))
    if one.face == "ceiling":
        return float(row["roof_k"]) * (1.0 - one.shade)
    if one.azimuth is None:
        return 0.0
    equator = np.where(np.asarray(site.latitude) < 0.0, 0.0, 180.0)
    added = np.zeros(())
    for column, direction in (("east_k", _EAST), ("equator_k", equator), ("west_k", _WEST)):
        off = np.abs((one.azimuth - direction + 180.0) % 360.0 - 180.0)
        added = np.maximum(added, np.where(off <= _REACH, float(row[column]), 0.0))
    found = added * (1.0 - one.shade)
    return found if isinstance(found, np.ndarray) and found.ndim else float(found)


def _colour(scene: Scene, one: Surface) -> str:
    project = scene.project
    if one.role == "face":
        return project.faces[one.face].colour
    things = project.panels if one.role == "panel" else project.doors
    return next(thing.colour for thing in things if one.id.endswith(f".{thing.name}"))
