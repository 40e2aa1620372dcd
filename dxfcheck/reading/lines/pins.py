"""Rings on the sheet, and which of them are pins (reading rule 2)."""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass
from typing import NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import Arc, Ring
from dxfcheck.geometry import Point
from dxfcheck.reading.lines.linework import Linework, Strand
from dxfcheck.reading.lines.nearness import near_pairs
from dxfcheck.reading.lines.roles import BUILT_IN_ROLES, frame_reason
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.reading.lines.touches import Touches
from dxfcheck.reading.lines.unions import Unions
from dxfcheck.settings import LayerRoles
from dxfcheck.tolerances.linework import (
    DISC_OFFSET_OF_RADIUS,
    ROUND_LOOP_LIKENESS,
    ROUND_LOOP_PIECES,
    STACKED_OF_RADIUS,
)

__all__ = ["Disc", "PinSite", "PinSites", "find_pins", "rings_of_arcs", "rings_of_lines"]


class PinSite(NamedTuple):
    """A place where a pin is drawn: rings on one centre, ``radii`` from the smallest up; ``number`` among the sites.

    ``frame`` says why its ring is itself frame, or is None.
    """

    number: int
    at: Point
    radii: tuple[float, ...]
    rings: tuple[Ring, ...]
    frame: str | None

    @property
    def radius(self) -> float:
        """Radius of the smallest ring."""
        return self.radii[0]


class Disc(NamedTuple):
    """A ring that holds other pins off its centre: a crank plate, an eccentric.

    ``holds`` are indices of pin sites, the one on its own centre among them. ``rim`` says that a pitch circle
    has the same centre: it shows the body of that wheel, no part of its own.
    """

    ring: Ring
    holds: tuple[int, ...]
    rim: bool = False


@dataclass(frozen=True, slots=True, kw_only=True)
class PinSites:
    """All pins of a sketch, its discs, and pairs of pins that stand on one another (indices, distance of centres)."""

    pins: tuple[PinSite, ...]
    discs: tuple[Disc, ...]
    stacked: tuple[tuple[int, int, float], ...]


def rings_of_arcs(arcs: Sequence[Strand], tolerance: Tolerance) -> list[tuple[Ring, tuple[int, ...]]]:
    """Rings drawn as several arcs that make up a full turn on one centre, each with the strands it was made of."""
    curved = [strand for strand in arcs if isinstance(strand.primitive, Arc)]
    if len(curved) < 2:
        return []
    shapes = [strand.primitive for strand in curved if isinstance(strand.primitive, Arc)]
    centres = np.array([arc.centre for arc in shapes], dtype=np.complex128)
    reach = np.array([min(tolerance.rim(arc.radius), tolerance.close(arc.radius)) for arc in shapes])
    groups = Unions(len(shapes))
    for one, other in zip(*(each.tolist() for each in near_pairs(centres, reach, centres, centres)), strict=True):
        if abs(shapes[one].radius - shapes[other].radius) <= min(reach[one], reach[other]):
            groups.join(one, other)
    found = []
    for members in groups.groups():
        for turn in _full_turns(members, shapes, tolerance):
            parts = [shapes[member] for member in turn]
            centre = sum(part.centre for part in parts) / len(parts)
            ring = Ring(parts[0].source, centre, sum(part.radius for part in parts) / len(parts))
            found.append((ring, tuple(sorted(curved[member].number for member in turn))))
    return found


def _full_turns(members: Sequence[int], shapes: Sequence[Arc], tolerance: Tolerance) -> Iterator[list[int]]:
    """The full turns that arcs on one circle make up, each end on the next one's start: a ring may be drawn twice."""
    gap = max(tolerance.t, tolerance.rim(shapes[members[0]].radius))
    left = list(members)
    while len(left) > 1:
        turn = [left.pop(0)]
        while abs(shapes[turn[-1]].end - shapes[turn[0]].start) > gap:
            after = [each for each in left if abs(shapes[turn[-1]].end - shapes[each].start) <= gap]
            if not after:
                break
            turn.append(after[0])
            left.remove(after[0])
        swept = sum(shapes[each].sweep for each in turn)
        if len(turn) > 1 and abs(swept - math.tau) * shapes[turn[0]].radius <= gap * len(turn):
            yield turn


