"""Forks: two parallel lines that touch the ring of a pin from opposite sides, a slot with open ends (rule 6).

Glossary
    rail        one of the two lines
    joint       the piece across that joins two rails at one end
"""

from __future__ import annotations

import math
from collections import Counter, defaultdict
from collections.abc import Collection, Iterator, Sequence
from dataclasses import dataclass
from itertools import combinations
from typing import NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import Arc, Segment
from dxfcheck.geometry import Point, angle_between_lines, dot, parameter_on_line, unit
from dxfcheck.reading.lines.landing import Landings
from dxfcheck.reading.lines.linework import Linework, Strand
from dxfcheck.reading.lines.nearness import near_pairs, pair_distances
from dxfcheck.reading.lines.pins import PinSite
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.reading.lines.touches import Touches
from dxfcheck.reading.shapes.obrounds import Obround
from dxfcheck.reading.shapes.slots import Slot
from dxfcheck.tolerances.linework import (
    FORK_CLEARANCE_OF_RADIUS,
    FORK_LIKENESS,
    FORK_PAST_RADII,
    RIGHT_ANGLE_DEGREES,
    RIM_OF_RADIUS,
)

__all__ = ["Fork", "find_forks"]


@dataclass(frozen=True, slots=True)
class Fork(Obround):
    """A slot of two parallel lines; ``centres`` are where its centre line ends, ``radius`` half its width."""


class _Rail(NamedTuple):
    """A straight piece that touches a ring: its strand, its place in that, and from the pin to its foot."""

    strand: Strand
    number: int
    piece: Segment
    away: Point


def find_forks(
    landings: Landings,
    pins: Sequence[PinSite],
    linework: Linework,
    touching: Touches,
    tolerance: Tolerance,
    *,
    apart: Collection[int] = (),
    taken: Collection[int] = (),
) -> list[Slot]:
    """Pins between two parallel lines that touch a ring of theirs from opposite sides.

    Both lines run on past the ring by a ring's diameter towards the same side; they are about equally long or joined
    at one end, not at both. Joined at one end, they may leave the pin some room. ``apart`` are strands used up
    otherwise (slots, rectangles), ``taken`` sites that sit in a block. A pin that fits in two forks is in none.
    """
    beside: defaultdict[int, dict[int, None]] = defaultdict(dict)
    for landing in landings.landings:
        if landing.how in {"beside", "loose"} and landing.strand not in apart:
            beside[landing.pin][landing.strand] = None
    for miss in landings.misses:
        if miss.strand not in apart:
            beside[miss.pin][miss.strand] = None
    found = []
    for number, strands in sorted(beside.items()):
        if number not in taken:
            forks = list(_forks_at(pins[number], sorted(strands), linework.strands, touching, tolerance))
            if len(forks) == 1:
                found.append(Slot(forks[0], (number,)))
    settled = {site for slot in found for site in slot.sites}.union(taken)
    for number, passing in _with_clearance(pins, linework, tolerance, settled, apart):
        roomy = list(_forks_at(pins[number], passing, linework.strands, touching, tolerance, roomy=True))
        if len(roomy) == 1:
            found.append(Slot(roomy[0], (number,)))
    return found


def _with_clearance(
    pins: Sequence[PinSite],
    linework: Linework,
    tolerance: Tolerance,
    settled: Collection[int],
    apart: Collection[int],
) -> Iterator[tuple[int, list[int]]]:
    """Pins with two or more lines that pass their smallest ring a little further off than its rim."""
    radii = np.array([pin.radius for pin in pins])
    centres = np.array([pin.at for pin in pins], dtype=np.complex128)
    which, piece = near_pairs(centres, FORK_CLEARANCE_OF_RADIUS * radii, linework.piece_starts, linework.piece_ends)
    if not which.size:
        return
    gaps = pair_distances(centres[which], linework.piece_starts[piece], linework.piece_ends[piece])
    outside = gaps > radii[which] + np.maximum(tolerance.t, RIM_OF_RADIUS * radii[which])
    passing: defaultdict[int, set[int]] = defaultdict(set)
    pieces: Counter[int] = Counter(which[outside].tolist())
    for number, strand in zip(which[outside].tolist(), linework.piece_strand[piece[outside]].tolist(), strict=True):
        if pieces[number] > 1 and number not in settled and strand not in apart:
            passing[number].add(strand)
    for number, strands in sorted(passing.items()):
        yield number, sorted(strands)


