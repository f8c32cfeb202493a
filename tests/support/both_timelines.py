"""A box of the reference as the engine wants it: the same walls, goods, packs, doors and drives in its own records."""

from __future__ import annotations

import math

import numpy as np
import reference_timeline as ref

from coldbox.timeline import bodies, packs, solver, walls
from coldbox.timeline.types import (
    Change,
    Conditions,
    ConductivityPart,
    CurvePart,
    Doors,
    LotPart,
    Network,
    PackPart,
    Plan,
    Signal,
    Trace,
    WallLayer,
    WallPart,
    Watch,
)  # fmt: skip

WALL_CELLS = 12
# Three points of Gauss: the mean of a smooth drive over a step.
POINTS = (0.5 - math.sqrt(0.15), 0.5, 0.5 + math.sqrt(0.15))
WEIGHTS = (5.0 / 18.0, 8.0 / 18.0, 5.0 / 18.0)


def curve(given: ref.Curve) -> CurvePart:
    return CurvePart(
        chen=given.chen, freezing_point_c=given.point, specific_heat_above=given.above, specific_heat_below=given.below,
        latent_heat=given.latent, melts_over_k=given.width,
    )  # fmt: skip


def network(box: ref.Box, draws: int = 1, wall_cells: int = WALL_CELLS, lot_cells: int = 20) -> Network:
    """The box as the engine's network, the same in every draw."""
    wall_parts = [
        WallPart(
            name=f"wall {i}",
            layers=tuple(WallLayer(resistance=x.resistance, capacity=x.capacity) for x in wall.layers),
            inside_film=1.0 / (wall.inside_h * wall.inside_area), radiating=wall.emissivity * wall.outside_area,
            cells=wall_cells,
        )
        for i, wall in enumerate(box.walls)
    ]  # fmt: skip
    lot_parts = [
        LotPart(
            name=f"lot {i}", mass=body.mass, start_c=body.start_c, shape=body.shape, half_thickness=body.half_thickness,
            density=body.density, film=body.film, curve=curve(body.curve),
            conductivity=ConductivityPart(
                warm=body.conductivity[0], linear=body.conductivity[1], square=body.conductivity[2]
            ),
            respiration_at_c=tuple(at for at, _ in body.respiration),
            respiration_w_per_kg=tuple(w for _, w in body.respiration),
        )
        for i, body in enumerate(box.bodies)
    ]  # fmt: skip
    pack_parts = [
        PackPart(
            name=f"pack {i}", mass=pack.mass, start_c=pack.start_c, frozen=pack.frozen, exchange=pack.exchange,
            whole_mass=pack.mass, curve=curve(pack.curve), sublimes=pack.sublimes,
        )
        for i, pack in enumerate(box.packs)
    ]  # fmt: skip

    def all_draws(value: float) -> np.ndarray:
        return np.full(draws, value)

    return Network(
        draws=draws,
        walls=walls.stack(wall_parts, draws),
        lots=bodies.stack(lot_parts, draws, lot_cells),
        packs=packs.stack(pack_parts, draws),
        doors=Doors(
            labels=tuple(f"door {i}" for i in range(len(box.doors))),
            width=np.array([[door.width] for door in box.doors]).reshape(-1, 1),
            height=np.array([[door.height] for door in box.doors]).reshape(-1, 1),
        ),
        volume=all_draws(box.volume),
        pressure=all_draws(box.pressure),
        start_c=all_draws(box.start_c),
        start_humidity_ratio=all_draws(box.humidity_ratio),
    )


