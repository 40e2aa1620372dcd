"""Weld marks: a small arc about the end of a line, with or without strokes in it (reading rule 4)."""

from __future__ import annotations

import math
from collections.abc import Collection, Iterator, Sequence

import numpy as np

from dxfcheck.drawing.primitives import Arc, Segment
from dxfcheck.reading.lines.landing import Landing
from dxfcheck.reading.lines.linework import Strand
from dxfcheck.reading.lines.nearness import near_pairs
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.shapes.contact import Oddity
from dxfcheck.tolerances.shapes import WELD_ARC_DEGREES, WELD_ARC_OF_LINE, WELD_ARC_OFF_CENTRE

__all__ = ["weld_marks", "welds_on_rings"]


def weld_marks(strands: Sequence[Strand], apart: Collection[int]) -> list[tuple[int, int, int]]:
    """Each arc that is a weld mark, with the line it stands at and that line's end (0 or 1).

    Those ``apart`` are arcs of rings, outlines and slots.
    """
    low, high = WELD_ARC_DEGREES
    arcs = [
        (strand.number, strand.primitive)
        for strand in strands
        if isinstance(strand.primitive, Arc)
        and strand.number not in apart
        and low <= math.degrees(strand.primitive.sweep) <= high
    ]
    lines = [strand for strand in strands if isinstance(strand.primitive, Segment)]
    if not arcs or not lines:
        return []
    centres = np.array([arc.centre for _, arc in arcs], dtype=np.complex128)
    reach = np.array([WELD_ARC_OFF_CENTRE * arc.radius for _, arc in arcs])
    ends = np.array([end for line in lines for end in line.ends], dtype=np.complex128)
    found = []
    for place, end in zip(*(each.tolist() for each in near_pairs(centres, reach, ends, ends)), strict=True):
        number, arc = arcs[place]
        line = lines[end // 2]
        if arc.radius <= WELD_ARC_OF_LINE * line.length:
            found.append((number, line.number, end % 2))
    return found


def welds_on_rings(
    sheet: Sheet, landings: Sequence[Landing], marks: Sequence[tuple[int, int, int]]
) -> Iterator[Oddity]:
    """Ends on the rim of a pin at which a weld mark stands: the ring belongs to that link, which is not read."""
    if not marks:
        return
    on_pin = {(each.strand, each.end): each for each in landings if each.how == "end"}
    for arc, line, end in marks:
        landing = on_pin.get((line, end))
        if landing is not None:
            detail = (
                "a weld mark stands where the link ends on the ring, so the ring is part of that link; "
                "that is not read: the link is taken to be pinned there like the others"
            )
            at = sheet.strands[line].ends[end]
            yield Oddity("weld-on-ring", at, detail, site=landing.pin, strands=(line, arc))
