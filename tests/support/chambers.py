"""Boxes for the timeline's engine, built by hand: a wall, an air, goods and packs whose answers are known elsewhere."""

from __future__ import annotations

import numpy as np

from coldbox.timeline import bodies, packs, walls
from coldbox.timeline.types import (
    Conditions,
    ConductivityPart,
    CurvePart,
    Doors,
    LotPart,
    Network,
    PackPart,
    WallLayer,
    WallPart,
)

PRESSURE = 101325.0


def sensible(specific_heat=3600.0):
    return CurvePart(
        chen=False, freezing_point_c=0.0, specific_heat_above=specific_heat, specific_heat_below=specific_heat,
        latent_heat=0.0, melts_over_k=1.0,
    )  # fmt: skip


def quoted(above=3600.0, below=1900.0, latent=250e3, point=-1.0, over=0.1):
    return CurvePart(
        chen=False, freezing_point_c=point, specific_heat_above=above, specific_heat_below=below,
        latent_heat=latent, melts_over_k=over,
    )  # fmt: skip


def chen(water=0.8, protein=0.18, point=-1.0, above=3600.0):
    return CurvePart(
        chen=True, freezing_point_c=point, specific_heat_above=above,
        specific_heat_below=1000.0 * (1.55 + 1.26 * (1.0 - water)),
        latent_heat=333_600.0 * (water - 0.4 * protein), melts_over_k=0.1,
    )  # fmt: skip


ICE = CurvePart(
    chen=False, freezing_point_c=0.0, specific_heat_above=4190.0, specific_heat_below=2030.0,
    latent_heat=333_600.0, melts_over_k=0.0,
)  # fmt: skip


def lot(**changes):
    figures = {
        "name": "goods", "mass": 100.0, "start_c": 5.0, "shape": "slab", "half_thickness": 0.05, "density": 1000.0,
        "film": 10.0, "curve": sensible(),
        "conductivity": ConductivityPart(warm=0.5, linear=0.0, square=0.0),
        "respiration_at_c": (), "respiration_w_per_kg": (),
    }  # fmt: skip
    return LotPart(**{**figures, **changes})


def pack(**changes):
    figures = {
        "name": "ice", "mass": 10.0, "start_c": 0.0, "frozen": 1.0, "exchange": 20.0, "whole_mass": 10.0, "curve": ICE,
        "sublimes": False,
    }  # fmt: skip
    return PackPart(**{**figures, **changes})


def wall(resistance=0.1, capacity=0.0, *, name="wall", inside_film=1e-6, radiating=0.0, cells=1):
    """One layer, K/W and J/K."""
    layers = (WallLayer(resistance=resistance, capacity=capacity),)
    return WallPart(name=name, layers=layers, inside_film=inside_film, radiating=radiating, cells=cells)


def network(*, parts=(), lots=(), coolants=(), doors=(), start_c=5.0, ratio=0.0, volume=1.0, draws=1, cells=20, **more):
    def each(value):
        return np.broadcast_to(np.asarray(value, dtype=float), (draws,))

    return Network(
        draws=draws, walls=walls.stack(parts, draws), lots=bodies.stack(lots, draws, cells),
        packs=packs.stack(coolants, draws),
        doors=Doors(
            labels=tuple(f"door {i}" for i in range(len(doors))),
            width=np.array([[width] for width, _ in doors]).reshape(-1, 1),
            height=np.array([[height] for _, height in doors]).reshape(-1, 1),
        ),
        volume=each(volume), pressure=each(PRESSURE), start_c=each(start_c), start_humidity_ratio=each(ratio), **more,
    )  # fmt: skip


class Lasting:
    """Drivers that never change unless `at` says from when on."""

    def __init__(self, outside_c=30.0, *, count=1, film=1e6, gain_w=0.0, at=(), **changes):
        self.base = self.conditions(outside_c, count=count, film=film, gain_w=gain_w, **changes)
        self.later = sorted(at, key=lambda pair: pair[0])

    @staticmethod
    def conditions(outside_c, *, count=1, film=1e6, gain_w=0.0, **changes):
        def column(value):
            return np.array(np.broadcast_to(np.asarray(value, dtype=float), (count, np.size(outside_c))))

        none = np.empty((0, 1))
        figures = {
            "outside_c": column(outside_c), "film": column(film), "gain_w": column(gain_w), "extra": none,
            "extra_c": none, "leak": none, "leak_c": none, "leak_humidity_ratio": none, "door_share": None,
            "door_c": None, "door_humidity_ratio": None, "heat_w": np.zeros(1), "moisture": np.zeros(1),
            "capacity_w": None, "set_c": None, "warms": False,
        }  # fmt: skip
        return Conditions(**{**figures, **changes})

    def during(self, start_s, end_s):
        assert end_s > start_s
        now = self.base
        for since, conditions in self.later:
            if start_s >= since - 1e-6:
                now = conditions
        return now


def held(air_c, **changes):
    """An ideal machine that holds the air: what a body meets in a stream of one temperature."""
    return {"capacity_w": np.array([np.inf]), "set_c": np.array([float(air_c)]), "warms": True, **changes}
