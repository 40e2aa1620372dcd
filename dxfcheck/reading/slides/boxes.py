"""Rectangles as what slides: blocks, rams, barrels, cylinders and fixed sleeves, in their own axes (reading rule 6)."""

from __future__ import annotations

from collections import Counter, defaultdict
from collections.abc import Iterator, Mapping, Sequence
from collections.abc import Set as AbstractSet
from typing import NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import Arc, Segment
from dxfcheck.geometry import Point, cross, dot
from dxfcheck.reading.frames.frame import FrameSymbols
from dxfcheck.reading.lines.landing import Landing
from dxfcheck.reading.lines.linework import Strand
from dxfcheck.reading.lines.nearness import near_pairs
from dxfcheck.reading.lines.pins import PinSite
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.reading.shapes.rectangles import Rectangle
from dxfcheck.tolerances.linework import RIM_OF_RADIUS

__all__ = ["Anchor", "Box", "Hatched", "anchors_of", "boxes_of", "hatched_boxes"]

Anchor = tuple[int, int]
"""A strand and the end of it (0 or 1) that meets a box."""


class Box(NamedTuple):
    """A rectangle: ``axes`` are unit vectors along its sides, ``halves`` half its lengths along them.

    ``sites`` are the pins whose centres lie inside it, ``frame`` says that its layer makes it frame. ``slack`` is how
    far off its sides what meets them may lie. Of one that is ``open`` the
    side where the first axis begins is missing.
    """

    number: int
    strands: tuple[int, ...]
    centre: Point
    axes: tuple[Point, Point]
    halves: tuple[float, float]
    sites: tuple[int, ...]
    frame: bool
    slack: float
    open: bool = False

    def place(self, point: Point) -> tuple[float, float]:
        """A point's coordinates in the box's own axes, from its centre."""
        out = point - self.centre
        return dot(out, self.axes[0]), dot(out, self.axes[1])

    def holds(self, point: Point) -> bool:
        """Whether a point lies inside it or on its sides."""
        one, other = self.place(point)
        return abs(one) <= self.halves[0] + self.slack and abs(other) <= self.halves[1] + self.slack


def boxes_of(
    rectangles: Sequence[Rectangle],
    pins: Sequence[PinSite],
    landings: Sequence[Landing],
    frame: AbstractSet[int],
    tolerance: Tolerance,
) -> list[Box]:
    """The rectangles that may slide, or that something slides in, the smallest first.

    They have at most one pin inside (a cylinder has one more in its piston) and none on their corners.

    ``landings`` are those of all linework, ``frame`` the strands that their layer makes frame. A frame rectangle that
    holds a pin is a bearing and no box.
    """
    held = _pins_inside(rectangles, pins)
    corners_on_pins = {landing.strand for landing in landings if landing.how in {"end", "corner"}}
    boxes: list[Box] = []
    for rectangle, sites in zip(rectangles, held, strict=True):
        fixed = not frame.isdisjoint(rectangle.strands)
        if len(sites) > 2 or (fixed and sites) or not corners_on_pins.isdisjoint(rectangle.strands):
            continue
        first, second, third, fourth = rectangle.corners
        sides = (second - first, third - second)
        lengths = (abs(sides[0]), abs(sides[1]))
        if not lengths[0] or not lengths[1]:
            continue
        axes = (sides[0] / lengths[0], sides[1] / lengths[1])
        slack = max(tolerance.close(min(lengths)), RIM_OF_RADIUS * min(lengths) / 2.0)
        centre = (first + second + third + fourth) / 4.0
        halves = (lengths[0] / 2.0, lengths[1] / 2.0)
        rungs = len(rectangle.strands) == 2 and not sites
        if not rungs and not (rectangle.open and sites):
            boxes.append(Box(0, rectangle.strands, centre, axes, halves, tuple(sites), fixed, slack, rectangle.open))
    boxes.sort(key=lambda box: (box.halves[0] * box.halves[1], box.strands))
    return [box._replace(number=number) for number, box in enumerate(boxes)]


