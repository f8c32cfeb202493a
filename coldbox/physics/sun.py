"""The sun: where it stands, what a clear sky lets through, and what falls on a tilted surface.

Angles in degrees: azimuth clockwise from true north, tilt 0 facing up, 90 a wall, 180 facing down. Altitudes are
geometric, without refraction.
"""

from __future__ import annotations

import math

import numpy as np

from coldbox.physics.number import FloatArray, Number
from coldbox.physics.validity import within
from coldbox.record import Record

_RAD = math.pi / 180.0
_INSTANTS = 6  # an hour: its mean on a wall is then within 1.5 W/m² of that of 120 instants; of one instant, 40
_SOLAR_CONSTANT = 1367.0  # W/m², as the clear-sky model of ASHRAE uses it
_POSITION = "Sun position (Astronomical Almanac, low precision)"
_CLEAR = "Clear sky (ASHRAE, tau_b and tau_d)"


class SunPosition(Record):
    """Where the sun stands."""

    altitude: FloatArray  # degrees above the horizon, without refraction
    azimuth: FloatArray  # degrees clockwise from true north, 0 to 360
    declination: FloatArray  # degrees
    equation_of_time: FloatArray  # minutes, apparent sun time less mean sun time


class Irradiance(Record):
    """What falls on a surface, W/m²."""

    beam: FloatArray
    sky: FloatArray  # diffuse, from the sky
    ground: FloatArray  # reflected by the ground

    @property
    def total(self) -> FloatArray:
        """Beam, sky and ground together, W/m²."""
        return self.beam + self.sky + self.ground


def day_of_year(month: Number, day: Number, year: Number = 2026) -> Number:
    """Day of the year, 1 for 1 January.

    n = JD(year, month, day) - JD(year, 1, 1) + 1

    month 1 to 12, day 1 to 31, year: any shape; the result broadcasts.
    Source: the Gregorian calendar.
    >>> float(day_of_year(7, 21))
    202.0
    """
    return _julian_day(year, month, day) - _julian_day(year, 1.0, 1.0) + 1.0


def _julian_day(year: Number, month: Number, day: Number) -> Number:
    """Julian day at 0:00 UTC of a date from March 1900 to February 2100 (the usual integer formula)."""
    return (367.0 * year - np.floor(1.75 * (year + np.floor((month + 9.0) / 12.0))) + np.floor(275.0 * month / 9.0)) + (
        day + 1721013.5
    )


