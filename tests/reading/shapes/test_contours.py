from __future__ import annotations

import cmath
import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from dxfcheck.drawing.primitives import Arc, Path, Segment
from dxfcheck.reading.shapes.contours import Contour, find_contours
from tests.sketches import Drawn, arc, laid_out, line, obround, path, rectangle, ring

FAR = line(-200 + 150j, 200 + 150j)
"""Gives the sheet a diagonal of about 450: the shape tolerance is 0.2."""


def contours(*things: Drawn, apart: frozenset[int] = frozenset()) -> list[Contour]:
    sheet, _ = laid_out(*things, FAR)
    return find_contours(
        sheet.linework,
        sheet.touching,
        sheet.tolerance,
        apart | sheet.ring_strands,
        sheet.pins,
        sheet.landings.landings,
    )


def loose_bar(one: complex, other: complex, radius: float) -> list[Drawn]:
    """A bar of two lines and two half arcs."""
    along = (other - one) / abs(other - one)
    side = radius * along * 1j
    turn = math.degrees(cmath.phase(along))
    return [
        line(one - side, other - side),
        arc(other, radius, turn - 90, 180),
        line(other + side, one + side),
        arc(one, radius, turn + 90, 180),
    ]


def holes(*places: complex, radius: float = 4.0) -> list[Drawn]:
    return [ring(at, radius) for at in places]


def area(contour: Contour) -> float:
    points = contour.points
    return abs(sum((a.conjugate() * b).imag for a, b in zip(points, [*points[1:], points[0]], strict=True))) / 2


BAR_AREA = 100 * 20 + math.pi * 100
"""Of a bar of radius 10 between centres 100 apart."""


@pytest.mark.parametrize("degrees", [0.0, 33.0, 200.0])
def test_a_bar_of_loose_lines_and_arcs_and_one_of_a_polyline_are_contours(degrees: float) -> None:
    far = 100 * cmath.exp(1j * math.radians(degrees))
    (loose,) = contours(*holes(0j, far), *loose_bar(0j, far, 10.0))
    (whole,) = contours(*holes(0j, far), obround(0j, far, 10.0))
    assert len(set(loose.strands)) == 4
    assert len(whole.strands) == 1
    for found in (loose, whole):
        assert area(found) == pytest.approx(BAR_AREA, rel=2e-3)
        assert found.contains(50 * far / 100)
        assert not found.contains(-12 * far / 100)


@given(order=st.permutations(range(4)), turned=st.lists(st.booleans(), min_size=2, max_size=2))
def test_the_order_and_direction_of_its_pieces_does_not_matter(order: list[int], turned: list[bool]) -> None:
    pieces = loose_bar(0j, 100 + 0j, 10.0)
    ends = [(-10j, 100 - 10j), (100 + 10j, 10j)]
    for place, (start, end), turn in zip((0, 2), ends, turned, strict=True):
        pieces[place] = line(end, start) if turn else line(start, end)
    (found,) = contours(*holes(0j, 100 + 0j), *(pieces[number] for number in order))
    assert area(found) == pytest.approx(BAR_AREA, rel=2e-3)
    assert found.clearance(0j) == pytest.approx(10.0)


def test_ends_close_within_the_shape_tolerance() -> None:
    pieces = loose_bar(0j, 100 + 0j, 10.0)
    pieces[0] = line(0.1 - 10j, 99.95 - 10.05j)
    assert len(contours(*holes(0j, 100 + 0j), *pieces)) == 1
    pieces[0] = line(1.0 - 10j, 99.95 - 10.05j)
    assert contours(*holes(0j, 100 + 0j), *pieces) == []


def test_a_chain_that_lacks_a_piece_and_one_round_no_pin_are_no_contours() -> None:
    bar = loose_bar(0j, 100 + 0j, 10.0)
    assert contours(*holes(0j, 100 + 0j), *bar[:3]) == []
    assert contours(*holes(50j), *bar) == []


