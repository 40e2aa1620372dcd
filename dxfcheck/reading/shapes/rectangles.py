"""Rectangles among the linework, of one closed polyline or of four lines (reading rule 6)."""

from __future__ import annotations

import math
from collections import defaultdict
from collections.abc import Collection, Iterator, Sequence
from itertools import pairwise
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from dxfcheck.drawing.primitives import Arc, Segment
from dxfcheck.geometry import Point, angle_between_lines, dot
from dxfcheck.reading.lines.linework import Linework, Strand
from dxfcheck.reading.lines.nearness import ComplexArray, near_pairs
from dxfcheck.reading.lines.pins import PinSite
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.reading.lines.touches import Touches
from dxfcheck.tolerances.linework import (
    MOST_SLENDER_BLOCK,
    RIGHT_ANGLE_DEGREES,
    RIM_OF_RADIUS,
    ROUNDING_OF_BLOCK,
    SHARED_SIDE_OF_BLOCK,
)

__all__ = ["Rectangle", "find_rectangles", "is_square_outline"]

Flags = NDArray[np.bool_]


class Rectangle(NamedTuple):
    """A rectangle of one closed polyline or of four lines; ``corners`` in order round it.

    Sides that are part of a longer line, a guide, are not among its strands. One that is ``open`` lacks the side from
    its last corner to its first.
    """

    strands: tuple[int, ...]
    corners: tuple[Point, ...]
    open: bool = False


def find_rectangles(
    linework: Linework,
    touching: Touches,
    pins: Sequence[PinSite],
    tolerance: Tolerance,
    beside: Collection[int] = (),
) -> list[Rectangle]:
    """Rectangles that may hold a pin, or that stand by the strands ``beside``, each once.

    The corners of loose lines close within the shape tolerance. On a sheet of other parts there may be thousands of
    rectangles: those that no pin and no link comes near are not looked at.
    """
    strands = linework.strands
    outlines = [Rectangle((strand.number,), strand.corners) for strand in strands if is_square_outline(strand)]
    outlines.extend(rounded for strand in strands if (rounded := _rounded(strand)) is not None)
    outlines.extend(_half_closed(strand, strands, touching) for strand in strands if _is_square_u(strand))
    found = _near_linkage(outlines, linework, pins, beside)
    sides = _sides(linework, touching, pins, beside)
    for number in sides:
        found.extend(_rectangle_from(strands[number], strands, touching, tolerance))
    whole = {number for rectangle in found if len(rectangle.strands) > 1 for number in rectangle.strands}
    found.extend(_on_longer_lines([number for number in sides if number not in whole], strands, touching))
    return found


def _pieces_of(linework: Linework, beside: Collection[int]) -> tuple[ComplexArray, ComplexArray]:
    wanted = np.zeros(len(linework.strands), dtype=np.bool_)
    wanted[list(beside)] = True
    chosen = wanted[linework.piece_strand]
    return linework.piece_starts[chosen], linework.piece_ends[chosen]


def _near_linkage(
    outlines: Sequence[Rectangle], linework: Linework, pins: Sequence[PinSite], beside: Collection[int]
) -> list[Rectangle]:
    """The outlines with a pin inside the circle round them, or a link's line."""
    if not outlines:
        return []
    corners = np.array([outline.corners for outline in outlines], dtype=np.complex128)
    centres = corners.mean(axis=1)
    reach = np.abs(corners - centres[:, None]).max(axis=1)
    places = np.array([pin.at for pin in pins], dtype=np.complex128)
    near = near_pairs(centres, reach, places, places)[0].tolist()
    near += near_pairs(centres, reach, *_pieces_of(linework, beside))[0].tolist()
    return [outlines[number] for number in sorted(set(near))]


