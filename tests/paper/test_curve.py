"""The curve in characters: what is drawn lies where the figures are."""

from __future__ import annotations

import math

import numpy as np
import pytest

from coldbox.paper.curve import BLANK, ROWS, drawn
from coldbox.paper.document import Curve, Line


def curve(**changes: object) -> Curve:
    at = tuple(float(one) for one in np.linspace(0.0, 10.0, 41))
    given: dict[str, object] = {
        "unit": "°C", "at": at, "lines": (Line(label="air", values=tuple(-20.0 + 2.0 * one for one in at)),),
        "levels": (("limit -10 °C", -10.0),), "ticks": ((0.0, "14:00"), (5.0, "19:00")), "points": (0, 20, 40),
    }  # fmt: skip
    return Curve(**{**given, **changes})


@pytest.mark.parametrize("width", [40, 60, 80, 120])
@pytest.mark.parametrize("ascii_only", [False, True])
def test_size(width: int, ascii_only: bool) -> None:
    page = drawn(curve(), width, ascii_only=ascii_only)
    assert len(page) == ROWS + 2
    assert max(map(len, page)) <= width
    if ascii_only:
        assert all(line.replace("°", "").isascii() for line in page)


def test_a_straight_line_is_drawn_straight() -> None:
    page = drawn(curve(levels=()), 80, ascii_only=True)[1 : ROWS + 1]
    places = [(line.split("|")[1].index("*"), row) for row, line in enumerate(page) if "*" in line.split("|")[1]]
    assert len(places) == ROWS
    columns, rows = zip(*places, strict=True)
    # The outermost rows stand for half a row each.
    assert np.abs(np.diff(columns, 2)).max() <= 3 and list(rows) == list(range(ROWS))
    assert columns[0] > columns[-1]  # it rises: the highest row has the latest hour


def test_the_level_stands_at_its_row_and_the_scale_agrees() -> None:
    page = drawn(curve(), 80, ascii_only=True)
    row = next(line for line in page if "limit -10 °C" in line)
    assert row.strip().startswith("-10|") and "----" in row
    assert page[1].strip().startswith("0|") and page[ROWS].strip().startswith("-20|")
    assert page[-1].split() == ["14:00", "19:00"]
    middle = page[0].index("C") + 2
    assert page[-1].index("19:00") == pytest.approx(middle + (80 - middle - 14) / 2, abs=3)


def test_braille_has_four_times_the_rows() -> None:
    page = drawn(curve(levels=()), 80)[1 : ROWS + 1]
    dots = sum(bin(ord(char) - BLANK).count("1") for line in page for char in line if 0x2800 <= ord(char) < 0x2900)
    assert dots > 4 * ROWS
    assert all(any(0x2800 < ord(char) < 0x2900 for char in line) for line in page)


def test_what_is_not_there_is_not_drawn() -> None:
    at = curve().at
    gone = Line(label="milk", values=tuple(math.nan if one > 5.0 else 0.0 for one in at))
    page = drawn(curve(lines=(gone,), levels=()), 80, ascii_only=True)
    marks = [line.split("|")[1].split(" * ")[0] for line in page[1 : ROWS + 1]]
    width = 80 - 8
    assert max((mark.rfind("*") for mark in marks), default=0) <= 0.6 * width
    assert "milk" in "".join(page)


def test_nothing_at_all_and_level_figures_are_drawn_too() -> None:
    none = Line(label="x", values=(math.nan,) * 41)
    assert len(drawn(curve(lines=(none,), levels=()), 80)) == ROWS + 2
    steady = Line(label="x", values=(4.0,) * 41)
    page = drawn(curve(lines=(steady,), levels=()), 80, ascii_only=True)
    assert sum("*****" in line for line in page) == 1


def test_a_jump_has_no_hole() -> None:
    at = curve().at
    jump = Line(label="x", values=tuple(0.0 if one < 5.0 else 10.0 for one in at))
    page = drawn(curve(lines=(jump,), levels=()), 80, ascii_only=True)[1 : ROWS + 1]
    assert all("*" in line.split("|")[1] for line in page)


def test_names_at_one_height_stand_below_each_other() -> None:
    lines = tuple(Line(label=f"lot {number}", values=(1.0,) * 41) for number in range(3))
    page = drawn(curve(lines=lines, levels=(("limit", 1.0),)), 80)
    assert all(any(f"lot {number}" in line for line in page) for number in range(3))
