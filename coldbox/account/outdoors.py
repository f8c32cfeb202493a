"""Outdoor surfaces through the day: where each sits between sun, sky, wind and the cold behind it."""

from __future__ import annotations

from collections.abc import Sequence
from itertools import groupby
from typing import TYPE_CHECKING, TypeVar

import numpy as np

from coldbox.physics import constants, periodic, sun, surface
from coldbox.physics.number import FloatArray, Number
from coldbox.record import Record
from coldbox.scene import Scene
from coldbox.scene.draws import matters, stack
from coldbox.scene.types import Surface, Weather

if TYPE_CHECKING:
    from numpy.typing import NDArray

# Heat through a panel moves by its U times this, some µW/m²; each round of the balance gains a digit or more.
_TOLERANCE_K = 1e-5
_ZERO = float(constants.ZERO_CELSIUS)
_SIGMA = float(constants.STEFAN_BOLTZMANN)
Scalar = TypeVar("Scalar", np.float64, np.complex128)


class Outdoors(Record):
    """Outdoor surfaces stacked on the first axis, then draws (or 1), then hours (or 1)."""

    surfaces: tuple[Surface, ...]  # those that share their layers side by side
    plain_w: FloatArray  # into the room without sun
    sun_w: FloatArray  # what the sun adds
    surface_c: FloatArray  # outside surface, in the sun
    mean_surface_c: FloatArray  # of the day, without sun
    peak_surface_c: FloatArray  # at the hour when it is warmest
    peak_sol_air_c: FloatArray  # at that hour
    peak_incident: FloatArray  # W/m² in the brightest hour, shade not taken off
    coldest_c: FloatArray  # outside surface
    over_dew_point_k: FloatArray  # least of surface less dew point
    dew_point_c: FloatArray  # in the hour of that least, found at the mean of the draws

    def sunlit(self, place: int) -> bool:
        """Whether the sun brings anything through the surface at this place of the stack."""
        return matters(self.sun_w[place])

    def day(self, stacked: FloatArray, place: int) -> FloatArray:
        """One surface's figure of the day, (24,) or (draws, 24), from a stack of these."""
        found: FloatArray = stacked[place]
        return found[0] if found.shape[0] == 1 else found

    def steady(self, stacked: FloatArray, place: int) -> Number:
        """One surface's steady figure, float or (draws, 1), from a stack of these."""
        found: FloatArray = stacked[place]
        return float(found[0, 0]) if found.shape[0] == 1 else found


def solve(scene: Scene, surfaces: Sequence[Surface]) -> Outdoors:
    """Heat through outdoor surfaces by the balance of each outside surface and periodic conduction behind it.

    The sun's part is the heat with sun less the heat without; through glass it is g (1 - shade) I A.
    All surfaces are solved in one call, with sun and without. Joints and allowance follow the outside surface
    without delay.
    """
    weather = scene.weather
    assert weather is not None, "nothing outdoors without a site"
    surfaces = _by_layers(surfaces)
    incident = _incident(weather, surfaces)
    lets_in = stack([one.solar_gain for one in surfaces])
    falls = (1.0 - stack([one.shade for one in surfaces])) * incident
    absorbed = np.where(lets_in > 0.0, 0.0, stack([one.absorptance for one in surfaces])) * falls
    sunny = bool(absorbed.any())
    emissivity = stack([one.emissivity for one in surfaces])
    sky_share = surface.sky_view(stack([one.tilt for one in surfaces]))
    convection = surface.wind_convection(weather.wind)
    air_c = weather.air.temperature_c
    balanced = surface.balance(
        air_c=air_c,
        sky_c=weather.sky_c,
        absorbed=np.stack([np.zeros_like(absorbed), absorbed]) if sunny else absorbed[None],
        emissivity=emissivity,
        sky_share=sky_share,
        convection=convection,
        room_c=scene.room.temperature_c,
        panel=_responses(surfaces),
        tolerance_k=_TOLERANCE_K,
    )
    # On the first axis: without sun, and with it where there is any.
    outside = stack([one.outside_area for one in surfaces])
    surface_c = balanced.surface_c[-1]
    plain = outside * balanced.inside_w_per_m2[0]
    added = outside * balanced.inside_w_per_m2[1] - plain if sunny else np.zeros_like(plain)
    if matters(lets_in):
        added += lets_in * falls * stack([one.area for one in surfaces])
    warmest = surface_c.mean(axis=1).argmax(axis=-1)
    each = np.arange(len(surfaces))
    own = surface_c[each, :, warmest][..., None]
    sol_air = _sol_air(
        own + _ZERO,
        _at(air_c, warmest) + _ZERO,
        _at(weather.sky_c, warmest) + _ZERO,
        absorbed[each, :, warmest][..., None],
        emissivity * _SIGMA,
        sky_share,
        convection,
    )
    over = surface_c - weather.air.dew_point_c
    nearest = over.mean(axis=1).argmin(axis=-1)
    return Outdoors(
        surfaces=tuple(surfaces),
        plain_w=plain,
        sun_w=added,
        surface_c=surface_c,
        mean_surface_c=balanced.surface_c[0].mean(axis=-1, keepdims=True),
        peak_surface_c=own,
        peak_sol_air_c=sol_air - _ZERO,
        peak_incident=incident.max(axis=-1, keepdims=True),
        coldest_c=surface_c.min(axis=-1, keepdims=True),
        over_dew_point_k=over.min(axis=-1, keepdims=True),
        dew_point_c=_at(weather.air.dew_point_c, nearest),
    )


