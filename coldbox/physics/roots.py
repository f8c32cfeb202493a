"""Roots of monotone or merely continuous functions, many at a time, inside brackets that hold them."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np

from coldbox.errors import NoRoot
from coldbox.physics.number import FloatArray, Number

# Chandrupatla's method halves the bracket whenever it does not interpolate, and it never needed more than about three
# times the steps of plain bisection in its author's tests; twice 200 halvings exhaust any float64 bracket.
_MOST_STEPS = 400


def bracketed(
    function: Callable[[FloatArray], FloatArray], low: Number, high: Number, *, tolerance: float, what: str
) -> FloatArray:
    """Where a function crosses zero between `low` and `high`, element by element.

    f(x) = 0, by inverse quadratic interpolation where that is safe and bisection where not, so it always converges.

    function: takes an array of x (the broadcast shape of low and high) and gives f of the same shape. low, high: ends
    of the bracket, any shapes that broadcast with f; f must differ in sign there or be zero. tolerance: absolute, in
    the unit of x; the root lies within it. what: words for the message. Result: x, array of the broadcast shape.
    Raises NoRoot when an end is nan or some bracket holds no change of sign.
    Source: T. R. Chandrupatla, Advances in Engineering Software 28 (1997) 145-149 (from memory).
    >>> round(float(bracketed(lambda x: x * x - 2.0, 0.0, 2.0, tolerance=1e-12, what="square root")), 9)
    1.414213562
    """
    start, end = np.asarray(low, dtype=np.float64), np.asarray(high, dtype=np.float64)
    shape = np.broadcast_shapes(start.shape, end.shape)
    near, far = np.broadcast_to(end, shape).copy(), np.broadcast_to(start, shape).copy()
    f_near, f_far = np.asarray(function(near)), np.asarray(function(far))
    shape = np.broadcast_shapes(shape, f_near.shape, f_far.shape)
    near, far, f_near, f_far = (np.broadcast_to(item, shape).copy() for item in (near, far, f_near, f_far))
    if not np.all(np.sign(f_near) * np.sign(f_far) <= 0.0):
        raise NoRoot(what, float(np.min(far)), float(np.max(near)))
    step = np.full(shape, 0.5)
    for _ in range(_MOST_STEPS):
        trial = near + step * (far - near)
        f_trial = np.asarray(function(trial))
        # `near` and `far` keep the root between them; `last` is the end that was given up.
        same = np.sign(f_trial) == np.sign(f_near)
        last, f_last = np.where(same, near, far), np.where(same, f_near, f_far)
        far, f_far = np.where(same, far, near), np.where(same, f_far, f_near)
        near, f_near = trial, f_trial
        best = np.where(np.abs(f_near) < np.abs(f_far), near, far)
        width = np.abs(far - near)
        least = np.minimum(tolerance / np.where(width > 0.0, width, np.inf), 0.5)
        done = (width <= tolerance) | (f_near == 0.0) | (f_far == 0.0)
        if np.all(done):
            return best
        step = np.clip(_interpolated(near, far, last, f_near, f_far, f_last), least, 1.0 - least)
    raise NoRoot(what, float(np.min(far)), float(np.max(near)))


def _interpolated(
    near: FloatArray, far: FloatArray, last: FloatArray, f_near: FloatArray, f_far: FloatArray, f_last: FloatArray
) -> FloatArray:
    """Share of the way from `near` to `far` for the next trial: interpolated where the curve is tame, else half."""
    with np.errstate(divide="ignore", invalid="ignore"):
        xi = (near - far) / (last - far)
        phi = (f_near - f_far) / (f_last - f_far)
        tame = (phi**2 < xi) & ((1.0 - phi) ** 2 < 1.0 - xi)
        inverse = f_near / (f_far - f_near) * f_last / (f_far - f_last) + (last - near) / (far - near) * f_near / (
            f_last - f_near
        ) * f_far / (f_last - f_far)
    return np.where(tame & np.isfinite(inverse), inverse, 0.5)
