"""Floors and the ground: slabs, floors over a void, the year's wave, and what lies beneath a freezer.

The ground is driven by the yearly mean and the yearly wave of the outdoor air, never by a design day: a hot afternoon
does not reach under a floor.
"""

from __future__ import annotations

import math

import numpy as np

from coldbox.physics.number import Number
from coldbox.physics.validity import within
from coldbox.record import Record

_METHOD = "Heat transfer via the ground (ISO 13370)"
_YEAR = 3.15e7  # s, as ISO 13370 rounds it
# The centre of a slab: its ground resistance falls from that of an even floor temperature to 2/π of it, that of an even
# heat flow, as the slab's own resistance grows. Exact at both ends; 0.12 fits a numerical solution within 3 %.
_EVEN_FLOW, _BLEND = 2.0 / math.pi, 0.12


class FloorHeat(Record):
    """A floor with a heater beneath its insulation: watts, and the mean temperature of the heater's plane."""

    to_room_w: Number
    heater_w: Number
    plane_c: Number


def characteristic_dimension(area: Number, exposed_edge: Number) -> Number:
    """Characteristic dimension of a floor, m.

    B' = A / (½ P)

    area: A, m². exposed_edge: P, length of the outline towards outdoors, m. Both broadcast. A floor without an exposed
    edge raises OutOfValidity: it needs a ground temperature instead.
    Source: ISO 13370, eq. 2 (number from memory).
    >>> characteristic_dimension(100.0, 40.0)
    5.0
    """
    within(exposed_edge, 1e-3, 1e6, quantity="the exposed edge", unit="m", method=_METHOD)
    return 2.0 * area / exposed_edge


def equivalent_thickness(
    edge_wall: Number, soil_conductivity: Number, inside_film: Number, resistance: Number, outside_film: Number = 0.04
) -> Number:
    """Thickness of ground that resists as the floor does, m.

    d_t = w + λ (R_si + R_f + R_se)

    edge_wall: w, thickness of the outer wall at the edge, m. soil_conductivity: λ, W/(m·K). inside_film: R_si, m²K/W.
    resistance: R_f of the floor's layers, m²K/W. outside_film: R_se, m²K/W. All broadcast.
    Source: ISO 13370, eq. 3 (number from memory).
    >>> round(float(equivalent_thickness(0.3, 1.5, 0.17, 0.0)), 3)
    0.615
    """
    return edge_wall + soil_conductivity * (inside_film + resistance + outside_film)


def slab_u(area: Number, exposed_edge: Number, equivalent_thickness: Number, soil_conductivity: Number) -> Number:
    """Transmittance of a slab on the ground from room to outdoor air over the year, W/(m²·K).

    U = 2 λ / (π B' + d_t) · ln(π B' / d_t + 1)    d_t < B'
    U = λ / (0.457 B' + d_t)                        otherwise: well insulated

    area: m². exposed_edge: m. equivalent_thickness: d_t, m, above zero. soil_conductivity: λ, W/(m·K). All broadcast.
    Errors as `characteristic_dimension`.
    Source: ISO 13370, eq. 4 and 5 (numbers from memory).
    >>> round(float(slab_u(100.0, 40.0, 0.615, 1.5)), 3)
    0.603
    """
    within(equivalent_thickness, 1e-6, 1e4, quantity="the equivalent thickness", unit="m", method=_METHOD)
    size = characteristic_dimension(area, exposed_edge)
    bare = _bare_u(size, equivalent_thickness, soil_conductivity)
    insulated = soil_conductivity / (0.457 * size + equivalent_thickness)
    found = np.where(np.asarray(equivalent_thickness < size), bare, insulated)
    return found if found.ndim else float(found)


def _bare_u(size: Number, thickness: Number, soil_conductivity: Number) -> Number:
    arc = math.pi * size
    return 2.0 * soil_conductivity / (arc + thickness) * np.log(arc / thickness + 1.0)


