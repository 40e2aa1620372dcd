"""Rules on the drawn pose: drives that cannot act, contradict one another or are missing, and dead centres."""

from __future__ import annotations

import cmath
import math
from collections.abc import Iterator

from dxfcheck.analysis.results import Analysis, DeadCentre, DriveVerdict
from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.linkage import Drive, Linkage
from dxfcheck.rules.fault_wording import drive_options, link_names, rigid_together
from dxfcheck.rules.finding import Finding
from dxfcheck.rules.observed import finding, observed
from dxfcheck.rules.registry import rule
from dxfcheck.rules.settings_and_sources import DRIVES, UNITS
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.tolerances.analysis import DEAD_CENTRE_RADIANS

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


def _motion(linkage: Linkage, drive: Drive, unit: LengthUnit) -> str:
    """A drive's motion as words after 'to': 'turn at 2 rad/s cw', 'slide at 50 mm/s towards 90 deg relative to A-B'."""
    if drive.kind == "turn":
        sense = "cw" if drive.rate < 0.0 else "ccw"
        return f"turn at {abs(drive.rate):.5g} rad/s {sense}{_on(linkage, drive)}"
    direction = linkage.joints[drive.joint].direction if drive.joint is not None else None
    if direction is None:
        return f"slide at {_speed(drive, drive.rate, unit)}{_on(linkage, drive)}"
    degrees = round(math.degrees(cmath.phase(-direction if drive.rate < 0.0 else direction)), 2)
    towards = 180.0 - (180.0 - degrees) % 360.0  # -180 is said as 180
    return f"slide at {_speed(drive, abs(drive.rate), unit)} towards {towards:g} deg{_on(linkage, drive)}"


def _speed(drive: Drive, rate: float, unit: LengthUnit) -> str:
    """A rate of a drive with its unit: rad/s, or the drawing's lengths a second."""
    if drive.kind == "turn":
        return f"{rate:.5g} rad/s"
    return f"{rate:.5g} {'unit' if unit.metres is None else unit.name}/s"


def _on(linkage: Linkage, drive: Drive) -> str:
    """What a drive runs against, if that is not the frame."""
    return "" if drive.against == linkage.frame else f" relative to {linkage.links[drive.against].name}"


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
    matters="The link with the shortest arm on the frame is taken to turn at 1 rad/s counter-clockwise or, where none "
    "turns there, a slide on the frame to run at 1 length unit a second: every speed is a ratio to that.",
    remedy="Write a note such as 'n = 60 rpm' beside the crank, or use --drive 'A-B = 60 rpm'; for a slide "
    "'v = 50 mm/s', or --drive 'block at C = 50 mm/s'.",
    settings=DRIVES,
)
def assumed_drive(subject: RuleSubject) -> Iterator[Finding]:
    """Drives that were assumed."""
    for linkage, analysis in subject.mechanisms:
        for drive in linkage.drives:
            if drive.source == "assumed" and analysis.mobility.at_pose > 0:
                name = linkage.links[drive.link].name
                motion = _motion(linkage, drive, subject.sketch.unit)
                message = f"no drive is stated: {name} is taken to {motion}, so every speed is a ratio"
                note, speed = ("v", "50 mm/s") if drive.kind == "slide" else ("n", "60 rpm")
                remedy = f"write a note such as '{note} = {speed}' beside it"
                if linkage.links[drive.link].pins:  # the name of a link without pins is a mere handle
                    remedy += f", or use --drive '{name} = {speed}'"
                yield _about(linkage, drive, "assumed-drive", message, remedy)


@rule(
    "unknown-drive",
    "error",
    "A drive that cannot be placed",
    family="pose",
    looks_for="A drive note or option that names no link of the drawing, fits several, or contradicts itself.",
    matters="It is left out: speeds are those of other drives, or of an assumed one.",
    remedy="Name the link by two of its pins, as 'ω_AB = 4 rad/s', a block by its pin, as 'v_C = 0.2 m/s', or move the "
    "note to its link.",
    settings=DRIVES,
)
def unknown_drive(subject: RuleSubject) -> Iterator[Finding]:
    """Drive texts that fit no link."""
    for seen in observed(subject, "unknown-drive"):
        message = f"the drive '{seen.subject}' is left out: {seen.detail}"
        remedy = (
            "name the link by two of its pins, as in 'ω_AB = 4 rad/s', a block by its pin, as in 'v_C = 0.2 m/s', "
            "or move the note to its link"
        )
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
    settings=UNITS,
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
    settings=DRIVES,
)
def drive_conflict(subject: RuleSubject) -> Iterator[Finding]:
    """Drives left out because they contradict others."""
    for linkage, _, drive, verdict in _drives(subject, "conflict"):
        name = linkage.links[drive.link].name
        unit = subject.sketch.unit
        fits = f"; the others give {_speed(drive, verdict.implied, unit)}" if verdict.implied is not None else ""
        motion = _motion(linkage, drive, unit)
        message = f"{name} is stated to {motion}, which contradicts the other drives{fits}; it is left out"
        yield _about(
            linkage, drive, "drive-conflict", message, "delete one of the drives, or state the speed that fits"
        )


