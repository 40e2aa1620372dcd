"""First formulation: one matrix of velocity constraints over all moving links, and its null space.

A moving link k has three unknowns, all of them speeds: w = omega * size, and the velocity vx, vy of its centre, where
centre and size are taken from the link's own joints. Each link then weighs alike whatever its size, and the verdict is
the same in metres, millimetres or inches. The link's velocity at a point p is v + i omega (p - centre).

A constraint says that the relative velocity of two links at a joint has no component along a direction, or that they
do not turn on one another: pin 2 rows, slide 2, pin in slot 1 (across the slot), rolling 1 (along the tangent: the
distance of the centres is held by the links that carry them; where nothing carries them the contact holds as a pin).
Where along its guide a slide was drawn is arbitrary: no scale and no row depends on it.
Source: any text on planar kinematics, e.g. J.J. Uicker, G.R. Pennock & J.E. Shigley, Theory of Machines and
Mechanisms, ch. 3 (from memory).
"""

from __future__ import annotations

from collections.abc import Callable
from functools import lru_cache
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from dxfcheck.analysis.topology import TOPOLOGIES_KEPT, Topology
from dxfcheck.geometry import Point
from dxfcheck.linkage import Joint, JointKind, Linkage
from dxfcheck.tolerances.analysis import (
    LINK_SIZE_FLOOR,
    RANK_GREATEST,
    RANK_NOISE,
    RANK_OF_STEP,
    RANK_RELATIVE,
    RANK_STEP,
)
from dxfcheck.tolerances.linework import TYPED_NOISE, TYPED_STEPS

__all__ = [
    "CELLS",
    "ROWS",
    "Body",
    "Freedom",
    "Matrix",
    "bodies_of",
    "constraint_matrix",
    "freedom_of",
    "rank_of",
    "rank_tolerance",
    "rows_of_joint",
    "tolerance_for",
    "typed_step",
]

Matrix = NDArray[np.float64]


class Body(NamedTuple):
    """Where one link's motion is measured, and the length its turning is scaled by."""

    centre: Point
    size: float


class Freedom(NamedTuple):
    """What the constraints leave: an orthonormal basis of the motions they allow, one a row.

    ``gap`` is the smallest singular value that counted and the greatest taken for zero, over the greatest of all.
    """

    motions: Matrix
    gap: tuple[float, float] | None


def bodies_of(linkage: Linkage) -> list[Body]:
    """Centre and size of every link, by the joints it has; a link with one place of joints takes the mechanism's size.

    Slides do not count: they hold alike wherever along the guide, or beside it, they are drawn.
    """
    places: list[list[Point]] = [[] for _ in linkage.links]
    for joint in linkage.joints:
        if joint.kind != "slide":
            places[joint.first].append(joint.at)
            places[joint.second].append(joint.at)
    bodies = [_body_at(at or [pin.at for pin in linkage.pins]) if len(at) != 1 else Body(at[0], 0.0) for at in places]
    whole = max([body.size for body in bodies]) or _extent([pin.at for pin in linkage.pins]) or 1.0
    floor = LINK_SIZE_FLOOR * whole
    return [body if body.size > floor else Body(body.centre, floor if body.size else whole) for body in bodies]


def _body_at(at: list[Point]) -> Body:
    """The middle of the places, and how far the furthest lies from it."""
    if len(at) == 2:
        return Body((at[0] + at[1]) / 2.0, abs(at[0] - at[1]) / 2.0)
    centre = sum(at) / len(at) if at else 0j
    return Body(centre, max([abs(place - centre) for place in at], default=0.0))


def _extent(places: list[Point]) -> float:
    """Half the diagonal of the box around the places; 0 for none or one."""
    if not places:
        return 0.0
    across = [place.real for place in places]
    up = [place.imag for place in places]
    return abs(complex(max(across) - min(across), max(up) - min(up))) / 2.0


def constraint_matrix(linkage: Linkage, topology: Topology, bodies: list[Body]) -> Matrix:
    """All constraint rows over the unknowns (w, vx, vy) of the moving links in the order of the linkage."""
    rows, cells = _layout(topology)
    values: list[float] = []
    for joint, place in zip(linkage.joints, topology.joints, strict=True):
        fill = ROWS[place.acts_as]
        for link, sign in ((joint.first, -1.0), (joint.second, 1.0)):
            if link != topology.frame:
                values += fill(joint, bodies[link], sign, bodies)
    matrix = np.zeros(rows * 3 * (topology.links - 1))
    matrix[cells] = values
    return matrix.reshape(rows, 3 * (topology.links - 1))


def rank_tolerance(linkage: Linkage) -> float:
    """Below what part of the greatest a singular value counts as zero: more where coordinates were typed by hand."""
    places = [pin.at for pin in linkage.pins]
    return tolerance_for(typed_step(places), 2.0 * _extent(places))


def tolerance_for(step: float, diagonal: float) -> float:
    """The same for links within a diagonal whose places lie on a grid of that step (0: full precision)."""
    if not diagonal or not step:
        return RANK_RELATIVE
    return min(RANK_GREATEST, max(RANK_RELATIVE, RANK_OF_STEP * step / diagonal))


def typed_step(places: list[Point]) -> float:
    """The coarsest grid of decimals on which all coordinates lie; 0 for whole numbers and for full precision."""
    values = [value for place in places for value in (place.real, place.imag)]
    if all(_on_grid(value, 1.0) for value in values):
        return 0.0
    return next((step for step in TYPED_STEPS if all(_on_grid(value, step) for value in values)), 0.0)


