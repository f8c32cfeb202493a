"""A lot as goods: how much heat is in them at each temperature, and what they give off while they live."""

from __future__ import annotations

from collections.abc import Callable
from typing import Final

import numpy as np

from coldbox.errors import BadProject, OutOfValidity, Problem
from coldbox.physics import food, food_components, respiration
from coldbox.physics.number import Number
from coldbox.project.model import Composition, Lot
from coldbox.record import Record

DRY: Final = 0.2  # with no more free water than this and no freezing point, nothing freezes
ROUNDING_K: Final = 1e-9  # goods at their freezing point are not yet frozen, whatever units the figures came in
NEVER_FREEZING_C: Final = 0.0  # goods of unknown freezing point are only computed above this


class Curve(Record):
    """Enthalpy against temperature: rising everywhere, so it has an inverse. J/kg, 0 at -40 °C."""

    method: str
    source: str  # key into tables/sources.toml

    def enthalpy(self, temperature_c: Number) -> Number:
        """J/kg at a temperature in °C; the shape of the argument. Raises OutOfValidity."""
        raise NotImplementedError

    def temperature(self, enthalpy_j_per_kg: Number) -> Number:
        """°C at an enthalpy in J/kg; the shape of the argument. Raises OutOfValidity."""
        raise NotImplementedError

    def heat_capacity(self, temperature_c: Number) -> Number:
        """Slope of the enthalpy, freezing included, J/kgK, at a temperature in °C. Raises OutOfValidity."""
        raise NotImplementedError


class ChenCurve(Curve):
    """From composition and initial freezing point."""

    method: str = "Chen enthalpy"
    source: str = "chen-1985"
    water: Number
    protein: Number
    freezing_point_c: Number
    specific_heat_above: Number

    def enthalpy(self, temperature_c: Number) -> Number:
        return food.enthalpy(temperature_c, **self._figures())

    def temperature(self, enthalpy_j_per_kg: Number) -> Number:
        return food.temperature(enthalpy_j_per_kg, **self._figures())

    def heat_capacity(self, temperature_c: Number) -> Number:
        return food.apparent_heat_capacity(temperature_c, **self._figures())

    def _figures(self) -> dict[str, Number]:
        return {
            "water": self.water,
            "protein": self.protein,
            "freezing_point_c": self.freezing_point_c,
            "specific_heat_above": self.specific_heat_above,
        }


class QuotedCurve(Curve):
    """From two specific heats, a latent heat and a freezing point."""

    method: str = "quoted heats"
    source: str = "ashrae-r-loads"
    specific_heat_above: Number
    specific_heat_below: Number
    latent_heat: Number
    freezing_point_c: Number

    def enthalpy(self, temperature_c: Number) -> Number:
        return food.quoted_enthalpy(temperature_c, **self._figures())

    def temperature(self, enthalpy_j_per_kg: Number) -> Number:
        return food.quoted_temperature(enthalpy_j_per_kg, **self._figures())

    def heat_capacity(self, temperature_c: Number) -> Number:
        return food.quoted_heat_capacity(temperature_c, **self._figures())

    def _figures(self) -> dict[str, Number]:
        return {
            "specific_heat_above": self.specific_heat_above,
            "specific_heat_below": self.specific_heat_below,
            "latent_heat": self.latent_heat,
            "freezing_point_c": self.freezing_point_c,
        }


class SensibleCurve(Curve):
    """From one specific heat, where nothing freezes between `low_c` and `high_c`."""

    method: str = "specific heat"
    source: str = "ashrae-r-loads"
    specific_heat: Number
    low_c: float
    high_c: float

    def enthalpy(self, temperature_c: Number) -> Number:
        self._check(temperature_c)
        return self.specific_heat * np.subtract(temperature_c, food.REFERENCE_C)

    def temperature(self, enthalpy_j_per_kg: Number) -> Number:
        found = enthalpy_j_per_kg / self.specific_heat + food.REFERENCE_C
        self._check(found)
        return found

    def heat_capacity(self, temperature_c: Number) -> Number:
        self._check(temperature_c)
        return self.specific_heat + np.zeros_like(temperature_c)

    def _check(self, temperature_c: Number) -> None:
        slack = 1e-9
        low, high = float(np.min(temperature_c)), float(np.max(temperature_c))
        if not (low >= self.low_c - slack and high <= self.high_c + slack):
            worst = high if low >= self.low_c - slack else low
            raise OutOfValidity("temperature", worst, self.low_c, self.high_c, "°C", "One specific heat")


