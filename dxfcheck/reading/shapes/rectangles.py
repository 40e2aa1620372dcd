"""Rectangles among the linework, of one closed polyline or of four lines (reading rule 6)."""

from __future__ import annotations

import math
from collections.abc import Collection, Iterator, Sequence
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from dxfcheck.drawing.primitives import Arc, Segment
from dxfcheck.geometry import Point, angle_between_lines
from dxfcheck.reading.lines.linework import Linework, Strand
from dxfcheck.reading.lines.nearness import ComplexArray, near_pairs
from dxfcheck.reading.lines.pins import PinSite
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.reading.lines.touches import Touches
from dxfcheck.settings import MOST_SLENDER_BLOCK, RIGHT_ANGLE_DEGREES

__all__ = ["Rectangle", "find_rectangles"]

Flags = NDArray[np.bool_]


class Rectangle(NamedTuple):
    """A rectangle of one closed polyline or of four lines; ``corners`` in order round it."""

    strands: tuple[int, ...]
    corners: tuple[Point, ...]


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
    outlines = [Rectangle((strand.number,), strand.corners) for strand in strands if _is_square_outline(strand)]
    found = _near_linkage(outlines, linework, pins, beside)
    for number in _sides(linework, touching, pins, beside):
        found.extend(_rectangle_from(strands[number], strands, touching, tolerance))
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


def _is_square_outline(strand: Strand) -> bool:
    corners = strand.corners
    if not strand.closed or len(corners) != 4 or any(isinstance(piece, Arc) for piece in strand.pieces):
        return False
    sides = [after - corner for corner, after in zip(corners, [*corners[1:], corners[0]], strict=True)]
    return all(_square(side, after) for side, after in zip(sides, [*sides[1:], sides[0]], strict=True))


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
