"""Values for people: digits, units, and that what is shown can be typed again."""

from __future__ import annotations

import math
import random

import numpy as np
import pytest
from hypothesis import assume, given
from hypothesis import strategies as st

from coldbox.units import (
    KINDS,
    Rate,
    Schedule,
    Span,
    Spread,
    compass_point,
    parse,
    show,
    show_number,
    show_spread,
    thin,
)
from coldbox.units.kinds import Kind

SYSTEM = st.sampled_from(["SI", "IP"])
PLAIN = [kind for kind in KINDS.values() if kind.reader in ("quantity", "difference", "humidity_ratio", "share")]


@pytest.mark.parametrize(
    ("kind", "value", "si", "ip"),
    [
        ("length", 0.1016, "101.6 mm", "4 in"),
        ("length", 0.0005, "0.5 mm", "0.01969 in"),
        ("length", 1.6764, "1.676 m", "5 ft 6 in"),
        ("length", 3.6576, "3.658 m", "12 ft"),
        ("length", 0.3048, "304.8 mm", "1 ft"),
        ("length", 1.8287, "1.829 m", "6 ft"),
        ("length", 0.30479, "304.8 mm", "12 in"),
        ("length", -1.6764, "-1.676 m", "-5 ft 6 in"),
        ("length", 1500.0, "1 500 m", "4 921 ft"),
        ("length", 0.0, "0 mm", "0 in"),
        ("area", 12.0774, "12.08 m²", "130 ft²"),
        ("volume", 0.04, "40 L", "1.413 ft³"),
        ("volume", 28.8, "28.8 m³", "1 017 ft³"),
        ("temperature", -18.0, "-18 °C", "-0.4 °F"),
        ("temperature", -0.04, "0 °C", "31.9 °F"),
        ("temperature", -32 * 5 / 9, "-17.8 °C", "0 °F"),
        ("difference", 9.0, "9 K", "16.2 °F"),
        ("power", 307.0, "307 W", "1 048 Btu/h"),
        ("power", 4430.0, "4.43 kW", "15 120 Btu/h"),
        ("power", -52.3, "-52.3 W", "-178.5 Btu/h"),
        ("mass", 0.6, "600 g", "1.323 lb"),
        ("mass", 900.0, "900 kg", "1 984 lb"),
        ("mass_rate", 900 / 86400, "900 kg/day", "1 984 lb/day"),
        ("moisture_rate", 11.6, "11.6 kg/day", "25.57 lb/day"),
        ("resistance", 4.402754592057646, "4.403 m²K/W", "R-25"),
        ("transmittance", 0.28, "0.28 W/m²K", "0.04931 Btu/h·ft²·°F"),
        ("conductivity", 0.022, "0.022 W/mK", "0.1525 Btu·in/h·ft²·°F"),
        ("share", 0.6, "60 %", "60 %"),
        ("share", 0.125, "12.5 %", "12.5 %"),
        ("flow", 0.2359737216, "849.5 m³/h", "500 cfm"),
        ("speed", 4.4704, "4.47 m/s", "10 mph"),
        ("specific_power", 0.05, "50 mW/kg", "1.857 Btu/lb·day"),
        ("density", 35.0, "35 kg/m³", "2.185 lb/ft³"),
        ("energy", 3.6e6 * 53.96, "53.96 kWh", "184 100 Btu"),
        ("rate", Rate(20 / 3600, "hour"), "20/h", "20/h"),
        ("rate", Rate(1200 / 86400, "day"), "1 200/day", "1 200/day"),
        ("daily_duration", Rate(20 / 1440, "day"), "20 min/day", "20 min/day"),
        ("duration", 12.0, "12 s", "12 s"),
        ("duration", 1800.0, "30 min", "30 min"),
        ("duration", 66000.0, "18 h 20 min", "18 h 20 min"),
        ("duration", 168 * 3600.0, "168 h", "168 h"),
        ("clock", 14.0, "14:00", "14:00"),
        ("clock", 32 + 1 / 3, "08:20 day 2", "08:20 day 2"),
        ("clock", 23.9999, "00:00 day 2", "00:00 day 2"),
        ("utc_offset", 2.0, "UTC+2", "UTC+2"),
        ("utc_offset", -3.5, "UTC-3:30", "UTC-3:30"),
        ("utc_offset", 0.0, "UTC", "UTC"),
        ("month", 7, "July", "July"),
        ("bearing", 180.0, "180°", "180°"),
        ("count", 3, "3", "3"),
        ("yes_no", True, "yes", "yes"),
        ("words", ("top", "sides"), "top, sides", "top, sides"),
    ],
)
def test_shown(kind: str, value: object, si: str, ip: str) -> None:
    assert show(value, kind) == si
    assert show(value, kind, "IP") == ip


@pytest.mark.parametrize(
    "text", ["always", "never", "always 50 %", "06:00-18:00, 20:00-22:00 50 %", "22:00-06:00 25 %"]
)
def test_hours_shown_as_typed(text: str) -> None:
    assert show(parse(text, "hours").value, "hours") == text


def test_digits_and_prices() -> None:
    assert show(4025.3, "power", digits=6) == "4.0253 kW"
    assert show(0.3 / 3.6e6, "energy_price", currency="EUR") == "0.3 EUR/kWh"
    assert show_number(3516.8528420667, "power", "IP") == ("12 000", "Btu/h")
    assert show_number(-18.0, "temperature", "IP") == ("-0.4", "°F")
    assert show_spread(Spread("normal", 2.0), "temperature") == "± 2 K"
    assert show_spread(Spread("normal", 0.15 / 3600), "rate") == "± 0.15/h"


