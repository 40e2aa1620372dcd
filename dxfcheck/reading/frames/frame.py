"""Frame symbols in plain lines: a base line with hatch strokes on one side, or a hatch along it (reading rule 5)."""

from __future__ import annotations

import math
from collections import defaultdict
from collections.abc import Collection, Iterable, Iterator, Sequence
from dataclasses import dataclass
from typing import NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import Fill, Segment
from dxfcheck.geometry import Point, angle_between_lines, cross, parameter_on_line
from dxfcheck.reading.lines.landing import Landing
from dxfcheck.reading.lines.linework import Strand, distance_to_piece
from dxfcheck.reading.lines.nearness import near_pairs
from dxfcheck.reading.lines.pins import PinSite
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.reading.lines.touches import Touch
from dxfcheck.reading.shapes.outlines import inside_outline
from dxfcheck.settings import (
    STROKE_ANGLES_DEGREES,
    STROKE_OF_BASE,
    STROKE_PARALLEL_DEGREES,
    STROKE_SHORT_OF_BASE,
)

__all__ = ["LEG", "FrameSymbols", "find_frame_symbols"]

LEG = "leg of a frame symbol"

STROKES_OF_A_SYMBOL = 2


@dataclass(frozen=True, slots=True, kw_only=True)
class FrameSymbols:
    """Strands that are frame by a symbol (bases and legs) and strands that are its hatch strokes, with reasons.

    ``bases`` are the straight pieces (strand, number) that strokes stand on or a hatch runs along.
    """

    frame: dict[int, str]
    strokes: dict[int, str]
    bases: tuple[tuple[int, int], ...] = ()


class _Base(NamedTuple):
    """One straight piece of a strand, as a base line strokes may stand on."""

    strand: int
    number: int


class _Stroke(NamedTuple):
    """A line that may be a hatch stroke of a base: on which side, and in which direction away from it.

    One whose far end lies on a pin is not ``firm``: it counts only beside others that are.
    """

    strand: int
    base: _Base
    side: bool
    direction: Point
    firm: bool


def find_frame_symbols(
    sheet: Sheet,
    relevant: Collection[int],
    marks: Collection[int],
    landings: Sequence[Landing],
    boxes: Collection[int] = (),
) -> FrameSymbols:
    """Frame symbols among the linework that hangs together with pins (``relevant`` strands, no ``marks``).

    ``boxes`` are strands of rectangles that may slide: a single rod that ends on one is no leg, the two of a triangle
    are.
    """
    strands, tolerance = sheet.strands, sheet.tolerance
    ignored = sheet.ring_strands.union(marks)
    landed = {(landing.strand, landing.end) for landing in landings}
    standing = _strokes_on_bases(sheet, relevant, ignored, landed)
    bases, strokes = _accept(strands, standing, {})
    loose = _loose_strokes(sheet, relevant, ignored, bases, strokes, landed)
    bases, strokes = _accept(strands, loose, strokes, bases)
    reasons = {base.strand: "base line of a frame symbol with hatch strokes" for base in bases}
    hatched = _bases_along_hatches(strands, relevant, sheet.fills, sheet.pins, tolerance)
    reasons.update({base.strand: "base line with a hatch along it" for base in hatched if base.strand not in reasons})
    lines = [*bases, *hatched]
    legs = [
        *_legs(sheet, lines, landings, boxes),
        *_polyline_legs(strands, lines, landings, sheet.pins, tolerance),
    ]
    new = (leg for leg in legs if leg not in reasons and leg not in strokes)
    reasons.update(dict.fromkeys(new, LEG))
    return FrameSymbols(
        frame=reasons,
        strokes=dict.fromkeys(strokes, "hatch stroke of a frame symbol"),
        bases=tuple((base.strand, base.number) for base in lines),
    )


def _piece(strands: Sequence[Strand], base: _Base) -> Segment:
    piece = strands[base.strand].pieces[base.number]
    assert isinstance(piece, Segment)  # noqa: S101 (bases are made of straight pieces only)
    return piece


def _as_stroke(strands: Sequence[Strand], index: int, base: _Base, near: int, *, firm: bool) -> _Stroke | None:
    """A line as a stroke of a base by its angle and length, its end ``near`` being the one at the base."""
    line, piece = strands[index], _piece(strands, base)
    along = piece.end - piece.start
    if line.length > STROKE_OF_BASE * abs(along):
        return None
    direction = line.ends[1 - near] - line.ends[near]
    low, high = STROKE_ANGLES_DEGREES
    if not low <= math.degrees(angle_between_lines(direction, along)) <= high:
        return None
    return _Stroke(index, base, cross(along, direction) > 0, direction, firm)


