"""Obrounds, straight and curved, among the linework: what slots and bars are drawn as (reading rule 6)."""

from __future__ import annotations

import cmath
import math
from abc import ABC, abstractmethod
from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from typing import TypeGuard

from dxfcheck.drawing.primitives import Arc, Path, Segment
from dxfcheck.geometry import Point, angle_between_lines, cross, dot, unit
from dxfcheck.reading.lines.linework import Strand
from dxfcheck.reading.lines.pins import PinSite
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.reading.lines.touches import Touches
from dxfcheck.tolerances.linework import RIGHT_ANGLE_DEGREES, RIM_OF_RADIUS

__all__ = ["Channel", "CurvedSlot", "Obround", "find_curved_slots", "find_obrounds"]


@dataclass(frozen=True, slots=True)
class Channel(ABC):
    """A band of one width along a centre line, with round ends: a slot or a bar.

    ``strands`` are what it is drawn with, ``centres`` those of its half arcs, ``radius`` half its width. Its centre
    line runs from the first centre to the second.
    """

    strands: tuple[int, ...]
    centres: tuple[Point, Point]
    radius: float

    @property
    @abstractmethod
    def length(self) -> float:
        """Length of its centre line."""

    @property
    def middle(self) -> Point | None:
        """Centre of the circle that its centre line lies on; None for a straight one."""
        return None

    @abstractmethod
    def tangent_at(self, point: Point) -> Point:
        """Unit direction of its centre line where a place is nearest to it, from the first end to the second."""

    @abstractmethod
    def along(self, point: Point) -> float:
        """How far along its centre line the foot of a place lies from the first end; negative before it."""

    @abstractmethod
    def aside(self, point: Point) -> float:
        """How far off its centre line (run on past its ends) a place lies, positive to the left of the tangent."""

    def reach(self, point: Point) -> tuple[float, float]:
        """How far along its centre line the first and the second end's centre lie from a place; negative beyond."""
        along = self.along(point)
        return along, self.length - along

    def room(self, point: Point, direction: Point) -> tuple[float, float]:
        """The reach of a place against and along a direction, as Contact.room has it."""
        first, second = self.reach(point)
        return (first, second) if dot(direction, self.tangent_at(point)) >= 0.0 else (second, first)

    def contains(self, point: Point) -> bool:
        """Whether a place lies inside its outline."""
        first, second = self.reach(point)
        if first >= 0.0 and second >= 0.0:
            return abs(self.aside(point)) < self.radius
        return min(abs(point - centre) for centre in self.centres) < self.radius

    def holds(self, pin: PinSite) -> bool:
        """Whether a pin lies on its centre line, between the centres of its half arcs."""
        within = RIM_OF_RADIUS * self.radius
        return abs(self.aside(pin.at)) <= self.radius / 2 and min(self.reach(pin.at)) >= -within

    def ends_at(self, pin: PinSite, tolerance: Tolerance) -> bool:
        """Whether a pin sits at the centre of one of its half arcs."""
        return min(abs(pin.at - centre) for centre in self.centres) <= self.end_slack(tolerance)

    def end_slack(self, tolerance: Tolerance) -> float:
        """How far from the centre of a half arc a pin may lie and still sit there."""
        return max(tolerance.t, min(tolerance.close(self.radius), RIM_OF_RADIUS * self.radius))


@dataclass(frozen=True, slots=True)
class Obround(Channel):
    """Two parallel lines and two half arcs."""

    @property
    def length(self) -> float:
        """Distance of the centres of its half arcs."""
        return abs(self.centres[1] - self.centres[0])

    def tangent_at(self, point: Point) -> Point:  # noqa: ARG002 - the same everywhere
        """Unit direction from its first to its second end."""
        return unit(self.centres[1] - self.centres[0])

    def along(self, point: Point) -> float:
        """How far the foot of a place lies from the first end."""
        return dot(self.centres[1] - self.centres[0], point - self.centres[0]) / self.length

    def aside(self, point: Point) -> float:
        """How far off its axis a place lies."""
        return cross(self.centres[1] - self.centres[0], point - self.centres[0]) / self.length


@dataclass(frozen=True, slots=True)
class CurvedSlot(Channel):
    """Two concentric arcs and two half arcs; its centre line has the radius ``bend`` about ``pole``.

    ``centres`` are in counter-clockwise order along the centre line.
    """

    pole: Point
    bend: float

    @property
    def length(self) -> float:
        """Length of its centre line."""
        return self.bend * self._turn

    @property
    def _turn(self) -> float:
        return cmath.phase((self.centres[1] - self.pole) / (self.centres[0] - self.pole)) % math.tau

    @property
    def middle(self) -> Point:
        """Centre of the circle that its centre line lies on."""
        return self.pole

    def tangent_at(self, point: Point) -> Point:
        """Unit direction of its centre line at the angle of a place, counter-clockwise; ValueError at its pole."""
        return unit(point - self.pole) * 1j

    def along(self, point: Point) -> float:
        """How far along the arc the foot of a place lies from the first end; half the rest of the circle is beyond."""
        half = self._turn / 2.0
        turn = cmath.phase((point - self.pole) / (self.centres[0] - self.pole))
        return self.bend * ((turn - half + math.pi) % math.tau + half - math.pi)

    def aside(self, point: Point) -> float:
        """How far inside its centre line a place lies; negative outside."""
        return self.bend - abs(point - self.pole)


