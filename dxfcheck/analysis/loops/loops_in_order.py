"""The loop equations of a large linkage, loop after loop: what loop_equations.py solves in one matrix.

The unknowns and the equations are the same; each loop states its own about a place of its own, in its own size, so that
a far end of the linkage loses no digits. The loops are taken in the order in which they hang together, from an end on,
a few at a time. Rates that no later loop passes are then expressed by those that one does, as far as their singular
values are firm; combinations of them that are not, and what remains of equations that others nearly make up, wait for
the end and are solved there together with the drives. No code of the first formulation (elimination.py) is used, and
nothing is decided about ranks here: it is told the freedom.
"""

from __future__ import annotations

from collections import deque
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from dxfcheck.geometry import Point
from dxfcheck.linkage import Joint, Linkage
from dxfcheck.tolerances.analysis import LOOP_FIRM, LOOP_NOISE

__all__ = ["JointRates", "Passage", "rates_in_order"]

Passage = tuple[tuple[int, float], ...]
"""Joints passed one after another, each with the sense, +1 or -1, in which it is passed."""

Matrix = NDArray[np.float64]
Unknown = tuple[int, int]
"""A joint's number and which of its rates; below 0 a step's number and which of its combinations of rates."""

TURNS, SLIDES = 0, 1

SOLVED_AT_ONCE = 12
"""Loops are taken together until so many unknowns can be expressed: larger steps cost less each, and more in all."""

Equations = list[tuple[Unknown, float, float, float]]
"""A loop's three equations: what each unknown adds to the turns, and to the velocities across and up."""

Row = dict[Unknown, float]


class JointRates(NamedTuple):
    """Turn (rad/s) and sliding speed (length units a second) at the joints; what no loop or drive moves is absent."""

    turns: dict[int, float]
    slides: dict[int, float]

    def of(self, joint: int) -> tuple[float, float]:
        """Both rates of a joint, 0.0 where it has none."""
        return self.turns.get(joint, 0.0), self.slides.get(joint, 0.0)


class _Solved(NamedTuple):
    """Some unknowns as sums of later ones."""

    unknowns: list[Unknown]
    later: list[Unknown]
    of: Matrix


class _Open(NamedTuple):
    """Equations over the unknowns that later loops pass: orthonormal ``firm`` rows, and ``weak`` ones as they came."""

    unknowns: list[Unknown]
    firm: Matrix
    weak: Matrix


class _Scales(NamedTuple):
    """The length by which each sliding speed is divided."""

    whole: float
    of_joint: dict[int, float]

    def of(self, joint: int) -> float:
        return self.of_joint.get(joint, self.whole)


def rates_in_order(
    linkage: Linkage,
    acts_as: list[str],
    loops: list[Passage],
    drives: list[tuple[Passage | int, float, float]],
    whole: float,
    freedom: int,
) -> JointRates:
    """Rates that close the loops and run as the drives say.

    A drive is the passage from one link to another, or the number of a slide; its sense; and its rate. ``whole`` is the
    linkage's size. Of the rates that stay without a firm pivot, as many combinations are free as ``freedom`` says.
    """
    scales = _scales_of(linkage, loops, whole)
    equations = [_equations(linkage, acts_as, loop, scales) for loop in _in_order(loops)]
    passed = {unknown for loop in equations for unknown, _, _, _ in loop}
    outside = [unknown for unknown in _unknowns_of(acts_as) if unknown not in passed]
    rates = [rate / scales.of(path) if isinstance(path, int) else rate for path, _, rate in drives]
    solved, left, waiting = _eliminated(equations)
    free = [*left.unknowns, *waiting, *outside]
    wanted = _matrix_of([_drive_row(path, sense, acts_as, solved) for path, sense, _ in drives], free)
    values = dict(zip(free, _chosen(left, wanted, rates, freedom), strict=True))
    for step in reversed(solved):
        later = np.array([values[unknown] for unknown in step.later])
        values |= zip(step.unknowns, (step.of @ later).tolist(), strict=True)
    return JointRates(
        {joint: value for (joint, which), value in values.items() if joint >= 0 and which == TURNS},
        {joint: value * scales.of(joint) for (joint, which), value in values.items() if joint >= 0 and which == SLIDES},
    )


def _unknowns_of(acts_as: list[str]) -> list[Unknown]:
    unknowns: list[Unknown] = []
    for number, kind in enumerate(acts_as):
        if kind != "slide":
            unknowns.append((number, TURNS))
        if kind != "pin":
            unknowns.append((number, SLIDES))
    return unknowns


