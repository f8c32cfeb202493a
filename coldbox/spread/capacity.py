"""The load with draws: how sure the capacity is."""

from __future__ import annotations

from typing import Final

import numpy as np

from coldbox.account.load import load
from coldbox.physics.number import FloatArray
from coldbox.project.draw import with_values
from coldbox.project.model import Project
from coldbox.record import Record
from coldbox.spread.draws import draws
from coldbox.spread.influence import Driver, drivers
from coldbox.spread.inputs import FILMS
from coldbox.spread.percentiles import Percentiles, percentiles

BLOCK: Final = 2000


class CapacitySpread(Record):
    """Required capacity of every draw, without the safety allowance, W."""

    seed: int
    middle_w: float
    required_w: Percentiles
    daily_j: Percentiles
    drivers: tuple[Driver, ...]
    draws_w: FloatArray  # (draws,)


def capacity_spread(project: Project, count: int, seed: int) -> CapacitySpread:
    """Percentiles of the required capacity and what moves it.

    project: complete, without draws. The safety allowance is left out: it stands for the same thing. Surface films,
    which hardly count in an insulated wall, are not drawn here.
    Raises what `account.load.load` raises.
    """
    project = with_values(project, {"sizing.safety": 0.0})
    usual = load(project)
    if "bearing_deg" in usual.facts:  # nobody told it: all draws face as the middle does, whatever block they are in
        project = project.replace(box=project.box.replace(bearing=float(np.mean(usual.facts["bearing_deg"]))))
    drawn = draws(project, count, seed)
    counts = [one for one in drawn.columns if one.targets[0].path != FILMS]
    required, daily = np.empty(count), np.empty(count)
    for start in range(1, count + 1, BLOCK):
        stop = min(start + BLOCK, count + 1)
        found = load(drawn.part(start, stop), enthalpy=drawn.enthalpy_of(start, stop))
        rows = stop - start + 1
        watts = np.broadcast_to(found.required_capacity_w, (rows,))
        required[start - 1 : stop - 1] = watts[1:]
        daily[start - 1 : stop - 1] = np.broadcast_to(found.counted_daily_j, (rows,))[1:]
    return CapacitySpread(
        seed=seed,
        middle_w=float(np.mean(usual.required_capacity_w)),
        required_w=percentiles(required),
        daily_j=percentiles(daily),
        drivers=drivers(drawn.replace(columns=tuple(counts)), required),
        draws_w=required,
    )
