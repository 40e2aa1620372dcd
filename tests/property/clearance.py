"""Whether a drafter could draw a random linkage clearly: no mark lies on another by accident."""

from __future__ import annotations

import cmath
import dataclasses
import math
from collections.abc import Iterator
from itertools import combinations, pairwise
from typing import NamedTuple

from fixtures.drafting import FRAME, Habit, Line, Outline, Part, Plan, draft

__all__ = ["is_clear"]

CLOSEST_PASS = 15.0
"""How near a line may pass a pin that is not its own, or that it does not end at."""
CLOSEST_END = 8.0
"""How near an end without a pin may lie to a line of another group."""
NARROWEST = math.radians(12)
"""The smallest angle between two lines from one place."""
SAME_PLACE = 1e-6
CHORDS = 6
"""Straight pieces that stand for a bent side of a slot."""


class _Group(NamedTuple):
    """The lines of one thing drawn: its pins, and whether its lines may pass them at any distance.

    ``shut`` says that no line of anything else may cross it but one that ends at its pins.
    """

    name: str
    pins: frozenset[str]
    loose: bool
    shut: bool
    lines: tuple[tuple[complex, complex], ...]


def is_clear(plan: Plan, radius: float) -> bool:
    """Whether the plan's marks keep clear of one another, whatever the habit (but a frame line from pin to pin)."""
    groups = _groups(plan, radius)
    return not (
        any(_covers_a_pin(part, plan) for part in plan.parts if part.shape == "contour")
        or any(_passes_too_near(group, plan) for group in groups)
        or any(_in_the_way(one, other, plan) for one, other in combinations(groups, 2))
    )


def _covers_a_pin(part: Part, plan: Plan) -> bool:
    """Whether a cut plate lies over a pin of others, which would be one of its holes: its corners turn round it."""
    corners = [plan.points[pin] for pin in part.pins]
    others = [at for pin, at in plan.points.items() if pin not in part.pins]
    return any(
        abs(sum(cmath.phase((end - at) / (start - at)) for start, end in pairwise([*corners, corners[0]]))) > math.pi
        for at in others
    )


def _groups(plan: Plan, radius: float) -> list[_Group]:
    """The linework of the plan, cut parts as plain polygons and guides as one line each."""
    parts = tuple(
        dataclasses.replace(part, shape="polyline") if part.shape == "contour" else part for part in plan.parts
    )
    marks = draft(dataclasses.replace(plan, parts=parts, notes=()), Habit(radius=radius, frame="ring layer"))
    lines: dict[str, list[tuple[complex, complex]]] = {}
    for mark in marks:
        if isinstance(mark, (Line, Outline)):
            lines.setdefault(mark.part, []).extend(_pieces(mark))
    return [_group(name, tuple(drawn), plan) for name, drawn in lines.items()]


def _pieces(mark: Line | Outline) -> Iterator[tuple[complex, complex]]:
    if isinstance(mark, Line):
        yield mark.start, mark.end
        return
    points = (*mark.points, mark.points[0]) if mark.closed else mark.points
    for (start, end), bulge in zip(pairwise(points), mark.bulges or (0.0,) * len(points), strict=False):
        yield from pairwise(_bent(start, end, bulge))


def _bent(start: complex, end: complex, bulge: float) -> list[complex]:
    """Points on the arc of a bulge (the tangent of a quarter of its angle; DXF reference, LWPOLYLINE)."""
    if bulge == 0.0:
        return [start, end]
    centre = (start + end) / 2 + (end - start) * 1j * (1 - bulge**2) / (4 * bulge)
    angle = 4 * math.atan(bulge) / CHORDS
    return [centre + (start - centre) * cmath.exp(1j * angle * step) for step in range(CHORDS + 1)]


def _group(name: str, lines: tuple[tuple[complex, complex], ...], plan: Plan) -> _Group:
    kind, _, key = name.partition(" ")
    if kind in ("block", "guide", "slot"):
        return _Group(name, frozenset({key}), loose=True, shut=kind != "guide", lines=lines)
    if kind in ("barrel", "rod"):
        return _Group(name, frozenset(key.split("-")), loose=True, shut=kind == "barrel", lines=lines)
    pins = set(plan.part(name).pins)
    pins |= {slide.pin for slide in plan.slides if slide.guide == name}
    pins |= {slot.pin for slot in plan.slots if slot.owner == name}
    return _Group(name, frozenset(pins), loose=False, shut=False, lines=lines)


def _passes_too_near(group: _Group, plan: Plan) -> bool:
    """Whether a line of the group passes near a pin that is not its own, or near one of its own that it misses."""
    for name, point in plan.points.items():
        if name in group.pins and group.loose:
            continue
        for start, end in group.lines:
            distance = _distance(point, start, end)
            if distance < CLOSEST_PASS and not (name in group.pins and distance < SAME_PLACE):
                return True
    return False


def _in_the_way(one: _Group, other: _Group, plan: Plan) -> bool:
    if _belong_together(one, other, plan):
        return False
    shared = one.pins & other.pins
    shut = (one.shut or other.shut) and not shared
    excused = [plan.points[name] for name in (shared if one.loose or other.loose else plan.points)]
    reach = CLOSEST_PASS if one.loose or other.loose else SAME_PLACE
    for start, end in one.lines:
        for other_start, other_end in other.lines:
            if _narrow(start, end, other_start, other_end):
                return True
            if shut and _cross(start, end, other_start, other_end):
                return True
            if _ends_near(start, end, other_start, other_end, excused, reach):
                return True
    return False


def _belong_together(one: _Group, other: _Group, plan: Plan) -> bool:
    """A block and its guide, a barrel and its rod, a slot and the link it is cut in."""
    names = {one.name, other.name}
    for slide in plan.slides:
        guide = f"guide {slide.key}" if slide.guide == FRAME else slide.guide
        if names == {f"block {slide.key}", guide}:
            return True
    slots = any(
        names in ({f"slot {slot.pin}", slot.owner}, {f"slot {slot.pin}", f"block {slot.pin}"}) for slot in plan.slots
    )
    return slots or any(names == {f"barrel {each.key}", f"rod {each.key}"} for each in plan.telescopes)


def _narrow(start: complex, end: complex, other_start: complex, other_end: complex) -> bool:
    """Whether two lines leave one place in nearly the same direction."""
    for first, last in ((start, end), (end, start)):
        for other_first, other_last in ((other_start, other_end), (other_end, other_start)):
            if abs(first - other_first) < SAME_PLACE:
                return abs(cmath.phase((last - first) / (other_last - other_first))) < NARROWEST
    return False


def _ends_near(
    start: complex, end: complex, other_start: complex, other_end: complex, excused: list[complex], reach: float
) -> bool:
    """Whether an end of one line lies near the other line, but not within reach of an excused place."""
    for point, first, last in (
        (start, other_start, other_end),
        (end, other_start, other_end),
        (other_start, start, end),
        (other_end, start, end),
    ):
        if _distance(point, first, last) < CLOSEST_END and all(abs(point - place) > reach for place in excused):
            return True
    return False


def _distance(point: complex, start: complex, end: complex) -> float:
    along = (point - start) / (end - start)
    off = abs(along.imag) if 0 <= along.real <= 1 else min(abs(along), abs(along - 1))
    return off * abs(end - start)


def _cross(start: complex, end: complex, other_start: complex, other_end: complex) -> bool:
    one = [((point - start) / (end - start)).imag for point in (other_start, other_end)]
    other = [((point - other_start) / (other_end - other_start)).imag for point in (start, end)]
    return one[0] * one[1] < 0 and other[0] * other[1] < 0
