"""Rigid sub-structures one by one: how many constraints they have too many, and what would free them."""

from __future__ import annotations

from collections.abc import Sequence

from dxfcheck.analysis.faults.rigid_parts import rigid_parts
from dxfcheck.analysis.freedom.constraints import bodies_of, rows_of_joint
from dxfcheck.analysis.freedom.freedom import freedom_at_pose, part_of
from dxfcheck.analysis.results import DependentJoints, LockedPart, RigidParts
from dxfcheck.analysis.speeds.velocity import Motion
from dxfcheck.analysis.topology import topology_of
from dxfcheck.linkage import Linkage
from dxfcheck.tolerances.analysis import FREED_LINKS, STILL_JOINT

__all__ = ["has_still_joint", "locked_parts"]


def has_still_joint(linkage: Linkage, motion: Motion) -> bool:
    """Whether some joint of a solved linkage does not run: without one, no two links are rigid with one another."""
    least = STILL_JOINT * motion.fastest
    at_pin: dict[int, list[int]] = {}
    for joint in linkage.joints:
        if joint.kind != "pin" or joint.pin is None:
            apart = motion.velocity(joint.second, joint.at) - motion.velocity(joint.first, joint.at)
            if abs(apart) <= least and _turn_alike(motion, joint.first, joint.second, least):
                return True
            continue
        there = at_pin.setdefault(joint.pin, [joint.first])
        if any(_turn_alike(motion, link, joint.second, least) for link in there):
            return True
        there.append(joint.second)
    return False


def _turn_alike(motion: Motion, first: int, second: int, least: float) -> bool:
    size = min(motion.bodies[first].size, motion.bodies[second].size)
    return abs(motion.turns[second] - motion.turns[first]) * size <= least


def locked_parts(linkage: Linkage, rigid: RigidParts, dependent: Sequence[DependentJoints]) -> tuple[LockedPart, ...]:
    """The parts that are rigid with the frame, taken apart where only the frame joins them, and the others."""
    held = [_locked(linkage, part, dependent, with_frame=True) for part in _apart(linkage, rigid.with_frame)]
    return (*held, *[_locked(linkage, part, dependent, with_frame=False) for part in rigid.others])


def _apart(linkage: Linkage, links: tuple[int, ...]) -> list[tuple[int, ...]]:
    """Links in groups that hang together otherwise than through the frame."""
    leader = {link: link for link in links}

    def first_of(link: int) -> int:
        while leader[link] != link:
            link = leader[link]
        return link

    at_pin: dict[int, int] = {}
    for joint in linkage.joints:
        ends = [link for link in (joint.first, joint.second) if link in leader]
        if joint.kind == "pin" and joint.pin is not None and ends and not linkage.pins[joint.pin].fixed:
            ends.append(at_pin.setdefault(joint.pin, ends[0]))
        elif joint.kind == "pin" and joint.pin is not None:
            continue
        for end in ends[1:]:
            leader[first_of(end)] = first_of(ends[0])
    groups: dict[int, list[int]] = {}
    for link in links:
        groups.setdefault(first_of(link), []).append(link)
    return [tuple(group) for group in groups.values()]


def _locked(
    linkage: Linkage, links: tuple[int, ...], dependent: Sequence[DependentJoints], *, with_frame: bool
) -> LockedPart:
    whole = (linkage.frame, *links) if with_frame else links
    part = part_of(linkage, whole)
    topology = topology_of(part)
    rows = sum([rows_of_joint(joint.acts_as) for joint in topology.joints])
    redundant = rows - 3 * (len(whole) - 1)
    if redundant:
        among = set(whole)
        to_go = {link for each in dependent for link in each.links_to_go if link in among}
        return LockedPart(links, with_frame, redundant, tuple(sorted(to_go)))
    return LockedPart(links, with_frame, 0, _freeing(linkage, links, whole))


def _freeing(linkage: Linkage, links: tuple[int, ...], whole: tuple[int, ...]) -> tuple[int, ...]:
    """The links, each of which, taken out, adds one freedom and leaves as few others as any still locked."""
    if not 1 < len(links) <= FREED_LINKS:
        return ()
    still: dict[int, int] = {}
    for link in links:
        rest = part_of(linkage, tuple([other for other in whole if other != link]))
        topology, bodies = topology_of(rest), bodies_of(rest)
        motions = freedom_at_pose(rest, topology, bodies).motions
        if len(motions) == 1:
            left = rigid_parts(rest, topology, bodies, motions)
            still[link] = len(left.with_frame) + sum([len(part) for part in left.others])
    fewest = min(still.values(), default=0)
    return tuple([link for link, count in still.items() if count == fewest])
