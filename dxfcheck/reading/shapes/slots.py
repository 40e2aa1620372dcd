"""Slots and the pins and blocks in them, and bars (reading rule 6).

Glossary
    slot        an obround or curved slot in which a pin slides, or a block with a pin
    bar         an obround with a pin at each end: one link
"""

from __future__ import annotations

import math
from collections import defaultdict
from collections.abc import Collection, Iterator, Sequence
from dataclasses import dataclass
from itertools import permutations
from typing import NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import Segment
from dxfcheck.geometry import Point, angle_between_lines, cross, dot
from dxfcheck.reading.lines.linework import Linework, Strand
from dxfcheck.reading.lines.nearness import near_pairs
from dxfcheck.reading.lines.pins import PinSite
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.reading.shapes.contact import Oddity
from dxfcheck.reading.shapes.contours import Contour
from dxfcheck.reading.shapes.obrounds import Channel
from dxfcheck.reading.shapes.rectangles import Rectangle
from dxfcheck.tolerances.linework import (
    BLOCK_IN_SLOT_RADII,
    HOLE_OF_BAR,
    RIGHT_ANGLE_DEGREES,
    RIM_OF_RADIUS,
    STROKE_PARALLEL_DEGREES,
)

__all__ = ["Bar", "Slot", "Slots", "find_slots"]


class Slot(NamedTuple):
    """A slot, the sites that slide in it, and the strands of the block round them (none for a mere pin).

    ``pinned`` is a site at one of its end centres, on which it turns: the pivot of a slotted lever.
    """

    shape: Channel
    sites: tuple[int, ...]
    block: tuple[int, ...] = ()
    pinned: int | None = None

    @property
    def strands(self) -> tuple[int, ...]:
        """What it is drawn with."""
        return self.shape.strands


class Bar(NamedTuple):
    """An obround or curved slot with a pin at each end, or with two narrow holes equally far from its ends."""

    shape: Channel
    sites: tuple[int, int]


@dataclass(frozen=True, slots=True, kw_only=True)
class Slots:
    """What the obrounds and curved slots of a sheet are; ``empty`` are those that hold no pin at all."""

    slots: tuple[Slot, ...]
    bars: tuple[Bar, ...]
    empty: tuple[Channel, ...]
    oddities: tuple[Oddity, ...]


def find_slots(
    shapes: Sequence[Channel],
    pins: Sequence[PinSite],
    linework: Linework,
    tolerance: Tolerance,
    *,
    carrying: Collection[int] | None = None,
    outlines: Sequence[Contour] = (),
    rectangles: Sequence[Rectangle] = (),
) -> Slots:
    """Tell slots from bars by the pins in them.

    ``carrying`` are the sites on which other linework lands (None: all), ``outlines`` contours of which a pin may be a
    hole. A shape in which nothing else holds a pin is itself an outline with holes, not a slot, and is left out; so is
    one with three pins or more, and one out of which another is cut.
    ``rectangles`` may be blocks in slots.
    """
    slots: list[Slot] = []
    bars: list[Bar] = []
    empty: list[Channel] = []
    oddities: list[Oddity] = []
    inside = _pins_in(shapes, pins)
    cuts = _cuts(shapes, inside)
    inside = [
        [pin for pin in held if not any(shapes[cut].contains(pin.at) for cut in cuts[number])]
        for number, held in enumerate(inside)
    ]
    outlines_round = _outlines_round(inside, outlines)
    for number, (shape, held) in enumerate(zip(shapes, inside, strict=True)):
        inner = [pin for pin in held if shape.holds(pin)]
        ends = [pin for pin in held if shape.ends_at(pin, tolerance)]
        if len(inner) == 2 and (inner == ends or _overhangs_alike(shape, inner, tolerance)):
            bars.append(Bar(shape, (inner[0].number, inner[1].number)))
        elif cuts[number]:
            continue
        elif not held:
            empty.append(shape)
        elif len(held) <= 2 and any(
            carrying is None
            or pin.number in carrying
            or any(_foreign(each, shape) for each in outlines_round[pin.number])
            for pin in held
        ):
            slots.append(_slot(shape, held, ends))
            oddities.extend(_two_pins(shape, held, ends, tolerance))
    blocked = _with_blocks(slots, pins, linework, rectangles, tolerance)
    for slot in blocked:
        oddities.extend(_off_centre(slot, pins, tolerance))
    return Slots(slots=tuple(blocked), bars=tuple(bars), empty=tuple(empty), oddities=tuple(oddities))


