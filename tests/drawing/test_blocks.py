from __future__ import annotations

import random
from collections.abc import Callable, Iterable
from itertools import product
from typing import Any

import pytest
from ezdxf.document import Drawing

from dxfcheck.drawing.primitives import Fate, Path, Ring, Segment, Sketch
from dxfcheck.tolerances.drawing import BLOCK_DEPTH_LIMIT

Sketcher = Callable[..., Sketch]


def rings(sketch: Sketch) -> list[Ring]:
    return [shape for shape in sketch.primitives if isinstance(shape, Ring)]


def kinds(sketch: Sketch) -> list[str]:
    return [notice.kind for notice in sketch.notices]


def pin(drawing: Drawing, **attributes: Any) -> None:  # noqa: ANN401 - DXF attributes of many types
    """A block with a ring off its base point, referred to once."""
    block = drawing.blocks.new("PIN", base_point=(1, 0))
    block.add_circle((2, 0), 0.5)
    drawing.modelspace().add_blockref("PIN", (10, 20), dxfattribs=attributes)


@pytest.mark.parametrize(
    ("attributes", "centre", "radius"),
    [
        ({}, 11 + 20j, 0.5),
        ({"rotation": 90}, 10 + 21j, 0.5),
        ({"xscale": 3, "yscale": 3}, 13 + 20j, 1.5),
        ({"xscale": -1}, 9 + 20j, 0.5),
        ({"xscale": -2, "yscale": 2, "rotation": 90}, 10 + 18j, 1),
        ({"extrusion": (0, 0, -1)}, -11 + 20j, 0.5),
        ({"zscale": 0}, 11 + 20j, 0.5),
    ],
)
def test_a_reference_places_its_block(
    sketch_of: Sketcher, attributes: dict[str, Any], centre: complex, radius: float
) -> None:
    (ring,) = rings(sketch_of(lambda drawing: pin(drawing, **attributes)))
    assert ring.centre == pytest.approx(centre)
    assert ring.radius == pytest.approx(radius)


