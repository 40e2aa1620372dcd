"""From a sketch to linkages, with the evidence, what looked wrong, and the account of every entity."""

from __future__ import annotations

from collections import Counter

from dxfcheck.drawing.primitives import Sketch
from dxfcheck.reading.lengths.observe_lengths import observe_lengths
from dxfcheck.reading.lines.sheet import Sheet, lay_out
from dxfcheck.reading.lines.sorting import Sorted, sort_primitives
from dxfcheck.reading.lines.tolerance import tolerance_for
from dxfcheck.reading.lines.touches import find_touches
from dxfcheck.reading.mechanisms.model import Model, make_model
from dxfcheck.reading.observations.missing_rings import observe_missing_rings
from dxfcheck.reading.observations.observe_ends import observe_ends
from dxfcheck.reading.observations.observe_joints import observe_joints
from dxfcheck.reading.observations.observe_lines import observe_lines
from dxfcheck.reading.observations.observe_sheet import observe_sheet
from dxfcheck.reading.observations.seen import Seen
from dxfcheck.reading.parts.parts import Parts, find_parts
from dxfcheck.reading.reading import Reading
from dxfcheck.reading.records.account import make_account
from dxfcheck.reading.records.evidence import linkage_evidence
from dxfcheck.reading.records.fates import fates_of
from dxfcheck.settings import Settings

__all__ = ["read_linkages"]


def read_linkages(sketch: Sketch, settings: Settings, *, with_evidence: bool = True) -> Reading:
    """Read a sketch by the reading rules of DEVELOPERS.md. Cost near-linear in its primitives.

    Without evidence it takes a tenth less time.
    """
    kinds = sort_primitives(sketch, settings.layers)
    tolerance = tolerance_for(sketch.diagonal, settings, [ring for _, ring in kinds.rings])
    sheet = lay_out(kinds, tolerance)
    parts = find_parts(kinds, sheet, settings)
    model = make_model(sketch, settings, kinds, sheet, parts)
    seen = _seen(kinds, sheet, parts, model)
    observations = (
        *observe_sheet(sketch, kinds, sheet, parts, model),
        *observe_ends(seen),
        *observe_lines(seen),
        *observe_joints(sketch, seen, parts),
        *observe_lengths(sketch, kinds, sheet.tolerance, model.linkages),
        *observe_missing_rings(seen, [text for _, text in kinds.texts], model.names),
        *model.driven.observations,
        *model.required.observations,
    )
    decided = (*model.driven.evidence, *model.required.evidence)
    return Reading(
        tolerance=tolerance.t,
        linkages=model.linkages,
        evidence=(*linkage_evidence(model, sheet, parts), *decided) if with_evidence else (),
        observations=observations,
        account=make_account(sketch, fates_of(sketch, kinds, sheet, parts, model)),
        requirements=model.required.requirements,
    )


def _seen(kinds: Sorted, sheet: Sheet, parts: Parts, model: Model) -> Seen:
    bodies_at = Counter(site for body in parts.bodies.bodies for site in body.pins)
    sliding = {pair for contact in parts.contacts for pair in (contact.bodies, contact.bodies[::-1])}
    owners = [
        (body, link.name, each.linkage.name)
        for each in model.assembled
        for body, link in zip(each.bodies, each.linkage.links, strict=True)
        if body is not None
    ]
    drawn = sorted(strand for body in parts.bodies.bodies if not body.frame for strand in body.strands)
    shaped = {strand for box in parts.slides.boxes for strand in box.strands}
    shaped.update(strand for slot in parts.slots for strand in (*slot.strands, *slot.block))
    guides = {strand for slide in parts.slides.slides for strand in slide.guide.strands}
    guides.update(parts.slides.inside, parts.welds)
    return Seen(
        strands=sheet.strands,
        gaps=find_touches(sheet.linework, sheet.tolerance, sheet.tolerance.missing, drawn),
        sites=sheet.sites,
        landings=parts.landings,
        misses=[miss for miss in sheet.landings.misses if miss.strand not in parts.closed],
        bodies=parts.bodies,
        body_names={body: link for body, link, _ in owners},
        mechanisms={body: mechanism for body, _, mechanism in owners},
        pin_names=dict(model.names.names),
        site_mechanisms={site: each.linkage.name for each in model.assembled for site in each.sites},
        body_of={strand: number for number, body in enumerate(parts.bodies.bodies) for strand in body.strands},
        sliding=frozenset(sliding),
        shared=frozenset(site for site, count in bodies_at.items() if count > 1),
        shaped=parts.closed.union(shaped),
        boxes=parts.slides.boxes,
        guides=frozenset(guides | kinds.racks),
        wheels=dict(kinds.pitch_rings),
        idle=frozenset({*parts.marks, *parts.symbols.strokes, *parts.borders, *sheet.ring_strands, *shaped}),
        handles=model.strand_handles,
        tolerance=sheet.tolerance,
    )
