"""Moist air as a mixture of ideal gases: vapour pressure, humidity, enthalpy, dew point and wet bulb.

Humidity is over water at and above 0 °C and over ice below. Single floats take the short way through `math`: a load
asks for some dozen states of air, and numpy costs ten times as much for one number.
"""

from __future__ import annotations

import math
from typing import TYPE_CHECKING

import numpy as np

from coldbox.errors import NoRoot, OutOfValidity
from coldbox.physics import constants
from coldbox.physics.number import FloatArray, Number
from coldbox.physics.validity import within

if TYPE_CHECKING:
    from numpy.typing import NDArray

_ZERO = float(constants.ZERO_CELSIUS)
_GAS = float(constants.GAS_CONSTANT_DRY_AIR)
_MASS = float(constants.WATER_TO_AIR_MASS)
_C_AIR = float(constants.SPECIFIC_HEAT_DRY_AIR)
_C_VAPOUR = float(constants.SPECIFIC_HEAT_VAPOUR)
_EVAPORATION = float(constants.LATENT_EVAPORATION)

_Curve = tuple[float, float, float, float, float, float, float]
# ln p = a/T + b + c T + d T² + e T³ + f T⁴ + g ln T, p in Pa, T in K: ASHRAE Fundamentals, eq. 5 and 6.
_ICE: _Curve = (-5.6745359e3, 6.3925247, -9.677843e-3, 6.2215701e-7, 2.0747825e-9, -9.484024e-13, 4.1635019)
_WATER: _Curve = (-5.8002206e3, 1.3914993, -4.8640239e-2, 4.1764768e-5, -1.4452093e-8, 0.0, 6.5459673)
# First guess of the dew point, t = B x / (A - x) with x = ln(p / 611.2 Pa): Magnus, within 0.5 K from -60 to 60 °C.
_MAGNUS_ICE, _MAGNUS_WATER = (22.46, 272.62), (17.62, 243.12)
_COLDEST_C, _HOTTEST_C = -100.0, 200.0
_METHOD = "Moist air (Hyland and Wexler)"


def _ln_pressure(curve: _Curve, kelvin: Number, log: Number) -> Number:
    a, b, c, d, e, f, g = curve
    return a / kelvin + b + kelvin * (c + kelvin * (d + kelvin * (e + kelvin * f))) + g * log


def _slope(curve: _Curve, kelvin: Number) -> Number:
    """d ln p / dT, 1/K."""
    a, _, c, d, e, f, g = curve
    return (g - a / kelvin) / kelvin + c + kelvin * (2.0 * d + kelvin * (3.0 * e + kelvin * 4.0 * f))


_LN_WATER_AT_0 = float(_ln_pressure(_WATER, _ZERO, math.log(_ZERO)))
_LN_LOWEST = float(_ln_pressure(_ICE, _ZERO + _COLDEST_C, math.log(_ZERO + _COLDEST_C)))
_LN_HIGHEST = float(_ln_pressure(_WATER, _ZERO + _HOTTEST_C, math.log(_ZERO + _HOTTEST_C)))


def saturation_pressure(temperature_c: Number) -> Number:
    """Vapour pressure of saturated air, Pa: over water at and above 0 °C, over ice below.

    ln p = a/T + b + c T + d T² + e T³ + f T⁴ + g ln T

    temperature_c: °C, any shape; the result has it. Valid from -100 to 200 °C, else OutOfValidity.
    Source: ASHRAE Fundamentals, Psychrometrics, eq. 5 and 6, after Hyland and Wexler 1983.
    >>> round(saturation_pressure(20.0), 1)
    2338.8
    """
    within(temperature_c, _COLDEST_C, _HOTTEST_C, quantity="temperature", unit="°C", method=_METHOD)
    kelvin = temperature_c + _ZERO
    if isinstance(kelvin, float):
        return math.exp(_ln_pressure(_ICE if kelvin < _ZERO else _WATER, kelvin, math.log(kelvin)))
    cold, log = kelvin < _ZERO, np.log(kelvin)
    if not cold.any():
        return np.asarray(np.exp(_ln_pressure(_WATER, kelvin, log)))
    over_ice = _ln_pressure(_ICE, kelvin, log)
    if cold.all():
        return np.asarray(np.exp(over_ice))
    return np.asarray(np.exp(np.where(cold, over_ice, _ln_pressure(_WATER, kelvin, log))))


