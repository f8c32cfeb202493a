"""Heat through the envelope and from the sun: an entry for each surface, and one for the sun on it."""

from __future__ import annotations

from collections.abc import Mapping

import numpy as np

from coldbox.account import allowance, floor, outdoors
from coldbox.account.entry import Entry, Input
from coldbox.account.floor import Floor
from coldbox.account.outdoors import Outdoors
from coldbox.account.shapes import day, steady_mean
from coldbox.physics import periodic, shape
from coldbox.physics.number import FloatArray, Number
from coldbox.record import Record
from coldbox.scene import Scene
from coldbox.scene import body as bodies
from coldbox.scene.draws import matters, most
from coldbox.scene.types import Surface


class SurfaceFact(Record):
    """The outside of a surface beside the air there: below the dew point it sweats. Figures float or (draws, 1)."""

    id: str
    label: str
    behind: str
    coldest_c: Number
    warmest_c: Number
    over_dew_point_k: Number  # least through the day of surface less dew point
    dew_point_c: Number  # in the hour of that least
    bridged: bool  # joints or bolts go through it, colder than this


class Envelope(Record):
    """All that passes through the envelope, and what came out beside it."""

    entries: tuple[Entry, ...]
    ua_w_per_k: Number
    k_w_per_m2k: Number
    facts: Mapping[str, Number]
    surfaces: tuple[SurfaceFact, ...]


def envelope(scene: Scene) -> Envelope:
    """Entries of the groups transmission and sun, UA and K, and facts, all from one solution.

    UA from air to air with the films of ISO 6946, joints and allowance, floors by ISO 13370; K = UA / √(A_i A_e).
    facts: "underfloor_heater_w", "under_floor_centre_c" (heater off), "under_floor_c" (mean, heater on), "bearing_deg"
    where it was not given, as far as the box has them.
    Raises OutOfValidity where a method does not hold.
    """
    surfaces = scene.body.surfaces
    floors = {one.id: floor.floor(scene, one) for one in surfaces if floor.belongs(scene, one)}
    open_air = [one for one in surfaces if one.behind == "outdoors" and one.id not in floors]
    hourly = scene.project.box.sun == "hourly"
    solved = outdoors.solve(scene, open_air) if open_air and hourly else None
    places = {one.id: place for place, one in enumerate(open_air)}
    around = _outdoor_and_room(scene) if open_air else ()
    entries: list[Entry] = []
    ua: Number = 0.0
    for one in surfaces:
        if one.id in floors:
            entries.append(_floor(one, floors[one.id], scene))
            ua = ua + floors[one.id].ua
            continue
        ua = ua + bodies.conductance(one) + one.extra_w_per_k
        if solved is not None and one.id in places:
            entries += _outdoor(scene, solved, places[one.id], around)
        elif one.id in places:
            entries += _allowed(scene, one)
        elif one.behind == "road":
            entries.append(_road(scene, one))
        else:
            entries.append(_steady(scene, one))
    return Envelope(
        entries=tuple(entries),
        ua_w_per_k=ua,
        k_w_per_m2k=shape.k_value(ua, scene.body.inside_area, scene.body.outside_area),
        facts=_facts(scene, floors),
        surfaces=tuple(_fact(scene, one, solved, places) for one in surfaces if one.behind != "ground"),
    )


def entries(scene: Scene) -> list[Entry]:
    """The entries of `envelope`, for who wants nothing else."""
    return list(envelope(scene).entries)


def _facts(scene: Scene, floors: Mapping[str, Floor]) -> dict[str, Number]:
    found: dict[str, Number] = {}
    main = floors.get("floor")
    if main is not None:
        found["under_floor_c"] = main.plane_c
        if main.centre_c is not None:
            found["under_floor_centre_c"] = main.centre_c
        if main.heater_w is not None:
            found["underfloor_heater_w"] = main.heater_w
    if scene.project.box.bearing is None:
        front = next((one for one in scene.body.surfaces if one.azimuth is not None), None)
        if front is not None and front.azimuth is not None:
            found["bearing_deg"] = (front.azimuth - bodies.TURN[front.face]) % 360.0
    return found


def _outdoor(scene: Scene, solved: Outdoors, place: int, around: tuple[Input, ...]) -> list[Entry]:
    one = solved.surfaces[place]
    made = [
        _entry(
            one,
            row(solved.plain_w, place),
            method="outside surface balance and periodic conduction (ISO 13786)",
            source="iso-13786",
            formula="(t_surface - t_room) A / (R + R_si) in the day's mean, delayed and damped by its layers",
            remark=_of_k(one),
            more=(
                *around,
                Input(
                    key="surface_mean_c",
                    label="t_surface, mean without sun",
                    value=steady(solved.mean_surface_c, place),
                    kind="temperature",
                ),
            ),
        )
    ]
    if solved.sunlit(place):
        made.append(_sun(scene, solved, place))
    return made


