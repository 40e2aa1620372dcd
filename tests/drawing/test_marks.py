from __future__ import annotations

from collections.abc import Callable

import pytest
from ezdxf.document import Drawing

from dxfcheck.drawing.primitives import Fate, Fill, Sketch

Sketcher = Callable[..., Sketch]


def only_fill(sketch: Sketch) -> Fill:
    (shape,) = sketch.primitives
    assert isinstance(shape, Fill)
    return shape


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
