"""Rules on the file as a whole: damage, an empty model space, units, and how far out the drawing lies."""

from __future__ import annotations

import math
from collections.abc import Iterator

from dxfcheck.drawing.fates import PAPER_SPACE
from dxfcheck.drawing.primitives import Notice
from dxfcheck.rules.finding import Finding
from dxfcheck.rules.noticed import about_notices, noticed
from dxfcheck.rules.observed import observed
from dxfcheck.rules.registry import rule
from dxfcheck.rules.settings_and_sources import TOLERANCE, UNITS
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.rules.wording import length, plural

__all__: list[str] = []


@rule(
    "damaged-file",
    "error",
    "A file that had to be repaired",
    family="exchange",
    looks_for="A DXF file that breaks the format's rules and was read only after repair, or that was cut off.",
    matters="Entities may be missing without a trace: what is reported is what could be saved, not what was drawn.",
    remedy="Export the drawing again, or open and save it in the program it was drawn with.",
    source="the structure of DXF files (DXF Reference, sections and group codes, from memory), as ezdxf checks it",
)
def damaged_file(subject: RuleSubject) -> Iterator[Finding]:
    """Repairs made on loading."""
    notices = noticed(subject, "recovered", "emptied")
    details = "; ".join(notice.detail for notice in notices)
    yield from about_notices(
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
    settings=UNITS,
    source="header variable $INSUNITS (DXF Reference, from memory)",
)
def units_missing(subject: RuleSubject) -> Iterator[Finding]:
    """Lengths without a unit."""
    if subject.sketch.unit.source == "assumed" and subject.mechanisms:
        said = next(observed(subject, "units-missing"), None)
        unit, to = (said.subject, f" to {said.subject}") if said is not None else ("mm", "")
        yield Finding(
            rule="units-missing",
            severity="warning",
            message="the drawing states no length unit: lengths and speeds are in drawing units"
            + (f" ({said.detail})" if said is not None else ""),
            remedy=f"set the drawing's unit{to}, or state it with --units {unit}",
        )


@rule(
    "far-from-origin",
    "warning",
    "A drawing far from the origin",
    family="exchange",
    looks_for="Coordinates more than a million times as large as the drawing itself: the digits they need are missing "
    "from its shapes.",
    matters="Ends that met when drawn no longer do, and speeds lose the same digits; programs that store fewer digits "
    "lose more.",
    remedy="Move the drawing near the origin in the program it was drawn with.",
    settings=TOLERANCE,
    source="IEEE 754 double precision, which DXF coordinates are read into",
)
def far_from_origin(subject: RuleSubject) -> Iterator[Finding]:
    """Coordinates that cost digits."""
    notices = noticed(subject, "far-from-origin")
    message = _digits_lost(subject, notices[0]) if notices else ""
    yield from about_notices(
        subject, "far-from-origin", "warning", notices, message, "move the drawing near the origin and save it again"
    )


def _digits_lost(subject: RuleSubject, notice: Notice) -> str:
    """How far out it lies, how many digits are left for the shapes, and the step between two coordinates there."""
    said = f"the drawing lies {notice.detail}"
    if notice.amount is None or subject.sketch.diagonal == 0.0:
        return f"{said}, so far that digits are lost"
    step = math.ulp(notice.amount)
    left = max(0, math.floor(math.log10(subject.sketch.diagonal / step)))
    unit = subject.sketch.unit
    met = "ends may no longer meet" if step > subject.reading.tolerance else "ends still meet"
    return (
        f"{said}: {left} of 16 digits are left for its shapes. Coordinates there go in steps of {length(step, unit)}; "
        f"ends count as meeting within {length(subject.reading.tolerance, unit)}, so {met}"
    )
