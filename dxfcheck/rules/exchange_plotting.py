"""Rules on what is read but will not be on the print, and on what is on the print but cannot be read."""

from __future__ import annotations

from bisect import bisect_left
from collections import Counter, defaultdict
from collections.abc import Collection, Iterator, Sequence
from typing import NamedTuple

from dxfcheck.drawing.primitives import Ring, Segment
from dxfcheck.geometry import Point
from dxfcheck.rules.finding import Finding
from dxfcheck.rules.noticed import about_entities, linkage_handles
from dxfcheck.rules.observed import finding, of_linkages
from dxfcheck.rules.registry import rule
from dxfcheck.rules.settings_and_sources import CONSTRUCTION
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.rules.wording import place, plural
from dxfcheck.tolerances.drawing import NEVER_PLOTTED
from dxfcheck.tolerances.linework import RIM_OF_RADIUS

__all__: list[str] = []


@rule(
    "unplotted-linework",
    "warning",
    "A linkage on a layer that is not plotted",
    family="exchange",
    looks_for="Links, frame or pins on a layer that is set not to plot; lines between pins on the layer DEFPOINTS, "
    "which is never plotted and is not read as links, where one of the two pins has fewer than two links otherwise.",
    matters="Who reads the print sees another linkage than who reads the file; what lies on DEFPOINTS is left out of "
    "the count.",
    remedy="Move the linework to a layer that is plotted, or set the layer to plot.",
    settings=CONSTRUCTION,
    source="LAYER group code 290 (DXF Reference, from memory)",
)
def unplotted_linework(subject: RuleSubject) -> Iterator[Finding]:
    """Links on layers that are not plotted, a finding a layer; then links that were forgotten on DEFPOINTS."""
    layers = subject.sketch.unplotted
    if not layers:
        return
    sketch = subject.sketch
    handles = linkage_handles(subject)
    drawn: defaultdict[str, set[int]] = defaultdict(set)
    for shape in sketch.primitives:
        if shape.source.layer in layers and sketch.entities[shape.source.entity].handle in handles:
            drawn[shape.source.layer].add(shape.source.entity)
    for layer, numbers in sorted(drawn.items()):
        entities = [sketch.entities[number] for number in sorted(numbers)]
        count = plural(len(entities), "entity")
        message = f"{count} of the linkage on layer {layer}, which is not plotted: the print will not show them"
        remedy = "set the layer to plot, or move them to one that is plotted"
        yield about_entities("unplotted-linework", "warning", entities, message, remedy)
    forgotten = _forgotten(subject, drawn.keys())
    if forgotten:
        entities = [sketch.entities[segment.source.entity] for segment in forgotten]
        first = forgotten[0]
        count = plural(len(forgotten), "line")
        message = (
            f"{count} on layer {first.source.layer} not read, though pins are at both ends: the first from "
            f"{place(first.start)} to {place(first.end)}; that layer is never plotted"
        )
        remedy = "move them to the layer of the links if they are links"
        yield about_entities("unplotted-linework", "warning", entities, message, remedy)


@rule(
    "exploded-text",
    "note",
    "Labels exploded into lines",
    family="exchange",
    looks_for="Small strokes that are part of nothing, in heaps to one side of three pins or more and of half of all, "
    "on a sheet where no pin has a label.",
    matters="Lettering that was exploded into lines names no pin and states no drive.",
    remedy="Write the labels as text, or keep text as text when the drawing is exported.",
)
def exploded_text(subject: RuleSubject) -> Iterator[Finding]:
    """Lettering that is no text any more."""
    for seen in of_linkages(subject, "exploded-text"):
        near = f"{int(seen.amount or 0)} of {plural(int(seen.limit or 0), 'pin')}"
        message = f"small strokes stand beside {near} where labels would be: text exploded into lines is not read"
        yield finding(seen, "note", message, "write the labels as text, or export text as text")


class _Place(NamedTuple):
    """A ring that a line may end on: its centre, radius, how many links it carries, and whether it is fixed."""

    at: Point
    radius: float
    links: int
    fixed: bool


def _forgotten(subject: RuleSubject, read: Collection[str]) -> list[Segment]:
    """Lines on DEFPOINTS that run from pin to pin and are missed at one of them at least.

    On a sheet without a linkage: those that hang together at a ring.
    """
    shapes = subject.sketch.primitives
    lines = [
        shape
        for shape in shapes
        if isinstance(shape, Segment) and shape.source.layer.upper() == NEVER_PLOTTED and shape.source.layer not in read
    ]
    if not lines:
        return []
    pins = [pin for linkage, _ in subject.mechanisms for pin in linkage.pins]
    places = [_Place(pin.at, pin.radius, len(pin.links), pin.fixed) for pin in pins]
    if not pins:
        places = [_Place(shape.centre, shape.radius, 0, fixed=False) for shape in shapes if isinstance(shape, Ring)]
    places.sort(key=lambda each: each.at.real)
    joining = [(line, ends) for line in lines if (ends := _ends(places, line)) is not None]
    if pins:
        return [
            line
            for line, (one, other) in joining
            if min(one.links, other.links) < JOINED and not (one.fixed and other.fixed)
        ]
    carried = Counter(each for _, ends in joining for each in ends)
    return [line for line, ends in joining if max(carried[each] for each in ends) >= JOINED]


JOINED = 2
"""A pin that joins something has two links."""


def _ends(places: Sequence[_Place], line: Segment) -> tuple[_Place, _Place] | None:
    """The two rings that a line runs between, from centre or rim; None where an end is on none."""
    one, other = _on_ring(places, line.start), _on_ring(places, line.end)
    return (one, other) if one is not None and other is not None and one != other else None


def _on_ring(places: Sequence[_Place], end: Point) -> _Place | None:
    widest = (1.0 + RIM_OF_RADIUS) * max((each.radius for each in places), default=0.0)
    first = bisect_left(places, end.real - widest, key=lambda each: each.at.real)
    for each in places[first:]:
        if each.at.real > end.real + widest:
            return None
        away = abs(end - each.at)
        if min(away, abs(away - each.radius)) <= RIM_OF_RADIUS * each.radius:
            return each
    return None
