"""Food from its components: Choi and Okos (1986) properties, density, and Levy's conductivity.

Components are water, ice, protein, fat, carbohydrate, fibre and ash. Shares are mass shares that sum to one, and
carbohydrate includes fibre, as food tables print it.
"""

from __future__ import annotations

from typing import Final, Literal, NamedTuple

import numpy as np

from coldbox.errors import OutOfValidity
from coldbox.physics.number import Number

Component = Literal["water", "ice", "protein", "fat", "carbohydrate", "fibre", "ash"]

LOW_C: Final = -40.0
HIGH_C: Final = 150.0


class ComponentProperties(NamedTuple):
    """What one component is like at one temperature."""

    conductivity: Number  # W/mK
    density: Number  # kg/m³
    specific_heat: Number  # J/kgK


# Coefficients of 1, t and t² (t in °C): conductivity W/mK, density kg/m³, specific heat kJ/kgK.
_COEFFICIENTS: Final[dict[str, tuple[tuple[float, float, float], ...]]] = {
    "protein": ((1.7881e-1, 1.1958e-3, -2.7178e-6), (1329.9, -0.51840, 0.0), (2.0082, 1.2089e-3, -1.3129e-6)),
    "fat": ((1.8071e-1, -2.7604e-4, -1.7749e-7), (925.59, -0.41757, 0.0), (1.9842, 1.4733e-3, -4.8008e-6)),
    "carbohydrate": ((2.0141e-1, 1.3874e-3, -4.3312e-6), (1599.1, -0.31046, 0.0), (1.5488, 1.9625e-3, -5.9399e-6)),
    "fibre": ((1.8331e-1, 1.2497e-3, -3.1683e-6), (1311.5, -0.36589, 0.0), (1.8459, 1.8306e-3, -4.6509e-6)),
    "ash": ((3.2962e-1, 1.4011e-3, -2.9069e-6), (2423.8, -0.28063, 0.0), (1.0926, 1.8896e-3, -3.6817e-6)),
    "water": ((5.7109e-1, 1.7625e-3, -6.7036e-6), (997.18, 3.1439e-3, -3.7574e-3), (4.1762, -9.0864e-5, 5.4731e-6)),
    "ice": ((2.2196, -6.2489e-3, 1.0154e-4), (916.89, -0.13071, 0.0), (2.0623, 6.0769e-3, 0.0)),
}
_SUPERCOOLED_WATER: Final = (4.0817, -5.3062e-3, 9.9516e-4)


def choi_okos(component: Component, temperature_c: Number) -> ComponentProperties:
    """Conductivity, density and specific heat of one component of food.

    Polynomials in temperature, k = a + b t + c t², likewise density and specific heat.

    component: water, ice, protein, fat, carbohydrate, fibre or ash. temperature_c: °C, any shape.
    Result: W/mK, kg/m³, J/kgK, each of that shape.
    Valid from -40 to 150 °C; raises OutOfValidity beyond.
    Source: Choi and Okos (1986); ASHRAE Handbook, Refrigeration, chapter Thermal properties of foods, Tables 1 and 2.
    The specific heat of water above 0 °C starts at 4.1762 kJ/kgK, as in the authors' paper: the handbook's 4.1289 lies
    1.2 % below that of liquid water. Below 0 °C it is supercooled water.

    >>> round(choi_okos("water", 20.0).density, 2)
    995.74
    """
    if np.any(np.less(temperature_c, LOW_C)) or np.any(np.greater(temperature_c, HIGH_C)):
        worst = np.min(temperature_c) if np.any(np.less(temperature_c, LOW_C)) else np.max(temperature_c)
        raise OutOfValidity("temperature", float(worst), LOW_C, HIGH_C, "°C", "Choi and Okos (1986)")
    conductivity, density, specific_heat = _COEFFICIENTS[component]
    heat = _polynomial(specific_heat, temperature_c)
    if component == "water":
        heat = np.where(np.less(temperature_c, 0.0), _polynomial(_SUPERCOOLED_WATER, temperature_c), heat)
        heat = heat if heat.ndim else float(heat)
    return ComponentProperties(
        _polynomial(conductivity, temperature_c), _polynomial(density, temperature_c), 1000.0 * heat
    )


def component_specific_heat(
    *, water: Number, protein: Number, fat: Number, carbohydrate: Number, fibre: Number, ash: Number,
    temperature_c: Number = 20.0,
) -> Number:  # fmt: skip
    """Specific heat of unfrozen food, the sum over its components, J/kgK.

    c = Σ x_i c_i

    water … ash: mass shares (carbohydrate includes fibre). temperature_c: °C. All broadcast; so does the result.
    Valid from -40 to 150 °C; raises OutOfValidity beyond.
    Source: Choi and Okos (1986); ASHRAE Handbook, Refrigeration, chapter Thermal properties of foods.
    """
    parts = _parts(water, protein, fat, carbohydrate, fibre, ash)
    total: Number = sum((share * choi_okos(name, temperature_c).specific_heat for name, share in parts), 0.0)
    return total


