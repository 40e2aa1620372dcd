"""Which bodies slide on one another, once the linework is welded (reading rule 6)."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence

from dxfcheck.geometry import Point
from dxfcheck.reading.lines.pins import PinSite
from dxfcheck.reading.shapes.contact import Contact, directed
from dxfcheck.reading.slides.boxes import Box
from dxfcheck.reading.slides.guides import ENDS_INSIDE, Guide
from dxfcheck.reading.slides.slide import Slide
from dxfcheck.reading.slides.slides import Slides

__all__ = ["slide_contacts"]


def slide_contacts(
    slides: Slides, body_of: Mapping[int, int], frame: int | None, pins: Sequence[PinSite]
) -> Iterator[tuple[Slide, Contact]]:
    """The contact of each slide whose two parts are different bodies; ``frame`` is the frame's body, if any."""
    for slide in slides.slides:
        box, guide = slide.box, slide.guide
        own = body_of.get(box.strands[0])
        other = frame if guide.frame else body_of.get(guide.strands[0])
        if own is None or other is None or own == other:
            continue
        axis = box.axes[guide.axis]
        direction = directed(axis)
        yield (
            slide,
            Contact(
                kind="slide",
                bodies=(other, own),
                at=_at(box, pins),
                direction=direction,
                why=f"{_what(box, guide)}: its guide {guide.how}",
                site=box.sites[0] if box.sites and not slide.is_barrel else None,
                strands=(*box.strands, *guide.strands),
                room=_room(slide, direction),
            ),
        )


def _at(box: Box, pins: Sequence[PinSite]) -> Point:
    return pins[box.sites[0]].at if box.sites else box.centre


def _what(box: Box, guide: Guide) -> str:
    if guide.how == ENDS_INSIDE and not guide.frame:
        return "a barrel and a rod that enters it"
    if box.frame:
        return "a fixed sleeve"
    return "a rectangle round the pin (a block)" if box.sites else "a rectangle without a pin (part of its link)"


def _room(slide: Slide, direction: Point) -> tuple[float, float] | None:
    """How far the box can go against and along the direction before its guide ends."""
    guide, half = slide.guide, slide.box.halves[slide.guide.axis]
    if guide.ends is None or slide.is_barrel:
        return None
    behind, ahead = -half - guide.ends[0], guide.ends[1] - half
    along = slide.box.axes[guide.axis]
    return (behind, ahead) if (along * direction.conjugate()).real > 0.0 else (ahead, behind)
