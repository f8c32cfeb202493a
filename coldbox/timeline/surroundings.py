"""What surrounds a box that stands somewhere in some way: air, sun and sky of each hour, ready for the engine."""

from __future__ import annotations

from typing import Final

import numpy as np

from coldbox.physics import constants, panel, sun, surface
from coldbox.physics.number import FloatArray, Number
from coldbox.project.model import Project
from coldbox.record import Record
from coldbox.scene.body import TURN
from coldbox.scene.build import build
from coldbox.scene.draws import stack
from coldbox.scene.openings import leak_neighbour
from coldbox.scene.sun_allowance import added_degrees
from coldbox.scene.types import Air, Scene, Surface, Weather
from coldbox.timeline import weather_file
from coldbox.timeline.envelope import TOUCHES, Envelope, outside_conductance

ZERO: Final = float(constants.ZERO_CELSIUS)
SIGMA: Final = float(constants.STEFAN_BOLTZMANN)
FIXED: Final = ("ground", "void")  # what a box cannot be moved off
POINTS: Final = 16
# Of a film that holds radiation, at least this share is convection.
LEAST_CONVECTION: Final = 0.1


class Setting(Record):
    """Where the box stands and how; None leaves it as the project has it."""

    neighbour: str | None = None  # behind all faces that are not on the ground
    bearing: float | None = None  # of the front
    worst_h: tuple[float, float] | None = None  # clock hours for which the worst of 16 bearings is sought
    shade: float | None = None  # share of the sun kept off, beside that of each face
    speed: float = 0.0  # m/s
    dry_bulb: Number | None = None
    around: str | None = None  # name, for what is told


