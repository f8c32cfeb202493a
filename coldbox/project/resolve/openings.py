"""What is cut out of the faces: panels, which never open, and doors; and fresh air brought in on purpose."""

from __future__ import annotations

import math
from collections.abc import Mapping
from typing import Any

from coldbox.physics.number import Number
from coldbox.project.model import Door, Face, Panel, Ventilation
from coldbox.project.raw import Block
from coldbox.project.resolve.body import Common, listed
from coldbox.project.resolve.constructions import Walls
from coldbox.project.resolve.reader import Reader, Work
from coldbox.project.resolve.rows import row_or_problem
from coldbox.project.resolve.surroundings import Behind
from coldbox.project.sizes import face_size


def title(block: Block, word: str, alone: bool) -> str:
    """The name of a thing; one without is called by its word, numbered when it is not the only one."""
    if block.name != block.path:
        return block.name
    return word if alone else f"{word} {block.path.rpartition('[')[2].rstrip(']')}"


class Opening:
    """A block that is cut out of a face: what the face says holds for it unless it says otherwise."""

    def __init__(self, reader: Reader, faces: Mapping[str, Face], common: Common, walls: Walls, behind: Behind) -> None:
        self.reader, self.faces, self.common = reader, faces, common
        if reader.table == "doors":
            reader.on_library("doors", "width" in reader.typed)
        name = reader.value("face")
        self.face = faces.get(name) or faces["front"]
        self.construction = self._construction(walls)
        self.neighbour = self._neighbour(behind)

    def _construction(self, walls: Walls) -> str | None:
        own = walls.of(self.reader)
        if own is not None and self.common.k_value is not None:
            said = next(
                key for key in ("construction", "r_value", "u_value") if own != self.reader.path or self.reader.has(key)
            )
            self.reader.problem(said, "The box has a k_value, which counts doors and panels too: keep one of them.")
            return None
        return own or self.face.construction

    def _neighbour(self, behind: Behind) -> str:
        if not self.reader.has("neighbour"):
            return self.face.neighbour
        floor = self.face.name == "floor" and self.reader.table == "panels"
        return behind.check(self.reader, self.reader.given("neighbour"), floor=floor)

    def surface(self) -> dict[str, Any]:
        """What panels and doors have alike."""
        reader, face = self.reader, self.face
        shade = reader.given("shade")
        return {
            "face": face.name,
            "construction": self.construction,
            "neighbour": self.neighbour,
            "colour": reader.given("colour") or face.colour,
            "weathered": face.weathered,
            "emissivity": face.emissivity,
            "shade": face.shade if shade is None else shade,
            "solar_gain": (reader.value if self.neighbour == "outdoors" else reader.quiet)("solar_gain"),
        }


def panel(opening: Opening, name: str, sizes: Mapping[str, Number | None]) -> Panel:
    """A panel; its height is that of its face unless it says otherwise."""
    reader = opening.reader
    width, height, area = reader.given("width"), reader.given("height"), reader.given("area")
    if area is not None:
        for key, value in (("width", width), ("height", height)):
            if value is not None:
                reader.problem(key, "area says how large it is already: keep area, or width and height.")
        width = height = None
    elif width is None:
        reader.missing("width", 'Write width (and height), such as "1.2 m", or area.')
        area = math.nan
    else:
        if height is None:
            height = face_size(opening.face.name, sizes)[1]
        if height is None:
            reader.missing("height", "A box of another shape has no height of its own: write the panel's, or its area.")
            height = math.nan
        area = width * height
    return Panel(name=name, width=width, height=height, area=area, **opening.surface())


def door(opening: Opening, name: str) -> Door:
    """A door, with what protects it."""
    reader = opening.reader
    if opening.neighbour == "ground":
        key = "neighbour" if reader.has("neighbour") else "face"
        said = f"A door opens into air, and behind the {opening.face.name} is the ground."
        reader.problem(key, f'{said} Put it on another face, or write what air is behind it, such as "room".')
    protection, held, power = _protection(reader)
    traffic = reader.value if reader.has("passages") or reader.has("stood_open") else reader.quiet
    return Door(
        name=name,
        width=reader.need("width", 'Write the clear width, such as "900 mm".'),
        height=reader.need("height", 'Write the clear height, such as "2 m".'),
        count=reader.value("count"),
        passages=reader.value("passages"),
        open_each=traffic("open_each"),
        stood_open=reader.value("stood_open"),
        hours=traffic("hours"),
        protection=protection,
        effectiveness=held,
        protection_power=power,
        flow_factor=traffic("flow_factor"),
        gasket_leakage=reader.value("gasket_leakage"),
        heater=reader.value("heater"),
        heater_to_room=(reader.value if reader.has("heater") else reader.quiet)("heater_to_room"),
        **opening.surface(),
    )


def _protection(reader: Reader) -> tuple[tuple[str, ...], Any, Any]:
    """What holds the air back, the share of it, and what its motor draws. What several let through multiplies."""
    words = tuple(word for word in listed(reader.value("protection")) if word != "none")
    passed, power, sources = 1.0, 0.0, []
    for word in words:
        row = row_or_problem(reader, "protection", "protection", word)
        if row:
            passed *= 1.0 - row["effectiveness"]
            power += row["power"]
            sources.append(word)
    if not words:
        held = reader.given("effectiveness")
        drawn = reader.given("protection_power")
        return words, 0.0 if held is None else held, 0.0 if drawn is None else drawn
    reason = f"protection table: {' and '.join(sources)}"
    held = reader.fall("effectiveness", 1.0 - passed, f"{100 * (1 - passed):.3g} %", reason)
    drawn = (
        reader.fall("protection_power", power, f"{power:g} W", reason) if power else reader.given("protection_power")
    )
    return words, held, 0.0 if drawn is None else drawn


def ventilation(work: Work, block: Block, name: str, common: Common, behind: Behind) -> Ventilation:
    """Fresh air: from behind the box unless said otherwise."""
    reader = Reader(work, "ventilation", block.path, block)
    if reader.has("neighbour"):
        neighbour = behind.check(reader, reader.given("neighbour"))
    else:
        neighbour = common.behind(behind, floor=True)
        if neighbour in ("ground", "void", "road"):
            reader.missing("neighbour", f'The box has "{neighbour}" behind it, where no fresh air comes from.')
    return Ventilation(
        name=name,
        flow=reader.need("flow", 'Write how much, such as "100 m³/h".'),
        hours=reader.value("hours"),
        recovery=reader.value("recovery"),
        dried_to=reader.given("dried_to"),
        neighbour=neighbour,
    )
