"""The box as a body: every stretch of its envelope with its areas, layers and films."""

from __future__ import annotations

from typing import Literal

import numpy as np

from coldbox.errors import OutOfValidity
from coldbox.physics import panel, shape, surface
from coldbox.physics.number import Number
from coldbox.physics.panel import Direction
from coldbox.physics.surface import Facing
from coldbox.project.model import FACES, WALLS, Construction, Door, Face, Panel, Project
from coldbox.scene import constructions, weather
from coldbox.scene.about import about
from coldbox.scene.constructions import Mask
from coldbox.scene.draws import least
from coldbox.scene.sizes import Sizes, sizes
from coldbox.scene.types import Body, Sheet, Surface
from coldbox.tables import load

TILT = {"ceiling": 0.0, "front": 90.0, "right": 90.0, "back": 90.0, "left": 90.0, "floor": 180.0}
# Seen from outside, facing the front, the right side looks a quarter turn counterclockwise of the front.
TURN = {"front": 0.0, "left": 90.0, "back": 180.0, "right": 270.0}
# ISO 6946: inside and unventilated rooms, by direction of the heat flow, m²K/W.
_STILL_FILM: dict[Direction, float] = {"up": 0.10, "horizontal": 0.13, "down": 0.17}
_COMPASS = ("N", "NNE", "NE", "ENE", "E", "ESE", "SE", "SSE", "S", "SSW", "SW", "WSW", "W", "WNW", "NW", "NNW")
_FACING: dict[Direction, Facing] = {"up": "unstable", "horizontal": "vertical", "down": "stable"}
_INSIDE_EMISSIVITY = 0.9
_FILM_ROUNDS = 12  # each gains a digit: the film is a small part of the wall
_UNDER_FLOORS = ("ground", "void", "road")


def compass(degrees: Number) -> str:
    """The nearest of the 16 compass points of a direction in degrees clockwise from north ("SSW")."""
    middle = degrees if isinstance(degrees, float | int) else float(np.mean(degrees))
    return _COMPASS[round(middle / 22.5) % 16]


def body(project: Project) -> Body:
    """The envelope of a project: one surface per face, panel and door (all equal doors together).

    Doors and panels are cut out of their face; the face is what remains and carries all of its edges and corners.
    A k_value is shared among the faces by their area inside, K sqrt(A_i A_e) in all.
    Without a bearing the walls have no azimuth: see `turned`.
    Raises OutOfValidity: openings larger than their face, walls thicker than the shortest inside side, a K or U that
    the films alone would exceed.
    """
    size = sizes(project)
    inside_area = sum((size.inside[name] for name in FACES), 0.0)
    outside_area = sum((size.outside[name] for name in FACES), 0.0)
    whole = None
    if project.box.k_value is not None:
        whole = project.box.k_value * shape.mean_area(inside_area, outside_area) / inside_area
    maker = _Maker(project, size, whole)
    found = [*maker.faces(), *map(maker.panel, project.panels), *map(maker.door, project.doors)]
    made = Body(
        surfaces=tuple(one for one in found if one is not None),
        length=size.length,
        width=size.width,
        height=size.height,
        volume=size.volume,
        floor_area=size.floor_area,
        perimeter=size.perimeter,
        inside_area=inside_area,
        outside_area=outside_area,
    )
    return made if project.box.bearing is None else turned(made, project.box.bearing)


def turned(body: Body, bearing: Number) -> Body:
    """The same box with its front facing a bearing, degrees clockwise from north."""
    surfaces = []
    for one in body.surfaces:
        if one.face in TURN:
            azimuth = (bearing + TURN[one.face]) % 360.0
            label = f"{one.label} {compass(azimuth)}" if one.role == "face" and one.behind == "outdoors" else one.label
            surfaces.append(one.replace(azimuth=azimuth, label=label))
        else:
            surfaces.append(one)
    return body.replace(surfaces=tuple(surfaces))


