"""What the timeline is made of: the box as chains of cells, what drives it, what happens to it, what is kept of a run.

Shapes: the draws are the last axis, cells the first: (cell, wall, draw), (cell, lot, draw), (pack, draw), (draw,).
Every array's draw axis is either `draws` long or 1 (the same in every draw). Times are seconds from any zero the
caller likes, the same in everything it hands over. Temperatures °C, everything else SI.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence
from typing import Literal, Protocol

from coldbox.physics.number import FloatArray, Number
from coldbox.record import Record

Where = Literal["surface", "mean", "core", "air"]


# --- one part, as network.py describes it; `walls.stack`, `bodies.stack` and `packs.stack` lay parts side by side


class WallLayer(Record):
    """A layer of one wall with its area in it. Resistance 0 (a thin sheet) and capacity 0 (an air space) are fine."""

    resistance: Number  # K/W
    capacity: Number  # J/K


class WallPart(Record):
    """One surface of the envelope, a chain from its outside surface to the room air."""

    name: str
    layers: tuple[WallLayer, ...]  # outside first; of a floor on ground the ground comes first
    inside_film: Number  # K/W from the innermost layer's face to the room air
    radiating: Number  # m², emissivity x outside area that sees sky and ground; 0: the film holds the radiation
    cells: int  # at least this many


class CurvePart(Record):
    """Heat content against temperature of goods or packs; `chen` from composition, else two lines and a plateau."""

    chen: bool
    freezing_point_c: Number  # where the last ice goes; for `chen` the initial freezing point, below 0
    specific_heat_above: Number  # J/kgK
    specific_heat_below: Number  # J/kgK; for `chen` that of the frozen goods without what still freezes
    latent_heat: Number  # J/kg; for `chen` of all water that can freeze
    melts_over_k: Number  # width of the plateau below the freezing point; `chen` has none


class ConductivityPart(Record):
    """k = warm + linear (r - 1) + square (r - 1)², r the thawed share: t_f/t of `chen`, else of the latent heat."""

    warm: Number  # W/mK
    linear: Number
    square: Number


class LotPart(Record):
    """One body of goods; its pieces are alike, so everything goes by the kg. Mass 0 until it comes is fine."""

    name: str
    mass: Number  # kg at the start
    start_c: Number
    shape: Literal["slab", "cylinder", "sphere"]
    half_thickness: Number  # m, or radius
    density: Number  # kg/m³, at the start, kept
    film: Number  # W/m²K of film and wrap in series, on the piece's surface
    curve: CurvePart
    conductivity: ConductivityPart
    respiration_at_c: tuple[Number, ...]  # by rising temperature; empty: it does not live
    respiration_w_per_kg: tuple[Number, ...]


class PackPart(Record):
    """One kind of coolant, or the fittings: a lump at one temperature."""

    name: str
    mass: Number  # kg at the start; 0 until it comes
    start_c: Number
    frozen: Number  # share frozen at the start: rules where start_c lies within the melting range
    exchange: Number  # W/K from all of its mass to the room air
    whole_mass: Number  # kg that `exchange` belongs to, above 0
    curve: CurvePart
    sublimes: bool  # dry ice: -78.5 °C and -571 kJ/kg until it is spent


class DoorPart(Record):
    """One doorway; how far it is open is among the conditions."""

    name: str
    width: Number
    height: Number


# --- the box, stacked


class Walls(Record):
    """Walls of equally many cells; rows `first` to `first + count` of everything that has a wall axis."""

    labels: tuple[str, ...]
    first: int
    capacity: FloatArray  # (cell, wall, draw) J/K
    between: FloatArray  # (cell + 1, wall, draw) W/K: outside surface to first cell … last cell to the room air
    radiating: FloatArray  # (wall, draw) m²


class Curve(Record):
    """Curves of the same form side by side; the heat content counts from the freezing point. (row, draw) each."""

    chen: bool
    first: int  # rows first … first + count of the stack they belong to
    count: int
    freezing_point_c: FloatArray
    specific_heat_above: FloatArray
    specific_heat_below: FloatArray
    latent_heat: FloatArray
    melts_over_k: FloatArray


class Lots(Record):
    """All bodies of goods, side by side. Conductances are per kg of the whole lot."""

    labels: tuple[str, ...]
    order: tuple[int, ...]  # row of each part as it was handed in
    mass: FloatArray  # (lot, draw) kg at the start
    content: FloatArray  # (cell, lot, draw) J/kg at the start, from the freezing point
    share: FloatArray  # (cell, lot, draw) of the mass
    face: FloatArray  # (cell, lot, draw) m/kg: times conductivity is W/(kg K) to the next cell, last: to the surface
    film: FloatArray  # (lot, draw) W/(kg K)
    curves: tuple[Curve, ...]
    conductivity: FloatArray  # (3, lot, draw) coefficients of 1, r, r²
    living: tuple[int, ...]  # rows that live
    respiration: tuple[tuple[FloatArray, FloatArray], ...]  # of each living row: (point, draw) °C and W/kg


class Packs(Record):
    """All lumps side by side: packs that melt and the fittings first, what sublimes last."""

    labels: tuple[str, ...]
    order: tuple[int, ...]
    mass: FloatArray  # (pack, draw) kg at the start
    content: FloatArray  # (pack, draw) J/kg at the start; of what sublimes 0, the gas counts from there
    exchange: FloatArray  # (pack, draw) W/(kg K) of the whole mass
    whole_mass: FloatArray  # (pack, draw) kg
    curves: tuple[Curve, ...]
    melting: int  # how many of the rows melt; the rest sublime


class Doors(Record):
    """All doorways side by side."""

    labels: tuple[str, ...]
    width: FloatArray  # (door, draw) m
    height: FloatArray  # (door, draw) m


class Network(Record):
    """The box: what holds heat and what joins it."""

    draws: int
    walls: tuple[Walls, ...]
    lots: Lots
    packs: Packs
    doors: Doors
    volume: FloatArray  # (draw,) m³ of room air
    pressure: FloatArray  # (draw,) Pa
    start_c: FloatArray  # (draw,) room air at the start
    start_humidity_ratio: FloatArray  # (draw,) kg/kg


# --- what drives it


class Conditions(Record):
    """What surrounds the box during one step, means over it. Rows follow the network; draw axis 1 or all.

    Hand over the same object `film` while it does not change: that is how the engine knows.
    """

    outside_c: FloatArray  # (wall, draw) air or ground behind each wall
    film: FloatArray  # (wall, draw) W/K, outside air to outside surface; large for ground
    gain_w: FloatArray  # (wall, draw) W: absorbed sun and sky's and ground's long-wave; 0 where `radiating` is 0
    extra: FloatArray  # (path, draw) W/K straight from an outside air to the room air
    extra_c: FloatArray  # (path, draw)
    leak: FloatArray  # (leak, draw) kg dry air per s that comes in, as much going out
    leak_c: FloatArray  # (leak, draw)
    leak_humidity_ratio: FloatArray  # (leak, draw)
    door_share: FloatArray | None  # (door, draw) share of the fully open flow that passes; None: all shut
    door_c: FloatArray | None  # (door, draw) air behind
    door_humidity_ratio: FloatArray | None
    heat_w: FloatArray  # (draw,) people, lamps, sun through glass: to the room air
    moisture: FloatArray  # (draw,) kg/s given off as vapour at the room's temperature
    capacity_w: FloatArray | None  # (draw,) of the machine, all it can take out; inf: ideal; None: no power
    set_c: FloatArray | None  # (draw,) what it holds
    warms: bool = False  # whether it also warms a room that is too cold (normal days: the air is held)


class Drivers(Protocol):
    """Anything that tells the conditions of a step."""

    def during(self, start_s: float, end_s: float) -> Conditions:
        """Means from `start_s` to `end_s`; a step never spans a mark of the run."""


class Change(Record):
    """Goods or packs that come or go at an instant; `row` as handed in (Lots.order, Packs.order find the stack's)."""

    at_s: float
    what: Literal["lot in", "lot out", "pack in", "pack out"]
    row: int
    mass: Number  # kg that come; kg that go (never more than there is)
    temperature_c: Number = 0.0  # of what comes
    frozen: Number = 1.0  # of a pack that comes, within its melting range


# --- what is kept of a run


class Signal(Record):
    """One figure to look at: the air's temperature, a lot's, a pack's, …; `row` as handed in."""

    what: Literal["air", "lot", "pack", "pack mass", "pack frozen", "humidity ratio", "carbon dioxide"]
    where: Where = "mean"
    row: int = 0


class Watch(Record):
    """A limit on a signal: used up when the signal has been beyond it for `allowed_s` in sum."""

    signal: int  # index into the run's signals
    side: Literal["above", "below"]
    limit: Number
    allowed_s: float = 0.0


class State:
    """Everything that changes from step to step, as arrays that are written in place."""

    __slots__ = ("air_c", "carbon_dioxide", "frost", "gas", "humidity_ratio", "lot_content", "lot_mass",
                 "pack_content", "pack_mass", "surface_c", "wall_c")  # fmt: skip

    wall_c: list[FloatArray]  # of each group of walls (cell, wall, draw) °C
    surface_c: list[FloatArray]  # of each group (wall, draw), outside surfaces
    lot_content: FloatArray  # (cell, lot, draw) J/kg from the freezing point
    lot_mass: FloatArray  # (lot, draw) kg
    pack_content: FloatArray  # (pack, draw) J/kg from the freezing point
    pack_mass: FloatArray  # (pack, draw) kg
    air_c: FloatArray  # (draw,)
    humidity_ratio: FloatArray  # (draw,)
    frost: FloatArray  # (draw,) kg water settled since the start
    gas: FloatArray  # (draw,) kg of dry ice turned into gas since the start
    carbon_dioxide: FloatArray  # (draw,) kg in the room air

    def copy(self) -> State:
        """The same figures in arrays of their own."""
        made = State()
        for name in self.__slots__:
            kept = getattr(self, name)
            setattr(made, name, [array.copy() for array in kept] if isinstance(kept, list) else kept.copy())
        return made


class Trace(Record):
    """What a run leaves: when limits were used up, extremes, series, the books."""

    start_s: float
    end_s: float
    steps: int
    crossed_s: FloatArray  # (watch, draw) instant a limit is used up; inf: not within the run
    beyond_s: FloatArray  # (watch, draw) seconds beyond it in sum
    first: FloatArray  # (signal, draw) at the start
    last: FloatArray  # (signal, draw) at the end
    lowest: FloatArray  # (signal, draw)
    highest: FloatArray  # (signal, draw)
    lowest_at_s: FloatArray  # (signal, draw)
    highest_at_s: FloatArray  # (signal, draw)
    spent_s: FloatArray  # (pack, draw), rows as handed in: all melted or sublimed; inf: not
    times_s: FloatArray  # (time,) instants asked for
    series: FloatArray  # (time, signal, draw)
    heat_in: FloatArray  # (draw,) J net through every boundary, with sources, machine and what came and went
    stored: FloatArray  # (draw,) J more in walls, goods, packs, air
    moved: FloatArray  # (draw,) J sum of all those flows without sign
    machine_j: FloatArray  # (draw,) J taken out by the machine
    heat_balance_error: float  # |in - stored| / moved, the worst draw
    notes: tuple[str, ...]  # what was held at the edge of its validity: "respiration of NAME above 35 °C"
    state: State  # at the end: a further run can start from it


class Plan(Record):
    """What a run is asked: from when to when, what happens, what to look at, and how fine to step."""

    start_s: float
    end_s: float
    marks: Sequence[float] = ()  # instants at which a driver jumps: door, power, moved; steps restart short there
    changes: Sequence[Change] = ()
    signals: Sequence[Signal] = ()
    watches: Sequence[Watch] = ()
    times_s: Sequence[float] = ()  # instants of the series
    step_s: float = 600.0  # the longest step; whole hours counted from zero are always landed on
    go_on: Callable[[float], bool] | None = None  # told the share done, now and then; False ends in errors.Stopped
