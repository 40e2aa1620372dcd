"""What looks wrong about slides, slots and rolling contacts, with the names of pins and links."""

from __future__ import annotations

from collections.abc import Iterator

from dxfcheck.drawing.primitives import Sketch
from dxfcheck.reading.observations.seen import Seen, pin_name
from dxfcheck.reading.parts.parts import Parts
from dxfcheck.reading.reading import Observation
from dxfcheck.reading.shapes.contact import Oddity

__all__ = ["observe_joints"]


OF_LINKAGES = frozenset({"block-without-guide"})
"""Kinds that say nothing where the pin is no linkage's: a plate with one hole is no block."""


AT_THE_PIN = frozenset({"off-centre-ring"})
"""Kinds of which what lies elsewhere belongs on the pin's centre."""


def observe_joints(sketch: Sketch, seen: Seen, parts: Parts) -> Iterator[Observation]:
    """The oddities of the joints of linkages, and of what would have been one."""
    for oddity in parts.oddities:
        site = oddity.site
        if site is not None and site not in seen.pin_names and not oddity.rings:
            continue  # on a hole or ring that carries no link
        mechanism = seen.mechanisms.get(oddity.body) if oddity.body is not None else None
        if mechanism is None and site is not None:
            mechanism = seen.site_mechanisms.get(site)
        if mechanism is None and oddity.kind in OF_LINKAGES:
            continue
        handles = [seen.handles[strand] for strand in oddity.strands]
        handles += [sketch.handles(sketch.primitives[ring]) for ring in oddity.rings]
        yield Observation(
            kind=oddity.kind,
            at=oddity.at,
            handles=tuple(dict.fromkeys(handles)),
            layer=_layer(sketch, seen, oddity),
            amount=oddity.amount,
            limit=oddity.limit,
            subject=pin_name(seen, site) if site in seen.pin_names else seen.body_names.get(oddity.body or -1, ""),
            detail=oddity.detail,
            mechanism=mechanism,
            severity=oddity.severity,
            case=oddity.case,
            snap=seen.sites.pins[site].at if site is not None and oddity.kind in AT_THE_PIN else None,
        )


def _layer(sketch: Sketch, seen: Seen, oddity: Oddity) -> str | None:
    if oddity.strands:
        return seen.strands[oddity.strands[0]].primitive.source.layer
    return sketch.primitives[oddity.rings[0]].source.layer if oddity.rings else None
