"""Air that comes in: through an open door, by air changes, by ventilation; the heat and the water it brings.

Heat is counted per kg of dry air, as enthalpy of moist air is. In a steady exchange as much dry air leaves as comes.
"""

from __future__ import annotations

import math
from collections.abc import Iterable

import numpy as np

from coldbox.physics import constants
from coldbox.physics.number import FloatArray, Number
from coldbox.physics.validity import within
from coldbox.record import Record

_GRAVITY = float(constants.GRAVITY)
_C_AIR = float(constants.SPECIFIC_HEAT_DRY_AIR)
_C_VAPOUR = float(constants.SPECIFIC_HEAT_VAPOUR)
_EVAPORATION = float(constants.LATENT_EVAPORATION)
_FUSION = float(constants.LATENT_FUSION)
_C_ICE = float(constants.SPECIFIC_HEAT_ICE)

_DOORWAY = "Doorway flow (Gosney and Olama)"


class Exchange(Record):
    """Heat and water brought in by air; negative where they leave."""

    sensible_w: FloatArray
    latent_w: FloatArray  # with the fusion of what freezes
    moisture: FloatArray  # kg/s

    @property
    def total_w(self) -> FloatArray:
        """Sensible and latent together, W."""
        return self.sensible_w + self.latent_w


def doorway_flow(width: Number, height: Number, inside_density: Number, outside_density: Number) -> FloatArray:
    """Flow through a fully open doorway between two still airs, m³/s of the denser air; as much dry air comes back.

    V = 0.221 A (1 - ρ_l / ρ_d)^0.5 (g H)^0.5 F_m, F_m = (2 / (1 + (ρ_d / ρ_l)^(1/3)))^1.5

    width, height: H, of the opening, m; A their product. inside_density, outside_density: of moist air, kg/m³; ρ_d
    is the larger, ρ_l the smaller: the denser side drives, whichever it is. All broadcast; so does the result, 0 for
    equal densities. Positive sizes and densities, else OutOfValidity. The coefficient is two thirds of the 1/3 of
    flow without friction or mixing.
    Source: W. B. Gosney and H. A.-L. Olama 1975, as in ASHRAE Refrigeration, Refrigerated-facility loads (copy).
    >>> round(float(doorway_flow(2.0, 2.5, 1.39, 1.16)), 2)
    2.13
    """
    for value, quantity, unit in (
        (width, "the width", "m"),
        (height, "the height", "m"),
        (inside_density, "the density", "kg/m³"),
        (outside_density, "the density", "kg/m³"),
    ):
        within(value, 1e-9, math.inf, quantity=quantity, unit=unit, method=_DOORWAY)
    ratio = np.maximum(inside_density, outside_density) / np.minimum(inside_density, outside_density)
    shape = (2.0 / (1.0 + np.cbrt(ratio))) ** 1.5
    return np.asarray(0.221 * width * height * np.sqrt((1.0 - 1.0 / ratio) * _GRAVITY * height) * shape)


def open_share(passages: Number, open_each: Number, stood_open: Number) -> Number:
    """Share of the time a door is open.

    D = P θ_p + D_o

    passages: P, 1/s. open_each: θ_p, seconds a passage. stood_open: D_o, seconds open per second. All broadcast.
    Result: 0 to 1; more than that, or anything negative, is OutOfValidity: the door would be open longer than there
    is time. Source: ASHRAE Refrigeration, Refrigerated-facility loads, open-time factor (copy).
    >>> round(open_share(300 / 86400, 30.0, 0.0), 4)
    0.1042
    """
    for value, quantity, unit in (
        (passages, "the passages", "1/s"),
        (open_each, "the seconds open each time", "s"),
        (stood_open, "the share it stands open", ""),
    ):
        within(value, 0.0, math.inf, quantity=quantity, unit=unit, method="Open time of a door")
    share = passages * open_each + stood_open
    # A door open all day, written as passages, may exceed 1 by rounding.
    within(share, 0.0, 1.0 + 1e-9, quantity="the share of time the door is open", unit="", method="Open time of a door")
    return share


def let_through(effectivenesses: Iterable[Number]) -> Number:
    """Share of the flow that passes what protects a doorway, one thing behind the other.

    Π (1 - ε)

    effectivenesses: ε of each, a share from 0 to 1, broadcasting; else OutOfValidity. Result: a share from 0 to 1, 1
    for no protection.
    Source: ASHRAE Refrigeration, Refrigerated-facility loads, doorway protective devices (copy).
    """
    share: Number = 1.0
    for effectiveness in effectivenesses:
        within(effectiveness, 0.0, 1.0, quantity="the effectiveness", unit="", method="Doorway protection")
        share = share * (1.0 - effectiveness)
    return share


