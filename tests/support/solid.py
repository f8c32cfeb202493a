"""Steady conduction by finite volumes through the walls of a box or of an L-shaped duct: what effective areas are held
against. Films are conductances on the faces of the cells."""

from __future__ import annotations

import numpy as np
from scipy.sparse import coo_matrix
from scipy.sparse.linalg import cg, spsolve

SOLID, ROOM, OPEN = 0, 1, 2


def conductance(
    kind: np.ndarray, sizes: list[np.ndarray], conductivity: float, inside_film: float, outside_film: float
):
    """W/K from room to open air (per metre where there are two axes) of cells marked SOLID, ROOM or OPEN.

    kind: cells; sizes: cell widths along each axis, m. Outer faces of the grid are symmetry planes.
    """
    solid = kind == SOLID
    number = np.full(kind.shape, -1)
    number[solid] = np.arange(solid.sum())
    rows, columns, values = [], [], []
    diagonal, source = np.zeros(solid.sum()), np.zeros(solid.sum())
    widths = np.meshgrid(*sizes, indexing="ij")
    volume = np.prod(widths, axis=0)
    for axis in range(kind.ndim):
        first = tuple(slice(0, -1) if one == axis else slice(None) for one in range(kind.ndim))
        second = tuple(slice(1, None) if one == axis else slice(None) for one in range(kind.ndim))
        area = (volume / widths[axis])[first]
        half_1, half_2 = widths[axis][first] / 2 / conductivity, widths[axis][second] / 2 / conductivity
        kinds_1, kinds_2 = kind[first], kind[second]
        both = (kinds_1 == SOLID) & (kinds_2 == SOLID)
        flow = (area / (half_1 + half_2))[both]
        a, b = number[first][both], number[second][both]
        rows += [a, b]
        columns += [b, a]
        values += [-flow, -flow]
        np.add.at(diagonal, a, flow)
        np.add.at(diagonal, b, flow)
        for film, what in ((inside_film, ROOM), (outside_film, OPEN)):
            for mine, other, half, own in (
                (kinds_1, kinds_2, half_1, number[first]),
                (kinds_2, kinds_1, half_2, number[second]),
            ):
                edge = (mine == SOLID) & (other == what)
                flow = (area / (half + film))[edge]
                np.add.at(diagonal, own[edge], flow)
                if what == ROOM:
                    np.add.at(source, own[edge], flow)
    every = np.arange(len(diagonal))
    matrix = coo_matrix(
        (np.concatenate([*values, diagonal]), (np.concatenate([*rows, every]), np.concatenate([*columns, every])))
    ).tocsr()
    if len(diagonal) < 5000:
        temperature = spsolve(matrix, source)
    else:
        temperature, failed = cg(matrix, source, rtol=1e-9)
        assert not failed
    # With the room at 1 and the open air at 0, what the room gives is what its faces pass.
    return float(source.sum() - source @ temperature)


def octant(half: tuple[float, float, float], walls: tuple[float, float, float], cells: int):
    """An eighth of a box: half its inside sizes, the walls they end at, and cells across each wall."""
    sizes, inner, whole = [], [], []
    for side, wall in zip(half, walls, strict=True):
        fine = wall / cells
        # Along the inside the cells may grow towards the middle.
        steps, left = [], side
        width = fine
        while left > 1e-12:
            width = min(width * 1.3, left)
            steps.append(width)
            left -= width
        sizes.append(np.array([*steps[::-1], *[fine] * cells, fine]))
        inner.append(len(steps))
        whole.append(len(steps) + cells + 1)
    kind = np.full(whole, SOLID)
    kind[tuple(slice(0, count) for count in inner)] = ROOM
    for axis in range(3):
        kind[tuple(slice(-1, None) if one == axis else slice(None) for one in range(3))] = OPEN
    return kind, sizes


def box(half: tuple[float, float, float], walls: tuple[float, float, float], conductivity: float, inside_film: float,
        outside_film: float) -> float:  # fmt: skip
    """W/K of a whole box, carried from 6 and 12 cells across the walls to infinitely many.

    The heat flow at an inward edge of the solid makes the error fall with the cells to the power of 4/3.
    """
    coarse, fine = (
        8.0 * conductance(*octant(half, walls, cells), conductivity, inside_film, outside_film) for cells in (6, 12)
    )
    return fine + (fine - coarse) / (2.0 ** (4 / 3) - 1.0)
