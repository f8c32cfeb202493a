"""The whitelist: every unit that may be typed, with its dimension and its exact factor to SI.

Nothing outside this list is read from a text. Compound units ("W/m²K") are put together from these in `unit_text`.
A temperature unit stands here for a difference; `temperatures` knows the zero points.
"""

from __future__ import annotations

Dims = tuple[int, int, int, int]  # exponents of metre, kilogram, second, kelvin

NONE: Dims = (0, 0, 0, 0)
LENGTH: Dims = (1, 0, 0, 0)
AREA: Dims = (2, 0, 0, 0)
VOLUME: Dims = (3, 0, 0, 0)
MASS: Dims = (0, 1, 0, 0)
TIME: Dims = (0, 0, 1, 0)
TEMPERATURE: Dims = (0, 0, 0, 1)
SPEED: Dims = (1, 0, -1, 0)
FLOW: Dims = (3, 0, -1, 0)
ENERGY: Dims = (2, 1, -2, 0)
POWER: Dims = (2, 1, -3, 0)
PRESSURE: Dims = (-1, 1, -2, 0)

BTU = 1055.05585262  # J, International Table
POUND = 0.45359237  # kg, exact
FOOT = 0.3048  # m, exact
INCH = 0.0254  # m, exact
GRAVITY = 9.80665  # m/s², standard, exact
CALORIE = 4.1868  # J, International Table
TON = 12000.0 * BTU / 3600.0  # W, ton of refrigeration
HORSEPOWER = 550.0 * FOOT * POUND * GRAVITY  # W, mechanical
METRIC_HORSEPOWER = 75.0 * GRAVITY  # W
DEGREE_F = 5.0 / 9.0  # K
US_GALLON = 231.0 * INCH**3
IMPERIAL_GALLON = 4.54609e-3

ATOMS: dict[str, tuple[float, Dims]] = {
    # length
    **dict.fromkeys(("m", "metre", "metres", "meter", "meters"), (1.0, LENGTH)),
    **dict.fromkeys(("mm", "millimetre", "millimetres", "millimeter", "millimeters"), (1e-3, LENGTH)),
    **dict.fromkeys(("cm", "centimetre", "centimetres", "centimeter", "centimeters"), (1e-2, LENGTH)),
    **dict.fromkeys(("km", "kilometre", "kilometres", "kilometer", "kilometers"), (1e3, LENGTH)),
    **dict.fromkeys(("in", "inch", "inches", '"'), (INCH, LENGTH)),
    **dict.fromkeys(("ft", "foot", "feet", "'"), (FOOT, LENGTH)),
    **dict.fromkeys(("yd", "yard", "yards"), (3 * FOOT, LENGTH)),
    **dict.fromkeys(("mi", "mile", "miles"), (5280 * FOOT, LENGTH)),
    # area and volume
    **dict.fromkeys(("sqft",), (FOOT**2, AREA)),
    **dict.fromkeys(("sqm",), (1.0, AREA)),
    **dict.fromkeys(("cuft",), (FOOT**3, VOLUME)),
    **dict.fromkeys(("cum", "cbm"), (1.0, VOLUME)),
    **dict.fromkeys(("L", "l", "litre", "litres", "liter", "liters"), (1e-3, VOLUME)),
    **dict.fromkeys(("mL", "ml"), (1e-6, VOLUME)),
    "hL": (0.1, VOLUME),
    "US gal": (US_GALLON, VOLUME),
    "imp gal": (IMPERIAL_GALLON, VOLUME),
    # time
    **dict.fromkeys(("s", "sec", "secs", "second", "seconds"), (1.0, TIME)),
    **dict.fromkeys(("min", "mins", "minute", "minutes"), (60.0, TIME)),
    **dict.fromkeys(("h", "hr", "hrs", "hour", "hours"), (3600.0, TIME)),
    **dict.fromkeys(("d", "day", "days"), (86400.0, TIME)),
    **dict.fromkeys(("week", "weeks", "wk"), (604800.0, TIME)),
    # mass
    **dict.fromkeys(("kg", "kgs", "kilo", "kilos", "kilogram", "kilograms"), (1.0, MASS)),
    **dict.fromkeys(("g", "gram", "grams"), (1e-3, MASS)),
    "mg": (1e-6, MASS),
    "ng": (1e-12, MASS),
    **dict.fromkeys(("t", "tonne", "tonnes", "metric ton"), (1000.0, MASS)),
    **dict.fromkeys(("lb", "lbs", "lbm", "pound", "pounds"), (POUND, MASS)),
    **dict.fromkeys(("oz", "ounce", "ounces"), (POUND / 16, MASS)),
    **dict.fromkeys(("grain", "grains"), (POUND / 7000, MASS)),
    "short ton": (2000 * POUND, MASS),
    "long ton": (2240 * POUND, MASS),
    # temperature difference
    **dict.fromkeys(("K", "°C", "C", "degC", "kelvin", "kelvins"), (1.0, TEMPERATURE)),
    **dict.fromkeys(("°F", "F", "degF"), (DEGREE_F, TEMPERATURE)),
    # speed and flow
    **dict.fromkeys(("mph",), (5280 * FOOT / 3600, SPEED)),
    **dict.fromkeys(("kph", "kmh"), (1000 / 3600, SPEED)),
    **dict.fromkeys(("kn", "kt", "knot", "knots"), (1852 / 3600, SPEED)),
    "fpm": (FOOT / 60, SPEED),
    **dict.fromkeys(("cfm", "CFM"), (FOOT**3 / 60, FLOW)),
    # energy and power
    **dict.fromkeys(("J", "joule", "joules"), (1.0, ENERGY)),
    "kJ": (1e3, ENERGY),
    "MJ": (1e6, ENERGY),
    "Wh": (3.6e3, ENERGY),
    "kWh": (3.6e6, ENERGY),
    "MWh": (3.6e9, ENERGY),
    **dict.fromkeys(("Btu", "BTU", "Btus", "BTUs"), (BTU, ENERGY)),
    "kBtu": (1e3 * BTU, ENERGY),
    **dict.fromkeys(("kcal", "fg", "frigorie", "frigories"), (1e3 * CALORIE, ENERGY)),
    **dict.fromkeys(("W", "watt", "watts"), (1.0, POWER)),
    "mW": (1e-3, POWER),
    **dict.fromkeys(("kW", "kilowatt", "kilowatts"), (1e3, POWER)),
    "MW": (1e6, POWER),
    **dict.fromkeys(("Btuh", "BTUH", "BtuH"), (BTU / 3600, POWER)),
    "MBH": (1e3 * BTU / 3600, POWER),
    **dict.fromkeys(("ton", "tons", "TR", "ton of refrigeration"), (TON, POWER)),
    **dict.fromkeys(("hp", "horsepower"), (HORSEPOWER, POWER)),
    "PS": (METRIC_HORSEPOWER, POWER),
    # pressure
    "Pa": (1.0, PRESSURE),
    "hPa": (1e2, PRESSURE),
    "kPa": (1e3, PRESSURE),
    "MPa": (1e6, PRESSURE),
    "bar": (1e5, PRESSURE),
    "mbar": (1e2, PRESSURE),
    "atm": (101325.0, PRESSURE),
    "psi": (POUND * GRAVITY / INCH**2, PRESSURE),
    "mmHg": (13595.1 * GRAVITY * 1e-3, PRESSURE),
    "inHg": (13595.1 * GRAVITY * INCH, PRESSURE),
    "inH2O": (1000 * GRAVITY * INCH, PRESSURE),
}

