"""From sorted primitives to rigid bodies and their joints: the order in which the reading rules are applied.

Rings come first, then where ends land, outlines and slots, boxes and what runs along them, marks, frame symbols,
guides, and last welds and joints. Each step is a pure function of the ones before it.
"""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterator, Mapping, Sequence
from collections.abc import Set as AbstractSet
from dataclasses import dataclass, replace
from typing import NamedTuple

import numpy as np

from dxfcheck.reading.bodies.bodies import Bodies, Known, make_bodies
from dxfcheck.reading.frames.frame import FrameSymbols, find_frame_symbols, symbols_apart
from dxfcheck.reading.frames.marks import find_marks
from dxfcheck.reading.frames.weld_marks import weld_marks, welds_on_rings
from dxfcheck.reading.lines.landing import Landing
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.lines.sorting import Sorted
from dxfcheck.reading.parts.ground import find_ground, without_plinths
from dxfcheck.reading.parts.joints import find_joints
from dxfcheck.reading.shapes.contact import Contact, Oddity
from dxfcheck.reading.shapes.outlined import Outlined, find_outlined
from dxfcheck.reading.shapes.slots import Slot
from dxfcheck.reading.slides.boxes import hatched_boxes
from dxfcheck.reading.slides.held import trimmed_rods
from dxfcheck.reading.slides.slides import Slides, find_slides
from dxfcheck.settings import Settings

