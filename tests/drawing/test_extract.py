from __future__ import annotations

from collections.abc import Callable
from typing import Any

import ezdxf
import pytest
from ezdxf.document import Drawing

from dxfcheck.drawing.extract import extract
from dxfcheck.drawing.fates import UNDERLAY
from dxfcheck.drawing.primitives import Fate, Segment, Sketch

Sketcher = Callable[..., Sketch]


def fate_of(sketch: Sketch) -> Fate | None:
    (entity,) = sketch.entities
    return entity.fate


def test_every_entity_is_in_the_account_in_drawing_order_paper_after_model(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        drawing.layouts.new("Back").add_text("scale 1:2")
        drawing.layout("Layout1").add_line((0, 0), (1, 1))
        drawing.modelspace().add_line((0, 0), (1, 1), dxfattribs={"layer": "LINKS"})
        drawing.modelspace().add_circle((0, 0), 1)

    sketch = sketch_of(draw)
    told = [(entity.type, entity.layer, entity.fate) for entity in sketch.entities if entity.type != "VIEWPORT"]
    paper = Fate("skipped", "paper space")
    assert told == [("LINE", "LINKS", None), ("CIRCLE", "0", None), ("TEXT", "0", paper), ("LINE", "0", paper)]
    assert [shape.source.entity for shape in sketch.primitives] == [0, 1]
    assert sketch.handles(sketch.primitives[1]) == sketch.entities[1].handle != ""


@pytest.mark.parametrize(
    ("draw", "fate"),
    [
        (lambda msp: msp.add_point((3, 4)), Fate("skipped", "a point has no extent")),
        (lambda msp: msp.add_attdef("NAME", (3, 4)), Fate("note", "attribute definition")),
        (lambda msp: msp.add_spline([(3, 4), (5, 6), (7, 4)]), Fate("unread", "SPLINE is not read")),
        (lambda msp: msp.add_3dface([(3, 4), (5, 6), (7, 4)]), Fate("unread", "3DFACE is not read")),
        (lambda msp: msp.add_ray((3, 4), (1, 0)), Fate("skipped", "a construction line without an end")),
        (lambda msp: msp.add_xline((3, 4), (1, 0)), Fate("skipped", "a construction line without an end")),
        (lambda msp: msp.add_mline([(3, 4), (5, 6)]), Fate("unread", "MLINE is not read")),
        (lambda msp: msp.add_leader([(3, 4), (5, 6)]), Fate("note", "leader")),
    ],
    ids=["point", "attdef", "spline", "face", "ray", "xline", "mline", "leader"],
)
def test_what_is_not_read_says_so_and_where(sketch_of: Sketcher, draw: Callable[[Any], object], fate: Fate) -> None:
    sketch = sketch_of(lambda drawing: draw(drawing.modelspace()))
    assert fate_of(sketch) == fate
    assert sketch.entities[0].at == 3 + 4j
    assert sketch.primitives == ()


def test_an_unread_entity_keeps_its_layer(sketch_of: Sketcher) -> None:
    sketch = sketch_of(
        lambda drawing: drawing.modelspace().add_spline([(3, 4), (5, 6), (7, 4)], dxfattribs={"layer": "LINKS"})
    )
    assert sketch.entities[0].layer == "LINKS"


def on_layer(change: Callable[[Any], object]) -> Callable[[Drawing], None]:
    def draw(drawing: Drawing) -> None:
        change(drawing.layers.add("Aside"))
        drawing.modelspace().add_line((0, 0), (1, 1), dxfattribs={"layer": "ASIDE"})

    return draw


def test_layers_that_do_not_show_are_skipped(sketch_of: Sketcher) -> None:
    assert fate_of(sketch_of(on_layer(lambda layer: layer.off()))) == Fate("skipped", "layer is off")
    assert fate_of(sketch_of(on_layer(lambda layer: layer.freeze()))) == Fate("skipped", "layer is frozen")
    assert fate_of(sketch_of(on_layer(lambda layer: layer.lock()))) is None


def test_an_invisible_entity_is_skipped(sketch_of: Sketcher) -> None:
    sketch = sketch_of(lambda drawing: drawing.modelspace().add_line((0, 0), (1, 1), dxfattribs={"invisible": 1}))
    assert fate_of(sketch) == Fate("skipped", "invisible")


def test_a_layer_missing_from_the_table_is_on(sketch_of: Sketcher) -> None:
    sketch = sketch_of(lambda drawing: drawing.modelspace().add_line((0, 0), (1, 1), dxfattribs={"layer": "NOWHERE"}))
    assert sketch.primitives[0].source.layer == "NOWHERE"


@pytest.mark.parametrize(
    ("stated", "effective"),
    [(None, "CENTER2"), ("BYLAYER", "CENTER2"), ("Phantom", "PHANTOM"), ("ByBlock", "CONTINUOUS")],
)
def test_the_linetype_in_effect_is_upper_case(sketch_of: Sketcher, stated: str | None, effective: str) -> None:
    def draw(drawing: Drawing) -> None:
        drawing.layers.add("AXES", linetype="Center2")
        line = drawing.modelspace().add_line((0, 0), (1, 1), dxfattribs={"layer": "AXES"})
        if stated is not None:
            line.dxf.linetype = stated

    assert sketch_of(draw).primitives[0].source.linetype == effective


@pytest.mark.parametrize("figure", [float("nan"), float("inf"), 1e300])
def test_a_coordinate_that_is_no_number_is_noticed(sketch_of: Sketcher, figure: float) -> None:
    def draw(drawing: Drawing) -> None:
        msp = drawing.modelspace()
        msp.add_line((figure, 0), (1, 1))
        msp.add_circle((0, figure), 1)
        msp.add_arc((0, 0), figure, 0, 90)
        msp.add_lwpolyline([(0, 0), (figure, 1), (2, 2)])
        msp.add_text("A", dxfattribs={"insert": (figure, 0)})
        msp.add_line((0, 0), (1, 1))

    sketch = sketch_of(draw)
    assert [entity.fate for entity in sketch.entities] == [Fate("unread", "a coordinate is no number")] * 5 + [None]
    assert [notice.kind for notice in sketch.notices] == ["not-finite"] * 5
    assert [notice.entity for notice in sketch.notices] == [0, 1, 2, 3, 4]
    assert len(sketch.primitives) == 1


def test_what_is_drawn_from_behind_is_mirrored_and_noticed_once(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        msp = drawing.modelspace()
        behind = {"extrusion": (0, 0, -1)}
        msp.add_circle((3, 4), 1, dxfattribs=behind)
        msp.add_arc((3, 4), 1, 0, 90, dxfattribs=behind)
        msp.add_lwpolyline([(3, 4), (5, 4)], dxfattribs=behind)
        msp.add_line((3, 4), (5, 4), dxfattribs=behind)

    sketch = sketch_of(draw)
    ring, arc, polyline, line = sketch.primitives
    assert ring.centre == -3 + 4j  # type: ignore[union-attr]
    assert (arc.start, arc.end) == (pytest.approx(-3 + 5j), pytest.approx(-4 + 4j))  # type: ignore[union-attr]
    assert isinstance(polyline, Segment)
    assert polyline.start == -3 + 4j
    assert isinstance(line, Segment)
    assert line.start == 3 + 4j
    (notice,) = sketch.notices
    assert (notice.kind, notice.amount, notice.entity) == ("mirrored-plane", 3, 0)


def test_names_out_of_the_drawing_are_cleaned(sketch_of: Sketcher) -> None:
    sketch = sketch_of(lambda drawing: drawing.modelspace().add_line((0, 0), (1, 1), dxfattribs={"layer": "a\x1b[2Jb"}))
    assert sketch.entities[0].layer == sketch.primitives[0].source.layer == "a\ufffd[2Jb"


def test_an_entity_that_lacks_a_coordinate_does_not_stop_the_rest() -> None:
    drawing = ezdxf.new()
    drawing.modelspace().add_line((0, 0), (1, 1)).dxf.discard("end")
    drawing.modelspace().add_line((0, 0), (1, 1))
    assert [entity.fate for entity in extract(drawing).entities] == [
        Fate("unread", "LINE is damaged: no end is given"),
        None,
    ]


def test_an_elevation_that_is_no_number_is_noticed(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        drawing.modelspace().add_polyline2d([(0, 0), (4, 0)], dxfattribs={"elevation": (0, 0, float("nan"))})

    assert [notice.kind for notice in sketch_of(draw).notices] == ["not-finite"]


def test_pictures_and_underlays_lie_in_other_files(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        picture = drawing.add_image_def("bench.png", (640, 480))
        drawing.modelspace().add_image(picture, (3, 4), (10, 8))
        drawing.modelspace().add_underlay(drawing.add_underlay_def("bench.pdf"), (3, 4))

    sketch = sketch_of(draw)
    assert [entity.fate for entity in sketch.entities] == [UNDERLAY, UNDERLAY]


def test_layers_that_are_not_plotted_are_named(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        drawing.layers.add("AXES").dxf.plot = 0
        drawing.layers.add("UNUSED").dxf.plot = 0
        for layer in ("AXES", "Defpoints", "LINKS"):
            drawing.modelspace().add_line((0, 0), (5, 0), dxfattribs={"layer": layer})

    assert sketch_of(draw).unplotted == {"AXES", "Defpoints"}
