"""Small valid projects for tests: each maker takes only what a test wants different.

`box_project(box={"temperature": -18.0}, faces={"floor": {"neighbour": "ground"}}, doors=[door(width=1.2)])`.
Site and box take mappings of changes, or whole records; `every_face` changes all six. `site=None` is a box indoors.
"""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from coldbox.project import model as m
from coldbox.units.clock import ALWAYS, Rate, Schedule, Span

DAYTIME = Schedule((Span(7.0, 17.0, 1.0),))


def layer(material: str = "PIR foam", **changes: Any) -> m.Layer:
    """One layer; a known word gives its usual figures."""
    thickness, k, factor, density, heat, foam = {
        "PIR foam": (0.1, 0.022, 0.0, 35.0, 1400.0, True),
        "EPS foam": (0.1, 0.036, 0.0, 20.0, 1450.0, True),
        "steel sheet": (0.0005, 50.0, 0.0, 7800.0, 450.0, False),
        "concrete": (0.15, 1.7, 0.0, 2300.0, 900.0, False),
        "brick": (0.25, 0.7, 0.0, 1700.0, 840.0, False),
        "air": (0.025, None, 0.0, 1.2, 1005.0, False),
    }[material]
    given: dict[str, Any] = {
        "material": material,
        "thickness": thickness,
        "conductivity": k,
        "temperature_factor": factor,
        "density": density,
        "specific_heat": heat,
        "ageing": 0.0,
        "moisture": 0.0,
        "emissivity": 0.82 if k is None else None,
        "foam": foam,
        "edge_psi": 0.0,
    }
    return m.Layer(**{**given, **changes})


def construction(name: str = "pir100", *layers: m.Layer, **changes: Any) -> m.Construction:
    """A steel sandwich with 100 mm of foam, or the layers given; `r_value`, `u_value` with `thickness` for a figure."""
    quoted = "r_value" in changes or "u_value" in changes
    own = layers or (() if quoted else (layer("steel sheet"), layer("PIR foam"), layer("steel sheet")))
    given: dict[str, Any] = {
        "name": name,
        "layers": tuple(own),
        "r_value": None,
        "u_value": None,
        "thickness": sum((one.thickness for one in own), 0.0),
        "edge_loss": 0.0,
        "point_loss": 0.0,
        "points": 0,
    }
    return m.Construction(**{**given, **changes})


def neighbour(name: str = "room", **changes: Any) -> m.Neighbour:
    given: dict[str, Any] = {
        "name": name,
        "temperature": 24.0,
        "humidity": 0.5,
        "project": None,
        "volume": None,
        "air_change": None,
    }
    return m.Neighbour(**{**given, **changes})


def site(**changes: Any) -> m.Site:
    """A northern harbour town in July."""
    given: dict[str, Any] = {
        "place": None,
        "latitude": 55.1,
        "longitude": 14.7,
        "altitude": 0.0,
        "clock": 2.0,
        "month": 7,
        "day": 21,
        "weather": None,
        "dry_bulb": 32.0,
        "daily_range": 9.0,
        "humidity": 0.45,
        "wet_bulb": None,
        "wind": 3.0,
        "ground_temperature": 9.0,
        "yearly_swing": 9.0,
        "sky": "clear",
        "tau_beam": 0.42,
        "tau_diffuse": 2.2,
        "ground_reflects": 0.2,
    }
    return m.Site(**{**given, **changes})


def box(**changes: Any) -> m.Box:
    """A freezer 3 m deep, 4 m wide and 2.4 m high inside, front to the south."""
    given: dict[str, Any] = {
        "length": 3.0,
        "width": 4.0,
        "height": 2.4,
        "measured": "inside",
        "notch_length": None,
        "notch_width": None,
        "notch_corner": None,
        "volume": None,
        "floor_area": None,
        "perimeter": None,
        "bearing": 180.0,
        "temperature": -18.0,
        "humidity": 0.85,
        "powered": True,
        "k_value": None,
        "thickness": None,
        "allowance": 0.0,
        "sun": "hourly",
        "air": "doors",
        "use": "average",
        "films": "standard",
        "leakage": Rate(0.1 / 3600, "hour"),
        "air_change": None,
        "fittings": 0.0,
        "credit_cold": False,
        "rules": (),
        "limits": (),
    }
    return m.Box(**{**given, **changes})


def face(name: str, **changes: Any) -> m.Face:
    given: dict[str, Any] = {
        "name": name,
        "construction": "pir100",
        "neighbour": "outdoors",
        "colour": "white",
        "weathered": False,
        "emissivity": 0.9,
        "shade": 0.0,
        "soil": "clay",
        "exposed_edge": None,
        "edge_wall": 0.3,
    }
    return m.Face(**{**given, **changes})


def panel(name: str = "panel", **changes: Any) -> m.Panel:
    given: dict[str, Any] = {
        "name": name,
        "face": "front",
        "width": 1.0,
        "height": 1.0,
        "area": None,
        "construction": "pir100",
        "neighbour": "outdoors",
        "colour": "white",
        "weathered": False,
        "emissivity": 0.9,
        "shade": 0.0,
        "solar_gain": 0.0,
        **changes,
    }
    if given["area"] is None:
        given["area"] = given["width"] * given["height"]
    return m.Panel(**given)


def door(name: str = "main", **changes: Any) -> m.Door:
    given: dict[str, Any] = {
        "name": name,
        "face": "front",
        "width": 0.9,
        "height": 2.0,
        "count": 1,
        "construction": "pir100",
        "neighbour": "outdoors",
        "colour": "white",
        "weathered": False,
        "emissivity": 0.9,
        "shade": 0.0,
        "solar_gain": 0.0,
        "passages": Rate(0.0, "hour"),
        "open_each": 15.0,
        "stood_open": Rate(0.0, "day"),
        "hours": DAYTIME,
        "protection": (),
        "effectiveness": 0.0,
        "protection_power": 0.0,
        "flow_factor": 0.8,
        "gasket_leakage": 0.0,
        "heater": 0.0,
        "heater_to_room": 0.5,
    }
    return m.Door(**{**given, **changes})