def _sides(linework: Linework, touching: Touches, pins: Sequence[PinSite], beside: Collection[int]) -> list[int]:
    """Lines that meet one square to them at both ends, with a pin's foot between their ends or a link nearby."""
    along = linework.line_directions()
    ends, targets, _, _ = touching.as_pairs()
    with np.errstate(divide="ignore", invalid="ignore"):
        turn = np.abs(np.angle(along[ends // 2] / along[targets]))
    square = np.abs(turn - math.pi / 2) <= math.radians(RIGHT_ANGLE_DEGREES)
    has_square = np.zeros(2 * along.size, dtype=np.bool_)
    has_square[ends[square]] = True
    candidates = np.nonzero(has_square.reshape(-1, 2).all(axis=1))[0]
    if not candidates.size:
        return []
    starts = np.array([linework.strands[number].ends[0] for number in candidates.tolist()], dtype=np.complex128)
    sides = along[candidates]
    wanted = _opposite_a_pin(starts, sides, pins) | _by_a_link(starts, sides, linework, beside)
    found: list[int] = candidates[wanted].tolist()
    return found


def _opposite_a_pin(starts: ComplexArray, sides: ComplexArray, pins: Sequence[PinSite]) -> Flags:
    """Which sides have a pin no further off than a pin in their rectangle can be."""
    if not pins:
        return np.zeros(starts.size, dtype=np.bool_)
    places = np.array([pin.at for pin in pins], dtype=np.complex128)
    opposite = np.zeros(starts.size, dtype=np.bool_)
    near, _ = near_pairs(starts + sides / 2, MOST_SLENDER_BLOCK * np.abs(sides), places, places)
    opposite[near] = True
    return opposite


def _by_a_link(starts: ComplexArray, sides: ComplexArray, linework: Linework, beside: Collection[int]) -> Flags:
    by_link = np.zeros(starts.size, dtype=np.bool_)
    if beside:
        near, _ = near_pairs(starts + sides / 2, np.abs(sides), *_pieces_of(linework, beside))
        by_link[near] = True
    return by_link


def _is_line(strand: Strand) -> bool:
    return len(strand.pieces) == 1 and isinstance(strand.primitive, Segment)


def is_square_outline(strand: Strand) -> bool:
    """Whether a strand is a closed polyline of four straight sides, each square to the next."""
    corners = strand.corners
    if not strand.closed or len(corners) != 4 or any(isinstance(piece, Arc) for piece in strand.pieces):
        return False
    sides = [after - corner for corner, after in zip(corners, [*corners[1:], corners[0]], strict=True)]
    return all(_square(side, after) for side, after in zip(sides, [*sides[1:], sides[0]], strict=True))


def _rounded(strand: Strand) -> Rectangle | None:
    """A closed polyline of four sides with small arcs between them, with the corners that the sides would meet in."""
    if not strand.closed or len(strand.pieces) != 8:
        return None
    sides = [piece for piece in strand.pieces if isinstance(piece, Segment)]
    arcs = [piece for piece in strand.pieces if isinstance(piece, Arc)]
    around = list(zip(sides, [*sides[1:], *sides[:1]], strict=True))
    if len(sides) != 4 or not all(_square(one.end - one.start, two.end - two.start) for one, two in around):
        return None
    if max(arc.radius for arc in arcs) > ROUNDING_OF_BLOCK * min(abs(side.end - side.start) for side in sides):
        return None
    corners = []
    for one, two in around:
        along = one.end - one.start
        corners.append(one.end + along * dot(two.start - one.end, along) / abs(along) ** 2)
    return Rectangle((strand.number,), tuple(corners))


def _is_square_u(strand: Strand) -> bool:
    """Whether it is a polyline of three sides of a rectangle."""
    if len(strand.corners) != 2 or strand.closed or len(strand.pieces) != 3:
        return False
    if any(isinstance(piece, Arc) for piece in strand.pieces):
        return False
    first, second, third = (piece.end - piece.start for piece in strand.pieces)
    across = strand.ends[1] - strand.ends[0]
    alike = bool(first and second and third and across) and _square(first, across)
    return alike and _square(first, second) and _square(second, third) and abs(first + third) < abs(first)


def _half_closed(strand: Strand, strands: Sequence[Strand], touching: Touches) -> Rectangle:
    """Three sides of a rectangle; a longer line that both ends lie on closes it."""
    corners = (strand.ends[0], *strand.corners, strand.ends[1])
    closing = _longer_lines(strand.number, strand.number, (0, 1), strands, touching)
    return Rectangle((strand.number,), corners, open=not closing)


def _longer_lines(
    one: int, other: int, ends: tuple[int, int], strands: Sequence[Strand], touching: Touches
) -> list[int]:
    """Lines that an end of one strand and one of another lie on, each a good deal longer than the way between them."""
    first, second = touching.met(one, ends[0]), touching.met(other, ends[1])
    way = strands[other].ends[ends[1]] - strands[one].ends[ends[0]]
    return [
        number
        for number in first
        if number in second and _is_line(strands[number]) and strands[number].length >= SHARED_SIDE_OF_BLOCK * abs(way)
    ]


def _on_longer_lines(sides: Sequence[int], strands: Sequence[Strand], touching: Touches) -> Iterator[Rectangle]:
    """Three lines that stand on a longer line, and two across between two longer ones."""
    if len(sides) < 2:
        return
    on_line: defaultdict[int, list[tuple[int, int]]] = defaultdict(list)
    for number in sides:
        for end in (0, 1):
            for target in touching.met(number, end):
                if _is_line(strands[target]):
                    on_line[target].append((number, end))
    for base, standing in on_line.items():
        along = strands[base].ends[1] - strands[base].ends[0]
        placed = sorted(
            (dot(strands[number].ends[end] - strands[base].ends[0], along), number, end)
            for number, end in standing
            if _square(along, strands[number].ends[1] - strands[number].ends[0])
        )
        for (_, one, near), (_, other, end) in pairwise(placed):
            rectangle = _standing(base, (one, near), (other, end), strands, touching)
            if rectangle is not None:
                yield rectangle


def _standing(
    base: int, one: tuple[int, int], other: tuple[int, int], strands: Sequence[Strand], touching: Touches
) -> Rectangle | None:
    """The rectangle of two lines beside one another on a base line that the same line joins at their other ends."""
    if base not in _longer_lines(one[0], other[0], (one[1], other[1]), strands, touching):
        return None
    corners = (
        strands[one[0]].ends[one[1]],
        strands[one[0]].ends[1 - one[1]],
        strands[other[0]].ends[1 - other[1]],
        strands[other[0]].ends[other[1]],
    )
    near_end = min(abs(end - corner) for end in strands[base].ends for corner in (corners[0], corners[3]))
    if near_end <= RIM_OF_RADIUS * abs(corners[3] - corners[0]):
        # A wall that closes a cylinder stands at the end of its sides.
        return None
    for number in touching.met(one[0], 1 - one[1]):
        if number == base or not _is_line(strands[number]):
            continue
        ends = strands[number].ends
        if {one[0], other[0]} <= {touch for end in (0, 1) for touch in touching.met(number, end)} and max(
            min(abs(end - corner) for end in ends) for corner in corners[1:3]
        ) <= abs(ends[1] - ends[0]) * RIM_OF_RADIUS:
            return Rectangle((one[0], number, other[0]), corners)
    longer = _longer_lines(one[0], other[0], (1 - one[1], 1 - other[1]), strands, touching)
    return Rectangle((one[0], other[0]), corners) if any(number > base for number in longer) else None


def _square(one: Point, other: Point) -> bool:
    return abs(angle_between_lines(one, other) - math.pi / 2) <= math.radians(RIGHT_ANGLE_DEGREES)


class _Side(NamedTuple):
    """A line as walked round a rectangle: which strand, and its near and far end."""

    strand: int
    near: Point
    far: Point


def _rectangle_from(
    first: Strand, strands: Sequence[Strand], touching: Touches, tolerance: Tolerance
) -> Iterator[Rectangle]:
    """The rectangles in which this line comes first: four sides, each square to the one before, back to the start."""
    within = tolerance.close(first.length)

    def onward(side: _Side, end: int) -> Iterator[tuple[_Side, int]]:
        for touch in touching.at(side.strand, end):
            other = strands[touch.strand]
            if touch.strand <= first.number or not _is_line(other):
                continue
            for near in (0, 1):
                meets = abs(other.ends[near] - side.far) <= within
                if meets and _square(side.far - side.near, other.ends[1] - other.ends[0]):
                    yield _Side(other.number, other.ends[near], other.ends[1 - near]), 1 - near

    start = _Side(first.number, first.ends[0], first.ends[1])
    seen: set[frozenset[int]] = set()
    for second, second_end in onward(start, 1):
        for third, third_end in onward(second, second_end):
            for fourth, _ in onward(third, third_end):
                members = (first.number, second.strand, third.strand, fourth.strand)
                closes = abs(fourth.far - start.near) <= within
                if closes and len(set(members)) == 4 and frozenset(members) not in seen:
                    seen.add(frozenset(members))
                    yield Rectangle(members, (start.near, second.near, third.near, fourth.near))