def pressure_at_altitude(altitude: Number) -> Number:
    """Pressure of the standard atmosphere, Pa.

    p = 101 325 (1 - 2.25577e-5 z)^5.2559

    altitude: z, m above sea level, any shape. Valid from -5000 to 11 000 m, else OutOfValidity.
    Source: ASHRAE Fundamentals, Psychrometrics, eq. 3.
    """
    within(altitude, -5000.0, 11000.0, quantity="altitude", unit="m", method="The standard atmosphere")
    return float(constants.STANDARD_PRESSURE) * (1.0 - 2.25577e-5 * altitude) ** 5.2559


def _ratio(vapour_pressure: Number, pressure: Number) -> Number:
    """W = 0.621945 p_w / (p - p_w), refusing air that would be nothing but steam."""
    within(vapour_pressure / pressure, 0.0, 0.95, quantity="share of vapour in the pressure", unit="", method=_METHOD)
    return _MASS * vapour_pressure / (pressure - vapour_pressure)


def humidity_ratio(temperature_c: Number, relative_humidity: Number, pressure: Number) -> Number:
    """Humidity ratio of air of a relative humidity, kg water per kg dry air.

    W = 0.621945 φ p_ws / (p - φ p_ws)

    temperature_c: °C. relative_humidity: φ, 0..1, over ice below 0 °C. pressure: Pa. All broadcast.
    Valid from -100 to 200 °C while vapour is at most 95 % of the pressure, else OutOfValidity.
    Source: ASHRAE Fundamentals, Psychrometrics, eq. 20 and 22.
    """
    within(relative_humidity, 0.0, 1.0, quantity="relative humidity", unit="", method=_METHOD)
    return _ratio(relative_humidity * saturation_pressure(temperature_c), pressure)


def saturation_humidity_ratio(temperature_c: Number, pressure: Number) -> Number:
    """Humidity ratio of saturated air, kg water per kg dry air.

    W_s = 0.621945 p_ws / (p - p_ws)

    temperature_c: °C. pressure: Pa. Both broadcast. Validity as for `humidity_ratio`, else OutOfValidity.
    Source: ASHRAE Fundamentals, Psychrometrics, eq. 21.
    """
    return _ratio(saturation_pressure(temperature_c), pressure)


def relative_humidity(temperature_c: Number, humidity_ratio: Number, pressure: Number) -> Number:
    """Relative humidity, a share of 1; above 1 where the air holds more than it can.

    φ = p W / ((0.621945 + W) p_ws)

    temperature_c: °C. humidity_ratio: W, kg/kg. pressure: Pa. All broadcast. Valid from -100 to 200 °C and for W >= 0,
    else OutOfValidity.
    Source: ASHRAE Fundamentals, Psychrometrics, eq. 20 and 22 solved for φ.
    """
    within(humidity_ratio, 0.0, math.inf, quantity="humidity ratio", unit="kg/kg", method=_METHOD)
    return pressure * humidity_ratio / ((_MASS + humidity_ratio) * saturation_pressure(temperature_c))


def enthalpy(temperature_c: Number, humidity_ratio: Number) -> Number:
    """Enthalpy of moist air, J per kg dry air, 0 for dry air and liquid water at 0 °C.

    h = 1006 t + W (2 501 000 + 1860 t)

    temperature_c: t, °C. humidity_ratio: W, kg/kg. Both broadcast.
    Source: ASHRAE Fundamentals, Psychrometrics, eq. 30.
    """
    return _C_AIR * temperature_c + humidity_ratio * (_EVAPORATION + _C_VAPOUR * temperature_c)


