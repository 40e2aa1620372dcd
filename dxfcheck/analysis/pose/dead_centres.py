"""Poses in which one link cannot drive its neighbour.

A binary link b (pinned at both ends, nothing else) can only push or pull along the line through its pins. It cannot
drive a neighbour a
    where a turns on the frame and b's line runs through a's fixed pin: the two are in line (a crank and its coupler,
    a toggle folded or stretched);
    where a slides on the frame and b stands square to the slide.
A pin in a slot, or in a block that slides on another link, pushes square to the slot alone: its line is the slot's
normal through the pin, for the link with the slot as well as for the one with the pin (a crank square to its slotted
lever, a yoke at the end of its stroke).
The driven link is a in all cases. Where b's neighbour is a binary link too and neither is held by the frame, the two
in line cannot drive one another from outside, and no driven link is named. Source: Norton, Design of Machinery, ch. 3,
toggle positions, and ch. 4, transmission angle (from memory).
"""

from __future__ import annotations

import math
from collections.abc import Iterator
from functools import lru_cache
from itertools import permutations
from typing import NamedTuple

from dxfcheck.analysis.results import DeadCentre
from dxfcheck.analysis.topology import TOPOLOGIES_KEPT, Topology, topology_of
from dxfcheck.geometry import Point, angle_between_lines
from dxfcheck.linkage import Linkage
from dxfcheck.tolerances.analysis import DEAD_CENTRE_RADIANS

__all__ = ["dead_centres"]

_Pins = tuple[tuple[tuple[int, ...], bool], ...]
"""The links of every pin, and whether it is fixed."""


class _Pair(NamedTuple):
    """A rod and its neighbour at a knee: what follows from the joints alone.

    ``far`` is the rod's other pin; where there is none, the link pushes square to the slot or slide ``across``. The
    neighbour's line runs to the pin ``end``, or is square to the slide ``joint``.
    """

    knee: int
    far: int | None
    links: tuple[int, int]
    driven: int | None
    end: int | None = None
    joint: int | None = None
    across: int | None = None


def dead_centres(linkage: Linkage, within: float = DEAD_CENTRE_RADIANS) -> tuple[DeadCentre, ...]:
    """Every pair of neighbours within an angle (radians) of a dead centre, in the order of their pins.

    The rules for poses near a dead centre call it with a wider angle.
    """
    pins = linkage.pins
    found = []
    for pair in _pairs_of(topology_of(linkage), tuple([(pin.links, pin.fixed) for pin in pins])):
        at = pins[pair.knee].at
        push = _square_to(linkage, pair.across) if pair.far is None else at - pins[pair.far].at
        angle = _bend(push, _square_to(linkage, pair.joint) if pair.end is None else at - pins[pair.end].at)
        if angle <= within:
            square = pair.across is not None or pair.joint is not None
            found.append(DeadCentre(pin=pair.knee, links=pair.links, driven=pair.driven, angle=angle, square=square))
    return tuple(found)


def _square_to(linkage: Linkage, joint: int | None) -> Point:
    """The direction square to a slide or slot."""
    along = None if joint is None else linkage.joints[joint].direction
    return 1j * along if along is not None else 0j


def _bend(one: Point, other: Point) -> float:
    return angle_between_lines(one, other) if one and other else math.pi / 2.0


@lru_cache(maxsize=TOPOLOGIES_KEPT)
def _pairs_of(topology: Topology, pins: _Pins) -> tuple[_Pair, ...]:
    """Every rod and neighbour that some pose could keep from driving one another; ``pins`` are (links, fixed)."""
    ends: list[list[int]] = [[] for _ in range(topology.links)]
    for number, (links, _) in enumerate(pins):
        for link in links if len(links) > 1 else ():
            ends[link].append(number)
    shaped = {link for joint in topology.joints if joint.kind != "pin" for link in (joint.first, joint.second)}
    binary = [len(at) == 2 and link not in shaped for link, at in enumerate(ends)]
    slides = _frame_slides(topology)
    pairs = []
    for knee, (links, fixed) in enumerate(pins):
        for rod, other in [] if fixed or topology.frame in links else permutations(links, 2):
            far = _other_end(ends[rod], knee) if binary[rod] else None
            if far is None or pins[far][1] or other in pins[far][0]:
                continue
            held = [pin for pin in ends[other] if pins[pin][1]]
            pair = _Pair(knee, far, (min(rod, other), max(rod, other)), other)
            if other in slides:
                pairs.append(pair._replace(joint=slides[other]))
            elif len(held) == 1:
                pairs.append(pair._replace(end=held[0]))
            elif not held and binary[other] and rod < other:
                end = _other_end(ends[other], knee)
                if set(pins[end][0]).isdisjoint(pins[far][0]):
                    pairs.append(pair._replace(driven=None, end=end))
    pairs += _slotted_pairs(topology, pins, ends, slides)
    return tuple(sorted(pairs, key=lambda pair: pair.knee))


def _slotted_pairs(
    topology: Topology,
    pins: _Pins,
    ends: list[list[int]],
    slides: dict[int, int],
) -> Iterator[_Pair]:
    """The link with a slot and each link of the pin in it, both ways round, where a pin or slide on the frame holds."""
    blocks = _blocks(topology, ends)
    for number, knee, owner in _slots(topology, pins, ends, blocks):
        links, fixed = pins[knee]
        if fixed or topology.frame in (owner, *links):
            continue
        carriers = [link for link in links if link != owner and link not in blocks]
        for pusher, driven in [pair for link in carriers for pair in ((link, owner), (owner, link))]:
            pair = _Pair(knee, None, (min(pusher, driven), max(pusher, driven)), driven, across=number)
            held = [pin for pin in ends[driven] if pins[pin][1]]
            if driven in slides:
                yield pair._replace(joint=slides[driven])
            elif len(held) == 1:
                yield pair._replace(end=held[0])


def _slots(topology: Topology, pins: _Pins, ends: list[list[int]], blocks: set[int]) -> Iterator[tuple[int, int, int]]:
    """Joint, pin, and link with the slot (or guide), of every pin in a slot and every block with one pin."""
    for number, joint in enumerate(topology.joints):
        for inner, owner in ((joint.first, joint.second), (joint.second, joint.first)):
            if joint.kind == "pin in slot" and joint.pin is not None and inner in pins[joint.pin][0]:
                yield number, joint.pin, owner
            elif joint.kind == "slide" and inner != topology.frame and inner in blocks:
                yield number, ends[inner][0], owner


def _blocks(topology: Topology, ends: list[list[int]]) -> set[int]:
    """The links that have one pin and one slide and nothing else."""
    other: dict[int, list[str]] = {}
    for joint in topology.joints:
        if joint.kind != "pin":
            for link in {joint.first, joint.second}:
                other.setdefault(link, []).append(joint.kind)
    return {link for link, kinds in other.items() if kinds == ["slide"] and len(ends[link]) == 1}


def _other_end(ends: list[int], knee: int) -> int:
    return ends[0] if ends[1] == knee else ends[1]


def _frame_slides(topology: Topology) -> dict[int, int]:
    """The slide on the frame, by number, of each link that has one."""
    slides: dict[int, int] = {}
    for number, joint in enumerate(topology.joints):
        if joint.kind == "slide" and topology.frame in (joint.first, joint.second):
            slides[joint.first if joint.second == topology.frame else joint.second] = number
    return slides