def find_obrounds(strands: Sequence[Strand], touching: Touches) -> list[Obround]:
    """All obrounds, of one closed polyline with bulges or of two lines and two half arcs."""
    found = []
    for strand in strands:
        if isinstance(strand.primitive, Path) and strand.closed and len(strand.pieces) == 4:
            arcs = [piece for piece in strand.pieces if isinstance(piece, Arc)]
            lines = [piece for piece in strand.pieces if isinstance(piece, Segment)]
            if len(arcs) == 2 and _make_an_obround(arcs, lines):
                found.append(Obround((strand.number,), (arcs[0].centre, arcs[1].centre), arcs[0].radius))
        elif isinstance(strand.primitive, Arc) and _is_half(strand.primitive):
            for members in _rounds_of_four(strand, strands, touching, Segment):
                caps = [arc for arc in (strands[number].primitive for number in members[::2]) if isinstance(arc, Arc)]
                lines = [piece for number in members[1::2] for piece in strands[number].pieces if _is_segment(piece)]
                if _make_an_obround(caps, lines):
                    found.append(Obround(members, (caps[0].centre, caps[1].centre), caps[0].radius))
    return found


def find_curved_slots(strands: Sequence[Strand], touching: Touches, tolerance: Tolerance) -> list[CurvedSlot]:
    """All curved slots, of one closed polyline with bulges or of four arcs."""
    found: list[CurvedSlot] = []
    for strand in strands:
        if isinstance(strand.primitive, Path) and strand.closed and len(strand.pieces) == 4:
            arcs = [piece for piece in strand.pieces if isinstance(piece, Arc)]
            if len(arcs) == 4:
                both = (
                    _curved_slot((strand.number,), arcs[each::2], arcs[1 - each :: 2], tolerance) for each in (0, 1)
                )
                found.extend(slot for slot in both if slot is not None)
        elif isinstance(strand.primitive, Arc) and _is_half(strand.primitive):
            for members in _rounds_of_four(strand, strands, touching, Arc):
                arcs = [arc for arc in (strands[number].primitive for number in members) if isinstance(arc, Arc)]
                slot = _curved_slot(members, arcs[::2], arcs[1::2], tolerance)
                if slot is not None:
                    found.append(slot)
    return found


def _curved_slot(
    members: tuple[int, ...], caps: Sequence[Arc], sides: Sequence[Arc], tolerance: Tolerance
) -> CurvedSlot | None:
    """The slot that two half arcs close between two concentric arcs, or None where they do not fit."""
    inner, outer = sorted(sides, key=lambda arc: arc.radius)
    pole, bend, radius = (inner.centre + outer.centre) / 2, (inner.radius + outer.radius) / 2, caps[0].radius
    within = max(tolerance.rim(radius), tolerance.close(radius))
    fits = (
        all(_is_half(cap) for cap in caps)
        and abs(caps[1].radius - radius) <= within
        and abs(inner.centre - outer.centre) <= within
        and abs((outer.radius - inner.radius) / 2 - radius) <= within
        and all(abs(abs(cap.centre - pole) - bend) <= within for cap in caps)
        and abs(inner.sweep - outer.sweep) * inner.radius <= 2 * within
    )
    if not fits or abs(caps[0].centre - caps[1].centre) <= within:
        return None
    first, second = sorted((cap.centre for cap in caps), key=lambda centre: abs(centre - outer.start))
    return CurvedSlot(members, (first, second), radius, pole, bend)


def _is_half(arc: Arc) -> bool:
    """Whether each end of an arc is within 2 % of its radius of where half a turn ends."""
    return abs(arc.sweep - math.pi) <= 2 * RIM_OF_RADIUS


def _is_segment(piece: Segment | Arc) -> TypeGuard[Segment]:
    return isinstance(piece, Segment)


def _make_an_obround(arcs: Sequence[Arc], lines: Sequence[Segment]) -> bool:
    alike = abs(arcs[0].radius - arcs[1].radius) <= RIM_OF_RADIUS * arcs[0].radius
    along = arcs[1].centre - arcs[0].centre
    parallel = all(
        angle_between_lines(line.end - line.start, along) <= math.radians(RIGHT_ANGLE_DEGREES) for line in lines
    )
    return alike and parallel and along != 0 and all(_is_half(arc) for arc in arcs)


def _rounds_of_four(
    first: Strand, strands: Sequence[Strand], touching: Touches, side: type[Segment | Arc]
) -> Iterator[tuple[int, int, int, int]]:
    """Cap, side, cap, side of closed rounds in which this half arc comes first and the sides are of one kind."""

    def sides_at(strand: Strand, end: int) -> list[int]:
        near = touching.at(strand.number, end)
        return [touch.strand for touch in near if isinstance(strands[touch.strand].primitive, side)]

    for one in sides_at(first, 0):
        for other in sides_at(first, 1):
            far = {
                touch.strand
                for line in (one, other)
                for end in (0, 1)
                for touch in touching.at(line, end)
                if touch.strand > first.number
            }
            for candidate in sorted(far - {one, other}):
                cap = strands[candidate]
                if one == other or not isinstance(cap.primitive, Arc):
                    continue
                if {one, other} <= {*sides_at(cap, 0), *sides_at(cap, 1)}:
                    yield first.number, one, candidate, other
