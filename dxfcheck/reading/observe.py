"""What looks wrong in the linework of the links: ends that miss, aim off centre, end on nothing; lines drawn twice."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Collection, Iterable, Iterator, Sequence
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
    shared: Collection[int]
    """Sites where two or more bodies meet, the frame counted."""
    handles: Sequence[str]
    """Handle of each strand's top-level entity."""
    tolerance: Tolerance


def observe_linework(seen: Seen) -> Iterator[Observation]:
    """All observations on ends and lines of bodies, in drawing order."""
    body_of = {index: number for number, body in enumerate(seen.bodies.bodies) for index in body.strands}
    yield from _ends(seen, body_of)
    yield from _rods_that_miss(seen, body_of)
    yield from _aims(seen, body_of)
    yield from _doubles(seen, body_of)
    yield from _stacked(seen)


def _observation(  # noqa: PLR0913 (the fields of an observation)
    seen: Seen,
    kind: str,
    strand: Strand,
    at: complex,
    body_of: dict[int, int],
    *,
    amount: float | None = None,
    limit: float | None = None,
    detail: str = "",
    severity: str | None = None,
    also: Iterable[str] = (),
) -> Observation:
    body = body_of.get(strand.number)
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


def _ends(seen: Seen, body_of: dict[int, int]) -> Iterator[Observation]:
    """Each end of a moving body that neither lands on a pin nor meets other linework."""
    landed = {(each.strand, each.end) for each in seen.bodies.landings}
    through: defaultdict[int, list[int]] = defaultdict(list)
    for landing in seen.bodies.landings:
        if landing.how == "through":
            through[landing.strand].append(landing.pin)
    misses: defaultdict[tuple[int, int], list[Miss]] = defaultdict(list)
    for miss in seen.misses:
        misses[miss.strand, miss.end].append(miss)
    for index, number in sorted(body_of.items()):
        body = seen.bodies.bodies[number]
        if body.frame or number not in seen.body_names:
            continue
        strand = seen.strands[index]
        for end in range(len(strand.ends)):
            if (index, end) in landed:
                continue
            near = [touch for touch in seen.gaps.at(index, end) if touch.strand in body_of]
            if any(touch.meets for touch in near):
                continue
            joints = len(set(body.pins) & set(seen.shared))
            yield _free_end(seen, strand, end, near, misses[index, end], through[index], body_of, joints)


def _free_end(
    seen: Seen,
    strand: Strand,
    end: int,
    near: Sequence[Touch],
    misses: Sequence[Miss],
    through: Sequence[int],
    body_of: dict[int, int],
    joints: int,
) -> Observation:
    point = strand.ends[end]
    own = set(seen.bodies.bodies[body_of[strand.number]].pins)
    for pin in (seen.sites.pins[index] for index in through):
        past = abs(point - pin.at)
        limit = pin.radius + RIM_GAP_IN_DIAMETERS * 2.0 * pin.radius
        if past <= limit:
            detail = f"runs {{amount}} past the centre of pin {_pin_name(seen, pin.number)} and is read as pinned there"
            return _observation(
                seen, "near-miss", strand, point, body_of, amount=past, limit=limit, detail=detail, severity="warning"
            )
    aimed = [miss for miss in misses if miss.pin not in own and miss.offset <= seen.sites.pins[miss.pin].radii[-1]]
    if aimed:
        miss = min(aimed, key=lambda each: (each.gap, each.pin))
        pin = seen.sites.pins[miss.pin]
        detail = f"stops {{amount}} short of the rim of pin {_pin_name(seen, pin.number)} and is not joined to it"
        return _observation(
            seen,
            "near-miss",
            strand,
            point,
            body_of,
            amount=miss.gap,
            limit=seen.tolerance.rim(pin.radius),
            detail=detail,
        )
    gaps = [touch for touch in near if not touch.meets]
    if gaps:
        touch = min(gaps, key=lambda each: (each.gap, each.strand))
        detail = "stops {amount} short of the line it seems to be welded to and is not joined to it"
        return _observation(
            seen,
            "near-miss",
            strand,
            point,
            body_of,
            amount=touch.gap,
            limit=seen.tolerance.t,
            detail=detail,
            also=(seen.handles[touch.strand],),
        )
    severity = "warning" if joints < 2 else "note"
    return _observation(seen, "loose-end", strand, point, body_of, severity=severity)


