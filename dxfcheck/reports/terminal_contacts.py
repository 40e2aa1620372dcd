"""What slides on what and what rolls on what, in words: the joints of a mechanism that are not pins.

Speeds are in the drawing's unit a second, directions in degrees from +x, counter-clockwise.
"""

from __future__ import annotations

import cmath
import math
from collections.abc import Iterator
from itertools import product

from dxfcheck.analysis.results import Analysis, JointMotion
from dxfcheck.geometry import Point, cross, dot
from dxfcheck.linkage import Joint, JointKind, Linkage
from dxfcheck.reports.terminal_layout import UNKNOWN, count_of, figure, place
from dxfcheck.settings import ON_AXIS_OF_REACH, SHOWN_AS_ZERO

__all__ = ["contact_sentences", "joint_counts", "sliding_words", "towards"]

COUNTED: tuple[tuple[JointKind, str, str], ...] = (
    ("slide", "slide", "slides"),
    ("pin in slot", "pin in slot", "pins in slots"),
    ("rolling", "rolling contact", "rolling contacts"),
)


def joint_counts(linkage: Linkage) -> list[str]:
    """'2 slides', '1 rolling contact': how many joints there are of each kind but pins."""
    kinds = [joint.kind for joint in linkage.joints]
    return [count_of(kinds.count(kind), one, many) for kind, one, many in COUNTED if kind in kinds]


def contact_sentences(linkage: Linkage, analysis: Analysis, unit: str) -> Iterator[tuple[str, str]]:
    """Label and sentence for each slide, pin in slot and rolling contact; the label once for each kind."""
    slides = [motion.slide_speed for motion in analysis.joints if motion.slide_speed is not None]
    noise = SHOWN_AS_ZERO * max(map(abs, slides), default=0.0)
    for label, kinds in (("sliding", ("slide", "pin in slot")), ("rolling", ("rolling",))):
        shown = label
        for joint, motion in zip(linkage.joints, analysis.joints, strict=True):
            if joint.kind in kinds:
                yield shown, _sentence(linkage, analysis, joint, motion, unit, noise)
                shown = ""


def _sentence(linkage: Linkage, analysis: Analysis, joint: Joint, motion: JointMotion, unit: str, noise: float) -> str:
    if joint.kind == "rolling":
        return _rolling(linkage, analysis, joint, motion)
    speed = motion.slide_speed
    if joint.kind == "slide":
        return sliding_words(linkage, joint, speed, unit, noise)
    return _slot_sentence(linkage, joint, speed, unit, noise)


def _slot_sentence(linkage: Linkage, joint: Joint, speed: float | None, unit: str, noise: float) -> str:
    """The pin's motion in the slot; where it is not clear which link has the slot, the second link's."""
    first, second = linkage.links[joint.first], linkage.links[joint.second]
    carriers = [link for link in (first, second) if joint.pin in link.pins]
    if joint.pin is None or len(carriers) != 1:
        names = f"the pin at {place(joint.at)} in the slot between {first.name} and {second.name}"
        return f"{names}: {second.name} slides {_pace(joint, speed, unit, noise)}"
    slot = first if carriers[0] is second else second
    if slot is second and speed is not None:
        speed = -speed
    pin = linkage.pins[joint.pin].name
    return f"pin {pin} of {carriers[0].name} slides in the slot of {slot.name} {_pace(joint, speed, unit, noise)}"


def sliding_words(linkage: Linkage, joint: Joint, speed: float | None, unit: str, noise: float = 0.0) -> str:
    """A slide's motion as a drafter says it; ``speed`` is the second link's against the first, None if not settled."""
    ends = _telescope(linkage, joint)
    if ends is not None:
        near, far = (linkage.pins[pin] for pin in ends)
        telescope = f"telescope {near.name}-{far.name}"
        if speed is None or abs(speed) <= noise:
            return f"{telescope} {'extends at ' + UNKNOWN if speed is None else 'keeps its length'}"
        growth = speed * dot(far.at - near.at, joint.direction or 0j)
        return f"{telescope} {'extends' if growth > 0.0 else 'closes'} at {figure(abs(speed))} {unit}/s"
    first, second = joint.first, joint.second
    if linkage.links[first].kind == "block" and linkage.links[second].kind == "link":
        first, second = second, first  # the block slides, whichever is named first
        speed = None if speed is None else -speed
    names = f"{linkage.links[second].name} slides on {linkage.links[first].name}"
    return f"{names} {_pace(joint, speed, unit, noise)}"


def _pace(joint: Joint, speed: float | None, unit: str, noise: float) -> str:
    if speed is None:
        return f"at {UNKNOWN} {unit}/s"
    if abs(speed) <= noise:
        return f"at 0 {unit}/s"
    return f"at {figure(abs(speed))} {unit}/s towards {towards((joint.direction or 0j) * speed)} deg"


def towards(direction: Point) -> str:
    """The angle at which a vector points, degrees from +x, above -180 up to 180."""
    size = SHOWN_AS_ZERO * abs(direction)
    flat = complex(direction.real, 0.0 if abs(direction.imag) <= size else direction.imag)
    return figure(math.degrees(cmath.phase(flat)), SHOWN_AS_ZERO)


def _telescope(linkage: Linkage, joint: Joint) -> tuple[int, int] | None:
    """The furthest pins, one of each link, that lie on the axis of a slide between two moving links."""
    links = linkage.links[joint.first], linkage.links[joint.second]
    if any(link.kind != "link" for link in links) or joint.direction is None:
        return None
    found, furthest = None, 0.0
    for near, far in product(*(link.pins for link in links)):
        way = linkage.pins[far].at - linkage.pins[near].at
        offsets = way, linkage.pins[near].at - joint.at
        if abs(way) > furthest and all(
            abs(cross(joint.direction, offset)) <= ON_AXIS_OF_REACH * abs(way) for offset in offsets
        ):
            found, furthest = (near, far), abs(way)
    return found


def _rolling(linkage: Linkage, analysis: Analysis, joint: Joint, motion: JointMotion) -> str:
    first, second = (linkage.links[link].name for link in (joint.first, joint.second))
    relative = motion.relative_angular_velocity
    if linkage.frame in (joint.first, joint.second):
        wheel = second if joint.first == linkage.frame else first
        turn = UNKNOWN if relative is None else figure(abs(relative))
        return f"{wheel} rolls on the frame at {turn} rad/s"
    rates = [analysis.links[link].angular_velocity for link in (joint.first, joint.second)]
    turn = UNKNOWN if relative is None else figure(relative)
    return f"{second} rolls on {first} at {turn} rad/s{_ratio(rates, first, second)}"


def _ratio(rates: list[float | None], first: str, second: str) -> str:
    """How fast the second wheel turns to one turn of the first, both against the frame."""
    one, other = rates
    if one is None or other is None or abs(one) <= SHOWN_AS_ZERO * abs(other) or one == 0.0:
        return ""
    return f"; against the frame {second} turns {figure(other / one)} times as fast as {first}"
