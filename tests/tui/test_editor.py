"""The editor of one line."""

from __future__ import annotations

from hypothesis import given
from hypothesis import strategies as st

from coldbox.tui.widgets.editor import Editor

KEYS = ["left", "right", "home", "end", "backspace", "delete", "ctrl+u", "ctrl+k", "ctrl+w", "x", "é", " "]


@given(st.lists(st.sampled_from(KEYS), max_size=60))
def test_the_cursor_never_leaves_the_text(keys: list[str]) -> None:
    editor = Editor("4 in")
    for key in keys:
        if not editor.key(key):
            editor.type(key)
        assert 0 <= editor.at <= len(editor.text)
        shown, at = editor.shown(10)
        assert len(shown) <= 10
        assert 0 <= at < 10


def test_the_first_letter_takes_the_place_of_what_stood_there() -> None:
    editor = Editor("-18 °C", fresh=True)
    editor.type("-")
    editor.type("20")
    assert editor.text == "-20"


def test_moving_first_keeps_what_stood_there() -> None:
    editor = Editor("18 °C", fresh=True)
    editor.key("home")
    editor.type("-")
    assert editor.text == "-18 °C"


def test_of_several_lines_the_first_is_taken_and_the_others_are_counted() -> None:
    editor = Editor()
    assert editor.paste("\n  4 in \r\nsecond\nthird\n") == 2
    assert editor.text == "4 in"


def test_what_cannot_be_printed_becomes_a_blank() -> None:
    editor = Editor()
    editor.paste("a\x1b[31mb\x07c")
    assert editor.text == "a [31mb c"


def test_a_paste_without_end_is_cut() -> None:
    editor = Editor()
    editor.paste("x" * 1_000_000)
    assert len(editor.text) == 2000


def test_a_word_goes_with_one_key() -> None:
    editor = Editor("strip curtain, air")
    editor.key("ctrl+w")
    assert editor.text == "strip curtain, "
    editor.key("ctrl+w")
    assert editor.text == "strip "
