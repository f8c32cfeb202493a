"""What a technician types, and what it must be read as, or that it must be refused and why."""

from __future__ import annotations

import math

import pytest

from coldbox.errors import UnitProblem
from coldbox.units import KINDS, Rate, Schedule, Span, Spread, parse

BTU = 1055.05585262
R = 0.3048**2 * (5 / 9) * 3600 / BTU  # m²K/W in R-1
DAY = 86400.0

READ = [
    # lengths, in every way a rule is read aloud
    ("length", "100 mm", 0.1),
    ("length", "100mm", 0.1),
    ("length", "2.4 m", 2.4),
    ("length", "1,5 m", 1.5),
    ("length", "2,40 m", 2.4),
    ("length", "0,022 m", 0.022),
    ("length", "12 000 mm", 12.0),
    ("length", "12\u202f000 mm", 12.0),
    ("length", "12\u2009000 mm", 12.0),
    ("length", "12\u00a0000 mm", 12.0),
    ("length", "12_000 mm", 12.0),
    ("length", "1 000 m", 1000.0),
    ("length", "1 000,5 m", 1000.5),
    ("length", "4 in", 0.1016),
    ("length", "4in.", 0.1016),
    ("length", "4 inches", 0.1016),
    ("length", '36"', 0.9144),
    ("length", "36″", 0.9144),
    ("length", "3 1/2 in", 0.0889),
    ("length", "3-1/2 in", 0.0889),
    ("length", "3½ in", 0.0889),
    ("length", "1/2 in", 0.0127),
    ("length", "5' 6\"", 1.6764),
    ("length", "5'6\"", 1.6764),
    ("length", "5' 6''", 1.6764),
    ("length", "5′ 6″", 1.6764),
    ("length", "5'-6 1/2\"", 1.6891),
    ("length", "5 ft 6 in", 1.6764),
    ("length", "5ft 6in", 1.6764),
    ("length", "5 feet 6 inches", 1.6764),
    ("length", "1 m 20 cm", 1.2),
    ("length", "7'", 2.1336),
    ("length", "5 MM", 0.005),
    ("length", "5 Mm", 0.005),
    ("length", "1e3 mm", 1.0),
    ("length", ".5 m", 0.5),
    ("length", "+5 m", 5.0),
    ("area", "12 m²", 12.0),
    ("area", "12 m2", 12.0),
    ("area", "12 m^2", 12.0),
    ("area", "12 sq m", 12.0),
    ("area", "130 ft²", 130 * 0.3048**2),
    ("area", "130 sq. ft.", 130 * 0.3048**2),
    ("area", "130 sqft", 130 * 0.3048**2),
    ("area", "130 square feet", 130 * 0.3048**2),
    ("volume", "28 m³", 28.0),
    ("volume", "40 L", 0.04),
    ("volume", "40 litres", 0.04),
    ("volume", "1000 cu ft", 1000 * 0.3048**3),
    ("volume", "1000 cubic feet", 1000 * 0.3048**3),
    ("volume", "10 US gal", 0.03785411784),
    ("volume", "10 imp gallons", 0.0454609),
    # temperatures and differences: the field decides
    ("temperature", "-18 °C", -18.0),
    ("temperature", "−18 °C", -18.0),
    ("temperature", "–18 °C", -18.0),
    ("temperature", "- 18 °C", -18.0),
    ("temperature", "-18 C", -18.0),
    ("temperature", "-18C", -18.0),
    ("temperature", "-18 ° C", -18.0),
    ("temperature", "-18 ºC", -18.0),
    ("temperature", "-18 ℃", -18.0),
    ("temperature", "-18 degC", -18.0),
    ("temperature", "-18 deg C", -18.0),
    ("temperature", "-18 degrees C", -18.0),
    ("temperature", "-18 celsius", -18.0),
    ("temperature", "0 F", -32 * 5 / 9),
    ("temperature", "0 °F", -32 * 5 / 9),
    ("temperature", "32 deg F", 0.0),
    ("temperature", "-40 f", -40.0),
    ("temperature", "32 fahrenheit", 0.0),
    ("temperature", "32 degrees Fahrenheit", 0.0),
    ("temperature", "255.15 K", -18.0),
    ("temperature", "-0,5 °C", -0.5),
    ("difference", "9 K", 9.0),
    ("difference", "9 °C", 9.0),
    ("difference", "9 C", 9.0),
    ("difference", "9 °F", 5.0),
    ("difference", "9 F", 5.0),
    # powers
    ("power", "400 W", 400.0),
    ("power", "1,5 kW", 1500.0),
    ("power", "1.5 KW", 1500.0),
    ("power", "2.5 ton", 2.5 * 12000 * BTU / 3600),
    ("power", "2.5 tons", 2.5 * 12000 * BTU / 3600),
    ("power", "2.5 TR", 2.5 * 12000 * BTU / 3600),
    ("power", "2.5 tons of refrigeration", 2.5 * 12000 * BTU / 3600),
    ("power", "12 000 Btu/h", 12000 * BTU / 3600),
    ("power", "12 000 BTU/hr", 12000 * BTU / 3600),
    ("power", "12000 btu/hr", 12000 * BTU / 3600),
    ("power", "12000 Btuh", 12000 * BTU / 3600),
    ("power", "12000 Btu per hour", 12000 * BTU / 3600),
    ("power", "12 MBH", 12000 * BTU / 3600),
    ("power", "1000 kcal/h", 1163.0),
    ("power", "1/2 hp", 0.5 * 550 * 0.3048 * 0.45359237 * 9.80665),
    # masses and flows
    ("mass", "500 kg", 500.0),
    ("mass", "500 kgs", 500.0),
    ("mass", "2.5 t", 2500.0),
    ("mass", "2.5 metric tons", 2500.0),
    ("mass", "2 tonnes", 2000.0),
    ("mass", "1 short ton", 907.18474),
    ("mass", "1 long ton", 1016.0469088),
    ("mass", "1100 lb", 1100 * 0.45359237),
    ("mass", "1100 lbs", 1100 * 0.45359237),
    ("mass", "5 lb 3 oz", 83 * 0.45359237 / 16),
    ("mass_rate", "900 kg/day", 900 / DAY),
    ("mass_rate", "900 kg a day", 900 / DAY),
    ("mass_rate", "900 kg per day", 900 / DAY),
    ("mass_rate", "2000 lb/d", 2000 * 0.45359237 / DAY),
    ("mass_rate", "2 short tons/day", 2 * 907.18474 / DAY),
    ("moisture_rate", "11.6 kg/day", 11.6),
    ("flow", "500 cfm", 500 * 0.3048**3 / 60),
    ("flow", "500 CFM", 500 * 0.3048**3 / 60),
    ("flow", "500 ft³/min", 500 * 0.3048**3 / 60),
    ("flow", "850 m³/h", 850 / 3600),
    ("flow", "850 m3/hr", 850 / 3600),
    ("flow", "240 L/s", 0.24),
    ("flow", "240 l/s", 0.24),
    ("gasket_flow", "0.5 m³/h per m", 0.5 / 3600),
    ("gasket_flow", "0.5 m3/h/m", 0.5 / 3600),
    ("gasket_flow", "0.5 m³/(h·m)", 0.5 / 3600),
    ("gasket_flow", "0.1 cfm/ft", 0.1 * 0.3048**2 / 60),
    # walls
    ("conductivity", "0.022 W/mK", 0.022),
    ("conductivity", "0.022W/mK", 0.022),
    ("conductivity", "0,022 W/mK", 0.022),
    ("conductivity", "0.022 W/m·K", 0.022),
    ("conductivity", "0.022 W/(m·K)", 0.022),
    ("conductivity", "0.022 W/(m K)", 0.022),
    ("conductivity", "0.022 W/m K", 0.022),
    ("conductivity", "0.022 W/m.K", 0.022),
    ("conductivity", "0.022 W/m-K", 0.022),
    ("conductivity", "0.022 W/m/K", 0.022),
    ("conductivity", "0.022 W·m⁻¹·K⁻¹", 0.022),
    ("conductivity", "0.022 W m^-1 K^-1", 0.022),
    ("conductivity", "0.022 w/mk", 0.022),
    ("conductivity", "22 mW/mK", 0.022),
    ("conductivity", "0.022 W/m°C", 0.022),
    ("conductivity", "0.153 Btu·in/h·ft²·°F", 0.153 * 0.0254 / R),
    ("conductivity", "0.153 Btu-in/hr-ft2-F", 0.153 * 0.0254 / R),
    ("conductivity", "0.153 Btu in/(h ft² °F)", 0.153 * 0.0254 / R),
    ("conductivity", "R-6/in", 0.0254 / (6 * R)),
    ("conductivity", "R-6 per inch", 0.0254 / (6 * R)),
    ("resistance", "R-25", 25 * R),
    ("resistance", "R25", 25 * R),
    ("resistance", "R 25", 25 * R),
    ("resistance", "r-25", 25 * R),
    ("resistance", "RSI 4.4", 4.4),
    ("resistance", "RSI-4.4", 4.4),
    ("resistance", "RSI 4,4", 4.4),
    ("resistance", "RSI 4.4 m²K/W", 4.4),
    ("resistance", "4.4 m²K/W", 4.4),
    ("resistance", "4.4 m²·K/W", 4.4),
    ("resistance", "4.4 (m²·K)/W", 4.4),
    ("resistance", "4.4 K·m²/W", 4.4),
    ("resistance", "25 ft²·°F·h/Btu", 25 * R),
    ("resistance", "25 h·ft²·°F/Btu", 25 * R),
    ("resistance", "25 (h ft2 F)/Btu", 25 * R),
    ("resistance", "25 hft2F/Btu", 25 * R),
    ("transmittance", "0.28 W/m²K", 0.28),
    ("transmittance", "0.28 W/m2K", 0.28),
    ("transmittance", "0.28 W/m2.K", 0.28),
    ("transmittance", "0.28 W/(m²·K)", 0.28),
    ("transmittance", "0.28 W/m²·K", 0.28),
    ("transmittance", "0.28 W/m²/K", 0.28),
    ("transmittance", "0.28 W m⁻² K⁻¹", 0.28),
    ("transmittance", "0.05 Btu/h·ft²·°F", 0.05 / R),
    ("transmittance", "0.05 Btu/(h·ft²·°F)", 0.05 / R),
    ("transmittance", "0.05 Btu/hr-ft2-°F", 0.05 / R),
    ("transmittance", "0.05 BTU/hr/sq ft/deg F", 0.05 / R),
    ("line_transmittance", "0.02 W/mK", 0.02),
    ("point_transmittance", "0.3 W/K", 0.3),
    ("density", "35 kg/m³", 35.0),
    ("density", "2.2 lb/ft3", 2.2 * 0.45359237 / 0.3048**3),
    ("density", "2.2 lb/cu ft", 2.2 * 0.45359237 / 0.3048**3),
    ("specific_heat", "3.4 kJ/kgK", 3400.0),
    ("specific_heat", "3.4 kJ/kg·K", 3400.0),
    ("specific_heat", "3.4 kJ/(kg K)", 3400.0),
    ("specific_heat", "1 Btu/lb·°F", 4186.8),
    ("specific_heat", "1 Btu/lbF", 4186.8),
    ("latent_heat", "210 kJ/kg", 210e3),
    ("latent_heat", "144 Btu/lb", 144 * 2326.0),
    ("specific_power", "50 mW/kg", 0.05),
    ("specific_power", "2 Btu/lb·day", 2 * 2326.0 / DAY),
    ("transpiration", "1.4 mg/(kg·s·MPa)", 1.4e-12),
    ("transpiration", "1.4e-12 kg/(kg s Pa)", 1.4e-12),
    ("humidity_ratio", "9 g/kg", 0.009),
    ("humidity_ratio", "63 gr/lb", 0.009),
    ("energy", "2 kWh", 7.2e6),
    ("pressure", "1013 hPa", 101300.0),
    ("pressure", "1 mbar", 100.0),
    ("speed", "3 m/s", 3.0),
    ("speed", "90 km/h", 25.0),
    ("speed", "90 kmh", 25.0),
    ("speed", "10 mph", 4.4704),
    ("irradiance", "800 W/m²", 800.0),
    # shares
    ("share", "60 %", 0.6),
    ("share", "60%", 0.6),
    ("share", "60 %RH", 0.6),
    ("share", "60 % RH", 0.6),
    ("share", "12,5 %", 0.125),
    ("share", "60 percent", 0.6),
    # rates keep their basis
    ("rate", "3/h", Rate(3 / 3600, "hour")),
    ("rate", "3 / h", Rate(3 / 3600, "hour")),
    ("rate", "3 per hour", Rate(3 / 3600, "hour")),
    ("rate", "0.3 ACH", Rate(0.3 / 3600, "hour")),
    ("rate", "0.3 air changes/h", Rate(0.3 / 3600, "hour")),
    ("rate", "0.3 air changes per hour", Rate(0.3 / 3600, "hour")),
    ("rate", "20 openings an hour", Rate(20 / 3600, "hour")),
    ("rate", "0.3 h⁻¹", Rate(0.3 / 3600, "hour")),
    ("rate", "0.3 1/h", Rate(0.3 / 3600, "hour")),
    ("rate", "200/day", Rate(200 / DAY, "day")),
    ("rate", "200 passages/day", Rate(200 / DAY, "day")),
    ("rate", "1 200/day", Rate(1200 / DAY, "day")),
    ("rate", "200 a day", Rate(200 / DAY, "day")),
    ("daily_duration", "20 min/day", Rate(20 / 1440, "day")),
    ("daily_duration", "20 min a day", Rate(20 / 1440, "day")),
    ("daily_duration", "1.5 h per day", Rate(1.5 / 24, "day")),
    ("daily_duration", "6 min/h", Rate(0.1, "hour")),
    # times
    ("duration", "30 min", 1800.0),
    ("duration", "12 s", 12.0),
    ("duration", "1.5 h", 5400.0),
    ("duration", "1 h 30 min", 5400.0),
    ("duration", "1h 30min", 5400.0),
    ("duration", "2 days", 172800.0),
    ("clock", "14:00", 14.0),
    ("clock", "6:30", 6.5),
    ("clock", "24:00", 24.0),
    ("clock", "6 pm", 18.0),
    ("clock", "12 am", 0.0),
    ("clock", "12:15 p.m.", 12.25),
    ("clock", "day 2 06:00", 30.0),
    ("clock", "06:00 day 2", 30.0),
    ("clock", "06:00 on day 2", 30.0),
    ("hours", "always", Schedule((Span(0, 24, 1),))),
    ("hours", "never", Schedule(())),
    ("hours", "07:00-17:00", Schedule((Span(7, 17, 1),))),
    ("hours", "07:00–17:00", Schedule((Span(7, 17, 1),))),
    ("hours", "7 am - 5 pm", Schedule((Span(7, 17, 1),))),
    ("hours", "07:00 to 17:00", Schedule((Span(7, 17, 1),))),
    ("hours", "07:00-17:00 25 %", Schedule((Span(7, 17, 0.25),))),
    ("hours", "06:00-18:00, 20:00-22:00 50 %", Schedule((Span(6, 18, 1), Span(20, 22, 0.5)))),
    ("hours", "22:00-06:00", Schedule((Span(0, 6, 1), Span(22, 24, 1)))),
    ("hours", "22:00-24:00", Schedule((Span(22, 24, 1),))),
    ("hours", "22:00-00:00", Schedule((Span(22, 24, 1),))),
    ("hours", "00:00-24:00", Schedule((Span(0, 24, 1),))),
    ("hours", "always 50 %", Schedule((Span(0, 24, 0.5),))),
    ("utc_offset", "UTC+2", 2.0),
    ("utc_offset", "UTC−3:30", -3.5),
    ("utc_offset", "GMT", 0.0),
    ("utc_offset", "UTC+5.5", 5.5),
    ("month", "July", 7),
    ("month", "sept", 9),
    ("month", "12", 12),
    # directions
    ("bearing", "180°", 180.0),
    ("bearing", "180 deg", 180.0),
    ("bearing", "SSW", 202.5),
    ("bearing", "n", 0.0),
    ("bearing", "north", 0.0),
    ("latitude", "55.1° N", 55.1),
    ("latitude", "55.1N", 55.1),
    ("latitude", "33.9° S", -33.9),
    ("latitude", "-33.9°", -33.9),
    ("latitude", "55° 6' N", 55.1),
    ("latitude", "-33° 54'", -33.9),
    ("latitude", "55°06'00\" north", 55.1),
    ("longitude", "14.7° E", 14.7),
    ("longitude", "58,4 W", -58.4),
    ("angle", "SSW", 202.5),
    ("angle", "55.1° N", 55.1),
    # the rest
    ("number", "0.45", 0.45),
    ("count", "3", 3),
    ("yes_no", "yes", True),
    ("yes_no", "false", False),
    ("word", "  strip   curtain ", "strip curtain"),
    ("words", "top, sides", ("top", "sides")),
    ("composition", "water 88 %, fat 4 %", (("water", 0.88), ("fat", 0.04))),
]


