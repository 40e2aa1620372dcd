from __future__ import annotations

import math

import pytest

from dxfcheck.drawing.curves import FULL_TURN, bulge_arc, polyline_shape, sweep_between
from dxfcheck.drawing.placement import SHEET, reference_placement
from dxfcheck.drawing.primitives import Arc, Path, Segment, Source
from dxfcheck.drawing.shapes import NotRead

SOURCE = Source(0, "2F", "0", "CONTINUOUS", ())
UNEVEN = reference_placement((0, 0, 0), (0, 0, 0), (2, 1, 1), 0)


@pytest.mark.parametrize(
    ("start", "end", "sweep"),
    [(0, 1, 1), (1, 0, FULL_TURN - 1), (0, FULL_TURN, FULL_TURN), (2, 2, 0), (-1, 1, 2), (0, 3 * FULL_TURN, FULL_TURN)],
)
def test_sweeps_run_counter_clockwise(start: float, end: float, sweep: float) -> None:
    assert sweep_between(start, end) == pytest.approx(sweep)


def test_a_quarter_bulge_has_its_centre_on_the_left() -> None:
    arc = bulge_arc(SOURCE, 1 + 0j, 1j, math.tan(math.pi / 8))
    assert arc.centre == pytest.approx(0)
    assert (arc.radius, arc.sweep, arc.start_angle) == pytest.approx((1, math.pi / 2, 0))


def test_a_polyline_without_vertices_is_refused() -> None:
    with pytest.raises(NotRead, match="a polyline without vertices"):
        polyline_shape(SOURCE, SHEET, [], closed=True)


def test_a_mirrored_arc_keeps_its_ends_and_its_side() -> None:
    place = reference_placement((10, 0, 0), (0, 0, 0), (-1, 1, 1), 0)
    shape = polyline_shape(SOURCE, place, [(0j, 0.5), (4 + 0j, 0.0)], closed=False)
    assert isinstance(shape, Arc)
    assert (shape.start, shape.end) == pytest.approx((6, 10))
    middle = shape.centre + shape.radius * complex(
        math.cos(shape.start_angle + shape.sweep / 2), math.sin(shape.start_angle + shape.sweep / 2)
    )
    assert middle == pytest.approx(8 - 1j)


@pytest.mark.parametrize("bulge", [1.0, -1.0])
def test_an_unevenly_scaled_obround_is_joined_end_to_end(bulge: float) -> None:
    corners = [(0j, 0.0), (10 + 0j, bulge), (10 + 4j, 0.0), (4j, bulge)]
    shape = polyline_shape(SOURCE, UNEVEN, corners, closed=True)
    assert isinstance(shape, Path)
    assert shape.curved
    assert shape.vertices == (0, 20, 20 + 4j, 4j)
    assert all(isinstance(piece, Segment) for piece in shape.pieces)
    following = [*shape.pieces[1:], shape.pieces[0]]
    assert all(abs(a.end - b.start) < 1e-9 for a, b in zip(shape.pieces, following, strict=True))


def test_an_unevenly_scaled_ring_of_bulges_is_no_ring() -> None:
    assert isinstance(polyline_shape(SOURCE, UNEVEN, [(0j, 1.0), (4 + 0j, 1.0)], closed=True), Path)
