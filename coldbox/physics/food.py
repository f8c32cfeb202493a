"""Heat content of food: one enthalpy curve through freezing, its slope and its inverse.

Two curves, both 0 at -40 °C, continuous and rising everywhere, so that each has an inverse:

- Chen (1985): from composition and initial freezing point; ice fraction, enthalpy and heat capacity are one model here
  (the enthalpy falls by 333.6 kJ for each kg that freezes, the heat capacity is the slope of the enthalpy);
- quoted: two specific heats, a latent heat and a freezing point, as handbooks add them up.

Functions take the temperature (or the enthalpy) first and everything else by name. All broadcast.
"""

from __future__ import annotations

from typing import Final

import numpy as np

from coldbox.errors import OutOfValidity
from coldbox.physics.food_components import component_specific_heat
from coldbox.physics.number import Number

REFERENCE_C: Final = -40.0  # enthalpy is 0 here
FUSION: Final = 333_600.0  # J/kg, of water at 0 °C, the figure Chen's equations carry
HANDBOOK_FUSION: Final = 334_000.0  # J/kg, the figure behind printed latent heats of foods
LOW_C: Final = -45.0
HIGH_C: Final = 100.0
QUOTED_LOW_C: Final = -90.0
FREEZES_LOW_C: Final = -20.0  # initial freezing points of foods lie between these
FREEZES_HIGH_C: Final = -0.01
FREEZES_OVER_K: Final = 0.1  # the quoted curve gives off its latent heat within this below the freezing point
BOUND_PER_PROTEIN: Final = 0.4  # kg of water that never freezes per kg of protein
MOSTLY_WATER: Final = 0.5  # share of water from which Chen's short equation for unfrozen food is used

_CHEN = "Chen (1985)"
_QUOTED = "The curve from quoted specific heats"


def bound_water(protein: Number) -> Number:
    """Water that never freezes, kg per kg of food.

    x_b = 0.4 x_protein

    protein: mass share, any shape. Result: the same shape. Valid for foods, shares 0..1; raises nothing.
    Source: ASHRAE Handbook, Refrigeration, chapter Thermal properties of foods, after Schwartzberg (1976).
    """
    return BOUND_PER_PROTEIN * protein


def latent_heat(water: Number) -> Number:
    """Latent heat of a food as handbooks print it, J/kg: as if all its water froze.

    L = 334 kJ/kg · x_w

    water: mass share 0..1, any shape. Result: the same shape. Raises nothing.
    Source: ASHRAE Handbook, Refrigeration, chapter Thermal properties of foods, Table 3.
    """
    return HANDBOOK_FUSION * water


def frozen_specific_heat(water: Number) -> Number:
    """Specific heat of a food well below freezing, by its water alone, J/kgK.

    c = 2.1 x_w + 0.84 (1 - x_w) kJ/kgK

    water: mass share 0..1, any shape. Result: the same shape. For foods that hold more water than fat. Raises nothing.
    Source: Earle, Unit operations in food processing, appendix 7. It stands in where a specific heat below freezing is
    not quoted although a latent heat is.
    """
    return 840.0 + 1260.0 * water


def chen_unfrozen_specific_heat(water: Number) -> Number:
    """Specific heat of unfrozen food by its solids alone, J/kgK.

    c_u = 4.19 - 2.30 x_s - 0.628 x_s³ kJ/kgK,  x_s = 1 - x_w

    water: mass share, any shape. Result: the same shape. For foods of half water or more. Raises nothing.
    Source: Chen (1985); ASHRAE Handbook, Refrigeration, chapter Thermal properties of foods.
    """
    solids = np.subtract(1.0, water)
    return 1000.0 * (4.19 - solids * (2.30 + 0.628 * solids * solids))


def unfrozen_specific_heat(
    *, water: Number, protein: Number, fat: Number, carbohydrate: Number, fibre: Number, ash: Number
) -> Number:
    """Specific heat of unfrozen food, J/kgK.

    Chen's c_u where at least half of the food is water; the sum over the components at 20 °C where less is: Chen's
    equation sees only solids, and fat (butter, cheese, chocolate) would come out 7 to 25 % low.

    water … ash: mass shares (carbohydrate includes fibre). All broadcast; so does the result. Raises nothing.
    Source: Chen (1985), as in the handbook's worked example of freezing beef, and Choi and Okos (1986).
    """
    short = chen_unfrozen_specific_heat(water)
    if np.all(np.greater_equal(water, MOSTLY_WATER)):
        return short
    summed = component_specific_heat(
        water=water, protein=protein, fat=fat, carbohydrate=carbohydrate, fibre=fibre, ash=ash
    )
    return _plain(np.where(np.greater_equal(water, MOSTLY_WATER), short, summed))


def ice_fraction(temperature_c: Number, *, water: Number, protein: Number, freezing_point_c: Number) -> Number:
    """Ice in a food, kg per kg of food.

    x_ice = (x_w - x_b)(1 - t_f / t) below t_f, 0 above

    temperature_c: t, °C. water, protein: mass shares. freezing_point_c: t_f, initial freezing point, °C.
    Valid from -45 to 100 °C, t_f from -20 to -0.01 °C, water not below bound water; raises OutOfValidity beyond.
    Source: Chen (1985), with bound water of 0.4 of the protein.
    """
    freezable = _freezable(water, protein, freezing_point_c)
    _within(temperature_c, LOW_C, HIGH_C, _CHEN)
    return freezable * (1.0 - freezing_point_c / np.minimum(temperature_c, freezing_point_c))


