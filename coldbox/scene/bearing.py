"""Which way a box faces when nobody says: the worst of the 16 compass points."""

from __future__ import annotations

import numpy as np

from coldbox.physics import sun
from coldbox.physics.number import FloatArray, Number
from coldbox.scene.body import TURN, conductance
from coldbox.scene.types import Body, Surface, Weather

POINTS = 16
_STEP = 360.0 / POINTS


def worst_bearing(body: Body, weather: Weather) -> float | None:
    """The bearing of the front, degrees clockwise from north, at which the sun's heat has the highest peak hour.

    For each point: max over the hours of the sum over all sunlit surfaces of
    α (1 - shade) R_se UA I (what a wall passes on at once) or g (1 - shade) A I (glass).
    Draws are taken at their mean, so that all share one bearing. None where no wall stands in the sun.
    """
    walls = [one for one in body.surfaces if one.behind == "outdoors" and one.face in TURN]
    if not walls or weather.sun is None:
        return None
    directions = _STEP * np.arange(float(POINTS))
    total = _falls_on(weather, directions[:, None], 90.0)
    heat = np.zeros((POINTS, 24))
    for one in walls:
        turn = round(TURN[one.face] / _STEP)
        heat += _share(one) * total[(np.arange(POINTS) + turn) % POINTS]
    roofs = sum(_share(one) for one in body.surfaces if one.behind == "outdoors" and one.face == "ceiling")
    if roofs:
        heat += roofs * _falls_on(weather, 0.0, 0.0)
    return float(directions[int(np.argmax(heat.max(axis=-1)))])


def _falls_on(weather: Weather, azimuth: Number, tilt: float) -> FloatArray:
    """Hourly means on surfaces of some azimuths, (…, 24) W/m², at the middle of the draws."""
    day = weather.sun
    assert day is not None
    beam, diffuse, altitude = (
        figure if figure.ndim == 1 else figure.mean(axis=0)
        for figure in (day.beam_normal, day.diffuse_horizontal, day.altitude)
    )
    # Directions have no mean across north: those of the first draw stand for all.
    sun_azimuth = day.azimuth.reshape(-1, day.azimuth.shape[-1])[0]
    reflects = float(np.mean(weather.ground_reflects))
    return sun.day_on_surface(
        beam, diffuse, altitude, sun_azimuth, azimuth, tilt, reflects, overcast=day.overcast
    ).total


def _share(one: Surface) -> float:
    """Watts into the box for each W/m² that falls on the surface, with what passes on at once."""
    glass = one.solar_gain * one.area
    wall = one.absorptance * one.outside_film * conductance(one)
    return float(np.mean((1.0 - one.shade) * np.where(np.asarray(one.solar_gain) > 0.0, glass, wall)))
