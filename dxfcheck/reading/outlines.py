"""Closed outlines: links with the pins inside them, and borders drawn round whole links (reading rules 1 and 4)."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Collection, Sequence
from dataclasses import dataclass

import numpy as np

from dxfcheck.drawing.primitives import Segment
from dxfcheck.geometry import Point
from dxfcheck.reading.landing import Landing
from dxfcheck.reading.linework import Strand, arc_middle
from dxfcheck.reading.pins import PinSite
from dxfcheck.reading.shapes import Rectangle

__all__ = ["Outlines", "find_outlines", "inside_outline", "loose_borders", "outline_points", "pins_inside"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Outlines:
    """``borders`` are closed strands that enclose whole links; ``held`` landings of pins inside the other ones."""

    borders: frozenset[int]
    held: tuple[Landing, ...]


def find_outlines(
    strands: Sequence[Strand],
    apart: Collection[int],
    landings: Sequence[Landing],
    pins: Sequence[PinSite],
    frame: Collection[int],
) -> Outlines:
    """Look into every closed strand; ``apart`` are strands used up otherwise (as rings, as the sides of bars)."""
    pins_of: defaultdict[int, set[int]] = defaultdict(set)
    for landing in landings:
        if landing.how != "across":
            pins_of[landing.strand].add(landing.pin)
    closed = {
        strand.number: outline_points(strand) for strand in strands if strand.closed and strand.number not in apart
    }
    places = np.array([pin.at for pin in pins], dtype=np.complex128)
    held: list[Landing] = []
    for number, outline in closed.items():
        if not pins_of[number]:
            within = pins_inside(outline, places)
            held.extend(Landing(number, pin, "corner", None, 0.0) for pin in within)
            pins_of[number].update(within)
    links = [strands[number] for number in sorted(pins_of) if len(pins_of[number]) > 1 and number not in frame]
    starts = np.array([_first_point(strand) for strand in links], dtype=np.complex128)
    on_pins = {landing.strand for landing in landings if landing.how != "across"}
    borders = frozenset(
        number
        for number, outline in closed.items()
        if number not in on_pins
        and any(
            links[each].number != number and _encloses(outline, links[each]) for each in _inside_box(starts, outline)
        )
    )
    return Outlines(borders=borders, held=tuple(landing for landing in held if landing.strand not in borders))


def pins_inside(outline: Sequence[Point], places: np.typing.NDArray[np.complex128]) -> list[int]:
    """Which of the places (P,) lie inside an outline."""
    return [number for number in _inside_box(places, outline) if inside_outline(complex(places[number]), outline)]


def _first_point(strand: Strand) -> Point:
    return strand.ends[0] if strand.ends else strand.pieces[0].start


def loose_borders(
    rectangles: Sequence[Rectangle], landings: Sequence[Landing], pins: Sequence[PinSite], frame: Collection[int]
) -> frozenset[int]:
    """The lines of rectangles of four loose lines that enclose whole links and end on no pin: sheet borders."""
    pins_of: defaultdict[int, set[int]] = defaultdict(set)
    for landing in landings:
        if landing.how != "across":
            pins_of[landing.strand].add(landing.pin)
    links = [held for number, held in pins_of.items() if len(held) > 1 and number not in frame]
    return frozenset(
        line
        for rectangle in rectangles
        if len(rectangle.strands) == 4 and not any(pins_of.get(line) for line in rectangle.strands)
        if any(all(inside_outline(pins[pin].at, rectangle.corners) for pin in held) for held in links)
        for line in rectangle.strands
    )


def _inside_box(points: np.typing.NDArray[np.complex128], outline: Sequence[Point]) -> list[int]:
    if not points.size:
        return []
    left, right = min(point.real for point in outline), max(point.real for point in outline)
    low, high = min(point.imag for point in outline), max(point.imag for point in outline)
    inside = (points.real >= left) & (points.real <= right) & (points.imag >= low) & (points.imag <= high)
    found: list[int] = np.nonzero(inside)[0].tolist()
    return found


def _encloses(outline: Sequence[Point], strand: Strand) -> bool:
    return all(inside_outline(point, outline) for piece in strand.pieces for point in (piece.start, piece.end))


def outline_points(strand: Strand) -> list[Point]:
    """The outline of a closed strand as a polygon; arcs by their ends and middles, in the order of its pieces."""
    points: list[Point] = []
    for piece in strand.pieces:
        run = [piece.start, *([] if isinstance(piece, Segment) else [arc_middle(piece)]), piece.end]
        if points and abs(run[-1] - points[-1]) < abs(run[0] - points[-1]):
            run.reverse()
        points.extend(run)
    return points


def inside_outline(point: Point, outline: Sequence[Point]) -> bool:
    """Whether a point lies inside a polygon (even-odd rule)."""
    inside = False
    for start, end in zip(outline, [*outline[1:], *outline[:1]], strict=True):
        if (start.imag > point.imag) != (end.imag > point.imag):
            crossing = start.real + (point.imag - start.imag) / (end.imag - start.imag) * (end.real - start.real)
            if crossing > point.real:
                inside = not inside
    return inside
