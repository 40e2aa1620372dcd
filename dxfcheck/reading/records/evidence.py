"""Why each pin, link and joint of a linkage was read as it was."""

from __future__ import annotations

from collections import Counter, defaultdict
from collections.abc import Iterator, Mapping, Sequence

from dxfcheck.drawing.primitives import Arc, Path
from dxfcheck.linkage import Linkage
from dxfcheck.reading.lines.landing import Landing
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.mechanisms.assemble import Assembled
from dxfcheck.reading.mechanisms.model import Model
from dxfcheck.reading.parts.parts import Parts
from dxfcheck.reading.reading import Evidence
from dxfcheck.reading.shapes.contact import Contact

__all__ = ["linkage_evidence"]

HOW = {
    "end": "ends at {}",
    "corner": "has a corner or hole at {}",
    "through": "runs on through {}",
    "beside": "runs on past {}, touching its ring",
    "loose": "meets {} as frame",
}

LAID_OVER = "lies over {} without being pinned there, as it shares another pin with a link that ends there"


def linkage_evidence(model: Model, sheet: Sheet, parts: Parts) -> Iterator[Evidence]:
    """Evidence for every linkage: its frame, pins, links and joints, in that order."""
    by_strand: defaultdict[int, list[Landing]] = defaultdict(list)
    frame_at: dict[int, int] = {}
    for landing in parts.bodies.landings:
        by_strand[landing.strand].append(landing)
        if landing.strand in parts.frame:
            frame_at.setdefault(landing.pin, landing.strand)
    for assembled, linkage in zip(model.assembled, model.linkages, strict=True):
        yield from _frame(assembled, linkage, frame_at, sheet, parts)
        yield from _pins(assembled, linkage, sheet, model)
        yield from _links(assembled, linkage, by_strand, sheet, parts, model)
        yield from _joints(linkage, assembled.contacts)


def _frame(
    assembled: Assembled, linkage: Linkage, frame_at: Mapping[int, int], sheet: Sheet, parts: Parts
) -> Iterator[Evidence]:
    if not linkage.grounded:
        why = f"no joint ties it to a frame: {linkage.links[linkage.frame].name} is held for the count"
        yield Evidence("frame", "none", 8, why, (), None, linkage.name)
        return
    for pin, site in zip(linkage.pins, assembled.sites, strict=True):
        if not pin.fixed:
            continue
        ring = sheet.pins[site].frame
        if ring is not None:
            why = f"its ring is frame by {ring}"
        elif site in frame_at:
            why = f"it is on frame linework: {parts.frame[frame_at[site]]}"
        else:
            why = "it is stated to be a frame pin"
        yield Evidence("frame", pin.name, 5, why, pin.handles, pin.at, linkage.name)


def _pins(assembled: Assembled, linkage: Linkage, sheet: Sheet, model: Model) -> Iterator[Evidence]:
    for pin, site in zip(linkage.pins, assembled.sites, strict=True):
        rings = sheet.pins[site].rings
        made = sum(len(sheet.of_ring[id(ring)]) for ring in rings)
        what = "one ring" if len(rings) == 1 else f"{len(rings)} rings on one centre"
        if made > len(rings):
            what += f" drawn in {made} pieces"
        named = "named by the text beside it" if site in model.names.labels else "numbered by its place"
        yield Evidence("pin", pin.name, 2, f"{what}; {named}", pin.handles, pin.at, linkage.name)


def _links(
    assembled: Assembled,
    linkage: Linkage,
    by_strand: Mapping[int, Sequence[Landing]],
    sheet: Sheet,
    parts: Parts,
    model: Model,
) -> Iterator[Evidence]:
    for link, number in zip(linkage.links, assembled.bodies, strict=True):
        if number is None:
            continue
        body = parts.bodies.bodies[number]
        kinds = Counter(_kind(sheet.strands[index].primitive) for index in body.strands)
        drawn = [f"{count} {kind}{'s' if count > 1 else ''}" for kind, count in kinds.items()]
        drawn.extend(["a solid fill"] * bool(body.fills) + ["a disc"] * bool(body.discs))
        if body.wheels:
            drawn.append("a pitch circle" if len(body.wheels) == 1 else f"{len(body.wheels)} pitch circles")
        how = dict.fromkeys(
            ("holds {}" if body.block and landing.how == "corner" else HOW[landing.how]).format(
                model.names.names[landing.pin]
            )
            for index in body.strands
            for landing in by_strand.get(index, ())
        )
        own = set(body.strands)
        how.update(
            dict.fromkeys(
                LAID_OVER.format(model.names.names[pin])
                for strand, pin in parts.bodies.laid_over
                if strand in own and pin in model.names.names
            )
        )
        welded = sum(kinds.values()) > 1
        if not how:
            how.update(dict.fromkeys(f"about {linkage.pins[pin].name}" for pin in link.pins))
        why = f"{' and '.join(drawn)}{' welded together' if welded else ''}: {', '.join(how)}".rstrip(": ")
        rule = 6 if body.wheels or body.block else 4 if welded else 3
        yield Evidence("link", link.name, rule, why, link.handles, None, linkage.name)


def _kind(primitive: object) -> str:
    if isinstance(primitive, Path):
        return "outline" if primitive.closed else "polyline"
    return "arc" if isinstance(primitive, Arc) else "line"


def _joints(linkage: Linkage, contacts: Sequence[Contact]) -> Iterator[Evidence]:
    reasons = iter(contacts)
    for joint in linkage.joints:
        first, second = linkage.links[joint.first].name, linkage.links[joint.second].name
        pin = linkage.pins[joint.pin] if joint.pin is not None else None
        count = len(pin.links) if pin is not None else 0
        name = f"{first} / {second}"
        if joint.kind != "pin":
            yield Evidence("joint", name, 6, _contact_reason(next(reasons)), joint.handles, joint.at, linkage.name)
            continue
        if pin is None:
            continue
        why = f"both are pinned at {pin.name}"
        if count > 2:
            why += f", a pin of {count} links, which is {count - 1} joints"
        yield Evidence("joint", name, 7 if count > 2 else 3, why, joint.handles, joint.at, linkage.name)


def _contact_reason(contact: Contact) -> str:
    """Why two links slide or roll on one another, and how far they can go."""
    why = contact.why
    if contact.room is not None and min(contact.room) >= 0.0:
        where = "the slot" if contact.kind == "pin in slot" else "its guide"
        why += f"; {contact.room[0]:.6g} from one end of {where}, {contact.room[1]:.6g} from the other"
    return why
