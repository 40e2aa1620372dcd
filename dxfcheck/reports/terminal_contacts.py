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
from dxfcheck.tolerances.findings import ON_AXIS_OF_REACH, SHOWN_AS_ZERO

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
    first, second = (_called(linkage, link) for link in (joint.first, joint.second))
    carriers = [link for link in (joint.first, joint.second) if joint.pin in linkage.links[link].pins]
    if joint.pin is None or len(carriers) != 1:
        names = f"the pin at {place(joint.at)} in the slot between {first} and {second}"
        return f"{names}: {second} slides {_pace(joint, speed, unit, noise)}"
    carrier, slot = (second, first) if carriers[0] == joint.second else (first, second)
    if slot == second and speed is not None:
        speed = -speed
    pin = linkage.pins[joint.pin].name
    return f"pin {pin} of {carrier} slides in the slot of {slot} {_pace(joint, speed, unit, noise)}"


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
    names = f"{_called(linkage, second)} slides on {_called(linkage, first)}"
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
    """One link's turning against the other, the wheel named first where the other does not turn."""
    known = [abs(link.angular_velocity) for link in analysis.links if link.angular_velocity is not None]
    noise = SHOWN_AS_ZERO * max(known, default=0.0)
    wheel, other, relative = joint.second, joint.first, motion.relative_angular_velocity
    rates = {each: analysis.links[each].angular_velocity for each in (wheel, other)}
    if wheel == linkage.frame or (other != linkage.frame and _stands(rates[wheel], noise)):
        wheel, other = other, wheel
        relative = None if relative is None else -relative
    names = {each: _called(linkage, each) for each in (wheel, other)}
    rolls = f"{names[wheel]} rolls on {names[other]} at {_turning(relative, noise)}"
    if other == linkage.frame:
        return rolls
    if _stands(rates[other], noise):
        return f"{rolls}; {names[other]} does not turn"
    return rolls + _ratio(rates[wheel], rates[other], names[wheel], names[other])


def _stands(rate: float | None, noise: float) -> bool:
    return rate is not None and abs(rate) <= noise


def _turning(rate: float | None, noise: float) -> str:
    """An angular velocity with its sense."""
    if rate is None or abs(rate) <= noise:
        return f"{UNKNOWN if rate is None else 0} rad/s"
    return f"{figure(abs(rate))} rad/s {'ccw' if rate > 0.0 else 'cw'}"


def _ratio(rate: float | None, other_rate: float | None, name: str, other_name: str) -> str:
    """How fast the one turns to one turn of the other, both against the frame."""
    if rate is None or other_rate is None:
        return ""
    way = "the same way" if rate * other_rate > 0.0 else "the other way"
    return f"; against the frame {name} turns {figure(abs(rate / other_rate))} times as fast as {other_name}, {way}"


def _called(linkage: Linkage, link: int) -> str:
    """A link in a sentence; the name of one without pins is a mere handle."""
    if link == linkage.frame and linkage.links[link].kind == "frame":
        return "the frame"
    name = linkage.links[link].name
    return name if linkage.links[link].pins else f"link {name}"
