"""Which of many numbered things belong together (disjoint sets), in an order that does not depend on hashing."""

from __future__ import annotations

__all__ = ["Unions"]


class Unions:
    """Disjoint sets over 0 .. count - 1; the least number of a set stands for it."""

    def __init__(self, count: int) -> None:
        self._parent = list(range(count))

    def of(self, member: int) -> int:
        """The number that stands for a member's set."""
        parent = self._parent
        root = member
        while parent[root] != root:
            root = parent[root]
        while parent[member] != root:
            parent[member], member = root, parent[member]
        return root

    def join(self, one: int, other: int) -> None:
        """Put two members into one set."""
        first, second = sorted((self.of(one), self.of(other)))
        self._parent[second] = first

    def groups(self) -> list[list[int]]:
        """The sets, each in ascending order, by their least member."""
        members: dict[int, list[int]] = {}
        for member in range(len(self._parent)):
            members.setdefault(self.of(member), []).append(member)
        return list(members.values())
