"""Closed outlines on the sheet: closed polylines, and loose lines and arcs that close end to end (reading rule 4).

Glossary
    contour     one closed outline that holds the centre of a pin, or has one at a corner
    joint       where two ends of a chain meet; each end of a chain belongs to one joint

A sheet of other parts may hold 60,000 lines, so chains are told apart on whole arrays, and only those round a pin are
walked one by one.
"""

from __future__ import annotations

import math
from collections.abc import Collection, Iterator, Sequence
from typing import NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import Arc, Segment
from dxfcheck.geometry import Point, angle_between_lines
from dxfcheck.reading.lines.landing import Landing
from dxfcheck.reading.lines.linework import Linework, Strand, distance_to_piece
from dxfcheck.reading.lines.nearness import ComplexArray, FloatArray, IntArray, near_pairs
from dxfcheck.reading.lines.pins import PinSite
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.reading.lines.touches import Touches
from dxfcheck.reading.shapes.outlines import inside_outline
from dxfcheck.tolerances.linework import CHORD_ANGLE_DEGREES, SHAPE_OF_SIZE, SMOOTH_JOINT_DEGREES

__all__ = ["Contour", "find_contours"]

BoolArray = np.typing.NDArray[np.bool_]
NONE = -1


class Contour(NamedTuple):
    """A closed outline: its strands in order round it, a polygon with chords for arcs, and the pieces themselves."""

    strands: tuple[int, ...]
    points: tuple[Point, ...]
    pieces: tuple[Segment | Arc, ...]

    def contains(self, point: Point) -> bool:
        """Whether a place lies inside."""
        return inside_outline(point, self.points)

    def clearance(self, point: Point) -> float:
        """Distance from a place to the nearest piece."""
        return min(distance_to_piece(point, piece) for piece in self.pieces)

    def circle_round(self) -> tuple[Point, float]:
        """Middle and half diagonal of the box round it: no place inside lies further off."""
        across = [point.real for point in self.points]
        up = [point.imag for point in self.points]
        low, high = complex(min(across), min(up)), complex(max(across), max(up))
        return (low + high) / 2, abs(high - low) / 2

    def encloses(self, points: Collection[Point]) -> bool:
        """Whether all of some places lie inside."""
        return all(self.contains(point) for point in points)

    def rounds(self, centre: Point, radius: float, within: float) -> bool:
        """Whether an arc of it runs about a centre, further out than a radius, as the end of a bar does."""
        return any(
            abs(piece.centre - centre) <= within and piece.radius > radius - within
            for piece in self.pieces
            if isinstance(piece, Arc)
        )


def find_contours(
    linework: Linework,
    touching: Touches,
    tolerance: Tolerance,
    apart: Collection[int],
    pins: Sequence[PinSite],
    landings: Sequence[Landing] = (),
) -> list[Contour]:
    """The contours round pins, by first strand; ``apart`` are strands used up otherwise (rings, blocks, slots).

    Ends of loose linework that land on a pin (``landings``) close no chain there: four rods from pin to pin are four
    links. Only a smooth passage from a line into an arc that happens to lie inside some ring does. A chain stops where
    a third end meets it, unless that is the end of a branch whose other end is free. Cost near-linear.
    """
    if not pins or not linework.strands:
        return []
    strands = linework.strands
    places = np.array([pin.at for pin in pins], dtype=np.complex128)
    boxes = _boxes(linework)
    closed = np.array([strand.closed and strand.number not in apart for strand in strands], dtype=np.bool_)
    lone = np.nonzero(closed)[0]
    reach = max(pin.radii[-1] for pin in pins)
    around = lone[_hold_any(boxes[:, lone], places, reach)]
    found = [_contour_of([(number, 0)], strands) for number in around.tolist()]
    ends = _ends(strands, apart)
    if not np.isfinite(ends).any():
        return found
    mates = _mates(strands, ends, touching, tolerance, landings)
    found.extend(_contour_of(_walk(first, mates), strands) for first in _closed_chains(mates, boxes, places))
    return sorted(found, key=lambda contour: contour.strands)


def _ends(strands: Sequence[Strand], apart: Collection[int]) -> ComplexArray:
    """The ends of all strands (2 N), nan for closed ones and those apart."""
    blank = (complex(math.nan, math.nan),) * 2
    flat = [end for strand in strands for end in (strand.ends or blank)]
    ends = np.array(flat, dtype=np.complex128)
    taken = np.array(sorted(apart), dtype=np.int64)
    ends[2 * taken] = ends[2 * taken + 1] = blank[0]
    return ends