@pytest.mark.parametrize(("kind", "text", "wanted"), READ)
def test_is_read(kind: str, text: str, wanted: object) -> None:
    value = parse(text, kind).value
    assert type(value) is type(wanted)
    if isinstance(wanted, Rate):
        assert isinstance(value, Rate)
        assert value.basis == wanted.basis
        assert math.isclose(value.per_second, wanted.per_second, rel_tol=1e-14)
    elif isinstance(wanted, float):
        assert isinstance(value, float)
        assert math.isclose(value, wanted, rel_tol=1e-13, abs_tol=1e-12)
    else:
        assert value == wanted


REFUSED = [
    # what is not said, or said in two meanings
    ("length", "90", "has no unit"),
    ("length", "", "is empty"),
    ("length", "   ", "is empty"),
    ("length", "mm", "does not begin with a number"),
    ("length", "12,000 mm", "12.000 or for 12000"),
    ("length", "1,500 m", "1.500 or for 1500"),
    ("length", "1,234,567 mm", "comma"),
    ("length", "1.234.567 mm", "more than one point"),
    ("length", "12 00 mm", "a number without a unit"),
    ("length", "5' 6", "without a unit"),
    ("length", "5 ft 14 in", "do not grow smaller"),
    ("length", "6 in 5 ft", "do not grow smaller"),
    ("length", "5 ft 3 kg", "is a mass"),
    ("length", "3 5/4 in", "fraction"),
    ("length", "1/0 in", "fraction"),
    ("length", "5² m", "a number without a unit"),
    ("length", "3-5 mm", ""),
    ("length", "90 kg", "is a mass, not a length"),
    ("length", "90 furlongs", 'not known here, "furlongs"'),
    ("length", "10**10**7 m", ""),
    ("length", "nan", "computed with"),
    ("length", "nan m", "computed with"),
    ("length", "inf m", "computed with"),
    ("length", "-inf m", "computed with"),
    ("length", "1e400 m", "too large"),
    ("length", "1e-400 m", "too large or too small"),
    ("length", "1" * 400 + " m", "too long"),
    ("length", "0x10 m", ""),
    ("length", "١٢ m", "does not begin"),
    ("length", "1 m; rm", ""),
    ("area", "12 m", "is a length, not an area"),
    ("volume", "100 gal", "US or an imperial gallon"),
    ("mass", "2.5 ton", "short ton"),
    ("mass", "2.5 tons", "long ton"),
    ("mass", "500 gr", "grams or grains"),
    ("mass", "3 cwt", "112 lb"),
    ("mass", "3 Mg", "does not fit"),
    ("mass", "3 MG", "does not fit"),
    ("volume", "3 ML", "not known here"),
    ("energy", "3 mj", "not known here"),
    ("energy", "3 mJ", "not known here"),
    ("mass_rate", "2 ton/day", "short ton"),
    ("mass_rate", "2 kg", "is a mass, not a mass per day"),
    ("power", "3 RT", "3.86 kW"),
    ("power", "12 MBtu/h", "a million to others"),
    ("power", "400 kWh", "is an energy, not a power"),
    ("power", "400 w/m2", "is a heat flow per area"),
    ("power", "5 mw", "not known here"),
    ("power", "2.5 t", "is a mass, not a power"),
    ("duration", "30 m", 'write "min"'),
    ("duration", "1h30", "without a unit"),
    ("duration", "3-5 min", ""),
    ("flow", "500 cal", "several sizes"),
    ("temperature", "-18", "has no unit"),
    ("temperature", "-18 °", "without their scale"),
    ("temperature", "-18 deg", "without their scale"),
    ("temperature", "-300 °C", "colder than anything"),
    ("temperature", "-1 K", "colder than anything"),
    ("temperature", "20 kg", "is a mass, not a temperature"),
    ("temperature", "20 R", ""),
    ("temperature", "32 °C ± 5 %", "nothing about a temperature"),
    ("difference", "9", "has no unit"),
    ("conductivity", "0.022 W/m²K", "is a thermal transmittance, not a conductivity"),
    ("conductivity", "0.022", "has no unit"),
    ("transmittance", "R-25", "is a thermal resistance, not a thermal transmittance"),
    ("transmittance", "0.05 Btu/(h ft²) °F", "read two ways"),
    ("transmittance", "0.28 W/(m²K", "without its other half"),
    ("transmittance", "0.28 W/m²K)", "without its other half"),
    ("transmittance", "0.28 W//m²K", "nothing beside it"),
    ("transmittance", "0.28 W/", "nothing beside it"),
    ("transmittance", "0.28 W/()", "empty bracket"),
    ("resistance", "25", "has no unit"),
    ("resistance", "25 R", "in front"),
    ("resistance", "R-25 m²K/W", "not the same one"),
    ("share", "0.6", "has no unit"),
    ("share", "60", "has no unit"),
    ("share", "60 kg", "where % should stand"),
    ("rate", "20", "has no unit"),
    ("rate", "20 h", 'where "/h" or "/day"'),
    ("rate", "20 kg/h", 'where "/h" or "/day"'),
    ("rate", "20 openings", 'where "/h" or "/day"'),
    ("daily_duration", "20 min", "per what"),
    ("daily_duration", "20 kg/day", "does not fit"),
    ("humidity_ratio", "9 %", ""),
    ("clock", "14.00", "hours and minutes"),
    ("clock", "14", "hours and minutes"),
    ("clock", "25:00", "no clock shows"),
    ("clock", "14:61", "no clock shows"),
    ("clock", "14 pm", "am or pm"),
    ("clock", "day 0 06:00", "day"),
    ("clock", "day 99 06:00", "day"),
    ("hours", "06:00-18:00, 17:00-19:00", "overlap"),
    ("hours", "22:00-06:00, 05:00-07:00", "overlap"),
    ("hours", "06:00-06:00", "always"),
    ("hours", "06:00-18:00 150 %", "0 % to 100 %"),
    ("hours", "6-18", ""),
    ("hours", "8 h", ""),
    ("hours", "06:00-18:00,", "comma"),
    ("utc_offset", "+2", "offset"),
    ("utc_offset", "UTC+15", "no clock has"),
    ("month", "Ju", "month"),
    ("month", "13", "month"),
    ("bearing", "180", "has no unit"),
    ("bearing", "55.1° N", "cannot stand"),
    ("latitude", "14.7° E", "cannot stand"),
    ("latitude", "-55° N", "both a minus"),
    ("longitude", "55.1° S", "cannot stand"),
    ("angle", "55 degs", "degrees should stand"),
    ("angle", "55° 61' N", "59"),
    ("energy_price", "0.30/kWh", "no currency"),
    ("energy_price", "$0.30/kWh", "several currencies"),
    ("energy_price", "0.30 EUR USD/kWh", "two currencies"),
    ("energy_price", "0.30 EUR", "per what"),
    ("energy_price", "0.30 eur/kWh", "no currency"),
    ("energy_price", "0.30 EUR/m³", "is a price per volume"),
    ("count", "3.5", "whole number"),
    ("count", "-3", "whole number"),
    ("yes_no", "maybe", "neither"),
    ("number", "3 m", "behind a plain number"),
    ("words", "top,,sides", "comma"),
    ("word", "a\x1b[31m", "control character"),
    ("text", "a\x1b[31m", "control character"),
    ("composition", "water 88 %, water 3 %", "twice"),
    ("composition", "stone 3 %", "where one of"),
    # spreads and ranges
    ("power", "2 kW ± -3 W", "below zero"),
    ("power", "2 kW ± 3 °C", "is a temperature, not a power"),
    ("power", "2 kW ± 3 W ± 2 W", "cannot be read"),
    ("power", "2 kW ±", "cannot be read"),
    ("power", "± 2 kW", "cannot be read"),
    ("duration", "5 to 3 min", "not the larger"),
    ("duration", "3 to 4 to 5 min", "more than one range"),
    ("length", "3 ± 0.1", "has no unit"),
]