class Around(Record):
    """The surroundings in each hour of one or more days, (hour, …, draw or 1), hour 0 from 00:00 of the first day."""

    hours: int
    outside_c: FloatArray  # (hour, wall, draw)
    film: tuple[FloatArray, ...]  # of each day (wall, draw) W/K
    gain_w: FloatArray  # (hour, wall, draw)
    glass_w: FloatArray  # (hour, draw) sun through glass
    extra: FloatArray  # (wall, draw) W/K
    extra_c: FloatArray  # (hour, wall, draw)
    airs: dict[str, tuple[FloatArray, FloatArray]]  # by neighbour: °C and kg/kg, (hour, draw)
    behind: dict[str, str]  # of each surface: the neighbour's name
    leak: str  # where leaking air comes from; "": nowhere
    bearing: float | None

    def hour(self, at_s: float) -> int:
        """Row of an instant; before the first day and after the last, the same hour of that day."""
        hour = int(at_s // 3600.0)
        day = min(max(hour // 24, 0), self.hours // 24 - 1)
        return 24 * day + hour % 24


def placed(project: Project, setting: Setting) -> Project:
    """The project as the setting has it."""
    site, box = project.site, project.box
    if site is not None and setting.dry_bulb is not None:
        project = project.replace(site=site.replace(dry_bulb=setting.dry_bulb))
    if setting.bearing is not None:
        project = project.replace(box=box.replace(bearing=setting.bearing))
    if setting.neighbour is not None:
        name = setting.neighbour
        project = project.replace(
            faces={
                face: one if one.neighbour in FIXED else one.replace(neighbour=_beneath(face, name))
                for face, one in project.faces.items()
            },
            panels=tuple(one.replace(neighbour=_beneath(one.face, name)) for one in project.panels),
            doors=tuple(one.replace(neighbour=name) for one in project.doors),
        )
    return project


def _beneath(face: str, name: str) -> str:
    """Outdoors a floor that is off the ground stands over a road: out of sun and sky."""
    return "road" if name == "outdoors" and face == "floor" else name


def faces_sky(project: Project, settings: list[Setting]) -> frozenset[str]:
    """Ids of the surfaces that face the outdoors in any of the settings, where sun and sky are hourly."""
    if project.site is None or project.box.sun != "hourly":
        return frozenset()
    found: set[str] = set()
    for setting in settings:
        there = placed(project, setting)
        found |= {name for name, one in there.faces.items() if one.neighbour == "outdoors"}
        found |= {f"panels.{one.name}" for one in there.panels if one.neighbour == "outdoors"}
        found |= {f"doors.{one.name}" for one in there.doors if one.neighbour == "outdoors"}
    return frozenset(found)


def surroundings(project: Project, setting: Setting, envelope: Envelope, films: Number = 1.0) -> Around:
    """The hours around a box in one setting. films: factor on the outside films."""
    there = placed(project, setting)
    scene = build(there)
    if setting.worst_h is not None and setting.bearing is None:
        bearing = _worst(scene, setting.worst_h)
        if bearing is not None:
            there = there.replace(box=there.box.replace(bearing=bearing))
            scene = build(there)
    days: tuple[Weather | None, ...] = (scene.weather,)
    if project.site is not None and project.site.weather is not None:
        days = weather_file.days(there, scene.pressure)
    makers = [_Day(scene, day, setting, envelope, films) for day in days]
    airs = {
        name: tuple(np.concatenate([_air(maker.airs[name], part) for maker in makers]) for part in (0, 1))
        for name in scene.airs
    }
    made = [maker.walls() for maker in makers]
    return Around(
        hours=24 * len(days),
        outside_c=_joined([one[0] for one in made]),
        film=tuple(one[1] for one in made),
        gain_w=_joined([one[2] for one in made]),
        glass_w=_joined([one[3] for one in made]),
        extra=_rows([one.extra for one in envelope.stretches]),
        extra_c=_joined([one[4] for one in made]),
        airs={name: (both[0], both[1]) for name, both in airs.items()},
        behind={one.id: one.behind for one in scene.body.surfaces},
        leak=leak_neighbour(scene),
        bearing=_front(scene.body.surfaces),
    )


def _joined(days: list[FloatArray]) -> FloatArray:
    return days[0] if len(days) == 1 else np.concatenate(np.broadcast_arrays(*days))


def _air(one: Air, part: int) -> FloatArray:
    return _hours(one.humidity_ratio if part else one.temperature_c)


def _hours(figure: Number) -> FloatArray:
    """A steady figure or a figure of the day as (24, draw or 1)."""
    return np.ascontiguousarray((np.atleast_2d(figure) + np.zeros((1, 24))).T)


def _rows(values: list[Number]) -> FloatArray:
    flat = [np.ravel(value) for value in values]
    width = max(one.size for one in flat)
    return np.array([np.broadcast_to(one, (width,)) for one in flat]).reshape(len(flat), width)


class _Day:
    """One day's surroundings, surface by surface."""

    def __init__(self, scene: Scene, day: Weather | None, setting: Setting, made: Envelope, films: Number) -> None:
        self.scene, self.day, self.setting, self.made, self.films = scene, day, setting, made, films
        self.airs = dict(scene.airs)
        if day is not None:
            self.airs |= dict.fromkeys(("outdoors", "void", "road"), day.air)
        self.hourly = scene.project.box.sun == "hourly"
        by_id = {one.id: one for one in scene.body.surfaces}
        self.surfaces = [by_id[one.surface.id] for one in made.stretches]
        self.falls = _falls(self.surfaces, day, setting)

    def walls(self) -> tuple[FloatArray, FloatArray, FloatArray, FloatArray, FloatArray]:
        """Outside temperatures, films, gains, sun through glass, and the air beside each wall."""
        outside, film, gain, beside = [], [], [], []
        glass = np.zeros((24, 1))
        for place, one in enumerate(self.surfaces):
            mine = self._wall(place, one)
            outside.append(mine[0])
            film.append(mine[1])
            gain.append(mine[2])
            beside.append(_hours(self.airs[one.behind].temperature_c) if one.behind in self.airs else mine[0])
            if np.any(one.solar_gain) and one.behind == "outdoors":
                glass = glass + _hours(one.solar_gain * one.area * self.falls[place])
        return _walls(outside), _rows(film), _walls(gain), glass, _walls(beside)

    def _wall(self, place: int, one: Surface) -> tuple[FloatArray, Number, FloatArray]:
        stretch = self.made.stretches[place]
        radiating, nothing = stretch.part.radiating, np.zeros((24, 1))
        if stretch.ground_c is not None:
            return _hours(stretch.ground_c), TOUCHES, nothing
        if one.behind == "void":
            return self._void(place, one)
        air_c = self.airs[one.behind].temperature_c
        if one.behind == "outdoors" and self.day is not None and self.hourly:
            convection = self.films * surface.wind_convection(self._wind(self.day)) * one.outside_area
            return _hours(air_c), convection, self._gain(place, one, self.day, radiating)
        if one.behind == "outdoors":
            air_c = air_c + added_degrees(self.scene, one)
        film = outside_conductance(one, self.films)
        if one.behind == "road" and self.day is not None and self.setting.speed > 0.0:
            mean = _day_mean(air_c)
            film = self.films * one.outside_area / panel.outside_film(self._wind(self.day), one.emissivity, mean)
        if not np.any(radiating):
            return _hours(air_c), film, nothing
        # A wall that at other times faces the sky radiates apart from its film: here to walls as warm as the air.
        kelvin = air_c + ZERO
        linear = 4.0 * SIGMA * radiating * _day_mean(kelvin) ** 3
        convection = np.maximum(film - linear, LEAST_CONVECTION * film)
        return _hours(air_c), convection, _hours(SIGMA * radiating * kelvin**4)

    def _wind(self, day: Weather) -> Number:
        return np.maximum(day.wind, self.setting.speed)

    def _gain(self, place: int, one: Surface, day: Weather, radiating: Number) -> FloatArray:
        share = surface.sky_view(one.tilt)
        air, sky = day.air.temperature_c + ZERO, day.sky_c + ZERO
        gain = SIGMA * radiating * (share * sky**4 + (1.0 - share) * air**4)
        if not np.any(one.solar_gain):
            gain = gain + one.absorptance * one.outside_area * self.falls[place]
        return _hours(gain)

    def _void(self, place: int, one: Surface) -> tuple[FloatArray, Number, FloatArray]:
        site, void = self.scene.project.site, self.made.stretches[place].void
        assert site is not None and self.day is not None, "no void without a site"
        film = outside_conductance(one, self.films)
        if void is None:
            return _hours(site.ground_temperature), film, np.zeros((24, 1))
        both, to_ground = void
        beneath = (to_ground * site.ground_temperature + (both - to_ground) * self.day.air.temperature_c) / both
        return _hours(beneath), 1.0 / (1.0 / film + 1.0 / both), np.zeros((24, 1))


def _day_mean(hours: Number) -> Number:
    """Mean of (…, 24) figures as (…, 1); a figure is its own."""
    figures = np.asarray(hours)
    return figures.mean(axis=-1, keepdims=True) if figures.ndim > 1 else float(figures.mean())


def _walls(values: list[FloatArray]) -> FloatArray:
    """(24, draw) of each wall as (24, wall, draw)."""
    width = max(one.shape[-1] for one in values)
    return np.stack([np.broadcast_to(one, (24, width)) for one in values], axis=1)


def _falls(surfaces: list[Surface], day: Weather | None, setting: Setting) -> FloatArray:
    """Sun on each surface, shade taken off, (wall, draw or 1, 24) W/m²."""
    if day is None or day.sun is None:
        return np.zeros((len(surfaces), 1, 24))
    stands = day.sun
    total = sun.day_on_surface(
        stands.beam_normal,
        stands.diffuse_horizontal,
        stands.altitude,
        stands.azimuth,
        stack([0.0 if one.azimuth is None else one.azimuth for one in surfaces]),
        stack([one.tilt for one in surfaces]),
        day.ground_reflects,
        overcast=stands.overcast,
    ).total
    lit = 1.0 - stack([one.shade for one in surfaces])
    shade = 0.0 if setting.shade is None else setting.shade
    outdoors = np.array([float(one.behind == "outdoors") for one in surfaces])[:, None, None]
    return np.asarray(outdoors * lit * (1.0 - shade) * total)


def _front(surfaces: tuple[Surface, ...]) -> float | None:
    wall = next((one for one in surfaces if one.azimuth is not None and one.face in TURN), None)
    if wall is None or wall.azimuth is None:
        return None
    return float(np.ravel((wall.azimuth - TURN[wall.face]) % 360.0)[0])


def _worst(scene: Scene, clock_h: tuple[float, float]) -> float | None:
    """Of 16 bearings the one at which most sun is taken up between two clock hours; None without sun on a wall."""
    day = scene.weather
    walls = [one for one in scene.body.surfaces if one.behind == "outdoors" and one.face in TURN]
    if day is None or day.sun is None or not walls:
        return None
    shares = np.zeros(24)
    for hour in range(int(clock_h[0] // 1), int(np.ceil(clock_h[1]))):
        shares[hour % 24] += max(min(clock_h[1], hour + 1.0) - max(clock_h[0], float(hour)), 0.0)
    bearings = 360.0 / POINTS * np.arange(POINTS)
    taken = np.zeros(POINTS)
    for place, bearing in enumerate(bearings):
        turned = [one.replace(azimuth=(bearing + TURN[one.face]) % 360.0) for one in walls]
        falls = _falls(turned, day, Setting())
        weight = stack([one.absorptance * one.outside_area + one.solar_gain * one.area for one in turned])
        taken[place] = float(((weight * falls)[:, 0].sum(axis=0) * shares).sum())
    return float(bearings[int(np.argmax(taken))])
