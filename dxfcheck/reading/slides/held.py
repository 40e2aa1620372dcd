"""Which landings a block changes: rods trimmed at it land on its pin, its guide does not (reading rule 6)."""

from __future__ import annotations

from collections.abc import Collection, Iterator, Mapping, Sequence

from dxfcheck.geometry import cross
from dxfcheck.reading.lines.landing import Landing
from dxfcheck.reading.lines.linework import Strand
from dxfcheck.reading.lines.pins import PinSite
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.slides.boxes import Anchor, Box, anchors_of
from dxfcheck.reading.slides.slide import Slide

__all__ = ["held_by", "off_guides", "trimmed_rods"]


def held_by(
    box: Box,
    guide: Collection[int],
    anchors: Sequence[Anchor],
    sheet: Sheet,
    ending: Mapping[int, Collection[int]],
) -> Iterator[Landing]:
    """The box on its own pins; and rods trimmed at the box that aim at its pin, where no link ends on it.

    ``guide`` are the strands of its guide, ``ending`` the strands that end at each pin.
    """
    own = {*box.strands, *guide}
    for site in box.sites:
        yield Landing(box.strands[0], site, "corner", None, 0.0)
        if not own.issuperset(ending.get(site, ())):
            continue
        for strand, end in anchors:
            offset = _aim(sheet.strands[strand], end, sheet.pins[site])
            if strand not in own and offset is not None and offset < sheet.pins[site].radius:
                yield Landing(strand, site, "end", end, offset)


def trimmed_rods(boxes: Sequence[Box], sheet: Sheet, landings: Sequence[Landing]) -> Iterator[Landing]:
    """Rods from a pin to a box round another pin that they aim at: links, whatever else they run along or stand on."""
    blocks = [box for box in boxes if box.sites]
    if not blocks:
        return
    landed = {(each.strand, each.end): each.pin for each in landings if each.how == "end"}
    for box, anchors in zip(blocks, anchors_of(blocks, sheet), strict=True):
        for strand, end in anchors:
            other = landed.get((strand, 1 - end))
            if other is None or other in box.sites or (strand, end) in landed:
                continue
            for site in box.sites:
                offset = _aim(sheet.strands[strand], end, sheet.pins[site])
                if offset is not None and offset < sheet.pins[site].radius:
                    yield Landing(strand, site, "end", end, offset)


def _aim(strand: Strand, end: int, pin: PinSite) -> float | None:
    """How far a straight strand, run on past an end, passes a pin's centre; None where it points away from it."""
    piece = strand.pieces[0] if end == 0 else strand.pieces[-1]
    tip = strand.ends[end]
    outward = tip - max(piece.start, piece.end, key=lambda point: abs(point - tip))
    ahead = pin.at - tip
    if not outward or (ahead * outward.conjugate()).real <= 0.0:
        return None
    return abs(cross(outward, ahead)) / abs(outward)


def off_guides(
    slides: Sequence[Slide], boxes: Sequence[Box], sheet: Sheet, landings: Sequence[Landing]
) -> Iterator[tuple[int, int]]:
    """Outlines that hold a block's pin since they lie round it, and carry its guide: a yoke is not pinned there."""
    held: dict[int, set[int]] = {}
    for each in landings:
        if each.how == "corner" and each.end is None:
            held.setdefault(each.pin, set()).add(each.strand)
    for slide in slides:
        at_pin = {strand for site in slide.box.sites for strand in held.get(site, ())}.difference(slide.box.strands)
        if not at_pin:
            continue
        carried = set(slide.guide.strands)
        carried.update(strand for box in boxes if not carried.isdisjoint(box.strands) for strand in box.strands)
        if not at_pin <= carried:
            carried |= _joined(slide, sheet)
        for site in slide.box.sites:
            for strand in at_pin & carried:
                if not _bends_at(sheet.strands[strand], sheet.pins[site]):
                    yield strand, site


def _joined(slide: Slide, sheet: Sheet) -> set[int]:
    """Strands that hang together with a guide, end to end."""
    seen = set(slide.box.strands)
    found: set[int] = set()
    waiting = list(slide.guide.strands)
    while waiting:
        number = waiting.pop()
        if number in seen:
            continue
        seen.add(number)
        found.add(number)
        for end in range(len(sheet.strands[number].ends)):
            waiting.extend(sheet.touching.met(number, end))
    return found


def _bends_at(strand: Strand, pin: PinSite) -> bool:
    return any(abs(corner - pin.at) <= pin.radii[-1] for corner in strand.corners)
