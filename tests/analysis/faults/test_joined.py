from __future__ import annotations

import random

import networkx as nx

from dxfcheck.analysis.faults.joined import joined_groups


def test_links_hang_together_by_pairs_and_alone_without() -> None:
    assert joined_groups(range(6), [(4, 1), (1, 3), (3, 4), (0, 5)]) == [(0, 5), (1, 3, 4), (2,)]
    assert joined_groups([], []) == []


def test_groups_are_those_of_a_graph_library() -> None:
    chance = random.Random(3)  # noqa: S311 - a repeatable choice, nothing to guard
    for _ in range(50):
        pairs = [(chance.randrange(30), chance.randrange(30)) for _ in range(chance.randrange(40))]
        graph: nx.Graph[int] = nx.Graph(pairs)
        graph.add_nodes_from(range(30))
        assert set(joined_groups(range(30), pairs)) == {tuple(sorted(part)) for part in nx.connected_components(graph)}
