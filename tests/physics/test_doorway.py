"""Air through doors: the flow's closed form, the energy and water it carries, and plain sense."""

from __future__ import annotations

import numpy as np
import psychrolib
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from coldbox.errors import OutOfValidity
from coldbox.physics import doorway, moist_air

PRESSURE = 101325.0
psychrolib.SetUnitSystem(psychrolib.SI)
warmth = st.floats(-40.0, 45.0)
humidity = st.floats(0.05, 1.0)


def air(temperature_c: float, relative_humidity: float) -> tuple[float, float, float]:
    """Temperature, humidity ratio and specific volume."""
    ratio = float(moist_air.humidity_ratio(temperature_c, relative_humidity, PRESSURE))
    return temperature_c, ratio, float(moist_air.specific_volume(temperature_c, ratio, PRESSURE))


def ideal_flow(width: float, height: float, dense: float, light: float) -> float:
    """Exchange without friction, m³/s of the denser air: Bernoulli at each height about the level of equal pressure,
    which lies where equal masses pass both ways; added up slice by slice."""
    slices = (np.arange(40000) + 0.5) / 40000 * height

    def masses(level: float) -> tuple[float, float]:
        pull = 2.0 * 9.80665 * (dense - light) * np.abs(slices - level)
        below = slices < level
        strip = width * height / len(slices)
        return (
            float(np.sum(np.sqrt(pull[below] * dense))) * strip,
            float(np.sum(np.sqrt(pull[~below] * light))) * strip,
        )

    low, high = 0.0, height
    for _ in range(60):
        level = 0.5 * (low + high)
        out, back = masses(level)
        low, high = (level, high) if out < back else (low, level)
    return masses(0.5 * (low + high))[0] / dense


@pytest.mark.parametrize(("dense", "light"), [(1.45, 1.13), (1.30, 1.25), (1.6, 0.9)])
def test_flow_is_the_same_share_of_the_ideal_for_any_airs(dense: float, light: float) -> None:
    # 0.221 against the ideal's 1/3; Pham and Oliver 1983 measured 0.68 of the ideal.
    ideal = ideal_flow(1.5, 2.4, dense, light)
    assert doorway.doorway_flow(1.5, 2.4, dense, light) == pytest.approx(0.663 * ideal, rel=1e-3)


def through_doorway(share: float, behind: tuple[float, ...], room: tuple[float, ...]) -> doorway.Exchange:
    """1 m by 2 m, open for a share of the time: flow measured in the denser air. Airs: °C, kg/kg, m³/kg."""
    inside, outside = (1 + room[1]) / room[2], (1 + behind[1]) / behind[2]
    flow = share * doorway.doorway_flow(1.0, 2.0, inside, outside)
    return doorway.exchange_heat(flow, room[2] if inside >= outside else behind[2], *behind[:2], *room[:2])


def test_the_denser_side_drives_whichever_it_is() -> None:
    assert doorway.doorway_flow(1.0, 2.0, 1.4, 1.2) == doorway.doorway_flow(1.0, 2.0, 1.2, 1.4)
    assert doorway.doorway_flow(1.0, 2.0, 1.2, 1.2) == 0.0
    # A warm box in a cold yard: heat leaves, and the yard's air is the dense one whose volume counts.
    yard, box = air(-10.0, 0.8), air(12.0, 0.7)
    got = through_doorway(0.1, yard, box)
    assert float(got.total_w) < 0.0 and float(got.moisture) < 0.0


@given(warmth, humidity, warmth, humidity)
@settings(max_examples=200, deadline=None)
def test_both_parts_sum_to_the_enthalpy_difference(t: float, rh: float, t_room: float, rh_room: float) -> None:
    outside, room = air(t, rh), air(t_room, rh_room)
    got = doorway.exchange_heat(0.7, room[2], outside[0], outside[1], room[0], room[1])
    dry = 0.7 / room[2]
    total = dry * (
        psychrolib.GetMoistAirEnthalpy(t, max(outside[1], 1e-7))
        - psychrolib.GetMoistAirEnthalpy(t_room, max(room[1], 1e-7))
    )
    ice = dry * (outside[1] - room[1]) * (333430.0 - 2100.0 * t_room) if t_room < 0.0 else 0.0
    assert float(got.total_w) == pytest.approx(total + ice, rel=1e-6, abs=0.5)
    assert float(got.moisture) == pytest.approx(dry * (outside[1] - room[1]), rel=1e-12)


def test_equal_airs_exchange_nothing() -> None:
    same = air(4.0, 0.85)
    got = through_doorway(1.0, same, same)
    assert float(got.sensible_w) == float(got.latent_w) == float(got.moisture) == 0.0


