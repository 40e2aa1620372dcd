"""Places, lengths, radii and directions of one mechanism in both drawings."""

from __future__ import annotations

import cmath
import math
from collections.abc import Iterator, Sequence
from itertools import combinations, pairwise

from dxfcheck.comparison.joints import JointPair, joint_name
from dxfcheck.comparison.motion import SheetMotion
from dxfcheck.comparison.pairing import Pairing
from dxfcheck.comparison.result import FigureChange, PinMove
from dxfcheck.geometry import angle_between_lines
from dxfcheck.linkage import Linkage
from dxfcheck.tolerances.comparison import COMPARED_TURN_RADIANS

__all__ = ["length_changes", "moves", "radius_changes", "turned_directions"]

ALL_SIDES_UP_TO = 4
"""Of a link with more pins only the distances between neighbours are compared, and from its first pin."""


def moves(
    old: Linkage, new: Linkage, pairing: Pairing, joints: Sequence[JointPair], motion: SheetMotion, scale: float
) -> Iterator[PinMove]:
    """Where each pin, and each joint without one, would lie had it not moved, and where it lies."""
    for first, second in sorted(pairing.pins.items(), key=lambda pair: pair[1]):
        yield PinMove(new.pins[second].name, motion(old.pins[first].at * scale), new.pins[second].at)
    for pair in joints:
        joint = new.joints[pair.new]
        if joint.pin is None and joint.kind != "slide":  # where along its guide a slide is said to be has no meaning
            name = joint_name(new, joint)
            yield PinMove(name, motion(old.joints[pair.old].at * scale), joint.at, is_pin=False)


def length_changes(
    old: Linkage, new: Linkage, pairing: Pairing, scale: float, tolerance: float
) -> Iterator[FigureChange]:
    """Distances between pins of one link, the frame included, that differ by more than the tolerance."""
    back = {second: first for first, second in pairing.pins.items()}
    for first, second in sorted(pairing.links.items(), key=lambda pair: pair[1]):
        known = set(old.links[first].pins)
        pins = [pin for pin in new.links[second].pins if back.get(pin) in known]
        for start, end in _sides(pins):
            before = abs(old.pins[back[end]].at - old.pins[back[start]].at) * scale
            after = abs(new.pins[end].at - new.pins[start].at)
            if abs(after - before) > tolerance:
                names = new.pins[start].name, new.pins[end].name
                yield FigureChange(new.links[second].name, names, before, after)


def _sides(pins: Sequence[int]) -> Iterator[tuple[int, int]]:
    if len(pins) <= ALL_SIDES_UP_TO:
        yield from combinations(pins, 2)
    else:
        yield from pairwise(pins)
        yield from ((pins[0], pin) for pin in pins[2:])


def radius_changes(
    old: Linkage, new: Linkage, pairing: Pairing, scale: float, tolerance: float
) -> Iterator[FigureChange]:
    """Rings of pins of another radius; rubbing speeds follow it."""
    for first, second in sorted(pairing.pins.items(), key=lambda pair: pair[1]):
        before, after = old.pins[first].radius * scale, new.pins[second].radius
        if abs(after - before) > tolerance:
            yield FigureChange(new.pins[second].name, ("", ""), before, after)


def turned_directions(
    old: Linkage, new: Linkage, joints: Sequence[JointPair], motion: SheetMotion
) -> Iterator[FigureChange]:
    """Slides and slots that run in another direction; degrees from +x on the new sheet."""
    for pair in joints:
        before, after = old.joints[pair.old].direction, new.joints[pair.new].direction
        joint = new.joints[pair.new]
        if before is None or after is None or joint.kind not in ("slide", "pin in slot"):
            continue
        laid = motion.vector(before)
        if angle_between_lines(laid, after) > COMPARED_TURN_RADIANS:
            laid = laid if (laid / after).real >= 0 else -laid
            is_now = math.degrees(cmath.phase(after))
            was = is_now + math.degrees(cmath.phase(laid / after))
            yield FigureChange(joint_name(new, joint), ("", ""), was, is_now)
