"""Rules on what was left out of the reading: hidden linework, and kinds of entities that are not read."""

from __future__ import annotations

from collections import Counter, defaultdict
from collections.abc import Iterator, Sequence
from typing import NamedTuple

from dxfcheck.drawing.fates import EXTERNAL, HIDDEN, OFF_PLANE, UNDERLAY
from dxfcheck.drawing.primitives import Entity, Source
from dxfcheck.geometry import Point
from dxfcheck.reading.lines.roles import construction_reason
from dxfcheck.rules.finding import Finding
from dxfcheck.rules.noticed import about_entities, among_links, boxes, noticed
from dxfcheck.rules.registry import rule
from dxfcheck.rules.settings_and_sources import CONSTRUCTION
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.rules.wording import listed, place, plural

__all__: list[str] = []

LINEWORK_TYPES = frozenset({"LINE", "CIRCLE", "ARC", "ELLIPSE", "LWPOLYLINE", "POLYLINE", "SPLINE", "INSERT"})
HIDDEN_REASONS = frozenset(fate.why for fate in HIDDEN)
TOLD_BY_OTHER_RULES = frozenset({OFF_PLANE, EXTERNAL, UNDERLAY})


@rule(
    "hidden-linework",
    "warning",
    "Linework on a layer that is off or frozen",
    family="exchange",
    also=("note",),
    looks_for="Lines, arcs, rings or blocks that are invisible or lie on a layer that is off or frozen, but on no "
    "layer of construction linework: a note where all of it lies away from the links that were read.",
    matters="They are not read. If a link lies there, the mechanism that is checked is not the one that is meant.",
    remedy="Turn the layer on if it belongs to the linkage, or delete it.",
    settings=CONSTRUCTION,
    source="layer states and group code 60 (DXF Reference, from memory)",
)
def hidden_linework(subject: RuleSubject) -> Iterator[Finding]:
    """Hidden linework, a finding a layer and reason."""
    hidden: defaultdict[tuple[str, str], list[Entity]] = defaultdict(list)
    for entity in subject.sketch.entities:
        if entity.fate is not None and entity.type in LINEWORK_TYPES and entity.fate.why in HIDDEN_REASONS:
            hidden[entity.layer, entity.fate.why].append(entity)
    for notice in noticed(subject, "hidden-part"):
        if notice.entity is not None and notice.detail in HIDDEN_REASONS:
            entity = subject.sketch.entities[notice.entity]
            hidden[entity.layer, f"{notice.detail} inside the block reference"].append(entity)
    around = boxes(subject) if hidden else []
    for (layer, why), entities in hidden.items():
        if construction_reason(Source(0, "", layer, "", ()), subject.settings.layers) is not None:
            continue
        near = not around or any(entity.at is None or among_links(entity.at, around) for entity in entities)
        where = "" if near else ", away from the links,"
        yield about_entities(
            "hidden-linework",
            "warning" if near else "note",
            entities,
            f"{plural(len(entities), 'entity')} on layer {layer}{where} not read: {why}",
            "turn the layer on if it belongs to the linkage, else delete what is on it",
        )


class _Unread(NamedTuple):
    """Entities left unread for one reason: their kind as counted in a message, why, and where the first lies."""

    kind: str
    why: str
    entity: Entity
    at: Point | None
    among: bool


@rule(
    "unread-entity",
    "warning",
    "An entity that is not read",
    family="exchange",
    also=("note",),
    looks_for="Entities of a kind that is not read (splines, solids, proxies ...), or that cannot be read as they are: "
    "a warning, by kind, where they lie among the links; one note for all that lie elsewhere.",
    matters="If it is part of the linkage, the mechanism that is checked is not the one that is meant.",
    remedy="Redraw it with lines, arcs and circles, or move it off the linkage.",
)
def unread_entity(subject: RuleSubject) -> Iterator[Finding]:
    """Entities left unread: those among the links by kind and reason, the others together."""
    unread = list(_unread(subject))
    kinds: defaultdict[tuple[str, str], list[_Unread]] = defaultdict(list)
    for each in unread:
        if each.among:
            kinds[each.kind, each.why].append(each)
    remedy = "redraw with lines, arcs and circles if part of the linkage"
    for (kind, why), members in kinds.items():
        places = [place(each.at) for each in members if each.at is not None]
        where = f"among the links at {listed(places, 3)}" if places else "on a layer of links"
        message = f"{_counted(kind, len(members))} {where} ({_layers(members)}) not read" + (f": {why}" if why else "")
        yield about_entities("unread-entity", "warning", [each.entity for each in members], message, remedy)
    others = [each for each in unread if not each.among]
    if others:
        counts = Counter(each.kind for each in others)
        said = listed([_counted(kind, count) for kind, count in counts.most_common()], 5)
        reasons = listed(list(dict.fromkeys(each.why for each in others if each.why)), 3)
        where = "elsewhere on the sheet" if subject.mechanisms else "on the sheet"
        message = f"{said} {where} ({_layers(others)}) not read" + (f": {reasons}" if reasons else "")
        yield about_entities("unread-entity", "note", [each.entity for each in others], message, remedy)


def _unread(subject: RuleSubject) -> Iterator[_Unread]:
    left = [entity for entity in subject.sketch.entities if entity.fate is not None and entity.fate.read_as == "unread"]
    parts = noticed(subject, "unread-part", "block-cycle", "block-missing")
    if not left and not parts:
        return
    around = boxes(subject)
    link_layers = {link.layer for linkage, _ in subject.mechanisms for link in linkage.links}
    for entity in left:
        fate = entity.fate
        if fate is not None and fate not in TOLD_BY_OTHER_RULES:
            among = among_links(entity.at, around) if entity.at is not None else entity.layer in link_layers
            why = "" if fate.why == f"{entity.type} is not read" else fate.why
            yield _Unread(entity.type, why, entity, entity.at, among)
    for notice in parts:
        if notice.entity is not None and subject.sketch.entities[notice.entity].fate is None:
            entity = subject.sketch.entities[notice.entity]
            among = among_links(notice.at, around)
            yield _Unread("parts of a block reference", notice.detail, entity, notice.at, among)


def _counted(kind: str, count: int) -> str:
    """'2 SPLINE' with the kind as the file names it; what is no kind of entity speaks for itself."""
    return f"{count} {kind}" if kind.isupper() else kind


def _layers(members: Sequence[_Unread]) -> str:
    return f"layer {listed(list(dict.fromkeys(each.entity.layer for each in members)), 3)}"