def test_a_nested_reference_keeps_the_trail(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        drawing.blocks.new("PIN").add_circle((1, 0), 0.5)
        drawing.blocks.new("CRANK").add_blockref("PIN", (5, 0), dxfattribs={"rotation": 90})
        drawing.modelspace().add_blockref("CRANK", (10, 0), dxfattribs={"xscale": 2, "yscale": 2})

    sketch = sketch_of(draw)
    (ring,) = rings(sketch)
    assert ring.centre == pytest.approx(20 + 2j)
    assert [use.name for use in ring.source.blocks] == ["CRANK", "PIN"]
    assert ring.source.blocks[0].handle == sketch.entities[0].handle
    assert ring.source.handle not in {use.handle for use in ring.source.blocks}
    assert len(sketch.entities) == 1


def test_an_array_is_copied_unscaled_and_turned(sketch_of: Sketcher) -> None:
    array = {"row_count": 2, "column_count": 3, "row_spacing": 10, "column_spacing": 4, "rotation": 90, "xscale": -1}
    found = rings(sketch_of(lambda drawing: pin(drawing, **array)))
    first = 10 + 19j
    expected = [first + 1j * complex(4 * column, 10 * row) for row in range(2) for column in range(3)]
    assert [ring.centre for ring in found] == [pytest.approx(centre) for centre in expected]


def test_copies_without_a_spacing_are_made_once(sketch_of: Sketcher) -> None:
    assert len(rings(sketch_of(lambda drawing: pin(drawing, row_count=5)))) == 1


def test_uneven_scale_makes_an_ellipse_and_a_notice(sketch_of: Sketcher) -> None:
    sketch = sketch_of(lambda drawing: pin(drawing, xscale=2, yscale=1))
    (shape,) = sketch.primitives
    assert isinstance(shape, Path)
    assert shape.curved
    (notice,) = sketch.notices
    assert (notice.kind, notice.entity, notice.amount) == ("uneven-scale", 0, 2)
    assert kinds(sketch_of(lambda drawing: pin(drawing, xscale=-2, yscale=2))) == []


def test_layer_zero_and_byblock_take_after_the_reference(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        drawing.layers.add("LINKS", linetype="Dashed")
        block = drawing.blocks.new("ROD")
        block.add_line((0, 0), (1, 0))
        block.add_line((0, 0), (2, 0), dxfattribs={"linetype": "BYBLOCK"})
        block.add_line((0, 0), (3, 0), dxfattribs={"layer": "OWN"})
        drawing.modelspace().add_blockref("ROD", (0, 0), dxfattribs={"layer": "LINKS", "linetype": "Phantom"})

    told = [(shape.source.layer, shape.source.linetype) for shape in sketch_of(draw).primitives]
    assert told == [("LINKS", "DASHED"), ("LINKS", "PHANTOM"), ("OWN", "CONTINUOUS")]


def hidden(change: Callable[[Any], object], reference_layer: str) -> Callable[[Drawing], None]:
    def draw(drawing: Drawing) -> None:
        change(drawing.layers.add("ASIDE"))
        block = drawing.blocks.new("ROD")
        block.add_line((0, 0), (1, 0))
        block.add_line((0, 0), (2, 0), dxfattribs={"layer": "OWN"})
        block.add_line((0, 0), (3, 0), dxfattribs={"layer": "ASIDE"})
        drawing.modelspace().add_blockref("ROD", (0, 0), dxfattribs={"layer": reference_layer})

    return draw


def ends(sketch: Sketch) -> list[complex]:
    return [shape.end for shape in sketch.primitives if isinstance(shape, Segment)]


def test_a_layer_off_hides_what_lies_on_it_and_on_layer_zero(sketch_of: Sketcher) -> None:
    assert ends(sketch_of(hidden(lambda layer: layer.off(), "ASIDE"))) == [2]
    sketch = sketch_of(hidden(lambda layer: layer.off(), "0"))
    assert ends(sketch) == [1, 2]
    (notice,) = sketch.notices
    assert (notice.kind, notice.detail, notice.amount) == ("hidden-part", "layer is off", 1)


def test_a_frozen_layer_hides_the_whole_reference(sketch_of: Sketcher) -> None:
    sketch = sketch_of(hidden(lambda layer: layer.freeze(), "ASIDE"))
    assert ends(sketch) == []
    assert sketch.entities[0].fate == Fate("skipped", "layer is frozen")
    assert ends(sketch_of(hidden(lambda layer: layer.freeze(), "0"))) == [1, 2]


def test_what_is_not_read_inside_is_noticed(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        block = drawing.blocks.new("CAM")
        block.add_line((0, 0), (1, 0))
        block.add_spline([(3, 4), (5, 6), (7, 4)])
        drawing.modelspace().add_blockref("CAM", (0, 0))

    (notice,) = sketch_of(draw).notices
    assert (notice.kind, notice.detail, notice.entity) == ("unread-part", "SPLINE is not read", 0)


def test_a_reference_of_which_nothing_is_left_has_a_fate(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        drawing.blocks.new("EMPTY")
        drawing.blocks.new("CAM").add_spline([(3, 4), (5, 6), (7, 4)])
        drawing.modelspace().add_blockref("EMPTY", (0, 0))
        drawing.modelspace().add_blockref("CAM", (0, 0))
        drawing.modelspace().add_blockref("GONE", (7, 0))

    sketch = sketch_of(draw)
    assert [entity.fate for entity in sketch.entities] == [
        Fate("skipped", "the block is empty"),
        Fate("unread", "SPLINE is not read"),
        Fate("unread", "the block is missing"),
    ]
    (notice,) = sketch.notices
    assert (notice.kind, notice.entity, notice.at) == ("block-missing", 2, 7)


def test_a_block_that_contains_itself_is_read_once(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        outer = drawing.blocks.new("OUTER")
        outer.add_circle((0, 0), 1)
        outer.add_blockref("inner", (0, 0))
        drawing.blocks.new("INNER").add_blockref("Outer", (0, 0))
        drawing.modelspace().add_blockref("OUTER", (0, 0))

    sketch = sketch_of(draw)
    assert len(rings(sketch)) == 1
    assert kinds(sketch) == ["block-cycle"]


def chain(length: int) -> Callable[[Drawing], None]:
    def draw(drawing: Drawing) -> None:
        for number in range(length):
            block = drawing.blocks.new(f"B{number}")
            block.add_circle((0, 0), 1)
            if number:
                block.add_blockref(f"B{number - 1}", (0, 0))
        drawing.modelspace().add_blockref(f"B{length - 1}", (0, 0))

    return draw


def test_a_chain_of_blocks_is_followed_to_the_limit_and_refused_beyond(sketch_of: Sketcher) -> None:
    assert len(rings(sketch_of(chain(BLOCK_DEPTH_LIMIT)))) == BLOCK_DEPTH_LIMIT
    for length in (BLOCK_DEPTH_LIMIT + 1, 1500):
        sketch = sketch_of(chain(length))
        assert sketch.primitives == ()
        assert kinds(sketch) == ["block-limit"]
        assert sketch.entities[0].fate == Fate("unread", "the block reference holds too much to expand")


def test_a_huge_array_is_refused_and_the_rest_is_read(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        huge = {"row_count": 32000, "column_count": 32000, "row_spacing": 1, "column_spacing": 1}
        pin(drawing, **huge)
        drawing.modelspace().add_blockref("PIN", (0, 0))

    sketch = sketch_of(draw)
    assert len(rings(sketch)) == 1
    assert kinds(sketch) == ["block-limit"]
    assert sketch.entities[1].fate is None


def test_a_nest_that_multiplies_is_refused(sketch_of: Sketcher, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr("dxfcheck.drawing.extract.BLOCK_ENTITY_LIMIT", 500)

    def draw(drawing: Drawing) -> None:
        drawing.blocks.new("N0").add_circle((0, 0), 1)
        for level in range(1, 6):
            block = drawing.blocks.new(f"N{level}")
            for place in range(10):
                block.add_blockref(f"N{level - 1}", (place, 0))
        drawing.modelspace().add_circle((5, 5), 1)
        drawing.modelspace().add_blockref("N5", (0, 0))

    sketch = sketch_of(draw)
    assert len(rings(sketch)) == 1
    assert kinds(sketch) == ["block-limit"]


def test_another_file_is_not_followed(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        drawing.add_xref_def("lift-table.dxf", "LIFT")
        drawing.modelspace().add_blockref("LIFT", (0, 0))

    sketch = sketch_of(draw)
    assert kinds(sketch) == ["outside-reference"]
    assert sketch.entities[0].fate == Fate("unread", "an external reference is not followed")


def line_ends(shapes: Iterable[Segment]) -> list[tuple[float, ...]]:
    rounded = [tuple(round(c, 6) + 0.0 for p in (s.start, s.end) for c in (p.real, p.imag)) for s in shapes]
    return sorted(rounded)


@pytest.mark.parametrize("seed", range(12))
def test_nested_references_land_where_the_library_s_matrices_take_them(sketch_of: Sketcher, seed: int) -> None:
    dice = random.Random(seed)  # noqa: S311 - no secret
    expected: list[tuple[float, ...]] = []

    def reference() -> dict[str, Any]:
        return {
            "insert": (dice.uniform(-9, 9), dice.uniform(-9, 9)),
            "rotation": dice.choice([0, 30, 90, 200]),
            "xscale": dice.choice([1, -1, 2, -0.5]),
            "yscale": dice.choice([1, -1, 2, 3]),
            "extrusion": (0, 0, dice.choice([1, -1])),
        }

    def draw(drawing: Drawing) -> None:
        drawing.blocks.new("INNER", base_point=(1, 2)).add_line((0, 0), (5, 1))
        outer_block = drawing.blocks.new("OUTER", base_point=(-1, 0.5))
        inner = [outer_block.add_blockref("INNER", (0, 0), dxfattribs=reference()) for _ in range(3)]
        outer = [drawing.modelspace().add_blockref("OUTER", (0, 0), dxfattribs=reference()) for _ in range(3)]
        for first, second in product(outer, inner):
            ends = [first.matrix44().transform(second.matrix44().transform(end)) for end in [(0, 0, 0), (5, 1, 0)]]
            expected.append(tuple(round(figure, 6) + 0.0 for end in ends for figure in (end.x, end.y)))

    sketch = sketch_of(draw)
    assert line_ends(shape for shape in sketch.primitives if isinstance(shape, Segment)) == sorted(expected)
    assert len(expected) == 9


def test_arrays_and_deep_nests_are_noticed_with_their_figures(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        drawing.blocks.new("PIN").add_circle((0, 0), 2)
        for number, inner in enumerate(("PIN", "NEST 0", "NEST 1")):
            drawing.blocks.new(f"NEST {number}").add_blockref(inner, (0, 0))
        drawing.modelspace().add_blockref("PIN", (0, 0), {"row_count": 2, "row_spacing": 9, "column_count": 3})
        drawing.modelspace().add_blockref("NEST 2", (50, 0))
        drawing.modelspace().add_blockref("NEST 1", (90, 0))

    noticed = [(notice.kind, notice.detail, notice.amount) for notice in sketch_of(draw).notices]
    assert noticed == [("block-array", "block PIN", 6.0), ("nested-block", "block NEST 2", 4.0)]
