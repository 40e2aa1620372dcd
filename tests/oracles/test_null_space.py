"""The speeds against a matrix of our own over the pins' velocities, not the links', and scipy's null space of it."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.linalg import null_space

from dxfcheck.linkage import Linkage
from tests.examples import (
    FOUR_BAR,
    FOUR_BAR_POINTS,
    STEPHENSON,
    STEPHENSON_POINTS,
    STRAIGHT_LINE,
    STRAIGHT_LINE_POINTS,
    WATT,
    WATT_POINTS,
)
from tests.model import Solved, linkage

AGREE = 1e-9


def pin_velocities(model: Linkage) -> np.ndarray:
    """Null space over the velocities of all pins as complex numbers, one motion a column.

    A link keeps the distance of its first two pins, and every further pin its place against these two; fixed pins rest.
    """
    rows = []
    count = len(model.pins)

    def row(**_: object) -> np.ndarray:
        return np.zeros(2 * count)

    for number, pin in enumerate(model.pins):
        if pin.fixed:
            for part in (0, 1):
                rows.append(row())
                rows[-1][2 * number + part] = 1.0
    for link in model.links[1:]:
        first, second, *more = link.pins
        way = model.pins[second].at - model.pins[first].at
        rows.append(row())
        rows[-1][[2 * first, 2 * first + 1, 2 * second, 2 * second + 1]] = [-way.real, -way.imag, way.real, way.imag]
        rows[-1] /= abs(way)
        for third in more:
            ratio = (model.pins[third].at - model.pins[first].at) / way
            for across, up in ((0, (ratio.real, -ratio.imag)), (1, (ratio.imag, ratio.real))):
                rows.append(row())
                rows[-1][2 * third + across] = -1.0
                rows[-1][2 * first + across] = 1.0
                for part in (0, 1):
                    rows[-1][2 * second + part] += up[part]
                    rows[-1][2 * first + part] -= up[part]
    free = null_space(np.array(rows), rcond=1e-9)
    return free[0::2] + 1j * free[1::2]


def check(model: Linkage, driven: str) -> None:
    solved = Solved(model)
    free = pin_velocities(model)
    assert free.shape[1] == solved.analysis.mobility.at_pose == 1
    crank = next(link for link in model.links if link.name == driven)
    first, second = crank.pins[:2]
    way = model.pins[second].at - model.pins[first].at
    rate = ((free[second, 0] - free[first, 0]) / (1j * way)).real
    expected = free[:, 0] * (model.drives[0].rate / rate)
    greatest = max(abs(expected))
    for pin, velocity in zip(model.pins, expected, strict=True):
        assert abs(solved.velocity(pin.name) - velocity) < AGREE * greatest
    assert solved.analysis.disagreement is not None
    assert solved.analysis.disagreement < AGREE


@pytest.mark.parametrize(
    ("points", "pins", "driven"),
    [
        (FOUR_BAR_POINTS, FOUR_BAR, "crank"),
        (WATT_POINTS, WATT, "l2"),
        (WATT_POINTS, WATT, "l6"),
        (STEPHENSON_POINTS, STEPHENSON, "crank"),
        (STEPHENSON_POINTS, STEPHENSON, "lever"),
    ],
)
def test_every_pin_moves_as_the_null_space_says(points: dict[str, complex], pins: dict[str, str], driven: str) -> None:
    check(linkage(points, pins, turn={driven: 3.0}), driven)


@given(st.lists(st.complex_numbers(max_magnitude=8.0, allow_nan=False), min_size=7, max_size=7))
def test_six_bars_at_many_poses(shifts: list[complex]) -> None:
    points = {name: at + shift for (name, at), shift in zip(STEPHENSON_POINTS.items(), shifts, strict=True)}
    check(linkage(points, STEPHENSON, turn={"lever": 2.0}), "lever")


def test_pins_of_three_links() -> None:
    """Driven at its crank, the far corner runs on a straight line square to the frame line."""
    model = linkage(STRAIGHT_LINE_POINTS, STRAIGHT_LINE, turn={"crank": 1.0})
    check(model, "crank")
    velocity = Solved(model).velocity("R")
    assert abs(velocity.real) < 1e-4 * abs(velocity.imag)  # the points are given to six figures
