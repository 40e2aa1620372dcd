from __future__ import annotations

from collections.abc import Sequence

import pytest

from dxfcheck.reading.lines.linework import Strand
from dxfcheck.reading.observations.snapping import foot_on_strand, place_on_line
from tests.sketches import RADIUS, A, B, C, D, Drawn, arc, labels, laid_out, line, pins, read, rod


def strands(*things: Drawn) -> Sequence[Strand]:
    return laid_out(*things)[0].strands


@pytest.mark.parametrize(
    ("end", "met", "past"),
    [
        pytest.param(30 + 9.9j, 30 + 10j, False, id="stops short"),
        pytest.param(30 + 10.2j, 30 + 10j, True, id="runs past"),
        pytest.param(63 + 10.1j, 60 + 10j, False, id="misses the end of the line"),
    ],
)
def test_a_line_meets_another_along_its_own_direction(end: complex, met: complex, past: bool) -> None:  # noqa: FBT001
    rod_, target = strands(line(end.real + 0j, end), line(10j, 60 + 10j))
    place, runs_past = place_on_line(rod_, 1, target)
    assert place == pytest.approx(met)
    assert runs_past == past


def test_a_line_that_comes_in_almost_level_is_snapped_to_the_nearest_point() -> None:
    shallow, target = strands(line(0j, 30 + 9.9j), line(10j, 60 + 10.1j))
    met, _ = place_on_line(shallow, 1, target)
    assert abs(met - (30 + 9.9j)) < 0.5


def test_the_foot_on_an_arc_lies_on_it() -> None:
    (bow,) = strands(arc(0j, 10.0, 0.0, 90.0))
    assert foot_on_strand(3 + 3j, bow) == pytest.approx(10 * (1 + 1j) / abs(1 + 1j))
    assert foot_on_strand(12 - 5j, bow) == pytest.approx(10 + 0j)


def snap(coupler: Drawn) -> complex | None:
    reading = read(*pins(), rod(A, B), coupler, rod(C, D), *labels())
    (seen,) = [each for each in reading.observations if each.kind == "near-miss"]
    return seen.snap


def test_a_line_that_begins_at_a_rim_is_snapped_to_the_rim_and_one_from_a_centre_to_the_centre() -> None:
    along = (C - B) / abs(C - B)
    assert snap(line(B + RADIUS * along, C - 7 * along)) == pytest.approx(C - RADIUS * along)
    assert snap(line(B, C - 7 * along)) == C
