"""What a stated sliding speed may move: slides and telescopes, by name or by what a note stands beside (rule 9)."""

from __future__ import annotations

import cmath
import math
from collections import defaultdict
from collections.abc import Collection, Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass
from itertools import product

from dxfcheck.geometry import Point, dot
from dxfcheck.linkage import Joint, Linkage
from dxfcheck.reading.drives.drive_names import Homes, Names, Place, Target, pairs_of, pins_of
from dxfcheck.tolerances.sheet import TELESCOPE_ACROSS

__all__ = ["Slides", "index_slides", "slide_target"]


@dataclass(frozen=True, slots=True)
class Slides:
    """The slide joints (indices) of every moving link, and the links that slide by the names of their pins.

    ``across`` are the slides of each linkage by a pin of each of their links, 'A-B' or 'AB'; None where the two pins
    lie side by side, so that neither way of sliding parts them. ``with_pin`` are the blocks with a pin of that name,
    where a linkage has none the sliding links with no other pin, else any that slide.
    """

    linkages: Sequence[Linkage]
    names: Names
    of_link: Mapping[Place, Sequence[int]]
    across: Mapping[str, Mapping[int, Sequence[Target | None]]]
    with_pin: Mapping[str, Homes]

    def homes(self, name: str) -> Collection[int]:
        """The linkages where a name fits a link or a slide, in order."""
        across = self.across.get(name, {})
        written = self.names.written(name)
        if written and across:
            return dict.fromkeys(sorted({*written, *across}))
        return written or across or self.with_pin.get(name, {})

    def movers(self, name: str) -> Homes:
        """The links that a name fits: as written, else those that slide and have a pin of that name."""
        return self.names.written(name) or self.with_pin.get(name, {})

    def named(self, name: str, linkage: int) -> list[Target]:
        """What a name may mean in a linkage: a link that slides, a telescope by two pins, a block or ram by its pin.

        A link that has both pins comes before a telescope between them.
        """
        written = self.names.written(name)
        if linkage in written:
            return [target for place in written[linkage] for target in self._of_place(place, by_pin=False)]
        across = self.across.get(name, {})
        if written or across:
            return [target for target in across.get(linkage, ()) if target is not None]
        places = self.with_pin.get(name, {}).get(linkage, ())
        return [target for place in places for target in self._of_place(place, by_pin=True)]

    def is_side_by_side(self, name: str) -> bool:
        """Whether a name is that of two pins of a slide which no sliding brings further apart."""
        written = self.names.written(name)
        across = self.across.get(name, {})
        return any(None in targets for linkage, targets in across.items() if linkage not in written)

    def against(self, place: Place, other: int) -> list[Target]:
        """The slides between two links of one linkage: the first's speed against the other."""
        linkage = self.linkages[place.linkage]
        own = self.of_link.get(place, ())
        joints = [joint for joint in own if _other(linkage.joints[joint], place.link) == other]
        return [slide_target(linkage, place, joint) for joint in joints]

    def beside(self, near: Sequence[tuple[float, Place]]) -> list[tuple[float, Target]]:
        """What a note without a name may mean: the slides it stands beside, nearest first.

        ``near`` are distances and links, nearest first. A slide lies where its block does, and where its guide does
        if that carries no other slide.
        """
        found: dict[tuple[int, int], tuple[float, Target]] = {}
        for distance, place in near:
            for joint in self.of_link.get(place, ()):
                target = self._unnamed(place.linkage, joint)
                if target is not None and place.link in target.shown:
                    found.setdefault((place.linkage, joint), (distance, target))
        return list(found.values())

    def _of_place(self, place: Place, *, by_pin: bool) -> Iterator[Target]:
        """The slides of a named link: its own speed, but a telescope's where a single pin is all that names it."""
        linkage = self.linkages[place.linkage]
        link = linkage.links[place.link]
        for index in self.of_link.get(place, ()):
            joint = linkage.joints[index]
            lengthening = None
            if len(link.pins) == 1 and _is_telescope(linkage, joint):
                lengthening = _lengthening(linkage, place.linkage, index, _furthest(linkage, joint))
            elif by_pin and len(link.pins) > 1 and link.kind != "block" and _other(joint, place.link) != linkage.frame:
                continue  # a pin of a link that slides on a moving one: its own speed is not the slide's
            yield lengthening or slide_target(linkage, place, index)

    def _unnamed(self, number: int, index: int) -> Target | None:
        """A slide by itself: its block's speed, or what moves on the frame, or a telescope's lengthening."""
        linkage = self.linkages[number]
        joint = linkage.joints[index]
        if _is_telescope(linkage, joint):
            return _lengthening(linkage, number, index, _furthest(linkage, joint))
        moving = _moving(linkage, joint)
        if moving is None:
            return None
        target = slide_target(linkage, Place(number, moving), index)
        guide = Place(number, target.against)
        return target._replace(shown=(moving, guide.link) if len(self.of_link.get(guide, ())) == 1 else (moving,))