@pytest.mark.parametrize(("kind", "text", "reason"), REFUSED)
def test_is_refused_in_words(kind: str, text: str, reason: str) -> None:
    with pytest.raises(UnitProblem) as caught:
        parse(text, kind)
    sentence = str(caught.value)
    assert reason in sentence
    assert sentence.startswith('"')
    assert "Write " in sentence
    assert sentence.endswith(".")
    assert any(example in sentence for example in KINDS[kind].examples)
    assert sentence.isprintable()
    assert len(sentence) < 320


SPREADS = [
    ("conductivity", "0.022 W/mK ± 10 %", 0.022, Spread("normal", 0.0022)),
    ("conductivity", "0.022 ± 0.002 W/mK", 0.022, Spread("normal", 0.002)),
    ("conductivity", "0.022 W/mK +/- 0.002 W/mK", 0.022, Spread("normal", 0.002)),
    ("conductivity", "0.022 W/mK ± 0.002", 0.022, Spread("normal", 0.002)),
    ("temperature", "32 °C ± 2 K", 32.0, Spread("normal", 2.0)),
    ("temperature", "32 ± 2 °C", 32.0, Spread("normal", 2.0)),
    ("temperature", "32 °F ± 9", 0.0, Spread("normal", 5.0)),
    ("temperature", "32 °F ± 9 °F", 0.0, Spread("normal", 5.0)),
    ("temperature", "-20 to -18 °C", -19.0, Spread("even", 1.0)),
    ("temperature", "30 to 34 °F", 0.0, Spread("even", 10 / 9)),
    ("share", "60 % ± 5 %", 0.6, Spread("normal", 0.05)),
    ("share", "60 ± 5 %", 0.6, Spread("normal", 0.05)),
    ("share", "60 % ± 5 points", 0.6, Spread("normal", 0.05)),
    ("share", "30 to 40 %", 0.35, Spread("even", 0.05)),
    ("duration", "3 to 5 min", 240.0, Spread("even", 60.0)),
    ("duration", "90 s to 3 min", 135.0, Spread("even", 45.0)),
    ("power", "2 kW ± 0", 2000.0, Spread("normal", 0.0)),
    ("resistance", "R-25 ± 10 %", 25 * R, Spread("normal", 2.5 * R)),
    ("resistance", "R-25 ± 2", 25 * R, Spread("normal", 2 * R)),
    ("resistance", "R-20 to R-30", 25 * R, Spread("even", 5 * R)),
    ("mass", "6 kg ± 0.3 kg", 6.0, Spread("normal", 0.3)),
    ("number", "0.45 ± 10 %", 0.45, Spread("normal", 0.045)),
]


