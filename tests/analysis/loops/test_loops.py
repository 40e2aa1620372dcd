from __future__ import annotations

import networkx as nx
import pytest
from hypothesis import given
from hypothesis import strategies as st

from dxfcheck.analysis.loops.loops import independent_loops, link_loops, places_of
from dxfcheck.analysis.topology import JointPlace, Topology, topology_of
from tests.examples import FOUR_BAR, FOUR_BAR_POINTS, STRAIGHT_LINE, STRAIGHT_LINE_POINTS, WATT, WATT_POINTS
from tests.model import linkage


def pins(links: int, *pairs: tuple[int, int], frame: int = 0) -> Topology:
    joints = [JointPlace("pin", first, second, number) for number, (first, second) in enumerate(pairs)]
    return Topology(links, frame, tuple(joints))


def test_four_bar_has_one_loop_from_the_frame_on() -> None:
    assert link_loops(topology_of(linkage(FOUR_BAR_POINTS, FOUR_BAR))) == ((0, 1, 2, 3),)


def test_six_bar_has_its_two_short_loops() -> None:
    assert link_loops(topology_of(linkage(WATT_POINTS, WATT))) == ((0, 1, 2, 3), (0, 3, 4, 5))


def test_two_links_that_share_two_pins_are_a_loop() -> None:
    assert link_loops(pins(2, (0, 1), (0, 1))) == ((0, 1),)


def test_open_chain_has_no_loop() -> None:
    assert link_loops(pins(3, (0, 1), (1, 2))) == ()


def test_loop_without_the_frame_starts_at_its_lowest_link() -> None:
    assert link_loops(pins(4, (3, 2), (2, 1), (1, 3), (0, 1))) == ((1, 2, 3),)


def test_direction_is_towards_the_lower_neighbour() -> None:
    assert link_loops(pins(4, (0, 3), (3, 1), (1, 2), (2, 0))) == ((0, 2, 1, 3),)


def test_held_link_need_not_be_the_first() -> None:
    assert link_loops(pins(3, (0, 1), (1, 2), (2, 0), frame=2)) == ((2, 0, 1),)


def test_pin_of_three_links_is_passed_directly() -> None:
    """Joints leave the pin's first link, but a loop through the other two does not hold the first."""
    topology = topology_of(linkage(STRAIGHT_LINE_POINTS, STRAIGHT_LINE))
    loops = link_loops(topology)
    assert len(loops) == len(topology.joints) - topology.links + 1
    assert sorted(map(len, loops)) == [4, 4, 4] or sum(map(len, loops)) <= 13
    for loop in independent_loops(topology):
        for place, pair in zip(loop.places, zip(loop.links, loop.links[1:] + loop.links[:1], strict=True), strict=True):
            assert set(pair) <= set(places_of(topology)[place].links)


graphs = st.integers(2, 7).flatmap(
    lambda links: st.lists(
        st.tuples(st.integers(0, links - 1), st.integers(0, links - 1)).filter(lambda pair: pair[0] != pair[1]),
        max_size=11,
    ).map(lambda pairs: pins(links, *pairs))
)


@given(graphs)
def test_basis_is_as_short_as_the_library_finds_it(topology: Topology) -> None:
    graph: nx.Graph[int] = nx.Graph()
    graph.add_nodes_from(range(topology.links))
    for number, place in enumerate(places_of(topology)):
        graph.add_edges_from([(link, topology.links + number) for link in place.links])
    expected = sorted(len(cycle) // 2 for cycle in nx.minimum_cycle_basis(graph))
    assert [len(loop) for loop in link_loops(topology)] == expected


@pytest.mark.parametrize("squares", [60])
def test_a_lattice_of_many_links(squares: int) -> None:
    pairs = sorted(nx.ladder_graph(squares).edges)
    loops = link_loops(pins(2 * squares, *pairs))
    assert [len(loop) for loop in loops] == [4] * (squares - 1)
