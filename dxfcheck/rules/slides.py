"""Rules on blocks and guides, slots and the pins in them, and the holes of outlines."""

from __future__ import annotations

from collections.abc import Iterator

from dxfcheck.reading.reading import Observation
from dxfcheck.rules.finding import Finding
from dxfcheck.rules.observed import at_pin, figured, finding, of_linkages
from dxfcheck.rules.registry import rule
from dxfcheck.rules.settings_and_sources import FRAME, PART_BLOCKS, SYMBOLS, TOLERANCE
from dxfcheck.rules.subject import RuleSubject

__all__: list[str] = []


def _what_slides(seen: Observation, subject: RuleSubject) -> str:
    """'at pin C', or 'on link C-E' for a block without a pin, which is part of that link.

    A pin and the only link on it may bear one name; what is about the pin stands at its place.
    """
    mine = (linkage for linkage, _ in subject.mechanisms if seen.mechanism in (None, linkage.name))
    if any(pin.name == seen.subject and pin.at == seen.at for linkage in mine for pin in linkage.pins):
        return at_pin(seen)
    if " at " in seen.subject:
        return f"on {seen.subject}: "
    return f"on link {seen.subject}: " if seen.subject else ""


@rule(
    "block-without-guide",
    "error",
    "A block that slides on nothing",
    family="linework",
    looks_for="A rectangle round a pin with no line through it, along it or ending at it in the direction of one of "
    "its sides, and no hatching along it; a block whose guide is welded to it.",
    matters="Without a guide the block holds nothing: the count is at least one too high, and the ram has no speed.",
    remedy="Draw the guide through the block, along its side (within half its width) or interrupted at it; delete the "
    "rectangle if nothing slides there.",
    settings=TOLERANCE + "; " + FRAME,
    source=SYMBOLS,
)
def block_without_guide(subject: RuleSubject) -> Iterator[Finding]:
    """Blocks that fit no guide."""
    for seen in of_linkages(subject, "block-without-guide"):
        message = f"the block at pin {seen.subject}: {figured(seen, subject.sketch.unit)}"
        if seen.case == "welded":
            remedy = "take away the line that ties the guide to the block"
        else:
            remedy = "draw its guide through it or along its side, or delete the rectangle if nothing slides there"
        yield finding(seen, "error", message, remedy)


@rule(
    "two-guides",
    "error",
    "A block with two guides",
    family="linework",
    looks_for="A block for which lines in two directions, or of two links, would do equally well as its guide.",
    matters="The block slides along one of them; with the other, the speeds are those of another mechanism.",
    remedy="Delete the line that is not its guide, or draw it so that it stays clear of the block.",
    settings=FRAME,
)
def two_guides(subject: RuleSubject) -> Iterator[Finding]:
    """Blocks that two guides fit."""
    for seen in of_linkages(subject, "two-guides"):
        message = f"{_what_slides(seen, subject)}{figured(seen, subject.sketch.unit)}"
        yield finding(seen, "error", message, "delete the line that is not its guide, or keep it clear of the block")


@rule(
    "past-guide-end",
    "warning",
    "A block or pin past the end of its guide",
    family="pose",
    looks_for="A block drawn partly or wholly past the end of its guide; a pin in a slot past the centre of the "
    "slot's end.",
    matters="The mechanism cannot be built in this pose: the block has left its guide, or the pin stands in metal.",
    remedy="Lengthen the guide or the slot, or draw a pose within the stroke.",
)
def past_guide_end(subject: RuleSubject) -> Iterator[Finding]:
    """Blocks past the ends of guides, pins past the ends of slots."""
    for seen in of_linkages(subject, "past-guide-end"):
        what = "slot" if "slot" in seen.detail else "guide"
        message = f"{_what_slides(seen, subject)}{figured(seen, subject.sketch.unit)}"
        yield finding(seen, "warning", message, f"lengthen the {what}, or draw a pose within the stroke")


