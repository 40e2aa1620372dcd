"""Links that hang together: groups of a graph of few edges, without loading a graph library for it."""

from __future__ import annotations

from collections.abc import Iterable

__all__ = ["joined_groups"]


def joined_groups(links: Iterable[int], pairs: Iterable[tuple[int, int]]) -> list[tuple[int, ...]]:
    """The links in groups that pairs join, each ascending, by their first; a link without a pair is a group."""
    around: dict[int, list[int]] = {link: [] for link in links}
    for first, second in pairs:
        around[first].append(second)
        around[second].append(first)
    met: set[int] = set()
    groups = []
    for first in around:
        if first in met:
            continue
        met.add(first)
        group = [first]
        for link in group:
            fresh = [other for other in dict.fromkeys(around[link]) if other not in met]
            met.update(fresh)
            group += fresh
        groups.append(tuple(sorted(group)))
    return groups