def _strokes_on_bases(
    sheet: Sheet, candidates: Iterable[int], ignored: Collection[int], landed: Collection[tuple[int, int | None]]
) -> Iterator[_Stroke]:
    """Lines with one end on another line and the other end free.

    A stroke may well begin inside the ring of a pin, where its base runs through the pin, or even end there.
    """
    strands = sheet.strands
    links = {index for index, end in landed if end == 0 and (index, 1) in landed}
    for index in candidates:
        strand = strands[index]
        if not isinstance(strand.primitive, Segment) or index in links:
            continue
        closing = [_closest(_near(sheet, ignored, index, end), sheet.tolerance) for end in (0, 1)]
        for end in (0, 1):
            firm = (index, 1 - end) not in landed
            if firm and closing[1 - end]:
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


def _base_at(strand: Strand, point: Point) -> _Base | None:
    number = 0
    if len(strand.pieces) > 1:
        number = min(range(len(strand.pieces)), key=lambda each: distance_to_piece(point, strand.pieces[each]))
    return _Base(strand.number, number) if isinstance(strand.pieces[number], Segment) else None


def _accept(
    strands: Sequence[Strand],
    candidates: Iterable[_Stroke],
    known: dict[int, _Stroke],
    bases: Sequence[_Base] = (),
) -> tuple[list[_Base], dict[int, _Stroke]]:
    """Bases with two or more parallel strokes on one side, the longest first; a stroke serves one base only.

    A base already known takes single strokes that run parallel to its own.
    """
    by_base: defaultdict[_Base, list[_Stroke]] = defaultdict(list)
    for stroke in candidates:
        by_base[stroke.base].append(stroke)
    accepted, taken = list(bases), dict(known)
    longest_first = sorted(by_base, key=lambda base: (-_length(_piece(strands, base)), base))
    own: defaultdict[_Base, list[_Stroke]] = defaultdict(list)
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


def _parallel_to(stroke: _Stroke, others: Iterable[_Stroke]) -> list[_Stroke]:
    within = math.radians(STROKE_PARALLEL_DEGREES)
    return [
        other
        for other in others
        if other.side == stroke.side and angle_between_lines(other.direction, stroke.direction) <= within
    ]


