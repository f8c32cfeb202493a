"""Lots as bodies with an inside: cells from core to surface, all lots and draws at once.

A step asks three things of a lot: from the state of now temperatures, potentials and slopes; a sweep from the core
that leaves the surface cell's rise as u + v (rise of the air); and, once that is known, all rises, from which the heat
contents follow by the very slopes of the sweep, so that what flowed is what is stored. Between cells heat goes by the
conduction potential, which never runs uphill when a cell freezes and conducts better.

Where a slope did not hold for the whole way, through a melting point say, the step goes on from where it came to
(Newton's method on the heat contents): the end of the step then agrees with itself, and nothing overshoots.
"""

from __future__ import annotations

from collections.abc import Sequence
from typing import Final

import numpy as np
from numpy.typing import NDArray

from coldbox.physics.number import FloatArray, Number
from coldbox.physics.validity import within
from coldbox.timeline import curves
from coldbox.timeline.curves import Melting, rows
from coldbox.timeline.types import ConductivityPart, Curve, LotPart, Lots

POWERS: Final = {"slab": 1, "cylinder": 2, "sphere": 3}
CELLS: Final = 20
# How far beyond its points a rate of respiration is taken along (as physics.respiration has it); from there it stays.
BELOW_K: Final = 30.0
ABOVE_K: Final = 15.0
GRADED: Final = 1.5
HELD_K: Final = 5e-4  # a slope held when temperature came out as it had it, within this
SURFACE_ROUNDS: Final = 20
SURFACE_K: Final = 1e-6

_METHOD = "A body in cells"


def stack(parts: Sequence[LotPart], draws: int, cells: int = CELLS) -> Lots:
    """Lots side by side, those of Chen's curve first; `order` leads from the parts to the rows.

    Raises OutOfValidity for a mass below 0, or a size, density, film or conductivity that is not above 0.
    """
    order = sorted(range(len(parts)), key=lambda i: not parts[i].curve.chen)
    parts = [parts[i] for i in order]
    for part in parts:
        within(part.mass, 0.0, np.inf, quantity=f"the mass of {part.name}", unit="kg", method=_METHOD)
        for value, what in ((part.half_thickness, "half thickness"), (part.density, "density"), (part.film, "film")):
            within(value, 1e-12, 1e12, quantity=f"the {what} of {part.name}", unit="", method=_METHOD)
        within(
            part.conductivity.warm, 1e-9, 1e9, quantity=f"the conductivity of {part.name}", unit="W/mK", method=_METHOD
        )
    share = np.zeros((cells, len(parts), 1))
    face = np.zeros((cells, len(parts), draws))
    # Thinner towards the surface, where temperatures change first and most.
    edges = 1.0 - np.linspace(1.0, 0.0, cells + 1) ** GRADED
    for i, part in enumerate(parts):
        power = POWERS[part.shape]
        share[:, i, 0] = np.diff(edges**power)
        # Face area per kg of the lot over the distance of centres, the last to the surface.
        area = power * edges[1:] ** (power - 1) / np.diff(np.append(0.5 * (edges[1:] + edges[:-1]), 1.0))
        face[:, i] = area[:, None] / np.ravel(part.density * np.square(part.half_thickness))
    groups = curves.stack([part.curve for part in parts], draws)
    return Lots(
        labels=tuple(part.name for part in parts),
        order=tuple(int(i) for i in np.argsort(order)),
        mass=_full([part.mass for part in parts], draws),
        content=np.repeat(contents(groups, [part.start_c for part in parts], draws)[None], cells, axis=0),
        share=share,
        face=face,
        film=rows([POWERS[part.shape] * part.film / (part.density * part.half_thickness) for part in parts], draws),
        curves=groups,
        conductivity=_conductivities([part.conductivity for part in parts], draws),
        living=tuple(i for i, part in enumerate(parts) if part.respiration_at_c),
        respiration=tuple(
            (rows(part.respiration_at_c, draws), rows(part.respiration_w_per_kg, draws))
            for part in parts
            if part.respiration_at_c
        ),
    )  # fmt: skip


def contents(
    groups: Sequence[Curve], temperatures_c: Sequence[Number], draws: int, frozen: Sequence[Number] | None = None
) -> FloatArray:
    """Heat content of each row at its temperature, (row, draw) J/kg."""
    made = np.empty((len(temperatures_c), draws))
    for group in groups:
        for i in range(group.count):
            row = group.first + i
            made[row] = curves.content(group, i, temperatures_c[row], None if frozen is None else frozen[row])
    return made