# Letters whose case is the difference between a thousandth and a million: never read in another case.
CASE_MATTERS = frozenset({"mW", "MW", "MJ", "MWh", "mg", "mL", "ml", "MPa", "mbar"})

# The short symbols that may stand side by side without a sign between them, "mK", "kgK", "hft".
SIDE_BY_SIDE = frozenset({"m", "mm", "K", "°C", "C", "°F", "F", "kg", "g", "lb", "h", "hr", "s", "ft", "in", "Pa"})

# What is known and not read, because it has two meanings or says too little: the reason, in words.
AMBIGUOUS: dict[str, str] = {
    "RT": 'has "RT", which is 3.52 kW in one country and 3.86 kW in another (write kW, or "ton" for 12 000 Btu/h)',
    "MBtu": 'has "MBtu", which is a thousand Btu to some and a million to others (write "kBtu" or "MBH")',
    "MMBtu": 'has "MMBtu", which is not read here (write "kBtu" or "kWh")',
    "gr": 'has "gr", which could be grams or grains (write "g", or "grains")',
    "cwt": 'has "cwt", which is 100 lb in one country and 112 lb in another (write "lb" or "kg")',
    "gal": 'has "gal", which could be a US or an imperial gallon (write "US gal", "imp gal" or "L")',
    "cal": 'has "cal", which has several sizes (write "kcal", read as 4.1868 kJ, or "kJ")',
    "Cal": 'has "Cal", which has several sizes (write "kcal", read as 4.1868 kJ, or "kJ")',
    "deg": "has degrees without their scale (write °C or °F)",
    "°": "has degrees without their scale (write °C or °F)",
    "R": 'has "R" behind the number (write it in front for a resistance, "R-25")',
    "$": 'has "$", which many countries use (write the three letters of the currency)',
    "£": 'has "£", which several countries use (write the three letters of the currency)',
    "¥": 'has "¥", which several countries use (write the three letters of the currency)',
}
AMBIGUOUS.update(
    {"gallon": AMBIGUOUS["gal"], "gallons": AMBIGUOUS["gal"], "gals": AMBIGUOUS["gal"], "MBTU": AMBIGUOUS["MBtu"]}
)

TON_OF_WHAT = 'has a ton of mass that could be 1000 kg, 2000 lb or 2240 lb (write "t", "short ton" or "long ton")'
