"""What is kept while a run goes on: limits used up, extremes, packs spent, the series asked for.

No history is stored: ten thousand draws would not fit.
"""

from __future__ import annotations

from typing import Final

import numpy as np
from numpy.typing import NDArray

from coldbox.physics.number import FloatArray
from coldbox.timeline.air import RoomAir
from coldbox.timeline.bodies import Bodies
from coldbox.timeline.curves import rows
from coldbox.timeline.packs import SUBLIMES_C, Lumps
from coldbox.timeline.steps import TOUCHING_S
from coldbox.timeline.types import Network, Plan, Signal, State

SPENT: Final = 1e-9  # share of a lump of dry ice that is as good as nothing


class Eyes:
    """Reads the signals of a plan off the state, (signal, draw)."""

    def __init__(
        self, network: Network, signals: tuple[Signal, ...], bodies: Bodies, lumps: Lumps, air: RoomAir
    ) -> None:
        self.network, self.signals = network, signals
        self.bodies, self.lumps, self.air = bodies, lumps, air

    def look(self, state: State) -> FloatArray:
        """All signals of now; the parts have looked at the state before."""
        found = np.empty((len(self.signals), self.network.draws))
        for i, signal in enumerate(self.signals):
            if signal.what == "air" or signal.where == "air":
                found[i] = state.air_c
            elif signal.what == "lot":
                found[i] = self._lot(signal)
            elif signal.what == "humidity ratio":
                found[i] = state.humidity_ratio
            elif signal.what == "carbon dioxide":
                found[i] = self.air.carbon_dioxide_share(state)
            else:
                found[i] = self._pack(signal, state)
        return found

    def _lot(self, signal: Signal) -> FloatArray:
        row = self.network.lots.order[signal.row]
        if signal.where == "surface":
            return np.asarray(self.bodies.surface_c[row])
        temperature = self.bodies.temperature[:, row]
        return np.asarray(
            temperature[0] if signal.where == "core" else (self.network.lots.share[:, row] * temperature).sum(axis=0)
        )

    def _pack(self, signal: Signal, state: State) -> FloatArray:
        packs = self.network.packs
        row = packs.order[signal.row]
        if signal.what == "pack mass":
            return np.asarray(np.maximum(state.pack_mass[row], 0.0))
        if row < packs.melting:
            if signal.what == "pack":
                return np.asarray(self.lumps.temperature[0, row])
            return np.asarray(self.lumps.frozen(state.pack_content)[row])
        if signal.what == "pack":
            return np.full(self.network.draws, SUBLIMES_C)
        return np.asarray(np.maximum(state.pack_mass[row] / packs.whole_mass[row], 0.0))

    def present(self, state: State) -> NDArray[np.bool_] | None:
        """Which signals mean anything: a lot that is not there has no temperature. None: all."""
        there = np.ones((len(self.signals), self.network.draws), dtype=bool)
        for i, signal in enumerate(self.signals):
            if signal.what == "lot" and signal.where != "air":
                there[i] = state.lot_mass[self.network.lots.order[signal.row]] > 0.0
        return None if there.all() else there


def paced(plan: Plan) -> list[int]:
    """The signals that set the pace: those with a limit, or else all temperatures."""
    warmths = [i for i, signal in enumerate(plan.signals) if signal.what in ("air", "lot", "pack")]
    return sorted({watch.signal for watch in plan.watches} or warmths)


