from __future__ import annotations

import math
from collections.abc import Callable, Sequence

import pytest
from ezdxf.document import Drawing

from dxfcheck.drawing.primitives import Arc, Fate, Path, Primitive, Ring, Segment, Sketch

Sketcher = Callable[..., Sketch]


def only(sketch: Sketch) -> Primitive:
    assert len(sketch.primitives) == 1
    return sketch.primitives[0]


def polyline(points: Sequence[Sequence[float]], *, close: bool = False) -> Callable[[Drawing], object]:
    return lambda drawing: drawing.modelspace().add_lwpolyline(points, format="xyb", close=close)


def test_a_line_is_a_segment(sketch_of: Sketcher) -> None:
    shape = only(sketch_of(lambda drawing: drawing.modelspace().add_line((1, 2), (3, 4))))
    assert isinstance(shape, Segment)
    assert (shape.start, shape.end) == (1 + 2j, 3 + 4j)


def test_a_line_of_no_length_stays_a_segment(sketch_of: Sketcher) -> None:
    shape = only(sketch_of(lambda drawing: drawing.modelspace().add_line((1, 2), (1, 2))))
    assert isinstance(shape, Segment)
    assert shape.start == shape.end


def test_a_circle_is_a_ring(sketch_of: Sketcher) -> None:
    shape = only(sketch_of(lambda drawing: drawing.modelspace().add_circle((1, 2), 3)))
    assert isinstance(shape, Ring)
    assert (shape.centre, shape.radius) == (1 + 2j, 3)


def test_a_circle_of_no_radius_is_accounted_for(sketch_of: Sketcher) -> None:
    sketch = sketch_of(lambda drawing: drawing.modelspace().add_circle((1, 2), 0))
    assert sketch.primitives == ()
    assert sketch.entities[0].fate == Fate("skipped", "a circle of no radius")


def test_an_arc_runs_counter_clockwise(sketch_of: Sketcher) -> None:
    shape = only(sketch_of(lambda drawing: drawing.modelspace().add_arc((0, 0), 2, 350, 80)))
    assert isinstance(shape, Arc)
    assert math.degrees(shape.sweep) == pytest.approx(90)
    assert shape.end == pytest.approx(2 * complex(math.cos(math.radians(80)), math.sin(math.radians(80))))


@pytest.mark.parametrize(("start", "end"), [(0, 360), (90, 450), (-180, 180), (0, 359.9999999)])
def test_an_arc_of_a_full_turn_is_a_ring(sketch_of: Sketcher, start: float, end: float) -> None:
    assert isinstance(only(sketch_of(lambda drawing: drawing.modelspace().add_arc((0, 0), 2, start, end))), Ring)


def test_an_arc_from_an_angle_to_itself_is_accounted_for(sketch_of: Sketcher) -> None:
    sketch = sketch_of(lambda drawing: drawing.modelspace().add_arc((0, 0), 2, 30, 30))
    assert sketch.entities[0].fate == Fate("skipped", "a curve of no size")


def test_an_ellipse_of_ratio_one_is_a_ring(sketch_of: Sketcher) -> None:
    shape = only(sketch_of(lambda drawing: drawing.modelspace().add_ellipse((1, 2), (0, 3), 1.0)))
    assert isinstance(shape, Ring)
    assert (shape.centre, shape.radius) == pytest.approx((1 + 2j, 3))


def test_part_of_an_ellipse_of_ratio_one_is_an_arc_from_its_own_axis(sketch_of: Sketcher) -> None:
    shape = only(sketch_of(lambda drawing: drawing.modelspace().add_ellipse((0, 0), (0, 3), 1.0, 0, math.pi / 2)))
    assert isinstance(shape, Arc)
    assert (shape.start, shape.end) == pytest.approx((3j, -3))


def test_an_ellipse_seen_from_behind_runs_the_other_way(sketch_of: Sketcher) -> None:
    shape = only(
        sketch_of(
            lambda drawing: drawing.modelspace().add_ellipse(
                (0, 0), (3, 0), 1.0, 0, math.pi / 2, dxfattribs={"extrusion": (0, 0, -1)}
            )
        )
    )
    assert isinstance(shape, Arc)
    assert {complex(round(end.real, 6), round(end.imag, 6)) for end in (shape.start, shape.end)} == {3 + 0j, -3j}


def test_another_ellipse_is_a_smooth_path_close_to_it(sketch_of: Sketcher) -> None:
    shape = only(sketch_of(lambda drawing: drawing.modelspace().add_ellipse((0, 0), (4, 0), 0.5)))
    assert isinstance(shape, Path)
    assert shape.curved
    assert shape.closed
    assert len(shape.pieces) == len(shape.vertices)
    assert all((point.real / 4) ** 2 + (point.imag / 2) ** 2 == pytest.approx(1) for point in shape.vertices)
    assert all(isinstance(piece, Segment) for piece in shape.pieces)


def test_an_open_polyline_is_a_path_in_drawing_order(sketch_of: Sketcher) -> None:
    shape = only(sketch_of(polyline([(0, 0), (4, 0), (4, 3)])))
    assert isinstance(shape, Path)
    assert (shape.closed, shape.curved, shape.vertices) == (False, False, (0, 4, 4 + 3j))
    assert [(piece.start, piece.end) for piece in shape.pieces] == [(0, 4), (4, 4 + 3j)]


