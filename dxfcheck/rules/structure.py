"""Rules on the mechanism as a structure: frame, count, freedom at the pose."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace

from dxfcheck.analysis.results import Analysis
from dxfcheck.drawing.fates import PAPER_SPACE
from dxfcheck.linkage import Linkage
from dxfcheck.rules.fault_wording import dependent_words, link_names, one_of
from dxfcheck.rules.finding import Finding, Severity
from dxfcheck.rules.limit_wording import stated_where
from dxfcheck.rules.registry import rule
from dxfcheck.rules.settings_and_sources import CONSTRUCTION, FRAME, MOBILITY, SYMBOLS, TOLERANCE
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.rules.wording import plural
from dxfcheck.tolerances.analysis import RANK_DOUBTFUL

__all__: list[str] = []


def _doubt(analysis: Analysis) -> str:
    """What to add where lengths that are nearly special make the freedom at the pose doubtful."""
    if analysis.rank_gap is None or analysis.rank_gap[0] >= RANK_DOUBTFUL:
        return ""
    return f"; barely so: its lengths are within about {100 * analysis.rank_gap[0]:.1g} % of ones that move"


def _about(linkage: Linkage, name: str, severity: Severity, message: str, remedy: str) -> Finding:
    """A finding about a whole mechanism, placed at its leftmost pin."""
    at = min((pin.at for pin in linkage.pins), key=lambda place: (place.real, place.imag), default=None)
    return Finding(rule=name, severity=severity, message=message, remedy=remedy, at=at, mechanism=linkage.name)


@rule(
    "no-linkage",
    "note",
    "No linkage on the sheet",
    family="structure",
    looks_for="A drawing in which nothing joins a link to a frame and no link has two pins shared with others.",
    matters="There is nothing to count; drawings of other trades look alike, so this is no error.",
    remedy="Nothing, if none was meant; else draw pins as rings, links to the rings, and a frame.",
    settings=FRAME + "; " + CONSTRUCTION,
)
def no_linkage(subject: RuleSubject) -> Iterator[Finding]:
    """Drawings without a linkage."""
    drawn = any(entity.fate != PAPER_SPACE for entity in subject.sketch.entities)
    for seen in subject.reading.observations if drawn else ():
        if seen.kind == "no-linkage":
            shown = (
                f"; it shows {seen.detail}, which are not read: nothing joins them to links on a frame"
                if seen.detail
                else ""
            )
            yield Finding(
                rule="no-linkage",
                severity="note",
                message="the drawing holds no linkage: nothing joins a link to a frame, and no link has two shared pins"
                + shown,
                remedy="if one was meant: draw pins as rings, lines ending on them, a frame (layer FRAME or hatching), "
                "pitch circles on a layer PITCH",
            )


@rule(
    "no-frame",
    "error",
    "A mechanism without a frame",
    family="structure",
    also=("warning",),
    looks_for="Links that hang together by pins, none of which is on a frame: a warning where they hold one another "
    "still several times over and no pin has a label, as in a grid of lines with marks.",
    matters="Nothing is fixed, so no speed can be told; the count holds the longest link fixed.",
    remedy="Draw the frame on a layer FRAME, put frame symbols under the fixed pins, or name them with --frame.",
    settings=FRAME,
    source=SYMBOLS,
)
def no_frame(subject: RuleSubject) -> Iterator[Finding]:
    """Mechanisms that hang on nothing."""
    grids = {
        linkage.name
        for linkage, analysis in subject.mechanisms
        if analysis.mobility.count < 0 and not any(pin.labelled for pin in linkage.pins)
    }
    for seen in subject.reading.observations:
        if seen.kind == "no-frame":
            yield Finding(
                rule="no-frame",
                severity="warning" if seen.mechanism in grids else "error",
                message=f"no pin of {seen.mechanism} is on a frame: {seen.subject} is held for the count, no speeds",
                remedy="put the fixed pins on a layer FRAME or on hatched base lines, or name them: --frame A,D",
                at=seen.at,
                mechanism=seen.mechanism,
            )


@rule(
    "unknown-frame-pin",
    "error",
    "A stated frame pin that is not there",
    family="structure",
    looks_for="A pin named by --frame that no pin of the drawing bears.",
    matters="The pin meant is not fixed, and the mechanism is another one.",
    remedy="Name the pins as the report does; `dxfcheck read` lists them.",
    settings="reading.frame-pins, or --frame",
)
def unknown_frame_pin(subject: RuleSubject) -> Iterator[Finding]:
    """Names in --frame or in the settings that fit no pin."""
    for seen in subject.reading.observations:
        if seen.kind == "unknown-frame-pin":
            known = f"; {seen.detail}" if seen.detail else ""
            yield Finding(
                rule="unknown-frame-pin",
                severity="error",
                message=f"no pin is called {seen.subject}{known}",
                remedy="name a pin of the drawing, with --frame or in the settings file (frame-pins)",
            )


@rule(
    "floating-group",
    "warning",
    "Linework that hangs on nothing",
    family="structure",
    looks_for="Lines with no pin on them on a layer that carries links, and links that hang on no linkage; one finding "
    "a drawing, with the first ten places.",
    matters="A link whose ends both miss their pins looks like this.",
    remedy="Join them to the linkage, or move them to a layer of their own.",
    settings=TOLERANCE + "; " + CONSTRUCTION,
)
def floating_group(subject: RuleSubject) -> Iterator[Finding]:
    """Linework on link layers that is part of no linkage."""
    for seen in subject.reading.observations:
        if seen.kind == "floating-group":
            count = int(seen.amount or 0)
            hang = "hangs" if count == 1 else "hang"
            yield Finding(
                rule="floating-group",
                severity="warning",
                message=f"{plural(count, 'piece')} of linework on link layers {hang} on no linkage: {seen.detail}",
                remedy="join them to their pins, or move them to a layer of their own",
                at=seen.at,
                handles=seen.handles,
                layer=seen.layer,
            )


@rule(
    "no-motion",
    "error",
    "A structure that cannot move",
    family="structure",
    looks_for="A mechanism on a frame with a count of 0 and no freedom at the drawn pose.",
    matters="It is a structure: the crank will not turn.",
    remedy="Take out a link or add a joint, unless a structure was meant.",
    settings=FRAME,
    source=MOBILITY,
)
def no_motion(subject: RuleSubject) -> Iterator[Finding]:
    """Mechanisms with count 0 and no freedom."""
    for linkage, analysis in subject.mechanisms:
        mobility = analysis.mobility
        if linkage.grounded and mobility.at_pose == 0 and mobility.count == 0:
            message = f"{linkage.name} cannot move: the count is 0, with no freedom at the drawn pose{_doubt(analysis)}"
            to_go = link_names(linkage, [link for part in analysis.locked_parts for link in part.links_to_go])
            remedy = f"take out {one_of(to_go) if to_go else 'a link'} or free a joint, unless it is meant so"
            yield _about(linkage, "no-motion", "error", message, remedy)


@rule(
    "over-constrained",
    "error",
    "More joints than the links can bear",
    family="structure",
    looks_for="A mechanism with a count below 0 and no freedom at the drawn pose.",
    matters="It is stiff several times over: it fits together only while lengths are exact, and cannot move.",
    remedy="Take out links or joints until the count is the number of drives.",
    settings=FRAME,
    source=MOBILITY,
)
def over_constrained(subject: RuleSubject) -> Iterator[Finding]:
    """Mechanisms with a negative count and no freedom."""
    for linkage, analysis in subject.mechanisms:
        mobility = analysis.mobility
        if linkage.grounded and mobility.at_pose == 0 and mobility.count < 0:
            said, going = dependent_words(linkage, analysis.dependent_joints)
            message = (
                f"{linkage.name} is over-constrained: the count is {mobility.count}, "
                f"{plural(-mobility.count, 'constraint')} more than hold it still{f'; {said}' if said else ''}"
            )
            remedy = f"take out {going or 'links or joints that repeat a constraint'}"
            if going:
                remedy += f"; {1 - mobility.count} such let it move"
            yield _about(linkage, "over-constrained", "error", message, remedy)


@rule(
    "expected-mobility",
    "error",
    "Another mobility than stated",
    family="structure",
    looks_for="A mechanism whose count differs from the one expected with --expect-mobility, in the settings, or by a "
    "note such as 'M = 1', 'F = 1' or 'mobility 1'.",
    matters="What is drawn is not what was designed.",
    remedy="Look for a link or joint too many or too few.",
    settings="expect.mobility, or --expect-mobility",
    source=MOBILITY,
)
def expected_mobility(subject: RuleSubject) -> Iterator[Finding]:
    """Counts that differ from the expected one."""
    linkages = {linkage.name: linkage for linkage, _ in subject.mechanisms}
    for verdict in subject.judged.verdicts:
        if verdict.quantity != "mobility" or verdict.outcome != "broken":
            continue
        stated, linkage = verdict.requirement, linkages[verdict.mechanism]
        message = f"the count of {linkage.name} is {verdict.actual:g}, stated was {verdict.bounds.expected:g}"
        message += f" {stated_where(stated).removeprefix('set ')}" if stated.source == "note" else ""
        found = _about(linkage, "expected-mobility", "error", message, "look for a link or joint too many or too few")
        yield replace(found, at=found.at if stated.at is None else stated.at, handles=stated.handles or found.handles)
