"""How findings name the links, joints and drives that are at fault."""

from __future__ import annotations

import math
from collections.abc import Iterable, Sequence

from dxfcheck.analysis.results import Analysis, DependentJoints, FiniteMotion, LockedPart, SettlingDrive
from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.geometry import Point
from dxfcheck.linkage import Linkage
from dxfcheck.rules.finding import Finding, Severity
from dxfcheck.rules.wording import length, listed, plural

__all__ = [
    "about_links",
    "dependent_words",
    "drive_options",
    "finite_words",
    "joint_names",
    "link_names",
    "one_of",
    "redundant_in_parts",
    "rigid_together",
]


def link_names(linkage: Linkage, links: Iterable[int]) -> list[str]:
    """The names of some links."""
    return [linkage.links[link].name for link in links]


def joint_names(linkage: Linkage, joints: Iterable[int]) -> list[str]:
    """Joints by their pins, others by what they join; each once, pins first."""
    pins, others = [], []
    for number in joints:
        joint = linkage.joints[number]
        first, second = linkage.links[joint.first].name, linkage.links[joint.second].name
        if joint.kind == "pin" and joint.pin is not None:
            pins.append(linkage.pins[joint.pin].name)
        elif joint.kind == "slide":
            others.append(f"the slide of {second} on {first}")
        elif joint.kind == "pin in slot":
            others.append(f"the slot between {first} and {second}")
        elif joint.kind == "rolling":
            others.append(f"the contact of {first} and {second}")
        else:
            others.append(f"the pin of {first} and {second}")
    return list(dict.fromkeys([*pins, *others]))


def one_of(names: Sequence[str]) -> str:
    """'A-B', 'A-B or B-C', 'A-B, B-C or C-D', and of many the first few."""
    shown = listed(names)
    if " more" in shown or len(names) == 1:
        return shown
    return f"{', '.join(names[:-1])} or {names[-1]}"


def about_links(
    linkage: Linkage, links: Sequence[int], name: str, severity: Severity, texts: tuple[str, str]
) -> Finding:
    """A finding about some links, at the leftmost pin that they have; about the whole mechanism where none are named.

    ``texts`` are message and remedy.
    """
    pins = {pin for link in links for pin in linkage.links[link].pins} or range(len(linkage.pins))
    places: list[Point] = [linkage.pins[pin].at for pin in pins]
    return Finding(
        rule=name,
        severity=severity,
        message=texts[0],
        remedy=texts[1],
        at=min(places, key=lambda place: (place.real, place.imag), default=None),
        handles=tuple([handle for link in links for handle in linkage.links[link].handles]),
        layer=linkage.links[links[0]].layer if links else None,
        mechanism=linkage.name,
    )


def rigid_together(analysis: Analysis, links: Iterable[int]) -> bool:
    """Whether some links are of one rigid part: how they push one another is then no matter of the pose."""
    return any(set(links) <= set(part.links) for part in analysis.locked_parts)


def redundant_in_parts(parts: Iterable[LockedPart]) -> int:
    """How many of the redundant constraints only hold rigid parts that are rigid without them."""
    return sum([part.redundant for part in parts])


def dependent_words(linkage: Linkage, dependent: Sequence[DependentJoints]) -> tuple[str, str]:
    """Which joints' constraints depend on one another, and which single link or joint can go: '' where none can."""
    joints = sorted({joint for each in dependent for joint in each.joints})
    links_to_go = sorted({link for each in dependent for link in each.links_to_go})
    joints_to_go = sorted({joint for each in dependent for joint in each.joints_to_go})
    said = f"the constraints of {listed(joint_names(linkage, joints))} depend on one another" if joints else ""
    names = link_names(linkage, links_to_go) + joint_names(linkage, joints_to_go)
    return said, one_of(names) if names else ""


def finite_words(finite: FiniteMotion | None, unit: LengthUnit) -> str:
    """What small finite steps say of freedoms beyond the count, with their figures."""
    if finite is None:
        return "it moves by its special lengths, or only for an instant"
    step = f"after a turn of {math.degrees(finite.turn):.2g} deg"
    misfit = f"{_short(finite.misfit, unit)}, limit {_short(finite.limit, unit)}"
    if finite.verdict == "through":
        return (
            f"it moves through: the extra constraint is redundant while lengths stay exact ({step} they are off by "
            f"{misfit})"
        )
    if finite.verdict == "momentary":
        return f"momentary: {step} {plural(finite.freedom, 'freedom')} left (lengths are off by {misfit})"
    return (
        f"momentary: it locks after the first step and cannot move beyond an instant ({step} a joint stays open by "
        f"{_short(finite.opening, unit)}, as if a length were off by {misfit})"
    )


def _short(value: float, unit: LengthUnit) -> str:
    """A length to two digits."""
    return length(float(f"{value:.2g}"), unit)


def drive_options(linkage: Linkage, drives: Sequence[SettlingDrive], unit: LengthUnit) -> str:
    """The drives as options of the command; '' where one of them has no name to state it by."""
    stated = []
    for drive in drives:
        link, against = linkage.links[drive.link], linkage.links[drive.against]
        on_frame = drive.against == linkage.frame
        if not link.pins or not (on_frame or against.pins) or not (on_frame or drive.joint is None):
            return ""
        of = "" if on_frame else f" against {against.name}"
        rate = "1 rad/s" if drive.joint is None else f"1 {'mm' if unit.metres is None else unit.name}/s"
        stated.append(f"--drive '{link.name}{of} = {rate}'")
    return " ".join(stated)
