"""The one numeric type: a float, or an array of float64 that broadcasts with the others."""

from __future__ import annotations

from typing import Any

import numpy as np

# Written out, not NDArray: numpy.typing costs a millisecond to import.
FloatArray = np.ndarray[tuple[Any, ...], np.dtype[np.float64]]
Number = float | FloatArray
