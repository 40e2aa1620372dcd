"""From rigid bodies to named, driven linkages (reading rules 7 to 11)."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Sequence
from dataclasses import dataclass, replace

import numpy as np

from dxfcheck.drawing.primitives import Arc, Sketch
from dxfcheck.geometry import Point
from dxfcheck.linkage import Linkage
from dxfcheck.reading.bodies.body import Body
from dxfcheck.reading.drives.drives import Driven, drive_linkages
from dxfcheck.reading.lines.linework import arc_middle
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.lines.sorting import Sorted
from dxfcheck.reading.lines.typed import rounding_of
from dxfcheck.reading.mechanisms.assemble import Assembled, Assembly, Named, assemble, find_assemblies
from dxfcheck.reading.parts.parts import Parts
from dxfcheck.reading.requirements.requirement_notes import Required, read_requirement_notes
from dxfcheck.reading.texts.labels import PinNames, name_pins, natural_key
from dxfcheck.settings import Settings

__all__ = ["Model", "make_model"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Model:
    """The linkages of a sketch, and what it holds besides.

    ``assembled`` has the linkages without drives beside their bodies, ``driven`` the same with drives, ``required``
    what notes hold them against. ``stray`` are assemblies that show too little to be called a linkage.
    ``unknown_frame_pins`` are names in the settings that no pin has. ``strand_handles`` are by strand.
    """

    names: PinNames
    fixed: frozenset[int]
    assembled: tuple[Assembled, ...]
    driven: Driven
    required: Required
    stray: tuple[Assembly, ...]
    unknown_frame_pins: tuple[str, ...]
    strand_handles: tuple[str, ...]

    @property
    def linkages(self) -> tuple[Linkage, ...]:
        """The linkages with their drives."""
        return self.driven.linkages


def make_model(sketch: Sketch, settings: Settings, kinds: Sorted, sheet: Sheet, parts: Parts) -> Model:
    """Name the pins, group bodies into mechanisms, make their joints and give them their drives."""
    bodies = parts.bodies.bodies
    used = {site for body in bodies if not body.frame for site in body.pins}
    used.update(each.site for each in parts.contacts if each.carrier is not None and each.site is not None)
    texts = [text for _, text in kinds.texts]
    drawn = frozenset(site for body in bodies if body.frame for site in body.pins)
    assemblies = find_assemblies(bodies, drawn, parts.contacts)
    first = {site for assembly in assemblies if assembly.linkage for site in assembly.sites}
    names = name_pins(sheet.pins, used, first, texts, sheet.tolerance)
    stated = {site for site, name in names.names.items() if name in settings.frame_pins}
    fixed = frozenset(stated | drawn)
    assemblies = find_assemblies(bodies, fixed, parts.contacts) if stated else assemblies
    good = [assembly for assembly in assemblies if assembly.linkage]
    stray = [assembly for assembly in assemblies if not assembly.linkage]
    strand_handles = tuple(sketch.handles(strand.primitive) for strand in sheet.strands)
    named = _named(sketch, kinds, sheet, parts, names, used, strand_handles)
    named = replace(named, resolution=_resolution(sheet, settings))
    strands = sheet.strands
    assembled = tuple(assemble(good, bodies, strands, sheet.pins, fixed, named, sheet.tolerance))
    linkages = [each.linkage for each in assembled]
    shapes = [[_drawn_pieces(body, bodies, sheet) for body in each.bodies] for each in assembled]
    handles = [sketch.handles(text) for text in texts]
    required = read_requirement_notes(linkages, shapes, texts, handles)
    driven = drive_linkages(linkages, shapes, required.texts, handles, settings, sketch.unit)
    return Model(
        names=names,
        fixed=fixed,
        assembled=assembled,
        driven=driven,
        required=required,
        stray=tuple(stray),
        unknown_frame_pins=tuple(name for name in settings.frame_pins if name not in names.names.values()),
        strand_handles=strand_handles,
    )


def _resolution(sheet: Sheet, settings: Settings) -> float:
    """What a coordinate may be off by: half a step of its decimals, a stated tolerance, gaps in what meets."""
    t = sheet.tolerance.t
    gaps = [landing.offset for landing in sheet.landings.landings if landing.offset <= t]
    apart = [abs(ring.centre - pin.at) for pin in sheet.pins if len(pin.rings) > 1 for ring in pin.rings]
    rounding = rounding_of(np.array([pin.at for pin in sheet.pins], dtype=np.complex128))
    return max(rounding, settings.tolerance or 0.0, *gaps, *apart)


def _named(
    sketch: Sketch,
    kinds: Sorted,
    sheet: Sheet,
    parts: Parts,
    names: PinNames,
    used: set[int],
    strand_handles: Sequence[str],
) -> Named:
    strands = sheet.strands
    frame_handles: defaultdict[int, dict[str, None]] = defaultdict(dict)
    on_frame: set[int] = set()
    if parts.bodies.bodies and parts.bodies.bodies[0].frame:
        on_frame = set(parts.bodies.bodies[0].strands)
        for landing in parts.bodies.landings:
            if landing.strand in on_frame:
                frame_handles[landing.pin][strand_handles[landing.strand]] = None
    for site in used:
        pin = sheet.pins[site]
        if pin.frame is not None:
            frame_handles[site].update(dict.fromkeys(sketch.handles(ring) for ring in pin.rings))
    ring_handles = {index: sketch.handles(ring) for index, ring in kinds.pitch_rings}
    of_wheels = [tuple(dict.fromkeys(ring_handles[index] for index in body.wheels)) for body in parts.bodies.bodies]
    return Named(
        strand_handles=strand_handles,
        ring_handles=ring_handles,
        frame_strands=on_frame,
        pin_names=names.names,
        pin_keys={site: natural_key(name) for site, name in names.names.items()},
        labelled=frozenset(names.labels),
        body_handles=[
            tuple(dict.fromkeys((*(strand_handles[index] for index in body.strands), *rings))) if not body.frame else ()
            for body, rings in zip(parts.bodies.bodies, of_wheels, strict=True)
        ],
        body_layers=[
            strands[body.strands[0]].primitive.source.layer if body.strands else None for body in parts.bodies.bodies
        ],
        site_handles={
            site: tuple(dict.fromkeys(sketch.handles(ring) for ring in sheet.pins[site].rings)) for site in used
        },
        frame_handles={site: tuple(handles) for site, handles in frame_handles.items()},
        site_layers={site: sheet.pins[site].rings[0].source.layer for site in used},
    )


def _drawn_pieces(body: int | None, bodies: Sequence[Body], sheet: Sheet) -> list[tuple[Point, Point]]:
    """The straight pieces (chords, for arcs) a link is drawn with; none for the frame."""
    if body is None:
        return []
    pieces = [piece for index in bodies[body].strands for piece in sheet.strands[index].pieces]
    found: list[tuple[Point, Point]] = []
    for piece in pieces:
        if isinstance(piece, Arc):
            middle = arc_middle(piece)
            found.extend(((piece.start, middle), (middle, piece.end)))
        else:
            found.append((piece.start, piece.end))
    return found