@pytest.mark.parametrize(
    ("extra", "count"),
    [
        pytest.param([line(50 + 10j, 50 + 60j)], 1, id="a link that ends on its side"),
        pytest.param([line(100.1 + 10.1j, 160 + 60j)], 1, id="a stroke that ends near a corner"),
        pytest.param([line(100 + 10j, 160 + 60j)], 1, id="a stroke that ends on a corner"),
        pytest.param([line(100 + 10j, 160 + 60j), line(160 + 60j, 190 + 60j)], 1, id="a branch of two lines"),
        pytest.param([line(100 + 10j, 100 + 40j), line(100 + 40j, 10j)], 0, id="a second way round"),
    ],
)
def test_what_else_ends_on_a_chain(extra: list[Drawn], count: int) -> None:
    assert len(contours(*holes(0j, 100 + 0j), *loose_bar(0j, 100 + 0j, 10.0), *extra)) == count


def test_rods_that_meet_on_pins_are_no_contour() -> None:
    places = [0j, 20 + 35j, 120 + 60j, 130 + 0j]
    rods = [line(start, end) for start, end in zip(places, [*places[1:], places[0]], strict=True)]
    assert contours(*holes(*places), *holes(70 + 20j), *rods) == []


def test_a_bar_whose_side_passes_into_its_end_inside_another_bars_hole() -> None:
    drawn = [*holes(0j, 100 + 0j), *loose_bar(0j, 100 + 0j, 10.0), *holes(101 + 9j)]
    assert len(contours(*drawn)) == 1


def test_strands_that_are_used_up_otherwise_make_no_contour() -> None:
    assert contours(*holes(0j), rectangle(0j, 20, 12), apart=frozenset({0})) == []
    assert len(contours(*holes(0j), rectangle(0j, 20, 12))) == 1


def test_an_open_polyline_that_ends_where_it_begins_is_closed() -> None:
    (found,) = contours(*holes(0j), path(-10 - 10j, 10 - 10j, 10j, -10 - 10j))
    assert found.strands == (0,)
    assert area(found) == pytest.approx(200.0)


def test_a_chain_of_polylines_and_lines() -> None:
    (found,) = contours(
        *holes(0j), path(-10 - 10j, 10 - 10j, 10 + 10j), path(-10 - 10j, -10 + 10j), line(-10 + 10j, 10 + 10j)
    )
    assert area(found) == pytest.approx(400.0)


def test_a_lens_of_two_arcs() -> None:
    half = math.degrees(math.asin(0.6))
    drawn = [arc(-8j, 10.0, 90 - half, 2 * half), arc(8j, 10.0, 270 - half, 2 * half)]
    (found,) = contours(*holes(0j, radius=1.0), *drawn)
    assert area(found) == pytest.approx(2 * (100 * math.asin(0.6) - 0.6 * 0.8 * 100), rel=2e-2)


def test_which_arcs_run_about_a_hole() -> None:
    (found,) = contours(*holes(0j, 100 + 0j), obround(0j, 100 + 0j, 10.0))
    assert found.rounds(0j, 4.0, 0.1)
    assert not found.rounds(50 + 0j, 4.0, 0.1)
    assert not found.rounds(0j, 12.0, 0.1)


def test_many_parts_beside_it_change_nothing() -> None:
    cells = [
        rectangle_piece
        for number in range(200)
        for rectangle_piece in _four_lines(-190 + 8 * (number % 40) + 1j * (-60 - 8 * (number // 40)))
    ]
    found = contours(*holes(0j, 100 + 0j), *loose_bar(0j, 100 + 0j, 10.0), *cells)
    assert [contour.strands for contour in found] == [(0, 1, 2, 3)]


def _four_lines(at: complex) -> list[Drawn]:
    corners = [at, at + 6, at + 6 + 6j, at + 6j]
    return [line(start, end) for start, end in zip(corners, [*corners[1:], corners[0]], strict=True)]


def test_pieces_are_those_drawn() -> None:
    (found,) = contours(*holes(0j, 100 + 0j), *loose_bar(0j, 100 + 0j, 10.0))
    assert sum(isinstance(piece, Arc) for piece in found.pieces) == 2
    assert sum(isinstance(piece, Segment) for piece in found.pieces) == 2
    assert not any(isinstance(piece, Path) for piece in found.pieces)
