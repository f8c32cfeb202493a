"""Floors: on the ground, over a void, and with a heater under them."""

from __future__ import annotations

import numpy as np

from coldbox.physics import ground
from coldbox.physics.number import FloatArray, Number
from coldbox.project.model import Heater
from coldbox.record import Record
from coldbox.scene.body import conductance
from coldbox.scene.constructions import inside_of_foam
from coldbox.scene.draws import most
from coldbox.scene.hours import day, steady_mean
from coldbox.scene.types import Scene, Surface
from coldbox.tables import load

# A vented void under a floor, where the project says no more: usual building practice, after ISO 13370 (from memory).
VOID_HEIGHT = 0.3  # m above ground
VOID_WALL_U = 1.5  # W/(m²K)
VOID_VENTS = 0.0015  # m² of opening per m of edge


class Floor(Record):
    """What passes through one stretch of floor, and how that came about."""

    heat_w: FloatArray  # (…, 24) into the room
    ua: Number  # W/K from the room to what drives it
    u: Number  # the same per m²
    method: str
    source: str
    formula: str
    driven_by_c: Number  # daily mean of what is beneath
    edge: Number | None  # exposed edge, m
    above: Number  # m²K/W from the room's air to beneath the insulation
    centre_c: Number | None  # beneath the insulation at the centre of a slab on the ground, heater off
    plane_c: Number  # beneath the insulation, mean over floor and day, heater on
    heater_w: Number | None  # mean of the day; None: no heater
    remark: str = ""


def belongs(scene: Scene, one: Surface) -> bool:
    """Whether a surface is a floor that this page computes: on ground, over a void, or heated."""
    return one.behind in ("ground", "void") or (one.id == "floor" and bool(heaters(scene)))


def heaters(scene: Scene) -> list[Heater]:
    """Underfloor heaters that hold a temperature."""
    return [one for one in scene.project.heaters if one.kind == "underfloor" and one.held_at is not None]


def floor(scene: Scene, one: Surface) -> Floor:
    """Heat through a floor into the room, and with a heater its watts.

    Slab: ISO 13370 by the year's mean and the year's wave in the design month, never by the design day. Without an
    exposed edge only w of ground lies between the slab and the ground temperature: the upper bound.
    Void: ISO 13370, suspended floor, its air between the ground at the year's mean and the day's outdoor air.
    A heater holds the plane beneath the insulation at no less than its temperature; only what passes from there to the
    room is counted.
    """
    found = idle(scene, one)
    held = heaters(scene)
    return found if not held or one.id != "floor" else _heated(scene, one, found, held)


def idle(scene: Scene, one: Surface) -> Floor:
    """The same with every heater off."""
    if one.behind == "ground":
        return _slab(scene, one)
    return _void(scene, one) if one.behind == "void" else _over_air(scene, one)


def _slab(scene: Scene, one: Surface) -> Floor:
    project, body, site = scene.project, scene.body, scene.project.site
    assert site is not None, "nothing on the ground without a site"
    lies, room_c = project.faces["floor"], scene.room.temperature_c
    soil = load.row("soils", lies.soil)
    conductivity = float(soil["conductivity"])
    edge: Number = body.perimeter if lies.exposed_edge is None else lies.exposed_edge
    # Joints and allowance lie beside the layers, the ground is behind both.
    layers = 1.0 / (1.0 / one.resistance + one.extra_w_per_k / one.area)
    above = one.inside_film + inside_of_foam(one.sheets) * layers / one.resistance
    thickness = ground.equivalent_thickness(lies.edge_wall, conductivity, one.inside_film, layers)
    year_c = site.ground_temperature
    if most(edge) == 0.0:
        u: Number = conductivity / thickness
        heat = u * one.area * (year_c - room_c)
        centre: Number = room_c + (year_c - room_c) * above * u
        remark = "no edge borders the outdoors: the ground right under the slab stays at its own temperature"
    else:
        share = one.area / body.floor_area
        u = ground.slab_u(body.floor_area, edge, thickness, conductivity)
        capacity = float(soil["heat_capacity"])
        heat = ground.slab_heat(
            one.area,
            u,
            room_c,
            year_c,
            amplitude_u=share * ground.periodic_amplitude_u(edge, thickness, conductivity, capacity),
            yearly_swing_k=site.yearly_swing,
            month=float(site.month),
            warmest_month=np.where(np.asarray(site.latitude) < 0.0, 1.0, 7.0),
            lag_months=ground.periodic_lag(thickness, conductivity, capacity),
        )
        size = ground.characteristic_dimension(body.floor_area, edge)
        centre = ground.below_slab_centre(
            room_c, year_c, above, size, conductivity, area=body.floor_area, edge_wall=lies.edge_wall
        )
        remark = ""
    return Floor(
        heat_w=day(heat),
        ua=u * one.area,
        u=u,
        method="slab on ground (ISO 13370)",
        source="iso-13370",
        formula="U A (t_year - t_room) + H_pe t_swing cos(2 pi (m - m_warmest - lag) / 12)",
        driven_by_c=year_c,
        edge=edge,
        above=above,
        centre_c=centre,
        plane_c=room_c + heat * above / one.area,
        heater_w=None,
        remark=remark,
    )


