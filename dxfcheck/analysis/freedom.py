"""The freedom of a linkage at the drawn pose, whatever its size; and of some of its links taken for themselves."""

from __future__ import annotations

from dataclasses import replace
from functools import partial

from dxfcheck.analysis.constraints import Body, Freedom, bodies_of, constraint_matrix, freedom_of, rank_tolerance
from dxfcheck.analysis.elimination import freedom_by_fronts
from dxfcheck.analysis.topology import Topology, topology_of
from dxfcheck.linkage import Linkage
from dxfcheck.tolerances import DENSE_LINKS

__all__ = ["freedom_at_pose", "freedom_of_linkage", "part_of"]


def freedom_at_pose(linkage: Linkage, topology: Topology, bodies: list[Body]) -> Freedom:
    """By one matrix for a small linkage, a few links at a time for a large one."""
    if topology.links > DENSE_LINKS:
        return freedom_by_fronts(linkage, topology, bodies)
    return freedom_of(constraint_matrix(linkage, topology, bodies), partial(rank_tolerance, linkage))


def freedom_of_linkage(linkage: Linkage) -> Freedom:
    """The same for a linkage of which nothing is known yet."""
    return freedom_at_pose(linkage, topology_of(linkage), bodies_of(linkage))


def part_of(linkage: Linkage, links: tuple[int, ...], joints: tuple[int, ...] | None = None) -> Linkage:
    """Some links with the joints among them (or those given), the first of them held; without drives.

    The pins stay as they are: they are asked for their places only.
    """
    number = {link: place for place, link in enumerate(links)}
    chosen = linkage.joints if joints is None else [linkage.joints[joint] for joint in joints]
    return replace(
        linkage,
        links=tuple([linkage.links[link] for link in links]),
        joints=tuple(
            [
                replace(joint, first=number[joint.first], second=number[joint.second])
                for joint in chosen
                if joint.first in number and joint.second in number
            ]
        ),
        drives=(),
        frame=0,
    )
