"""Rectangles and lines that belong to a block: a bush in it, a second outline, its centre marks (reading rule 6)."""

from __future__ import annotations

import math
from collections import defaultdict
from collections.abc import Collection, Iterator, Sequence

from dxfcheck.geometry import cross
from dxfcheck.reading.lines.pins import PinSite
from dxfcheck.reading.slides.boxes import Box
from dxfcheck.reading.slides.guides import choose_guide
from dxfcheck.reading.slides.rails import Rail
from dxfcheck.tolerances.linework import GUIDE_TURN_DEGREES
from dxfcheck.tolerances.shapes import BUSH_GAPS_ALIKE, CENTRE_MARK_OF_BLOCK

__all__ = ["with_their_own"]


def with_their_own(
    boxes: Sequence[Box], rails: Sequence[Sequence[Rail]], known: Collection[int], pins: Sequence[PinSite]
) -> tuple[list[Box], list[list[Rail]], set[int]]:
    """The boxes and their rails, with what belongs to a block among its strands and not among its rails.

    And the numbers of the boxes that are part of another one. ``known`` are the strands known to be frame.
    """
    settled, near = list(boxes), [list(each) for each in rails]
    parts: set[int] = set()
    by_site: defaultdict[int, list[int]] = defaultdict(list)
    for box in boxes:
        if len(box.sites) == 1:
            by_site[box.sites[0]].append(box.number)
            marks = set(_centre_marks(box, near[box.number], known, pins[box.sites[0]]))
            if marks:
                _take(settled, near, box.number, marks)
    for numbers in by_site.values():
        for place, outer in enumerate(numbers):
            for inner in numbers[:place]:
                if inner not in parts and _is_part(boxes[inner], boxes[outer], near[outer], known):
                    parts.add(inner)
                    _take(settled, near, outer, set(settled[inner].strands))
    return settled, near, parts


def _take(boxes: list[Box], rails: list[list[Rail]], number: int, strands: Collection[int]) -> None:
    own = boxes[number].strands
    boxes[number] = boxes[number]._replace(strands=(*own, *sorted(set(strands) - set(own))))
    rails[number] = [rail for rail in rails[number] if rail.strand not in strands]


def _is_part(inner: Box, outer: Box, rails: Sequence[Rail], known: Collection[int]) -> bool:
    """Whether a box is the same one drawn again, or a bush in a block that has a guide of its own."""
    slack = max(inner.slack, outer.slack)
    turned = abs(cross(inner.axes[0], outer.axes[0]))
    within = math.sin(math.radians(GUIDE_TURN_DEGREES))
    if abs(inner.centre - outer.centre) > slack or within < turned < math.cos(math.radians(GUIDE_TURN_DEGREES)):
        return False
    halves = inner.halves if turned <= within else inner.halves[::-1]
    gaps = sorted(large - small for large, small in zip(outer.halves, halves, strict=True))
    if gaps[1] <= slack:
        return gaps[0] >= -slack
    if gaps[0] <= slack or gaps[1] > BUSH_GAPS_ALIKE * gaps[0]:
        return False
    return choose_guide(outer, [rail for rail in rails if rail.strand not in inner.strands], known, ()) is not None


def _centre_marks(box: Box, rails: Sequence[Rail], known: Collection[int], pin: PinSite) -> Iterator[int]:
    """Two lines that cross at a block's pin and run only just out of it on all sides."""
    found: dict[int, list[int]] = {0: [], 1: []}
    at = box.place(pin.at)
    for rail in rails:
        middle = (rail.low + rail.high) / 2.0 - at[rail.axis]
        short = rail.high - rail.low <= 2.0 * CENTRE_MARK_OF_BLOCK * box.halves[rail.axis]
        central = max(abs(middle), abs(rail.offset - at[1 - rail.axis])) <= box.slack
        if rail.how == "through" and short and central and rail.strand not in known:
            found[rail.axis].append(rail.strand)
    if found[0] and found[1]:
        yield from found[0]
        yield from found[1]