def enthalpy(
    temperature_c: Number, *, water: Number, protein: Number, freezing_point_c: Number,
    specific_heat_above: Number | None = None,
) -> Number:  # fmt: skip
    """Enthalpy of a food from its composition, J/kg, 0 at -40 °C.

    t ≤ t_f: h = (t - t_r) [1.55 + 1.26 x_s - (x_w - x_b) L0 t_f / (t_r t)] kJ/kg,  t_r = -40 °C, L0 = 333.6 kJ/kg
    t > t_f: h = h(t_f) + c_u (t - t_f)

    temperature_c: t, °C. water, protein: mass shares. freezing_point_c: t_f, °C. specific_heat_above: c_u, J/kgK; None:
    Chen's own, `chen_unfrozen_specific_heat`.
    Valid from -45 to 100 °C, t_f from -20 to -0.01 °C, water not below bound water; raises OutOfValidity beyond.
    Source: Chen (1985); ASHRAE Handbook, Refrigeration, chapter Thermal properties of foods.

    >>> round(float(enthalpy(-20.0, water=0.5821, protein=0.1748, freezing_point_c=-1.7)))
    48793
    """
    freezable = _freezable(water, protein, freezing_point_c)
    _within(temperature_c, LOW_C, HIGH_C, _CHEN)
    above = chen_unfrozen_specific_heat(water) if specific_heat_above is None else specific_heat_above
    cold = np.minimum(temperature_c, freezing_point_c)
    base = _chen_base(water)
    frozen = (cold - REFERENCE_C) * (base - FUSION / REFERENCE_C * freezable * freezing_point_c / cold)
    return frozen + above * (temperature_c - cold)


def temperature(
    enthalpy_j_per_kg: Number, *, water: Number, protein: Number, freezing_point_c: Number,
    specific_heat_above: Number | None = None,
) -> Number:  # fmt: skip
    """Temperature of a food of a given enthalpy, °C: the inverse of `enthalpy`, in closed form.

    Below freezing Chen's equation times t is a quadratic in t, of which one root is negative.

    enthalpy_j_per_kg: J/kg from -40 °C. water, protein, freezing_point_c, specific_heat_above: as for `enthalpy`.
    Valid where the temperature found lies from -45 to 100 °C; raises OutOfValidity beyond.
    Source: Chen (1985).
    """
    freezable = _freezable(water, protein, freezing_point_c)
    above = chen_unfrozen_specific_heat(water) if specific_heat_above is None else specific_heat_above
    base = _chen_base(water)
    slope = FUSION * freezable * freezing_point_c  # a negative number, J K/kg
    at_freezing = (freezing_point_c - REFERENCE_C) * (base - slope / (REFERENCE_C * freezing_point_c))
    cold = np.minimum(enthalpy_j_per_kg, at_freezing)
    half = 0.5 * (slope / REFERENCE_C + base * REFERENCE_C + cold)
    found = (half - np.sqrt(half * half - base * slope)) / base + (enthalpy_j_per_kg - cold) / above
    _within(found, LOW_C, HIGH_C, _CHEN)
    return found


def apparent_heat_capacity(
    temperature_c: Number, *, water: Number, protein: Number, freezing_point_c: Number,
    specific_heat_above: Number | None = None,
) -> Number:  # fmt: skip
    """Slope of the enthalpy with temperature, freezing included, J/kgK.

    t ≤ t_f: c = 1.55 + 1.26 x_s - (x_w - x_b) L0 t_f / t² kJ/kgK;  t > t_f: c_u

    temperature_c: t, °C. water, protein, freezing_point_c, specific_heat_above: as for `enthalpy`, whose exact
    derivative this is; validity and errors too.
    Source: Chen (1985).
    """
    freezable = _freezable(water, protein, freezing_point_c)
    _within(temperature_c, LOW_C, HIGH_C, _CHEN)
    above = chen_unfrozen_specific_heat(water) if specific_heat_above is None else specific_heat_above
    cold = np.minimum(temperature_c, freezing_point_c)
    frozen = _chen_base(water) - FUSION * freezable * freezing_point_c / (cold * cold)
    return _plain(np.where(np.greater(temperature_c, freezing_point_c), above, frozen))