def response(one: Surface, outside_film: Number | None = None) -> periodic.Response:
    """Response of one panel to its outside surface, or with a film to the air there; per m² of outside surface."""
    film = () if outside_film is None else (outside_film * one.effective_area / one.outside_area,)
    layers = (*film, *one.sheets)
    answer = periodic.response(layers, one.inside_film * one.effective_area / one.area)
    return _scaled(answer, one.effective_area / one.outside_area, one.extra_w_per_k / one.outside_area)


def _by_layers(surfaces: Sequence[Surface]) -> list[Surface]:
    """The surfaces with those that share their layers side by side."""
    groups: dict[int, list[Surface]] = {}
    for one in surfaces:
        groups.setdefault(id(one.sheets), []).append(one)
    return [one for group in groups.values() for one in group]


def _responses(surfaces: Sequence[Surface]) -> periodic.Response:
    """The panels behind the surfaces, stacked; neighbours that share their layers share the work.

    Layers and inside film are taken per m² of layers, and the answer is then given per m² of outside surface.
    """
    answers: list[periodic.Response] = []
    for _, group in groupby(surfaces, key=lambda one: id(one.sheets)):
        members = list(group)
        film = stack([one.inside_film * one.effective_area / one.area for one in members])
        scale = stack([one.effective_area / one.outside_area for one in members])
        beside = stack([one.extra_w_per_k / one.outside_area for one in members])
        answers.append(_scaled(periodic.response(members[0].sheets, film), scale, beside))
    if len(answers) == 1:
        return answers[0]
    draws = max(one.transfer.shape[1] for one in answers)

    def together(parts: list[NDArray[Scalar]]) -> NDArray[Scalar]:
        if draws > 1:
            parts = [np.broadcast_to(one, (one.shape[0], draws, one.shape[2])) for one in parts]
        return np.concatenate(parts)

    return periodic.Response(
        u=together([np.asarray(one.u) for one in answers]),
        transfer=together([one.transfer for one in answers]),
        admittance=together([one.admittance for one in answers]),
    )


def _scaled(answer: periodic.Response, scale: Number, beside: Number) -> periodic.Response:
    return periodic.Response(
        u=answer.u * scale + beside,
        transfer=answer.transfer * scale + beside,
        admittance=answer.admittance * scale + beside,
    )


def _incident(weather: Weather, surfaces: Sequence[Surface]) -> FloatArray:
    """Sun on each surface, hourly means, (surfaces, draws or 1, 24) W/m²; worked out once for each face."""
    day = weather.sun
    if day is None:
        return np.zeros((len(surfaces), 1, 24))
    faces: dict[str, Surface] = {}
    for one in surfaces:
        faces.setdefault(one.face, one)
    order = list(faces)
    falls = sun.day_on_surface(
        day.beam_normal,
        day.diffuse_horizontal,
        day.altitude,
        day.azimuth,
        stack([0.0 if one.azimuth is None else one.azimuth for one in faces.values()]),
        stack([one.tilt for one in faces.values()]),
        weather.ground_reflects,
        overcast=day.overcast,
    ).total
    return falls[[order.index(one.face) for one in surfaces]]


def _sol_air(
    own: FloatArray, air: FloatArray, sky: FloatArray, absorbed: FloatArray, emitted: FloatArray, share: Number,
    convection: Number,
) -> FloatArray:  # fmt: skip
    """Sol-air temperature at one hour, K: the air that would send in the same heat without sun; all in kelvin."""
    into = absorbed + emitted * (air**4 + share * (sky**4 - air**4) - own**4) + convection * (air - own)
    return own + into / (convection + emitted * (air + own) * (air**2 + own**2))


def _at(figure: Number, hours: NDArray[np.intp]) -> FloatArray:
    """A figure of the day, (24,) or (draws, 24), at the hour of each surface, (surfaces, draws or 1, 1)."""
    return np.asarray(figure)[..., hours].T.reshape(len(hours), -1, 1)
