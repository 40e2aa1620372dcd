from __future__ import annotations

import math

import pytest

from dxfcheck.drawing.primitives import Arc, Path, Segment
from dxfcheck.reading.lines.linework import make_linework
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.reading.lines.touches import Touches, find_touches
from tests.sketches import SOURCE, TOLERANCE, path

BEAM = Segment(SOURCE, 0j, 100 + 0j)


def near(*primitives: Segment | Arc | Path, tolerance: Tolerance = TOLERANCE) -> Touches:
    return find_touches(make_linework(primitives, ()), tolerance, tolerance.close)


def post(foot: complex) -> Segment:
    return Segment(SOURCE, foot, foot + 40j)


@pytest.mark.parametrize(
    ("gap", "touches", "meets"),
    [
        pytest.param(0.0, True, True, id="on it"),
        pytest.param(0.0009, True, True, id="within t"),
        pytest.param(0.0011, True, False, id="beyond t"),
        pytest.param(0.099, True, False, id="within the shape tolerance"),
        pytest.param(0.101, False, False, id="beyond the shape tolerance"),
    ],
)
def test_an_end_near_the_inside_of_a_line(gap: float, touches: bool, meets: bool) -> None:  # noqa: FBT001 - a table
    found = near(BEAM, post(50 + gap * 1j))
    assert bool(found.count(1, 0)) is touches
    assert bool(found.met(1, 0)) is meets
    assert found.free(1, 0) is not touches
    if touches:
        (touch,) = found.at(1, 0)
        assert touch.strand == 0
        assert touch.gap == pytest.approx(gap, abs=1e-12)
        assert touch.meets is meets


def test_a_line_merely_crossed_is_not_touched() -> None:
    found = near(BEAM, post(50 - 20j))
    assert all(found.free(strand, end) for strand in (0, 1) for end in (0, 1))


def test_a_strand_does_not_touch_itself() -> None:
    bent = path(0j, 10 + 0j, 10 + 10j, 0j).make(SOURCE)
    assert isinstance(bent, Path)
    assert near(bent).free(0, 0)


def test_meeting_ends_touch_one_another() -> None:
    found = near(BEAM, post(100 + 0j))
    assert found.met(0, 1)
    assert found.met(1, 0)
    assert found.free(0, 0)


def test_a_polyline_near_an_end_with_several_pieces_counts_once_by_the_nearest() -> None:
    corner = path(0j, 50 + 0.02j, 100 + 0j).make(SOURCE)
    assert isinstance(corner, Path)
    found = near(corner, post(50 + 0.03j))
    (touch,) = found.at(1, 0)
    assert touch.gap == pytest.approx(0.01, rel=1e-3)


@pytest.mark.parametrize(
    ("off", "meets"),
    [pytest.param(0.19, True, id="within 2 % of the radius"), pytest.param(0.21, False, id="further off")],
)
def test_an_end_meets_an_arc_within_two_per_cent_of_its_radius(off: float, meets: bool) -> None:  # noqa: FBT001
    bow = Arc(SOURCE, 0j, 10.0, 0.0, math.pi)
    found = near(bow, Segment(SOURCE, (10 + off) * 1j, 60j))
    assert bool(found.met(1, 0)) is meets


def test_an_end_past_the_end_of_an_arc_does_not_meet_it() -> None:
    bow = Arc(SOURCE, 0j, 10.0, 0.0, math.pi)
    assert near(bow, Segment(SOURCE, -10 - 5j, -60j)).free(1, 0)


def test_closed_outlines_have_no_ends_but_can_be_met() -> None:
    plate = path(0j, 50 + 0j, 50 + 30j, closed=True).make(SOURCE)
    assert isinstance(plate, Path)
    found = near(plate, post(25 + 0j))
    assert found.count(0, 0) == 0
    assert found.met(1, 0)


def test_pairs_list_every_touch() -> None:
    ends, targets, gaps, meets = near(BEAM, post(100 + 0j)).as_pairs()
    assert list(zip(ends.tolist(), targets.tolist(), strict=True)) == [(1, 1), (2, 0)]
    assert gaps.tolist() == [0.0, 0.0]
    assert meets.all()


def test_only_the_strands_asked_for_are_looked_at() -> None:
    linework = make_linework([BEAM, post(100 + 0j)], ())
    found = find_touches(linework, TOLERANCE, TOLERANCE.close, [1])
    assert found.free(0, 1)
    assert found.met(1, 0)
