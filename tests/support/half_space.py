"""Heat conduction in a half-space by finite volumes: what the ground formulas are held against.

The surface is a floor around the origin (a quarter or half of it, by symmetry), a wall that passes nothing, and the
open air beyond. Steady, or as the complex amplitude of a wave.
"""

from __future__ import annotations

import numpy as np
from scipy.sparse import csc_matrix, diags
from scipy.sparse.linalg import cg, spsolve


def across(half, wall, fine, far, growth):
    """Cell edges from the middle of a floor outwards: fine at the floor's edge and at the wall's outer face."""
    inner, width = [half], fine
    while inner[-1] > 0.0:
        inner.append(max(inner[-1] - width, 0.0))
        width = min(width * growth, half / 12)
    start = half + wall
    middle = np.linspace(half, start, max(round(wall / fine), 1) + 1)[1:] if wall else np.array([])
    outer, width = [start], fine
    while outer[-1] < far:
        outer.append(outer[-1] + width)
        width *= growth
    edges = np.concatenate([inner[::-1], middle, outer[1:]])
    return edges[np.concatenate([[True], np.diff(edges) > 0.2 * fine])]


def down(fine, far, growth):
    depths, width = [0.0], fine
    while depths[-1] < far:
        depths.append(depths[-1] + width)
        width *= growth
    return np.array(depths)


def solve(halves, floor_resistance, *, conductivity=1.0, wall=0.0, outside_film=1e-6, fine=0.01, far=200.0,
          growth=1.2, storage=0.0):  # fmt: skip
    """A floor at 1 and outdoors at 0; or, with `storage` (iω·ρc), the floor at 0 and a wave of 1 outdoors.

    The floor's resistance is one number, or in two dimensions a function of the distance from the middle.
    Gives the ground's surface temperature at the centre, the flow through the floor there, and its mean over the floor.
    """
    edges = [across(half, wall, fine, far, growth) for half in halves] + [down(fine, far, growth)]
    widths = [np.diff(edge) for edge in edges]
    dims = len(edges)
    shape = tuple(len(width) for width in widths)
    number = np.arange(np.prod(shape)).reshape(shape)
    mesh = np.meshgrid(*widths, indexing="ij")
    diagonal = (storage * np.prod(mesh, axis=0)).ravel().astype(complex if storage else float)
    rows, columns, values = [], [], []
    for axis in range(dims):
        one, two = (slice(None),) * axis + (slice(0, -1),), (slice(None),) * axis + (slice(1, None),)
        area = np.prod([mesh[other] for other in range(dims) if other != axis], axis=0)
        link = (2 * conductivity * area[one] / (mesh[axis][one] + mesh[axis][two])).ravel()
        a, b = number[one].ravel(), number[two].ravel()
        rows += [a, b]
        columns += [b, a]
        values += [-link, -link]
        for end in (a, b):
            diagonal += np.bincount(end, link, number.size)
    places = np.meshgrid(*[np.cumsum(width) - width / 2 for width in widths[:-1]], indexing="ij")
    floor = np.logical_and.reduce([place < half for place, half in zip(places, halves, strict=True)])
    outdoors = np.logical_or.reduce([place > half + wall for place, half in zip(places, halves, strict=True)])
    if callable(floor_resistance):
        floor_resistance = floor_resistance(places[0])
    patch = np.prod(np.meshgrid(*widths[:-1], indexing="ij"), axis=0)
    half_cell = widths[-1][0] / (2 * conductivity)
    link = np.where(floor, 1 / (floor_resistance + half_cell), np.where(outdoors, 1 / (outside_film + half_cell), 0.0))
    top = number[..., 0].ravel()
    source = np.zeros(number.size)
    diagonal[top] += (link * patch).ravel()
    source[top] += (link * patch * (outdoors if storage else floor)).ravel()
    everything = np.arange(number.size)
    matrix = csc_matrix(
        (
            np.concatenate([*values, diagonal]),
            (np.concatenate([*rows, everything]), np.concatenate([*columns, everything])),
        )
    )
    if dims == 2:
        found = spsolve(matrix, source)
    else:
        scale = diags(1 / np.sqrt(diagonal))
        scaled, trouble = cg(scale @ matrix @ scale, scale @ source, rtol=1e-7)
        assert trouble == 0
        found = scale @ scaled
    ground = found.reshape(shape)[..., 0]
    flow = link * (ground if storage else 1.0 - ground)
    centre = (0,) * (dims - 1)
    above = np.broadcast_to(floor_resistance, flow.shape)[centre]
    return 1.0 - flow[centre] * above, flow[centre], (flow * patch)[floor].sum() / patch[floor].sum()