def _sun(scene: Scene, solved: Outdoors, place: int) -> Entry:
    one = solved.surfaces[place]
    weather = scene.weather
    overcast = weather is not None and weather.sun is not None and weather.sun.overcast
    glass = matters(one.solar_gain)
    sky = "overcast sky" if overcast else "clear sky with tau_b and tau_d (ASHRAE)"
    peak = Input(
        key="peak_irradiance_w_per_m2",
        label="I, brightest hour",
        value=steady(solved.peak_incident, place),
        kind="irradiance",
    )
    shade = Input(key="shade", label="shade", value=one.shade, kind="share")
    if glass:
        inputs: tuple[Input, ...] = (
            Input(key="area_m2", label="A", value=one.area, kind="area"),
            Input(key="solar_gain", label="g", value=one.solar_gain, kind="share"),
            shade,
            peak,
        )
    else:
        inputs = (
            Input(key="area_m2", label="A outside", value=one.outside_area, kind="area"),
            Input(key="absorptance", label="α", value=one.absorptance, kind="share"),
            shade,
            peak,
            Input(
                key="peak_surface_c",
                label="t_surface, warmest hour",
                value=steady(solved.peak_surface_c, place),
                kind="temperature",
            ),
            Input(
                key="peak_sol_air_c",
                label="sol-air temperature then",
                value=steady(solved.peak_sol_air_c, place),
                kind="temperature",
            ),
        )
    return Entry(
        id=f"sun.{one.id}",
        group="sun",
        label=f"sun through {one.label}" if glass else f"sun on {one.label}",
        sensible_w=row(solved.sun_w, place),
        latent_w=_nothing(row(solved.sun_w, place)),
        moisture_kg_per_day=0.0,
        method=sky,
        source="kasten-czeplak-1980" if overcast else "ashrae-f-clear-sky",
        formula="g (1 - shade) I A" if glass else "heat with α (1 - shade) I on the surface, less heat without",
        inputs=inputs,
        remark=_facing(scene, one),
    )


def _allowed(scene: Scene, one: Surface) -> list[Entry]:
    """Steady conduction from the outdoor air, and the handbook's added degrees for the sun."""
    through = bodies.conductance(one) + one.extra_w_per_k
    air = scene.airs["outdoors"].temperature_c
    made = [
        _entry(
            one,
            day(through * (air - scene.room.temperature_c)),
            method="thermal transmittance (ISO 6946)",
            source="iso-6946",
            formula="UA (t_out - t_room), hour by hour",
            remark=_of_k(one),
            more=_outdoor_and_room(scene),
        )
    ]
    added = allowance.added_degrees(scene, one)
    if matters(added):
        heat = day(through * added)
        made.append(
            Entry(
                id=f"sun.{one.id}",
                group="sun",
                label=f"sun on {one.label}",
                sensible_w=heat,
                latent_w=_nothing(heat),
                moisture_kg_per_day=0.0,
                method="added degrees for sun (ASHRAE)",
                source="ashrae-r-loads",
                formula="UA Δt_sun, all day",
                inputs=(
                    Input(key="ua_w_per_k", label="UA", value=through, kind="point_transmittance"),
                    Input(key="added_k", label="Δt_sun", value=added, kind="difference"),
                ),
                remark=_facing(scene, one),
            )
        )
    return made


def _road(scene: Scene, one: Surface) -> Entry:
    """The air beneath a vehicle: outdoor air through the day, out of sun and sky."""
    panel = outdoors.response(one, one.outside_film)
    air = scene.airs["road"].temperature_c
    heat = one.outside_area * periodic.through_day(panel.transfer, day(air), scene.room.temperature_c)
    return _entry(
        one,
        heat,
        method="periodic conduction (ISO 13786)",
        source="iso-13786",
        formula="UA (t_out - t_room) in the day's mean, delayed and damped by its layers",
        remark=_of_k(one) or "outdoor air beneath, out of sun and sky",
        more=_outdoor_and_room(scene),
    )


def _steady(scene: Scene, one: Surface) -> Entry:
    behind = scene.airs[one.behind].temperature_c
    heat = day((bodies.conductance(one) + one.extra_w_per_k) * (behind - scene.room.temperature_c))
    return _entry(
        one,
        heat,
        method="thermal transmittance (ISO 6946)",
        source="iso-6946",
        formula="UA (t_behind - t_room)",
        remark=_of_k(one),
        more=(Input(key="behind_c", label=f"t_behind, {one.behind}", value=behind, kind="temperature"), _room(scene)),
    )


def _floor(one: Surface, found: Floor, scene: Scene) -> Entry:
    label = one.label
    more = [
        Input(key="driven_by_c", label="t beneath, mean", value=found.driven_by_c, kind="temperature"),
        _room(scene),
        Input(key="under_floor_c", label="t beneath the insulation", value=found.plane_c, kind="temperature"),
    ]
    if found.edge is not None:
        more.append(Input(key="exposed_edge_m", label="exposed edge", value=found.edge, kind="length"))
    if found.heater_w is not None:
        idle = most(found.heater_w) <= 0.0
        label = f"{label}, heater idle" if idle else f"{label}, heater on"
        more.append(Input(key="heater_w", label="heater, in all", value=found.heater_w, kind="power"))
    made = _entry(
        one,
        found.heat_w,
        method=found.method,
        source=found.source,
        formula=found.formula,
        remark=found.remark,
        more=tuple(more),
        u=found.u,
    )
    return made if label == one.label else made.replace(label=label)