def lot(name: str = "lot", **changes: Any) -> m.Lot:
    """Stored white fish, frozen, that asks for nothing."""
    given: dict[str, Any] = {
        "name": name,
        "product": None,
        "composition": m.Composition(water=0.8122, protein=0.1781, fat=0.0067, carbohydrate=0.0, fibre=0.0, ash=0.003),
        "respiration": (),
        "transpiration": 0.0,
        "freezing_point": -2.2,
        "specific_heat_above": None,
        "specific_heat_below": None,
        "latent_heat": None,
        "conductivity": None,
        "density": None,
        "safe_above_c": None,
        "stored": 500.0,
        "arrives": 0.0,
        "arrival_time": 8.0,
        "arrival_temperature": None,
        "pulldown": 86400.0,
        "chilling_factor": 0.7,
        "start_temperature": None,
        "packaging": "none",
        "packaging_mass": 0.0,
        "piece": (0.4, 0.3, 0.3),
        "pieces": None,
        "exposed": ("top", "sides"),
        "shape": None,
        "half_thickness": None,
        "air_film": 6.0,
        "wrap": 0.0,
        "limits": (),
    }
    return m.Lot(**{**given, **changes})


def people(name: str = "people", **changes: Any) -> m.People:
    return m.People(**{"name": name, "count": 1, "hours": DAYTIME, **changes})


def light(name: str = "lights", **changes: Any) -> m.Light:
    return m.Light(**{"name": name, "power": 40.0, "count": 1, "hours": ALWAYS, **changes})


def motor(name: str = "motor", **changes: Any) -> m.Motor:
    given: dict[str, Any] = {"name": name, "kind": "motor", "power": 500.0, "count": 1, "hours": ALWAYS}
    return m.Motor(**{**given, "place": "inside", **changes})


def heater(name: str = "floor heater", **changes: Any) -> m.Heater:
    """An underfloor heater held at 5 °C, or another with `power`."""
    given: dict[str, Any] = {
        "name": name,
        "kind": "underfloor",
        "power": None,
        "held_at": None if "power" in changes else 5.0,
        "hours": ALWAYS,
        "to_room": 1.0,
    }
    return m.Heater(**{**given, **changes})


def ventilation(name: str = "fresh air", **changes: Any) -> m.Ventilation:
    given: dict[str, Any] = {
        "name": name,
        "flow": 100 / 3600,
        "hours": ALWAYS,
        "recovery": 0.0,
        "dried_to": None,
        "neighbour": "room",
    }
    return m.Ventilation(**{**given, **changes})


def machine(**changes: Any) -> m.Machine:
    """No fans, no defrost: nothing the box does not ask for."""
    given: dict[str, Any] = {
        "unit": None,
        "capacity": None,
        "band": 2.0,
        "fans": 0,
        "fan_power": 0.0,
        "fan_share": 0.0,
        "defrost": "none",
        "defrost_at": (),
        "defrost_time": 1500.0,
        "defrost_power": 0.0,
        "defrost_share": 0.0,
        "defrost_to_room": 0.5,
    }
    return m.Machine(**{**given, **changes})


def trip(**changes: Any) -> m.Trip:
    return m.Trip(**{"starts": 8.0, "dry_bulb": None, "legs": (), "stops": (), **changes})


def _made(given: Any, maker: Any) -> Any:
    return maker(**given) if isinstance(given, Mapping) else given


def box_project(
    *,
    site: Mapping[str, Any] | m.Site | None = {},  # noqa: B006  never written to
    box: Mapping[str, Any] | m.Box = {},  # noqa: B006
    every_face: Mapping[str, Any] = {},  # noqa: B006
    faces: Mapping[str, Mapping[str, Any]] = {},  # noqa: B006
    constructions: Any = (),
    neighbours: Any = (),
    **rest: Any,
) -> m.Project:
    """A whole project: the walk-in freezer of `box()` outdoors, every face of 100 mm PIR, changed as told.

    `constructions` and `neighbours` are sequences of records, added to "pir100" and "room".
    Lists of things go by their model names: doors=[door()], panels=[panel()], heaters=[heater()]…
    """
    things = {key: tuple(value) if isinstance(value, list) else value for key, value in rest.items()}
    given: dict[str, Any] = {
        "file": "test.toml",
        "name": "test",
        "units": "SI",
        "customer": "",
        "by": "",
        "notes": "",
        "site": _made(site, globals()["site"]),
        "box": _made(box, globals()["box"]),
        "constructions": {one.name: one for one in (construction(), *constructions)},
        "neighbours": {one.name: one for one in (neighbour(), *neighbours)},
        "faces": {name: face(name, **{**every_face, **faces.get(name, {})}) for name in m.FACES},
        "machine": machine(),
        "outage": m.Outage(at=14.0, lasts=None, asked=86400.0, horizon=259200.0, going_on=(), dry_bulb=None, events=()),
        "sizing": m.Sizing(run_hours=18 * 3600.0, safety=0.1, tested_with_unit=False),
        "money": m.Money(currency=None, tariff=None, insulation_cost=None, years=10, interest=0.0),
        "spread_factors": m.Spreads(
            foam=0.1, ageing=0.05, air=0.3, openings=0.3, ambient=2.0, enthalpy=0.1, freezing_point=0.3, films=0.2
        ),
        "origins": {},
        "spreads": {},
    }
    return m.Project(**{**given, **things})
