from __future__ import annotations

import math
from collections.abc import Callable

import pytest
from ezdxf.document import Drawing

from dxfcheck.drawing.primitives import Dimension, DimensionStyle, Sketch

Sketcher = Callable[..., Sketch]


def only_dimension(sketch: Sketch) -> Dimension:
    (shape,) = sketch.primitives
    assert isinstance(shape, Dimension)
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


def test_an_arc_dimension_measures_along_its_arc(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        drawing.modelspace().add_arc_dim_cra((0, 0), 5, 0, 90, 2).render()

    shape = only_dimension(sketch_of(draw))
    assert shape.kind == "arc"
    assert shape.measured == pytest.approx(2.5 * math.pi)


@pytest.mark.parametrize(
    ("raw", "text", "underlined"),
    [
        (r"120\S+0.1^-0.1;", "120 +0.1 / -0.1", False),
        (r"{\A1;120\H0.7x;\S+0,2^ 0;}", "120 +0,2 / 0", False),
        (r"5\S1/2;", "5 1/2", False),
        (r"5\S1#2;", "5 1/2", False),
        (r"120\XTYP", "120\nTYP", False),
        (r"\L120\l", "120", True),
        ("%%u120", "120", True),
        ("%%c50", "Ø50", False),
    ],
)
def test_what_is_written_stands_in_a_row(sketch_of: Sketcher, raw: str, text: str, underlined: bool) -> None:  # noqa: FBT001
    shape = only_dimension(
        sketch_of(lambda drawing: drawing.modelspace().add_aligned_dim((1, 2), (4, 6), distance=1, text=raw).render())
    )
    assert (shape.text, shape.underlined) == (text, underlined)


def test_the_style_tells_how_figures_are_shown(sketch_of: Sketcher) -> None:
    shown = {"dimpost": "<> mm", "dimrnd": 0.5, "dimdec": 1, "dimalt": 1, "dimaltf": 0.03937, "dimapost": "[] in"}

    def draw(drawing: Drawing) -> None:
        drawing.modelspace().add_aligned_dim((1, 2), (4, 6), distance=1, override=shown).render()

    style = only_dimension(sketch_of(draw)).style
    assert style == DimensionStyle(1.0, 0.5, 1, "<> mm", 0.03937, "[] in", feet=False)


def test_a_second_figure_that_is_not_shown_says_nothing(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        drawing.modelspace().add_aligned_dim((1, 2), (4, 6), distance=1, override={"dimaltf": 25.4}).render()

    assert only_dimension(sketch_of(draw)).style.alternate is None


def test_feet_and_inches_have_no_decimals(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        drawing.modelspace().add_aligned_dim((1, 2), (4, 6), distance=1, override={"dimlunit": 4, "dimdec": 4}).render()

    style = only_dimension(sketch_of(draw)).style
    assert (style.feet, style.decimals) == (True, None)


def test_a_dimension_in_a_turned_and_enlarged_block_measures_as_its_own_text_shows(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        drawing.blocks.new("PLATE").add_linear_dim((0, 9), (1, 0), (5, 0)).render()
        drawing.modelspace().add_blockref("PLATE", (10, 0), {"xscale": -2, "yscale": 2, "rotation": 90})

    shape = only_dimension(sketch_of(draw))
    assert shape.measured == pytest.approx(4)
    assert shape.points == pytest.approx((10 - 2j, 10 - 10j))
    assert shape.direction == pytest.approx(-1j)


def test_a_dimension_out_of_the_plane_has_no_measure(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        drawing.modelspace().add_aligned_dim((0, 0, 0), (3, 0, 4), distance=1).render()

    assert only_dimension(sketch_of(draw)).measured is None


def test_a_dimension_of_an_unknown_style_has_no_measure(sketch_of: Sketcher) -> None:
    def draw(drawing: Drawing) -> None:
        drawing.modelspace().add_aligned_dim((0, 0), (3, 4), distance=1).render()
        for entity in drawing.modelspace():
            entity.dxf.dimstyle = "GONE"

    assert only_dimension(sketch_of(draw)).measured is None


def test_dimensions_do_not_break_into_lines(sketch_of: Sketcher) -> None:
    sketch = sketch_of(lambda drawing: drawing.modelspace().add_linear_dim((0, 9), (1, 2), (5, 2)).render())
    assert sketch.diagonal == 0
    assert not math.isnan(sketch.diagonal)
