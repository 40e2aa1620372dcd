"""Ends of links on nothing: what they may have been meant to meet."""

from __future__ import annotations

import math
from collections import defaultdict
from collections.abc import Iterator, Sequence

from dxfcheck.drawing.primitives import Segment
from dxfcheck.geometry import Point, angle_between_lines
from dxfcheck.reading.bodies.body import Body
from dxfcheck.reading.lines.landing import Miss
from dxfcheck.reading.lines.linework import Strand
from dxfcheck.reading.lines.touches import Touch
from dxfcheck.reading.observations.seen import Seen, about_strand, pin_name
from dxfcheck.reading.observations.snapping import place_on_line, place_on_pin
from dxfcheck.reading.reading import Observation
from dxfcheck.tolerances.linework import GUIDE_TURN_DEGREES, RIM_GAP_IN_DIAMETERS

__all__ = ["observe_ends"]


def observe_ends(seen: Seen) -> Iterator[Observation]:
    """Free ends of links, then rods that miss their pins with both ends."""
    yield from _ends(seen)
    yield from _rods_that_miss(seen)


def _ends(seen: Seen) -> Iterator[Observation]:
    """Each end of a moving body that neither lands on a pin nor meets other linework."""
    landed = {(each.strand, each.end) for each in seen.bodies.landings}
    through: defaultdict[int, list[int]] = defaultdict(list)
    for landing in seen.bodies.landings:
        if landing.how == "through":
            through[landing.strand].append(landing.pin)
    misses: defaultdict[tuple[int, int], list[Miss]] = defaultdict(list)
    for miss in seen.misses:
        misses[miss.strand, miss.end].append(miss)
    told: list[Observation] = []
    for index, number in sorted(seen.body_of.items()):
        body = seen.bodies.bodies[number]
        if body.frame or index in seen.shaped:
            continue
        strand = seen.strands[index]
        for end in range(len(strand.ends)):
            if (index, end) in landed or _on_own_disc(seen, body, strand.ends[end]):
                continue
            found = _odd_end(seen, strand, end, misses[index, end], through[index])
            if found is not None and not _faces(found, told, seen.tolerance.t):
                told.append(found)
                yield found


def _odd_end(
    seen: Seen, strand: Strand, end: int, misses: Sequence[Miss], through: Sequence[int]
) -> Observation | None:
    """What is to be said of an end that lands on no pin, if anything."""
    near = _neighbours(seen, strand.number, end)
    if any(touch.meets for touch in near):
        return _along_a_line(seen, strand, end, near, through) if through else None
    found = _free_end(seen, strand, end, near, misses, through)
    # An arm that hangs on no linkage is told of as a whole; only what it may have missed is told of its ends. A guide,
    # or the rod in a barrel, ends where it likes.
    linked = seen.body_of[strand.number] in seen.body_names and strand.number not in seen.guides
    return found if linked or found.kind == "near-miss" else None


def _faces(found: Observation, told: Sequence[Observation], t: float) -> bool:
    """Whether the other end of the same gap was told of: it lies where this one is to be snapped to."""
    return found.snap is not None and any(
        each.at is not None and abs(each.at - found.snap) <= t and each.handles[::-1] == found.handles for each in told
    )


def _along_a_line(
    seen: Seen, strand: Strand, end: int, near: Sequence[Touch], through: Sequence[int]
) -> Observation | None:
    """An end past a pin on a line that ends at that pin, in one direction with it: drawn over it, and so welded to it.

    As where a coupler in line with the crank begins a little before their pin: the two would be one rigid link.
    """
    met = {touch.strand for touch in near if touch.meets}
    for landing in seen.bodies.landings:
        if landing.strand in met and landing.pin in through and landing.how == "end":
            other = seen.strands[landing.strand]
            straight = isinstance(strand.primitive, Segment) and isinstance(other.primitive, Segment)
            along = [each.ends[1] - each.ends[0] for each in (strand, other)]
            if straight and angle_between_lines(*along) <= math.radians(GUIDE_TURN_DEGREES):
                name, at = pin_name(seen, landing.pin), seen.sites.pins[landing.pin].at
                return about_strand(
                    seen,
                    "near-miss",
                    strand,
                    strand.ends[end],
                    amount=abs(strand.ends[end] - at),
                    detail=f"runs {{amount}} past pin {name} along another line and is welded to it: one rigid link",
                    severity="warning",
                    snap=place_on_pin(seen, strand, end, landing.pin),
                    case="past",
                    also=(seen.handles[landing.strand],),
                )
    return None


def _neighbours(seen: Seen, strand: int, end: int) -> list[Touch]:
    """The linework of bodies near an end, but for what its own body slides on: that may come as near as it likes."""
    own = seen.body_of[strand]
    return [
        touch
        for touch in seen.gaps.at(strand, end)
        if touch.strand in seen.body_of and (own, seen.body_of[touch.strand]) not in seen.sliding
    ]


