"""The null space of a large linkage's constraints, without ever setting up one matrix for all of it.

The steps of fronts.py are taken one after another. A step holds the constraints of its own joints and what the steps
before it left over. It turns them into
    carry    how its links follow the links of its border, x = carry * border,
    free     motions of its links that no border link takes part in, and
    left     what remains as constraints on the border alone: orthonormal rows, handed on to a later step.
The motions then follow from the last step back to the first. Only orthogonal transformations and one small
well-conditioned inverse a step are used, and each row handed on is of unit size: whether constraints repeat one another
is decided in each step by the singular values of its own few rows, with the same limits as in one matrix for all
(constraints.freedom_of), and no chain is so long that they fade. The rows of a step are some of all rows: what is
dependent among them is so in the whole.

Where a step's links follow the border only weakly (less than RANK_DOUBTFUL, but more than rounding), dividing by that
would blow errors up: its links then go on to the later step undivided and are dealt with together with what they touch.
Sources: A. George & J.W.H. Liu, Computer Solution of Large Sparse Positive Definite Systems, 1981 (orders and fronts);
I.S. Duff & J.K. Reid, The multifrontal solution of unsymmetric sets of linear equations, SIAM J. Sci. Stat. Comput. 5,
1984 (what is weak is put off); G.W. Stewart, On the perturbation of pseudo-inverses, SIAM Review 19, 1977, for the
angles between subspaces (all from memory).
"""

from __future__ import annotations

import math
from collections.abc import Callable, Iterator
from functools import partial
from typing import NamedTuple, Protocol

import numpy as np

from dxfcheck.analysis.freedom.constraints import (
    CELLS,
    ROWS,
    Body,
    Freedom,
    Matrix,
    rank_of,
    rows_of_joint,
    tolerance_for,
    typed_step,
)
from dxfcheck.analysis.freedom.fronts import Front, fronts_of
from dxfcheck.analysis.topology import Topology
from dxfcheck.linkage import Linkage
from dxfcheck.tolerances.analysis import (
    AT_REST_BESIDE,
    MOST_PUT_OFF,
    RANK_DOUBTFUL,
    RANK_GREATEST,
    STILL_OF_BORDER,
    TALLEST_MOTION,
)

__all__ = ["Condition", "Stage", "freedom_by_fronts", "motion_under", "split_rows", "split_with_care", "stages"]


class Remainder(NamedTuple):
    """Orthonormal constraint rows on a few links, three columns (w, vx, vy) each, handed on to a later step."""

    links: tuple[int, ...]
    rows: Matrix


_USED = Remainder((), np.zeros((0, 0)))


class Step(NamedTuple):
    """How a step's links follow those of its border, and their motions of their own (one a column)."""

    links: tuple[int, ...]
    border: tuple[int, ...]
    carry: Matrix
    free: Matrix


class Split(NamedTuple):
    """What one step makes of its rows; ``carry`` is None where its links had better be put off.

    ``gap`` is the smallest singular value that counted and the greatest taken for zero, over the greatest. ``left_by``
    gives the rows left over, and ``dependent`` the combinations that come to nothing, as sums of the step's rows; both
    only from split_with_care.
    """

    carry: Matrix | None
    free: Matrix
    left: Matrix
    gap: tuple[float, float]
    left_by: Matrix
    dependent: Matrix


class Splitter(Protocol):
    """How a step splits its rows; the first columns are those of its own links."""

    def __call__(self, matrix: Matrix, own: int, tolerance: Callable[[], float], *, may_put_off: bool) -> Split:
        """The split of one step."""


class Stage(NamedTuple):
    """One step of the order as it was taken: its own joints and the earlier steps whose remainders it took up.

    ``own`` are the links it deals with, ``columns`` these and the border; both as link numbers.
    """

    joints: tuple[int, ...]
    parts: tuple[int, ...]
    own: tuple[int, ...]
    columns: tuple[int, ...]
    split: Split


