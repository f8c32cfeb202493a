"""Water brought in, and what becomes of it on a coil below freezing."""

from __future__ import annotations

import numpy as np

from coldbox.account.entry import Entry
from coldbox.account.equipment import defrost_energy
from coldbox.physics.number import Number
from coldbox.scene import Scene

COIL_DIFFERENCE_K = 6.0  # coil below room air, before a unit is chosen: common trade practice, from memory
FUSION_J_PER_KG = 333.6e3
ICE_J_PER_KGK = 2.1e3
WATER_J_PER_KGK = 4.19e3
MELT_LEAVES_AT_C = 5.0  # how warm the melted water runs off: common trade practice, from memory


def moisture_kg_per_day(entries: list[Entry]) -> Number:
    """Water brought into the air of the box, kg a day, float or (draws, 1)."""
    return sum((entry.moisture_kg_per_day for entry in entries), 0.0)


def frost_kg_per_day(scene: Scene, entries: list[Entry]) -> Number:
    """Water that freezes on the coil, kg a day: all that comes in where the coil is below 0 °C, else none."""
    water = np.maximum(moisture_kg_per_day(entries), 0.0)
    return water * np.where(scene.room.temperature_c - COIL_DIFFERENCE_K < 0.0, 1.0, 0.0)


def melting_j_per_day(scene: Scene, frost: Number) -> Number:
    """Heat it takes to melt a day's frost off the coil and let it run away, J.

    m (c_ice (0 - t_coil) + L + c_water t_away). frost: kg a day. No losses: a heater needs more.
    Source: heat balance; the runoff temperature is common trade practice, from memory.
    """
    coil = np.minimum(scene.room.temperature_c - COIL_DIFFERENCE_K, 0.0)
    return frost * (FUSION_J_PER_KG - ICE_J_PER_KGK * coil + WATER_J_PER_KGK * MELT_LEAVES_AT_C)


def facts(scene: Scene, frost: Number) -> dict[str, Number]:
    """Defrost figures of the day: heat to melt the frost, heater energy, and what of it stays in the room."""
    melting = melting_j_per_day(scene, frost)
    heater = defrost_energy(scene)
    found: dict[str, Number] = {"frost_melting_kwh_per_day": melting / 3.6e6}
    if heater is not None and scene.project.machine.defrost not in ("none", "air"):
        found["defrost_heater_kwh_per_day"] = heater / 3.6e6
        found["defrost_left_after_melt_kwh_per_day"] = (heater - melting) / 3.6e6
    return found
