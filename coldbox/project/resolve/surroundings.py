"""What is around the box: the site with its design day, and the rooms behind its faces."""

from __future__ import annotations

import math
import os
from collections.abc import Mapping
from typing import Any

from coldbox.errors import UnknownName
from coldbox.project.model import GENERAL_NEIGHBOURS, Neighbour, Origin, Site
from coldbox.project.raw import Block
from coldbox.project.resolve.reader import Reader, Work, hint
from coldbox.tables import load

DAYS = (31, 29, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31)
MONTHS = (
    "January", "February", "March", "April", "May", "June",
    "July", "August", "September", "October", "November", "December",
)  # fmt: skip
FAR_KM = 1500.0  # a place farther away says nothing about this one
EARTH_KM = 6371.0  # mean radius
USUAL_TAU = (0.45, 2.1)  # beam and diffuse, of a summer month in middle latitudes
UNDERGROUND = ("ground", "void", "road")  # what only a floor can have under it


class Behind:
    """Names of what may be behind a face, and which of them were used."""

    def __init__(self, work: Work, named: Mapping[str, Neighbour]) -> None:
        self.work = work
        self.named = dict(named)
        self.used: dict[str, Reader] = {}  # general name -> the first block that has it behind

    def check(self, reader: Reader, name: str, key: str = "neighbour", *, floor: bool = False) -> str:
        """The name, checked where it was typed; "room" is made when it is first used."""
        if not isinstance(name, str):
            return "room"
        if name in self.named:
            return name
        if name in GENERAL_NEIGHBOURS:
            if name in UNDERGROUND and not floor:
                if key in reader.typed:
                    reader.problem(
                        key,
                        f'"{name}" can only be under the floor. For a wall below ground write a neighbour of its own'
                        " with the temperature of the soil.",
                    )
                return name
            self.used.setdefault(name, reader)
            return name
        if name == "room":
            self.named[name] = _room(self.work)
            return name
        if key in reader.typed:
            known = (*self.named, *GENERAL_NEIGHBOURS, "room")
            reader.problem(
                key,
                f'"{name}" is nothing this file knows.{hint(name, known)} Write'
                f" {', '.join(GENERAL_NEIGHBOURS)}, room, or the name of a table under [neighbours].",
            )
        return name


def _room(work: Work) -> Neighbour:
    reason = "an ordinary indoor room"
    work.origins["neighbours.room.temperature"] = Origin(kind="default", text="24 °C", reason=reason)
    work.origins["neighbours.room.humidity"] = Origin(kind="default", text="50 %", reason=reason)
    return Neighbour(name="room", temperature=24.0, humidity=0.5, project=None, volume=None, air_change=None)


def neighbours(work: Work, blocks: tuple[Block, ...], own_names: set[str]) -> dict[str, Neighbour]:
    """The rooms of [neighbours], by name. `own_names` are those of this very project, which no room may be."""
    rooms = {}
    for block in blocks:
        reader = Reader(work, "neighbours", block.path, block)
        if block.name in GENERAL_NEIGHBOURS:
            reader.problem("", f'"{block.name}" is a word of its own: give the room another name.')
        project = reader.given("project")
        if isinstance(project, str) and _bare(project) in own_names:
            reader.problem("project", f'"{project}" is this very project. A room can be a copy only of another one.')
        rooms[block.name] = Neighbour(
            name=block.name,
            temperature=reader.need("temperature", 'Write the temperature of that room, such as "20 °C".'),
            humidity=reader.value("humidity"),
            project=project,
            volume=reader.given("volume"),
            air_change=_per_second(reader.given("air_change")),
        )
    return rooms


def _per_second(rate: Any) -> Any:
    return getattr(rate, "per_second", rate)


def _bare(name: str) -> str:
    name = os.path.basename(name.strip()).casefold()
    return name[:-5] if name.endswith(".toml") else name


def own_names(file: str, title: str) -> set[str]:
    """What another project would call this one: its file name, without the ending, and its title."""
    return {_bare(file), title.strip().casefold()} - {""}


def site(work: Work, block: Block | None, behind: Behind, moving: Reader | None) -> Site | None:
    """The site, complete; None when the file has none. `moving` is the trip, which is always outdoors."""
    needed = next(iter(behind.used.values()), None) or moving
    if block is None:
        if needed is not None:
            what = next(iter(behind.used), "outdoors")
            needed.problem(
                "neighbour" if "neighbour" in needed.typed else "",
                f'This touches "{what}" and the file has no [site]. Write one with latitude, longitude and dry_bulb'
                ' (or a place of the weather table), or neighbour = "room" for a box indoors.',
            )
        return None
    outdoors = moving is not None or any(name != "ground" for name in behind.used)
    return _Place(work, block, outdoors, "ground" in behind.used).site()


