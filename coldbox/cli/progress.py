"""How far long work is, in one line on standard error, and only where somebody watches."""

from __future__ import annotations

import sys
import time
from types import TracebackType
from typing import Self

FIRST_S = 1.0  # shorter work says nothing
AGAIN_S = 0.2


class Progress:
    """Called with the share done; always says go on. As a context it wipes its line at the end, whatever ends it."""

    def __init__(self, what: str) -> None:
        self.what = what
        self.begun = self.said = time.monotonic()
        self.shown = 0
        self.watched = sys.stderr.isatty()

    def __enter__(self) -> Self:
        return self

    def __call__(self, share: float) -> bool:
        now = time.monotonic()
        if self.watched and now - self.begun >= FIRST_S and now - self.said >= AGAIN_S:
            self.said = now
            left = (now - self.begun) * (1.0 - share) / share if share > 0.02 else 0.0
            more = f", about {left:.0f} s more" if left >= 1.0 else ""
            self._put(f"{self.what}: {100.0 * share:.0f} %{more}; Ctrl-C stops")
        return True

    def _put(self, text: str) -> None:
        sys.stderr.write(f"\r{text.ljust(self.shown)}")
        sys.stderr.flush()
        self.shown = len(text)

    def __exit__(
        self, kind: type[BaseException] | None, error: BaseException | None, trace: TracebackType | None
    ) -> None:
        if self.shown:
            sys.stderr.write(f"\r{' ' * self.shown}\r")
            sys.stderr.flush()
