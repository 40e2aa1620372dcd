"""Strands put together into rigid bodies, and the pins each body has (reading rules 3, 4 and 5)."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Collection, Iterable, Iterator, Mapping, Sequence
from collections.abc import Set as AbstractSet
from dataclasses import dataclass

from dxfcheck.drawing.primitives import Segment
from dxfcheck.geometry import Point, cross, distance_to_segment
from dxfcheck.reading.frame import pins_at_corners
from dxfcheck.reading.landing import Landing
from dxfcheck.reading.pins import Disc
from dxfcheck.reading.sheet import Sheet
from dxfcheck.reading.unions import Unions

__all__ = ["Bodies", "Body", "DoubleLine", "make_bodies"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Body:
    """One rigid body of the drawing: its strands, its pins (indices of sites) and whether it is the frame.

    ``fills`` and ``discs`` are indices of the solid fills and discs that are part of it.
    """

    strands: tuple[int, ...]
    pins: tuple[int, ...]
    frame: bool
    discs: tuple[int, ...] = ()
    fills: tuple[int, ...] = ()


@dataclass(frozen=True, slots=True, kw_only=True)
class DoubleLine:
    """A line drawn twice between the same two pins; ``kept`` stays, ``repeated`` is taken into it."""

    kept: int
    repeated: int


@dataclass(frozen=True, slots=True, kw_only=True)
class Bodies:
    """All bodies that have pins, the frame (if there is any) first.

    ``doubles`` are lines drawn twice; ``laid_over`` pairs of a strand and a pin it runs over without being pinned there
    (a folded dead centre); ``landings`` are those that count.
    """

    bodies: tuple[Body, ...]
    doubles: tuple[DoubleLine, ...]
    laid_over: tuple[tuple[int, int], ...]
    landings: tuple[Landing, ...]


def make_bodies(
    sheet: Sheet,
    active: AbstractSet[int],
    landings: Sequence[Landing],
    frame: Mapping[int, str],
    groups: Sequence[Sequence[int]],
) -> Bodies:
    """Weld the active strands into bodies and give each its pins.

    ``frame`` are the strands known to be frame, ``active`` those that are neither marks nor hatch strokes, ``groups``
    strands known to be one part whatever their ends do (the four of an obround).
    """
    counted = [each for each in landings if each.strand in active and _counts(each, frame)]
    unions = _weld(sheet, active, counted, frame, groups)
    doubles = list(_doubles(sheet, counted, unions, frame))
    members = {index: unions.of(index) for index in active}
    laid_over = set(_laid_over(counted, members))
    counted = [each for each in counted if (each.strand, each.pin) not in laid_over]
    bodies = _gather(sheet, active, members, counted, frame)
    return Bodies(
        bodies=tuple(_with_fills_and_discs(sheet, bodies)),
        doubles=tuple(doubles),
        laid_over=tuple(sorted(laid_over)),
        landings=tuple(counted),
    )


def _counts(landing: Landing, frame: Mapping[int, str]) -> bool:
    return landing.how != "across" and (landing.how != "loose" or landing.strand in frame)


def _weld(
    sheet: Sheet,
    active: AbstractSet[int],
    landings: Iterable[Landing],
    frame: Mapping[int, str],
    groups: Sequence[Sequence[int]],
) -> Unions:
    """Join strands where an end meets another strand and no pin is there; all frame is one body."""
    unions = Unions(len(sheet.strands))
    for group in groups:
        for other in group[1:]:
            unions.join(group[0], other)
    at_pin = {(landing.strand, landing.end) for landing in landings if landing.end is not None}
    frame_strands = sorted(active & frame.keys())
    for index in frame_strands[1:]:
        unions.join(frame_strands[0], index)
    for index in sorted(active):
        for end in range(len(sheet.strands[index].ends)):
            if (index, end) in at_pin:
                continue
            for touch in sheet.touching.at(index, end):
                if touch.meets and touch.strand in active:
                    unions.join(index, touch.strand)
    return unions


def _doubles(
    sheet: Sheet, landings: Iterable[Landing], unions: Unions, frame: Mapping[int, str]
) -> Iterator[DoubleLine]:
    """Straight lines that lie on one another between the same two pins; each is joined to the one it repeats."""
    ends: defaultdict[int, dict[int, int]] = defaultdict(dict)
    for landing in landings:
        straight = isinstance(sheet.strands[landing.strand].primitive, Segment)
        if landing.end is not None and straight and landing.strand not in frame:
            ends[landing.strand][landing.end] = landing.pin
    between: defaultdict[tuple[int, ...], list[int]] = defaultdict(list)
    for index, pins in sorted(ends.items()):
        if len(pins) == 2:
            between[tuple(sorted(pins.values()))].append(index)
    for strands in between.values():
        for position, repeated in enumerate(strands):
            kept = next((each for each in strands[:position] if _lie_together(sheet, each, repeated)), None)
            if kept is not None:
                unions.join(kept, repeated)
                yield DoubleLine(kept=kept, repeated=repeated)


def _lie_together(sheet: Sheet, one: int, other: int) -> bool:
    """Whether the shorter of two lines lies on the longer, within t to the side."""
    first, second = sorted((sheet.strands[one], sheet.strands[other]), key=lambda strand: strand.length)
    start, end = second.ends
    along = end - start
    if along == 0:
        return False
    return all(abs(cross(along, point - start)) / abs(along) <= sheet.tolerance.t for point in first.ends)


def _laid_over(landings: Sequence[Landing], body_of: Mapping[int, int]) -> Iterator[tuple[int, int]]:
    """Strands that run over a pin's centre although they share another pin with a link that ends there."""
    pins_of: defaultdict[int, set[int]] = defaultdict(set)
    ends_at: defaultdict[int, set[int]] = defaultdict(set)
    for landing in landings:
        if landing.strand in body_of and landing.how not in {"through", "beside"}:
            pins_of[body_of[landing.strand]].add(landing.pin)
            ends_at[landing.pin].add(body_of[landing.strand])
    for landing in landings:
        if landing.how not in {"through", "beside"} or landing.strand not in body_of:
            continue
        own = body_of[landing.strand]
        for other in ends_at[landing.pin] - {own}:
            if pins_of[own] & pins_of[other] - {landing.pin}:
                yield landing.strand, landing.pin
                break


