"""A program in a pseudo-terminal of its own: keys in, bytes and a picture out, with the times of both."""

from __future__ import annotations

import contextlib
import fcntl
import os
import pty
import select
import signal
import struct
import sys
import termios
import time
from collections.abc import Mapping, Sequence
from pathlib import Path

import pyte

ROOT = Path(__file__).parents[2]
QUIET_S = 0.08  # nothing more comes after so long


class Terminal:
    """A program at work in a terminal of so many columns and lines."""

    def __init__(
        self, words: Sequence[str], *, columns: int = 80, lines: int = 24, environment: Mapping[str, str] = {},  # noqa: B006
        folder: Path = ROOT,
    ) -> None:  # fmt: skip
        self.screen = pyte.Screen(columns, lines)
        self.stream = pyte.ByteStream(self.screen)
        self.written = b""
        kept = {key: value for key, value in os.environ.items() if key not in ("COLUMNS", "LINES", "NO_COLOR")}
        kept |= {"PYTHONPATH": str(ROOT), "TERM": "xterm-256color", "LANG": "C.UTF-8", **environment}
        kept.pop("PYTHONDONTWRITEBYTECODE", None)
        self.begun = time.perf_counter()
        self.pid, self.end = pty.fork()
        if self.pid == 0:
            os.chdir(folder)
            os.execve(sys.executable, [sys.executable, *words], kept)
        self.resize(columns, lines, tell=False)

    def __enter__(self) -> Terminal:
        return self

    def __exit__(self, *_: object) -> None:
        with contextlib.suppress(ProcessLookupError):
            os.kill(self.pid, signal.SIGKILL)
        with contextlib.suppress(OSError):
            os.close(self.end)
        with contextlib.suppress(ChildProcessError):
            os.waitpid(self.pid, 0)

    def resize(self, columns: int, lines: int, *, tell: bool = True) -> None:
        """Another size, as a window gets it."""
        fcntl.ioctl(self.end, termios.TIOCSWINSZ, struct.pack("HHHH", lines, columns, 0, 0))
        self.screen.resize(lines, columns)
        if tell:
            os.kill(self.pid, signal.SIGWINCH)

    def read(self, quiet_s: float = QUIET_S, most_s: float = 20.0) -> tuple[bytes, float]:
        """What comes until nothing does; the instant of the last byte."""
        found, last, end = b"", time.perf_counter(), time.perf_counter() + most_s
        while time.perf_counter() < end:
            ready, _, _ = select.select([self.end], [], [], quiet_s)
            if not ready:
                break
            try:
                more = os.read(self.end, 65536)
            except OSError:
                break
            if not more:
                break
            found, last = found + more, time.perf_counter()
        self.written += found
        self.stream.feed(found)
        return found, last

    def until(self, text: str, most_s: float = 30.0) -> float:
        """Reads until a text stands on the screen; seconds since the program began."""
        end = time.perf_counter() + most_s
        while text not in self.text():
            assert time.perf_counter() < end, f"{text!r} never came:\n{self.text()}"
            self.read(0.01)
        return time.perf_counter() - self.begun

    def send(self, keys: str) -> tuple[int, float]:
        """Keys as they arrive; bytes that came back, and the seconds until the last of them."""
        start = time.perf_counter()
        os.write(self.end, keys.encode())
        found, last = self.read()
        return len(found), last - start

    def text(self) -> str:
        """What stands on the screen."""
        return "\n".join(line.rstrip() for line in self.screen.display)

    def ended(self, most_s: float = 15.0) -> int:
        """The exit status, once the program has ended."""
        end = time.perf_counter() + most_s
        while time.perf_counter() < end:
            self.read(0.01, 0.2)
            done, status = os.waitpid(self.pid, os.WNOHANG)
            if done:
                return os.waitstatus_to_exitcode(status)
        raise AssertionError(f"it goes on:\n{self.text()}")