def quoted_enthalpy(
    temperature_c: Number, *, specific_heat_above: Number, specific_heat_below: Number, latent_heat: Number,
    freezing_point_c: Number,
) -> Number:  # fmt: skip
    """Enthalpy from quoted figures, J/kg, 0 at -40 °C.

    h = c_a max(t - t_f, 0) + c_b min(t - t_f, 0) + L s(t), less its value at -40 °C;
    s rises evenly from 0 at t_f - 0.1 K to 1 at t_f.

    The latent heat leaves within 0.1 K below the freezing point, so that h(warm) - h(frozen) is exactly the handbooks'
    c_a (t_warm - t_f) + L + c_b (t_f - t_frozen), and the curve still has an inverse.

    temperature_c: t, °C. specific_heat_above, specific_heat_below: c_a, c_b, J/kgK. latent_heat: L, J/kg.
    freezing_point_c: t_f, °C. Valid from -90 to 100 °C; raises OutOfValidity beyond.
    Source: ASHRAE Handbook, Refrigeration, chapter Refrigerated-facility loads, product load.

    >>> figures = dict(specific_heat_above=4187.0, specific_heat_below=2100.0, latent_heat=334e3, freezing_point_c=0.0)
    >>> round(float(quoted_enthalpy(15.0, **figures) - quoted_enthalpy(-0.1, **figures)) - 210)
    396805
    """
    _within(temperature_c, QUOTED_LOW_C, HIGH_C, _QUOTED)
    past = np.subtract(temperature_c, freezing_point_c)
    below = np.minimum(past, 0.0)
    melted = np.maximum(below / FREEZES_OVER_K, -1.0)
    at_reference = specific_heat_below * (REFERENCE_C - freezing_point_c) - latent_heat
    return specific_heat_above * (past - below) + specific_heat_below * below + latent_heat * melted - at_reference


def quoted_temperature(
    enthalpy_j_per_kg: Number, *, specific_heat_above: Number, specific_heat_below: Number, latent_heat: Number,
    freezing_point_c: Number,
) -> Number:  # fmt: skip
    """Temperature from quoted figures, °C: the inverse of `quoted_enthalpy`, in closed form.

    enthalpy_j_per_kg: J/kg from -40 °C. The rest as for `quoted_enthalpy`.
    Valid where the temperature found lies from -90 to 100 °C; raises OutOfValidity beyond.
    Source: as for `quoted_enthalpy`.
    """
    at_freezing = latent_heat - specific_heat_below * (REFERENCE_C - freezing_point_c)
    past = np.subtract(enthalpy_j_per_kg, at_freezing)
    plateau = latent_heat + specific_heat_below * FREEZES_OVER_K
    frozen = np.minimum(past + plateau, 0.0)
    melting = np.minimum(past, 0.0) - frozen
    found = (
        freezing_point_c
        + np.maximum(past, 0.0) / specific_heat_above
        + melting * (FREEZES_OVER_K / plateau)
        + frozen / specific_heat_below
    )
    _within(found, QUOTED_LOW_C, HIGH_C, _QUOTED)
    return found


def quoted_heat_capacity(
    temperature_c: Number, *, specific_heat_above: Number, specific_heat_below: Number, latent_heat: Number,
    freezing_point_c: Number,
) -> Number:  # fmt: skip
    """Slope of the curve from quoted figures, freezing included, J/kgK.

    c_a above t_f; c_b + L / 0.1 K within 0.1 K below it; c_b further down.

    Its exact derivative, so arguments, validity and errors are as for `quoted_enthalpy`.
    Source: as for `quoted_enthalpy`.
    """
    _within(temperature_c, QUOTED_LOW_C, HIGH_C, _QUOTED)
    past = np.subtract(temperature_c, freezing_point_c)
    below = np.where(past >= -FREEZES_OVER_K, specific_heat_below + latent_heat / FREEZES_OVER_K, specific_heat_below)
    return _plain(np.where(past > 0.0, specific_heat_above, below))


def _chen_base(water: Number) -> Number:
    """Heat capacity of the frozen food without what still freezes, J/kgK."""
    return 1000.0 * (1.55 + 1.26 * np.subtract(1.0, water))


def _freezable(water: Number, protein: Number, freezing_point_c: Number) -> Number:
    """Water that can freeze, kg/kg, once it is sure that Chen's equations hold."""
    freezable = water - bound_water(protein)
    if np.any(np.less(freezable, 0.0)):
        raise OutOfValidity("water less bound water", float(np.min(freezable)), 0.0, 1.0, "kg/kg", _CHEN)
    if np.any(np.less(freezing_point_c, FREEZES_LOW_C)) or np.any(np.greater(freezing_point_c, FREEZES_HIGH_C)):
        low = np.any(np.less(freezing_point_c, FREEZES_LOW_C))
        worst = float(np.min(freezing_point_c) if low else np.max(freezing_point_c))
        raise OutOfValidity("the initial freezing point", worst, FREEZES_LOW_C, FREEZES_HIGH_C, "°C", _CHEN)
    return freezable


def _within(temperature_c: Number, low: float, high: float, method: str) -> None:
    """Raises OutOfValidity unless every temperature lies between `low` and `high`."""
    slack = 1e-9
    if np.any(np.less(temperature_c, low - slack)):
        raise OutOfValidity("temperature", float(np.min(temperature_c)), low, high, "°C", method)
    if np.any(np.greater(temperature_c, high + slack)):
        raise OutOfValidity("temperature", float(np.max(temperature_c)), low, high, "°C", method)


def _plain(value: Number) -> Number:
    """A float where numpy made an array without a dimension."""
    return value if np.ndim(value) else float(value)
