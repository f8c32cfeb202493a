"""What a row of each built-in table may and must hold: one declaration per column, checked on every row loaded.

Every row also carries `source` (a key of sources.toml) and `where` (page, clause or table there), may carry `note`, and
may carry `also`, other names it is found by. Values that nobody read in print say "memory" in `where` or `note`.
"""

from __future__ import annotations

from collections.abc import Mapping
from math import inf
from typing import Literal

from coldbox.record import Record

Kind = Literal["number", "count", "text", "word", "yes_no", "numbers", "pairs", "limits"]


class Column(Record):
    """One column: `low` and `high` bound every number in it, `unit` is what they are in, `length` of a list."""

    kind: Kind
    unit: str = ""
    low: float = -inf
    high: float = inf
    required: bool = True
    choices: tuple[str, ...] = ()
    length: int | None = None

    def fault(self, value: object) -> str:
        """What is wrong with a value, in words; empty when nothing is."""
        if self.kind == "yes_no":
            return "" if isinstance(value, bool) else f"must be true or false, not {value!r}"
        if self.kind == "text":
            return "" if isinstance(value, str) and value.strip() else f"must be a text, not {value!r}"
        if self.kind == "word":
            return "" if value in self.choices else f"must be one of {', '.join(self.choices)}, not {value!r}"
        if self.kind == "limits":
            return _limits_fault(value)
        if self.kind == "pairs":
            return self._pairs_fault(value)
        if self.kind == "numbers":
            if not isinstance(value, list) or (self.length is not None and len(value) != self.length):
                return f"must be a list of {self.length or 'some'} numbers, not {value!r}"
            return next((fault for item in value if (fault := self._number_fault(item))), "")
        return self._number_fault(value)

    def _number_fault(self, value: object) -> str:
        wanted = (int,) if self.kind == "count" else (int, float)
        if isinstance(value, bool) or not isinstance(value, wanted):
            return f"must be a {'whole number' if self.kind == 'count' else 'number'}, not {value!r}"
        if not self.low <= value <= self.high:  # also what nan fails
            return f"is {value:g}; it must lie between {self.low:g} and {self.high:g} {self.unit}".rstrip()
        return ""

    def _pairs_fault(self, value: object) -> str:
        """Points [at_c, figure] by rising temperature; the bounds are those of the figure."""
        if not isinstance(value, list) or any(not isinstance(pair, list) or len(pair) != 2 for pair in value):
            return f"must be a list of pairs, not {value!r}"
        at_c = [pair[0] for pair in value]
        if any(isinstance(at, bool) or not isinstance(at, int | float) for at in at_c):
            return "must have a temperature first in every pair"
        if any(later <= earlier for earlier, later in zip(at_c, at_c[1:], strict=False)):
            return "must rise in temperature from pair to pair"
        return next((fault for pair in value if (fault := self._number_fault(pair[1]))), "")

    def clean(self, value: object) -> object:
        """A sound value as callers get it: numbers as floats, lists as tuples."""
        if self.kind == "number" and isinstance(value, int):
            return float(value)
        if self.kind == "numbers" and isinstance(value, list):
            return tuple(map(float, value))
        if self.kind == "pairs" and isinstance(value, list):
            return tuple((float(at_c), float(figure)) for at_c, figure in value)
        return value


def _limits_fault(value: object) -> str:
    """A list of { above or below = °C, where = a place }."""
    if not isinstance(value, list):
        return f"must be a list of limits, not {value!r}"
    for limit in value:
        if not isinstance(limit, dict) or set(limit) not in ({"above", "where"}, {"below", "where"}):
            return f"must hold limits of above or below, and where, not {limit!r}"
        side = limit.get("above", limit.get("below"))
        if isinstance(side, bool) or not isinstance(side, int | float) or not -100 <= side <= 100:
            return f"has a limit at {side!r}; it must be a temperature in °C"
        if limit["where"] not in ("surface", "mean", "core", "air"):
            return f"has a limit at {limit['where']!r}; it must be surface, mean, core or air"
    return ""


def _number(unit: str, low: float, high: float) -> Column:
    return Column(kind="number", unit=unit, low=low, high=high)


def _maybe(unit: str, low: float, high: float) -> Column:
    return Column(kind="number", unit=unit, low=low, high=high, required=False)


