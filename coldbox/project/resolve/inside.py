"""What gives off heat inside: people, lights, motors, heaters, quoted figures, the machine's own fans and defrost."""

from __future__ import annotations

import math
from typing import Any

from coldbox.project.model import Box, Heater, Light, Machine, Motor, People, Quoted
from coldbox.project.raw import Block
from coldbox.project.resolve.body import listed
from coldbox.project.resolve.reader import Reader, Work
from coldbox.project.resolve.rows import by_room, row
from coldbox.tables import load
from coldbox.units.clock import ALWAYS

COIL_BELOW_ROOM_K = 6.0  # how much colder than the room an evaporator usually is
AIR_DEFROSTS_FROM_C = 2.0  # a room this warm still melts the frost of its coil by itself


def people(work: Work, block: Block, name: str) -> People:
    reader = Reader(work, "people", block.path, block)
    count = reader.need("count", "Write how many people, such as 2.")
    hours = reader.given("hours")
    if hours is None:
        reader.missing("hours", 'Write when they are inside, such as "07:00-17:00 25 %".')
    return People(name=name, count=float(count), hours=ALWAYS if hours is None else hours)


def light(work: Work, block: Block, name: str) -> Light:
    reader = Reader(work, "lights", block.path, block)
    power = reader.need("power", 'Write the power of one lamp, such as "40 W".')
    return Light(name=name, power=power, count=reader.value("count"), hours=reader.value("hours"))


def motor(work: Work, block: Block, name: str) -> Motor:
    """A motor, or a truck: what it draws while it runs."""
    reader = Reader(work, block.table, block.path, block)
    return Motor(
        name=name,
        kind=reader.given("kind") or {"motors": "motor", "trucks": "truck"}[block.table],
        power=reader.need("power", 'Write the power of one, such as "1.2 kW".'),
        count=reader.value("count"),
        hours=reader.value("hours"),
        place=reader.value("place"),
    )


def heater(work: Work, block: Block, name: str, floor_behind: str) -> Heater:
    reader = Reader(work, "heaters", block.path, block)
    kind, power, held_at = reader.given("kind"), reader.given("power"), reader.given("held_at")
    if power is not None and held_at is not None:
        reader.problem("held_at", "Power and held_at exclude each other: when it is held, its power is a result.")
    elif power is None and held_at is None:
        such = 'or the temperature the floor is held_at, such as "5 °C"' if kind == "underfloor" else 'such as "50 W"'
        reader.missing("power", f"Write its power, {such}.")
        power = math.nan
    if held_at is not None and kind in ("drain", "relief port"):
        reader.problem("held_at", f"Only an underfloor heater holds a temperature; a {kind} heater has a power.")
    if held_at is not None and floor_behind not in ("ground", "void", "road", "outdoors"):
        reader.problem(
            "held_at", f'Under this floor is "{floor_behind}", a room: there is no ground to hold from freezing.'
        )
    return Heater(
        name=name, kind=kind, power=power, held_at=held_at, hours=reader.value("hours"), to_room=reader.value("to_room")
    )


def quoted(work: Work, block: Block, name: str) -> Quoted:
    """A printed figure. What it replaces is looked up by the account, which knows the names of its entries."""
    reader = Reader(work, "quoted", block.path, block)
    return Quoted(
        name=name,
        group=reader.given("group") or "internal",
        power=reader.need("power", 'Write the printed figure, such as "1.2 kW".'),
        hours=reader.value("hours"),
        latent=reader.value("latent"),
        replaces=listed(reader.given("replaces")),
        source=reader.given("source") or "",
    )


