"""The speeds against poses solved again a little later and a little earlier: central differences of the pins' places.

The pose is found by scipy from lengths alone. With a step of 2e-5 rad the central difference is off by the order of the
step squared times the third derivative, 1e-7 here, and by the residual of the solver over the step, 1e-7: hence 1e-6.
"""

from __future__ import annotations

import cmath
from itertools import combinations

import numpy as np
import pytest
from scipy.optimize import root

from dxfcheck.linkage import Linkage
from tests.examples import FOUR_BAR, FOUR_BAR_POINTS, STEPHENSON, STEPHENSON_POINTS, WATT, WATT_POINTS
from tests.model import Solved, linkage

STEP = 2e-5
AGREE = 1e-6


def places_after(model: Linkage, driven: int, angle: float) -> dict[str, complex]:
    """Places of all pins once the driven link, which has a fixed pin, has turned by an angle."""
    known = {number: pin.at for number, pin in enumerate(model.pins) if pin.fixed}
    pivot = next(number for number in model.links[driven].pins if model.pins[number].fixed)
    for number in model.links[driven].pins:
        known[number] = model.pins[pivot].at + (model.pins[number].at - model.pins[pivot].at) * cmath.exp(1j * angle)
    unknown = [number for number in range(len(model.pins)) if number not in known]
    rods = [pair for link in model.links[1:] for pair in combinations(link.pins, 2) if set(pair) & set(unknown)]
    lengths = [abs(model.pins[one].at - model.pins[other].at) for one, other in rods]

    def at(values: np.ndarray) -> dict[int, complex]:
        return known | dict(zip(unknown, (values[0::2] + 1j * values[1::2]).tolist(), strict=True))

    def misfit(values: np.ndarray) -> list[float]:
        now = at(values)
        return [abs(now[one] - now[other]) - length for (one, other), length in zip(rods, lengths, strict=True)]

    start = np.array([part for number in unknown for part in (model.pins[number].at.real, model.pins[number].at.imag)])
    solution = root(misfit, start, tol=1e-13)
    assert max(abs(value) for value in misfit(solution.x)) < 1e-9
    return {model.pins[number].name: place for number, place in at(solution.x).items()}


@pytest.mark.parametrize(
    ("points", "pins", "driven"),
    [
        (FOUR_BAR_POINTS, FOUR_BAR, "crank"),
        (FOUR_BAR_POINTS, FOUR_BAR, "rocker"),
        (WATT_POINTS, WATT, "l2"),
        (STEPHENSON_POINTS, STEPHENSON, "lever"),
    ],
)
def test_speeds_are_the_change_of_place(points: dict[str, complex], pins: dict[str, str], driven: str) -> None:
    model = linkage(points, pins, turn={driven: 1.0})
    number = next(index for index, link in enumerate(model.links) if link.name == driven)
    later, earlier = places_after(model, number, STEP), places_after(model, number, -STEP)
    solved = Solved(model)
    greatest = max(abs(solved.velocity(name)) for name in points)
    for name in points:
        assert abs(solved.velocity(name) - (later[name] - earlier[name]) / (2.0 * STEP)) < AGREE * greatest