def _void(scene: Scene, one: Surface) -> Floor:
    project, body, site = scene.project, scene.body, scene.project.site
    assert site is not None and scene.weather is not None, "no void without a site"
    lies, room_c, year_c = project.faces["floor"], scene.room.temperature_c, site.ground_temperature
    edge: Number = body.perimeter if lies.exposed_edge is None else lies.exposed_edge
    u_floor, above = through(one)
    if most(edge) == 0.0:
        void_c: Number = year_c
        u = u_floor
        remark = "no edge borders the outdoors: the void stays at the ground's temperature"
    else:
        to_both, to_ground = void_onwards(scene, u_floor)
        outdoors = (to_both - to_ground) * scene.weather.air.temperature_c
        void_c = (u_floor * room_c + to_ground * year_c + outdoors) / (u_floor + to_both)
        u = 1.0 / (1.0 / u_floor + 1.0 / to_both)
        remark = (
            f"void {VOID_HEIGHT * 1000:.0f} mm high, its walls {VOID_WALL_U:g} W/m²K, vents"
            f" {VOID_VENTS * 1e6:.0f} mm² for each metre of edge: usual building practice"
        )
    heat = day(u_floor * one.area * (void_c - room_c))
    mean = steady_mean(day(void_c))
    return Floor(
        heat_w=heat,
        ua=u * one.area,
        u=u_floor,
        method="suspended floor (ISO 13370)",
        source="iso-13370",
        formula="U_f A (t_void - t_room); t_void between ground at the year's mean and outdoor air",
        driven_by_c=mean,
        edge=edge,
        above=above,
        centre_c=None,
        plane_c=room_c + (mean - room_c) * above * u_floor,
        heater_w=None,
        remark=remark,
    )


def void_onwards(scene: Scene, floor_u: Number) -> tuple[Number, Number]:
    """From a vented void to ground and outdoors together, and to the ground alone, W/(m²K) of floor.

    floor_u: from room to void, W/(m²K). For a floor with an exposed edge.
    """
    body, site, lies = scene.body, scene.project.site, scene.project.faces["floor"]
    assert site is not None, "no void without a site"
    edge: Number = body.perimeter if lies.exposed_edge is None else lies.exposed_edge
    conductivity = float(load.row("soils", lies.soil)["conductivity"])

    def onwards(wall_u: float, vents: float) -> Number:
        whole = ground.suspended_u(
            body.floor_area, edge, floor_u, conductivity, void_height=VOID_HEIGHT, wall_u=wall_u, vents=vents,
            wind=site.wind, edge_wall=lies.edge_wall,
        )  # fmt: skip
        return 1.0 / (1.0 / whole - 1.0 / floor_u)

    return onwards(VOID_WALL_U, VOID_VENTS), onwards(0.0, 0.0)


def _over_air(scene: Scene, one: Surface) -> Floor:
    room_c, beneath_c = scene.room.temperature_c, scene.airs[one.behind].temperature_c
    u, above = through(one)
    mean = steady_mean(day(beneath_c))
    return Floor(
        heat_w=day(u * one.area * (beneath_c - room_c)),
        ua=u * one.area,
        u=u,
        method="heated floor, steady (ISO 6946)",
        source="iso-6946",
        formula="U A (t_beneath - t_room)",
        driven_by_c=mean,
        edge=None,
        above=above,
        centre_c=None,
        plane_c=room_c + (mean - room_c) * above * u,
        heater_w=None,
    )


def through(one: Surface) -> tuple[Number, Number]:
    """U from air to air and the resistance from the room's air to beneath the insulation, both per m² inside."""
    layers = conductance(one)
    u = (layers + one.extra_w_per_k) / one.area
    share = (one.inside_film / one.area + inside_of_foam(one.sheets) / one.effective_area) * layers
    return u, share / u


def _heated(scene: Scene, one: Surface, idle: Floor, held: list[Heater]) -> Floor:
    room_c, heat, watts = scene.room.temperature_c, idle.heat_w, day(0.0)
    for heater in held:
        assert heater.held_at is not None
        warm = ground.held_floor(one.area, idle.u, idle.above, room_c, heater.held_at, idle.heat_w)
        on = heater.hours.shares()
        heat = np.maximum(heat, idle.heat_w + on * (warm.to_room_w - idle.heat_w))
        watts = np.maximum(watts, on * warm.heater_w)
    plane = room_c + steady_mean(heat) * idle.above / one.area
    return idle.replace(
        heat_w=heat,
        plane_c=plane,
        heater_w=steady_mean(watts),
        formula="A (max(t_idle, t_held) - t_room) / R_above; t_idle from " + idle.formula,
    )
