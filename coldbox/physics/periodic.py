"""Heat conduction through layered panels over a day that repeats.

A day of 24 hourly means is a sum of harmonics 0 to 12 of the 24 h period; each layer answers each harmonic by its
transfer matrix. The matrices are applied as impedances from the inside out, which no thickness can overflow.
"""

from __future__ import annotations

import math
from collections.abc import Iterable, Sequence
from types import EllipsisType
from typing import Any, Protocol, TypeVar

import numpy as np

from coldbox.errors import OutOfValidity
from coldbox.physics.number import FloatArray, Number
from coldbox.physics.validity import within
from coldbox.record import Record

ComplexArray = np.ndarray[tuple[Any, ...], np.dtype[np.complex128]]
Operand = TypeVar("Operand", Number, ComplexArray)
Part = tuple[EllipsisType | slice, ...]
WHOLE: Part = (...,)

_METHOD = "Periodic conduction (ISO 13786)"
_DAY = 86400.0
HARMONICS = np.arange(13)
_OMEGA = 2.0 * math.pi / _DAY * HARMONICS  # rad/s
_I_OMEGA = 1j * _OMEGA

# The discrete Fourier transform of 24 hours as products with real matrices: on arrays this small they are twice as
# fast as an FFT. Columns (rows) alternate between real and imaginary parts of the 13 harmonics.
_ANGLES = 2.0 * math.pi / 24.0 * (np.outer(HARMONICS, np.arange(24)) % 24)
_WEIGHTS = np.where((HARMONICS == 0) | (HARMONICS == 12), 1.0, 2.0)[:, None] / 24.0
# The sine of harmonic 12 is 0 at every full hour, and must not be 1e-15.
_SINES = np.where((HARMONICS == 12)[:, None], 0.0, np.sin(_ANGLES))
_TO_HARMONICS: FloatArray = np.ascontiguousarray(np.stack([np.cos(_ANGLES), -_SINES], axis=1).reshape(26, 24).T)
_TO_HOURS: FloatArray = np.stack([_WEIGHTS * np.cos(_ANGLES), -_WEIGHTS * _SINES], axis=1).reshape(26, 24)

# Rows of 13 harmonics worked on at once: their intermediate results stay in the processor's cache.
_ROWS = 1024
# Below this |x²| two terms of the series of tanh(x)/x are exact to rounding, and the closed form is not.
_SMALL = 1e-7
# Where all |x²| of a layer lie below this (metal skins), five terms are exact to rounding, and cheaper.
_SERIES = 1e-3


class Layered(Protocol):
    """A layer as the response needs it."""

    @property
    def resistance(self) -> Number: ...  # m²K/W

    @property
    def heat_capacity(self) -> Number: ...  # J/(m²K)


class ThermalLayer(Record):
    """A homogeneous layer by its material; any Number may be an array (…, 1)."""

    thickness: Number  # m
    conductivity: Number  # W/(m·K)
    density: Number  # kg/m³
    specific_heat: Number  # J/(kg·K)

    @property
    def resistance(self) -> Number:
        """d / k, m²K/W."""
        return self.thickness / self.conductivity

    @property
    def heat_capacity(self) -> Number:
        """ρ c d, J/(m²K)."""
        return self.thickness * self.density * self.specific_heat


class Response(Record):
    """How a panel answers its outside surface temperature, the room held steady; per m² of outside surface."""

    u: Number  # W/(m²K), steady, outside surface to inside air
    transfer: ComplexArray  # (…, 13) W/(m²K), outside surface -> heat leaving into the room
    admittance: ComplexArray  # (…, 13) W/(m²K), outside surface -> heat entering the outside


def to_harmonics(hours: FloatArray) -> ComplexArray:
    """Harmonics 0 to 12 of 24 hourly values: X_k = Σ x_n exp(-2πi k n / 24).

    hours: (…, 24), any unit; the result is (…, 13) in the same unit.
    Source: the discrete Fourier transform.
    """
    return (hours @ _TO_HARMONICS).view(np.complex128)


def to_hours(harmonics: ComplexArray) -> FloatArray:
    """The 24 hourly values of harmonics 0 to 12, the inverse of `to_harmonics`: x_n = Σ w_k Re(X_k exp(2πi k n / 24)).

    harmonics: (…, 13) contiguous, any unit; the result is (…, 24) in the same unit.
    Source: the discrete Fourier transform.
    """
    return harmonics.view(np.float64) @ _TO_HOURS


