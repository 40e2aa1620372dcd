"""Closed shapes of a sheet before any welding: outlines with holes, bars, slots, borders (reading rules 1, 4, 6)."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Collection, Sequence
from dataclasses import dataclass

import numpy as np

from dxfcheck.drawing.primitives import Path, Segment
from dxfcheck.reading.lines.landing import Landing
from dxfcheck.reading.lines.linework import Strand, arc_middle
from dxfcheck.reading.lines.nearness import near_pairs
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.reading.shapes.contact import Oddity
from dxfcheck.reading.shapes.contours import Contour, find_contours
from dxfcheck.reading.shapes.forks import find_forks
from dxfcheck.reading.shapes.holes import OutlineLinks, cut_slots, find_outline_links, owner_of_cut
from dxfcheck.reading.shapes.obrounds import Channel, find_curved_slots, find_obrounds
from dxfcheck.reading.shapes.part_blocks import PartGroup, part_groups
from dxfcheck.reading.shapes.slots import Slot, Slots, find_slots

__all__ = ["Outlined", "find_outlined"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Outlined:
    """What the closed shapes of a sheet are.

    ``landings`` are all that count so far, holes of outlines and ends of bars among them; ``borders`` strands drawn
    round whole links; ``slots`` hold pins that slide in them, ``empty`` ones hold none; ``bars`` are the strands of
    bars, plates and part blocks, ``groups`` other strands of one part whatever their ends do, ``never`` pairs of
    strands that slide on one another. ``parts`` are the part blocks; ``closed`` the strands of all outlines and slots,
    ``slotted`` those of outlines out of which a slot with a pin in it is cut.
    """

    landings: tuple[Landing, ...]
    borders: frozenset[int]
    slots: tuple[Slot, ...]
    empty: tuple[Channel, ...]
    bars: tuple[tuple[int, ...], ...]
    groups: tuple[tuple[int, ...], ...]
    never: frozenset[tuple[int, int]]
    parts: tuple[PartGroup, ...]
    closed: frozenset[int]
    slotted: frozenset[int]
    oddities: tuple[Oddity, ...]


def find_outlined(sheet: Sheet, frame: Collection[int], part_blocks: Sequence[str]) -> Outlined:
    """Look into every closed shape; ``frame`` are strands that their layer makes frame."""
    parts = part_groups(sheet.strands, sheet.pins, part_blocks, sheet.ring_strands)
    in_parts = {strand for part in parts for strand in part.strands}
    drawn = [*_of_parts(sheet, parts, in_parts)]
    apart = sheet.ring_strands | in_parts
    contours = find_contours(sheet.linework, sheet.touching, sheet.tolerance, apart, sheet.pins, drawn)
    found, slots = _slots(sheet, drawn, contours, apart)
    cuts = cut_slots(found.slots, sheet.touching, drawn)
    used = {strand for slot in found.slots for strand in (*slot.strands, *slot.block)}
    solid = [contour for contour in contours if used.isdisjoint(contour.strands)]
    solid = _parts_among(solid, sheet)
    voids = [slot.shape for slot in cuts]
    links = find_outline_links(solid, sheet.strands, drawn, sheet.pins, frame, sheet.tolerance, voids, found.bars)
    owners = [(slot.strands[0], owner_of_cut(slot.shape, solid, links.borders, frame)) for slot in cuts]
    cut_out = {first for first, owner in owners if owner is not None}
    return Outlined(
        landings=_that_count(drawn, slots, links, cut_out, sheet),
        borders=links.borders,
        slots=slots,
        empty=found.empty,
        bars=(*links.groups, *(part.strands for part in parts if part.strands)),
        groups=(
            *(lines for slot in slots for lines in (slot.strands, slot.block) if lines),
            *((first, solid[owner].strands[0]) for first, owner in owners if owner is not None),
        ),
        never=frozenset(
            pair
            for slot in slots
            for one in slot.strands
            for other in slot.block
            for pair in ((one, other), (other, one))
        ),
        parts=tuple(parts),
        slotted=frozenset(each for _, owner in owners if owner is not None for each in solid[owner].strands),
        closed=frozenset(used.union(*(contour.strands for contour in contours))),
        oddities=(*found.oddities, *links.oddities),
    )


def _parts_among(contours: Sequence[Contour], sheet: Sheet) -> list[Contour]:
    """The contours that show that they are parts: drawn in one piece, or with holes as bars and plates have them.

    Four loose lines round a few rings are as well a table, a housing or a border. Loose lines make a part where a hole
    is drawn with a ring of its own on another part's, or lies in another outline too, or has a rounded end about it.
    """
    if not any(len(contour.strands) > 1 for contour in contours):
        return list(contours)
    middles, reaches = zip(*(contour.circle_round() for contour in contours), strict=True)
    places = np.array([pin.at for pin in sheet.pins], dtype=np.complex128)
    pairs = near_pairs(np.array(middles), np.array(reaches), places, places)
    holders: defaultdict[int, list[int]] = defaultdict(list)
    for number, site in zip(*(each.tolist() for each in pairs), strict=True):
        if contours[number].contains(sheet.pins[site].at):
            holders[site].append(number)
    parts = {number for number, contour in enumerate(contours) if len(contour.strands) == 1}
    for site, numbers in holders.items():
        pin = sheet.pins[site]
        within = sheet.tolerance.rim(pin.radius)
        if len(numbers) > 1 or len(pin.rings) > 1:
            parts.update(numbers)
        parts.update(number for number in numbers if contours[number].rounds(pin.at, pin.radius, within))
    return [contour for number, contour in enumerate(contours) if number in parts]


def _of_parts(sheet: Sheet, parts: Sequence[PartGroup], in_parts: Collection[int]) -> list[Landing]:
    """All landings, but for part blocks only those on their own rings."""
    own = [Landing(part.strands[0], site, "corner", None, 0.0) for part in parts if part.strands for site in part.sites]
    return [*(each for each in sheet.landings.landings if each.strand not in in_parts), *own]


def _slots(
    sheet: Sheet, drawn: Sequence[Landing], contours: Sequence[Contour], apart: Collection[int]
) -> tuple[Slots, tuple[Slot, ...]]:
    """What the obrounds and curved slots are, and all slots, forks among them."""
    pins, tolerance = sheet.pins, sheet.tolerance
    shapes: list[Channel] = []
    if pins:
        shapes.extend(find_obrounds(sheet.strands, sheet.touching))
        shapes.extend(find_curved_slots(sheet.strands, sheet.touching, tolerance))
    shapes = [shape for shape in shapes if set(shape.strands).isdisjoint(apart)]
    carrying = {landing.pin for landing in drawn}
    # A ring of the frame alone holds a slotted link as well.
    carrying.update(pin.number for pin in pins if pin.frame is not None)
    found = find_slots(shapes, pins, sheet.linework, tolerance, carrying=carrying, outlines=contours)
    used = {strand for slot in found.slots for strand in (*slot.strands, *slot.block)}
    in_contours = {strand for contour in contours for strand in contour.strands}
    forks = find_forks(
        sheet.landings,
        pins,
        sheet.linework,
        sheet.touching,
        tolerance,
        apart=used | in_contours | set(apart),
        taken={site for slot in found.slots for site in slot.sites},
    )
    return found, (*found.slots, *forks)


def _that_count(
    drawn: Sequence[Landing], slots: Sequence[Slot], links: OutlineLinks, cut_out: Collection[int], sheet: Sheet
) -> tuple[Landing, ...]:
    """Landings but those of borders and of what a pin slides in, with holes, pivots of levers and blocks in slots.

    The sides of a slot that is ``cut_out`` of an outline (its first strand) land on nothing they pass by, and a line
    drawn along the side of a slot does not hold the pin in it.
    """
    out = {(strand, site) for slot in slots for site in slot.sites for strand in (*slot.strands, *slot.block)}
    out |= links.void
    edges = {strand for slot in slots if slot.strands[0] in cut_out for strand in slot.strands}
    apart = edges | links.borders
    slots_at: defaultdict[int, list[Channel]] = defaultdict(list)
    for slot in slots:
        for site in slot.sites:
            slots_at[site].append(slot.shape)
    out |= {
        (each.strand, each.pin)
        for each in drawn
        if each.how in {"beside", "loose"} and each.pin in slots_at
        if any(_lies_along(sheet.strands[each.strand], shape, sheet.tolerance) for shape in slots_at[each.pin])
    }
    kept = (each for each in drawn if (each.strand, each.pin) not in out and each.strand not in apart)
    pivots = [Landing(slot.strands[0], slot.pinned, "corner", None, 0.0) for slot in slots if slot.pinned is not None]
    blocks = [Landing(slot.block[0], site, "corner", None, 0.0) for slot in slots if slot.block for site in slot.sites]
    return (*kept, *links.held, *pivots, *blocks)


def _lies_along(strand: Strand, shape: Channel, tolerance: Tolerance) -> bool:
    """Whether a line or arc lies on a side of a slot."""
    if isinstance(strand.primitive, Path):
        return False
    middle = (
        (strand.ends[0] + strand.ends[1]) / 2 if isinstance(strand.primitive, Segment) else arc_middle(strand.primitive)
    )
    asides = [shape.aside(point) for point in (*strand.ends, middle)]
    within = max(tolerance.rim(shape.radius), tolerance.close(shape.radius))
    return all(abs(abs(each) - shape.radius) <= within for each in asides) and min(asides) * max(asides) > 0.0
