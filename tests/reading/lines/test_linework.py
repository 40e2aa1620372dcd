from __future__ import annotations

import cmath
import math

import pytest

from dxfcheck.drawing.primitives import Arc, Path, Segment
from dxfcheck.reading.lines.linework import distance_to_piece, make_linework, piece_length
from tests.sketches import SOURCE, obround, path

LINE = Segment(SOURCE, 0j, 3 + 4j)
QUARTER = Arc(SOURCE, 1 + 1j, 10.0, 0.0, math.pi / 2)


def polyline(*points: complex, closed: bool = False, curved: bool = False) -> Path:
    made = path(*points, closed=closed, curved=curved).make(SOURCE)
    assert isinstance(made, Path)
    return made


def test_lines_and_arcs_have_two_ends_and_no_corners() -> None:
    line, arc = make_linework([LINE, QUARTER], ()).strands
    assert (line.ends, line.corners, line.length) == ((0j, 3 + 4j), (), 5.0)
    assert list(arc.ends) == pytest.approx([11 + 1j, 1 + 11j])
    assert arc.length == pytest.approx(5 * math.pi)
    assert not line.closed


def test_an_open_polyline_has_its_inner_vertices_as_corners() -> None:
    (strand,) = make_linework([polyline(0j, 10 + 0j, 10 + 5j, 20 + 5j)], ()).strands
    assert strand.ends == (0j, 20 + 5j)
    assert strand.corners == (10 + 0j, 10 + 5j)
    assert strand.length == 25.0


def test_a_closed_polyline_has_no_ends_and_all_its_vertices_as_corners() -> None:
    (strand,) = make_linework([polyline(0j, 3 + 0j, 3 + 4j, closed=True)], ()).strands
    assert strand.closed
    assert strand.corners == (0j, 3 + 0j, 3 + 4j)
    assert strand.length == 12.0


def test_the_vertices_of_a_smooth_curve_are_no_corners() -> None:
    (strand,) = make_linework([polyline(0j, 3 + 1j, 6 + 0j, curved=True)], ()).strands
    assert strand.corners == ()
    assert strand.ends == (0j, 6 + 0j)


def test_strands_are_numbered_and_marked_as_frame() -> None:
    linework = make_linework([LINE, QUARTER, LINE], {2})
    assert [strand.number for strand in linework.strands] == [0, 1, 2]
    assert [strand.frame for strand in linework.strands] == [False, False, True]


def test_straight_pieces_and_chords_know_their_strand() -> None:
    linework = make_linework([QUARTER, polyline(0j, 1 + 0j, 2 + 1j), LINE], ())
    assert linework.piece_strand.tolist() == [1, 1, 2]
    assert set(linework.chord_strand.tolist()) == {0}
    assert linework.piece_starts.tolist() == [0j, 1 + 0j, 0j]


def test_chords_of_an_arc_run_along_it_within_seven_and_a_half_degrees() -> None:
    linework = make_linework([QUARTER], ())
    turns = [
        cmath.phase((end - QUARTER.centre) / (start - QUARTER.centre))
        for start, end in zip(linework.chord_starts.tolist(), linework.chord_ends.tolist(), strict=True)
    ]
    assert sum(turns) == pytest.approx(QUARTER.sweep)
    assert max(turns) <= math.radians(7.5) + 1e-12


def test_only_single_lines_have_a_direction() -> None:
    directions = make_linework([LINE, QUARTER, polyline(0j, 1 + 0j), LINE], ()).line_directions().tolist()
    assert directions[0] == directions[3] == 3 + 4j
    assert cmath.isnan(directions[1])
    assert cmath.isnan(directions[2])


def test_an_outline_with_arcs_is_as_long_as_its_pieces() -> None:
    made = obround(0j, 10 + 0j, 2.0).make(SOURCE)
    assert isinstance(made, Path)
    assert make_linework([made], ()).strands[0].length == pytest.approx(20 + 4 * math.pi)
    assert piece_length(QUARTER) == pytest.approx(5 * math.pi)


@pytest.mark.parametrize(
    ("point", "distance"),
    [
        pytest.param(1 + cmath.rect(12, 1.0) + 1j, 2.0, id="outside the arc"),
        pytest.param(1 + cmath.rect(7, 0.1) + 1j, 3.0, id="inside the arc"),
        pytest.param(1 + 1j, 10.0, id="at its centre"),
        pytest.param(11 - 2j, 3.0, id="past its first end"),
        pytest.param(-2 + 11j, 3.0, id="past its last end"),
    ],
)
def test_distance_to_an_arc(point: complex, distance: float) -> None:
    assert distance_to_piece(point, QUARTER) == pytest.approx(distance)


def test_no_primitives_make_no_strands() -> None:
    linework = make_linework([], ())
    assert linework.strands == ()
    assert linework.piece_starts.size == linework.chord_starts.size == 0