def _pins_in(shapes: Sequence[Channel], pins: Sequence[PinSite]) -> list[list[PinSite]]:
    """The pins inside each shape."""
    found: list[list[PinSite]] = [[] for _ in shapes]
    if shapes and pins:
        ends = [shape.centres for shape in shapes]
        middles = np.array([(one + other) / 2 for one, other in ends], dtype=np.complex128)
        reach = np.array([shape.length / 2 + shape.radius for shape in shapes])
        places = np.array([pin.at for pin in pins], dtype=np.complex128)
        for number, pin in zip(*(each.tolist() for each in near_pairs(middles, reach, places, places)), strict=True):
            if shapes[number].contains(pins[pin].at):
                found[number].append(pins[pin])
    # Beside a pin that fits, one whose ring crosses the side of the slot merely lies in its way.
    fitting = [[pin for pin in held if _fits(shape, pin)] for shape, held in zip(shapes, found, strict=True)]
    return [fits or held for fits, held in zip(fitting, found, strict=True)]


def _fits(shape: Channel, pin: PinSite) -> bool:
    """Whether a pin's ring lies between the sides of a slot; one on the centre line may be drawn larger."""
    aside = abs(shape.aside(pin.at))
    return aside <= max(RIM_OF_RADIUS * shape.radius, shape.radius - (1.0 - RIM_OF_RADIUS) * pin.radius)


def _cuts(shapes: Sequence[Channel], inside: Sequence[Sequence[PinSite]]) -> list[list[int]]:
    """For each shape, those with pins that lie inside it: slots cut out of it."""
    round_pin: defaultdict[int, list[int]] = defaultdict(list)
    for number, held in enumerate(inside):
        for pin in held:
            round_pin[pin.number].append(number)
    found: list[list[int]] = [[] for _ in shapes]
    for numbers in round_pin.values():
        for outer, inner in permutations(numbers, 2):
            narrower = shapes[inner].radius < shapes[outer].radius
            if narrower and all(shapes[outer].contains(centre) for centre in shapes[inner].centres):
                found[outer].append(inner)
    return found


def _outlines_round(
    inside: Sequence[Sequence[PinSite]], outlines: Sequence[Contour]
) -> defaultdict[int, list[Contour]]:
    """The contours inside which each pin of some shape lies, by site."""
    found: defaultdict[int, list[Contour]] = defaultdict(list)
    pins = list({pin.number: pin for held in inside for pin in held}.values())
    if pins and outlines:
        middles, reaches = zip(*(contour.circle_round() for contour in outlines), strict=True)
        places = np.array([pin.at for pin in pins], dtype=np.complex128)
        pairs = near_pairs(np.array(middles), np.array(reaches), places, places)
        for number, place in zip(*(each.tolist() for each in pairs), strict=True):
            if outlines[number].contains(pins[place].at):
                found[pins[place].number].append(outlines[number])
    return found


def _foreign(contour: Contour, shape: Channel) -> bool:
    """Whether a contour is neither a shape itself nor what the shape is cut out of."""
    return set(contour.strands).isdisjoint(shape.strands) and not contour.encloses(shape.centres)


def _overhangs_alike(shape: Channel, pins: Sequence[PinSite], tolerance: Tolerance) -> bool:
    """Whether two holes that are much narrower than a shape lie equally far from its ends: a bar that overhangs."""
    low, high = sorted(shape.along(pin.at) for pin in pins)
    narrow = all(
        pin.radius < HOLE_OF_BAR * shape.radius and abs(shape.aside(pin.at)) <= tolerance.rim(shape.radius)
        for pin in pins
    )
    return narrow and abs(low - (shape.length - high)) <= shape.end_slack(tolerance)


def _slot(shape: Channel, held: Sequence[PinSite], ends: Sequence[PinSite]) -> Slot:
    """A slot with one pin, or with two of which one at an end is its pivot."""
    pinned = ends[0].number if len(held) == 2 and len(ends) == 1 else None
    return Slot(shape, tuple(pin.number for pin in held if pin.number != pinned), pinned=pinned)


def _two_pins(
    shape: Channel, held: Sequence[PinSite], ends: Sequence[PinSite], tolerance: Tolerance
) -> Iterator[Oddity]:
    """What is wrong about a slot with two pins: how far they are from making a bar of it."""
    if len(held) != 2:
        return
    gaps = [[abs(pin.at - centre) for centre in shape.centres] for pin in held]
    straight, crossed = max(gaps[0][0], gaps[1][1]), max(gaps[0][1], gaps[1][0])
    amount = min(straight, crossed)
    worst = max(held, key=lambda pin: min(abs(pin.at - centre) for centre in shape.centres))
    how = "the one at its end is read as its pivot" if ends else "both are read as sliding in it"
    detail = (
        f"two pins in one slot, where one pin (a slot) or a pin at each end (a bar) was expected; "
        f"a pin is {{amount}} from its end's centre; {how}"
    )
    limit = shape.end_slack(tolerance)
    yield Oddity("slot-pins", worst.at, detail, amount, limit, site=worst.number, strands=shape.strands)


