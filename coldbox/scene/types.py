"""The records a scene is made of.

Shapes: a figure of the day is (24,) or (draws, 24), hour i the mean over i:00-i+1:00 of the wall clock; a steady figure
is a float or (draws, 1); so everything broadcasts with the hours last. Units as in `project.model`.
"""

from __future__ import annotations

from collections.abc import Mapping
from typing import Literal

from coldbox.physics.number import FloatArray, Number
from coldbox.project.model import Construction, Project
from coldbox.record import Record


class Air(Record):
    """Moist air at one place."""

    temperature_c: Number
    relative_humidity: Number  # over ice below 0 °C
    humidity_ratio: Number  # kg water per kg dry air
    enthalpy: Number  # J per kg dry air, 0 at 0 °C dry
    specific_volume: Number  # m³ per kg dry air
    density: Number  # kg moist air per m³
    dew_point_c: Number  # frost point below 0 °C


class SunDay(Record):
    """The sun at even instants of the design day, (…, 24 k), k an hour: what hourly means on a surface are made of."""

    altitude: FloatArray  # degrees above the horizon, negative at night
    azimuth: FloatArray  # degrees clockwise from north
    beam_normal: FloatArray  # W/m²
    diffuse_horizontal: FloatArray  # W/m²
    overcast: bool


class Weather(Record):
    """The design day outdoors."""

    air: Air  # (…, 24)
    wind: Number
    sky_c: FloatArray  # sky temperature
    sun: SunDay | None  # None: a sky without sun
    ground_reflects: Number


class Sheet(Record):
    """One layer as it stands in its wall, with temperature, ageing and moisture in its resistance."""

    material: str
    thickness: Number
    resistance: Number  # m²K/W
    heat_capacity: Number  # J/(m²K), thickness x density x specific heat; 0 for an air space
    foam: bool


class Surface(Record):
    """A stretch of the envelope with one construction and one thing behind it (doors: all `count` together)."""

    id: str  # "front", "panels.window", "doors.main"
    label: str  # "front S", "main door, leaf"
    face: str
    role: Literal["face", "panel", "door"]
    construction: Construction | None  # None: part of a box with a k_value
    sheets: tuple[Sheet, ...]  # the layers, outside first; one for a quoted figure
    resistance: Number  # m²K/W of the layers alone, factors applied, without films
    thickness: Number
    area: Number  # m², inside
    effective_area: Number  # of the layers, with its part of edges and corners
    outside_area: Number
    extra_w_per_k: Number  # joints, bolts, edges of evacuated panels, the allowance
    inside_film: Number  # m²K/W
    outside_film: Number  # m²K/W, standard; the hourly method solves the outside surface instead
    azimuth: Number | None  # of the outward normal, degrees clockwise from north; None: horizontal, or unknown
    tilt: float  # 0 facing up (ceiling), 90 wall, 180 facing down (floor)
    behind: str  # "outdoors", "ground", "void", "road", or a key into Scene.airs
    absorptance: Number
    emissivity: Number
    shade: Number
    solar_gain: Number


class Body(Record):
    """The box in numbers, inside unless said otherwise."""

    surfaces: tuple[Surface, ...]
    length: Number | None
    width: Number | None
    height: Number
    volume: Number
    floor_area: Number
    perimeter: Number
    inside_area: Number  # all six faces
    outside_area: Number


class Scene(Record):
    """Everything the account and the timeline start from."""

    project: Project
    body: Body
    pressure: Number  # Pa
    weather: Weather | None
    room: Air
    airs: Mapping[str, Air]  # by neighbour, "outdoors" and "road" among them when there is a site
