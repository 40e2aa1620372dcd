"""Where an end that misses, or aims beside, was meant to be: the place that a drafter would snap it to."""

from __future__ import annotations

from dxfcheck.drawing.primitives import Arc, Segment
from dxfcheck.geometry import Point, cross, parameter_on_line, unit
from dxfcheck.reading.lines.linework import Strand, distance_to_piece
from dxfcheck.reading.observations.seen import Seen
from dxfcheck.tolerances.sheet import SNAP_REACH_IN_GAPS

__all__ = ["foot_on_strand", "place_on_line", "place_on_pin"]


def place_on_pin(seen: Seen, strand: Strand, end: int, site: int) -> Point:
    """The pin's centre, or its rim where the line's other end stops at one: on the way there from the other end."""
    pin = seen.sites.pins[site]
    point, far = strand.ends[end], strand.ends[1 - end]
    if not _stops_at_rims(seen, strand, 1 - end):
        return pin.at
    radius = min(pin.radii, key=lambda each: abs(abs(point - pin.at) - each))
    aim = far if isinstance(strand.primitive, Segment) else point
    return pin.at + radius * unit(aim - pin.at) if aim != pin.at else pin.at


def _stops_at_rims(seen: Seen, strand: Strand, end: int) -> bool:
    """Whether an end of a strand stops at a ring's rim; False where it lands on no pin."""
    away = [
        abs(strand.ends[end] - seen.sites.pins[landing.pin].at)
        for landing in seen.bodies.landings
        if landing.strand == strand.number and landing.end == end
    ]
    return any(distance > seen.tolerance.t for distance in away)


def place_on_line(strand: Strand, end: int, target: Strand) -> tuple[Point, bool]:
    """Where an end of a strand meets a target it nearly meets, and whether it runs past it (else it stops short).

    A straight line meets a straight one along its own direction; all else meets the nearest point.
    """
    point, far = strand.ends[end], strand.ends[1 - end]
    foot = foot_on_strand(point, target)
    gap = abs(foot - point)
    if not isinstance(strand.primitive, Segment):
        return foot, False
    for piece in target.pieces:
        met = _crossing(far, point, piece) if isinstance(piece, Segment) else None
        if met is not None and abs(met - point) <= SNAP_REACH_IN_GAPS * gap:
            return met, parameter_on_line(met, far, point) < 1.0
    return foot, False


def _crossing(start: Point, end: Point, piece: Segment) -> Point | None:
    """Where the line through two points meets a bounded line; None where it does not."""
    along, across = end - start, piece.end - piece.start
    turn = cross(along, across)
    if turn == 0.0:
        return None
    share = cross(start - piece.start, along) / -turn
    return piece.start + share * across if 0.0 <= share <= 1.0 else None


def foot_on_strand(point: Point, target: Strand) -> Point:
    """The point of a strand that lies nearest to a point."""
    piece = min(target.pieces, key=lambda each: distance_to_piece(point, each))
    if isinstance(piece, Arc):
        nearer_end = min((piece.start, piece.end), key=lambda each: abs(point - each))
        if point == piece.centre or distance_to_piece(point, piece) >= abs(point - nearer_end):
            return nearer_end
        return piece.centre + piece.radius * unit(point - piece.centre)
    share = min(1.0, max(0.0, parameter_on_line(point, piece.start, piece.end)))
    return piece.start + share * (piece.end - piece.start)
