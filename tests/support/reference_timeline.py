"""An independent timeline: the same physics as `coldbox.timeline`, written apart from it and solved by scipy.

Nothing here comes from the program. Space is cut differently (nodes that sit on every surface and joint, crowded to a
body's surface; the engine has cells between them), radiation is taken at the surface of the moment, and time is
scipy's: an implicit method of high order that chooses its own steps, with limits found as events. What is stated is a
plain box: walls with layers, areas and films, bodies with a shape and a curve, packs, doors, leaks, air with its water.

The figures of moist air, dry ice and doorways are typed from their sources again: ASHRAE Fundamentals, Psychrometrics
(eq. 5, 6, 26, 30), Gosney and Olama 1975, Chen 1985.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Sequence
from dataclasses import dataclass, field

import numpy as np
from scipy.integrate import solve_ivp
from scipy.sparse import lil_matrix

Drive = Callable[[float], float]
STEFAN = 5.670374419e-8
KELVIN = 273.15
UNIT = 4000.0  # J/kg per unit of state, so that heat contents count about like kelvins


def steady(value: float) -> Drive:
    """Something that does not change."""
    return lambda _: value


# --- what a box is


@dataclass(frozen=True)
class Layer:
    """One layer of a wall, m, W/mK, kg/m³, J/kgK; `area` is the m² heat passes in it."""

    thickness: float
    conductivity: float
    density: float
    specific_heat: float
    area: float

    @property
    def resistance(self) -> float:
        return self.thickness / (self.conductivity * self.area)

    @property
    def capacity(self) -> float:
        return self.thickness * self.density * self.specific_heat * self.area


@dataclass(frozen=True)
class Wall:
    """Layers outside first. `sun` is what it absorbs, W/m²; sky and ground are looked at with `emissivity`."""

    layers: tuple[Layer, ...]
    outside_c: Drive
    outside_area: float
    inside_area: float
    outside_h: float = 20.0
    inside_h: float = 8.0
    sun: Drive = field(default=steady(0.0))
    emissivity: float = 0.0
    sky_c: Drive = field(default=steady(0.0))
    ground_c: Drive = field(default=steady(0.0))
    sky_share: float = 1.0


@dataclass(frozen=True)
class Curve:
    """Heat content from the freezing point, J/kg: Chen's (latent = 333 600 × freezable water) or plateau and lines."""

    point: float
    above: float
    below: float = 2000.0
    latent: float = 0.0
    width: float = 0.1
    chen: bool = False

    def content(self, celsius: float) -> float:
        if celsius >= self.point:
            return self.above * (celsius - self.point)
        if self.chen:
            return self.below * (celsius - self.point) + self.latent * (self.point / celsius - 1.0)
        melted = max((celsius - self.point) / self.width, -1.0)
        return self.below * (celsius - self.point) + self.latent * melted

    def celsius_and_thawed(self, content: np.ndarray) -> tuple[np.ndarray, np.ndarray]:
        """Temperature and thawed share of heat contents."""
        if self.chen:
            frozen = np.minimum(content, 0.0)
            half = frozen + self.below * self.point + self.latent
            cold = (half - np.sqrt(half * half - 4.0 * self.below * self.latent * self.point)) / (2.0 * self.below)
            return np.where(content > 0.0, self.point + content / self.above, cold), np.minimum(self.point / cold, 1.0)
        whole = self.latent + self.below * self.width
        melting = np.clip(content, -whole, 0.0)
        celsius = self.point + np.maximum(content, 0.0) / self.above + np.minimum(content + whole, 0.0) / self.below
        return celsius + melting / whole * self.width, 1.0 + melting / whole


