"""The independent loops of a linkage: closed chains of links, as few links each as can be.

Links and places (a pin with all its links, or another joint with its two) are the nodes of one graph, so that two
links that share two pins are a loop of two. Nodes are integers and are visited in ascending order: no result depends
on how strings hash.
"""

from __future__ import annotations

from functools import lru_cache
from typing import NamedTuple

import networkx as nx

from dxfcheck.analysis.short_loops import short_cycles
from dxfcheck.analysis.topology import TOPOLOGIES_KEPT, Topology
from dxfcheck.tolerances import DENSE_LINKS

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

    Candidates are all cycles made of two shortest paths from one link and the edge that closes them; the shortest
    independent ones are kept (J.D. Horton, A polynomial-time algorithm to find the shortest cycle basis of a graph,
    SIAM J. Computing 16, 1987; from memory). networkx's own minimum_cycle_basis took 70 s for 240 links, this 1 s; in
    large linkages the search is bounded (short_loops.py).
    """
    if topology.links > DENSE_LINKS:
        cycles = short_cycles(_neighbours(topology), topology.links, topology.frame)
        return _sorted([_oriented(cycle, topology) for cycle in cycles])
    graph = _graph_of(topology)
    wanted = graph.number_of_edges() - graph.number_of_nodes() + nx.number_connected_components(graph)
    bits = {frozenset(edge): 1 << number for number, edge in enumerate(graph.edges)}
    kept: list[Loop] = []
    pivots: dict[int, int] = {}
    for cycle in _candidates(graph, topology) if wanted else ():
        mask = sum(bits[frozenset(pair)] for pair in zip(cycle, cycle[1:] + cycle[:1], strict=True))
        if _is_new(mask, pivots):
            kept.append(_oriented(cycle, topology))
        if len(kept) == wanted:
            break
    return _sorted(kept)


def _sorted(loops: list[Loop]) -> tuple[Loop, ...]:
    return tuple(sorted(loops, key=lambda loop: (len(loop.links), loop.links, loop.places)))


def _neighbours(topology: Topology) -> list[list[int]]:
    """The graph of _graph_of as lists: the places of each link, and the links of each place."""
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


def _graph_of(topology: Topology) -> nx.Graph[int]:
    """Links are nodes 0, 1, ...; places follow them."""
    graph: nx.Graph[int] = nx.Graph()
    graph.add_nodes_from(range(topology.links))
    for number, place in enumerate(places_of(topology)):
        graph.add_edges_from([(link, topology.links + number) for link in place.links])
    return graph


def _candidates(graph: nx.Graph[int], topology: Topology) -> list[tuple[int, ...]]:
    """Cycles of nodes that hold a shortest basis, shortest first, each once for the link it was found from."""
    found: set[tuple[int, ...]] = set()
    for root in range(topology.links):
        parent = dict(nx.bfs_predecessors(graph, root))
        for one, other in graph.edges:
            if one != root and one not in parent:
                continue
            if parent.get(one) != other and parent.get(other) != one:
                found.add(_closed_by(one, other, parent, root))
    return sorted(found, key=lambda cycle: (len(cycle), cycle))


def _closed_by(one: int, other: int, parent: dict[int, int], root: int) -> tuple[int, ...]:
    """The cycle that an edge closes with the tree, written from its lowest node towards the lower neighbour."""
    left, right = _path(one, parent, root), _path(other, parent, root)
    while len(left) > 1 and len(right) > 1 and left[-2] == right[-2]:
        left.pop()
        right.pop()
    return _canonical(left + right[-2::-1])


def _path(node: int, parent: dict[int, int], root: int) -> list[int]:
    path = [node]
    while node != root:
        node = parent[node]
        path.append(node)
    return path


def _canonical(cycle: list[int]) -> tuple[int, ...]:
    start = cycle.index(min(cycle))
    turned = cycle[start:] + cycle[:start]
    return tuple(turned if turned[1] < turned[-1] else turned[:1] + turned[:0:-1])


def _is_new(mask: int, pivots: dict[int, int]) -> bool:
    """Whether a set of edges is independent of those before it (over the field of two elements); then it is added."""
    while mask:
        top = mask.bit_length()
        if top not in pivots:
            pivots[top] = mask
            return True
        mask ^= pivots[top]
    return False


def _oriented(cycle: tuple[int, ...], topology: Topology) -> Loop:
    """The loop from the frame (else the lowest link) on, towards the lower of the two neighbours."""
    start = cycle.index(topology.frame) if topology.frame in cycle else cycle.index(min(cycle))
    turned = cycle[start:] + cycle[:start]
    if turned[2:] and (turned[2], turned[1]) > (turned[-2], turned[-1]):
        turned = turned[:1] + turned[:0:-1]
    places = tuple([node - topology.links for node in turned[1::2]])
    return Loop(turned[0::2], places)