_NOTHING: Matrix = np.zeros((0, 0))


class Condition(NamedTuple):
    """A further constraint: a sum of unknowns (link, which of w, vx and vy, coefficient), and what it shall come to."""

    cells: tuple[tuple[int, int, float], ...]
    wanted: float


def freedom_by_fronts(linkage: Linkage, topology: Topology, bodies: list[Body]) -> Freedom:
    """The motions that the constraints allow: what constraints.freedom_of gives, at a cost in step with the links."""
    steps: list[Step] = []
    least, most, any_rows = 1.0, 0.0, False
    for stage in stages(linkage, topology, bodies, split_rows):
        split = stage.split
        if stage.joints or stage.parts:
            any_rows = True
            least, most = min(least, split.gap[0]), max(most, split.gap[1])
        if split.carry is not None:
            steps.append(Step(stage.own, stage.columns[len(stage.own) :], split.carry, split.free))
    raw = _motions_of(steps, topology)
    flat = np.delete(raw, topology.frame, axis=0).reshape(3 * (topology.links - 1), raw.shape[2])
    return Freedom(_orthonormal_motions(flat), (least, most) if any_rows else None)


def _orthonormal_motions(columns: Matrix) -> Matrix:
    """The same motions, of unit size and square to one another, one a row."""
    if columns.shape[1] == 1:
        only: Matrix = (columns / np.linalg.norm(columns)).T
        return only
    return np.asarray(np.linalg.qr(columns)[0].T) if columns.size else columns.T


def motion_under(
    linkage: Linkage, topology: Topology, bodies: list[Body], conditions: tuple[Condition, ...]
) -> tuple[Matrix, Matrix] | None:
    """One motion that fulfils further conditions, and the motions that leave them at nothing; None if there is none.

    Both over (w, vx, vy) of all links, the held one too; the free motions one a row, none a mixture of others: what
    rests in them has no rounding error. The conditions are written with what they shall come to as the first unknown of
    a link of its own, dealt with last; its other two are nothing.
    """
    clock = topology.links
    extended = [Condition((*each.cells, (clock, 0, -each.wanted)), 0.0) for each in conditions]
    extended += [Condition(((clock, which, 1.0),), 0.0) for which in (1, 2)]
    wider = topology._replace(links=clock + 1)
    steps = [
        Step(stage.own, stage.columns[len(stage.own) :], stage.split.carry, stage.split.free)
        for stage in stages(linkage, wider, [*bodies, Body(0j, 0.0)], split_rows, tuple(extended), clock)
        if stage.split.carry is not None
    ]
    motions = _motions_of(steps, wider)
    if not steps or clock not in steps[-1].links or steps[-1].free.shape[1] != 1 or not motions[clock, 0, -1]:
        return None
    flat = motions[:clock].reshape(3 * clock, motions.shape[2])
    free = flat[:, :-1]
    return flat[:, -1] / motions[clock, 0, -1], (free / np.linalg.norm(free, axis=0)).T


def stages(
    linkage: Linkage,
    topology: Topology,
    bodies: list[Body],
    splitter: Splitter,
    conditions: tuple[Condition, ...] = (),
    last: int = -1,
) -> Iterator[Stage]:
    """Takes every step of the order; ``splitter`` is split_rows, or split_with_care to be told of every row."""
    step_of_grid: list[float] = []

    def tolerance(links: tuple[int, ...]) -> float:
        if not step_of_grid:
            step_of_grid.append(typed_step([pin.at for pin in linkage.pins]))
        return tolerance_for(step_of_grid[0], 2.0 * max([bodies[link].size for link in links]))

    rows_of = _Rows(linkage, topology, bodies, conditions)
    remainders: list[Remainder] = []
    related = [{link for link, _, _ in condition.cells} for condition in conditions]
    for front in fronts_of(topology, related, last):
        numbers = tuple([number for number in front.parts if len(remainders[number].rows)])
        parts = [remainders[number] for number in numbers]
        for number in numbers:
            remainders[number] = _USED
        own = _own_links(front, parts)
        columns = own + front.border
        matrix = _front_matrix(front, columns, parts, rows_of)
        split = splitter(matrix, 3 * len(own), partial(tolerance, columns), may_put_off=len(own) <= MOST_PUT_OFF)
        remainders.append(Remainder(columns if split.carry is None else front.border, split.left))
        yield Stage(front.joints, numbers, own, columns, split)


