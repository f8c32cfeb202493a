"""The room air of one step: its water, the air that comes and goes, and the balance that gives its temperature."""

from __future__ import annotations

from typing import Final

import numpy as np

from coldbox.physics import constants, moist_air
from coldbox.physics.doorway import doorway_flow
from coldbox.physics.number import FloatArray
from coldbox.record import Record
from coldbox.timeline.packs import GAS_CONSTANT, GAS_SPECIFIC_HEAT, SUBLIMES_C
from coldbox.timeline.types import Conditions, Network, State

C_AIR: Final = float(constants.SPECIFIC_HEAT_DRY_AIR)
C_VAPOUR: Final = float(constants.SPECIFIC_HEAT_VAPOUR)
C_WATER: Final = float(constants.SPECIFIC_HEAT_WATER)
C_ICE: Final = float(constants.SPECIFIC_HEAT_ICE)
EVAPORATION: Final = float(constants.LATENT_EVAPORATION)
FUSION: Final = float(constants.LATENT_FUSION)
R_AIR: Final = float(constants.GAS_CONSTANT_DRY_AIR)
MASS_RATIO: Final = float(constants.WATER_TO_AIR_MASS)
ZERO: Final = float(constants.ZERO_CELSIUS)


class Joined:
    """All that the room air touches: Σ heat to it is `fixed` - `per_k` (rise of the air)."""

    __slots__ = ("coldest_c", "films", "fixed", "per_k")

    def __init__(self, draws: int) -> None:
        self.fixed = np.zeros(draws)  # W at the air of now
        self.per_k = np.zeros(draws)  # W/K
        self.films = np.zeros(draws)  # W/K, all films together
        self.coldest_c = np.full(draws, np.inf)

    def copy(self) -> Joined:
        """The same figures, to be added to."""
        made = Joined(len(self.fixed))
        for name in self.__slots__:
            np.copyto(getattr(made, name), getattr(self, name))
        return made

    def chain(self, film: FloatArray, constant: FloatArray, share: FloatArray, air_c: FloatArray) -> None:
        """Adds rows whose ends come to `constant` + `share` T_air, behind `film` (row, draw) W/K."""
        loose = 1.0 - share
        self.per_k += (film * loose).sum(axis=0)
        self.fixed += (film * (constant - loose * air_c)).sum(axis=0)
        self.films += film.sum(axis=0)

    def rising(self, film: FloatArray, now_c: FloatArray, u: FloatArray, v: FloatArray, air_c: FloatArray) -> None:
        """Adds rows at `now_c` that rise by `u` + `v` (rise of the air), behind `film` (row, draw) W/K."""
        self.per_k += (film * (1.0 - v)).sum(axis=0)
        self.fixed += (film * (now_c - air_c + u)).sum(axis=0)

    def colder(self, temperatures_c: FloatArray) -> None:
        """Notes surfaces (row, draw) on which water may settle."""
        if len(temperatures_c):
            np.minimum(self.coldest_c, temperatures_c.min(axis=0), out=self.coldest_c)


class Balance(Record):
    """The air's own side of a step: Σ heat is `fixed` - `per_k` (rise of the air); all (draw,)."""

    fixed: FloatArray  # W at the air of the start
    per_k: FloatArray  # W/K
    ratio: FloatArray  # kg/kg humidity ratio at the end
    mass: FloatArray  # kg/s dry air in and out
    came: FloatArray  # W with what came in
    settled: FloatArray  # kg/s water that settles
    settled_j: FloatArray  # J/kg it takes along