@pytest.mark.parametrize(("kind", "text", "value", "spread"), SPREADS)
def test_spread(kind: str, text: str, value: float, spread: Spread) -> None:
    reading = parse(text, kind)
    assert reading.value == pytest.approx(value, rel=1e-13, abs=1e-12)
    assert reading.spread is not None
    assert reading.spread.shape == spread.shape
    assert reading.spread.half_width == pytest.approx(spread.half_width, rel=1e-12)


def test_spread_of_a_rate_is_per_second() -> None:
    reading = parse("0.3/h ± 50 %", "rate")
    assert isinstance(reading.value, Rate)
    assert reading.spread == Spread("normal", pytest.approx(reading.value.per_second / 2))
    assert parse("200 ± 20/day", "rate").spread == Spread("normal", pytest.approx(20 / DAY))


@pytest.mark.parametrize(
    ("text", "kind", "currency", "value"),
    [
        ("0.30 EUR/kWh", "energy_price", "EUR", 0.30 / 3.6e6),
        ("DKK 2,10/kWh", "energy_price", "DKK", 2.10 / 3.6e6),
        ("0.30 EUR per kWh", "energy_price", "EUR", 0.30 / 3.6e6),
        ("€0.30/kWh", "energy_price", "EUR", 0.30 / 3.6e6),
        ("300 EUR/MWh", "energy_price", "EUR", 0.30 / 3.6e6),
        ("400 EUR/m³", "volume_price", "EUR", 400.0),
        ("400 XYZ/m3", "volume_price", "XYZ", 400.0),
    ],
)
def test_price(text: str, kind: str, currency: str, value: float) -> None:
    reading = parse(text, kind)
    assert reading.currency == currency
    assert reading.value == pytest.approx(value, rel=1e-13)


