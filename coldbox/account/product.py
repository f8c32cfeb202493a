"""Product heat: what arrives warm, the packaging that comes with it, and what living produce gives off."""

from __future__ import annotations

from math import ceil

import numpy as np

from coldbox.account.entry import Entry, Input
from coldbox.account.shapes import NOTHING, SECONDS_A_DAY, SECONDS_AN_HOUR, day, steady_mean
from coldbox.physics import moist_air
from coldbox.physics.number import FloatArray, Number
from coldbox.physics.validity import within
from coldbox.project.model import Lot
from coldbox.scene import Scene
from coldbox.scene.about import about
from coldbox.scene.draws import matters, most
from coldbox.scene.goods import Goods, goods
from coldbox.tables.load import row

PARTS_OF_AN_HOUR = 4  # steps within the hour in which a falling temperature is followed
_HEAT_KEPT = "Keep it within that range, or give the lot a product or figures that hold there."
_HEAT_OF_IT = "Bring it in within that range, or give the lot a product or figures that hold there."
_BREATH_AT_REST = "Keep it within that range, or give the lot its own respiration at temperatures nearer to it."
_BREATH_OF_IT = "Bring it in cooler, or give the lot's own respiration at temperatures nearer to it."
EVAPORATION_J_PER_KG = 2.5e6  # heat of evaporation near 0 °C, moist-air tables


def entries(scene: Scene, enthalpy: Number = 1.0) -> list[Entry]:
    """Every product entry of the account, lot by lot. enthalpy: factor on the heat contents of goods."""
    found: list[Entry] = []
    for lot in scene.project.lots:
        kind = goods(lot)
        if most(lot.arrives) > 0:
            shares = _pulldown_shares(lot)
            found.append(_intake(scene, lot, kind, shares, enthalpy))
            if lot.packaging != "none" and most(lot.packaging_mass) > 0:
                found.append(_packaging(scene, lot, shares))
        if kind.lives:
            found += [entry for entry in (_respiration(scene, lot, kind), _transpiration(scene, lot)) if entry]
    return found


def removed_share(elapsed: FloatArray, pulldown: Number, chilling_factor: Number) -> FloatArray:
    """Share of the pull-down heat taken out once `elapsed` seconds have passed since the goods arrived.

    The rate stands at its peak, mean / f, for the first (2 f - 1) of the pull-down and then falls evenly to nothing:
    the peak hour is what the handbook's chilling-rate factor says, and the whole is exactly one.

    elapsed: s, any shape that broadcasts. pulldown: s. chilling_factor f: 0.5 to 1, mean rate over peak rate.
    Raises OutOfValidity for a factor outside 0.5 to 1.
    Source: ASHRAE Handbook, Refrigeration, chapter Refrigerated-facility loads, chilling-rate factor (from memory);
    the shape behind the peak is ours.
    """
    within(chilling_factor, 0.5, 1.0, quantity="the chilling-rate factor", unit="", method="The pull-down profile")
    flat = 2.0 * chilling_factor - 1.0
    passed = np.minimum(np.maximum(elapsed / pulldown, 0.0), 1.0)
    late = np.maximum(passed - flat, 0.0)
    # Where nothing falls (f = 1), late is nought throughout, and what it is divided by makes no difference.
    share: FloatArray = (passed - late * late / np.maximum(2.0 - 2.0 * flat, 1e-12)) / chilling_factor
    return share


def _clock_edges(lot: Lot, parts: int) -> tuple[FloatArray, int]:
    """Seconds since arrival at the edges of every part of an hour, from midnight of the day of arrival until the
    pull-down is over: (days x 24 x parts + 1,), and the number of days."""
    days = int(ceil((lot.arrival_time * SECONDS_AN_HOUR + most(lot.pulldown)) / SECONDS_A_DAY))
    hours = np.arange(days * 24 * parts + 1) / parts
    return (hours - lot.arrival_time) * SECONDS_AN_HOUR, days


def _folded(values: FloatArray, days: int) -> FloatArray:
    """Days laid over each other: what yesterday's goods still give today. (…, days x 24) to (…, 24)."""
    over: FloatArray = values.reshape(*values.shape[:-1], days, 24).sum(axis=-2)
    return over


def _pulldown_shares(lot: Lot) -> FloatArray:
    """Share of a day's pull-down heat in each clock hour, (24,) or (draws, 24); sums to one."""
    edges, days = _clock_edges(lot, 1)
    return _folded(np.diff(removed_share(edges, lot.pulldown, lot.chilling_factor), axis=-1), days)


def _intake(scene: Scene, lot: Lot, kind: Goods, shares: FloatArray, enthalpy: Number) -> Entry:
    room = scene.room.temperature_c
    warm = _arrival_temperature(lot)
    with about(scene.project, f"lots.{lot.name}.arrival_temperature", _HEAT_OF_IT):
        arriving = kind.enthalpy(warm)
    with about(scene.project, "box.temperature", f'It is asked for the lot "{lot.name}". {_HEAT_KEPT}'):
        per_kg = enthalpy * (arriving - kind.enthalpy(room))
    daily = lot.arrives * SECONDS_A_DAY * per_kg
    return Entry(
        id=f"lots.{lot.name}.intake",
        group="product",
        label=f"{lot.name}, coming in",
        sensible_w=day(daily / SECONDS_AN_HOUR * shares),
        latent_w=NOTHING,
        moisture_kg_per_day=0.0,
        method=kind.method,
        source=kind.source,
        formula="m (h(t_in) - h(t_room)) over the pull-down, peak = mean / f",
        inputs=(
            Input(key="arrives_kg_per_day", label="m arrives", value=lot.arrives * SECONDS_A_DAY, kind="mass_a_day"),
            Input(key="arrival_c", label="t_in", value=warm, kind="temperature"),
            Input(key="room_c", label="t_room", value=room, kind="temperature"),
            Input(key="enthalpy_j_per_kg", label="h(t_in) - h(t_room)", value=per_kg, kind="latent_heat"),
            Input(key="pulldown_s", label="pull-down", value=lot.pulldown, kind="duration"),
            Input(key="chilling_factor", label="f", value=lot.chilling_factor, kind="number"),
        ),
    )


