"""Drives applied to the motions that the constraints leave, and the velocities that follow.

All work is done in the coordinates of those motions, so that one decomposition of the constraint matrix serves for the
freedom, the drives and the speeds.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from dxfcheck.analysis.constraints import Body
from dxfcheck.analysis.results import DriveVerdict
from dxfcheck.geometry import Point, dot
from dxfcheck.linkage import Drive, Linkage
from dxfcheck.tolerances import DETERMINED_RELATIVE, DRIVE_AGREES_RELATIVE, DRIVE_DEPENDENT_RELATIVE

__all__ = ["Motion", "RateRow", "apply_drives"]

Matrix = NDArray[np.float64]


class RateRow(NamedTuple):
    """One drive as a sum of unknowns that equals ``scale`` times its rate; ``cells`` are (column, coefficient)."""

    cells: tuple[tuple[int, float], ...]
    scale: float


class _Choice(NamedTuple):
    """The motion chosen so far, as parts of the allowed motions, and an orthonormal basis of what drives settled."""

    parts: list[float]
    settled: list[list[float]]


@dataclass(frozen=True, slots=True)
class Motion:
    """Motion of every link (the held one at rest) and what the drives leave free.

    ``turns`` are rad/s, ``centres`` the velocities of the bodies' centres. ``free`` holds the motions still free, one a
    row of (w, vx, vy) for each link in turn, the held link too; it has no rows where everything is settled.
    """

    bodies: list[Body]
    turns: list[float]
    centres: list[Point]
    free: Matrix
    settled: list[bool]
    fastest: float
    taken: tuple[int, ...]

    def velocity(self, link: int, place: Point) -> Point:
        """Velocity of the point of a link that lies at a place, length units a second; only where it is settled."""
        return self.centres[link] + 1j * self.turns[link] * (place - self.bodies[link].centre)

    def turn_settled(self, first: int, second: int) -> bool:
        """Whether the drives settle how one link turns against another."""
        if self.settled[first] and self.settled[second]:
            return True
        sizes = self.bodies[first].size, self.bodies[second].size
        least = min(sizes)
        free = self.free[:, 3 * second] * (least / sizes[1]) - self.free[:, 3 * first] * (least / sizes[0])
        return self._is_still(free)

    def point_settled(self, link: int, place: Point) -> bool:
        """Whether the drives settle the velocity of a link's point at a place."""
        return self.settled[link] or self._is_still(self._free_velocity(link, place))

    def slide_settled(self, first: int, second: int, place: Point, direction: Point) -> bool:
        """Whether the drives settle the second link's speed against the first along a direction at a place."""
        if self.settled[first] and self.settled[second]:
            return True
        free = self._free_velocity(second, place) - self._free_velocity(first, place)
        return self._is_still((free * direction.conjugate()).real)

    def _free_velocity(self, link: int, place: Point) -> NDArray[np.complex128]:
        arm = (place - self.bodies[link].centre) / self.bodies[link].size
        turn, across, up = (self.free[:, 3 * link + part] for part in range(3))
        velocity: NDArray[np.complex128] = across + 1j * up + 1j * arm * turn
        return velocity

    def _is_still(self, free: NDArray[np.float64] | NDArray[np.complex128]) -> bool:
        return bool(np.linalg.norm(free) <= DETERMINED_RELATIVE * _fastest(self.free))


def apply_drives(
    linkage: Linkage, bodies: list[Body], motions: Matrix, limits: Sequence[float]
) -> tuple[Motion, tuple[DriveVerdict, ...]]:
    """Takes the drives one after another; what contradicts, or cannot drive, is left out and told.

    ``motions`` is the orthonormal basis of what the constraints allow. A drive that moves its link by less than
    its part in ``limits`` of the fastest motion is at its limit. ValueError for a sliding drive without a slide.
    """
    fastest = _fastest(motions)
    choice = _Choice([0.0] * len(motions), [])
    verdicts: list[DriveVerdict] = []
    for drive, limit in zip(linkage.drives, limits, strict=True):
        row = _rate_row(drive, linkage, bodies)
        verdict, choice = _judge(drive.rate, row.scale, _effect(row, motions), choice, limit * fastest)
        verdicts.append(verdict)
    taken = tuple([number for number, verdict in enumerate(verdicts) if verdict.outcome == "taken"])
    motion = _motion_of(linkage.frame, bodies, motions, choice, taken)
    return motion, tuple(verdicts)