def position(
    latitude: Number, longitude: Number, month: Number, day: Number, utc_hours: Number, year: Number = 2026
) -> SunPosition:
    """Altitude and azimuth of the sun's centre, its declination, and the equation of time.

    n = JD - 2451545; L = 280.460° + 0.9856474° n; g = 357.528° + 0.9856003° n; λ = L + 1.915° sin g + 0.020° sin 2g;
    ε = 23.439° - 0.0000004° n; right ascension and declination from λ and ε; hour angle from sidereal time
    18.697374558 h + 24.06570982441908 n h; altitude and azimuth from the spherical triangle.

    latitude -90 to 90 north positive, longitude -180 to 180 east positive, degrees. month, day, year: the UTC date.
    utc_hours: hours after its 0:00 UTC, may lie outside 0 to 24. All broadcast; the results have their shape.
    Within 0.02° from 1950 to 2050; else, or off the globe, OutOfValidity.
    Source: Astronomical Almanac, low-precision formulas for the sun, as in J. J. Michalsky, Solar Energy 40, 1988
    (from memory).
    """
    within(year, 1950.0, 2050.0, quantity="the year", unit="", method=_POSITION)
    within(latitude, -90.0, 90.0, quantity="the latitude", unit="°", method=_POSITION)
    within(longitude, -180.0, 180.0, quantity="the longitude", unit="°", method=_POSITION)
    n = _julian_day(year, month, day) - 2451545.0 + np.asarray(utc_hours, float) / 24.0
    mean_longitude = 280.460 + 0.9856474 * n
    anomaly = (357.528 + 0.9856003 * n) * _RAD
    ecliptic = (mean_longitude + 1.915 * np.sin(anomaly) + 0.020 * np.sin(2.0 * anomaly)) * _RAD
    obliquity = (23.439 - 4e-7 * n) * _RAD
    sine = np.sin(ecliptic)
    ascension = np.arctan2(np.cos(obliquity) * sine, np.cos(ecliptic))
    sin_declination = np.sin(obliquity) * sine
    declination = np.arcsin(sin_declination)
    hour_angle = ((18.697374558 + 24.06570982441908 * n) * 15.0 + longitude) * _RAD - ascension
    sin_latitude, cos_latitude = np.sin(latitude * _RAD), np.cos(latitude * _RAD)
    cos_declination, cos_hour = np.cos(declination), np.cos(hour_angle)
    sin_altitude = sin_latitude * sin_declination + cos_latitude * cos_declination * cos_hour
    azimuth = np.arctan2(
        -cos_declination * np.sin(hour_angle),
        sin_declination * cos_latitude - cos_declination * sin_latitude * cos_hour,
    )
    equation = mean_longitude - ascension / _RAD
    return SunPosition(
        altitude=np.arcsin(np.minimum(1.0, np.maximum(-1.0, sin_altitude))) / _RAD,
        azimuth=np.mod(azimuth / _RAD, 360.0),
        declination=declination / _RAD,
        equation_of_time=4.0 * (np.mod(equation + 180.0, 360.0) - 180.0),
    )


def instants(utc_offset: Number, per_hour: int = _INSTANTS) -> FloatArray:
    """UTC hours of evenly spread instants through a day of the wall clock, from which hourly means are taken.

    h_i = (i + 1/2) / per_hour - utc_offset, i = 0 … 24 per_hour - 1

    utc_offset: hours the clock is ahead of UTC, float or (…, 1). Result: (…, 24 per_hour) hours after 0:00 UTC of
    the same date. Source: the midpoint rule.
    """
    return np.asarray((np.arange(24 * per_hour) + 0.5) / per_hour - utc_offset)


def hour_means(values: FloatArray) -> FloatArray:
    """Means over each clock hour of values at `instants`.

    (…, 24 k) -> (…, 24), any unit. Source: the midpoint rule.
    """
    return np.asarray(values.reshape(*values.shape[:-1], 24, -1).mean(axis=-1))


def extraterrestrial(day_of_year: Number) -> Number:
    """Solar irradiance above the atmosphere, W/m².

    E_0 = 1367 (1 + 0.033 cos(360° (n - 3) / 365))

    day_of_year: n, any shape; the result has it.
    Source: ASHRAE Fundamentals 2013, Climatic design information, eq. 4 (from memory).
    """
    return _SOLAR_CONSTANT * (1.0 + 0.033 * np.cos(2.0 * math.pi / 365.0 * (day_of_year - 3.0)))


def air_mass(altitude: Number) -> Number:
    """Relative optical air mass.

    m = 1 / (sin β + 0.50572 (6.07995 + β)^-1.6364)

    altitude: β, degrees, 0 to 90, any shape; the result has it. Else OutOfValidity.
    Source: F. Kasten and A. T. Young, Applied Optics 28, 1989, eq. 3 (from memory).
    """
    within(altitude, 0.0, 90.0, quantity="the sun's altitude", unit="°", method="Air mass (Kasten and Young)")
    return 1.0 / (np.sin(altitude * _RAD) + 0.50572 * (6.07995 + altitude) ** -1.6364)