class Drives:
    """The drives of a box as means over each step."""

    def __init__(self, box: ref.Box) -> None:
        self.box = box
        self.film = np.array([[wall.outside_h * wall.outside_area] for wall in box.walls]).reshape(-1, 1)

    def during(self, start_s: float, end_s: float) -> Conditions:
        def mean(*drives: ref.Drive) -> np.ndarray:
            at = [start_s + (end_s - start_s) * point for point in POINTS]
            return np.array(
                [[sum(w * drive(t) for w, t in zip(WEIGHTS, at, strict=True))] for drive in drives]
            ).reshape(-1, 1)

        box = self.box
        share = mean(*(door.share for door in box.doors))
        opened = bool(share.any())
        machine = box.machine(0.5 * (start_s + end_s))
        return Conditions(
            outside_c=mean(*(wall.outside_c for wall in box.walls)),
            film=self.film,
            gain_w=mean(*(_gain(wall) for wall in box.walls)),
            extra=np.zeros((0, 1)),
            extra_c=np.zeros((0, 1)),
            leak=np.array([[leak.dry_kg_per_s] for leak in box.leaks]).reshape(-1, 1),
            leak_c=mean(*(leak.outside_c for leak in box.leaks)),
            leak_humidity_ratio=mean(*(leak.humidity_ratio for leak in box.leaks)),
            door_share=share if opened else None,
            door_c=mean(*(door.outside_c for door in box.doors)) if opened else None,
            door_humidity_ratio=mean(*(door.humidity_ratio for door in box.doors)) if opened else None,
            heat_w=mean(box.heat)[0],
            moisture=mean(box.moisture)[0],
            capacity_w=None if machine is None else np.array([machine[0]]),
            set_c=None if machine is None else np.array([machine[1]]),
        )


def _gain(wall: ref.Wall) -> ref.Drive:
    def gain(t: float) -> float:
        seen = 0.0
        if wall.emissivity:
            sky, ground = (wall.sky_c(t) + 273.15) ** 4, (wall.ground_c(t) + 273.15) ** 4
            seen = wall.emissivity * ref.STEFAN * (wall.sky_share * sky + (1.0 - wall.sky_share) * ground)
        return wall.outside_area * (wall.sun(t) + seen)

    return gain


def signal(what: tuple) -> Signal:
    kind, *index = what
    if kind in ("core", "surface", "mean"):
        return Signal(what="lot", where=kind, row=index[0])
    return Signal(what=kind, row=index[0] if index else 0)


def plan(box: ref.Box, hours: float, limits: list[ref.Limit], signals: list[tuple], **changed: object) -> Plan:
    """What the engine is asked so that it answers as the reference does."""
    wanted = [*signals, *(limit.signal for limit in limits if limit.signal not in signals)]
    return Plan(
        start_s=0.0,
        end_s=hours * 3600.0,
        marks=box.marks,
        changes=tuple(
            Change(
                at_s=move.at_s, what="lot out" if move.comes_at_c is None else "lot in", row=move.body, mass=move.mass,
                temperature_c=move.comes_at_c or 0.0,
            )
            for move in box.moves
        ),
        signals=tuple(signal(what) for what in wanted),
        watches=tuple(
            Watch(
                signal=wanted.index(limit.signal), side="above" if limit.above else "below", limit=limit.celsius
            )
            for limit in limits
        ),
        times_s=tuple(np.unique(np.append(np.arange(0.0, hours * 3600.0, 3600.0), hours * 3600.0))),
        **changed,
    )  # fmt: skip


def run(
    box: ref.Box, hours: float, limits: list[ref.Limit], signals: list[tuple], *, wall_cells: int = WALL_CELLS,
    lot_cells: int = 20, **changed: object,
) -> Trace:  # fmt: skip
    """The engine on a box of the reference."""
    made, drives = network(box, 1, wall_cells, lot_cells), Drives(box)
    asked = plan(box, hours, limits, signals, **changed)
    state = solver.start(made, drives.during(0.0, 1.0))
    for i, celsius in enumerate(box.wall_start_c):
        for group, own, surface in zip(made.walls, state.wall_c, state.surface_c, strict=True):
            if celsius is not None and group.first <= i < group.first + len(group.labels):
                own[:, i - group.first] = surface[i - group.first] = celsius
    return solver.run(made, drives, asked, state)
