"""Which linework is looked at: what hangs together with pins, boxes by it, and the guides of these boxes.

A sheet may hold tens of thousands of lines of other parts; only what is reached from a pin, a wheel or a slot counts.
"""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterable, Iterator, Mapping, Sequence
from typing import NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import Ring
from dxfcheck.reading.frames.frame import LEG, FrameSymbols
from dxfcheck.reading.gears.gearing import strands_at_wheels
from dxfcheck.reading.lines.nearness import near_pairs
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.lines.sorting import Sorted
from dxfcheck.reading.shapes.outlined import Outlined
from dxfcheck.reading.shapes.rectangles import find_rectangles
from dxfcheck.reading.slides.boxes import Box, boxes_of
from dxfcheck.reading.slides.rails import Rail, rails_of
from dxfcheck.reading.slides.sleeves import lines_beside_rods
from dxfcheck.reading.slides.slides import anchors_of

__all__ = ["Ground", "find_ground", "without_plinths"]


class Ground(NamedTuple):
    """The strands that hang together with pins, and the boxes among them with the lines that run along each."""

    reached: Sequence[int]
    boxes: Sequence[Box]
    rails: Sequence[Sequence[Rail]]


def find_ground(kinds: Sorted, sheet: Sheet, outlined: Outlined, by_layer: Mapping[int, str]) -> Ground:
    """What there is to look at: linework on pins first, then boxes by it, then the guides of these boxes."""
    apart = outlined.borders | sheet.ring_strands
    touched = [each.strand for each in outlined.landings if each.how != "across" or each.strand in by_layer]
    touched.extend(kinds.racks)
    touched.extend(outlined.slotted)
    touched.extend(strand for slot in outlined.slots for strand in (*slot.strands, *slot.block))
    touched.extend(strands_at_wheels(kinds.pitch_rings, sheet))
    touched.extend(_on_discs([disc.ring for disc in sheet.sites.discs], sheet))
    neighbours = _neighbours(sheet)
    seen: set[int] = set(apart)
    reached = _reached(touched, sheet, neighbours, seen)
    reached.extend(_reached(lines_beside_rods(sheet, reached), sheet, neighbours, seen))
    carrying = {landing.pin for landing in outlined.landings}
    used = [pin for pin in sheet.pins if pin.number in carrying]
    no_boxes = apart | outlined.slotted
    on_pins: defaultdict[int, set[int]] = defaultdict(set)
    for landing in outlined.landings:
        if landing.how == "end":
            on_pins[landing.strand].add(landing.pin)
    rectangles = [
        each
        for each in find_rectangles(sheet.linework, sheet.touching, used, sheet.tolerance, reached)
        if no_boxes.isdisjoint(each.strands) and not _welds_arms(each.strands, on_pins, sheet)
    ]
    if not rectangles:
        return Ground(sorted(reached), (), ())
    boxes = boxes_of(rectangles, sheet.pins, sheet.landings.landings, by_layer.keys(), sheet.tolerance)
    rails = rails_of(boxes, sheet.linework, sheet.touching, sheet.landings.landings, apart | kinds.racks)
    beside = {rail.strand for each in rails for rail in each} | {each for box in boxes for each in box.strands}
    reached.extend(_reached(sorted(beside), sheet, neighbours, seen))
    return Ground(sorted(reached), boxes, rails)


def _welds_arms(sides: Sequence[int], on_pins: Mapping[int, set[int]], sheet: Sheet) -> bool:
    """Whether four lines are the weld strokes of a spider: each ends on arms, and all arms run from one pin."""
    shared: set[int] | None = None
    together: set[int] = set()
    for side in sides:
        for end in range(len(sheet.strands[side].ends)):
            arms = [each for each in sheet.touching.met(side, end) if each not in sides and each in on_pins]
            if not arms:
                return False
            pins = set().union(*(on_pins[each] for each in arms))
            shared = pins if shared is None else shared & pins
            together.update(arms)
    return bool(shared) and len(together) >= len(sides)


