"""Where the values of a project came from, told to its user."""

from __future__ import annotations

from collections.abc import Mapping

from coldbox.errors import UnitProblem
from coldbox.project import fields
from coldbox.project.model import Project
from coldbox.units import KINDS, parse, show

_AS_TYPED = ("yes_no", "word", "name", "text", "count", "month", "hours")
_LATER = ("outage.", "trip.", "spreads.", "fit.")
_LATER_KEYS = ("piece", "exposed", "air_film", "wrap", "start_temperature", "minutes", "band", "fittings")


def defaults_used(project: Project, *, for_load: bool = False) -> list[tuple[str, str, str]]:
    """Every default of a project that has an effect.

    project   a complete project
    for_load  leave out what only an outage or a trip uses
    result    key path, value in the project's units, reason; the same default of several things is one row, with `*`
              for their names
    """
    merged: dict[tuple[str, str, str], list[str]] = {}
    for path, origin in project.origins.items():
        if origin.kind != "default" or (for_load and _later(path)):
            continue
        merged.setdefault((_place(path)[0], origin.text, origin.reason), []).append(path)
    return [
        (paths[0] if len(paths) == 1 else pattern, _shown(paths[0], text, project.units), reason)
        for (pattern, text, reason), paths in merged.items()
    ]


def _later(path: str) -> bool:
    return path.startswith(_LATER) or path.rpartition(".")[2] in _LATER_KEYS


def _place(path: str) -> tuple[str, str]:
    """The key path with `*` for the names and numbers in it, and the table whose declarations hold for its key."""
    head, _, key = path.rpartition(".")
    pattern, table = "", ""
    for step in head.split(".") if head else ():
        word, bracket, _ = step.partition("[")
        below = "constructions" if word == "construction" else f"{table}.{word}" if table else word
        if below in fields.BY_KEY:
            pattern, table = f"{pattern}.{word}" if pattern else word, below
            star = bool(bracket)
        else:
            star = not pattern.endswith("*")  # a name; or more of one that holds a point
        pattern += ".*" if star else ""
    return f"{pattern}.{key}" if pattern else key, table


def declaration(path: str) -> fields.Field | None:
    """The declaration of a key path such as "doors.main.width" or "constructions.pir100.layers[2].ageing"."""
    found: Mapping[str, fields.Field] = fields.BY_KEY.get(_place(path)[1], {})
    return found.get(path.rpartition(".")[2])


def _shown(path: str, text: str, system: str) -> str:
    """A default in the units of the project; words, and what stands for no value, as they are."""
    field = declaration(path)
    if field is None or field.many or field.kind in _AS_TYPED or field.kind not in KINDS or system == "SI":
        return text
    try:
        return show(parse(text, field.kind).value, field.kind, "IP")
    except UnitProblem:
        return text


def looked_up(project: Project) -> list[tuple[str, str]]:
    """What was looked up in the shop library, not copied: owner's key path, and the row with its date."""
    found = {
        (path.rpartition(".")[0], origin.reason) for path, origin in project.origins.items() if origin.kind == "library"
    }
    owners = {owner for owner, _ in found}
    return sorted(pair for pair in found if not any(pair[0].startswith(f"{owner}.") for owner in owners))
