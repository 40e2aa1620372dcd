from __future__ import annotations

import math
from collections.abc import Callable

import pytest
from ezdxf.document import Drawing

from dxfcheck.drawing.primitives import Dimension, Fate, Fill, Sketch

Sketcher = Callable[..., Sketch]


def only_dimension(sketch: Sketch) -> Dimension:
    (shape,) = sketch.primitives
    assert isinstance(shape, Dimension)
    return shape


def only_fill(sketch: Sketch) -> Fill:
    (shape,) = sketch.primitives
    assert isinstance(shape, Fill)
    return shape


def test_a_linear_dimension_measures_between_its_points(sketch_of: Sketcher) -> None:
    shape = only_dimension(
        sketch_of(lambda drawing: drawing.modelspace().add_linear_dim((0, 9), (1, 2), (5, 2)).render())
    )
    assert (shape.kind, shape.text, shape.points) == ("linear", "", (1 + 2j, 5 + 2j))
    assert shape.measured == pytest.approx(4)


def test_the_linear_factor_applies_to_lengths(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        drawing.modelspace().add_linear_dim((0, 9), (1, 2), (5, 2), override={"dimlfac": 2.5}).render()

    assert only_dimension(sketch_of(draw)).measured == pytest.approx(10)


@pytest.mark.parametrize(("stated", "text"), [("<>", ""), ("120", "120"), ("d1=33.2/2", "d1=33.2/2"), (" ", " ")])
def test_an_overridden_text_is_kept_as_typed(sketch_of: Sketcher, stated: str, text: str) -> None:
    shape = only_dimension(
        sketch_of(
            lambda drawing: drawing.modelspace().add_aligned_dim((1, 2), (4, 6), distance=1, text=stated).render()
        )
    )
    assert shape.text == text
    assert shape.measured == pytest.approx(5)


def test_angles_are_in_degrees_and_not_scaled(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        drawing.modelspace().add_angular_dim_3p((9, 9), (0, 0), (1, 0), (0, 1), override={"dimlfac": 2}).render()

    shape = only_dimension(sketch_of(draw))
    assert shape.kind == "angular"
    assert shape.measured == pytest.approx(90)


def test_round_dimensions_name_their_kind(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        drawing.modelspace().add_radius_dim((0, 0), radius=3, angle=0).render()
        drawing.modelspace().add_diameter_dim((0, 0), radius=3, angle=0).render()

    radius, diameter = sketch_of(draw).primitives
    assert isinstance(radius, Dimension)
    assert isinstance(diameter, Dimension)
    assert (radius.kind, diameter.kind) == ("radius", "diameter")
    assert [radius.measured, diameter.measured] == pytest.approx([3, 6])


def test_an_ordinate_measures_along_its_axis(sketch_of: Sketcher) -> None:
    shape = only_dimension(sketch_of(lambda drawing: drawing.modelspace().add_ordinate_x_dim((7, 3), (0, 5)).render()))
    assert shape.kind == "ordinate"
    assert shape.measured == pytest.approx(7)
    assert shape.points == pytest.approx((7 + 3j,))


def test_an_arc_dimension_has_no_measure_but_is_no_failure(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        drawing.modelspace().add_arc_dim_cra((0, 0), 5, 0, 90, 2).render()

    shape = only_dimension(sketch_of(draw))
    assert (shape.kind, shape.measured) == ("arc", None)


def test_a_hatch_is_a_fill_of_its_outlines(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        hatch = drawing.modelspace().add_hatch()
        hatch.paths.add_polyline_path([(0, 0), (4, 0), (4, 3)], is_closed=True)
        hatch.set_pattern_fill("ANSI31")
        edges = drawing.modelspace().add_hatch()
        edges.paths.add_edge_path().add_arc((0, 0), 2, 0, 360)

    pattern, solid = sketch_of(draw).primitives
    assert isinstance(pattern, Fill)
    assert isinstance(solid, Fill)
    assert (pattern.solid, pattern.outlines) == (False, ((0, 4, 4 + 3j),))
    assert solid.solid
    assert len(solid.outlines[0]) > 12
    assert all(abs(point) == pytest.approx(2, rel=2e-3) for point in solid.outlines[0])


def test_a_hatch_drawn_from_behind_is_mirrored(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        hatch = drawing.modelspace().add_hatch(dxfattribs={"extrusion": (0, 0, -1)})
        hatch.paths.add_polyline_path([(0, 0), (4, 0), (4, 3)], is_closed=True)

    assert only_fill(sketch_of(draw)).outlines == ((0, -4, -4 + 3j),)


@pytest.mark.parametrize("kind", ["solid", "trace"])
def test_a_solid_is_uncrossed(sketch_of: Sketcher, kind: str) -> None:
    def draw(drawing: Drawing) -> None:
        getattr(drawing.modelspace(), f"add_{kind}")([(0, 0), (4, 0), (0, 3), (4, 3)])

    assert only_fill(sketch_of(draw)).outlines == ((0, 4, 4 + 3j, 3j),)


def test_a_triangular_solid_has_three_corners(sketch_of: Sketcher) -> None:
    fill = only_fill(sketch_of(lambda drawing: drawing.modelspace().add_solid([(0, 0), (4, 0), (0, 3)])))
    assert fill.outlines == ((0, 4, 3j),)
    assert fill.solid


def test_a_hatch_without_a_boundary_is_accounted_for(sketch_of: Sketcher) -> None:
    sketch = sketch_of(lambda drawing: drawing.modelspace().add_hatch())
    assert sketch.entities[0].fate == Fate("skipped", "a fill without an outline")


def test_dimensions_do_not_break_into_lines(sketch_of: Sketcher) -> None:
    sketch = sketch_of(lambda drawing: drawing.modelspace().add_linear_dim((0, 9), (1, 2), (5, 2)).render())
    assert sketch.diagonal == 0
    assert not math.isnan(sketch.diagonal)
