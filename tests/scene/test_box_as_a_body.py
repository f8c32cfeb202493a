"""The six faces in square metres and what passes through them, against numerical solutions and plain arithmetic."""

import math

import numpy as np
import pytest
import solid
from boxes import box_project, construction, door, layer, neighbour, panel
from hypothesis import given
from hypothesis import strategies as st
from solid import OPEN, ROOM, SOLID, conductance

from coldbox.errors import OutOfValidity
from coldbox.scene import body as bodies
from coldbox.scene.body import body
from coldbox.scene.constructions import foam_resistance, inside_of_foam
from coldbox.scene.sizes import sizes


def through(one):
    return bodies.conductance(one) + one.extra_w_per_k


def whole(made):
    return sum(through(one) for one in made.surfaces)


def plain(name, thickness, k):
    return construction(name, layer(thickness=thickness, conductivity=k))


def indoors(**changes):
    every = {"neighbour": "room", "construction": "wall", **changes.pop("every_face", {})}
    return box_project(site=None, every_face=every, **changes)


# The floor's film is 0.10, the ceiling's 0.17: their mean in the numerical solution is the walls' 0.13 within 1 %.
@pytest.mark.parametrize(
    ("inside", "wall", "within"),
    [((0.3, 0.3, 0.25), 0.05, 0.02), ((0.4, 0.4, 0.25), 0.1, 0.02), ((3.0, 4.0, 2.4), 0.1, 0.005)],
)
def test_a_box_conducts_as_a_numerical_solution_in_three_dimensions_does(inside, wall, within):
    length, width, height = inside
    made = body(
        indoors(
            box={"length": length, "width": width, "height": height, "temperature": -18.0},
            constructions=[plain("wall", wall, 0.035)],
        )
    )
    expected = solid.box((length / 2, width / 2, height / 2), (wall, wall, wall), 0.035, 0.13, 0.13)
    assert whole(made) == pytest.approx(expected, rel=within)


def test_inside_area_alone_would_be_wrong_by_more_than_that():
    # So that the test above can fail: a parcel by its inside area is 15 % out.
    expected = solid.box((0.15, 0.15, 0.125), (0.05, 0.05, 0.05), 0.035, 0.13, 0.13)
    assert expected > 1.15 * 0.48 / (0.05 / 0.035 + 0.26)


def test_unequal_walls_share_their_edges_each_by_its_own_thickness():
    made = body(
        indoors(
            box={"length": 1.0, "width": 1.2, "height": 0.8},
            constructions=[plain("wall", 0.1, 0.03), plain("thick", 0.2, 0.03)],
            faces={"ceiling": {"construction": "thick"}, "floor": {"construction": "thick"}},
        )
    )
    assert whole(made) == pytest.approx(solid.box((0.5, 0.6, 0.4), (0.1, 0.1, 0.2), 0.03, 0.13, 0.13), rel=0.01)


def test_an_inward_edge_takes_off_what_an_outward_edge_seen_from_outside_would():
    # An endless L-shaped duct, 2 by 2 m less a notch of 1 by 1 m, against the same walls without edges.
    wall, k, fine = 0.2, 0.03, 0.025
    cells = round(2.4 / fine) + 2
    at = (np.arange(cells) - 0.5) * fine - wall
    x, y = np.meshgrid(at, at, indexing="ij")

    def shape(grow):
        inside = (x > -grow) & (x < 2 + grow) & (y > -grow) & (y < 2 + grow)
        return inside & ~((x > 1 + grow) & (y > 1 + grow))

    kind = np.where(shape(0.0), ROOM, np.where(shape(wall), SOLID, OPEN))
    found = conductance(kind, [np.full(cells, fine)] * 2, k, 1e-9, 1e-9)
    added = (found - 8.0 * k / wall) * wall / k / wall  # in thicknesses of wall
    ours = sizes(indoors(box={"length": 2.0, "width": 2.0, "height": 1.0, "notch_length": 1.0, "notch_width": 1.0,
                              "notch_corner": "back right"}, constructions=[plain("wall", wall, k)]))  # fmt: skip
    uprights = sum(ours.edges[name] - 2.0 * 2.0 for name in ("front", "right", "back", "left"))
    assert 0.5 * 0.54 * uprights == pytest.approx(5 * 0.54 - 1.46)
    assert added == pytest.approx(0.5 * 0.54 * uprights, abs=0.12)


def test_a_notch_takes_floor_and_ceiling_and_leaves_the_walls():
    square = body(box_project())
    cut = body(box_project(box={"notch_length": 1.0, "notch_width": 1.5, "notch_corner": "front left"}))
    areas = [{one.id: one.area for one in made.surfaces} for made in (square, cut)]
    for name in ("front", "right", "back", "left"):
        assert areas[1][name] == areas[0][name]
    assert areas[1]["floor"] == areas[1]["ceiling"] == pytest.approx(12.0 - 1.5)
    assert cut.volume == pytest.approx(10.5 * 2.4)
    assert cut.perimeter == square.perimeter
    assert cut.inside_area == pytest.approx(square.inside_area - 3.0)
    assert cut.outside_area == pytest.approx(square.outside_area - 3.0)


