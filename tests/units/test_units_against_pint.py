"""Every unit of the whitelist, and every unit shown, against pint's definitions."""

from __future__ import annotations

import math
from typing import Any

import pint
import pytest
from hypothesis import given
from hypothesis import strategies as st

from coldbox.errors import UnitProblem
from coldbox.units import KINDS, parse
from coldbox.units.atoms import ATOMS, BTU, CASE_MATTERS, SIDE_BY_SIDE, TON
from coldbox.units.kinds import Kind
from coldbox.units.pint_bridge import dims_of, from_quantity, parse_with_pint
from coldbox.units.refused import Refused
from coldbox.units.temperatures import scale
from coldbox.units.unit_text import _other_case, unit

# A registry of its own with pint's stock definitions: nothing that our bridge defined.
STOCK: pint.UnitRegistry[Any] = pint.UnitRegistry()
BTU_IT = STOCK.Quantity(1, "international_british_thermal_unit").to("joule").magnitude

# pint's name of each unit; where the spelling is not pint's, the meaning written out in pint's words.
IN_PINT = {
    "m": "meter metre metres meter meters",
    "millimeter": "mm millimetre millimetres millimeter millimeters",
    "centimeter": "cm centimetre centimetres centimeter centimeters",
    "kilometer": "km kilometre kilometres kilometer kilometers",
    "inch": 'in inch inches "',
    "foot": "ft foot feet '",
    "yard": "yd yard yards",
    "mile": "mi mile miles",
    "foot**2": "sqft",
    "meter**2": "sqm",
    "foot**3": "cuft",
    "meter**3": "cum cbm",
    "liter": "L l litre litres liter liters",
    "milliliter": "mL ml",
    "hectoliter": "hL",
    "second": "s sec secs second seconds",
    "minute": "min mins minute minutes",
    "hour": "h hr hrs hour hours",
    "day": "d day days",
    "week": "week weeks wk",
    "kilogram": "kg kgs kilo kilos kilogram kilograms",
    "gram": "g gram grams",
    "milligram": "mg",
    "nanogram": "ng",
    "metric_ton": "t tonne tonnes",
    "pound": "lb lbs lbm pound pounds",
    "ounce": "oz ounce ounces",
    "grain": "grain grains",
    "kelvin": "K °C C degC kelvin kelvins",
    "delta_degree_Fahrenheit": "°F F degF",
    "mile/hour": "mph",
    "kilometer/hour": "kph kmh",
    "knot": "kn kt knot knots",
    "foot/minute": "fpm",
    "foot**3/minute": "cfm CFM",
    "joule": "J joule joules",
    "kilojoule": "kJ",
    "megajoule": "MJ",
    "watt_hour": "Wh",
    "kilowatt_hour": "kWh",
    "megawatt_hour": "MWh",
    "international_british_thermal_unit": "Btu BTU Btus BTUs",
    "1000*international_british_thermal_unit": "kBtu",
    "1000*international_calorie": "kcal fg frigorie frigories",
    "watt": "W watt watts",
    "milliwatt": "mW",
    "kilowatt": "kW kilowatt kilowatts",
    "megawatt": "MW",
    "international_british_thermal_unit/hour": "Btuh BTUH BtuH",
    "1000*international_british_thermal_unit/hour": "MBH",
    "12000*international_british_thermal_unit/hour": "ton tons TR",
    "horsepower": "hp horsepower",
    "metric_horsepower": "PS",
    "pascal": "Pa",
    "hectopascal": "hPa",
    "kilopascal": "kPa",
    "megapascal": "MPa",
    "bar": "bar",
    "millibar": "mbar",
    "standard_atmosphere": "atm",
    "psi": "psi",
    "millimeter_Hg": "mmHg",
    "inch_Hg": "inHg",
    "inch*1000*kilogram/meter**3*standard_gravity": "inH2O",
}
MEANING = {spelling: meaning for meaning, spellings in IN_PINT.items() for spelling in spellings.split()}
MEANING |= {
    "m": "meter",
    "metric ton": "metric_ton",
    "short ton": "US_ton",
    "long ton": "UK_ton",
    "US gal": "US_liquid_gallon",
    "imp gal": "imperial_gallon",
    "ton of refrigeration": "12000*international_british_thermal_unit/hour",
}


def in_stock(meaning: str) -> Any:
    return STOCK.Quantity(1.0, "dimensionless") * STOCK.parse_expression(meaning)


def in_mks(meaning: str) -> tuple[float, Any]:
    """Size in metre, kilogram, second, kelvin, and the exponents."""
    one = in_stock(meaning)
    dims = dims_of(one)
    assert dims is not None
    target = STOCK.meter ** dims[0] * STOCK.kilogram ** dims[1] * STOCK.second ** dims[2] * STOCK.kelvin ** dims[3]
    return float(one.to(target).magnitude), dims


