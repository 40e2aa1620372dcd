"""Rules on what a mechanism is held against: limits on speeds and ratios, expected speeds."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterator

from dxfcheck.requirements.verdict import Verdict
from dxfcheck.rules.finding import Finding
from dxfcheck.rules.limit_findings import limit_findings
from dxfcheck.rules.limit_wording import stated_where
from dxfcheck.rules.observed import finding, observed
from dxfcheck.rules.registry import rule
from dxfcheck.rules.settings_and_sources import DRIVES, UNITS
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.rules.wording import plural

__all__: list[str] = []

_UNCHECKED = " A speed that is not settled at the drawn pose is a warning, as it could not be held against its limit."


@rule(
    "pin-speed",
    "error",
    "A pin that runs too fast",
    family="limits",
    also=("warning",),
    looks_for="A pin whose speed at the drawn pose lies beyond a limit of a note, as 'v_C <= 2 m/s', or of the "
    f"settings.{_UNCHECKED}",
    matters="What the pin carries is moved faster than was allowed for.",
    remedy="Run the drive slower, or change the lengths, or the limit.",
    settings="limits.pin-speed",
)
def pin_speed(subject: RuleSubject) -> Iterator[Finding]:
    """Pins beyond their limits."""
    yield from limit_findings(subject, "pin-speed")


@rule(
    "slide-speed",
    "error",
    "A slide that runs too fast",
    family="limits",
    also=("warning",),
    looks_for="A block on its guide, a telescope, or a pin in its slot whose sliding speed at the drawn pose lies "
    "beyond a limit of a note, as 'v_EF <= 50 mm/s' or 'sliding speed of block at E max 0.2 m/s', or of the "
    f"settings.{_UNCHECKED}",
    matters="Guides and seals are made for a greatest speed.",
    remedy="Run the drive slower, or change the lengths, or the limit.",
    settings="limits.slide-speed",
)
def slide_speed(subject: RuleSubject) -> Iterator[Finding]:
    """Slides beyond their limits."""
    yield from limit_findings(subject, "slide-speed")


@rule(
    "rubbing-speed",
    "error",
    "A pin that rubs too fast",
    family="limits",
    also=("warning",),
    looks_for="A pin at which the rubbing speed (its radius times the speed at which its links turn on one another) "
    f"lies beyond a limit of a note, as 'rubbing speed at B <= 0.1 m/s', or of the settings.{_UNCHECKED}",
    matters="Plain bearings wear and heat with the rubbing speed.",
    remedy="Make the pin thinner, or run the drive slower.",
    settings="limits.rubbing-speed",
    source="rubbing speed: Khurmi and Gupta, Theory of Machines, ch. 7",
)
def rubbing_speed(subject: RuleSubject) -> Iterator[Finding]:
    """Pins that rub beyond their limits."""
    yield from limit_findings(subject, "rubbing-speed")


@rule(
    "link-speed",
    "error",
    "A link that turns too fast",
    family="limits",
    also=("warning",),
    looks_for="A link whose speed of turning, against the frame or against another link, lies beyond a limit of a "
    f"note, as 'n_CD <= 120 rpm' or 'ω_AB against BC max 5 rad/s', or of the settings.{_UNCHECKED}",
    matters="Motors, bearings and whatever the link carries are made for a greatest speed.",
    remedy="Run the drive slower, or change the lengths, or the limit.",
    settings="limits.link-speed",
)
def link_speed(subject: RuleSubject) -> Iterator[Finding]:
    """Links beyond their limits."""
    yield from limit_findings(subject, "link-speed")


@rule(
    "speed-ratio",
    "error",
    "A ratio of speeds other than stated",
    family="limits",
    also=("warning",),
    looks_for="Two links whose speeds of turning at the drawn pose have another ratio than a note, as 'ω_CD/ω_AB = 0.5 "
    "± 2 %', or the settings state. It is held by its size, unless it was stated with a sign. Where no tolerance is "
    "stated it is 0.5 %. A ratio that is not settled at the drawn pose is a warning.",
    matters="The lengths, or the numbers of teeth, are not those that were designed.",
    remedy="Look for a wrong length or pitch circle, or state another ratio.",
    settings="expect.ratios",
)
def speed_ratio(subject: RuleSubject) -> Iterator[Finding]:
    """Ratios beyond their bounds."""
    yield from limit_findings(subject, "speed-ratio")


@rule(
    "expected-speed",
    "error",
    "A speed other than expected",
    family="limits",
    also=("warning",),
    looks_for="A pin, link or slide whose speed at the drawn pose differs from the one that a note, as 'v_C = 0.35 m/s "
    "± 1 %', or the settings expect. Turning is held with its sense, counter-clockwise positive. Where the settings "
    "state no tolerance it is 0.5 %. A speed that is not settled at the drawn pose is a warning.",
    matters="What is drawn does not run as it was designed to.",
    remedy="Look for a wrong length, pose or drive, or state another speed.",
    settings="expect.speeds",
)
def expected_speed(subject: RuleSubject) -> Iterator[Finding]:
    """Speeds other than expected."""
    yield from limit_findings(subject, "expected-speed")


@rule(
    "unjudged-limit",
    "warning",
    "Limits on speeds that are only ratios",
    family="limits",
    looks_for="Limits and expected speeds of a mechanism whose drive is not stated, but assumed.",
    matters="Every speed is then a ratio to the assumed one, so the limits were not held against anything.",
    remedy="State the drive, by a note such as 'ω_AB = 4 rad/s' or with --drive; a note with a tolerance is an "
    "expected speed and no drive.",
    settings=DRIVES,
)
def unjudged_limit(subject: RuleSubject) -> Iterator[Finding]:
    """Mechanisms with limits and without a stated drive, a finding each."""
    assumed = {
        linkage.name for linkage, _ in subject.mechanisms if any(drive.source == "assumed" for drive in linkage.drives)
    }
    unjudged: defaultdict[str, list[Verdict]] = defaultdict(list)
    for verdict in subject.judged.verdicts:
        if verdict.outcome == "not judged" and not verdict.superseded and verdict.mechanism in assumed:
            unjudged[verdict.mechanism].append(verdict)
    for mechanism, verdicts in unjudged.items():
        first = verdicts[0].requirement
        count = len({id(verdict.requirement) for verdict in verdicts})
        yield Finding(
            rule="unjudged-limit",
            severity="warning",
            message=f"{plural(count, 'stated limit')} of {mechanism} not judged, as its drive is only "
            f"assumed; the first is {stated_where(first)}",
            remedy="state the drive by a note (without a tolerance) or with --drive",
            at=first.at,
            handles=first.handles,
            mechanism=mechanism,
        )


@rule(
    "limit-unit-assumed",
    "warning",
    "A limit on a drawing without units",
    family="limits",
    looks_for="A limit or expected speed in m/s, mm/s or in/s on a drawing whose length unit is not known.",
    matters="The figure is taken as so many of the drawing's own units a second: if those are another unit, the check "
    "is wrong by that factor.",
    remedy="State the unit: $INSUNITS in the drawing's header, or --units.",
    settings=UNITS,
)
def limit_unit_assumed(subject: RuleSubject) -> Iterator[Finding]:
    """Limits whose unit could not be brought to the drawing's, one finding a drawing."""
    held = [each for each in subject.judged.verdicts if each.unit_assumed and each.outcome in {"kept", "broken"}]
    if not held:
        return
    stated = list({id(each.requirement): each.requirement for each in held}.values())
    first = stated[0]
    figure = next(each for each in (first.expected, first.greatest, first.least) if each is not None)
    others = f", and {len(stated) - 1} more likewise" if len(stated) > 1 else ""
    yield Finding(
        rule="limit-unit-assumed",
        severity="warning",
        message=f"the drawing has no length unit: the speed {stated_where(first)} is taken as {figure.written:.6g} of "
        f"its units a second{others}",
        remedy="state the drawing's unit in its header ($INSUNITS) or with --units",
        at=first.at,
        handles=first.handles,
    )


