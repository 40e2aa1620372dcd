"""Second formulation, which shares no code with the first: the equations of the independent loops.

The unknowns are the rates at the joints: a turn for a pin (and about the contact of a wheel that nothing else holds),
a sliding speed for a slide, both for a half joint (where wheels roll, the speed at which they would part). Around
each closed loop the relative motions add up to nothing:

    sum of q = 0,    sum of q * (-i) (p - origin) + s * u = 0

with q the relative angular velocity and p the place of a turning joint, s the speed and u the direction of a sliding
one. Source: the loop-closure equations in Norton, Design of Machinery, ch. 6, written with relative rates as in
Uicker, Pennock & Shigley, Theory of Machines and Mechanisms, ch. 3 (both from memory).
"""

from __future__ import annotations

from collections import deque
from functools import lru_cache
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from dxfcheck.analysis.loops.loops import Loop, Place, independent_loops, places_of
from dxfcheck.analysis.loops.loops_in_order import Passage, rates_in_order
from dxfcheck.analysis.topology import TOPOLOGIES_KEPT, Topology
from dxfcheck.geometry import Point
from dxfcheck.linkage import Joint, Linkage
from dxfcheck.tolerances.analysis import DENSE_LINKS

__all__ = ["LoopSolution", "solve_loops"]

Matrix = NDArray[np.float64]


class LoopSolution(NamedTuple):
    """Turn (rad/s) of every link, and velocity of its point at ``places``; what the frame does not reach rests."""

    places: list[Point]
    turns: list[float]
    velocities: list[Point]

    def velocity(self, link: int, place: Point) -> Point:
        """Velocity of a link's point at a place, length units a second."""
        return self.velocities[link] + 1j * self.turns[link] * (place - self.places[link])


class _Signs(NamedTuple):
    """Which unknowns are turns (1 or 0), which of them a loop passes, and which lie between the frame and a link.

    The last two with the sense, +1 or -1, in which they are passed.
    """

    unknowns: tuple[tuple[int, bool], ...]
    turning: Matrix
    around: Matrix
    to_link: Matrix


def solve_loops(linkage: Linkage, topology: Topology, drives: tuple[int, ...], freedom: int) -> LoopSolution:
    """The motion under the drives with these numbers, where the loops leave as many motions as ``freedom`` says."""
    if topology.links > DENSE_LINKS:
        return _solve_in_order(linkage, topology, drives, freedom)
    signs = _signs_of(topology)
    origin, size = _middle_of(linkage)
    shares = _shares(linkage, signs, origin, size)
    loops = (shares[:, None, :] * signs.around[None, :, :]).reshape(-1, len(signs.unknowns))
    rows, wanted = _drive_rows(linkage, signs, drives, size)
    rates = _joint_rates(loops, rows, wanted, freedom)
    turns, across, up = ((shares * rates) @ signs.to_link.T).tolist()
    velocities = [complex(right, upward) * size for right, upward in zip(across, up, strict=True)]
    return LoopSolution([origin] * topology.links, turns, velocities)


def _middle_of(linkage: Linkage) -> tuple[Point, float]:
    """A place among the turning joints (else the pins) and the greatest distance of one from it.

    Where a slide was drawn does not count: it is arbitrary, and its equations do not ask.
    """
    places = [joint.at for joint in linkage.joints if joint.kind != "slide"] or [pin.at for pin in linkage.pins]
    origin = sum(places) / (len(places) or 1)
    return origin, max([abs(place - origin) for place in places], default=0.0) or 1.0


def _shares(linkage: Linkage, signs: _Signs, origin: Point, size: float) -> Matrix:
    """What each unknown adds to the turn and to the velocity at the origin of the link behind it; three rows."""
    columns: list[tuple[float, float, float]] = []
    for number, slides in signs.unknowns:
        joint = linkage.joints[number]
        if slides:
            along = joint.direction or 0j
            along = along * 1j if joint.kind == "rolling" else along
            columns.append((0.0, along.real, along.imag))
        else:
            arm = (origin - joint.at) / size
            columns.append((1.0, -arm.imag, arm.real))
    return np.array(columns).T


def _drive_rows(
    linkage: Linkage, signs: _Signs, drives: tuple[int, ...], size: float
) -> tuple[list[Matrix], list[float]]:
    """One row over the joint rates for each drive, and what it shall come to."""
    rows: list[Matrix] = []
    wanted: list[float] = []
    for drive in [linkage.drives[number] for number in drives]:
        joint = None if drive.joint is None else linkage.joints[drive.joint]
        if drive.kind == "slide" and joint is not None:
            sense = 1.0 if (joint.first, joint.second) == (drive.against, drive.link) else -1.0
            rows.append(np.array([sense * float(unknown == (drive.joint, True)) for unknown in signs.unknowns]))
            wanted.append(drive.rate / size)
        else:
            rows.append((signs.to_link[drive.link] - signs.to_link[drive.against]) * signs.turning)
            wanted.append(drive.rate)
    return rows, wanted


def _joint_rates(loops: Matrix, rows: list[Matrix], wanted: list[float], freedom: int) -> Matrix:
    """The joint rates that close the loops and run as the drives say; where several do, the least of them.

    Where loops and drives are as many as the unknowns and none repeats another, they are solved as they stand. Else
    the motions that fit the loops best are combined: as many as the freedom says.
    """
    unknowns = loops.shape[1]
    if len(loops) + freedom == unknowns and len(rows) == freedom:
        square = np.empty((unknowns, unknowns))
        square[: len(loops)] = loops
        square[len(loops) :] = rows
        try:
            return np.linalg.solve(square, np.array([0.0] * len(loops) + wanted))
        except np.linalg.LinAlgError:
            pass  # exactly singular: the least motion below will differ from the first formulation, and tell
    motions = np.linalg.svd(loops, full_matrices=True)[2] if len(loops) else np.eye(unknowns)
    motions = motions[unknowns - freedom :]
    parts: Matrix = np.linalg.lstsq(np.array(rows) @ motions.T, np.array(wanted), rcond=None)[0]
    return parts @ motions