def _in_order(loops: list[Passage]) -> list[Passage]:
    """Loops that share joints one after another, starting from an end: the last loop met from any."""
    passing: dict[int, list[int]] = {}
    for number, loop in enumerate(loops):
        for joint, _ in loop:
            passing.setdefault(joint, []).append(number)
    order: list[int] = []
    met: set[int] = set()
    for first in range(len(loops)):
        if first not in met:
            end = _spread(first, loops, passing, set())[-1]
            order += _spread(end, loops, passing, met)
    return [loops[number] for number in order]


def _spread(first: int, loops: list[Passage], passing: dict[int, list[int]], met: set[int]) -> list[int]:
    """All loops that hang together with one, nearest first."""
    order = [first]
    met.add(first)
    waiting = deque(order)
    opened: set[int] = set()
    while waiting:
        for joint, _ in loops[waiting.popleft()]:
            if joint in opened:
                continue
            opened.add(joint)
            for other in passing[joint]:
                if other not in met:
                    met.add(other)
                    order.append(other)
                    waiting.append(other)
    return order


def _scales_of(linkage: Linkage, loops: list[Passage], whole: float) -> _Scales:
    """A slide's speed is measured by the size of the first loop that passes it."""
    of_joint: dict[int, float] = {}
    for loop in loops:
        slides = [joint for joint, _ in loop if linkage.joints[joint].kind != "pin" and joint not in of_joint]
        if slides:
            size = _middle_of([linkage.joints[joint] for joint, _ in loop], whole)[1]
            of_joint |= dict.fromkeys(slides, size)
    return _Scales(whole, of_joint)


def _middle_of(joints: list[Joint], whole: float) -> tuple[Point, float]:
    """A place amid a loop's turning joints, and how far the furthest lies from it."""
    places = [joint.at for joint in joints if joint.kind != "slide"]
    if not places:
        return joints[0].at, whole
    middle = sum(places) / len(places)
    return middle, max([abs(place - middle) for place in places]) or whole


def _equations(linkage: Linkage, acts_as: list[str], loop: Passage, scales: _Scales) -> Equations:
    """The turns add up to nothing, and so do both parts of the velocities about the loop's middle."""
    joints = linkage.joints
    middle, size = _middle_of([joints[number] for number, _ in loop], scales.whole)
    equations: Equations = []
    for number, sense in loop:
        joint = joints[number]
        if acts_as[number] != "slide":
            arm = sense * (middle - joint.at) / size
            equations.append(((number, TURNS), sense, -arm.imag, arm.real))
        if acts_as[number] != "pin":
            along = sense * _along(joint) * (scales.of(number) / size)
            equations.append(((number, SLIDES), 0.0, along.real, along.imag))
    return equations


def _along(joint: Joint) -> Point:
    """Where a positive sliding speed moves the second link: for wheels, that in which they would part."""
    along = joint.direction or 0j
    return along * 1j if joint.kind == "rolling" else along


def _eliminated(equations: list[Equations]) -> tuple[list[_Solved], _Open, list[Unknown]]:
    """The unknowns as sums of later ones; the equations left at the end; and the combinations that are in none."""
    left = _Open([], np.zeros((0, 0)), np.zeros((0, 0)))
    solved: list[_Solved] = []
    loose: list[Unknown] = []
    loops: list[Equations] = []
    ending: list[Unknown] = []
    for number, (loop, last) in enumerate(zip(equations, _ending(equations), strict=True), start=1):
        loops.append(loop)
        ending += last
        if len(ending) >= SOLVED_AT_ONCE or number == len(equations):
            step, left, more = _solve(left, loops, ending, len(solved))
            solved.append(step)
            loose += more
            loops, ending = [], []
    return solved, left, loose


def _ending(equations: list[Equations]) -> list[list[Unknown]]:
    """For each loop the unknowns that no later loop passes."""
    last: dict[Unknown, int] = {}
    for number, loop in enumerate(equations):
        for unknown, _, _, _ in loop:
            last[unknown] = number
    ending: list[list[Unknown]] = [[] for _ in equations]
    for unknown, number in last.items():
        ending[number].append(unknown)
    return ending


def _solve(
    before: _Open, loops: list[Equations], ending: list[Unknown], steps: int
) -> tuple[_Solved, _Open, list[Unknown]]:
    """Unknowns as sums of those that later loops pass, and of combinations of their own that the equations leave open.

    By the singular values of their columns: those that are firm solve as many equations.
    """
    ends = len(ending)
    unknowns, firm, weak = _laid_out(before, loops, ending)
    turned, values, axes = np.linalg.svd(firm[:, :ends], full_matrices=True)
    held = int(np.count_nonzero(values >= LOOP_FIRM))
    beyond = turned.T @ firm[:, ends:]
    of = np.hstack([axes[:held].T @ (beyond[:held] / -values[:held, None]), axes[held:].T])
    faint = np.zeros((len(firm) - held, ends - held))
    np.fill_diagonal(faint, values[held:])
    later = [*unknowns[ends:], *[(-1 - steps, number) for number in range(ends - held)]]
    weak_later = weak[:, :ends] @ of
    weak_later[:, : len(unknowns) - ends] += weak[:, ends:]
    left, loose = _sorted_out(later, np.hstack([beyond[held:], faint]), weak_later)
    return _Solved(ending, later, of), left, loose


