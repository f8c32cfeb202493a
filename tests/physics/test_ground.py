"""Floors on the ground against numerical solutions of the half-space, the standard's own table, and themselves."""

from __future__ import annotations

import numpy as np
import pytest
from half_space import solve
from hypothesis import given
from hypothesis import strategies as st

from coldbox.errors import OutOfValidity
from coldbox.physics import ground

resistances = st.floats(0.2, 12.0)
soils = st.floats(0.8, 4.0)


@pytest.mark.parametrize("resistance", [0.1, 0.5, 2.0, 6.0])
@pytest.mark.parametrize("half", [2.0, 8.0])
def test_slab_u_against_two_dimensions(half, resistance):
    """A long slab: both branches within 8 % of the half-space under a wall of 0.3 m."""
    soil, film = 2.0, 0.17
    *_, whole = solve([half], film + resistance, conductivity=soil, wall=0.3, outside_film=0.04, far=60 * half)
    thick = ground.equivalent_thickness(0.3, soil, film, resistance)
    # Per metre of a strip with two exposed edges.
    assert ground.slab_u(2 * half, 2.0, thick, soil) == pytest.approx(whole, rel=0.08)


@pytest.mark.parametrize("resistance", [0.02, 0.1, 0.5, 1.0, 4.0])
def test_under_the_centre_of_a_strip(resistance):
    """With all of the ground's resistance at stake: half width 1 m, soil of 1 W/(m·K), no wall."""
    surface, *_ = solve([1.0], resistance, fine=0.004, growth=1.15, far=400.0)
    ours = ground.below_slab_centre(1.0, 0.0, resistance, 2.0, 1.0, area=1e9)
    assert ours == pytest.approx(surface, abs=0.01)


@pytest.mark.parametrize("long", [1.0, 3.0])
@pytest.mark.parametrize("resistance", [0.2, 1.0, 4.0])
def test_under_the_centre_of_a_rectangle(long, resistance):
    surface, *_ = solve([1.0, long], resistance, fine=0.05, growth=1.4, far=20.0)
    area, size = 4.0 * long, 4.0 * long / (2.0 * (1.0 + long))
    ours = ground.below_slab_centre(1.0, 0.0, resistance, size, 1.0, area=area)
    assert ours == pytest.approx(surface, abs=0.015)


@pytest.mark.parametrize("wall", [0.1, 0.3])
@pytest.mark.parametrize("resistance", [0.2, 1.0, 4.0])
def test_walls_are_counted_to_the_safe_side(wall, resistance):
    surface, *_ = solve([1.0], resistance, wall=wall, fine=0.005, growth=1.15, far=400.0)
    ours = ground.below_slab_centre(1.0, 0.0, resistance, 2.0, 1.0, area=1e9, edge_wall=wall)
    # 1 is the room: nearer to it is colder ground under a freezer.
    assert surface - 0.003 <= ours <= surface + 0.035


def test_walls_widen_the_rectangle_all_round():
    def under(length, width, wall):
        size = ground.characteristic_dimension(length * width, 2 * (length + width))
        return ground.below_slab_centre(1.0, 0.0, 0.5, size, 1.0, area=length * width, edge_wall=wall)

    assert under(5.0, 3.0, 0.4) == pytest.approx(under(5.8, 3.8, 0.0), rel=1e-12)


@pytest.mark.parametrize("thick", [0.6, 1.0, 2.0, 4.0, 8.0])
@pytest.mark.parametrize("soil, capacity", [(1.5, 3.0e6), (2.0, 2.0e6), (3.5, 2.0e6)])
def test_the_years_wave_against_two_dimensions(thick, soil, capacity):
    """The standard's simple annex: never below the solution, at most 40 % above, its lag 0.1 to 0.4 month later."""
    half, wall = 6.0, 0.3
    storage = 2j * np.pi / 3.15e7 * capacity
    resistance = (thick - wall) / soil - 0.04
    *_, whole = solve([half], resistance, conductivity=soil, wall=wall, outside_film=0.04, far=60.0, storage=storage)
    per_edge = whole * half
    ours = ground.periodic_amplitude_u(1.0, thick, soil, capacity)
    assert abs(per_edge) < ours < 1.4 * abs(per_edge)
    lag = -np.angle(per_edge) / (2 * np.pi) * 12
    assert 0.1 < ground.periodic_lag(thick, soil, capacity) - lag < 0.4


def test_penetration_depth_is_where_the_wave_has_fallen():
    depth = ground.penetration_depth(2.0, 2.0e6)
    wave = np.exp(-(1 + 1j) * depth * np.sqrt(np.pi / 3.15e7 * 2.0e6 / 2.0))
    assert abs(wave) == pytest.approx(np.exp(-1.0), rel=1e-12)


@given(size=st.floats(2.0, 60.0), soil=soils, resistance=resistances)
def test_more_insulation_passes_less(size, soil, resistance):
    thick = ground.equivalent_thickness(0.3, soil, 0.17, resistance)
    more = ground.equivalent_thickness(0.3, soil, 0.17, resistance + 0.5)
    edge = 4.0 * size
    assert ground.slab_u(size**2, edge, more, soil) < ground.slab_u(size**2, edge, thick, soil)


@given(soil=soils, size=st.floats(1.0, 40.0))
def test_the_branches_meet(soil, size):
    """Where d_t = B' the two equations differ by less than 1 %."""
    edge = 4.0 * size
    dimension = ground.characteristic_dimension(size**2, edge)
    bare, insulated = (ground.slab_u(size**2, edge, dimension * (1 + step), soil) for step in (-1e-9, 1e-9))
    assert bare == pytest.approx(insulated, rel=0.01)


