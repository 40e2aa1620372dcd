"""Which singular values count, and how the rows of each kind of joint act."""

from __future__ import annotations

import cmath
from dataclasses import replace
from functools import partial

import numpy as np
import pytest

from dxfcheck.analysis.freedom.constraints import bodies_of, constraint_matrix, freedom_of, rank_tolerance
from dxfcheck.analysis.topology import topology_of
from dxfcheck.linkage import Joint
from tests.examples import FOUR_BAR, FOUR_BAR_POINTS
from tests.model import linkage


def freedom(*singular: float) -> int:
    return len(freedom_of(np.diag(singular), lambda: 1e-4).motions)


def test_noise_of_typed_coordinates_counts_as_zero() -> None:
    assert freedom(1.0, 0.1, 2e-5) == 1
    assert freedom(1.0, 0.1, 2e-4) == 0


def test_small_values_that_follow_one_another_count() -> None:
    """The lowest true values of a long strip of bars fall below what noise may reach, but without a jump."""
    assert freedom(1.0, 1e-2, 2e-3, 4e-4, 8e-5, 2e-5, 5e-6) == 0
    assert freedom(1.0, 1e-2, 2e-3, 4e-4, 8e-5, 2e-5, 1e-7) == 1


@pytest.mark.parametrize(
    ("corner", "tolerance"),
    [
        pytest.param(300 + 400j, 1e-6, id="whole numbers are exact"),
        pytest.param(300.25 + 400j, 3.0e-5, id="two decimals"),
        pytest.param(300.123456789 + 400j, 1e-6, id="full precision"),
        pytest.param(30.5 + 40j, 3e-4, id="no more than the cap"),
    ],
)
def test_tolerance_follows_the_decimals_of_the_coordinates(corner: complex, tolerance: float) -> None:
    model = linkage({"A": 0j, "B": corner}, {"A": "ground a"}, tracing={"B": "a"})
    assert rank_tolerance(model) == pytest.approx(tolerance, rel=1e-3)


def shelf(shift: float, decimals: int | None) -> int:
    """Freedom of a parallelogram of cranks of 60 on a bench of 200, the foot of its third crank moved by ``shift``."""
    crank = cmath.rect(60.0, 1.1)
    points = {"A": 0j, "B": crank, "C": 200 + crank, "D": 200 + 0j, "E": 100 + crank, "F": 100 + shift + 0j}
    if decimals is not None:
        points = {name: complex(round(at.real, decimals), round(at.imag, decimals)) for name, at in points.items()}
    joints = {"A": "ground a", "B": "a b", "C": "b c", "D": "c ground", "E": "b d", "F": "d ground"}
    model = linkage(points, joints)
    return len(
        freedom_of(
            constraint_matrix(model, topology_of(model), bodies_of(model)), partial(rank_tolerance, model)
        ).motions
    )


def test_a_redundant_crank_moves_when_exact_or_typed_to_two_decimals() -> None:
    assert shelf(0.0, None) == 1
    assert shelf(0.0, 2) == 1


def test_a_third_crank_a_thousandth_too_short_locks() -> None:
    assert shelf(0.13, None) == 0
    assert shelf(0.13, 4) == 0


def test_rounding_error_never_counts() -> None:
    assert freedom(1.0, 1e-17, 1e-17) == 2


def test_gap_tells_what_was_near() -> None:
    assert freedom_of(np.diag([2.0, 0.2, 2e-5]), lambda: 1e-4).gap == pytest.approx((0.1, 1e-5))
    assert freedom_of(np.diag([2.0, 0.2]), lambda: 1e-4).gap == pytest.approx((0.1, 0.0))


def test_motions_are_orthonormal_and_obey_the_constraints() -> None:
    model = linkage(FOUR_BAR_POINTS, FOUR_BAR)
    matrix = constraint_matrix(model, topology_of(model), bodies_of(model))
    motions = freedom_of(matrix, lambda: 1e-6).motions
    assert matrix.shape == (8, 9)
    assert motions @ motions.T == pytest.approx(np.eye(1))
    assert np.abs(matrix @ motions.T).max() < 1e-14


def test_a_slide_without_a_direction_is_refused() -> None:
    plain = linkage({"A": 0j, "B": 10 + 0j}, {"A": "ground a"}, tracing={"B": "a"})
    model = replace(plain, joints=(Joint(kind="slide", first=0, second=1, at=5 + 0j),))
    with pytest.raises(ValueError, match="direction"):
        constraint_matrix(model, topology_of(model), bodies_of(model))