def response(
    layers: Iterable[Layered | Number],
    inside_film: Number,
    *,
    layers_area: Number = 1.0,
    inside_area: Number = 1.0,
    beside: Number = 0.0,
) -> Response:
    """Response of a panel to its outside surface temperature, by layer transfer matrices, all harmonics of the day.

    Each layer [cosh x, R sinh x / x; iωC sinh x / x, cosh x], x² = iωRC, applied inside out to the inside film as
    Z' = (Z + R t) / (1 + iωC t Z), q = q' / (cosh x (1 + iωC t Z)), t = tanh x / x, with Z = θ / q.

    layers: outside first; each a ThermalLayer or anything with `resistance` R m²K/W and `heat_capacity` C J/(m²K), or
    a Number: a pure resistance m²K/W. Shapes (…, 1) broadcast: surfaces stacked first, draws before the hours.
    inside_film: Rsi, m²K/W. layers_area, inside_area: area of the layers and of the inside surface per m² of outside
    surface, so that each film and the layers keep their own areas. beside: W/K per m² of outside surface that passes
    beside the layers without delay. An outside film is given as the first layer where air, not surface, drives.
    Result: Response, u (…, 1) or float, transfer and admittance (…, 13). The day's mean passes by u exactly. Harmonic
    12 has two samples a period, so only the real part of its response can show in hourly values: it is kept real.
    Valid for positive total resistance, resistances and capacities not negative, else OutOfValidity.
    Source: ISO 13786, heat transfer matrix of a component and of a layer (from memory).
    >>> foam = ThermalLayer(thickness=0.1, conductivity=0.025, density=35.0, specific_heat=1400.0)
    >>> round(response([foam], 0.13).u, 4)
    0.2421
    """
    inside = inside_film / inside_area
    stack: list[tuple[Number, Number]] = []
    for layer in layers:
        r, c = (layer, 0.0) if isinstance(layer, float | int | np.ndarray) else (layer.resistance, layer.heat_capacity)
        stack.append((r / layers_area, c * layers_area))
    total = inside
    for r, c in stack:
        for value, unit in ((r, "m²K/W"), (c, "J/(m²K)")):
            within(value, 0.0, math.inf, quantity="a layer's resistance or capacity", unit=unit, method=_METHOD)
        total = total + r
    if not np.all(total > 0.0):
        raise OutOfValidity("the panel's resistance", float(np.min(total)), 0.0, math.inf, "m²K/W", _METHOD)
    shape = np.broadcast_shapes(np.shape(total), np.shape(beside), *(np.shape(c) for _, c in stack), (1,))
    transfer, admittance = np.empty((*shape[:-1], 13), complex), np.empty((*shape[:-1], 13), complex)
    for part in blocks(shape, _ROWS):
        own = [(cut(r, part), cut(c, part)) for r, c in stack]
        through, into = _chain(own, cut(inside, part))
        extra = cut(beside, part)
        transfer[part], admittance[part] = through + extra, into + extra
    for harmonics in (transfer, admittance):
        harmonics.imag[..., 12] = 0.0
    return Response(u=1.0 / total + beside, transfer=transfer, admittance=admittance)


def _chain(stack: list[tuple[Number, Number]], inside: Number) -> tuple[ComplexArray, ComplexArray]:
    """Transfer and admittance at 13 harmonics of layers (R, C), outside first, behind them the inside film."""
    z: ComplexArray = np.asarray(inside, complex)
    flux: ComplexArray = np.ones(1, complex)  # heat out at the inside over heat in at this interface
    for r, c in reversed(stack):
        if isinstance(c, float | int) and c == 0.0:
            z = z + r
            continue
        admitted = np.asarray(_I_OMEGA * c)
        t, sech = _layer(np.asarray(admitted * r, complex), float(np.max(r * c)))
        admitted = admitted * t  # not in place: t has draws where only the resistance does
        slowed = 1.0 + admitted * z
        z = np.asarray((z + r * t) / slowed, complex)
        flux = np.asarray(flux * sech / slowed, complex)
    into = np.asarray(1.0 / z, complex)
    whole = np.broadcast_shapes(into.shape, flux.shape, (13,))
    return flux * into, np.broadcast_to(into, whole)


