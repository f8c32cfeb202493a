"""The state a run begins with: walls of a day that repeats, goods as they have been since they came.

A powered room: its air has been held at its temperature for days, until the walls of the first draw repeat within a
hundredth of a kelvin; a heated floor has settled. Stored goods are as warm as the room; what lives has its own heat in
it, built up over ten days. Today's intake has cooled since it came, as a body of its own. A start temperature that is
told rules. Before a pull-down goods are as warm as they come: they are put in as it begins. A box that nothing cools
has its walls settled between its start temperature and the surroundings of the first hour.
"""

from __future__ import annotations

from collections.abc import Sequence
from typing import Final

import numpy as np

from coldbox.timeline import bodies, envelope, packs, solver, walls
from coldbox.timeline.drivers import Hours
from coldbox.timeline.network import Body, Rig
from coldbox.timeline.types import Change, Conditions, Lots, Network, Plan, State

DAY_S: Final = 86400.0
MOST_DAYS: Final = 12
REPEATS_K: Final = 0.01
WALL_STEP_S: Final = 1800.0
BREATHING_DAYS: Final = 10
BREATHING_STEP_S: Final = 3600.0


def begin(rig: Rig, hours: Hours, start_s: float, *, normal_days: bool, goods_before: bool) -> State:
    """The state at the start.

    normal_days: whether the air has been held at the network's start temperature before. goods_before: whether the
    goods have been in it; else they are put in now, as warm as the network has them.
    """
    if not normal_days:
        return solver.start(rig.network, hours.during(start_s, start_s + 1.0))
    state = solver.start(rig.network, hours.mean_held())
    _walls(rig, hours, start_s, state)
    envelope.held_floors(rig.network, rig.envelope, rig.network.start_c, state)
    if goods_before:
        _goods(rig, hours, start_s, state)
    return state


def _walls(rig: Rig, hours: Hours, start_s: float, state: State) -> None:
    """Walls of the day that repeats, into the state."""
    draws = rig.network.draws
    alone = rig.network.replace(lots=bodies.stack((), draws), packs=packs.stack((), draws))
    own = solver.start(alone, hours.mean_held())
    driver = _Held(hours)
    for day in range(MOST_DAYS, 0, -1):
        before = [cells.copy() for cells in own.wall_c]
        plan = Plan(start_s=start_s - day * DAY_S, end_s=start_s - (day - 1) * DAY_S, step_s=WALL_STEP_S)
        own = solver.run(alone, driver, plan, own).state
        moved = max(
            (float(np.abs(one - other)[..., 0].max()) for one, other in zip(own.wall_c, before, strict=True)),
            default=0.0,
        )
        if moved < REPEATS_K:
            break
    state.wall_c, state.surface_c = own.wall_c, own.surface_c


class _Held:
    """The drivers of normal days."""

    def __init__(self, hours: Hours) -> None:
        self.hours = hours

    def during(self, start_s: float, end_s: float) -> Conditions:
        return self.hours.held(start_s, end_s)


class _Still:
    """Nothing around but air held at a temperature."""

    def __init__(self, hours: Hours) -> None:
        none = np.zeros((0, 1))
        self.now = hours.mean_held().replace(outside_c=none, film=none, gain_w=none)

    def during(self, start_s: float, end_s: float) -> Conditions:  # noqa: ARG002  the same at any time
        return self.now


def _goods(rig: Rig, hours: Hours, start_s: float, state: State) -> None:
    """Heat contents of what has not simply the room's temperature, into the state."""
    untold = [body for body in rig.bodies if body.lot.start_temperature is None]
    alive = [body for body in untold if body.kind == "stored" and body.lot.respiration]
    _since(rig, hours, alive, start_s - BREATHING_DAYS * DAY_S, start_s, BREATHING_STEP_S, state)
    came = [body for body in untold if body.kind == "intake"]
    if came:
        first = min(body.arrived_s for body in came if body.arrived_s is not None)
        _since(rig, hours, came, first, start_s, Plan(start_s=0.0, end_s=0.0).step_s, state)


def _since(
    rig: Rig, hours: Hours, some: Sequence[Body], from_s: float, to_s: float, step_s: float, state: State
) -> None:  # fmt: skip
    """Lets some bodies stand in the room's air from an instant (or from when they came) to the start."""
    if not some or to_s <= from_s:
        return
    draws = rig.network.draws
    parts = [rig.lot_parts[body.row].replace(mass=0.0) for body in some]
    lots = bodies.stack(parts, draws)
    changes = [
        Change(
            at_s=from_s if body.arrived_s is None else body.arrived_s,
            what="lot in",
            row=place,
            mass=np.maximum(body.mass, 1e-6),
            temperature_c=body.start_c,
        )
        for place, body in enumerate(some)
    ]
    alone: Network = rig.network.replace(walls=walls.stack((), draws), lots=lots, packs=packs.stack((), draws))
    plan = Plan(start_s=from_s, end_s=to_s, changes=changes, step_s=step_s)
    ended = solver.run(alone, _Still(hours), plan).state
    for place, body in enumerate(some):
        _put(rig.network.lots, body.row, state, ended, lots, place)


def _put(whole: Lots, row: int, state: State, found: State, lots: Lots, place: int) -> None:
    state.lot_content[:, whole.order[row]] = found.lot_content[:, lots.order[place]]
