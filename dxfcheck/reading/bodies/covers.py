"""Solid fills and discs as links: a filled triangle, a crank plate, a filled corner (reading rules 2 and 4)."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Collection, Iterable, Iterator, Sequence
from itertools import count

import numpy as np

from dxfcheck.drawing.primitives import Segment
from dxfcheck.geometry import Point, cross, distance_to_segment, parameter_on_line
from dxfcheck.reading.bodies.body import Body
from dxfcheck.reading.lines.linework import Strand
from dxfcheck.reading.lines.nearness import near_pairs
from dxfcheck.reading.lines.pins import Disc
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.shapes.outlines import pins_inside
from dxfcheck.tolerances.linework import CORNER_OF_LINE

__all__ = ["corner_pins", "corner_welds", "cover_bodies"]

Edge = tuple[Point, Point]
HALF_WAY = 0.5


def corner_pins(sheet: Sheet) -> list[set[int]]:
    """For each fill, the pins whose rings hold one of its corners; for a solid one with none there, those inside."""
    found: list[set[int]] = [set() for _ in sheet.fills]
    corners = [(number, corner) for number, fill in enumerate(sheet.fills) for line in fill.outlines for corner in line]
    if corners and sheet.pins:
        places = np.array([corner for _, corner in corners], dtype=np.complex128)
        centres = np.array([pin.at for pin in sheet.pins], dtype=np.complex128)
        reach = np.array([pin.radii[-1] + sheet.tolerance.rim(pin.radii[-1]) for pin in sheet.pins])
        for pin, place in zip(*(each.tolist() for each in near_pairs(centres, reach, places, places)), strict=True):
            found[corners[place][0]].add(pin)
        for number, fill in enumerate(sheet.fills):
            if fill.solid and not found[number]:
                found[number].update(pin for outline in fill.outlines for pin in pins_inside(outline, centres))
    return found


def corner_welds(sheet: Sheet, active: Collection[int], pins_of_fill: Sequence[Collection[int]]) -> Iterator[list[int]]:
    """Groups of lines that a small filled corner welds: two of its edges run along them, and it is no link itself."""
    filled = [(number, edge) for number, fill in enumerate(sheet.fills) if fill.solid for edge in _edges(fill.outlines)]
    filled = [(number, edge) for number, edge in filled if len(pins_of_fill[number]) < 2 and edge[0] != edge[1]]
    lines = [strand for strand in map(sheet.strands.__getitem__, sorted(active)) if _is_line(strand)]
    if not filled or not lines:
        return
    middles = np.array([(start + end) / 2 for _, (start, end) in filled], dtype=np.complex128)
    reach = np.array([sheet.tolerance.close(abs(end - start)) for _, (start, end) in filled])
    starts = np.array([strand.ends[0] for strand in lines], dtype=np.complex128)
    ends = np.array([strand.ends[1] for strand in lines], dtype=np.complex128)
    along: defaultdict[int, set[int]] = defaultdict(set)
    for place, line in zip(*(each.tolist() for each in near_pairs(middles, reach, starts, ends)), strict=True):
        number, edge = filled[place]
        if _runs_along(edge, lines[line], float(reach[place])):
            along[number].add(lines[line].number)
    for _, group in sorted(along.items()):
        if len(group) > 1:
            yield sorted(group)


def _is_line(strand: Strand) -> bool:
    return isinstance(strand.primitive, Segment) and strand.length > 0.0


def _runs_along(edge: Edge, line: Strand, within: float) -> bool:
    """Whether a short edge lies on a line that is longer than it."""
    start, end = line.ends
    aside = max(abs(cross(end - start, point - start)) for point in edge) / line.length
    inside = all(abs(parameter_on_line(point, start, end) - HALF_WAY) < 1.0 for point in edge)
    return aside <= within and inside and abs(edge[1] - edge[0]) <= CORNER_OF_LINE * line.length


def cover_bodies(sheet: Sheet, bodies: Sequence[Body], pins_of_fill: Sequence[Collection[int]]) -> list[Body]:
    """Join the bodies that a solid fill covers or a disc carries into one, and add those that have no linework."""
    pool = _Pool(bodies)
    for number, fill in enumerate(sheet.fills):
        pins = pins_of_fill[number]
        if fill.solid and len(pins) > 1:
            edges = list(_edges(fill.outlines))
            own = [body for body in pool.on(pins) if _drawn_along(sheet, pool.parts[body], pins, edges)]
            pool.join(own, pins, fills=(number,))
    for number, disc in enumerate(sheet.sites.discs):
        if disc.rim:
            continue
        own = [body for body, part in pool.parts.items() if not part.frame and _belongs_to(sheet, part, disc)]
        if (disc.holds or own) and not _is_bubble([pool.parts[body] for body in own], disc):
            pool.join(own, disc.holds, discs=(number,))
    return list(pool.parts.values())


class _Pool:
    """Bodies by number, some of which are being made into one."""

    def __init__(self, bodies: Sequence[Body]) -> None:
        self.parts = dict(enumerate(bodies))
        self._fresh = count(len(bodies))
        self._at_pin: defaultdict[int, set[int]] = defaultdict(set)
        for number, body in self.parts.items():
            for pin in body.pins:
                self._at_pin[pin].add(number)

    def on(self, pins: Iterable[int]) -> list[int]:
        """The moving bodies on some pins."""
        return sorted({body for pin in pins for body in self._at_pin[pin] if not self.parts[body].frame})

    def join(
        self, own: Iterable[int], pins: Iterable[int], *, fills: tuple[int, ...] = (), discs: tuple[int, ...] = ()
    ) -> None:
        """Make one body of some, with further pins."""
        parts = [self.parts.pop(number) for number in own]
        made = Body(
            strands=tuple(sorted(index for body in parts for index in body.strands)),
            pins=tuple(sorted({*pins, *(pin for body in parts for pin in body.pins)})),
            frame=False,
            fills=fills + tuple(each for body in parts for each in body.fills),
            discs=discs + tuple(each for body in parts for each in body.discs),
            wheels=tuple(each for body in parts for each in body.wheels),
        )
        number = next(self._fresh)
        self.parts[number] = made
        for pin in made.pins:
            self._at_pin[pin] = {each for each in self._at_pin[pin] if each in self.parts} | {number}


def _edges(outlines: Sequence[Sequence[Point]]) -> Iterator[Edge]:
    for outline in outlines:
        yield from zip(outline, [*outline[1:], *outline[:1]], strict=True)


def _drawn_along(sheet: Sheet, body: Body, pins: Collection[int], edges: Sequence[Edge]) -> bool:
    """Whether a body is a fill's outline, or all its pins are corners of it and its strands run along its edges."""
    radius = max(sheet.pins[pin].radii[-1] for pin in pins)
    within = max(sheet.tolerance.close(radius), sheet.tolerance.rim(radius))

    def along(index: int) -> bool:
        strand = sheet.strands[index]
        points = (*strand.ends, *strand.corners)
        return all(min(distance_to_segment(point, *edge) for edge in edges) <= within for point in points)

    outlines = [index for index in body.strands if sheet.strands[index].closed and sheet.strands[index].corners]
    if any(along(index) for index in outlines):
        return True
    return set(body.pins) <= set(pins) and all(along(index) for index in body.strands)


def _is_bubble(inside: Sequence[Body], disc: Disc) -> bool:
    """Whether a ring is drawn round a whole linkage: two or more links between pins lie inside it."""
    return sum(len(body.pins) > 1 and set(body.pins) <= set(disc.holds) for body in inside) > 1


def _belongs_to(sheet: Sheet, body: Body, disc: Disc) -> bool:
    """Whether a body is drawn on a disc: it ends on its rim, or lies inside with no pin that the disc does not hold."""
    ring = disc.ring
    within = sheet.tolerance.rim(ring.radius)
    ends = [abs(end - ring.centre) for index in body.strands for end in sheet.strands[index].ends]
    corners = [abs(corner - ring.centre) for index in body.strands for corner in sheet.strands[index].corners]
    if any(abs(away - ring.radius) <= within for away in ends):
        return True
    inside = all(away <= ring.radius for away in (*ends, *corners))
    return bool(ends or corners) and inside and set(body.pins) <= set(disc.holds)
