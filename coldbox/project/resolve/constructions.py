"""Constructions: named ones, those of the shop library, and those that stand inline at their owner."""

from __future__ import annotations

import math
from collections.abc import Mapping
from typing import Any

from coldbox.errors import UnknownName
from coldbox.project.model import Construction, Layer
from coldbox.project.raw import Block
from coldbox.project.resolve.reader import Reader, Work, hint
from coldbox.project.resolve.rows import NOTHING, row, row_or_problem

FILMS = 0.17  # m²K/W, 0.13 inside and 0.04 outside, that a quoted U-value holds (ISO 6946)
AIR_SPACE = ("air", "air space")
QUOTED = ("r_value", "u_value")
INSULATION = ("foam", "insulation", "evacuated")  # kinds of material that count for the panel minimum
LEAST_OF_OTHERS = 0.07  # W/mK: what conducts less is insulation, whatever it is called


class Walls:
    """The constructions of a project: read when they are first named, or all at the end."""

    def __init__(self, work: Work, blocks: tuple[Block, ...]) -> None:
        self.work = work
        self.blocks = {block.name: block for block in blocks}
        self.made: dict[str, Construction] = {}

    def all(self) -> dict[str, Construction]:
        """Every construction, also those of the file that nothing names."""
        for name in self.blocks:
            self._named(name)
        return self.made

    def of(self, reader: Reader) -> str | None:
        """What a block says it is made of: a name, a construction in place, or quoted figures; None for nothing."""
        inline = reader.children("construction", "constructions")
        said = [key for key in ("construction", *QUOTED) if reader.has(key)] + ["construction"] * len(inline)
        if len(said) > 1:
            reader.problem(said[1], f"{said[0]} and {said[1]} both say what this is made of: keep one of them.")
        if inline:
            path = f"{reader.path}.construction"
            self.made[path] = _construction(inline[0], path)
            return path
        if reader.has("construction"):
            return self.name(reader, reader.given("construction"))
        if said:
            self.made[reader.path] = _quoted(reader, reader.path)
            return reader.path
        if reader.has("thickness") and reader.table != "box":
            reader.problem("thickness", "A thickness alone makes no wall: write r_value or u_value with it.")
        return None

    def name(self, reader: Reader, name: Any) -> str | None:
        """A construction by its name: of the file, else of the shop library."""
        if not isinstance(name, str):
            return None
        try:
            self._named(name)
        except UnknownName:
            known = (*self.blocks, *self.work.library.names("constructions"))
            reader.problem(
                "construction",
                f'No construction is called "{name}", neither under [constructions] nor in the shop library.'
                f"{hint(name, known)}",
            )
            return None
        return name

    def _named(self, name: str) -> None:
        if name in self.made:
            return
        block = self.blocks.get(name)
        if block is None:
            row = self.work.library.row("constructions", name)
            reader = Reader(self.work, "constructions", f"constructions.{name}", None)
            self.made[name] = _construction(reader.on(row, self.work.library.said("constructions", row)), name)
            return
        self.made[name] = _construction(self._reader(block), name)

    def _reader(self, block: Block) -> Reader:
        reader = Reader(self.work, "constructions", block.path, block)
        reader.on_library("constructions", any(key in block.values for key in QUOTED) or bool(block.children))
        return reader


def _construction(reader: Reader, name: str) -> Construction:
    layers = reader.children("layers", "constructions.layers")
    said = [key for key in QUOTED if reader.has(key)] + (["layers"] if layers else [])
    if len(said) > 1:
        reader.problem(said[0], f"{' and '.join(said)} say the same thing twice: keep one of them.")
    if not said:
        if not reader.work.said_about(reader.path):
            reader.problem("", "This construction says nothing: write layers, or r_value or u_value with a thickness.")
        return _made(reader, name, (), None, None, math.nan)
    if layers:
        made = tuple(_layer(one) for one in layers)
        total = sum(layer.thickness for layer in made)
        typed = reader.given("thickness")
        if typed is not None and abs(typed - total) > 0.0005:
            reader.problem(
                "thickness",
                f"The layers add up to {1000 * total:g} mm, not {1000 * typed:g} mm. Take thickness away: it follows.",
            )
        return _made(reader, name, made, None, None, total)
    return _quoted(reader, name)


