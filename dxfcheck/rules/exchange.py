"""Rules on the file and the sheet: damage, units, planes, and what was left out of the reading."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterator, Sequence

from dxfcheck.drawing.fates import EXTERNAL, HIDDEN, OFF_PLANE, PAPER_SPACE
from dxfcheck.drawing.primitives import Entity, Notice
from dxfcheck.geometry import Point
from dxfcheck.rules.finding import Finding, Severity
from dxfcheck.rules.registry import rule
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.rules.wording import listed, plural
from dxfcheck.tolerances import AMONG_LINKS_OF_DIAGONAL, PLACES_NAMED

__all__: list[str] = []

LINEWORK_TYPES = frozenset({"LINE", "CIRCLE", "ARC", "ELLIPSE", "LWPOLYLINE", "POLYLINE", "SPLINE", "INSERT"})


def _notices(subject: RuleSubject, *kinds: str) -> Iterator[Notice]:
    return (notice for notice in subject.sketch.notices if notice.kind in kinds)


def _from_notices(
    subject: RuleSubject, name: str, severity: Severity, notices: Sequence[Notice], message: str, remedy: str
) -> Iterator[Finding]:
    """One finding for all notices of a kind, at the first of them."""
    if notices:
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


@rule(
    "damaged-file",
    "error",
    "A file that had to be repaired",
    family="exchange",
    looks_for="A DXF file that breaks the format's rules and was read only after repair, or that was cut off.",
    matters="Entities may be missing without a trace: what is reported is what could be saved, not what was drawn.",
    remedy="Export the drawing again, or open and save it in the program it was drawn with.",
)
def damaged_file(subject: RuleSubject) -> Iterator[Finding]:
    """Repairs made on loading."""
    notices = list(_notices(subject, "recovered", "emptied"))
    details = "; ".join(notice.detail for notice in notices)
    yield from _from_notices(
        subject,
        "damaged-file",
        "error",
        notices,
        f"the file is damaged and was read as far as it could be saved: {details}",
        "export the drawing again from the program it was drawn with",
    )


@rule(
    "empty-model-space",
    "error",
    "Nothing drawn in model space",
    family="exchange",
    looks_for="A drawing whose model space holds no entity; what lies on paper layouts is not read.",
    matters="There is nothing to check, though the file may look full on paper.",
    remedy="Draw the linkage in model space, or move it there from the layout.",
)
def empty_model_space(subject: RuleSubject) -> Iterator[Finding]:
    """No entity outside paper layouts."""
    paper = [entity for entity in subject.sketch.entities if entity.fate == PAPER_SPACE]
    if len(paper) == len(subject.sketch.entities):
        held = f"; {plural(len(paper), 'entity')} on paper layouts {'is' if len(paper) == 1 else 'are'} not read"
        yield Finding(
            rule="empty-model-space",
            severity="error",
            message=f"model space is empty{held if paper else ''}",
            remedy="draw the linkage in model space, or move it there",
        )


@rule(
    "units-missing",
    "warning",
    "No length unit",
    family="exchange",
    looks_for="A drawing that holds a linkage and states no length unit in its header.",
    matters="Speeds come out in drawing units a second, which may be millimetres or inches.",
    remedy="Set the drawing's unit ($INSUNITS), or state it with --units.",
)
def units_missing(subject: RuleSubject) -> Iterator[Finding]:
    """Lengths without a unit."""
    if subject.sketch.unit.source == "assumed" and subject.mechanisms:
        yield Finding(
            rule="units-missing",
            severity="warning",
            message="the drawing states no length unit: lengths and speeds are in drawing units",
            remedy="set the drawing's unit, or state it with --units mm",
        )


@rule(
    "off-plane",
    "warning",
    "Linework off the plane of the sheet",
    family="exchange",
    looks_for="Entities at another z than the rest of the sheet, or in a tilted plane.",
    matters="They are left out of the reading: seen from above they seem to meet what they do not meet.",
    remedy="Flatten the drawing to one plane.",
)
def off_plane(subject: RuleSubject) -> Iterator[Finding]:
    """Entities that lie off the sheet."""
    notices = list(_notices(subject, "off-plane"))
    first = notices[0].detail if notices else ""
    message = f"{plural(len(notices), 'entity')} off the plane of the sheet left out of the reading; the first: {first}"
    yield from _from_notices(subject, "off-plane", "warning", notices, message, "move everything to one z, flat")


@rule(
    "mirrored-plane",
    "note",
    "Linework drawn seen from behind",
    family="exchange",
    looks_for="Entities whose plane faces away from the viewer (extrusion 0, 0, -1), as mirroring in 3D does it.",
    matters="Other programs may show or read them mirrored; here they are read where they truly lie.",
    remedy="Redraw or explode them if the next program shows them elsewhere.",
)
def mirrored_plane(subject: RuleSubject) -> Iterator[Finding]:
    """Entities with a mirrored plane."""
    notices = list(_notices(subject, "mirrored-plane"))
    message = f"{notices[0].detail}, seen from behind; read where they truly lie" if notices else ""
    yield from _from_notices(
        subject, "mirrored-plane", "note", notices, message, "redraw them if another program shows them mirrored"
    )


@rule(
    "uneven-scale",
    "warning",
    "A block scaled unevenly",
    family="exchange",
    looks_for="A block reference with different scales in x and y.",
    matters="Rings in it become ellipses, which are no pins, and angles and lengths change.",
    remedy="Insert the block with one scale, or redraw what it holds.",
)
def uneven_scale(subject: RuleSubject) -> Iterator[Finding]:
    """Block references with unequal scales."""
    notices = list(_notices(subject, "uneven-scale"))
    details = listed([notice.detail for notice in notices], 3)
    yield from _from_notices(
        subject, "uneven-scale", "warning", notices, details, "insert the block with equal scales, or redraw it"
    )


@rule(
    "outside-reference",
    "warning",
    "A reference to another file",
    family="exchange",
    looks_for="A block that stands for another drawing file.",
    matters="What it shows is not in this file and is not read.",
    remedy="Bind the reference into the drawing, or check the other file by itself.",
)
def outside_reference(subject: RuleSubject) -> Iterator[Finding]:
    """External references."""
    notices = list(_notices(subject, "outside-reference"))
    details = listed([notice.detail for notice in notices], 3)
    yield from _from_notices(
        subject, "outside-reference", "warning", notices, details, "bind the reference into the drawing"
    )


@rule(
    "far-from-origin",
    "warning",
    "A drawing far from the origin",
    family="exchange",
    looks_for="Coordinates so much larger than the drawing itself that digits are lost to them.",
    matters="Ends that met when drawn no longer do, and speeds lose the same digits.",
    remedy="Move the drawing near the origin in the program it was drawn with.",
)
def far_from_origin(subject: RuleSubject) -> Iterator[Finding]:
    """Coordinates that cost digits."""
    notices = list(_notices(subject, "far-from-origin"))
    message = f"the drawing lies {notices[0].detail}, so far that digits are lost" if notices else ""
    yield from _from_notices(
        subject, "far-from-origin", "warning", notices, message, "move the drawing near the origin and save it again"
    )


@rule(
    "hidden-linework",
    "warning",
    "Linework on a layer that is off or frozen",
    family="exchange",
    looks_for="Lines, arcs, rings or blocks that are invisible or lie on a layer that is off or frozen.",
    matters="They are not read. If a link lies there, the mechanism that is checked is not the one that is meant.",
    remedy="Turn the layer on if it belongs to the linkage, or delete it.",
)
def hidden_linework(subject: RuleSubject) -> Iterator[Finding]:
    """Hidden linework, a finding a layer and reason."""
    hidden: defaultdict[tuple[str, str], list[Entity]] = defaultdict(list)
    for entity in subject.sketch.entities:
        if entity.fate is not None and entity.type in LINEWORK_TYPES and entity.fate.why in HIDDEN_REASONS:
            hidden[entity.layer, entity.fate.why].append(entity)
    for notice in _notices(subject, "hidden-part"):
        if notice.entity is not None and notice.detail in HIDDEN_REASONS:
            entity = subject.sketch.entities[notice.entity]
            hidden[entity.layer, f"{notice.detail} inside the block reference"].append(entity)
    for (layer, why), entities in hidden.items():
        yield Finding(
            rule="hidden-linework",
            severity="warning",
            message=f"{plural(len(entities), 'entity')} on layer {layer} not read: {why}",
            remedy="turn the layer on if it belongs to the linkage, else delete what is on it",
            at=next((entity.at for entity in entities if entity.at is not None), None),
            handles=tuple(entity.handle for entity in entities[:PLACES_NAMED] if entity.handle),
            layer=layer,
        )


HIDDEN_REASONS = frozenset(fate.why for fate in HIDDEN)


@rule(
    "unread-entity",
    "warning",
    "An entity that is not read",
    family="exchange",
    also=("note",),
    looks_for="Entities of a kind that is not read (splines, solids, images ...), or that cannot be read as they are: "
    "a warning where one lies among the links, a note elsewhere.",
    matters="If it is part of the linkage, the mechanism that is checked is not the one that is meant.",
    remedy="Redraw it with lines, arcs and circles, or move it off the linkage.",
)
def unread_entity(subject: RuleSubject) -> Iterator[Finding]:
    """Entities left unread, a finding a type and reason and whether they lie among the links."""
    boxes = list(_boxes(subject))
    link_layers = {link.layer for linkage, _ in subject.mechanisms for link in linkage.links}
    unread: defaultdict[tuple[bool, str, str], list[Entity]] = defaultdict(list)
    for entity in subject.sketch.entities:
        if entity.fate is not None and entity.fate.read_as == "unread" and entity.fate not in TOLD_BY_OTHER_RULES:
            among = (
                any(_inside(entity.at, *box) for box in boxes) if entity.at is not None else entity.layer in link_layers
            )
            unread[among, entity.type, entity.fate.why].append(entity)
    for notice in _notices(subject, "unread-part", "block-cycle", "block-missing"):
        if notice.entity is not None and subject.sketch.entities[notice.entity].fate is None:
            among = notice.at is not None and any(_inside(notice.at, *box) for box in boxes)
            unread[among, "parts of a block reference", notice.detail].append(subject.sketch.entities[notice.entity])
    for (among, kind, why), entities in unread.items():
        what = f"{len(entities)} {kind}" if kind.isupper() else kind
        placed = any(entity.at is not None for entity in entities)
        where = ("among the links" if placed else "on a layer of links") if among else "elsewhere on the sheet"
        layers = listed(list(dict.fromkeys(entity.layer for entity in entities)), 3)
        yield Finding(
            rule="unread-entity",
            severity="warning" if among else "note",
            message=f"{what} {where} (layer {layers}) not read: {why}",
            remedy="redraw with lines, arcs and circles if part of the linkage",
            at=next((entity.at for entity in entities if entity.at is not None), None),
            handles=tuple(entity.handle for entity in entities[:PLACES_NAMED] if entity.handle),
            layer=entities[0].layer,
        )


TOLD_BY_OTHER_RULES = frozenset({OFF_PLANE, EXTERNAL})


def _boxes(subject: RuleSubject) -> Iterator[tuple[Point, Point]]:
    """Lower left and upper right of the box round each mechanism's pins, a little widened."""
    margin = AMONG_LINKS_OF_DIAGONAL * subject.sketch.diagonal * (1 + 1j)
    for linkage, _ in subject.mechanisms:
        xs, ys = [pin.at.real for pin in linkage.pins], [pin.at.imag for pin in linkage.pins]
        yield complex(min(xs), min(ys)) - margin, complex(max(xs), max(ys)) + margin


def _inside(at: Point, low: Point, high: Point) -> bool:
    return low.real <= at.real <= high.real and low.imag <= at.imag <= high.imag