def _word(*choices: str) -> Column:
    return Column(kind="word", choices=choices)


def _share(required: bool = True) -> Column:
    return Column(kind="number", low=0.0, high=1.0, required=required)


def _by_month(unit: str, low: float, high: float) -> Column:
    return Column(kind="numbers", unit=unit, low=low, high=high, length=12)


TEXT = Column(kind="text")
MAYBE_TEXT = Column(kind="text", required=False)
MAYBE_YES = Column(kind="yes_no", required=False)
TEMPERATURE = _number("°C", -100, 100)
MAYBE_TEMPERATURE = _maybe("°C", -100, 100)

COMMON: Mapping[str, Column] = {"source": TEXT, "where": TEXT, "note": MAYBE_TEXT}

SOURCES: Mapping[str, Column] = {"title": TEXT, "where": TEXT, "read": _word("print", "copy", "memory")}

MATERIAL_KINDS = (
    "foam", "insulation", "evacuated", "metal", "masonry", "wood", "plastic",
    "packaging", "glass", "ground", "other",
)  # fmt: skip

COLUMNS: Mapping[str, Mapping[str, Column]] = {
    "methods": {
        "gives": TEXT,
        "holds": TEXT,
    },
    "materials": {
        "kind": _word(*MATERIAL_KINDS),
        "conductivity": _number("W/mK at 10 °C mean", 0.001, 450),
        "density": _number("kg/m³", 1, 12000),
        "specific_heat": _number("J/kgK", 100, 4300),
        "temperature_factor": _number("1/K", 0, 0.02),
        "edge_psi": _maybe("W/mK", 0, 0.1),  # along the edge of an evacuated panel
        "emissivity": _maybe("of its bare face", 0.01, 1),
    },
    "films": {
        "direction": _word("up", "horizontal", "down"),
        "side": _word("inside", "outside"),
        "resistance": _number("m²K/W", 0.01, 0.3),
    },
    "airspaces": {
        "direction": _word("up", "horizontal", "down"),
        "thickness": _number("m", 0.001, 0.5),
        "resistance": _number("m²K/W", 0.05, 0.4),
    },
    "colours": {
        "absorptance": _share(),
        "weathered_absorptance": _share(),
        "emissivity": _share(),
        "allowance": _word("light", "medium", "dark"),  # row of sun_allowance
    },
    "sun_allowance": {
        "east_k": _number("K", 0, 20),
        "equator_k": _number("K", 0, 20),  # the wall that sees the noon sun: south, or north below the equator
        "west_k": _number("K", 0, 20),
        "roof_k": _number("K", 0, 20),
    },
    "people": {
        "at_zero_w": _maybe("W", 100, 500),
        "fall_w_per_k": _maybe("W/K", 0, 20),
        "warmest_c": MAYBE_TEMPERATURE,
        "coldest_c": MAYBE_TEMPERATURE,
        "at_c": MAYBE_TEMPERATURE,
        "heat_w": _maybe("W", 50, 600),
        "latent_share": _share(required=False),
    },
    "protection": {
        "effectiveness": _share(),
        "power": _number("W, of one ordinary doorway", 0, 5000),
        "works_without_power": Column(kind="yes_no"),
    },
    "air_changes": {
        "volume": _number("m³", 1, 100000),
        "above_zero": _number("per 24 h", 0.1, 100),
        "below_zero": _number("per 24 h", 0.1, 100),
    },
    "air_use": {"factor": _number("", 0.1, 5)},
    "soils": {
        "conductivity": _number("W/mK", 0.2, 6),
        "heat_capacity": _number("J/m³K", 1e5, 6e6),
    },
    "motors": {
        "up_to_w": _number("W at the shaft", 1, 1e6),
        "efficiency": Column(kind="number", low=0.1, high=0.99),
    },
    "trucks": {
        "power": _number("W, mean while working", 50, 50000),
        "carbon_monoxide": MAYBE_YES,
    },
    "run_hours": {
        "coil": _word("above 0 °C", "below 0 °C"),
        "defrost": _word("none", "air", "electric", "hot gas"),
        "hours": _number("h a day", 8, 24),
        "highest": _number("h a day", 8, 24),
    },
    "room_humidity": {
        "up_to_c": TEMPERATURE,
        "humidity": _share(),
    },
    "fans": {
        "up_to_c": TEMPERATURE,
        "share": _share(),  # of the rest of the load
    },
    "defrost": {
        "share": _share(),  # heat left in the room, of the rest of the load
        "defrosts_per_day": Column(kind="count", low=0, high=24),
    },
    "spreads": {
        "half_width": _number("", 0, 20),
        "unit": _word("share", "K"),
    },
    "weather": {
        "country": TEXT,
        "latitude": _number("°, north positive", -90, 90),
        "longitude": _number("°, east positive", -180, 180),
        "altitude": _number("m", -450, 6000),
        "utc_offset": _number("h", -12, 14),
        "summer_offset": _maybe("h", -12, 14),
        "hottest_month": Column(kind="count", low=1, high=12),
        "design": _word("0.4 %", "1 %"),
        "dry_bulb_c": _number("°C", -20, 60),
        "wet_bulb_c": _number("°C, mean with the dry bulb", -20, 40),
        "daily_range_k": _number("K", 1, 25),
        "annual_mean_c": _number("°C", -30, 40),
        "yearly_swing_k": _number("K, half of warmest less coldest month", 0, 40),
        "monthly_source": TEXT,
        "monthly_mean_c": _by_month("°C", -60, 50),
        "tau_beam": _number("", 0.2, 1.2),
        "tau_diffuse": _number("", 1.0, 3.5),
        "verified": Column(kind="yes_no"),
    },
    "foods": {
        "group": _word("vegetable", "fruit", "meat", "fish", "dairy", "frozen", "drink", "bakery", "other goods"),
        "water": _share(),
        "protein": _share(),
        "fat": _share(),
        "carbohydrate": _share(),
        "fibre": _share(),
        "ash": _share(),
        "freezing_point_c": MAYBE_TEMPERATURE,  # absent: too dry to freeze
        "store_at_c": TEMPERATURE,
        "store_humidity": _share(required=False),
        "safe_above_c": MAYBE_TEMPERATURE,
        "respiration": Column(kind="pairs", unit="W/kg", low=0, high=3),
        "transpiration": _maybe("kg/(kg s Pa)", 0, 1e-7),
        "chilling_factor": Column(kind="number", low=0.3, high=1.0),
        "limit": Column(kind="limits"),
        "density": _maybe("kg/m³", 50, 3000),
        "conductivity": _maybe("W/mK", 0.02, 5),
        "specific_heat_above": _maybe("J/kgK", 500, 4300),
        "specific_heat_below": _maybe("J/kgK", 300, 3000),
        "latent_heat": _maybe("J/kg", 0, 340000),
        "not_food": MAYBE_YES,
    },
    "packaging": {
        "specific_heat": _number("J/kgK", 100, 4300),
        "conductivity": _maybe("W/mK", 0.01, 450),
        "density": _maybe("kg/m³", 10, 12000),
        "share": _share(required=False),
    },
    "packs": {
        "melts_from": TEMPERATURE,
        "melts_to": TEMPERATURE,
        "latent_heat": _number("J/kg", 0, 650000),
        "specific_heat_frozen": _number("J/kgK", 300, 5000),
        "specific_heat_melted": _number("J/kgK", 300, 5000),
        "density": _maybe("kg/m³", 500, 2000),
        "sublimes": MAYBE_YES,
    },
}  # fmt: skip


def row_fault(columns: Mapping[str, Column], row: Mapping[str, object]) -> str:
    """The first thing wrong with a row, in words; empty when nothing is."""
    for key, value in row.items():
        column = columns.get(key)
        if column is None:
            return f"{key} is no column of this table"
        fault = column.fault(value)
        if fault:
            return f"{key} {fault}"
    return next((f"{key} is missing" for key, column in columns.items() if column.required and key not in row), "")


def also_fault(names: object) -> str:
    """What is wrong with the other names of a row, in words; empty when nothing is."""
    if isinstance(names, list) and names and all(isinstance(name, str) and name.strip() for name in names):
        return ""
    return f"also must be a list of names, not {names!r}"


def cleaned(columns: Mapping[str, Column], row: Mapping[str, object]) -> dict[str, object]:
    """A sound row as callers get it."""
    return {key: columns[key].clean(value) for key, value in row.items()}
