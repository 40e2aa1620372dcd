"""Pitch circles about pins, which of them mesh, and what touches their rims (reading rule 6).

Glossary
    wheel       a pitch circle about a pin; one drawn twice is one wheel
    mesh        two wheels that are tangent, from outside or one inside the other (an annulus)
    miss        how far two wheels are from being tangent: a gap, or an overlap where it is negative
"""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterator, Sequence
from collections.abc import Set as AbstractSet
from typing import NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import Ring, Source
from dxfcheck.geometry import Point
from dxfcheck.reading.lines.nearness import near_pairs
from dxfcheck.reading.lines.pins import PinSite
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.reading.shapes.contact import Oddity
from dxfcheck.tolerances.linework import RIM_OF_RADIUS
from dxfcheck.tolerances.shapes import NEAR_TANGENT_OF_RADIUS, ROLLING_OF_RADIUS, TANGENT_OF_RADIUS

__all__ = ["Mesh", "Wheel", "choose_meshes", "find_meshes", "place_wheels", "rim_touches"]


_Axis = tuple[str, int]
"""What a wheel turns about: its pin, or itself where it has none."""


class Wheel(NamedTuple):
    """A pitch circle: ``rings`` are indices of primitives, the first of them the ring itself.

    ``site`` is its pin, and ``at`` that pin's place; None, and the ring's own centre, where it has none.
    """

    number: int
    rings: tuple[int, ...]
    site: int | None
    at: Point
    radius: float
    source: Source


class Mesh(NamedTuple):
    """Two wheels (numbers) that are tangent, or nearly: centres ``apart``, ``expected`` apart to be tangent."""

    first: int
    second: int
    outside: bool
    apart: float
    expected: float
    smaller: float

    @property
    def miss(self) -> float:
        """The gap between the two circles, negative where they overlap."""
        return self.apart - self.expected if self.outside else self.expected - self.apart

    def exact(self, tolerance: Tolerance) -> bool:
        """Whether they were drawn tangent."""
        return abs(self.miss) <= max(tolerance.t, TANGENT_OF_RADIUS * self.smaller)

    def rolls(self, tolerance: Tolerance) -> bool:
        """Whether they are near enough tangent to be read as rolling."""
        return abs(self.miss) <= max(tolerance.t, ROLLING_OF_RADIUS * self.smaller)


def place_wheels(
    pitch_rings: Sequence[tuple[int, Ring]], pins: Sequence[PinSite], tolerance: Tolerance
) -> tuple[list[Wheel], list[Oddity]]:
    """Each pitch ring about its pin: within 2 % of its radius, with an oddity if further off than t."""
    near = _nearest_pins(pitch_rings, pins, tolerance)
    wheels: list[Wheel] = []
    oddities: list[Oddity] = []
    at_place: defaultdict[int, list[int]] = defaultdict(list)
    for place, (index, ring) in enumerate(pitch_rings):
        if place not in near:
            wheels.append(Wheel(len(wheels), (index,), None, ring.centre, ring.radius, ring.source))
            continue
        site, away = near[place]
        if away > tolerance.t:
            oddities.append(_off_centre(index, ring, site, away, tolerance))
        twice = [each for each in at_place[site] if abs(wheels[each].radius - ring.radius) <= tolerance.t]
        if twice:
            first = wheels[twice[0]]
            wheels[twice[0]] = first._replace(rings=(*first.rings, index))
        else:
            at_place[site].append(len(wheels))
            wheels.append(Wheel(len(wheels), (index,), site, pins[site].at, ring.radius, ring.source))
    return wheels, oddities