def _rate_row(drive: Drive, linkage: Linkage, bodies: list[Body]) -> RateRow:
    """The drive over the unknowns, scaled so that no coefficient is above 1."""
    along = None
    place = 0j
    if drive.kind == "slide":
        place, along = _slide_of(drive, linkage)
    least = min(bodies[drive.link].size, bodies[drive.against].size)
    cells: list[tuple[int, float]] = []
    for link, sign in ((drive.link, 1.0), (drive.against, -1.0)):
        if link == linkage.frame:
            continue
        column = 3 * (link - (link > linkage.frame))
        if along is None:
            cells.append((column, sign * least / bodies[link].size))
            continue
        arm = (place - bodies[link].centre) / bodies[link].size
        cells.append((column, sign * dot(1j * arm, along)))
        cells += [(column + 1, sign * along.real), (column + 2, sign * along.imag)]
    return RateRow(tuple(cells), least if along is None else 1.0)


def _slide_of(drive: Drive, linkage: Linkage) -> tuple[Point, Point]:
    """Place and direction of the slide that a drive runs along."""
    joint = None if drive.joint is None else linkage.joints[drive.joint]
    if joint is None or joint.direction is None:
        msg = f"the sliding drive '{drive.stated}' names no joint with a direction"
        raise ValueError(msg)
    return joint.at, joint.direction


def _effect(row: RateRow, motions: Matrix) -> list[float]:
    """What each allowed motion does to a driven rate."""
    if len(motions) == 1:
        only = motions[0]
        return [sum([weight * float(only[column]) for column, weight in row.cells])]
    columns = [column for column, _ in row.cells]
    effect: list[float] = (motions[:, columns] @ np.array([weight for _, weight in row.cells])).tolist()
    return effect


def _judge(
    rate: float, scale: float, effect: list[float], choice: _Choice, least: float
) -> tuple[DriveVerdict, _Choice]:
    """What becomes of a drive, and the motion chosen with it: the least change that brings the driven rate about."""
    size = math.sqrt(_product(effect, effect))
    if size <= least:
        return DriveVerdict(outcome="at limit" if rate else "repeats", implied=0.0), choice
    new = effect
    for settled in choice.settled:
        along = _product(new, settled)
        new = [value - along * part for value, part in zip(new, settled, strict=True)]
    left = math.sqrt(_product(new, new))
    implied = _product(effect, choice.parts) / scale
    if left <= DRIVE_DEPENDENT_RELATIVE * size:
        agrees = abs(implied - rate) <= DRIVE_AGREES_RELATIVE * max(abs(rate), abs(implied))
        return DriveVerdict(outcome="repeats" if agrees else "conflict", implied=implied), choice
    step = (rate - implied) * scale / left
    new = [value / left for value in new]
    parts = [value + step * part for value, part in zip(choice.parts, new, strict=True)]
    return DriveVerdict(outcome="taken", implied=None), _Choice(parts, [*choice.settled, new])


def _product(one: list[float], other: list[float]) -> float:
    return sum([left * right for left, right in zip(one, other, strict=True)])


def _fastest(motions: Matrix) -> float:
    """The greatest speed that any one unknown has in any allowed motion of unit size."""
    if len(motions) == 1:
        only: list[float] = motions[0].tolist()
        return max(map(abs, only))
    return float(np.sqrt(np.einsum("ij,ij->j", motions, motions).max(initial=0.0)))


def _motion_of(frame: int, bodies: list[Body], motions: Matrix, choice: _Choice, taken: tuple[int, ...]) -> Motion:
    speeds = _speeds(motions, choice.parts)
    fastest = max([abs(speed) for speed in speeds], default=0.0)
    held = 3 * frame
    speeds[held:held] = [0.0, 0.0, 0.0]
    turns = [speeds[3 * link] / body.size + 0.0 for link, body in enumerate(bodies)]
    centres = [complex(across, up) for across, up in zip(speeds[1::3], speeds[2::3], strict=True)]
    free = _still_free(motions, choice.settled, held)
    settled = [True] * len(bodies)
    if len(free):
        speed_of_link = np.sqrt(np.square(free).sum(axis=0).reshape(-1, 3).max(axis=1))
        settled = (speed_of_link <= DETERMINED_RELATIVE * _fastest(free)).tolist()
    return Motion(bodies, turns, centres, free, settled, fastest, taken)


def _speeds(motions: Matrix, parts: list[float]) -> list[float]:
    """The unknowns, as the sum of the allowed motions by their parts."""
    if len(parts) == 1:
        only: list[float] = motions[0].tolist()
        return [parts[0] * speed for speed in only]
    speeds: list[float] = (np.array(parts) @ motions).tolist()
    return speeds


def _still_free(motions: Matrix, settled: list[list[float]], held: int) -> Matrix:
    """The allowed motions that the drives leave, with columns of zeros for the held link."""
    if len(settled) == len(motions):
        return _NOTHING_FREE
    if settled:
        complement = np.linalg.svd(np.array(settled), full_matrices=True)[2][len(settled) :]
        motions = complement @ motions
    return np.concatenate([motions[:, :held], np.zeros((len(motions), 3)), motions[:, held:]], axis=1)


_NOTHING_FREE: Matrix = np.zeros((0, 0))