@lru_cache(maxsize=TOPOLOGIES_KEPT)
def _signs_of(topology: Topology) -> _Signs:
    """The unknowns, (joint, whether it slides), and in which sense each loop and each link's path pass them."""
    unknowns: list[tuple[int, bool]] = []
    for number, joint in enumerate(topology.joints):
        unknowns += [(number, False)] if joint.acts_as != "slide" else []
        unknowns += [(number, True)] if joint.acts_as != "pin" else []
    places = places_of(topology)
    loops = independent_loops(topology)
    around = np.zeros((len(loops), len(topology.joints)))
    for row, loop in zip(around, loops, strict=True):
        _add(row, _round(loop, topology, places))
    to_link = np.zeros((topology.links, len(topology.joints)))
    for start, place, end in _tree(topology):
        to_link[end] = to_link[start]
        _add(to_link[end], _step(topology, places[place].joints, start, end))
    passed = [number for number, _ in unknowns]
    around, to_link = around[:, passed], to_link[:, passed]
    turning = np.array([not slides for _, slides in unknowns], dtype=float)
    for matrix in (turning, around, to_link):
        matrix.setflags(write=False)
    return _Signs(tuple(unknowns), turning, around, to_link)


def _round(loop: Loop, topology: Topology, places: tuple[Place, ...]) -> Passage:
    """The joints that a loop passes, and their sense."""
    passed: list[tuple[int, float]] = []
    for start, place, end in zip(loop.links, loop.places, loop.links[1:] + loop.links[:1], strict=True):
        passed += _step(topology, places[place].joints, start, end)
    return tuple(passed)


def _step(topology: Topology, joints: tuple[int, ...], start: int, end: int) -> Passage:
    """The joints passed from one link to another at one place, and their sense: a pin's joints leave its first link."""
    step: list[tuple[int, float]] = []
    if start != end:
        for number in joints:
            joint = topology.joints[number]
            if joint.second in (start, end):
                step.append((number, 1.0 if joint.second == end else -1.0))
    return tuple(step)


def _add(row: Matrix, step: Passage) -> None:
    for number, sense in step:
        row[number] += sense


def _tree(topology: Topology) -> list[tuple[int, int, int]]:
    """Steps (link, place, link) that reach every link from the frame, nearest first."""
    at_link: list[list[int]] = [[] for _ in range(topology.links)]
    places = places_of(topology)
    for number, place in enumerate(places):
        for link in place.links:
            at_link[link].append(number)
    reached, waiting, steps = {topology.frame}, deque([topology.frame]), []
    while waiting:
        link = waiting.popleft()
        for number in at_link[link]:
            for other in places[number].links:
                if other not in reached:
                    reached.add(other)
                    waiting.append(other)
                    steps.append((link, number, other))
    return steps


def _solve_in_order(linkage: Linkage, topology: Topology, drives: tuple[int, ...], freedom: int) -> LoopSolution:
    """The same for a large linkage, loop after loop."""
    places = places_of(topology)
    before: list[tuple[int, Passage] | None] = [None] * topology.links
    tree = _tree(topology)
    for start, place, end in tree:
        before[end] = (start, _step(topology, places[place].joints, start, end))
    loops = [_round(loop, topology, places) for loop in independent_loops(topology)]
    acts_as: list[str] = [joint.acts_as for joint in topology.joints]
    wanted: list[tuple[Passage | int, float, float]] = []
    for drive in [linkage.drives[number] for number in drives]:
        joint = None if drive.joint is None else linkage.joints[drive.joint]
        if drive.kind == "slide" and drive.joint is not None and joint is not None:
            sense = 1.0 if (joint.first, joint.second) == (drive.against, drive.link) else -1.0
            wanted.append((drive.joint, sense, drive.rate))
        else:
            wanted.append((_between(drive.against, drive.link, before), 1.0, drive.rate))
    rates = rates_in_order(linkage, acts_as, loops, wanted, _middle_of(linkage)[1], freedom)
    solution = LoopSolution([0j] * topology.links, [0.0] * topology.links, [0j] * topology.links)
    for start, _, end in tree:
        _, passed = before[end] or (start, ())
        motion = solution.places[start], solution.turns[start], solution.velocities[start]
        for number, sense in passed:
            motion = _passed(motion, linkage.joints[number], acts_as[number], sense, rates.of(number))
        solution.places[end], solution.turns[end], solution.velocities[end] = motion
    return solution


PointMotion = tuple[Point, float, Point]
"""A place, a link's turn, and the velocity of its point there."""


def _passed(before: PointMotion, joint: Joint, acts_as: str, sense: float, rates: tuple[float, float]) -> PointMotion:
    """The motion of the link behind a joint, from that of the link before it and the joint's own two rates."""
    place, turn, velocity = before
    if acts_as != "slide":
        velocity += 1j * turn * (joint.at - place)
        place = joint.at
        turn += sense * rates[0]
    if acts_as != "pin":
        along = joint.direction or 0j
        velocity += sense * rates[1] * (along * 1j if joint.kind == "rolling" else along)
    return place, turn, velocity


def _between(start: int, end: int, before: list[tuple[int, Passage] | None]) -> Passage:
    """The joints on the way from one link to another through the tree."""
    way: list[tuple[int, float]] = []
    for link, sense in ((start, -1.0), (end, 1.0)):
        step = before[link]
        while step is not None:
            way += [(joint, sense * along) for joint, along in step[1]]
            step = before[step[0]]
    return tuple(way)
