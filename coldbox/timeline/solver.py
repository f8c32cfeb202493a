"""The engine: one step of everything, and the run over all steps of a plan.

Conductances and door flows of a step are those of its start, temperatures in the flows those of its end. Walls are
swept from outside and goods from the core until each is a line in the air's temperature; the air is solved; the sweeps
go back. Where something melted on the way, goods and air are solved again from where they came to. Heat contents change
by exactly what flowed.
"""

from __future__ import annotations

from typing import Final

import numpy as np

from coldbox.errors import Stopped
from coldbox.physics.number import FloatArray, Number
from coldbox.timeline import curves, walls
from coldbox.timeline.air import Balance, Joined, RoomAir
from coldbox.timeline.bodies import Bodies
from coldbox.timeline.packs import SUBLIMATION, SUBLIMES_C, DryIce, Lumps
from coldbox.timeline.steps import TOUCHING_S, Pace
from coldbox.timeline.trace import Eyes, Record, paced
from coldbox.timeline.types import Change, Conditions, Curve, Drivers, Network, Plan, State, Trace
from coldbox.timeline.walls import Chains

ROUNDS: Final = 12  # of a step; what is left over then is in the next step's flows
ASK_EVERY: Final = 8  # steps between two looks at whether to go on


def start(network: Network, now: Conditions) -> State:
    """The state of the start: walls steady under lasting conditions, everything else as the network has it."""
    draws = network.draws
    made = State()
    made.air_c = np.array(np.broadcast_to(network.start_c, (draws,)))
    made.humidity_ratio = np.array(np.broadcast_to(network.start_humidity_ratio, (draws,)))
    made.wall_c, made.surface_c = [], []
    for group in network.walls:
        shape = (*group.capacity.shape[:2], draws)
        made.wall_c.append(np.empty(shape))
        made.surface_c.append(np.empty(shape[1:]))
        walls.steady(group, now, made.air_c, made.wall_c[-1], made.surface_c[-1])
    made.lot_content, made.lot_mass = network.lots.content.copy(), network.lots.mass.copy()
    made.pack_content, made.pack_mass = network.packs.content.copy(), network.packs.mass.copy()
    made.frost, made.gas, made.carbon_dioxide = (np.zeros(draws) for _ in range(3))
    return made


def run(network: Network, drivers: Drivers, plan: Plan, state: State | None = None) -> Trace:
    """Everything from the start of a plan to its end.

    network: the box. drivers: what surrounds it at each step. plan: what happens and what to look at. state: where an
    earlier run ended (left as it is), or None: as `start` makes it under the conditions of the first step.
    Raises Stopped when the plan's `go_on` says so, OutOfValidity where a method leaves its range.
    """
    pace = Pace(plan, [plan.signals[i] for i in paced(plan)])
    if state is None:
        state = start(network, drivers.during(plan.start_s, pace.next() or plan.start_s + plan.step_s))
    return _Run(network, drivers, plan, state.copy()).all(pace)