def index_slides(linkages: Sequence[Linkage], names: Names) -> Slides:
    """The slides of all linkages that hang on a frame."""
    of_link: defaultdict[Place, list[int]] = defaultdict(list)
    across: defaultdict[str, defaultdict[int, list[Target | None]]] = defaultdict(lambda: defaultdict(list))
    with_pin: defaultdict[str, dict[int, list[Place]]] = defaultdict(dict)
    for number, linkage in enumerate(linkages):
        sliding: dict[int, None] = {}
        for index, joint in enumerate(linkage.joints if linkage.grounded else ()):
            if joint.kind != "slide":
                continue
            for link in (joint.first, joint.second):
                if link != linkage.frame:
                    of_link[Place(number, link)].append(index)
                    sliding[link] = None
            for ends in _ends(linkage, joint):
                target = _lengthening(linkage, number, index, ends)
                one, other = (linkage.pins[pin].name for pin in ends)
                for name in (*pairs_of(one, other), *pairs_of(other, one)):
                    across[name][number].append(target)
        for name, links in _by_pin(linkage, sliding).items():
            with_pin[name][number] = [Place(number, link) for link in links]
    return Slides(linkages, names, of_link, across, with_pin)


def _by_pin(linkage: Linkage, sliding: Iterable[int]) -> dict[str, list[int]]:
    """For each name of a pin of a sliding link, the blocks with it, else the links with no other, else all with it."""
    by_pin: defaultdict[str, list[int]] = defaultdict(list)
    for link in sliding:
        for name in dict.fromkeys(pins_of(linkage, linkage.links[link])):
            by_pin[name].append(link)
    found: dict[str, list[int]] = {}
    for name, links in by_pin.items():
        blocks = [link for link in links if linkage.links[link].kind == "block"]
        found[name] = blocks or [link for link in links if len(linkage.links[link].pins) == 1] or links
    return found


def slide_target(linkage: Linkage, place: Place, joint: int) -> Target:
    """The speed of one link of a slide joint against the other, along the joint's direction."""
    slide = linkage.joints[joint]
    along = slide.direction
    meaning = f"positive is {_toward(along)}" if along is not None else ""
    return Target(place.linkage, place.link, _other(slide, place.link), joint, (place.link,), meaning)


def _other(joint: Joint, link: int) -> int:
    return joint.first if joint.second == link else joint.second


def _is_telescope(linkage: Linkage, joint: Joint) -> bool:
    """Whether two moving links slide on one another and neither is a block, by its kind or by the pin in it."""
    sides = (joint.first, joint.second)
    return linkage.frame not in sides and joint.pin is None and len(_blocks(linkage, joint)) != 1


def _blocks(linkage: Linkage, joint: Joint) -> list[int]:
    return [link for link in (joint.first, joint.second) if linkage.links[link].kind == "block"]


def _moving(linkage: Linkage, joint: Joint) -> int | None:
    """What slides on the frame, else the block, else the link that holds the pin in the block."""
    sides = (joint.first, joint.second)
    if linkage.frame in sides:
        return _other(joint, linkage.frame)
    holders = [link for link in sides if joint.pin in linkage.links[link].pins]
    found = next((each for each in (_blocks(linkage, joint), holders) if len(each) == 1), None)
    return found[0] if found is not None else None


def _ends(linkage: Linkage, joint: Joint) -> Iterator[tuple[int, int]]:
    """Pairs of a pin (index) of the first link and another pin, of the second."""
    first, second = (linkage.links[link].pins for link in (joint.first, joint.second))
    return ((one, other) for one, other in product(first, second) if one != other)


def _furthest(linkage: Linkage, joint: Joint) -> tuple[int, int] | None:
    """The pins of the two links that lie furthest apart along the slide."""
    along = joint.direction or 0j
    pins = linkage.pins
    return max(
        _ends(linkage, joint),
        key=lambda ends: abs(dot(pins[ends[1]].at - pins[ends[0]].at, along)),
        default=None,
    )


def _lengthening(linkage: Linkage, number: int, index: int, ends: tuple[int, int] | None) -> Target | None:
    """A slide that runs so that a pin of its first and one of its second link part; None where it cannot be told.

    Positive is along the joint's direction, so the link that lies ahead is the one that runs.
    """
    joint = linkage.joints[index]
    if ends is None or joint.direction is None:
        return None
    one, other = (linkage.pins[pin] for pin in ends)
    apart = other.at - one.at
    ahead = dot(apart, joint.direction)
    if abs(ahead) <= TELESCOPE_ACROSS * abs(apart):
        return None
    link, against = (joint.second, joint.first) if ahead > 0.0 else (joint.first, joint.second)
    shown = tuple(side for side in (link, against) if side != linkage.frame)
    return Target(number, link, against, index, shown, f"positive moves {one.name} and {other.name} apart")


def _toward(direction: Point) -> str:
    """A direction in words: along +x, along +y, or its angle from +x."""
    degrees = round(math.degrees(cmath.phase(direction)), 3)
    if degrees in (0, 90):
        return "along +y" if degrees else "along +x"
    return f"at {degrees:g} deg from +x"
