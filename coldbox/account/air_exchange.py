"""An exchange of air as an entry of the account."""

from __future__ import annotations

import numpy as np

from coldbox.account.entry import Entry, Input
from coldbox.account.shapes import SECONDS_A_DAY, day, steady_mean
from coldbox.physics import doorway
from coldbox.physics.doorway import Exchange
from coldbox.physics.number import FloatArray, Number
from coldbox.scene import Air, Scene


def exchange(scene: Scene, behind: Air, flow: FloatArray, specific_volume: Number) -> Exchange:
    """What `flow` (m³/s each way, measured in air of `specific_volume`) brings from the air behind into the room."""
    room = scene.room
    return doorway.exchange_heat(
        flow, specific_volume, behind.temperature_c, behind.humidity_ratio, room.temperature_c, room.humidity_ratio
    )


def denser_volume(scene: Scene, behind: Air) -> Number:
    """Specific volume of the denser of the two airs, which drives a doorway, m³ per kg dry air."""
    room = scene.room
    return np.where(np.greater_equal(room.density, behind.density), room.specific_volume, behind.specific_volume)


def entry(
    behind: Air,
    found: Exchange,
    *,
    name: str,
    label: str,
    how: tuple[str, str, str],
    inputs: tuple[Input, ...],
    remark: str = "",
) -> Entry:
    """The entry of an exchange; `how` is method, source and formula. The airs are added to the inputs."""
    method, source, formula = how
    airs = (
        Input(key="air_c", label="air, mean", value=steady_mean(day(behind.temperature_c)), kind="temperature"),
        Input(
            key="air_humidity_kg_per_kg",
            label="its water, mean",
            value=steady_mean(day(behind.humidity_ratio)),
            kind="humidity_ratio",
        ),
    )
    return Entry(
        id=name,
        group="infiltration",
        label=label,
        sensible_w=day(found.sensible_w),
        latent_w=day(found.latent_w),
        moisture_kg_per_day=steady_mean(day(found.moisture)) * SECONDS_A_DAY,
        method=method,
        source=source,
        formula=formula,
        inputs=(*inputs, *airs),
        remark=remark,
    )
