"""Blocks, rams, barrels and sleeves with their guides: what slides on what (reading rule 6).

Done before the linework is welded: which lines are guides, what must not weld and which landings do not count. Once
there are bodies, slide_contacts.py says which of them slide on one another.
"""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Collection, Iterator, Mapping, Sequence
from collections.abc import Set as AbstractSet
from dataclasses import dataclass

import numpy as np

from dxfcheck.reading.lines.landing import Landing
from dxfcheck.reading.lines.pins import PinSite
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.slides.apart import beside_the_guide, inside, never_weld
from dxfcheck.reading.slides.boxes import Anchor, Box, Hatched, anchors_of
from dxfcheck.reading.slides.guides import STROKES, Guide, choose_guide
from dxfcheck.reading.slides.held import held_by, off_guides
from dxfcheck.reading.slides.nests import with_their_own
from dxfcheck.reading.slides.pistons import pistons_of
from dxfcheck.reading.slides.rails import Rail, rails_of
from dxfcheck.reading.slides.sleeves import sleeves_of, sleeves_of_bars
from dxfcheck.reading.slides.slide import Slide
from dxfcheck.tolerances.shapes import GUIDE_LEVEL_OF_WIDTH

__all__ = ["Slide", "Slides", "anchors_of", "find_slides"]


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
    known = {*frame, *hatched.sides}
    boxes, rails, parts = with_their_own(boxes, rails, known, sheet.pins)
    anchors = anchors_of(boxes, sheet)
    slides, unguided = _choose(boxes, rails, anchors, known, hatched, strokes, parts)
    guides = {strand for slide in slides for strand in slide.guide.strands}
    idle = [box for box in boxes if box.number in hatched.numbers and guides.isdisjoint(box.strands)]
    idle = [box for box in idle if not any(slide.box.number == box.number for slide in slides)]
    sleeves = list(_sleeves(sheet, boxes, idle, known, guides, landings))
    anchors.extend([] for _ in sleeves)
    pistons = list(_pistons(sheet, boxes, len(boxes) + len(sleeves), known, landings))
    anchors.extend(ends for _, _, ends in pistons)
    slides.extend([*(slide for slide, _ in sleeves), *(slide for slide, _, _ in pistons)])
    rails = [*rails, *(near for _, near in sleeves), *(near for _, near, _ in pistons)]
    every = {slide.box.number: slide.guide.strands for slide in slides}
    ending: defaultdict[int, set[int]] = defaultdict(set)
    for landing in landings:
        if landing.how in {"end", "corner"} and landing.strand not in strokes:
            ending[landing.pin].add(landing.strand)
    held = [
        landing
        for box in [*(slide.box for slide in slides), *unguided]
        for landing in held_by(box, every.get(box.number, ()), anchors[box.number], sheet, ending)
    ]
    barrels = [slide.box for slide in slides if slide.is_barrel]
    return Slides(
        slides=tuple(_by_its_pins(slide) for slide in slides),
        unguided=tuple(unguided),
        frame=dict(_frame_rails(slides)),
        never=frozenset(never_weld(slides, rails, anchors, sheet, _with(ending, held), known)),
        dropped=frozenset((*_dropped(slides, unguided, rails), *off_guides(slides, boxes, sheet, landings))),
        passing=frozenset(_passing(slides, landings, sheet.pins, known)),
        inside=frozenset(strand for box in barrels for strand in inside(box, anchors[box.number], sheet)),
        landings=tuple(held),
    )


def _with(ending: Mapping[int, Collection[int]], landings: Sequence[Landing]) -> dict[int, set[int]]:
    """The strands that end at each pin, with those of further landings."""
    every = {site: set(strands) for site, strands in ending.items()}
    for landing in landings:
        every.setdefault(landing.pin, set()).add(landing.strand)
    return every


def _choose(
    boxes: Sequence[Box],
    rails: Sequence[Sequence[Rail]],
    anchors: Sequence[Sequence[Anchor]],
    known: AbstractSet[int],
    hatched: Hatched,
    strokes: Collection[int],
    parts: Collection[int],
) -> tuple[list[Slide], list[Box]]:
    """The boxes with their guides, and those round a pin that fit none; ``parts`` are boxes that belong to others.

    The smallest box comes first: what a piston slides in is its cylinder and no block itself.
    """
    slides: list[Slide] = []
    unguided: list[Box] = []
    containers: set[int] = set()
    # The end of a barrel runs through a thick rod that enters it.
    walls = {strand for box in boxes for strand in box.strands}
    for drawn, near, ends in zip(boxes, rails, anchors, strict=True):
        if drawn.number in parts or not containers.isdisjoint(drawn.strands):
            continue
        held = [each for each in ends if each[0] not in strokes and each[0] not in hatched.sides]
        sleeve = drawn.number in hatched.numbers and not drawn.sites and not held
        fixed = sleeve or (drawn.open and not known.isdisjoint(drawn.strands))
        box = drawn._replace(frame=True) if fixed else drawn
        fit = near
        if sleeve:
            fit = [rail for rail in near if rail.strand not in hatched.sides]
        elif not box.sites:
            fit = [rail for rail in near if rail.how != "through" or rail.strand not in walls]
        rivals = choose_guide(box, fit, known, () if sleeve else hatched.axes.get(box.number, ()))
        if rivals is None or not _plain_enough(box, rivals.guide, held, known):
            if len(box.sites) == 1:
                unguided.append(box)
            continue
        slides.append(Slide(box, rivals.guide, rivals.others))
        containers.update(rivals.guide.strands)
    return slides, [box for box in unguided if containers.isdisjoint(box.strands)]