def _gather(
    sheet: Sheet,
    active: Iterable[int],
    members: Mapping[int, int],
    landings: Iterable[Landing],
    frame: Mapping[int, str],
) -> list[Body]:
    strands: defaultdict[int, list[int]] = defaultdict(list)
    for index in sorted(active):
        strands[members[index]].append(index)
    pins: defaultdict[int, set[int]] = defaultdict(set)
    for landing in landings:
        if landing.strand in members:
            pins[members[landing.strand]].add(landing.pin)
    frame_roots = {members[index] for index in frame if index in members}
    frame_pins = {pin.number for pin in sheet.pins if pin.frame is not None}
    frame_pins.update(pin for root in frame_roots for pin in pins[root])
    moving = [
        Body(strands=tuple(each), pins=tuple(sorted(pins[root])), frame=False)
        for root, each in strands.items()
        if root not in frame_roots and pins[root]
    ]
    if not frame_pins:
        return moving
    fixed = tuple(sorted(index for root in frame_roots for index in strands[root]))
    return [Body(strands=fixed, pins=tuple(sorted(frame_pins)), frame=True), *moving]


def _with_fills_and_discs(sheet: Sheet, bodies: Sequence[Body]) -> list[Body]:
    """Join the bodies that a solid fill covers or a disc carries into one, and add those that have no linework."""
    parts = [*bodies]
    for number, fill in enumerate(sheet.fills):
        if not fill.solid:
            continue
        corners = {pin for outline in fill.outlines for pin in pins_at_corners(outline, sheet.pins, sheet.tolerance)}
        if len(corners) >= 2:
            edges = [
                edge for outline in fill.outlines for edge in zip(outline, [*outline[1:], *outline[:1]], strict=True)
            ]
            own = [body for body in parts if not body.frame and _drawn_along(sheet, body, corners, edges)]
            parts = _merged(parts, own, corners, fills=(number,))
    for number, disc in enumerate(sheet.sites.discs):
        on_rim = [
            body for body in parts if not body.frame and any(_ends_on(sheet, index, disc) for index in body.strands)
        ]
        if disc.holds or on_rim:
            parts = _merged(parts, on_rim, set(disc.holds), discs=(number,))
    return parts


def _drawn_along(sheet: Sheet, body: Body, corners: Collection[int], edges: Sequence[tuple[Point, Point]]) -> bool:
    """Whether all of a body's pins are corners of a fill and all its strands run along the fill's edges."""
    if not set(body.pins) <= set(corners):
        return False
    radius = max(sheet.pins[pin].radii[-1] for pin in corners)
    within = max(sheet.tolerance.close(radius), sheet.tolerance.rim(radius))
    points = [point for index in body.strands for point in (*sheet.strands[index].ends, *sheet.strands[index].corners)]
    return all(min(distance_to_segment(point, *edge) for edge in edges) <= within for point in points)


def _ends_on(sheet: Sheet, index: int, disc: Disc) -> bool:
    within = sheet.tolerance.rim(disc.ring.radius)
    return any(abs(abs(end - disc.ring.centre) - disc.ring.radius) <= within for end in sheet.strands[index].ends)


def _merged(
    parts: Sequence[Body],
    own: Sequence[Body],
    pins: Collection[int],
    *,
    fills: tuple[int, ...] = (),
    discs: tuple[int, ...] = (),
) -> list[Body]:
    joined = Body(
        strands=tuple(sorted(index for body in own for index in body.strands)),
        pins=tuple(sorted({*pins, *(pin for body in own for pin in body.pins)})),
        frame=False,
        fills=fills + tuple(each for body in own for each in body.fills),
        discs=discs + tuple(each for body in own for each in body.discs),
    )
    return [*(body for body in parts if body not in own), joined]