def _layer(xx: ComplexArray, longest: float) -> tuple[ComplexArray, ComplexArray]:
    """tanh(x) / x and 1 / cosh(x) of x² at 13 harmonics; `longest` is the largest R C among the layers, s."""
    if longest * _OMEGA[-1] < _SERIES:
        t = 1.0 - xx * (1 / 3 - xx * (2 / 15 - xx * (17 / 315 - xx * (62 / 2835))))
        return t, 1.0 - xx * (1 / 2 - xx * (5 / 24 - xx * (61 / 720 - xx * (277 / 8064))))
    x = np.sqrt(xx)
    once = np.exp(-x)
    twice = once * once
    more = 1.0 + twice
    small = np.abs(xx) < _SMALL
    t = np.where(small, 1.0 - xx / 3.0, (1.0 - twice) / (more * np.where(small, 1.0, x)))
    once *= 2.0
    once /= more
    return t, once


def through_day(transfer: ComplexArray, outside_surface_c: Number, room_c: Number) -> FloatArray:
    """Heat into the room through the day, W per m² of outside surface; its mean is u (mean T_s - T_i) exactly.

    q = F⁻¹[transfer · F(T_s - T_i)]

    transfer: (…, 13) W/(m²K), of `response`. outside_surface_c: (…, 24) °C, hourly means of the surface (or of the air,
    where the response holds the outside film). room_c: steady, °C, float or (…, 1). Result: (…, 24) W/m².
    Source: ISO 13786, superposition of periodic components (from memory).
    """
    shape = np.broadcast_shapes(np.shape(outside_surface_c), np.shape(room_c), (*np.shape(transfer)[:-1], 24))
    heat = np.empty(shape)
    for part in blocks(shape, _ROWS):
        difference = np.asarray(cut(outside_surface_c, part) - cut(room_c, part))
        heat[part] = to_hours(np.multiply(cut(transfer, part), to_harmonics(difference)))
    return heat


def decrement_and_lag(panel: Response, harmonic: int = 1) -> tuple[FloatArray, FloatArray]:
    """Decrement factor, and time lag in hours, of one harmonic of the day.

    f = |transfer_n| / u; lag = -arg(transfer_n) · 24 / (2 π n)

    panel: of `response`. harmonic: n, 1 to 11 (1: the day itself). Results: f without unit, lag from 0 to 24/n hours
    (beyond one period the lag of a wave cannot be told), both of the panel's shape without its last axis.
    Raises OutOfValidity for another harmonic. Source: ISO 13786, decrement factor and time shift (from memory).
    """
    within(harmonic, 1, 11, quantity="harmonic", unit="", method=_METHOD)
    wave = panel.transfer[..., harmonic]
    steady = np.broadcast_to(panel.u, (*panel.transfer.shape[:-1], 1))[..., 0]
    lag = np.mod(-np.angle(wave), 2.0 * math.pi) * 24.0 / (2.0 * math.pi * harmonic)
    return np.abs(wave) / steady, lag


def blocks(shape: tuple[int, ...], rows: int) -> Sequence[Part]:
    """Index tuples that cut the last axis but one of a result into pieces of about `rows` rows in all.

    shape: of the result, draws on its last axis but one. rows: wanted rows (all axes but the last) in a piece.
    Result: indices of the pieces; one for everything when the whole is small.
    Source: none, this is no formula.
    """
    every = math.prod(shape[:-1])
    if len(shape) < 2 or every <= 2 * rows:
        return (WHOLE,)
    step = max(1, rows * shape[-2] // every)
    return [(..., slice(start, start + step), slice(None)) for start in range(0, shape[-2], step)]


def cut(value: Operand, part: Part) -> Operand:
    """The piece of an operand that belongs to a piece of the result; what broadcasts along the cut stays whole.

    value: float or array that broadcasts with the result. part: one of `blocks`. Result: the value or a view of it.
    Source: none, this is no formula.
    """
    if part is WHOLE or isinstance(value, float | int) or value.ndim < 2 or value.shape[-2] == 1:
        return value
    return value[part]