def _off_centre(slot: Slot, pins: Sequence[PinSite], tolerance: Tolerance) -> Iterator[Oddity]:
    """Pins beside the centre line of their slot; where a block stands between, it need not be on it."""
    limit = tolerance.rim(slot.shape.radius)
    for site in () if slot.block else slot.sites:
        amount = _away(slot.shape, pins[site].at)
        if amount > limit:
            detail = "the pin is {amount} off the centre line of its slot"
            yield Oddity("off-slot-centre", pins[site].at, detail, amount, limit, site=site, strands=slot.strands)


def _away(shape: Channel, point: Point) -> float:
    return abs(shape.aside(point))


# --- blocks in slots ---


def _with_blocks(
    slots: Sequence[Slot],
    pins: Sequence[PinSite],
    linework: Linework,
    rectangles: Sequence[Rectangle],
    tolerance: Tolerance,
) -> list[Slot]:
    """The slots, each with the block that stands in it round its one sliding pin."""
    single = [slot for slot in slots if len(slot.sites) == 1]
    if not single:
        return list(slots)
    places = np.array([pins[slot.sites[0]].at for slot in single], dtype=np.complex128)
    corners = np.array([sum(each.corners) / len(each.corners) for each in rectangles], dtype=np.complex128)
    reach = np.array([BLOCK_IN_SLOT_RADII * slot.shape.radius for slot in single])
    block: dict[int, tuple[int, ...]] = {}
    for number, each in zip(*(got.tolist() for got in near_pairs(places, reach, corners, corners)), strict=True):
        pin = pins[single[number].sites[0]]
        if number not in block and _stands_in(rectangles[each], single[number].shape, pin, tolerance):
            block[number] = rectangles[each].strands
    across: defaultdict[int, list[tuple[float, int]]] = defaultdict(list)
    which, piece = near_pairs(places, reach, linework.piece_starts, linework.piece_ends)
    for number, strand in zip(which.tolist(), linework.piece_strand[piece].tolist(), strict=True):
        side = _side_of(linework.strands[strand], single[number], pins, tolerance)
        if side is not None:
            across[number].append((side, strand))
    for number, strokes in across.items():
        before = max((each for each in strokes if each[0] < 0.0), default=None)
        after = min((each for each in strokes if each[0] > 0.0), default=None)
        if number not in block and before is not None and after is not None:
            block[number] = (before[1], after[1])
    found = {slot.strands: slot._replace(block=block.get(number, ())) for number, slot in enumerate(single)}
    return [found.get(slot.strands, slot) for slot in slots]


def _stands_in(rectangle: Rectangle, shape: Channel, pin: PinSite, tolerance: Tolerance) -> bool:
    """Whether a rectangle lies between the sides of a slot, round the pin and along the slot."""
    if set(rectangle.strands) & set(shape.strands):
        return False
    along = shape.tangent_at(pin.at)
    corners = rectangle.corners
    widest = shape.radius + tolerance.rim(shape.radius)
    offsets = [corner - pin.at for corner in corners]
    parts = ([dot(along, offset) for offset in offsets], [cross(along, offset) for offset in offsets])
    round_pin = all(min(part) < 0.0 < max(part) for part in parts)
    within = max(abs(shape.aside(corner)) for corner in corners) <= widest
    lean = min(angle_between_lines(corners[1] - corners[0], along), angle_between_lines(corners[2] - corners[1], along))
    return round_pin and within and lean <= math.radians(RIGHT_ANGLE_DEGREES)


def _side_of(strand: Strand, slot: Slot, pins: Sequence[PinSite], tolerance: Tolerance) -> float | None:
    """How far along its slot a stroke across it stands from the pin; None where it is no such stroke."""
    shape = slot.shape
    if not isinstance(strand.primitive, Segment) or strand.number in shape.strands:
        return None
    within = max(tolerance.rim(shape.radius), tolerance.close(shape.radius))
    if abs(strand.length - 2 * shape.radius) > 2 * within:
        return None
    sides = sorted(shape.aside(end) for end in strand.ends)
    middle = (strand.ends[0] + strand.ends[1]) / 2
    square = math.pi / 2 - angle_between_lines(strand.ends[1] - strand.ends[0], shape.tangent_at(middle))
    on_both = max(abs(sides[0] + shape.radius), abs(sides[1] - shape.radius)) <= within
    if not on_both or square > math.radians(STROKE_PARALLEL_DEGREES):
        return None
    away = shape.along(middle) - shape.along(pins[slot.sites[0]].at)
    return away or None
