from __future__ import annotations

import cmath
import math

import pytest

from dxfcheck.reading.shapes.contact import directed


@pytest.mark.parametrize(
    ("vector", "expected"),
    [
        (3 + 0j, 1 + 0j),
        (-3 + 0j, 1 + 0j),
        (0.2j, 1j),
        (-7j, 1j),
        (3 + 4j, 0.6 + 0.8j),
        (-3 - 4j, 0.6 + 0.8j),
        (3 - 4j, 0.6 - 0.8j),
        (-3 + 4j, 0.6 - 0.8j),
        pytest.param(-1e-15 - 5j, 1j, id="upright but for rounding"),
        pytest.param(1e-15 - 5j, 1j, id="upright but for rounding, the other way"),
        pytest.param(-5 + 1e-15j, 1 + 0j, id="level but for rounding"),
    ],
)
def test_a_direction_points_to_plus_x_or_straight_up(vector: complex, expected: complex) -> None:
    assert directed(vector) == pytest.approx(expected, abs=1e-15)


@pytest.mark.parametrize("degrees", range(0, 360, 15))
def test_it_lies_along_its_line_and_is_the_same_both_ways(degrees: int) -> None:
    vector = cmath.rect(250, math.radians(degrees))
    found = directed(vector)
    assert abs(found) == pytest.approx(1)
    assert (found * vector.conjugate()).imag == pytest.approx(0, abs=1e-9)
    assert directed(-vector) == pytest.approx(found)


def test_what_is_nearly_upright_is_not_turned_round_by_more_than_rounding() -> None:
    assert directed(1e-6 - 1j).imag < 0
    assert directed(-1e-6 - 1j).imag > 0


def test_rounding_is_taken_off() -> None:
    assert directed(-5 + 1e-15j) == 1
    assert directed(1e-15 - 5j) == 1j