def chen(water: float, protein: float, point: float) -> Curve:
    """Chen's enthalpy of a food from its composition: 1.55 + 1.26 x_s frozen, 4.19 - 2.30 x_s - 0.628 x_s³ thawed."""
    solids = 1.0 - water
    return Curve(
        point=point,
        above=1000.0 * (4.19 - 2.30 * solids - 0.628 * solids**3),
        below=1000.0 * (1.55 + 1.26 * solids),
        latent=333_600.0 * (water - 0.4 * protein),
        chen=True,
    )


@dataclass(frozen=True)
class Body:
    """Goods: alike pieces. k = warm + linear (r - 1) + square (r - 1)² of the thawed share r."""

    mass: float
    start_c: float
    shape: str
    half_thickness: float
    density: float
    film: float
    curve: Curve
    conductivity: tuple[float, float, float]
    respiration: tuple[tuple[float, float], ...] = ()  # (°C, W/kg)


@dataclass(frozen=True)
class Pack:
    """A lump: `exchange` W/K to the air. `sublimes`: dry ice, whose exchange is that of `mass`."""

    mass: float
    start_c: float
    exchange: float
    curve: Curve = field(default=Curve(point=0.0, above=4186.0, below=2100.0, latent=333_430.0))
    frozen: float = 1.0
    sublimes: bool = False


@dataclass(frozen=True)
class Door:
    width: float
    height: float
    share: Drive  # of the fully open flow
    outside_c: Drive
    humidity_ratio: Drive


@dataclass(frozen=True)
class Leak:
    dry_kg_per_s: float
    outside_c: Drive
    humidity_ratio: Drive


@dataclass(frozen=True)
class Move:
    """At an instant, goods go (kg, off a body) or come into an empty place at a temperature."""

    at_s: float
    body: int
    mass: float
    comes_at_c: float | None = None


@dataclass(frozen=True)
class Box:
    volume: float
    start_c: float
    humidity_ratio: float
    walls: tuple[Wall, ...] = ()
    wall_start_c: tuple[float | None, ...] = ()  # None or missing: steady under the conditions of the start
    bodies: tuple[Body, ...] = ()
    packs: tuple[Pack, ...] = ()
    doors: tuple[Door, ...] = ()
    leaks: tuple[Leak, ...] = ()
    pressure: float = 101_325.0
    heat: Drive = field(default=steady(0.0))
    moisture: Drive = field(default=steady(0.0))
    machine: Callable[[float], tuple[float, float] | None] = field(default=lambda _: None)  # W it can, °C it holds
    marks: tuple[float, ...] = ()  # instants at which a drive jumps
    moves: tuple[Move, ...] = ()


@dataclass(frozen=True)
class Limit:
    """When `signal` first lies beyond `celsius`; signals are tuples as `_Nodes.signal` reads them."""

    signal: tuple
    celsius: float
    above: bool = True


@dataclass(frozen=True)
class Run:
    times_s: np.ndarray
    series: dict[tuple, np.ndarray]  # of every signal asked for
    crossed_s: tuple[float, ...]  # of each limit; inf: not
    heat_in: float  # J net through every boundary, machine and moves included
    stored: float  # J
    evaluations: int


# --- moist air and doorways


def saturation_pressure(celsius: float) -> float:
    """Pa, over ice below 0 °C; an iteration that has gone astray is held at what air can be."""
    celsius = min(max(celsius, -150.0), 90.0)
    kelvin = celsius + KELVIN
    if celsius < 0.0:
        log = (
            -5.6745359e3 / kelvin + 6.3925247 - 9.677843e-3 * kelvin + 6.2215701e-7 * kelvin**2
            + 2.0747825e-9 * kelvin**3 - 9.484024e-13 * kelvin**4 + 4.1635019 * math.log(kelvin)
        )  # fmt: skip
    else:
        log = (
            -5.8002206e3 / kelvin + 1.3914993 - 4.8640239e-2 * kelvin + 4.1764768e-5 * kelvin**2
            - 1.4452093e-8 * kelvin**3 + 6.5459673 * math.log(kelvin)
        )  # fmt: skip
    return math.exp(log)


