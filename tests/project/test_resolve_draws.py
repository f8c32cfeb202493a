"""Numbers replaced by key path, and what follows from them."""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest
from typed import BOXES, LEAST, SITE, project

from coldbox.errors import UnknownName
from coldbox.project import store
from coldbox.project.draw import numeric_paths, with_values

OUTSIDE = LEAST.replace('"room"', '"outdoors"') + SITE
THICK = np.array([[0.05], [0.1], [0.2]])


@pytest.mark.parametrize("file", BOXES, ids=lambda file: file.stem)
def test_putting_back_what_is_there_changes_nothing(file: Path) -> None:
    found = store.open(file)
    assert with_values(found, numeric_paths(found)) == found
    assert with_values(found, {}) is found


@pytest.mark.parametrize("file", BOXES, ids=lambda file: file.stem)
def test_every_number_can_be_replaced_alone_and_is_then_there(file: Path) -> None:
    found = store.open(file)
    paths = numeric_paths(found)
    assert set(found.spreads) <= set(paths)  # whatever carries a ± can be drawn
    for path, value in paths.items():
        drawn = np.full((3, 1), float(value) + 0.125)
        again = numeric_paths(with_values(found, {path: drawn}))
        assert again[path] is drawn, path


def test_thicknesses_and_sizes_follow_a_layer() -> None:
    text = OUTSIDE.replace(
        'r_value = "RSI 4", thickness = "80 mm"',
        'layers = [{ material = "steel sheet", thickness = "1 mm" }, { material = "PIR foam", thickness = "100 mm" }]',
    ).replace("height =", 'measured = "outside"\nheight =')
    text += '[[panels]]\nname = "a"\nface = "left"\nwidth = "1 m"\nconstruction = "wall"\n'
    drawn = with_values(project(text), {"constructions.wall.layers[2].thickness": THICK})
    assert np.allclose(drawn.constructions["wall"].thickness, THICK + 0.001)
    height = drawn.panels[0].height
    assert height is not None
    assert np.allclose(height, 2.4 - 2 * (THICK + 0.001))
    assert np.allclose(drawn.panels[0].area, 2.4 - 2 * (THICK + 0.001))


def test_a_shade_is_taken_over_unless_it_is_said() -> None:
    panel = '[[panels]]\nname = "%s"\nface = "left"\nwidth = "1 m"\n'
    found = project(OUTSIDE + panel % "follows" + panel % "own" + 'shade = "10 %"\n')
    follows, own = with_values(found, {"faces.left.shade": 0.7}).panels
    assert (follows.shade, own.shade) == (0.7, 0.1)


def test_a_box_drawn_larger_takes_its_panels_along_and_typed_heights_stay() -> None:
    panel = '[[panels]]\nname = "%s"\nface = "left"\nwidth = "1 m"\n'
    found = project(LEAST + panel % "follows" + panel % "own" + 'height = "1 m"\n')
    follows, own = with_values(found, {"box.height": THICK + 2.4}).panels
    assert np.allclose(follows.area, THICK + 2.4)
    assert own.area == 1.0


def test_rates_keep_their_basis() -> None:
    found = project(LEAST + '[[doors]]\nname = "main"\nwidth = "1 m"\nheight = "2 m"\npassages = "240/day"\n')
    assert numeric_paths(found)["doors.main.passages"] == pytest.approx(240 / 86400)
    drawn = with_values(found, {"doors.main.passages": 0.5}).doors[0].passages
    assert (drawn.per_second, drawn.basis) == (0.5, "day")
    assert with_values(found, {"doors[1].passages": 0.25}).doors[0].passages.per_second == 0.25


def test_inline_constructions_go_by_the_path_of_their_place() -> None:
    found = project(
        LEAST + '[[doors]]\nname = "main"\nwidth = "1 m"\nheight = "2 m"\nu_value = "0.3 W/m²K"\nthickness = "60 mm"\n'
    )
    drawn = with_values(found, {"doors.main.u_value": 0.4, "doors.main.width": 1.2})
    assert drawn.constructions["doors.main"].u_value == 0.4
    assert drawn.doors[0].width == 1.2


@pytest.mark.parametrize(
    "path", ["box.temprature", "box.measured", "doors.main.width", "lots[9].stored", "box", "", "box.length.x"]
)
def test_a_path_of_no_number_is_refused(path: str) -> None:
    with pytest.raises(UnknownName):
        with_values(project(LEAST), {path: 1.0})


def test_what_follows_is_no_number_of_its_own() -> None:
    text = LEAST.replace(
        'r_value = "RSI 4", thickness = "80 mm"', 'layers = [{ material = "PIR foam", thickness = "80 mm" }]'
    )
    paths = numeric_paths(project(text + '[[panels]]\nname = "a"\nface = "left"\nwidth = "1 m"\n'))
    assert "constructions.wall.thickness" not in paths
    assert "panels.a.area" not in paths
    assert "panels.a.height" not in paths
    assert "panels.a.width" in paths
