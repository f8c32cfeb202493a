"""Whole commands in processes of their own, timed as a user has them: compiled modules are kept."""

from __future__ import annotations

import os
import subprocess
import sys
import time
from collections.abc import Sequence
from pathlib import Path

ROOT = Path(__file__).parents[2]
FLOOR = ("-c", "import numpy, tomllib, argparse")  # what no command can do without

AGREED_FLOOR_S = 0.086
"""What FLOOR took on the machine on which times were agreed in seconds: a time in seconds means so many floors."""


def environment() -> dict[str, str]:
    kept = {key: value for key, value in os.environ.items() if key != "PYTHONDONTWRITEBYTECODE"}
    return {**kept, "PYTHONPATH": str(ROOT)}


def seconds(command: Sequence[str]) -> float:
    """Wall time of one run of this interpreter with these arguments, s."""
    start = time.perf_counter()
    subprocess.run([sys.executable, *command], cwd=ROOT, env=environment(), stdout=subprocess.DEVNULL, check=True)
    return time.perf_counter() - start


def floor_seconds(runs: int = 10) -> float:
    """Least time of FLOOR in these runs, s."""
    return min(seconds(FLOOR) for _ in range(runs))
