"""One thread for linear algebra: the tests run side by side, and on a busy machine threads that wait for each other
make a tenth of a second of work last ten."""

import os

for library in ("OPENBLAS", "OMP", "MKL"):
    os.environ.setdefault(f"{library}_NUM_THREADS", "1")
