"""The parts of a mechanism that a requirement can be about, by name and by pattern, with their speeds."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from fnmatch import fnmatchcase
from functools import cached_property
from typing import NamedTuple

from dxfcheck.analysis.results import Analysis
from dxfcheck.geometry import Point
from dxfcheck.linkage import Joint, Linkage
from dxfcheck.reading.drives.drive_names import Place
from dxfcheck.reading.drives.drive_targets import Lookup, make_lookup
from dxfcheck.reading.texts.labels import natural_key
from dxfcheck.settings import Quantity, Requirement
from dxfcheck.tolerances.findings import SHOWN_AS_ZERO

__all__ = ["Parts", "Subject", "is_pattern"]


class Subject(NamedTuple):
    """A part with its speed: ``actual`` in length units a second or rad/s, signed but for a pin's; None if not known.

    ``key`` tells parts of one kind apart.
    """

    name: str
    against: str
    actual: float | None
    at: Point | None
    handles: tuple[str, ...]
    layer: str | None
    key: tuple[int, ...]


def is_pattern(name: str) -> bool:
    """Whether a name is a pattern of names."""
    return any(mark in name for mark in "*?[")


class Parts:
    """The parts of all mechanisms of a drawing, with their speeds."""

    def __init__(self, mechanisms: Sequence[tuple[Linkage, Analysis]]) -> None:
        self.mechanisms = mechanisms
        self._greatest: dict[tuple[bool, int], float] = {}

    @cached_property
    def lookup(self) -> Lookup:
        """The names of links and slides; made when first asked for, as most requirements ask for none."""
        return make_lookup([linkage for linkage, _ in self.mechanisms], sliding=True)

    def of(self, requirement: Requirement, number: int) -> list[Subject]:
        """What a requirement is about in one mechanism."""
        quantity = requirement.quantity
        if quantity in {"pin-speed", "rubbing-speed"}:
            named = requirement.subject
            found = (
                self._rubbing(number)
                if quantity == "rubbing-speed"
                else self._pins(number, fixed=not is_pattern(named))
            )
            return [each for each in found if _fits(named, each.name)]
        if quantity == "slide-speed":
            return self._slides(requirement, number)
        return self._turning(requirement, number)

    def greatest(self, quantity: Quantity, number: int) -> float:
        """The greatest figure of a kind in a mechanism: what is small against it is rounding."""
        turns = quantity == "link-speed"
        if (turns, number) not in self._greatest:
            _, analysis = self.mechanisms[number]
            of_links = (abs(each.angular_velocity or 0.0) for each in analysis.links)
            of_pins = (abs(each.velocity or 0.0) for each in analysis.pins)
            self._greatest[turns, number] = max(of_links if turns else of_pins, default=0.0)
        return self._greatest[turns, number]

    def _pins(self, number: int, *, fixed: bool) -> Iterator[Subject]:
        """Moving pins, and those on the frame if they are asked for."""
        linkage, analysis = self.mechanisms[number]
        for index, (pin, motion) in enumerate(zip(linkage.pins, analysis.pins, strict=True)):
            if fixed or not pin.fixed:
                speed = None if motion.velocity is None else abs(motion.velocity)
                yield Subject(pin.name, "", speed, pin.at, pin.handles, pin.layer, (index,))

    def _rubbing(self, number: int) -> Iterator[Subject]:
        linkage, analysis = self.mechanisms[number]
        for index, (joint, motion) in enumerate(zip(linkage.joints, analysis.joints, strict=True)):
            if joint.kind == "pin" and joint.pin is not None:
                pin = linkage.pins[joint.pin]
                links = f"{linkage.links[joint.first].name} and {linkage.links[joint.second].name}"
                yield Subject(pin.name, links, motion.rubbing_speed, pin.at, pin.handles, pin.layer, (index,))

    def _turning(self, requirement: Requirement, number: int) -> list[Subject]:
        """Links of that name, against another where the requirement names one; for a ratio both speeds' quotient."""
        linkage, _ = self.mechanisms[number]
        links = self._links(requirement.subject, number)
        others = self._links(requirement.against, number) if requirement.against else [linkage.frame]
        if requirement.against == linkage.links[linkage.frame].name:
            others = [linkage.frame]
        pairs = [(link, other) for link in links for other in others if link != other]
        return [self._turn(requirement.quantity, number, link, other) for link, other in pairs]

    def _turn(self, quantity: Quantity, number: int, link: int, other: int) -> Subject:
        """The turning of one link against another, or the ratio of the two speeds against the frame."""
        linkage, analysis = self.mechanisms[number]
        part = linkage.links[link]
        own, its = analysis.links[link].angular_velocity, analysis.links[other].angular_velocity
        ratio = quantity == "speed-ratio"
        actual = None
        if own is not None and its is not None:
            actual = _quotient(own, its, self.greatest("link-speed", number)) if ratio else own - its
        ends = [linkage.pins[pin].at for pin in part.pins[:2]]
        at = sum(ends) / len(ends) if ends else None
        against = linkage.links[other].name if ratio or other != linkage.frame else ""
        return Subject(part.name, against, actual, at, part.handles, part.layer, (link, other))

    def _links(self, name: str, number: int) -> list[int]:
        """Moving links by name, by two of their pins, by their only pin, or by a pattern."""
        linkage, _ = self.mechanisms[number]
        if is_pattern(name):
            moving = (index for index in range(len(linkage.links)) if index != linkage.frame)
            return [index for index in moving if fnmatchcase(linkage.links[index].name, name)]
        if not linkage.grounded:  # its names are not in the lookup, as nothing in it can be driven
            return [index for index, link in enumerate(linkage.links) if link.name == name]
        names = self.lookup.names
        homes = names.homes(name) or names.homes(name.removeprefix("wheel at "))
        return [place.link for place in homes.get(number, ())]

    def _slides(self, requirement: Requirement, number: int) -> list[Subject]:
        linkage, _ = self.mechanisms[number]
        name, against = requirement.subject, requirement.against
        everything = list(self._sliding(number))
        if is_pattern(name):
            return [each for each in everything if fnmatchcase(each.name, name)]
        slides = self.lookup.slides
        if against:
            others = [linkage.frame] if against == "frame" else self._links(against, number)
            places = slides.movers(name).get(number) or [Place(number, link) for link in self._links(name, number)]
            targets = [target for place in places for other in others for target in slides.against(place, other)]
        else:
            targets = slides.named(name, number)
        joints = {target.joint: target.link for target in targets if target.joint is not None}
        found = [_seen_from(each, linkage, joints[each.key[0]]) for each in everything if each.key[0] in joints]
        return found or [each for each in everything if name in self._names_of_slot(linkage, each.key[0])]

    def _sliding(self, number: int) -> Iterator[Subject]:
        """Every slide, telescope and pin in a slot, under the name of its block, its telescope's pins, or its link."""
        linkage, analysis = self.mechanisms[number]
        for index, (joint, motion) in enumerate(zip(linkage.joints, analysis.joints, strict=True)):
            if joint.kind in {"slide", "pin in slot"}:
                name, against = _slide_name(linkage, joint)
                yield Subject(name, against, motion.slide_speed, joint.at, joint.handles, None, (index,))

    def _names_of_slot(self, linkage: Linkage, index: int) -> set[str]:
        """How a pin in a slot may be named: by the pin or by the links that it joins."""
        joint = linkage.joints[index]
        if joint.kind != "pin in slot" or joint.pin is None:
            return set()
        pin = linkage.pins[joint.pin].name
        links = {linkage.links[side].name for side in (joint.first, joint.second) if side != linkage.frame}
        return {pin, f"pin {pin}", *links}