def exchange_heat(
    flow: Number,
    specific_volume: Number,
    air_c: Number,
    air_humidity_ratio: Number,
    room_c: Number,
    room_humidity_ratio: Number,
) -> Exchange:
    """Heat and water that an exchange of air brings into a room.

    m = V / v; sensible m (1006 + 1860 (W + W_r) / 2)(t - t_r); latent m (W - W_r)(2 501 000 + 1860 (t + t_r) / 2),
    together m (h - h_r); where t_r < 0 °C the water ends as ice of the room's temperature and the latent part also
    holds m (W - W_r)(333 430 - 2100 t_r): vapour and ice then differ by the heat of sublimation.

    flow: V, m³/s each way; specific_volume: v of the air that flow is measured in, m³ per kg dry air (the denser side
    of a doorway, the room's for air changes, the fresh air's for ventilation). air_c: t, air_humidity_ratio: W kg/kg,
    of the air coming in; room_c: t_r, room_humidity_ratio: W_r. All broadcast; so does the Exchange.
    Volumes above 0, flows and humidity ratios not negative, else OutOfValidity.
    Source: ASHRAE Fundamentals, Psychrometrics, eq. 30, and Refrigeration, Refrigerated-facility loads (copy).
    """
    for value, low, quantity, unit in (
        (flow, 0.0, "the flow", "m³/s"),
        (specific_volume, 1e-9, "the specific volume", "m³/kg"),
        (air_humidity_ratio, 0.0, "the humidity ratio", "kg/kg"),
        (room_humidity_ratio, 0.0, "the humidity ratio", "kg/kg"),
    ):
        within(value, low, math.inf, quantity=quantity, unit=unit, method="Air exchange")
    dry = flow / specific_volume
    moisture = np.asarray(dry * (air_humidity_ratio - room_humidity_ratio))
    vapour = _EVAPORATION + 0.5 * _C_VAPOUR * (air_c + room_c)
    frozen = np.where(np.asarray(room_c) < 0.0, _FUSION - _C_ICE * room_c, 0.0)
    specific_heat = _C_AIR + 0.5 * _C_VAPOUR * (air_humidity_ratio + room_humidity_ratio)
    return Exchange(
        sensible_w=np.asarray(dry * specific_heat * (air_c - room_c)),
        latent_w=moisture * (vapour + frozen),
        moisture=moisture,
    )


def air_change_heat(
    volume: Number,
    changes: Number,
    room_specific_volume: Number,
    air_c: Number,
    air_humidity_ratio: Number,
    room_c: Number,
    room_humidity_ratio: Number,
) -> Exchange:
    """Heat and water of a number of air changes.

    `exchange_heat` of n V, at the room's specific volume: an air change replaces the air that fills the room

    volume: V of the room, m³. changes: n, 1/s. room_specific_volume: m³ per kg dry air. The rest as `exchange_heat`.
    All broadcast; so does the Exchange.
    Source: ASHRAE Refrigeration, Refrigerated-facility loads, infiltration by air exchange (copy).
    """
    within(volume, 0.0, math.inf, quantity="the volume", unit="m³", method="Air changes")
    return exchange_heat(volume * changes, room_specific_volume, air_c, air_humidity_ratio, room_c, room_humidity_ratio)


def ventilation_heat(
    flow: Number,
    specific_volume: Number,
    air_c: Number,
    air_humidity_ratio: Number,
    room_c: Number,
    room_humidity_ratio: Number,
    recovery: Number = 0.0,
    dried_to: Number | None = None,
) -> Exchange:
    """Heat and water of fresh air brought in on purpose.

    (1 - η) · `exchange_heat`, with W = min(W, W_dried)

    flow: m³/s of the fresh air, specific_volume: its v. recovery: η, share of the enthalpy difference given back, 0
    to 1, else OutOfValidity; of heat and moisture alike. dried_to: humidity ratio a drier leaves, kg/kg; None: no
    drier. The rest as `exchange_heat`. All broadcast; so does the Exchange.
    Source: enthalpy balance of a ventilated room, ρ V Δh.
    """
    within(recovery, 0.0, 1.0, quantity="the recovery", unit="", method="Ventilation")
    brought = air_humidity_ratio if dried_to is None else np.minimum(air_humidity_ratio, dried_to)
    return exchange_heat((1.0 - recovery) * flow, specific_volume, air_c, brought, room_c, room_humidity_ratio)
