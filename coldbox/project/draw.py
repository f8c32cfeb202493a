"""Numbers of a project replaced by key path: one value, or an array of draws, each with all that follows from it.

The keys are those of the file: "box.temperature", "doors.main.passages", "constructions.pir100.layers[2].conductivity",
"lots.cod.limits[1].above", also "doors[1].width". A rate takes a value per second and keeps its basis.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from typing import Any

from coldbox.errors import UnknownName
from coldbox.physics.number import Number
from coldbox.project import sizes
from coldbox.project.model import Construction, Door, Panel, Project
from coldbox.project.words import nearest
from coldbox.record import Record
from coldbox.units.clock import Rate

_FROM_FACE = ("shade", "emissivity")
_TABLES = {"spreads": "spread_factors"}  # tables of the file whose record is called otherwise
_KEYS = {
    ("Limit", "limit_c"): "",  # by its side: "above" or "below"
    ("Limit", "allowed_s"): "minutes",
    ("RespirationPoint", "at_c"): "at",
    ("RespirationPoint", "w_per_kg"): "heat",
    ("Lot", "safe_above_c"): "safe_above",
}
_TOP = (
    "site", "box", "constructions", "neighbours", "faces", "panels", "doors", "lots", "packs", "people", "lights",
    "motors", "trucks", "heaters", "ventilation", "quoted", "machine", "outage", "trip", "sizing", "money", "spreads",
    "fit",
)  # fmt: skip


def with_values(project: Project, values: Mapping[str, Number | Rate]) -> Project:
    """The project with some numbers replaced.

    project  a complete project
    values   by key path, in SI: a float, or an array of shape (draws, 1)
    result   another project; areas, thicknesses and what one part takes over from another follow
    raises   UnknownName for a path that is no number of this project

    Defaults that were chosen by a value (humidity by temperature, defrost by room) stay as they were chosen.
    """
    for path, value in values.items():
        project = _put(project, path, value)
    return _derived(project) if values else project


def numeric_paths(project: Project) -> dict[str, Number]:
    """Every number that `with_values` replaces, by key path; a rate as its value per second.

    Left out are counts and clock times, and what follows from other numbers.
    """
    return {path: value.per_second if isinstance(value, Rate) else value for path, value in _numbers(project)}


def _numbers(project: Project) -> Iterator[tuple[str, Any]]:
    walk = _Walk(project)
    for table in _TOP:
        part = getattr(project, _TABLES.get(table, table))
        if isinstance(part, Record):
            yield from walk.record(part, table)
        elif isinstance(part, Mapping):
            for name, one in part.items():
                # A construction that stands inline has the path of its place as its name.
                inline = table == "constructions" and name in walk.places and f"{table}.{name}" not in walk.places
                yield from walk.record(one, name if inline else f"{table}.{name}")
        elif part:
            yield from walk.things(part, table)


class _Walk:
    """One pass over a project: every number with its path."""

    def __init__(self, project: Project) -> None:
        self.origins = project.origins
        self.places = {path.rpartition(".")[0] for path in project.origins}

    def record(self, record: Record, path: str) -> Iterator[tuple[str, Any]]:
        for name, value in record:
            if value is None or self.follows(record, name, path):
                continue
            here = f"{path}.{_key(record, name)}"
            annotation = type(record).__annotations__[name]
            if isinstance(value, Record):
                yield from self.record(value, here)
            elif isinstance(value, tuple) and value and isinstance(value[0], Record):
                yield from self.things(value, here)
            elif annotation.startswith("tuple[Number"):
                yield from ((f"{here}[{number}]", one) for number, one in enumerate(value, 1))
            elif annotation.startswith(("Number", "Rate")):
                yield here, value

    def things(self, things: tuple[Record, ...], path: str) -> Iterator[tuple[str, Any]]:
        """Things of a list, by name where the file gives them one, else by number."""
        for number, one in enumerate(things, 1):
            named = f"{path}.{getattr(one, 'name', '')}"
            numbered = f"{path}[{number}]"
            yield from self.record(one, named if named in self.places and numbered not in self.places else numbered)

    def follows(self, record: Record, name: str, path: str) -> bool:
        """Whether a number follows from others, so that it cannot be replaced by itself."""
        if isinstance(record, Construction):
            return name == "thickness" and bool(record.layers)
        cut_out = isinstance(record, Panel) and name in ("area", "height")
        taken_over = isinstance(record, Panel | Door) and name in _FROM_FACE
        return (cut_out or taken_over) and f"{path}.{name}" not in self.origins


def _key(record: Record, name: str) -> str:
    key = _KEYS.get((type(record).__name__, name))
    return name if key is None else key or str(getattr(record, "side"))  # noqa: B009  only a limit has one


def _put(project: Project, path: str, value: Any) -> Project:
    placed = _inline(project, path, value)
    if placed is not None:
        return placed
    table = path.partition(".")[0].partition("[")[0]
    if table in _TOP:
        attribute = _TABLES.get(table, table)
        placed = _placed(getattr(project, attribute), path[len(table) :], value)
        if placed is not None:
            return project.replace(**{attribute: placed})
    raise UnknownName("numbers of this project", path, nearest(path, numeric_paths(project)))


def _inline(project: Project, path: str, value: Any) -> Project | None:
    """The project with a construction changed that stands at its owner; None when the path means no such thing."""
    for name, made in project.constructions.items():
        if path.startswith(f"{name}."):
            placed = _placed(made, path[len(name) :], value)
            if placed is not None:
                return project.replace(constructions={**project.constructions, name: placed})
    return None


def _placed(node: Any, rest: str, value: Any) -> Any:
    """`node` with the number at `rest` (".key", "[2]", ".name.key" …) replaced; None when there is no such number."""
    if not rest:
        return _number(node, value)
    if isinstance(node, Record):
        return _in_record(node, rest, value)
    for key, one, after in _matches(node, rest):
        placed = _placed(one, after, value)
        if placed is not None:
            if isinstance(node, Mapping):
                return {**node, key: placed}
            return (*node[:key], placed, *node[key + 1 :])
    return None


def _number(old: Any, value: Any) -> Any:
    if isinstance(old, Rate):
        return value if isinstance(value, Rate) else Rate(value, old.basis)
    if old is None or isinstance(old, (str, bool, tuple, Record, Mapping)):
        return None
    return value


def _in_record(record: Record, rest: str, value: Any) -> Record | None:
    for name, old in record:
        key = f".{_key(record, name)}"
        if rest.startswith(key) and (len(rest) == len(key) or rest[len(key)] in ".["):
            placed = _placed(old, rest[len(key) :], value)
            if placed is not None:
                return record.replace(**{name: placed})
    return None


def _matches(node: Any, rest: str) -> Iterator[tuple[Any, Any, str]]:
    """What of a mapping or a tuple the first step of `rest` may mean; names may hold points, so longer ones first."""
    if isinstance(node, Mapping):
        for name in sorted(node, key=len, reverse=True):
            if rest.startswith(f".{name}."):
                yield name, node[name], rest[len(name) + 1 :]
    elif isinstance(node, tuple) and not isinstance(node, Rate):
        if rest.startswith("["):
            inner, _, after = rest[1:].partition("]")
            if inner.isdecimal() and 1 <= int(inner) <= len(node):
                yield int(inner) - 1, node[int(inner) - 1], after
            return
        named = [(index, one) for index, one in enumerate(node) if hasattr(one, "name")]
        for index, one in sorted(named, key=lambda pair: -len(pair[1].name)):
            if rest.startswith(f".{one.name}."):
                yield index, one, rest[len(one.name) + 1 :]


def _derived(project: Project) -> Project:
    """The project with all that follows from other numbers made to follow."""
    constructions = {
        name: made.replace(thickness=sum((layer.thickness for layer in made.layers[1:]), made.layers[0].thickness))
        if made.layers
        else made
        for name, made in project.constructions.items()
    }
    thickness = sizes.wall_thickness(project.box, project.faces, sizes.cuts(project.panels), constructions)
    inside = sizes.inside(project.box, thickness)
    panels = tuple(_panel(project, number, panel, inside) for number, panel in enumerate(project.panels, 1))
    doors = tuple(
        door.replace(**_of_face(project, "doors", number, door)) for number, door in enumerate(project.doors, 1)
    )
    return project.replace(constructions=constructions, panels=panels, doors=doors)


def _panel(project: Project, number: int, panel: Panel, inside: Mapping[str, Number | None]) -> Panel:
    changes = _of_face(project, "panels", number, panel)
    if panel.width is not None and panel.height is not None:
        height = panel.height
        if not _said(project, "panels", number, panel.name, "height"):
            upward = sizes.face_size(panel.face, inside)[1]
            height = height if upward is None else upward
        changes |= {"height": height, "area": panel.width * height}
    return panel.replace(**changes)


def _of_face(project: Project, table: str, number: int, part: Panel | Door) -> dict[str, Any]:
    """What a panel or a door takes over from its face."""
    face = project.faces[part.face]
    return {key: getattr(face, key) for key in _FROM_FACE if not _said(project, table, number, part.name, key)}


def _said(project: Project, table: str, number: int, name: str, key: str) -> bool:
    return f"{table}.{name}.{key}" in project.origins or f"{table}[{number}].{key}" in project.origins
