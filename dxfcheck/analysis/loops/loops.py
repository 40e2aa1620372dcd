"""The independent loops of a linkage: closed chains of links, as few links each as can be.

Links and places (a pin with all its links, or another joint with its two) are the nodes of one graph, so that two
links that share two pins are a loop of two. Nodes are integers and are visited in ascending order: no result depends
on how strings hash.
"""

from __future__ import annotations

from functools import lru_cache
from typing import NamedTuple

from dxfcheck.analysis.loops.short_loops import short_cycles
from dxfcheck.analysis.topology import TOPOLOGIES_KEPT, Topology
from dxfcheck.tolerances.analysis import DENSE_LINKS

__all__ = ["Loop", "Place", "independent_loops", "link_loops", "places_of"]


class Place(NamedTuple):
    """Where links meet: the links, and the joints (indices) among them."""

    links: tuple[int, ...]
    joints: tuple[int, ...]


class Loop(NamedTuple):
    """A closed chain: ``places[k]`` joins ``links[k]`` to ``links[k + 1]``, the last one back to the first."""

    links: tuple[int, ...]
    places: tuple[int, ...]


@lru_cache(maxsize=TOPOLOGIES_KEPT)
def places_of(topology: Topology) -> tuple[Place, ...]:
    """Every place where links meet: all pin joints at one pin are one place, any other joint is one of its own."""
    groups: dict[tuple[str, int], list[int]] = {}
    for index, joint in enumerate(topology.joints):
        at_pin = joint.kind == "pin" and joint.pin is not None
        groups.setdefault(("pin", joint.pin or 0) if at_pin else ("joint", index), []).append(index)
    places = []
    for joints in groups.values():
        ends = [link for index in joints for link in (topology.joints[index].first, topology.joints[index].second)]
        places.append(Place(tuple(sorted(set(ends))), tuple(joints)))
    return tuple(places)


@lru_cache(maxsize=TOPOLOGIES_KEPT)
def independent_loops(topology: Topology) -> tuple[Loop, ...]:
    """A basis of the linkage's loops, shortest first; each starts at the frame, or else at its lowest link.

    In a small linkage there is no shorter one; in a large one the search for short loops is bounded.
    """
    neighbours = _neighbours(topology)
    if topology.links > DENSE_LINKS:
        cycles = short_cycles(neighbours, topology.links, topology.frame)
    else:
        # Imported here because networkx takes 16 MB and 0.1 s, which a sheet with one large linkage need not pay.
        from dxfcheck.analysis.loops.shortest_loops import shortest_cycles  # noqa: PLC0415

        cycles = shortest_cycles(neighbours, topology.links)
    loops = [_oriented(cycle, topology) for cycle in cycles]
    return tuple(sorted(loops, key=lambda loop: (len(loop.links), loop.links, loop.places)))


def _neighbours(topology: Topology) -> list[list[int]]:
    """The places of each link, and the links of each place; links are nodes 0, 1, ..., places follow them."""
    places = places_of(topology)
    neighbours: list[list[int]] = [[] for _ in range(topology.links + len(places))]
    for number, place in enumerate(places, start=topology.links):
        neighbours[number] = list(place.links)
        for link in place.links:
            neighbours[link].append(number)
    return neighbours


def link_loops(topology: Topology) -> tuple[tuple[int, ...], ...]:
    """The links of each independent loop, in cyclic order."""
    return tuple([loop.links for loop in independent_loops(topology)])


def _oriented(cycle: tuple[int, ...], topology: Topology) -> Loop:
    """The loop from the frame (else the lowest link) on, towards the lower of the two neighbours."""
    start = cycle.index(topology.frame) if topology.frame in cycle else cycle.index(min(cycle))
    turned = cycle[start:] + cycle[:start]
    if turned[2:] and (turned[2], turned[1]) > (turned[-2], turned[-1]):
        turned = turned[:1] + turned[:0:-1]
    places = tuple([node - topology.links for node in turned[1::2]])
    return Loop(turned[0::2], places)