def test_inside_and_outside_sizes_of_one_box_give_the_same_body():
    thick = construction("thick", layer(thickness=0.15))
    faces = {"floor": {"construction": "thick"}}
    panels = [panel(face="back", construction="thick")]
    inner = body(box_project(constructions=[thick], faces=faces, panels=panels))
    sizes_outside = {"length": 3.0 + 0.101 + 0.15, "width": 4.0 + 0.202, "height": 2.4 + 0.101 + 0.15}
    outer = body(
        box_project(box={**sizes_outside, "measured": "outside"}, constructions=[thick], faces=faces, panels=panels)
    )
    for one, other in zip(inner.surfaces, outer.surfaces, strict=True):
        assert one.area == pytest.approx(other.area, rel=1e-12)
        assert one.effective_area == pytest.approx(other.effective_area, rel=1e-12)
        assert one.outside_area == pytest.approx(other.outside_area, rel=1e-12)
    assert inner.outside_area == pytest.approx(outer.outside_area)


@given(
    st.floats(0.5, 3.0), st.floats(0.5, 2.0), st.integers(1, 3), st.sampled_from(["front", "left", "ceiling", "floor"])
)
def test_openings_are_cut_out_of_their_face_and_nothing_is_lost(width, height, count, face):
    made = body(
        box_project(
            box={"length": 12.0, "width": 12.0, "height": 3.0},
            doors=[door(face=face, width=width, height=height, count=count)],
            panels=[panel(face=face, width=0.5, height=1.0)],
        )
    )
    assert sum(one.area for one in made.surfaces) == pytest.approx(made.inside_area)
    assert sum(one.outside_area for one in made.surfaces) == pytest.approx(made.outside_area)
    assert sum(one.effective_area for one in made.surfaces) == pytest.approx(
        sum(
            one.effective_area for one in body(box_project(box={"length": 12.0, "width": 12.0, "height": 3.0})).surfaces
        )
    )


def test_a_face_that_is_all_door_hands_its_edges_to_the_door():
    made = body(box_project(doors=[door(width=4.0, height=2.4)]))
    front = next(one for one in body(box_project()).surfaces if one.id == "front")
    leaf = next(one for one in made.surfaces if one.role == "door")
    assert "front" not in {one.id for one in made.surfaces}
    assert leaf.effective_area == pytest.approx(front.effective_area)


def test_doors_larger_than_their_face_are_refused():
    with pytest.raises(OutOfValidity, match="front"):
        body(box_project(doors=[door(width=3.0, height=2.4, count=2)]))


def test_walls_thicker_than_the_shortest_inside_side_are_refused():
    with pytest.raises(OutOfValidity, match="thickness"):
        body(indoors(box={"length": 0.3, "width": 0.3, "height": 0.2}, constructions=[plain("wall", 0.21, 0.03)]))
    with pytest.raises(OutOfValidity):
        body(indoors(box={"length": np.array([[0.3], [0.15]]), "width": 0.3, "height": 0.3},
                     constructions=[plain("wall", 0.2, 0.03)]))  # fmt: skip


def test_the_front_decides_where_all_walls_look():
    made = {one.id: one for one in body(box_project(box={"bearing": 180.0})).surfaces}
    # Facing the front from outside one looks north, and the right hand points east.
    assert [made[name].azimuth for name in ("front", "right", "back", "left")] == [180.0, 90.0, 0.0, 270.0]
    assert [made[name].label for name in ("front", "right", "back", "left")] == [
        "front S",
        "right E",
        "back N",
        "left W",
    ]
    assert made["ceiling"].azimuth is None and (made["ceiling"].tilt, made["floor"].tilt) == (0.0, 180.0)


def test_another_shape_with_the_measures_of_a_square_box_is_that_box():
    square = box_project(box={"length": 3.0, "width": 3.0})
    given_ = {"length": None, "width": None, "height": None, "volume": 21.6, "floor_area": 9.0, "perimeter": 12.0}
    one, other = body(square), body(box_project(box=given_))
    assert other.inside_area == pytest.approx(one.inside_area)
    assert other.outside_area == pytest.approx(one.outside_area)
    assert whole(other) == pytest.approx(whole(one))
    # Walls given as panels with areas share the edges the walls have.
    walls = [panel(f"w{i}", width=None, height=None, area=3.6) for i in range(8)]
    split = body(box_project(box=given_, panels=walls))
    assert {one.role for one in split.surfaces if one.face not in ("ceiling", "floor")} == {"panel"}
    assert whole(split) == pytest.approx(whole(one), rel=2e-3)


# ---- K coefficient


def test_k_is_shared_so_that_the_whole_body_has_it():
    for thickness in (0.06, 0.1):
        made = body(box_project(box={"k_value": 0.38, "thickness": thickness}, every_face={"construction": None}))
        mean = math.sqrt(made.inside_area * made.outside_area)
        assert whole(made) == pytest.approx(0.38 * mean, rel=1e-12)