@rule(
    "drive-at-limit",
    "error",
    "A drive that cannot act at the drawn pose",
    family="pose",
    looks_for="A driven link or slide that the joints hold still at this pose, as a crank when coupler and rocker are "
    "in line, or a block at the end of its stroke.",
    matters="No speed of the drive is possible there: the drive stands at the end of its stroke.",
    remedy="Draw another pose, or drive another link.",
    settings=DRIVES,
    source="limit positions: Norton, Design of Machinery, ch. 3 (from memory)",
)
def drive_at_limit(subject: RuleSubject) -> Iterator[Finding]:
    """Drives that the constraints hold still."""
    for linkage, analysis, drive, _ in _drives(subject, "at limit"):
        if analysis.mobility.at_pose == 0:
            continue  # a structure: no-motion and over-constrained say so
        name = linkage.links[drive.link].name
        what = "sliding drive" if drive.kind == "slide" else "drive"
        stated = f"{'assumed' if drive.source == 'assumed' else 'stated'} {what}"
        message = f"the {stated} of {name} cannot act at this pose: the joints hold {name} still{_on(linkage, drive)}"
        remedy = "draw another pose, or drive another link"
        if analysis.settling_drives:
            able = link_names(linkage, [each.link for each in analysis.settling_drives])
            message += f"; {', '.join(able)} could drive it from here"
            option = drive_options(linkage, analysis.settling_drives, subject.sketch.unit)
            remedy = f"draw another pose, or drive {' and '.join(able)} instead{f': {option}' if option else ''}"
        elif taken := [each.link for each in _taken(linkage, analysis)]:
            remedy = (
                f"draw another pose, or leave this drive out: {' and '.join(link_names(linkage, taken))} can drive it"
            )
        yield _about(linkage, drive, "drive-at-limit", message, remedy)


@rule(
    "dead-centre",
    "warning",
    "Two links in line",
    family="pose",
    looks_for="A link in line with the one that would drive it, through their common pin, or a push square to the "
    f"slide or slot that it should run in, within {math.degrees(DEAD_CENTRE_RADIANS):.1g} degrees.",
    matters="The one cannot drive the other there, and which way it goes on is not settled.",
    remedy="Draw another pose if this one is not meant, or make sure that something carries it over.",
    source="toggle positions: Norton, Design of Machinery, ch. 3 (from memory)",
)
def dead_centre(subject: RuleSubject) -> Iterator[Finding]:
    """Dead centres of the drawn pose."""
    for linkage, analysis in subject.mechanisms:
        if analysis.mobility.at_pose == 0:
            continue
        for centre in analysis.dead_centres:
            if rigid_together(analysis, centre.links):
                continue
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
                remedy=f"draw another pose if this one is not meant{_able(linkage, analysis)}",
                at=pin.at,
                handles=pin.handles,
                layer=pin.layer,
                mechanism=linkage.name,
            )


def _able(linkage: Linkage, analysis: Analysis) -> str:
    """Which link drives the linkage from this pose, or could."""
    able = [each.link for each in (_taken(linkage, analysis) if analysis.solved else analysis.settling_drives)]
    if not able:
        return ""
    names = " and ".join(link_names(linkage, able))
    return f"; {names} {'drives' if analysis.solved else 'could drive'} it from here"


def _taken(linkage: Linkage, analysis: Analysis) -> list[Drive]:
    """The drives that act."""
    pairs = zip(linkage.drives, analysis.drives, strict=True)
    return [drive for drive, verdict in pairs if verdict.outcome == "taken"]


def _cannot_drive(linkage: Linkage, centre: DeadCentre) -> str:
    """Which of the two cannot drive which, where that is clear."""
    if centre.driven is None:
        return ""
    driver = centre.links[0] if centre.links[1] == centre.driven else centre.links[1]
    return f", so that {linkage.links[driver].name} cannot drive {linkage.links[centre.driven].name}"
