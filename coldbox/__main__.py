"""`coldbox` and `python -m coldbox`."""

from __future__ import annotations

import os
import sys

from coldbox.cli.main import BAD_INPUT
from coldbox.cli.main import main as commands


def main() -> int:
    """Run one command and leave with its exit status."""
    status = commands()
    try:
        sys.stdout.flush()
        sys.stderr.flush()
    except OSError:  # a closed pipe or a full disk, where help was printed: a command says so itself
        status = status or BAD_INPUT
    # Taking the interpreter apart piece by piece takes as long as an account; nothing of ours waits for it.
    os._exit(status)


if __name__ == "__main__":
    main()