def _on_own_disc(seen: Seen, body: Body, point: Point) -> bool:
    """Whether an end sits on the rim of a disc or a pitch circle that is part of its link."""
    rings = [seen.sites.discs[disc].ring for disc in body.discs] + [seen.wheels[wheel] for wheel in body.wheels]
    return any(abs(abs(point - ring.centre) - ring.radius) <= seen.tolerance.rim(ring.radius) for ring in rings)


def _free_end(
    seen: Seen, strand: Strand, end: int, near: Sequence[Touch], misses: Sequence[Miss], through: Sequence[int]
) -> Observation:
    """What a free end comes nearest to: a pin it runs past, a pin or a line it stops short of, or nothing."""
    found = (
        _past_a_pin(seen, strand, end, through)
        or _short_of_a_pin(seen, strand, end, misses)
        or _short_of_a_line(seen, strand, end, near)
    )
    if found is not None:
        return found
    number = seen.body_of[strand.number]
    sliding = sum(number == one for one, _ in seen.sliding)
    joints = len(seen.shared.intersection(seen.bodies.bodies[number].pins)) + sliding
    return about_strand(seen, "loose-end", strand, strand.ends[end], severity="warning" if joints < 2 else "note")


def _past_a_pin(seen: Seen, strand: Strand, end: int, through: Sequence[int]) -> Observation | None:
    for site in through:
        pin = seen.sites.pins[site]
        past = abs(strand.ends[end] - pin.at)
        limit = pin.radius + RIM_GAP_IN_DIAMETERS * 2.0 * pin.radius
        if past <= limit:
            return about_strand(
                seen,
                "near-miss",
                strand,
                strand.ends[end],
                amount=past,
                limit=limit,
                detail=f"runs {{amount}} past the centre of pin {pin_name(seen, site)} and is read as pinned there",
                severity="warning",
                snap=place_on_pin(seen, strand, end, site),
                case="past",
            )
    return None


def _short_of_a_pin(seen: Seen, strand: Strand, end: int, misses: Sequence[Miss]) -> Observation | None:
    if strand.number in seen.guides:
        return None
    own = seen.bodies.bodies[seen.body_of[strand.number]].pins if strand.number in seen.body_of else ()
    aimed = [miss for miss in misses if miss.pin not in own and miss.offset <= seen.sites.pins[miss.pin].radii[-1]]
    if not aimed:
        return None
    miss = min(aimed, key=lambda each: (each.gap, each.pin))
    limit = seen.tolerance.rim(seen.sites.pins[miss.pin].radius)
    name = pin_name(seen, miss.pin)
    if miss.gap <= limit:
        detail = f"touches the rim of pin {name} but points past it, as a belt does; it is not joined to it"
    else:
        detail = f"stops {{amount}} short of the rim of pin {name} and is not joined to it"
    return about_strand(
        seen,
        "near-miss",
        strand,
        strand.ends[end],
        amount=miss.gap,
        limit=limit,
        detail=detail,
        snap=place_on_pin(seen, strand, end, miss.pin),
    )


def _short_of_a_line(seen: Seen, strand: Strand, end: int, near: Sequence[Touch]) -> Observation | None:
    inside = strand.number in seen.guides and any(box.holds(strand.ends[end]) for box in seen.boxes)
    if not near or inside:
        return None
    touch = min(near, key=lambda each: (each.gap, each.strand))
    met, past = place_on_line(strand, end, seen.strands[touch.strand])
    where = "runs {amount} past" if past else "stops {amount} short of"
    return about_strand(
        seen,
        "near-miss",
        strand,
        strand.ends[end],
        amount=abs(met - strand.ends[end]),
        limit=seen.tolerance.t,
        detail=f"{where} the line it seems to be welded to and is not joined to it",
        snap=met,
        case="overshoot" if past else "",
        also=(seen.handles[touch.strand],),
    )


def _rods_that_miss(seen: Seen) -> Iterator[Observation]:
    """Lines of no body whose two ends both stop just short of rims they point at: a rod with no joint left.

    Where there is a linkage, of its pins; else, as every rod may have missed, of any ring.
    """
    pins_meant = seen.pin_names or range(len(seen.sites.pins))
    by_strand: defaultdict[int, defaultdict[int, list[Miss]]] = defaultdict(lambda: defaultdict(list))
    for miss in seen.misses:
        if miss.strand not in seen.body_of and miss.strand not in seen.idle and miss.pin in pins_meant:
            by_strand[miss.strand][miss.end].append(miss)
    for index, misses in sorted(by_strand.items()):
        strand = seen.strands[index]
        pins = [{miss.pin for miss in misses[end]} for end in (0, 1)]
        if not isinstance(strand.primitive, Segment) or not all(pins) or pins[0] & pins[1]:
            continue
        both = [_short_of_a_pin(seen, strand, end, misses[end]) for end in (0, 1)]
        if None not in both:
            yield from filter(None, both)
