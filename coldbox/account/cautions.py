"""Standing cautions: what is true of every such box, whatever its numbers. They never set the exit status."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Literal

import numpy as np

from coldbox.account.entry import Finding
from coldbox.scene import Scene
from coldbox.tables.load import row

WALK_IN_M3 = 2.0  # a box a person can stand in; common practice


def standing(scene: Scene) -> Iterator[Finding]:
    """The usual cautions that apply to this kind of box."""
    room = float(np.mean(scene.room.temperature_c))
    walk_in = float(np.mean(scene.body.volume)) >= WALK_IN_M3
    if walk_in:
        yield _standing(
            "entrapment",
            "caution",
            "a person can be shut in: every door must open from inside, with light and alarm that work without power",
            "EN 378-3; local codes rule",
        )
    if walk_in and room < 0.0:
        yield _standing(
            "cold-exposure",
            "caution",
            "work below freezing needs clothing, breaks and somebody who knows that you are in there",
            "ISO 15743; local codes rule",
        )
        yield _standing(
            "pressure-relief",
            "caution",
            "a freezer needs a heated pressure-relief port: cooling air after a door opening can lock or crush it",
            "common trade practice",
        )
    if any(pack.kind == "dry ice" for pack in scene.project.packs):
        yield _standing(
            "dry-ice",
            "danger",
            "dry ice gives off carbon dioxide that suffocates without warning: ventilate, never seal the box airtight,"
            " no bare hands, ask your safety officer; 5 000 ppm is the workday limit, 40 000 ppm dangerous at once",
            "OSHA PEL; NIOSH IDLH",
        )
    if scene.project.box.powered:
        yield _standing(
            "refrigerant",
            "note",
            "refrigerant work by licensed people; a leak into a closed room can suffocate or burn: charge limits,"
            " detection and ventilation as the safety standard and local codes say",
            "EN 378-1 and -3",
        )
    if scene.project.site is not None:
        yield from _weather(scene)
    yield _standing("advice", "note", "an estimate, not an approval: local codes and licensed practice rule", "")


def _weather(scene: Scene) -> Iterator[Finding]:
    place = scene.project.site.place if scene.project.site is not None else None
    if place is not None and not row("weather", place).get("verified", False):
        yield _standing(
            "weather-unverified",
            "caution",
            f"the design weather of {place} was recalled, not read in print: check it against your national tables",
            "",
        )


def _standing(name: str, level: Literal["note", "caution", "danger"], text: str, rule: str) -> Finding:
    return Finding(level=level, id=name, text=text, rule=rule, standing=True)