def _nearest_pins(
    pitch_rings: Sequence[tuple[int, Ring]], pins: Sequence[PinSite], tolerance: Tolerance
) -> dict[int, tuple[int, float]]:
    """The pin nearest to the centre of each ring (by place), if near enough, and how far off it is."""
    centres = np.array([ring.centre for _, ring in pitch_rings], dtype=np.complex128)
    places = np.array([pin.at for pin in pins], dtype=np.complex128)
    reach = np.array([tolerance.rim(ring.radius) for _, ring in pitch_rings])
    found: dict[int, tuple[int, float]] = {}
    for place, site in zip(*(each.tolist() for each in near_pairs(centres, reach, places, places)), strict=True):
        away = abs(pitch_rings[place][1].centre - pins[site].at)
        if place not in found or away < found[place][1]:
            found[place] = (site, away)
    return found


def _off_centre(index: int, ring: Ring, site: int, away: float, tolerance: Tolerance) -> Oddity:
    detail = (
        f"the pitch circle of radius {ring.radius:g} is {{amount}} off the centre of its pin; read as about the pin"
    )
    return Oddity(
        "off-centre-ring", ring.centre, detail, away, tolerance.t, site=site, rings=(index,), severity="warning"
    )


def find_meshes(wheels: Sequence[Wheel]) -> list[Mesh]:
    """All pairs of wheels on different centres that are within 15 % of the smaller radius of being tangent.

    Each wheel is held against those whose boxes overlap its own in x: near-linear for wheels spread over a sheet.
    """
    if len(wheels) < 2:
        return []
    centres = np.array([wheel.at for wheel in wheels], dtype=np.complex128)
    radii = np.array([wheel.radius for wheel in wheels], dtype=np.float64)
    reach = (1.0 + NEAR_TANGENT_OF_RADIUS) * radii
    order = np.argsort(centres.real - reach, kind="stable")
    left, right = (centres.real - reach)[order], (centres.real + reach)[order]
    stops = np.searchsorted(left, right, side="right")
    found = []
    for place in range(order.size - 1):
        others = order[place + 1 : stops[place]]
        if not others.size:
            continue
        own = order[place]
        apart = np.abs(centres[others] - centres[own])
        smaller = np.minimum(radii[others], radii[own])
        outside, inside = radii[others] + radii[own], np.abs(radii[others] - radii[own])
        miss = np.minimum(np.abs(apart - outside), np.abs(apart - inside))
        for hit in np.nonzero((miss <= NEAR_TANGENT_OF_RADIUS * smaller) & (apart > RIM_OF_RADIUS * smaller))[0]:
            first, second = sorted((int(own), int(others[hit])))
            found.append(_mesh(wheels[first], wheels[second]))
    return sorted(mesh for mesh in found if not _same_pin(wheels[mesh.first], wheels[mesh.second]))


def _same_pin(one: Wheel, other: Wheel) -> bool:
    return one.site is not None and one.site == other.site


def _mesh(one: Wheel, other: Wheel) -> Mesh:
    apart = abs(other.at - one.at)
    outside, inside = one.radius + other.radius, abs(one.radius - other.radius)
    from_outside = abs(apart - outside) <= abs(apart - inside)
    expected = outside if from_outside else inside
    return Mesh(one.number, other.number, from_outside, apart, expected, min(one.radius, other.radius))


def choose_meshes(
    meshes: Sequence[Mesh], wheels: Sequence[Wheel], tolerance: Tolerance
) -> tuple[list[Mesh], list[Mesh]]:
    """The meshes that roll, and those that miss by too much although one of the wheels rolls on nothing else.

    Of the wheels about one pin a wheel meshes with one from outside and with one annulus at most: in a train that
    comes back to its first axis the two stages lie in different planes, and what nearly fits across them means nothing.
    Two planets beside one another nearly touch, too, but each rolls on its sun.
    """
    taken: set[tuple[int, _Axis, bool]] = set()
    between: defaultdict[tuple[_Axis, _Axis, bool], list[Mesh]] = defaultdict(list)
    rolling: list[Mesh] = []
    missing: list[Mesh] = []
    for mesh in sorted(meshes, key=lambda each: (abs(each.miss) / each.smaller, each)):
        one, other = _axis(wheels[mesh.first]), _axis(wheels[mesh.second])
        known = between[min(one, other), max(one, other), mesh.outside]
        sides = ((mesh.first, other, mesh.outside), (mesh.second, one, mesh.outside))
        if not taken.isdisjoint(sides) or _are_tooth_circles(mesh, known, wheels, tolerance):
            continue
        taken.update(sides)
        if mesh.rolls(tolerance):
            rolling.append(mesh)
            known.append(mesh)
        else:
            missing.append(mesh)
    engaged = {wheel for mesh in rolling for wheel in (mesh.first, mesh.second)}
    return sorted(rolling), sorted(mesh for mesh in missing if not engaged.issuperset((mesh.first, mesh.second)))


