"""The null space found a few links at a time against that of one matrix for all."""

from __future__ import annotations

from functools import partial

import numpy as np
import pytest

from dxfcheck.analysis.freedom.constraints import (
    Freedom,
    bodies_of,
    constraint_matrix,
    freedom_of,
    rank_tolerance,
)
from dxfcheck.analysis.freedom.elimination import freedom_by_fronts, split_rows, split_with_care
from dxfcheck.analysis.topology import topology_of
from dxfcheck.linkage import Linkage
from dxfcheck.tolerances.analysis import RANK_DOUBTFUL
from tests.analysis.lattices import four_bar_chain, large_linkage, scissor_lattice
from tests.analysis.random_models import random_model, stacked_floors


def by_fronts(model: Linkage) -> Freedom:
    return freedom_by_fronts(model, topology_of(model), bodies_of(model))


def by_one_matrix(model: Linkage) -> Freedom:
    matrix = constraint_matrix(model, topology_of(model), bodies_of(model))
    return freedom_of(matrix, partial(rank_tolerance, model))


def check_same(model: Linkage) -> None:
    """The same number of motions, and each of the one is a sum of the other's."""
    fronts, whole = by_fronts(model), by_one_matrix(model)
    assert len(fronts.motions) == len(whole.motions)
    assert fronts.motions @ fronts.motions.T == pytest.approx(np.eye(len(fronts.motions)), abs=1e-10)
    inside = (fronts.motions @ whole.motions.T) @ whole.motions
    assert fronts.motions == pytest.approx(inside, abs=1e-9)


@pytest.mark.parametrize("coarse", [False, True])
@pytest.mark.parametrize("seed", range(60))
def test_random_linkages_have_the_same_motions(seed: int, *, coarse: bool) -> None:
    check_same(random_model(seed, coarse=coarse))


@pytest.mark.parametrize("unpinned", [(), (3,), (5, 6, 19)])
def test_lattices_have_the_same_motions(unpinned: tuple[int, ...]) -> None:
    check_same(scissor_lattice(60, unpinned=unpinned))


@pytest.mark.parametrize("decimals", [None, 2])
@pytest.mark.parametrize("floors", [1, 3, 10, 40])
def test_redundant_cranks_are_seen_one_by_one_even_typed_to_two_decimals(floors: int, decimals: int | None) -> None:
    """One matrix for all of it takes 31 of 40 for needed where the places were typed: each floor adds to its noise."""
    freedom = by_fronts(stacked_floors(floors, decimals))
    assert len(freedom.motions) == floors
    assert freedom.gap is not None
    assert freedom.gap[0] > RANK_DOUBTFUL
    assert freedom.gap[1] < 1e-4


def test_gap_of_a_long_lattice_does_not_fade() -> None:
    """In one matrix the smallest value that counts falls with the square of the length."""
    short, long = by_fronts(scissor_lattice(100)), by_fronts(scissor_lattice(3000))
    assert short.gap is not None
    assert long.gap is not None
    assert long.gap[0] == pytest.approx(short.gap[0], rel=0.05)
    assert long.gap[0] > 10 * RANK_DOUBTFUL


def test_motions_of_a_chain_that_multiplies_speeds_beyond_all_numbers_stay_finite() -> None:
    """Two thousand lever stages of 3 to 1 would reach 1e900."""
    freedom = by_fronts(four_bar_chain(2000, crank=12.0))
    assert len(freedom.motions) == 1
    assert np.isfinite(freedom.motions).all()
    assert np.linalg.norm(freedom.motions) == pytest.approx(1.0)


@pytest.mark.parametrize("small", [1e-2, 1e-1, 1.0, 1e3])
def test_a_link_ten_million_times_smaller_than_the_next_counts(small: float) -> None:
    """A four-bar with a crank of 0.01 beside rods of 100,000."""
    model = large_linkage(
        [
            (0j, (0, 1)),
            (small * (0.6 + 0.8j), (1, 2)),
            (8e4 + 6e4j, (2, 3)),
            (1e5 + 0j, (0, 3)),
        ],
        4,
    )
    for freedom in (by_fronts(model), by_one_matrix(model)):
        assert len(freedom.motions) == 1


def test_constraints_in_conflict_leave_nothing() -> None:
    model = large_linkage([(0j, (0, 1)), (50 + 80j, (1, 2)), (100 + 0j, (0, 2)), (20 + 40j, (0, 1))], 3)
    assert by_fronts(model).motions.shape == (0, 6)


def test_without_joints_all_is_free_and_nothing_is_in_doubt() -> None:
    freedom = by_fronts(large_linkage([(0j, (1,)), (5j, (2,))], 3))
    assert freedom.motions == pytest.approx(np.eye(6))
    assert freedom.gap is None


def test_both_ways_to_split_rows_say_the_same() -> None:
    """What is left over spans the same, and so do the links' motions on top of it."""
    rows = np.random.default_rng(3).normal(size=(8, 15))
    quick, slow = (split(rows, 6, lambda: 1e-6, may_put_off=True) for split in (split_rows, split_with_care))
    assert quick.left @ slow.left.T @ slow.left == pytest.approx(quick.left)
    border = np.linalg.svd(quick.left)[2][len(quick.left) :].T
    assert quick.carry is not None
    assert slow.carry is not None
    assert quick.carry @ border == pytest.approx(slow.carry @ border)
    assert slow.left_by @ rows == pytest.approx(np.hstack([np.zeros((2, 6)), slow.left]), abs=1e-12)


def test_links_that_hardly_follow_their_border_are_put_off() -> None:
    rows = np.array([[1e-5, 1.0, 0.0], [0.0, 0.0, 1.0]])
    assert split_rows(rows, 1, lambda: 1e-6, may_put_off=True).carry is None
    assert split_rows(rows, 1, lambda: 1e-6, may_put_off=False).carry == pytest.approx(np.array([[-1e5, 0.0]]))
    rounding = split_rows(np.array([[1e-13, 1.0]]), 1, lambda: 1e-6, may_put_off=True)
    assert rounding.carry == pytest.approx(np.zeros((1, 1)))
    assert rounding.free.shape == (1, 1)


def test_rows_that_repeat_one_another_are_named() -> None:
    rows = np.array([[1.0, 0.0, 2.0], [2.0, 0.0, 4.0], [0.0, 1.0, 0.0]])
    split = split_with_care(rows, 1, lambda: 1e-6, may_put_off=True)
    assert split.dependent @ rows == pytest.approx(np.zeros((1, 3)), abs=1e-12)
    assert abs(split.dependent[0, 0] / split.dependent[0, 1]) == pytest.approx(2.0)
