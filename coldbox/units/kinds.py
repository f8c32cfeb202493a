"""The kinds of quantity: one declaration each of what may be typed, how it is kept, and how it is shown."""

from __future__ import annotations

from collections.abc import Mapping
from typing import NamedTuple

from coldbox.record import Record
from coldbox.units.atoms import (
    AREA,
    BTU,
    DEGREE_F,
    ENERGY,
    FLOW,
    FOOT,
    INCH,
    LENGTH,
    MASS,
    NONE,
    POUND,
    POWER,
    PRESSURE,
    SPEED,
    TEMPERATURE,
    TIME,
    VOLUME,
    Dims,
)

DAY = 86400.0
HOUR = 3600.0


class Display(NamedTuple):
    """One unit to show in: kept value = shown x factor + offset; used from that size of the kept value on."""

    unit: str
    factor: float = 1.0
    offset: float = 0.0
    start: float = 0.0


class Kind(Record):
    """A kind of quantity."""

    name: str
    label: str  # with its article, "a length"
    examples: tuple[str, ...] = ()  # SI first, IP second
    reader: str = "quantity"  # which reader of `grammar` takes it
    dims: Dims = NONE
    si: str = ""  # the unit of the value kept
    scale: float = 1.0  # kept value = SI base value / scale
    suffix: str = ""  # of JSON keys
    si_display: tuple[Display, ...] = ()
    ip_display: tuple[Display, ...] = ()
    digits: int = 4  # significant ones shown
    compound: bool = False  # several units in a row, "5 ft 6 in"


_CONDUCTIVITY: Dims = (1, 1, -3, -1)
_RESISTANCE: Dims = (0, -1, 3, 1)
_TRANSMITTANCE: Dims = (0, 1, -3, -1)
R_VALUE = FOOT**2 * DEGREE_F * HOUR / BTU  # m²K/W in one ft²·°F·h/Btu