def test_a_door_without_a_construction_of_its_own_belongs_to_the_body_with_a_k():
    bare = box_project(box={"k_value": 0.38, "thickness": 0.08}, every_face={"construction": None})
    with_door = bare.replace(doors=(door(construction=None),))
    assert whole(body(with_door)) == pytest.approx(whole(body(bare)))
    better = bare.replace(doors=(door(construction="pir100"),))
    assert whole(body(better)) < whole(body(bare))


def test_a_k_that_the_films_alone_would_exceed_is_refused():
    with pytest.raises(OutOfValidity):
        body(box_project(box={"k_value": 9.0, "thickness": 0.01}, every_face={"construction": None}))


# ---- layers and films


def test_declared_foam_is_taken_at_its_own_mean_temperature_aged_and_damp():
    declared = layer(temperature_factor=0.0055, ageing=0.10, moisture=0.05)
    project = indoors(constructions=[construction("wall", layer("concrete", thickness=0.2), declared)])
    one = body(project).surfaces[0]
    concrete = 0.2 / 1.7
    # The film, the concrete and half of the foam lie between the room behind at 24 °C and the foam's middle.
    foam = 4.5
    for _ in range(50):
        middle = 24.0 - 42.0 * (0.04 + concrete + foam / 2) / (0.17 + concrete + foam)
        foam = 0.1 / (0.022 * math.exp(0.0055 * (middle - 10.0)) * 1.10 * 1.05)
    assert one.sheets[1].resistance == pytest.approx(foam, rel=1e-4)
    assert one.resistance == pytest.approx(foam + concrete, rel=1e-4)
    assert foam_resistance(project.constructions["wall"], 10.0) == pytest.approx(0.1 / (0.022 * 1.10 * 1.05))


def test_a_typed_conductivity_holds_as_it_is():
    cold, warm = (
        body(indoors(box={"temperature": at}, constructions=[plain("wall", 0.1, 0.025)])).surfaces[0].resistance
        for at in (-70.0, 10.0)
    )
    assert cold == warm == pytest.approx(4.0)


@pytest.mark.parametrize(("face", "from_outside", "from_inside"), [
    ("ceiling", 0.19, 0.16), ("front", 0.18, 0.18), ("floor", 0.16, 0.19),
])  # fmt: skip
def test_air_spaces_resist_by_the_direction_the_heat_goes(face, from_outside, from_inside):
    # ISO 6946: 25 mm, 0.16 upwards, 0.18 level, 0.19 downwards, at 10 °C with 5 K or less across.
    space = construction("wall", layer("air"), layer(thickness=0.1))
    for room, behind, expected in ((9.0, 11.0, from_outside), (11.0, 9.0, from_inside)):
        project = indoors(box={"temperature": room}, neighbours=[neighbour(temperature=behind)], constructions=[space])
        one = next(one for one in body(project).surfaces if one.id == face)
        assert one.sheets[0].resistance == pytest.approx(expected, abs=0.005)


def test_films_turn_round_where_the_neighbour_is_colder_draw_by_draw():
    project = indoors(neighbours=[neighbour(temperature=np.array([[24.0], [-30.0]]))],
                      constructions=[plain("wall", 0.1, 0.03)])  # fmt: skip
    made = {one.id: one for one in body(project).surfaces}
    assert np.ravel(made["ceiling"].inside_film).tolist() == [0.17, 0.10]
    assert np.ravel(made["floor"].inside_film).tolist() == [0.10, 0.17]
    assert made["front"].inside_film == 0.13


def test_natural_films_lie_near_the_standard_ones_and_shrink_with_the_difference():
    films = {}
    for behind in (-10.0, 24.0):
        project = indoors(box={"films": "natural"}, neighbours=[neighbour(temperature=behind)],
                          constructions=[plain("wall", 0.05, 0.03)])  # fmt: skip
        films[behind] = {one.id: one.inside_film for one in body(project).surfaces}
    for name in ("front", "ceiling", "floor"):
        assert 0.1 < films[24.0][name] < 0.3
        assert films[24.0][name] < films[-10.0][name]
    assert films[24.0]["ceiling"] > films[24.0]["front"] > films[24.0]["floor"]


def test_joints_bolts_evacuated_edges_and_the_allowance_are_added_once():
    joined = construction("wall", layer(thickness=0.1, conductivity=0.03, edge_psi=0.01), edge_loss=0.02,
                          point_loss=0.005, points=8)  # fmt: skip
    one = next(one for one in body(indoors(constructions=[joined])).surfaces if one.id == "front")
    outline = 2 * (4.0 + 2.4)
    assert one.extra_w_per_k == pytest.approx(outline * 0.03 + 8 * 0.005)
    more = next(
        one for one in body(indoors(box={"allowance": 0.1}, constructions=[joined])).surfaces if one.id == "front"
    )
    assert through(more) == pytest.approx(1.1 * through(one))


def test_a_quoted_u_value_holds_with_its_films():
    quoted = construction("wall", u_value=0.28, thickness=0.08)
    one = body(indoors(constructions=[quoted])).surfaces[0]
    assert 1.0 / (one.resistance + 0.17) == pytest.approx(0.28)
    assert inside_of_foam(one.sheets) == one.resistance
