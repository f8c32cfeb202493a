"""Heat through the envelope and from the sun: an entry for each surface, and one for the sun on it."""

from __future__ import annotations

from collections.abc import Mapping

import numpy as np

from coldbox.account import outdoors, sun
from coldbox.account.entry import Entry, Input
from coldbox.account.outdoors import Outdoors
from coldbox.account.shapes import day, steady_mean
from coldbox.account.surfaces import SurfaceFact, surface_fact
from coldbox.physics import periodic, shape
from coldbox.physics.number import FloatArray, Number
from coldbox.record import Record
from coldbox.scene import Scene, floor
from coldbox.scene import body as bodies
from coldbox.scene.draws import matters, most
from coldbox.scene.floor import Floor
from coldbox.scene.types import Surface


class Envelope(Record):
    """All that passes through the envelope, and what came out beside it."""

    entries: tuple[Entry, ...]
    ua_w_per_k: Number
    k_w_per_m2k: Number
    facts: Mapping[str, Number]
    surfaces: tuple[SurfaceFact, ...]


def envelope(scene: Scene) -> Envelope:
    """Entries of the groups transmission and sun, UA and K, and facts, all from one solution.

    facts: those of `facts`. Raises OutOfValidity where a method does not hold.
    """
    surfaces, floors = scene.body.surfaces, _floors(scene)
    open_air = [one for one in surfaces if one.behind == "outdoors" and one.id not in floors]
    hourly = scene.project.box.sun == "hourly"
    solved = outdoors.solve(scene, open_air) if open_air and hourly else None
    places = {one.id: place for place, one in enumerate(open_air if solved is None else solved.surfaces)}
    around = _outdoor_and_room(scene) if open_air else ()
    entries: list[Entry] = []
    for one in surfaces:
        if one.id in floors:
            entries.append(_floor(one, floors[one.id], scene))
        elif solved is not None and one.id in places:
            entries += _outdoor(scene, solved, places[one.id], around)
        elif one.id in places:
            entries += _allowed(scene, one)
        elif one.behind == "road":
            entries.append(_road(scene, one))
        else:
            entries.append(_steady(scene, one))
    ua = _ua(scene, floors)
    return Envelope(
        entries=tuple(entries),
        ua_w_per_k=ua,
        k_w_per_m2k=shape.k_value(ua, scene.body.inside_area, scene.body.outside_area),
        facts=_facts(scene, floors),
        surfaces=tuple(surface_fact(scene, one, solved, places) for one in surfaces if one.behind != "ground"),
    )


def entries(scene: Scene) -> list[Entry]:
    """The entries of `envelope`, for who wants nothing else."""
    return list(envelope(scene).entries)


def conductance(scene: Scene) -> tuple[Number, Number]:
    """UA of the box, W/K, and its K coefficient, W/(m²K).

    UA from air to air with the films of ISO 6946, joints and allowance, floors by ISO 13370; K = UA / √(A_i A_e).
    """
    ua = _ua(scene, _floors(scene))
    return ua, shape.k_value(ua, scene.body.inside_area, scene.body.outside_area)


def facts(scene: Scene) -> dict[str, Number]:
    """Further results, as far as the box has them.

    "under_floor_c": beneath the floor's insulation, mean over floor and day, with its heater. "under_floor_centre_c":
    at the centre of a slab on the ground once the ground has settled, heater off. "underfloor_heater_w": mean of the
    day. "bearing_deg": of the front, where the project leaves it open.
    """
    return _facts(scene, _floors(scene))


def _floors(scene: Scene) -> dict[str, Floor]:
    return {one.id: floor.floor(scene, one) for one in scene.body.surfaces if floor.belongs(scene, one)}


def _ua(scene: Scene, floors: Mapping[str, Floor]) -> Number:
    ua: Number = 0.0
    for one in scene.body.surfaces:
        ua = ua + (floors[one.id].ua if one.id in floors else bodies.conductance(one) + one.extra_w_per_k)
    return ua


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
            solved.day(solved.plain_w, place),
            method="periodic (ISO 13786)",
            source="iso-13786",
            formula="(t_surface - t_room) A / (R + R_si) in the day's mean, delayed and damped by its layers",
            remark=_of_k(one),
            more=(
                *around,
                Input(
                    key="surface_mean_c",
                    label="t_surface, mean without sun",
                    value=solved.steady(solved.mean_surface_c, place),
                    kind="temperature",
                ),
            ),
        )
    ]
    if solved.sunlit(place):
        made.append(sun.entry(scene, solved, place))
    return made


def _allowed(scene: Scene, one: Surface) -> list[Entry]:
    """Steady conduction from the outdoor air, and the handbook's added degrees for the sun."""
    through = bodies.conductance(one) + one.extra_w_per_k
    air = scene.airs["outdoors"].temperature_c
    made = [
        _entry(
            one,
            day(through * (air - scene.room.temperature_c)),
            method="U A (ISO 6946)",
            source="iso-6946",
            formula="UA (t_out - t_room), hour by hour",
            remark=_of_k(one),
            more=_outdoor_and_room(scene),
        )
    ]
    sun_part = sun.allowed(scene, one)
    return made if sun_part is None else [*made, sun_part]


def _road(scene: Scene, one: Surface) -> Entry:
    """The air beneath a vehicle: outdoor air through the day, out of sun and sky."""
    panel = outdoors.response(one, one.outside_film)
    air = scene.airs["road"].temperature_c
    heat = one.outside_area * periodic.through_day(panel.transfer, day(air), scene.room.temperature_c)
    return _entry(
        one,
        heat,
        method="periodic (ISO 13786)",
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
        method="U A (ISO 6946)",
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
        latent_w=np.zeros(heat.shape),
        moisture_kg_per_day=0.0,
        method=method,
        source=source,
        formula=formula,
        inputs=(*inputs, *more),
        remark=remark,
    )


def _of_k(one: Surface) -> str:
    return "" if one.construction is not None else "its share, by area, of K √(A_i A_e) of the whole body (ATP)"


def _outdoor_and_room(scene: Scene) -> tuple[Input, ...]:
    mean = steady_mean(day(scene.airs["outdoors"].temperature_c))
    return (Input(key="outdoor_mean_c", label="t_out, mean", value=mean, kind="temperature"), _room(scene))


def _room(scene: Scene) -> Input:
    return Input(key="room_c", label="t_room", value=scene.room.temperature_c, kind="temperature")
