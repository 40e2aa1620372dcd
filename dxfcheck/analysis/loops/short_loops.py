"""Independent loops of a large linkage, at a cost in step with its links.

Short cycles are looked for round every link in turn, within a few steps of it; the link is then left out, since every
cycle through it was seen. Links with many joints come first: what remains falls apart into small pieces. Cycles are
kept shortest first where they are independent (J.D. Horton, A polynomial-time algorithm to find the shortest cycle
basis of a graph, SIAM J. Computing 16, 1987, with the search bounded; from memory). Each kept cycle settles one edge,
the last of the sum it was reduced to. The graph without the settled edges holds the cycles that are missing, and no
combination of the kept ones: its own fundamental cycles complete the basis.
"""

from __future__ import annotations

from collections import deque
from collections.abc import Iterator, Sequence
from typing import NamedTuple

__all__ = ["short_cycles"]

Cycle = tuple[int, ...]
Neighbours = Sequence[Sequence[int]]

REACHES = (4, 6, 8, 12)
"""So many steps from link to place to link are looked ahead, in rounds: loops of up to so many links are found."""

NODES_LOOKED_AT = 300
"""Round a link no more than so many links and places are looked at, and so many more for each of its joints."""

NODES_FOR_EACH_JOINT = 20


def short_cycles(neighbours: Neighbours, links: int, start: int) -> list[Cycle]:
    """A basis of the cycles of a graph whose nodes up to ``links`` are links; what lies near ``start`` comes first.

    Cycles begin at their lowest node and run towards its lower neighbour.
    """
    around = _without_ends(neighbours)
    place, parts = _in_order(around, start)
    wanted = sum([len(others) for others in around]) // 2 - len(place) + parts
    edges = _Edges(place, len(around))
    kept: list[Cycle] = []
    settled: dict[int, frozenset[int]] = {}
    seen: set[Cycle] = set()
    for reach in REACHES:
        if len(kept) == wanted:
            return kept
        found = [cycle for cycle in _round_every_link(around, links, reach) if cycle not in seen]
        seen.update(found)
        found.sort(key=lambda cycle: (len(cycle), cycle))
        kept += [cycle for cycle in found if _is_new(edges.of(cycle), settled)]
    if len(kept) < wanted:
        rest = [
            [other for other in others if edges.number(node, other) not in settled]
            for node, others in enumerate(around)
        ]
        kept += _fundamental(rest, start)
    return kept


class _Edges(NamedTuple):
    """Numbers of edges that rise with the places of their nodes in an order: neighbours have numbers close by."""

    place: dict[int, int]
    nodes: int

    def number(self, one: int, other: int) -> int:
        first, second = self.place[one], self.place[other]
        return first * self.nodes + second if first > second else second * self.nodes + first

    def of(self, cycle: Cycle) -> frozenset[int]:
        return frozenset([self.number(one, other) for one, other in zip(cycle, cycle[1:] + cycle[:1], strict=True)])


def _without_ends(neighbours: Neighbours) -> list[list[int]]:
    """The graph without what hangs on it: nodes with one neighbour are on no cycle."""
    kept = [sorted(around) for around in neighbours]
    ends = [node for node, around in enumerate(kept) if len(around) == 1]
    while ends:
        node = ends.pop()
        if kept[node]:
            other = kept[node].pop()
            kept[other].remove(node)
            if len(kept[other]) == 1:
                ends.append(other)
    return kept


def _in_order(neighbours: Neighbours, start: int) -> tuple[dict[int, int], int]:
    """The place of every node that has neighbours, nearest first, from one node and then from the lowest not yet met.

    With the number of connected parts.
    """
    place: dict[int, int] = {}
    parts = 0
    for first in (start, *range(len(neighbours))):
        if first in place or not neighbours[first]:
            continue
        parts += 1
        place[first] = len(place)
        waiting = deque([first])
        while waiting:
            for other in neighbours[waiting.popleft()]:
                if other not in place:
                    place[other] = len(place)
                    waiting.append(other)
    return place, parts


def _round_every_link(neighbours: Neighbours, links: int, reach: int) -> Iterator[Cycle]:
    """Cycles through each link that reach no further from it than so many steps, past no link already looked round."""
    left = [list(around) for around in neighbours]
    search = _Search(left, [-1] * len(left), [0] * len(left), [0] * len(left), [0] * len(left))
    for root in sorted(range(links), key=lambda link: (-len(neighbours[link]), link)):
        if len(left[root]) > 1:
            yield from _round(root, search, reach)
        for place in left[root]:
            left[place].remove(root)


class _Search(NamedTuple):
    """The graph, and for each node: the last root it was met from, its distance, its parent, and where it branched."""

    neighbours: list[list[int]]
    root: list[int]
    steps: list[int]
    parent: list[int]
    branch: list[int]


def _round(root: int, search: _Search, reach: int) -> Iterator[Cycle]:
    """Cycles of two shortest paths from a link that share nothing, and the edge between their ends."""
    neighbours, met_from, steps, parent, branch = search
    left = NODES_LOOKED_AT + NODES_FOR_EACH_JOINT * len(neighbours[root])
    met_from[root], steps[root], branch[root] = root, 0, -1
    level = [root]
    for further in range(1, reach + 1):
        following = []
        for node in level:
            stem = branch[node]
            for other in neighbours[node]:
                if met_from[other] != root:
                    met_from[other], steps[other], parent[other] = root, further, node
                    branch[other] = stem if stem >= 0 else other
                    following.append(other)
                elif steps[other] == further and branch[other] != stem:
                    yield _closed_by(node, other, parent, root)
        left -= len(following)
        if left < 0:
            return
        level = following


def _closed_by(one: int, other: int, parent: list[int], root: int) -> Cycle:
    """The cycle that an edge closes with two paths from a root that share nothing else."""
    cycle = [root]
    way_back = []
    while one != root:
        way_back.append(one)
        one = parent[one]
    cycle += way_back[::-1]
    while other != root:
        cycle.append(other)
        other = parent[other]
    return _canonical(cycle)


def _canonical(cycle: list[int]) -> Cycle:
    first = cycle.index(min(cycle))
    turned = cycle[first:] + cycle[:first]
    return tuple(turned if turned[1] < turned[-1] else turned[:1] + turned[:0:-1])


def _is_new(cycle: frozenset[int], settled: dict[int, frozenset[int]]) -> bool:
    """Whether a cycle is no sum of those before it (over the field of two elements); then its last edge is settled."""
    while cycle:
        last = max(cycle)
        if last not in settled:
            settled[last] = cycle
            return True
        cycle ^= settled[last]
    return False


def _fundamental(neighbours: Neighbours, start: int) -> list[Cycle]:
    """The cycle that each edge outside a tree of shortest paths closes with it."""
    parent: dict[int, int] = {}
    steps: dict[int, int] = {}
    cycles = []
    for node in _in_order(neighbours, start)[0]:
        parent.setdefault(node, node)
        steps.setdefault(node, 0)
        for other in neighbours[node]:
            if other not in parent:
                parent[other], steps[other] = node, steps[node] + 1
            elif parent[node] != other and parent[other] != node and node < other:
                cycles.append((node, other))
    return sorted([_tree_cycle(one, other, parent, steps) for one, other in cycles], key=lambda c: (len(c), c))


def _tree_cycle(one: int, other: int, parent: dict[int, int], steps: dict[int, int]) -> Cycle:
    left, right = [one], [other]
    while left[-1] != right[-1]:
        deeper = left if steps[left[-1]] >= steps[right[-1]] else right
        deeper.append(parent[deeper[-1]])
    return _canonical(left + right[-2::-1])