def test_every_unit_has_its_meaning_in_pint() -> None:
    assert set(MEANING) == set(ATOMS)


@pytest.mark.parametrize("spelling", sorted(ATOMS))
def test_whitelist(spelling: str) -> None:
    size, dims = in_mks(MEANING[spelling])
    factor, ours = ATOMS[spelling]
    assert ours == dims
    assert math.isclose(factor, size, rel_tol=1e-12)


def test_btu_and_ton_are_those_of_the_international_table() -> None:
    assert BTU == 1055.05585262
    assert math.isclose(BTU, BTU_IT, rel_tol=1e-12)
    assert math.isclose(TON, 3516.8528420667, rel_tol=1e-12)


@pytest.mark.parametrize(
    ("text", "pints"), [("°C", "degC"), ("°F", "degF"), ("K", "kelvin"), ("deg F", "degF"), ("celsius", "degC")]
)
@pytest.mark.parametrize("number", [-40.0, 0.0, 32.0, 98.6, 451.0])
def test_temperature_scales_with_their_zeros(text: str, pints: str, number: float) -> None:
    if text == "K" and number < 0:
        pytest.skip("below absolute zero")
    wanted = STOCK.Quantity(number, pints).to("degC").magnitude
    value = parse(f"{number} {text}", "temperature").value
    assert value == pytest.approx(wanted, abs=1e-10)
    known = scale(text)
    assert known is not None
    assert math.isclose(known[0], 5 / 9 if "F" in text.upper() else 1.0, rel_tol=1e-15)


def shown_units() -> list[tuple[Kind, str, float]]:
    return [
        (kind, shown.unit, shown.factor)
        for kind in KINDS.values()
        for shown in (*kind.si_display, *kind.ip_display)
        if kind.reader in ("quantity", "difference")
    ]


def meaning_of(text: str) -> str:
    """A shown unit in pint's words, by hand: what stands behind the stroke is below it."""
    upper, _, lower = text.replace("²", "**2").replace("³", "**3").replace(" per ", "/").partition("/")
    factors = {"kgK": ("kg", "K"), "mK": ("m", "K"), "m**2K": ("m**2", "K")}

    def words(part: str) -> str:
        names = []
        for one in part.replace("(", "").replace(")", "").replace("/", "·").split("·"):
            for piece in factors.get(one, (one,)):
                name, _, power = piece.partition("**")
                names.append(MEANING[name] + (f"**{power}" if power else ""))
        return "*".join(f"({name})" for name in names)

    return f"({words(upper)})/({words(lower)})" if lower else words(upper)


@pytest.mark.parametrize(("kind", "text", "factor"), shown_units(), ids=lambda case: getattr(case, "name", str(case)))
def test_units_shown(kind: Kind, text: str, factor: float) -> None:
    size, dims = in_mks(meaning_of(text))
    assert dims == kind.dims
    assert math.isclose(factor * kind.scale, size, rel_tol=1e-12)
    value = parse(f"1 {text}", kind.name).value
    assert isinstance(value, float)
    assert math.isclose(value, factor, rel_tol=1e-12)


@pytest.mark.parametrize("kind", [kind for kind in KINDS.values() if kind.reader == "quantity"], ids=lambda k: k.name)
def test_every_unit_of_a_kind_and_none_of_another(kind: Kind) -> None:
    """In a field, each unit of the whitelist is read exactly where pint finds the field's dimension."""
    for spelling in ATOMS:
        size, dims = in_mks(MEANING[spelling])
        text = f"3 {spelling}"
        if dims == kind.dims:
            value = parse(text, kind.name).value
            assert isinstance(value, float)
            assert math.isclose(value, 3 * size / kind.scale, rel_tol=1e-12)
        else:
            with pytest.raises(UnitProblem):
                parse(text, kind.name)


ATOM = st.sampled_from(sorted(set(ATOMS) - {"'", '"'} - {name for name in ATOMS if " " in name}))
POWER = st.integers(1, 3)
TERM = st.tuples(ATOM, POWER)
SIGN = st.sampled_from(["·", "*", " ", ".", "-", " · "])