class _Place:
    """A site being completed: typed values first, then those of its place, then defaults."""

    def __init__(self, work: Work, block: Block, outdoors: bool, on_ground: bool) -> None:
        self.reader = Reader(work, "site", block.path, block)
        self.work, self.outdoors, self.on_ground = work, outdoors, on_ground
        self.row: Mapping[str, Any] = {}
        self.row_source = ""
        self.nearest: tuple[str, float] | None = None
        self.reader.on_library("places", "dry_bulb" in block.values or "place" in block.values)
        name = self.reader.given("place")
        self.takes = self.reader.value if outdoors else self.reader.quiet
        self.name = name if isinstance(name, str) else None
        if self.name is not None:
            try:
                self.row = load.row("weather", self.name)
                self.row_source = f"weather table, {self.name}"
            except UnknownName as unknown:
                hint = f' Nearest: "{unknown.nearest}".' if unknown.nearest else ""
                self.reader.problem(
                    "place", f'"{self.name}" is not in the weather table.{hint} Or write latitude, longitude, dry_bulb.'
                )

    def site(self) -> Site:
        reader, takes = self.reader, self.takes
        latitude = self._coordinate("latitude", 'Write it such as "55.1° N", or a place of the weather table.')
        longitude = self._coordinate("longitude", 'Write it such as "14.7° E", or a place of the weather table.')
        month = self._month(latitude)
        dry_bulb = self._dry_bulb(month)
        if dry_bulb is None:
            dry_bulb = self._missing("dry_bulb", 'Write the highest temperature of the day, such as "32 °C".')
        daily_range = self._or_declared("daily_range", "daily_range_k", "{:g} K")
        humidity, wet_bulb = self._moisture(dry_bulb)
        tau_beam, tau_diffuse = self._depths(latitude, longitude)
        ground, swing = self._year(latitude, longitude, dry_bulb, daily_range)
        day = takes("day")
        if isinstance(month, int) and day > DAYS[month - 1]:
            reader.problem("day", f"{MONTHS[month - 1]} has {DAYS[month - 1]} days, so there is no day {day}.")
        if not self.outdoors:  # never used then, only completes the record
            latitude, longitude, dry_bulb = (0.0 if math.isnan(one) else one for one in (latitude, longitude, dry_bulb))
        return Site(
            place=self.name,
            latitude=latitude,
            longitude=longitude,
            altitude=self._or_declared("altitude", "altitude", "{:g} m"),
            clock=self._clock(latitude, longitude, month),
            month=month,
            day=day,
            weather=reader.given("weather"),
            dry_bulb=dry_bulb,
            daily_range=daily_range,
            humidity=humidity,
            wet_bulb=wet_bulb,
            wind=takes("wind"),
            ground_temperature=ground,
            yearly_swing=swing,
            sky=takes("sky"),
            tau_beam=tau_beam,
            tau_diffuse=tau_diffuse,
            ground_reflects=takes("ground_reflects"),
        )

    def _coordinate(self, key: str, advice: str) -> Any:
        """Latitude or longitude: nan, and a problem where it is needed, when it is nowhere said."""
        value = self._from_row(key, key, "{:g}°")
        return self._missing(key, advice) if value is None else value

    def _from_row(self, key: str, column: str, form: str = "{:g}") -> Any:
        """The value given, else that of the place; None where neither has it."""
        value = self.row.get(column)
        if self.reader.has(key) or value is None:
            return self.reader.given(key)
        return self.reader.fall(key, value, form.format(value), self.row_source, "table")

    def _or_declared(self, key: str, column: str, form: str = "{:g}") -> Any:
        value = self._from_row(key, column, form)
        return self.takes(key) if value is None else value

    def _missing(self, key: str, advice: str) -> float:
        if self.outdoors:
            self.reader.missing(key, advice)
        return math.nan

    def _month(self, latitude: Any) -> Any:
        if self.reader.has("month"):
            return self.reader.given("month")
        hottest = self.row.get("hottest_month")
        if isinstance(hottest, int):
            return self.reader.fall("month", hottest, MONTHS[hottest - 1], self.row_source, "table")
        month = 7 if not latitude < 0 else 1
        return self.reader.fall("month", month, MONTHS[month - 1], "usually the hottest month of this hemisphere")

    def _dry_bulb(self, month: Any) -> Any:
        """The value given, else the design temperature of the place; of that month, where the table has it."""
        monthly = self.row.get("monthly_dry_bulb_c")
        if self.reader.has("dry_bulb") or not monthly or month in (None, self.row["hottest_month"]):
            return self._from_row("dry_bulb", "dry_bulb_c", "{:g} °C")
        value, reason = monthly[month - 1], f"{self.row_source}, {MONTHS[month - 1]}"
        return self.reader.fall("dry_bulb", value, f"{value:g} °C", reason, "table")

    def _moisture(self, dry_bulb: float) -> tuple[Any, Any]:
        """Humidity or wet bulb at the day's highest: exactly one."""
        reader = self.reader
        if reader.has("humidity") and reader.has("wet_bulb"):
            reader.problem("wet_bulb", "humidity and wet_bulb say the same thing: write one of them.")
        if reader.has("wet_bulb"):
            wet_bulb = reader.given("wet_bulb")
            if wet_bulb > dry_bulb:
                reader.problem(
                    "wet_bulb", f"A wet bulb of {wet_bulb:g} °C cannot be above the dry bulb, {dry_bulb:g} °C."
                )
            return None, wet_bulb
        if reader.has("humidity"):
            return reader.given("humidity"), None
        wet_bulb = self.row.get("wet_bulb_c")
        if isinstance(wet_bulb, int | float) and wet_bulb <= dry_bulb:
            return None, reader.fall("wet_bulb", float(wet_bulb), f"{wet_bulb:g} °C", self.row_source, "table")
        return self.takes("humidity"), None

    def _clock(self, latitude: Any, longitude: Any, month: Any) -> Any:
        reader = self.reader
        if reader.has("clock"):
            return reader.given("clock")
        if "utc_offset" in self.row:
            northern_summer = isinstance(month, int) and 4 <= month <= 10
            summer = northern_summer if not latitude < 0 else not northern_summer
            column = "summer_offset" if summer and "summer_offset" in self.row else "utc_offset"
            value = float(self.row[column])
            return reader.fall("clock", value, _offset(value), self.row_source, "table")
        if not self.outdoors or math.isnan(longitude):
            return 0.0
        value = float(round(longitude / 15.0))
        return reader.fall(
            "clock", value, _offset(value), "from the longitude, without summer time; write clock to set it"
        )

    def _year(self, latitude: Any, longitude: Any, dry_bulb: Any, daily_range: Any) -> tuple[Any, Any]:
        """Mean and half swing of the year's temperatures, which only what lies on the ground feels."""
        mean = self._from_row("ground_temperature", "annual_mean_c", "{:g} °C")
        swing = self._from_row("yearly_swing", "yearly_swing_k", "{:g} K")
        if not self.on_ground:  # never used then, only completes the record
            return (dry_bulb - daily_range / 2 if mean is None else mean), (0.0 if swing is None else swing)
        near, reason = self._near(latitude, longitude)
        if mean is None and near:
            mean = near["annual_mean_c"]
            self.reader.fall("ground_temperature", mean, f"{mean:g} °C", reason)
        if swing is None and near:
            swing = near["yearly_swing_k"]
            self.reader.fall("yearly_swing", swing, f"{swing:g} K", reason)
        if mean is None:
            if not (self.outdoors and math.isnan(latitude + longitude)):  # then that is what is missing
                far = f" ({reason[0].upper()}{reason[1:]}.)" if reason else ""
                self.reader.missing(
                    "ground_temperature",
                    f'The floor lies on the ground: write the year\'s mean temperature there, such as "10 °C".{far}',
                )
            mean = math.nan
        if swing is None:
            swing = self.reader.fall("yearly_swing", 0.0, "0 K", "nothing is known of the year there")
        return mean, swing

    def _near(self, latitude: Any, longitude: Any) -> tuple[Mapping[str, Any], str]:
        """The row of the nearest place of the weather table, and which it is; empty where none is near."""
        if math.isnan(latitude + longitude):
            return {}, ""
        if self.nearest is None:
            self.nearest = nearest_place(latitude, longitude)
        name, km = self.nearest
        if km > FAR_KM:
            return {}, f"the nearest place of the weather table, {name}, is {km:.0f} km away"
        return load.row("weather", name), f"that of {name}, {km:.0f} km away"

    def _depths(self, latitude: Any, longitude: Any) -> tuple[Any, Any]:
        """How thick the air is for the sun: the place's, or that of the nearest place."""
        found = [self._from_row(key, key) for key in ("tau_beam", "tau_diffuse")]
        if None not in found:
            return found[0], found[1]
        near, reason = self._near(latitude, longitude) if self.outdoors else ({}, "")
        for at, key in enumerate(("tau_beam", "tau_diffuse")):
            if found[at] is None:
                value = near.get(key, USUAL_TAU[at])
                found[at] = value
                if self.outdoors:
                    self.reader.fall(key, value, f"{value:g}", reason if near else "a usual summer value")
        return found[0], found[1]


def _offset(hours: float) -> str:
    return f"UTC{hours:+g}"


def nearest_place(latitude: float, longitude: float) -> tuple[str, float]:
    """The place of the weather table nearest to a point, and how far it is (great circle), km."""
    best, least = "", math.inf
    here, east = math.radians(latitude), load.figures("weather", "longitude")
    for name, north in load.figures("weather", "latitude").items():
        there, apart = math.radians(north), math.radians(east[name] - longitude)
        half = math.sin((there - here) / 2) ** 2 + math.cos(here) * math.cos(there) * math.sin(apart / 2) ** 2
        km = 2 * EARTH_KM * math.asin(min(1.0, math.sqrt(half)))
        if km < least:
            best, least = name, km
    return best, least
