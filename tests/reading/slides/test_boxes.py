from __future__ import annotations

import cmath
import math

import pytest

from dxfcheck.reading.frames.frame import FrameSymbols
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.shapes.rectangles import find_rectangles
from dxfcheck.reading.slides.boxes import Box, boxes_of, hatched_boxes
from tests.reading.slides.sliders import turned_rectangle
from tests.sketches import Drawn, laid_out, line, path, rectangle, ring, rod

FAR = line(-100 + 50j, 100 + 50j)
"""Gives the sheet a diagonal of about 210: the shape tolerance is 0.1."""


def boxes(*things: Drawn) -> tuple[Sheet, list[Box]]:
    sheet, _ = laid_out(*things, FAR)
    every = range(len(sheet.strands))
    rectangles = find_rectangles(sheet.linework, sheet.touching, sheet.pins, sheet.tolerance, every)
    frame = {strand.number for strand in sheet.strands if strand.frame}
    return sheet, boxes_of(rectangles, sheet.pins, sheet.landings.landings, frame, sheet.tolerance)


def framed(centre: complex, length: float, width: float) -> Drawn:
    half, up = length / 2, width / 2 * 1j
    corners = (centre - half - up, centre + half - up, centre + half + up, centre - half + up)
    return path(*corners, closed=True, layer="FRAME")


@pytest.mark.parametrize("degrees", [0.0, 30.0, 137.0])
def test_a_box_knows_its_middle_its_axes_and_half_lengths(degrees: float) -> None:
    turn = math.radians(degrees)
    _, (box,) = boxes(ring(3 + 2j, 2.0), turned_rectangle(3 + 2j, 20, 12, turn))
    assert box.centre == pytest.approx(3 + 2j)
    assert box.halves == pytest.approx((10, 6))
    assert box.axes == pytest.approx((cmath.rect(1, turn), cmath.rect(1, turn + math.pi / 2)))
    assert box.place(3 + 2j + cmath.rect(7, turn)) == pytest.approx((7, 0))
    assert box.sites == (0,)


@pytest.mark.parametrize(
    ("point", "held"),
    [(9 + 5j, True), (10 + 6j, True), (10.1 + 6.1j, True), (10.5 + 0j, False), (6.5j, False), (-10.5 + 0j, False)],
)
def test_a_box_holds_what_lies_inside_or_on_its_sides(point: complex, held: bool) -> None:  # noqa: FBT001
    _, (box,) = boxes(rectangle(0j, 20, 12))
    assert box.holds(point) == held


@pytest.mark.parametrize(("width", "slack"), [(2.0, 0.06), (6.0, 0.1), (40.0, 0.4)])
def test_what_meets_a_box_may_be_off_by_the_shape_tolerance_and_more_on_a_great_one(width: float, slack: float) -> None:
    """3 % of a small one, 2 % of half the width of a great one, and a two-thousandth of the diagonal between."""
    _, (box,) = boxes(rectangle(0j, 50, width))
    assert box.slack == pytest.approx(slack, rel=0.1)


def test_the_smallest_box_comes_first() -> None:
    _, found = boxes(rectangle(0j, 40, 30), rectangle(60 + 0j, 10, 8), rectangle(-60 + 0j, 20, 10))
    assert [box.halves for box in found] == [(5, 4), (10, 5), (20, 15)]
    assert [box.number for box in found] == [0, 1, 2]


def test_a_rectangle_with_three_pins_is_no_box() -> None:
    pins = [ring(at, 2.0) for at in (-10 + 0j, 0j, 10 + 0j)]
    _, (box,) = boxes(*pins[:2], rectangle(0j, 30, 12))
    assert box.sites == (0, 1)
    assert boxes(*pins, rectangle(0j, 30, 12))[1] == []


def test_a_pin_outside_the_sides_is_not_inside() -> None:
    _, (box,) = boxes(ring(7j, 2.0), rectangle(0j, 30, 12))
    assert box.sites == ()


def test_a_rectangle_on_a_frame_layer_is_a_bearing_with_a_pin_and_a_box_without() -> None:
    _, (box,) = boxes(framed(0j, 20, 12), ring(60j, 2.0))
    assert box.frame
    assert boxes(framed(0j, 20, 12), ring(0j, 2.0))[1] == []
    assert not boxes(rectangle(0j, 20, 12))[1][0].frame


def test_a_rectangle_with_a_pin_on_a_corner_is_a_link() -> None:
    assert boxes(ring(10 + 6j, 2.0), rectangle(0j, 20, 12))[1] == []


def symbols(*bases: tuple[int, int]) -> FrameSymbols:
    return FrameSymbols(frame={}, strokes={}, bases=bases)


def test_strokes_on_a_side_say_along_which_axis_a_box_is_hatched() -> None:
    sheet, found = boxes(rectangle(0j, 20, 12), rectangle(60 + 0j, 10, 8))
    small, great = found
    hatched = hatched_boxes(found, symbols((great.strands[0], 0)), sheet)
    assert hatched.numbers == {great.number}
    assert hatched.sides == set(great.strands)
    assert dict(hatched.axes) == {great.number: (0,)}
    upright = hatched_boxes(found, symbols((small.strands[0], 1)), sheet)
    assert dict(upright.axes) == {small.number: (1,)}


def test_a_box_hatched_all_over_is_a_section_and_says_no_axis() -> None:
    sheet, found = boxes(rectangle(0j, 20, 12))
    two = hatched_boxes(found, symbols((0, 0), (0, 1)), sheet)
    assert dict(two.axes) == {0: (0, 1)}
    four = hatched_boxes(found, symbols((0, 0), (0, 1), (0, 2), (0, 3)), sheet)
    assert dict(four.axes) == {}
    assert four.numbers == {0}


def test_strokes_on_other_lines_hatch_no_box_and_a_box_of_the_frame_needs_none() -> None:
    sheet, found = boxes(rectangle(0j, 20, 12))
    assert hatched_boxes(found, symbols((1, 0)), sheet) == (frozenset(), {}, frozenset())
    assert hatched_boxes([found[0]._replace(frame=True)], symbols((0, 0)), sheet).numbers == frozenset()


def test_a_link_that_ends_on_a_pin_inside_leaves_the_box_one() -> None:
    """A rod's end is no corner of the box."""
    _, found = boxes(ring(0j, 2.0), ring(40 + 30j, 2.0), rod(0j, 40 + 30j, radius=2.0), rectangle(0j, 20, 12))
    assert [box.sites for box in found] == [(0,)]
