"""Latin hypercube draws of a project: the middle first, then as many equally likely boxes as asked for."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Final

import numpy as np

from coldbox.physics.number import FloatArray, Number
from coldbox.project.draw import with_values
from coldbox.project.model import Project
from coldbox.record import Record
from coldbox.spread.inputs import ENTHALPY, FILMS, Column, Target, columns
from coldbox.spread.normal import TWO_SIDED_95, below, quantile

_HEATS: Final = (".specific_heat_above", ".specific_heat_below", ".latent_heat")
_NO_SPREAD: Final[FloatArray] = np.array(1.0)


class Draws(Record):
    """A project drawn `count` times."""

    project: Project  # every input at its middle
    count: int
    seed: int
    columns: tuple[Column, ...]
    ranks: Mapping[str, FloatArray]  # by column key: the share of its distribution below each draw, (count,)
    values: Mapping[str, FloatArray]  # by key path, in SI: the middle and each draw, (1 + count,)
    enthalpy: FloatArray  # factor on all heat contents of goods, (1 + count,) or one figure
    films: FloatArray  # factor on the conductance of all films, likewise

    def part(self, start: int, stop: int) -> Project:
        """The middle, then the draws start..stop counted from 1 (stop not among them), as arrays (1 + draws, 1)."""
        return with_values(self.project, {path: self._rows(one, start, stop) for path, one in self.values.items()})

    def enthalpy_of(self, start: int, stop: int) -> Number:
        """The factor on heat contents for the same draws: (1 + draws, 1), or a figure."""
        return self._rows(self.enthalpy, start, stop) if self.enthalpy.ndim else float(self.enthalpy)

    def films_of(self, start: int, stop: int) -> Number:
        """The factor on films for the same draws: (1 + draws, 1), or a figure."""
        return self._rows(self.films, start, stop) if self.films.ndim else float(self.films)

    def _rows(self, values: FloatArray, start: int, stop: int) -> FloatArray:
        return np.concatenate((values[:1], values[start:stop]))[:, np.newaxis]


def draws(project: Project, count: int, seed: int) -> Draws:
    """Draws of every unsure input of a project.

    project: complete, without draws. count: 1 or more. seed: 0 or more.
    Result: the same for the same three, whatever the order of things in the file. Raises ValueError for a count below 1
    or a seed below 0.
    """
    if count < 1 or seed < 0:
        raise ValueError(f"{count} draws, seed {seed}")
    found = columns(project)
    ranks = {column.key: hypercube_column(column.key, count, seed) for column in found}
    values: dict[str, FloatArray] = {}
    for column in found:
        for target in column.targets:
            values[target.path] = _with_middle(target, column.shape, ranks[column.key])
    enthalpy, films = values.pop(ENTHALPY, _NO_SPREAD), values.pop(FILMS, _NO_SPREAD)
    _keep_own(project, values, enthalpy, films)
    _wet_bulb(project, values)
    return Draws(
        project=project, count=count, seed=seed, columns=found, ranks=ranks, values=values, enthalpy=enthalpy,
        films=films,
    )  # fmt: skip


def hypercube_column(key: str, count: int, seed: int) -> FloatArray:
    """One draw in each of `count` equal strata of 0..1, mixed, (count,).

    u_i = (π(i) + r_i) / count, π a random order and r even in 0..1, both made by seed, key and count alone.
    Source: McKay, Beckman and Conover 1979, Technometrics 21.
    """
    rng = np.random.default_rng([seed, *key.encode("utf-8")])
    order = rng.permutation(count)
    inside: FloatArray = rng.random(count)
    # Never the bounds themselves: there a normal distribution has no value.
    return np.clip((order + inside) / count, 0.25 / count, 1.0 - 0.25 / count)


def drawn(target: Target, shape: str, ranks: FloatArray) -> FloatArray:
    """What lies at these shares of a target's distribution, cut at its bounds, the shape of `ranks`.

    normal: m + s Φ⁻¹(Φ(a) + u (Φ(b) - Φ(a))), s = half-width / 1.96, a and b the bounds in standard deviations;
    even: from the lower to the upper end within the bounds.
    """
    if shape == "even":
        low = max(target.middle - target.half_width, target.low)
        high = min(target.middle + target.half_width, target.high)
        return low + ranks * (high - low)
    deviation = target.half_width / TWO_SIDED_95
    low, high = (below((end - target.middle) / deviation) for end in (target.low, target.high))
    found = target.middle + deviation * quantile(low + ranks * (high - low))
    return np.clip(found, target.low, target.high)  # rounding alone reaches beyond


def _with_middle(target: Target, shape: str, ranks: FloatArray) -> FloatArray:
    found = np.concatenate(([target.middle], drawn(target, shape, ranks)))
    if not target.quoted:
        return found
    resistance = target.quoted / found + target.films
    return 1.0 / resistance if target.per_resistance else resistance


def _keep_own(project: Project, values: dict[str, FloatArray], enthalpy: FloatArray, films: FloatArray) -> None:
    """Takes the factors off again where the file gives a ± of its own, which stands for the whole."""
    for path in project.spreads:
        if not path.startswith(("lots", "packs")):
            continue
        factor = films if path.endswith(".air_film") else enthalpy if path.endswith(_HEATS) else _NO_SPREAD
        if factor.ndim and path in values:
            values[path] = values[path] / factor


def _wet_bulb(project: Project, values: dict[str, FloatArray]) -> None:
    """The wet bulb belongs to the dry bulb: it moves along, or, drawn itself, stays at most as high."""
    site, dry = project.site, values.get("site.dry_bulb")
    if site is None or site.wet_bulb is None or dry is None:
        return
    own = values.get("site.wet_bulb")
    values["site.wet_bulb"] = float(site.wet_bulb) + dry - dry[0] if own is None else np.minimum(own, dry)