def _laid_out(before: _Open, loops: list[Equations], ending: list[Unknown]) -> tuple[list[Unknown], Matrix, Matrix]:
    """All unknowns, those that end first; the firm rows over them, three a loop below what was left; the weak rows."""
    column = {unknown: number for number, unknown in enumerate(ending)}
    for unknown in before.unknowns:
        column.setdefault(unknown, len(column))
    cells: list[tuple[int, int, float]] = []
    row = len(before.firm)
    for loop in loops:
        for unknown, turn, across, up in loop:
            at = column.setdefault(unknown, len(column))
            cells += ((row, at, turn), (row + 1, at, across), (row + 2, at, up))
        row += 3
    firm = np.zeros((row, len(column)))
    weak = np.zeros((len(before.weak), len(column)))
    known = [column[unknown] for unknown in before.unknowns]
    firm[: len(before.firm), known] = before.firm
    weak[:, known] = before.weak
    rows, columns, values = zip(*cells, strict=True)
    np.add.at(firm, (rows, columns), values)
    return list(column), firm, weak


def _sorted_out(unknowns: list[Unknown], rows: Matrix, weak: Matrix) -> tuple[_Open, list[Unknown]]:
    """Independent rows of unit size, and weak ones, over the unknowns that are in any; and combinations that are not.

    Rows that repeat one another are found here, where they meet; handed on, what rounding leaves of them would grow.
    """
    if len(rows):
        _, values, axes = np.linalg.svd(rows, full_matrices=False)
        held = int(np.count_nonzero(values >= LOOP_FIRM))
        felt = int(np.count_nonzero(values > LOOP_NOISE))
        rows = axes[:held]
        weak = np.vstack([weak, axes[held:felt] * values[held:felt, None]])
    met = (abs(rows).max(axis=0, initial=0.0) > LOOP_NOISE) | (abs(weak).max(axis=0, initial=0.0) > LOOP_NOISE)
    kept = [unknown for unknown, is_met in zip(unknowns, met.tolist(), strict=True) if is_met]
    loose = [unknown for unknown, is_met in zip(unknowns, met.tolist(), strict=True) if unknown[0] < 0 and not is_met]
    return _Open(kept, rows[:, met], weak[:, met]), loose


def _drive_row(path: Passage | int, sense: float, acts_as: list[str], solved: list[_Solved]) -> Row:
    """What a drive's rate is a sum of, once every unknown is expressed by the free ones."""
    row: Row = {}
    if isinstance(path, int):
        row[path, SLIDES] = sense
    else:
        for joint, along in path:
            if acts_as[joint] != "slide":
                row[joint, TURNS] = row.get((joint, TURNS), 0.0) + sense * along
    for step in solved:
        parts = [row.pop(unknown, 0.0) for unknown in step.unknowns]
        if any(parts):
            for unknown, part in zip(step.later, (np.array(parts) @ step.of).tolist(), strict=True):
                row[unknown] = row.get(unknown, 0.0) + part
    return row


def _chosen(left: _Open, wanted: Matrix, rates: list[float], freedom: int) -> list[float]:
    """The least values of the free unknowns that fit what is left best and with which the drives run as stated."""
    count = wanted.shape[1]
    motions = np.eye(count)
    rows = np.vstack([left.firm, left.weak])
    if len(rows) and count > freedom:
        padded = np.zeros((len(rows), count))
        padded[:, : len(left.unknowns)] = rows
        motions = np.linalg.svd(padded, full_matrices=True)[2][count - freedom :]
    values = np.zeros(count)
    if len(wanted) and len(motions):
        values = np.linalg.lstsq(wanted @ motions.T, np.array(rates), rcond=None)[0] @ motions
    chosen: list[float] = values.tolist()
    return chosen


def _matrix_of(rows: list[Row], unknowns: list[Unknown]) -> Matrix:
    column = {unknown: number for number, unknown in enumerate(unknowns)}
    matrix = np.zeros((len(rows), len(unknowns)))
    for number, row in enumerate(rows):
        for unknown, part in row.items():
            matrix[number, column[unknown]] = part
    return matrix