@given(upper=st.lists(TERM, min_size=1, max_size=3), lower=st.lists(TERM, max_size=3), sign=SIGN, way=st.integers(0, 3))
def test_any_compound_unit(upper: list[tuple[str, int]], lower: list[tuple[str, int]], sign: str, way: int) -> None:
    """However a product and a quotient are written, the size is pint's of the same thing in brackets."""
    raised = [str, lambda power: f"^{power}", lambda power: "" if power == 1 else "²³"[power - 2], str][way]

    def ours(terms: list[tuple[str, int]], joined: str) -> str:
        return joined.join(f"{name}{raised(power) if power > 1 and name[-1] != '2' else ''}" for name, power in terms)

    def pints(terms: list[tuple[str, int]]) -> str:
        return "*".join(f"({MEANING[name]})**{power if name[-1] != '2' else 1}" for name, power in terms) or "1"

    text = ours(upper, sign)
    if lower:
        text += [
            f"/{ours(lower, sign)}",
            f"/({ours(lower, sign)})",
            f"/{ours(lower, '/')}",
            f" per {ours(lower, sign)}",
        ][way]
    if any(name in ("inH2O",) for name, _ in (*upper, *lower)):
        return  # read alone only; its digit is part of its name
    from coldbox.units.plain import plain

    try:
        factor, dims = unit(plain(text))
    except Refused as refused:
        assert len(plain(text)) > 48, refused.reason
        return
    size, of = in_mks(f"({pints(upper)})/({pints(lower)})")
    assert dims == of
    assert math.isclose(factor, size, rel_tol=1e-12)


@given(st.lists(st.sampled_from(sorted(SIDE_BY_SIDE)), min_size=2, max_size=4))
def test_symbols_side_by_side(symbols: list[str]) -> None:
    """Written together, short symbols are one known unit, or the product of symbols: never a prefix."""
    run = "".join(symbols)
    try:
        factor, dims = unit(run)
    except Refused:
        return
    if run in ATOMS or run.casefold() in _other_case() or "mm" in run:
        return
    assert dims == tuple(sum(ATOMS[symbol][1][place] for symbol in symbols) for place in range(4))
    assert math.isclose(factor, math.prod(ATOMS[symbol][0] for symbol in symbols), rel_tol=1e-12)


def test_case_that_matters_is_kept() -> None:
    assert unit("mW")[0] * 1e9 == pytest.approx(unit("MW")[0])
    for name in CASE_MATTERS:
        for other in (name.lower(), name.upper(), name.swapcase()):
            try:
                dims = unit(other)[1]
            except Refused:
                continue
            assert other in ATOMS or dims != ATOMS[name][1], other


def test_no_unit_in_other_case_is_another_unit() -> None:
    for small, known in _other_case().items():
        assert {ATOMS[name] for name in ATOMS if name.casefold() == small} == {known}


# Quantities handed in from Python.


@pytest.mark.parametrize(
    ("number", "pints", "kind", "wanted"),
    [
        (4.0, "inch", "length", 0.1016),
        (0.0, "degF", "temperature", -160 / 9),
        (255.15, "kelvin", "temperature", -18.0),
        (9.0, "delta_degF", "difference", 5.0),
        (9.0, "kelvin", "difference", 9.0),
        (1.0, "refrigeration_ton", "power", TON),
        (1.0, "Btu", "energy", BTU),
        (25.0, "ft**2*delta_degF*hour/Btu", "resistance", 25 * 0.3048**2 * 5 / 9 * 3600 / BTU),
        (50.0, "percent", "share", 0.5),
        (5.0, "kg/day", "moisture_rate", 5.0),
        (0.022, "W/m/K", "conductivity", 0.022),
    ],
)
def test_pint_quantity(number: float, pints: str, kind: str, wanted: float) -> None:
    assert from_quantity(STOCK.Quantity(number, pints), kind) == pytest.approx(wanted, rel=1e-12, abs=1e-10)


@pytest.mark.parametrize(
    ("number", "pints", "kind"),
    [
        (4.0, "kg", "length"),
        (9.0, "degC", "difference"),
        (-5.0, "kelvin", "temperature"),
        (math.nan, "meter", "length"),
        (1.0, "ampere", "power"),
        (1.0, "hour", "clock"),
    ],
)
def test_pint_quantity_refused(number: float, pints: str, kind: str) -> None:
    with pytest.raises(UnitProblem, match="Write "):
        from_quantity(STOCK.Quantity(number, pints), kind)


def test_a_number_is_no_quantity() -> None:
    with pytest.raises(UnitProblem):
        from_quantity(3.0, "length")


def test_unit_outside_the_whitelist_by_its_dimension() -> None:
    assert parse_with_pint("2 furlong", "length").value == pytest.approx(402.336, rel=1e-5)
    assert parse_with_pint("100 mm", "length").value == pytest.approx(0.1)


@pytest.mark.parametrize(
    ("text", "kind"), [("2 furlong", "mass"), ("500 cfm", "length"), ("5 dam", "length"), ("2 ton", "mass")]
)
def test_pint_never_reads_abbreviations_or_another_dimension(text: str, kind: str) -> None:
    with pytest.raises(UnitProblem):
        parse_with_pint(text, kind)
