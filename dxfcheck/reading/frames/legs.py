"""Legs of frame symbols: lines from a base to a pin, and triangles in one piece (reading rule 5)."""

from __future__ import annotations

from collections import Counter, defaultdict
from collections.abc import Collection, Iterator, Sequence

import numpy as np

from dxfcheck.reading.frames.bases import Base, piece_of
from dxfcheck.reading.lines.landing import Landing
from dxfcheck.reading.lines.linework import Strand
from dxfcheck.reading.lines.nearness import near_pairs
from dxfcheck.reading.lines.pins import PinSite
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.lines.tolerance import Tolerance

__all__ = ["legs_of", "on_two_pins", "polyline_legs_of"]


def on_two_pins(landings: Sequence[Landing]) -> set[int]:
    """Strands that are on two pins or more: links, as a rule."""
    held: defaultdict[int, set[int]] = defaultdict(set)
    for landing in landings:
        if landing.how not in {"loose", "across"}:
            held[landing.strand].add(landing.pin)
    return {strand for strand, pins in held.items() if len(pins) > 1}


def legs_of(
    sheet: Sheet, bases: Collection[Base], landings: Sequence[Landing], boxes: Collection[int]
) -> Iterator[int]:
    """Lines from a base to a pin: the sides of a triangle, whatever angle they meet the ring at."""
    base_strands = {base.strand for base in bases}
    landed = {(landing.strand, landing.end): landing.pin for landing in landings if landing.how != "loose"}
    on_box: defaultdict[tuple[int, int], list[int]] = defaultdict(list)
    for landing in landings:
        strand = sheet.strands[landing.strand]
        if landing.end is None or strand.number in base_strands:
            continue
        if landed.get((strand.number, 1 - landing.end), landing.pin) != landing.pin:
            continue  # a link between two pins, one of which sits on the base line itself
        feet = [
            touch.strand for touch in sheet.touching.at(strand.number, 1 - landing.end) if touch.strand in base_strands
        ]
        if any(foot not in boxes for foot in feet):
            yield strand.number
        elif feet:
            on_box[landing.pin, feet[0]].append(strand.number)
    for legs in on_box.values():
        if len(legs) > 1:
            yield from legs


def polyline_legs_of(
    strands: Sequence[Strand],
    bases: Collection[Base],
    landings: Sequence[Landing],
    pins: Sequence[PinSite],
    tolerance: Tolerance,
    outlines: Collection[int] = (),
) -> Iterator[int]:
    """Triangles of one polyline that land on a pin and have corners on a base, other than at their pins.

    Of ``outlines`` with holes one corner on a base is not enough: a triangle round its pin has a side there.
    """
    base_strands = {base.strand for base in bases}
    # What is on two pins is a link, though one of its corners may come to lie on a base.
    apart = base_strands | on_two_pins(landings)
    paths = [strands[number] for number in sorted({landing.strand for landing in landings} - apart)]
    at_pin = {(landing.strand, landing.pin) for landing in landings if landing.how == "corner"}
    rings: defaultdict[int, list[PinSite]] = defaultdict(list)
    for number, pin in at_pin:
        rings[number].append(pins[pin])
    corners = [
        (path.number, corner, tolerance.close(path.length))
        for path in paths
        for corner in path.corners
        if not any(abs(corner - pin.at) <= pin.radii[-1] for pin in rings[path.number])
    ]
    if corners and bases:
        places = np.array([corner for _, corner, _ in corners], dtype=np.complex128)
        reach = np.array([within for _, _, within in corners])
        starts = np.array([piece_of(strands, base).start for base in bases], dtype=np.complex128)
        ends = np.array([piece_of(strands, base).end for base in bases], dtype=np.complex128)
        on_base, _ = near_pairs(places, reach, starts, ends)
        standing = Counter(corners[each][0] for each in set(on_base.tolist()))
        yield from sorted(path for path, feet in standing.items() if feet > 1 or path not in outlines)