_ALL = (
    Kind(
        name="length",
        label="a length",
        examples=("900 mm", "36 in"),
        dims=LENGTH,
        si="m",
        suffix="_m",
        compound=True,
        si_display=(Display("mm", 1e-3), Display("m", start=1.0)),
        ip_display=(Display("in", INCH), Display("ft", FOOT, start=FOOT)),
    ),
    Kind(
        name="area",
        label="an area",
        examples=("12 m²", "130 ft²"),
        dims=AREA,
        si="m²",
        suffix="_m2",
        si_display=(Display("m²"),),
        ip_display=(Display("ft²", FOOT**2),),
    ),
    Kind(
        name="volume",
        label="a volume",
        examples=("28 m³", "1000 ft³"),
        dims=VOLUME,
        si="m³",
        suffix="_m3",
        si_display=(Display("L", 1e-3), Display("m³", start=1.0)),
        ip_display=(Display("ft³", FOOT**3),),
    ),
    Kind(
        name="temperature",
        label="a temperature",
        examples=("-18 °C", "0 °F"),
        reader="temperature",
        dims=TEMPERATURE,
        si="°C",
        suffix="_c",
        si_display=(Display("°C"),),
        ip_display=(Display("°F", DEGREE_F, -32 * DEGREE_F),),
    ),
    Kind(
        name="difference",
        label="a temperature difference",
        examples=("9 K", "16 °F"),
        reader="difference",
        dims=TEMPERATURE,
        si="K",
        suffix="_k",
        si_display=(Display("K"),),
        ip_display=(Display("°F", DEGREE_F),),
    ),
    Kind(
        name="power",
        label="a power",
        examples=("400 W", "12 000 Btu/h", "2.5 ton"),
        dims=POWER,
        si="W",
        suffix="_w",
        si_display=(Display("W"), Display("kW", 1e3, start=1e3)),
        ip_display=(Display("Btu/h", BTU / HOUR),),
    ),
    Kind(
        name="mass",
        label="a mass",
        examples=("500 kg", "1100 lb"),
        dims=MASS,
        si="kg",
        suffix="_kg",
        compound=True,
        si_display=(Display("g", 1e-3), Display("kg", start=1.0)),
        ip_display=(Display("oz", POUND / 16), Display("lb", POUND, start=POUND)),
    ),
    *(
        Kind(
            name=name,
            label="a mass per day",
            examples=("900 kg/day", "2000 lb/day"),
            dims=(0, 1, -1, 0),
            si=si,
            scale=scale,
            suffix=suffix,
            si_display=(Display("kg/day", 1 / DAY / scale),),
            ip_display=(Display("lb/day", POUND / DAY / scale),),
        )
        for name, si, scale, suffix in (
            ("mass_rate", "kg/s", 1.0, "_kg_per_s"),
            ("mass_per_day", "kg/s", 1.0, "_kg_per_s"),
            ("moisture_rate", "kg/day", 1 / DAY, "_kg_per_day"),
            ("mass_a_day", "kg/day", 1 / DAY, "_kg_per_day"),
        )
    ),
    Kind(
        name="rate",
        label="a rate",
        examples=("20/h", "200/day"),
        reader="rate",
        dims=(0, 0, -1, 0),
        si="1/s",
        suffix="_per_s",
        si_display=(
            Display("/h", 1 / HOUR),
            Display("/day", 1 / DAY),
        ),
        ip_display=(
            Display("/h", 1 / HOUR),
            Display("/day", 1 / DAY),
        ),
    ),
    Kind(
        name="daily_duration",
        label="a time per day",
        examples=("20 min/day", "1.5 h/day"),
        reader="daily_duration",
        si="s/s",
        suffix="_s_per_s",
        si_display=(
            Display("min/h", 60 / HOUR),
            Display("min/day", 60 / DAY),
        ),
        ip_display=(
            Display("min/h", 60 / HOUR),
            Display("min/day", 60 / DAY),
        ),
    ),
    Kind(
        name="duration",
        label="a duration",
        examples=("30 min", "12 s", "1 h 30 min"),
        dims=TIME,
        si="s",
        suffix="_s",
        compound=True,
        si_display=(
            Display("s"),
            Display("min", 60.0, start=60.0),
            Display("h", HOUR, start=HOUR),
        ),
        ip_display=(
            Display("s"),
            Display("min", 60.0, start=60.0),
            Display("h", HOUR, start=HOUR),
        ),
    ),
    Kind(
        name="share",
        label="a share",
        examples=("60 %",),
        reader="share",
        si="1",
        si_display=(Display("%", 0.01),),
        ip_display=(Display("%", 0.01),),
    ),
    Kind(
        name="number",
        label="a number",
        examples=("0.45",),
        reader="number",
        si="1",
        si_display=(Display(""),),
        ip_display=(Display(""),),
    ),
    Kind(
        name="count",
        label="a whole number",
        examples=("3",),
        reader="count",
        si="1",
        si_display=(Display(""),),
        ip_display=(Display(""),),
    ),
    *(
        Kind(
            name=name,
            label=label,
            examples=examples,
            reader="angle",
            si="°",
            suffix="_deg",
            si_display=(Display("°"),),
            ip_display=(Display("°"),),
        )
        for name, label, examples in (
            ("angle", "an angle or a compass point", ("180°", "SSW", "55.1° N")),
            ("bearing", "a compass bearing", ("180°", "SSW")),
            ("latitude", "a latitude", ("55.1° N", "33.9° S")),
            ("longitude", "a longitude", ("14.7° E", "58.4° W")),
        )
    ),
    Kind(name="clock", label="a clock time", examples=("14:00", "day 2 06:00"), reader="clock", si="h", suffix="_h"),
    Kind(
        name="hours",
        label="hours of the day",
        examples=("06:00-18:00, 20:00-22:00 50 %", "always", "never"),
        reader="hours",
    ),
    Kind(name="utc_offset", label="an offset from UTC", examples=("UTC+2", "UTC-3:30"), reader="utc_offset", si="h"),
    Kind(
        name="speed",
        label="a speed",
        examples=("3 m/s", "60 km/h", "7 mph"),
        dims=SPEED,
        si="m/s",
        suffix="_m_per_s",
        si_display=(Display("m/s"),),
        ip_display=(Display("mph", 5280 * FOOT / HOUR),),
    ),
    Kind(
        name="conductivity",
        label="a conductivity",
        examples=("0.022 W/mK", "0.153 Btu·in/h·ft²·°F"),
        dims=_CONDUCTIVITY,
        si="W/mK",
        suffix="_w_per_mk",
        si_display=(Display("W/mK"),),
        ip_display=(Display("Btu·in/h·ft²·°F", INCH / R_VALUE),),
    ),
    Kind(
        name="resistance",
        label="a thermal resistance",
        examples=("RSI 4.4", "R-25", "4.4 m²K/W"),
        dims=_RESISTANCE,
        si="m²K/W",
        suffix="_m2k_per_w",
        si_display=(Display("m²K/W"),),
        ip_display=(Display("ft²·°F·h/Btu", R_VALUE),),
    ),
    Kind(
        name="transmittance",
        label="a thermal transmittance",
        examples=("0.28 W/m²K", "0.05 Btu/h·ft²·°F"),
        dims=_TRANSMITTANCE,
        si="W/m²K",
        suffix="_w_per_m2k",
        si_display=(Display("W/m²K"),),
        ip_display=(Display("Btu/h·ft²·°F", 1 / R_VALUE),),
    ),
    Kind(
        name="line_transmittance",
        label="a loss along a line",
        examples=("0.02 W/mK", "0.012 Btu/h·ft·°F"),
        dims=_CONDUCTIVITY,
        si="W/mK",
        suffix="_w_per_mk",
        si_display=(Display("W/mK"),),
        ip_display=(Display("Btu/h·ft·°F", FOOT / R_VALUE),),
    ),
    Kind(
        name="point_transmittance",
        label="a loss per degree",
        examples=("0.3 W/K", "0.5 Btu/h·°F"),
        dims=(2, 1, -3, -1),
        si="W/K",
        suffix="_w_per_k",
        si_display=(Display("W/K"),),
        ip_display=(Display("Btu/h·°F", BTU / HOUR / DEGREE_F),),
    ),
    Kind(
        name="density",
        label="a density",
        examples=("35 kg/m³", "2.2 lb/ft³"),
        dims=(-3, 1, 0, 0),
        si="kg/m³",
        suffix="_kg_per_m3",
        si_display=(Display("kg/m³"),),
        ip_display=(Display("lb/ft³", POUND / FOOT**3),),
    ),
    Kind(
        name="specific_heat",
        label="a specific heat",
        examples=("3.4 kJ/kgK", "0.81 Btu/lb·°F"),
        dims=(2, 0, -2, -1),
        si="J/kgK",
        suffix="_j_per_kgk",
        si_display=(Display("kJ/kgK", 1e3),),
        ip_display=(Display("Btu/lb·°F", BTU / POUND / DEGREE_F),),
    ),
    *(
        Kind(
            name=name,
            label=label,
            examples=examples,
            dims=(2, 0, -2, 0),
            si="J/kg",
            suffix="_j_per_kg",
            si_display=(Display("kJ/kg", 1e3),),
            ip_display=(Display("Btu/lb", BTU / POUND),),
        )
        for name, label, examples in (
            ("latent_heat", "a latent heat", ("210 kJ/kg", "90 Btu/lb")),
            ("enthalpy", "an enthalpy", ("62 kJ/kg", "27 Btu/lb")),
        )
    ),
    Kind(
        name="specific_power",
        label="a heat per mass",
        examples=("50 mW/kg", "2 Btu/lb·day"),
        dims=(2, 0, -3, 0),
        si="W/kg",
        suffix="_w_per_kg",
        si_display=(Display("mW/kg", 1e-3), Display("W/kg", start=1.0)),
        ip_display=(Display("Btu/lb·day", BTU / POUND / DAY),),
    ),
    Kind(
        name="flow",
        label="an air flow",
        examples=("850 m³/h", "500 cfm", "240 L/s"),
        dims=FLOW,
        si="m³/s",
        suffix="_m3_per_s",
        si_display=(Display("m³/h", 1 / HOUR),),
        ip_display=(Display("cfm", FOOT**3 / 60),),
    ),
    Kind(
        name="gasket_flow",
        label="a leakage per length of gasket",
        examples=("0.5 m³/h per m", "0.1 cfm/ft"),
        dims=(2, 0, -1, 0),
        si="m²/s",
        suffix="_m2_per_s",
        si_display=(Display("m³/h per m", 1 / HOUR),),
        ip_display=(Display("cfm/ft", FOOT**2 / 60),),
    ),
    Kind(
        name="pressure",
        label="a pressure",
        examples=("101.3 kPa", "14.7 psi"),
        dims=PRESSURE,
        si="Pa",
        suffix="_pa",
        si_display=(Display("Pa"), Display("kPa", 1e3, start=1e3)),
        ip_display=(Display("psi", 6894.757293168361),),
    ),
    Kind(
        name="energy",
        label="an energy",
        examples=("54 kWh", "180 000 Btu"),
        dims=ENERGY,
        si="J",
        suffix="_j",
        si_display=(Display("kWh", 3.6e6),),
        ip_display=(Display("Btu", BTU),),
    ),
    Kind(
        name="energy_price",
        label="a price of energy",
        examples=("0.30 EUR/kWh",),
        reader="price",
        dims=(-2, -1, 2, 0),
        si="1/J",
        suffix="_per_j",
        si_display=(Display("/kWh", 1 / 3.6e6),),
        ip_display=(Display("/kWh", 1 / 3.6e6),),
    ),
    Kind(
        name="volume_price",
        label="a price per volume",
        examples=("400 EUR/m³", "11 USD/ft³"),
        reader="price",
        dims=(-3, 0, 0, 0),
        si="1/m³",
        suffix="_per_m3",
        si_display=(Display("/m³"),),
        ip_display=(Display("/ft³", FOOT**-3),),
    ),
    Kind(
        name="irradiance",
        label="a heat flow per area",
        examples=("800 W/m²", "250 Btu/h·ft²"),
        dims=(0, 1, -3, 0),
        si="W/m²",
        suffix="_w_per_m2",
        si_display=(Display("W/m²"),),
        ip_display=(Display("Btu/h·ft²", BTU / HOUR / FOOT**2),),
    ),
    Kind(
        name="transpiration",
        label="a transpiration coefficient",
        examples=("1.4 mg/(kg·s·MPa)", "1400 ng/(kg·s·kPa)"),
        dims=(1, -1, 1, 0),
        si="kg/(kg·s·Pa)",
        suffix="_kg_per_kg_s_pa",
        si_display=(Display("ng/(kg·s·Pa)", 1e-12),),
        ip_display=(Display("ng/(kg·s·Pa)", 1e-12),),
    ),
    Kind(
        name="humidity_ratio",
        label="a humidity ratio",
        examples=("9 g/kg", "63 gr/lb"),
        reader="humidity_ratio",
        si="kg/kg",
        suffix="_kg_per_kg",
        si_display=(Display("g/kg", 1e-3),),
        ip_display=(Display("gr/lb", 1 / 7000),),
    ),
    Kind(name="month", label="a month", examples=("July", "Jul", "7"), reader="month"),
    Kind(name="word", label="a word", examples=("outdoors",), reader="word"),
    Kind(name="name", label="a name", examples=("hall",), reader="word"),
    Kind(name="text", label="a text", examples=("anything",), reader="text"),
    Kind(name="words", label="words with commas between", examples=("top, sides",), reader="words"),
    Kind(name="yes_no", label="yes or no", examples=("yes", "no"), reader="yes_no"),
    Kind(
        name="composition",
        label="shares of a food",
        examples=("water 88 %, protein 3 %, fat 4 %, carbohydrate 5 %",),
        reader="composition",
    ),
)

KINDS: Mapping[str, Kind] = {kind.name: kind for kind in _ALL}
"""Every kind by its name."""


def kind_of_dims(dims: Dims) -> Kind | None:
    """The first kind with that dimension, or None; for saying what a wrong unit would have been."""
    return next((kind for kind in _ALL if kind.dims == dims and dims != NONE), None)
