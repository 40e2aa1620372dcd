"""Joints of one mechanism in both drawings, each brought to the names and directions of the new one."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Mapping
from typing import NamedTuple

from dxfcheck.comparison.motion import SheetMotion
from dxfcheck.comparison.pairing import Pairing
from dxfcheck.geometry import dot
from dxfcheck.linkage import Joint, JointKind, Linkage

__all__ = ["JointPair", "JointPairs", "joint_name", "pair_joints"]

Key = tuple[JointKind, frozenset[int], int | None]


class JointPair(NamedTuple):
    """One joint in both drawings (indices). ``sign`` brings the old one's relative motion to the new one's sense.

    It is -1 where first and second link are the other way round, or, for what slides, where the direction is.
    """

    old: int
    new: int
    sign: int


class JointPairs(NamedTuple):
    """The joints in both drawings, and those (indices) in one only."""

    both: tuple[JointPair, ...]
    gone: tuple[int, ...]
    added: tuple[int, ...]


def pair_joints(old: Linkage, new: Linkage, pairing: Pairing, motion: SheetMotion, scale: float) -> JointPairs:
    """Joints of one kind between the same links at the same pin are one; of several the nearest."""
    waiting: defaultdict[Key, list[int]] = defaultdict(list)
    for number, joint in enumerate(new.joints):
        waiting[joint.kind, frozenset((joint.first, joint.second)), joint.pin].append(number)
    both, gone = [], []
    for number, joint in enumerate(old.joints):
        key = _key(joint, pairing)
        there = waiting[key] if key is not None and key in waiting else []
        place = motion(joint.at * scale)
        nearest = min(there, key=lambda other: abs(new.joints[other].at - place), default=None)
        if nearest is None:
            gone.append(number)
        else:
            there.remove(nearest)
            sign = _sign(joint, new.joints[nearest], pairing.links, motion)
            both.append(JointPair(number, nearest, sign))
    return JointPairs(tuple(both), tuple(gone), tuple(sorted(number for left in waiting.values() for number in left)))


def _key(joint: Joint, pairing: Pairing) -> Key | None:
    """What the joint would go by in the new drawing; None where a part of it is not there."""
    links = pairing.links.get(joint.first), pairing.links.get(joint.second)
    pin = None if joint.pin is None else pairing.pins.get(joint.pin)
    if links[0] is None or links[1] is None or (pin is None) != (joint.pin is None):
        return None
    return joint.kind, frozenset((links[0], links[1])), pin


def _sign(old: Joint, new: Joint, links: Mapping[int, int], motion: SheetMotion) -> int:
    sign = 1 if links[old.first] == new.first else -1
    if old.direction is not None and new.direction is not None and dot(motion.vector(old.direction), new.direction) < 0:
        sign = -sign
    return sign


def joint_name(linkage: Linkage, joint: Joint) -> str:
    """'C (A-B, B-C)', 'slide of block at E on frame', 'pin D in the slot of C-T', 'rolling of F and G'."""
    first, second = linkage.links[joint.first].name, linkage.links[joint.second].name
    pin = "" if joint.pin is None else linkage.pins[joint.pin].name
    names = {
        "pin": f"{pin} ({first}, {second})",
        "slide": f"slide of {second} and {first}",
        "pin in slot": f"pin {pin} in slot, of {first} and {second}",
        "rolling": f"rolling of {first} and {second}",
    }
    return names[joint.kind]
