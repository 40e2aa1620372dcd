"""Poses in which one link cannot drive its neighbour.

A binary link b (pinned at both ends, nothing else) can only push or pull along the line through its pins. It cannot
drive a neighbour a
    where a turns on the frame and b's line runs through a's fixed pin: the two are in line (a crank and its coupler,
    a toggle folded or stretched);
    where a slides on the frame and b stands square to the slide.
The driven link is a in both cases. Where b's neighbour is a binary link too and neither is held by the frame, the two
in line cannot drive one another from outside, and no driven link is named. Source: Norton, Design of Machinery, ch. 3,
toggle positions, and ch. 4, transmission angle (from memory).
"""

from __future__ import annotations

import math
from functools import lru_cache
from itertools import permutations
from typing import NamedTuple

from dxfcheck.analysis.results import DeadCentre
from dxfcheck.analysis.topology import TOPOLOGIES_KEPT, Topology, topology_of
from dxfcheck.geometry import Point, angle_between_lines
from dxfcheck.linkage import Linkage
from dxfcheck.settings import DEAD_CENTRE_RADIANS

__all__ = ["dead_centres"]


class _Pair(NamedTuple):
    """A rod and its neighbour at a knee: what follows from the joints alone.

    ``far`` is the rod's other pin. The neighbour's line runs to the pin ``end``, or is square to the slide ``joint``.
    """

    knee: int
    far: int
    links: tuple[int, int]
    driven: int | None
    end: int | None
    joint: int | None


def dead_centres(linkage: Linkage, within: float = DEAD_CENTRE_RADIANS) -> tuple[DeadCentre, ...]:
    """Every pair of neighbours within an angle (radians) of a dead centre, in the order of their pins.

    The rules for poses near a dead centre call it with a wider angle.
    """
    pins = linkage.pins
    found = []
    for pair in _pairs_of(topology_of(linkage), tuple([(pin.links, pin.fixed) for pin in pins])):
        at = pins[pair.knee].at
        angle = _bend(at - pins[pair.far].at, _line_of(linkage, pair, at))
        if angle <= within:
            found.append(DeadCentre(pin=pair.knee, links=pair.links, driven=pair.driven, angle=angle))
    return tuple(found)


def _line_of(linkage: Linkage, pair: _Pair, at: Point) -> Point:
    """The direction in which the rod cannot drive its neighbour."""
    if pair.end is not None:
        return at - linkage.pins[pair.end].at
    along = None if pair.joint is None else linkage.joints[pair.joint].direction
    return 1j * along if along is not None else 0j


def _bend(one: Point, other: Point) -> float:
    return angle_between_lines(one, other) if one and other else math.pi / 2.0


@lru_cache(maxsize=TOPOLOGIES_KEPT)
def _pairs_of(topology: Topology, pins: tuple[tuple[tuple[int, ...], bool], ...]) -> tuple[_Pair, ...]:
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
            pair = _Pair(knee, far, (min(rod, other), max(rod, other)), other, None, None)
            if other in slides:
                pairs.append(pair._replace(joint=slides[other]))
            elif len(held) == 1:
                pairs.append(pair._replace(end=held[0]))
            elif not held and binary[other] and rod < other:
                end = _other_end(ends[other], knee)
                if set(pins[end][0]).isdisjoint(pins[far][0]):
                    pairs.append(pair._replace(driven=None, end=end))
    return tuple(pairs)


def _other_end(ends: list[int], knee: int) -> int:
    return ends[0] if ends[1] == knee else ends[1]


def _frame_slides(topology: Topology) -> dict[int, int]:
    """The slide on the frame, by number, of each link that has one."""
    slides: dict[int, int] = {}
    for number, joint in enumerate(topology.joints):
        if joint.kind == "slide" and topology.frame in (joint.first, joint.second):
            slides[joint.first if joint.second == topology.frame else joint.second] = number
    return slides
