"""Whatever is typed, the answer is a value or one sentence, after work that grows with the length of the text."""

from __future__ import annotations

import math
import sys
from types import FrameType

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from coldbox.errors import UnitProblem
from coldbox.units import KINDS, Rate, Reading, parse
from coldbox.units.atoms import ATOMS
from coldbox.units.numbers import read_number
from coldbox.units.unit_text import unit

KIND = st.sampled_from(sorted(KINDS))
PIECE = st.sampled_from(
    [
        *ATOMS,
        *"0123456789.,/*^()-+±°%'\" _",
        "e",
        "to",
        "per",
        "R-",
        "RSI",
        "nan",
        "inf",
        "day 2",
        "UTC",
        "EUR",
        "²",
        "½",
    ]
)
SOUP = st.lists(PIECE, max_size=40).map("".join)
WELL = st.sampled_from([example for kind in KINDS.values() for example in kind.examples])


def read(text: str, kind: str, bare: str | None = None) -> Reading | None:
    try:
        return parse(text, kind, bare=bare)
    except UnitProblem as problem:
        sentence = str(problem)
        assert sentence.isprintable()
        assert len(sentence) < 500
        assert sentence.endswith(".")
        return None


def check(reading: Reading | None) -> None:
    if reading is None:
        return
    value = reading.value.per_second if isinstance(reading.value, Rate) else reading.value
    if isinstance(value, float):
        assert math.isfinite(value)
    if reading.spread is not None:
        assert math.isfinite(reading.spread.half_width)
        assert reading.spread.half_width >= 0.0


@settings(max_examples=400)
@given(st.text(max_size=200), KIND)
def test_any_text(text: str, kind: str) -> None:
    check(read(text, kind))


@settings(max_examples=600)
@given(SOUP, KIND, st.sampled_from([None, "mm", "°C", "%", "/h", "R", "EUR/kWh"]))
def test_soup_of_what_texts_are_made_of(text: str, kind: str, bare: str | None) -> None:
    check(read(text, kind, bare))


@settings(max_examples=400)
@given(WELL, KIND, st.integers(0, 30), PIECE)
def test_good_text_with_something_in_it(text: str, kind: str, place: int, piece: str) -> None:
    check(read(text[:place] + piece + text[place:], kind))


NASTY = [
    "(" * 100,
    "9" * 119,
    "1 " * 59,
    "1 000 " * 19,
    "/" * 100,
    "1 " + "mK" * 40,
    "1 " + "ftinKhm" * 12,
    "1 " + "hhhhhhhhhhhh" * 9,
    "1" + " m" * 55,
    "1 m" + "^2" * 50,
    "1 W/" + "(m·K)/" * 18,
    "1 " + "sq " * 30,
    "1 " + " per " * 20,
    "±" * 100,
    " to " * 28,
    "1,1,1,1," * 14,
    "5' 6\" " * 16,
    "06:00-07:00, " * 45,
    "day 2 " * 20,
    "a " * 59,
    " " * 110 + "m",
    "-" * 118,
    "EUR" * 39,
]


def lines_run(text: str, kind: str) -> int:
    """Lines of this package that run for one text."""
    count = 0

    def trace(frame: FrameType, event: str, _arg: object) -> object:
        nonlocal count
        if "coldbox" not in frame.f_code.co_filename:
            return None
        count += event == "line"
        return trace

    unit.cache_clear()
    before = sys.gettrace()
    sys.settrace(trace)  # type: ignore[arg-type]
    try:
        read(text, kind)
    finally:
        sys.settrace(before)
    return count


@pytest.mark.parametrize("text", NASTY)
def test_work_is_bounded(text: str) -> None:
    """Counted in lines run, not by the clock: at most a few per sign, for every kind."""
    unit("kg*m")  # the look-up by small letters is made once
    for kind in KINDS:
        assert lines_run(text, kind) < 400 + 60 * len(text), kind


def test_long_text_is_refused_before_it_is_looked_at() -> None:
    for kind in KINDS:
        assert lines_run("1" * 1_000_000, kind) < 600


@given(st.text(alphabet="0123456789 .,/e+-_", max_size=60))
def test_a_number_ends_inside_the_text_and_is_finite(text: str) -> None:
    from coldbox.units.refused import Refused

    try:
        value, end = read_number(text)
    except Refused:
        return
    assert 0 < end <= len(text)
    assert math.isfinite(value)


@given(st.integers(1, 999), st.lists(st.integers(0, 999), min_size=1, max_size=3))
def test_thousands_apart(first: int, groups: list[int]) -> None:
    whole = float(f"{first}{''.join(f'{group:03d}' for group in groups)}")
    for sign in (" ", "_", "\u2009", "\u202f", "\u00a0"):
        text = f"{first}{''.join(f'{sign}{group:03d}' for group in groups)} mm"
        assert parse(text, "length").value == pytest.approx(whole / 1000.0, rel=1e-15)


@given(st.integers(0, 99999), st.text(alphabet="0123456789", min_size=1, max_size=6))
def test_comma_is_a_decimal_or_refused(whole: int, decimals: str) -> None:
    text = f"{whole},{decimals} m"
    if len(decimals) == 3 and whole != 0:
        with pytest.raises(UnitProblem, match="has a comma that could stand for"):
            parse(text, "length")
    else:
        assert parse(text, "length").value == pytest.approx(float(f"{whole}.{decimals}"))


def test_reading_a_file_does_not_start_pint() -> None:
    import subprocess

    code = (
        "import sys, coldbox.units as u; u.parse('100 mm', 'length'); u.show(1.0, 'power');print('pint' in sys.modules)"
    )
    assert subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True).stdout == "False\n"
