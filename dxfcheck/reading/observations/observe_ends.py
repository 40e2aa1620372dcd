"""Ends of links on nothing: what they may have been meant to meet."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterator, Sequence

from dxfcheck.drawing.primitives import Segment
from dxfcheck.geometry import Point
from dxfcheck.reading.bodies.body import Body
from dxfcheck.reading.lines.landing import Miss
from dxfcheck.reading.lines.linework import Strand
from dxfcheck.reading.lines.touches import Touch
from dxfcheck.reading.observations.seen import Seen, about_strand, pin_name
from dxfcheck.reading.reading import Observation
from dxfcheck.tolerances import RIM_GAP_IN_DIAMETERS

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
    for index, number in sorted(seen.body_of.items()):
        body = seen.bodies.bodies[number]
        if body.frame or index in seen.shaped:
            continue
        strand = seen.strands[index]
        for end in range(len(strand.ends)):
            if (index, end) in landed or _on_own_disc(seen, body, strand.ends[end]):
                continue
            near = _neighbours(seen, index, end)
            if any(touch.meets for touch in near):
                continue
            found = _free_end(seen, strand, end, near, misses[index, end], through[index])
            # An arm that hangs on no linkage is told of as a whole; only what it may have missed is told of its ends.
            # A guide, or the rod in a barrel, ends where it likes.
            if found.kind == "near-miss" or (number in seen.body_names and index not in seen.guides):
                yield found


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
    )


def _short_of_a_line(seen: Seen, strand: Strand, end: int, near: Sequence[Touch]) -> Observation | None:
    inside = strand.number in seen.guides and any(box.holds(strand.ends[end]) for box in seen.boxes)
    if not near or inside:
        return None
    touch = min(near, key=lambda each: (each.gap, each.strand))
    return about_strand(
        seen,
        "near-miss",
        strand,
        strand.ends[end],
        amount=touch.gap,
        limit=seen.tolerance.t,
        detail="stops {amount} short of the line it seems to be welded to and is not joined to it",
        also=(seen.handles[touch.strand],),
    )


def _rods_that_miss(seen: Seen) -> Iterator[Observation]:
    """Lines of no body whose two ends both stop just short of rims they point at: a rod with no joint left."""
    by_strand: defaultdict[int, defaultdict[int, list[Miss]]] = defaultdict(lambda: defaultdict(list))
    for miss in seen.misses:
        if miss.strand not in seen.body_of and miss.strand not in seen.idle and miss.pin in seen.pin_names:
            by_strand[miss.strand][miss.end].append(miss)
    for index, misses in sorted(by_strand.items()):
        strand = seen.strands[index]
        pins = [{miss.pin for miss in misses[end]} for end in (0, 1)]
        if not isinstance(strand.primitive, Segment) or not all(pins) or pins[0] & pins[1]:
            continue
        both = [_short_of_a_pin(seen, strand, end, misses[end]) for end in (0, 1)]
        if None not in both:
            yield from filter(None, both)
