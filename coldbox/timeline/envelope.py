"""The envelope for the timeline: each surface as a chain of layers, floors with the ground beneath them."""

from __future__ import annotations

from typing import Final

import numpy as np

from coldbox.physics.number import FloatArray, Number
from coldbox.record import Record
from coldbox.scene import Scene, floor
from coldbox.scene.types import Surface
from coldbox.tables import load
from coldbox.timeline.types import Network, State, WallLayer, WallPart

CELLS: Final = 12  # of a wall
GROUND_CELLS: Final = 20
# The ground under a floor is cut into layers, each so many times as thick as the one above it.
GROUND_LAYERS: Final = 6
GROUND_GROWS: Final = 2.0
TOUCHES: Final = 1e6  # W/K where no film lies between a wall and what is behind it


class Stretch(Record):
    """One surface with what the drivers need to know of it."""

    surface: Surface
    part: WallPart
    extra: Number  # W/K beside the layers, from the air behind to the room's
    ground_c: Number | None  # what a floor on the ground ends at; None: no ground
    void: tuple[Number, Number] | None  # W/K from a void to ground and outdoors together, and to the ground alone
    held: tuple[Number, Number] | None  # with power: the heated plane's °C and the K/W from the room's air to it


class Envelope(Record):
    """All of it, in the order of the network's walls."""

    stretches: tuple[Stretch, ...]
    ua: Number  # W/K with the films of the steady account, floors to the year's mean or the void's surroundings


def envelope(scene: Scene, sky: frozenset[str], films: Number = 1.0) -> Envelope:
    """The envelope of a scene.

    sky: ids of the surfaces that face the sky at any time of the run; their radiation is apart from their film.
    films: factor on all films' conductances, inside and out.
    """
    made = [_stretch(scene, one, one.id in sky, films) for one in scene.body.surfaces]
    # Walls of equally many cells side by side are stepped together.
    made.sort(key=lambda one: (one.ground_c is not None, _layers_that_hold(one.part)))
    ua: Number = 0.0
    for one in scene.body.surfaces:
        if one.behind in ("ground", "void"):
            ua = ua + floor.idle(scene, one).ua
        else:
            ua = ua + 1.0 / _air_to_air(one, films) + one.extra_w_per_k
    return Envelope(stretches=tuple(made), ua=ua)


def outside_conductance(one: Surface, films: Number = 1.0) -> Number:
    """Film between a surface and the air behind it, W/K."""
    return films * one.outside_area / one.outside_film


def held_floors(network: Network, made: Envelope, room_c: Number, state: State) -> None:
    """Writes into a state what a heated floor settles at: straight lines from the room to the plane, and onwards."""
    row = 0
    for group, cells, surface_c in zip(network.walls, state.wall_c, state.surface_c, strict=True):
        for place in range(len(group.labels)):
            held = made.stretches[row].held
            row += 1
            if held is None:
                continue
            plane_c, above = np.ravel(held[0]), np.ravel(held[1])
            own = group.between[:, place]
            # K/W from the room's air to each cell, outermost first, and to the surface.
            way = np.cumsum(1.0 / own[::-1], axis=0)[::-1]
            room = np.ravel(room_c)
            rising = room + (plane_c - room) * way / above
            beyond = np.maximum(way[0] - above, 1e-12)
            onwards = plane_c + (surface_c[place] - plane_c) * (way - above) / beyond
            cells[:, place] = np.where(way <= above, rising, onwards)[1:]


def _layers_that_hold(part: WallPart) -> int:
    return max(part.cells, sum(bool(np.any(layer.capacity)) for layer in part.layers))


def _air_to_air(one: Surface, films: Number) -> Number:
    inside = one.inside_film / (films * one.area)
    return inside + one.resistance / one.effective_area + 1.0 / outside_conductance(one, films)


def _stretch(scene: Scene, one: Surface, sees_sky: bool, films: Number) -> Stretch:
    inside_film = one.inside_film / (films * one.area)
    layers = [
        WallLayer(resistance=sheet.resistance / one.effective_area, capacity=sheet.heat_capacity * one.effective_area)
        for sheet in one.sheets
    ]
    extra: Number = one.extra_w_per_k
    ground_c: Number | None = None
    void: tuple[Number, Number] | None = None
    beneath = floor.idle(scene, one) if one.behind in ("ground", "void") else None
    if beneath is not None:
        # Joints and allowance lie beside the layers, and what is beneath is behind both.
        layers, extra = _with_extra(one, layers, films), 0.0
    if one.behind == "ground":
        assert beneath is not None
        ground_c, column = _ground(scene, one, beneath, layers, inside_film)
        layers = [*column, *layers]
    elif (
        one.behind == "void"
        and beneath is not None
        and beneath.edge is not None
        and np.all(np.greater(beneath.edge, 0.0))
    ):
        to_both, to_ground = floor.void_onwards(scene, beneath.u)
        void = to_both * one.area, to_ground * one.area
    return Stretch(
        surface=one,
        part=WallPart(
            name=one.id,
            layers=tuple(layers),
            inside_film=inside_film,
            radiating=one.emissivity * one.outside_area if sees_sky else 0.0,
            cells=GROUND_CELLS if one.behind == "ground" else CELLS,
        ),
        extra=extra,
        ground_c=ground_c,
        void=void,
        held=_held(scene, one),
    )


def _with_extra(one: Surface, layers: list[WallLayer], films: Number) -> list[WallLayer]:
    """Layers that conduct so much more that a path beside them, film to film, is theirs too."""
    outside: Number = 0.0 if one.behind == "ground" else 1.0 / outside_conductance(one, films)
    whole = sum((layer.resistance for layer in layers), 0.0)
    if one.behind == "ground":
        less = 1.0 / (1.0 / whole + one.extra_w_per_k)
    else:
        inside = one.inside_film / (films * one.area)
        less = 1.0 / (1.0 / (inside + whole + outside) + one.extra_w_per_k) - inside - outside
    return [layer.replace(resistance=layer.resistance * less / whole) for layer in layers]


def _ground(
    scene: Scene, one: Surface, beneath: floor.Floor, layers: list[WallLayer], inside_film: Number
) -> tuple[Number, list[WallLayer]]:
    """The ground under a floor, outermost first: as much of the soil as resists like ISO 13370's ground.

    It ends at the temperature that drives the month's heat: the year's mean with the year's wave in it.
    """
    soil = load.row("soils", scene.project.faces["floor"].soil)
    conductivity, capacity = float(soil["conductivity"]), float(soil["heat_capacity"])
    resistance = 1.0 / beneath.ua - inside_film - sum((layer.resistance for layer in layers), 0.0)
    deep = np.maximum(resistance, 1e-6) * conductivity * one.area  # m
    shares = GROUND_GROWS ** np.arange(GROUND_LAYERS)[::-1]
    shares /= shares.sum()
    column = [
        WallLayer(resistance=share * deep / (conductivity * one.area), capacity=share * deep * one.area * capacity)
        for share in shares
    ]
    heat: FloatArray = beneath.heat_w[..., :1]
    ends_at = scene.room.temperature_c + (heat if heat.ndim > 1 else float(heat[0])) / beneath.ua
    return ends_at, column


def _held(scene: Scene, one: Surface) -> tuple[Number, Number] | None:
    if one.id != "floor" or not floor.heaters(scene) or not scene.project.box.powered:
        return None
    found = floor.floor(scene, one)
    return found.plane_c, found.above / one.area