@rule(
    "unknown-requirement",
    "error",
    "A limit or expectation that cannot be placed",
    family="limits",
    also=("warning", "note"),
    looks_for="A limit or an expected speed, ratio or mobility that names no part of the drawing, fits several, or "
    "contradicts itself: an error for one of the settings, a warning for one of a note and for a pattern that fits "
    "nothing, a note for a ratio 'i = 2.5' that names no links.",
    matters="It is held against nothing.",
    remedy="Name a pin, as 'v_C <= 2 m/s', a link by two of its pins, as 'n_CD <= 120 rpm', or move the note to it.",
)
def unknown_requirement(subject: RuleSubject) -> Iterator[Finding]:
    """What was stated of nothing that is there."""
    for seen in observed(subject, "unknown-requirement"):
        message = f"the note '{seen.subject}' is held against nothing: {seen.detail}"
        remedy = "name a pin, as in 'v_C <= 2 m/s', or a link by two of its pins, as in 'n_CD <= 120 rpm'"
        if seen.severity == "note":
            remedy = "name the links, or leave it if no ratio of this linkage is meant"
        yield finding(seen, "warning", message, remedy)
    for requirement, why, pattern in subject.judged.unmatched:
        about = f"{requirement.quantity} of {requirement.subject}"
        about += f" against {requirement.against}" if requirement.against else ""
        yield Finding(
            rule="unknown-requirement",
            severity="warning" if pattern else "error",
            message=f"the {about}, {stated_where(requirement)}, is held against nothing: {why}",
            remedy="name a part as dxfcheck read shows it, or state it for the drawings that have it",
        )
