"""What looks wrong in the linework of the links: ends that miss, aim off centre, end on nothing; lines drawn twice."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass

from dxfcheck.drawing.primitives import Segment
from dxfcheck.reading.bodies import Bodies
from dxfcheck.reading.landing import Landing, Miss
from dxfcheck.reading.linework import Strand
from dxfcheck.reading.pins import PinSites
from dxfcheck.reading.reading import Observation
from dxfcheck.reading.tolerance import Tolerance
from dxfcheck.reading.touches import Touch, Touches
from dxfcheck.settings import LINE_OFF_CENTRE_OF_RADIUS, RIM_GAP_IN_DIAMETERS

__all__ = ["Seen", "observe_linework"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Seen:
    """The results of the earlier steps that the observations are made on.

    ``names`` and ``mechanism`` name the body (by index) a strand belongs to; ``pin_names`` the sites.
    """

    strands: Sequence[Strand]
    gaps: Touches
    """What lies near the ends of the bodies' strands, as far off as an end may miss a weld."""
    sites: PinSites
    landings: Sequence[Landing]
    misses: Sequence[Miss]
    bodies: Bodies
    body_names: dict[int, str]
    mechanisms: dict[int, str]
    pin_names: dict[int, str]
    body_of: Mapping[int, int]
    """The body of each strand that has one."""
    shared: frozenset[int]
    """Sites where two or more bodies meet, the frame counted."""
    handles: Sequence[str]
    """Handle of each strand's top-level entity."""
    tolerance: Tolerance


def observe_linework(seen: Seen) -> Iterator[Observation]:
    """All observations on ends and lines of bodies, in drawing order."""
    yield from _ends(seen)
    yield from _rods_that_miss(seen)
    yield from _aims(seen)
    yield from _doubles(seen)
    yield from _stacked(seen)


def _observation(  # noqa: PLR0913 (the fields of an observation)
    seen: Seen,
    kind: str,
    strand: Strand,
    at: complex,
    *,
    amount: float | None = None,
    limit: float | None = None,
    detail: str = "",
    severity: str | None = None,
    also: Iterable[str] = (),
) -> Observation:
    body = seen.body_of.get(strand.number)
    return Observation(
        kind=kind,
        at=at,
        handles=(seen.handles[strand.number], *also),
        layer=strand.primitive.source.layer,
        amount=amount,
        limit=limit,
        subject=seen.body_names.get(body, "") if body is not None else "",
        detail=detail,
        mechanism=seen.mechanisms.get(body) if body is not None else None,
        severity=severity,  # type: ignore[arg-type]
    )


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
        if body.frame or number not in seen.body_names:
            continue
        strand = seen.strands[index]
        for end in range(len(strand.ends)):
            if (index, end) in landed:
                continue
            near = [touch for touch in seen.gaps.at(index, end) if touch.strand in seen.body_of]
            if any(touch.meets for touch in near):
                continue
            yield _free_end(seen, strand, end, near, misses[index, end], through[index])


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
    joints = len(seen.shared.intersection(seen.bodies.bodies[seen.body_of[strand.number]].pins))
    return _observation(seen, "loose-end", strand, strand.ends[end], severity="warning" if joints < 2 else "note")


def _past_a_pin(seen: Seen, strand: Strand, end: int, through: Sequence[int]) -> Observation | None:
    for site in through:
        pin = seen.sites.pins[site]
        past = abs(strand.ends[end] - pin.at)
        limit = pin.radius + RIM_GAP_IN_DIAMETERS * 2.0 * pin.radius
        if past <= limit:
            return _observation(
                seen,
                "near-miss",
                strand,
                strand.ends[end],
                amount=past,
                limit=limit,
                detail=f"runs {{amount}} past the centre of pin {_pin_name(seen, site)} and is read as pinned there",
                severity="warning",
            )
    return None


def _short_of_a_pin(seen: Seen, strand: Strand, end: int, misses: Sequence[Miss]) -> Observation | None:
    own = seen.bodies.bodies[seen.body_of[strand.number]].pins if strand.number in seen.body_of else ()
    aimed = [miss for miss in misses if miss.pin not in own and miss.offset <= seen.sites.pins[miss.pin].radii[-1]]
    if not aimed:
        return None
    miss = min(aimed, key=lambda each: (each.gap, each.pin))
    return _observation(
        seen,
        "near-miss",
        strand,
        strand.ends[end],
        amount=miss.gap,
        limit=seen.tolerance.rim(seen.sites.pins[miss.pin].radius),
        detail=f"stops {{amount}} short of the rim of pin {_pin_name(seen, miss.pin)} and is not joined to it",
    )


def _short_of_a_line(seen: Seen, strand: Strand, end: int, near: Sequence[Touch]) -> Observation | None:
    if not near:
        return None
    touch = min(near, key=lambda each: (each.gap, each.strand))
    return _observation(
        seen,
        "near-miss",
        strand,
        strand.ends[end],
        amount=touch.gap,
        limit=seen.tolerance.t,
        detail="stops {amount} short of the line it seems to be welded to and is not joined to it",
        also=(seen.handles[touch.strand],),
    )


