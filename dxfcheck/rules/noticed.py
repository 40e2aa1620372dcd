"""From what the loading noticed to findings: the words and places that such rules have in common."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence

from dxfcheck.drawing.primitives import Entity, Notice
from dxfcheck.geometry import Point
from dxfcheck.rules.finding import Finding, Severity
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.tolerances.findings import AMONG_LINKS_OF_DIAGONAL
from dxfcheck.tolerances.sheet import PLACES_NAMED

__all__ = ["about_entities", "about_notices", "among_links", "boxes", "linkage_handles", "noticed"]


def noticed(subject: RuleSubject, *kinds: str) -> list[Notice]:
    """The notices of those kinds, in drawing order."""
    return [notice for notice in subject.sketch.notices if notice.kind in kinds]


def about_notices(
    subject: RuleSubject, name: str, severity: Severity, notices: Sequence[Notice], message: str, remedy: str
) -> Iterator[Finding]:
    """One finding for all notices given, at the first of them that has a place; none where there are no notices."""
    if not notices:
        return
    numbers = [notice.entity for notice in notices if notice.entity is not None]
    entities = [subject.sketch.entities[number] for number in numbers[:PLACES_NAMED]]
    yield Finding(
        rule=name,
        severity=severity,
        message=message,
        remedy=remedy,
        at=next((notice.at for notice in notices if notice.at is not None), None),
        handles=tuple(entity.handle for entity in entities if entity.handle),
        layer=entities[0].layer if entities else None,
    )


def about_entities(name: str, severity: Severity, entities: Sequence[Entity], message: str, remedy: str) -> Finding:
    """A finding about one entity or more, at the first that has a place."""
    return Finding(
        rule=name,
        severity=severity,
        message=message,
        remedy=remedy,
        at=next((entity.at for entity in entities if entity.at is not None), None),
        handles=tuple(entity.handle for entity in entities[:PLACES_NAMED] if entity.handle),
        layer=entities[0].layer,
    )


def boxes(subject: RuleSubject) -> list[tuple[Point, Point]]:
    """Lower left and upper right of the box round each mechanism's pins, a little widened."""
    margin = AMONG_LINKS_OF_DIAGONAL * subject.sketch.diagonal * (1 + 1j)
    found = []
    for linkage, _ in subject.mechanisms:
        xs, ys = [pin.at.real for pin in linkage.pins], [pin.at.imag for pin in linkage.pins]
        if xs:
            found.append((complex(min(xs), min(ys)) - margin, complex(max(xs), max(ys)) + margin))
    return found


def among_links(at: Point | None, around: Iterable[tuple[Point, Point]]) -> bool:
    """Whether a place lies in one of the boxes; what has no place does not."""
    return at is not None and any(
        low.real <= at.real <= high.real and low.imag <= at.imag <= high.imag for low, high in around
    )


def linkage_handles(subject: RuleSubject) -> frozenset[str]:
    """Handles of the entities that links, the frame and pins of the mechanisms are drawn with."""
    linkages = [linkage for linkage, _ in subject.mechanisms]
    handles = {handle for linkage in linkages for link in linkage.links for handle in link.handles}
    handles.update(handle for linkage in linkages for pin in linkage.pins for handle in pin.handles)
    return frozenset(handles - {""})