class RoomAir:
    """The room air at work. Its dry mass is that of the start."""

    def __init__(self, network: Network) -> None:
        self.network = network
        self.dry = network.volume / moist_air.specific_volume(
            network.start_c, network.start_humidity_ratio, network.pressure
        )
        self.whole = network.volume * network.pressure / GAS_CONSTANT  # kg K of carbon dioxide that would fill it

    def enthalpy(self, state: State) -> FloatArray:
        """J in the room air, from dry air at 0 °C."""
        return np.asarray(self.dry * moist_air.enthalpy(state.air_c, state.humidity_ratio))

    def _doors(self, now: Conditions, state: State, share: FloatArray) -> FloatArray:
        """Dry air through each doorway, (door, draw) kg/s, at the densities of now."""
        assert now.door_c is not None and now.door_humidity_ratio is not None
        pressure, doors = self.network.pressure, self.network.doors
        inside = moist_air.density(state.air_c, state.humidity_ratio, pressure)
        outside = moist_air.density(now.door_c, now.door_humidity_ratio, pressure)
        wet = np.where(inside >= outside, state.humidity_ratio, now.door_humidity_ratio)
        flow = doorway_flow(doors.width, doors.height, inside, outside)
        return np.asarray(share * flow * np.maximum(inside, outside) / (1.0 + wet))

    def _leaks(self, now: Conditions, state: State, gas: FloatArray | None) -> FloatArray:
        """Dry air through leaks, (leak, draw) kg/s; cold gas keeps out as much as it has volume."""
        if gas is None or not len(now.leak):
            return now.leak
        # At the room's temperature and pressure a kg of the gas fills as much as so many kg of dry air with its vapour.
        alike = GAS_CONSTANT / (R_AIR * (1.0 + state.humidity_ratio / MASS_RATIO))
        left = 1.0 - gas * alike / np.maximum(now.leak.sum(axis=0), 1e-12)
        return np.asarray(now.leak * np.maximum(left, 0.0))

    def comes(
        self, now: Conditions, state: State, joined: Joined, gas: FloatArray | None, step_s: float
    ) -> Balance:  # fmt: skip
        """What comes to the air in a step but for walls, goods and packs, which `joined` gathers; and its water.

        M (h_new - h_old)/Δt = came - m h_new + vapour + heat - settled + joined - machine, linear in the rise.
        gas: kg/s of carbon dioxide coming off dry ice, or None.
        """
        old_c, old_ratio = state.air_c, state.humidity_ratio
        leak = self._leaks(now, state, gas)
        mass = leak.sum(axis=0)  # dry air in and out
        wet = (leak * now.leak_humidity_ratio).sum(axis=0)
        came = (leak * moist_air.enthalpy(now.leak_c, now.leak_humidity_ratio)).sum(axis=0)
        if now.door_share is not None:
            assert now.door_c is not None and now.door_humidity_ratio is not None
            door = self._doors(now, state, now.door_share)
            mass = mass + door.sum(axis=0)
            wet = wet + (door * now.door_humidity_ratio).sum(axis=0)
            came = came + (door * moist_air.enthalpy(now.door_c, now.door_humidity_ratio)).sum(axis=0)
        ratio, settled, settled_j = self._water(now, state, joined, mass, wet, step_s)

        dry = self.dry / step_s
        specific_heat = C_AIR + ratio * C_VAPOUR
        vapour = EVAPORATION + C_VAPOUR * old_c
        fixed = came + now.heat_w + now.moisture * vapour - settled * settled_j
        fixed -= mass * (C_AIR * old_c + ratio * vapour)
        fixed -= dry * (ratio - old_ratio) * vapour
        per_k = (dry + mass) * specific_heat - now.moisture * C_VAPOUR
        if len(now.extra):
            fixed += (now.extra * (now.extra_c - old_c)).sum(axis=0)
            per_k = per_k + now.extra.sum(axis=0)
        if gas is not None:
            fixed -= gas * GAS_SPECIFIC_HEAT * (old_c - SUBLIMES_C)
            per_k = per_k + gas * GAS_SPECIFIC_HEAT
        return Balance(
            fixed=fixed, per_k=per_k, ratio=ratio, mass=mass, came=came, settled=settled, settled_j=settled_j
        )

    def rise(
        self, now: Conditions, state: State, balance: Balance, joined: Joined
    ) -> tuple[FloatArray, FloatArray | None]:
        """How much the air warms in the step, (draw,) K, and what the machine takes out, (draw,) W or None."""
        fixed, per_k = balance.fixed + joined.fixed, balance.per_k + joined.per_k
        machine = _machine(now, fixed, per_k, state.air_c)
        return np.asarray((fixed if machine is None else fixed - machine) / per_k), machine

    def settle(
        self, now: Conditions, state: State, balance: Balance, rise: FloatArray, gas: FloatArray | None, step_s: float
    ) -> list[FloatArray]:
        """Writes the air of the step's end into the state; gives the flows that did it, each (draw,) W."""
        new_c = np.add(state.air_c, rise)
        state.air_c = new_c
        state.humidity_ratio = ratio = balance.ratio
        state.frost += balance.settled * step_s
        flows = [
            balance.came - balance.mass * (C_AIR * new_c + ratio * (EVAPORATION + C_VAPOUR * new_c)),
            now.heat_w + now.moisture * (EVAPORATION + C_VAPOUR * new_c),
            -balance.settled * balance.settled_j,
        ]
        if len(now.extra):
            flows.append((now.extra * (now.extra_c - new_c)).sum(axis=0))
        if gas is not None:
            flows.append(-gas * GAS_SPECIFIC_HEAT * (new_c - SUBLIMES_C))
            self._carbon_dioxide(state, balance.mass, gas, step_s)
        return flows

    def _water(
        self, now: Conditions, state: State, joined: Joined, mass: FloatArray, wet: FloatArray, step_s: float
    ) -> tuple[FloatArray, FloatArray, FloatArray]:
        """Humidity ratio at the end, water that settles kg/s, and the J/kg it takes along."""
        dry = self.dry / step_s
        gained, lost = dry * state.humidity_ratio + wet + now.moisture, dry + mass
        ratio = gained / lost
        coldest = np.minimum(joined.coldest_c, state.air_c)
        held = moist_air.saturation_humidity_ratio(coldest, self.network.pressure)
        if now.capacity_w is not None:
            # A machine that runs keeps the air as dry as it was.
            runs = now.capacity_w > 0.0
            held = np.where(runs, np.minimum(held, self.network.start_humidity_ratio), held)
        film = joined.films / C_AIR
        settles = ratio > held
        ratio = np.where(settles, (gained + film * held) / (lost + film), ratio)
        settled = np.where(settles, film * (ratio - held), 0.0)
        return ratio, settled, np.where(coldest < 0.0, C_ICE * coldest - FUSION, C_WATER * coldest)

    def _carbon_dioxide(self, state: State, mass: FloatArray, gas: FloatArray, step_s: float) -> None:
        """Gas in the room air at the end of the step, implicit."""
        out = mass / self.dry + gas * (state.air_c + ZERO) / self.whole  # 1/s
        state.carbon_dioxide = (state.carbon_dioxide + gas * step_s) / (1.0 + out * step_s)

    def carbon_dioxide_share(self, state: State) -> FloatArray:
        """Share of the room air's volume that is carbon dioxide."""
        return np.asarray(np.minimum(state.carbon_dioxide * (state.air_c + ZERO) / self.whole, 1.0))


def _machine(now: Conditions, fixed: FloatArray, per_k: FloatArray, air_c: FloatArray) -> FloatArray | None:
    """W the machine takes out: what holds its set point, at most its capacity; below 0 only where it warms."""
    if now.capacity_w is None or now.set_c is None:
        return None
    wanted = fixed - per_k * (now.set_c - air_c)
    taken = np.minimum(wanted, now.capacity_w)
    return np.asarray(taken if now.warms else np.maximum(taken, 0.0))
