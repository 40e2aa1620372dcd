"""Rectangles and obrounds among the linework: what blocks, barrels, slots and bars are drawn as (reading rule 6)."""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence
from typing import NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import Arc, Path, Segment
from dxfcheck.geometry import Point, angle_between_lines, cross
from dxfcheck.reading.linework import Linework, Strand
from dxfcheck.reading.pins import PinSite
from dxfcheck.reading.tolerance import Tolerance
from dxfcheck.reading.touches import Touches
from dxfcheck.settings import RIGHT_ANGLE_DEGREES, RIM_OF_RADIUS

__all__ = ["Obround", "Rectangle", "find_obrounds", "find_rectangles"]


class Rectangle(NamedTuple):
    """A rectangle of one closed polyline or of four lines; ``corners`` in order round it."""

    strands: tuple[int, ...]
    corners: tuple[Point, ...]


class Obround(NamedTuple):
    """Two parallel lines and two half arcs; ``centres`` are those of the half arcs."""

    strands: tuple[int, ...]
    centres: tuple[Point, Point]
    radius: float

    def holds(self, pin: PinSite) -> bool:
        """Whether a pin lies on its centre line, between the centres of its half arcs."""
        axis = self.centres[1] - self.centres[0]
        out = pin.at - self.centres[0]
        within = RIM_OF_RADIUS * self.radius
        along = (out * axis.conjugate()).real / abs(axis)
        return abs(cross(axis, out)) / abs(axis) <= self.radius / 2 and -within <= along <= abs(axis) + within

    def ends_at(self, pin: PinSite, tolerance: Tolerance) -> bool:
        """Whether a pin sits at the centre of one of its half arcs."""
        return min(abs(pin.at - centre) for centre in self.centres) <= max(
            tolerance.t, min(tolerance.close(self.radius), RIM_OF_RADIUS * self.radius)
        )


def find_rectangles(
    linework: Linework, touching: Touches, pins: Sequence[PinSite], tolerance: Tolerance
) -> list[Rectangle]:
    """All rectangles that may hold a pin, each once; the corners of loose lines close within the shape tolerance."""
    strands = linework.strands
    found = [Rectangle((strand.number,), strand.corners) for strand in strands if _is_square_outline(strand)]
    for number in _sides(linework, touching, pins):
        found.extend(_rectangle_from(strands[number], strands, touching, tolerance))
    return found


def _sides(linework: Linework, touching: Touches, pins: Sequence[PinSite]) -> list[int]:
    """Lines that meet one square to them at both ends and have the foot of some pin between their ends."""
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
    opposite = np.zeros(candidates.size, dtype=np.bool_)
    for pin in pins:
        parameter = ((pin.at - starts) * sides.conj()).real / (sides * sides.conj()).real
        opposite |= (parameter > 0.0) & (parameter < 1.0)
    found: list[int] = candidates[opposite].tolist()
    return found


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


def find_obrounds(strands: Sequence[Strand], touching: Touches) -> list[Obround]:
    """All obrounds, of one closed polyline with bulges or of two lines and two half arcs."""
    found = []
    for strand in strands:
        if isinstance(strand.primitive, Path) and strand.closed:
            arcs = [piece for piece in strand.pieces if isinstance(piece, Arc)]
            lines = [piece for piece in strand.pieces if isinstance(piece, Segment)]
            if len(arcs) == 2 and len(lines) == 2 and _make_an_obround(arcs, lines):
                found.append(Obround((strand.number,), (arcs[0].centre, arcs[1].centre), arcs[0].radius))
        elif isinstance(strand.primitive, Arc) and _is_half(strand.primitive):
            found.extend(_obround_from(strand, strands, touching))
    return found


def _is_half(arc: Arc) -> bool:
    return abs(arc.sweep - math.pi) <= math.radians(2 * RIGHT_ANGLE_DEGREES)


def _make_an_obround(arcs: Sequence[Arc], lines: Sequence[Segment]) -> bool:
    alike = abs(arcs[0].radius - arcs[1].radius) <= RIM_OF_RADIUS * arcs[0].radius
    along = arcs[1].centre - arcs[0].centre
    parallel = all(
        angle_between_lines(line.end - line.start, along) <= math.radians(RIGHT_ANGLE_DEGREES) for line in lines
    )
    return alike and parallel and along != 0 and all(_is_half(arc) for arc in arcs)


def _obround_from(first: Strand, strands: Sequence[Strand], touching: Touches) -> Iterator[Obround]:
    """The obround in which this half arc comes first, if there is one."""

    def lines_at(strand: Strand, end: int) -> list[int]:
        near = touching.at(strand.number, end)
        return [touch.strand for touch in near if _is_line(strands[touch.strand])]

    assert isinstance(first.primitive, Arc)  # noqa: S101 (the caller's condition, for the type checker)
    for one in lines_at(first, 0):
        for other in lines_at(first, 1):
            far = {
                touch.strand
                for line in (one, other)
                for end in (0, 1)
                for touch in touching.at(line, end)
                if touch.strand > first.number
            }
            for candidate in sorted(far):
                arc = strands[candidate].primitive
                if one == other or not isinstance(arc, Arc):
                    continue
                lines = [strands[one].primitive, strands[other].primitive]
                straight = [line for line in lines if isinstance(line, Segment)]
                meets_both = {one, other} <= {*lines_at(strands[candidate], 0), *lines_at(strands[candidate], 1)}
                if meets_both and _make_an_obround([first.primitive, arc], straight):
                    members = (first.number, one, candidate, other)
                    yield Obround(members, (first.primitive.centre, arc.centre), first.primitive.radius)
