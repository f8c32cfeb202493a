"""Heat content, temperature and conduction potential of goods and packs, many side by side and in place.

Heat content e counts from the freezing point, thawed: e = h(t) - h(t_f), J/kg. So does the potential, Φ = ∫ k dt from
t_f, W/m (Kirchhoff's): heat between two cells is face (Φ_2 - Φ_1), whatever the conductivity does on the way.

- Chen: e < 0: e = b (t - t_f) + L t_f (1/t - 1/t_f), of which t is one root of a quadratic; r = t_f/t is thawed;
  k = q0 + q1 r + q2 r², so Φ = q0 (t - t_f) - q1 t_f ln r - q2 t_f (r - 1);
- plateau: L and b w within w below t_f, b t below, c_a t above; k of thawed and frozen goods, their mean between.

A step asks for the slope de/dΦ along which heat content and potential go together near where they are.
"""

from __future__ import annotations

from collections.abc import Sequence
from typing import Final

import numpy as np

from coldbox.physics.number import FloatArray, Number
from coldbox.physics.validity import within
from coldbox.timeline.types import Curve, CurvePart

NARROWEST_K: Final = 0.01  # a plateau needs some width for its curve to have an inverse
NO_CONDUCTION: Final = np.array([1.0, 0.0, 0.0]).reshape(3, 1, 1)  # of a lump: its potential is its temperature
_BLOCK: Final = "Heat content of goods and packs"


def stack(parts: Sequence[CurvePart], draws: int) -> tuple[Curve, ...]:
    """Curves of parts that are sorted, Chen's first. Raises OutOfValidity for a slope that is not above 0."""
    count = sum(part.chen for part in parts)
    groups = []
    for first, group in ((0, parts[:count]), (count, parts[count:])):
        if not group:
            continue
        chen = group[0].chen
        point = rows([part.freezing_point_c for part in group], draws)
        above = rows([part.specific_heat_above for part in group], draws)
        below = rows([part.specific_heat_below for part in group], draws)
        latent = rows([part.latent_heat for part in group], draws)
        for value, what in ((above, "the specific heat above freezing"), (below, "the specific heat below freezing")):
            within(value, 1e-3, 1e6, quantity=what, unit="J/kgK", method=_BLOCK)
        within(latent, 0.0, 1e7, quantity="the latent heat", unit="J/kg", method=_BLOCK)
        if chen:
            within(point, -40.0, -1e-6, quantity="the freezing point", unit="°C", method="Chen (1985)")
        over = np.maximum(rows([part.melts_over_k for part in group], draws), NARROWEST_K)
        groups.append(
            Curve(chen=chen, first=first, count=len(group), freezing_point_c=point, specific_heat_above=above,
                  specific_heat_below=below, latent_heat=latent, melts_over_k=over)
        )  # fmt: skip
    return tuple(groups)


def rows(values: Sequence[Number], draws: int) -> FloatArray:
    """Numbers, each one figure or one per draw in any shape, as (row, draw); (row, 1) where no draw differs."""
    flat = [np.ravel(np.asarray(value, dtype=np.float64)) for value in values]
    width = draws if any(value.size > 1 for value in flat) else 1
    return np.array([np.broadcast_to(value, (width,)) for value in flat]).reshape(len(flat), width)


def content(curve: Curve, row: int, temperature_c: Number, frozen: Number | None = None) -> FloatArray:
    """J/kg from the freezing point of one row of a curve, (draw,).

    temperature_c: °C, a figure or one per draw. frozen: share of a plateau that is frozen, where the temperature lies
    within it; None: by the temperature, evenly over the plateau's width.
    """
    point, above, below, latent = (
        array[row]
        for array in (curve.freezing_point_c, curve.specific_heat_above, curve.specific_heat_below, curve.latent_heat)
    )
    given = np.ravel(temperature_c)
    cold = np.minimum(given, point)
    warm = above * (given - cold)
    if curve.chen:
        return np.asarray(warm + below * (cold - point) + latent * (point / cold - 1.0))
    over = curve.melts_over_k[row]
    plateau = latent + below * over
    past = cold - point
    by_temperature = warm + plateau * np.maximum(past / over, -1.0) + below * np.minimum(past + over, 0.0)
    if frozen is None:
        return np.asarray(by_temperature)
    within_it = (past >= -over * (1.0 + 1e-9)) & (given <= point)
    return np.asarray(np.where(within_it, -plateau * np.ravel(frozen), by_temperature))


