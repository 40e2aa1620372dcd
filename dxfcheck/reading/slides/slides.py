"""Blocks, rams, barrels and sleeves with their guides: what slides on what (reading rule 6).

Done before the linework is welded: which lines are guides, what must not weld and which landings do not count. Once
there are bodies, slide_contacts.py says which of them slide on one another.
"""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Collection, Iterator, Mapping, Sequence
from dataclasses import dataclass
from typing import NamedTuple

import numpy as np

from dxfcheck.geometry import cross
from dxfcheck.reading.lines.landing import Landing
from dxfcheck.reading.lines.linework import Strand
from dxfcheck.reading.lines.pins import PinSite
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.slides.boxes import Box, Hatched
from dxfcheck.reading.slides.guides import ENDS_INSIDE, STROKES, Guide, choose_guide
from dxfcheck.reading.slides.rails import Rail, rails_of
from dxfcheck.reading.slides.sleeves import sleeves_of

__all__ = ["Slide", "Slides", "anchors_of", "find_slides"]

Anchor = tuple[int, int]
"""A strand and the end of it (0 or 1) that meets a box."""


class Slide(NamedTuple):
    """A box and what it slides along, or what slides in it; ``rivals`` are other guides that fit as well."""

    box: Box
    guide: Guide
    rivals: tuple[Guide, ...]

    @property
    def is_barrel(self) -> bool:
        """Whether a rod enters the box and ends in it: a telescope."""
        return self.guide.how == ENDS_INSIDE and not self.guide.frame


@dataclass(frozen=True, slots=True, kw_only=True)
class Slides:
    """What slides, before there are bodies.

    ``unguided`` are boxes round a pin that fit no guide, each with the distance of the nearest parallel line and how
    far off one may lie (None where there is none). ``frame`` are strands that are frame as part of a frame guide;
    ``never`` pairs of strands that do not weld; ``dropped`` pairs of a strand and a site where no landing counts;
    ``landings`` those to add. ``passing`` are pairs of a rod that slides on the frame and a pin it runs over without
    being pinned there, and ``inside`` strands in barrels: the piston at the end of a rod.
    """

    slides: tuple[Slide, ...]
    unguided: tuple[Box, ...]
    frame: Mapping[int, str]
    never: frozenset[tuple[int, int]]
    dropped: frozenset[tuple[int, int]]
    landings: tuple[Landing, ...]
    passing: frozenset[tuple[int, int]]
    inside: frozenset[int]

    @property
    def boxes(self) -> list[Box]:
        """All boxes that are parts: those that slide, and those round a pin that fit no guide."""
        return [*(slide.box for slide in self.slides), *self.unguided]

    @property
    def groups(self) -> list[tuple[int, ...]]:
        """Strands that are one part whatever their ends do: the sides of a box, the pieces or rails of a guide."""
        return [*(box.strands for box in self.boxes), *(slide.guide.strands for slide in self.slides)]

    @property
    def strands(self) -> set[int]:
        """The strands of all boxes and guides."""
        guides = (strand for slide in self.slides for strand in slide.guide.strands)
        return {*guides, *(strand for box in self.boxes for strand in box.strands)}


