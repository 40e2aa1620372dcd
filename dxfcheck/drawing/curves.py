"""Circles, ellipses and polylines with bulges, as plain shapes on the sheet.

An ellipse about c is P(t) = c + forward e^(it) + backward e^(-it): a circle where one of the two is zero. Any map of
the plane that keeps straight lines takes this form into itself, so circles in unevenly scaled blocks need no case of
their own.
"""

from __future__ import annotations

import cmath
import math
from collections.abc import Sequence

from dxfcheck.drawing.placement import SHEET, Placement
from dxfcheck.drawing.primitives import Arc, Fate, Path, Ring, Segment, Source
from dxfcheck.drawing.shapes import NotRead
from dxfcheck.geometry import Point
from dxfcheck.tolerances.drawing import (
    ELLIPSE_IS_RING_RELATIVE,
    FLATTENING_OF_RADIUS,
    FULL_TURN_SLACK,
    MANY_SIDES,
    REPEATED_VERTEX_RELATIVE,
    ROUND_OF_RADIUS,
    STRAIGHT_BULGE,
)

__all__ = ["FULL_TURN", "bulge_arc", "ellipse_shape", "flattened_ellipse", "polyline_shape", "sweep_between"]

FULL_TURN = 2.0 * math.pi
_CHORD_ANGLE = 2.0 * math.acos(1.0 - FLATTENING_OF_RADIUS)
_NO_EXTENT = Fate("skipped", "a curve of no size")

Corner = tuple[Point, float]
"""A vertex of a polyline and the bulge of the piece that starts there: tan of a quarter of its sweep, positive
counter-clockwise (Autodesk, DXF Reference, LWPOLYLINE group 42, from memory)."""


def sweep_between(start: float, end: float) -> float:
    """Counter-clockwise angle from start to end in radians: 0 only for equal angles, FULL_TURN where the arc closes."""
    if start == end:
        return 0.0
    sweep = (end - start) % FULL_TURN
    if sweep <= FULL_TURN_SLACK and abs(end - start) > FULL_TURN_SLACK:
        return FULL_TURN
    return FULL_TURN if FULL_TURN - sweep <= FULL_TURN_SLACK else sweep


def ellipse_shape(
    source: Source, place: Placement, centre: Point, forward: complex, backward: complex, start: float, sweep: float
) -> Ring | Arc | Path:
    """The part of an ellipse from parameter ``start`` over ``sweep``, as placed on the sheet; NotRead where tiny."""
    ahead = place.direct * forward + place.mirrored * backward.conjugate()
    back = place.direct * backward + place.mirrored * forward.conjugate()
    middle = place(centre)
    greater, lesser = max(abs(ahead), abs(back)), min(abs(ahead), abs(back))
    if greater == 0.0 or sweep == 0.0:
        raise NotRead(_NO_EXTENT)
    # The axes are greater + lesser and greater - lesser, so twice the lesser is how much they differ.
    if 2.0 * lesser <= ELLIPSE_IS_RING_RELATIVE * greater:
        if sweep >= FULL_TURN:
            return Ring(source, middle, greater)
        if abs(ahead) >= abs(back):
            return Arc(source, middle, greater, cmath.phase(ahead) + start, sweep)
        return Arc(source, middle, greater, cmath.phase(back) - start - sweep, sweep)
    points = flattened_ellipse(middle, ahead, back, start, sweep)
    closed = sweep >= FULL_TURN
    ends = (*points[1:], points[0]) if closed else points[1:]
    pieces = tuple(Segment(source, a, b) for a, b in zip(points, ends, strict=False))
    return Path(source, pieces, points, closed, curved=True)


def flattened_ellipse(
    centre: Point, forward: complex, backward: complex, start: float, sweep: float
) -> tuple[Point, ...]:
    """Points on an ellipse, no chord further off than FLATTENING_OF_RADIUS; the first is not repeated at full turn."""
    count = max(1, math.ceil(sweep / _CHORD_ANGLE))
    steps = range(count if sweep >= FULL_TURN else count + 1)
    turns = [cmath.rect(1.0, start + sweep * step / count) for step in steps]
    return tuple(centre + forward * turn + backward * turn.conjugate() for turn in turns)


def bulge_arc(source: Source, start: Point, end: Point, bulge: float) -> Arc:
    """The arc of a polyline piece; its sweep is 4 atan |bulge|, its centre on the chord's mid-perpendicular."""
    chord = end - start
    centre = start + chord / 2 + 1j * chord * (1 - bulge * bulge) / (4 * bulge)
    first = start if bulge > 0 else end
    radius = abs(chord) * (1 + bulge * bulge) / (4 * abs(bulge))
    return Arc(source, centre, radius, cmath.phase(first - centre), 4 * math.atan(abs(bulge)))