class Melting:
    """One curve at work on its rows of a stack; keeps the arrays it needs.

    conductivity: (3, row, draw) coefficients of 1, r, r² for all rows of the stack.
    """

    def __init__(self, curve: Curve, shape: tuple[int, ...], conductivity: FloatArray = NO_CONDUCTION) -> None:
        self.rows = slice(curve.first, curve.first + curve.count)
        self.chen = curve.chen
        self.point = curve.freezing_point_c
        self.above, self.below = curve.specific_heat_above, curve.specific_heat_below
        self.latent, self.over = curve.latent_heat, curve.melts_over_k
        self.plateau = self.latent + self.below * self.over
        self.per_above, self.per_below = 1.0 / self.above, 1.0 / self.below
        own = (*shape[:-2], curve.count, shape[-1])
        self._work, self._cold, self._thawed_share = np.empty(own), np.empty(own), np.empty(own)
        q0, q1, q2 = conductivity if conductivity is NO_CONDUCTION else conductivity[:, self.rows]
        self.q0, self.q1, self.q2 = q0, q1, q2
        self.k_warm, self.k_cold = q0 + q1 + q2, np.asarray(q0)
        self.k_melting = 0.5 * (self.k_warm + self.k_cold)
        if self.chen:
            self.half = 0.5 / self.below
            self.middle = self.half * (self.below * self.point + self.latent)
            self.root = self.latent * self.point / self.below
            self.sharp = -self.latent / self.point

    def update(self, content: FloatArray, temperature: FloatArray, potential: FloatArray, slope: FloatArray) -> None:
        """Temperature °C, potential W/m and slope de/dΦ of (…, row, draw) contents, written in place."""
        if content.size == 0:
            return
        (self._update_chen if self.chen else self._update_plateau)(content, temperature, potential, slope)

    def _update_chen(
        self, content: FloatArray, temperature: FloatArray, potential: FloatArray, slope: FloatArray
    ) -> None:
        work, r = self._work, self._thawed_share
        if content.min() >= 0.0:
            np.multiply(content, self.per_above, out=temperature)
            np.multiply(temperature, self.k_warm, out=potential)
            temperature += self.point
            np.copyto(slope, self.above / self.k_warm)
            return
        warm = bool(content.max() > 0.0)
        cold = np.minimum(content, 0.0, out=self._cold) if warm else content
        np.multiply(cold, self.half, out=work)
        work += self.middle
        np.multiply(work, work, out=temperature)
        temperature -= self.root
        np.sqrt(temperature, out=temperature)
        np.subtract(work, temperature, out=temperature)
        np.divide(self.point, temperature, out=r)
        # Potential: q0 (t - t_f) - t_f (q1 ln r + q2 (r - 1)).
        np.log(r, out=potential)
        potential *= self.q1
        np.multiply(r, self.q2, out=work)
        potential += work
        potential -= self.q2
        potential *= -self.point
        np.subtract(temperature, self.point, out=slope)
        slope *= self.q0
        potential += slope
        # Slope: (b - L/t_f r²) / (q0 + q1 r + q2 r²); work holds q2 r.
        work += self.q1
        work *= r
        work += self.q0
        np.multiply(r, r, out=slope)
        slope *= self.sharp
        slope += self.below
        slope /= work
        if warm:
            thawed = content >= 0.0
            np.copyto(slope, self.above / self.k_warm, where=thawed)
            np.multiply(content, self.per_above, out=work)
            np.multiply(work, self.k_warm, out=potential, where=thawed)
            np.add(work, self.point, out=temperature, where=thawed)

    def _update_plateau(
        self, content: FloatArray, temperature: FloatArray, potential: FloatArray, slope: FloatArray
    ) -> None:
        work, cold = self._work, self._cold
        np.minimum(content, 0.0, out=cold)
        np.subtract(content, cold, out=temperature)
        temperature *= self.per_above
        np.multiply(temperature, self.k_warm, out=potential)
        temperature += self.point
        np.maximum(cold, -self.plateau, out=work)
        cold -= work
        cold *= self.per_below
        temperature += cold
        cold *= self.k_cold
        potential += cold
        work *= self.over / self.plateau
        temperature += work
        work *= self.k_melting
        potential += work
        np.copyto(slope, self.plateau / (self.over * self.k_melting))
        np.copyto(slope, self.above / self.k_warm, where=content >= 0.0)
        np.copyto(slope, self.below / self.k_cold, where=content <= -self.plateau)

    def frozen(self, content: FloatArray) -> FloatArray:
        """Share of a plateau's heat that is still to be taken up, 0..1, of (row, draw) contents."""
        return np.asarray(np.clip(-content / self.plateau, 0.0, 1.0))

    def conductivity(self, temperature: FloatArray) -> FloatArray:
        """W/mK at (row, draw) temperatures °C."""
        if self.chen:
            r = self.point / np.minimum(temperature, self.point)
            return np.asarray(self.q0 + r * (self.q1 + r * self.q2))
        past = temperature - self.point
        return np.where(past >= 0.0, self.k_warm, np.where(past > -self.over, self.k_melting, self.k_cold))

    def at(self, temperature: FloatArray) -> tuple[FloatArray, FloatArray]:
        """Potential W/m and conductivity W/mK at (row, draw) temperatures °C."""
        past, k = temperature - self.point, self.conductivity(temperature)
        warm = np.maximum(past, 0.0)
        if self.chen:
            r = self.point / np.minimum(temperature, self.point)
            cold = self.q0 * (past - warm) - self.point * (self.q1 * np.log(r) + self.q2 * (r - 1.0))
            return self.k_warm * warm + cold, k
        melting = np.clip(past, -self.over, 0.0)
        cold = self.k_melting * melting + self.k_cold * (past - warm - melting)
        return self.k_warm * warm + cold, k