class Record:
    """Fills the figures of a Trace step by step."""

    def __init__(self, network: Network, plan: Plan) -> None:
        signals, draws = len(plan.signals), network.draws
        self.network = network
        self.times = sorted({at for at in plan.times_s if plan.start_s - TOUCHING_S <= at <= plan.end_s + TOUCHING_S})
        self.series = np.empty((len(self.times), signals, draws))
        self._next = 0
        self.lowest, self.highest = np.full((signals, draws), np.inf), np.full((signals, draws), -np.inf)
        self.lowest_at, self.highest_at = np.full((signals, draws), np.inf), np.full((signals, draws), np.inf)
        self.which = np.array([watch.signal for watch in plan.watches], dtype=np.intp)
        self.sign = np.array([[1.0 if watch.side == "above" else -1.0] for watch in plan.watches]).reshape(-1, 1)
        self.limit = rows([watch.limit for watch in plan.watches], draws) if plan.watches else np.empty((0, 1))
        self.allowed = np.array([[watch.allowed_s] for watch in plan.watches]).reshape(-1, 1)
        self.crossed = np.full((len(plan.watches), draws), np.inf)
        self.beyond = np.zeros((len(plan.watches), draws))
        self.spent = np.full((len(network.packs.labels), draws), np.inf)
        self._latent = np.zeros((network.packs.melting, 1), dtype=bool)
        for curve in network.packs.curves:
            self._latent[curve.first : curve.first + curve.count, 0] = np.any(curve.latent_heat > 0.0, axis=-1)
        self.now = np.empty((signals, draws))
        self.present: NDArray[np.bool_] | None = None
        self._over = np.empty((0, draws))
        self._paced = paced(plan)

    def paced(self) -> FloatArray:
        """The figures of the first draw that set the pace."""
        return self.now[self._paced, 0].copy()

    def jump(self, at_s: float, values: FloatArray, present: NDArray[np.bool_] | None, state: State) -> None:
        """The signals of an instant, at the start or after something came or went."""
        self.now, self.present = values, present
        self._extremes(at_s, values)
        self._over = self._beyond(values)
        packs, content = self.network.packs, state.pack_content
        melted = (content[: packs.melting] >= 0.0) & (state.pack_mass[: packs.melting] > 0.0) & self._latent
        own = self.spent[: packs.melting]
        own[melted & np.isinf(own)] = at_s

    def sample(self, at_s: float) -> None:
        """Stores the signals of now if this instant was asked for."""
        while self._next < len(self.times) and self.times[self._next] <= at_s + TOUCHING_S:
            self.series[self._next] = self.now
            self._next += 1

    def step(self, from_s: float, to_s: float, values: FloatArray) -> None:
        """The signals at the end of a step."""
        self.now = values
        self._extremes(to_s, values)
        if len(self.which):
            self._watch(from_s, to_s, values)

    def _beyond(self, values: FloatArray) -> FloatArray:
        """How far beyond its limit each watched signal is, K; what is not there is not beyond."""
        over = values[self.which] - self.limit
        over *= self.sign
        if self.present is not None:
            over[~self.present[self.which]] = -1.0
        return over

    def _watch(self, from_s: float, to_s: float, values: FloatArray) -> None:
        before, after = self._over, self._beyond(values)
        self._over = after
        if before.max() <= 0.0 and after.max() <= 0.0:
            return
        step = to_s - from_s
        # Straight within the step: the share of it that lies beyond, at its end where the signal rises.
        passed = step * (np.maximum(before, 0.0) + np.maximum(after, 0.0)) / (np.abs(before) + np.abs(after) + 1e-300)
        total = self.beyond + passed
        used = (total >= self.allowed) & (total > 0.0) & np.isinf(self.crossed)
        begins = np.where(after > 0.0, to_s - passed, from_s)
        np.copyto(self.crossed, begins + np.maximum(self.allowed - self.beyond, 0.0), where=used)
        self.beyond = total

    def _extremes(self, at_s: float, values: FloatArray) -> None:
        for bound, instant, better in (
            (self.lowest, self.lowest_at, values < self.lowest),
            (self.highest, self.highest_at, values > self.highest),
        ):
            seen = better if self.present is None else better & self.present
            np.copyto(bound, values, where=seen)
            np.copyto(instant, at_s, where=seen)

    def packs(
        self, from_s: float, to_s: float, content: FloatArray, mass: FloatArray, state: State
    ) -> None:  # fmt: skip
        """Instants at which packs are spent, from contents and masses before a step and the state after it."""
        melting = self.network.packs.melting
        step = to_s - from_s
        own = self.spent[:melting]
        before, after = content[:melting], state.pack_content[:melting]
        gone = (before < 0.0) & (after >= 0.0)
        if gone.any():
            gone &= np.isinf(own) & self._latent & (mass[:melting] > 0.0)
            own[gone] = (from_s + step * before / np.minimum(before - after, -1e-300))[gone]
        if melting < len(mass):
            own = self.spent[melting:]
            least = SPENT * self.network.packs.whole_mass[melting:]
            before, after = mass[melting:], state.pack_mass[melting:]
            gone = (before > least) & (after <= least) & np.isinf(own)
            own[gone] = (from_s + step * before / np.maximum(before - after, 1e-300))[gone]
