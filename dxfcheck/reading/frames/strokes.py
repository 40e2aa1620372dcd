"""Hatch strokes on base lines, exact ones and clipped ones that stop short (reading rule 5)."""

from __future__ import annotations

import math
from collections import Counter, defaultdict
from collections.abc import Collection, Iterable, Iterator, Sequence
from typing import NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import Segment
from dxfcheck.geometry import Point, angle_between_lines, cross
from dxfcheck.reading.frames.bases import Base, piece_of
from dxfcheck.reading.lines.linework import Strand, distance_to_piece
from dxfcheck.reading.lines.nearness import near_pairs
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.reading.lines.touches import Touch
from dxfcheck.tolerances.linework import STROKE_PARALLEL_DEGREES
from dxfcheck.tolerances.shapes import STROKE_ANGLES_DEGREES, STROKE_OF_BASE, STROKE_SHORT_OF_BASE

__all__ = ["accept_bases", "loose_strokes", "strokes_on_bases"]

STROKES_OF_A_SYMBOL = 2


class Stroke(NamedTuple):
    """A line that may be a hatch stroke of a base: on which side, and in which direction away from it.

    One whose far end lies on a pin is not ``firm``: it counts only beside others that are.
    """

    strand: int
    base: Base
    side: bool
    direction: Point
    firm: bool


def _as_stroke(strands: Sequence[Strand], index: int, base: Base, near: int, *, firm: bool) -> Stroke | None:
    """A line as a stroke of a base by its angle and length, its end ``near`` being the one at the base.

    What lies on a frame layer does not make a line on another layer its base.
    """
    line, piece = strands[index], piece_of(strands, base)
    along = piece.end - piece.start
    if line.length > STROKE_OF_BASE * abs(along) or (line.frame and not strands[base.strand].frame):
        return None
    direction = line.ends[1 - near] - line.ends[near]
    low, high = STROKE_ANGLES_DEGREES
    if not low <= math.degrees(angle_between_lines(direction, along)) <= high:
        return None
    return Stroke(index, base, cross(along, direction) > 0, direction, firm)


def strokes_on_bases(
    sheet: Sheet,
    candidates: Iterable[int],
    ignored: Collection[int],
    landed: Collection[tuple[int, int | None]],
    outlines: Collection[int] = (),
) -> Iterator[Stroke]:
    """Lines with one end on another line and the other end free, or on the side of one of the ``outlines`` laid over.

    A stroke may well begin inside the ring of a pin, where its base runs through the pin, or even end there.
    """
    strands = sheet.strands
    links = {index for index, end in landed if end == 0 and (index, 1) in landed}
    outlines_only = frozenset(outlines)
    for index in candidates:
        strand = strands[index]
        if not isinstance(strand.primitive, Segment) or index in links or sheet.touching.alone(index):
            continue
        closing = [_closest(_near(sheet, ignored, index, end), sheet.tolerance) for end in (0, 1)]
        for end in (0, 1):
            firm = (index, 1 - end) not in landed
            if firm and not outlines_only.issuperset(closing[1 - end]):
                continue
            for target in closing[end]:
                base = _base_at(strands[target], strand.ends[end])
                stroke = _as_stroke(strands, index, base, end, firm=firm) if base else None
                if stroke is not None:
                    yield stroke


def _near(sheet: Sheet, ignored: Collection[int], strand: int, end: int) -> Sequence[Touch]:
    """What lies near an end, but for marks and what rings are made of: a stroke may stop beside a ring or a cross."""
    near = sheet.touching.at(strand, end)
    return [touch for touch in near if touch.strand not in ignored] if near and ignored else near


def _closest(near: Sequence[Touch], tolerance: Tolerance) -> list[int]:
    """The strands that an end closes on: of several within the shape tolerance, those it is nearest to."""
    if len(near) < 2:
        return [touch.strand for touch in near]
    nearest = min([touch.gap for touch in near]) + tolerance.t
    return [touch.strand for touch in near if touch.gap <= nearest]


def _base_at(strand: Strand, point: Point) -> Base | None:
    number = 0
    if len(strand.pieces) > 1:
        number = min(range(len(strand.pieces)), key=lambda each: distance_to_piece(point, strand.pieces[each]))
    return Base(strand.number, number) if isinstance(strand.pieces[number], Segment) else None


