"""Findings about what is stored: freezing and chilling injury, and limits above food-safety guidance."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from coldbox.account.entry import Figure, Finding
from coldbox.project.model import Limit, Lot
from coldbox.scene import Scene

COLD_HOLDING_C = 5.0  # FDA Food Code 3-501.16
PERISHABLE = ("meat", "fish", "dairy")


def findings(scene: Scene) -> Iterator[Finding]:
    """What the room's temperature does to the goods in it."""
    room = float(np.mean(scene.room.temperature_c))
    for lot in scene.project.lots:
        yield from _injury(lot, room)
        yield from _guidance(scene, lot)


def _injury(lot: Lot, room: float) -> Iterator[Finding]:
    lives = bool(lot.respiration)
    freezing = None if lot.freezing_point is None else float(np.mean(lot.freezing_point))
    if lives and freezing is not None and room < freezing:
        yield Finding(
            level="danger",
            id="freezing-injury",
            text=(f"{lot.name} lives and freezes at ", _degrees(freezing), "; the room is held at ", _degrees(room)),
            rule="USDA Agriculture Handbook 66",
            path=f"lots.{lot.name}",
        )
    elif lot.safe_above_c is not None and room < float(np.mean(lot.safe_above_c)):
        yield Finding(
            level="caution" if lives else "danger",
            id="chilling-injury" if lives else "too-cold",
            text=(
                f"{lot.name} is harmed below ",
                _degrees(float(np.mean(lot.safe_above_c))),
                "; the room is held at ",
                _degrees(room),
            ),
            rule="USDA Agriculture Handbook 66" if lives else "the product's own storage range",
            path=f"lots.{lot.name}",
        )


def _guidance(scene: Scene, lot: Lot) -> Iterator[Finding]:
    from coldbox.tables.load import row

    if lot.product is None or float(np.mean(scene.room.temperature_c)) < 0.0:
        return
    if row("foods", lot.product).get("group") not in PERISHABLE:
        return
    for limit in lot.limits:
        if _above_guidance(limit):
            yield Finding(
                level="caution",
                id="limit-above-guidance",
                text=(
                    f"{lot.name} may warm to ",
                    _degrees(float(np.mean(limit.limit_c))),
                    "; guidance for cold holding is ",
                    Figure(value=COLD_HOLDING_C, kind="temperature", both=True),
                    " or colder; your food authority decides",
                ),
                rule="FDA Food Code 3-501.16",
                path=f"lots.{lot.name}.limits",
            )


def _degrees(value_c: float) -> Figure:
    return Figure(value=value_c, kind="temperature")


def _above_guidance(limit: Limit) -> bool:
    return limit.side == "above" and limit.allowed_s == 0.0 and float(np.mean(limit.limit_c)) > COLD_HOLDING_C