def _on_grid(value: float, step: float) -> bool:
    return abs(value / step - round(value / step)) * step <= TYPED_NOISE * max(1.0, abs(value))


def freedom_of(matrix: Matrix, tolerance: Callable[[], float]) -> Freedom:
    """Null space of the constraints by singular values; which of them count as zero, rank_of says.

    ``tolerance`` is called only where a small value makes the question arise.
    """
    rows, columns = matrix.shape
    if rows == 0 or columns == 0:
        return Freedom(np.eye(columns), None)
    values, right = _singular_of(matrix)
    rank = len(values)
    if values[-1] <= RANK_GREATEST * values[0]:
        rank = rank_of(values, tolerance())
    zero = values[rank] if rank < len(values) else 0.0
    if right is None and rank == rows:
        right = np.linalg.qr(matrix.T, mode="complete")[0].T
    elif right is None:
        right = np.linalg.svd(matrix, full_matrices=True)[2]
    return Freedom(right[rank:], (values[rank - 1] / values[0], zero / values[0]) if rank else None)


def _singular_of(matrix: Matrix) -> tuple[list[float], Matrix | None]:
    """Singular values in falling order, with the right vectors (one a row) for a small matrix.

    In a large one mostly all rows count; then a QR of its transpose gives the null space in a third of the time.
    """
    if matrix.shape[1] >= LARGE_MATRIX:
        return np.linalg.svd(matrix, compute_uv=False).tolist(), None
    _, singular, right = np.linalg.svd(matrix, full_matrices=True)
    return singular.tolist(), right


LARGE_MATRIX = 60
"""From so many columns on (twenty moving links) two calls without vectors cost less than one with them."""


def rank_of(values: list[float], tolerance: float) -> int:
    """How many singular values count, in falling order: those above the tolerance and what follows in small steps.

    Source of the problem: numpy's own tolerance is for rounding in the computer, not for coordinates typed by hand.
    """
    least, noise = tolerance * values[0], RANK_NOISE * values[0]
    rank = sum([value > least for value in values])
    while 0 < rank < len(values) and values[rank] > noise and values[rank] * RANK_STEP > values[rank - 1]:
        rank += 1
    return rank


def _pin_cells(joint: Joint, body: Body, sign: float, _: list[Body]) -> tuple[float, ...]:
    arm = (joint.at - body.centre) / body.size
    return (-sign * arm.imag, sign, sign * arm.real, sign)


def _slide_cells(joint: Joint, body: Body, sign: float, bodies: list[Body]) -> tuple[float, ...]:
    """No turn, and nothing across the slide: stated at the smaller link's centre, as it holds at any place."""
    first, second = bodies[joint.first], bodies[joint.second]
    smaller = first if first.size < second.size else second
    return (sign * smaller.size / body.size, *_cells_along(smaller.centre, body, sign, 1j * _direction(joint)))


def _slot_cells(joint: Joint, body: Body, sign: float, _: list[Body]) -> tuple[float, ...]:
    return _cells_along(joint.at, body, sign, 1j * _direction(joint))


def _rolling_cells(joint: Joint, body: Body, sign: float, _: list[Body]) -> tuple[float, ...]:
    return _cells_along(joint.at, body, sign, _direction(joint))


def _cells_along(place: Point, body: Body, sign: float, along: Point) -> tuple[float, ...]:
    arm = (place - body.centre) / body.size
    turning = arm.real * along.imag - arm.imag * along.real
    return (sign * turning, sign * along.real, sign * along.imag)


def _direction(joint: Joint) -> Point:
    if joint.direction is None:
        msg = f"a joint of kind '{joint.kind}' needs a direction"
        raise ValueError(msg)
    return joint.direction


CellFiller = Callable[[Joint, Body, float, list[Body]], tuple[float, ...]]
ROWS: dict[JointKind, CellFiller] = {
    "pin": _pin_cells,
    "slide": _slide_cells,
    "pin in slot": _slot_cells,
    "rolling": _rolling_cells,
}
CELLS: dict[JointKind, tuple[tuple[int, int], ...]] = {
    "pin": ((0, 0), (0, 1), (1, 0), (1, 2)),
    "slide": ((0, 0), (1, 0), (1, 1), (1, 2)),
    "pin in slot": ((0, 0), (0, 1), (0, 2)),
    "rolling": ((0, 0), (0, 1), (0, 2)),
}
"""Row and column, within a joint's rows and a link's columns, of each cell that ROWS fills."""


def rows_of_joint(acts_as: JointKind) -> int:
    """How many constraints a joint of this kind states."""
    return 1 + CELLS[acts_as][-1][0]


@lru_cache(maxsize=TOPOLOGIES_KEPT)
def _layout(topology: Topology) -> tuple[int, NDArray[np.intp]]:
    """Number of rows, and the flat place of every cell in the order in which constraint_matrix fills them."""
    columns = 3 * (topology.links - 1)
    cells: list[int] = []
    row = 0
    for joint in topology.joints:
        for link in (joint.first, joint.second):
            if link != topology.frame:
                start = row * columns + 3 * (link - (link > topology.frame))
                cells += [start + down * columns + right for down, right in CELLS[joint.acts_as]]
        row += rows_of_joint(joint.acts_as)
    places = np.array(cells, dtype=np.intp)
    places.setflags(write=False)
    return row, places
