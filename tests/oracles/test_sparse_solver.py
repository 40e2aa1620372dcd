"""Speeds of a large lattice against scipy's sparse direct solver, on a system of our own over the pins' velocities."""

from __future__ import annotations

import numpy as np
import pytest
from scipy.sparse import csr_matrix
from scipy.sparse.linalg import spsolve

from dxfcheck.analysis import analyse
from dxfcheck.linkage import Linkage
from tests.analysis.lattices import four_bar_chain, scissor_lattice

Cell = tuple[int, int, float]


def pin_velocities(model: Linkage) -> np.ndarray:
    """Velocity of every pin: links keep the distances and places of their pins, and the first link turns as driven."""
    cells: list[Cell] = []
    wanted: list[float] = []

    def row(cells_of_row: list[tuple[int, float]], value: float = 0.0) -> None:
        cells.extend((len(wanted), column, part) for column, part in cells_of_row)
        wanted.append(value)

    for number, pin in enumerate(model.pins):
        if pin.fixed:
            row([(2 * number, 1.0)])
            row([(2 * number + 1, 1.0)])
    for joint in model.joints:
        if joint.kind == "slide":
            (foot,) = model.links[joint.second].pins
            row([(2 * foot + 1, 1.0)])
    for number, link in enumerate(model.links[1:], start=1):
        if len(link.pins) < 2:
            continue
        first, second, *more = link.pins
        way = model.pins[second].at - model.pins[first].at
        size = abs(way) ** 2
        along = [(2 * first, -way.real), (2 * first + 1, -way.imag), (2 * second, way.real), (2 * second + 1, way.imag)]
        row([(column, part / size) for column, part in along])
        if number == model.drives[0].link:
            turn = [
                (2 * first, way.imag),
                (2 * first + 1, -way.real),
                (2 * second, -way.imag),
                (2 * second + 1, way.real),
            ]
            row([(column, part / size) for column, part in turn], model.drives[0].rate)
        for third in more:
            ratio = (model.pins[third].at - model.pins[first].at) / way
            row(
                [
                    (2 * third, -1.0),
                    (2 * first, 1 - ratio.real),
                    (2 * first + 1, ratio.imag),
                    (2 * second, ratio.real),
                    (2 * second + 1, -ratio.imag),
                ]
            )
            row(
                [
                    (2 * third + 1, -1.0),
                    (2 * first + 1, 1 - ratio.real),
                    (2 * first, -ratio.imag),
                    (2 * second + 1, ratio.real),
                    (2 * second, ratio.imag),
                ]
            )
    rows, columns, parts = zip(*cells, strict=True)
    speeds = spsolve(csr_matrix((parts, (rows, columns)), shape=(len(wanted), 2 * len(model.pins))), np.array(wanted))
    return speeds[0::2] + 1j * speeds[1::2]


@pytest.mark.parametrize("model", [scissor_lattice(600), scissor_lattice(600, driven=400), four_bar_chain(200)])
def test_every_pin_moves_as_the_sparse_solver_says(model: Linkage) -> None:
    expected = pin_velocities(model)
    result = analyse(model)
    assert result.solved
    greatest = max(abs(expected))
    for motion, velocity in zip(result.pins, expected, strict=True):
        assert motion.velocity is not None
        assert abs(motion.velocity - velocity) < 1e-9 * greatest
