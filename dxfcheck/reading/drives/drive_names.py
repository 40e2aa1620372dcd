"""Which links a drive's name may mean (reading rule 9)."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterator, Mapping, Sequence
from typing import NamedTuple

from dxfcheck.linkage import Link, Linkage

__all__ = ["Homes", "Names", "Place", "Target", "index_names", "pairs_of", "pins_of"]


class Place(NamedTuple):
    """One link of one linkage, by indices."""

    linkage: int
    link: int


class Target(NamedTuple):
    """What a drive may move: a link against another of its linkage, along a slide joint if ``joint`` is one.

    ``shown`` are the links whose linework a note about it stands beside; ``meaning`` says what a positive speed is
    where that is more than the sense of turning.
    """

    linkage: int
    link: int
    against: int
    joint: int | None = None
    shown: tuple[int, ...] = ()
    meaning: str = ""


Homes = Mapping[int, Sequence[Place]]
"""Links that a name fits, by the linkage they belong to; in order."""


class Names(NamedTuple):
    """Moving links by their names, by two of their pins written 'AB' or 'A-B' in either order, by their only pin.

    A sheet may hold a thousand mechanisms with the same names, so nothing here is asked over all of them.
    """

    links: Mapping[str, Homes]
    pairs: Mapping[str, Homes]
    only_pins: Mapping[str, Homes]

    def written(self, name: str) -> Homes:
        """The links whose name it is, else those two of whose pins it names."""
        return self.links.get(name) or self.pairs.get(name, {})

    def homes(self, name: str) -> Homes:
        """The links that a name fits: as written, else those whose only pin it is."""
        return self.written(name) or self.only_pins.get(name, {})


def index_names(linkages: Sequence[Linkage]) -> Names:
    """The names of all moving links of the linkages that hang on a frame."""
    links: defaultdict[str, defaultdict[int, list[Place]]] = defaultdict(lambda: defaultdict(list))
    pairs: defaultdict[str, defaultdict[int, list[Place]]] = defaultdict(lambda: defaultdict(list))
    only_pins: defaultdict[str, defaultdict[int, list[Place]]] = defaultdict(lambda: defaultdict(list))
    for number, linkage in enumerate(linkages):
        for index, link in enumerate(linkage.links if linkage.grounded else ()):
            if index == linkage.frame:
                continue
            place = Place(number, index)
            links[link.name][number].append(place)
            own = pins_of(linkage, link)
            for name in {name for one in own for other in own for name in pairs_of(one, other)}:
                pairs[name][number].append(place)
            if len(own) == 1:
                only_pins[own[0]][number].append(place)
    return Names(links, pairs, only_pins)


def pins_of(linkage: Linkage, link: Link) -> list[str]:
    """The names of a link's pins."""
    return [linkage.pins[pin].name for pin in link.pins]


def pairs_of(one: str, other: str) -> Iterator[str]:
    """How two different pins are written together; both orders come of asking both ways."""
    if one != other:
        yield f"{one}{other}"
        yield f"{one}-{other}"
