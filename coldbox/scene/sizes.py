"""The six faces in square metres, from inside or outside dimensions, with a notch or of another shape.

A rectangular notch takes its area from floor and ceiling. It leaves the wall areas as they are: what the back wall and
the side wall lose, the two walls of the notch give back, and these look the same ways. So the six faces keep their
names, and each keeps its area. What a notch changes is the edges: five upright edges point outwards, one inwards.
"""

from __future__ import annotations

from collections.abc import Mapping

from coldbox.errors import OutOfValidity
from coldbox.physics.number import Number
from coldbox.project.model import FACES, WALLS, Box, Project
from coldbox.project.sizes import cuts, inside, wall_thickness
from coldbox.record import Record
from coldbox.scene.draws import least, most

# An outward edge carries 0.54 of its length beside the areas inside. Seen from the other side the same corner has its
# two areas longer by a wall each, so an inward edge carries 0.54 - 2, here counted in outward edges.
INWARD_EDGE = (0.54 - 2.0) / 0.54


class Sizes(Record):
    """Lengths m, areas m². Mappings by face; `edges` in metres of outward edge, `corners` counted."""

    length: Number | None
    width: Number | None
    height: Number
    volume: Number
    floor_area: Number
    perimeter: Number
    inside: Mapping[str, Number]
    outside: Mapping[str, Number]
    edges: Mapping[str, Number]
    corners: Mapping[str, float]
    outline: Mapping[str, Number]
    boxlike: bool  # length and width are known; else only sums over the walls


def sizes(project: Project) -> Sizes:
    """Inside sizes, areas, edges and outlines of the box.

    Outside dimensions lose each face's own thickest panel. Raises OutOfValidity when a wall is thicker than the
    shortest inside side: the shape factors of edges and corners do not hold there.
    """
    box = project.box
    thickness = wall_thickness(box, project.faces, cuts(project.panels), project.constructions)
    length, width, height = inside(box, thickness).values()
    if length is None or width is None or height is None:
        return _other_shape(box, thickness)
    return _box(box, thickness, length, width, height)


def _box(box: Box, thickness: Mapping[str, Number], length: Number, width: Number, height: Number) -> Sizes:
    notched = box.notch_length is not None and box.notch_width is not None
    along = box.notch_length if box.notch_length is not None else 0.0
    across = box.notch_width if box.notch_width is not None else 0.0
    shortest = [length, width, height]
    if notched:
        shortest += [length - along, width - across]
    _check_thickness(thickness, shortest)
    notch = along * across
    floor, perimeter = length * width - notch, 2.0 * (length + width)
    outer_length = length + thickness["front"] + thickness["back"]
    outer_width = width + thickness["left"] + thickness["right"]
    outer_height = height + thickness["ceiling"] + thickness["floor"]
    walls = {"front": width, "back": width, "right": length, "left": length}
    outer_walls = {"front": outer_width, "back": outer_width, "right": outer_length, "left": outer_length}
    flat, outer_flat = dict.fromkeys(("ceiling", "floor"), floor), outer_length * outer_width - notch
    cut = (box.notch_corner or "").split() if notched else []
    edges: dict[str, Number] = {}
    corners: dict[str, float] = {}
    for name, wide in walls.items():
        # Beside its two horizontal edges a wall has two upright ones; both parts of a notched wall together four, one
        # of them inwards.
        uprights = 3.0 + INWARD_EDGE if name in cut else 2.0
        edges[name] = 2.0 * wide + uprights * height
        corners[name] = 6.0 if name in cut else 4.0
    for name in flat:
        edges[name], corners[name] = perimeter, 5.0 if notched else 4.0
    return Sizes(
        length=length,
        width=width,
        height=height,
        volume=box.volume if box.volume is not None else floor * height,
        floor_area=floor,
        perimeter=perimeter,
        inside={**{name: wide * height for name, wide in walls.items()}, **flat},
        outside={
            **{name: wide * outer_height for name, wide in outer_walls.items()},
            **dict.fromkeys(flat, outer_flat),
        },
        edges=edges,
        corners=corners,
        outline={
            **{name: 2.0 * (wide + height) for name, wide in walls.items()},
            **dict.fromkeys(flat, perimeter),
        },
        boxlike=True,
    )


def _other_shape(box: Box, thickness: Mapping[str, Number]) -> Sizes:
    """Any upright shape from its volume, floor area and perimeter; each wall name holds a quarter of the walls.

    Outside, the floor grows as an outline with right-angled corners does. Four upright edges are counted.
    """
    volume, floor, perimeter = box.volume, box.floor_area, box.perimeter
    if volume is None or floor is None or perimeter is None:
        raise OutOfValidity("sizes given", 0.0, 1.0, 1.0, "", "A box of another shape (volume, floor area, perimeter)")
    height = volume / floor
    _check_thickness(thickness, [height, 4.0 * floor / perimeter])
    wall = 0.25 * sum((thickness[name] for name in WALLS), 0.0)
    outer_height = height + thickness["ceiling"] + thickness["floor"]
    outer_floor = floor + perimeter * wall + 4.0 * wall**2
    side, outer_side = 0.25 * perimeter, 0.25 * perimeter + 2.0 * wall
    flat = ("ceiling", "floor")
    return Sizes(
        length=None,
        width=None,
        height=height,
        volume=volume,
        floor_area=floor,
        perimeter=perimeter,
        inside={**dict.fromkeys(WALLS, side * height), **dict.fromkeys(flat, floor)},
        outside={**dict.fromkeys(WALLS, outer_side * outer_height), **dict.fromkeys(flat, outer_floor)},
        edges={**dict.fromkeys(WALLS, 2.0 * (side + height)), **dict.fromkeys(flat, perimeter)},
        corners=dict.fromkeys(FACES, 4.0),
        outline={**dict.fromkeys(WALLS, 2.0 * (side + height)), **dict.fromkeys(flat, perimeter)},
        boxlike=False,
    )


def _check_thickness(thickness: Mapping[str, Number], sides: list[Number]) -> None:
    shortest = min(least(side) for side in sides)
    thickest = max(most(one) for one in thickness.values())
    if thickest <= shortest:
        return
    # Draw by draw only when the extremes of the draws cross.
    if shortest <= 0.0 or min(least(side - one) for one in thickness.values() for side in sides) < 0.0:
        raise OutOfValidity(
            "the thickness of a wall", thickest, 0.0, max(shortest, 0.0), "m (the shortest inside side)",
            "Conduction shape factors for edges and corners",
        )  # fmt: skip
