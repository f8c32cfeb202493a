"""The box unfolded like a carton: four walls in a row, the ceiling folded up and the floor folded down from the front.

Every face with its watts at the peak hour, its W/m² as a figure and as a shade, and what is behind it; doors stand in
their faces as gaps in the lower line; what is in the box stands beside the floor.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from typing import Final, Literal

import numpy as np

from coldbox.account.entry import Entry, Load
from coldbox.paper.drawing.canvas import Canvas, Place, width
from coldbox.physics.number import Number
from coldbox.project.model import FACES, Project
from coldbox.record import Record
from coldbox.units import compass_point, show, show_number

System = Literal["SI", "IP"]
SHADES: Final = ((3.0, " ", "shade0"), (6.0, "░", "shade1"), (12.0, "▒", "shade2"), (25.0, "▓", "shade3"))
HOTTEST: Final = ("█", "shade4")
LEAST: Final = (44, 14)  # columns and rows below which a list is drawn instead
NARROWEST: Final = 9  # columns inside a wall
TURN: Final = {"front": 0.0, "left": 90.0, "back": 180.0, "right": 270.0}
WALLS: Final = ("left", "front", "right", "back")


class Drawing(Record):
    """A canvas, and where on it each thing stands, by key path."""

    canvas: Canvas
    places: Mapping[str, Place]


class _Said(Record):
    """What is told of one face."""

    name: str  # with its bearing
    watts: str
    flux: str
    behind: str
    shade: str
    style: str


def carton(
    project: Project, load: Load, width: int, height: int, *, system: System = "SI", ascii_only: bool = False
) -> Drawing:
    """The unfolded box on so many columns and rows; too small a room gives the same as a list."""
    canvas = Canvas(width, height, ascii_only=ascii_only)
    said = {face: _said(project, load, face, system) for face in FACES}
    if width < LEAST[0] or height < LEAST[1]:
        return _listed(canvas, project, said, system)
    return _Unfolded(canvas, project, said, system).drawing()


def of_face(load: Load, face: str) -> tuple[float, float]:
    """Watts through a face at the peak hour, sun included, and its area inside, m²."""
    mine = [entry for entry in load.entries if entry.id in (face, f"sun.{face}")]
    watts = sum(float(np.mean(entry.hours_w[..., load.peak_hour])) for entry in mine)
    return watts, max((_area(entry) for entry in mine if entry.id == face), default=0.0)


def _area(entry: Entry) -> float:
    return next((float(np.mean(one.value)) for one in entry.inputs if one.label == "A inside"), 0.0)


def _said(project: Project, load: Load, face: str, system: System) -> _Said:
    watts, area = of_face(load, face)
    flux = watts / area if area > 0.0 else 0.0
    bearing = project.box.bearing
    name = face
    if face in TURN and bearing is not None:
        name = f"{face} {compass_point((float(np.mean(bearing)) + TURN[face]) % 360.0)}"
    at = next(((shade, style) for below, shade, style in SHADES if abs(flux) < below), HOTTEST)
    behind = project.faces[face].neighbour
    lit = any(entry.id == f"sun.{face}" and float(np.max(entry.hours_w)) > 0.0 for entry in load.entries)
    number, unit = show_number(flux, "irradiance", system, 2) if area > 0.0 else ("", "")
    return _Said(
        name=name,
        watts=show(watts, "power", system, 3),
        flux=f"{number} {unit}".strip(),
        behind="sun" if lit else behind,
        shade=at[0],
        style=at[1],
    )


def inside(project: Project, system: System) -> Iterator[tuple[str, str]]:
    """Key path and words of everything in the box, goods first."""
    for table in ("lots", "packs", "people", "lights", "motors", "trucks", "heaters", "ventilation"):
        for number, one in enumerate(getattr(project, table), 1):
            name = one.name or f"{table} {number}"
            yield f"{table}.{one.name}" if one.name else f"{table}[{number}]", _words(table, one, name, system)


def _words(table: str, one: object, name: str, system: System) -> str:
    def figure(key: str, kind: str) -> str:
        value = getattr(one, key, None)
        return (
            "" if value is None or not np.any(np.greater(value, 0.0)) else show(float(np.mean(value)), kind, system, 3)
        )

    count = int(float(np.mean(getattr(one, "count", 1))))
    if table == "lots":
        return " ".join(part for part in (name, figure("stored", "mass"), _daily(one, system)) if part)
    if table == "packs":
        return f"{name} {count} x {figure('mass', 'mass')}" if count > 1 else f"{name} {figure('mass', 'mass')}"
    if table == "people":
        return f"{count} {name}"
    many = f"{count} x " if count > 1 else ""
    return f"{many}{name} {figure('power', 'power')}".strip()


def _daily(one: object, system: System) -> str:
    arrives = getattr(one, "arrives", None)
    if arrives is None or not np.any(np.greater(arrives, 0.0)):
        return ""
    return f"{show(float(np.mean(arrives)) * 86400.0, 'mass', system, 3)}/day"


class _Unfolded:
    """The places of everything, and the pen."""

    def __init__(self, canvas: Canvas, project: Project, said: Mapping[str, _Said], system: System) -> None:
        self.canvas, self.project, self.said, self.system = canvas, project, said, system
        self.places: dict[str, Place] = {}
        box = project.box
        self.length, self.width, self.tall = (_metres(one) for one in (box.length, box.width, box.height))

    def drawing(self) -> Drawing:
        columns = self._columns()
        ceiling, walls, floor = self._rows()
        x, edges = 0, {}
        for face in WALLS:
            edges[face] = (x, columns[face] + 2)
            x += columns[face] + 1
        front_x, front_w = edges["front"]
        top, middle, low = 0, ceiling + 1, ceiling + walls + 2
        self._face("ceiling", Place(x=front_x, y=top, width=front_w, height=ceiling + 2))
        for face in WALLS:
            at, wide = edges[face]
            self._face(face, Place(x=at, y=middle, width=wide, height=walls + 2))
        self._face("floor", Place(x=front_x, y=low, width=front_w, height=floor + 2))
        for face in FACES:
            self._openings(face, self.places[f"faces.{face}"])
        self._beside(front_x + front_w + 1, low + 1, floor + 1)
        self._around(front_x + front_w + 1, top, ceiling + 1)
        return Drawing(canvas=self.canvas, places=self.places)

    def _columns(self) -> dict[str, int]:
        """Columns inside each wall: by their lengths, as far as every wall keeps room for its figures."""
        room = self.canvas.width - 5
        metres = {"left": self.length, "front": self.width, "right": self.length, "back": self.width}
        found = {face: max(round(room * metres[face] / sum(metres.values())), NARROWEST) for face in WALLS}
        while sum(found.values()) > room:
            widest = max(found, key=lambda face: found[face])
            found[widest] -= 1
        return found

    def _rows(self) -> tuple[int, int, int]:
        """Rows inside ceiling, walls and floor: the walls by the box's height, the rest shared."""
        room = self.canvas.height - 4
        scale = self._columns()["front"] / max(self.width, 1e-3) / 2.0  # a cell is twice as high as wide
        walls = int(np.clip(round(self.tall * scale), 4, max(room - 6, 4)))
        lie = int(np.clip(round(self.length * scale), 3, max((room - walls) // 2, 3)))
        return lie, walls, max(min(lie, room - walls - lie), 3)

    def _face(self, face: str, place: Place) -> None:
        canvas, said = self.canvas, self.said[face]
        canvas.frame(place.x, place.y, place.width, place.height)
        self.places[f"faces.{face}"] = place
        x, room = place.x + 1, place.width - 2
        canvas.text(x, place.y, said.name, "title", room)
        canvas.text(x, place.y + 1, said.watts, "text", room)
        flux = said.flux if width(said.watts) + width(said.flux) + 1 > room else ""
        if not flux:
            canvas.text(x + width(said.watts) + 1, place.y + 1, said.flux, "dim", room - width(said.watts) - 1)
        lines = [flux, said.behind] if flux else [said.behind]
        rows = place.height - 2
        for row, line in enumerate(line for line in lines if line):
            text = line if width(line) <= room else line.partition(" ")[0]  # rather no unit than half of one
            if row + 2 <= rows:
                canvas.text(x, place.y + 2 + row, text, "dim", room)
        first = place.y + 2 + len([line for line in lines if line])
        if said.shade != " ":
            for row in range(first, place.y + 1 + rows):
                canvas.text(x, row, said.shade * room, said.style, room)

    def _openings(self, face: str, place: Place) -> None:
        """Doors as gaps from the lower line up, panels as dotted squares, the widest room first."""
        doors = [one for one in self.project.doors if one.face == face]
        panels = [one for one in self.project.panels if one.face == face]
        metres = self.width if face in ("front", "back", "ceiling", "floor") else self.length
        scale = (place.width - 2) / max(metres, 1e-3)
        right = place.x + place.width - 1
        tall = max(min(place.height - 3, 3), 2)
        cut: list[tuple[str, str, Number | None]] = [("doors", one.name, one.width) for one in reversed(doors)]
        cut += [("panels", one.name, one.width) for one in panels]
        for table, name, across in cut:
            wide = int(np.clip(round(_metres(across) * scale), 3, max(place.width // 2 - 1, 3)))
            if right - wide < place.x + 1:
                break
            x, y = right - wide, place.y + place.height - 1 - tall
            right = x - 1
            opening = table == "doors"
            edge, top = ("│", "─") if opening else ("┆", "┄")
            for row in range(y, y + tall):
                self.canvas.text(x, row, edge + " " * (wide - 2) + edge, "door", wide)
            if opening:
                self.canvas.text(x, y + tall, "┘" + " " * (wide - 2) + "└", "door", wide)
            self.canvas.text(x, y, ("┌" + top * (wide - 2) + "┐"), "door", wide)
            self.canvas.text(x + 1, y + 1, name, "door", wide - 2)
            self.places[f"{table}.{name}"] = Place(x=x, y=y, width=wide, height=tall + (1 if opening else 0))

    def _beside(self, x: int, y: int, rows: int) -> None:
        """What is in the box, in as many columns as there is room for."""
        things = list(inside(self.project, self.system))
        self.canvas.text(x, y - 1 if rows < 3 else y, "inside" if things else "nothing inside yet", "title")
        first, room = y + 1, rows - 1
        across = self.canvas.width - x
        columns = max(min(across // 20, -(-len(things) // max(room, 1))), 1)
        wide = across // columns
        shown = things if len(things) <= columns * room else things[: columns * room - 1]
        for number, (path, words) in enumerate(shown):
            at_x, at_y = x + number // room * wide, first + number % room
            self.canvas.text(at_x, at_y, words, "text", wide - 1)
            self.places[path] = Place(x=at_x, y=at_y, width=min(width(words), wide - 1), height=1)
        if len(shown) < len(things):
            number = len(shown)
            self.canvas.text(x + number // room * wide, first + number % room, f"{len(things) - number} more", "dim")

    def _around(self, x: int, y: int, rows: int) -> None:
        """Where it stands, what cools it, what is asked of it: beside the ceiling."""
        project, wide = self.project, self.canvas.width - x
        site = project.site
        place = "indoors" if site is None else f"{site.place or 'outdoors'}, {_degrees(site.dry_bulb, self.system)}"
        unit = project.machine.unit or ("no machine yet" if project.machine.capacity is None else "machine")
        held = f"{_degrees(project.box.temperature, self.system)} inside"
        told = [("box", held), ("site", place), ("machine", unit if project.box.powered else "nothing cools it"),
                ("outage", "outage"), ("sizing", "sizing")]  # fmt: skip
        for row, (path, words) in enumerate(told[:rows]):
            self.canvas.text(x, y + row, words, "text", wide)
            self.places[path] = Place(x=x, y=y + row, width=min(width(words), wide), height=1)


def _metres(value: Number | None) -> float:
    """For the proportions alone; a box of another shape is drawn as a cube."""
    return 3.0 if value is None else float(np.mean(value))


def _degrees(value: Number, system: System) -> str:
    return show(float(np.mean(value)), "temperature", system)


def _listed(canvas: Canvas, project: Project, said: Mapping[str, _Said], system: System) -> Drawing:
    """The same as a list, for a room without room."""
    places: dict[str, Place] = {}
    told = [(f"faces.{face}", f"{one.name} {one.watts}, {one.behind}") for face, one in said.items()]
    told += [(f"doors.{door.name}", f"door {door.name}") for door in project.doors]
    told += list(inside(project, system))
    for row, (path, words) in enumerate(told[: canvas.height]):
        canvas.text(0, row, words, "text")
        places[path] = Place(x=0, y=row, width=min(width(words), canvas.width), height=1)
    return Drawing(canvas=canvas, places=places)