def suspended_u(
    area: Number,
    exposed_edge: Number,
    floor_u: Number,
    soil_conductivity: Number,
    *,
    void_height: Number,
    wall_u: Number,
    vents: Number,
    wind: Number,
    edge_wall: Number = 0.3,
    ground_resistance: Number = 0.0,
    film: Number = 0.17,
    shelter: Number = 0.05,
) -> Number:
    """Transmittance of a floor over a vented void from room to outdoor air over the year, W/(m²·K).

    1/U = 1/U_f + 1/(U_g + U_x); U_g = 2 λ / (π B' + d_g) · ln(π B' / d_g + 1), d_g = w + λ (R_s + R_g + 0.04);
    U_x = (2 z U_w + 1450 ε v f_w) / B'

    area: m². exposed_edge: m. floor_u: U_f from room to void, its films included, W/(m²·K). soil_conductivity: λ,
    W/(m·K). void_height: z above ground, m. wall_u: U_w of the void's walls, W/(m²·K). vents: ε, open area per length
    of edge, m²/m. wind: v, yearly mean 10 m up, m/s. edge_wall: w, m. ground_resistance: R_g of insulation on the
    void's ground, m²K/W. film: R_s at that ground, m²K/W. shelter: f_w, 0.02 sheltered, 0.05 average, 0.10 exposed.
    All broadcast. Errors as `characteristic_dimension`.
    Source: ISO 13370, suspended floors, eq. 6 to 9 (from memory).
    >>> round(float(suspended_u(80.0, 36.0, 0.3, 1.5, void_height=0.3, wall_u=1.0, vents=0.002, wind=4.0)), 3)
    0.226
    """
    size = characteristic_dimension(area, exposed_edge)
    ground = equivalent_thickness(edge_wall, soil_conductivity, film, ground_resistance)
    sides = (2.0 * void_height * wall_u + 1450.0 * vents * wind * shelter) / size
    return 1.0 / (1.0 / floor_u + 1.0 / (_bare_u(size, ground, soil_conductivity) + sides))


def penetration_depth(soil_conductivity: Number, soil_heat_capacity: Number) -> Number:
    """Depth at which the year's wave has fallen to 1/e, m.

    δ = √(3.15e7 λ / (π ρc))

    soil_conductivity: λ, W/(m·K). soil_heat_capacity: ρc, J/(m³·K), above zero, else OutOfValidity. Both broadcast.
    Source: ISO 13370, annex on periodic heat flow (from memory); wave in a half-space.
    >>> round(float(penetration_depth(1.5, 3.0e6)), 1)
    2.2
    """
    within(soil_heat_capacity, 1e4, 1e7, quantity="heat capacity of the ground", unit="J/(m³·K)", method=_METHOD)
    found = np.sqrt(_YEAR / math.pi * soil_conductivity / soil_heat_capacity)
    return found if isinstance(found, np.ndarray) else float(found)


def periodic_amplitude_u(
    exposed_edge: Number, equivalent_thickness: Number, soil_conductivity: Number, soil_heat_capacity: Number
) -> Number:
    """Conductance by which the outdoor year's wave reaches the room through a slab, W per K of amplitude.

    H_pe = 0.37 P λ ln(δ / d_t + 1)

    exposed_edge: P, m. equivalent_thickness: d_t, m. soil_conductivity: λ, W/(m·K). soil_heat_capacity: ρc,
    J/(m³·K). All broadcast. Errors as `penetration_depth`.
    Source: ISO 13370, annex on periodic heat flow, slab without edge insulation (from memory).
    >>> round(float(periodic_amplitude_u(40.0, 3.0, 1.5, 3.0e6)), 2)
    12.38
    """
    depth = penetration_depth(soil_conductivity, soil_heat_capacity)
    return 0.37 * exposed_edge * soil_conductivity * np.log(depth / equivalent_thickness + 1.0)


def periodic_lag(equivalent_thickness: Number, soil_conductivity: Number, soil_heat_capacity: Number) -> Number:
    """By how much the heat flow through a slab lags behind the outdoor air's year, months.

    β = 1.5 - 0.42 ln(δ / (d_t + 1))

    equivalent_thickness: d_t, m. soil_conductivity: λ, W/(m·K). soil_heat_capacity: ρc, J/(m³·K). All broadcast.
    Errors as `penetration_depth`.
    Source: ISO 13370, annex on periodic heat flow (from memory).
    >>> round(float(periodic_lag(3.0, 1.5, 3.0e6)), 2)
    1.74
    """
    return 1.5 - 0.42 * np.log(penetration_depth(soil_conductivity, soil_heat_capacity) / (equivalent_thickness + 1.0))


def slab_heat(
    area: Number,
    u: Number,
    room_c: Number,
    annual_mean_c: Number,
    *,
    amplitude_u: Number = 0.0,
    yearly_swing_k: Number = 0.0,
    month: Number = 0.0,
    warmest_month: Number = 0.0,
    lag_months: Number = 0.0,
) -> Number:
    """Heat into the box through a slab in a month of the year, W.

    Q = U A (t_year - t_room) + H_pe · t̂ · cos(2π (m - m_warmest - β) / 12)

    area: m². u: of `slab_u` or `suspended_u`, W/(m²·K). room_c: °C, the same all year. annual_mean_c: of the outdoor
    air, or of the building around a slab inside one, °C. amplitude_u: H_pe of `periodic_amplitude_u`, W/K.
    yearly_swing_k: t̂, half of warmest less coldest monthly mean, K. month, warmest_month: 1..12. lag_months: β of
    `periodic_lag`. All broadcast. With the defaults the mean over the year.
    Source: ISO 13370, annex on monthly heat flow (from memory).
    >>> round(float(slab_heat(100.0, 0.2, -20.0, 10.0, amplitude_u=12.0, yearly_swing_k=9.0, month=8)), 1)
    546.0
    """
    wave = np.cos(math.pi / 6.0 * (month - warmest_month - lag_months))
    return u * area * (annual_mean_c - room_c) + amplitude_u * yearly_swing_k * wave


