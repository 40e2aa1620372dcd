"""The motion of a plan worked out by itself, by other means than the program's.

The unknowns are the velocities of the pins, not of the links: two pins of a link keep their distance, a further pin
of it moves as the similarity of those two says (the velocity image of a rigid body; Norton, Design of Machinery,
sec. 6). The matrix is solved by scipy's least squares, its freedom read off scipy's null space.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np
import scipy.linalg
from numpy.typing import NDArray

from fixtures.drafting import Part, Plan

Matrix = NDArray[np.float64]


@dataclass(frozen=True, slots=True, kw_only=True)
class Solution:
    """Freedom at the pose; rad/s of each link and velocity of each pin, None where the drives leave it open.

    ``condition`` is the greatest over the smallest non-zero singular value of the constraints with the drives.
    """

    freedom: int
    turning: dict[str, float | None]
    velocity: dict[str, complex | None]
    condition: float


def solve(plan: Plan, drives: Mapping[str, float]) -> Solution:
    """The solution of a plan whose links (by name) are driven at the given rad/s."""
    size = max(abs(first - second) for first in plan.points.values() for second in plan.points.values())
    points = {pin: point / size for pin, point in plan.points.items()}
    columns = {pin: 2 * number for number, pin in enumerate(points)}
    constraints = np.array(_constraints(plan, points, columns))
    freedom = scipy.linalg.null_space(constraints, rcond=1e-9).shape[1]
    turning = {part.name: _turning_row(part, points, columns) for part in plan.parts}
    driven = np.vstack([constraints, *(turning[link] for link in drives)])
    right = np.concatenate([np.zeros(len(constraints)), list(drives.values())])
    motion = scipy.linalg.lstsq(driven, right)[0]
    open_ways = scipy.linalg.null_space(driven, rcond=1e-9)
    values = scipy.linalg.svdvals(driven)
    kept = values[values > values[0] * 1e-9]

    def settled(row: Matrix) -> float | None:
        return float(row @ motion) if np.abs(row @ open_ways).max(initial=0.0) < 1e-9 else None

    velocity: dict[str, complex | None] = {}
    for pin, column in columns.items():
        along, across = settled(_unit_row(column, len(motion))), settled(_unit_row(column + 1, len(motion)))
        velocity[pin] = None if along is None or across is None else complex(along, across) * size
    return Solution(
        freedom=freedom,
        turning={link: settled(row) for link, row in turning.items()},
        velocity=velocity,
        condition=float(kept[0] / kept[-1]),
    )


def _constraints(plan: Plan, points: Mapping[str, complex], columns: Mapping[str, int]) -> list[Matrix]:
    width = 2 * len(points)
    rows = [_unit_row(columns[pin] + axis, width) for pin in plan.frame for axis in (0, 1)]
    for part in plan.parts:
        first, second, *others = part.pins
        span = points[second] - points[first]
        keeps_distance = np.zeros(width)
        for pin, sign in ((first, -1.0), (second, 1.0)):
            keeps_distance[columns[pin] : columns[pin] + 2] = sign * span.real, sign * span.imag
        rows.append(keeps_distance)
        for pin in others:
            ratio = (points[pin] - points[first]) / span
            for axis in (1, 1j):
                row = np.zeros(width)
                for other, factor in ((pin, 1 + 0j), (first, ratio - 1), (second, -ratio)):
                    turned = factor * axis
                    row[columns[other] : columns[other] + 2] = turned.real, -turned.imag
                rows.append(row)
    return rows


def _turning_row(part: Part, points: Mapping[str, complex], columns: Mapping[str, int]) -> Matrix:
    """The row that gives a link's rad/s: the imaginary part of (v2 - v1) / (p2 - p1)."""
    first, second = part.pins[:2]
    inverse = 1 / (points[second] - points[first])
    row = np.zeros(2 * len(points))
    for pin, sign in ((first, -1.0), (second, 1.0)):
        row[columns[pin] : columns[pin] + 2] = sign * inverse.imag, sign * inverse.real
    return row


def _unit_row(column: int, width: int) -> Matrix:
    row = np.zeros(width)
    row[column] = 1.0
    return row
