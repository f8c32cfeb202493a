"""Heat content, temperature and thawed share of goods and packs, many side by side and in place.

Heat content e counts from the freezing point, thawed: e = h(t) - h(t_f), J/kg.

- Chen: e < 0: e = b (t - t_f) + L t_f (1/t - 1/t_f), of which t is one root of a quadratic; thawed share r = t_f/t;
- plateau: L and b w within w below t_f, b t below, c_a t above; r by the latent heat taken up.

A step needs the slope c = de/dt. The slope of now would be wrong for what leaves a plateau within the step: the flow
would be taken as if the plateau went on, and the temperature overshoot. So where the change foreseen from the flows of
now crosses a kink (or runs far along Chen's curve while freezing) the smaller of slope and secant is taken.
"""

from __future__ import annotations

from collections.abc import Sequence
from typing import Final

import numpy as np
from numpy.typing import NDArray

from coldbox.physics.number import FloatArray, Number
from coldbox.physics.validity import within
from coldbox.timeline.types import Curve, CurvePart

NARROWEST_K: Final = 0.01  # a plateau needs some width for its curve to have an inverse
FAR: Final = 0.05  # share of its distance from 0 °C that frozen goods may cool in a step on one slope
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
    """One curve at work on its rows of a stack; keeps the arrays it needs."""

    def __init__(self, curve: Curve, shape: tuple[int, ...]) -> None:
        self.rows = slice(curve.first, curve.first + curve.count)
        self.chen = curve.chen
        self.point = curve.freezing_point_c
        self.above, self.below = curve.specific_heat_above, curve.specific_heat_below
        self.latent, self.over = curve.latent_heat, curve.melts_over_k
        self.plateau = self.latent + self.below * self.over
        self.per_above, self.per_below = 1.0 / self.above, 1.0 / self.below
        own = (*shape[:-2], curve.count, shape[-1])
        self.work, self.cold = np.empty(own), np.empty(own)
        self._thawed = True  # whether anything may be above its freezing point
        self.half = 0.5 / self.below
        self.middle = self.half * (self.below * self.point + self.latent)
        self.root = self.latent * self.point / self.below
        self.sharp = -self.latent / self.point if self.chen else self.latent
        # Chen's |c t| is nowhere below this, so a smaller change is never a far one.
        self.gentle = -FAR * float(np.min(2.0 * np.sqrt(self.below * self.latent * np.abs(self.point))))

    def update(self, content: FloatArray, temperature: FloatArray, slope: FloatArray, thawed: FloatArray) -> None:
        """Temperature °C, slope J/kgK and thawed share of (…, row, draw) contents, written in place."""
        if self.chen:
            self._update_chen(content, temperature, slope, thawed)
        else:
            self._update_plateau(content, temperature, slope, thawed)

    def _update_chen(self, content: FloatArray, temperature: FloatArray, slope: FloatArray, thawed: FloatArray) -> None:
        work = self.work
        self._thawed = any_warm = content.size > 0 and bool(content.max() > 0.0)
        cold = np.minimum(content, 0.0, out=self.cold) if any_warm else content
        np.multiply(cold, self.half, out=work)
        work += self.middle
        np.multiply(work, work, out=temperature)
        temperature -= self.root
        np.sqrt(temperature, out=temperature)
        np.subtract(work, temperature, out=temperature)
        np.divide(self.point, temperature, out=thawed)
        np.multiply(thawed, thawed, out=slope)
        slope *= self.sharp
        slope += self.below
        if any_warm:
            np.copyto(slope, self.above, where=content > 0.0)
            np.subtract(content, cold, out=work)
            work *= self.per_above
            temperature += work

    def _update_plateau(
        self, content: FloatArray, temperature: FloatArray, slope: FloatArray, thawed: FloatArray
    ) -> None:
        work, cold = self.work, self.cold
        np.minimum(content, 0.0, out=cold)
        np.subtract(content, cold, out=temperature)
        temperature *= self.per_above
        temperature += self.point
        np.maximum(cold, -self.plateau, out=work)
        cold -= work
        cold *= self.per_below
        temperature += cold
        np.divide(work, self.plateau, out=thawed)
        np.multiply(thawed, self.over, out=work)
        temperature += work
        thawed += 1.0
        np.copyto(slope, self.plateau / self.over)
        np.copyto(slope, self.above, where=content >= 0.0)
        np.copyto(slope, self.below, where=content <= -self.plateau)

    def lessen(self, content: FloatArray, change: FloatArray, temperature: FloatArray, slope: FloatArray) -> None:
        """The slope, in place, made the secant where `change` (J/kg, foreseen) leaves what the slope holds for."""
        if not content.size:
            return
        work, kinked = np.add(content, change, out=self.work), None
        if self._thawed:
            np.multiply(work, content, out=self.cold)
            if self.cold.min() < 0.0:
                kinked = self.cold < 0.0
        elif work.max() > 0.0:
            kinked = work > 0.0
        if self.chen:
            if change.min() < self.gentle:
                far = (content <= 0.0) & (change < FAR * slope * temperature)
                kinked = far if kinked is None else kinked | far
        else:
            work += self.plateau
            np.add(content, self.plateau, out=self.cold)
            work *= self.cold
            if work.min() < 0.0:
                crossed = work < 0.0
                kinked = crossed if kinked is None else kinked | crossed
        if kinked is not None:
            where = np.nonzero(kinked)
            self._secant(where, content, change, temperature, slope)

    def _secant(
        self, where: tuple[NDArray[np.intp], ...], content: FloatArray, change: FloatArray, temperature: FloatArray,
        slope: FloatArray,
    ) -> None:  # fmt: skip
        step = change[where]
        then = content[where] + step

        def figure(array: FloatArray) -> FloatArray:
            return np.asarray(np.broadcast_to(array, content.shape)[where])

        cold = np.minimum(then, 0.0)
        found = np.maximum(then, 0.0) * figure(self.per_above)
        if self.chen:
            middle = cold * figure(self.half) + figure(self.middle)
            found += middle - np.sqrt(middle * middle - figure(self.root))
        else:
            plateau = figure(self.plateau)
            melting = np.maximum(cold, -plateau)
            found += figure(self.point) + melting / plateau * figure(self.over)
            found += (cold - melting) * figure(self.per_below)
        rise = np.abs(found - temperature[where])
        secant = np.abs(step) / np.maximum(rise, 1e-30)
        slope[where] = np.minimum(slope[where], secant)
