"""What looks wrong about slides: blocks without a guide, with two, or drawn past the end of theirs."""

from __future__ import annotations

import math
from collections.abc import Iterator, Mapping, Sequence

import numpy as np

from dxfcheck.geometry import Point
from dxfcheck.reading.lines.pins import PinSite
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.shapes.contact import Contact, Oddity
from dxfcheck.reading.slides.boxes import Box
from dxfcheck.reading.slides.slide import Slide
from dxfcheck.reading.slides.slides import Slides
from dxfcheck.tolerances.linework import GUIDE_TURN_DEGREES
from dxfcheck.tolerances.shapes import GUIDE_BESIDE_OF_WIDTH, GUIDE_LOOKED_FOR_IN_BLOCKS

__all__ = ["slide_oddities"]


def slide_oddities(
    slides: Slides, contacts: Sequence[tuple[Slide, Contact]], body_of: Mapping[int, int], sheet: Sheet
) -> Iterator[Oddity]:
    """All of them, in the order of the boxes."""
    for box in slides.unguided:
        yield _unguided(box, body_of, sheet)
    joined = {slide.box.number for slide, _ in contacts}
    for slide in slides.slides:
        if slide.box.number not in joined and slide.box.sites and slide.box.strands[0] in body_of:
            yield _welded(slide, body_of, sheet.pins)
    for slide, contact in contacts:
        if slide.rivals:
            yield _two_guides(slide, contact, body_of)
        yield from _past_the_end(slide, contact, body_of)


def _unguided(box: Box, body_of: Mapping[int, int], sheet: Sheet) -> Oddity:
    beside, short = _nearest_parallel(box, sheet)
    expected = "expected a guide line through it or parallel to a side, no further off than half the block's width"
    amount, limit = beside if beside is not None else (short, None)
    if beside is not None:
        found = "the nearest line parallel to a side is {amount} from that side"
    elif short is not None:
        found = "no line runs through it or along it, the nearest one in its way ends {amount} before it"
    else:
        found = "no line runs through it or along it"
    return Oddity(
        "block-without-guide",
        sheet.pins[box.sites[0]].at,
        f"{found}; {expected}",
        amount=amount,
        limit=limit,
        site=box.sites[0],
        body=body_of.get(box.strands[0]),
        strands=box.strands,
    )


def _nearest_parallel(box: Box, sheet: Sheet) -> tuple[tuple[float, float] | None, float | None]:
    """How far from a side the nearest straight piece parallel to it runs, and how far it might; None without one.

    And how far before the box the nearest one ends that would run through it or along it; None without one.
    """
    linework = sheet.linework
    starts, ends = linework.piece_starts - box.centre, linework.piece_ends - box.centre
    own = np.isin(linework.piece_strand, box.strands)
    reach = GUIDE_LOOKED_FOR_IN_BLOCKS * math.hypot(*box.halves)
    within = math.sin(math.radians(GUIDE_TURN_DEGREES))
    beside: list[tuple[float, float]] = []
    short: list[float] = []
    for axis in (0, 1):
        first, last = starts * box.axes[axis].conjugate(), ends * box.axes[axis].conjugate()
        half, across = box.halves[axis], box.halves[1 - axis]
        level = np.abs(last.imag - first.imag) <= within * np.abs(last - first)
        fits = level & (np.abs(last - first) >= 2.0 * half) & ~own
        gap = np.maximum(np.minimum(first.real, last.real) - half, -half - np.maximum(first.real, last.real))
        aside = np.abs((first.imag + last.imag) / 2.0) - across
        limit = 2.0 * across * GUIDE_BESIDE_OF_WIDTH
        beside.extend((away, limit) for away in aside[fits & (gap < 0.0) & (aside > 0.0) & (aside <= reach)].tolist())
        short.extend(gap[fits & (gap >= 0.0) & (gap <= reach) & (aside <= limit)].tolist())
    return min(beside, default=None), min(short, default=None)


def _welded(slide: Slide, body_of: Mapping[int, int], pins: Sequence[PinSite]) -> Oddity:
    box = slide.box
    return Oddity(
        "block-without-guide",
        pins[box.sites[0]].at,
        "its guide is welded to it by other linework, so it cannot slide; expected the guide on another link",
        site=box.sites[0],
        body=body_of.get(box.strands[0]),
        strands=(*box.strands, *slide.guide.strands),
        case="welded",
    )


def _two_guides(slide: Slide, contact: Contact, body_of: Mapping[int, int]) -> Oddity:
    other = slide.rivals[0]
    turned = "across" if other.axis != slide.guide.axis else "along"
    return Oddity(
        "two-guides",
        contact.at,
        f"two guides fit the block, where one was expected: one that {slide.guide.how}, at "
        f"{_degrees(contact.direction)}, and one {turned} it that {other.how}, {{amount}} from its middle; read as "
        "sliding along the first",
        amount=abs(other.offset),
        site=contact.site,
        body=body_of.get(slide.box.strands[0]),
        strands=(*slide.box.strands, *slide.guide.strands, *other.strands),
    )


def _past_the_end(slide: Slide, contact: Contact, body_of: Mapping[int, int]) -> Iterator[Oddity]:
    if contact.room is None:
        return
    short = min(contact.room)
    if short < -slide.box.slack:
        yield Oddity(
            "past-guide-end",
            contact.at,
            "the block stands {amount} past the end of its guide; expected it wholly on the guide",
            amount=-short,
            limit=slide.box.slack,
            site=contact.site,
            body=body_of.get(slide.box.strands[0]),
            strands=contact.strands,
        )


def _degrees(direction: Point) -> str:
    return f"{math.degrees(math.atan2(direction.imag, direction.real)):.4g} degrees"
