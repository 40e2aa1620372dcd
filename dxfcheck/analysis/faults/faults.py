"""Who is at fault where a linkage is not simply driven and solved: what is locked, repeats, is free or idle."""

from __future__ import annotations

from typing import NamedTuple

from dxfcheck.analysis.faults.dependence import dependent_joints
from dxfcheck.analysis.faults.drive_choice import settling_drives
from dxfcheck.analysis.faults.free_parts import free_parts
from dxfcheck.analysis.faults.idle_links import idle_links
from dxfcheck.analysis.faults.locked_parts import has_still_joint, locked_parts
from dxfcheck.analysis.faults.rigid_parts import rigid_parts
from dxfcheck.analysis.freedom.constraints import Body, Matrix
from dxfcheck.analysis.results import (
    DependentJoints,
    FreePart,
    IdleLink,
    LockedPart,
    Mobility,
    RigidParts,
    SettlingDrive,
)
from dxfcheck.analysis.speeds.velocity import Motion
from dxfcheck.analysis.topology import Topology
from dxfcheck.linkage import Linkage

__all__ = ["Faults", "faults_of", "faults_without_frame"]


class Faults(NamedTuple):
    """As the fields of Analysis of the same names."""

    rigid_parts: RigidParts | None = None
    locked_parts: tuple[LockedPart, ...] = ()
    dependent_joints: tuple[DependentJoints, ...] = ()
    free_parts: tuple[FreePart, ...] = ()
    idle_links: tuple[IdleLink, ...] = ()
    settling_drives: tuple[SettlingDrive, ...] = ()


NO_FAULTS = Faults()


def faults_of(
    linkage: Linkage,
    topology: Topology,
    mobility: Mobility,
    motions: Matrix,
    motion: Motion,
    *,
    solved: bool,
) -> Faults:
    """Of a linkage on a frame; ``motions`` are those that the constraints allow, ``motion`` what the drives chose.

    Nothing is worked out for a linkage that is solved, whose count is right and whose joints all run.
    """
    if solved and not _is_unusual(mobility) and not has_still_joint(linkage, motion):
        return NO_FAULTS
    rigid = rigid_parts(linkage, topology, motion.bodies, motions)
    dependent = _dependent(linkage, topology, motion.bodies, mobility)
    locked = locked_parts(linkage, rigid, dependent)
    if solved:
        return Faults(rigid, locked, dependent)
    free, idle = free_parts(linkage, motion), idle_links(linkage, motion)
    return Faults(rigid, locked, dependent, free, idle, settling_drives(linkage, motion, free, idle) if free else ())


def faults_without_frame(
    linkage: Linkage, topology: Topology, bodies: list[Body], mobility: Mobility, motions: Matrix
) -> Faults:
    """Of an assembly that nothing ties to a frame: no drive is judged there, so nothing is called free."""
    if not _is_unusual(mobility):
        return NO_FAULTS
    return Faults(
        rigid_parts=rigid_parts(linkage, topology, bodies, motions),
        dependent_joints=_dependent(linkage, topology, bodies, mobility),
    )


def _dependent(
    linkage: Linkage, topology: Topology, bodies: list[Body], mobility: Mobility
) -> tuple[DependentJoints, ...]:
    return dependent_joints(linkage, topology, bodies) if mobility.redundant else ()


def _is_unusual(mobility: Mobility) -> bool:
    """Whether the count says less than there is, or that nothing can move: then parts are looked at for themselves."""
    return mobility.at_pose != mobility.count or mobility.count <= 0
