"""Moist air at one place, with everything the account asks of it."""

from __future__ import annotations

import numpy as np

from coldbox.physics import moist_air
from coldbox.physics.number import Number
from coldbox.scene.types import Air


def state(temperature_c: Number, relative_humidity: Number, pressure: Number) -> Air:
    """Air of a temperature (°C) and relative humidity (0..1, over ice below 0 °C) at a pressure (Pa)."""
    ratio = moist_air.humidity_ratio(temperature_c, relative_humidity, pressure)
    return _air(temperature_c, relative_humidity, ratio, pressure)


def from_humidity_ratio(temperature_c: Number, humidity_ratio: Number, pressure: Number) -> Air:
    """Air of a temperature (°C) and humidity ratio (kg/kg, at most what the air can hold) at a pressure (Pa)."""
    relative = moist_air.relative_humidity(temperature_c, humidity_ratio, pressure)
    return _air(temperature_c, relative, humidity_ratio, pressure)


def outdoors(temperature_c: Number, humidity_ratio: Number, pressure: Number) -> Air:
    """Air that keeps its water through the day: hours too cold to hold it are saturated, the rest falls as dew.

    temperature_c: (…, 24) °C. humidity_ratio: kg/kg of the day. pressure: Pa. The dew point is found once for the day
    and is the air's own temperature where the air is saturated.
    """
    held = moist_air.saturation_humidity_ratio(temperature_c, pressure)
    ratio = np.minimum(humidity_ratio, held)
    dew_point = np.minimum(moist_air.dew_point(humidity_ratio, pressure), temperature_c)
    relative = np.minimum(moist_air.relative_humidity(temperature_c, ratio, pressure), 1.0)
    return _air(temperature_c, relative, ratio, pressure, dew_point)


def _air(
    temperature_c: Number,
    relative_humidity: Number,
    humidity_ratio: Number,
    pressure: Number,
    dew_point_c: Number | None = None,
) -> Air:
    return Air(
        temperature_c=temperature_c,
        relative_humidity=relative_humidity,
        humidity_ratio=humidity_ratio,
        enthalpy=moist_air.enthalpy(temperature_c, humidity_ratio),
        specific_volume=moist_air.specific_volume(temperature_c, humidity_ratio, pressure),
        density=moist_air.density(temperature_c, humidity_ratio, pressure),
        dew_point_c=moist_air.dew_point(humidity_ratio, pressure) if dew_point_c is None else dew_point_c,
    )
