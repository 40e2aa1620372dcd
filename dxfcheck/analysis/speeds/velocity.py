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

from dxfcheck.analysis.freedom.constraints import Body
from dxfcheck.analysis.freedom.elimination import Condition, motion_under
from dxfcheck.analysis.freedom.vicinity import links_near
from dxfcheck.analysis.results import DeadCentre, DriveVerdict
from dxfcheck.analysis.topology import Topology
from dxfcheck.geometry import Point, dot
from dxfcheck.linkage import Drive, Linkage
from dxfcheck.tolerances.analysis import (
    AT_LIMIT_OF_BEND,
    AT_LIMIT_RELATIVE,
    DENSE_LINKS,
    DETERMINED_RELATIVE,
    DRIVE_AGREES_RELATIVE,
    DRIVE_DEPENDENT_RELATIVE,
    RANK_NOISE,
)

__all__ = ["Motion", "RateRow", "apply_drives", "rate_row"]

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
    row of (w, vx, vy) for each link in turn, the held link too; it has no rows where everything is settled. Speeds
    in them up to ``still_below`` count as none; in a large linkage (None) what rests does so exactly, and each of these
    motions is judged by itself.
    """

    bodies: list[Body]
    turns: list[float]
    centres: list[Point]
    free: Matrix
    settled: list[bool]
    fastest: float
    taken: tuple[int, ...]
    still_below: float | None

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
        return self._is_still(free, first, second)

    def point_settled(self, link: int, place: Point) -> bool:
        """Whether the drives settle the velocity of a link's point at a place."""
        return self.settled[link] or self._is_still(self._free_velocity(link, place), link)

    def slide_settled(self, first: int, second: int, place: Point, direction: Point) -> bool:
        """Whether the drives settle the second link's speed against the first along a direction at a place."""
        if self.settled[first] and self.settled[second]:
            return True
        free = self._free_velocity(second, place) - self._free_velocity(first, place)
        return self._is_still((free * direction.conjugate()).real, first, second)

    def _free_velocity(self, link: int, place: Point) -> NDArray[np.complex128]:
        arm = (place - self.bodies[link].centre) / self.bodies[link].size
        turn, across, up = (self.free[:, 3 * link + part] for part in range(3))
        velocity: NDArray[np.complex128] = across + 1j * up + 1j * arm * turn
        return velocity

    def _is_still(self, free: NDArray[np.float64] | NDArray[np.complex128], *links: int) -> bool:
        if self.still_below is not None:
            return bool(np.linalg.norm(free) <= self.still_below)
        fastest = abs(self.free[:, [3 * link + part for link in links for part in range(3)]]).max(axis=1)
        return bool((abs(free) <= DETERMINED_RELATIVE * fastest).all())


def apply_drives(
    linkage: Linkage, topology: Topology, bodies: list[Body], motions: Matrix, centres: Sequence[DeadCentre]
) -> tuple[Motion, tuple[DriveVerdict, ...]]:
    """Takes the drives one after another; what contradicts, or cannot drive, is left out and told.

    ``motions`` is the orthonormal basis of what the constraints allow. A drive that hardly moves its link beside the
    fastest motion near it is at its limit; the limit grows with the bend at a dead centre there that may stop the
    drive. ValueError for a sliding drive without a slide.
    """
    fastest = _fastest(motions)
    choice = _Choice([0.0] * len(motions), [])
    verdicts: list[DriveVerdict] = []
    for drive in linkage.drives:
        row = rate_row(drive, linkage, bodies)
        least = _least_effect(drive, topology, motions, centres, fastest)
        verdict, choice = _judge(drive.rate, row.scale, _effect(row, motions), choice, least)
        verdicts.append(verdict)
    taken = tuple([number for number, verdict in enumerate(verdicts) if verdict.outcome == "taken"])
    chosen = _chosen_motion(linkage, topology, bodies, motions, choice, taken)
    motion = _motion_of(topology, bodies, chosen, taken)
    return motion, tuple(verdicts)


def _least_effect(
    drive: Drive, topology: Topology, motions: Matrix, centres: Sequence[DeadCentre], fastest: float
) -> float:
    """What a drive must move its link by; the driven link of a dead centre drives itself, and is not stopped there."""
    near = links_near(topology, (drive.link, drive.against))
    bends = [
        centre.angle
        for centre in centres
        if centre.driven not in {drive.link, drive.against} and (near is None or not near.isdisjoint(centre.links))
    ]
    limit = max(AT_LIMIT_RELATIVE, AT_LIMIT_OF_BEND * max(bends, default=0.0))
    if near is None:
        return limit * fastest
    columns = [3 * (link - (link > topology.frame)) + part for link in near for part in range(3)]
    return max(limit * _fastest(motions[:, columns]), RANK_NOISE * fastest)


def rate_row(drive: Drive, linkage: Linkage, bodies: list[Body]) -> RateRow:
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


def _motion_of(
    topology: Topology, bodies: list[Body], chosen: tuple[list[float], Matrix], taken: tuple[int, ...]
) -> Motion:
    speeds, free = chosen
    fastest = max([abs(speed) for speed in speeds], default=0.0)
    turns = [speeds[3 * link] / body.size + 0.0 for link, body in enumerate(bodies)]
    centres = [complex(across, up) for across, up in zip(speeds[1::3], speeds[2::3], strict=True)]
    settled, still_below = [True] * len(bodies), None
    if len(free) and topology.links > DENSE_LINKS:
        settled = (abs(free).max(axis=0).reshape(-1, 3).max(axis=1) == 0.0).tolist()
    elif len(free):
        speed_of_link = np.sqrt(np.square(free).sum(axis=0).reshape(-1, 3).max(axis=1))
        still_below = DETERMINED_RELATIVE * float(speed_of_link.max())
        settled = (speed_of_link <= still_below).tolist()
    return Motion(bodies, turns, centres, free, settled, fastest, taken, still_below)


def _chosen_motion(
    linkage: Linkage,
    topology: Topology,
    bodies: list[Body],
    motions: Matrix,
    choice: _Choice,
    taken: tuple[int, ...],
) -> tuple[list[float], Matrix]:
    """The speeds under the drives taken, and the motions that these leave; both with the held link's zeros.

    Where a large linkage has several freedoms they are worked out anew with the drives as conditions: combined from
    motions of all of it, what is slow or at rest would keep the rounding error of what is fast.
    """
    if len(motions) > 1 and topology.links > DENSE_LINKS:
        rows = [(rate_row(linkage.drives[number], linkage, bodies), linkage.drives[number].rate) for number in taken]
        anew = motion_under(linkage, topology, bodies, tuple([_condition(row, rate, topology) for row, rate in rows]))
        if anew is not None:
            speeds, free = anew
            return speeds.tolist(), free
    held = 3 * topology.frame
    single = _speeds(motions, choice.parts)
    single[held:held] = [0.0, 0.0, 0.0]
    return single, _still_free(motions, choice.settled, held)


def _condition(row: RateRow, rate: float, topology: Topology) -> Condition:
    """A drive by the links and their unknowns, as it runs."""
    cells = []
    for column, weight in row.cells:
        moving, which = divmod(column, 3)
        cells.append((moving + (moving >= topology.frame), which, weight))
    return Condition(tuple(cells), row.scale * rate)


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
