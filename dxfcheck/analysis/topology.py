"""Which link is joined to which, without any place: what linkages drawn many times over have in common.

A sheet of a thousand four-bars holds one topology; what follows from it alone is worked out once and cached.
"""

from __future__ import annotations

from typing import NamedTuple

from dxfcheck.linkage import JointKind, Linkage

__all__ = ["TOPOLOGIES_KEPT", "JointPlace", "Topology", "topology_of"]

TOPOLOGIES_KEPT = 512
"""How many different topologies a run remembers; one sheet seldom holds ten."""


class JointPlace(NamedTuple):
    """One joint: its kind, its two links, and the pin it sits at (None where it sits at none)."""

    kind: JointKind
    first: int
    second: int
    pin: int | None
    full: bool = False

    @property
    def acts_as(self) -> JointKind:
        """The kind that holds the two links alike at the drawn pose: a rolling contact that is full acts as a pin."""
        return "pin" if self.full and self.kind == "rolling" else self.kind


class Topology(NamedTuple):
    """The joints among ``links`` links, of which number ``frame`` is held. Hashable: the key of every cache."""

    links: int
    frame: int
    joints: tuple[JointPlace, ...]


def topology_of(linkage: Linkage) -> Topology:
    """The linkage without its places."""
    joints = tuple(
        [JointPlace(joint.kind, joint.first, joint.second, joint.pin, joint.full) for joint in linkage.joints]
    )
    return Topology(len(linkage.links), linkage.frame, joints)
