"""Which way a box faces when nobody says: the worst of the 16 compass points."""

from __future__ import annotations

import numpy as np

from coldbox.physics import periodic, sun
from coldbox.physics.number import FloatArray, Number
from coldbox.physics.periodic import ComplexArray
from coldbox.record import Record
from coldbox.scene.body import TURN
from coldbox.scene.types import Body, Surface, Weather

POINTS = 16
_STEP = 360.0 / POINTS


def worst_bearing(body: Body, weather: Weather) -> float | None:
    """The bearing of the front, degrees clockwise from north, at which the sun's heat has the highest peak hour.

    For each point: max over the hours of the sum over all sunlit surfaces of g (1 - shade) A I through glass, and
    through walls of A F⁻¹[H / (h + Y) · F(α (1 - shade) I)], with the film h of ISO 6946 and the panel's transfer H and
    admittance Y.
    The first draw, the middle of all, decides for all. None where no wall stands in the sun.
    """
    walls = [one for one in body.surfaces if one.behind == "outdoors" and one.face in TURN]
    if not walls or weather.sun is None:
        return None
    directions = _STEP * np.arange(float(POINTS))
    total = periodic.to_harmonics(_falls_on(weather, directions[:, None], 90.0))
    heat = np.zeros((POINTS, 13), complex)
    known: dict[int, ComplexArray] = {}
    for one in walls:
        turn = round(TURN[one.face] / _STEP)
        heat += _passes(one, known) * total[(np.arange(POINTS) + turn) % POINTS]
    roofs = [one for one in body.surfaces if one.behind == "outdoors" and one.face == "ceiling"]
    if roofs:
        falls = periodic.to_harmonics(_falls_on(weather, 0.0, 0.0))
        heat += sum(_passes(one, known) for one in roofs) * falls
    return float(directions[int(np.argmax(periodic.to_hours(heat).max(axis=-1)))])


def _falls_on(weather: Weather, azimuth: Number, tilt: float) -> FloatArray:
    """Hourly means on surfaces of some azimuths, (…, 24) W/m², in the first draw."""
    day = weather.sun
    assert day is not None
    beam, diffuse, altitude, sun_azimuth = (
        figure.reshape(-1, figure.shape[-1])[0]
        for figure in (day.beam_normal, day.diffuse_horizontal, day.altitude, day.azimuth)
    )
    reflects = _middle(weather.ground_reflects)
    return sun.day_on_surface(
        beam, diffuse, altitude, sun_azimuth, azimuth, tilt, reflects, overcast=day.overcast
    ).total


def _passes(one: Surface, known: dict[int, ComplexArray]) -> ComplexArray:
    """Watts into the box for each W/m² that falls on the surface, at the 13 harmonics of the day.

    known: what was found for the same layers, taken again: their inside films hardly differ.
    """
    sunny = 1.0 - _middle(one.shade)
    gain = _middle(one.solar_gain)
    if gain > 0.0:
        return np.full(13, complex(gain * sunny * _middle(one.area)))
    if id(one.sheets) not in known:
        layers = [
            _Layer(resistance=_middle(each.resistance), heat_capacity=_middle(each.heat_capacity))
            for each in one.sheets
        ]
        panel = periodic.response(layers, _middle(one.inside_film))
        known[id(one.sheets)] = panel.transfer / (1.0 / _middle(one.outside_film) + panel.admittance)
    return one.absorptance * sunny * _middle(one.effective_area) * known[id(one.sheets)]


class _Layer(Record):
    resistance: float
    heat_capacity: float


def _middle(figure: Number) -> float:
    return figure if isinstance(figure, float) else float(np.ravel(figure)[0])