def below_slab_centre(
    room_c: Number,
    annual_mean_c: Number,
    resistance_above: Number,
    characteristic: Number,
    soil_conductivity: Number,
    *,
    area: Number | None = None,
    edge_wall: Number = 0.0,
) -> Number:
    """Temperature under the insulation at the centre of a slab once the ground has settled, °C.

    t = t_room + (t_year - t_room) R / (R + R_g)
    R_g = R_0 · (2/π + (1 - 2/π) · 0.12 / (0.12 + R / R_0)), R_0 = π/2 · a b / (λ √(a² + b²))

    a and b are half the sides of the floor to the outer face of its walls. R_0 is exact for the centre of a rectangle
    at an even temperature on a half-space with the ground around it at another: ∫ over the ground outside of Δt/r³.
    R_0 · 2/π is exact for a long strip or a disc through which heat flows evenly, which thick insulation sees to.
    Between the two it follows numerical solutions of strips and rectangles within 3 %; counting the outer walls as
    floor makes R_g up to 10 % larger and the ground colder, the safe side for frost.

    room_c: °C. annual_mean_c: °C, outdoors. resistance_above: R from the room's air to that depth, film included,
    m²K/W. characteristic: B', m. soil_conductivity: λ, W/(m·K). area: of the floor, m²; with B' it tells the sides
    of the rectangle. Without it, or where part of the outline is not exposed, a square of that B': again the safe
    side. edge_wall: thickness of the outer walls, m. All broadcast. Valid for R and λ above zero, else OutOfValidity.
    Source: closed forms of the half-space, derived here; the tests hold it against numerical solutions in 2-D and 3-D.
    >>> round(float(below_slab_centre(-25.0, 8.0, 5.0, 5.0, 2.0, area=100.0)), 1)
    -0.8
    """
    within(resistance_above, 1e-6, 1e4, quantity="resistance above", unit="m²K/W", method="The ground under a slab")
    within(soil_conductivity, 0.05, 20.0, quantity="conductivity of the ground", unit="W/(m·K)", method=_METHOD)
    square = 4.0 * characteristic**2
    floor = square if area is None else np.maximum(area, square)
    # Half sides: their product, their sum and the sum of their squares; then each longer by the wall.
    product, total = 0.25 * floor, 0.5 * floor / characteristic
    squares = total**2 - 2.0 * product
    product = product + edge_wall * (total + edge_wall)
    squares = squares + 2.0 * edge_wall * (total + edge_wall)
    even = 0.5 * math.pi * product / (soil_conductivity * np.sqrt(squares))
    blend = _BLEND / (_BLEND + resistance_above / even)
    ground = even * (_EVEN_FLOW + (1.0 - _EVEN_FLOW) * blend)
    return room_c + (annual_mean_c - room_c) * resistance_above / (resistance_above + ground)


def held_floor(
    area: Number, u: Number, resistance_above: Number, room_c: Number, held_at_c: Number, idle_heat_w: Number
) -> FloorHeat:
    """A slab whose plane beneath the insulation a heater holds at no less than a temperature.

    t_idle = t_room + Q_idle R / A;  t = max(t_idle, t_held);  to room = A (t - t_room) / R
    from ground = Q_idle - A (t - t_idle) / (1/U - R);  heater = to room - from ground, zero when idle

    The ground's own resistance is what the slab's U has beyond R, so at the edge of idling both states agree. Only what
    passes to the room is its load, and that once; what the heater loses to the ground is in its watts alone.

    area: A, m². u: U of `slab_u`, W/(m²·K). resistance_above: R from the room's air to the heater's plane, m²K/W, less
    than 1/U. room_c, held_at_c: °C. idle_heat_w: Q_idle, of `slab_heat` in the month looked at, W. All broadcast.
    Result: W and °C. A resistance of 1/U or more raises OutOfValidity.
    Source: ISO 13370's resistances in series, split at the heater's plane; derived here.
    >>> float(held_floor(100.0, 0.15, 5.0, -20.0, 4.0, 300.0).to_room_w)
    480.0
    """
    within(resistance_above * u, 1e-6, 1.0 - 1e-9, quantity="resistance above, of all", unit="", method=_METHOD)
    idle_c = room_c + idle_heat_w * resistance_above / area
    plane_c = np.maximum(idle_c, held_at_c)
    raised = plane_c - idle_c
    return FloorHeat(
        to_room_w=area * (plane_c - room_c) / resistance_above,
        heater_w=area * raised * (1.0 / resistance_above + 1.0 / (1.0 / u - resistance_above)),
        plane_c=plane_c,
    )
