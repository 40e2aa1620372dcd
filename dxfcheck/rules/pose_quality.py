"""Rules on how good the drawn pose is: near a dead centre, a flat transmission angle, speeds that hang on a hair."""

from __future__ import annotations

import math
from collections.abc import Iterator
from typing import NamedTuple

from dxfcheck.analysis.results import Analysis, SpeedBounds, Transmission
from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.geometry import Point
from dxfcheck.linkage import Linkage
from dxfcheck.rules.fault_wording import rigid_together
from dxfcheck.rules.finding import Finding
from dxfcheck.rules.registry import rule
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.rules.wording import length
from dxfcheck.tolerances.analysis import NEAR_DEAD_CENTRE_DEGREES
from dxfcheck.tolerances.findings import DOUBTFUL_SPEED_RELATIVE, LOW_TRANSMISSION_DEGREES, SPEED_OF_FASTEST

__all__: list[str] = []


def _at_pin(linkage: Linkage, number: int, name: str, message: str, remedy: str) -> Finding:
    pin = linkage.pins[number]
    return Finding(
        rule=name,
        severity="warning",
        message=message,
        remedy=remedy,
        at=pin.at,
        handles=pin.handles,
        layer=pin.layer,
        mechanism=linkage.name,
    )


@rule(
    "near-dead-centre",
    "warning",
    "Two links nearly in line",
    family="pose",
    looks_for="A link that is nearly in line with its neighbour through their common pin, or a push nearly square to "
    f"the slide or slot that it should run in: within {NEAR_DEAD_CENTRE_DEGREES:g} degrees of a dead centre.",
    matters="The one can hardly drive the other there; small errors of lengths change the speeds much.",
    remedy="Draw another pose if this one is not meant; else hold the lengths closely.",
)
def near_dead_centre(subject: RuleSubject) -> Iterator[Finding]:
    """Poses close to a dead centre."""
    for linkage, analysis in subject.mechanisms:
        if analysis.mobility.at_pose == 0:
            continue
        for centre in analysis.near_dead_centres:
            if rigid_together(analysis, centre.links):
                continue
            first, second = (linkage.links[link].name for link in centre.links)
            pin, angle = linkage.pins[centre.pin], f"{math.degrees(centre.angle):.2g} deg"
            if centre.square:
                state = f"{first} and {second} push on one another {angle} off square to the way they can go"
            else:
                state = f"{first} and {second} are {angle} off one line"
            hardly = ""
            if centre.driven is not None:
                driver = centre.links[0] if centre.links[1] == centre.driven else centre.links[1]
                hardly = f", so that {linkage.links[driver].name} can hardly drive {linkage.links[centre.driven].name}"
            message = f"near a dead centre: {state} at {pin.name}{hardly} (limit {NEAR_DEAD_CENTRE_DEGREES:g} deg)"
            remedy = "draw another pose if this one is not meant"
            yield _at_pin(linkage, centre.pin, "near-dead-centre", message, remedy)


@rule(
    "low-transmission-angle",
    "warning",
    "A push that hardly turns what it pushes",
    family="pose",
    looks_for="A transmission angle at the drawn pose (between the link that pushes, away from the drive, and the line "
    "through the pushed link's fixed pin, or the normal of its slide or slot) below "
    f"{LOW_TRANSMISSION_DEGREES:g} degrees.",
    matters="Most of the push goes into the bearings: friction and wear grow, and the linkage may jam.",
    remedy="Change the lengths, or draw another pose if this one is not meant.",
    settings="limits.transmission-angle",
)
def low_transmission_angle(subject: RuleSubject) -> Iterator[Finding]:
    """Flat transmission angles that are no dead centres yet."""
    least = subject.settings.transmission_angle
    for linkage, analysis in subject.mechanisms:
        if analysis.mobility.at_pose == 0:
            continue
        for each in analysis.transmissions:
            degrees = math.degrees(each.angle)
            if NEAR_DEAD_CENTRE_DEGREES < degrees < least and not rigid_together(analysis, (each.pusher, each.pushed)):
                message = f"{_push(linkage, each)} (least {least:g} deg)"
                remedy = "change the lengths, or draw another pose if this one is not meant"
                yield _at_pin(linkage, each.pin, "low-transmission-angle", message, remedy)


def _push(linkage: Linkage, each: Transmission) -> str:
    """Who pushes whom, where, and at what angle."""
    pusher, pushed, pin = linkage.links[each.pusher].name, linkage.links[each.pushed].name, linkage.pins[each.pin].name
    degrees = math.degrees(each.angle)
    pressure = f", a pressure angle of {90.0 - degrees:.3g} deg" if each.square else ""
    return f"{pusher} pushes {pushed} at {pin} under a transmission angle of {degrees:.3g} deg{pressure}"


class _Doubt(NamedTuple):
    """The speed of a mechanism that is off by most of itself: words for it, its place, and the part."""

    what: str
    at: Point | None
    part: float


@rule(
    "doubtful-speed",
    "warning",
    "A speed that hangs on the drawing's last digits",
    family="pose",
    looks_for="Speeds that may be off by more than "
    f"{100 * DOUBTFUL_SPEED_RELATIVE:g} % of themselves where every pin, guide and wheel is off by the drawing's own "
    "resolution (half the last typed decimal, gaps between what meets, a stated tolerance): a bound of first order.",
    matters="The pose is ill-conditioned: a redrawn sheet gives another speed.",
    remedy="Draw with more decimals, or draw a pose further from a dead centre.",
    settings="limits.doubtful-speed, reading.tolerance",
    source="linear propagation of errors; the limit is common practice, no source",
)
def doubtful_speed(subject: RuleSubject) -> Iterator[Finding]:
    """One finding a mechanism, at its worst speed."""
    limit, unit = subject.settings.doubtful_speed, subject.sketch.unit
    for linkage, analysis in subject.mechanisms:
        bounds = analysis.bounds
        if bounds is None or not analysis.solved:
            continue
        worst = max(_doubts(linkage, analysis, bounds, unit), key=lambda each: each.part, default=None)
        if worst is not None and worst.part > limit:
            yield Finding(
                rule="doubtful-speed",
                severity="warning",
                message=f"{worst.what}, {100 * worst.part:.2g} % (limit {100 * limit:g} %), where every coordinate may "
                f"be off by {length(bounds.resolution, unit)}",
                remedy="draw with more decimals, or a pose further from a dead centre",
                at=worst.at,
                mechanism=linkage.name,
            )


def _doubts(linkage: Linkage, analysis: Analysis, bounds: SpeedBounds, unit: LengthUnit) -> Iterator[_Doubt]:
    """Every known speed of links and pins with what it may be off by, over itself or a small part of the greatest."""
    turns = [abs(motion.angular_velocity or 0.0) for motion in analysis.links]
    least = SPEED_OF_FASTEST * max(turns, default=0.0)
    for link, turn, off in zip(linkage.links, turns, bounds.links, strict=True):
        if max(turn, least) > 0.0:
            what = f"{link.name} turns at {turn:.4g} rad/s plus or minus {off:.2g}"
            at = linkage.pins[link.pins[0]].at if link.pins else None
            yield _Doubt(what, at, off / max(turn, least))
    speeds = [abs(motion.velocity or 0.0) for motion in analysis.pins]
    least = SPEED_OF_FASTEST * max(speeds, default=0.0)
    for pin, speed, off in zip(linkage.pins, speeds, bounds.pins, strict=True):
        if max(speed, least) > 0.0:
            what = f"{pin.name} runs at {length(speed, unit)}/s plus or minus {off:.2g}"
            yield _Doubt(what, pin.at, off / max(speed, least))
