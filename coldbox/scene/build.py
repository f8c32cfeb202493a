"""From a project to its scene: the body, the air around and in it, the design day."""

from __future__ import annotations

from coldbox.physics import moist_air
from coldbox.physics.number import Number
from coldbox.project.model import Project
from coldbox.scene import air
from coldbox.scene.about import about
from coldbox.scene.bearing import worst_bearing
from coldbox.scene.body import body, turned
from coldbox.scene.types import Air, Scene
from coldbox.scene.weather import weather

_DRIER = 'Write drier or wetter air for the hottest hour, or sky = "overcast", which needs no dew point.'


def build(project: Project) -> Scene:
    """Everything the account and the timeline start from.

    Pressure follows the site's altitude (sea level without a site). Behind a face named "road" or "void" lies the
    outdoor air, without sun and without sky: under a vehicle, or in a vented hollow under a floor. A box in the sun
    without a bearing faces the worst of 16: its surfaces carry that azimuth.
    """
    pressure: Number = moist_air.pressure_at_altitude(0.0 if project.site is None else project.site.altitude)
    with about(project, ("site.humidity", "site.wet_bulb", "site.place"), _DRIER, quantity="the dew point"):
        outdoors = None if project.site is None else weather(project.site, pressure)
    envelope = body(project)
    airs: dict[str, Air] = {
        name: air.state(room.temperature, room.humidity, pressure) for name, room in project.neighbours.items()
    }
    if outdoors is not None:
        airs |= dict.fromkeys(("outdoors", "void", "road"), outdoors.air)
        if project.box.bearing is None:
            facing = worst_bearing(envelope, outdoors)
            envelope = envelope if facing is None else turned(envelope, facing)
    return Scene(
        project=project,
        body=envelope,
        pressure=pressure,
        weather=outdoors,
        room=air.state(project.box.temperature, project.box.humidity, pressure),
        airs=airs,
    )
