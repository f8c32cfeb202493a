"""The box and its six faces."""

from __future__ import annotations

import math
from typing import Any

from coldbox.project.model import FACES, Box, Face, Limit
from coldbox.project.raw import Block
from coldbox.project.resolve.constructions import Walls
from coldbox.project.resolve.reader import Reader, Work
from coldbox.project.resolve.rows import by_room
from coldbox.project.resolve.surroundings import Behind

SIZES = {"length": "3 m", "width": "4 m", "height": "2.4 m"}
SHAPE = ("volume", "floor_area", "perimeter")
NOTCH = ("notch_length", "notch_width", "notch_corner")


def limits(owner: Reader) -> tuple[Limit, ...]:
    """The limits of a lot or of the box."""
    made = []
    for reader in owner.children("limits", f"{owner.table}.limits"):
        above, below = reader.given("above"), reader.given("below")
        where, allowed = reader.value("where"), reader.value("minutes")
        if above is not None and below is not None:
            reader.problem("below", "A limit is above or below, not both. Write two limits.")
        elif above is None and below is None:
            if not owner.work.said_about(reader.path):
                reader.problem("", 'This limit has no temperature. Write above = "8 °C", or below.')
        else:
            side, at = ("above", above) if above is not None else ("below", below)
            made.append(Limit(side=side, limit_c=at, where=where, allowed_s=allowed))  # type: ignore[arg-type]
    return tuple(made)


def box(work: Work, block: Block | None, walls: Walls) -> tuple[Box, Common]:
    """The box, and what it says for all its faces."""
    reader = Reader(work, "box", block.path if block else "box", block)
    sizes = _sizes(reader)
    temperature = reader.need("temperature", 'Write the temperature it is held at, such as "4 °C".')
    what, usual = by_room("room_humidity", temperature)
    k_value, thickness = reader.given("k_value"), reader.given("thickness")
    construction = walls.of(reader)
    if k_value is not None:
        if construction is not None:
            reader.problem("construction", "k_value stands for all six faces: keep it, or the construction.")
        if thickness is None:
            reader.missing("thickness", 'k_value needs the thickness of the walls, for their areas, such as "80 mm".')
            thickness = math.nan
    elif thickness is not None:
        reader.problem("thickness", "This is for a box with a k_value; a construction has its own thickness.")
    air, air_change = reader.value("air"), reader.given("air_change")
    if air == "rate" and air_change is None:
        reader.missing("air_change", 'air = "rate" needs it, such as "2/h" or "10/day".')
    made = Box(
        **sizes,
        measured=reader.value("measured"),
        bearing=reader.given("bearing"),
        temperature=temperature,
        humidity=reader.fall("humidity", usual["humidity"], f"{100 * usual['humidity']:g} %", f"usual in {what}"),
        powered=reader.value("powered"),
        k_value=k_value,
        thickness=thickness,
        allowance=reader.value("allowance"),
        sun=reader.value("sun"),
        air=air,
        use=(reader.value if air == "table" else reader.quiet)("use"),
        films=reader.value("films"),
        leakage=reader.value("leakage"),
        air_change=air_change,
        fittings=reader.value("fittings"),
        credit_cold=reader.value("credit_cold"),
        rules=listed(reader.given("rules")),
        limits=limits(reader),
    )
    return made, Common(reader, construction, k_value)


def listed(value: Any) -> tuple[Any, ...]:
    """One value or several, as a tuple; nothing is an empty one."""
    if value is None:
        return ()
    return tuple(value) if isinstance(value, tuple | list) else (value,)


def _sizes(reader: Reader) -> dict[str, Any]:
    found: dict[str, Any] = {key: reader.given(key) for key in (*SIZES, *NOTCH, *SHAPE)}
    if not any(found[key] is not None for key in SHAPE):
        for key, such in SIZES.items():
            if found[key] is None:
                reader.missing(key, f'Write it such as "{such}".')
                found[key] = math.nan
    elif any(found[key] is None for key in SIZES):
        for key in SHAPE:
            if found[key] is None:
                reader.missing(key, "A box of another shape needs volume, floor_area and perimeter, all three.")
                found[key] = math.nan
    notch = [key for key in NOTCH if found[key] is not None]
    if notch and len(notch) < len(NOTCH):
        for key in NOTCH:
            if found[key] is None:
                reader.missing(key, "A notch needs notch_length, notch_width and notch_corner, all three.")
    for key, whole in (("notch_length", "length"), ("notch_width", "width")):
        if found[key] is not None and found[whole] is not None and found[key] >= found[whole]:
            reader.problem(
                key,
                f"A notch of {found[key]:g} m leaves nothing of a {whole} of {found[whole]:g} m: it must be smaller.",
            )
    return found


class Common:
    """What the box says for all its faces."""

    __slots__ = ("construction", "k_value", "reader")

    def __init__(self, reader: Reader, construction: str | None, k_value: Any) -> None:
        self.reader, self.construction, self.k_value = reader, construction, k_value

    def behind(self, behind: Behind, *, floor: bool) -> str:
        return behind.check(self.reader, self.reader.value("neighbour"), floor=floor)

    def colour(self, *, in_sun: bool) -> str:
        return str((self.reader.value if in_sun else self.reader.quiet)("colour"))


def faces(work: Work, blocks: tuple[Block, ...], common: Common, walls: Walls, behind: Behind) -> dict[str, Face]:
    """All six faces, each completed with what the box says for all. What is taken over has no origin of its own."""
    by_name = {block.name: block for block in blocks}
    return {
        name: _face(Reader(work, "faces", f"faces.{name}", by_name.get(name)), name, common, walls, behind)
        for name in FACES
    }


def _face(reader: Reader, name: str, common: Common, walls: Walls, behind: Behind) -> Face:
    own = walls.of(reader)
    construction = None if common.k_value is not None else own or common.construction
    if own is not None and common.k_value is not None:
        reader.problem("construction", "The box has a k_value, which stands for all six faces: keep one of them.")
    elif construction is None and common.k_value is None:
        _no_construction(reader, common)
    floor = name == "floor"
    if reader.has("neighbour"):
        neighbour = behind.check(reader, reader.given("neighbour"), floor=floor)
    else:
        neighbour = common.behind(behind, floor=floor)
    # Only what this face uses is taken, so that the list of defaults names nothing that has no effect.
    in_sun = neighbour == "outdoors" and not floor
    sees = reader.value if in_sun else reader.quiet
    on_ground = neighbour == "ground" and floor
    lies = reader.value if on_ground else reader.quiet
    return Face(
        name=name,
        construction=construction,
        neighbour=neighbour,
        colour=reader.given("colour") or common.colour(in_sun=in_sun),
        weathered=sees("weathered"),
        emissivity=sees("emissivity"),
        shade=sees("shade"),
        soil=lies("soil"),
        exposed_edge=_exposed_edge(reader) if on_ground else reader.given("exposed_edge"),
        edge_wall=lies("edge_wall"),
    )


def _exposed_edge(reader: Reader) -> Any:
    return reader.fall("exposed_edge", None, "all round", "the whole outline of the floor borders the outdoors")


def _no_construction(reader: Reader, common: Common) -> None:
    """Said once, at the box, when neither a face nor the box says what the walls are made of."""
    work = reader.work
    if "construction" in reader.typed or "construction" in common.reader.typed:
        return  # named, but not found: said there
    if work.said_about("box.construction") or work.said_about(f"{reader.path}.construction"):
        return
    common.reader.missing(
        "construction",
        "Write what the walls are made of: the name of one under [constructions] or of the shop library, such as"
        ' "pir80", or a k_value for the whole body.',
    )
