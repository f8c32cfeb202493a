"""A program in a terminal of its own: a pseudo-terminal, and a screen that keeps what was painted on it."""

from __future__ import annotations

import fcntl
import os
import pty
import select
import signal
import struct
import sys
import termios
import time
from pathlib import Path

import pyte

BYTES = {
    "enter": b"\r", "escape": b"\x07", "up": b"\x1b[A", "down": b"\x1b[B", "right": b"\x1b[C", "left": b"\x1b[D",
    "home": b"\x1b[H", "end": b"\x1b[F", "tab": b"\t", "backspace": b"\x7f", "f2": b"\x1bOQ", "f1": b"\x1bOP",
}  # fmt: skip
ROOT = Path(__file__).parents[2]


def sent(key: str) -> bytes:
    """What a terminal sends for a key. For Esc, Ctrl-G: the other way back, which no tmux delays."""
    if key in BYTES:
        return BYTES[key]
    if key.startswith("ctrl+"):
        return bytes([ord(key[5]) - 96])
    return key.encode()


class Terminal:
    """A process in a pseudo-terminal of 80 by 24."""

    def __init__(
        self, arguments: list[str], folder: Path, environment: dict[str, str], size: tuple[int, int] = (80, 24)
    ):
        inherited = {key: os.environ[key] for key in ("PATH", "HOME", "OPENBLAS_NUM_THREADS") if key in os.environ}
        self.environment = {
            **inherited, "PYTHONPATH": str(ROOT), "TERM": "xterm-256color", "LANG": "C.UTF-8", "ESCDELAY": "25",
            "XDG_STATE_HOME": str(folder / "state"), "XDG_CONFIG_HOME": str(folder / "config"), **environment,
        }  # fmt: skip
        self.screen = pyte.Screen(*size)
        self._stream = pyte.ByteStream(self.screen)
        self.painted = b""
        self.began = time.perf_counter()
        self.pid, self.fd = pty.fork()
        if self.pid == 0:
            os.chdir(folder)
            os.execve(sys.executable, [sys.executable, *arguments], self.environment)
        self.resize(*size)
        self.status: int | None = None

    def resize(self, width: int, height: int) -> None:
        """Another size, as when a window is pulled."""
        fcntl.ioctl(self.fd, termios.TIOCSWINSZ, struct.pack("HHHH", height, width, 0, 0))
        self.screen.resize(height, width)

    def send(self, *keys: str) -> None:
        """Keys, all at once."""
        os.write(self.fd, b"".join(sent(key) for key in keys))

    def read(self, seconds: float) -> bytes:
        """What is painted until nothing has come for so long."""
        got = b""
        while select.select([self.fd], [], [], seconds)[0]:
            try:
                data = os.read(self.fd, 65536)
            except OSError:
                break
            if not data:
                break
            got += data
        self._stream.feed(got.replace(b"\x1b[<u", b""))
        self.painted += got
        return got

    def until(self, words: str, seconds: float = 30.0) -> list[str]:
        """Reads until the words stand on the screen; its lines."""
        end = time.perf_counter() + seconds
        while words not in self.text:
            left = end - time.perf_counter()
            assert left > 0.0, f"no {words!r} on\n{self.text}"
            assert self.read(0.02) or self.alive, f"ended without {words!r}:\n{self.text}"
        return self.lines

    @property
    def lines(self) -> list[str]:
        """The screen, line by line."""
        return [line.rstrip() for line in self.screen.display]

    @property
    def text(self) -> str:
        """The screen as one text."""
        return "\n".join(self.lines)

    @property
    def alive(self) -> bool:
        """Whether it still runs."""
        if self.status is None:
            pid, status = os.waitpid(self.pid, os.WNOHANG)
            if pid:
                self.status = os.waitstatus_to_exitcode(status)
        return self.status is None

    def end(self, seconds: float = 10.0) -> int:
        """Waits for its end; its exit status."""
        end = time.perf_counter() + seconds
        while self.alive and time.perf_counter() < end:
            self.read(0.02)
        assert not self.alive, f"still there:\n{self.text}"
        assert self.status is not None
        return self.status

    def close(self) -> None:
        """Ends it if it has not ended, and hangs up."""
        if self.alive:
            os.kill(self.pid, signal.SIGKILL)
            os.waitpid(self.pid, 0)
        os.close(self.fd)
