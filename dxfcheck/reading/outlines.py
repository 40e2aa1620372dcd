"""Closed outlines: links with the pins inside them, and borders drawn round whole links (reading rules 1 and 4)."""

from __future__ import annotations

import math
from collections.abc import Collection, Sequence
from dataclasses import dataclass

import numpy as np

from dxfcheck.drawing.primitives import Segment
from dxfcheck.geometry import Point
from dxfcheck.reading.landing import Landing
from dxfcheck.reading.linework import Strand
from dxfcheck.reading.pins import PinSite

__all__ = ["Outlines", "find_outlines", "inside_outline", "outline_points"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Outlines:
    """``borders`` are closed strands that enclose whole links; ``held`` landings of pins inside the other ones."""

    borders: frozenset[int]
    held: tuple[Landing, ...]


def find_outlines(
    strands: Sequence[Strand], landings: Sequence[Landing], pins: Sequence[PinSite], frame: Collection[int]
) -> Outlines:
    """Look into every closed strand with no pin at its corners or on its sides."""
    on_pins = {landing.strand for landing in landings if landing.how != "across"}
    closed = [strand for strand in strands if strand.closed and strand.number not in on_pins]
    if not closed or not pins:
        return Outlines(borders=frozenset(), held=())
    linked = [strands[index] for index in sorted(on_pins) if not strands[index].closed and index not in frame]
    first_ends = np.array([strand.ends[0] for strand in linked], dtype=np.complex128)
    places = np.array([pin.at for pin in pins], dtype=np.complex128)
    borders: set[int] = set()
    held: list[Landing] = []
    for strand in closed:
        outline = outline_points(strand)
        inside = _inside_box(first_ends, outline)
        if any(_encloses(outline, linked[index]) for index in inside):
            borders.add(strand.number)
            continue
        within = [index for index in _inside_box(places, outline) if inside_outline(pins[index].at, outline)]
        held.extend(Landing(strand.number, index, "corner", None, 0.0) for index in within)
    return Outlines(borders=frozenset(borders), held=tuple(held))


def _inside_box(points: np.typing.NDArray[np.complex128], outline: Sequence[Point]) -> list[int]:
    if not points.size:
        return []
    left, right = min(point.real for point in outline), max(point.real for point in outline)
    low, high = min(point.imag for point in outline), max(point.imag for point in outline)
    inside = (points.real >= left) & (points.real <= right) & (points.imag >= low) & (points.imag <= high)
    found: list[int] = np.nonzero(inside)[0].tolist()
    return found


def _encloses(outline: Sequence[Point], strand: Strand) -> bool:
    return all(inside_outline(point, outline) for point in (*strand.ends, *strand.corners))


def outline_points(strand: Strand) -> list[Point]:
    """The outline of a closed strand as a polygon; arcs by their ends and middles, in the order of its pieces."""
    points: list[Point] = []
    for piece in strand.pieces:
        if isinstance(piece, Segment):
            run = [piece.start, piece.end]
        else:
            middle = piece.centre + (piece.start - piece.centre) * _turn(piece.sweep / 2)
            run = [piece.start, middle, piece.end]
        if points and abs(run[-1] - points[-1]) < abs(run[0] - points[-1]):
            run.reverse()
        points.extend(run)
    return points


def _turn(angle: float) -> Point:
    return complex(math.cos(angle), math.sin(angle))


def inside_outline(point: Point, outline: Sequence[Point]) -> bool:
    """Whether a point lies inside a polygon (even-odd rule)."""
    inside = False
    for start, end in zip(outline, [*outline[1:], *outline[:1]], strict=True):
        if (start.imag > point.imag) != (end.imag > point.imag):
            crossing = start.real + (point.imag - start.imag) / (end.imag - start.imag) * (end.real - start.real)
            if crossing > point.real:
                inside = not inside
    return inside