def saturated(celsius: float, pressure: float = 101_325.0) -> float:
    """kg of water per kg of dry air."""
    vapour = saturation_pressure(celsius)
    return 0.621945 * vapour / (pressure - vapour)


def moist_volume(celsius: float, ratio: float, pressure: float = 101_325.0) -> float:
    """m³ per kg of dry air."""
    return 287.042 * (celsius + KELVIN) * (1.0 + ratio / 0.621945) / pressure


def moist_enthalpy(celsius: float, ratio: float) -> float:
    """J per kg of dry air."""
    return 1006.0 * celsius + ratio * (2_501_000.0 + 1860.0 * celsius)


def dry_flow(door: Door, inside: tuple[float, float], outside: tuple[float, float], pressure: float) -> float:
    """kg dry air per s each way through a fully open door."""
    volumes = [moist_volume(*air, pressure) for air in (inside, outside)]
    weights = [(1.0 + air[1]) / volume for air, volume in zip((inside, outside), volumes, strict=True)]
    heavy, light = max(weights), min(weights)
    form = (2.0 / (1.0 + (heavy / light) ** (1.0 / 3.0))) ** 1.5
    flow = 0.221 * door.width * door.height * math.sqrt((1.0 - light / heavy) * 9.80665 * door.height) * form
    return flow / volumes[weights.index(heavy)]


# --- nodes


def wall_nodes(wall: Wall, per_layer: int) -> tuple[list[float], list[float]]:
    """Heat capacities of nodes, J/K, the outside surface first, and conductances between them, W/K."""
    capacities, conductances = [0.0], []
    for layer in wall.layers:
        if layer.resistance * wall.inside_area < 1e-5:  # a sheet: lies on its joint
            capacities[-1] += layer.capacity
            continue
        cut = per_layer if layer.capacity else 1
        for _ in range(cut):
            capacities[-1] += 0.5 * layer.capacity / cut
            capacities.append(0.5 * layer.capacity / cut)
            conductances.append(cut / layer.resistance)
    # A joint that nothing heavy touches gets the skin of a film of air.
    return [max(value, 10.0 * wall.inside_area) for value in capacities], conductances


def radii(count: int) -> np.ndarray:
    """Where the nodes of a body are, as shares of its radius."""
    return 1.0 - (1.0 - np.linspace(0.0, 1.0, count)) ** 1.5


def body_nodes(body: Body, count: int) -> tuple[np.ndarray, np.ndarray, float]:
    """Mass shares of nodes from core to surface, conductances between them per kg and W/mK, the film's W/(kg K)."""
    power = {"slab": 1, "cylinder": 2, "sphere": 3}[body.shape]
    radius = radii(count)
    faces = 0.5 * (radius[1:] + radius[:-1])
    share = np.diff(np.concatenate(([0.0], faces**power, [1.0])))
    per_kg = power * faces ** (power - 1) / np.diff(radius) / (body.density * body.half_thickness**2)
    return share, per_kg, power * body.film / (body.density * body.half_thickness)


