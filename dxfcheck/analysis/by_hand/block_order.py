"""Which unknown links become determined together, and which of these sets a person would solve first.

Every equation is given to one of the links that it relates, three to each link, and a link then needs the links that
its own equations relate it to. The strongly connected components of who needs whom are the sets, and the order among
them is that of the block-triangular form (A.L. Dulmage & N.S. Mendelsohn, Coverings of bipartite graphs, from memory).
"""

from __future__ import annotations

from collections import deque
from collections.abc import Sequence

import networkx as nx

__all__ = ["UNKNOWNS", "blocks_in_order"]

UNKNOWNS = 3
"""A moving link has three: its turning and the two components of one point's velocity."""

Row = tuple[int, ...]
"""The links, one or two, that one equation relates."""


def blocks_in_order(links: Sequence[int], rows: Sequence[Row]) -> list[list[int]]:
    """The sets of links that are determined together, those first that need no other; links in each in order.

    ``rows`` are the links of each equation, those that are known left out. Equations in excess are left over; a link
    short of equations needs none but what it has. The same for the same input. Cost linear in links and rows where
    equations find their links at once, at worst their product.
    """
    owners = _owners(links, rows)
    needs: nx.DiGraph[int] = nx.DiGraph()
    needs.add_nodes_from(links)
    for row, owner in zip(rows, owners, strict=True):
        needs.add_edges_from((link, owner) for link in row if owner is not None and link != owner)
    blocks = nx.condensation(needs)
    members: dict[int, list[int]] = {number: sorted(blocks.nodes[number]["members"]) for number in blocks}
    return [members[number] for number in nx.lexicographical_topological_sort(blocks, key=lambda each: members[each])]


def _owners(links: Sequence[int], rows: Sequence[Row]) -> list[int | None]:
    """The link that each equation is given to, None for those in excess: a matching by augmenting paths."""
    rows_of: dict[int, list[int]] = {link: [] for link in links}
    for number, row in enumerate(rows):
        for link in row:
            rows_of[link].append(number)
    owners: list[int | None] = [None] * len(rows)
    held = dict.fromkeys(links, 0)
    for number, row in enumerate(rows):
        taker = next((link for link in row if held[link] < UNKNOWNS), None)
        if taker is not None:
            owners[number] = taker
            held[taker] += 1
    for link in links:
        while held[link] < UNKNOWNS and _augment(link, rows_of, owners):
            held[link] += 1
    return owners


def _augment(link: int, rows_of: dict[int, list[int]], owners: list[int | None]) -> bool:
    """Give a link one more equation, by a chain of links that each pass one on; whether there is such a chain."""
    taken_by: dict[int, tuple[int, int]] = {}
    waiting, seen = deque([link]), {link}
    while waiting:
        taker = waiting.popleft()
        for row in rows_of[taker]:
            owner = owners[row]
            if owner is None:
                _pass_on(link, taker, row, taken_by, owners)
                return True
            if owner not in seen:
                seen.add(owner)
                taken_by[owner] = (row, taker)
                waiting.append(owner)
    return False


def _pass_on(link: int, taker: int, row: int, taken_by: dict[int, tuple[int, int]], owners: list[int | None]) -> None:
    """Hand the free equation to the last link of the chain, and back along it each one's to the link before."""
    owners[row] = taker
    while taker != link:
        row, taker = taken_by[taker]
        owners[row] = taker
