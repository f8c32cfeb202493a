"""A process of its own for what takes longer than a key may wait: how it begins, and how it ends at once."""

from __future__ import annotations

import contextlib
import os
import sys
from collections.abc import Callable
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from multiprocessing.connection import Connection


NICE = 10  # keys come first, also on one core


class Aside:
    """A running process and the pipe to it. `work(pipe, *args)` is what it does."""

    def __init__(self, work: Callable[..., None], *args: Any) -> None:
        import multiprocessing

        context = multiprocessing.get_context("spawn")
        self.pipe, theirs = context.Pipe()
        self.process = context.Process(target=_quietly, args=(work, theirs, *args), daemon=True)
        # While the screens stand, sys.stderr leads into them and has no number to hand on.
        with contextlib.redirect_stderr(sys.__stderr__):
            self.process.start()
        theirs.close()

    @property
    def alive(self) -> bool:
        """Whether it still runs."""
        return self.process.is_alive()

    def end(self) -> None:
        """End it, whatever it does."""
        self.process.terminate()
        self.process.join(timeout=2.0)
        self.pipe.close()


def _quietly(work: Callable[..., None], pipe: Connection, *args: Any) -> None:
    """The work; what it might print goes nowhere, for it would land in the middle of the screen."""
    import signal

    signal.signal(signal.SIGINT, signal.SIG_IGN)
    os.nice(NICE)
    nowhere = os.open(os.devnull, os.O_WRONLY)
    os.dup2(nowhere, 1)
    os.dup2(nowhere, 2)
    with contextlib.suppress(EOFError, OSError):  # whoever asked has gone
        work(pipe, *args)