def _own_links(front: Front, parts: list[Remainder]) -> tuple[int, ...]:
    """The links a step deals with: its own, and those that an earlier one put off."""
    put_off: list[int] = []
    outside = {*front.links, *front.border}
    for part in parts:
        put_off += [link for link in part.links if link not in outside]
    return (*front.links, *put_off) if put_off else front.links


class _Rows(NamedTuple):
    """What the rows of a step are made of."""

    linkage: Linkage
    topology: Topology
    bodies: list[Body]
    conditions: tuple[Condition, ...]


def _front_matrix(front: Front, columns: tuple[int, ...], parts: list[Remainder], rows_of: _Rows) -> Matrix:
    """The rows of a step's joints and conditions, in order, and below them what the earlier steps left over."""
    place = {link: 3 * number for number, link in enumerate(columns)}
    width = 3 * len(columns)
    linkage, topology, bodies, conditions = rows_of
    offsets = {kind: [down * width + right for down, right in pattern] for kind, pattern in CELLS.items()}
    cells: list[int] = []
    values: list[float] = []
    start = 0
    for number in front.joints:
        joint = linkage.joints[number]
        acts_as = topology.joints[number].acts_as
        fill, pattern = ROWS[acts_as], offsets[acts_as]
        for link, sign in ((joint.first, -1.0), (joint.second, 1.0)):
            if link != topology.frame:
                corner = start + place[link]
                cells += [corner + offset for offset in pattern]
                values += fill(joint, bodies[link], sign, bodies)
        start += width * rows_of_joint(acts_as)
    for number in front.conditions:
        for link, which, value in conditions[number].cells:
            cells.append(start + place[link] + which)
            values.append(value)
        start += width
    height = start // width + sum([len(part.rows) for part in parts])
    flat = np.zeros(height * width)
    flat[cells] = values
    matrix = flat.reshape(height, width)
    row = start // width
    for part in parts:
        below = row + len(part.rows)
        for number, link in enumerate(part.links):
            at = place[link]
            matrix[row:below, at : at + 3] = part.rows[:, 3 * number : 3 * number + 3]
        row = below
    return matrix


def split_rows(matrix: Matrix, own: int, tolerance: Callable[[], float], *, may_put_off: bool) -> Split:
    """The common case without a full decomposition: the links follow their border firmly and no row repeats another.

    The triangle of a QR of all rows holds that of the links' own columns, what stands beside it, and below that what is
    left for the border; the orthogonal factor is not asked for.
    """
    rows, columns = matrix.shape
    if rows < own:
        return split_with_care(matrix, own, tolerance, may_put_off=may_put_off)
    triangle: Matrix = np.asarray(np.linalg.qr(matrix, mode="r"))
    upper = triangle[:own, :own]
    try:
        inverse = np.linalg.inv(upper)
    except np.linalg.LinAlgError:
        return split_with_care(matrix, own, tolerance, may_put_off=may_put_off)
    firm = 1.0 / math.sqrt(np.vdot(inverse, inverse) * max(1.0, np.vdot(upper, upper)))
    if not firm >= RANK_DOUBTFUL:
        return split_with_care(matrix, own, tolerance, may_put_off=may_put_off)
    free = np.zeros((own, 0))
    if own == columns:
        return Split(np.zeros((own, 0)), free, _NOTHING, (firm, 0.0), _NOTHING, _NOTHING)
    carry = inverse @ triangle[:own, own:]
    np.negative(carry, out=carry)
    left = triangle[own:, own:]
    if rows > own:
        left, least = _orthonormal(left)
        if rows > columns or least < RANK_DOUBTFUL:
            return split_with_care(matrix, own, tolerance, may_put_off=may_put_off)
        firm = min(firm, least)
    return Split(carry, free, left, (firm, 0.0), _NOTHING, _NOTHING)