def _forks_at(
    pin: PinSite,
    beside: Sequence[int],
    strands: Sequence[Strand],
    touching: Touches,
    tolerance: Tolerance,
    *,
    roomy: bool = False,
) -> Iterator[Fork]:
    """The forks round a pin; ``roomy`` ones are joined at one end and leave the pin as much room on either side."""
    radii = (pin.radius,) if roomy else dict.fromkeys(pin.radii)
    for radius in radii:
        most = FORK_CLEARANCE_OF_RADIUS * radius if roomy else radius
        rails = [rail for each in beside for rail in _rails(strands[each], pin.at, (radius, most), tolerance)]
        for one, other in combinations(rails, 2):
            fork = _fork(one, other, pin.at, radius, strands, touching, roomy=roomy)
            level = not roomy or abs(abs(one.away) - abs(other.away)) <= tolerance.rim(radius)
            if fork is not None and level:
                yield fork


def _rails(strand: Strand, at: Point, span: tuple[float, float], tolerance: Tolerance) -> Iterator[_Rail]:
    """The pieces of an open strand that pass a pin as far off as the span says: its foot lies between their ends."""
    least, most = span
    within = tolerance.rim(least)
    for number, piece in enumerate(() if strand.closed else strand.pieces):
        if isinstance(piece, Segment) and piece.start != piece.end:
            parameter = parameter_on_line(at, piece.start, piece.end)
            foot = piece.start + parameter * (piece.end - piece.start)
            touches = least - within <= abs(foot - at) <= most + within
            # A line that ends where it touches is a belt.
            if touches and within < parameter * abs(piece.end - piece.start) < abs(piece.end - piece.start) - within:
                yield _Rail(strand, number, piece, foot - at)


def _fork(
    one: _Rail,
    other: _Rail,
    at: Point,
    radius: float,
    strands: Sequence[Strand],
    touching: Touches,
    *,
    roomy: bool,
) -> Fork | None:
    """Two rails as a fork round a pin, or None where they are none."""
    vectors = [rail.piece.end - rail.piece.start for rail in (one, other)]
    if dot(one.away, other.away) >= 0.0 or angle_between_lines(*vectors) > math.radians(RIGHT_ANGLE_DEGREES):
        return None
    axis = unit(vectors[0])
    spans = [sorted(dot(axis, end - at) for end in (rail.piece.start, rail.piece.end)) for rail in (one, other)]
    low, high = max(span[0] for span in spans), min(span[1] for span in spans)
    joints = {forward: _joint(one, other, axis, strands, touching, forward=forward) for forward in (False, True)}
    shorter, longer = sorted(abs(vector) for vector in vectors)
    # Joined at both ends they are a box round the pin, not a fork.
    if max(high, -low) < FORK_PAST_RADII * radius or all(joints.values()):
        return None
    if (roomy or longer > FORK_LIKENESS * shorter) and not any(joints.values()):
        return None
    # The pin stops at the far side of a straight cross-piece, and in the middle of a round one.
    low += radius if isinstance(joints[False], Segment) else 0.0
    high -= radius if isinstance(joints[True], Segment) else 0.0
    middle = at + (one.away + other.away) / 2
    rails = tuple(dict.fromkeys((one.strand.number, other.strand.number)))
    return Fork(rails, (middle + low * axis, middle + high * axis), (abs(one.away) + abs(other.away)) / 2)


def _joint(
    one: _Rail, other: _Rail, axis: Point, strands: Sequence[Strand], touching: Touches, *, forward: bool
) -> Segment | Arc | None:
    """The piece that joins two rails at one end."""
    if one.strand is other.strand:
        first, second = sorted((one, other), key=lambda rail: rail.number)
        ahead = dot(axis, first.piece.end - first.piece.start) > 0.0
        return first.strand.pieces[first.number + 1] if second.number == first.number + 2 and ahead == forward else None
    ends = []
    for rail in (one, other):
        along = rail.strand.ends[1] - rail.strand.ends[0]
        ends.append((rail.strand.number, 1 if (dot(axis, along) > 0.0) == forward else 0))
    near = [{touch.strand for touch in touching.at(*end)} for end in ends]
    shared = sorted((near[0] & near[1]) - {one.strand.number, other.strand.number})
    pieces = [strands[each].pieces for each in shared]
    return next((each[0] for each in pieces if len(each) == 1), None)
