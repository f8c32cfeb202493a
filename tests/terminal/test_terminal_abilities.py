"""What is known of a terminal before anything is painted on it."""

from __future__ import annotations

import pytest

from coldbox.tui.terminal import NoTerminal, abilities, check


@pytest.mark.parametrize(
    ("environment", "drawing", "letters"),
    [
        ({"LANG": "en_GB.UTF-8", "TERM": "xterm-256color"}, False, False),
        ({"LANG": "C.UTF-8", "TERM": "screen-256color"}, False, False),
        ({"LC_ALL": "C", "LANG": "en_GB.UTF-8", "TERM": "xterm"}, True, True),
        ({"LANG": "C", "LC_CTYPE": "C.UTF-8", "TERM": "xterm"}, True, True),  # as Python leaves LANG=C
        ({"LANG": "de_DE.ISO-8859-1", "TERM": "xterm"}, True, True),
        ({"TERM": "xterm"}, True, True),
        ({"LANG": "nb_NO.utf8", "TERM": "linux"}, True, False),
    ],
)
def test_ascii_where_letters_or_lines_do_not_arrive(environment: dict[str, str], drawing: bool, letters: bool) -> None:
    found = abilities(environment, "utf-8")
    assert (found.ascii_drawing, found.ascii_letters) == (drawing, letters)


def test_a_stream_that_is_not_utf8_gets_ascii() -> None:
    assert abilities({"LANG": "en_GB.UTF-8", "TERM": "xterm"}, "iso8859-1").ascii_letters


def test_no_color_is_heard_and_an_empty_one_is_not() -> None:
    assert abilities({"NO_COLOR": "1", "LANG": "C.UTF-8"}, "utf-8").theme == "plain"
    assert abilities({"NO_COLOR": "", "LANG": "C.UTF-8"}, "utf-8").theme == ""


@pytest.mark.parametrize("term", ["", "dumb", "unknown"])
def test_a_terminal_that_cannot_be_drawn_on_is_refused_in_words(term: str) -> None:
    with pytest.raises(NoTerminal, match=r"coldbox load FILE"):
        check({"TERM": term}, stdin=True, stderr=True)


@pytest.mark.parametrize(("stdin", "stderr"), [(False, True), (True, False), (False, False)])
def test_a_pipe_is_refused_in_words(stdin: bool, stderr: bool) -> None:
    with pytest.raises(NoTerminal, match="pipe"):
        check({"TERM": "xterm"}, stdin=stdin, stderr=stderr)
