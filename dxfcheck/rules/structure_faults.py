"""Rules on who is at fault: parts that are locked, constraints that repeat, links that are free or idle."""

from __future__ import annotations

from collections.abc import Iterator

from dxfcheck.analysis.results import Analysis, DependentJoints, IdleLink, LockedPart
from dxfcheck.linkage import Linkage
from dxfcheck.rules.fault_wording import (
    about_links,
    dependent_words,
    drive_options,
    finite_words,
    link_names,
    one_of,
    redundant_in_parts,
)
from dxfcheck.rules.finding import Finding, Severity
from dxfcheck.rules.registry import rule
from dxfcheck.rules.settings_and_sources import DRIVES, FRAME, MOBILITY, TOLERANCE
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.rules.wording import listed, plural
from dxfcheck.tolerances.findings import RIGID_TRIANGLE

__all__: list[str] = []


@rule(
    "locked-part",
    "error",
    "A part that is locked beside one that moves",
    family="structure",
    also=("note",),
    looks_for="Links that cannot move against the frame, or that move as one with a constraint too many among them, "
    "in a mechanism that moves elsewhere: a note where they move as one and none is too many. Three bars pinned "
    "in a triangle are a usual way to draw one link, and not told of.",
    matters="The count of the whole can be right and hides it: these links are a structure.",
    remedy="Take out one of the links that it names, free a joint, or draw the part as one link or as frame.",
    settings=FRAME,
    source=MOBILITY,
)
def locked_part(subject: RuleSubject) -> Iterator[Finding]:
    """Rigid sub-structures of mechanisms that are not locked as a whole."""
    for linkage, analysis in subject.mechanisms:
        if not linkage.grounded or analysis.mobility.at_pose == 0:
            continue
        for part in analysis.locked_parts:
            if part.with_frame or part.redundant or len(part.links) > RIGID_TRIANGLE:
                severity: Severity = "error" if part.with_frame or part.redundant else "note"
                yield about_links(linkage, part.links, "locked-part", severity, _locked_texts(linkage, analysis, part))


def _locked_texts(linkage: Linkage, analysis: Analysis, part: LockedPart) -> tuple[str, str]:
    """Message and remedy: what is locked with what, why, and what would free it."""
    names = listed(link_names(linkage, part.links))
    several = len(part.links) > 1
    locked = f"{names} {'are' if several else 'is'} locked with the frame"
    message = locked if part.with_frame else f"{names} are locked with one another and move as one link"
    to_go = one_of(link_names(linkage, part.links_to_go)) if part.links_to_go else ""
    if part.redundant:
        said, going = dependent_words(linkage, _within(linkage, analysis, part))
        message += f": {plural(part.redundant, 'constraint')} too many" + (f"; {said}" if said else "")
        remedy = f"take out {going or 'a link or joint'}"
        if part.with_frame:
            remedy += f"; {part.redundant + 1} such let the part move"
        return message, remedy
    if part.with_frame:
        message += ", with just as many constraints as hold " + ("them" if several else "it")
        return message, f"take out {to_go or 'a link'}, or free a joint; draw it as frame if it is meant so"
    return message, f"nothing, if they are meant as one link; else take out {to_go or 'one of them'}"


def _within(linkage: Linkage, analysis: Analysis, part: LockedPart) -> list[DependentJoints]:
    """The sets of dependent joints that lie within the part."""
    among = {*part.links, *([linkage.frame] if part.with_frame else [])}
    return [each for each in analysis.dependent_joints if _lies_within(linkage, each, among)]


def _lies_within(linkage: Linkage, dependent: DependentJoints, among: set[int]) -> bool:
    """Whether they join these links only; the first link of a pin of several may be another, if that is its one place.

    The joints of such a pin run from its first link, which then only passes on what the others do to one another.
    """
    places: dict[int, set[int]] = {}
    for number in dependent.joints:
        joint = linkage.joints[number]
        outside = {joint.first, joint.second} - among
        if outside and (joint.kind != "pin" or joint.pin is None or len(outside) > 1):
            return False
        for link in outside:
            places.setdefault(link, set()).add(joint.pin or 0)
    return all(len(pins) == 1 for pins in places.values())