def machine(work: Work, block: Block | None, box: Box) -> Machine:
    """Fans and defrost: its own figures, or declared shares until they are known."""
    reader = Reader(work, "machine", "machine", block)
    cooled = box.powered
    defrost: Any = reader.given("defrost") or _usual_defrost(reader, box)
    fans = reader.given("fans")
    fan_power = reader.given("fan_power")
    if fans and fan_power is None:
        reader.missing("fan_power", 'Write the power of one fan, such as "110 W".')
        fan_power = math.nan
    if fan_power is not None and fans is None:
        reader.missing("fans", "fan_power is that of one fan: write how many there are.")
    power = reader.given("defrost_power")
    if defrost in ("none", "air") and power is not None:
        reader.problem("defrost_power", f'A defrost of kind "{defrost}" has no heaters: write defrost = "electric".')
    return Machine(
        unit=reader.given("unit"),
        capacity=reader.given("capacity"),
        band=(reader.value if cooled else reader.quiet)("band"),
        fans=fans or 0,
        fan_power=0.0 if fan_power is None else fan_power,
        fan_share=_fan_share(reader, box, fans),
        defrost=defrost,
        defrost_at=_defrost_at(reader, defrost),
        defrost_time=(reader.quiet if defrost == "none" else reader.value)("defrost_time"),
        defrost_power=power,
        defrost_share=_defrost_share(reader, defrost, power),
        defrost_to_room=(reader.quiet if power is None else reader.value)("defrost_to_room"),
    )


def _usual_defrost(reader: Reader, box: Box) -> str:
    if not box.powered:
        return "none"
    coil = box.temperature - COIL_BELOW_ROOM_K
    if coil > 0:
        return str(reader.fall("defrost", "none", "none", f"a coil at about {coil:g} °C does not freeze"))
    if box.temperature >= AIR_DEFROSTS_FROM_C:
        return str(reader.fall("defrost", "air", "air", f"a room at {box.temperature:g} °C melts the frost by itself"))
    return str(reader.fall("defrost", "electric", "electric", f"a room at {box.temperature:g} °C melts no frost"))


def _fan_share(reader: Reader, box: Box, fans: Any) -> Any:
    """0 once fans are given, and for a box that nothing cools."""
    if fans is not None:
        if "fan_share" in reader.typed:
            reader.problem("fan_share", "The fans are given: their share of the load is a result. Keep one of them.")
        return 0.0
    if not box.powered:
        return reader.given("fan_share") or 0.0
    name, found = by_room("fans", float(box.temperature))
    return reader.fall(
        "fan_share", found["share"], f"{100 * found['share']:g} %", f"usual in {name}, until fans are given"
    )


def _defrost_share(reader: Reader, defrost: str, power: Any) -> Any:
    """0 once a power is given, and where nothing is heated."""
    if power is not None:
        if "defrost_share" in reader.typed:
            reader.problem(
                "defrost_share", "defrost_power is given: its share of the load is a result. Keep one of them."
            )
        return 0.0
    share = row("defrost", defrost)["share"]
    if not share:
        return reader.given("defrost_share") or 0.0
    return reader.fall(
        "defrost_share", share, f"{100 * share:g} %", f"usual with {defrost} defrost, until a power is given"
    )


def _defrost_at(reader: Reader, defrost: str) -> tuple[float, ...]:
    """The clock times typed, else so many as are usual, evenly through the day."""
    if reader.has("defrost_at"):
        times = tuple(reader.given("defrost_at"))
        if defrost == "none" and times:
            reader.problem("defrost_at", 'Nothing is defrosted with defrost = "none": take these times away.')
        return times
    count = row("defrost", defrost)["defrosts_per_day"]
    if not count:
        return ()
    return tuple(
        reader.fall("defrost_at", tuple(24.0 / count * one for one in range(count)), f"{count} a day, evenly", "usual")
    )


def usual_run_hours(defrost: str, temperature: float) -> tuple[float, str]:
    """Hours a day a machine may run, by its defrost and the side of 0 °C its coil is on, and which row says so."""
    coil = "above 0 °C" if temperature - COIL_BELOW_ROOM_K > 0 else "below 0 °C"
    rows = [(name, found) for name, found in load.rows("run_hours").items() if found["defrost"] == defrost]
    name, found = next(((name, found) for name, found in rows if found["coil"] == coil), rows[0])
    return found["hours"], name
