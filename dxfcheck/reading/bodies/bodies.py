"""Strands put together into rigid bodies, and the pins each body has (reading rules 3, 4 and 5)."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterable, Iterator, Mapping, Sequence
from collections.abc import Set as AbstractSet
from dataclasses import dataclass
from typing import NamedTuple

from dxfcheck.reading.bodies.body import Body
from dxfcheck.reading.bodies.covers import corner_pins, corner_welds, cover_bodies
from dxfcheck.reading.bodies.doubles import DoubleLine, find_doubles
from dxfcheck.reading.lines.landing import Landing
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.lines.unions import Unions

__all__ = ["Bodies", "Known", "make_bodies"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Bodies:
    """All bodies that have pins, or slide or roll on others, the frame (if there is any) first.

    ``doubles`` are lines drawn twice; ``laid_over`` pairs of a strand and a pin it runs over without being pinned there
    (a folded dead centre); ``landings`` are those that count.
    """

    bodies: tuple[Body, ...]
    doubles: tuple[DoubleLine, ...]
    laid_over: tuple[tuple[int, int], ...]
    landings: tuple[Landing, ...]


class Known(NamedTuple):
    """What is known of the parts of a sheet before anything is welded.

    ``outlines`` are the strands of bars and plates, which touch one another without being welded; ``groups`` other
    strands known to be one part whatever their ends do (the four of a block); ``never`` pairs that slide on one another
    (both ways round). Bodies without a pin are left out, but for those of the strands ``kept``. ``runs_in`` are pairs
    of the strand of a slot or guide and a pin that slides in it.
    """

    outlines: Sequence[Sequence[int]] = ()
    groups: Sequence[Sequence[int]] = ()
    never: AbstractSet[tuple[int, int]] = frozenset()
    kept: AbstractSet[int] = frozenset()
    runs_in: Sequence[tuple[int, int]] = ()


def make_bodies(
    sheet: Sheet, active: AbstractSet[int], landings: Sequence[Landing], frame: Mapping[int, str], known: Known
) -> Bodies:
    """Weld the active strands into bodies and give each its pins.

    ``frame`` are the strands known to be frame, ``active`` those that are neither marks nor hatch strokes.
    """
    counted = [each for each in landings if each.strand in active and _counts(each, frame)]
    pins_of_fill = corner_pins(sheet)
    unions = _weld(sheet, active, counted, frame, known)
    for group in corner_welds(sheet, active, pins_of_fill):
        for other in group[1:]:
            unions.join(group[0], other)
    doubles = find_doubles(sheet, counted, frame)
    for double in doubles:
        if double.same:
            unions.join(double.kept, double.repeated)
    members = {index: unions.of(index) for index in active}
    laid_over = set(_laid_over(counted, members, known.runs_in))
    counted = [each for each in counted if (each.strand, each.pin) not in laid_over]
    bodies = _gather(sheet, active, members, counted, frame, known.kept)
    return Bodies(
        bodies=tuple(cover_bodies(sheet, bodies, pins_of_fill)),
        doubles=tuple(doubles),
        laid_over=tuple(sorted(laid_over)),
        landings=tuple(counted),
    )


def _counts(landing: Landing, frame: Mapping[int, str]) -> bool:
    """Frame linework holds every pin it runs through or touches; links only those they land on."""
    return landing.how not in {"across", "loose"} or landing.strand in frame


def _weld(
    sheet: Sheet,
    active: AbstractSet[int],
    landings: Iterable[Landing],
    frame: Mapping[int, str],
    known: Known,
) -> Unions:
    """Join strands where an end meets another strand and no pin is there; all frame is one body."""
    unions = Unions(len(sheet.strands))
    for group in (*known.outlines, *known.groups):
        for other in group[1:]:
            unions.join(group[0], other)
    at_pin = {(landing.strand, landing.end) for landing in landings if landing.end is not None}
    # Two bars on one pin touch one another with their arcs and sides, but turn on one another.
    bar_of = {index: number for number, group in enumerate(known.outlines) for index in group}
    frame_strands = sorted(active & frame.keys())
    for index in frame_strands[1:]:
        unions.join(frame_strands[0], index)
    for index in sorted(active):
        for end in range(len(sheet.strands[index].ends)):
            if (index, end) in at_pin:
                continue
            for touch in sheet.touching.at(index, end):
                bars = {bar_of[strand] for strand in (index, touch.strand) if strand in bar_of}
                slides = (index, touch.strand) in known.never
                if touch.meets and touch.strand in active and len(bars) < 2 and not slides:
                    unions.join(index, touch.strand)
    return unions


def _laid_over(
    landings: Sequence[Landing], body_of: Mapping[int, int], runs_in: Iterable[tuple[int, int]]
) -> Iterator[tuple[int, int]]:
    """Strands that run over a pin's centre although they share another pin with a link that ends there.

    A pin that slides along a body counts as shared: a slotted lever may lie over the pivot of its crank.
    """
    pins_of: defaultdict[int, set[int]] = defaultdict(set)
    for strand, pin in runs_in:
        if strand in body_of:
            pins_of[body_of[strand]].add(pin)
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
    kept: AbstractSet[int],
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
    # A line from one frame pivot to another is the frame drawn as a link, not a link that turns on nothing.
    frame_roots.update(root for root in strands if len(pins[root]) > 1 and pins[root] <= frame_pins)
    kept_roots = {members[index] for index in kept if index in members}
    moving = [
        Body(strands=tuple(each), pins=tuple(sorted(pins[root])), frame=False)
        for root, each in strands.items()
        if root not in frame_roots and (pins[root] or root in kept_roots)
    ]
    if not frame_pins and frame_roots.isdisjoint(kept_roots):
        return moving
    fixed = tuple(sorted(index for root in frame_roots for index in strands[root]))
    return [Body(strands=fixed, pins=tuple(sorted(frame_pins)), frame=True), *moving]