def _quoted(reader: Reader, name: str) -> Construction:
    r_value, u_value = (reader.given(key) for key in QUOTED)
    if u_value is not None and u_value >= 1 / FILMS:
        reader.problem(
            "u_value",
            f"A U-value counts with films of 0.13 and 0.04 m²K/W, so it stays below {1 / FILMS:.2f} W/m²K;"
            f" here it is {u_value:g} W/m²K.",
        )
    thickness = reader.given("thickness")
    if thickness is None:
        key = QUOTED[0] if r_value is not None else QUOTED[1]
        reader.missing("thickness", f'{key} needs it, for the size of the box. Write it such as "80 mm".')
        thickness = math.nan
    return _made(reader, name, (), r_value, u_value, thickness)


def _made(
    reader: Reader, name: str, layers: tuple[Layer, ...], r_value: Any, u_value: Any, thickness: Any
) -> Construction:
    joints: dict[str, Any] = {"edge_loss": 0.0, "point_loss": 0.0, "points": 0}
    if reader.table == "constructions":
        joints = {key: reader.value(key) for key in joints}
        if bool(joints["points"]) != bool(joints["point_loss"]):
            reader.problem(
                "points" if joints["points"] else "point_loss",
                "points counts the bolts, point_loss is the loss of one: write both.",
            )
    return Construction(name=name, layers=layers, r_value=r_value, u_value=u_value, thickness=thickness, **joints)


def _layer(reader: Reader) -> Layer:
    name = reader.given("material")
    name = name if isinstance(name, str) else ""
    thickness = reader.need("thickness", 'Write how thick the layer is, such as "100 mm".')
    ageing, moisture = reader.value("ageing"), reader.value("moisture")
    if name in AIR_SPACE:
        return _air_space(reader, name, thickness)
    row = _material(reader, name)

    def of(key: str, unit: str) -> Any:
        if key not in row:
            return reader.given(key) if reader.has(key) else math.nan
        return reader.fall(key, row[key], f"{row[key]:g} {unit}", f"materials table, {name}", "table")

    conductivity = of("conductivity", "W/mK")
    # A typed conductivity holds as it is; that of the table changes with temperature as the table says.
    factor = 0.0 if reader.has("conductivity") else row.get("temperature_factor", 0.0)
    return Layer(
        material=name,
        thickness=thickness,
        conductivity=conductivity,
        temperature_factor=reader.given("temperature_factor") if reader.has("temperature_factor") else factor,
        density=of("density", "kg/m³"),
        specific_heat=of("specific_heat", "J/kgK"),
        ageing=ageing,
        moisture=moisture,
        emissivity=None,
        foam=row["kind"] in INSULATION if row else conductivity < LEAST_OF_OTHERS,
        edge_psi=row.get("edge_psi", 0.0),
    )


def _material(reader: Reader, name: str) -> Mapping[str, Any]:
    """The row of the material; empty for one of the user's own, which comes with all its figures."""
    own = all(reader.has(key) for key in ("conductivity", "density", "specific_heat"))
    if not name:
        if not own:
            reader.missing("material", "Write the name of a material, or its conductivity, density and specific_heat.")
        return NOTHING
    if not own:
        return row_or_problem(
            reader, "material", "materials", name, "Or write its conductivity, density and specific_heat here."
        )
    try:
        return row("materials", name)
    except UnknownName:
        return NOTHING


def _air_space(reader: Reader, name: str, thickness: Any) -> Layer:
    for key in ("conductivity", "ageing", "moisture"):
        if key in reader.typed:
            reader.problem(key, f"An air space has no {key}: its resistance follows from thickness and emissivity.")
    return Layer(
        material=name,
        thickness=thickness,
        conductivity=None,
        temperature_factor=0.0,
        density=1.2,
        specific_heat=1006.0,
        ageing=0.0,
        moisture=0.0,
        emissivity=reader.fall("emissivity", 0.82, "82 %", "two ordinary faces of 0.9 each (ISO 6946)"),
        foam=False,
        edge_psi=0.0,
    )
