"""Walls: chains of cells from the outside surface to the room air, all walls of equally many cells at once.

The matrix of a step is the same in every step of that length, so it is factorised once: a sweep inwards leaves the
innermost cell as T_last = a + b T_air; when the room air is known, a sweep outwards gives the rest.
"""

from __future__ import annotations

from collections.abc import Sequence
from typing import Final

import numpy as np

from coldbox.physics import constants
from coldbox.physics.number import FloatArray, Number
from coldbox.physics.validity import within
from coldbox.record import Record
from coldbox.timeline.curves import rows
from coldbox.timeline.types import Conditions, WallLayer, WallPart, Walls

ZERO: Final = float(constants.ZERO_CELSIUS)
SIGMA: Final = float(constants.STEFAN_BOLTZMANN)
# The radiation of the outside surface is linearised with this slope throughout; what it misses is made up from step
# to step, so a settled surface is exact and the matrix never changes.
SLOPE: Final = 4.0 * SIGMA * 300.0**3
SLIGHT_K_PER_W: Final = 1e-9  # resistance between two cells that touch
GRADED: Final = 1.5  # depths of the joints in a layer, from the room, are (i/n) to this power
KEPT: Final = 64  # step lengths whose factors are kept

_METHOD = "A wall in layers"


def stack(parts: Sequence[WallPart], draws: int) -> tuple[Walls, ...]:
    """Walls in groups of equally many cells, in the order of the parts: rows are those of the parts.

    Neighbouring parts are put into one group when their layers can be cut into equally many cells. Raises
    OutOfValidity for a resistance or capacity below 0, and for a wall without any resistance.
    """
    wanted = [max(part.cells, sum(np.any(layer.capacity) for layer in part.layers), 1) for part in parts]
    groups: list[Walls] = []
    first = 0
    while first < len(parts):
        last = first
        while last < len(parts) and wanted[last] == wanted[first]:
            last += 1
        own = parts[first:last]
        chains = [chain(part, int(wanted[first])) for part in own]
        groups.append(
            Walls(
                labels=tuple(part.name for part in own),
                first=first,
                capacity=_side_by_side([cells for cells, _ in chains], draws),
                between=_side_by_side([joints for _, joints in chains], draws),
                radiating=rows([part.radiating for part in own], draws),
            )
        )
        first = last
    return tuple(groups)


def _side_by_side(chains: Sequence[Sequence[Number]], draws: int) -> FloatArray:
    """Figures along chains as (cell, wall, draw)."""
    arrays = [rows(values, draws) for values in chains]
    width = max(array.shape[-1] for array in arrays)
    return np.stack([np.broadcast_to(array, (len(array), width)) for array in arrays], axis=1)


def chain(part: WallPart, cells: int) -> tuple[list[Number], list[Number]]:
    """Heat capacities of the cells of a wall, J/K, and the conductances before, between and after them, W/K.

    Each layer that holds heat is cut into cells with half their resistance on either side, thinner towards the room,
    which is what is felt first; where there are more cells than such layers, those are cut first whose cells are
    slowest (R C / n²) in the first draw. What holds no heat is resistance.
    """
    for layer in part.layers:
        for value, what in ((layer.resistance, "a layer's resistance"), (layer.capacity, "a layer's heat capacity")):
            within(value, 0.0, np.inf, quantity=what, unit="", method=_METHOD)
    layers = part.layers or (WallLayer(resistance=0.0, capacity=0.0),)
    holds = [bool(np.any(layer.capacity)) for layer in layers]
    if not any(holds):
        holds[int(np.argmax([_first(layer.resistance) for layer in layers]))] = True
    cut = [int(flag) for flag in holds]
    while sum(cut) < cells:
        slow = [
            _first(layer.resistance) * (_first(layer.capacity) + 1e-9) / n**2 if n else -1.0
            for layer, n in zip(layers, cut, strict=True)
        ]
        cut[int(np.argmax(slow))] += 1
    capacities: list[Number] = []
    joints: list[Number] = []
    before: Number = 0.0
    for layer, n in zip(layers, cut, strict=True):
        if not n:
            before = before + layer.resistance
            continue
        for share in np.diff(np.linspace(0.0, 1.0, n + 1) ** GRADED)[::-1]:
            joints.append(1.0 / np.maximum(before + layer.resistance * share / 2.0, SLIGHT_K_PER_W))
            capacities.append(layer.capacity * share)
            before = layer.resistance * share / 2.0
    joints.append(1.0 / np.maximum(before + part.inside_film, SLIGHT_K_PER_W))
    return capacities, joints


def _first(value: Number) -> float:
    return float(np.ravel(value)[0])


