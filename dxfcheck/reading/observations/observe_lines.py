"""Lines of links that aim past a pin's centre or are drawn twice, and pins on one another."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterator

from dxfcheck.drawing.primitives import Segment
from dxfcheck.reading.lines.landing import Landing
from dxfcheck.reading.observations.seen import Seen, about_strand, pin_name
from dxfcheck.reading.observations.snapping import foot_on_strand, place_on_pin
from dxfcheck.reading.reading import Observation
from dxfcheck.tolerances.sheet import LINE_OFF_CENTRE_OF_RADIUS

__all__ = ["observe_lines"]


def observe_lines(seen: Seen) -> Iterator[Observation]:
    """All observations on lines and on pins that stand on one another."""
    yield from _aims(seen)
    yield from _doubles(seen)
    yield from _stacked(seen)


def _aims(seen: Seen) -> Iterator[Observation]:
    """Ends that land on a pin but point past its centre, and lines that run through a ring off its centre."""
    laid_over = set(seen.bodies.laid_over)
    held: defaultdict[int, set[int]] = defaultdict(set)
    ending: defaultdict[int, set[int]] = defaultdict(set)
    for landing in seen.bodies.landings:
        if landing.how != "across":
            held[seen.body_of[landing.strand]].add(landing.pin)
            ending[landing.pin].add(seen.body_of[landing.strand])
    for landing in seen.landings:
        number = seen.body_of.get(landing.strand)
        if number is None or landing.pin not in seen.pin_names:
            continue
        frame = seen.bodies.bodies[number].frame
        if landing.how == "across" and landing.pin in held[number]:
            continue  # a stroke at a corner, or a leg: its body lands on that pin by other linework
        if landing.how == "end" and not frame and number in seen.body_names:
            yield from _end_off_centre(seen, landing)
        elif landing.how == "across" and any(held[number] & held[other] for other in ending[landing.pin] - {number}):
            continue  # a folded link passes close by the pivot of its neighbour
        elif landing.how == "across" and (landing.strand, landing.pin) not in laid_over:
            yield from _line_off_centre(seen, landing, "fixed there" if frame else "not pinned there")


def _end_off_centre(seen: Seen, landing: Landing) -> Iterator[Observation]:
    strand, pin = seen.strands[landing.strand], seen.sites.pins[landing.pin]
    point = strand.ends[landing.end or 0]
    nearest = min(pin.radii, key=lambda radius: abs(abs(point - pin.at) - radius))
    limit = seen.tolerance.rim(nearest)
    if landing.offset > limit:
        detail = f"points {{amount}} past the centre of pin {pin_name(seen, pin.number)}"
        yield about_strand(
            seen,
            "off-centre-end",
            strand,
            point,
            amount=landing.offset,
            limit=limit,
            detail=detail,
            snap=place_on_pin(seen, strand, landing.end or 0, pin.number),
            case="end",
        )


def _line_off_centre(seen: Seen, landing: Landing, read_as: str) -> Iterator[Observation]:
    """A line through a ring off its centre: frame holds the pin all the same, a link does not."""
    strand, pin = seen.strands[landing.strand], seen.sites.pins[landing.pin]
    limit = seen.tolerance.rim(pin.radius) if read_as == "fixed there" else seen.tolerance.t
    if limit < landing.offset <= LINE_OFF_CENTRE_OF_RADIUS * pin.radius:
        name = pin_name(seen, pin.number)
        detail = f"runs past the centre of pin {name} by {{amount}}, inside its ring, and is read as {read_as}"
        yield about_strand(
            seen,
            "off-centre-end",
            strand,
            pin.at,
            amount=landing.offset,
            limit=limit,
            detail=detail,
            snap=foot_on_strand(pin.at, strand),
            case="frame" if read_as == "fixed there" else "",
        )


def _doubles(seen: Seen) -> Iterator[Observation]:
    """Lines drawn twice: between the same two pins, or with the same two ends inside one body."""
    told: set[int] = set()
    for double in seen.bodies.doubles:
        if double.repeated in seen.body_of and seen.body_of[double.repeated] in seen.body_names:
            told.add(double.repeated)
            yield _double(seen, double.kept, double.repeated, None if double.same else double.apart)
    for index in sorted(seen.body_of):
        if seen.body_of[index] not in seen.body_names or len(seen.strands[index].ends) != 2 or index in told:
            continue
        kept = _same_line_before(seen, index)
        if kept is not None:
            yield _double(seen, kept, index, None)


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


def _double(seen: Seen, kept: int, repeated: int, apart: float | None) -> Observation:
    """A line drawn twice; ``apart`` is given where the two only nearly lie on one another and stay two links."""
    strand = seen.strands[repeated]
    ends = strand.ends or strand.corners
    return about_strand(
        seen,
        "double-line",
        strand,
        (ends[0] + ends[-1]) / 2,
        amount=apart,
        limit=seen.tolerance.t,
        also=(seen.handles[kept],),
    )


def _stacked(seen: Seen) -> Iterator[Observation]:
    """Pins that stand on one another, where at least one of them carries a link."""
    for one, other, distance in seen.sites.stacked:
        if one in seen.pin_names or other in seen.pin_names:
            # The ring that carries a link stays; the other one is to be moved onto it.
            stays, moves = (one, other) if one in seen.pin_names else (other, one)
            pins = [seen.sites.pins[moves], seen.sites.pins[stays]]
            names = [pin_name(seen, pin.number) for pin in pins]
            yield Observation(
                kind="stacked-pins",
                at=pins[0].at,
                amount=distance,
                limit=seen.tolerance.t,
                subject=f"{names[1]} and {names[0]}",
                snap=pins[1].at,
                layer=pins[0].rings[0].source.layer,
            )
