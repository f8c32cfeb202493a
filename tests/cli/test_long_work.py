"""Long work in a real terminal: a line of progress after a second, stopped at once and without a mess."""

from __future__ import annotations

import contextlib
import os
import pty
import signal
import subprocess
import sys
import time
from pathlib import Path

import pytest

from coldbox.cli import progress
from coldbox.cli.progress import Progress

ROOT = Path(__file__).parents[2]
LONG = ["outage", "projects/net-loft-full.toml", "--draws", "20000"]


class Terminal:
    """Standard error that somebody watches."""

    def __init__(self) -> None:
        self.text = ""

    def isatty(self) -> bool:
        return True

    def write(self, text: str) -> None:
        self.text += text

    def flush(self) -> None:
        pass


@pytest.fixture
def clock(monkeypatch: pytest.MonkeyPatch) -> list[float]:
    now = [100.0]
    monkeypatch.setattr(progress.time, "monotonic", lambda: now[0])
    return now


def test_short_work_says_nothing(clock: list[float], monkeypatch: pytest.MonkeyPatch) -> None:
    terminal = Terminal()
    monkeypatch.setattr(sys, "stderr", terminal)
    with Progress("outage") as tell:
        for step in range(9):
            clock[0] = 100.0 + 0.1 * step
            assert tell(step / 10.0)
    assert terminal.text == ""


def test_long_work_tells_and_wipes_its_line(clock: list[float], monkeypatch: pytest.MonkeyPatch) -> None:
    terminal = Terminal()
    monkeypatch.setattr(sys, "stderr", terminal)
    with Progress("outage") as tell:
        for step in range(40):
            clock[0] = 100.0 + 0.1 * step
            tell(step / 40.0)
    said = terminal.text.split("\r")
    assert said[1].startswith("outage: 25 %, about 3 s more")
    assert len(said) - 3 <= 16 and "\n" not in terminal.text
    assert said[-1] == "" and not said[-2].strip() and len(said[-2]) >= len(said[-3].rstrip())


def test_nobody_watches_nothing_is_said(clock: list[float], capsys: pytest.CaptureFixture[str]) -> None:
    with Progress("outage") as tell:
        clock[0] = 200.0
        assert tell(0.5)
    assert capsys.readouterr().err == ""


def started(error: int) -> subprocess.Popen[bytes]:
    return subprocess.Popen(
        [sys.executable, "-m", "coldbox", *LONG],
        cwd=ROOT,
        env={**os.environ, "PYTHONPATH": str(ROOT)},
        stdout=subprocess.PIPE,
        stderr=error,
        start_new_session=True,
    )


def ended(process: subprocess.Popen[bytes]) -> None:
    """Ends a process and its own, should the test have failed to."""
    with contextlib.suppress(ProcessLookupError):
        os.killpg(process.pid, signal.SIGKILL)
    process.wait()


def test_ctrl_c_stops_at_once_with_one_line() -> None:
    ours, theirs = pty.openpty()
    process = started(theirs)
    os.close(theirs)
    try:
        seen = b""
        deadline = time.monotonic() + 40.0
        while b"%" not in seen and time.monotonic() < deadline:
            seen += os.read(ours, 1000)
        assert b"outage: " in seen and b"Ctrl-C stops" in seen
        os.killpg(process.pid, signal.SIGINT)  # as the terminal does: every process of it hears
        asked = time.monotonic()
        assert process.stdout is not None
        out = process.stdout.read()
        assert process.wait(timeout=10) == 130
        assert time.monotonic() - asked < 3.0
        rest = b""
        while True:
            try:
                more = os.read(ours, 1000)
            except OSError:  # the other end is closed: all is read
                break
            if not more:
                break
            rest += more
        assert out == b"" and b"Traceback" not in rest
        last = rest.replace(b"\r\n", b"\n").split(b"\r")[-1]
        assert last == b"coldbox: stopped.\n"
        with pytest.raises(ProcessLookupError):  # none of its own is left behind
            for _ in range(50):
                os.killpg(process.pid, 0)
                time.sleep(0.1)
    finally:
        os.close(ours)
        ended(process)


def test_without_a_terminal_there_is_no_progress() -> None:
    process = started(subprocess.PIPE)
    try:
        time.sleep(4.0)
        os.killpg(process.pid, signal.SIGINT)
        out, err = process.communicate(timeout=10)
        assert process.returncode == 130 and out == b"" and err == b"coldbox: stopped.\n"
    finally:
        ended(process)
