"""The freedom of a linkage at the drawn pose, whatever its size; and of some of its links taken for themselves."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace
from functools import partial

from dxfcheck.analysis.freedom.constraints import (
    Body,
    Freedom,
    bodies_of,
    constraint_matrix,
    freedom_of,
    rank_tolerance,
)
from dxfcheck.analysis.freedom.elimination import freedom_by_fronts
from dxfcheck.analysis.topology import Topology, topology_of
from dxfcheck.linkage import Joint, Linkage
from dxfcheck.tolerances.analysis import DENSE_LINKS

__all__ = ["freedom_at_pose", "freedom_of_linkage", "part_of"]


def freedom_at_pose(linkage: Linkage, topology: Topology, bodies: list[Body]) -> Freedom:
    """By one matrix for a small linkage, a few links at a time for a large one."""
    if topology.links > DENSE_LINKS:
        return freedom_by_fronts(linkage, topology, bodies)
    return freedom_of(constraint_matrix(linkage, topology, bodies), partial(rank_tolerance, linkage))


def freedom_of_linkage(linkage: Linkage) -> Freedom:
    """The same for a linkage of which nothing is known yet."""
    return freedom_at_pose(linkage, topology_of(linkage), bodies_of(linkage))


def part_of(linkage: Linkage, links: tuple[int, ...]) -> Linkage:
    """Some links with the joints among them, the first of them held; without drives.

    The pins stay as they are: they are asked for their places only.
    """
    number = {link: place for place, link in enumerate(links)}
    return replace(
        linkage,
        links=tuple([linkage.links[link] for link in links]),
        joints=tuple(_among(linkage, number)),
        drives=(),
        frame=0,
    )


def _among(linkage: Linkage, number: dict[int, int]) -> Iterator[Joint]:
    """The joints among some links; what hung at a pin on a link that is left out hangs on another that is there."""
    at_pin: dict[int, list[int]] = {}
    for joint in linkage.joints:
        ends = [number[link] for link in (joint.first, joint.second) if link in number]
        if joint.kind == "pin" and joint.pin is not None:
            there = at_pin.setdefault(joint.pin, ends[:1])
            new = [link for link in ends if link not in there]
            ends = [*there[:1], *new] if new and there else []
            there += new
        if len(ends) > 1:
            yield replace(joint, first=ends[0], second=ends[1])
