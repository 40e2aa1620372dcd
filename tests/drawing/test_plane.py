from __future__ import annotations

import math
from collections.abc import Callable

import pytest
from ezdxf.document import Drawing

from dxfcheck.drawing.primitives import Fate, Sketch

Sketcher = Callable[..., Sketch]
OFF = Fate("unread", "lies off the plane of the sheet")


def frame_at(z: float, drawing: Drawing) -> None:
    """Three lines at one height, a hundred long."""
    for y in (0, 10, 20):
        drawing.modelspace().add_line((0, y, z), (100, y, z))


@pytest.mark.parametrize("z", [0, 25, -3.5])
def test_one_common_height_is_a_plane_like_any_other(sketch_of: Sketcher, z: float) -> None:
    sketch = sketch_of(lambda drawing: frame_at(z, drawing))
    assert len(sketch.primitives) == 3
    assert sketch.notices == ()
    assert sketch.diagonal == pytest.approx(math.hypot(100, 20))


@pytest.mark.parametrize("z", [0, 25])
def test_what_lies_off_the_plane_is_left_out_and_noticed(sketch_of: Sketcher, z: float) -> None:
    def draw(drawing: Drawing) -> None:
        frame_at(z, drawing)
        drawing.modelspace().add_circle((50, 50, z + 7), 3)

    sketch = sketch_of(draw)
    assert len(sketch.primitives) == 3
    assert sketch.entities[3].fate == OFF
    (notice,) = sketch.notices
    assert (notice.kind, notice.entity, notice.at) == ("off-plane", 3, 50 + 50j)
    assert notice.amount == pytest.approx(7)
    assert sketch.diagonal == pytest.approx(math.hypot(100, 20))


def test_what_lies_at_zero_under_a_raised_sheet_is_off_plane(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        frame_at(25, drawing)
        drawing.modelspace().add_line((0, 5), (10, 5))
        drawing.modelspace().add_text("A")

    sketch = sketch_of(draw)
    assert [entity.fate for entity in sketch.entities] == [None, None, None, OFF, None]
    assert sketch.notices[0].amount == -25


def test_noise_in_z_is_the_same_plane(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        frame_at(0, drawing)
        drawing.modelspace().add_line((0, 5, 1e-9), (10, 5, -0.01))

    sketch = sketch_of(draw)
    assert sketch.notices == ()
    assert len(sketch.primitives) == 4


def test_a_tilted_line_says_by_how_many_degrees(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        frame_at(0, drawing)
        drawing.modelspace().add_line((0, 5, 0), (10, 5, 10))

    (notice,) = sketch_of(draw).notices
    assert (notice.kind, notice.amount) == ("off-plane", 10)
    assert "tilted by 45 degrees" in notice.detail


def test_a_tilted_circle_is_not_flattened(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        frame_at(0, drawing)
        drawing.modelspace().add_circle((0, 0), 3, dxfattribs={"extrusion": (0, 1, 1)})
        drawing.modelspace().add_ellipse((0, 0), (3, 0), dxfattribs={"extrusion": (0, 1, 1)})

    sketch = sketch_of(draw)
    assert [entity.fate for entity in sketch.entities[3:]] == [OFF, OFF]
    assert [(notice.kind, notice.detail) for notice in sketch.notices] == [
        ("off-plane", "tilted by 45 degrees"),
        ("off-plane", "tilted by 45 degrees"),
    ]


def test_of_a_reference_only_the_part_off_the_plane_is_left_out(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        frame_at(0, drawing)
        block = drawing.blocks.new("PIN")
        block.add_circle((0, 0), 1)
        block.add_circle((0, 0, 4), 2)
        drawing.modelspace().add_blockref("PIN", (5, 5), dxfattribs={"zscale": 2})

    sketch = sketch_of(draw)
    assert len(sketch.primitives) == 4
    assert sketch.entities[3].fate is None
    assert [(notice.kind, notice.amount) for notice in sketch.notices] == [("off-plane", 8)]


def test_a_sheet_far_from_the_origin_is_noticed(sketch_of: Sketcher) -> None:
    def at(distance: float) -> Callable[[Drawing], object]:
        return lambda drawing: drawing.modelspace().add_line((distance, 0), (distance + 1, 1))

    (notice,) = sketch_of(at(1e9)).notices
    assert notice.kind == "far-from-origin"
    assert notice.amount == pytest.approx(1e9)
    assert sketch_of(at(1e4)).notices == ()


def test_the_diagonal_spans_arcs_by_what_is_drawn_of_them(sketch_of: Sketcher) -> None:
    sketch = sketch_of(lambda drawing: drawing.modelspace().add_arc((0, 0), 10, 45, 135))
    assert sketch.diagonal == pytest.approx(math.hypot(2 * 10 * math.sqrt(0.5), 10 * (1 - math.sqrt(0.5))))


def test_an_empty_sheet_has_no_diagonal(sketch_of: Sketcher) -> None:
    sketch = sketch_of(lambda drawing: drawing.modelspace())
    assert (sketch.diagonal, sketch.notices, sketch.primitives) == (0, (), ())