def test_bare_number_takes_the_unit_beside_the_field() -> None:
    assert parse("90", "length", bare="mm").value == pytest.approx(0.09)
    assert parse("-18", "temperature", bare="°C").value == -18.0
    assert parse("9", "difference", bare="°F").value == pytest.approx(5.0)
    assert parse("25", "resistance", bare="R").value == pytest.approx(25 * R)
    assert parse("60", "share", bare="%").value == pytest.approx(0.6)
    assert parse("20", "rate", bare="/h").value == Rate(20 / 3600, "hour")
    assert parse("20", "daily_duration", bare="min/day").value == Rate(20 / 1440, "day")
    assert parse("180", "bearing", bare="°").value == 180.0
    assert parse("90 ± 5", "length", bare="mm").spread == Spread("normal", pytest.approx(0.005))
    assert parse("3", "energy_price", bare="EUR/kWh").currency == "EUR"


def test_bare_unit_never_overrules_a_typed_one() -> None:
    assert parse("9 in", "length", bare="mm").value == pytest.approx(0.2286)


def test_several_kinds_will_do() -> None:
    assert (parse("16:00", "clock|duration").value, parse("6 h", "clock|duration").kind) == (16.0, "duration")
    assert parse("45 kg/day", "mass|mass_rate").kind == "mass_rate"
    with pytest.raises(UnitProblem, match="a clock time such as .* or a duration such as"):
        parse("soon", "clock|duration")


def test_the_contract_sentence() -> None:
    with pytest.raises(UnitProblem) as caught:
        parse("90", "length")
    assert str(caught.value) == '"90" has no unit. Write a length, such as "900 mm" or "36 in".'


def test_control_characters_do_not_reach_the_message() -> None:
    with pytest.raises(UnitProblem) as caught:
        parse("90\x1b[31m\x00 mm", "length")
    assert str(caught.value).isprintable()


def test_understood_says_back_how_it_was_read() -> None:
    assert parse("2.5 ton", "power").understood == "8.792 kW"
    assert parse("9 F", "difference").understood == "5 K"
    assert parse("32 ± 2 °C", "temperature").understood == "32 °C ± 2 K"
    assert parse("0.30 EUR/kWh", "energy_price").understood == "0.3 EUR/kWh"
