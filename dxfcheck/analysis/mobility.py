"""The mobility count of a planar linkage."""

from __future__ import annotations

from dxfcheck.analysis.results import Mobility
from dxfcheck.linkage import Joint, JointKind, Linkage

__all__ = ["FULL_JOINTS", "count_mobility"]

FULL_JOINTS: frozenset[JointKind] = frozenset({"pin", "slide"})
"""Joints that leave one relative freedom; the others leave two, but for a rolling contact that nothing else holds."""


def count_mobility(linkage: Linkage, at_pose: int) -> Mobility:
    """Gruebler's count M = 3 (n - 1) - 2 f - h, n with the frame, and the freedom found at the pose beside it.

    A pin of k links is k - 1 joints of the linkage already. Source: R.L. Norton, Design of Machinery, ch. 2
    (from memory).
    """
    links = len(linkage.links)
    full = sum([_is_full(joint) for joint in linkage.joints])
    half = len(linkage.joints) - full
    count = 3 * (links - 1) - 2 * full - half
    return Mobility(count=count, links=links, full_joints=full, half_joints=half, at_pose=at_pose)


def _is_full(joint: Joint) -> bool:
    return joint.kind in FULL_JOINTS or (joint.full and joint.kind == "rolling")
