"""The cells of the screen: nothing outside, nothing half, nothing alive."""

from __future__ import annotations

import unicodedata

import pytest
from hypothesis import given
from hypothesis import strategies as st

from coldbox.tui.frame import Frame, wrapped
from coldbox.tui.plain import cells, width


@given(st.text(max_size=60), st.integers(-70, 90), st.integers(-3, 8), st.booleans())
def test_whatever_is_written_the_picture_keeps_its_size(text: str, x: int, y: int, letters: bool) -> None:
    frame = Frame(30, 4, ascii_letters=letters)
    frame.text(x, y, text)
    for row in frame.rows():
        assert sum(width(run.text) for run in row) == 30


@given(st.text(max_size=80))
def test_no_control_character_is_ever_a_cell(text: str) -> None:
    shown = "".join(cells(text))
    assert not any(unicodedata.category(one) in ("Cc", "Cf", "Cs", "Zl", "Zp") for one in shown)


@given(st.text(max_size=80))
def test_ascii_is_ascii(text: str) -> None:
    assert "".join(cells(text, ascii_drawing=True, ascii_letters=True)).isascii()


def test_lines_become_ascii_and_letters_stay_where_only_lines_are_missing() -> None:
    assert "".join(cells("┌─┐ 4 °C ▓⣿", ascii_drawing=True)) == "+-+ 4 °C %*"
    assert "".join(cells("┌─┐ 4 °C m²", ascii_drawing=True, ascii_letters=True)) == "+-+ 4 C m2"


def test_a_wide_letter_takes_two_cells_and_is_never_cut_in_half() -> None:
    frame = Frame(5, 1)
    frame.text(0, 0, "冷凍室", width=5)
    assert width(frame.lines()[0]) <= 5
    assert sum(width(run.text) for run in frame.rows()[0]) == 5


def test_an_accent_that_combines_stays_on_its_letter() -> None:
    assert list(cells("e\u0301")) == ["e\u0301"]


def test_what_is_too_long_ends_in_a_mark() -> None:
    frame = Frame(20, 1)
    frame.text(0, 0, "a rather long name", width=8)
    assert frame.lines() == ["a rathe…"]


@given(st.text(alphabet="ab c\n", max_size=120), st.integers(5, 30))
def test_wrapping_loses_no_word_and_keeps_within_the_width(text: str, size: int) -> None:
    lines = wrapped(text, size)
    assert "".join("".join(lines).split()) == "".join(text.split())
    assert all(width(line) <= size for line in lines)


@pytest.mark.parametrize("size", [(0, 0), (1, 1), (2, 2), (20, 5)])
def test_a_box_in_a_tiny_picture_raises_nothing(size: tuple[int, int]) -> None:
    frame = Frame(*size)
    frame.box(0, 0, 40, 10, "title")
    assert len(frame.rows()) == max(size[1], 1)