def _mates(
    strands: Sequence[Strand],
    ends: ComplexArray,
    touching: Touches,
    tolerance: Tolerance,
    landings: Sequence[Landing],
) -> IntArray:
    """For each end the one end it meets (2 N), or NONE."""
    one, other = _end_pairs(strands, ends, touching, tolerance)
    kept = _off_pins(strands, ends, tolerance, landings, one, other)
    one, other = one[kept], other[kept]
    one, other = _without_branches(one, other, ends.size)
    alone = np.bincount(one, minlength=ends.size) == 1
    single = alone[one] & alone[other]
    mates = np.full(ends.size, NONE, dtype=np.int64)
    mates[one[single]] = other[single]
    return mates


def _end_pairs(
    strands: Sequence[Strand], ends: ComplexArray, touching: Touches, tolerance: Tolerance
) -> tuple[IntArray, IntArray]:
    """Pairs of ends that meet, each in both orders; where an end meets one exactly, only those it meets exactly."""
    own, target, _, _ = touching.as_pairs()
    one = np.concatenate((own, own))
    other = np.concatenate((2 * target, 2 * target + 1))
    # A chain drawn as one open polyline closes on itself.
    whole = np.array([strand.number for strand in strands if len(strand.pieces) > 1 and strand.ends], dtype=np.int64)
    one = np.concatenate((one, 2 * whole, 2 * whole + 1))
    other = np.concatenate((other, 2 * whole + 1, 2 * whole))
    lengths = np.repeat(np.array([strand.length for strand in strands]), 2)
    close = np.maximum(tolerance.t, np.minimum(tolerance.shape, SHAPE_OF_SIZE * lengths))
    gaps = np.abs(ends[one] - ends[other])
    met = gaps <= np.minimum(close[one], close[other])  # False for nan
    one, other, gaps = one[met], other[met], gaps[met]
    exact = np.zeros(ends.size, dtype=np.bool_)
    exact[one[gaps <= tolerance.t]] = True
    kept = (gaps <= tolerance.t) | ~(exact[one] | exact[other])
    return one[kept], other[kept]


def _off_pins(
    strands: Sequence[Strand],
    ends: ComplexArray,
    tolerance: Tolerance,
    landings: Sequence[Landing],
    one: IntArray,
    other: IntArray,
) -> BoolArray:
    """Which pairs of ends do not meet on a pin, or pass smoothly from one into the other beside its centre."""
    landed = np.zeros(ends.size, dtype=np.bool_)
    landed[[2 * each.strand + each.end for each in landings if each.end is not None and each.how == "end"]] = True
    kept: BoolArray = ~(landed[one] | landed[other])
    curved = np.repeat(np.array([isinstance(strand.primitive, Arc) for strand in strands], dtype=np.bool_), 2)
    at_pin = {(each.strand, each.end) for each in landings if each.how == "end" and each.offset <= tolerance.t}
    for place in np.nonzero(~kept & (curved[one] | curved[other]))[0].tolist():
        both = [divmod(int(number), 2) for number in (one[place], other[place])]
        aimed = any(each in at_pin for each in both)
        kept[place] = not aimed and _passes_smoothly(*(_heading(strands[strand], end) for strand, end in both))
    return kept


def _heading(strand: Strand, end: int) -> Point:
    """The direction of a strand at one of its ends, as a line without a sense."""
    piece = strand.pieces[0 if end == 0 else -1]
    if isinstance(piece, Segment):
        return piece.end - piece.start
    return (strand.ends[end] - piece.centre) * 1j


def _passes_smoothly(one: Point, other: Point) -> bool:
    return angle_between_lines(one, other) <= math.radians(SMOOTH_JOINT_DEGREES)


def _without_branches(one: IntArray, other: IntArray, count: int) -> tuple[IntArray, IntArray]:
    """Pairs of ends but for those of strands of which one end meets nothing, and so on along each branch."""
    for _ in range(BRANCH_STEPS):
        degree = np.bincount(one, minlength=count)
        open_ended = (degree == 0)[np.arange(count) ^ 1]
        kept = ~(open_ended[one] | open_ended[other])
        if kept.all():
            break
        one, other = one[kept], other[kept]
    return one, other


BRANCH_STEPS = 8