class _Nodes:
    """Everything of a box laid in one vector: wall nodes, body nodes, packs, dry ice, then air, water, books."""

    def __init__(self, box: Box, per_layer: int, per_body: int) -> None:
        self.box = box
        self.rows: list[slice] = []
        capacity: list[float] = []
        joint: list[float] = []
        for wall in box.walls:
            own, between = wall_nodes(wall, per_layer)
            self.rows.append(slice(len(capacity), len(capacity) + len(own)))
            capacity += own
            joint += [*between, 0.0]
        self.walled = len(capacity)
        self.capacity, self.joint = np.array(capacity), np.array(joint[:-1])
        self.first = np.array([rows.start for rows in self.rows], dtype=int)
        self.last = np.array([rows.stop - 1 for rows in self.rows], dtype=int)
        self.inner = np.array([wall.inside_h * wall.inside_area for wall in box.walls])
        self.body_rows = [
            slice(self.walled + i * per_body, self.walled + (i + 1) * per_body) for i in range(len(box.bodies))
        ]
        self.bodies = [body_nodes(body, per_body) for body in box.bodies]
        first = self.walled + len(box.bodies) * per_body
        self.pack = range(first, first + len(box.packs))
        self.air = first + len(box.packs)
        self.water, self.carbon, self.books = self.air + 1, self.air + 2, self.air + 3
        self.size = self.books + 1
        self.mass = np.array([body.mass for body in box.bodies])
        self.dry = box.volume / moist_volume(box.start_c, box.humidity_ratio, box.pressure)
        self.alive = [
            (np.array([at for at, _ in body.respiration]), np.log([w for _, w in body.respiration]))
            for body in box.bodies
        ]

    def start(self) -> np.ndarray:
        box, state = self.box, np.zeros(self.size)
        for i, (wall, rows) in enumerate(zip(box.walls, self.rows, strict=True)):
            given = box.wall_start_c[i] if i < len(box.wall_start_c) else None
            state[rows] = self._settled(wall, rows, i) if given is None else given
        for body, rows in zip(box.bodies, self.body_rows, strict=True):
            state[rows] = body.curve.content(body.start_c) / UNIT
        for row, pack in zip(self.pack, box.packs, strict=True):
            curve = pack.curve
            within = curve.point - curve.width <= pack.start_c <= curve.point
            content = (
                -(curve.latent + curve.below * curve.width) * pack.frozen if within else curve.content(pack.start_c)
            )
            state[row] = pack.mass if pack.sublimes else content / UNIT
        state[self.air], state[self.water] = box.start_c, box.humidity_ratio * 1000.0
        return state

    def _settled(self, wall: Wall, rows: slice, i: int) -> np.ndarray:
        """Steady between the surroundings and the air of the start."""
        total = float(np.sum(1.0 / self.joint[rows.start : rows.stop - 1])) + 1.0 / self.inner[i]
        low, high = -150.0, 200.0
        for _ in range(200):
            surface = 0.5 * (low + high)
            passes = (surface - self.box.start_c) / total
            low, high = (surface, high) if self.gain(wall, surface, 0.0) > passes else (low, surface)
        drop = np.concatenate(([0.0], np.cumsum(1.0 / self.joint[rows.start : rows.stop - 1])))
        return surface - (surface - self.box.start_c) / total * drop

    @staticmethod
    def gain(wall: Wall, surface: float, t: float) -> float:
        """W an outside surface takes up."""
        flux = wall.outside_h * (wall.outside_c(t) - surface) + wall.sun(t)
        if wall.emissivity:
            sky, ground = (wall.sky_c(t) + KELVIN) ** 4, (wall.ground_c(t) + KELVIN) ** 4
            seen = wall.sky_share * sky + (1.0 - wall.sky_share) * ground
            flux += wall.emissivity * STEFAN * (seen - (surface + KELVIN) ** 4)
        return flux * wall.outside_area

    def slope(self, t: float, state: np.ndarray) -> np.ndarray:
        box, out = self.box, np.zeros(self.size)
        air, ratio = float(state[self.air]), max(float(state[self.water]) / 1000.0, 0.0)
        to_air, film, coldest, books = 0.0, 0.0, math.inf, 0.0  # W, W/K, °C, W
        if box.walls:
            celsius = state[: self.walled]
            between = self.joint * (celsius[:-1] - celsius[1:])
            flow = np.zeros(self.walled)
            flow[1:] += between
            flow[:-1] -= between
            enters = self.inner * (celsius[self.last] - air)
            flow[self.last] -= enters
            for wall, row in zip(box.walls, self.first, strict=True):
                gain = self.gain(wall, float(celsius[row]), t)
                flow[row] += gain
                books += gain
            out[: self.walled] = flow / self.capacity
            to_air += float(enters.sum())
            film += float(self.inner.sum())
            coldest = float(celsius[self.last].min())
        for i, (body, rows) in enumerate(zip(box.bodies, self.body_rows, strict=True)):
            if not self.mass[i]:
                continue
            share, per_kg, surface = self.bodies[i]
            celsius, thawed = body.curve.celsius_and_thawed(state[rows] * UNIT)
            warm, linear, square = body.conductivity
            k = warm + (thawed - 1.0) * (linear + square * (thawed - 1.0))
            between = per_kg * 0.5 * (k[1:] + k[:-1]) * (celsius[:-1] - celsius[1:])
            flow = np.zeros(len(celsius))
            flow[1:] += between
            flow[:-1] -= between
            given = surface * (celsius[-1] - air)
            flow[-1] -= given
            if body.respiration:
                heat = self.respiration(i, celsius) * share
                flow += heat
                books += self.mass[i] * float(heat.sum())
            out[rows] = flow / (share * UNIT)
            to_air += self.mass[i] * given
            film += self.mass[i] * surface
            coldest = min(coldest, float(celsius[-1]))
        gas = 0.0
        for row, pack in zip(self.pack, box.packs, strict=True):
            if not pack.sublimes:
                celsius = float(pack.curve.celsius_and_thawed(state[row : row + 1] * UNIT)[0][0])
                out[row] = pack.exchange * (air - celsius) / (pack.mass * UNIT)
                to_air += pack.exchange * (celsius - air)
                film += pack.exchange
                coldest = min(coldest, celsius)
                continue
            left = max(float(state[row]), 0.0)
            exchange = pack.exchange * (left / pack.mass) ** (2.0 / 3.0)
            spends = exchange * (air + 78.5) / 571_000.0
            out[row] = -spends
            gas += spends
            # The ice takes its heat from the air; its gas warms to the room and leaves with what it took.
            to_air -= exchange * (air + 78.5) + spends * 800.0 * (air + 78.5)
            books -= spends * 800.0 * (air + 78.5)
            film += exchange
            if left > 1e-9 * pack.mass:
                coldest = min(coldest, -78.5)
        heat, water, dry = self._exchanged(t, air, ratio, gas)
        whole = box.volume * box.pressure / 188.92 / (air + KELVIN)
        out[self.carbon] = gas - float(state[self.carbon]) * (dry / self.dry + gas / whole)
        machine = box.machine(t)
        if machine is not None:
            capacity, held = machine
            heat -= capacity * min(max((air - held) / 0.001, 0.0), 1.0)
        vapour = 2_501_000.0 + 1860.0 * air
        given = box.moisture(t)
        heat, water = heat + box.heat(t) + given * vapour, water + given
        books += heat
        coldest = min(coldest, air)
        held_ratio = saturated(coldest, box.pressure)
        if machine is not None:  # one that runs keeps the air as dry as it was
            held_ratio = min(held_ratio, box.humidity_ratio)
        settles = film / 1006.0 * max(ratio - held_ratio, 0.0)
        leaves = settles * (-333_430.0 + 2100.0 * coldest if coldest < 0.0 else 4186.0 * coldest)
        heat, water, books = heat - leaves, water - settles, books - leaves
        wetter = water / self.dry
        out[self.air] = ((to_air + heat) / self.dry - wetter * vapour) / (1006.0 + 1860.0 * ratio)
        out[self.water] = wetter * 1000.0
        out[self.books] = books * 1e-6
        return out

    def _exchanged(self, t: float, air: float, ratio: float, gas: float) -> tuple[float, float, float]:
        """W and kg/s that leaks and doors bring, and their dry air; gas keeps out leaks by its volume."""
        heat = water = total = 0.0
        box, own = self.box, moist_enthalpy(air, ratio)
        whole = sum(leak.dry_kg_per_s for leak in box.leaks)
        kept_out = gas * 188.92 / 287.042 / (1.0 + ratio / 0.621945)
        passes = max(1.0 - kept_out / whole, 0.0) if whole else 0.0
        flows = [(leak, leak.dry_kg_per_s * passes) for leak in box.leaks]
        for door in box.doors:
            share = door.share(t)
            if share:
                beyond = (door.outside_c(t), door.humidity_ratio(t))
                flows.append((door, share * dry_flow(door, (air, ratio), beyond, box.pressure)))
        for way, dry in flows:
            celsius, brought = way.outside_c(t), way.humidity_ratio(t)
            heat += dry * (moist_enthalpy(celsius, brought) - own)
            water += dry * (brought - ratio)
            total += dry
        return heat, water, total

    def respiration(self, i: int, celsius: np.ndarray) -> np.ndarray:
        """W/kg, ln w in straight lines between points and on beyond them; none where it is frozen."""
        at, logs = self.alive[i]
        line = np.interp(celsius, at, logs)
        line = np.where(celsius < at[0], logs[0] + (logs[1] - logs[0]) / (at[1] - at[0]) * (celsius - at[0]), line)
        line = np.where(
            celsius > at[-1], logs[-1] + (logs[-1] - logs[-2]) / (at[-1] - at[-2]) * (celsius - at[-1]), line
        )
        curve = self.box.bodies[i].curve
        return np.where((celsius < curve.point) & (curve.latent > 0.0), 0.0, np.exp(line))

    def joined(self) -> lil_matrix:
        """Which slope depends on which state."""
        pattern = lil_matrix((self.size, self.size), dtype=bool)
        for offset in (-1, 0, 1):
            for row in range(max(-offset, 0), self.air + min(-offset, 0) if offset > 0 else self.air):
                pattern[row, row + offset] = True
        ends = [*self.last, *(rows.stop - 1 for rows in self.body_rows), *self.pack]
        for row in (self.air, self.water, self.carbon, self.books):
            pattern[row, [*ends, self.air, self.water]] = True
        pattern[self.carbon, self.carbon] = True
        pattern[self.books, self.first] = True
        for i, body in enumerate(self.box.bodies):
            if body.respiration:
                pattern[self.books, self.body_rows[i]] = True
        for row in ends:
            pattern[row, self.air] = True
        return pattern

    def signal(self, what: tuple, state: np.ndarray) -> float | np.ndarray:
        """One figure of a state, or the temperatures of all nodes of a body."""
        kind, *index = what
        if kind == "air":
            return float(state[self.air])
        if kind == "humidity ratio":
            return float(state[self.water]) / 1000.0
        if kind == "pack mass":
            return float(state[self.pack[index[0]]])
        if kind == "wall":
            return float(state[self.last[index[0]]])
        if kind == "carbon dioxide":
            whole = self.box.volume * self.box.pressure / 188.92 / (state[self.air] + KELVIN)
            return float(state[self.carbon] / whole)
        curve = (self.box.packs if kind.startswith("pack") else self.box.bodies)[index[0]].curve
        if kind.startswith("pack"):
            celsius, thawed = curve.celsius_and_thawed(state[self.pack[index[0]]] * np.full(1, UNIT))
            return float(celsius[0] if kind == "pack" else 1.0 - thawed[0])
        celsius, _ = curve.celsius_and_thawed(state[self.body_rows[index[0]]] * UNIT)
        if kind == "nodes":
            return celsius
        if kind == "mean":
            return float(np.dot(self.bodies[index[0]][0], celsius))
        return float(celsius[0 if kind == "core" else -1])

    def stored(self, state: np.ndarray) -> float:
        """J in everything, from states of zero."""
        total = float(np.dot(self.capacity, state[: self.walled])) if self.walled else 0.0
        for i, rows in enumerate(self.body_rows):
            total += self.mass[i] * float(np.dot(self.bodies[i][0], state[rows])) * UNIT
        for row, pack in zip(self.pack, self.box.packs, strict=True):
            total += -571_000.0 * float(state[row]) if pack.sublimes else pack.mass * float(state[row]) * UNIT
        return total + self.dry * moist_enthalpy(float(state[self.air]), float(state[self.water]) / 1000.0)