def _slide_name(linkage: Linkage, joint: Joint) -> tuple[str, str]:
    """The name of a slide and of what it runs on: a block, a pin in its slot, a telescope's two pins, or a link."""
    sides = (joint.first, joint.second)
    if joint.kind == "pin in slot" and joint.pin is not None:
        pin = joint.pin
        holder = next((side for side in sides if pin not in linkage.links[side].pins), joint.second)
        return f"pin {linkage.pins[pin].name}", "" if holder == linkage.frame else linkage.links[holder].name
    blocks = [side for side in sides if linkage.links[side].kind == "block"]
    moving = [side for side in sides if side != linkage.frame]
    if not blocks and len(moving) == 2 and joint.pin is None:
        ends = _telescope_pins(linkage, joint)
        if ends is not None:
            return ends, ""
    own = blocks[0] if blocks else moving[0] if moving else joint.second
    other = joint.first if own == joint.second else joint.second
    return linkage.links[own].name, "" if other == linkage.frame else linkage.links[other].name


def _telescope_pins(linkage: Linkage, joint: Joint) -> str | None:
    """The pins of two links that slide on one another which lie furthest apart, as 'D-E'."""
    pins = linkage.pins
    pairs = [
        (abs(pins[one].at - pins[other].at), one, other)
        for one in linkage.links[joint.first].pins
        for other in linkage.links[joint.second].pins
        if one != other
    ]
    if not pairs:
        return None
    _, one, other = max(pairs)
    return "-".join(sorted((pins[one].name, pins[other].name), key=natural_key))


def _seen_from(subject: Subject, linkage: Linkage, link: int) -> Subject:
    """The speed of that link against the other one: a joint's own is that of its second link."""
    joint = linkage.joints[subject.key[0]]
    if link == joint.second or subject.actual is None:
        return subject
    return subject._replace(actual=-subject.actual)


def _quotient(own: float, its: float, greatest: float) -> float | None:
    """A ratio of two speeds; None where the second does not turn."""
    return None if abs(its) <= greatest * SHOWN_AS_ZERO else own / its


def _fits(pattern: str, name: str) -> bool:
    return fnmatchcase(name, pattern) if is_pattern(pattern) else name == pattern