def test_what_freezes_gives_up_the_heat_of_sublimation() -> None:
    for t, sublimation in ((-10.0, 2837.0e3), (-20.0, 2838.4e3), (-30.0, 2839.0e3)):  # ice to vapour, steam tables
        got = doorway.exchange_heat(1.0, 1.0, t, 0.002, t, 0.001)
        assert float(got.latent_w / got.moisture) == pytest.approx(sublimation, rel=1e-3)
    above = doorway.exchange_heat(1.0, 1.0, 0.0, 0.003, 0.0, 0.002)
    assert float(above.latent_w / above.moisture) == pytest.approx(2501.0e3)
    # Draws on both sides of freezing keep apart.
    both = doorway.exchange_heat(1.0, 1.0, 5.0, 0.005, np.array([-0.1, 0.1]), 0.003)
    assert both.latent_w[0] - both.latent_w[1] == pytest.approx(0.002 * 333.6e3, rel=0.01)


@given(st.floats(0.0, 0.9), st.floats(0.0, 0.1), warmth, humidity)
@settings(max_examples=100, deadline=None)
def test_longer_open_is_never_less_heat(share: float, more: float, t: float, rh: float) -> None:
    warm, cold = air(t + 50.0, rh), air(min(t, 0.0), 0.8)
    short = through_doorway(share, warm, cold)
    long = through_doorway(share + more, warm, cold)
    assert abs(float(long.total_w)) >= abs(float(short.total_w))
    assert float(long.sensible_w) >= float(short.sensible_w)


@given(st.floats(0.3, 4.0), st.floats(0.3, 4.0), st.floats(1.05, 1.6), st.floats(1.05, 1.6), st.floats(0.01, 0.5))
@settings(max_examples=100, deadline=None)
def test_larger_door_and_larger_difference_never_less_flow(w: float, h: float, a: float, b: float, more: float) -> None:
    flow = float(doorway.doorway_flow(w, h, a, b))
    assert flow >= 0.0
    assert float(doorway.doorway_flow(w + more, h, a, b)) >= flow
    assert float(doorway.doorway_flow(w, h + more, a, b)) >= flow
    assert float(doorway.doorway_flow(w, h, max(a, b) + more, min(a, b))) >= flow


def test_open_time_is_counted_and_bounded() -> None:
    assert doorway.open_share(40 / 86400, 12.0, 600 / 86400) == pytest.approx((40 * 12 + 600) / 86400)
    assert doorway.open_share(24 / 86400, 3600.0, 0.0) == pytest.approx(1.0)
    for times in ((25 / 86400, 3600.0, 0.0), (0.0, 0.0, 1.01), (-1e-3, 5.0, 0.5), (np.array([1e-3, 1.0]), 5.0, 0.0)):
        with pytest.raises(OutOfValidity):
            doorway.open_share(*times)


def test_protection_multiplies() -> None:
    assert doorway.let_through([]) == 1.0
    assert doorway.let_through([0.9, 0.5]) == pytest.approx(0.05)
    assert doorway.let_through([np.array([0.0, 0.5]), 0.2]) == pytest.approx([0.8, 0.4])
    with pytest.raises(OutOfValidity):
        doorway.let_through([1.1])


def test_ventilation_recovers_and_dries() -> None:
    fresh, room = air(30.0, 0.6), air(2.0, 0.9)
    plain = doorway.ventilation_heat(0.05, fresh[2], *fresh[:2], *room[:2])
    half = doorway.ventilation_heat(0.05, fresh[2], *fresh[:2], *room[:2], recovery=0.5)
    assert float(half.total_w) == pytest.approx(0.5 * float(plain.total_w))
    dried = doorway.ventilation_heat(0.05, fresh[2], *fresh[:2], *room[:2], dried_to=room[1])
    assert float(dried.latent_w) == float(dried.moisture) == 0.0
    useless = doorway.ventilation_heat(0.05, fresh[2], *fresh[:2], *room[:2], dried_to=0.1)
    assert float(useless.total_w) == float(plain.total_w)
    with pytest.raises(OutOfValidity):
        doorway.ventilation_heat(0.05, fresh[2], *fresh[:2], *room[:2], recovery=1.2)


@pytest.mark.parametrize("wrong", [{"flow": -1.0}, {"specific_volume": 0.0}, {"room_humidity_ratio": -1e-3}])
def test_impossible_air_is_refused(wrong: dict[str, float]) -> None:
    usual = {
        "flow": 1.0, "specific_volume": 0.8, "air_c": 20.0, "air_humidity_ratio": 0.01, "room_c": 2.0,
        "room_humidity_ratio": 0.004,
    }  # fmt: skip
    with pytest.raises(OutOfValidity):
        doorway.exchange_heat(**{**usual, **wrong})


def test_hours_and_draws_go_together() -> None:
    hours = np.linspace(15.0, 35.0, 24)
    got = doorway.air_change_heat(np.full((500, 1), 100.0), 3 / 86400, 0.75, hours, 0.012, np.zeros((500, 1)), 0.003)
    assert got.total_w.shape == (500, 24) and got.moisture.shape == (500, 1)
    assert np.all(np.diff(got.total_w, axis=-1) > 0.0)
