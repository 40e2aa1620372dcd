"""Corners of links that bear a label as pins do, but have no ring: read as welded, perhaps meant as pins."""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence
from typing import NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import Segment, Text
from dxfcheck.geometry import Point, angle_between_lines
from dxfcheck.reading.observations.seen import Seen, about_strand
from dxfcheck.reading.reading import Observation
from dxfcheck.reading.texts.labels import PinNames
from dxfcheck.reading.texts.text_places import texts_near
from dxfcheck.tolerances.linework import RIGHT_ANGLE_DEGREES
from dxfcheck.tolerances.sheet import LABEL_LENGTH, LABEL_REACH_IN_DIAMETERS, LABEL_REACH_IN_HEIGHTS, LABELLED_PINS

__all__ = ["observe_missing_rings"]


class _Corner(NamedTuple):
    """Two straight lines of one link that end at one place without a pin."""

    at: Point
    strand: int
    other: int


def observe_missing_rings(seen: Seen, texts: Sequence[Text], names: PinNames) -> Iterator[Observation]:
    """Corners of links beside a text that is written as the labels of pins are and names no pin."""
    free = _labels_left(texts, names)
    corners = _corners(seen) if free else []
    if not corners:
        return
    radius = min(seen.sites.pins[site].radius for site in names.labels)
    reaches = np.array([_reach(radius, text) for text in free])
    places = np.array([corner.at for corner in corners], dtype=np.complex128)
    pins = np.array([seen.sites.pins[site].at for site in sorted(names.names)], dtype=np.complex128)
    nearest: dict[int, float] = {}
    for number, _, distance in zip(*(each.tolist() for each in texts_near(free, reaches, pins, pins)), strict=True):
        nearest[number] = min(distance, nearest.get(number, math.inf))
    found: dict[int, tuple[float, int]] = {}
    near = texts_near(free, reaches, places, places)
    for number, place, distance in zip(*(each.tolist() for each in near), strict=True):
        if distance < nearest.get(number, math.inf):
            found[number] = min((distance, place), found.get(number, (math.inf, place)))
    for number, (distance, place) in sorted(found.items()):
        corner = corners[place]
        yield about_strand(
            seen,
            "missing-ring",
            seen.strands[corner.strand],
            corner.at,
            amount=distance,
            limit=float(reaches[number]),
            detail=free[number].content.strip(),
            also=(seen.handles[corner.other],),
        )


def _labels_left(texts: Sequence[Text], names: PinNames) -> list[Text]:
    """Texts that name no pin, but are written as the labels are: a letter first, on their layer, of their height."""
    if len(names.labels) < LABELLED_PINS:
        return []
    used = set(names.labels.values())
    written = {(texts[number].source.layer, f"{texts[number].height:.2g}") for number in used}
    spoken = {texts[number].content.strip() for number in used}
    if not all(content[:1].isalpha() for content in spoken):
        return []
    left = [text for number, text in enumerate(texts) if number not in used]
    return [
        text
        for text in left
        if len(content := text.content.strip()) <= LABEL_LENGTH
        and content.isalnum()
        and content[0].isalpha()
        and content not in spoken
        and (text.source.layer, f"{text.height:.2g}") in written
    ]


def _corners(seen: Seen) -> list[_Corner]:
    """Each corner once."""
    landed = {(each.strand, each.end) for each in seen.bodies.landings}
    found = []
    for index, number in sorted(seen.body_of.items()):
        strand = seen.strands[index]
        if number not in seen.body_names or index in seen.shaped or not isinstance(strand.primitive, Segment):
            continue
        for end in (0, 1):
            if (index, end) in landed:
                continue
            other = next((each for each in seen.gaps.met(index, end) if _turns(seen, index, end, each)), None)
            if other is not None and other > index and seen.body_of.get(other) == number:
                found.append(_Corner(strand.ends[end], index, other))
    return found


def _turns(seen: Seen, strand: int, end: int, other: int) -> bool:
    """Whether another straight line ends where this one does, in another direction."""
    one, two = seen.strands[strand], seen.strands[other]
    if not isinstance(two.primitive, Segment):
        return False
    meets = min(abs(each - one.ends[end]) for each in two.ends) <= seen.tolerance.on_line
    angle = angle_between_lines(one.ends[1] - one.ends[0], two.ends[1] - two.ends[0])
    return meets and angle > math.radians(RIGHT_ANGLE_DEGREES)


def _reach(radius: float, text: Text) -> float:
    return max(LABEL_REACH_IN_DIAMETERS * 2.0 * radius, LABEL_REACH_IN_HEIGHTS * text.height)
