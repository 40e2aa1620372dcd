"""Rules on dimensions and stated lengths: what the sheet says against what is drawn."""

from __future__ import annotations

from collections.abc import Iterator

from dxfcheck.rules.finding import Finding
from dxfcheck.rules.observed import finding, observed
from dxfcheck.rules.registry import rule
from dxfcheck.rules.subject import RuleSubject

__all__: list[str] = []


@rule(
    "dimension-override",
    "warning",
    "A dimension text that disagrees with what it measures",
    family="dimensions",
    also=("note",),
    looks_for="A dimension whose text was written by hand and states another figure than the dimension measures, by "
    "more than half a unit of its last digit and beyond its own tolerance; letters and remarks without a figure are "
    "right. A note where the text is underlined or says that it is not to scale, and where all dimensions show a "
    "multiple of what is drawn.",
    matters="Links are made by the text, but checked, and their speeds worked out, by what is drawn.",
    remedy="Draw the link to its size and let the dimension measure it (text '<>'), or correct the text. Where the "
    "whole sheet is drawn to scale, draw it 1:1.",
    source="underlined dimensions are not to scale: ISO 129-1 (from memory); else common practice, no source",
)
def dimension_override(subject: RuleSubject) -> Iterator[Finding]:
    """Texts written over a measured figure."""
    for seen in observed(subject, "dimension-override"):
        if seen.severity == "note":
            remedy = "draw to full size if the speeds shall be those of the stated lengths"
        elif not seen.subject:
            remedy = "draw to full size, or write the unit behind the figures: speeds are worked out from what is drawn"
        else:
            remedy = "move the linework to the stated size, or let the dimension measure (text '<>')"
        yield finding(seen, "warning", seen.detail, remedy)


@rule(
    "dimension-off-geometry",
    "warning",
    "A dimension that no longer sits on the linework",
    family="dimensions",
    also=("note",),
    looks_for="A dimension with a point on no end, centre, line or rim, nor where lines would meet if drawn on: a "
    "warning where an end or centre lies near, a note where none does. Points near linework that was not read count "
    "as right. At most 50 such dimensions of a sheet are looked for; the last one says how many are left.",
    matters="The linework was moved and the dimension left behind: it shows the size before the change.",
    remedy="Snap the point back to the end or centre it belongs to, or delete the dimension.",
)
def dimension_off_geometry(subject: RuleSubject) -> Iterator[Finding]:
    """Points of dimensions on nothing."""
    for seen in observed(subject, "dimension-off-geometry"):
        remedy = "snap it to the end or centre it belongs to, or delete the dimension"
        yield finding(seen, "warning", seen.detail, remedy)


@rule(
    "stated-length",
    "warning",
    "A stated length that is not the drawn one",
    family="dimensions",
    looks_for="A note such as 'AB = 120 mm' that differs from the drawn distance of the two pins by more than half a "
    "unit of its last digit.",
    matters="Speeds are worked out from what is drawn; the part will be made by what is stated.",
    remedy="Correct the note, or move the pins to the stated distance.",
)
def stated_length(subject: RuleSubject) -> Iterator[Finding]:
    """Notes on the distance of two pins."""
    for seen in observed(subject, "stated-length"):
        yield finding(seen, "warning", seen.detail, "correct the note, or move a pin to the stated distance")