class Goods(Record):
    """The heat of one lot, per kg. Everything broadcasts with the lot's own figures."""

    curve: Curve
    freezing_point_c: Number | None  # None: nothing in it freezes, or nobody said where
    lives: bool
    respiration_source: str  # key into tables/sources.toml
    at_c: tuple[Number, ...]
    w_per_kg: tuple[Number, ...]
    composition: Composition | None
    quoted_conductivity: Number | None
    quoted_density: Number | None

    @property
    def method(self) -> str:
        """Name of the method of the enthalpy curve."""
        return self.curve.method

    @property
    def source(self) -> str:
        """Source of that method, a key into tables/sources.toml."""
        return self.curve.source

    def enthalpy(self, temperature_c: Number) -> Number:
        """J/kg at a temperature in °C, 0 at -40 °C. Raises OutOfValidity."""
        return self.curve.enthalpy(temperature_c)

    def temperature(self, enthalpy_j_per_kg: Number) -> Number:
        """°C at an enthalpy in J/kg: the inverse of `enthalpy`. Raises OutOfValidity."""
        return self.curve.temperature(enthalpy_j_per_kg)

    def heat_capacity(self, temperature_c: Number) -> Number:
        """Slope of the enthalpy, freezing included, J/kgK, at a temperature in °C. Raises OutOfValidity."""
        return self.curve.heat_capacity(temperature_c)

    def respiration_w_per_kg(self, temperature_c: Number) -> Number:
        """Heat of respiration, W/kg, at a temperature in °C; 0 for what does not live, and for what is frozen.

        Raises OutOfValidity far beyond the points, as `physics.respiration.heat` does.
        """
        if not self.lives:
            return np.zeros_like(temperature_c) if np.ndim(temperature_c) else 0.0
        if self.freezing_point_c is None:
            return respiration.heat(self.at_c, self.w_per_kg, temperature_c)
        frozen = np.less(temperature_c, self.freezing_point_c - ROUNDING_K)
        awake = np.where(frozen, self.at_c[0], temperature_c)
        result = np.where(frozen, 0.0, respiration.heat(self.at_c, self.w_per_kg, awake))
        return result if result.ndim else float(result)

    def ice_fraction(self, temperature_c: Number) -> Number:
        """Ice, kg per kg, at a temperature in °C; 0 where nothing freezes. Raises OutOfValidity.

        On the curve from quoted figures all that freezes does so within 0.1 K below the freezing point.
        """
        if isinstance(self.curve, ChenCurve):
            curve = self.curve
            return food.ice_fraction(
                temperature_c, water=curve.water, protein=curve.protein, freezing_point_c=curve.freezing_point_c
            )
        if isinstance(self.curve, QuotedCurve):
            frozen = np.clip((self.curve.freezing_point_c - temperature_c) / food.FREEZES_OVER_K, 0.0, 1.0)
            return frozen * (self.curve.latent_heat / food.FUSION)
        return 0.0 * np.asarray(temperature_c)

    def conductivity(self, temperature_c: Number) -> Number | None:
        """W/mK at a temperature in °C: as given, or Levy's from the composition; None where neither is known."""
        return self._by_composition(food_components.conductivity, self.quoted_conductivity, temperature_c)

    def density(self, temperature_c: Number) -> Number | None:
        """kg/m³ at a temperature in °C: as given, or from the composition; None where neither is known."""
        return self._by_composition(food_components.density, self.quoted_density, temperature_c)

    def _by_composition(
        self, method: Callable[..., Number], quoted: Number | None, temperature_c: Number
    ) -> Number | None:
        if quoted is not None:
            return quoted + np.zeros_like(temperature_c)
        if self.composition is None:
            return None
        ice = np.minimum(self.ice_fraction(temperature_c), self.composition.water)
        return method(**dict(self.composition), ice=ice, temperature_c=temperature_c)


def goods(lot: Lot) -> Goods:
    """The heat of a lot: Chen's curve from its composition, or its quoted figures where they say more.

    A quoted specific heat above freezing alone replaces only that part of Chen's curve; a quoted specific heat below
    freezing or latent heat makes the handbook's curve, what is missing filled in from the composition (334 kJ per kg of
    water; the sum of water and solids below freezing). Without a freezing point there is one specific heat: at every
    temperature for dry goods, else only above 0 °C. Raises OutOfValidity when asked outside that.
    """
    return Goods(
        curve=_curve(lot),
        freezing_point_c=lot.freezing_point,
        lives=bool(lot.respiration),
        respiration_source="usda-ah-66",
        at_c=tuple(point.at_c for point in lot.respiration),
        w_per_kg=tuple(point.w_per_kg for point in lot.respiration),
        composition=lot.composition,
        quoted_conductivity=lot.conductivity,
        quoted_density=lot.density,
    )


def _curve(lot: Lot) -> Curve:
    made, point = lot.composition, lot.freezing_point
    above, below, latent = lot.specific_heat_above, lot.specific_heat_below, lot.latent_heat
    if above is None and made is not None:
        above = food.unfrozen_specific_heat(**dict(made))
    if point is None and above is not None:
        source = "choi-okos-1986" if lot.specific_heat_above is None else "ashrae-r-loads"
        low = food.QUOTED_LOW_C if _dry(lot) else NEVER_FREEZING_C
        return SensibleCurve(specific_heat=above, low_c=low, high_c=food.HIGH_C, source=source)
    if point is not None:
        if made is not None and above is not None:
            if below is None and latent is None:
                return ChenCurve(
                    water=made.water, protein=made.protein, freezing_point_c=point, specific_heat_above=above
                )
            below = food.frozen_specific_heat(made.water) if below is None else below
            latent = food.latent_heat(made.water) if latent is None else latent
        if above is not None and below is not None and latent is not None:
            return QuotedCurve(
                specific_heat_above=above, specific_heat_below=below, latent_heat=latent, freezing_point_c=point
            )
        if above is not None:
            return SensibleCurve(specific_heat=above, low_c=float(np.max(point)), high_c=food.HIGH_C)
        if below is not None:
            return SensibleCurve(specific_heat=below, low_c=food.QUOTED_LOW_C, high_c=float(np.min(point)))
    text = "Nothing tells its heat: give a product, a composition with a freezing point, or its specific heats."
    raise BadProject([Problem(text, path=f"lots.{lot.name}")])


def _dry(lot: Lot) -> bool:
    """Whether goods without a freezing point are sure never to freeze: said so by a latent heat of 0, or too dry."""
    if lot.latent_heat is not None:
        return not np.any(lot.latent_heat)
    made = lot.composition
    return made is not None and bool(np.all(np.less_equal(made.water - food.bound_water(made.protein), DRY)))
