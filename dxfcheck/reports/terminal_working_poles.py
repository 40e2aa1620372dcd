"""The poles of the hand working in words: which lines meet there, and one speed to check it by."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from dxfcheck.analysis.by_hand.kennedy import PoleLine, PoleWorking
from dxfcheck.analysis.by_hand.solved_linkage import acts_as
from dxfcheck.reports.terminal_layout import figure
from dxfcheck.reports.terminal_working_terms import Names
from dxfcheck.tolerances.findings import SHOWN_AS_ZERO

__all__ = ["pole_sentences"]


def pole_sentences(names: Names, poles: Sequence[PoleWorking]) -> Iterator[str]:
    """A sentence for each link whose pole is no pin on the frame."""
    for work in poles:
        yield _sentence(names, work)


def _sentence(names: Names, work: PoleWorking) -> str:
    link = names.link(work.link)
    if work.case == "translates":
        return f"{link} has no pole: all its points have one velocity"
    if work.case == "at rest":
        return f"{link} is at rest"
    if work.case == "resting pin" and work.pin is not None:
        return f"pole of {link}: its pin {names.linkage.pins[work.pin].name}, which has no speed"
    at = names.point(work.pole or 0j)
    if work.case == "no crossing":
        return f"pole of {link}: too few lines cross to show it; {_check(names, work)}, so it lies at {at}"
    one, other = (_line(names, line) for line in work.lines)
    check = _check(names, work)
    return f"pole of {link}: where the line {one} meets the line {other}, at {at}" + (f"; {check}" if check else "")


def _line(names: Names, line: PoleLine) -> str:
    """A line in words."""
    at = names.place(line.through)
    if line.kind == "velocity":
        return f"through {at} square to v_{at}"
    if line.kind == "contact":
        return f"along the contact {at} with the frame"
    if line.kind == "slot":
        return f"through {at} square to the slot on the frame"
    link = "" if line.link is None else names.link(line.link)
    if line.kind == "translating":
        return f"through {at} square to the motion of {link}"
    pole = "?" if line.link is None else _pole_name(names, line.link)
    return f"through {pole} square to the slide on {link}" if line.kind == "slide" else f"through {pole} and {at}"


def _pole_name(names: Names, link: int) -> str:
    """The fixed pin, or the contact with the frame, that a link turns about; else 'the pole of' it."""
    for number in names.solved.joints_of[link]:
        joint = names.linkage.joints[number]
        if acts_as(joint) == "pin" and names.linkage.frame in (joint.first, joint.second):
            return names.place(joint.at)
    return f"the pole of {names.link(link)}"


def _check(names: Names, work: PoleWorking) -> str:
    """One pin's speed over omega is its distance from the pole."""
    for pin in names.linkage.links[work.link].pins:
        at, velocity = names.linkage.pins[pin].at, names.solved.analysis.pins[pin].velocity or 0j
        distance = abs(at - (work.pole or 0j))
        if distance > SHOWN_AS_ZERO * names.solved.reach and abs(velocity) > names.noise:
            name, omega = names.linkage.pins[pin].name, abs(names.solved.turns[work.link])
            share = f"{figure(abs(velocity))} / {figure(omega)} = {figure(distance)} {names.unit}"
            return f"v_{name} / omega = {share} from {name}"
    return ""
