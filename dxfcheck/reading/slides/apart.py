"""What must not weld although it meets: a box, its guide, and what hangs on one of them (reading rule 6)."""

from __future__ import annotations

import math
from collections.abc import Collection, Iterable, Iterator, Mapping, Sequence

from dxfcheck.geometry import angle_between_lines
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.slides.boxes import Anchor, Box
from dxfcheck.reading.slides.guides import ENDS_INSIDE, Guide
from dxfcheck.reading.slides.rails import Rail
from dxfcheck.reading.slides.slide import Slide
from dxfcheck.tolerances.linework import GUIDE_TURN_DEGREES

__all__ = ["beside_the_guide", "inside", "never_weld"]


def never_weld(
    slides: Sequence[Slide],
    rails: Sequence[Sequence[Rail]],
    anchors: Sequence[Sequence[Anchor]],
    sheet: Sheet,
    ending: Mapping[int, Collection[int]],
    known: Collection[int],
) -> Iterator[tuple[int, int]]:
    """Pairs of strands, both ways round, that slide on one another or belong to parts that do.

    ``ending`` are the strands that end at each pin, ``known`` those known to be frame.
    """
    links = {strand for strands in ending.values() for strand in strands}
    for slide in slides:
        own = anchors[slide.box.number]
        apart = {*slide.guide.strands, *beside_the_guide(rails[slide.box.number], slide.guide)}
        pairs = [(strand, other) for strand in slide.box.strands for other in apart]
        if slide.guide.frame:
            pairs.extend(_in_line(slide.guide, links, sheet))
            if not slide.box.frame:
                pairs.extend(_on_frame(slide.box, known, sheet))
        for strand, end in own:
            if strand not in apart:
                of_guide = _belongs_to_guide(slide, strand, end, ending, known, sheet)
                pairs.extend((strand, other) for other in (slide.box.strands if of_guide else apart))
        for one, other in pairs:
            yield one, other
            yield other, one


def beside_the_guide(rails: Iterable[Rail], guide: Guide) -> list[int]:
    """Strands that run along a box beside its guide: rails of a pair that are not the nearest ones."""
    return [rail.strand for rail in rails if rail.axis == guide.axis and rail.how == "beside"]


def inside(box: Box, anchors: Sequence[Anchor], sheet: Sheet) -> Iterator[int]:
    """Strands that meet a box from within: the piston at the end of a rod, or section strokes."""
    for number in dict.fromkeys(strand for strand, _ in anchors):
        if _is_inside(box, number, sheet):
            yield number


def _is_inside(box: Box, number: int, sheet: Sheet) -> bool:
    strand = sheet.strands[number]
    return bool(strand.ends) and all(box.holds(point) for point in (*strand.ends, *strand.corners))


def _in_line(guide: Guide, links: Collection[int], sheet: Sheet) -> Iterator[tuple[int, int]]:
    """A guide on the frame and links that its ends lie on, as at a dead centre."""
    for strand in guide.strands:
        for end in range(len(sheet.strands[strand].ends)):
            for touch in sheet.touching.at(strand, end):
                if touch.strand in links:
                    yield strand, touch.strand


def _on_frame(box: Box, known: Collection[int], sheet: Sheet) -> Iterator[tuple[int, int]]:
    """A box that slides on the frame and other frame linework that its corners lie on."""
    for strand in box.strands:
        for end in range(len(sheet.strands[strand].ends)):
            for touch in sheet.touching.at(strand, end):
                if touch.strand in known:
                    yield strand, touch.strand


def _belongs_to_guide(
    slide: Slide,
    strand: int,
    end: int,
    ending: Mapping[int, Collection[int]],
    known: Collection[int],
    sheet: Sheet,
) -> bool:
    """Whether a strand that ends at a box is part of what the box slides on or in: frame, a stem, a piston."""
    box, guide = slide.box, slide.guide
    if _is_inside(box, strand, sheet):
        return guide.how == ENDS_INSIDE
    if strand in known:
        return guide.frame and not box.frame
    if any(each in guide.strands for each in sheet.touching.met(strand, 1 - end)):
        # It stands on the guide, as a hatch stroke beside the box does.
        return True
    own = {strand, *box.strands}
    held = any(not own.issuperset(ending.get(site, ())) for site in box.sites)
    lands = any(strand in ending.get(site, ()) for site in box.sites)
    on_both = any(each in guide.strands for each in sheet.touching.met(strand, end))
    return held and not lands and on_both and _leads_off(slide, strand, end, ending, sheet)


def _leads_off(slide: Slide, strand: int, end: int, ending: Mapping[int, Collection[int]], sheet: Sheet) -> bool:
    """Whether a strand that starts where a box meets its guide leads away from the box.

    One in line with the guide does not; where the guide runs through the box, a link does not that stands on the frame.
    """
    box, guide = slide.box, slide.guide
    piece = sheet.strands[strand].pieces[0 if end == 0 else -1]
    along = box.axes[guide.axis]
    if angle_between_lines(piece.end - piece.start, along) <= math.radians(GUIDE_TURN_DEGREES):
        return False
    if abs(guide.offset) >= box.halves[1 - guide.axis] - box.slack:
        far = box.place(sheet.strands[strand].ends[1 - end])[1 - guide.axis] - guide.offset
        return abs(far) > box.slack and far * guide.offset > 0.0
    return not guide.frame or not any(strand in strands for strands in ending.values())
