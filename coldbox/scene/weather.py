"""The design day outdoors: air, sky and sun in each hour of the wall clock."""

from __future__ import annotations

import numpy as np

from coldbox.physics import moist_air, sun, surface
from coldbox.physics.number import FloatArray, Number
from coldbox.project.model import Site
from coldbox.scene import air
from coldbox.scene.types import SunDay, Weather

# Share of the daily range by which the air lies below the day's highest, at the full hours 0:00 to 23:00 of sun time.
# Source ashrae-f-daily-profile: Fundamentals 1997, chapter 28, table 2 (from memory).
_BELOW_HIGHEST = np.array([
    0.82, 0.87, 0.92, 0.96, 0.99, 1.00, 0.98, 0.93, 0.84, 0.71, 0.56, 0.39,
    0.23, 0.11, 0.03, 0.00, 0.03, 0.10, 0.21, 0.34, 0.47, 0.58, 0.68, 0.76,
])  # fmt: skip
MEAN_BELOW_HIGHEST = float(_BELOW_HIGHEST.mean())
_HOURS: FloatArray = np.arange(24.0)

# Instants an hour: the tests show how near their mean is to that of one a minute.
INSTANTS = 3


def mean_temperature(site: Site) -> Number:
    """Mean of the design day's air, °C: the day's highest less 57 % of its range."""
    return site.dry_bulb - MEAN_BELOW_HIGHEST * site.daily_range


def clock_ahead(site: Site) -> Number:
    """How far the wall clock is ahead of mean sun time, hours: the offset from UTC less longitude / 15."""
    return site.clock - site.longitude / 15.0


def air_temperature(site: Site) -> FloatArray:
    """Mean outdoor air temperature in each clock hour of the design day, (…, 24) °C.

    t = t_highest - f(h) (t_highest - t_lowest), f by the hour of sun time with its zero at 15:00, straight lines
    between the full hours; sun time is the clock less `clock_ahead`.
    Source: ASHRAE Handbook, Fundamentals 1997, chapter 28, table 2 (from memory).
    """
    start = -clock_ahead(site)
    whole = np.floor(start)
    rest = start - whole
    first = (_HOURS + whole).astype(int)
    below = (
        0.5 * (1.0 - rest) ** 2 * _BELOW_HIGHEST[first % 24]
        + (0.5 + rest - rest**2) * _BELOW_HIGHEST[(first + 1) % 24]
        + 0.5 * rest**2 * _BELOW_HIGHEST[(first + 2) % 24]
    )
    return np.asarray(site.dry_bulb - site.daily_range * below)


def humidity_ratio(site: Site, pressure: Number) -> Number:
    """Water in the outdoor air, kg/kg, the same all day: from the humidity or wet bulb at the day's highest."""
    if site.wet_bulb is not None:
        return moist_air.humidity_ratio_from_wet_bulb(site.dry_bulb, site.wet_bulb, pressure)
    assert site.humidity is not None, "a site has a humidity or a wet bulb"
    return moist_air.humidity_ratio(site.dry_bulb, site.humidity, pressure)


def weather(site: Site, pressure: Number) -> Weather:
    """Air, sky and sun of the design day, hour i the mean over i:00-i+1:00 of the wall clock.

    sky "clear": sun by tau_beam and tau_diffuse, a sky that radiates by the dew point. "overcast": a quarter of it,
    all diffuse, and a sky at air temperature. "none": no sun, and a sky at air temperature.
    pressure: Pa. Sources: those of `physics.sun` and `physics.surface`.
    """
    temperature = air_temperature(site)
    outdoors = air.outdoors(temperature, humidity_ratio(site, pressure), pressure)
    sky_c = temperature
    if site.sky == "clear":
        sun_time = _HOURS + 0.5 - clock_ahead(site)
        sky_c = surface.sky_temperature(temperature, outdoors.dew_point_c, sun_time, pressure)
    return Weather(
        air=outdoors,
        wind=site.wind,
        sky_c=sky_c,
        sun=None if site.sky == "none" else _sun(site),
        ground_reflects=site.ground_reflects,
    )


def _sun(site: Site) -> SunDay:
    utc_hours = sun.instants(site.clock, INSTANTS)
    stands = sun.position(site.latitude, site.longitude, site.month, site.day, utc_hours)
    day = sun.day_of_year(site.month, site.day)
    beam, diffuse = sun.clear_sky(site.tau_beam, site.tau_diffuse, day, stands.altitude)
    overcast = site.sky == "overcast"
    if overcast:
        diffuse = sun.overcast_sky(beam, diffuse, stands.altitude)
        beam = np.zeros_like(diffuse)
    return SunDay(
        altitude=stands.altitude,
        azimuth=stands.azimuth,
        beam_normal=beam,
        diffuse_horizontal=diffuse,
        overcast=overcast,
    )
