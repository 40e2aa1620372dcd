from __future__ import annotations

import math
import random

import numpy as np
import pytest
from hypothesis import example, given
from hypothesis import strategies as st

from dxfcheck.geometry import distance_to_segment
from dxfcheck.reading.lines import nearness
from dxfcheck.reading.lines.nearness import near_pairs, pair_distances

Piece = tuple[complex, complex]
EDGE = 1e-9
"""Pairs whose distance is the reach but for this part may fall either way by rounding."""


def brute_force(points: list[complex], reaches: list[float], pieces: list[Piece]) -> set[tuple[int, int]]:
    return {
        (number, place)
        for number, point in enumerate(points)
        for place, piece in enumerate(pieces)
        if distance_to_segment(point, *piece) <= reaches[number]
    }


def found(points: list[complex], reaches: list[float], pieces: list[Piece]) -> list[tuple[int, int]]:
    which, place = near_pairs(
        np.array(points, dtype=np.complex128),
        np.array(reaches, dtype=np.float64),
        np.array([piece[0] for piece in pieces], dtype=np.complex128),
        np.array([piece[1] for piece in pieces], dtype=np.complex128),
    )
    return list(zip(which.tolist(), place.tolist(), strict=True))


def assert_agrees(points: list[complex], reaches: list[float], pieces: list[Piece]) -> None:
    pairs = found(points, reaches, pieces)
    assert pairs == sorted(set(pairs))
    for number, place in set(pairs) ^ brute_force(points, reaches, pieces):
        distance = distance_to_segment(points[number], *pieces[place])
        assert distance == pytest.approx(reaches[number], rel=EDGE, abs=EDGE), "no rounding: a pair is missing or wrong"


coordinates = st.one_of(st.integers(-8, 8).map(float), st.floats(-100, 100, width=32))
places = st.builds(complex, coordinates, coordinates)
reach = st.one_of(st.just(0.0), st.sampled_from([1e-6, 0.01, 0.5, 1.0, 3.0, 8.0, 64.0, 1e4]))


@pytest.fixture(params=[0, 40_000], ids=["by cells", "all pairs"])
def limit(request: pytest.FixtureRequest, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(nearness, "ALL_PAIRS_LIMIT", request.param)


@pytest.mark.usefixtures("limit")
def test_no_points_or_no_pieces_give_no_pairs() -> None:
    assert found([], [], [(0j, 1 + 0j)]) == []
    assert found([0j], [1.0], []) == []


@pytest.mark.usefixtures("limit")
def test_a_reach_counts_to_its_very_end_and_no_further() -> None:
    assert found([3j, 3j], [3.0, 2.999], [(-1 + 0j, 1 + 0j)]) == [(0, 0)]


@pytest.mark.usefixtures("limit")
def test_a_point_beyond_the_end_of_a_piece_is_measured_to_that_end() -> None:
    assert found([4 + 4j], [5.0], [(-9 + 0j, 1 + 0j)]) == [(0, 0)]
    assert found([4 + 4j], [4.9], [(-9 + 0j, 1 + 0j)]) == []


@pytest.mark.usefixtures("limit")
def test_a_piece_of_no_length_is_a_point() -> None:
    assert found([0j, 9 + 0j], [5.0, 5.0], [(3 + 4j, 3 + 4j)]) == [(0, 0)]


@pytest.mark.usefixtures("limit")
def test_pairs_come_by_point_then_piece() -> None:
    pieces = [(complex(0, row), complex(9, row)) for row in range(3)]
    assert found([5 + 1j, 5 + 0j], [1.0, 0.0], pieces) == [(0, 0), (0, 1), (0, 2), (1, 0)]


def run_by_cells(points: list[complex], reaches: list[float], pieces: list[Piece]) -> None:
    with pytest.MonkeyPatch.context() as patch:
        patch.setattr(nearness, "ALL_PAIRS_LIMIT", 0)
        patch.setattr(nearness, "POINTS_AT_ONCE", 3)
        assert_agrees(points, reaches, pieces)


@given(st.lists(st.tuples(places, reach), min_size=1, max_size=12), st.lists(st.tuples(places, places), min_size=1))
@example([(0j, 1.0)], [(1 + 0j, 1 + 0j)])
@example([(0j, 0.0), (0j, 1e4)], [(-100 + 0j, 100 + 0j), (0j, 0j)])
def test_cells_find_what_measuring_every_pair_finds(asked: list[tuple[complex, float]], pieces: list[Piece]) -> None:
    run_by_cells([point for point, _ in asked], [each for _, each in asked], pieces)


@pytest.mark.parametrize("seed", range(6))
def test_a_busy_sheet_with_reaches_of_every_size(seed: int) -> None:
    """300 points and 400 pieces: past the limit up to which all pairs are measured."""
    chance = random.Random(seed)  # noqa: S311 - a repeatable sheet, nothing to guard
    spread = chance.choice([1.0, 1000.0, 1e-3])
    shift = chance.choice([0j, 1e5 * spread * (1 - 1j)])

    def anywhere() -> complex:
        return shift + spread * complex(chance.random(), chance.random())

    starts = [anywhere() for _ in range(400)]
    pieces = [(start, start + spread * 10 ** chance.uniform(-4, 0) * complex(1, chance.random())) for start in starts]
    reaches = [spread * 10 ** chance.uniform(-5, 0.2) for _ in range(300)]
    assert nearness.ALL_PAIRS_LIMIT < 300 * 400
    assert_agrees([anywhere() for _ in range(300)], reaches, pieces)


def test_one_long_piece_across_many_short_ones_is_found_from_all_along_it() -> None:
    points = [complex(column, 0.5) for column in range(1000)]
    pieces = [(0j, 1000 + 0j), *((complex(column, 900), complex(column, 901)) for column in range(60))]
    assert found(points, [0.6] * 1000, pieces) == [(number, 0) for number in range(1000)]


def test_distances_are_those_of_a_bounded_piece() -> None:
    starts = np.array([0j, 0j, 2 + 2j])
    ends = np.array([4 + 0j, 4 + 0j, 2 + 2j])
    distances = pair_distances(np.array([1 + 3j, 7 + 4j, 5 + 6j]), starts, ends)
    assert distances.tolist() == pytest.approx([3.0, 5.0, 5.0])
    assert math.isfinite(float(distances.max()))
