"""Random boxes that a technician could have: as project files in SI or IP units, and as projects made straight away.

A file is written from one set of figures in SI, with conversion factors that do not come from the program. The figures
stay within what the rules of the file allow, so every one of them is a valid project.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from typing import Any, NamedTuple

import boxes
from hypothesis import strategies as st

from coldbox.project import codec, shop
from coldbox.project.model import Project
from coldbox.project.resolve import resolve
from coldbox.units.clock import Rate, Schedule, Span

FOOT, POUND, BTU = 0.3048, 0.45359237, 1055.05585262
HOUR, DAY = 3600.0, 86400.0
RANKINE = 1 / 1.8
UNITS: Mapping[str, tuple[tuple[str, float], tuple[str, float]]] = {
    "length": (("mm", 1e-3), ("in", FOOT / 12)),
    "altitude": (("m", 1.0), ("ft", FOOT)),
    "difference": (("K", 1.0), ("°F", RANKINE)),
    "power": (("W", 1.0), ("Btu/h", BTU / HOUR)),
    "mass": (("kg", 1.0), ("lb", POUND)),
    "mass_rate": (("kg/day", 1 / DAY), ("lb/day", POUND / DAY)),
    "share": (("%", 0.01), ("%", 0.01)),
    "an_hour": (("/h", 1 / HOUR), ("/h", 1 / HOUR)),
    "a_day": (("/day", 1 / DAY), ("/day", 1 / DAY)),
    "minutes_a_day": (("min/day", 60 / DAY), ("h/day", HOUR / DAY)),
    "duration": (("s", 1.0), ("min", 60.0)),
    "speed": (("m/s", 1.0), ("mph", 5280 * FOOT / HOUR)),
    "conductivity": (("W/mK", 1.0), ("Btu·in/h·ft²·°F", BTU / HOUR * FOOT / 12 / FOOT**2 / RANKINE)),
    "transmittance": (("W/m²K", 1.0), ("Btu/h·ft²·°F", BTU / HOUR / FOOT**2 / RANKINE)),
    "line": (("W/mK", 1.0), ("Btu/h·ft·°F", BTU / HOUR / FOOT / RANKINE)),
    "flow": (("m³/h", 1 / HOUR), ("cfm", FOOT**3 / 60)),
    "gasket": (("m³/h per m", 1 / HOUR), ("cfm/ft", FOOT**2 / 60)),
    "specific_heat": (("kJ/kgK", 1e3), ("Btu/lb·°F", BTU / POUND / RANKINE)),
    "latent_heat": (("kJ/kg", 1e3), ("Btu/lb", BTU / POUND)),
}


class Q(NamedTuple):
    """A figure in SI, and what it is a figure of."""

    value: float
    kind: str

    def typed(self, system: str) -> str:
        if self.kind == "temperature":
            return f"{self.value!r} °C" if system == "SI" else f"{self.value * 1.8 + 32.0!r} °F"
        unit, factor = UNITS[self.kind][system == "IP"]
        return f"{self.value / factor!r}{'' if unit[0] == '/' else ' '}{unit}"


Order = Callable[[list[Any]], None]  # what puts a list into another order
File = dict[str, Any]  # tables by name; a named table is a mapping of blocks, a list of tables a list


def written(file: File, system: str = "SI", order: Order | None = None) -> str:
    """The file as TOML in SI or IP units; with `order`, tables, blocks and keys in another order."""
    parts = []
    for table, content in _mixed(file["tables"].items(), order):
        if isinstance(content, list):
            parts += [f"[[{table}]]\n{_keys(block, system, order)}" for block in _mixed(content, order)]
        elif table in ("constructions", "neighbours", "faces"):
            parts += [
                f"[{table}.{name}]\n{_keys(block, system, order)}" for name, block in _mixed(content.items(), order)
            ]
        else:
            parts.append(f"[{table}]\n{_keys(content, system, order)}")
    return f'format = 1\nname = "a box"\nunits = "{system}"\n' + "\n".join(parts)


def _mixed(things: Any, order: Order | None) -> list[Any]:
    found = list(things)
    if order is not None:
        order(found)
    return found


def _keys(block: Mapping[str, Any], system: str, order: Order | None) -> str:
    return "".join(f"{key} = {_value(value, system)}\n" for key, value in _mixed(block.items(), order))


def _value(value: Any, system: str) -> str:
    if isinstance(value, Q):
        return f'"{value.typed(system)}"'
    if isinstance(value, bool):
        return str(value).lower()
    if isinstance(value, int | float):
        return str(value)
    if isinstance(value, list):
        return f"[{', '.join(_value(one, system) for one in value)}]"
    if isinstance(value, dict):
        return f"{{ {', '.join(f'{key} = {_value(one, system)}' for key, one in value.items())} }}"
    return f'"{value}"'


def project(text: str) -> Project:
    """The project of a file that was never written to disk."""
    raw, problems = codec.read(text, "a-box.toml")
    return resolve(raw, problems, shop.library("a-box.toml"))


# Figures

ROOMS = ("hall", "kitchen", "loft")
PRODUCTS = ("milk", "lettuce", "cod", "strawberries", "ice cream", "beef carcass", "carrots")
HOURS = ("always", "06:00-18:00", "05:30-09:00, 21:00-23:00 50 %", "22:00-04:00")
COLOURS = ("white", "light", "medium", "dark")


def figure(kind: str, low: float, high: float, digits: int = 4) -> st.SearchStrategy[Q]:
    """A figure between two in SI, rounded so that failures read well."""
    return st.floats(low, high).map(lambda value: Q(round(value, digits), kind))


def temperature(low: float, high: float) -> st.SearchStrategy[Q]:
    return figure("temperature", low, high, 1)


@st.composite
def layers(draw: st.DrawFn) -> list[dict[str, Any]]:
    """Foam between sheets, foam on masonry, or foam behind a calm air space."""
    foam: dict[str, Any] = {
        "material": draw(st.sampled_from(("PIR foam", "EPS foam"))),
        "thickness": draw(figure("length", 0.03, 0.2, 3)),
    }
    if draw(st.booleans()):
        foam |= {"conductivity": draw(figure("conductivity", 0.02, 0.045)), "ageing": draw(figure("share", 0, 0.3, 2))}
    around = draw(
        st.sampled_from(
            (
                {"material": "steel sheet", "thickness": Q(0.0006, "length")},
                {"material": "concrete", "thickness": Q(0.12, "length")},
                {"material": "air space", "thickness": Q(0.02, "length")},
            )
        )
    )
    return [around, foam, {"material": "steel sheet", "thickness": Q(0.0005, "length")}]


@st.composite
def files(draw: st.DrawFn, *, outdoors: bool = True, room: tuple[float, float] = (-30.0, 14.0)) -> File:
    """A whole project file. `outdoors`: whether it may touch the open air."""
    behind = st.sampled_from((*ROOMS, *(("outdoors",) * 3 if outdoors else ())))
    width, height, deep = (draw(figure("length", 1.6, high, 3)) for high in (7.0, 4.0, 9.0))
    box: dict[str, Any] = {
        "length": deep,
        "width": width,
        "height": height,
        "measured": draw(st.sampled_from(("inside", "outside"))),
        "temperature": draw(temperature(*room)),
        "humidity": draw(figure("share", 0.5, 1.0, 3)),
        "construction": "wall",
        "neighbour": draw(behind),
        "leakage": draw(figure("an_hour", 0.0, 0.8 / HOUR, 7)),
        "allowance": draw(figure("share", 0.0, 0.1, 3)),
        "air": draw(st.sampled_from(("doors", "doors", "doors", "rate"))),
        "air_change": draw(figure("an_hour", 0.0, 1.0 / HOUR, 7)),
        # Still air over a large cold floor is beyond what natural convection was measured for.
        "films": draw(
            st.sampled_from(("standard", "natural") if max(deep.value, width.value) < 5.0 else ("standard",))
        ),
        "credit_cold": draw(st.booleans()),
    }
    if draw(st.booleans()):
        box["bearing"] = f"{draw(st.integers(0, 359))}°"
    tables: dict[str, Any] = {
        "site": draw(sites()),
        "box": box,
        "constructions": {name: {"layers": draw(layers())} for name in ("wall", "other")},
        "neighbours": {
            name: {"temperature": draw(temperature(-5.0, 40.0)), "humidity": draw(figure("share", 0.2, 0.9, 3))}
            for name in ROOMS
        },
        "faces": {
            "left": {"neighbour": draw(behind), "construction": "other", "colour": draw(st.sampled_from(COLOURS))},
            "ceiling": {"neighbour": draw(behind), "shade": draw(figure("share", 0.0, 1.0, 2))},
            "floor": {"neighbour": draw(st.sampled_from((*ROOMS, *(("ground", "void") if outdoors else ()))))},
        },
        "doors": draw(st.lists(doors(width.value, height.value, behind), max_size=2)),
        "panels": [draw(windows(deep.value, height.value, behind))] if draw(st.booleans()) else [],
        "lots": draw(st.lists(lots(), max_size=3)),
        "people": draw(st.lists(people(), max_size=1)),
        "lights": draw(st.lists(consumers("lights"), max_size=1)),
        "motors": draw(st.lists(consumers("motors"), max_size=2)),
        "heaters": [],
        "ventilation": draw(st.lists(fresh_air(), max_size=1)),
        "machine": draw(machines()),
        "sizing": {"run_hours": Q(3600.0 * draw(st.integers(12, 24)), "duration"), "safety": Q(0.1, "share")},
    }
    on_ground = tables["faces"]["floor"]["neighbour"] in ("ground", "void")
    tables["heaters"] = draw(st.lists(heaters(on_ground), max_size=1))
    for name, things in tables.items():
        if isinstance(things, list):
            for number, thing in enumerate(things, 1):
                thing["name"] = f"{name} {number}"
    return {"tables": tables}


@st.composite
def sites(draw: st.DrawFn) -> dict[str, Any]:
    high = draw(temperature(15.0, 42.0))
    return {
        "latitude": f"{draw(st.integers(-55, 60))}°",
        "longitude": f"{draw(st.integers(-120, 140))}°",
        "altitude": draw(figure("altitude", 0.0, 2500.0, 0)),
        "month": draw(st.sampled_from(("January", "April", "July", "October"))),
        "dry_bulb": high,
        "daily_range": draw(figure("difference", 0.0, 14.0, 1)),
        "humidity": draw(figure("share", 0.1, 0.6, 2)),  # a wetter sky is beyond its model
        "wind": draw(figure("speed", 0.5, 8.0, 1)),
        "ground_temperature": draw(temperature(2.0, 20.0)),
        "yearly_swing": draw(figure("difference", 0.0, 12.0, 1)),
        "sky": draw(st.sampled_from(("clear", "clear", "overcast", "none"))),
    }


@st.composite
def doors(draw: st.DrawFn, width: float, height: float, behind: st.SearchStrategy[str]) -> dict[str, Any]:
    """A door of the front: two of the widest still leave something of it, also when the sizes are outside ones."""
    made: dict[str, Any] = {
        "width": Q(round(draw(st.floats(0.2, 0.3)) * (width - 0.5), 3), "length"),
        "height": Q(round(draw(st.floats(0.5, 0.8)) * (height - 0.5), 3), "length"),
        "neighbour": draw(behind),
        "passages": draw(figure("an_hour", 0.0, 30.0 / HOUR, 6) | figure("a_day", 0.0, 60.0 / DAY, 8)),
        "open_each": draw(figure("duration", 1.0, 25.0, 1)),
        "stood_open": draw(figure("minutes_a_day", 0.0, 20 * 60 / DAY)),
        "hours": draw(st.sampled_from(HOURS[:2])),
        "protection": draw(st.sampled_from(("none", "strip curtain", "air curtain", "fast door"))),
        "heater": draw(figure("power", 0.0, 300.0, 0)),
        "gasket_leakage": draw(st.sampled_from((Q(0.0, "gasket"), Q(0.0001, "gasket")))),
        "u_value": draw(figure("transmittance", 0.2, 2.0, 2)),
        "thickness": draw(figure("length", 0.03, 0.12, 3)),
    }
    if draw(st.booleans()):
        made["solar_gain"] = draw(figure("share", 0.1, 0.6, 2))
    return made


@st.composite
def windows(draw: st.DrawFn, width: float, height: float, behind: st.SearchStrategy[str]) -> dict[str, Any]:
    return {
        "face": "right",
        "width": Q(round(0.4 * (width - 0.5), 3), "length"),
        "height": Q(round(0.4 * (height - 0.5), 3), "length"),
        "neighbour": draw(behind),
        "u_value": Q(1.1, "transmittance"),
        "thickness": Q(0.024, "length"),
        "solar_gain": draw(figure("share", 0.0, 0.6, 2)),
    }


@st.composite
def lots(draw: st.DrawFn) -> dict[str, Any]:
    packaging = draw(st.sampled_from(("none", "cardboard", "plastic")))
    made: dict[str, Any] = {
        "product": draw(st.sampled_from(PRODUCTS)),
        "stored": draw(figure("mass", 0.0, 5000.0, 0)),
        "arrives": draw(figure("mass_rate", 20.0 / DAY, 2000.0 / DAY, 6)),
        "arrival_temperature": draw(temperature(-10.0, 25.0)),
        "arrival_time": draw(st.sampled_from(("00:00", "08:00", "15:30", "23:45"))),
        "pulldown": Q(3600.0 * draw(st.integers(2, 40)), "duration"),
        "chilling_factor": draw(figure("share", 0.56, 1.0, 2)),
    }
    if packaging != "none":
        made |= {"packaging": packaging, "packaging_mass": draw(figure("mass_rate", 0.0, 100.0 / DAY, 8))}
    return made


@st.composite
def people(draw: st.DrawFn) -> dict[str, Any]:
    return {"count": draw(st.integers(0, 4)), "hours": draw(st.sampled_from(HOURS))}


@st.composite
def consumers(draw: st.DrawFn, table: str) -> dict[str, Any]:
    made = {"power": draw(figure("power", 0.0, 900.0, 0)), "hours": draw(st.sampled_from(HOURS))}
    if table == "motors":
        made["place"] = draw(st.sampled_from(("inside", "load only", "motor only")))
    return made


@st.composite
def heaters(draw: st.DrawFn, on_ground: bool) -> dict[str, Any]:
    if on_ground and draw(st.booleans()):
        return {"kind": "underfloor", "held_at": draw(temperature(0.0, 12.0))}
    return {"kind": "drain", "power": Q(60.0, "power"), "to_room": draw(figure("share", 0.0, 1.0, 2))}


@st.composite
def fresh_air(draw: st.DrawFn) -> dict[str, Any]:
    return {
        "flow": draw(figure("flow", 0.0, 200.0 / HOUR)),
        "hours": draw(st.sampled_from(HOURS)),
        "recovery": draw(figure("share", 0.0, 0.8, 2)),
        "neighbour": draw(st.sampled_from(ROOMS)),
    }


@st.composite
def machines(draw: st.DrawFn) -> dict[str, Any]:
    made: dict[str, Any] = {"defrost": draw(st.sampled_from(("none", "air", "electric", "hot gas")))}
    if draw(st.booleans()):
        made |= {"fans": draw(st.integers(1, 4)), "fan_power": draw(figure("power", 20.0, 200.0, 0))}
    if made["defrost"] in ("electric", "hot gas") and draw(st.booleans()):
        made |= {"defrost_power": draw(figure("power", 500.0, 4000.0, 0)), "defrost_at": ["04:00", "16:00"]}
    return made


# Projects made straight away


@st.composite
def projects(draw: st.DrawFn) -> Project:
    """A project as records, other in its shapes than what `files` makes: no text is read on the way."""
    room = draw(st.floats(-28.0, 12.0))
    height = draw(st.floats(1.5, 6.0))
    count = draw(st.integers(0, 3))
    doors: Sequence[Any] = [
        boxes.door(
            f"door {number}",
            width=0.3,
            height=height * 0.6,
            count=draw(st.integers(1, 3)),
            neighbour=draw(st.sampled_from(("outdoors", "room"))),
            passages=Rate(draw(st.floats(0.0, 40.0)) / HOUR, draw(st.sampled_from(("hour", "day")))),
            open_each=draw(st.floats(0.0, 30.0)),
            hours=Schedule((Span(7.0, draw(st.floats(15.0, 22.0)), 1.0),)),
            effectiveness=draw(st.floats(0.0, 0.95)),
            solar_gain=draw(st.sampled_from((0.0, 0.4))),
            heater=draw(st.floats(0.0, 300.0)),
        )
        for number in range(count)
    ]
    return boxes.box_project(
        site={
            "latitude": draw(st.floats(-60.0, 60.0)),
            "month": draw(st.integers(1, 12)),
            "dry_bulb": draw(st.floats(5.0, 42.0)),
            "daily_range": draw(st.floats(0.0, 15.0)),
            "sky": draw(st.sampled_from(("clear", "overcast", "none"))),
        },
        box={
            "temperature": room,
            "height": height,
            "bearing": draw(st.none() | st.floats(0.0, 360.0)),
            "sun": draw(st.sampled_from(("hourly", "allowance"))),
            "air": draw(st.sampled_from(("doors", "table"))),
            "credit_cold": draw(st.booleans()),
            "rules": draw(st.sampled_from(((), ("atp-a",), ("us-walk-in", "atp-c")))),
        },
        faces={
            "floor": {"neighbour": draw(st.sampled_from(("ground", "void", "road", "room")))},
            "back": {"neighbour": draw(st.sampled_from(("outdoors", "room", "cold")))},
        },
        neighbours=[boxes.neighbour("cold", temperature=draw(st.floats(-40.0, 5.0)), humidity=0.9)],
        doors=doors,
        lots=[boxes.lot(arrives=draw(st.floats(0.0, 0.02)), arrival_temperature=draw(st.floats(-20.0, 20.0)))],
        people=[boxes.people(count=draw(st.integers(0, 3)))],
        lights=[boxes.light(power=draw(st.floats(0.0, 200.0)))],
        machine=boxes.machine(
            fan_share=draw(st.floats(0.0, 0.2)),
            defrost=draw(st.sampled_from(("none", "electric"))),
            defrost_power=draw(st.none() | st.floats(0.0, 3000.0)),
            defrost_at=(4.0, 16.0),
            defrost_share=0.05,
        ),
    )
