"""Projects from texts, as somebody would type them, without a file."""

from __future__ import annotations

from pathlib import Path

from coldbox.errors import BadProject, Problem
from coldbox.project import codec
from coldbox.project.model import Project
from coldbox.project.resolve import resolve
from coldbox.project.shop import Library

SHARED = str(Path(__file__).parents[2] / "shared")
BOXES = sorted((Path(__file__).parents[1] / "project" / "boxes").glob("*.toml"))

LEAST = """\
format = 1
[box]
length = "3 m"
width = "4 m"
height = "2.4 m"
temperature = "4 °C"
construction = "wall"
neighbour = "room"
[constructions]
wall = { r_value = "RSI 4", thickness = "80 mm" }
"""
"""A cooler indoors; tests add tables to it, or change a value in it."""

SITE = """\
[site]
latitude = "55.1° N"
longitude = "14.7° E"
dry_bulb = "32 °C"
"""


def project(text: str, options: dict[str, str] | None = None, library: str | None = None) -> Project:
    """The project of a text. Raises BadProject."""
    raw, problems = codec.read(text, "typed.toml", options or {})
    return resolve(raw, problems, Library(library))


def problems(text: str, library: str | None = None) -> list[Problem]:
    """What is wrong with a text."""
    try:
        project(text, library=library)
    except BadProject as bad:
        return list(bad.problems)
    return []


def line_of(text: str, part: str) -> int:
    """The line, from 1, in which a part of the text first stands."""
    return text[: text.index(part)].count("\n") + 1
