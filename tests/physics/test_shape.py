"""The box as a body, against a solution in three dimensions with films on both sides, and the textbook's factors."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.sparse import csr_matrix, diags
from scipy.sparse.linalg import cg

from coldbox.errors import OutOfValidity
from coldbox.physics import panel, shape

sides = st.floats(0.3, 20.0)


def wall_edges(half, thickness, cells):
    """Cell edges from the middle of a box through its wall: even in the wall, growing by a quarter away from it."""
    fine = thickness / cells
    edges, width = [half], fine
    while edges[-1] > 0.0:
        width = min(1.25 * width, half / 4)
        edges.append(max(edges[-1] - width, 0.0))
    if edges[-2] < 0.3 * width:
        edges.pop(-2)
    return np.concatenate([edges[::-1], half + fine * np.arange(1, cells + 1)])


def solved_conductance(inside, thickness, conductivity, inside_film, outside_film, cells):
    """W/K of a box from air to air by finite volumes over an eighth of its walls."""
    halves = [side / 2 for side in inside]
    widths = [np.diff(wall_edges(half, thickness, cells)) for half in halves]
    centres = [np.cumsum(width) - width / 2 for width in widths]
    mesh = np.meshgrid(*centres, indexing="ij")
    wall = ~np.logical_and.reduce([x < half for x, half in zip(mesh, halves, strict=True)])
    number = np.full(wall.shape, -1)
    count = int(wall.sum())
    number[wall] = np.arange(count)
    across = np.meshgrid(*widths, indexing="ij")
    diagonal, source, to_outside = np.zeros(count), np.zeros(count), np.zeros(count)
    rows, columns, values = [], [], []
    for axis in range(3):
        one, two = (slice(None),) * axis + (slice(0, -1),), (slice(None),) * axis + (slice(1, None),)
        last = (slice(None),) * axis + (-1,)
        area = np.prod([across[other] for other in range(3) if other != axis], axis=0)
        half_layer = across[axis] / (2 * conductivity)
        a, b = number[one], number[two]
        both = (a >= 0) & (b >= 0)
        link = (area[one] / (half_layer[one] + half_layer[two]))[both]
        rows += [a[both], b[both]]
        columns += [b[both], a[both]]
        values += [-link, -link]
        for end in (a[both], b[both]):
            diagonal += np.bincount(end, link, count)
        face = (a < 0) & (b >= 0)
        film = (area[two] / (inside_film + half_layer[two]))[face]
        diagonal += np.bincount(b[face], film, count)
        source += np.bincount(b[face], film, count)
        film = (area[last] / (outside_film + half_layer[last])).ravel()
        to_outside += np.bincount(number[last].ravel(), film, count)
    diagonal += to_outside
    matrix = csr_matrix(
        (
            np.concatenate([*values, diagonal]),
            (np.concatenate([*rows, range(count)]), np.concatenate([*columns, range(count)])),
        ),
        shape=(count, count),
    )
    scale = diags(1.0 / np.sqrt(diagonal))
    scaled, trouble = cg(scale @ matrix @ scale, scale @ source, rtol=1e-7)
    assert trouble == 0
    return 8.0 * float(to_outside @ (scale @ scaled))


def converged(*box):
    """Two grids carried on to none: an inward edge makes the error fall with the power 4/3 of the cell."""
    coarse, fine = (solved_conductance(*box, cells) for cells in (6, 12))
    return fine + (fine - coarse) / (2 ** (4 / 3) - 1)


def ours(inside, thickness, conductivity, inside_film, outside_film):
    length, width, height = inside
    total = 0.0
    for one, two in ((length, width), (width, height), (height, length)):
        effective = shape.effective_area(one * two, thickness, 2 * (one + two))
        outer = (one + 2 * thickness) * (two + 2 * thickness)
        total += 2 * panel.conductance(one * two, effective, outer, thickness / conductivity, inside_film, outside_film)
    return total


@pytest.mark.parametrize(
    "inside, thickness, conductivity, within",
    [
        ((0.30, 0.25, 0.20), 0.02, 0.035, 0.02),
        ((0.30, 0.25, 0.20), 0.05, 0.035, 0.02),
        ((0.30, 0.25, 0.20), 0.20, 0.035, 0.02),  # as thick as the shortest side
        ((0.20, 0.20, 0.20), 0.05, 0.0045, 0.02),
        ((4.0, 3.0, 2.4), 0.10, 0.022, 0.005),
        ((2.0, 2.0, 2.2), 0.15, 0.022, 0.005),
    ],
    ids=["thin parcel", "parcel", "thickest", "evacuated", "room", "small room"],
)
def test_against_three_dimensions(inside, thickness, conductivity, within):
    box = (inside, thickness, conductivity, 0.13, 0.04)
    assert ours(*box) == pytest.approx(converged(*box), rel=within)


def test_inside_areas_alone_would_fail_that_test():
    box = ((0.30, 0.25, 0.20), 0.05, 0.035, 0.13, 0.04)
    inner = 2 * (0.3 * 0.25 + 0.25 * 0.2 + 0.2 * 0.3)
    plain = panel.conductance(inner, inner, inner, 0.05 / 0.035, 0.13, 0.04)
    assert plain < 0.85 * solved_conductance(*box, 8)


@given(length=sides, width=sides, height=sides, share=st.floats(0.01, 1.0))
def test_faces_sum_to_the_textbooks_factor(length, width, height, share):
    thickness = share * min(length, width, height)
    faces = ((length, width), (width, height), (height, length))
    summed = sum(2 * shape.effective_area(a * b, thickness, 2 * (a + b)) for a, b in faces)
    assert summed / thickness == pytest.approx(shape.box_shape_factor(length, width, height, thickness), rel=1e-12)


@given(length=sides, width=sides, height=sides, share=st.floats(0.01, 0.9))
def test_thicker_walls_never_pass_more(length, width, height, share):
    box = (length, width, height)
    thickness = share * min(box)
    films = (0.022, 0.13, 0.04)
    assert ours(box, thickness * 1.1, *films) < ours(box, thickness, *films)


def test_effective_area_lies_between_inside_and_outside():
    inside, outside = 6 * 0.5**2, 6 * 0.7**2
    effective = 6 * shape.effective_area(0.25, 0.1, 2.0)
    assert inside < effective < outside
    # Near the geometric mean, by which transport judges a body.
    assert effective == pytest.approx(shape.mean_area(inside, outside), rel=0.15)


def test_k_value():
    assert shape.k_value(40.0, 80.0, 90.0) == pytest.approx(40.0 / np.sqrt(7200.0))
    np.testing.assert_allclose(
        shape.k_value(np.array([[30.0], [60.0]]), 80.0, 90.0).ravel(), [0.35355, 0.70711], atol=1e-5
    )


@pytest.mark.parametrize(
    "call",
    [
        lambda: shape.box_shape_factor(1.0, 1.0, 0.2, 0.21),
        lambda: shape.box_shape_factor(1.0, 1.0, np.array([0.5, 0.2]), 0.3),
        lambda: shape.effective_area(0.04, 0.25, 0.8),
        lambda: shape.effective_area(0.04, np.array([0.1, 0.25]), 0.8),
        lambda: shape.k_value(10.0, 0.0, 5.0),
    ],
)
def test_outside_its_range_it_refuses(call):
    with pytest.raises(OutOfValidity):
        call()