def anchors_of(boxes: Sequence[Box], sheet: Sheet) -> list[list[Anchor]]:
    """For each box the ends of other strands that meet its sides."""
    found: list[list[Anchor]] = [[] for _ in boxes]
    owners: defaultdict[int, list[int]] = defaultdict(list)
    for each in boxes:
        for strand in each.strands:
            owners[strand].append(each.number)
    ends, targets, _, meets = sheet.touching.as_pairs()
    wanted = np.zeros(len(sheet.strands), dtype=np.bool_)
    wanted[list(owners)] = True
    chosen = meets & wanted[targets]
    for end, target in zip(ends[chosen].tolist(), targets[chosen].tolist(), strict=True):
        for box in owners[target]:
            if end // 2 not in boxes[box].strands:
                found[box].append((end // 2, end % 2))
    return found


def find_slides(
    sheet: Sheet,
    boxes: Sequence[Box],
    rails: Sequence[Sequence[Rail]],
    frame: Collection[int],
    hatched: Hatched,
    strokes: Collection[int],
    landings: Sequence[Landing],
) -> Slides:
    """Give each box its guide, and find the sleeves that are drawn as two lines.

    ``frame`` are the strands known to be frame, ``hatched`` the boxes on which hatch strokes stand, ``strokes`` the
    strokes themselves, ``landings`` those that count so far.
    """
    anchors = anchors_of(boxes, sheet)
    known = {*frame, *hatched.sides}
    slides, unguided = _choose(boxes, rails, anchors, known, hatched, strokes)
    guides = {strand for slide in slides for strand in slide.guide.strands}
    sleeves = list(_sleeves(sheet, boxes, known, guides, landings))
    slides.extend(slide for slide, _ in sleeves)
    rails = [*rails, *(near for _, near in sleeves)]
    anchors.extend([] for _ in sleeves)
    every = {slide.box.number: slide for slide in slides}
    ending: defaultdict[int, set[int]] = defaultdict(set)
    for landing in landings:
        if landing.how in {"end", "corner"}:
            ending[landing.pin].add(landing.strand)
    barrels = [slide.box for slide in slides if slide.is_barrel]
    return Slides(
        slides=tuple(slides),
        unguided=tuple(unguided),
        frame=dict(_frame_rails(slides)),
        never=frozenset(_never(slides, rails, anchors, sheet, ending)),
        dropped=frozenset(_dropped(slides, unguided, rails)),
        passing=frozenset(_passing(slides, landings, sheet.pins, known)),
        inside=frozenset(strand for box in barrels for strand in _inside(box, anchors[box.number], sheet)),
        landings=tuple(
            landing
            for box in [*(slide.box for slide in slides), *unguided]
            for landing in _held(box, every.get(box.number), anchors[box.number], sheet, ending)
        ),
    )


def _choose(
    boxes: Sequence[Box],
    rails: Sequence[Sequence[Rail]],
    anchors: Sequence[Sequence[Anchor]],
    known: Collection[int],
    hatched: Hatched,
    strokes: Collection[int],
) -> tuple[list[Slide], list[Box]]:
    """The boxes with their guides, and those round a pin that fit none.

    The smallest box comes first: what a piston slides in is its cylinder and no block itself.
    """
    slides: list[Slide] = []
    unguided: list[Box] = []
    containers: set[int] = set()
    for drawn, near, ends in zip(boxes, rails, anchors, strict=True):
        if len(drawn.sites) > 1 or not containers.isdisjoint(drawn.strands):
            continue
        held = [each for each in ends if each[0] not in strokes]
        sleeve = drawn.number in hatched.numbers and not drawn.sites and not held
        box = drawn._replace(frame=True) if sleeve else drawn
        rivals = choose_guide(box, near, known, () if sleeve else hatched.axes.get(box.number, ()))
        if rivals is None or not _plain_enough(box, rivals.guide, held):
            if box.sites:
                unguided.append(box)
            continue
        slides.append(Slide(box, rivals.guide, rivals.others))
        containers.update(rivals.guide.strands)
    return slides, [box for box in unguided if containers.isdisjoint(box.strands)]


def _sleeves(
    sheet: Sheet, boxes: Sequence[Box], known: Collection[int], guides: Collection[int], landings: Sequence[Landing]
) -> Iterator[tuple[Slide, list[Rail]]]:
    """Pairs of frame lines that guide nothing else, with a rod between them; numbered on after the boxes."""
    pinned = {landing.strand for landing in landings if landing.how != "across"}
    ends, targets, _, _ = sheet.touching.as_pairs()
    on_pins = np.zeros(len(sheet.strands), dtype=np.bool_)
    on_pins[list(pinned)] = True
    used = {*guides, *pinned, *np.unique(targets[on_pins[ends // 2]]).tolist()}
    used.update(strand for box in boxes for strand in box.strands)
    found = list(sleeves_of(sheet, known, used))
    number = len(boxes)
    for box, near in zip(found, rails_of(found, sheet.linework, sheet.touching, landings, known), strict=True):
        through = [rail for rail in near if rail.how == "through" and rail.axis == 0]
        rivals = choose_guide(box, through, known, ())
        if rivals is not None:
            yield Slide(box._replace(number=number), rivals.guide, rivals.others), through
            number += 1


def _plain_enough(box: Box, guide: Guide, anchors: Sequence[Anchor]) -> bool:
    """Whether a box without a pin slides: it is frame, or part of a link that is welded to it elsewhere."""
    if box.sites or box.frame:
        return True
    return any(strand not in guide.strands for strand, _ in anchors)


def _frame_rails(slides: Sequence[Slide]) -> Iterator[tuple[int, str]]:
    for slide in slides:
        if slide.box.frame:
            for strand in slide.box.strands:
                yield strand, "a sleeve on the frame"
        if slide.guide.frame and slide.guide.how != STROKES:
            for strand in slide.guide.strands:
                yield strand, "guide of a slide on the frame"


def _never(
    slides: Sequence[Slide],
    rails: Sequence[Sequence[Rail]],
    anchors: Sequence[Sequence[Anchor]],
    sheet: Sheet,
    ending: Mapping[int, Collection[int]],
) -> Iterator[tuple[int, int]]:
    """A box does not weld to its guide, nor a barrel to what its rod carries inside it.

    Nor does a guide weld to a link it is in line with: at a dead centre its end lies on a rod or a crank.
    """
    links = {strand for strands in ending.values() for strand in strands}
    for slide in slides:
        for guide in slide.guide.strands if slide.guide.frame else ():
            for end in range(len(sheet.strands[guide].ends)):
                for touch in sheet.touching.at(guide, end):
                    if touch.strand in links:
                        yield guide, touch.strand
                        yield touch.strand, guide
        along = {rail.strand for rail in rails[slide.box.number] if _same_kind(rail, slide.guide)}
        apart = {*slide.guide.strands, *along}
        if slide.guide.how == ENDS_INSIDE:
            apart.update(_inside(slide.box, anchors[slide.box.number], sheet))
        for one in slide.box.strands:
            for other in apart:
                yield one, other
                yield other, one


def _same_kind(rail: Rail, guide: Guide) -> bool:
    """Whether a rail runs along the box beside its guide: rails of a pair that are not the nearest ones."""
    return rail.axis == guide.axis and rail.how == "beside"


def _inside(box: Box, anchors: Sequence[Anchor], sheet: Sheet) -> Iterator[int]:
    """Strands that meet a box from within: the piston at the end of a rod."""
    for number in dict.fromkeys(strand for strand, _ in anchors):
        strand = sheet.strands[number]
        if strand.ends and all(box.holds(point) for point in (*strand.ends, *strand.corners)):
            yield number


def _dropped(
    slides: Sequence[Slide], unguided: Sequence[Box], rails: Sequence[Sequence[Rail]]
) -> Iterator[tuple[int, int]]:
    """A box's own lines do not land on its pin (it holds it), nor do the lines it slides along."""
    for box in [*(slide.box for slide in slides), *unguided]:
        for site in box.sites:
            for strand in box.strands:
                yield strand, site
    for slide in slides:
        along = [rail.strand for rail in rails[slide.box.number] if _same_kind(rail, slide.guide)]
        for site in slide.box.sites:
            rivals = (strand for rival in slide.rivals for strand in rival.strands)
            for strand in (*slide.guide.strands, *along, *rivals):
                yield strand, site


def _passing(
    slides: Sequence[Slide], landings: Sequence[Landing], pins: Sequence[PinSite], frame: Collection[int]
) -> Iterator[tuple[int, int]]:
    """A rod that slides in a fixed sleeve runs over the frame pins in its way: it could not slide if it were pinned."""
    rods = {strand for slide in slides if slide.box.frame for strand in slide.guide.strands}
    if not rods:
        return
    fixed = {each.pin for each in landings if each.strand in frame and each.how != "across"}
    fixed.update(pin.number for pin in pins if pin.frame is not None)
    for landing in landings:
        if landing.strand in rods and landing.how in {"through", "beside"} and landing.pin in fixed:
            yield landing.strand, landing.pin


def _held(
    box: Box, slide: Slide | None, anchors: Sequence[Anchor], sheet: Sheet, ending: Mapping[int, Collection[int]]
) -> Iterator[Landing]:
    """The box on its own pin; and rods trimmed at the box that aim at its pin, where no link ends on it.

    ``ending`` are the strands that end at each pin.
    """
    guide = set(slide.guide.strands) if slide is not None else set()
    for site in box.sites:
        yield Landing(box.strands[0], site, "corner", None, 0.0)
        own = {*box.strands, *guide}
        if not own.issuperset(ending.get(site, ())):
            continue
        for strand, end in anchors:
            offset = _aim(sheet.strands[strand], end, sheet.pins[site])
            if strand not in own and offset is not None and offset <= sheet.tolerance.rim(sheet.pins[site].radius):
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
