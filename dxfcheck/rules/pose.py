"""Rules on the drawn pose: drives that cannot act, contradict one another or are missing, and dead centres."""

from __future__ import annotations

import math
from collections.abc import Iterator

from dxfcheck.analysis.results import Analysis, DeadCentre, DriveVerdict
from dxfcheck.linkage import Drive, Linkage
from dxfcheck.rules.finding import Finding
from dxfcheck.rules.observed import finding, observed
from dxfcheck.rules.registry import rule
from dxfcheck.rules.subject import RuleSubject

__all__: list[str] = []


def _drives(subject: RuleSubject, outcome: str) -> Iterator[tuple[Linkage, Analysis, Drive, DriveVerdict]]:
    for linkage, analysis in subject.mechanisms:
        for drive, verdict in zip(linkage.drives, analysis.drives, strict=True):
            if verdict.outcome == outcome:
                yield linkage, analysis, drive, verdict


def _place_of(linkage: Linkage, drive: Drive) -> complex | None:
    """Where the drive was stated, else the first fixed pin of its link."""
    if drive.at is not None:
        return drive.at
    pins = [linkage.pins[pin] for pin in linkage.links[drive.link].pins]
    return next((pin.at for pin in pins if pin.fixed), pins[0].at if pins else None)


def _about(linkage: Linkage, drive: Drive, name: str, message: str, remedy: str) -> Finding:
    return Finding(
        rule=name,
        severity="note" if name == "assumed-drive" else "error",
        message=message,
        remedy=remedy,
        at=_place_of(linkage, drive),
        handles=drive.handles or linkage.links[drive.link].handles,
        layer=linkage.links[drive.link].layer,
        mechanism=linkage.name,
    )


@rule(
    "assumed-drive",
    "note",
    "No drive is stated",
    family="pose",
    looks_for="A mechanism on a frame with no drive stated by note or option.",
    matters="The link with the shortest arm on the frame is taken to turn at 1 rad/s counter-clockwise: every speed is "
    "a ratio to that.",
    remedy="Write a note such as 'n = 60 rpm' beside the crank, or use --drive 'A-B = 60 rpm'.",
)
def assumed_drive(subject: RuleSubject) -> Iterator[Finding]:
    """Drives that were assumed."""
    for linkage, analysis in subject.mechanisms:
        for drive in linkage.drives:
            if drive.source == "assumed" and analysis.mobility.at_pose > 0:
                name = linkage.links[drive.link].name
                message = f"no drive is stated: {name} is taken to turn at 1 rad/s ccw, so every speed is a ratio"
                remedy = f"write a note such as 'n = 60 rpm' beside it, or use --drive '{name} = 60 rpm'"
                yield _about(linkage, drive, "assumed-drive", message, remedy)


@rule(
    "unknown-drive",
    "error",
    "A drive that cannot be placed",
    family="pose",
    looks_for="A drive note or option that names no link of the drawing, fits several, or contradicts itself.",
    matters="It is left out: speeds are those of other drives, or of an assumed one.",
    remedy="Name the link by two of its pins, as 'ω_AB = 4 rad/s', or move the note to its link.",
)
def unknown_drive(subject: RuleSubject) -> Iterator[Finding]:
    """Drive texts that fit no link."""
    for seen in observed(subject, "unknown-drive"):
        message = f"the drive '{seen.subject}' is left out: {seen.detail}"
        remedy = "name the link by two of its pins, as in 'ω_AB = 4 rad/s', or move the note to its link"
        yield finding(seen, "error", message, remedy)


