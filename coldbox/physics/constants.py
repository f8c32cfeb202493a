"""Physical constants. None can be made without its unit and its source."""

from __future__ import annotations

from typing import Self


class Constant(float):
    """A number of nature or of a standard, with its unit and the key of its source in tables/sources.toml."""

    __slots__ = ("source", "unit")

    unit: str
    source: str

    def __new__(cls, value: float, *, unit: str, source: str) -> Self:
        if not unit or not source:
            raise TypeError(f"The constant {value:g} needs a unit and a source.")
        made = super().__new__(cls, value)
        made.unit, made.source = unit, source
        return made

    def __repr__(self) -> str:
        return f"Constant({float(self)!r}, unit={self.unit!r}, source={self.source!r})"


# 0 °C on the thermodynamic scale.
ZERO_CELSIUS = Constant(273.15, unit="K", source="si-2019")
STEFAN_BOLTZMANN = Constant(5.670374419e-8, unit="W/(m²·K⁴)", source="codata-2018")
# Standard gravity, by definition.
GRAVITY = Constant(9.80665, unit="m/s²", source="si-2019")
# Standard atmosphere, by definition.
STANDARD_PRESSURE = Constant(101325.0, unit="Pa", source="si-2019")
# Dry air, M = 28.966 g/mol; and the ratio of the molar masses of water and dry air.
GAS_CONSTANT_DRY_AIR = Constant(287.042, unit="J/(kg·K)", source="ashrae-f-psychrometrics")
WATER_TO_AIR_MASS = Constant(0.621945, unit="kg/kg", source="ashrae-f-psychrometrics")
# Enthalpy of moist air: h = 1006 t + W (2 501 000 + 1860 t).
SPECIFIC_HEAT_DRY_AIR = Constant(1006.0, unit="J/(kg·K)", source="ashrae-f-psychrometrics")
SPECIFIC_HEAT_VAPOUR = Constant(1860.0, unit="J/(kg·K)", source="ashrae-f-psychrometrics")
LATENT_EVAPORATION = Constant(2.501e6, unit="J/kg", source="ashrae-f-psychrometrics")
# Water and ice beside it.
SPECIFIC_HEAT_WATER = Constant(4186.0, unit="J/(kg·K)", source="ashrae-f-psychrometrics")
SPECIFIC_HEAT_ICE = Constant(2100.0, unit="J/(kg·K)", source="ashrae-f-psychrometrics")
# Of pure water at 0 °C.
LATENT_FUSION = Constant(333430.0, unit="J/kg", source="iapws-06")
# Dry ice subliming at one atmosphere, and where it does.
LATENT_SUBLIMATION_CO2 = Constant(571000.0, unit="J/kg", source="dry-ice-figures")
SUBLIMATION_CO2_C = Constant(-78.5, unit="°C", source="dry-ice-figures")
