"""The box as a body: what edges and corners of thick walls add, and the areas by which a box is judged."""

from __future__ import annotations

import numpy as np

from coldbox.physics.number import Number
from coldbox.physics.validity import within

# Conduction shape factors: of an edge 0.54 of its length, of a corner 0.15 of the thickness of its walls.
EDGE, CORNER = 0.54, 0.15
_METHOD = "Conduction shape factors for edges and corners"


def effective_area(area: Number, thickness: Number, edges: Number, corners: Number = 4.0) -> Number:
    """Area by which a wall of a box conducts, m²: its inside area with half of its edges and a third of its corners.

    A = A_i + ½ · 0.54 t l + ⅓ · 0.15 t² n

    area: A_i, m². thickness: t of the wall, m. edges: l, the lengths of all its edges together, m. corners: n. All
    broadcast. Valid while t is at most the shortest inside side; here a t beyond the side of a square of that area
    raises OutOfValidity, and whoever knows the sides refuses the rest.
    Source: Holman, Heat Transfer, table 3-1; any heat-transfer textbook.
    >>> round(effective_area(0.25, 0.1, 2.0), 3)
    0.306
    """
    within(
        thickness / np.sqrt(area), 0.0, 1.0, quantity="wall thickness over the side of a square face", unit="",
        method=_METHOD,
    )  # fmt: skip
    return area + thickness * (0.5 * EDGE * edges + CORNER / 3.0 * thickness * corners)


def box_shape_factor(length: Number, width: Number, height: Number, thickness: Number) -> Number:
    """Conduction shape factor of a box with equal walls, m: heat flow = S λ Δt between its two surfaces.

    S = A / t + 4 · 0.54 (l + w + h) + 8 · 0.15 t

    length, width, height: inside, m. thickness: t, m. All broadcast. Valid while t is above zero and at most the
    shortest inside side, else OutOfValidity.
    Source: Holman, Heat Transfer, table 3-1 and ex. 3-2.
    >>> round(box_shape_factor(0.5, 0.5, 0.5, 0.1), 2)
    18.36
    """
    for side in (length, width, height):
        within(thickness / side, 1e-9, 1.0, quantity="wall thickness over an inside side", unit="", method=_METHOD)
    area = 2.0 * (length * width + width * height + height * length)
    return area / thickness + 4.0 * EDGE * (length + width + height) + 8.0 * CORNER * thickness


def mean_area(inside: Number, outside: Number) -> Number:
    """Mean area of a body, m², as transport judges it.

    S = √(S_i S_e)

    inside: S_i, m². outside: S_e, m². Both broadcast.
    Source: UN ATP, Annex 1, Appendix 1, the K coefficient (from memory).
    >>> mean_area(4.0, 9.0)
    6.0
    """
    found = np.sqrt(inside * outside)
    return found if isinstance(found, np.ndarray) else float(found)


def k_value(ua: Number, inside: Number, outside: Number) -> Number:
    """K coefficient of a body, W/(m²·K).

    K = UA / √(S_i S_e)

    ua: conductance of the whole body, W/K. inside: S_i, m², above zero. outside: S_e, m², above zero, else
    OutOfValidity. All broadcast.
    Source: UN ATP, Annex 1, Appendix 1 (from memory).
    >>> k_value(3.0, 4.0, 9.0)
    0.5
    """
    for area in (inside, outside):
        within(area, 1e-9, 1e9, quantity="area of the body", unit="m²", method="The K coefficient")
    return ua / mean_area(inside, outside)
