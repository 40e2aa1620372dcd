"""From shapes to contacts between bodies: what slides in what, what rolls on what, what was taken to be the frame.

The bodies have been welded; here blocks are named as such, guides that nothing else holds are read as frame, and wheels
without linework become bodies of their own.
"""

from __future__ import annotations

import math
from collections import defaultdict
from collections.abc import Collection, Iterator, Mapping, Sequence
from dataclasses import dataclass, replace

from dxfcheck.geometry import cross
from dxfcheck.reading.bodies.body import Body
from dxfcheck.reading.gears.gearing import find_gearing
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.lines.sorting import Sorted
from dxfcheck.reading.lines.unions import Unions
from dxfcheck.reading.shapes.contact import Contact, Oddity, directed
from dxfcheck.reading.shapes.obrounds import Channel
from dxfcheck.reading.shapes.slots import Slot
from dxfcheck.reading.slides.empty_guides import empty_guides
from dxfcheck.reading.slides.slide_contacts import slide_contacts
from dxfcheck.reading.slides.slide_oddities import slide_oddities
from dxfcheck.reading.slides.slides import Slides
from dxfcheck.tolerances.linework import GUIDE_TURN_DEGREES

__all__ = ["Joints", "find_joints"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Joints:
    """All bodies with the contacts between them, what looked wrong, and pitch circles that roll on nothing."""

    bodies: tuple[Body, ...]
    contacts: tuple[Contact, ...]
    oddities: tuple[Oddity, ...]
    idle_rings: frozenset[int]


def find_joints(
    kinds: Sorted,
    sheet: Sheet,
    bodies: Sequence[Body],
    slides: Slides,
    slots: Sequence[Slot],
    empty: Sequence[Channel],
    frame_strands: Collection[int],
    *,
    frame_stated: bool,
) -> Joints:
    """Give the bodies their contacts. ``frame_stated`` says that the user names frame pins, whichever they are.

    ``empty`` are slots that hold no pin, ``frame_strands`` all linework that is frame.
    """
    if not slides.slides and not slides.unguided and not slots and not kinds.pitch_rings:
        oddities = tuple(empty_guides(sheet, bodies, (), empty))
        return Joints(bodies=tuple(bodies), contacts=(), oddities=oddities, idle_rings=frozenset())
    pool = _with_frame(bodies)
    pool, assumed = _assume_frame(pool, slides, slots, frame_stated=frame_stated)
    body_of = {strand: number for number, body in enumerate(pool) for strand in body.strands}
    pool = _named_blocks(pool, slides, slots, body_of)
    found = list(slide_contacts(slides, body_of, 0, sheet.pins))
    sliding = [contact for _, contact in found]
    in_slots = list(_slot_contacts(slots, pool, body_of, sheet))
    merged = _merged(sliding)
    gearing = find_gearing(kinds.pitch_rings, kinds.racks, sheet, pool, frame_strands, merged)
    contacts = [_moved(contact, gearing.moved) for contact in (*merged, *in_slots)]
    odd = [
        *slide_oddities(slides, found, body_of, sheet),
        *_past_slot_ends(in_slots, sheet),
        *(_assumed(body, strands, sheet) for body, strands in assumed),
        *gearing.oddities,
    ]
    odd = [each._replace(body=gearing.moved[each.body]) if each.body is not None else each for each in odd]
    every = [*contacts, *gearing.contacts]
    odd.extend(empty_guides(sheet, gearing.bodies, every, empty))
    return _pruned(gearing.bodies, every, odd, frozenset(gearing.idle_rings))


def _with_frame(bodies: Sequence[Body]) -> list[Body]:
    """The bodies, the frame first: an empty one where the sheet shows none so far."""
    if bodies and bodies[0].frame:
        return list(bodies)
    return [Body(strands=(), pins=(), frame=True), *bodies]


def _assume_frame(
    bodies: list[Body], slides: Slides, slots: Sequence[Slot], *, frame_stated: bool
) -> tuple[list[Body], list[tuple[int, tuple[int, ...]]]]:
    """Guides and slots that no pin and no other joint holds become frame, where the rest hangs on a frame.

    Returned with the guided body (index) and the strands, for what is to be said about each.
    """
    body_of = {strand: number for number, body in enumerate(bodies) for strand in body.strands}
    sliding = {body_of.get(slide.box.strands[0]) for slide in slides.slides}
    sliding.update(body_of.get(slide.guide.strands[0]) for slide in slides.slides if slide.box.frame)
    guides: defaultdict[int, set[int]] = defaultdict(set)
    for slide in slides.slides:
        if not slide.guide.frame and slide.guide.rails:
            guided = body_of.get(slide.box.strands[0])
            for strand in slide.guide.strands:
                if strand in body_of and guided is not None and body_of[strand] != guided:
                    guides[body_of[strand]].add(guided)
    for slot in slots:
        owner = body_of.get(slot.strands[0])
        at_pin = [number for number, body in enumerate(bodies) if slot.sites[0] in body.pins and number != owner]
        if owner is not None and slot.pinned is None:
            guides[owner].update(at_pin)
    held = _hanging_on_frame(bodies, guides, frame_stated=frame_stated)
    assumed = [
        (min(guided), number)
        for number, guided in sorted(guides.items())
        if not bodies[number].frame and not bodies[number].pins and number not in sliding and guided & held
    ]
    if not assumed:
        return bodies, []
    taken = {number for _, number in assumed}
    strands = tuple(sorted({*bodies[0].strands, *(strand for number in taken for strand in bodies[number].strands)}))
    # The emptied bodies stay in their places until all joints are found.
    settled = [
        replace(body, strands=strands) if number == 0 else replace(body, strands=()) if number in taken else body
        for number, body in enumerate(bodies)
    ]
    return settled, [(guided, bodies[number].strands) for guided, number in assumed]


def _hanging_on_frame(bodies: Sequence[Body], guides: Mapping[int, set[int]], *, frame_stated: bool) -> set[int]:
    """Bodies that a chain of pins, or of guides known to be held, joins to the frame."""
    if frame_stated:
        return set(range(len(bodies)))
    groups = Unions(len(bodies))
    first: dict[int, int] = {}
    for number, body in enumerate(bodies):
        for site in body.pins:
            groups.join(first.setdefault(site, number), number)
    for guide, guided in guides.items():
        if bodies[guide].frame or bodies[guide].pins:
            for number in guided:
                groups.join(guide, number)
    return {number for number in range(len(bodies)) if groups.of(number) == groups.of(0)}


def _assumed(guided: int, strands: tuple[int, ...], sheet: Sheet) -> Oddity:
    strand = sheet.strands[strands[0]]
    at = strand.ends[0] if strand.ends else strand.pieces[0].start
    detail = "no frame symbol, frame layer or pin holds this guide; read as fixed to the frame"
    return Oddity("guide-taken-as-frame", at, detail, body=guided, strands=strands)


def _named_blocks(
    bodies: Sequence[Body], slides: Slides, slots: Sequence[Slot], body_of: Mapping[int, int]
) -> list[Body]:
    """Bodies that hold a sliding block and at most one pin are called blocks; a barrel or a lever is a link."""
    boxes = [*(slide.box for slide in slides.slides if not slide.is_barrel), *slides.unguided]
    blocks = {
        body_of[box.strands[0]]: box.sites or bodies[body_of[box.strands[0]]].pins[:1]
        for box in boxes
        if box.strands[0] in body_of and not box.frame
    }
    blocks.update({body_of[slot.block[0]]: slot.sites for slot in slots if slot.block and slot.block[0] in body_of})
    return [
        replace(body, block=not body.frame and number in blocks and 0 < len(body.pins) <= len(blocks[number]))
        for number, body in enumerate(bodies)
    ]


def _slot_contacts(
    slots: Sequence[Slot], bodies: Sequence[Body], body_of: Mapping[int, int], sheet: Sheet
) -> Iterator[Contact]:
    """Pins in slots, each against the lowest of the bodies it carries; blocks in slots slide."""
    for slot in slots:
        owner = body_of.get(slot.strands[0])
        if owner is None:
            continue
        for site in slot.sites:
            at = sheet.pins[site].at
            direction = directed(slot.shape.tangent_at(at))
            if slot.block:
                carried = [body_of[slot.block[0]]] if slot.block[0] in body_of else []
            else:
                carried = [number for number, body in enumerate(bodies) if site in body.pins and number != owner]
            if carried and carried[0] != owner:
                yield Contact(
                    kind="slide" if slot.block else "pin in slot",
                    bodies=(owner, carried[0]),
                    at=at,
                    direction=direction,
                    why="a block between the sides of a slot" if slot.block else "a pin in a slot",
                    site=site,
                    strands=(*slot.strands, *slot.block),
                    room=slot.shape.room(at, direction),
                    carrier=None if slot.block else 0,
                    curves=(slot.shape.middle, None),
                )


def _past_slot_ends(contacts: Sequence[Contact], sheet: Sheet) -> Iterator[Oddity]:
    """Pins drawn past the centre of an end of their slot."""
    for contact in contacts:
        if contact.room is None or contact.site is None:
            continue
        past, limit = -min(contact.room), sheet.tolerance.rim(sheet.pins[contact.site].radius)
        if past > limit:
            detail = "the pin stands {amount} past the end of its slot; expected it between the centres of the two ends"
            yield Oddity("past-guide-end", contact.at, detail, past, limit, contact.site, None, contact.strands)


def _merged(contacts: Sequence[Contact]) -> list[Contact]:
    """The slides, but two bodies that slide on one another in parallel guides have one joint: a rod in two bushes."""
    kept: list[Contact] = []
    between: defaultdict[tuple[int, ...], list[int]] = defaultdict(list)
    for contact in contacts:
        pair = tuple(sorted(contact.bodies))
        parallel = math.radians(GUIDE_TURN_DEGREES)
        same = (place for place in between[pair] if abs(cross(kept[place].direction, contact.direction)) <= parallel)
        place = next(same, None)
        if place is None:
            between[pair].append(len(kept))
            kept.append(contact)
        else:
            first = kept[place]
            kept[place] = first._replace(
                strands=tuple(dict.fromkeys((*first.strands, *contact.strands))),
                why=f"{first.why}; guided in several places along one direction, which is one joint",
                room=None,
            )
    return kept


def _moved(contact: Contact, moved: Sequence[int]) -> Contact:
    one, other = (moved[body] for body in contact.bodies)
    return contact._replace(bodies=(one, other))


def _pruned(
    bodies: Sequence[Body], contacts: Sequence[Contact], oddities: Sequence[Oddity], idle: frozenset[int]
) -> Joints:
    """Without bodies that have neither a pin nor a contact; of a contact with the frame, the frame comes first."""
    touched = {body for contact in contacts for body in contact.bodies}
    kept = [number for number, body in enumerate(bodies) if body.pins or number in touched]
    index = {number: place for place, number in enumerate(kept)}
    settled = []
    for contact in contacts:
        one, other = (index[body] for body in contact.bodies)
        framed = bodies[contact.bodies[1]].frame
        numbered = contact._replace(bodies=(one, other))
        settled.append(numbered.swapped() if framed else numbered)
    return Joints(
        bodies=tuple(bodies[number] for number in kept),
        contacts=tuple(settled),
        oddities=tuple(
            each._replace(body=index.get(each.body) if each.body is not None else None) for each in oddities
        ),
        idle_rings=idle,
    )
