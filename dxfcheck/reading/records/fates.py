"""What each primitive was read as, for the account."""

from __future__ import annotations

from collections.abc import Sequence

from dxfcheck.drawing.primitives import Fate, Ring, Sketch
from dxfcheck.reading.bodies.body import Body
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.lines.sorting import Sorted
from dxfcheck.reading.mechanisms.model import Model
from dxfcheck.reading.parts.parts import Parts

__all__ = ["fates_of"]

OTHER = Fate("other linework", "no pin on it")


def fates_of(sketch: Sketch, kinds: Sorted, sheet: Sheet, parts: Parts, model: Model) -> dict[int, Fate]:
    """The fate of every primitive by its index."""
    fates = dict(kinds.skipped)
    _texts(fates, kinds, model)
    _linework(fates, kinds, sheet, parts, model)
    _rings(fates, sheet, parts.bodies.bodies, model)
    for index, fill in kinds.fills:
        fates[index] = Fate("skipped", "solid fill, no part of a link" if fill.solid else "pattern hatch")
    for body in parts.bodies.bodies:
        for number in body.fills:
            fates[kinds.fills[number][0]] = Fate("link", "solid fill of a link")
    rolling = {ring for contact in parts.contacts for ring in contact.rings}
    rolling.update(ring for body in parts.bodies.bodies for ring in body.wheels)
    for index, _ in kinds.pitch_rings:
        if index in rolling:
            fates[index] = Fate("pitch circle", "rolls on another or on a rack")
        else:
            fates[index] = Fate("skipped", "ring in a chain linetype or on a pitch layer that rolls on nothing")
    assert len(fates) == len(sketch.primitives)  # noqa: S101 (every primitive is accounted for)
    return fates


def _texts(fates: dict[int, Fate], kinds: Sorted, model: Model) -> None:
    labels = set(model.names.labels.values())
    for number, (index, _) in enumerate(kinds.texts):
        if number in labels:
            fates[index] = Fate("label", "names a pin")
        elif number in model.driven.notes:
            fates[index] = Fate("drive note", "states a drive")
        elif number in model.required.notes:
            fates[index] = Fate("note", "states a limit or an expectation")
        else:
            fates[index] = Fate("note", "text")


def _linework(fates: dict[int, Fate], kinds: Sorted, sheet: Sheet, parts: Parts, model: Model) -> None:
    linked = {body for each in model.assembled for body in each.bodies if body is not None}
    by_strand: dict[int, Fate] = {}
    for number, body in enumerate(parts.bodies.bodies):
        if body.frame:
            fate = Fate("frame", "")
        elif number in linked:
            fate = Fate("link", "part of a link")
        else:
            fate = Fate("other linework", "on a pin, but hangs on no linkage")
        by_strand.update(dict.fromkeys(body.strands, fate))
    by_strand.update({index: Fate("skipped", why) for index, why in parts.marks.items()})
    by_strand.update({index: Fate("frame", why) for index, why in parts.symbols.strokes.items()})
    by_strand.update({index: Fate("frame", why) for index, why in parts.frame.items()})
    by_strand.update(dict.fromkeys(parts.borders, Fate("skipped", "an outline that encloses whole links")))
    by_strand.update(_sliding(parts))
    by_strand.update(dict.fromkeys(sheet.ring_strands, Fate("pin", "part of a ring")))
    for number, (index, _) in enumerate(kinds.lines):
        fate = by_strand.get(number, OTHER)
        fates[index] = fate if fate.why else Fate("frame", "welded to the frame")


def _sliding(parts: Parts) -> dict[int, Fate]:
    """Blocks, slots and pitch lines, by strand; guides stay what they are besides."""
    found: dict[int, Fate] = {}
    for slide in parts.slides.slides:
        what = "a sleeve on the frame" if slide.box.frame else "a block, or a barrel"
        found.update(dict.fromkeys(slide.box.strands, Fate("slide", what)))
    for box in parts.slides.unguided:
        found.update(dict.fromkeys(box.strands, Fate("slide", "a block without a guide")))
    for slot in parts.slots:
        found.update(dict.fromkeys(slot.strands, Fate("slot", "a pin runs in it")))
        found.update(dict.fromkeys(slot.block, Fate("slide", "a block in a slot")))
    return found


def _rings(fates: dict[int, Fate], sheet: Sheet, bodies: Sequence[Body], model: Model) -> None:
    in_linkage = {site for each in model.assembled for site in each.sites}
    carrying = set(model.names.names)

    def settle(ring: Ring, fate: Fate) -> None:
        for index in sheet.of_ring[id(ring)]:
            fates[index] = fate

    for pin in sheet.pins:
        if pin.number in in_linkage:
            fate = Fate("pin", "a ring where links meet or end")
        elif pin.number in carrying:
            fate = Fate("pin", "a ring on linework that hangs on no linkage")
        else:
            fate = Fate("other linework", "a ring with no link on it")
        for ring in pin.rings:
            settle(ring, fate)
    plates = {number for body in bodies for number in body.discs}
    for number, disc in enumerate(sheet.sites.discs):
        plate = Fate("disc", "a ring that holds other pins off its centre")
        if disc.rim:
            settle(disc.ring, Fate("pitch circle", "a rim of a wheel, about its pitch circle"))
            continue
        settle(disc.ring, plate if number in plates else Fate("skipped", "a ring drawn round whole links"))
