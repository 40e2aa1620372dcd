from __future__ import annotations

import pytest

from dxfcheck.reading.lines.tolerance import Tolerance, tolerance_for
from dxfcheck.settings import Settings

SHEET = Tolerance(t=0.003, shape=0.5, gap=1.0)


def test_the_coincidence_tolerance_is_three_millionths_of_the_diagonal() -> None:
    assert tolerance_for(1000.0, Settings())[:3] == pytest.approx((0.003, 0.5, 1.0))


def test_a_stated_tolerance_replaces_t_alone() -> None:
    assert tolerance_for(1000.0, Settings(tolerance=0.1))[:3] == pytest.approx((0.1, 0.5, 1.0))


def test_a_stated_tolerance_wider_than_shapes_widens_them_too() -> None:
    assert tolerance_for(1000.0, Settings(tolerance=2.0))[:3] == pytest.approx((2.0, 2.0, 2.0))


def test_a_sheet_of_no_size_has_no_tolerance() -> None:
    assert tolerance_for(0.0, Settings())[:3] == (0.0, 0.0, 0.0)


@pytest.mark.parametrize(
    ("radius", "within"),
    [pytest.param(10.0, 0.2, id="2 % of the radius"), pytest.param(0.1, 0.003, id="t where that is more")],
)
def test_how_near_a_rim_an_end_must_be(radius: float, within: float) -> None:
    assert SHEET.rim(radius) == pytest.approx(within)


@pytest.mark.parametrize(
    ("size", "within"),
    [
        pytest.param(10.0, 0.3, id="3 % of a small shape"),
        pytest.param(1000.0, 0.5, id="the sheet's share for a large one"),
        pytest.param(0.01, 0.003, id="never below t"),
    ],
)
def test_how_near_the_parts_of_a_shape_must_be(size: float, within: float) -> None:
    assert SHEET.close(size) == pytest.approx(within)


@pytest.mark.parametrize(
    ("length", "within"),
    [
        pytest.param(5.0, 0.5, id="a tenth of a short line"),
        pytest.param(100.0, 1.0, id="a thousandth of the diagonal for a long one"),
        pytest.param(0.01, 0.003, id="never below t"),
    ],
)
def test_how_far_short_an_end_may_stop_and_be_told_of(length: float, within: float) -> None:
    assert SHEET.missing(length) == pytest.approx(within)


@pytest.mark.parametrize(
    ("radius", "within"),
    [
        pytest.param(50.0, 1.0, id="2 % of the radius"),
        pytest.param(1000.0, 2.0, id="four shape tolerances on a great arc"),
    ],
)
def test_how_near_an_arc_an_end_must_be_to_meet_it(radius: float, within: float) -> None:
    assert SHEET.arc(radius, 1000.0) == pytest.approx(within)


def test_a_short_stroke_meets_an_arc_only_within_a_small_part_of_itself() -> None:
    assert SHEET.arc(50.0, 10.0) == pytest.approx(0.3)
