"""The axes of outlines that are bars by their form, and rings beside these axes (reading rule 4).

Glossary
    axis        the line about which a long outline is symmetric
    station     a hole, or a slot cut out, on the axis of a bar
"""

from __future__ import annotations

from collections.abc import Collection, Sequence
from itertools import pairwise
from typing import NamedTuple

from dxfcheck.geometry import Point, cross, dot, unit
from dxfcheck.reading.lines.pins import PinSite
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.reading.shapes.contours import Contour
from dxfcheck.reading.shapes.obrounds import Channel
from dxfcheck.tolerances.linework import BAR_LENGTH_OF_WIDTH

__all__ = ["Axis", "beside_axis", "is_on_axis", "long_axis"]


class Axis(NamedTuple):
    """The axis of a bar from end to end of its outline."""

    start: Point
    end: Point

    def aside(self, point: Point) -> float:
        """How far off the axis a place lies."""
        return abs(cross(unit(self.end - self.start), point - self.start))

    def overhangs(self, point: Point) -> tuple[float, float]:
        """How far a place lies from either end, along the axis."""
        along = unit(self.end - self.start)
        return dot(along, point - self.start), dot(along, self.end - point)


def long_axis(contour: Contour, tolerance: Tolerance, slender: float = BAR_LENGTH_OF_WIDTH) -> Axis | None:
    """The axis of an outline that is symmetric about it, and at least so many times as long as it is wide, or None."""
    middle, direction = _principal(contour.points)
    if direction == 0:
        return None
    offsets = [(point - middle) * direction.conjugate() for point in contour.points]
    low, high = min(each.real for each in offsets), max(each.real for each in offsets)
    width = max(each.imag for each in offsets) - min(each.imag for each in offsets)
    if high - low < slender * width:
        return None
    within = tolerance.close(high - low)
    mirrored = (middle + each.conjugate() * direction for each in offsets)
    if any(contour.clearance(point) > within for point in mirrored):
        return None
    return Axis(middle + low * direction, middle + high * direction)


def _principal(points: Sequence[Point]) -> tuple[Point, Point]:
    """The centroid of a polygon and the unit direction in which it is longest, 0 where it has no area or direction.

    Second moments of area by edges (any textbook of statics, from memory).
    """
    origin = points[0]
    area, first, square, size = 0.0, 0j, 0j, 0.0
    edges = [(one - origin, other - origin) for one, other in pairwise([*points, origin])]
    for one, other in edges:
        piece = cross(one, other)
        area += piece / 2.0
        first += piece * (one + other) / 6.0
        square += piece * (one * one + one * other + other * other) / 12.0
        size += abs(piece)
    if abs(area) <= 0.0 or not size:
        return origin, 0j
    centroid = first / area
    spread = (square - area * centroid * centroid) / area
    return origin + centroid, unit(spread**0.5) if spread else 0j


def is_on_axis(contour: Contour, pin: PinSite, others: Collection[PinSite], tolerance: Tolerance) -> bool:
    """Whether a pin and one more lie on the axis of an outline that is longer than it is wide."""
    axis = long_axis(contour, tolerance, 1.0) if others else None
    if axis is None:
        return False
    off = [axis.aside(each.at) / max(tolerance.rim(each.radius), tolerance.close(each.radius)) for each in others]
    return min(off) <= 1.0 and axis.aside(pin.at) <= max(tolerance.rim(pin.radius), tolerance.close(pin.radius))


def beside_axis(
    contour: Contour,
    sites: Sequence[int],
    voids: Sequence[Channel],
    pins: Sequence[PinSite],
    carried: Collection[int],
    tolerance: Tolerance,
) -> tuple[int, ...]:
    """Which pins in a bar are none of its holes: off its axis, carried by something else, and it has two stations.

    ``voids`` are slots cut out of the outline. The stations are two holes equally far from the ends, or a hole and a
    slot.
    """
    axis = long_axis(contour, tolerance) if len(sites) + len(voids) > 1 else None
    if axis is None:
        return ()
    on_axis = [site for site in sites if axis.aside(pins[site].at) <= tolerance.rim(pins[site].radius)]
    slotted = any(max(map(axis.aside, void.centres)) <= tolerance.rim(void.radius) for void in voids)
    length = abs(axis.end - axis.start)
    within = tolerance.close(length)
    overhangs = [axis.overhangs(pins[site].at) for site in on_axis]
    alike = any(abs(one[0] - other[1]) <= within for one in overhangs for other in overhangs if one[0] < length / 2)
    if not (alike and len(on_axis) > 1) and not (slotted and on_axis):
        return ()
    return tuple(site for site in sites if site not in on_axis and site in carried)
