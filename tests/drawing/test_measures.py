from __future__ import annotations

import math

import pytest

from dxfcheck.drawing.measures import measure, measuring_direction

POINTS = {"defpoint2": 1 + 1j, "defpoint3": 4 + 5j}


def test_an_aligned_one_measures_from_foot_to_foot_and_a_linear_one_along_its_direction() -> None:
    assert measure("aligned", POINTS, measuring_direction("aligned", POINTS, 0.0, of_x=False)) == pytest.approx(5)
    upright = measuring_direction("linear", POINTS, math.pi / 2, of_x=False)
    assert measure("linear", POINTS, upright) == pytest.approx(4)


def test_an_ordinate_measures_from_its_origin_along_x_or_y() -> None:
    points = {"defpoint": 1 + 0j, "defpoint2": 4 - 5j}
    for of_x, figure in ((True, 3.0), (False, 5.0)):
        assert measure("ordinate", points, measuring_direction("ordinate", points, 0.0, of_x=of_x)) == figure


@pytest.mark.parametrize(("arc", "degrees"), [(2 + 0.5j, 30.0), (-1 + 2j, 150.0), (-2 - 0.5j, 30.0), (1 - 2j, 150.0)])
def test_of_the_four_angles_of_two_lines_the_one_with_the_arc_is_measured(arc: complex, degrees: float) -> None:
    leg = complex(math.cos(math.pi / 6), math.sin(math.pi / 6))
    points = {"defpoint2": 1 + 0j, "defpoint3": 3 + 0j, "defpoint4": leg, "defpoint": 2 * leg, "defpoint5": arc}
    assert measure("angular", points, None) == pytest.approx(degrees)


def test_parallel_lines_make_no_angle() -> None:
    points = {"defpoint2": 0j, "defpoint3": 1 + 0j, "defpoint4": 1j, "defpoint": 1 + 1j, "defpoint5": 2 + 0.5j}
    assert measure("angular", points, None) is None


@pytest.mark.parametrize(("through", "degrees"), [(1 + 1j, 90.0), (-1 - 1j, 270.0)])
def test_at_a_vertex_the_side_of_the_arc_is_measured(through: complex, degrees: float) -> None:
    points = {"defpoint4": 0j, "defpoint2": 3 + 0j, "defpoint3": 2j, "defpoint": through}
    assert measure("angular", points, None) == pytest.approx(degrees)


@pytest.mark.parametrize(("through", "quarters"), [(3 + 3j, 1), (-3 - 3j, 3)])
def test_an_arc_is_measured_on_the_side_of_its_dimension_line(through: complex, quarters: int) -> None:
    points = {"defpoint4": 0j, "defpoint2": 2 + 0j, "defpoint3": 2j, "defpoint": through}
    assert measure("arc", points, None) == pytest.approx(quarters * math.pi)


@pytest.mark.parametrize("kind", ["linear", "aligned", "diameter", "radius", "ordinate", "arc", "angular"])
def test_what_is_not_told_is_not_measured(kind: str) -> None:
    assert measure(kind, {}, None) is None
