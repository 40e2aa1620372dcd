from __future__ import annotations

import cmath
import math

import pytest

from dxfcheck.drawing.primitives import Arc, Path, Segment, Source
from dxfcheck.reading.shapes.rectangles import Rectangle, find_rectangles
from tests.sketches import Drawn, laid_out, line, path, rectangle, ring

CORNERS = (-10 - 6j, 10 - 6j, 10 + 6j, -10 + 6j)
FAR = line(-100 + 50j, 100 + 50j)
"""Gives the sheet a diagonal of about 210."""


def rectangles(*things: Drawn) -> list[Rectangle]:
    sheet, _ = laid_out(ring(0j, 2.0), FAR, *things)
    return find_rectangles(sheet.linework, sheet.touching, sheet.pins, sheet.tolerance)


def rounded_rectangle(centre: complex, length: float, width: float, radius: float) -> Drawn:
    """A closed polyline of four sides and four quarter arcs."""
    across = [complex(1, -1), complex(1, 1), complex(-1, 1), complex(-1, -1)]
    middles = [centre + complex(way.real * (length / 2 - radius), way.imag * (width / 2 - radius)) for way in across]
    out = [-1j, 1, 1j, -1]

    def make(source: Source) -> Path:
        pieces: list[Segment | Arc] = []
        for number, middle in enumerate(middles):
            pieces.append(Segment(source, middles[number - 1] + radius * out[number], middle + radius * out[number]))
            pieces.append(Arc(source, middle, radius, cmath.phase(out[number]), math.pi / 2))
        corners = tuple(piece.start for piece in pieces if isinstance(piece, Segment))
        return Path(source, tuple(pieces), corners, closed=True, curved=False)

    return Drawn("LWPOLYLINE", make)


def four_lines(*corners: complex) -> list[Drawn]:
    return [line(start, end) for start, end in zip(corners, [*corners[1:], corners[0]], strict=True)]


def turned(corners: tuple[complex, ...], degrees: float) -> list[complex]:
    return [corner * cmath.exp(1j * math.radians(degrees)) for corner in corners]


@pytest.mark.parametrize("degrees", [0.0, 30.0, 137.0])
def test_four_lines_or_a_closed_polyline_are_a_rectangle_whatever_way_it_is_turned(degrees: float) -> None:
    corners = turned(CORNERS, degrees)
    (loose,) = rectangles(*four_lines(*corners))
    (outline,) = rectangles(path(*corners, closed=True))
    assert len(loose.strands) == 4
    assert len(outline.strands) == 1
    assert {complex(round(at.real, 6), round(at.imag, 6)) for at in loose.corners} == {
        complex(round(at.real, 6), round(at.imag, 6)) for at in outline.corners
    }


@pytest.mark.parametrize("order", [(0, 1, 2, 3), (3, 1, 0, 2), (2, 0, 3, 1)])
def test_a_rectangle_is_found_once_in_whatever_order_its_lines_are_drawn(order: tuple[int, ...]) -> None:
    sides = four_lines(*CORNERS)
    assert len(rectangles(*(sides[number] for number in order))) == 1


@pytest.mark.parametrize(("gap", "found"), [(0.05, 1), (0.15, 0)])
def test_loose_corners_close_within_the_shape_tolerance(gap: float, found: int) -> None:
    """A two-thousandth of the diagonal, about 0.1 here."""
    sides = four_lines(*CORNERS)
    sides[2] = line(10 + 6j, -10 + gap + 6j)
    assert len(rectangles(*sides)) == found


@pytest.mark.parametrize(
    "corners",
    [
        pytest.param((-10 - 6j, 10 - 6j, 12 + 6j, -8 + 6j), id="slanted"),
        pytest.param((-10 - 6j, 10 - 6j, 10 + 6j, -10 + 7j), id="one side longer"),
    ],
)
def test_what_is_not_square_is_no_rectangle(corners: tuple[complex, ...]) -> None:
    assert rectangles(*four_lines(*corners)) == []
    assert rectangles(path(*corners, closed=True)) == []


@pytest.mark.parametrize(("degrees", "found"), [(0.4, 1), (0.6, 0)])
def test_corners_are_square_within_half_a_degree(degrees: float, found: int) -> None:
    lean = 12 * math.tan(math.radians(degrees))
    assert len(rectangles(path(-10 - 6j, 10 - 6j, 10 + lean + 6j, -10 + lean + 6j, closed=True))) == found


def test_three_sides_and_a_triangle_are_no_rectangle() -> None:
    assert rectangles(*four_lines(*CORNERS)[:3]) == []
    assert rectangles(path(*CORNERS[:3], closed=True)) == []


def test_three_sides_of_one_polyline_are_open_unless_a_longer_line_closes_them() -> None:
    (half,) = rectangles(path(*CORNERS))
    assert half.open
    (whole,) = rectangles(path(*CORNERS), line(-10 - 30j, -10 + 30j))
    assert not whole.open
    (still,) = rectangles(path(*CORNERS), line(-10 - 6j, -10 + 6j))
    assert still.open


@pytest.mark.parametrize("order", [(0, 1, 2), (2, 1, 0), (1, 0, 2)])
def test_three_lines_on_a_longer_one_are_a_rectangle_once(order: tuple[int, ...]) -> None:
    sides = four_lines(*CORNERS)[:3]
    drawn = [sides[number] for number in order]
    (found,) = rectangles(*drawn, line(-10 - 30j, -10 + 30j))
    assert len(found.strands) == 3
    assert rectangles(*drawn, line(-10 - 6j, -10 + 30j)) == []


def test_two_lines_across_between_longer_ones_are_a_rectangle_but_not_at_their_ends() -> None:
    across = [line(-10 - 6j, -10 + 6j), line(10 - 6j, 10 + 6j)]
    (found,) = rectangles(line(-40 - 6j, 40 - 6j), line(-40 + 6j, 40 + 6j), *across)
    assert len(found.strands) == 2
    assert rectangles(line(-10 - 6j, 40 - 6j), line(-10 + 6j, 40 + 6j), *across) == []


@pytest.mark.parametrize(("radius", "found"), [(2.0, 1), (5.0, 0)])
def test_small_roundings_leave_a_rectangle_with_the_corners_its_sides_would_meet_in(radius: float, found: int) -> None:
    rounded = rectangles(rounded_rectangle(0j, 20, 12, radius))
    assert len(rounded) == found
    for each in rounded:
        assert sorted((round(at.real, 9), round(at.imag, 9)) for at in each.corners) == sorted(
            (at.real, at.imag) for at in CORNERS
        )


def test_lines_that_cross_like_a_hash_are_no_rectangle() -> None:
    crossed = [line(-20 - 6j, 20 - 6j), line(-20 + 6j, 20 + 6j), line(-10 - 20j, -10 + 20j), line(10 - 20j, 10 + 20j)]
    assert rectangles(*crossed) == []


def test_a_rectangle_from_its_builder_is_one() -> None:
    assert len(rectangles(rectangle(0j, 20, 12))) == 1
