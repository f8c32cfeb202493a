"""A CSV of hourly weather, days on end, in place of the design day.

First line: names of columns; then a line for each hour from 00:00 of the first day, means over the hour. `dry_bulb_c`
is needed; `humidity_percent`, `wind_m_per_s`, `beam_w_per_m2` (on a surface that faces the sun), `diffuse_w_per_m2`
(on flat ground) and `sky_c` may stand beside it; what is missing is taken from the site. Other columns are left alone.
"""

from __future__ import annotations

import csv
from pathlib import Path
from typing import Final

import numpy as np

from coldbox.errors import BadProject, FileTrouble, Problem
from coldbox.physics import moist_air, sun, surface
from coldbox.physics.number import FloatArray, Number
from coldbox.project.model import Project, Site
from coldbox.scene import air, weather
from coldbox.scene.types import SunDay, Weather

LARGEST: Final = 2_000_000  # bytes; a year of hours is a quarter of it
_BOUNDS: Final = {
    "dry_bulb_c": (-70.0, 60.0),
    "humidity_percent": (0.0, 100.0),
    "wind_m_per_s": (0.0, 60.0),
    "beam_w_per_m2": (0.0, 1500.0),
    "diffuse_w_per_m2": (0.0, 1000.0),
    "sky_c": (-100.0, 60.0),
}


def days(project: Project, pressure: Number) -> tuple[Weather, ...]:
    """The weather of the project's file, day by day; an hour too few at the end leaves its day out.

    Raises FileTrouble for a file that cannot be read, BadProject for one that makes no sense.
    """
    site = project.site
    assert site is not None and site.weather is not None, "asked of a site with a weather file"
    columns = _read(project, site.weather)
    count = len(columns["dry_bulb_c"]) // 24
    return tuple(
        _day(site, {name: hours[24 * i : 24 * (i + 1)] for name, hours in columns.items()}, pressure)
        for i in range(count)
    )


def _read(project: Project, name: str) -> dict[str, FloatArray]:
    if Path(name).name != name:
        raise BadProject([Problem(f'"{name}" is not a plain file name in the project\'s folder.', path="site.weather")])
    path = Path(project.file).parent / name
    try:
        if path.stat().st_size > LARGEST:
            raise FileTrouble(str(path), f"too large: weather files may have {LARGEST // 1_000_000} MB")
        text = path.read_text(encoding="utf-8-sig")
    except OSError as reason:
        raise FileTrouble(str(path), reason.strerror or "cannot be read") from None
    except UnicodeDecodeError:
        raise FileTrouble(str(path), "is not text in UTF-8") from None
    lines = [line for line in csv.reader(text.splitlines()) if any(cell.strip() for cell in line)]
    problems: list[Problem] = []
    head = [cell.strip() for cell in lines[0]] if lines else []
    if "dry_bulb_c" not in head:
        problems.append(Problem('The first line names no column "dry_bulb_c".', file=str(path), line=1))
    elif len(lines) < 25:
        problems.append(Problem(f"{len(lines) - 1} hours are less than a day: 24 are needed.", file=str(path)))
    if problems:
        raise BadProject(problems)
    found: dict[str, FloatArray] = {}
    for column, label in enumerate(head):
        if label in _BOUNDS:
            found[label] = np.array(
                [_number(line, column, label, str(path), at, problems) for at, line in enumerate(lines[1:], 2)]
            )
    if problems:
        raise BadProject(problems[:20])
    return found


def _number(line: list[str], column: int, label: str, file: str, at: int, problems: list[Problem]) -> float:
    text = line[column].strip() if column < len(line) else ""
    low, high = _BOUNDS[label]
    try:
        value = float(text)
    except ValueError:
        value = np.nan
    if not low <= value <= high:
        shown = text if text.isprintable() else "?"
        problems.append(
            Problem(f'"{shown}" under {label}: write a number from {low:g} to {high:g}.', file=file, line=at)
        )
    return value


def _day(site: Site, columns: dict[str, FloatArray], pressure: Number) -> Weather:
    temperature = columns["dry_bulb_c"]
    if "humidity_percent" in columns:
        ratio: Number = moist_air.humidity_ratio(temperature, columns["humidity_percent"] / 100.0, pressure)
    else:
        ratio = weather.humidity_ratio(site, pressure)
    outdoors = air.outdoors(temperature, ratio, pressure)
    usual = weather.weather(site, pressure)
    sky_c = columns.get("sky_c")
    if sky_c is None:
        sky_c = temperature
        if site.sky == "clear":
            sun_time = np.arange(24.0) + 0.5 - weather.clock_ahead(site)
            sky_c = surface.sky_temperature(temperature, outdoors.dew_point_c, sun_time, pressure)
    return Weather(
        air=outdoors,
        wind=float(columns["wind_m_per_s"].mean()) if "wind_m_per_s" in columns else site.wind,
        sky_c=sky_c,
        sun=_sun(site, columns, usual.sun),
        ground_reflects=site.ground_reflects,
    )


def _sun(site: Site, columns: dict[str, FloatArray], usual: SunDay | None) -> SunDay | None:
    """The sun where the file has both its parts, each spread over its hour; else that of the site's sky."""
    if not {"beam_w_per_m2", "diffuse_w_per_m2"} <= columns.keys():
        return usual
    stands = sun.position(
        site.latitude, site.longitude, site.month, site.day, sun.instants(site.clock, weather.INSTANTS)
    )
    up = stands.altitude > 0.0
    beam, diffuse = (np.repeat(columns[name], weather.INSTANTS) for name in ("beam_w_per_m2", "diffuse_w_per_m2"))
    return SunDay(
        altitude=stands.altitude,
        azimuth=stands.azimuth,
        beam_normal=np.where(up, beam, 0.0),
        diffuse_horizontal=np.asarray(diffuse + np.zeros_like(stands.altitude)),
        overcast=False,
    )
