"""Linework that is drawn on a linkage but is no part of it: centre crosses, arrows, marks in rings (reading rule 1)."""

from __future__ import annotations

import math
from collections import defaultdict
from collections.abc import Iterator, Mapping, Sequence

import numpy as np

from dxfcheck.drawing.primitives import Segment
from dxfcheck.geometry import Point, angle_between_lines, cross, dot
from dxfcheck.reading.frames.arrows import find_arrows
from dxfcheck.reading.lines.landing import Landing
from dxfcheck.reading.lines.linework import Strand
from dxfcheck.reading.lines.pins import PinSites
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.tolerances.shapes import CROSS_ANGLE_DEGREES, CROSS_OVERHANG_IN_RADII, SHORT_OF_COINCIDENCE

__all__ = ["find_marks"]


def find_marks(sheet: Sheet, among: Sequence[int], landings: Sequence[Landing]) -> dict[int, str]:
    """Strands that are marks only, each with the reason, looked for ``among`` those that hang together with pins."""
    strands, sites, tolerance = sheet.strands, sheet.sites, sheet.tolerance
    marks: dict[int, str] = {}
    for strand in (strands[index] for index in among):
        if not strand.closed and strand.length <= SHORT_OF_COINCIDENCE * tolerance.t:
            marks[strand.number] = "a speck, too short to be a link"
    for index in _inside_rings(sheet, landings):
        marks.setdefault(index, "a mark inside a ring")
    for index in _centre_crosses(strands, among, sites, landings, tolerance):
        marks.setdefault(index, "a centre cross")
    for index in find_arrows(sheet, landings):
        marks.setdefault(index, "an arrow")
    return marks


def _inside_rings(sheet: Sheet, landings: Sequence[Landing]) -> Iterator[int]:
    """Strands that begin and end on one pin's rings: lines across a ring, arcs of rotation arrows on its rim.

    The legs of a frame symbol may by chance end on the greater of two rings, where its base is.
    """
    ends_on: defaultdict[tuple[int, int], set[int | None]] = defaultdict(set)
    for landing in landings:
        ends_on[landing.strand, landing.pin].add(landing.end)
    for (index, pin), ends in ends_on.items():
        strand = sheet.strands[index]
        rings = sheet.pins[pin].radii
        if not strand.closed:
            if {0, 1} <= ends and not strand.corners and (len(rings) == 1 or not _stands_on_a_base(sheet, strand)):
                yield index
            continue
        if strand.corners and all(abs(corner - sheet.pins[pin].at) < rings[-1] for corner in strand.corners):
            yield index


def _stands_on_a_base(sheet: Sheet, leg: Strand) -> bool:
    """Whether a line ends on another on which two more stand: a base with its strokes."""
    met = {number for end in (0, 1) for number in sheet.touching.met(leg.number, end)}
    if not met:
        return False
    ends, targets, _, meets = sheet.touching.as_pairs()
    standing: defaultdict[int, set[int]] = defaultdict(set)
    chosen = np.isin(targets, np.array(sorted(met), dtype=np.int64)) & meets
    for end, target in zip(ends[chosen].tolist(), targets[chosen].tolist(), strict=True):
        standing[target].add(end // 2)
    return any(len(lines - {leg.number}) >= STROKES_ON_BASE for lines in standing.values())


STROKES_ON_BASE = 2


def _centre_crosses(
    strands: Sequence[Strand], among: Sequence[int], sites: PinSites, landings: Sequence[Landing], tolerance: Tolerance
) -> Iterator[int]:
    """Two crossing lines through a ring's centre that end just outside it, or run on to just outside another ring's."""
    rings = [(pin.at, pin.radii[-1]) for pin in sites.pins] + [
        (disc.ring.centre, disc.ring.radius) for disc in sites.discs
    ]
    through: defaultdict[int, set[int]] = defaultdict(set)
    for landing in landings:
        if landing.how == "through":
            through[landing.pin].add(landing.strand)
    for number, disc in enumerate(sites.discs, start=len(sites.pins)):
        for strand in (strands[index] for index in among):
            if _runs_through(strand, disc.ring.centre, tolerance):
                through[number].add(strand.number)
    rings_of: defaultdict[int, list[tuple[Point, float]]] = defaultdict(list)
    for ring, lines in through.items():
        for number in lines:
            rings_of[number].append(rings[ring])
    for ring, lines in sorted(through.items()):
        straight = [strands[number] for number in sorted(lines) if isinstance(strands[number].primitive, Segment)]
        yield from _cross_on(rings[ring], straight, rings_of)


def _cross_on(
    ring: tuple[Point, float], lines: Sequence[Strand], rings_of: Mapping[int, Sequence[tuple[Point, float]]]
) -> Iterator[int]:
    """The lines through one ring that make a cross: each ends just outside rings, one of every two outside this one."""
    fitting = [line for line in lines if _just_outside(line, rings_of[line.number])]
    short = {line.number for line in fitting if _just_outside(line, [ring])}
    for line in fitting:
        partners = (other for other in fitting if line.number in short or other.number in short)
        if any(_cross_at(line, other) for other in partners):
            yield line.number


def _runs_through(strand: Strand, centre: Point, tolerance: Tolerance) -> bool:
    if not isinstance(strand.primitive, Segment) or strand.length == 0.0:
        return False
    start, end = strand.ends
    along = end - start
    within = 0.0 < dot(centre - start, along) < dot(along, along)
    return within and abs(cross(along, centre - start)) / abs(along) <= tolerance.t


def _just_outside(line: Strand, rings: Sequence[tuple[Point, float]]) -> bool:
    """Whether each end of a line lies outside, but just outside, one of the rings it runs through."""
    return all(
        any(radius <= abs(end - centre) <= (1.0 + CROSS_OVERHANG_IN_RADII) * radius for centre, radius in rings)
        for end in line.ends
    )


def _cross_at(one: Strand, other: Strand) -> bool:
    along, across = one.ends[1] - one.ends[0], other.ends[1] - other.ends[0]
    return angle_between_lines(along, across) >= math.radians(CROSS_ANGLE_DEGREES)
