from __future__ import annotations

import cmath
import math

import pytest

from dxfcheck.reading.shapes.rectangles import find_rectangles
from dxfcheck.reading.slides.boxes import boxes_of
from dxfcheck.reading.slides.rails import Rail, rails_of
from tests.reading.slides.sliders import turned_rectangle
from tests.sketches import Drawn, laid_out, line, path, rectangle, ring

BOX = rectangle(0j, 20, 12, handle="box")
FAR = line(-100 + 70j, 100 + 70j)
"""Gives the sheet a diagonal of about 210: the slack of the box is 0.12."""


def rails(*things: Drawn, box: Drawn = BOX, apart: frozenset[int] = frozenset()) -> list[Rail]:
    """The rails of a box, which is drawn first."""
    sheet, _ = laid_out(box, *things, FAR)
    rectangles = find_rectangles(sheet.linework, sheet.touching, sheet.pins, sheet.tolerance, [0])
    boxes = boxes_of(rectangles[:1], sheet.pins, sheet.landings.landings, frozenset(), sheet.tolerance)
    (found,) = rails_of(boxes, sheet.linework, sheet.touching, sheet.landings.landings, apart)
    return found


def how(*things: Drawn) -> list[tuple[str, int]]:
    return [(rail.how, rail.axis) for rail in rails(*things)]


@pytest.mark.parametrize(
    ("ends", "expected"),
    [
        pytest.param((-40 + 0j, 40 + 0j), "through", id="through the middle"),
        pytest.param((-40 + 5.8j, 40 + 5.8j), "through", id="through near a side"),
        pytest.param((-40 + 6j, 40 + 6j), "beside", id="along a side"),
        pytest.param((-40 + 12j, 40 + 12j), "beside", id="half a width off"),
        pytest.param((-40 + 12.3j, 40 + 12.3j), None, id="further off"),
        pytest.param((-40 - 9j, 40 - 9j), "beside", id="beneath"),
        pytest.param((-40 + 0j, 5 + 0j), "enters", id="ends inside"),
        pytest.param((-40 + 0j, -9.5 + 0j), "enters", id="ends just inside"),
        pytest.param((40 + 0j, 5 + 0j), "enters", id="ends inside from the other side"),
        pytest.param((-40 + 0j, -10 + 0j), "stops", id="ends at the side"),
        pytest.param((-40 + 0j, -20 + 0j), "stops", id="ends half a length before it"),
        pytest.param((-40 + 0j, -20.2 + 0j), None, id="ends further off"),
        pytest.param((10 + 0j, 40 + 0j), "stops", id="ends at the other side"),
        pytest.param((-9 + 0j, 9 + 0j), None, id="lies inside"),
        pytest.param((-40 + 8j, 5 + 8j), "beside", id="covers part of it"),
        pytest.param((-40 + 8j, -10 + 8j), None, id="ends beside its end"),
        pytest.param((-8 + 8j, 8 + 8j), None, id="shorter than the box"),
    ],
)
def test_how_a_line_along_the_box_runs_to_it(ends: tuple[complex, complex], expected: str | None) -> None:
    assert how(line(*ends)) == ([(expected, 0)] if expected else [])


def test_lines_across_count_along_the_other_axis() -> None:
    (rail,) = rails(line(3 - 40j, 3 + 40j))
    assert (rail.how, rail.axis) == ("through", 1)
    assert (rail.offset, rail.low, rail.high) == pytest.approx((-3, -40, 40))


@pytest.mark.parametrize(("degrees", "count"), [(0.4, 1), (-0.4, 1), (0.6, 0), (45.0, 0)])
def test_a_rail_runs_along_within_half_a_degree(degrees: float, count: int) -> None:
    reach = cmath.rect(40, math.radians(degrees))
    assert len(rails(line(-reach, reach))) == count


@pytest.mark.parametrize("degrees", [30.0, 200.0])
def test_rails_are_measured_in_the_boxs_own_axes(degrees: float) -> None:
    turn = cmath.rect(1, math.radians(degrees))
    ends = (turn * (-40 + 2j), turn * (30 + 2j))
    for one, other in (ends, ends[::-1]):
        (rail,) = rails(line(one, other), box=turned_rectangle(0j, 20, 12, math.radians(degrees)))
        assert (rail.offset, rail.low, rail.high) == pytest.approx((2, -40, 30))


def test_a_line_that_stops_at_the_box_and_at_other_linework_is_no_interrupted_guide() -> None:
    stop = line(-12 - 5j, -12 + 5j)
    assert how(line(-40 + 0j, -12 + 0j)) == [("stops", 0)]
    assert how(line(-40 + 0j, -12 + 0j), stop) == []
    assert how(line(-12 + 0j, -40 + 0j), stop) == []


@pytest.mark.parametrize("gap", [0.09, 0.06])
def test_one_that_merely_comes_near_other_linework_is(gap: float) -> None:
    """Within the shape tolerance of a line that it does not meet."""
    assert how(line(-40 + 0j, -12 + 0j), line(-12 + gap - 5j, -12 + gap + 5j)) == [("stops", 0)]


def test_what_is_used_up_otherwise_is_no_rail() -> None:
    drawn = [line(-40 + 0j, 40 + 0j), line(-40 + 8j, 40 + 8j)]
    assert [rail.strand for rail in rails(*drawn)] == [1, 2]
    assert [rail.strand for rail in rails(*drawn, apart=frozenset({1}))] == [2]


def test_the_sides_of_a_polyline_are_rails_of_one_strand() -> None:
    cylinder = path(40 - 8j, -40 - 8j, -40 + 8j, 40 + 8j)
    assert [(rail.strand, rail.how, round(rail.offset, 6)) for rail in rails(cylinder)] == [
        (1, "beside", -8),
        (1, "beside", 8),
    ]


@pytest.mark.parametrize(("start", "pinned"), [(0j, True), (2 + 0j, True), (-40 + 0j, False)])
def test_a_line_that_ends_at_the_boxs_own_pin_is_told(start: complex, pinned: bool) -> None:  # noqa: FBT001
    (rail,) = rails(ring(0j, 2.0), line(start, 60 + 0j))
    assert rail.pinned == pinned
