"""The one numeric type: a float, or an array of float64 that broadcasts with the others."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

FloatArray = NDArray[np.float64]
Number = float | FloatArray