def rings_of_lines(linework: Linework, touching: Touches, tolerance: Tolerance) -> list[tuple[Ring, tuple[int, ...]]]:
    """Rings drawn as a closed loop of many short lines on one circle, each with the strands it was made of."""
    strands = linework.strands
    after = _round_neighbours(linework, touching)
    found: list[tuple[Ring, tuple[int, ...]]] = []
    seen: set[int] = set()
    for first in after:
        if first in seen:
            continue
        chain = _chain_from(first, after)
        seen.update(chain)
        if len(chain) >= ROUND_LOOP_PIECES:
            ring = _circle_through([strands[index] for index in chain], tolerance)
            if ring is not None:
                found.append((ring, tuple(sorted(chain))))
    return found


def _round_neighbours(linework: Linework, touching: Touches) -> dict[int, tuple[int, int]]:
    """The one neighbour at each end of a line that is about as long and turns no more than the sides of a ring do.

    A link that ends on the loop, or a base line that touches it, is none.
    """
    along = linework.line_directions()
    ends, targets, _, meets = touching.as_pairs()
    ends, targets = ends[meets], targets[meets]
    own, other = along[ends // 2], along[targets]
    with np.errstate(divide="ignore", invalid="ignore"):
        turn = np.abs(np.angle(own / other))
        longer = np.abs(own) / np.abs(other)
    sharpest = 1.5 * math.tau / ROUND_LOOP_PIECES
    alike = (longer <= ROUND_LOOP_LIKENESS) & (longer >= 1.0 / ROUND_LOOP_LIKENESS)
    gentle = (np.minimum(turn, math.pi - turn) <= sharpest) & alike
    count = np.bincount(ends[gentle], minlength=2 * along.size)
    gentle &= count[ends] == 1
    neighbour = np.full(2 * along.size, -1, dtype=np.int64)
    neighbour[ends[gentle]] = targets[gentle]
    pairs = neighbour.reshape(-1, 2)
    both = np.nonzero((pairs >= 0).all(axis=1))[0]
    return {int(strand): (int(pairs[strand, 0]), int(pairs[strand, 1])) for strand in both}


def _chain_from(first: int, after: Mapping[int, tuple[int, int]]) -> list[int]:
    """The closed chain through a line, or an empty list where it is open or branches."""
    chain = [first]
    previous, current = first, after[first][0]
    while current != first:
        neighbours = after.get(current, (-1, -1))
        if previous not in neighbours or len(chain) > len(after):
            return []
        chain.append(current)
        onward = neighbours[1] if neighbours[0] == previous else neighbours[0]
        previous, current = current, onward
    return chain


def _circle_through(lines: Sequence[Strand], tolerance: Tolerance) -> Ring | None:
    corners = [point for line in lines for point in line.ends]
    centre = sum(corners) / len(corners)
    radius = sum(abs(corner - centre) for corner in corners) / len(corners)
    within = min(tolerance.rim(radius), tolerance.close(radius))
    if any(abs(abs(corner - centre) - radius) > within for corner in corners):
        return None
    return Ring(lines[0].primitive.source, centre, radius)


def find_pins(
    rings: Sequence[Ring],
    tolerance: Tolerance,
    pitch: Sequence[Ring] = (),
    roles: LayerRoles = BUILT_IN_ROLES,
) -> PinSites:
    """Pins from rings: concentric ones are one pin, one that holds another pin off its centre is a disc.

    One that lies about the centre of a ``pitch`` circle as well is the rim of that wheel.
    """
    groups = [[rings[index] for index in members] for members in _concentric(rings, tolerance)]
    holds = _rings_that_hold(groups)
    pins: list[PinSite] = []
    site_of_group: dict[int, int] = {}
    for number, group in enumerate(groups):
        kept = [ring for ring in group if id(ring) not in holds] if holds else group
        if len(kept) > 1:
            kept.sort(key=lambda ring: ring.radius)
        if kept:
            site_of_group[number] = len(pins)
            frame = next(filter(None, [frame_reason(ring.source, roles) for ring in kept]), None)
            radii = tuple([ring.radius for ring in kept])
            pins.append(PinSite(len(pins), kept[0].centre, radii, tuple(kept), frame))
    discs = [
        Disc(ring, tuple(sorted(site_of_group[held] for held in (number, *holds[id(ring)]) if held in site_of_group)))
        for number, group in enumerate(groups)
        for ring in group
        if id(ring) in holds
    ]
    discs = [disc._replace(rim=_is_rim(disc.ring, pitch, tolerance)) for disc in discs] if pitch else discs
    return PinSites(pins=tuple(pins), discs=tuple(discs), stacked=tuple(_stacked(pins)))


def _is_rim(ring: Ring, pitch: Sequence[Ring], tolerance: Tolerance) -> bool:
    return any(abs(each.centre - ring.centre) <= tolerance.rim(each.radius) for each in pitch)


def _concentric(rings: Sequence[Ring], tolerance: Tolerance) -> Iterable[list[int]]:
    if not rings:
        return []
    centres = np.array([ring.centre for ring in rings], dtype=np.complex128)
    groups = Unions(len(rings))
    reach = np.full(centres.size, tolerance.t)
    one, other = near_pairs(centres, reach, centres, centres)
    for pair in zip(one[one < other].tolist(), other[one < other].tolist(), strict=True):
        groups.join(*pair)
    return groups.groups()


def _rings_that_hold(groups: Sequence[Sequence[Ring]]) -> dict[int, list[int]]:
    """Rings (by id) that hold the smallest ring of other groups wholly, well off their centre: the groups they hold."""
    smallest = [group[0] if len(group) == 1 else min(group, key=lambda ring: ring.radius) for group in groups]
    owners = [(number, ring) for number, group in enumerate(groups) for ring in group]
    if not owners:
        return {}
    centres = np.array([ring.centre for _, ring in owners], dtype=np.complex128)
    radii = np.array([ring.radius for _, ring in owners])
    others = np.array([ring.centre for ring in smallest], dtype=np.complex128)
    holds: dict[int, list[int]] = {}
    group_of = np.array([number for number, _ in owners])
    place_of, held_by = near_pairs(centres, radii, others, others)
    foreign = group_of[place_of] != held_by
    for place, held in zip(place_of[foreign].tolist(), held_by[foreign].tolist(), strict=True):
        ring = owners[place][1]
        inner = smallest[held]
        offset = abs(inner.centre - ring.centre)
        # Two rings nearly on one centre were meant to be on it: they are reported as stacked, not read as a disc.
        apart = offset >= min(inner.radius, DISC_OFFSET_OF_RADIUS * ring.radius)
        if apart and offset + inner.radius < ring.radius:
            holds.setdefault(id(ring), []).append(held)
    return holds


def _stacked(pins: Sequence[PinSite]) -> Iterable[tuple[int, int, float]]:
    if len(pins) < 2:
        return
    centres = np.array([pin.at for pin in pins], dtype=np.complex128)
    reach = np.array([STACKED_OF_RADIUS * pin.radius for pin in pins])
    which, beside = near_pairs(centres, reach, centres, centres)
    apart = which != beside
    for one, other in zip(which[apart].tolist(), beside[apart].tolist(), strict=True):
        if (pins[one].radius, -one) > (pins[other].radius, -other):
            yield (min(one, other), max(one, other), abs(pins[one].at - pins[other].at))