def _are_tooth_circles(mesh: Mesh, known: Sequence[Mesh], wheels: Sequence[Wheel], tolerance: Tolerance) -> bool:
    """Whether two circles that nearly touch are the tip and root circles of wheels on the same pins that do mesh."""
    if mesh.exact(tolerance):
        return False
    on_axis: defaultdict[_Axis, list[float]] = defaultdict(list)
    for other in known:
        for number in (other.first, other.second):
            on_axis[_axis(wheels[number])].append(wheels[number].radius)
    return all(
        any(
            abs(radius - wheels[number].radius) <= NEAR_TANGENT_OF_RADIUS * radius
            for radius in on_axis[_axis(wheels[number])]
        )
        for number in (mesh.first, mesh.second)
    )


def _axis(wheel: Wheel) -> _Axis:
    return ("pin", wheel.site) if wheel.site is not None else ("ring", wheel.number)


def rim_touches(
    wheels: Sequence[Wheel], sheet: Sheet, at_pin: AbstractSet[tuple[int, int]]
) -> list[dict[int, tuple[int, ...]]]:
    """For each wheel the strands with an end or corner on its rim, and the ends (0, 1) and corners (-1) there.

    An end that lands on a pin (``at_pin``: strand, end) is there for the pin and not named.
    """
    touched: list[dict[int, tuple[int, ...]]] = [{} for _ in wheels]
    ends, corners = _drawn_points(sheet)
    for wheel, strand, end in _on_rims(wheels, [*ends, *corners], sheet):
        if strand not in sheet.ring_strands:
            before = touched[wheel].get(strand, ())
            touched[wheel][strand] = before if (strand, end) in at_pin else (*before, end)
    return touched


CORNER = -1


def _drawn_points(sheet: Sheet) -> tuple[list[tuple[int, int, Point]], list[tuple[int, int, Point]]]:
    """Ends and corners of all strands: strand, number of the end, place."""
    strands = sheet.strands
    ends = [(strand.number, end, point) for strand in strands for end, point in enumerate(strand.ends)]
    return ends, [(strand.number, CORNER, point) for strand in strands for point in strand.corners]


def _on_rims(
    wheels: Sequence[Wheel], points: Sequence[tuple[int, int, Point]], sheet: Sheet
) -> Iterator[tuple[int, int, int]]:
    """Wheel, strand and end of each point on a rim; the reach is that of an end that meets an arc."""
    centres = np.array([wheel.at for wheel in wheels], dtype=np.complex128)
    radii = np.array([wheel.radius for wheel in wheels], dtype=np.float64)
    places = np.array([point for _, _, point in points], dtype=np.complex128)
    which, place = near_pairs(centres, (1.0 + RIM_OF_RADIUS) * radii + sheet.tolerance.t, places, places)
    gaps = np.abs(np.abs(places[place] - centres[which]) - radii[which]) if place.size else np.zeros(0)
    close = gaps <= RIM_OF_RADIUS * radii[which] + sheet.tolerance.t
    for wheel, point, gap in zip(which[close].tolist(), place[close].tolist(), gaps[close].tolist(), strict=True):
        strand, end, _ = points[point]
        if gap <= sheet.tolerance.arc(wheels[wheel].radius, sheet.strands[strand].length):
            yield wheel, strand, end
