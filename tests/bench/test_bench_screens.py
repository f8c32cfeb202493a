"""What the screens cost in a terminal, against the least application of the same toolkit.

Run alone: pytest -m bench -p no:xdist -s tests/bench
"""

from __future__ import annotations

import statistics
from pathlib import Path

import pytest
from terminals import Terminal

pytestmark = pytest.mark.bench

LEAST = """
from textual.app import App
from textual.widgets import Input
class Least(App):
    CSS = "Input { width: 100%; }"
    def compose(self):
        yield Input(placeholder="ready to type", compact=True)
Least().run()
"""
ROUNDS = 5
KEYS = 20


@pytest.fixture
def file(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> str:
    monkeypatch.setenv("XDG_STATE_HOME", str(tmp_path / "state"))
    example = Path(__file__).parents[2] / "projects" / "long-quay-freezer.toml"
    (tmp_path / "quay.toml").write_bytes(example.read_bytes())
    return str(tmp_path / "quay.toml")


def started(words: list[str], until: str) -> float:
    with Terminal(words) as terminal:
        return terminal.until(until)


def test_first_picture(file: str) -> None:
    """Least of ours against least of the floor's, in turns."""
    started(["-m", "coldbox", file], "1 Carton")
    pairs = [
        (started(["-m", "coldbox", file], "1 Carton"), started(["-c", LEAST], "ready to type")) for _ in range(ROUNDS)
    ]
    ours, floor = (min(times) for times in zip(*pairs, strict=True))
    print(f"\nfirst picture: {1e3 * ours:.0f} / {1e3 * floor:.0f} ms, {ours / floor:.2f}")
    assert ours / floor <= 1.3


def keyed(words: list[str], until: str, keys: list[str], *, before: str = "") -> list[float]:
    with Terminal(words) as terminal:
        terminal.until(until)
        terminal.read(1.0)
        if before:
            terminal.send(before)
        times = []
        for key in keys:
            size, seconds = terminal.send(key)
            if size:
                times.append(seconds)
        return times


def test_key_to_picture(file: str) -> None:
    """Cursor moves over the carton, against letters into one input."""
    right, left = "\x1b[C", "\x1b[D"
    runs = []
    for _ in range(3):
        ours = keyed(["-m", "coldbox", file], "holds ", [right, left] * (KEYS // 2))
        floor = keyed(["-c", LEAST], "ready to type", list("abcdefghijklmnopqrst"))
        runs.append((statistics.median(ours) / statistics.median(floor), sorted(ours)[int(0.95 * len(ours))]))
    ratio, slow = min(one for one, _ in runs), min(one for _, one in runs)
    print(f"\nkey to picture: {ratio:.2f} of the floor's middle; 95 of 100 within {1e3 * slow:.0f} ms")
    assert ratio <= 0.7
    assert slow < 0.030


def test_bytes_on_the_line(file: str) -> None:
    with Terminal(["-m", "coldbox", file]) as terminal:
        terminal.until("holds ")
        terminal.until("1 Carton")
        terminal.read(3.0)
        moves = [terminal.send(key)[0] for key in ("\x1b[C", "\x1b[B", "\x1b[D", "\x1b[A") * 3]
        pages = [terminal.send(key)[0] for key in ("2", "3", "1")]
        terminal.send("\r")
        terminal.send("\x1b[B\x1b[B\x1b[B")
        letters = [terminal.send(letter)[0] for letter in "1.35 m"]
        idle = len(terminal.read(0.5, 2.0)[0])
    print(f"\nbytes: a move {max(moves)} at most, a page {max(pages)}, a letter {max(letters)}, idle {idle}")
    assert max(moves) <= 500 and max(pages) <= 12_000 and max(letters) <= 600 and idle == 0