def density(
    *, water: Number, protein: Number, fat: Number, carbohydrate: Number, fibre: Number, ash: Number,
    ice: Number, temperature_c: Number,
) -> Number:  # fmt: skip
    """Density of the solid stuff of a food, without pores, kg/m³.

    ρ = 1 / Σ (x_i / ρ_i)

    water … ash: mass shares (carbohydrate includes fibre). ice: share of the whole that is ice, part of the water.
    temperature_c: °C. All broadcast; so does the result.
    Valid from -40 to 150 °C; raises OutOfValidity beyond.
    Source: Choi and Okos (1986); ASHRAE Handbook, Refrigeration, chapter Thermal properties of foods.
    """
    parts = _parts(np.subtract(water, ice), protein, fat, carbohydrate, fibre, ash)
    volume = sum((share / choi_okos(name, temperature_c).density for name, share in parts), 0.0)
    volume = volume + ice / choi_okos("ice", temperature_c).density
    return 1.0 / volume


def conductivity(
    *, water: Number, protein: Number, fat: Number, carbohydrate: Number, fibre: Number, ash: Number,
    ice: Number, temperature_c: Number,
) -> Number:  # fmt: skip
    """Conductivity of a food, frozen or not, W/mK.

    The solids lie side by side (k = Σ φ_i k_i by volume share); water with solids, and ice with all of that, mix after
    Levy, `levy`.

    water … ash: mass shares (carbohydrate includes fibre). ice: share of the whole that is ice, part of the water.
    temperature_c: °C. All broadcast; so does the result.
    Valid from -40 to 150 °C, for food without pores; raises OutOfValidity beyond.
    Source: Levy (1981), from memory, with the components of Choi and Okos (1986).
    """
    liquid = np.subtract(water, ice)
    water_k, water_density, _ = choi_okos("water", temperature_c)
    ice_k, ice_density, _ = choi_okos("ice", temperature_c)
    solid_volume: Number = 0.0
    solid_k: Number = 0.0
    for name, share in _parts(0.0, protein, fat, carbohydrate, fibre, ash):
        found = choi_okos(name, temperature_c)
        solid_volume = solid_volume + share / found.density
        solid_k = solid_k + share / found.density * found.conductivity
    water_volume = liquid / water_density
    ice_volume = ice / ice_density
    wet_volume = water_volume + solid_volume
    no_solids = np.equal(solid_volume, 0.0)
    solid_k = np.where(no_solids, water_k, solid_k / np.where(no_solids, 1.0, solid_volume))
    wet_k = levy(solid_k, water_k, solid_volume / np.where(np.equal(wet_volume, 0.0), 1.0, wet_volume))
    return levy(ice_k, wet_k, ice_volume / (ice_volume + wet_volume))


def levy(first: Number, second: Number, first_volume: Number) -> Number:
    """Conductivity of a mixture of two, the same whichever is called the first, W/mK.

    k = k2 [(2+Λ) + 2(Λ-1)F] / [(2+Λ) - (Λ-1)F],  Λ = k1/k2,  σ = (Λ-1)² / [(Λ+1)² + Λ/2],
    F = ½ {(2/σ - 1 + 2φ) - sqrt[(2/σ - 1 + 2φ)² - 8φ/σ]},  φ the volume share of the first

    first, second: conductivities k1 and k2, W/mK, above 0. first_volume: φ, 0..1. All broadcast.
    Raises OutOfValidity for a conductivity that is not above 0 or a share outside 0..1.
    Source: Levy (1981), a Maxwell-Eucken equation made symmetric; from memory.

    >>> round(float(levy(2.0, 0.5, 0.3)), 6) == round(float(levy(0.5, 2.0, 0.7)), 6)
    True
    """
    if not (np.all(np.greater(first, 0.0)) and np.all(np.greater(second, 0.0))):
        worst = float(min(np.min(first), np.min(second)))
        raise OutOfValidity("conductivity", worst, 0.0, np.inf, "W/mK", "Levy (1981)")
    if not np.all((np.greater_equal(first_volume, -1e-12)) & (np.less_equal(first_volume, 1.0 + 1e-12))):
        outside = float(np.ravel(first_volume)[int(np.argmax(np.abs(np.ravel(first_volume) - 0.5)))])
        raise OutOfValidity("the volume share", outside, 0.0, 1.0, "", "Levy (1981)")
    ratio = first / second
    # With y = 1/σ the root reads ½ (b - sqrt(b² - 8 φ y)) = 4 φ y / (b + sqrt(…)); times σ above and below, equal
    # conductivities (σ = 0) need no case of their own.
    sigma = (ratio - 1.0) ** 2 / ((ratio + 1.0) ** 2 + 0.5 * ratio)
    b = 2.0 - sigma + 2.0 * sigma * first_volume
    share = 4.0 * first_volume / (b + np.sqrt(b * b - 8.0 * sigma * first_volume))
    mixed: Number = second * ((2.0 + ratio) + 2.0 * (ratio - 1.0) * share) / ((2.0 + ratio) - (ratio - 1.0) * share)
    return mixed


def _parts(
    water: Number, protein: Number, fat: Number, carbohydrate: Number, fibre: Number, ash: Number
) -> tuple[tuple[Component, Number], ...]:
    return (
        ("water", water),
        ("protein", protein),
        ("fat", fat),
        ("carbohydrate", np.subtract(carbohydrate, fibre)),
        ("fibre", fibre),
        ("ash", ash),
    )


def _polynomial(coefficients: tuple[float, float, float], x: Number) -> Number:
    constant, linear, square = coefficients
    return constant + x * (linear + x * square)