def anchors_of(boxes: Sequence[Box], sheet: Sheet) -> list[list[Anchor]]:
    """For each box the ends of other strands that meet its sides, or lie within its slack of them."""
    found: dict[int, dict[Anchor, None]] = {each.number: {} for each in boxes}
    slack = {each.number: each.slack for each in boxes}
    own = {each.number: each.strands for each in boxes}
    owners: defaultdict[int, list[int]] = defaultdict(list)
    for each in boxes:
        for strand in each.strands:
            owners[strand].append(each.number)
    ends, targets, gaps, meets = sheet.touching.as_pairs()
    wanted = np.zeros(len(sheet.strands), dtype=np.bool_)
    wanted[list(owners)] = True
    chosen = wanted[targets]
    measured = (each[chosen].tolist() for each in (ends, targets, gaps, meets))
    for end, target, gap, met in zip(*measured, strict=True):
        for box in owners[target]:
            if (met or gap <= slack[box]) and end // 2 not in own[box]:
                found[box].setdefault((end // 2, end % 2))
    return [list(found[each.number]) for each in boxes]


class Hatched(NamedTuple):
    """Boxes (numbers) on whose own sides hatch strokes stand, or a hatch lies; ``sides`` are all their strands.

    ``axes`` are those along which there are strokes, unless the box is hatched all over, as a section is.
    """

    numbers: frozenset[int]
    axes: Mapping[int, tuple[int, ...]]
    sides: frozenset[int]


def hatched_boxes(boxes: Sequence[Box], symbols: FrameSymbols, sheet: Sheet) -> Hatched:
    """Which boxes have hatch strokes, or a hatch, along a side, or section strokes from side to side."""
    bases = {strand for strand, _ in symbols.bases}
    axes: dict[int, tuple[int, ...]] = {}
    sides: set[int] = set()
    numbers: set[int] = set()
    for box in boxes:
        if bases.isdisjoint(box.strands) or box.frame or box.open:
            continue
        pieces = [sheet.strands[strand].pieces[number] for strand, number in symbols.bases if strand in box.strands]
        found = [_axis_of(box, piece) for piece in pieces]
        sides.update(box.strands)
        numbers.add(box.number)
        if len(found) <= SIDES_OF_A_CORNER:
            axes[box.number] = tuple(sorted(set(found)))
    for box, strokes in _sections(boxes, symbols, sheet):
        numbers.add(box.number)
        sides.update((*box.strands, *strokes))
        axes.pop(box.number, None)
    return Hatched(frozenset(numbers), axes, frozenset(sides))


def _sections(boxes: Sequence[Box], symbols: FrameSymbols, sheet: Sheet) -> Iterator[tuple[Box, set[int]]]:
    """Boxes with oblique strokes from side to side, which nothing else ends on: bars and walls in section."""
    plain = [box for box in boxes if not (box.sites or box.frame or box.open)]
    if not plain:
        return
    apart = {*symbols.strokes, *(strand for box in boxes if box.sites for strand in box.strands)}
    for box, anchors in zip(plain, anchors_of(plain, sheet), strict=True):
        ends = Counter(strand for strand, _ in anchors)
        across = {strand for strand, count in ends.items() if count == 2 and _is_oblique(box, sheet.strands[strand])}
        if len(across) >= STROKES_OF_A_SECTION and all(
            strand in across or strand in apart or box.holds(sheet.strands[strand].ends[1 - end])
            for strand, end in anchors
        ):
            yield box, across


STROKES_OF_A_SECTION = 3


def _is_oblique(box: Box, strand: Strand) -> bool:
    if not isinstance(strand.primitive, Segment):
        return False
    along = strand.ends[1] - strand.ends[0]
    return min(abs(dot(along, axis)) for axis in box.axes) > box.slack


SIDES_OF_A_CORNER = 2


def _axis_of(box: Box, piece: Segment | Arc) -> int:
    return min((0, 1), key=lambda axis: abs(cross(box.axes[axis], piece.end - piece.start)))


def _pins_inside(rectangles: Sequence[Rectangle], pins: Sequence[PinSite]) -> list[list[int]]:
    """For each rectangle the sites of the pins with their centres inside it."""
    held: list[list[int]] = [[] for _ in rectangles]
    if not rectangles or not pins:
        return held
    corners = np.array([rectangle.corners for rectangle in rectangles], dtype=np.complex128)
    centres = corners.mean(axis=1)
    places = np.array([pin.at for pin in pins], dtype=np.complex128)
    reach = np.abs(corners - centres[:, None]).max(axis=1)
    which, place = near_pairs(centres, reach, places, places)
    for number, pin in zip(which.tolist(), place.tolist(), strict=True):
        first, second, third, _ = rectangles[number].corners
        out = pins[pin].at - complex(centres[number])
        along, across = second - first, third - second
        if abs(dot(out, along)) <= abs(along) ** 2 / 2 and abs(dot(out, across)) <= abs(across) ** 2 / 2:
            held[number].append(pins[pin].number)
    return held
