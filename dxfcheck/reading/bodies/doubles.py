"""Links drawn twice: linework that lies on other linework between the same pins (reading rule 3)."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterable, Iterator, Mapping, Sequence
from typing import NamedTuple

from dxfcheck.drawing.primitives import Arc, Segment
from dxfcheck.geometry import Point, cross
from dxfcheck.reading.lines.landing import Landing
from dxfcheck.reading.lines.linework import Strand, arc_middle, distance_to_piece
from dxfcheck.reading.lines.sheet import Sheet

__all__ = ["DoubleLine", "find_doubles"]


class DoubleLine(NamedTuple):
    """Two strands between the same pins; ``apart`` is the greatest distance of the one from the other.

    Within t the ``repeated`` one is the ``kept`` one drawn twice (``same``); further apart they are two links, which
    is worth a look where it is less than the ring's radius.
    """

    kept: int
    repeated: int
    apart: float
    same: bool


def find_doubles(sheet: Sheet, landings: Iterable[Landing], frame: Mapping[int, str]) -> list[DoubleLine]:
    """Strands with two or more pins, all of them shared with an earlier or longer strand they lie on."""
    pins_of: defaultdict[int, set[int]] = defaultdict(set)
    for landing in landings:
        if landing.strand not in frame and landing.how in {"end", "corner"}:
            pins_of[landing.strand].add(landing.pin)
    by_pin: defaultdict[int, list[int]] = defaultdict(list)
    found: list[DoubleLine] = []
    # The strand with most pins first, so that a side drawn over a triangle repeats the triangle and not the reverse.
    for index in sorted(pins_of, key=lambda each: (-len(pins_of[each]), each)):
        pins = pins_of[index]
        if len(pins) < 2:
            continue
        kept = [other for other in by_pin[min(pins)] if pins <= pins_of[other]]
        double = _nearest(sheet, kept, index, min(sheet.pins[pin].radius for pin in pins)) if kept else None
        if double is not None:
            found.append(double)
        if double is None or not double.same:
            for pin in pins:
                by_pin[pin].append(index)
    return found


def _nearest(sheet: Sheet, kept: Sequence[int], repeated: int, radius: float) -> DoubleLine | None:
    """The strand that one lies on or nearly on, of those with its pins."""
    apart = [(_distance(sheet.strands[each], sheet.strands[repeated]), each) for each in kept]
    if not apart or min(apart)[0] >= radius:
        return None
    distance, other = min(apart)
    return DoubleLine(other, repeated, distance, distance <= sheet.tolerance.t)


def _distance(kept: Strand, repeated: Strand) -> float:
    """Greatest distance of the points of a strand from another, whichever of the two is trimmed the shorter."""
    if isinstance(kept.primitive, Segment) and isinstance(repeated.primitive, Segment):
        first, second = sorted((kept, repeated), key=lambda strand: strand.length)
        start, end = second.ends
        along = end - start
        return max(abs(cross(along, point - start)) for point in first.ends) / (abs(along) or 1.0)
    return min(_greatest(kept, repeated), _greatest(repeated, kept) if not kept.closed else float("inf"))


def _greatest(onto: Strand, strand: Strand) -> float:
    return max(min(distance_to_piece(point, piece) for piece in onto.pieces) for point in _points(strand))


def _points(strand: Strand) -> Iterator[Point]:
    """Ends of all pieces, and the middles of its arcs."""
    for piece in strand.pieces:
        yield from (piece.start, piece.end)
        if isinstance(piece, Arc):
            yield arc_middle(piece)