def _pin_name(seen: Seen, site: int) -> str:
    at = seen.sites.pins[site].at
    return seen.pin_names.get(site, f"at ({at.real:g}, {at.imag:g})")


def _rods_that_miss(seen: Seen, body_of: dict[int, int]) -> Iterator[Observation]:
    """Lines of no body whose two ends both stop just short of rims they point at: a rod with no joint left."""
    by_strand: defaultdict[int, dict[int, Miss]] = defaultdict(dict)
    for miss in seen.misses:
        pin = seen.sites.pins[miss.pin]
        strand = seen.strands[miss.strand]
        aimed = miss.offset <= pin.radius and miss.pin in seen.pin_names
        if aimed and miss.strand not in body_of and isinstance(strand.primitive, Segment):
            held = by_strand[miss.strand].get(miss.end)
            if held is None or miss.gap < held.gap:
                by_strand[miss.strand][miss.end] = miss
    for index, misses in sorted(by_strand.items()):
        if len(misses) < 2 or misses[0].pin == misses[1].pin:
            continue
        for miss in misses.values():
            detail = f"stops {{amount}} short of the rim of pin {_pin_name(seen, miss.pin)} and is not joined to it"
            strand = seen.strands[index]
            limit = seen.tolerance.rim(seen.sites.pins[miss.pin].radius)
            yield _observation(
                seen, "near-miss", strand, strand.ends[miss.end], body_of, amount=miss.gap, limit=limit, detail=detail
            )


def _aims(seen: Seen, body_of: dict[int, int]) -> Iterator[Observation]:
    """Ends that land on a pin but point past its centre, and lines that run through a ring off its centre."""
    laid_over = set(seen.bodies.laid_over)
    for landing in seen.landings:
        number = body_of.get(landing.strand)
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
                    body_of,
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
                    body_of,
                    amount=landing.offset,
                    limit=seen.tolerance.t,
                    detail=detail,
                )


def _doubles(seen: Seen, body_of: dict[int, int]) -> Iterator[Observation]:
    """Lines drawn twice: between the same two pins, or with the same two ends inside one body."""
    told: set[int] = set()
    for double in seen.bodies.doubles:
        if double.repeated in body_of and body_of[double.repeated] in seen.body_names:
            told.add(double.repeated)
            yield _double(seen, double.kept, double.repeated, body_of)
    for index in sorted(body_of):
        if body_of[index] not in seen.body_names or len(seen.strands[index].ends) != 2 or index in told:
            continue
        kept = _same_line_before(seen, index, body_of)
        if kept is not None:
            yield _double(seen, kept, index, body_of)


def _same_line_before(seen: Seen, index: int, body_of: dict[int, int]) -> int | None:
    """An earlier straight line of the same body with both ends where this one has its own."""
    if seen.gaps.free(index, 0) or seen.gaps.free(index, 1):
        return None
    strand = seen.strands[index]
    both = [{touch.strand for touch in seen.gaps.at(index, end) if touch.gap <= seen.tolerance.t} for end in (0, 1)]
    for other in sorted(both[0] & both[1]):
        same = seen.strands[other]
        straight = isinstance(strand.primitive, Segment) and isinstance(same.primitive, Segment)
        before = other < index and body_of.get(other) == body_of[index]
        if straight and before and abs(same.length - strand.length) <= 2 * seen.tolerance.t:
            return other
    return None


def _double(seen: Seen, kept: int, repeated: int, body_of: dict[int, int]) -> Observation:
    strand = seen.strands[repeated]
    middle = (strand.ends[0] + strand.ends[1]) / 2
    return _observation(seen, "double-line", strand, middle, body_of, also=(seen.handles[kept],))


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
