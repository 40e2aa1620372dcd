"""The drive that a linkage is given where none is stated (reading rule 10)."""

from __future__ import annotations

from typing import NamedTuple

from dxfcheck.linkage import Drive, Linkage
from dxfcheck.reading.drives.drive_names import Place
from dxfcheck.reading.drives.drive_slides import slide_target
from dxfcheck.reading.texts.labels import natural_key
from dxfcheck.tolerances.sheet import ASSUMED_TIE

__all__ = ["Reasoned", "assume_drive"]


class Reasoned(NamedTuple):
    """A drive and why it was set, in words."""

    drive: Drive
    why: str


def assume_drive(linkage: Linkage) -> Reasoned | None:
    """1 rad/s on the shortest arm on the frame, else 1 length unit a second on a frame slide, else 1 rad/s on a wheel.

    An arm runs from a pin on the frame to another pin of its link; a wheel is a link with no pin but one on the frame.
    """
    frame = linkage.frame
    arm = _shortest_arm(linkage)
    if arm is not None:
        why = "no drive is stated: the link with the shortest arm on the frame turns at 1 rad/s"
        return Reasoned(Drive(link=arm, against=frame, rate=1.0, source="assumed"), why)
    missing = "no drive is stated and no arm turns on the frame"
    slide = _first_frame_slide(linkage)
    if slide is not None:
        link, joint = slide
        meaning = slide_target(linkage, Place(0, link), joint).meaning
        why = f"{missing}: the first slide on it runs at 1 length unit a second; {meaning}"
        drive = Drive(link=link, against=frame, rate=1.0, kind="slide", joint=joint, source="assumed")
        return Reasoned(drive, why)
    wheel = _first_wheel(linkage)
    if wheel is not None:
        why = f"{missing}: the first link with a single pin on it turns at 1 rad/s"
        return Reasoned(Drive(link=wheel, against=frame, rate=1.0, source="assumed"), why)
    return None


def _shortest_arm(linkage: Linkage) -> int | None:
    """The link with the shortest distance between a pin on the frame and another of its pins."""
    arms = [
        (abs(linkage.pins[pin].at - linkage.pins[pivot].at), number)
        for number, link in enumerate(linkage.links)
        if number != linkage.frame
        for pivot in link.pins
        if linkage.pins[pivot].fixed
        for pin in link.pins
        if pin != pivot and not linkage.pins[pin].fixed
    ]
    if not arms:
        return None
    # Equal arms (a parallelogram) must give the same choice whatever way the sheet is turned: the first by name.
    shortest = min(arms)[0]
    return min(number for length, number in arms if length <= shortest * (1.0 + ASSUMED_TIE))


def _first_frame_slide(linkage: Linkage) -> tuple[int, int] | None:
    """Link and joint of the first slide on the frame, by the link's name."""
    slides = [
        (joint.second if joint.first == linkage.frame else joint.first, number)
        for number, joint in enumerate(linkage.joints)
        if joint.kind == "slide" and linkage.frame in (joint.first, joint.second)
    ]
    return min(slides, key=lambda slide: (natural_key(linkage.links[slide[0]].name), slide), default=None)


def _first_wheel(linkage: Linkage) -> int | None:
    """The first link by name whose only pin is on the frame; blocks come last."""
    links = linkage.links
    wheels = [
        number
        for number, link in enumerate(links)
        if number != linkage.frame and len(link.pins) == 1 and linkage.pins[link.pins[0]].fixed
    ]
    return min(
        wheels,
        key=lambda number: (links[number].kind == "block", natural_key(links[number].name), number),
        default=None,
    )