@rule(
    "drive-unit-assumed",
    "warning",
    "A sliding speed on a drawing without units",
    family="pose",
    looks_for="A drive in m/s, mm/s or in/s, stated by note or option, on a drawing whose length unit is not known.",
    matters="The figure is taken as so many of the drawing's own units a second: if those are another unit, all "
    "speeds are wrong by that factor.",
    remedy="State the unit: $INSUNITS in the drawing's header, or --units.",
)
def drive_unit_assumed(subject: RuleSubject) -> Iterator[Finding]:
    """Sliding speeds whose unit could not be brought to the drawing's."""
    for seen in observed(subject, "drive-unit-assumed"):
        message = f"the drive '{seen.subject}': {seen.detail}"
        yield finding(seen, "warning", message, "state the drawing's unit in its header ($INSUNITS) or with --units")


@rule(
    "drive-conflict",
    "error",
    "Drives that contradict one another",
    family="pose",
    looks_for="A drive whose speed differs from the one that the constraints and the drives before it give.",
    matters="Both cannot be true at once; the later one is left out.",
    remedy="Delete one of the drives, or state the speed that fits.",
)
def drive_conflict(subject: RuleSubject) -> Iterator[Finding]:
    """Drives left out because they contradict others."""
    for linkage, _, drive, verdict in _drives(subject, "conflict"):
        name = linkage.links[drive.link].name
        fits = f"; the others give {verdict.implied:.5g} rad/s" if verdict.implied is not None else ""
        message = f"{name} is stated to turn at {drive.rate:.5g} rad/s, against the other drives{fits}; it is left out"
        yield _about(
            linkage, drive, "drive-conflict", message, "delete one of the drives, or state the speed that fits"
        )


@rule(
    "drive-at-limit",
    "error",
    "A drive that cannot act at the drawn pose",
    family="pose",
    looks_for="A driven link that the joints hold still at this pose, as a crank when coupler and rocker are in line.",
    matters="No speed of the drive is possible there: the drive stands at the end of its stroke.",
    remedy="Draw another pose, or drive another link.",
)
def drive_at_limit(subject: RuleSubject) -> Iterator[Finding]:
    """Drives that the constraints hold still."""
    for linkage, analysis, drive, _ in _drives(subject, "at limit"):
        if analysis.mobility.at_pose == 0:
            continue  # a structure: no-motion and over-constrained say so
        name = linkage.links[drive.link].name
        stated = "assumed drive" if drive.source == "assumed" else "stated drive"
        message = f"the {stated} of {name} cannot act at this pose: the joints hold {name} still"
        yield _about(linkage, drive, "drive-at-limit", message, "draw another pose, or drive another link")


@rule(
    "dead-centre",
    "warning",
    "Two links in line",
    family="pose",
    looks_for="A link in line with the one that would drive it, through their common pin, within 0.02 degrees.",
    matters="The one cannot drive the other there, and which way it goes on is not settled.",
    remedy="Draw another pose if this one is not meant, or make sure that something carries it over.",
)
def dead_centre(subject: RuleSubject) -> Iterator[Finding]:
    """Dead centres of the drawn pose."""
    for linkage, analysis in subject.mechanisms:
        if analysis.mobility.at_pose == 0:
            continue
        for centre in analysis.dead_centres:
            first, second = (linkage.links[link].name for link in centre.links)
            pin = linkage.pins[centre.pin]
            within = f"{pin.name}, within {math.degrees(centre.angle):.2g} deg"
            if centre.square:
                names = f"{first} and {second} push on one another square to the way they could go at {within}"
            else:
                names = f"{first} and {second} are in line at {within}"
            message = f"dead centre: {names}{_cannot_drive(linkage, centre)}"
            yield Finding(
                rule="dead-centre",
                severity="warning",
                message=message,
                remedy="draw another pose if this one is not meant",
                at=pin.at,
                handles=pin.handles,
                layer=pin.layer,
                mechanism=linkage.name,
            )


def _cannot_drive(linkage: Linkage, centre: DeadCentre) -> str:
    """Which of the two cannot drive which, where that is clear."""
    if centre.driven is None:
        return ""
    driver = centre.links[0] if centre.links[1] == centre.driven else centre.links[1]
    return f", so that {linkage.links[driver].name} cannot drive {linkage.links[centre.driven].name}"