def run(
    box: Box,
    hours: float,
    limits: Sequence[Limit] = (),
    signals: Sequence[tuple] = (("air",),),
    *,
    per_layer: int = 24,
    per_body: int = 60,
    rtol: float = 1e-7,
    method: str = "BDF",
    every_s: float = 3600.0,
) -> Run:
    """Follows a box from time 0 through `hours`; its signals at every `every_s`."""
    nodes = _Nodes(box, per_layer, per_body)
    state, end = nodes.start(), hours * 3600.0
    before = nodes.stored(state)
    times = np.unique(np.append(np.arange(0.0, end, every_s), end))
    cuts = sorted({0.0, end, *(mark for mark in (*box.marks, *(move.at_s for move in box.moves)) if 0.0 < mark < end)})
    found: dict[tuple, list[float]] = {what: [nodes.signal(what, state)] for what in signals}
    evaluations, moved = 0, 0.0
    watch = [_event(nodes, limit) for limit in limits]
    crossed = [0.0 if event(0.0, state) * event.direction > 0.0 else math.inf for event in watch]
    for start, stop in zip(cuts[:-1], cuts[1:], strict=True):
        for move in box.moves:
            if move.at_s == start:
                moved += _move(nodes, move, state)
        options = {"jac_sparsity": nodes.joined()} if method in ("BDF", "Radau") else {}
        wanted = times[(times > start) & (times <= stop)]
        done = solve_ivp(
            # A drive that jumps at `stop` must not be seen beyond it.
            lambda t, y, stop=stop: nodes.slope(min(t, stop * (1.0 - 1e-12)), y), (start, stop), state, method=method,
            t_eval=np.unique(np.append(wanted, stop)), rtol=rtol, atol=rtol * 10.0, events=watch, first_step=1e-2,
            **options,
        )  # fmt: skip
        if not done.success:
            raise RuntimeError(done.message)
        evaluations += done.nfev
        for i, instants in enumerate(done.t_events or ()):
            crossed[i] = min(crossed[i], *instants) if len(instants) else crossed[i]
        for at, there in zip(done.t, done.y.T, strict=True):
            if at in wanted:
                for what in signals:
                    found[what].append(nodes.signal(what, there))
        state = done.y[:, -1].copy()
    return Run(
        times_s=times,
        series={what: np.array(values) for what, values in found.items()},
        crossed_s=tuple(crossed),
        heat_in=float(state[nodes.books]) * 1e6 + moved,
        stored=nodes.stored(state) - before,
        evaluations=evaluations,
    )


def _event(nodes: _Nodes, limit: Limit) -> Callable[[float, np.ndarray], float]:
    def beyond(_: float, state: np.ndarray) -> float:
        return nodes.signal(limit.signal, state) - limit.celsius

    beyond.direction = 1.0 if limit.above else -1.0  # type: ignore[attr-defined]
    return beyond


def _move(nodes: _Nodes, move: Move, state: np.ndarray) -> float:
    """Goods go, or come into a place that is empty; the heat they bring, J."""
    rows, body = nodes.body_rows[move.body], nodes.box.bodies[move.body]
    if move.comes_at_c is None:
        nodes.mass[move.body] -= move.mass
        return -move.mass * float(np.dot(nodes.bodies[move.body][0], state[rows])) * UNIT
    content = body.curve.content(move.comes_at_c)
    if nodes.mass[move.body]:
        raise ValueError("goods come only into an empty place")
    state[rows] = content / UNIT
    nodes.mass[move.body] = move.mass
    return move.mass * content
