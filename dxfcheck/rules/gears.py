"""Rules on pitch circles and racks: tangency, what they turn about, whose they are and what holds them together."""

from __future__ import annotations

from collections.abc import Iterator

from dxfcheck.rules.finding import Finding
from dxfcheck.rules.observed import at_pin, figured, finding, moved, of_linkages
from dxfcheck.rules.registry import rule
from dxfcheck.rules.settings_and_sources import FRAME, GEARING, PITCH, TOLERANCE
from dxfcheck.rules.subject import RuleSubject

__all__: list[str] = []


@rule(
    "off-tangency",
    "warning",
    "Pitch circles that miss tangency",
    family="linework",
    also=("error",),
    looks_for="Two pitch circles, or one and a rack, that miss tangency by more than 0.25 % of the smaller radius, "
    "whether they gap or overlap: a warning up to 3 %, where they are read as rolling; an error up to 15 %, where "
    "they are not, if one of them rolls on nothing else.",
    matters="Centre distance and radii contradict one another, so the ratio or the pose is not the one meant; where "
    "they are not read as rolling, the count is one too high.",
    remedy="Make the centre distance the sum of the radii (their difference, if one lies inside the other).",
    settings=TOLERANCE + "; " + PITCH,
    source=GEARING,
)
def off_tangency(subject: RuleSubject) -> Iterator[Finding]:
    """Pitch circles and racks that gap or overlap."""
    for seen in of_linkages(subject, "off-tangency"):
        message = figured(seen, subject.sketch.unit)
        yield finding(seen, "warning", message, "correct the radius, or move a centre, so that they are tangent")


@rule(
    "off-centre-ring",
    "warning",
    "A pitch circle off the centre of its pin",
    family="linework",
    looks_for="A pitch circle whose centre is further from a pin than the coincidence tolerance, but within 2 % of its "
    "radius.",
    matters="It is read as about the pin; if it is meant as it is drawn, the wheel runs out of true.",
    remedy="Move the circle onto the pin's centre.",
    settings=TOLERANCE + "; " + PITCH,
)
def off_centre_ring(subject: RuleSubject) -> Iterator[Finding]:
    """Pitch circles beside the centres of their pins."""
    for seen in of_linkages(subject, "off-centre-ring"):
        message = f"{at_pin(seen)}{figured(seen, subject.sketch.unit)}"
        yield finding(seen, "warning", message, moved(seen, "the circle's centre", subject.reading.tolerance))


@rule(
    "wheel-pin",
    "warning",
    "A pitch circle that turns about nothing",
    family="linework",
    looks_for="A pitch circle that touches another, with no pin at its centre, and is no part of the frame.",
    matters="It is not read: the wheel and its rolling contact are missing from the count.",
    remedy="Draw a pin at its centre, or put it on a layer FRAME if it stands still.",
    settings=PITCH,
)
def wheel_pin(subject: RuleSubject) -> Iterator[Finding]:
    """Pitch circles without a pin."""
    for seen in of_linkages(subject, "wheel-pin"):
        remedy = "draw a pin at its centre, or put it on a layer FRAME if it stands still"
        yield finding(seen, "warning", figured(seen, subject.sketch.unit), remedy)


@rule(
    "wheel-owner",
    "warning",
    "A pitch circle that could belong to several links",
    family="structure",
    also=("note",),
    looks_for="A pitch circle of which nothing drawn tells whether a link pinned at its centre, the frame or neither "
    "turns with it; a note where it is read as free to turn on the one link that pushes it.",
    matters="A gear that is fast on a link turns that link; one that is loose on it does not.",
    remedy="Draw a spoke from the link's line to the circle, or both in one block; nothing if it is as read.",
    settings=PITCH + "; " + FRAME,
)
def wheel_owner(subject: RuleSubject) -> Iterator[Finding]:
    """Pitch circles whose link had to be chosen."""
    for seen in of_linkages(subject, "wheel-owner"):
        message = f"{at_pin(seen)}{figured(seen, subject.sketch.unit)}"
        remedy = "if that is wrong, draw a spoke from the circle to the link that it is part of"
        yield finding(seen, "warning", message, remedy)


@rule(
    "shared-axis",
    "warning",
    "Pitch circles about one pin that may or may not turn together",
    family="structure",
    looks_for="Two pitch circles about one pin, with no line that touches both, no common block and no link that "
    "tells.",
    matters="A compound wheel and two loose wheels give different counts and speeds.",
    remedy="Draw a spoke that touches both circles if they turn together; a link of its own to each if they do not.",
    settings=PITCH + "; " + FRAME,
)
def shared_axis(subject: RuleSubject) -> Iterator[Finding]:
    """Pitch circles about one pin."""
    for seen in of_linkages(subject, "shared-axis"):
        message = f"{at_pin(seen)}{figured(seen, subject.sketch.unit)}"
        remedy = "draw a spoke that touches both circles if they turn together, else one from each to its own link"
        yield finding(seen, "warning", message, remedy)


@rule(
    "gear-centres",
    "warning",
    "Pitch circles that nothing holds together",
    family="structure",
    looks_for="Two pitch circles that roll on one another while no link, nor the frame, has a pin at both centres; a "
    "rack that no slide along it holds to its wheel.",
    matters="The two can draw apart: the count is then one higher than that of a gear pair on an arm.",
    remedy="Draw the arm that joins the two centres, or the slide that leads the rack.",
    settings=PITCH + "; " + FRAME,
    source=GEARING,
)
def gear_centres(subject: RuleSubject) -> Iterator[Finding]:
    """Rolling contacts that nothing holds closed."""
    for seen in of_linkages(subject, "gear-centres"):
        if seen.case == "rack":
            remedy = "draw the slide that leads the rack along its pitch line"
        else:
            remedy = "draw a link with a pin at both centres, or fix both pins to the frame"
        yield finding(seen, "warning", f"{at_pin(seen)}{figured(seen, subject.sketch.unit)}", remedy)