@rule(
    "special-geometry",
    "warning",
    "It moves only because of its lengths",
    family="structure",
    looks_for="More freedom at the drawn pose than the count gives: parallel cranks, coincident joints, a stretched "
    "chain. Small finite steps tell whether it moves through or locks at once.",
    matters="The extra freedom holds while lengths are exact, or only for an instant: wear or a tolerance locks it.",
    remedy="Check that the equal lengths are meant; else take out the link that repeats a constraint.",
    settings=TOLERANCE,
    source=MOBILITY,
)
def special_geometry(subject: RuleSubject) -> Iterator[Finding]:
    """Freedom at the pose beyond the count, other than what rigid parts have too many constraints for."""
    for linkage, analysis in subject.mechanisms:
        mobility = analysis.mobility
        special = mobility.at_pose - mobility.count - redundant_in_parts(analysis.locked_parts)
        if not linkage.grounded or not mobility.at_pose or special <= 0:
            continue
        beside = [_within(linkage, analysis, part) for part in analysis.locked_parts]
        told = [each for each in analysis.dependent_joints if all(each not in inside for inside in beside)]
        said, going = dependent_words(linkage, told or analysis.dependent_joints)
        message = (
            f"{linkage.name} has {plural(mobility.at_pose, 'freedom')} at the drawn pose where the count gives "
            f"{mobility.count}: {said + '; ' if said else ''}{finite_words(analysis.finite, subject.sketch.unit)}"
        )
        if analysis.finite is not None and analysis.finite.verdict == "locked":
            remedy = "as drawn it will not turn: change the lengths, draw another pose"
        else:
            remedy = "check that these lengths are meant and held to tolerance"
        yield about_links(
            linkage,
            (),
            "special-geometry",
            "warning",
            (message, f"{remedy}{f', or take out {going}' if going else ''}"),
        )


@rule(
    "undriven-freedom",
    "warning",
    "Links that no drive settles",
    family="structure",
    looks_for="A mechanism with more freedoms at the pose than drives that count, without those of idle links.",
    matters="The speeds of those links are not known; they are shown as '?'.",
    remedy="State another drive with a note on the sheet or with --drive.",
    settings=DRIVES,
    source=MOBILITY,
)
def undriven_freedom(subject: RuleSubject) -> Iterator[Finding]:
    """Freedoms left by the drives."""
    for linkage, analysis in subject.mechanisms:
        left = _undriven(linkage, analysis)
        if left <= 0:
            continue
        idle = {each.link for each in analysis.idle_links}
        free = [number for number, motion in enumerate(analysis.links) if not motion.determined and number not in idle]
        message = f"{plural(left, 'freedom')} of {linkage.name} not driven: "
        message += f"{listed(link_names(linkage, free))} may move in any way"
        remedy = f"state {plural(left, 'further drive')}, by a note or with --drive"
        names = one_of(link_names(linkage, [drive.link for drive in analysis.settling_drives]))
        if names:
            options = drive_options(linkage, analysis.settling_drives, subject.sketch.unit)
            names = names.replace(" or ", " and ")
            remedy = f"drive {names} too, by a note or with {options or '--drive'}"
        yield about_links(linkage, free, "undriven-freedom", "warning", (message, remedy))


def _undriven(linkage: Linkage, analysis: Analysis) -> int:
    taken = sum(drive.outcome == "taken" for drive in analysis.drives)
    at_limit = any(drive.outcome == "at limit" for drive in analysis.drives)
    if not linkage.grounded or at_limit:
        return 0
    return analysis.mobility.at_pose - taken - sum([each.freedoms for each in analysis.idle_links])


@rule(
    "idle-freedom",
    "note",
    "A link whose own motion moves nothing else",
    family="structure",
    looks_for="A link that is free by itself while all others are settled or held: a roller that may spin, an arm that "
    "hangs on one pin, a rod that slides at both ends.",
    matters="Its speed is not settled and is shown as '?'; those of all other links do not hang on it.",
    remedy="Nothing, if it is meant to be free; else drive it, or hold it by another joint.",
    settings=DRIVES,
    source=MOBILITY,
)
def idle_freedom(subject: RuleSubject) -> Iterator[Finding]:
    """Links with a motion of their own."""
    for linkage, analysis in subject.mechanisms:
        for idle in analysis.idle_links if linkage.grounded else ():
            yield about_links(linkage, (idle.link,), "idle-freedom", "note", _idle_texts(linkage, idle))


def _idle_texts(linkage: Linkage, idle: IdleLink) -> tuple[str, str]:
    name = linkage.links[idle.link].name
    pin = None if idle.pin is None else linkage.pins[idle.pin].name
    about = "" if pin is None else f" about {'its pin' if pin == name else pin}"  # a link of one pin has its name
    does = f"turns freely{about}" if idle.turns else "slides freely"
    if idle.turns and idle.freedoms > 1:
        does = "turns and slides freely"
    message = f"{name} {does}: this moves nothing else, and its own speed is not settled"
    remedy = "nothing, if it is meant to be free; else hold it by another joint"
    if idle.turns and idle.freedoms == 1 and linkage.links[idle.link].pins:
        remedy = f"nothing, if it is meant to be free; else drive it, by a note or with --drive '{name} = 1 rad/s'"
    return message, remedy