def accept_bases(
    strands: Sequence[Strand],
    candidates: Iterable[Stroke],
    known: dict[int, Stroke],
    bases: Sequence[Base] = (),
) -> tuple[list[Base], dict[int, Stroke]]:
    """Bases with two or more parallel strokes on one side, the longest first; a stroke serves one base only.

    A base already known takes single strokes that run parallel to its own.
    """
    by_base: defaultdict[Base, list[Stroke]] = defaultdict(list)
    for stroke in candidates:
        by_base[stroke.base].append(stroke)
    accepted, taken = list(bases), dict(known)
    longest_first = sorted(by_base, key=lambda base: (-_length(piece_of(strands, base)), base))
    own: defaultdict[Base, list[Stroke]] = defaultdict(list)
    for stroke in known.values():
        own[stroke.base].append(stroke)
    for base in longest_first:
        if base.strand in taken:
            continue
        together = own[base] + [stroke for stroke in by_base[base] if stroke.strand not in taken]
        firm = [stroke for stroke in together if stroke.firm]
        group = max((_parallel_to(stroke, together) for stroke in firm), key=len, default=[])
        if sum(stroke.firm for stroke in group) >= STROKES_OF_A_SYMBOL:
            taken.update({stroke.strand: stroke for stroke in group})
            if not own[base]:
                accepted.append(base)
    return accepted, taken


def _length(piece: Segment) -> float:
    return abs(piece.end - piece.start)


def _parallel_to(stroke: Stroke, others: Iterable[Stroke]) -> list[Stroke]:
    within = math.radians(STROKE_PARALLEL_DEGREES)
    return [
        other
        for other in others
        if other.side == stroke.side and angle_between_lines(other.direction, stroke.direction) <= within
    ]


def loose_strokes(
    sheet: Sheet,
    relevant: Collection[int],
    ignored: Collection[int],
    known: Collection[Base],
    strokes: Collection[int],
    landed: Collection[tuple[int, int | None]],
    links: Collection[int],
) -> Iterator[Stroke]:
    """Free lines that stop a little short of a base, as clipped hatches do.

    A known base comes first, then the one that most of them stand on, then the nearest: a rod that passes close by the
    strokes of a symbol is not their base.
    """
    strands = sheet.strands
    free = _free_lines(sheet, ignored, strokes, landed)
    bases = [
        Base(index, number)
        for index in sorted(relevant)
        if index not in strokes
        for number, piece in enumerate(strands[index].pieces)
        if isinstance(piece, Segment)
    ]
    if not free or not bases:
        return
    found: defaultdict[int, list[tuple[float, Stroke]]] = defaultdict(list)
    standing: Counter[Base] = Counter()
    for place, piece in _short_of(strands, free, bases):
        strand, near, base = strands[free[place // 2]], place % 2, bases[piece]
        if (strand.number, 1 - near) in landed:
            continue
        stroke = _as_stroke(strands, strand.number, base, near, firm=True)
        if stroke is not None and _stops_short(strand, near, piece_of(strands, base)):
            found[strand.number].append((abs(_height(strand.ends[near], piece_of(strands, base))), stroke))
            standing[base] += 1

    def rank(base: Base) -> tuple[bool, bool, int]:
        return base not in known, base.strand in links, -standing[base]

    for options in found.values():
        yield min(options, key=lambda each: (*rank(each[1].base), each[0]))[1]


def _free_lines(
    sheet: Sheet,
    ignored: Collection[int],
    strokes: Collection[int],
    landed: Collection[tuple[int, int | None]],
) -> list[int]:
    """Lines whose ends meet nothing (but marks and rings), other than strokes already and links from pin to pin."""
    ends, targets, _, meets = sheet.touching.as_pairs()
    passed = np.zeros(len(sheet.strands), dtype=np.bool_)
    passed[list(ignored)] = True
    met = np.zeros(len(sheet.strands), dtype=np.bool_)
    met[ends[meets & ~passed[targets]] // 2] = True
    straight = np.isfinite(sheet.linework.line_directions().real) & ~met
    return [
        number
        for number in np.nonzero(straight)[0].tolist()
        if number not in strokes and not ((number, 0) in landed and (number, 1) in landed)
    ]


def _short_of(strands: Sequence[Strand], free: Sequence[int], bases: Sequence[Base]) -> Iterator[tuple[int, int]]:
    """Ends (two to a line) that stop short of a base at least so much longer that the line may be a stroke of it."""
    lengths = np.repeat([strands[number].length for number in free], 2)
    points = np.array([end for number in free for end in strands[number].ends], dtype=np.complex128)
    starts = np.array([piece_of(strands, base).start for base in bases], dtype=np.complex128)
    ends = np.array([piece_of(strands, base).end for base in bases], dtype=np.complex128)
    which, piece = near_pairs(points, STROKE_SHORT_OF_BASE * lengths, starts, ends)
    longer = lengths[which] <= STROKE_OF_BASE * np.abs(ends - starts)[piece]
    yield from zip(which[longer].tolist(), piece[longer].tolist(), strict=True)


def _height(point: Point, base: Segment) -> float:
    """How far to the left of a base line a point lies."""
    along = base.end - base.start
    return cross(along, point - base.start) / abs(along)


def _stops_short(line: Strand, near: int, base: Segment) -> bool:
    heights = [_height(end, base) for end in line.ends]
    low, high = heights[near], heights[1 - near]
    return low * high > 0 and abs(low) <= STROKE_SHORT_OF_BASE * abs(high - low) and abs(low) < abs(high)