def _closed_chains(mates: IntArray, boxes: FloatArray, places: ComplexArray) -> list[int]:
    """The first strand of each closed chain whose box holds a pin."""
    linked = (mates != NONE).reshape(-1, 2).all(axis=1)
    count = linked.size
    near = np.where(mates == NONE, np.arange(2 * count), mates).reshape(-1, 2) // 2
    label = np.arange(count)
    while True:
        least = np.minimum(label, np.minimum(label[near[:, 0]], label[near[:, 1]]))
        least = least[least]
        if (least == label).all():
            break
        label = least
    broken = np.zeros(count, dtype=np.bool_)
    broken[label[~linked]] = True
    members = np.nonzero(~broken[label])[0]
    members = members[np.argsort(label[members], kind="stable")]
    if not members.size:
        return []
    roots, first = np.unique(label[members], return_index=True)
    low = np.minimum.reduceat(boxes[:2, members], first, axis=1)
    high = np.maximum.reduceat(boxes[2:, members], first, axis=1)
    chosen: list[int] = roots[_hold_any(np.concatenate((low, high)), places, 0.0)].tolist()
    return chosen


def _walk(first: int, mates: IntArray) -> list[tuple[int, int]]:
    """The strands of a closed chain in order, each with the end at which it is entered."""
    chain = []
    entry = 2 * first
    while True:
        chain.append((entry // 2, entry % 2))
        entry = int(mates[entry ^ 1])
        if entry // 2 == first:
            return chain


def _boxes(linework: Linework) -> FloatArray:
    """Left, low, right and high of each strand (4, N)."""
    count = len(linework.strands)
    starts = np.concatenate((linework.piece_starts, linework.chord_starts))
    ends = np.concatenate((linework.piece_ends, linework.chord_ends))
    owner = np.concatenate((linework.piece_strand, linework.chord_strand))
    boxes = np.full((4, count), np.inf)
    boxes[2:] = -np.inf
    order = np.argsort(owner, kind="stable")
    strands, first = np.unique(owner[order], return_index=True)
    for row, (a, b) in enumerate(((starts.real, ends.real), (starts.imag, ends.imag))):
        boxes[row, strands] = np.minimum.reduceat(np.minimum(a, b)[order], first)
        boxes[row + 2, strands] = np.maximum.reduceat(np.maximum(a, b)[order], first)
    return boxes


def _hold_any(boxes: FloatArray, places: ComplexArray, margin: float) -> BoolArray:
    """Which boxes (4, B), widened by a margin, hold a place."""
    held = np.zeros(boxes.shape[1], dtype=np.bool_)
    left, low, right, high = boxes
    centres = (left + right) / 2 + 1j * (low + high) / 2
    reach = np.hypot(right - left, high - low) / 2 + 2 * margin
    box, place = near_pairs(centres, reach, places, places)
    inside = (places[place].real >= left[box] - margin) & (places[place].real <= right[box] + margin)
    inside &= (places[place].imag >= low[box] - margin) & (places[place].imag <= high[box] + margin)
    held[box[inside]] = True
    return held


def _contour_of(chain: Sequence[tuple[int, int]], strands: Sequence[Strand]) -> Contour:
    """The contour of strands in order, each with the end at which it is entered."""
    pieces = [piece for number, entry in chain for piece in _in_order(strands[number].pieces, entry)]
    return Contour(tuple(number for number, _ in chain), tuple(_polygon(pieces)), tuple(pieces))


def _in_order(pieces: Sequence[Segment | Arc], entry: int) -> Sequence[Segment | Arc]:
    return pieces if entry == 0 else pieces[::-1]


def _polygon(pieces: Sequence[Segment | Arc]) -> Iterator[Point]:
    """The corners of a polygon along pieces that follow one another; each but its last point, or the next one's."""
    runs = [_run(piece) for piece in pieces]
    for number, run in enumerate(runs):
        onward = runs[(number + 1) % len(runs)]
        ahead = min(abs(run[-1] - onward[0]), abs(run[-1] - onward[-1]))
        back = min(abs(run[0] - onward[0]), abs(run[0] - onward[-1]))
        # A lens of two arcs meets at both ends: the second runs against the first.
        turned = (
            back < ahead if len(runs) != 2 else bool(number) and abs(run[0] - runs[0][0]) < abs(run[0] - runs[0][-1])
        )
        yield from (run[:0:-1] if turned else run[:-1])


def _run(piece: Segment | Arc) -> list[Point]:
    """The ends of a piece, and the points between them that stand for an arc."""
    if isinstance(piece, Segment):
        return [piece.start, piece.end]
    count = max(2, math.ceil(piece.sweep / math.radians(CHORD_ANGLE_DEGREES)))
    step = piece.sweep / count
    turn = complex(math.cos(step), math.sin(step))
    out = piece.start - piece.centre
    points = [piece.start]
    for _ in range(count):
        out *= turn
        points.append(piece.centre + out)
    return points