def polyline_shape(
    source: Source, place: Placement, corners: Sequence[Corner], *, closed: bool
) -> Segment | Arc | Ring | Path:
    """A polyline as the simplest shape it is: one straight or curved piece, a ring, else a path of pieces."""
    kept, closed = _without_repeats(corners, closed=closed)
    if not kept:
        raise NotRead(Fate("skipped", "a polyline without vertices"))
    if len(kept) == 1:
        raise NotRead(Fate("skipped", "a polyline of no length"))
    flat_ring = closed and place.even
    vertices = tuple([point for point, _ in kept] if place is SHEET else [place(point) for point, _ in kept])
    pieces, flattened = _pieces(source, place, kept, vertices, closed=closed)
    ring = _ring_of_arcs(source, pieces) if flat_ring else None
    ring = ring or (_ring_of_sides(source, pieces, vertices) if flat_ring else None)
    if ring is not None:
        return ring
    if len(pieces) == 1:
        return pieces[0]
    if closed and len(pieces) == 2 and all(isinstance(piece, Segment) for piece in pieces):
        return pieces[0]  # there and back: the same line twice in one polyline
    return Path(source, pieces, vertices, closed, curved=flattened)


def _without_repeats(corners: Sequence[Corner], *, closed: bool) -> tuple[list[Corner], bool]:
    """The corners that differ from their forerunner, and whether the polyline closes on itself."""
    if not corners:
        return [], closed
    origin = corners[0][0]
    slack = REPEATED_VERTEX_RELATIVE * max([abs(point - origin) for point, _ in corners])
    kept = [corners[0]]
    for corner in corners[1:]:
        if abs(corner[0] - kept[-1][0]) > slack:
            kept.append(corner)
        else:
            kept[-1] = corner  # a zero-length piece has no bulge worth keeping
    if len(kept) > 1 and abs(kept[-1][0] - origin) <= slack:
        return kept[:-1], True
    return kept, closed


def _pieces(
    source: Source, place: Placement, corners: Sequence[Corner], vertices: tuple[Point, ...], *, closed: bool
) -> tuple[tuple[Segment | Arc, ...], bool]:
    """The pieces between the corners, placed at ``vertices`` on the sheet, and whether an arc had to be flattened."""
    ends = (*vertices[1:], vertices[0]) if closed else vertices[1:]
    pieces: list[Segment | Arc] = []
    flattened = False
    for index, (start, end) in enumerate(zip(vertices, ends, strict=False)):
        corner, bulge = corners[index]
        if abs(bulge) <= STRAIGHT_BULGE:
            pieces.append(Segment(source, start, end))
            continue
        arc = bulge_arc(source, corner, corners[(index + 1) % len(corners)][0], bulge)
        shape = ellipse_shape(source, place, arc.centre, complex(arc.radius), 0j, arc.start_angle, arc.sweep)
        if isinstance(shape, Arc):
            pieces.append(shape)
        elif isinstance(shape, Path):
            flattened = True
            pieces.extend(_run_from(start, shape.pieces))
    return tuple(pieces), flattened


def _run_from(start: Point, pieces: tuple[Segment | Arc, ...]) -> Sequence[Segment | Arc]:
    """The straight pieces of a flattened arc in drawing order, whichever way round the arc was made."""
    first, last = pieces[0], pieces[-1]
    if abs(first.start - start) <= abs(last.end - start):
        return pieces
    return [Segment(piece.source, piece.end, piece.start) for piece in reversed(pieces)]


def _ring_of_arcs(source: Source, pieces: Sequence[Segment | Arc]) -> Ring | None:
    """The circle that arcs on one centre make when together they turn full round; else None."""
    arcs = [piece for piece in pieces if isinstance(piece, Arc)]
    if len(arcs) != len(pieces) or not arcs:
        return None
    centre = sum(arc.centre for arc in arcs) / len(arcs)
    radius = math.fsum(arc.radius for arc in arcs) / len(arcs)
    turn = math.fsum(arc.sweep for arc in arcs)
    slack = ROUND_OF_RADIUS * radius
    together = all(abs(arc.centre - centre) <= slack and abs(arc.radius - radius) <= slack for arc in arcs)
    return Ring(source, centre, radius) if together and abs(turn - FULL_TURN) <= ROUND_OF_RADIUS * FULL_TURN else None


def _ring_of_sides(source: Source, pieces: Sequence[Segment | Arc], vertices: Sequence[Point]) -> Ring | None:
    """The circle through the corners of a many-sided loop that goes round once in short steps; else None."""
    if len(pieces) < MANY_SIDES or not all(isinstance(piece, Segment) for piece in pieces):
        return None
    centre = sum(vertices) / len(vertices)
    radius = math.fsum(abs(vertex - centre) for vertex in vertices) / len(vertices)
    if any(abs(abs(vertex - centre) - radius) > ROUND_OF_RADIUS * radius for vertex in vertices):
        return None
    steps = [
        cmath.phase((b - centre) / (a - centre)) for a, b in zip(vertices, (*vertices[1:], vertices[0]), strict=True)
    ]
    longest = 2.0 * FULL_TURN / MANY_SIDES
    once = abs(abs(math.fsum(steps)) - FULL_TURN) <= FULL_TURN_SLACK
    return Ring(source, centre, radius) if once and max(map(abs, steps)) <= longest else None
