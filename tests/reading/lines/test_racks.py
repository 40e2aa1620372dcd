from __future__ import annotations

import numpy as np
import pytest

from dxfcheck.drawing.primitives import Ring, Segment
from dxfcheck.reading.lines.racks import find_tangents, pitch_lines
from tests.sketches import SOURCE

WHEEL = Ring(SOURCE, 0j, 20.0)


def racks(*lines: tuple[complex, complex], rings: tuple[Ring, ...] = (WHEEL,)) -> set[int]:
    return pitch_lines(rings, [Segment(SOURCE, *ends) for ends in lines])


@pytest.mark.parametrize(
    ("ends", "is_rack"),
    [
        pytest.param((-50 + 20j, 50 + 20j), True, id="above"),
        pytest.param((20 + 50j, 20 - 50j), True, id="upright"),
        pytest.param((-50 - 20.39j, 50 - 20.39j), True, id="within 2 % of the radius"),
        pytest.param((-50 - 20.41j, 50 - 20.41j), False, id="further off"),
        pytest.param((-50 + 19.5j, 50 + 19.5j), False, id="across"),
        pytest.param((20j, 50 + 20j), True, id="from the foot on"),
        pytest.param((1 + 20j, 50 + 20j), False, id="past the foot"),
        pytest.param((-50 + 0j, 50 + 0j), False, id="through the centre"),
        pytest.param((20j, 20j), False, id="of no length"),
    ],
)
def test_a_pitch_line_is_tangent_to_its_wheel(ends: tuple[complex, complex], is_rack: bool) -> None:  # noqa: FBT001
    assert racks(ends) == ({0} if is_rack else set())


def test_the_common_tangent_at_a_pitch_point_is_no_rack() -> None:
    rings = (WHEEL, Ring(SOURCE, 50 + 0j, 30.0))
    assert racks((20 - 40j, 20 + 40j), rings=rings) == set()


def test_an_axis_through_another_wheel_is_no_rack() -> None:
    rings = (Ring(SOURCE, 0j, 40.0), Ring(SOURCE, 20 + 0j, 20.0))
    assert racks((-50j, 50j), (40 - 50j, 40 + 50j), rings=rings[1:]) == {0, 1}
    assert racks((-50j, 50j), rings=rings) == set()


def test_the_run_of_a_belt_is_no_rack_but_a_rack_may_have_two_pinions() -> None:
    rings = (WHEEL, Ring(SOURCE, 100 + 0j, 20.0))
    assert racks((20j, 100 + 20j), (-30 + 20j, 130 + 20j), rings=rings) == {1}


def test_nothing_to_look_at() -> None:
    assert racks() == set()
    assert racks((0j, 1j), rings=()) == set()


def test_a_tangent_says_where_and_how_far_off() -> None:
    starts, ends = np.array([-50 + 20.2j]), np.array([70 + 20.2j])
    (tangent,) = find_tangents([0j], [20.0], starts, ends)
    assert (tangent.circle, tangent.piece) == (0, 0)
    assert (tangent.foot, tangent.length, tangent.miss) == pytest.approx((50.0, 120.0, 0.2))