def clear_sky(
    tau_beam: Number, tau_diffuse: Number, day_of_year: Number, altitude: Number
) -> tuple[FloatArray, FloatArray]:
    """Beam on a plane facing the sun, and diffuse on a horizontal plane, W/m², under a clear sky; 0 at night.

    E_b = E_0 exp(-τ_b m^ab), E_d = E_0 exp(-τ_d m^ad),
    ab = 1.454 - 0.406 τ_b - 0.268 τ_d + 0.021 τ_b τ_d, ad = 0.507 + 0.205 τ_b - 0.080 τ_d - 0.190 τ_b τ_d

    tau_beam, tau_diffuse: optical depths of the month, of the 2013 edition or later: those of 2009 belong to other
    coefficients. day_of_year: n. altitude: β, degrees, -90 to 90. All broadcast; so do the results.
    Optical depths above 0 to 5, else OutOfValidity.
    Source: ASHRAE Fundamentals 2013, Climatic design information, eq. 17 to 20 (from memory).
    """
    within(tau_beam, 1e-6, 5.0, quantity="tau_beam", unit="", method=_CLEAR)
    within(tau_diffuse, 1e-6, 5.0, quantity="tau_diffuse", unit="", method=_CLEAR)
    up = np.asarray(altitude, float) > 0.0
    log_mass = np.log(air_mass(np.where(up, altitude, 90.0)))
    outside = np.where(up, extraterrestrial(day_of_year), 0.0)
    both = tau_beam * tau_diffuse
    beam_power = 1.454 - 0.406 * tau_beam - 0.268 * tau_diffuse + 0.021 * both
    diffuse_power = 0.507 + 0.205 * tau_beam - 0.080 * tau_diffuse - 0.190 * both
    return (
        outside * np.exp(-tau_beam * np.exp(beam_power * log_mass)),
        outside * np.exp(-tau_diffuse * np.exp(diffuse_power * log_mass)),
    )


def overcast_sky(beam_normal: Number, diffuse_horizontal: Number, altitude: Number) -> FloatArray:
    """Irradiance of a horizontal plane under a sky all covered with cloud, all of it diffuse, W/m².

    E = (1 - 0.75 (8/8)^3.4) (E_b sin β + E_d)

    beam_normal, diffuse_horizontal: E_b, E_d of the clear sky, W/m². altitude: β, degrees. All broadcast.
    Source: F. Kasten and G. Czeplak, Solar Energy 24, 1980, at eight eighths of cloud (from memory).
    """
    return np.asarray(0.25 * (beam_normal * np.maximum(0.0, np.sin(altitude * _RAD)) + diffuse_horizontal))


def cos_incidence(altitude: Number, azimuth: Number, surface_azimuth: Number, tilt: Number) -> FloatArray:
    """Cosine of the angle between the sun's rays and the surface's outward normal; negative behind it.

    cos θ = cos β cos γ sin Σ + sin β cos Σ

    altitude: β; azimuth less surface_azimuth: γ; tilt: Σ; degrees, all broadcast.
    Source: ASHRAE Fundamentals 2013, Climatic design information, eq. 22 (from memory).
    """
    high, slope = np.asarray(altitude * _RAD), tilt * _RAD
    turned = (azimuth - surface_azimuth) * _RAD
    return np.asarray(np.cos(high) * np.cos(turned) * np.sin(slope) + np.sin(high) * np.cos(slope))


def _shares(
    altitude: Number, azimuth: Number, surface_azimuth: Number, tilt: Number, overcast: bool
) -> tuple[FloatArray, FloatArray, Number]:
    """What a surface gets of the normal beam, of the horizontal diffuse, and of what the ground reflects."""
    slope = tilt * _RAD
    sin_slope, cos_slope = np.maximum(0.0, np.sin(slope)), np.cos(slope)
    # A surface facing straight down is a floor: it gets none of the ground's light, the box shades that ground itself.
    ground = np.where(cos_slope > -1.0 + 1e-9, 0.5 * (1.0 - cos_slope), 0.0)
    incidence = cos_incidence(altitude, azimuth, surface_azimuth, tilt)
    beam = np.where(np.asarray(altitude) > 0.0, np.maximum(0.0, incidence), 0.0)
    if overcast:
        sky = np.broadcast_to(0.5 * (1.0 + cos_slope), beam.shape)
    else:
        # Y is the ratio on a wall of that azimuth, and stands on the incidence there.
        wall = np.cos(np.asarray(altitude) * _RAD) * np.cos((azimuth - surface_azimuth) * _RAD)
        ratio = np.maximum(0.45, 0.55 + wall * (0.437 + 0.313 * wall))
        sky = ratio * sin_slope + np.maximum(0.0, cos_slope)
    return beam, sky, ground