def _orthonormal(rows: Matrix) -> tuple[Matrix, float]:
    """Orthonormal rows that span the same, and the least singular value; that is 0 where there are too many rows."""
    if len(rows) == 1:
        size = math.sqrt(np.vdot(rows, rows))
        return rows / (size or 1.0), size
    _, values, right = np.linalg.svd(rows, full_matrices=False)
    return right, float(values[-1]) if len(values) == len(rows) else 0.0


def split_with_care(matrix: Matrix, own: int, tolerance: Callable[[], float], *, may_put_off: bool) -> Split:
    """By singular values: first what is dependent among the rows, then what the border holds of the step's links.

    For orthonormal rows the singular values of the links' columns are the cosines of the angles at which the
    constraints stand to the links' own unknowns: 1 means held without the border, 0 a constraint on the border alone.
    """
    rows, columns = matrix.shape
    whole = own == columns
    if rows == 0:
        return Split(np.zeros((own, columns - own)), np.eye(own), _NOTHING, (1.0, 0.0), _NOTHING, _NOTHING)
    left_by, singular, right = np.linalg.svd(matrix, full_matrices=True)
    values: list[float] = singular.tolist()
    rank = len(values)
    if values[-1] <= RANK_GREATEST * values[0]:
        rank = rank_of(values, tolerance())
    gap = _gap_of(values, rank)
    dependent = left_by[:, rank:].T
    basis = right[:rank]
    made = left_by[:, :rank].T / singular[:rank, None]
    if whole:
        return Split(np.zeros((own, 0)), right[rank:].T, _NOTHING, gap, _NOTHING, dependent)
    turned, cosines, axes = np.linalg.svd(basis[:, :own], full_matrices=True)
    held = int(np.count_nonzero(cosines > STILL_OF_BORDER))
    if may_put_off and held and cosines[held - 1] < RANK_DOUBTFUL:
        return Split(None, _NOTHING, basis, gap, made, dependent)
    along = turned.T @ basis[:, own:]
    carry = axes[:held].T @ (along[:held] / -cosines[:held, None])
    return Split(carry, axes[held:].T, along[held:], gap, turned[:, held:].T @ made, dependent)


def _gap_of(values: list[float], rank: int) -> tuple[float, float]:
    """The smallest value that counts and the greatest that does not, over the greatest of all."""
    if not values[0]:
        return 1.0, 0.0
    return values[max(rank - 1, 0)] / values[0], (values[rank] / values[0] if rank < len(values) else 0.0)


def _motions_of(steps: list[Step], topology: Topology) -> Matrix:
    """The motions of all links, by link, unknown and motion; those of the last step come last.

    What rests beside a border that moves is put to rest exactly: rounding error handed on would look like a motion.
    """
    freedom = sum([step.free.shape[1] for step in steps])
    motions = np.zeros((topology.links, 3, freedom))
    first = freedom
    for step in reversed(steps):
        links, border = list(step.links), list(step.border)
        around = motions[border].reshape(3 * len(border), freedom)
        moved = step.carry @ around
        if step.free.shape[1]:
            first -= step.free.shape[1]
            moved[:, first : first + step.free.shape[1]] += step.free
        here = np.maximum(abs(around).max(axis=0, initial=0.0), abs(moved).max(axis=0))
        moved[abs(moved) <= AT_REST_BESIDE * here] = 0.0
        motions[links] = moved.reshape(len(links), 3, freedom)
        if freedom and not here.max() < TALLEST_MOTION:
            motions /= np.maximum(1.0, abs(motions).max(axis=(0, 1)))
    return motions