def test_suspended_floors():
    given_floor = {"void_height": 0.4, "wall_u": 1.5, "vents": 0.0015, "wind": 4.0}
    u = ground.suspended_u(80.0, 36.0, 0.3, 1.5, **given_floor)
    assert 0.0 < u < 0.3  # the ground can only add resistance
    windy = ground.suspended_u(80.0, 36.0, 0.3, 1.5, **{**given_floor, "wind": 1e6})
    assert windy == pytest.approx(0.3, rel=1e-3)  # blown through: the floor alone
    assert ground.suspended_u(80.0, 36.0, 0.3, 1.5, **given_floor, ground_resistance=2.0) < u


def test_the_month():
    wave = {"amplitude_u": 12.0, "yearly_swing_k": 10.0, "warmest_month": 7, "lag_months": 2.0}
    months = np.arange(1.0, 13.0)
    heat = ground.slab_heat(100.0, 0.2, -20.0, 10.0, month=months, **wave)
    assert heat.mean() == pytest.approx(ground.slab_heat(100.0, 0.2, -20.0, 10.0))
    assert heat.argmax() + 1 == 9
    assert heat.max() - heat.min() == pytest.approx(2 * 120.0)


@given(
    room=st.floats(-40.0, 4.0),
    outdoors=st.floats(-10.0, 30.0),
    held=st.floats(0.0, 8.0),
    resistance=resistances,
    soil=soils,
    size=st.floats(2.0, 40.0),
)
def test_a_held_floor_balances(room, outdoors, held, resistance, soil, size):
    thick = ground.equivalent_thickness(0.2, soil, 0.17, resistance)
    area = size**2
    u = ground.slab_u(area, 4 * size, thick, soil)
    idle = float(ground.slab_heat(area, u, room, outdoors))
    floor = ground.held_floor(area, u, resistance + 0.17, room, held, idle)
    assert floor.heater_w >= 0.0
    assert floor.plane_c >= held - 1e-9
    # What passes to the room is what the heater gives and what the ground gives at that temperature.
    from_ground = area * (outdoors - floor.plane_c) / (1.0 / u - resistance - 0.17)
    assert floor.to_room_w == pytest.approx(floor.heater_w + from_ground, abs=1e-6 * area)
    if floor.heater_w == 0.0:
        assert floor.to_room_w == pytest.approx(idle, abs=1e-6 * area)
    else:
        assert floor.plane_c == pytest.approx(held)


def test_heater_and_idle_floor_meet():
    """Raising the set temperature from where the floor lies by itself starts the heater from nothing."""
    u, room, outdoors = 0.12, -25.0, 10.0
    idle = ground.slab_heat(400.0, u, room, outdoors)
    by_itself = ground.held_floor(400.0, u, 6.0, room, -273.0, idle).plane_c
    held = by_itself + np.array([-1.0, 0.0, 1e-6, 1.0, 2.0])
    floor = ground.held_floor(400.0, u, 6.0, room, held, idle)
    assert floor.heater_w[:2].tolist() == [0.0, 0.0]
    assert floor.heater_w[2] == pytest.approx(0.0, abs=1e-2)
    assert floor.heater_w[4] == pytest.approx(2 * floor.heater_w[3])
    assert floor.to_room_w[0] == pytest.approx(idle)


@given(room=st.floats(-30.0, 0.0), outdoors=st.floats(0.0, 25.0), resistance=resistances, soil=soils)
def test_under_the_slab_lies_between_room_and_outdoors(room, outdoors, resistance, soil):
    below = ground.below_slab_centre(room, outdoors, resistance, 6.0, soil)
    assert room <= below <= outdoors
    wider = ground.below_slab_centre(room, outdoors, resistance, 12.0, soil)
    assert wider <= below + 1e-12
    assert ground.below_slab_centre(room, outdoors, resistance, 6.0, soil, area=1000.0) >= below - 1e-12


def test_draws_and_months_broadcast():
    draws = np.linspace(1.0, 3.0, 5)[:, None]
    thick = ground.equivalent_thickness(0.3, draws, 0.17, 4.0)
    u = ground.slab_u(100.0, 40.0, thick, draws)
    lag = ground.periodic_lag(thick, draws, 2.0e6)
    heat = ground.slab_heat(100.0, u, -20.0, 10.0, amplitude_u=10.0, month=np.arange(12.0), lag_months=lag)
    assert heat.shape == (5, 12)
    assert ground.below_slab_centre(-20.0, 10.0, 4.0, 5.0, draws).shape == (5, 1)
    assert ground.held_floor(100.0, u, 4.0, -20.0, 4.0, heat).heater_w.shape == (5, 12)


@pytest.mark.parametrize(
    "call",
    [
        lambda: ground.characteristic_dimension(100.0, 0.0),
        lambda: ground.slab_u(100.0, np.array([40.0, 0.0]), 3.0, 1.5),
        lambda: ground.slab_u(100.0, 40.0, 0.0, 1.5),
        lambda: ground.below_slab_centre(-20.0, 10.0, 0.0, 5.0, 2.0),
        lambda: ground.held_floor(100.0, 0.2, 5.0, -20.0, 4.0, 300.0),
        lambda: ground.penetration_depth(2.0, 0.0),
    ],
)
def test_outside_its_range_it_refuses(call):
    with pytest.raises(OutOfValidity):
        call()