@rule(
    "guide-taken-as-frame",
    "warning",
    "A guide that nothing holds",
    family="structure",
    looks_for="A guide or a slot on which a link slides, with no pin, no frame symbol and no frame layer of its own. "
    "It is read as fixed to the frame.",
    matters="If it is part of a moving link, the count and all speeds are those of another mechanism.",
    remedy="Put the guide on a layer FRAME or hatch it; or join it to the link that carries it.",
    settings=FRAME,
)
def guide_taken_as_frame(subject: RuleSubject) -> Iterator[Finding]:
    """Guides read as frame because nothing holds them."""
    for seen in of_linkages(subject, "guide-taken-as-frame"):
        of_what = f" ({seen.subject} slides on it)" if seen.subject else ""
        message = f"{figured(seen, subject.sketch.unit)}{of_what}"
        remedy = "put it on a layer FRAME or hatch it; or join it to the link that carries it"
        yield finding(seen, "warning", message, remedy)


@rule(
    "empty-guide",
    "warning",
    "A guide or slot with nothing in it",
    family="linework",
    looks_for="A line of the frame that holds nothing, or a slot without a pin, within six ring diameters of a pin "
    "with one link.",
    matters="The pin was meant to slide there, and is not held: it is read as the free end of its link.",
    remedy="Draw a rectangle (the block) round the pin, along the guide, or put the pin on the slot's centre line; "
    "delete the guide or slot if nothing slides there.",
    settings=FRAME,
)
def empty_guide(subject: RuleSubject) -> Iterator[Finding]:
    """Guides and slots with nothing in them, beside pins that nothing else holds."""
    for seen in of_linkages(subject, "empty-guide"):
        message = f"{at_pin(seen)}{figured(seen, subject.sketch.unit)}"
        if "slot" in seen.detail:
            remedy = "put the pin on the slot's centre line, or delete the slot"
        else:
            remedy = "draw the block round the pin, or move the line to a layer of its own if nothing slides on it"
        yield finding(seen, "warning", message, remedy)


@rule(
    "slot-pins",
    "warning",
    "Two pins in one slot",
    family="linework",
    looks_for="An obround with two pins in it that are not both at the centres of its ends: with one pin it would be a "
    "slot, with a pin at each end a bar.",
    matters="Read as a slot, its link can move along the pins; read as a bar, it is a rigid link between them.",
    remedy="Put the two pins at the centres of the ends if it is a bar; take one pin out if it is a slot.",
)
def slot_pins(subject: RuleSubject) -> Iterator[Finding]:
    """Slots that hold two pins."""
    for seen in of_linkages(subject, "slot-pins"):
        message = f"{at_pin(seen)}{figured(seen, subject.sketch.unit)}"
        remedy = "put both pins at the centres of the ends if it is a bar; else give each a slot of its own"
        yield finding(seen, "warning", message, remedy)


@rule(
    "off-slot-centre",
    "warning",
    "A pin off the centre line of its slot",
    family="linework",
    looks_for="A pin in a slot that lies beside the slot's centre line by more than 2 % of half the slot's width.",
    matters="A pin that fills its slot cannot stand there: the pose is not one that the mechanism can take.",
    remedy="Move the pin onto the centre line.",
    settings=TOLERANCE,
)
def off_slot_centre(subject: RuleSubject) -> Iterator[Finding]:
    """Pins beside the centre line of their slot."""
    for seen in of_linkages(subject, "off-slot-centre"):
        message = f"{at_pin(seen)}{figured(seen, subject.sketch.unit)}"
        yield finding(seen, "warning", message, "move the pin onto the centre line, or the slot to the pin")


@rule(
    "doubtful-hole",
    "warning",
    "A hole that could belong to several outlines",
    family="linework",
    looks_for="A ring inside several outlines that lie over one another, with fewer rings than outlines at that place.",
    matters="Which parts turn on that pin decides what the mechanism is.",
    remedy="Draw the hole once for each part that has it, on one centre, or each part in a block of its own.",
    settings=PART_BLOCKS,
)
def doubtful_hole(subject: RuleSubject) -> Iterator[Finding]:
    """Holes under several outlines."""
    for seen in of_linkages(subject, "doubtful-hole"):
        message = f"the hole at pin {seen.subject}: {figured(seen, subject.sketch.unit)}"
        remedy = "draw the hole once for each part that has it, on one centre, or each part as a block of its own"
        yield finding(seen, "warning", message, remedy)
