from __future__ import annotations

import cmath
import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from dxfcheck.reading.shapes.forks import find_forks
from dxfcheck.reading.shapes.slots import Slot
from tests.sketches import Drawn, arc, laid_out, line, path, ring

FAR = line(-100 + 50j, 100 + 50j)
RAILS = [(-20 - 4j, 20 - 4j), (-20 + 4j, 20 + 4j)]
PIN = ring(0j, 4.0)


def forks(*things: Drawn, taken: frozenset[int] = frozenset(), apart: frozenset[int] = frozenset()) -> list[Slot]:
    sheet, _ = laid_out(*things, FAR)
    return find_forks(
        sheet.landings, sheet.pins, sheet.linework, sheet.touching, sheet.tolerance, apart=apart, taken=taken
    )


def lines(rails: list[tuple[complex, complex]], turn: complex = 1 + 0j) -> list[Drawn]:
    return [line(start * turn, end * turn) for start, end in rails]


@given(degrees=st.floats(0.0, 360.0), backwards=st.booleans(), swapped=st.booleans())
def test_two_lines_on_opposite_sides_of_a_ring_are_a_fork(degrees: float, backwards: bool, swapped: bool) -> None:  # noqa: FBT001
    turn = cmath.rect(1.0, math.radians(degrees))
    rails = [RAILS[0], RAILS[1][::-1] if backwards else RAILS[1]]
    (fork,) = forks(ring(0j, 4.0), *lines(rails[::-1] if swapped else rails, turn))
    assert fork.sites == (0,)
    assert sorted(fork.strands) == [0, 1]
    assert fork.shape.radius == pytest.approx(4.0)
    assert abs((fork.shape.tangent_at(0j) / turn).imag) < 1e-9
    assert fork.shape.reach(0j) == pytest.approx((20, 20))


@pytest.mark.parametrize(
    "rails",
    [
        pytest.param([(-20 - 4j, 2 - 4j), (-20 + 4j, 2 + 4j)], id="the pin near the mouth"),
        pytest.param([(-20 - 4j, 20 - 4j), (-18 + 4j, 20 + 4j)], id="about equally long"),
        pytest.param([(-20 - 4.05j, 20 - 4.05j), (-20 + 3.95j, 20 + 3.95j)], id="within 2 % of the radius"),
    ],
)
def test_what_is_a_fork_as_well(rails: list[tuple[complex, complex]]) -> None:
    assert len(forks(PIN, *lines(rails))) == 1


@pytest.mark.parametrize(
    "rails",
    [
        pytest.param(RAILS[:1], id="one line"),
        pytest.param([(-20 - 4j, 20 - 4j), (-20 - 4j, 25 - 4j)], id="both on one side"),
        pytest.param([(-20 - 4j, 20 - 4j), (-20 + 4.2j, 20 + 4.2j)], id="clear of the ring"),
        pytest.param([(-20 - 4j, 20 - 4j), (-20 + 3.4j, 20 + 4.6j)], id="not parallel"),
        pytest.param([(-10 - 4j, 10 - 4j), (-10 + 4j, 10 + 4j)], id="too short"),
        pytest.param([(-20 - 4j, 20 - 4j), (-20 + 4j, 80 + 4j)], id="one much longer"),
        pytest.param([(0 - 4j, 60 - 4j), (0 + 4j, 60 + 4j)], id="a belt"),
    ],
)
def test_what_is_no_fork(rails: list[tuple[complex, complex]]) -> None:
    assert forks(PIN, *lines(rails)) == []


def test_a_joint_at_one_end_makes_up_for_unequal_lines_and_is_the_end_of_the_slot() -> None:
    unequal = [(-20 - 4j, 20 - 4j), (-20 + 4j, 40 + 4j)]
    (square,) = forks(PIN, *lines(unequal), line(-20 - 4j, -20 + 4j))
    (round_end,) = forks(PIN, *lines(unequal), arc(-20 + 0j, 4.0, 90, 180))
    assert sorted(square.shape.reach(0j)) == pytest.approx([16, 20])
    assert sorted(round_end.shape.reach(0j)) == pytest.approx([20, 20])


@pytest.mark.parametrize("turn", [1 + 0j, 1j, -1 + 0j])
def test_a_fork_of_one_polyline(turn: complex) -> None:
    corners = [20 - 4j, -20 - 4j, -20 + 4j, 40 + 4j]
    (fork,) = forks(PIN, path(*(corner * turn for corner in corners)))
    assert fork.strands == (0,)
    first, second = fork.shape.room(0j, turn)
    assert (first, second) == pytest.approx((16, 20))


def test_used_up_strands_taken_pins_and_closed_outlines_make_no_fork() -> None:
    assert forks(PIN, *lines(RAILS), taken=frozenset({0})) == []
    assert forks(PIN, *lines(RAILS), apart=frozenset({1})) == []
    assert forks(PIN, path(-20 - 4j, 20 - 4j, 20 + 4j, -20 + 4j, closed=True)) == []


def test_lines_joined_at_both_ends_are_a_box_and_no_fork() -> None:
    assert forks(PIN, *lines(RAILS), line(-20 - 4j, -20 + 4j), line(20 - 4j, 20 + 4j)) == []


def test_a_pin_that_fits_in_two_forks_is_in_none() -> None:
    upright = [(-4 - 20j, -4 + 20j), (4 - 20j, 4 + 20j)]
    assert forks(PIN, *lines(RAILS), *lines(upright)) == []


def test_a_ring_within_a_ring_touches_with_either() -> None:
    assert len(forks(PIN, ring(0j, 2.0), *lines(RAILS))) == 1


@pytest.mark.parametrize(
    ("above", "below", "joined", "found"),
    [(5.0, -5.0, True, 1), (5.0, -5.0, False, 0), (6.5, -6.5, True, 0), (5.0, -5.5, True, 0)],
    ids=["joined", "open at both ends", "too wide", "the pin off its middle"],
)
def test_a_fork_joined_at_one_end_may_leave_its_pin_some_room(
    above: float,
    below: float,
    joined: bool,  # noqa: FBT001 - a table
    found: int,
) -> None:
    rails = [line(-20 + above * 1j, 30 + above * 1j), line(-20 + below * 1j, 30 + below * 1j)]
    across = [line(-20 + above * 1j, -20 + below * 1j)] if joined else []
    made = forks(PIN, *rails, *across)
    assert len(made) == found
    assert all(fork.shape.radius == pytest.approx(above) for fork in made)
