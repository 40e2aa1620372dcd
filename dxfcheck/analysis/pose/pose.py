"""How good the drawn pose is: what stands near a dead centre, how pushes pass on, what a step and small errors show."""

from __future__ import annotations

import math
from typing import NamedTuple

from dxfcheck.analysis.freedom.constraints import Body, Freedom, rank_tolerance
from dxfcheck.analysis.pose.dead_centres import dead_centres
from dxfcheck.analysis.pose.finite_motion import finite_motion
from dxfcheck.analysis.pose.sensitivity import speed_bounds
from dxfcheck.analysis.pose.transmission import transmissions
from dxfcheck.analysis.results import DeadCentre, FiniteMotion, Mobility, SpeedBounds, Transmission
from dxfcheck.analysis.speeds.velocity import Motion
from dxfcheck.analysis.topology import Topology
from dxfcheck.linkage import Linkage
from dxfcheck.tolerances.analysis import DEAD_CENTRE_RADIANS, NEAR_DEAD_CENTRE_DEGREES, TRUST_OF_SIZE

__all__ = ["Pose", "bounds_of", "finite_of", "pose_of"]


class Pose(NamedTuple):
    """Dead centres, what is near one, and where links push one another away from the drives."""

    dead_centres: tuple[DeadCentre, ...]
    near_dead_centres: tuple[DeadCentre, ...]
    transmissions: tuple[Transmission, ...]


def pose_of(linkage: Linkage) -> Pose:
    """All neighbours that some pose could keep from driving one another, sorted by how near this one is to it."""
    pairs = dead_centres(linkage, math.pi / 2.0)
    near = math.radians(NEAR_DEAD_CENTRE_DEGREES)
    return Pose(
        dead_centres=tuple([pair for pair in pairs if pair.angle <= DEAD_CENTRE_RADIANS]),
        near_dead_centres=tuple([pair for pair in pairs if DEAD_CENTRE_RADIANS < pair.angle <= near]),
        transmissions=transmissions(linkage, pairs),
    )


def finite_of(linkage: Linkage, bodies: list[Body], freedom: Freedom, mobility: Mobility) -> FiniteMotion | None:
    """Finite steps where there is more freedom at the pose than the count gives; else there is nothing to ask."""
    if mobility.at_pose <= max(mobility.count, 0) or not linkage.grounded:
        return None
    across = [pin.at.real for pin in linkage.pins]
    up = [pin.at.imag for pin in linkage.pins]
    diagonal = math.hypot(max(across) - min(across), max(up) - min(up)) if linkage.pins else 0.0
    size = diagonal or max(body.size for body in bodies)
    return finite_motion(linkage, bodies, freedom.motions, rank_tolerance(linkage), size)


def bounds_of(linkage: Linkage, topology: Topology, motion: Motion, *, wanted: bool) -> SpeedBounds | None:
    """What speeds may be off by; where nobody wants to see it, only if the drawing is coarse enough to matter."""
    smallest = min(body.size for body in motion.bodies)
    if not wanted and linkage.resolution <= TRUST_OF_SIZE * smallest:
        return None
    return speed_bounds(linkage, topology, motion, linkage.resolution)