def _arrival_temperature(lot: Lot) -> Number:
    if lot.arrival_temperature is None:
        raise ValueError(f"lot {lot.name} arrives without a temperature")
    return lot.arrival_temperature


def _packaging(scene: Scene, lot: Lot, shares: FloatArray) -> Entry:
    specific_heat = float(str(row("packaging", lot.packaging)["specific_heat"]))
    warm, room = _arrival_temperature(lot), scene.room.temperature_c
    daily = lot.packaging_mass * specific_heat * (warm - room)
    return Entry(
        id=f"lots.{lot.name}.packaging",
        group="product",
        label=f"{lot.name}, {lot.packaging}",
        sensible_w=day(daily / SECONDS_AN_HOUR * shares),
        latent_w=NOTHING,
        moisture_kg_per_day=0.0,
        method="specific heat",
        source=str(row("packaging", lot.packaging)["source"]),
        formula="m c (t_in - t_room) over the pull-down",
        inputs=(
            Input(key="packaging_kg_per_day", label="m", value=lot.packaging_mass, kind="mass_a_day"),
            Input(key="specific_heat_j_per_kgk", label="c", value=specific_heat, kind="specific_heat"),
            Input(key="arrival_c", label="t_in", value=warm, kind="temperature"),
            Input(key="room_c", label="t_room", value=room, kind="temperature"),
        ),
    )


def _respiration(scene: Scene, lot: Lot, kind: Goods) -> Entry | None:
    room = scene.room.temperature_c
    with about(scene.project, "box.temperature", f'It is asked for the lot "{lot.name}". {_BREATH_AT_REST}'):
        resting = kind.respiration_w_per_kg(room)
    watts = day(lot.stored * resting)
    inputs = [
        Input(key="stored_kg", label="m stored", value=lot.stored, kind="mass"),
        Input(key="room_c", label="t_room", value=room, kind="temperature"),
        Input(key="heat_w_per_kg", label="w(t_room)", value=resting, kind="specific_power"),
    ]
    if most(lot.arrives) > 0:
        with about(scene.project, f"lots.{lot.name}.arrival_temperature", _BREATH_OF_IT):
            cooling = _respiration_while_cooling(lot, kind, room)
        watts = watts + cooling
        inputs.append(Input(key="cooling_w", label="today's intake, mean", value=steady_mean(cooling), kind="power"))
    if not matters(watts):
        return None
    return Entry(
        id=f"lots.{lot.name}.respiration",
        group="product",
        label=f"{lot.name}, breathing",
        sensible_w=watts,
        latent_w=NOTHING,
        moisture_kg_per_day=0.0,
        method="respiration",
        source=kind.respiration_source,
        formula="m w(t), stored goods at t_room and today's intake while it cools",
        inputs=tuple(inputs),
        remark="after its pull-down today's intake counts as stored",
    )


def _respiration_while_cooling(lot: Lot, kind: Goods, room: Number) -> FloatArray:
    """Heat of what arrived today while it cools, W in each clock hour: its temperature falls as its heat leaves."""
    edges, days = _clock_edges(lot, PARTS_OF_AN_HOUR)
    middle = 0.5 * (edges[1:] + edges[:-1])
    inside = _running(middle, lot.pulldown)
    left = 1.0 - removed_share(middle, lot.pulldown, lot.chilling_factor)
    temperature = room + (_arrival_temperature(lot) - room) * left
    per_part = kind.respiration_w_per_kg(temperature) * inside * (lot.arrives * SECONDS_A_DAY)
    per_hour = per_part.reshape(*per_part.shape[:-1], days * 24, PARTS_OF_AN_HOUR).mean(axis=-1)
    return _folded(per_hour, days)


def _running(elapsed: FloatArray, pulldown: Number) -> FloatArray:
    """One while the pull-down lasts, zero before and after."""
    running: FloatArray = np.where((elapsed >= 0.0) & (elapsed < pulldown), 1.0, 0.0)
    return running


def _transpiration(scene: Scene, lot: Lot) -> Entry | None:
    if not (most(lot.transpiration) > 0 and most(lot.stored) > 0):
        return None
    room = scene.room
    deficit = moist_air.saturation_pressure(room.temperature_c) * np.maximum(1.0 - room.relative_humidity, 0.0)
    water = lot.stored * lot.transpiration * deficit
    latent = day(water * EVAPORATION_J_PER_KG)
    return Entry(
        id=f"lots.{lot.name}.transpiration",
        group="product",
        label=f"{lot.name}, drying",
        sensible_w=-latent,
        latent_w=latent,
        moisture_kg_per_day=water * SECONDS_A_DAY,
        method="transpiration",
        source="ashrae-r-foods",
        formula="m k_t (p_s(t_room) - p_room); the water takes its heat from the goods and the air",
        inputs=(
            Input(key="stored_kg", label="m", value=lot.stored, kind="mass"),
            Input(key="coefficient_kg_per_kg_s_pa", label="k_t", value=lot.transpiration, kind="transpiration"),
            Input(key="deficit_pa", label="p_s - p", value=deficit, kind="pressure"),
        ),
    )
