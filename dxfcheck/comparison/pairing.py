"""Within one mechanism of both drawings: which link and which pin is which."""

from __future__ import annotations

from collections import Counter, defaultdict
from collections.abc import Iterable, Mapping
from dataclasses import dataclass

from dxfcheck.comparison.motion import SheetMotion
from dxfcheck.linkage import Linkage

__all__ = ["Pairing", "pair_parts"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Pairing:
    """From old to new indices of links and pins; what is not in it is in one drawing only."""

    links: Mapping[int, int]
    pins: Mapping[int, int]


def pair_parts(
    old: Linkage, new: Linkage, motion: SheetMotion, scale: float, at_place: Iterable[tuple[int, int]]
) -> Pairing:
    """Pair links and pins, beginning with the pins known by their place.

    Then in turn, until nothing more is found: links by the pins they share, pins by their label, pins by the links they
    join; of several that would do, the nearest under the motion. Last come labels alone, and links without pins.
    """
    search = _Search(old, new, motion, scale)
    search.pins.update(at_place)
    search.start()
    search.go_on()
    if search.pins_by_label(any_links=True):
        search.go_on()
    search.links_alike()
    return Pairing(links=search.links, pins=search.pins)


class _Search:
    """The pairs found so far in one mechanism."""

    def __init__(self, old: Linkage, new: Linkage, motion: SheetMotion, scale: float) -> None:
        self.old = old
        self.new = new
        self.links: dict[int, int] = {}
        self.pins: dict[int, int] = {}
        self._places = [motion(pin.at * scale) for pin in old.pins]

    def start(self) -> None:
        """The frame is the frame; where no place is known, what a stated drive moves is what it moves in the other."""
        if self.old.grounded and self.new.grounded:
            self.links[self.old.frame] = self.new.frame
        if not self.pins:
            driven = [[drive.link for drive in linkage.drives] for linkage in (self.old, self.new)]
            for first, second in zip(*driven, strict=False):
                self._pair(self.links, first, second)

    def go_on(self) -> None:
        """Pair until nothing more is found."""
        found = -1
        while found < len(self.pins) + len(self.links):
            found = len(self.pins) + len(self.links)
            self.links_by_pins()
            self.pins_by_label()
            self.pins_by_links()

    def links_by_pins(self) -> None:
        """Links that share pins, those that share most first; a name in common decides between equals."""
        shared: Counter[tuple[int, int]] = Counter()
        for first, second in self.pins.items():
            for link in self.old.pins[first].links:
                for other in self.new.pins[second].links:
                    shared[link, other] += 1
        for first, second in sorted(shared, key=lambda pair: self._link_rank(pair, shared[pair])):
            whole = len(self.old.links[first].pins) == len(self.new.links[second].pins) == 1
            if whole or shared[first, second] > 1 or self._only_choice(first, second):
                self._pair(self.links, first, second)

    def _link_rank(self, pair: tuple[int, int], shared: int) -> tuple[int, bool, bool, bool, tuple[int, int]]:
        first, second = self.old.links[pair[0]], self.new.links[pair[1]]
        sizes = len(first.pins) != len(second.pins)
        return -shared, first.kind != second.kind, sizes, first.name != second.name, pair

    def _only_choice(self, first: int, second: int) -> bool:
        """Whether two links with one known pin are the only ones there that are not paired yet."""
        for pin in self.old.links[first].pins:
            other = self.pins.get(pin)
            if other is None or second not in self.new.pins[other].links:
                continue
            left = [link for link in self.old.pins[pin].links if link not in self.links]
            right = [link for link in self.new.pins[other].links if link not in self.links.values()]
            if left == [first] and right == [second]:
                return self.old.links[first].kind == self.new.links[second].kind
        return False

    def pins_by_label(self, *, any_links: bool = False) -> bool:
        """Pins of one label that have a link in common, or of whose links none is known yet; whether any was found."""
        before = len(self.pins)
        labels = {pin.name: number for number, pin in enumerate(self.new.pins) if pin.labelled}
        for number, pin in enumerate(self.old.pins):
            other = labels.get(pin.name) if pin.labelled else None
            if number in self.pins or other is None:
                continue
            known = {self.links[link] for link in pin.links if link in self.links}
            if any_links or not known or known & set(self.new.pins[other].links):
                self._pair(self.pins, number, other)
        return len(self.pins) > before

    def pins_by_links(self) -> None:
        """Pins that join the same known links, the nearest first."""
        groups: defaultdict[frozenset[int], list[int]] = defaultdict(list)
        paired = set(self.links.values())
        for number, pin in enumerate(self.new.pins):
            joined = frozenset(link for link in pin.links if link in paired)
            if joined and number not in self.pins.values():
                groups[joined].append(number)
        near: list[tuple[bool, bool, float, int, int]] = []
        for number, pin in enumerate(self.old.pins):
            if number in self.pins:
                continue
            joined = frozenset(self.links[link] for link in pin.links if link in self.links)
            for other in groups.get(joined, ()):
                target = self.new.pins[other]
                counts = len(pin.links) != len(target.links)
                near.append((pin.fixed != target.fixed, counts, abs(self._places[number] - target.at), number, other))
        for _, _, _, number, other in sorted(near):
            self._pair(self.pins, number, other)

    def links_alike(self) -> None:
        """Links that no pin tells apart (two between the same pins, some without pins), by kind, pins and name."""
        rest = [number for number in range(len(self.new.links)) if number not in self.links.values()]
        for number, link in enumerate(self.old.links):
            if number in self.links:
                continue
            pins = {self.pins.get(pin) for pin in link.pins}
            alike = [
                other
                for other in rest
                if self.new.links[other].kind == link.kind and set(self.new.links[other].pins) == pins
            ]
            alike.sort(key=lambda other: (self.new.links[other].name != link.name, other))
            if alike:
                self.links[number] = alike[0]
                rest.remove(alike[0])

    @staticmethod
    def _pair(pairs: dict[int, int], first: int, second: int) -> None:
        if first not in pairs and second not in pairs.values():
            pairs[first] = second