class _Maker:
    """Makes the surfaces of one project; holds what they share."""

    def __init__(self, project: Project, size: Sizes, whole: Number | None) -> None:
        self.project, self.size = project, size
        self.whole = whole  # W/K for each m² inside of a box with a k_value
        self.full: set[str] = set()  # faces of which the openings leave nothing
        self.known: dict[tuple[str, str, str], tuple[Sheet, ...]] = {}
        self.means: dict[str, Number] = {name: one.temperature for name, one in project.neighbours.items()}
        if project.site is not None:
            outdoors = weather.mean_temperature(project.site)
            self.means |= dict.fromkeys(("outdoors", "void", "road"), outdoors)
            self.means["ground"] = project.site.ground_temperature

    def faces(self) -> list[Surface | None]:
        """What remains of the six faces."""
        cut: dict[str, Number] = dict.fromkeys(FACES, 0.0)
        for hole in self.project.panels:
            cut[hole.face] = cut[hole.face] + hole.area
        for door in self.project.doors:
            cut[door.face] = cut[door.face] + door.width * door.height * door.count
        if not self.size.boxlike:
            # Only the walls' sum is known: what all openings leave of it is shared evenly.
            walls = 0.25 * sum((cut[name] for name in WALLS), 0.0)
            cut |= dict.fromkeys(WALLS, walls)
        return [self.face(face, cut[name]) for name, face in self.project.faces.items()]

    def face(self, face: Face, cut: Number) -> Surface | None:
        whole = self.size.inside[face.name]
        rest = whole - cut
        if least(rest + 1e-9 * whole) < 0.0:
            what = f"panels and doors in the face {face.name}"
            raise OutOfValidity(what, float(np.max(cut)), 0.0, float(np.min(whole)), "m²", "Area that is there")
        if least(1e-9 * whole - rest) >= 0.0:
            self.full.add(face.name)
            return None
        name = face.name
        return self.surface(
            id=name, name=name, role="face", on=face, area=rest, construction=face.construction, solar_gain=0.0,
            outside_area=self.size.outside[name] - cut, outline=self.size.outline[name],
        )  # fmt: skip

    def panel(self, one: Panel) -> Surface:
        # Of an area alone the outline is that of a square.
        outline: Number = 4.0 * one.area**0.5
        if one.width is not None and one.height is not None:
            outline = 2.0 * (one.width + one.height)
        return self.surface(
            id=f"panels.{one.name}", name=one.name, role="panel", on=one, area=one.area, outside_area=one.area,
            construction=one.construction, outline=outline, solar_gain=one.solar_gain,
        )  # fmt: skip

    def door(self, one: Door) -> Surface:
        area = one.width * one.height * one.count
        return self.surface(
            id=f"doors.{one.name}", name=one.name, role="door", on=one, area=area, outside_area=area,
            construction=one.construction, outline=2.0 * (one.width + one.height) * one.count,
            solar_gain=one.solar_gain, count=one.count,
        )  # fmt: skip

    def surface(
        self, *, id: str, name: str, role: Literal["face", "panel", "door"], on: Face | Panel | Door, area: Number,
        outside_area: Number, outline: Number, construction: str | None, solar_gain: Number, count: int = 1,
    ) -> Surface:  # fmt: skip
        face = on.name if isinstance(on, Face) else on.face
        made = None if construction is None else self.project.constructions[construction]
        inside_c, behind_c = self.project.box.temperature, self.means[on.neighbour]
        inwards = behind_c >= inside_c
        inside_film = constructions.by_direction(face, inwards, _STILL_FILM.__getitem__)
        outside_film = self.outside_film(face, on, inwards)
        if made is None:
            thickness = 0.0 if self.project.box.thickness is None else self.project.box.thickness
            effective: Number = (area * outside_area) ** 0.5
            layers = self.rest_of_k(area, effective, outside_area, inside_film, outside_film, thickness)
        else:
            thickness = made.thickness
            effective = self.with_edges(face, role, area, thickness) if on.neighbour != "ground" else area
            layers = self.layers(made, face, on.neighbour)
        resistance = constructions.total_resistance(layers)
        if self.project.box.films == "natural":
            with about(self.project, "box.films", _too_large(face)):
                inside_film, outside_film = self.natural(face, on, inwards, resistance, outside_film)
        surface_ = Surface(
            id=id, label=_label(name, role, on.neighbour), face=face, role=role, construction=made,
            sheets=layers, resistance=resistance, thickness=thickness, area=area, effective_area=effective,
            outside_area=outside_area, extra_w_per_k=0.0, inside_film=inside_film, outside_film=outside_film,
            azimuth=None, tilt=TILT[face], behind=on.neighbour, absorptance=_absorptance(on),
            emissivity=on.emissivity, shade=on.shade, solar_gain=solar_gain,
        )  # fmt: skip
        extra = self.extra(surface_, outline, count)
        return surface_ if isinstance(extra, float) and extra == 0.0 else surface_.replace(extra_w_per_k=extra)

    def outside_film(self, face: str, on: Face | Panel | Door, inwards: Mask) -> Number:
        """Outdoors by wind and long-wave emissivity; towards rooms and voids still air; none against the ground."""
        site = self.project.site
        if on.neighbour == "ground":
            return 0.0
        if on.neighbour in ("outdoors", "road") and site is not None:
            return panel.outside_film(site.wind, on.emissivity, self.means[on.neighbour])
        return constructions.by_direction(face, inwards, _STILL_FILM.__getitem__)

    def natural(
        self, face: str, on: Face | Panel | Door, inwards: Mask, resistance: Number, outside_film: Number
    ) -> tuple[Number, Number]:
        """Films from natural convection and radiation: both towards a room, the inside one behind an outdoor wall."""
        size = self.size
        length = size.height if face in WALLS else size.floor_area / size.perimeter
        inside_c, behind_c = self.project.box.temperature, self.means[on.neighbour]
        still = on.neighbour in self.project.neighbours

        def both(direction: Direction) -> tuple[Number, Number]:
            facing = _FACING[direction]
            if still:
                films = surface.natural_films(
                    behind_c, inside_c, resistance, length, facing, on.emissivity, _INSIDE_EMISSIVITY
                )
                return films.inside_film, films.outside_film
            film: Number = _STILL_FILM[direction]
            for _ in range(_FILM_ROUNDS):
                drop = (behind_c - inside_c) * film / (outside_film + resistance + film)
                mean = inside_c + 0.5 * drop
                film = 1.0 / (
                    surface.natural_convection(drop, length, facing, mean) + surface.radiative(_INSIDE_EMISSIVITY, mean)
                )
            return film, outside_film

        return (
            constructions.by_direction(face, inwards, lambda direction: both(direction)[0]),
            constructions.by_direction(face, inwards, lambda direction: both(direction)[1]),
        )

    def layers(self, made: Construction, face: str, neighbour: str) -> tuple[Sheet, ...]:
        """The layers of a construction; walls of one construction with one thing behind them share theirs."""
        key = (made.name, "wall" if face in WALLS else face, neighbour)
        if key not in self.known:
            self.known[key] = constructions.sheets(
                made, face, inside_c=self.project.box.temperature, behind_c=self.means[neighbour]
            )
        return self.known[key]

    def with_edges(self, face: str, role: str, area: Number, thickness: Number) -> Number:
        """Area of layers with their part of the half edges and third corners that belong to the face, m².

        All of it goes to what remains of the face. Its openings share it by area where they leave nothing of it, and
        where only the sum of the walls is known.
        """
        size = self.size
        whole = size.inside[face]
        pooled = not size.boxlike and face in WALLS
        if role == "face" and not pooled:
            share: Number = 1.0
        elif face in self.full or (pooled and role != "door"):
            share = area / whole
        else:
            return area
        return area + share * (shape.effective_area(whole, thickness, size.edges[face], size.corners[face]) - whole)

    def rest_of_k(
        self, area: Number, effective: Number, outside_area: Number, inside_film: Number, outside_film: Number,
        thickness: Number,
    ) -> tuple[Sheet, ...]:  # fmt: skip
        """One layer that, with its films, conducts this stretch's share of K sqrt(A_i A_e)."""
        if self.whole is None:
            raise OutOfValidity("constructions of a face", 0.0, 1.0, 1.0, "", "A box without a k_value")
        resistance = effective * (1.0 / (self.whole * area) - inside_film / area - outside_film / outside_area)
        if least(resistance) <= 0.0:
            highest = 1.0 / (inside_film + outside_film * area / outside_area)
            raise OutOfValidity(
                "heat through a square metre inside", float(np.max(self.whole)), 0.0, float(np.min(highest)), "W/K",
                "A K coefficient with the films of ISO 6946",
            )  # fmt: skip
        capacity = thickness * constructions.FOAM_DENSITY * constructions.FOAM_SPECIFIC_HEAT
        return (Sheet(material="body", thickness=thickness, resistance=resistance, heat_capacity=capacity, foam=True),)

    def extra(self, one: Surface, outline: Number, count: int) -> Number:
        """Joints along the outline, bolts, edges of evacuated panels, and the allowance on all that passes, W/K."""
        made = one.construction
        extra: Number = 0.0
        if made is not None:
            extra = panel.bridges(made.edge_loss, outline, made.point_loss, made.points * count)
            for layer in made.layers:
                if not isinstance(layer.edge_psi, float | int) or layer.edge_psi != 0.0:
                    extra = extra + panel.evacuated_extra(layer.edge_psi, outline)
        allowance = self.project.box.allowance
        if isinstance(allowance, float | int) and allowance == 0.0:
            return extra
        return extra + allowance * (conductance(one) + extra)


def conductance(one: Surface) -> Number:
    """Layers and films of a surface, each on its own area, without joints and allowance, W/K."""
    return panel.conductance(
        one.area, one.effective_area, one.outside_area, one.resistance, one.inside_film, one.outside_film
    )


def _absorptance(on: Face | Panel | Door) -> float:
    row = load.row("colours", on.colour)
    return float(row["weathered_absorptance" if on.weathered else "absorptance"])


def _too_large(face: str) -> str:
    return f'The {face} is too large, or its two sides too far apart, for this method. Write films = "standard".'


def _label(name: str, role: str, neighbour: str) -> str:
    if role == "door":
        return f"{name}, leaf" if "door" in name else f"{name} door, leaf"
    if role == "panel" or neighbour == "outdoors":
        return name
    if neighbour == "ground":
        return f"{name} on ground"
    return f"{name} over {neighbour}" if neighbour in _UNDER_FLOORS else f"{name} to {neighbour}"