class Factors(Record):
    """One step length worked into the matrix of a group of walls. Row 0 is the outside surface."""

    kept: FloatArray  # (cell, wall, draw) W/K, heat capacity over the step
    inwards: FloatArray  # (cell, wall, draw) share of a row that goes on to the next
    scale: FloatArray  # (cell + 1, wall, draw) K/W
    outwards: FloatArray  # (cell + 1, wall, draw) share of the next row's temperature; last: of the room air's


class Chains:
    """One group of walls at work."""

    def __init__(self, walls: Walls, draws: int) -> None:
        cells, count = len(walls.capacity), len(walls.labels)
        self.walls, self.rows = walls, slice(walls.first, walls.first + count)
        self.radiates = bool(np.any(walls.radiating))
        self.rest = np.empty((cells + 1, count, draws))
        self.spare = np.empty((count, draws))
        self.source = np.empty((count, draws))
        self.inner = walls.between[-1]
        self._film: FloatArray | None = None
        self._outer: FloatArray = self.inner
        self._known: dict[float, Factors] = {}
        self._now: Factors

    def _factors(self, film: FloatArray, step_s: float) -> Factors:
        if film is not self._film:
            self._film, self._known = film, {}
            self._outer = film[self.rows] + SLOPE * self.walls.radiating
        if step_s not in self._known:
            if len(self._known) >= KEPT:
                self._known.clear()
            self._known[step_s] = self._factorised(step_s)
        return self._known[step_s]

    def _factorised(self, step_s: float) -> Factors:
        kept, between = self.walls.capacity / step_s, self.walls.between
        shape = np.broadcast_shapes(self._outer.shape, kept[0].shape, between[0].shape)
        diagonal = np.broadcast_to(self._outer + between[0], shape)
        inwards, scale, outwards = [], [], []
        for i in range(len(kept) + 1):
            scale.append(1.0 / diagonal)
            outwards.append(between[i] / diagonal)
            if i < len(kept):
                inwards.append(between[i] / diagonal)
                diagonal = kept[i] + between[i] * (1.0 - inwards[i]) + between[i + 1]
        return Factors(kept=kept, inwards=np.array(inwards), scale=np.array(scale), outwards=np.array(outwards))

    def inward(
        self, now: Conditions, step_s: float, wall_c: FloatArray, surface_c: FloatArray
    ) -> tuple[FloatArray, FloatArray]:
        """Sweep inwards: innermost cells as a + b T_air, both (wall, draw)."""
        self._now = known = self._factors(now.film, step_s)
        film = now.film[self.rows]
        source = np.multiply(film, now.outside_c[self.rows], out=self.source)
        if self.radiates:
            source += now.gain_w[self.rows]
            # σ T_s⁴ at the old surface, less what the constant slope takes of it.
            kelvin = np.add(surface_c, ZERO, out=self.spare)
            np.multiply(kelvin, kelvin, out=kelvin)
            np.multiply(kelvin, kelvin, out=kelvin)
            kelvin *= -SIGMA
            kelvin += SLOPE * surface_c
            kelvin *= self.walls.radiating
            source += kelvin
        rest = self.rest
        rest[0] = source
        np.multiply(known.kept, wall_c, out=rest[1:])
        for i, share in enumerate(known.inwards):
            np.multiply(share, rest[i], out=self.spare)
            rest[i + 1] += self.spare
        rest *= known.scale
        return rest[-1], known.outwards[-1]

    def outward(self, air_c: FloatArray, wall_c: FloatArray, surface_c: FloatArray) -> FloatArray:
        """Sweep outwards with the room air known; writes temperatures, gives the W that came in, (wall, draw)."""
        outwards, rest = self._now.outwards, self.rest
        beyond: FloatArray = air_c
        for i in range(len(outwards) - 1, -1, -1):
            own = wall_c[i - 1] if i else surface_c
            np.multiply(outwards[i], beyond, out=own)
            own += rest[i]
            beyond = own
        came = np.multiply(self._outer, surface_c, out=self.spare)
        return np.subtract(self.source, came, out=came)


def steady(walls: Walls, now: Conditions, air_c: FloatArray, wall_c: FloatArray, surface_c: FloatArray) -> None:
    """Writes the temperatures that walls settle at under lasting conditions and a lasting room air.

    A draw that has settled stays as it is, however long the others take.
    """
    chains = Chains(walls, surface_c.shape[-1])
    surface_c[:] = now.outside_c[chains.rows]
    wall_c[:] = 0.0
    settled = np.zeros(surface_c.shape[-1], dtype=bool)
    for _ in range(200):
        surfaces, cells = surface_c.copy(), wall_c.copy()
        chains.inward(now, np.inf, wall_c, surface_c)
        chains.outward(air_c, wall_c, surface_c)
        np.copyto(surface_c, surfaces, where=settled)
        np.copyto(wall_c, cells, where=settled)
        settled |= np.abs(surface_c - surfaces).max(axis=0, initial=0.0) < 1e-10
        if settled.all():
            return