def _full(values: Sequence[Number], draws: int) -> FloatArray:
    return np.array(np.broadcast_to(rows(values, draws), (len(values), draws)))


def _conductivities(parts: Sequence[ConductivityPart], draws: int) -> FloatArray:
    """Coefficients of 1, r, r² from those of 1, r - 1, (r - 1)²: (3, lot, draw)."""
    return np.array(
        [
            _full([part.warm - part.linear + part.square for part in parts], draws),
            _full([part.linear - 2.0 * part.square for part in parts], draws),
            _full([part.square for part in parts], draws),
        ]
    )


class Respiration:
    """Heat of what lives by its temperature, log-linear between points; frozen goods give off none."""

    def __init__(self, lots: Lots) -> None:
        self.rows = lots.living
        self.notes: set[str] = set()
        self._labels = lots.labels
        self._points = lots.respiration
        self._freezing = [_freezing_point(lots, row) for row in lots.living]

    def add(self, flow: FloatArray, share: FloatArray, temperature: FloatArray) -> FloatArray:
        """Adds share x heat to the flows (cell, lot, draw) of what lives; gives the heat, (living, draw) W/kg."""
        total = []
        for row, (at_c, w_per_kg), freezing in zip(self.rows, self._points, self._freezing, strict=True):
            own = temperature[:, row]
            low, high = at_c[0] - BELOW_K, at_c[-1] + ABOVE_K
            if np.any(own > high):
                self.notes.add(
                    f"respiration of {self._labels[row]} stays as it is at {float(np.min(high)):g} °C above that"
                )
            held = np.clip(own, low, high)
            logs = np.log(w_per_kg)
            slopes = np.diff(logs, axis=0) / np.diff(at_c, axis=0)
            line = logs[0] + slopes[0] * (held - at_c[0])
            for i in range(1, len(slopes)):
                line += (slopes[i] - slopes[i - 1]) * np.maximum(held - at_c[i], 0.0)
            heat = np.exp(line, out=line)
            heat *= own >= freezing
            heat *= share[:, row]
            flow[:, row] += heat
            total.append(heat.sum(axis=0))
        return np.array(total)


def _freezing_point(lots: Lots, row: int) -> FloatArray:
    for group in lots.curves:
        if group.first <= row < group.first + group.count:
            point: FloatArray = group.freezing_point_c[row - group.first]
            return np.where(group.latent_heat[row - group.first] > 0.0, point, -np.inf)
    raise IndexError(row)