def _sleeves(
    sheet: Sheet,
    boxes: Sequence[Box],
    bars: Sequence[Box],
    known: Collection[int],
    guides: Collection[int],
    landings: Sequence[Landing],
) -> Iterator[tuple[Slide, list[Rail]]]:
    """Pairs of frame lines, or of hatched ``bars``, that guide nothing else, with a rod between them.

    They are numbered on after the boxes.
    """
    pinned = {landing.strand for landing in landings if landing.how != "across"}
    ends, targets, _, _ = sheet.touching.as_pairs()
    on_pins = np.zeros(len(sheet.strands), dtype=np.bool_)
    on_pins[list(pinned)] = True
    used = {*guides, *pinned, *np.unique(targets[on_pins[ends // 2]]).tolist()}
    used.update(strand for box in boxes for strand in box.strands)
    found = [*sleeves_of(sheet, known, used), *sleeves_of_bars(bars)]
    number = len(boxes)
    for box, near in zip(found, rails_of(found, sheet.linework, sheet.touching, landings, known), strict=True):
        through = [rail for rail in near if rail.how == "through" and rail.axis == 0]
        rivals = choose_guide(box, through, known, ())
        if rivals is not None:
            yield Slide(box._replace(number=number), rivals.guide, rivals.others), through
            number += 1


def _pistons(
    sheet: Sheet, boxes: Sequence[Box], first: int, known: Collection[int], landings: Sequence[Landing]
) -> Iterator[tuple[Slide, list[Rail], list[Anchor]]]:
    """Single lines across between two frame lines, with a rod; numbered from ``first`` on."""
    used = {strand for box in boxes for strand in box.strands}
    used.update(landing.strand for landing in landings if landing.how != "across")
    found = list(pistons_of(sheet, known, used))
    near = rails_of(found, sheet.linework, sheet.touching, landings, ())
    for number, (box, rails, ends) in enumerate(zip(found, near, anchors_of(found, sheet), strict=True), first):
        walls = [rail for rail in rails if rail.axis == 0 and rail.how == "beside" and rail.strand in known]
        rivals = choose_guide(box, walls, known, ())
        if rivals is not None:
            yield Slide(box._replace(number=number), rivals.guide, ()), walls, ends


def _plain_enough(box: Box, guide: Guide, anchors: Sequence[Anchor], known: Collection[int]) -> bool:
    """Whether a box slides: it holds one pin, or is frame, or part of a link that is welded to it elsewhere.

    One that holds two pins, as a bar does, slides only on frame lines that its sides lie on.
    """
    if len(box.sites) > 1:
        side = box.halves[1 - guide.axis]
        level = max(box.slack, GUIDE_LEVEL_OF_WIDTH * side)
        on_sides = all(abs(abs(rail.offset) - side) <= level and rail.how == "beside" for rail in guide.rails)
        return bool(guide.rails) and on_sides and all(rail.strand in known for rail in guide.rails)
    if box.sites or box.frame:
        return True
    return any(strand not in guide.strands for strand, _ in anchors)


def _by_its_pins(slide: Slide) -> Slide:
    """A block with two pins is a link that slides, called by its pins as other links are."""
    return slide._replace(box=slide.box._replace(sites=()), rivals=()) if len(slide.box.sites) > 1 else slide


def _frame_rails(slides: Sequence[Slide]) -> Iterator[tuple[int, str]]:
    for slide in slides:
        if slide.box.frame:
            for strand in slide.box.strands:
                yield strand, "a sleeve on the frame"
        if slide.guide.frame and slide.guide.how != STROKES:
            for strand in slide.guide.strands:
                yield strand, "guide of a slide on the frame"


def _dropped(
    slides: Sequence[Slide], unguided: Sequence[Box], rails: Sequence[Sequence[Rail]]
) -> Iterator[tuple[int, int]]:
    """A box's own lines do not land on its pin (it holds it), nor do the lines it slides along."""
    for box in [*(slide.box for slide in slides), *unguided]:
        for site in box.sites:
            for strand in box.strands:
                yield strand, site
    for slide in slides:
        along = beside_the_guide(rails[slide.box.number], slide.guide)
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