def _pin_name(seen: Seen, site: int) -> str:
    at = seen.sites.pins[site].at
    return seen.pin_names.get(site, f"at ({at.real:g}, {at.imag:g})")


def _rods_that_miss(seen: Seen) -> Iterator[Observation]:
    """Lines of no body whose two ends both stop just short of rims they point at: a rod with no joint left."""
    by_strand: defaultdict[int, defaultdict[int, list[Miss]]] = defaultdict(lambda: defaultdict(list))
    for miss in seen.misses:
        if miss.strand not in seen.body_of and miss.pin in seen.pin_names:
            by_strand[miss.strand][miss.end].append(miss)
    for index, misses in sorted(by_strand.items()):
        strand = seen.strands[index]
        pins = [{miss.pin for miss in misses[end]} for end in (0, 1)]
        if not isinstance(strand.primitive, Segment) or not all(pins) or pins[0] & pins[1]:
            continue
        both = [_short_of_a_pin(seen, strand, end, misses[end]) for end in (0, 1)]
        if None not in both:
            yield from filter(None, both)


def _aims(seen: Seen) -> Iterator[Observation]:
    """Ends that land on a pin but point past its centre, and lines that run through a ring off its centre."""
    laid_over = set(seen.bodies.laid_over)
    for landing in seen.landings:
        number = seen.body_of.get(landing.strand)
        if number is None or seen.bodies.bodies[number].frame or number not in seen.body_names:
            continue
        strand, pin = seen.strands[landing.strand], seen.sites.pins[landing.pin]
        if landing.how == "end" and landing.end is not None:
            point = strand.ends[landing.end]
            nearest = min(pin.radii, key=lambda radius: abs(abs(point - pin.at) - radius))
            limit = seen.tolerance.rim(nearest)
            if landing.offset > limit:
                detail = f"points {{amount}} past the centre of pin {_pin_name(seen, pin.number)}"
                yield _observation(
                    seen,
                    "off-centre-end",
                    strand,
                    point,
                    amount=landing.offset,
                    limit=limit,
                    detail=detail,
                    also=(),
                )
        elif landing.how == "across" and (landing.strand, landing.pin) not in laid_over:
            limit = LINE_OFF_CENTRE_OF_RADIUS * pin.radius
            if landing.offset <= limit and landing.pin in seen.pin_names:
                detail = (
                    f"runs past the centre of pin {_pin_name(seen, pin.number)} by {{amount}}, inside its ring, "
                    "and is read as not pinned there"
                )
                yield _observation(
                    seen,
                    "off-centre-end",
                    strand,
                    pin.at,
                    amount=landing.offset,
                    limit=seen.tolerance.t,
                    detail=detail,
                )


def _doubles(seen: Seen) -> Iterator[Observation]:
    """Lines drawn twice: between the same two pins, or with the same two ends inside one body."""
    told: set[int] = set()
    for double in seen.bodies.doubles:
        if double.repeated in seen.body_of and seen.body_of[double.repeated] in seen.body_names:
            told.add(double.repeated)
            yield _double(seen, double.kept, double.repeated)
    for index in sorted(seen.body_of):
        if seen.body_of[index] not in seen.body_names or len(seen.strands[index].ends) != 2 or index in told:
            continue
        kept = _same_line_before(seen, index)
        if kept is not None:
            yield _double(seen, kept, index)


def _same_line_before(seen: Seen, index: int) -> int | None:
    """An earlier straight line of the same body with both ends where this one has its own."""
    if seen.gaps.free(index, 0) or seen.gaps.free(index, 1):
        return None
    strand = seen.strands[index]
    both = [{touch.strand for touch in seen.gaps.at(index, end) if touch.gap <= seen.tolerance.t} for end in (0, 1)]
    for other in sorted(both[0] & both[1]):
        same = seen.strands[other]
        straight = isinstance(strand.primitive, Segment) and isinstance(same.primitive, Segment)
        before = other < index and seen.body_of.get(other) == seen.body_of[index]
        if straight and before and abs(same.length - strand.length) <= 2 * seen.tolerance.t:
            return other
    return None


def _double(seen: Seen, kept: int, repeated: int) -> Observation:
    strand = seen.strands[repeated]
    middle = (strand.ends[0] + strand.ends[1]) / 2
    return _observation(seen, "double-line", strand, middle, also=(seen.handles[kept],))


def _stacked(seen: Seen) -> Iterator[Observation]:
    """Pins that stand on one another, where at least one of them carries a link."""
    for one, other, distance in seen.sites.stacked:
        if one in seen.pin_names or other in seen.pin_names:
            pins = [seen.sites.pins[one], seen.sites.pins[other]]
            names = [_pin_name(seen, pin.number) for pin in pins]
            yield Observation(
                kind="stacked-pins",
                at=pins[0].at,
                amount=distance,
                limit=seen.tolerance.t,
                subject=f"{names[0]} and {names[1]}",
                layer=pins[0].rings[0].source.layer,
            )