def _loose_strokes(
    sheet: Sheet,
    relevant: Collection[int],
    ignored: Collection[int],
    known: Collection[_Base],
    strokes: Collection[int],
    landed: Collection[tuple[int, int | None]],
) -> Iterator[_Stroke]:
    """Free lines that stop a little short of a base, as clipped hatches do; a known base comes before the nearest."""
    strands = sheet.strands
    lines = (strand for strand in strands if isinstance(strand.primitive, Segment))
    free = [
        line
        for line in lines
        if not _near(sheet, ignored, line.number, 0) and not _near(sheet, ignored, line.number, 1)
    ]
    bases = [
        _Base(index, number)
        for index in sorted(relevant)
        if index not in strokes
        for number, piece in enumerate(strands[index].pieces)
        if isinstance(piece, Segment)
    ]
    if not free or not bases:
        return
    points = np.array([end for strand in free for end in strand.ends], dtype=np.complex128)
    reach = np.array([STROKE_SHORT_OF_BASE * strand.length for strand in free for _ in (0, 1)])
    starts = np.array([_piece(strands, base).start for base in bases], dtype=np.complex128)
    ends = np.array([_piece(strands, base).end for base in bases], dtype=np.complex128)
    nearest: dict[int, tuple[bool, float, _Stroke]] = {}
    for point, piece in zip(*(each.tolist() for each in near_pairs(points, reach, starts, ends)), strict=True):
        strand, near, base = free[point // 2], point % 2, bases[piece]
        stroke = _as_stroke(strands, strand.number, base, near, firm=True)
        if (strand.number, 1 - near) in landed:
            continue
        if stroke is not None and _stops_short(strand, near, _piece(strands, base)):
            gap = abs(_height(strand.ends[near], _piece(strands, base)))
            found = (base not in known, gap, stroke)
            nearest[strand.number] = min(found, nearest.get(strand.number, found), key=lambda each: each[:2])
    yield from (stroke for _, _, stroke in nearest.values())


def _height(point: Point, base: Segment) -> float:
    """How far to the left of a base line a point lies."""
    along = base.end - base.start
    return cross(along, point - base.start) / abs(along)


def _stops_short(line: Strand, near: int, base: Segment) -> bool:
    heights = [_height(end, base) for end in line.ends]
    low, high = heights[near], heights[1 - near]
    return low * high > 0 and abs(low) <= STROKE_SHORT_OF_BASE * abs(high - low) and abs(low) < abs(high)


def _bases_along_hatches(
    strands: Sequence[Strand],
    relevant: Collection[int],
    fills: Sequence[Fill],
    pins: Sequence[PinSite],
    tolerance: Tolerance,
) -> list[_Base]:
    """Straight pieces that a pattern hatch runs along; a hatch between two or more pins fills a link instead."""
    edges = [
        (start, end)
        for fill in fills
        if not fill.solid
        for outline in fill.outlines
        if _pins_in(outline, pins, tolerance) < 2
        for start, end in zip(outline, [*outline[1:], *outline[:1]], strict=True)
        if abs(end - start) > tolerance.close(abs(end - start))
    ]
    bases = [
        _Base(index, number)
        for index in sorted(relevant)
        for number, piece in enumerate(strands[index].pieces)
        if isinstance(piece, Segment)
    ]
    if not edges or not bases:
        return []
    middles = np.array([(start + end) / 2 for start, end in edges], dtype=np.complex128)
    half = np.array([abs(end - start) / 2 for start, end in edges])
    starts = np.array([_piece(strands, base).start for base in bases], dtype=np.complex128)
    ends = np.array([_piece(strands, base).end for base in bases], dtype=np.complex128)
    found = []
    for edge, piece in zip(*(each.tolist() for each in near_pairs(middles, half, starts, ends)), strict=True):
        if _lies_along(edges[edge], _piece(strands, bases[piece]), tolerance) and bases[piece] not in found:
            found.append(bases[piece])
    return found


def _lies_along(edge: tuple[Point, Point], base: Segment, tolerance: Tolerance) -> bool:
    """Whether an edge lies on a base line, over at least half of the shorter of the two."""
    along = base.end - base.start
    within = tolerance.close(abs(edge[1] - edge[0]))
    if along == 0 or any(abs(cross(along, point - base.start)) / abs(along) > within for point in edge):
        return False
    low, high = sorted(parameter_on_line(point, base.start, base.end) for point in edge)
    shared = min(high, 1.0) - max(low, 0.0)
    return shared >= min(1.0, high - low) / 2


def _pins_in(outline: Sequence[Point], pins: Sequence[PinSite], tolerance: Tolerance) -> int:
    """How many pins an outline has at its corners or inside it."""
    left, right = min(point.real for point in outline), max(point.real for point in outline)
    low, high = min(point.imag for point in outline), max(point.imag for point in outline)
    found = 0
    for pin in pins:
        reach = pin.radii[-1] + tolerance.rim(pin.radii[-1])
        near = left - reach <= pin.at.real <= right + reach and low - reach <= pin.at.imag <= high + reach
        if near and (inside_outline(pin.at, outline) or any(abs(corner - pin.at) <= reach for corner in outline)):
            found += 1
    return found


def _legs(sheet: Sheet, bases: Collection[_Base], landings: Sequence[Landing], boxes: Collection[int]) -> Iterator[int]:
    """Lines from a base to a pin: the sides of a triangle, whatever angle they meet the ring at."""
    base_strands = {base.strand for base in bases}
    landed = {(landing.strand, landing.end) for landing in landings if landing.how != "loose"}
    on_box: defaultdict[tuple[int, int], list[int]] = defaultdict(list)
    for landing in landings:
        strand = sheet.strands[landing.strand]
        if landing.end is None or strand.number in base_strands:
            continue
        if (strand.number, 1 - landing.end) in landed:
            continue  # a link between two pins, one of which sits on the base line itself
        feet = [
            touch.strand for touch in sheet.touching.at(strand.number, 1 - landing.end) if touch.strand in base_strands
        ]
        if any(foot not in boxes for foot in feet):
            yield strand.number
        elif feet:
            on_box[landing.pin, feet[0]].append(strand.number)
    for legs in on_box.values():
        if len(legs) > 1:
            yield from legs


def _polyline_legs(
    strands: Sequence[Strand],
    bases: Collection[_Base],
    landings: Sequence[Landing],
    pins: Sequence[PinSite],
    tolerance: Tolerance,
) -> Iterator[int]:
    """Triangles of one polyline that land on a pin and have corners on a base, other than at their pins."""
    base_strands = {base.strand for base in bases}
    paths = [strands[number] for number in sorted({landing.strand for landing in landings} - base_strands)]
    at_pin = {(landing.strand, landing.pin) for landing in landings if landing.how == "corner"}
    rings: defaultdict[int, list[PinSite]] = defaultdict(list)
    for number, pin in at_pin:
        rings[number].append(pins[pin])
    corners = [
        (path.number, corner, tolerance.close(path.length))
        for path in paths
        for corner in path.corners
        if not any(abs(corner - pin.at) <= pin.radii[-1] for pin in rings[path.number])
    ]
    if corners and bases:
        places = np.array([corner for _, corner, _ in corners], dtype=np.complex128)
        reach = np.array([within for _, _, within in corners])
        starts = np.array([_piece(strands, base).start for base in bases], dtype=np.complex128)
        ends = np.array([_piece(strands, base).end for base in bases], dtype=np.complex128)
        on_base, _ = near_pairs(places, reach, starts, ends)
        yield from sorted({corners[each][0] for each in on_base.tolist()})