__all__ = ["Parts", "find_parts"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Parts:
    """What the linework was read as: marks, borders round whole links, frame, slides, slots, bodies and their joints.

    ``bodies`` are all rigid bodies, wheels without linework among them; ``contacts`` their joints other than pins.
    ``closed`` are strands of outlines and slots, whose ends meet one another; ``welds`` are arcs that are weld marks.
    """

    marks: Mapping[int, str]
    borders: frozenset[int]
    symbols: FrameSymbols
    frame: Mapping[int, str]
    slides: Slides
    slots: tuple[Slot, ...]
    bodies: Bodies
    contacts: tuple[Contact, ...]
    closed: frozenset[int]
    welds: frozenset[int]
    oddities: tuple[Oddity, ...]
    idle_rings: frozenset[int]
    landings: tuple[Landing, ...]


def find_parts(kinds: Sorted, sheet: Sheet, settings: Settings) -> Parts:
    """What each strand is, the bodies they make up, and how these slide and roll on one another."""
    by_layer = {
        number: f"frame by {kinds.frame_lines[index]}"
        for number, (index, _) in enumerate(kinds.lines)
        if index in kinds.frame_lines
    }
    outlined = find_outlined(sheet, by_layer.keys(), settings.part_blocks)
    lines = _roles(kinds, sheet, outlined, by_layer)
    slides = lines.slides
    dropped = slides.dropped | slides.passing
    slots = _without_blocks(outlined.slots, slides)
    dropped |= set(_stems(sheet, slots, outlined.landings, lines.frame.keys()))
    dropped |= set(_under_links(slides, outlined.landings, lines.frame.keys()))
    landings = [each for each in outlined.landings if (each.strand, each.pin) not in dropped]
    landings.extend(slides.landings)
    known = Known(
        outlines=outlined.bars,
        groups=[*outlined.groups, *slides.groups],
        never=slides.never | outlined.never | symbols_apart(lines.symbols, outlined.bars, sheet.touching),
        kept={*slides.strands, *(strand for slot in slots for strand in (*slot.strands, *slot.block)), *kinds.racks},
        runs_in=list(_runs_in(slides, slots)),
    )
    frame = {index: why for index, why in lines.frame.items() if index in lines.active}
    bodies = make_bodies(sheet, lines.active, landings, frame, known)
    stated = bool(settings.frame_pins)
    joints = find_joints(
        kinds, sheet, bodies.bodies, slides, slots, outlined.empty, lines.frame.keys(), frame_stated=stated
    )
    laid_over = tuple(sorted({*bodies.laid_over, *slides.passing}))
    welds = weld_marks(sheet.strands, sheet.ring_strands | outlined.closed)
    return Parts(
        marks=lines.marks,
        borders=outlined.borders,
        symbols=lines.symbols,
        frame=lines.frame,
        slides=slides,
        slots=tuple(slots),
        bodies=replace(bodies, bodies=joints.bodies, laid_over=laid_over),
        contacts=joints.contacts,
        closed=outlined.closed,
        oddities=(
            *(each for each in outlined.oddities if slides.strands.isdisjoint(each.strands)),
            *joints.oddities,
            *welds_on_rings(sheet, bodies.landings, welds),
        ),
        welds=frozenset(arc for arc, _, _ in welds),
        idle_rings=joints.idle_rings,
        landings=tuple(landings),
    )


def _stems(
    sheet: Sheet, slots: Sequence[Slot], landings: Sequence[Landing], frame: AbstractSet[int]
) -> Iterator[tuple[int, int]]:
    """Lines that end on a slot's side, and so on the rim of the pin that fills it, though they carry the slot.

    That is so where nothing else holds the slot and another link ends on the pin.
    """
    ending: defaultdict[int, list[Landing]] = defaultdict(list)
    for landing in landings:
        if landing.how in {"end", "corner"}:
            ending[landing.pin].append(landing)
    for slot in slots:
        own = {*slot.strands, *slot.block}
        if slot.pinned is not None or slot.block or not frame.isdisjoint(own):
            continue
        held = {
            (each.strand, end)
            for site in slot.sites
            for each in ending[site]
            for end in ((0, 1) if each.end is None else (each.end,))
            if end < len(sheet.strands[each.strand].ends)
            and any(touch.meets and touch.strand in own for touch in sheet.touching.at(each.strand, end))
        }
        for site in slot.sites:
            stems = {each.strand for each in ending[site] if (each.strand, each.end) in held}
            others = {each.strand for each in ending[site]} - stems - own
            if stems and others and not _held_elsewhere(sheet, own, stems):
                yield from ((strand, site) for strand in stems)


def _under_links(slides: Slides, landings: Sequence[Landing], frame: AbstractSet[int]) -> Iterator[tuple[int, int]]:
    """Guides on the frame that run on under the pin between two links: at a dead centre crank and rod lie over them.

    A pivot on such a line has one link; the pin of the block itself is no matter of landings.
    """
    guides = {strand for slide in slides.slides if slide.guide.frame for strand in slide.guide.strands}
    links: defaultdict[int, set[int]] = defaultdict(set)
    for landing in landings:
        if landing.how in {"end", "corner"} and landing.strand not in frame:
            links[landing.pin].add(landing.strand)
    for landing in landings:
        if landing.strand in guides and landing.how in {"through", "beside"} and len(links[landing.pin]) > 1:
            yield landing.strand, landing.pin


def _held_elsewhere(sheet: Sheet, own: AbstractSet[int], stems: AbstractSet[int]) -> bool:
    """Whether other lines than the stems end on a slot."""
    ends, targets, _, meets = sheet.touching.as_pairs()
    wanted = np.isin(targets, sorted(own)) & meets
    return bool(set((ends[wanted] // 2).tolist()) - own - stems)


def _runs_in(slides: Slides, slots: Sequence[Slot]) -> Iterator[tuple[int, int]]:
    """Slots and moving guides, by a strand of each, with the pins that slide in them."""
    for slot in slots:
        yield from ((slot.strands[0], site) for site in slot.sites)
    for slide in slides.slides:
        if slide.guide.rails and not slide.guide.frame:
            yield from ((slide.guide.strands[0], site) for site in slide.box.sites)


class _Roles(NamedTuple):
    """What single strands are: marks, symbols, frame (with reasons), boxes and guides; ``active`` ones may be parts."""

    marks: Mapping[int, str]
    symbols: FrameSymbols
    frame: Mapping[int, str]
    slides: Slides
    active: AbstractSet[int]


def _roles(kinds: Sorted, sheet: Sheet, outlined: Outlined, by_layer: Mapping[int, str]) -> _Roles:
    ground = find_ground(kinds, sheet, outlined, by_layer)
    in_boxes = {strand for box in ground.boxes for strand in box.strands}
    held = {(strand, site) for box in ground.boxes for site in box.sites for strand in box.strands}
    landings = [each for each in outlined.landings if (each.strand, each.pin) not in held]
    landings.extend(trimmed_rods(ground.boxes, sheet, landings))
    marks = find_marks(sheet, ground.reached, landings)
    plain = [index for index in ground.reached if index not in marks]
    holed = {strand for outline in outlined.bars for strand in outline}
    symbols = find_frame_symbols(sheet, plain, marks, landings, in_boxes, holed)
    ground = without_plinths(ground, symbols, sheet)
    hatched = hatched_boxes(ground.boxes, symbols, sheet)
    frame = {**by_layer, **{strand: why for strand, why in symbols.frame.items() if strand not in hatched.sides}}
    slides = find_slides(sheet, ground.boxes, ground.rails, frame, hatched, symbols.strokes, outlined.landings)
    active = {index for index in plain if index not in symbols.strokes}
    return _Roles(marks, symbols, {**slides.frame, **frame}, slides, active)


def _without_blocks(slots: Sequence[Slot], slides: Slides) -> list[Slot]:
    """The slots but those that are the guide of a rectangular block round the pin in them."""
    guided = {(site, strand) for slide in slides.slides for site in slide.box.sites for strand in slide.guide.strands}
    return [
        slot for slot in slots if not any((site, strand) in guided for site in slot.sites for strand in slot.strands)
    ]
