"""A finite step along the free motions: what moves through, and what only shivers.

Velocities at one pose cannot tell a parallelogram with a third crank, which moves through, from a stretched pair of
bars, which locks at once. So the linkage is moved by a small finite step along each free motion and its joints are
closed again there (Newton's method on the closure equations, the amount of the free motion held). The joints of what
moves through close; what shivers stays open by the square of the step.
Source of the notion: R. Connelly & W. Whiteley, Second-order rigidity and prestress stability for tensegrity
frameworks, SIAM J. Discrete Math. 9 (1996), first-order flexes that no second-order flex extends (from memory).
"""

from __future__ import annotations

from collections.abc import Iterator
from typing import Literal, NamedTuple

import numpy as np
from numpy.typing import NDArray

from dxfcheck.analysis.freedom.constraints import Body, constraint_matrix, freedom_of
from dxfcheck.analysis.pose.displacement import Displaced, can_be_displaced, displace
from dxfcheck.analysis.results import FiniteMotion
from dxfcheck.analysis.topology import Topology, topology_of
from dxfcheck.linkage import Linkage
from dxfcheck.tolerances.analysis import (
    FINITE_STEP_RADIANS,
    FINITE_STEP_TURNS,
    RANK_NOISE,
    RANK_RELATIVE,
    STEPPED_FREEDOMS,
    STEPPED_LINKS,
)

__all__ = ["finite_motion"]

Matrix = NDArray[np.float64]


class _Reached(NamedTuple):
    """How far open a step stays, the misfit of a length that tells of, and the freedom at its end."""

    opening: float
    misfit: float
    freedom: int


class _Subject(NamedTuple):
    """What is stepped: the linkage, its bodies, and the tolerance of the rank at the pose."""

    linkage: Linkage
    topology: Topology
    bodies: list[Body]
    tolerance: float


def finite_motion(
    linkage: Linkage, bodies: list[Body], motions: Matrix, tolerance: float, diagonal: float
) -> FiniteMotion | None:
    """Step along each of the free motions (orthonormal, one a row) both ways.

    ``tolerance`` is the part of the greatest singular value below which one counted as zero at the pose, ``diagonal``
    that of the mechanism, in the drawing's unit. None where it cannot be judged: a joint whose shape is not known, or
    more links or freedoms than are stepped through.
    """
    few = len(linkage.links) <= STEPPED_LINKS and 0 < len(motions) <= STEPPED_FREEDOMS
    if not few or not can_be_displaced(linkage):
        return None
    tolerance = max(tolerance, RANK_RELATIVE)
    limit = tolerance * diagonal
    subject = _Subject(linkage, topology_of(linkage), bodies, tolerance)
    reached = [_go(subject, motions, way, limit) for way in _ways(len(motions))]
    closed = [each for each in reached if each.misfit <= limit]
    freedom = max((each.freedom for each in closed), default=0)
    best = min(closed or reached, key=lambda each: each.misfit)
    verdict: Literal["through", "momentary", "locked"] = "locked"
    if closed:
        verdict = "through" if freedom >= len(motions) else "momentary"
    return FiniteMotion(
        verdict=verdict,
        turn=2.0 * FINITE_STEP_RADIANS,
        opening=best.opening,
        misfit=best.misfit,
        limit=limit,
        freedom=freedom,
    )


def _ways(freedoms: int) -> Iterator[Matrix]:
    """Which mixtures of the free motions to try: each alone, and each with a part of every other, both ways."""
    for main in range(freedoms):
        for sign in (1.0, -1.0):
            way = np.zeros(freedoms)
            way[main] = sign
            yield way
            for other in range(freedoms):
                if other != main:
                    for part in (1.0, -1.0):
                        mixed = way.copy()
                        mixed[other] = part
                        yield mixed / np.linalg.norm(mixed)


def _go(subject: _Subject, motions: Matrix, way: Matrix, limit: float) -> _Reached:
    """Two steps from the pose, the second twice as long.

    Lengths that are special only to the drawing's rounding open the joints in proportion to the step; what is no motion
    at all, or one of lengths that are off, by its square or more. The second part, over half the square of the turn, is
    the error of a length: a bar too long by e that swings by a small angle opens its end by e angle^2 / 2.
    """
    direction = way @ motions
    short = _closed(subject, direction, FINITE_STEP_RADIANS)
    long = _closed(subject, direction, 2.0 * FINITE_STEP_RADIANS)
    openings = [_opening(each.errors) for each in (short, long)]
    misfit = abs(openings[1] - 2.0 * openings[0]) / FINITE_STEP_RADIANS**2
    freedom = 0
    if misfit <= limit:
        matrix = constraint_matrix(long.linkage, subject.topology, long.bodies)
        freedom = len(freedom_of(matrix, lambda: subject.tolerance).motions)
    return _Reached(openings[1], misfit, freedom)


def _opening(errors: Matrix) -> float:
    """What would be open if the errors, spread over all joints by the least squares, stood at one joint alone."""
    greatest = float(np.abs(errors).max(initial=0.0))
    return float(errors @ errors) / greatest if greatest else 0.0


def _closed(subject: _Subject, direction: Matrix, turn: float) -> Displaced:
    """Go so far along a motion and close the joints again as well as can be; the amount of the motion is held."""
    linkage, topology, bodies, tolerance = subject
    displacement = direction * (turn / _fastest_turn(direction, bodies, linkage.frame))
    there = displace(linkage, bodies, displacement)
    for _ in range(FINITE_STEP_TURNS):
        matrix = constraint_matrix(there.linkage, topology, there.bodies)
        held = np.vstack([matrix, direction])
        correction = np.linalg.lstsq(held, np.append(-there.errors, 0.0), rcond=tolerance)[0]
        if np.abs(correction).max(initial=0.0) <= RANK_NOISE * np.abs(displacement).max():
            break
        displacement = displacement + correction
        there = displace(linkage, bodies, displacement)
    return there


def _fastest_turn(direction: Matrix, bodies: list[Body], frame: int) -> float:
    """The greatest angle, or way over size, that any link goes in a motion."""
    sizes = np.array([body.size for number, body in enumerate(bodies) if number != frame])
    ways: Matrix = np.abs(direction).reshape(-1, 3)
    return float(max((ways[:, 0] / sizes).max(), ways[:, 1:].max() / sizes.max()))