def test_draws_are_shown_from_lowest_to_highest() -> None:
    assert show(np.array([[1.0], [2.0], [1.5]]), "power") == "1 W to 2 W"
    assert show(np.array([[2.0]]), "power") == "2 W"
    assert show(np.array([2.0, 2.0]), "power") == "2 W"


def test_compass_points() -> None:
    assert [compass_point(angle) for angle in (0, 11, 12, 180, 355, -90)] == ["N", "N", "NNE", "S", "N", "W"]


@given(st.floats(-1e12, 1e12, allow_subnormal=False), st.integers(1, 9))
def test_thin_keeps_its_digits(value: float, digits: int) -> None:
    text = thin(value, digits)
    back = float(text.replace(" ", ""))
    if value:
        assert abs(back - value) <= 0.5000001 * 10.0 ** (math.floor(math.log10(abs(value))) - digits + 1)
    assert not text.startswith("-0 ") and text != "-0"
    assert "." not in text or not text.endswith(("0", ".")) or "e" in text


@given(kind=st.sampled_from(PLAIN), system=SYSTEM, digits=st.sampled_from([None, 3, 6, 12]), data=st.data())
def test_what_is_shown_is_read_back(kind: Kind, system: str, digits: int | None, data: st.DataObject) -> None:
    """parse(show(x)) is x within half a unit of the last digit shown."""
    size = data.draw(st.floats(1e-3, 1e5))
    value = size * kind.si_display[0].factor
    back = parse(show(value, kind.name, system, digits), kind.name).value  # type: ignore[arg-type]
    assert isinstance(back, float)
    kept = kind.digits if digits is None else digits
    rounding = 10.0 ** (1 - kept) * abs(value) * 0.5001
    if kind.reader == "difference" and digits is None:
        rounding = 0.0501
    if kind.name == "length" and system == "IP":
        rounding = max(rounding, 0.0501 * 0.0254 if kept <= 4 else 0.0)
    if kind.name == "duration":
        rounding = max(rounding, 30.01 if value > 5390 else value * 0.51e-2)
    assert abs(back - value) <= rounding + 1e-15


@given(st.floats(-200.0, 500.0), SYSTEM)
def test_temperature_is_read_back(value: float, system: str) -> None:
    back = parse(show(value, "temperature", system), "temperature").value  # type: ignore[arg-type]
    assert isinstance(back, float)
    assert abs(back - value) <= 0.0501


@given(st.floats(0.01, 9999.0), st.sampled_from(["hour", "day"]), st.sampled_from(["rate", "daily_duration"]))
def test_rate_is_read_back_with_its_basis(number: float, basis: str, kind: str) -> None:
    per_second = number / (3600.0 if basis == "hour" else 86400.0)
    back = parse(show(Rate(per_second, basis), kind), kind).value  # type: ignore[arg-type]
    assert isinstance(back, Rate)
    assert back.basis == basis
    assert math.isclose(back.per_second, per_second, rel_tol=5.1e-4)


@given(st.integers(0, 31 * 24 * 60 - 1))
def test_clock_is_read_back(minutes: int) -> None:
    assert parse(show(minutes / 60.0, "clock"), "clock").value == pytest.approx(minutes / 60.0)


@given(st.lists(st.integers(0, 1440), min_size=2, max_size=8, unique=True), st.data())
def test_hours_are_read_back(minutes: list[int], data: st.DataObject) -> None:
    ends = sorted(minutes)
    spans = [
        Span(start / 60.0, end / 60.0, data.draw(st.sampled_from([0.25, 0.5, 1.0])))
        for start, end in zip(ends[::2], ends[1::2], strict=False)
    ]
    schedule = Schedule(tuple(spans))
    back = parse(show(schedule, "hours"), "hours").value
    assert isinstance(back, Schedule)
    assert np.allclose(back.shares(), schedule.shares(), atol=1e-9)
    assert back.hours_per_day() == pytest.approx(schedule.hours_per_day())


@given(st.sampled_from(sorted(KINDS)))
def test_examples_of_every_kind_are_read(name: str) -> None:
    for example in KINDS[name].examples:
        reading = parse(example, name)
        assert reading.kind == name
        assert reading.understood


@given(st.floats(-12.0, 14.0))
def test_utc_offset_is_read_back(hours: float) -> None:
    assert parse(show(hours, "utc_offset"), "utc_offset").value == pytest.approx(hours, abs=1 / 119)


@given(kind=st.sampled_from(PLAIN), number=st.integers(1, 9999), system=SYSTEM)
def test_with_and_without_the_space(kind: Kind, number: int, system: str) -> None:
    unit = (kind.si_display if system == "SI" else kind.ip_display)[0].unit
    assume(unit)
    spaced, tight = parse(f"{number} {unit}", kind.name).value, parse(f"{number}{unit}", kind.name).value
    assert spaced == tight
    plain = unit.replace("²", "2").replace("³", "3")
    assert parse(f"{number} {plain}", kind.name).value == spaced
    dots = unit.replace("·", random.Random(number).choice(["*", " ", ".", " · ", "⋅"]))
    assert parse(f"{number} {dots}", kind.name).value == spaced