def on_surface(
    beam_normal: Number,
    diffuse_horizontal: Number,
    altitude: Number,
    azimuth: Number,
    surface_azimuth: Number,
    tilt: Number,
    ground_reflects: Number,
    *,
    overcast: bool = False,
) -> Irradiance:
    """Irradiance of a tilted surface at an instant: beam, sky and ground-reflected, W/m².

    E_t,b = E_b cos θ; E_t,d = E_d (Y sin Σ + cos Σ) facing up, E_d Y sin Σ facing down, with the wall's
    Y = max(0.45, 0.55 + 0.437 cos θ_w + 0.313 cos² θ_w), or E_d (1 + cos Σ) / 2 under an overcast sky;
    E_t,r = ρ (E_b sin β + E_d) (1 - cos Σ) / 2, none on a floor (Σ = 180°)

    beam_normal, diffuse_horizontal: E_b, E_d, W/m². altitude: β, azimuth: of the sun; surface_azimuth: of the outward
    normal; tilt: Σ; degrees. ground_reflects: ρ. overcast: an even sky. All broadcast; so do the results.
    Source: ASHRAE Fundamentals 2013, Climatic design information, eq. 26 to 31 (from memory; facing up, Y is taken
    on the wall of the same azimuth).
    """
    beam, sky, ground = _shares(altitude, azimuth, surface_azimuth, tilt, overcast)
    flat = beam_normal * np.maximum(0.0, np.sin(np.asarray(altitude) * _RAD)) + diffuse_horizontal
    return Irradiance(
        beam=beam_normal * beam, sky=diffuse_horizontal * sky, ground=np.asarray(ground_reflects * ground * flat)
    )


def day_on_surface(
    beam_normal: FloatArray,
    diffuse_horizontal: FloatArray,
    altitude: FloatArray,
    azimuth: FloatArray,
    surface_azimuth: Number,
    tilt: Number,
    ground_reflects: Number,
    *,
    overcast: bool = False,
) -> Irradiance:
    """Mean irradiance of tilted surfaces over each clock hour, W/m², from values at `instants` of the day.

    The equations of `on_surface`, each part averaged over the instants of the hour.

    beam_normal, diffuse_horizontal: (…, 24 k) W/m²; altitude, azimuth of the sun: (…, 24 k) degrees, k instants an
    hour. surface_azimuth, tilt: degrees, ground_reflects: share; (…, 1), surfaces stacked first, draws before the
    hours: (surface, 1, 1). Results: (…, 24).
    Source: as `on_surface`, and the midpoint rule.
    """
    beam, sky, ground = _shares(altitude, azimuth, surface_azimuth, tilt, overcast)
    flat = hour_means(beam_normal * np.maximum(0.0, np.sin(altitude * _RAD)) + diffuse_horizontal)
    return Irradiance(
        beam=_mean_product(beam, beam_normal),
        sky=_mean_product(sky, diffuse_horizontal),
        ground=np.asarray(ground_reflects * ground * flat),
    )


def _mean_product(shares: FloatArray, flux: FloatArray) -> FloatArray:
    """Hourly means of shares times flux, without ever holding their product for all draws at all instants."""
    s = shares.reshape(*shares.shape[:-1], 24, -1)
    f = flux.reshape(*flux.shape[:-1], 24, -1)
    return np.asarray(np.einsum("...k,...k->...", s, f) / s.shape[-1])