@pytest.mark.parametrize(
    "points",
    [[(0, 0), (4, 0), (4, 3)], [(0, 0), (4, 0), (4, 0), (4, 3), (0, 0)]],
    ids=["plain", "with repeated vertices"],
)
def test_a_closed_polyline_does_not_repeat_its_first_vertex(
    sketch_of: Sketcher, points: Sequence[Sequence[float]]
) -> None:
    shape = only(sketch_of(polyline(points, close=True)))
    assert isinstance(shape, Path)
    assert shape.vertices == (0, 4, 4 + 3j)
    assert len(shape.pieces) == 3


def test_a_polyline_back_to_its_start_is_closed(sketch_of: Sketcher) -> None:
    shape = only(sketch_of(polyline([(0, 0), (4, 0), (4, 3), (0, 0)])))
    assert isinstance(shape, Path)
    assert shape.closed
    assert len(shape.pieces) == 3


def test_a_polyline_of_one_piece_is_that_piece(sketch_of: Sketcher) -> None:
    assert isinstance(only(sketch_of(polyline([(0, 0), (4, 0)]))), Segment)
    assert isinstance(only(sketch_of(polyline([(0, 0), (4, 0)], close=True))), Segment)
    arc = only(sketch_of(polyline([(0, 0, 1), (4, 0)])))
    assert isinstance(arc, Arc)
    assert (arc.centre, arc.radius, arc.sweep) == pytest.approx((2, 2, math.pi))
    assert arc.start == pytest.approx(0)


def test_a_clockwise_bulge_starts_its_arc_at_the_far_end(sketch_of: Sketcher) -> None:
    arc = only(sketch_of(polyline([(0, 0, -1), (4, 0)])))
    assert isinstance(arc, Arc)
    assert (arc.start, arc.end) == pytest.approx((4, 0))
    assert arc.start + (arc.end - arc.start) / 2 == pytest.approx(2)


@pytest.mark.parametrize("sign", [1, -1])
@pytest.mark.parametrize("corners", [2, 3, 4])
def test_a_closed_polyline_of_bulges_on_one_centre_is_a_ring(sketch_of: Sketcher, corners: int, sign: int) -> None:
    bulge = sign * math.tan(math.pi / 2 / corners)
    turns = [sign * 2 * math.pi * step / corners for step in range(corners)]
    shape = only(sketch_of(polyline([(5 + 2 * math.cos(t), 2 * math.sin(t), bulge) for t in turns], close=True)))
    assert isinstance(shape, Ring)
    assert (shape.centre, shape.radius) == pytest.approx((5, 2))


def test_a_lens_is_no_ring(sketch_of: Sketcher) -> None:
    assert isinstance(only(sketch_of(polyline([(0, 0, 0.9), (4, 0, 0.9)], close=True))), Path)


def test_an_obround_keeps_its_arcs(sketch_of: Sketcher) -> None:
    shape = only(sketch_of(polyline([(0, 0), (10, 0, 1), (10, 4), (0, 4, 1)], close=True)))
    assert isinstance(shape, Path)
    assert [type(piece) for piece in shape.pieces] == [Segment, Arc, Segment, Arc]


def test_a_loop_of_many_short_sides_on_a_circle_is_a_ring_but_a_nut_is_none(sketch_of: Sketcher) -> None:
    def regular(sides: int) -> list[tuple[float, float]]:
        turns = [2 * math.pi * step / sides for step in range(sides)]
        return [(round(3 * math.cos(turn), 2), round(3 * math.sin(turn), 2)) for turn in turns]

    ring = only(sketch_of(polyline(regular(24), close=True)))
    assert isinstance(ring, Ring)
    assert ring.radius == pytest.approx(3, abs=0.01)
    assert isinstance(only(sketch_of(polyline(regular(6), close=True))), Path)
    star = [point for step in range(13) for point in [regular(13)[step * 5 % 13]]]
    assert isinstance(only(sketch_of(polyline(star, close=True))), Path)


def test_polylines_without_extent_are_accounted_for(sketch_of: Sketcher) -> None:
    assert sketch_of(polyline([(1, 1), (1, 1)])).entities[0].fate == Fate("skipped", "a polyline of no length")


def test_old_polylines_are_read_in_two_and_three_dimensions(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        drawing.modelspace().add_polyline2d([(0, 0), (4, 0), (4, 3)], close=True)
        drawing.modelspace().add_polyline3d([(0, 0, 0), (4, 0, 0), (4, 3, 0)])

    flat, solid = sketch_of(draw, version="R12").primitives
    assert isinstance(flat, Path)
    assert isinstance(solid, Path)
    assert (flat.closed, solid.closed) == (True, False)
    assert flat.vertices == solid.vertices == (0, 4, 4 + 3j)


def test_a_mesh_is_not_read(sketch_of: Sketcher) -> None:
    sketch = sketch_of(lambda drawing: drawing.modelspace().add_polymesh((3, 3)))
    assert sketch.entities[0].fate == Fate("unread", "a mesh is not read")
