"""Lots as bodies with an inside: cells from core to surface, all lots and draws at once.

A step asks three things of a lot: from the state of now the conductances, the explicit flows and the slopes; a sweep
from the core that leaves the surface cell's rise as u + v (rise of the air); and, once that is known, all rises, from
which the heat contents follow by the very slopes of the sweep, so that what flowed is what is stored.
"""

from __future__ import annotations

from collections.abc import Sequence
from typing import Final

import numpy as np

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
    edges = np.linspace(0.0, 1.0, cells + 1)
    for i, part in enumerate(parts):
        power = POWERS[part.shape]
        share[:, i, 0] = np.diff(edges**power)
        # Face area per kg of the lot over the distance of centres; the last face is half a cell away.
        area = power * edges[1:] ** (power - 1) * cells
        area[-1] *= 2.0
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
    """All lots at work: their temperatures, slopes and conductances of now, and the sweep of a step."""

    def __init__(self, lots: Lots, draws: int) -> None:
        cells, count = lots.share.shape[:2]
        shape = (cells, count, draws)
        self.lots, self.shape = lots, shape
        self.temperature, self.slope, self.thawed = np.empty(shape), np.empty(shape), np.empty(shape)
        self.conductance = np.empty(shape)  # to the next cell, last: to the air; W/(kg K)
        self.work = np.empty(shape)
        self.to_surface = np.empty(shape[1:])  # from the last cell to the surface, W/(kg K)
        self.respired = np.zeros((len(lots.living), draws))
        self.respiration = Respiration(lots)
        self._melting = [Melting(curve, shape) for curve in lots.curves]
        self._half_face = 0.5 * lots.face[:-1]
        self._per_share = 1.0 / lots.share
        # Of each cell: right-hand side, diagonal, and the conductance outwards; then (u, v) of rise = u + v rise_next.
        self._matrix = np.empty((cells, 3, count, draws))
        self._solved = np.empty((cells, 2, count, draws))
        self._pair = np.empty((2, count, draws))

    def look(self, content: FloatArray) -> None:
        """Temperatures, slopes, thawed shares and conductances of now from heat contents."""
        for melting in self._melting:
            own = melting.rows
            melting.update(content[:, own], self.temperature[:, own], self.slope[:, own], self.thawed[:, own])
        constant, linear, square = self.lots.conductivity
        k = np.multiply(self.thawed, square, out=self.work)
        k += linear
        k *= self.thawed
        k += constant
        np.add(k[:-1], k[1:], out=self.conductance[:-1])
        self.conductance[:-1] *= self._half_face
        near, film = np.multiply(k[-1], self.lots.face[-1], out=self.to_surface), self.lots.film
        np.divide(near * film, near + film, out=self.conductance[-1])

    def surface_c(self, air_c: FloatArray) -> FloatArray:
        """Temperature of the goods' surfaces under film and wrap, (lot, draw) °C."""
        near, film = self.to_surface, self.lots.film
        return np.asarray((near * self.temperature[-1] + film * air_c) / (near + film))

    def outward(self, content: FloatArray, air_c: FloatArray, step_s: float) -> tuple[FloatArray, FloatArray]:
        """Sweep from the core to the surface: the last cell rises by u + v (rise of the air); both (lot, draw)."""
        conductance, temperature, matrix, solved = self.conductance, self.temperature, self._matrix, self._solved
        work, flow = self.work, matrix[:, 0]
        np.subtract(temperature[1:], temperature[:-1], out=work[:-1])
        np.subtract(air_c, temperature[-1], out=work[-1])
        work *= conductance
        flow[0] = work[0]
        np.subtract(work[1:], work[:-1], out=flow[1:])
        if self.respiration.rows:
            self.respired = self.respiration.add(flow, self.lots.share, temperature)
        np.multiply(flow, step_s * self._per_share, out=work)
        for melting in self._melting:
            own = melting.rows
            melting.lessen(content[:, own], work[:, own], temperature[:, own], self.slope[:, own])
        diagonal = matrix[:, 1]
        np.multiply(self.slope, self.lots.share / step_s, out=diagonal)
        diagonal += conductance
        diagonal[1:] += conductance[:-1]
        # (u, -v) throughout: then both rows of the elimination are one multiplication and one addition.
        np.negative(conductance, out=matrix[:, 2])
        pair = self._pair
        np.divide(matrix[0, ::2], matrix[0, 1], out=solved[0])
        for i in range(1, self.shape[0]):
            np.multiply(conductance[i - 1], solved[i - 1], out=pair)
            matrix[i, :2] += pair
            np.divide(matrix[i, ::2], matrix[i, 1], out=solved[i])
        return solved[-1, 0], -solved[-1, 1]

    def inward(self, air_rise: FloatArray, content: FloatArray) -> None:
        """Sweep back to the core with the rise of the air known; heat contents are written in place."""
        solved, rise = self._solved, self.work
        beyond = air_rise
        for i in range(self.shape[0] - 1, -1, -1):
            np.multiply(solved[i, 1], beyond, out=rise[i])
            np.subtract(solved[i, 0], rise[i], out=rise[i])
            beyond = rise[i]
        rise *= self.slope
        content += rise
