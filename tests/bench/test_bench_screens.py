"""What the screens cost in a terminal, against the least application of the same toolkit.

Run alone: pytest -m bench -p no:xdist -s tests/bench
"""

from __future__ import annotations

import statistics
import time
from collections.abc import Iterator
from contextlib import contextmanager
from pathlib import Path

import pytest
from realterminal import ROOT, Terminal

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
OURS, FLOOR = ["-m", "coldbox", "quay.toml"], ["-c", LEAST]
ROUNDS = 6
KEYS = 20
QUIET_S = 0.08  # nothing more comes after so long


@pytest.fixture
def folder(tmp_path: Path) -> Path:
    (tmp_path / "quay.toml").write_bytes((ROOT / "projects" / "long-quay-freezer.toml").read_bytes())
    return tmp_path


@contextmanager
def running(words: list[str], folder: Path) -> Iterator[Terminal]:
    terminal = Terminal(words, folder, {})
    try:
        yield terminal
    finally:
        terminal.close()


def started(words: list[str], folder: Path, until: str) -> float:
    with running(words, folder) as terminal:
        terminal.until(until)
        return time.perf_counter() - terminal.began


def keyed(terminal: Terminal, key: str) -> tuple[int, float]:
    """Bytes that a key brings, and the seconds until the last of them."""
    begin = time.perf_counter()
    terminal.send(key)
    size, last = 0, begin
    while data := terminal.read(0.0) or terminal.read(QUIET_S):
        size, last = size + len(data), time.perf_counter()
        if time.perf_counter() - begin > 5.0:
            break
    return size, last - begin


def test_first_picture(folder: Path) -> None:
    """Least of ours against least of the floor's, in turns."""
    started(OURS, folder, "1 Carton")
    pairs = [(started(OURS, folder, "1 Carton"), started(FLOOR, folder, "ready to type")) for _ in range(ROUNDS)]
    ours, floor = (min(times) for times in zip(*pairs, strict=True))
    print(f"\nfirst picture: {1e3 * ours:.0f} / {1e3 * floor:.0f} ms, {ours / floor:.2f}")
    assert ours / floor <= 1.3


def test_key_to_picture(folder: Path) -> None:
    """Cursor moves over the carton, once its hold time stands, against letters into one input; the best of three."""
    runs = []
    for _ in range(3):
        with running(OURS, folder) as terminal:
            terminal.until("holds ")
            while "8 in 10" not in terminal.text and " h to " not in terminal.text:
                terminal.read(0.2)
            terminal.read(1.0)
            ours = [keyed(terminal, key)[1] for key in ("right", "left") * (KEYS // 2)]
        with running(FLOOR, folder) as terminal:
            terminal.until("ready to type")
            terminal.read(1.0)
            floor = [keyed(terminal, letter)[1] for letter in "abcdefghijklmnopqrst"]
        runs.append((statistics.median(ours) / statistics.median(floor), sorted(ours)[int(0.95 * len(ours))]))
    ratio, slow = min(one for one, _ in runs), min(one for _, one in runs)
    print(f"\nkey to picture: {ratio:.2f} of the floor's middle; 95 of 100 within {1e3 * slow:.0f} ms")
    assert ratio <= 0.7
    assert slow < 0.030


def test_bytes_on_the_line(folder: Path) -> None:
    with running(OURS, folder) as terminal:
        terminal.until(" h to ", 60.0)
        terminal.read(1.0)
        moves = [keyed(terminal, key)[0] for key in ("right", "down", "left", "up") * 3]
        pages = [keyed(terminal, key)[0] for key in ("2", "3", "1")]
        keyed(terminal, "enter")
        for _ in range(3):
            keyed(terminal, "down")
        letters = [keyed(terminal, letter)[0] for letter in "1.35 m"]
        idle = len(terminal.read(1.5))
    print(f"\nbytes: a move {max(moves)} at most, a page {max(pages)}, a letter {max(letters)}, idle {idle}")
    assert max(moves) <= 500 and max(pages) <= 12_000 and max(letters) <= 600 and idle == 0
