"""The screens in a real pseudo-terminal: the tour under several terminals, signals, faults, what is left behind."""

from __future__ import annotations

import os
import signal
import termios
from collections.abc import Iterator
from pathlib import Path

import pytest
from realterminal import ROOT, Terminal
from screens import Driven
from tours import SI, build

PLACES = {
    "xterm": {},
    "tmux": {"TERM": "screen-256color"},
    "console": {"TERM": "linux"},
    "no colour": {"NO_COLOR": "1"},
    "no UTF-8": {"LANG": "C"},
}
COLDBOX = ["-m", "coldbox"]


@pytest.fixture(scope="module")
def tour(tmp_path_factory: pytest.TempPathFactory) -> tuple[list[str], str, list[str]]:
    """The keys of the tour, the file they make, and the picture at their end."""
    folder = tmp_path_factory.mktemp("plain")
    driven = Driven(folder)
    build(driven, SI, system="SI")
    return driven.keys, (folder / "quay.toml").read_text(), driven.lines()


@pytest.fixture
def started() -> Iterator[list[Terminal]]:
    terminals: list[Terminal] = []
    yield terminals
    for terminal in terminals:
        terminal.close()


def freezer(folder: Path) -> str:
    (folder / "quay.toml").write_text((ROOT / "projects" / "long-quay-freezer.toml").read_text())
    return "quay.toml"


@pytest.mark.parametrize("place", PLACES)
def test_the_tour_in_a_real_terminal(
    place: str, tour: tuple[list[str], str, list[str]], tmp_path: Path, started: list[Terminal]
) -> None:
    keys, file, picture = tour
    terminal = Terminal(COLDBOX, tmp_path, PLACES[place])
    started.append(terminal)
    terminal.until("no project in this folder")
    terminal.send(*keys)
    terminal.until("Saved: ", 60.0)
    assert (tmp_path / "quay.toml").read_text() == file
    shown = terminal.text
    assert "needs" in shown and "ceiling" in shown and "quay" in shown
    if place in ("xterm", "tmux", "no colour"):
        assert terminal.lines[1:-3] == picture[1:-3], "what was painted piece by piece is the whole picture"
    if place == "no UTF-8":
        assert terminal.painted.isascii()
    if place == "console":
        assert "┌" not in shown and "°C" in shown
    if place == "no colour":
        assert b"[38;" not in terminal.painted and b";31m" not in terminal.painted
    terminal.send("ctrl+q")
    assert terminal.end() == 0
    assert terminal.painted.rstrip().endswith(b"\x1b[?1004l") or b"\x1b[?1049l" in terminal.painted[-400:]


def test_a_fault_keeps_the_work_restores_the_terminal_and_names_a_report(
    tmp_path: Path, started: list[Terminal]
) -> None:
    script = (
        "import coldbox.tui.pages.paper as p, sys\n"
        "def falls(*a, **k): raise ZeroDivisionError('ours')\n"
        "p.Page.draw = falls\n"
        "sys.argv = ['coldbox', 'quay.toml']\n"
        "from coldbox.__main__ import main\n"
        "main() if __name__ == '__main__' else None\n"
    )
    freezer(tmp_path)
    (tmp_path / "falls.py").write_text(script)
    terminal = Terminal(["falls.py"], tmp_path, {"TMPDIR": str(tmp_path)})
    started.append(terminal)
    before = termios.tcgetattr(terminal.fd)
    terminal.until("needs")
    terminal.send("enter", "down", "down", "enter", "enter", "escape")
    terminal.until("not saved")
    terminal.send("6")
    assert terminal.end() == 3
    assert "is kept" in terminal.text and "a fault of this program (ZeroDivisionError)" in terminal.text
    assert "Traceback" not in terminal.text
    assert list(tmp_path.glob("coldbox-fault-*.txt"))
    assert termios.tcgetattr(terminal.fd) == before
    again = Terminal([*COLDBOX, "quay.toml"], tmp_path, {})
    started.append(again)
    again.until("Unsaved work")
    again.send("g")
    again.until("not saved")


@pytest.mark.parametrize("what", [signal.SIGHUP, signal.SIGTERM])
def test_a_line_that_drops_loses_nothing(what: signal.Signals, tmp_path: Path, started: list[Terminal]) -> None:
    terminal = Terminal([*COLDBOX, freezer(tmp_path)], tmp_path, {})
    started.append(terminal)
    terminal.until("needs")
    terminal.send("enter", "down", "down", "enter", "enter")
    terminal.until("not saved")
    os.kill(terminal.pid, what)
    assert terminal.end() == 128 + what
    assert not list(tmp_path.glob(".*lock*")), "its lock is given back"
    again = Terminal([*COLDBOX, "quay.toml"], tmp_path, {})
    started.append(again)
    again.until("Unsaved work")


@pytest.mark.parametrize("term", ["dumb", ""])
def test_a_terminal_that_cannot_be_drawn_on_is_refused(term: str, tmp_path: Path, started: list[Terminal]) -> None:
    terminal = Terminal([*COLDBOX, freezer(tmp_path)], tmp_path, {"TERM": term})
    started.append(terminal)
    assert terminal.end() == 2
    assert "cannot be drawn on" in terminal.text and "\x1b" not in terminal.painted.decode()


def test_few_bytes_go_over_the_line(tmp_path: Path, started: list[Terminal]) -> None:
    terminal = Terminal([*COLDBOX, freezer(tmp_path)], tmp_path, {})
    started.append(terminal)
    terminal.until("needs")
    while terminal.read(1.5):  # the hold time comes, and its spread
        continue
    assert cost(terminal, "right") <= 500
    assert cost(terminal, "2") <= 12_000
    assert cost(terminal, "down") <= 2_000
    assert cost(terminal, "1") <= 12_000
    cost(terminal, "enter")
    cost(terminal, "p")
    assert cost(terminal, "i") <= 600
    assert terminal.read(0.5) == b"", "idle is silent"


def cost(terminal: Terminal, key: str) -> int:
    """How many bytes a key brings."""
    terminal.send(key)
    return len(terminal.read(0.25))
