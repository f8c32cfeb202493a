"""What works inside: people, lights, motors, trucks."""

from __future__ import annotations

from coldbox.account.entry import Entry, Input
from coldbox.account.shapes import NOTHING, SECONDS_A_DAY, called, day
from coldbox.project.model import Light, Motor, People
from coldbox.scene import Scene
from coldbox.scene.inside import heat_of_a_person, share_inside

EVAPORATION_J_PER_KG = 2.5e6  # heat of evaporation near 0 °C, moist-air tables


def entries(scene: Scene) -> list[Entry]:
    """Every entry of the group internal, in the order of the file."""
    project = scene.project
    return [
        *(_people(scene, people) for people in project.people),
        *(_lights(light) for light in project.lights),
        *(_motor("motors", motor) for motor in project.motors),
        *(_motor("trucks", truck) for truck in project.trucks),
    ]


def _people(scene: Scene, people: People) -> Entry:
    room = scene.room.temperature_c
    each, latent_each, source = heat_of_a_person(room)
    present = people.count * people.hours.shares()
    hours_a_day = people.hours.hours_per_day()
    return Entry(
        id=f"people.{people.name}",
        group="internal",
        label=called("people", people.name),
        sensible_w=day((each - latent_each) * present),
        latent_w=day(latent_each * present),
        moisture_kg_per_day=latent_each * people.count * hours_a_day / 24.0 * SECONDS_A_DAY / EVAPORATION_J_PER_KG,
        method="people (ASHRAE)",
        source=source,
        formula="n (272 - 6 t_room) over their hours",
        inputs=(
            Input(key="count", label="n", value=people.count, kind="number"),
            Input(key="each_w", label="272 - 6 t_room", value=each, kind="power"),
            Input(key="room_c", label="t_room", value=room, kind="temperature"),
            Input(key="hours_per_day", label="hours a day", value=hours_a_day, kind="number"),
        ),
    )


def _lights(light: Light) -> Entry:
    return Entry(
        id=f"lights.{light.name}",
        group="internal",
        label=called("lights", light.name),
        sensible_w=day(light.power * light.count * light.hours.shares()),
        latent_w=NOTHING,
        moisture_kg_per_day=0.0,
        method="as given",
        source="as-given",
        formula="n P over their hours",
        inputs=(
            Input(key="power_w", label="P of one", value=light.power, kind="power"),
            Input(key="count", label="n", value=light.count, kind="count"),
            Input(key="hours_per_day", label="hours a day", value=light.hours.hours_per_day(), kind="number"),
        ),
    )


def _motor(table: str, motor: Motor) -> Entry:
    share, source = share_inside(motor)
    return Entry(
        id=f"{table}.{motor.name}",
        group="internal",
        label=called(motor.kind or "motor", motor.name),
        sensible_w=day(motor.power * share * motor.count * motor.hours.shares()),
        latent_w=NOTHING,
        moisture_kg_per_day=0.0,
        method=f"as given, {motor.place}",
        source=source,
        formula="n P over their hours, times the share that stays inside",
        inputs=(
            Input(key="power_w", label="P drawn by one", value=motor.power, kind="power"),
            Input(key="count", label="n", value=motor.count, kind="count"),
            Input(key="share_inside", label="share inside", value=share, kind="share"),
            Input(key="hours_per_day", label="hours a day", value=motor.hours.hours_per_day(), kind="number"),
        ),
    )
