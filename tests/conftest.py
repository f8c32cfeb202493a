"""One thread for linear algebra: the tests run side by side, and on a busy machine threads that wait for each other
make a tenth of a second of work last ten."""

import os

import pytest
from hypothesis import settings

for library in ("OPENBLAS", "OMP", "MKL"):
    os.environ.setdefault(f"{library}_NUM_THREADS", "1")

# A landing must not hang on the luck of a draw; at a desk the draws stay random and go on finding things.
settings.register_profile("ci", derandomize=True)
if os.environ.get("CI"):
    settings.load_profile("ci")


def pytest_addoption(parser: pytest.Parser) -> None:
    parser.addoption("--kills", type=int, default=200, help="how many times an editing process is killed")