class _Run:
    """One run: the parts at work, the state, the books."""

    def __init__(self, network: Network, drivers: Drivers, plan: Plan, state: State) -> None:
        draws = network.draws
        self.network, self.drivers, self.plan, self.state = network, drivers, plan, state
        self.walls = [Chains(group, draws) for group in network.walls]
        self.bodies, self.lumps, self.dry_ice = (
            Bodies(network.lots, draws),
            Lumps(network.packs, draws),
            DryIce(network.packs),
        )
        self.air = RoomAir(network)
        self.eyes = Eyes(network, tuple(plan.signals), self.bodies, self.lumps, self.air)
        self.record = Record(network, plan)
        self.heat_in, self.moved, self.machine_j = np.zeros(draws), np.zeros(draws), np.zeros(draws)
        self.rounds = 0
        self._all_there = False

    def all(self, pace: Pace) -> Trace:
        plan, state, record = self.plan, self.state, self.record
        waiting = sorted(plan.changes, key=lambda change: change.at_s)
        stored = self._stored()
        now, count = plan.start_s, 0
        waiting = self._changes(waiting, now)
        first = record.now.copy()
        record.sample(now)
        pace.begin(record.paced())
        while (instant := pace.next()) is not None:
            if plan.go_on is not None and count % ASK_EVERY == 0 and not plan.go_on(pace.share):
                raise Stopped
            content, mass = state.pack_content.copy(), state.pack_mass.copy()
            self._step(self.drivers.during(now, instant), instant - now)
            self.bodies.meet(state.air_c)
            record.step(now, instant, self.eyes.look(state))
            record.packs(now, instant, content, mass, state)
            now, count = instant, count + 1
            record.sample(now)
            pace.took(now, record.paced())
            if waiting and waiting[0].at_s <= now + TOUCHING_S:
                waiting = self._changes(waiting, now)
                pace.begin(record.paced())
        return self._trace(count, first, self._stored() - stored)

    def _look(self) -> None:
        self.bodies.look(self.state.lot_content, self.state.air_c)
        self.lumps.look(self.state.pack_content[: self.lumps.count])

    def _step(self, now: Conditions, step_s: float) -> None:
        """One step of everything, in rounds until goods and packs end where their slopes have them."""
        state, bodies, lumps = self.state, self.bodies, self.lumps
        air_c = state.air_c
        joined = Joined(self.network.draws)
        for group, wall_c, surface_c in zip(self.walls, state.wall_c, state.surface_c, strict=True):
            constant, share = group.inward(now, step_s, wall_c, surface_c)
            joined.chain(group.inner, constant, share, air_c)
            joined.colder(wall_c[-1])
        gas, conductance = self._ice(joined, air_c, step_s)
        self._settling(joined)
        balance = self.air.comes(now, state, joined, gas, step_s)
        rise, machine = self._goods(now, balance, joined, step_s)

        flows = self.air.settle(now, state, balance, rise, gas, step_s)
        for group, wall_c, surface_c in zip(self.walls, state.wall_c, state.surface_c, strict=True):
            flows.append(group.outward(state.air_c, wall_c, surface_c).sum(axis=0))
        for row, heat in zip(self.network.lots.living, bodies.respired, strict=True):
            flows.append(state.lot_mass[row] * heat)
        if conductance is not None:
            gone = conductance * (state.air_c - SUBLIMES_C) * (step_s / SUBLIMATION)
            state.pack_mass[lumps.count :] -= gone
            state.gas += gone.sum(axis=0)
        if machine is not None:
            flows.append(-machine)
            self.machine_j += machine * step_s
        for flow in flows:
            self.heat_in += flow * step_s
            self.moved += np.abs(flow) * step_s

    def _settling(self, joined: Joined) -> None:
        """Adds goods and packs as surfaces on which water may settle."""
        state, bodies, lumps = self.state, self.bodies, self.lumps
        pack_mass = state.pack_mass[: lumps.count]
        joined.films += (state.lot_mass * self.network.lots.film).sum(axis=0) + (pack_mass * lumps.exchange).sum(axis=0)
        joined.colder(self._there(bodies.surface_c, state.lot_mass))
        joined.colder(self._there(lumps.temperature[0], pack_mass))

    def _goods(
        self, now: Conditions, balance: Balance, joined: Joined, step_s: float
    ) -> tuple[FloatArray, FloatArray | None]:
        """Goods and packs with the air that they end with: writes their heat contents, gives the air's rise."""
        state, bodies, lumps, air_c = self.state, self.bodies, self.lumps, self.state.air_c
        pack_mass, packed = state.pack_mass[: lumps.count], state.pack_content[: lumps.count]
        bodies.begin(state.lot_content)
        lumps.begin(packed)
        rise = np.zeros_like(air_c)
        machine: FloatArray | None = None
        moving = np.ones(air_c.shape, dtype=bool)
        respired = bodies.respired
        for _ in range(ROUNDS):
            with_goods = joined.copy()
            if bodies.shape[1]:
                u, v = bodies.outward(state.lot_content, air_c, step_s)
                respired = np.where(moving, bodies.respired, respired)  # a draw that is held keeps what it took
                with_goods.rising(state.lot_mass * bodies.conductance, bodies.temperature[-1], u, v, air_c)
            if lumps.count:
                u, v = lumps.outward(packed, air_c, step_s)
                with_goods.rising(pack_mass * lumps.exchange, lumps.temperature[0], u, v, air_c)
            found, taken = self.air.rise(now, state, balance, with_goods)
            np.copyto(rise, found, where=moving)
            if taken is not None:
                machine = taken if machine is None else np.where(moving, taken, machine)
            held = lumps.inward(rise, moving, packed) & bodies.inward(rise, moving, state.lot_content)
            self.rounds += 1
            moving &= ~held
            if not moving.any():
                break
        bodies.respired = respired
        return rise, machine

    def _ice(
        self, joined: Joined, air_c: FloatArray, step_s: float
    ) -> tuple[FloatArray | None, FloatArray | None]:  # fmt: skip
        """Gas off dry ice by the air of now, kg/s, and its conductances; both None where there is no dry ice."""
        if not self.dry_ice.any:
            return None, None
        mass = self.state.pack_mass[self.dry_ice.rows]
        conductance = self.dry_ice.outward(mass, air_c, step_s)
        nothing = np.zeros((1, 1))
        joined.rising(conductance, np.full((1, 1), SUBLIMES_C), nothing, nothing, air_c)
        joined.films += conductance.sum(axis=0)
        joined.colder(np.where(mass > 0.0, SUBLIMES_C, np.inf))
        return (conductance * (air_c - SUBLIMES_C)).sum(axis=0) / SUBLIMATION, conductance

    def _there(self, temperature_c: FloatArray, mass: FloatArray) -> FloatArray:
        return temperature_c if self._all_there else np.where(mass > 0.0, temperature_c, np.inf)

    def _stored(self) -> FloatArray:
        """J in everything, from any fixed level."""
        state, network = self.state, self.network
        total = self.air.enthalpy(state)
        for group, wall_c in zip(network.walls, state.wall_c, strict=True):
            total = total + (group.capacity * wall_c).sum(axis=(0, 1))
        total = total + (state.lot_mass * (network.lots.share * state.lot_content).sum(axis=0)).sum(axis=0)
        melting = network.packs.melting
        total = total + (state.pack_mass[:melting] * state.pack_content[:melting]).sum(axis=0)
        return np.asarray(total - SUBLIMATION * state.pack_mass[melting:].sum(axis=0))

    def _changes(self, waiting: list[Change], now: float) -> list[Change]:
        """Applies what is due, looks again, and gives what still waits."""
        while waiting and waiting[0].at_s <= now + TOUCHING_S:
            self._change(waiting[0])
            waiting = waiting[1:]
        state = self.state
        self._all_there = bool(np.all(state.lot_mass > 0.0) and np.all(state.pack_mass > 0.0))
        self._look()
        self.record.jump(now, self.eyes.look(state), self.eyes.present(state), state)
        return waiting

    def _change(self, change: Change) -> None:
        """Goods or packs come (mixed with what is there of theirs) or go, with the heat that is in them."""
        state, network = self.state, self.network
        of_lot = change.what.startswith("lot")
        parts, masses = (network.lots, state.lot_mass) if of_lot else (network.packs, state.pack_mass)
        row = parts.order[change.row]
        if not of_lot and row >= network.packs.melting:
            level: Number = -SUBLIMATION
            contents = None
        else:
            contents = state.lot_content[:, row] if of_lot else state.pack_content[row][None]
            level = curves.content(*_curve(parts.curves, row), change.temperature_c, None if of_lot else change.frozen)
        share = network.lots.share[:, row] if of_lot else np.ones((1, 1))
        if change.what.endswith("out"):
            gone = np.minimum(np.ravel(change.mass), np.maximum(masses[row], 0.0))
            heat = -gone * (level if contents is None else (share * contents).sum(axis=0))
            masses[row] -= gone
        else:
            come = np.ravel(change.mass)
            heat = come * level * np.ones_like(self.heat_in)
            whole = masses[row] + come
            if contents is not None:
                mixed = (masses[row] * contents + come * level) / np.where(whole > 0.0, whole, 1.0)
                np.copyto(contents, mixed, where=whole > 0.0)
            masses[row] = whole
        self.heat_in += heat
        self.moved += np.abs(heat)

    def _trace(self, count: int, first: FloatArray, stored: FloatArray) -> Trace:
        record, network = self.record, self.network
        off = np.abs(self.heat_in - stored)
        moved = np.where(self.moved > 0.0, self.moved, 1.0)
        return Trace(
            start_s=self.plan.start_s,
            end_s=self.plan.end_s,
            steps=count,
            crossed_s=record.crossed,
            beyond_s=record.beyond,
            first=first,
            last=record.now,
            lowest=record.lowest,
            highest=record.highest,
            lowest_at_s=record.lowest_at,
            highest_at_s=record.highest_at,
            spent_s=record.spent[list(network.packs.order)],
            times_s=np.array(record.times),
            series=record.series,
            heat_in=self.heat_in,
            stored=stored,
            moved=self.moved,
            machine_j=self.machine_j,
            heat_balance_error=float(np.max(off / moved)),
            notes=tuple(sorted(self.bodies.respiration.notes)),
            state=self.state,
        )


def _curve(groups: tuple[Curve, ...], row: int) -> tuple[Curve, int]:
    group = next(group for group in groups if group.first <= row < group.first + group.count)
    return group, row - group.first
