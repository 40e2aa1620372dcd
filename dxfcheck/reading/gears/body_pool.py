"""Bodies while wheels are given to them: some are joined, new ones made, and the frame added where it was missing."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterable, Sequence
from dataclasses import replace
from itertools import chain

from dxfcheck.reading.bodies.body import Body

__all__ = ["BodyPool"]

NEW_FRAME = -1


class BodyPool:
    """Bodies by key: those given keep their index, the frame has -1 if it had to be made.

    ``parts`` are the bodies by key, ``body_of`` the key of the body each strand belongs to.
    """

    def __init__(self, bodies: Sequence[Body]) -> None:
        self.parts = dict(enumerate(bodies))
        self._given = len(bodies)
        self._next = len(bodies)
        self._joined: dict[int, int] = {}
        # What the frame is given is kept until the end: on a sheet of many mechanisms it is given much.
        self._fixed: list[tuple[tuple[int, ...], tuple[int, ...], tuple[int, ...]]] = []
        self._at_site: defaultdict[int, set[int]] = defaultdict(set)
        self.body_of: dict[int, int] = {}
        for key, body in self.parts.items():
            self._index(key, body)

    def _index(self, key: int, body: Body) -> None:
        self.body_of.update(dict.fromkeys(body.strands, key))
        if not body.frame:
            for site in body.pins:
                self._at_site[site].add(key)

    @property
    def frame(self) -> int:
        """Key of the frame, whether it is there or would be made on giving it something."""
        return 0 if 0 in self.parts and self.parts[0].frame else NEW_FRAME

    @property
    def frame_pins(self) -> frozenset[int]:
        """The pins of the frame, those it was given among them."""
        known = self.parts[self.frame].pins if self.frame in self.parts else ()
        return frozenset(known).union(*(pins for _, pins, _ in self._fixed))

    def pinned_at(self, site: int) -> list[int]:
        """The moving bodies with a pin, in order."""
        return sorted(self._at_site.get(site, ()))

    def add(self, body: Body) -> int:
        """A further body: its key."""
        key = self._next
        self._next += 1
        self.parts[key] = body
        self._index(key, body)
        return key

    def give(
        self, key: int, *, strands: Iterable[int] = (), pins: Iterable[int] = (), wheels: Iterable[int] = ()
    ) -> None:
        """Add linework, pins and pitch circles to a body; the frame is made if it is not there."""
        if key == self.frame:
            self._fixed.append((tuple(strands), tuple(pins), tuple(wheels)))
            self.body_of.update(dict.fromkeys(self._fixed[-1][0], key))
            return
        self.parts[key] = _more(self.parts[key], strands, pins, wheels)
        self._index(key, self.parts[key])

    def join(self, key: int, other: int) -> None:
        """Make the second body part of the first."""
        part = self.parts.pop(other)
        self._joined[other] = key
        for site in part.pins:
            self._at_site[site].discard(other)
        self.give(key, strands=part.strands, pins=part.pins, wheels=part.wheels)
        body = self.parts[key]
        self.parts[key] = replace(body, discs=(*body.discs, *part.discs), fills=(*body.fills, *part.fills))

    def finish(self) -> tuple[tuple[Body, ...], dict[int, int]]:
        """All bodies, the frame first, and the new index of every key."""
        if self._fixed:
            key = self.frame
            frame = self.parts.get(key, Body(strands=(), pins=(), frame=True))
            self.parts[key] = _more(frame, *map(chain.from_iterable, zip(*self._fixed, strict=True)))
            self._fixed.clear()
        order = sorted(self.parts)
        index = {key: number for number, key in enumerate(order)}
        for key in self._joined:
            kept = key
            while kept in self._joined:
                kept = self._joined[kept]
            index[key] = index[kept]
        return tuple([self.parts[key] for key in order]), index

    @property
    def given(self) -> range:
        """Keys of the bodies that were there at first."""
        return range(self._given)


def _more(body: Body, strands: Iterable[int], pins: Iterable[int], wheels: Iterable[int]) -> Body:
    return Body(
        strands=_with(body.strands, strands),
        pins=_with(body.pins, pins),
        frame=body.frame,
        discs=body.discs,
        fills=body.fills,
        wheels=_with(body.wheels, wheels),
        block=body.block,
    )


def _with(known: tuple[int, ...], more: Iterable[int]) -> tuple[int, ...]:
    fresh = set(more).difference(known)
    return tuple(sorted(fresh.union(known))) if fresh else known
