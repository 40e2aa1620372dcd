"""What looks wrong on the sheet as a whole: pins without links, repeated labels, groups that hang on nothing."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterator, Sequence

from dxfcheck.drawing.primitives import Sketch
from dxfcheck.geometry import Point
from dxfcheck.linkage import Linkage
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.lines.sorting import Sorted
from dxfcheck.reading.mechanisms.assemble import Assembly
from dxfcheck.reading.mechanisms.model import Model
from dxfcheck.reading.observations.exploded_labels import observe_exploded_labels
from dxfcheck.reading.observations.set_aside import clipped_strokes, cut_outs
from dxfcheck.reading.observations.unread_shapes import shapes_shown
from dxfcheck.reading.parts.parts import Parts
from dxfcheck.reading.reading import Observation
from dxfcheck.tolerances.sheet import EMPTY_PIN_LIKENESS, PLACES_NAMED

__all__ = ["observe_sheet"]


def observe_sheet(sketch: Sketch, kinds: Sorted, sheet: Sheet, parts: Parts, model: Model) -> Iterator[Observation]:
    """All observations on the sheet as a whole."""
    yield from _no_linkage(kinds, sheet, model)
    yield from _without_frame(model.linkages)
    yield from _empty_pins(sketch, sheet, model)
    yield from _repeated_labels(model.linkages)
    yield from _floating(sheet, parts, model)
    yield from _specks(sheet, parts, model)
    yield from observe_exploded_labels(sheet, parts, model)
    for name in model.unknown_frame_pins:
        known = ", ".join(sorted(set(model.names.names.values()))[:PLACES_NAMED])
        yield Observation(
            kind="unknown-frame-pin", at=None, subject=name, detail=f"the pins are {known}" if known else ""
        )


def _no_linkage(kinds: Sorted, sheet: Sheet, model: Model) -> Iterator[Observation]:
    if not model.linkages:
        yield Observation(kind="no-linkage", at=None, detail=shapes_shown(kinds, sheet))


def _without_frame(linkages: Sequence[Linkage]) -> Iterator[Observation]:
    for linkage in linkages:
        if not linkage.grounded:
            leftmost = min((pin.at for pin in linkage.pins), key=lambda at: (at.real, at.imag))
            held = linkage.links[linkage.frame].name
            yield Observation(kind="no-frame", at=leftmost, subject=held, mechanism=linkage.name)


def _empty_pins(sketch: Sketch, sheet: Sheet, model: Model) -> Iterator[Observation]:
    """Rings with no link on them that lie among the pins of a linkage and are of about their size."""
    sites = sheet.pins
    boxes = []
    for assembled in model.assembled:
        pins = assembled.linkage.pins
        radii = [pin.radius for pin in pins]
        margin = EMPTY_PIN_LIKENESS * max(radii)
        left, right = min(pin.at.real for pin in pins) - margin, max(pin.at.real for pin in pins) + margin
        low, high = min(pin.at.imag for pin in pins) - margin, max(pin.at.imag for pin in pins) + margin
        boxes.append((left, right, low, high, min(radii), max(radii), assembled.linkage.name))
    used = {site for assembled in model.assembled for site in assembled.sites} | set(model.names.names)
    empty = [pin for pin in sites if pin.number not in used]
    for pin in empty if boxes else ():
        for left, right, low, high, least, greatest, name in boxes:
            inside = left <= pin.at.real <= right and low <= pin.at.imag <= high
            if inside and least / EMPTY_PIN_LIKENESS <= pin.radius <= greatest * EMPTY_PIN_LIKENESS:
                handles = tuple(dict.fromkeys(sketch.handles(ring) for ring in pin.rings))
                layer = pin.rings[0].source.layer
                yield Observation(kind="empty-pin", at=pin.at, handles=handles, layer=layer, mechanism=name)
                break


def _repeated_labels(linkages: Sequence[Linkage]) -> Iterator[Observation]:
    for linkage in linkages:
        by_name: defaultdict[str, list[Point]] = defaultdict(list)
        for pin in linkage.pins:
            by_name[pin.name].append(pin.at)
        for name, places in by_name.items():
            if len(places) > 1:
                others = ", ".join(f"({at.real:.6g}, {at.imag:.6g})" for at in places[1:])
                yield Observation(
                    kind="duplicate-label",
                    at=places[0],
                    subject=name,
                    detail=others,
                    amount=float(len(places)),
                    mechanism=linkage.name,
                )


def _floating(sheet: Sheet, parts: Parts, model: Model) -> Iterator[Observation]:
    """Linework with no pin on it on layers that carry links, and groups of links that hang on nothing."""
    if not model.assembled:
        return
    strands = sheet.strands
    bodies = parts.bodies.bodies
    linked = {body for assembled in model.assembled for body in assembled.bodies if body is not None}
    layers = {strands[index].primitive.source.layer for body in linked for index in bodies[body].strands}
    owned = {index for body in bodies for index in body.strands}
    set_apart = {*parts.marks, *parts.symbols.strokes, *parts.borders, *sheet.ring_strands}
    set_apart.update(index for box in parts.slides.boxes for index in box.strands)
    loose = [
        strand
        for strand in strands
        if strand.number not in owned
        and strand.number not in set_apart
        and not strand.frame
        and strand.primitive.source.layer in layers
    ]
    windows = cut_outs(loose, linked, parts, sheet) | clipped_strokes(loose, parts, sheet)
    loose = [strand for strand in loose if strand.number not in windows]
    groups = [_place_of(assembly, sheet) for assembly in model.stray]
    places = [(strand.ends or strand.corners or (strand.pieces[0].start,))[0] for strand in loose]
    count = len(loose) + len(groups)
    if not count:
        return
    first = [*groups, *places][:PLACES_NAMED]
    detail = ", ".join(f"({at.real:.6g}, {at.imag:.6g})" for at in first)
    yield Observation(
        kind="floating-group",
        at=first[0],
        handles=tuple(model.strand_handles[strand.number] for strand in loose[:PLACES_NAMED]),
        layer=loose[0].primitive.source.layer if loose else None,
        amount=float(count),
        detail=detail + (" ..." if count > len(first) else ""),
    )


def _place_of(assembly: Assembly, sheet: Sheet) -> Point:
    places = [sheet.pins[site].at for site in assembly.sites] or [contact.at for contact in assembly.contacts]
    return min(places, key=lambda at: (at.real, at.imag))


def _specks(sheet: Sheet, parts: Parts, model: Model) -> Iterator[Observation]:
    """Lines too short to be links, where they touch linework that hangs together with a pin."""
    for index, why in parts.marks.items():
        strand = sheet.strands[index]
        if why.startswith("a speck") and model.assembled:
            yield Observation(
                kind="short-line",
                at=strand.ends[0],
                handles=(model.strand_handles[index],),
                layer=strand.primitive.source.layer,
                amount=strand.length,
            )