class Bodies:
    """All lots at work: their temperatures, potentials and slopes of now, and the sweep of a step."""

    def __init__(self, lots: Lots, draws: int) -> None:
        cells, count = lots.share.shape[:2]
        shape = (cells, count, draws)
        self.lots, self.shape = lots, shape
        self.temperature, self.potential, self.slope = np.empty(shape), np.empty(shape), np.empty(shape)
        self.work = np.empty(shape)
        self.conductance = np.empty(shape[1:])  # from the last cell to the air, W/(kg K)
        self.surface_c = np.empty(shape[1:])  # of the goods, under film and wrap
        self.last_k = np.empty(shape[1:])  # conductivity of the last cell, W/mK
        self.respired = np.zeros((len(lots.living), draws))
        self.respiration = Respiration(lots)
        self._looked = False
        self._expected = np.empty(shape)  # potentials as the slopes have them
        self._before = np.empty(shape)  # heat contents at the start of the step
        self._again = False
        self._melting = [Melting(curve, shape, lots.conductivity) for curve in lots.curves]
        self._allowed = HELD_K * lots.conductivity.sum(axis=0)
        # Conductances of a cell to both its neighbours; that of the last to the air is added at each step.
        self._both = np.zeros(lots.face.shape)
        self._both[:-1] += lots.face[:-1]
        self._both[1:] += lots.face[:-1]
        # Of each cell: right-hand side, diagonal, and the conductance outwards; then (u, -v) of rise = u + v rise_next.
        self._matrix = np.empty((cells, 3, count, draws))
        self._solved = np.empty((cells, 2, count, draws))
        self._pair = np.empty((2, count, draws))

    def look(self, content: FloatArray, air_c: FloatArray) -> None:
        """Everything of now from heat contents (cell, lot, draw) and the room air (draw,)."""
        self._update(content)
        self.meet(air_c)

    def _update(self, content: FloatArray) -> None:
        for melting in self._melting:
            own = melting.rows
            melting.update(content[:, own], self.temperature[:, own], self.potential[:, own], self.slope[:, own])
            self.last_k[own] = melting.conductivity(self.temperature[-1, own])

    def meet(self, air_c: FloatArray) -> None:
        """Surfaces: film (T_air - T_s) = face (Φ(T_s) - Φ_last), by Newton's method from where they were."""
        if not self.shape[1]:
            return
        film, near = self.lots.film, self.lots.face[-1]
        last_c, last = self.temperature[-1], self.potential[-1]
        surface = self.surface_c
        if not self._looked:
            surface[:], self._looked = last_c, True
        potential, k = np.empty_like(surface), np.empty_like(surface)
        moving = np.ones(surface.shape, dtype=bool)
        for _ in range(SURFACE_ROUNDS):
            for melting in self._melting:
                own = melting.rows
                found, k[own] = melting.at(surface[own])
                np.copyto(potential[own], found, where=moving[own])
            step = (film * (air_c - surface) - near * (potential - last)) / (film + near * k)
            step *= moving
            surface += step
            moving &= np.abs(step) >= SURFACE_K
            if not moving.any():
                break
        # What joins the last cell to the air, per kelvin between them: the film and the way to it in series.
        between = last_c - surface
        alike = np.abs(between) < 1e-6
        through = np.where(alike, self.last_k, (last - potential) / np.where(alike, 1.0, between))
        through *= near
        np.divide(through * film, through + film, out=self.conductance)

    def begin(self, content: FloatArray) -> None:
        """Keeps the heat contents that the step starts from."""
        self._before[:] = content
        self._again = False

    def outward(self, content: FloatArray, air_c: FloatArray, step_s: float) -> tuple[FloatArray, FloatArray]:
        """Sweep from the core to the surface: the last cell warms by u + v (rise of the air); both (lot, draw) in K.

        content: where the step has come to; air_c: of the start of the step, from which the air's rise counts.
        """
        face, matrix, solved, work = self.lots.face, self._matrix, self._solved, self.work
        flow, diagonal = matrix[:, 0], matrix[:, 1]
        np.subtract(self.potential[1:], self.potential[:-1], out=work[:-1])
        work[:-1] *= face[:-1]
        np.multiply(self.conductance, air_c - self.temperature[-1], out=work[-1])
        flow[0] = work[0]
        np.subtract(work[1:], work[:-1], out=flow[1:])
        if self.respiration.rows:
            self.respired = self.respiration.add(flow, self.lots.share, self.temperature)
        if self._again:
            np.subtract(content, self._before, out=work)
            work *= self.lots.share / step_s
            flow -= work
        np.multiply(self.slope, self.lots.share / step_s, out=diagonal)
        diagonal += self._both
        diagonal[-1] += self.conductance / self.last_k
        # (u, -v) throughout: then both rows of the elimination are one multiplication and one addition.
        np.negative(face, out=matrix[:, 2])
        np.negative(self.conductance, out=matrix[-1, 2])
        pair = self._pair
        np.divide(matrix[0, ::2], matrix[0, 1], out=solved[0])
        for i in range(1, self.shape[0]):
            np.multiply(face[i - 1], solved[i - 1], out=pair)
            matrix[i, :2] += pair
            np.divide(matrix[i, ::2], matrix[i, 1], out=solved[i])
        return solved[-1, 0] / self.last_k, solved[-1, 1] / -self.last_k

    def inward(self, air_rise: FloatArray, moving: NDArray[np.bool_], content: FloatArray) -> NDArray[np.bool_]:
        """Sweep back to the core with the rise of the air known; heat contents of `moving` draws written in place.

        Gives the draws whose slopes held; temperatures, potentials and slopes are those of the new contents.
        """
        solved, rise = self._solved, self.work
        beyond = air_rise
        for i in range(self.shape[0] - 1, -1, -1):
            np.multiply(solved[i, 1], beyond, out=rise[i])
            np.subtract(solved[i, 0], rise[i], out=rise[i])
            beyond = rise[i]
        if self._again:
            rise *= moving
        self._again = True
        expected = np.add(self.potential, rise, out=self._expected)
        rise *= self.slope
        content += rise
        self._update(content)
        expected -= self.potential
        np.abs(expected, out=expected)
        return np.asarray((expected.max(axis=0, initial=0.0) <= self._allowed).all(axis=0))
