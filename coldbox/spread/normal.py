"""The normal distribution's quantile, for arrays: drawing needs nothing else of statistics."""

from __future__ import annotations

import math
from typing import Final

import numpy as np

from coldbox.physics.number import FloatArray

TWO_SIDED_95: Final = 1.959963984540054  # standard deviations that hold 95 of 100 cases

# Numerators and denominators of the three rational approximations, from the constant upwards.
_CENTRE: Final = (
    (3.3871328727963666080e0, 1.3314166789178437745e2, 1.9715909503065514427e3, 1.3731693765509461125e4,
     4.5921953931549871457e4, 6.7265770927008700853e4, 3.3430575583588128105e4, 2.5090809287301226727e3),
    (1.0, 4.2313330701600911252e1, 6.8718700749205790830e2, 5.3941960214247511077e3,
     2.1213794301586595867e4, 3.9307895800092710610e4, 2.8729085735721942674e4, 5.2264952788528545610e3),
)  # fmt: skip
_FLANK: Final = (
    (1.42343711074968357734e0, 4.63033784615654529590e0, 5.76949722146069140550e0, 3.64784832476320460504e0,
     1.27045825245236838258e0, 2.41780725177450611770e-1, 2.27238449892691845833e-2, 7.74545014278341407640e-4),
    (1.0, 2.05319162663775882187e0, 1.67638483018380384940e0, 6.89767334985100004550e-1,
     1.48103976427480074590e-1, 1.51986665636164571966e-2, 5.47593808499534494600e-4, 1.05075007164441684324e-9),
)  # fmt: skip
_TAIL: Final = (
    (6.65790464350110377720e0, 5.46378491116411436990e0, 1.78482653991729133580e0, 2.96560571828504891230e-1,
     2.65321895265761230930e-2, 1.24266094738807843860e-3, 2.71155556874348757815e-5, 2.01033439929228813265e-7),
    (1.0, 5.99832206555887937690e-1, 1.36929880922735805310e-1, 1.48753612908506148525e-2,
     7.86869131145613259100e-4, 1.84631831751005468180e-5, 1.42151175831644588870e-7, 2.04426310338993978564e-15),
)  # fmt: skip
_CENTRE_HALF: Final = 0.425
_TAIL_FROM: Final = 5.0


def quantile(share: FloatArray) -> FloatArray:
    """The value that so large a share of a standard normal distribution stays below.

    Φ(z) = share, by rational approximations of degree 7 in the centre, the flanks and the tails.

    share: 0 < share < 1, any shape. Result: z, the same shape, within 1e-15 of itself. At 0 and 1: -inf and inf.
    Source: Wichura 1988, algorithm AS 241 (PPND16), Applied Statistics 37.
    >>> round(float(quantile(np.array(0.975))), 6)
    1.959964
    """
    share = np.asarray(share, dtype=np.float64)
    past = share - 0.5
    centre = past * _ratio(_CENTRE, _CENTRE_HALF**2 - np.minimum(past * past, _CENTRE_HALF**2))
    outer = np.minimum(share, 1.0 - share)
    with np.errstate(divide="ignore"):
        far = np.sqrt(-np.log(np.where(outer > 0.0, outer, 1.0)))
    flank = _ratio(_FLANK, np.minimum(far, _TAIL_FROM) - 1.6)
    tail = _ratio(_TAIL, np.maximum(far, _TAIL_FROM) - _TAIL_FROM)
    outside = np.where(outer > 0.0, np.where(far <= _TAIL_FROM, flank, tail), np.inf)
    return np.asarray(np.where(np.abs(past) <= _CENTRE_HALF, centre, np.copysign(outside, past)))


def below(value: float) -> float:
    """The share of a standard normal distribution below a value: Φ(z) = erfc(-z / √2) / 2."""
    return 0.5 * math.erfc(-value / math.sqrt(2.0))


def _ratio(both: tuple[tuple[float, ...], tuple[float, ...]], at: FloatArray) -> FloatArray:
    return _polynomial(both[0], at) / _polynomial(both[1], at)


def _polynomial(factors: tuple[float, ...], at: FloatArray) -> FloatArray:
    result = np.full_like(at, factors[-1])
    for factor in reversed(factors[:-1]):
        result = result * at + factor
    return result
