"""Sun entries: hour by hour on each surface, or by the handbook's added degrees."""

from __future__ import annotations

import numpy as np

from coldbox.account.entry import Entry, Input
from coldbox.account.outdoors import Outdoors
from coldbox.account.shapes import day
from coldbox.physics.number import Number
from coldbox.scene import Scene
from coldbox.scene import body as bodies
from coldbox.scene.draws import matters
from coldbox.scene.types import Surface
from coldbox.tables import load

# A wall between two of the table's directions takes the larger figure: it counts for a direction up to this far off.
_REACH = 67.5
_EAST, _WEST = 90.0, 270.0


def entry(scene: Scene, solved: Outdoors, place: int) -> Entry:
    """What the sun adds through one outdoor surface, hour by hour: heat with it less heat without, or through glass."""
    one, heat = solved.surfaces[place], solved.day(solved.sun_w, place)
    weather = scene.weather
    overcast = weather is not None and weather.sun is not None and weather.sun.overcast
    glass = matters(one.solar_gain)
    sky = "overcast sky" if overcast else "clear sky (ASHRAE)"
    peak = Input(
        key="peak_irradiance_w_per_m2",
        label="I, brightest hour",
        value=solved.steady(solved.peak_incident, place),
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
                value=solved.steady(solved.peak_surface_c, place),
                kind="temperature",
            ),
            Input(
                key="peak_sol_air_c",
                label="sol-air temperature then",
                value=solved.steady(solved.peak_sol_air_c, place),
                kind="temperature",
            ),
        )
    return Entry(
        id=f"sun.{one.id}",
        group="sun",
        label=f"sun through {one.label}" if glass else f"sun on {one.label}",
        sensible_w=heat,
        latent_w=np.zeros(heat.shape),
        moisture_kg_per_day=0.0,
        method=sky,
        source="kasten-czeplak-1980" if overcast else "ashrae-f-clear-sky",
        formula="g (1 - shade) I A" if glass else "heat with α (1 - shade) I on the surface, less heat without",
        inputs=inputs,
        remark=_facing(scene, one),
    )


def allowed(scene: Scene, one: Surface) -> Entry | None:
    """What the handbook's added degrees bring in through one outdoor surface, all day; None where there are none."""
    added = added_degrees(scene, one)
    if not matters(added):
        return None
    through = bodies.conductance(one) + one.extra_w_per_k
    heat = day(through * added)
    return Entry(
        id=f"sun.{one.id}",
        group="sun",
        label=f"sun on {one.label}",
        sensible_w=heat,
        latent_w=np.zeros(heat.shape),
        moisture_kg_per_day=0.0,
        method="allowance (ASHRAE)",
        source="ashrae-r-loads",
        formula="UA Δt_sun, all day",
        inputs=(
            Input(key="ua_w_per_k", label="UA", value=through, kind="point_transmittance"),
            Input(key="added_k", label="Δt_sun", value=added, kind="difference"),
        ),
        remark=_facing(scene, one),
    )


def added_degrees(scene: Scene, one: Surface) -> Number:
    """Degrees that stand for the sun on a surface, K; none on floors, in full shade, or under a sky without sun.

    Walls by east, the equator's side (south of the equator the north wall) and west, roofs by their own column, by
    the colour's class; times (1 - shade). They replace sun and sky all day long.
    Source: ASHRAE Handbook, Refrigeration, Refrigerated-facility loads, allowance for sun effect (from memory).
    """
    site = scene.project.site
    if site is None or site.sky != "clear" or one.face == "floor":
        return 0.0
    row = load.row("sun_allowance", str(load.row("colours", _colour(scene, one))["allowance"]))
    if one.face == "ceiling":
        return float(row["roof_k"]) * (1.0 - one.shade)
    if one.azimuth is None:
        return 0.0
    equator = np.where(np.asarray(site.latitude) < 0.0, 0.0, 180.0)
    added = np.zeros(())
    for column, direction in (("east_k", _EAST), ("equator_k", equator), ("west_k", _WEST)):
        off = np.abs((one.azimuth - direction + 180.0) % 360.0 - 180.0)
        added = np.maximum(added, np.where(off <= _REACH, float(row[column]), 0.0))
    found = added * (1.0 - one.shade)
    return found if isinstance(found, np.ndarray) and found.ndim else float(found)


def _colour(scene: Scene, one: Surface) -> str:
    project = scene.project
    if one.role == "face":
        return project.faces[one.face].colour
    things = project.panels if one.role == "panel" else project.doors
    return next(thing.colour for thing in things if one.id.endswith(f".{thing.name}"))


def _facing(scene: Scene, one: Surface) -> str:
    if scene.project.box.bearing is not None or one.azimuth is None:
        return ""
    front = (one.azimuth - bodies.TURN[one.face]) % 360.0
    return f"no bearing given: the front faces {bodies.compass(front)}, the worst of 16"
