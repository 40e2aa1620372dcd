"""Loops of large linkages against networkx's own shortest basis."""

from __future__ import annotations

import networkx as nx
import pytest

from dxfcheck.analysis.loops.loops import places_of
from dxfcheck.analysis.loops.short_loops import short_cycles
from dxfcheck.analysis.topology import Topology, topology_of
from tests.analysis.lattices import four_bar_chain, scissor_lattice
from tests.analysis.random_models import random_model


def graph_of(topology: Topology) -> list[list[int]]:
    places = places_of(topology)
    neighbours: list[list[int]] = [[] for _ in range(topology.links + len(places))]
    for number, place in enumerate(places, start=topology.links):
        for link in place.links:
            neighbours[number].append(link)
            neighbours[link].append(number)
    return neighbours


def as_networkx(neighbours: list[list[int]]) -> nx.Graph[int]:
    return nx.Graph((node, other) for node, around in enumerate(neighbours) for other in around)


def rank(cycles: list[tuple[int, ...]]) -> int:
    """Independent cycles among these, over the field of two elements."""
    edges: dict[frozenset[int], int] = {}
    pivots: dict[int, int] = {}
    for cycle in cycles:
        mask = 0
        for pair in zip(cycle, cycle[1:] + cycle[:1], strict=True):
            mask ^= 1 << edges.setdefault(frozenset(pair), len(edges))
        while mask and mask.bit_length() in pivots:
            mask ^= pivots[mask.bit_length()]
        if mask:
            pivots[mask.bit_length()] = mask
    return len(pivots)


def ring(links: int) -> Topology:
    """One loop of so many links."""
    joint = topology_of(scissor_lattice(2)).joints[0]
    joints = [joint._replace(first=link, second=(link + 1) % links, pin=link) for link in range(links)]
    return Topology(links, 0, tuple(joints))


@pytest.mark.parametrize("seed", range(25))
def test_basis_is_as_short_as_any(seed: int) -> None:
    topology = topology_of(random_model(seed, 16, coarse=seed % 2 == 0))
    neighbours = graph_of(topology)
    cycles = short_cycles(neighbours, topology.links, 0)
    shortest = nx.minimum_cycle_basis(as_networkx(neighbours))
    assert sorted(map(len, cycles)) == sorted(map(len, shortest))
    assert rank(cycles) == len(cycles)


@pytest.mark.parametrize(("model", "loops"), [(scissor_lattice(1000), 500), (four_bar_chain(500), 500)])
def test_lattices_and_chains_have_a_loop_of_four_links_a_cell(model: object, loops: int) -> None:
    topology = topology_of(model)  # type: ignore[arg-type]
    cycles = short_cycles(graph_of(topology), topology.links, 0)
    assert [len(cycle) for cycle in cycles] == [8] * loops
    assert rank(cycles) == loops


def test_a_loop_longer_than_any_search_is_found() -> None:
    topology = ring(400)
    (cycle,) = short_cycles(graph_of(topology), topology.links, 0)
    assert len(cycle) == 800


def test_long_and_short_loops_together_are_independent() -> None:
    topology = ring(300)
    more = [topology.joints[0]._replace(first=link, second=link + 150, pin=1000 + link) for link in range(0, 120, 40)]
    more += [topology.joints[0]._replace(first=link, second=link + 2, pin=2000 + link) for link in range(10, 90, 8)]
    topology = topology._replace(joints=(*topology.joints, *more))
    neighbours = graph_of(topology)
    cycles = short_cycles(neighbours, topology.links, 0)
    graph = as_networkx(neighbours)
    assert rank(cycles) == len(cycles) == graph.number_of_edges() - graph.number_of_nodes() + 1
    assert sum(len(cycle) == 6 for cycle in cycles) == 10


def test_a_tree_has_no_cycle() -> None:
    topology = ring(10)
    assert short_cycles(graph_of(topology._replace(joints=topology.joints[:-1])), 10, 0) == []


def test_cycles_begin_at_their_lowest_node_towards_its_lower_neighbour() -> None:
    topology = topology_of(scissor_lattice(200))
    for cycle in short_cycles(graph_of(topology), topology.links, 0):
        assert cycle[0] == min(cycle)
        assert cycle[1] < cycle[-1]