def without_plinths(ground: Ground, symbols: FrameSymbols, sheet: Sheet) -> Ground:
    """Without boxes under the legs of a frame symbol: those are its base."""
    if not ground.boxes:
        return ground
    legs = {strand for strand, why in symbols.frame.items() if why == LEG}
    plinths = {
        number
        for number, anchors in enumerate(anchors_of(ground.boxes, sheet))
        if any(strand in legs for strand, _ in anchors)
    }
    kept = [number for number in range(len(ground.boxes)) if number not in plinths]
    boxes = [ground.boxes[number]._replace(number=place) for place, number in enumerate(kept)]
    return ground._replace(boxes=boxes, rails=[ground.rails[number] for number in kept])


def _on_discs(discs: Sequence[Ring], sheet: Sheet) -> Iterator[int]:
    """Strands that end on the rim of a disc."""
    for ring in discs:
        within = sheet.tolerance.rim(ring.radius)
        for strand in sheet.strands:
            if any(abs(abs(end - ring.centre) - ring.radius) <= within for end in strand.ends):
                yield strand.number


def _reached(
    touched: Iterable[int], sheet: Sheet, neighbours: tuple[_Neighbours, _Neighbours], seen: set[int]
) -> list[int]:
    """Strands, but for those ``seen``, that hang together with the ones touched: all others are other linework.

    Linework hangs together where ends meet. Twice, what is close enough to belong to a frame symbol is taken in as
    well: the base under a leg, then the strokes under the base. What is reached counts as seen from now on.
    """
    beside, close = neighbours
    fresh = _spread(list(touched), beside, seen)
    reached = list(fresh)
    for _ in range(FRINGES):
        nearby = [near for number in fresh for near in close.of(number)]
        nearby.extend(_under_corners(sheet, fresh))
        fresh = _spread(nearby, beside, seen)
        reached.extend(fresh)
    return reached


def _under_corners(sheet: Sheet, reached: Sequence[int]) -> list[int]:
    """Lines that corners of reached polylines lie on: the base line under a triangle drawn in one piece."""
    paths = [sheet.strands[number] for number in reached if sheet.strands[number].corners]
    corners = np.array([corner for path in paths for corner in path.corners], dtype=np.complex128)
    reach = np.array([sheet.tolerance.close(path.length) for path in paths for _ in path.corners])
    _, pieces = near_pairs(corners, reach, sheet.linework.piece_starts, sheet.linework.piece_ends)
    found: list[int] = np.unique(sheet.linework.piece_strand[pieces]).tolist()
    return found


FRINGES = 2


class _Neighbours(NamedTuple):
    """The neighbours of each strand, in one list; ``first`` says where those of each strand begin."""

    first: Sequence[int]
    others: Sequence[int]

    def of(self, strand: int) -> Sequence[int]:
        return self.others[self.first[strand] : self.first[strand + 1]]


def _neighbours(sheet: Sheet) -> tuple[_Neighbours, _Neighbours]:
    """Strands that meet, and strands that come within the shape tolerance of one another."""
    ends, targets, _, meets = sheet.touching.as_pairs()
    owners = ends // 2

    def listed(chosen: np.typing.NDArray[np.bool_]) -> _Neighbours:
        one = np.concatenate((owners[chosen], targets[chosen]))
        other = np.concatenate((targets[chosen], owners[chosen]))
        order = np.argsort(one, kind="stable")
        first = np.searchsorted(one[order], np.arange(len(sheet.strands) + 1))
        return _Neighbours(first.tolist(), other[order].tolist())

    return listed(meets), listed(np.ones(meets.size, dtype=np.bool_))


def _spread(waiting: list[int], beside: _Neighbours, seen: set[int]) -> list[int]:
    """The strands not seen before that hang together with those waiting; they count as seen from now on."""
    reached = []
    while waiting:
        number = waiting.pop()
        if number not in seen:
            seen.add(number)
            reached.append(number)
            waiting.extend(beside.of(number))
    return reached