def _entry(
    one: Surface, heat: FloatArray, *, method: str, source: str, formula: str, remark: str, more: tuple[Input, ...],
    u: Number | None = None,
) -> Entry:  # fmt: skip
    """A transmission entry with the inputs that all have."""
    through = bodies.conductance(one) + one.extra_w_per_k
    inputs = [
        Input(key="area_m2", label="A inside", value=one.area, kind="area"),
        Input(key="effective_area_m2", label="A with edges and corners", value=one.effective_area, kind="area"),
        Input(key="resistance_m2k_per_w", label="R of the layers", value=one.resistance, kind="resistance"),
        Input(key="inside_film_m2k_per_w", label="R_si", value=one.inside_film, kind="resistance"),
        Input(key="u_w_per_m2k", label="U", value=through / one.area if u is None else u, kind="transmittance"),
    ]
    if matters(one.extra_w_per_k):
        extra = Input(
            key="extra_w_per_k", label="joints and allowance", value=one.extra_w_per_k, kind="point_transmittance"
        )
        inputs.append(extra)
    return Entry(
        id=one.id,
        group="transmission",
        label=one.label,
        sensible_w=heat,
        latent_w=_nothing(heat),
        moisture_kg_per_day=0.0,
        method=method,
        source=source,
        formula=formula,
        inputs=(*inputs, *more),
        remark=remark,
    )


def _fact(scene: Scene, one: Surface, solved: Outdoors | None, places: Mapping[str, int]) -> SurfaceFact:
    made = one.construction
    bridged = made is not None and (matters(made.edge_loss) or (made.points > 0 and matters(made.point_loss)))
    place = places.get(one.id)
    if solved is not None and place is not None:
        return SurfaceFact(
            id=one.id,
            label=one.label,
            behind=one.behind,
            coldest_c=steady(solved.coldest_c, place),
            warmest_c=steady(solved.peak_surface_c, place),
            over_dew_point_k=steady(solved.over_dew_point_k, place),
            dew_point_c=steady(solved.dew_point_c, place),
            bridged=bridged,
        )
    # Steady: the surface lies below the air by what the film takes of the whole difference.
    air = scene.airs[one.behind]
    film = bodies.conductance(one) * one.outside_film / one.outside_area
    surface_c = day(air.temperature_c - film * (air.temperature_c - scene.room.temperature_c))
    over = surface_c - air.dew_point_c
    nearest = int(over.reshape(-1, 24).mean(axis=0).argmin())
    return SurfaceFact(
        id=one.id,
        label=one.label,
        behind=one.behind,
        coldest_c=_ends(surface_c.min(axis=-1, keepdims=True)),
        warmest_c=_ends(surface_c.max(axis=-1, keepdims=True)),
        over_dew_point_k=_ends(over.min(axis=-1, keepdims=True)),
        dew_point_c=_ends(day(air.dew_point_c)[..., nearest : nearest + 1]),
        bridged=bridged,
    )


def _facing(scene: Scene, one: Surface) -> str:
    if scene.project.box.bearing is not None or one.azimuth is None:
        return ""
    front = (one.azimuth - bodies.TURN[one.face]) % 360.0
    return f"no bearing given: the front faces {bodies.compass(front)}, the worst of 16"


def _of_k(one: Surface) -> str:
    return "" if one.construction is not None else "its share, by area, of K √(A_i A_e) of the whole body (ATP)"


def _outdoor_and_room(scene: Scene) -> tuple[Input, ...]:
    mean = steady_mean(day(scene.airs["outdoors"].temperature_c))
    return (Input(key="outdoor_mean_c", label="t_out, mean", value=mean, kind="temperature"), _room(scene))


def _room(scene: Scene) -> Input:
    return Input(key="room_c", label="t_room", value=scene.room.temperature_c, kind="temperature")


def _nothing(heat: FloatArray) -> FloatArray:
    return np.zeros(heat.shape)


def row(stacked: FloatArray, place: int) -> FloatArray:
    """One thing of a stack as a figure of the day, (24,) or (draws, 24)."""
    found: FloatArray = stacked[place]
    return found[0] if found.shape[0] == 1 else found


def steady(stacked: FloatArray, place: int) -> Number:
    """One thing of a stack as a steady figure, float or (draws, 1)."""
    found: FloatArray = stacked[place]
    return float(found[0, 0]) if found.shape[0] == 1 else found


def _ends(figure: FloatArray) -> Number:
    return float(figure[0]) if figure.ndim == 1 else figure
