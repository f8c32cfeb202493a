"""Sun entries: hour by hour on each surface, or by the handbook's added degrees."""

from __future__ import annotations

import numpy as np

from coldbox.account.entry import Entry, Input
from coldbox.account.outdoors import Outdoors
from coldbox.account.shapes import day
from coldbox.scene import Scene
from coldbox.scene import body as bodies
from coldbox.scene.draws import matters
from coldbox.scene.sun_allowance import added_degrees
from coldbox.scene.types import Surface


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


def _facing(scene: Scene, one: Surface) -> str:
    if scene.project.box.bearing is not None or one.azimuth is None:
        return ""
    front = (one.azimuth - bodies.TURN[one.face]) % 360.0
    return f"no bearing given: the front faces {bodies.compass(front)}, the worst of 16"
