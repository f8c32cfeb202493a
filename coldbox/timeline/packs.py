"""Packs: lumps of coolant (and of fittings) that melt, and dry ice that turns into gas."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Final

import numpy as np
from numpy.typing import NDArray

from coldbox.physics import constants
from coldbox.physics.number import FloatArray
from coldbox.physics.validity import within
from coldbox.timeline import curves
from coldbox.timeline.bodies import HELD_K, contents
from coldbox.timeline.curves import Melting, rows
from coldbox.timeline.types import PackPart, Packs

SUBLIMES_C: Final = float(constants.SUBLIMATION_CO2_C)
SUBLIMATION: Final = float(constants.LATENT_SUBLIMATION_CO2)
GAS_SPECIFIC_HEAT: Final = 800.0  # J/kgK at constant pressure, mean from -78 to 0 °C: the row "dry ice" of the packs
GAS_CONSTANT: Final = 188.92  # J/kgK, of carbon dioxide: 8.314 46 J/molK over 44.01 g/mol

_METHOD = "A pack as a lump"


def stack(parts: Sequence[PackPart], draws: int) -> Packs:
    """Packs side by side, what sublimes last; `order` leads from the parts to the rows.

    Raises OutOfValidity for a mass or an exchange below 0, or a frozen share outside 0..1.
    """
    order = sorted(range(len(parts)), key=lambda i: parts[i].sublimes)
    parts = [parts[i] for i in order]
    for part in parts:
        within(part.mass, 0.0, np.inf, quantity=f"the mass of {part.name}", unit="kg", method=_METHOD)
        within(part.whole_mass, 1e-12, np.inf, quantity=f"the whole mass of {part.name}", unit="kg", method=_METHOD)
        within(part.exchange, 0.0, np.inf, quantity=f"the exchange of {part.name}", unit="W/K", method=_METHOD)
        within(part.frozen, 0.0, 1.0, quantity=f"the frozen share of {part.name}", unit="", method=_METHOD)
    melting = [part for part in parts if not part.sublimes]
    groups = curves.stack([part.curve for part in melting], draws)
    content = np.zeros((len(parts), draws))
    content[: len(melting)] = contents(
        groups, [part.start_c for part in melting], draws, [part.frozen for part in melting]
    )
    full = (len(parts), draws)
    return Packs(
        labels=tuple(part.name for part in parts),
        order=tuple(int(i) for i in np.argsort(order)),
        mass=np.array(np.broadcast_to(rows([part.mass for part in parts], draws), full)),
        content=content,
        exchange=rows([part.exchange / part.whole_mass for part in parts], draws),
        whole_mass=rows([part.whole_mass for part in parts], draws),
        curves=groups,
        melting=len(melting),
    )


class Lumps:
    """What melts, at work: one cell each, coupled to the air alone."""

    def __init__(self, packs: Packs, draws: int) -> None:
        count = packs.melting
        shape = (1, count, draws)
        self.count, self.exchange = count, packs.exchange[:count]
        self.temperature, self.potential, self.slope = np.empty(shape), np.empty(shape), np.empty(shape)
        self._melting = [Melting(curve, shape) for curve in packs.curves]
        self._u, self._v = np.empty(shape[1:]), np.empty(shape[1:])
        self._before = np.empty(shape[1:])

    def look(self, content: FloatArray) -> None:
        """Temperatures and slopes of now from the heat contents (pack, draw)."""
        for melting in self._melting:
            own = melting.rows
            melting.update(content[None, own], self.temperature[:, own], self.potential[:, own], self.slope[:, own])

    def frozen(self, content: FloatArray) -> FloatArray:
        """Share of each pack that is frozen, (pack, draw)."""
        return np.concatenate([melting.frozen(content[melting.rows]) for melting in self._melting])

    def begin(self, content: FloatArray) -> None:
        """Keeps the heat contents that the step starts from."""
        self._before = content.copy()

    def outward(self, content: FloatArray, air_c: FloatArray, step_s: float) -> tuple[FloatArray, FloatArray]:
        """Rise of each pack as u + v (rise of the air), both (pack, draw), from where the step has come to."""
        flow = self.exchange * (air_c - self.temperature[0]) - (content - self._before) / step_s
        diagonal = self.slope[0] / step_s + self.exchange
        return np.divide(flow, diagonal, out=self._u), np.divide(self.exchange, diagonal, out=self._v)

    def inward(self, air_rise: FloatArray, moving: NDArray[np.bool_], content: FloatArray) -> NDArray[np.bool_]:
        """Heat contents of `moving` draws, written in place; gives the draws whose slopes held."""
        rise = (self._u + self._v * air_rise) * moving
        expected = self.temperature[0] + rise
        content += self.slope[0] * rise
        self.look(content)
        return np.asarray((np.abs(expected - self.temperature[0]) <= HELD_K).all(axis=0))


class DryIce:
    """What sublimes, at work. Its exchange shrinks with its surface, (mass left over whole)^⅔."""

    def __init__(self, packs: Packs) -> None:
        self.rows = slice(packs.melting, len(packs.labels))
        self.any = packs.melting < len(packs.labels)
        self.whole = packs.whole_mass[self.rows]
        self.exchange = packs.exchange[self.rows] * self.whole

    def outward(self, mass: FloatArray, air_c: FloatArray, step_s: float) -> FloatArray:
        """Conductance of each to the room air, (pack, draw) W/K; never more than spends it within the step."""
        left = np.maximum(mass, 0.0)
        shrunk = self.exchange * np.cbrt(np.square(left / self.whole))
        drive = np.maximum(air_c - SUBLIMES_C, 1e-9)
        return np.asarray(np.minimum(shrunk, left * SUBLIMATION / (step_s * drive)))