def specific_volume(temperature_c: Number, humidity_ratio: Number, pressure: Number) -> Number:
    """Volume of moist air, m³ per kg dry air.

    v = 287.042 T (1 + W / 0.621945) / p

    temperature_c: °C. humidity_ratio: W, kg/kg. pressure: Pa. All broadcast.
    Source: ASHRAE Fundamentals, Psychrometrics, eq. 26.
    """
    return _GAS / pressure * (temperature_c + _ZERO) * (1.0 + humidity_ratio / _MASS)


def density(temperature_c: Number, humidity_ratio: Number, pressure: Number) -> Number:
    """Density of moist air, kg of the mixture per m³.

    ρ = (1 + W) / v

    temperature_c: °C. humidity_ratio: W, kg/kg. pressure: Pa. All broadcast.
    Source: ASHRAE Fundamentals, Psychrometrics, eq. 9b.
    """
    return (1.0 + humidity_ratio) / specific_volume(temperature_c, humidity_ratio, pressure)


def dew_point(humidity_ratio: Number, pressure: Number) -> Number:
    """Temperature at which the air's water begins to settle, °C: the dew point, or the frost point below 0 °C.

    p_ws(t) = p W / (0.621945 + W), by Newton's method on ln p over 1/T, nearly a straight line.

    humidity_ratio: W, kg/kg, above zero. pressure: Pa. Both broadcast. Valid for dew points from -100 to 200 °C, else
    OutOfValidity; dry air has none. Between the two curves (0.06 Pa at 0 °C) it is 0 °C.
    Source: ASHRAE Fundamentals, Psychrometrics, eq. 36, with eq. 5 and 6 inverted.
    """
    vapour = pressure * humidity_ratio / (_MASS + humidity_ratio)
    within(
        vapour, math.exp(_LN_LOWEST), math.exp(_LN_HIGHEST), quantity="vapour pressure", unit="Pa",
        method="The dew point",
    )  # fmt: skip
    if isinstance(vapour, float):
        log = math.log(vapour)
        return _dew_over_ice(log) if log < _LN_WATER_AT_0 else _dew_over_water(log)
    logs = np.log(vapour)
    cold = logs < _LN_WATER_AT_0
    if not cold.any():
        return _dew_over_water(logs)
    if cold.all():
        return _dew_over_ice(logs)
    warm = _dew_over_water(np.maximum(logs, _LN_WATER_AT_0))
    return np.where(cold, _dew_over_ice(np.minimum(logs, _LN_WATER_AT_0)), warm)


def _dew_over_ice(log: Number) -> Number:
    found = _dew(log, _ICE, _MAGNUS_ICE)
    return min(found, 0.0) if isinstance(found, float) else np.minimum(found, 0.0)


def _dew_over_water(log: Number) -> Number:
    found = _dew(log, _WATER, _MAGNUS_WATER)
    return max(found, 0.0) if isinstance(found, float) else np.maximum(found, 0.0)


def _dew(log: Number, curve: _Curve, magnus: tuple[float, float]) -> Number:
    """°C where a saturation curve has the logarithm of pressure `log`."""
    scale, offset = magnus
    guess = log - math.log(611.2)
    kelvin = _ZERO + offset * guess / (scale - guess)
    for _ in range(12):
        logs = math.log(kelvin) if isinstance(kelvin, float) else np.log(kelvin)
        step = (log - _ln_pressure(curve, kelvin, logs)) / (kelvin * _slope(curve, kelvin))
        kelvin = kelvin / (1.0 - step)
        # Relative step; the error left is of the order of its square.
        if (abs(step) if isinstance(step, float) else np.abs(step).max()) < 1e-6:
            return kelvin - _ZERO
    raise NoRoot("dew point", _COLDEST_C, _HOTTEST_C)


