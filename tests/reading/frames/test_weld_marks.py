from __future__ import annotations

import cmath
import math

import pytest

from dxfcheck.reading.frames.weld_marks import weld_marks
from tests.sketches import A, B, C, Drawn, arc, laid_out, line, observed, tipper

FAR = line(-100 + 90j, 100 + 90j)
STEM = line(0j, 40 + 0j)


def marks(*things: Drawn, apart: frozenset[int] = frozenset()) -> list[tuple[int, int, int]]:
    """Arc, line and end of each weld mark; strands are numbered as the things."""
    sheet, _ = laid_out(*things, FAR)
    return weld_marks(sheet.strands, apart)


@pytest.mark.parametrize(("end", "number"), [(0j, 0), (40 + 0j, 1)], ids=["at its beginning", "at its end"])
def test_an_arc_about_the_end_of_a_line_is_a_weld_mark(end: complex, number: int) -> None:
    assert marks(STEM, arc(end, 5, 0, 90)) == [(1, 0, number)]


@pytest.mark.parametrize(("sweep", "found"), [(29, 0), (31, 1), (90, 1), (199, 1), (201, 0), (300, 0)])
def test_its_sweep(sweep: float, found: int) -> None:
    assert len(marks(STEM, arc(0j, 5, 0, sweep))) == found


@pytest.mark.parametrize(("off", "found"), [(0.7, 1), (0.8, 0)])
def test_its_centre_is_the_lines_end(off: float, found: int) -> None:
    """Within 15 % of the arc's radius."""
    assert len(marks(STEM, arc(off * 1j, 5, 0, 90))) == found


@pytest.mark.parametrize(("radius", "found"), [(11.9, 1), (12.1, 0)])
def test_its_radius_is_small_beside_the_line(radius: float, found: int) -> None:
    """At most 0.3 of the line, else it is a link that bends."""
    assert len(marks(STEM, arc(0j, radius, 0, 90))) == found


def test_arcs_of_outlines_and_slots_are_none() -> None:
    assert marks(STEM, arc(0j, 5, 0, 90), apart=frozenset({1})) == []
    assert marks(STEM, line(0j, 5j)) == []
    assert marks(arc(0j, 5, 0, 90)) == []


def test_at_a_joint_of_several_lines_it_stands_at_each() -> None:
    assert marks(STEM, line(0j, 40j), arc(0j, 5, 0, 90)) == [(2, 0, 0), (2, 1, 0)]


ALONG = cmath.phase(C - B)
RIM = B + cmath.rect(4, ALONG)
"""Where the coupler ends on the ring of B."""


def test_a_weld_mark_at_the_rim_of_a_pin_is_told_and_changes_nothing() -> None:
    mark = arc(RIM, 3, math.degrees(ALONG), 60, handle="mark")
    (odd,) = observed("weld-on-ring", *tipper(), mark)
    assert odd.at == pytest.approx(RIM)
    assert (odd.subject, odd.handles, odd.mechanism) == ("B", ("coupler", "mark"), "M1")
    assert "the ring is part of that link; that is not read" in odd.detail


def test_a_weld_mark_elsewhere_on_a_link_is_not_told() -> None:
    middle = (A + B) / 2
    branch = line(middle, middle + 30 - 10j, handle="branch")
    drawn = (*tipper(), branch, arc(middle, 3, 0, 60, handle="mark"))
    assert observed("weld-on-ring", *drawn) == []
