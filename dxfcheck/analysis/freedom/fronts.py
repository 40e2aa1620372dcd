"""In which order the links of a large linkage are dealt with: a few neighbours at a time, outermost first.

Dealing with a group of links turns what its joints demand into demands on the links around it, its border. The order
decides how wide borders grow: the link with the fewest neighbours comes first (least degree, after H.M. Markowitz, The
elimination form of the inverse and its application to linear programming, Management Science 3, 1957; from memory),
with a few neighbours that widen the border no further, since one step with twelve unknowns costs less than four with
three. A chain or a lattice is then dealt with from its ends, with borders of a link or two whatever its length.
"""

from __future__ import annotations

from collections.abc import Sequence
from heapq import heapify, heappop, heappush
from typing import NamedTuple

from dxfcheck.analysis.topology import Topology

__all__ = ["Front", "fronts_of"]

LINKS_OF_FRONT = 6
"""At most so many links are dealt with in one step; larger steps cost less a link, but the singular values of more rows
at once are smaller."""

WIDEST_JOINED = 8
"""Behind a border of more links than this no further link is looked for."""


class Front(NamedTuple):
    """One step: the links it deals with, the links around them, its own joints, and the earlier steps it takes up.

    ``conditions`` are the further constraints that come with it.
    """

    links: tuple[int, ...]
    border: tuple[int, ...]
    joints: tuple[int, ...]
    parts: tuple[int, ...]
    conditions: tuple[int, ...] = ()


def fronts_of(topology: Topology, conditions: Sequence[set[int]] = (), last: int = -1) -> list[Front]:
    """Every moving link once, each joint with the first of its links; a step comes after those whose border it meets.

    The frame is at rest and is nobody's neighbour. ``conditions`` are the moving links of each further constraint;
    ``last`` is a link to be dealt with after all others.
    """
    neighbours, joints_at = _neighbours_of(topology)
    told_at: list[list[int]] = [[] for _ in range(topology.links)]
    for number, related in enumerate(conditions):
        for link in related:
            neighbours[link] |= related - {link}
            told_at[link].append(number)

    def place_in_order(link: int) -> int:
        return len(neighbours[link]) + (topology.links if link == last else 0)

    waiting = [(place_in_order(link), link) for link in range(topology.links) if link != topology.frame]
    heapify(waiting)
    done = [False] * topology.links
    placed: set[int] = set()
    told: set[int] = set()
    parts_at: list[set[int]] = [set() for _ in range(topology.links)]
    fronts: list[Front] = []
    while waiting:
        degree, link = heappop(waiting)
        if done[link] or degree != place_in_order(link):
            continue
        links, border = _group_of(link, neighbours, last)
        parts = sorted(set().union(*[parts_at[member] for member in links]))
        for part in parts:
            for outer in fronts[part].border:
                parts_at[outer].discard(part)
        for member in links:
            done[member] = True
        for outer in border:
            _close_up(neighbours, outer, links, border)
            heappush(waiting, (place_in_order(outer), outer))
            parts_at[outer].add(len(fronts))
        joints = _not_yet(links, joints_at, placed)
        fronts.append(Front(tuple(links), tuple(sorted(border)), joints, tuple(parts), _not_yet(links, told_at, told)))
    return fronts


def _close_up(neighbours: list[set[int]], outer: int, links: list[int], border: set[int]) -> None:
    """What is left over relates every link of a border to every other, in the place of the links dealt with."""
    around = neighbours[outer]
    around.difference_update(links)
    around |= border
    around.discard(outer)


def _not_yet(links: list[int], at: list[list[int]], placed: set[int]) -> tuple[int, ...]:
    """What is at these links and has no place yet; it has one from now on."""
    found = []
    for link in links:
        for number in at[link]:
            if number not in placed:
                placed.add(number)
                found.append(number)
    return tuple(found)


def _neighbours_of(topology: Topology) -> tuple[list[set[int]], list[list[int]]]:
    """The moving links joined to each link, and its joints."""
    neighbours: list[set[int]] = [set() for _ in range(topology.links)]
    joints_at: list[list[int]] = [[] for _ in range(topology.links)]
    frame = topology.frame
    for number, joint in enumerate(topology.joints):
        first, second = joint.first, joint.second
        joints_at[first].append(number)
        joints_at[second].append(number)
        if frame not in (first, second) and first != second:
            neighbours[first].add(second)
            neighbours[second].add(first)
    return neighbours, joints_at


def _group_of(link: int, neighbours: list[set[int]], last: int) -> tuple[list[int], set[int]]:
    """A link and a few more that widen its border no further; with the border."""
    links, border = [link], set(neighbours[link])
    while border and len(links) < LINKS_OF_FRONT and len(border) <= WIDEST_JOINED:
        fewest, best, added = 2, -1, set[int]()
        for other in border:
            if other == last or len(neighbours[other]) >= len(border) + len(links) + fewest:
                continue
            new = neighbours[other].difference(border, links)
            if (len(new), other) < (fewest, best):
                fewest, best, added = len(new), other, new
        if best < 0:
            break
        links.append(best)
        border |= added
        border.discard(best)
    return links, border