def humidity_ratio_from_wet_bulb(temperature_c: Number, wet_bulb_c: Number, pressure: Number) -> Number:
    """Humidity ratio of air of a wet-bulb temperature, kg water per kg dry air.

    W = ((2501 - 2.326 t*) W_s* - 1.006 (t - t*)) / (2501 + 1.86 t - 4.186 t*)   wet bulb at and above 0 °C
    W = ((2830 - 0.24 t*) W_s* - 1.006 (t - t*)) / (2830 + 1.86 t - 2.1 t*)      iced bulb below

    temperature_c: t, °C. wet_bulb_c: t*, °C. pressure: Pa. All broadcast. Valid while t* is at most t and not below
    what dry air would show, else OutOfValidity.
    Source: ASHRAE Fundamentals, Psychrometrics, eq. 33 and 35.
    """
    within(
        temperature_c - wet_bulb_c, 0.0, math.inf, quantity="dry bulb less wet bulb", unit="K", method="The wet bulb"
    )
    held = saturation_humidity_ratio(wet_bulb_c, pressure)
    latent, latent_slope, bulb = _bulb(np.asarray(wet_bulb_c) < 0.0)
    top = (latent - latent_slope * wet_bulb_c) * held - 1.006 * (temperature_c - wet_bulb_c)
    found = top / (latent + 1.86 * temperature_c - bulb * wet_bulb_c)
    within(found, 0.0, math.inf, quantity="humidity ratio", unit="kg/kg", method="The wet bulb")
    return found if found.ndim else float(found)


def _bulb(iced: NDArray[np.bool_]) -> tuple[FloatArray, ...]:
    """Latent heat at 0 °C, its slope, and specific heat of the water or ice on the bulb, kJ/kg and kJ/(kg·K)."""
    return np.where(iced, 2830.0, 2501.0), np.where(iced, 0.24, 2.326), np.where(iced, 2.1, 4.186)


def wet_bulb(temperature_c: Number, humidity_ratio: Number, pressure: Number) -> Number:
    """Thermodynamic wet-bulb temperature, °C.

    The t* of `humidity_ratio_from_wet_bulb` whose W is the air's: the wetted bulb where that lies at or above 0 °C,
    else the iced one. Newton's method falls on the root from above, since W_s is convex.

    temperature_c: °C. humidity_ratio: kg/kg, at most saturated. pressure: Pa. All broadcast. Validity as for
    `saturation_humidity_ratio`; supersaturated air raises OutOfValidity.
    Source: ASHRAE Fundamentals, Psychrometrics, eq. 33 and 35.
    """
    dry, ratio, total = np.broadcast_arrays(
        *(np.asarray(item, dtype=np.float64) for item in (temperature_c, humidity_ratio, pressure))
    )
    held = saturation_humidity_ratio(dry, total)
    excess = float(np.max(ratio / held))
    if not excess <= 1.0 + 1e-9:
        raise OutOfValidity("relative humidity", excess, 0.0, 1.0, "", "The wet bulb")
    # Sign of the balance at 0 °C of a wetted bulb decides which bulb it is.
    at_zero = _ratio(math.exp(_LN_WATER_AT_0), total)
    iced = (2501.0 + 1.86 * dry) * ratio - 2501.0 * at_zero + 1.006 * dry < 0.0
    latent, latent_slope, bulb = _bulb(iced)
    found = dry.copy()
    for _ in range(60):
        kelvin = found + _ZERO
        logs = np.log(kelvin)
        vapour = np.exp(np.where(iced, _ln_pressure(_ICE, kelvin, logs), _ln_pressure(_WATER, kelvin, logs)))
        held = _MASS * vapour / (total - vapour)
        rise = held * total / (total - vapour) * np.where(iced, _slope(_ICE, kelvin), _slope(_WATER, kelvin))
        heat = latent - latent_slope * found
        balance = (latent + 1.86 * dry - bulb * found) * ratio - heat * held + 1.006 * (dry - found)
        fall = -bulb * ratio + latent_slope * held - heat * rise - 1.006
        step = balance / fall
        found = found - step
        if np.abs(step).max() < 1e-7:
            found = np.minimum(np.where(iced, np.minimum(found, 0.0), np.maximum(found, 0.0)), dry)
            return found if found.ndim else float(found)
    raise NoRoot("wet bulb", float(found.min()), float(dry.max()))
