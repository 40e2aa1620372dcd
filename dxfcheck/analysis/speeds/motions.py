"""What the links, pins and joints do, read off a solved motion."""

from __future__ import annotations

from dxfcheck.analysis.results import JointMotion, LinkMotion, PinMotion
from dxfcheck.analysis.speeds.velocity import Motion
from dxfcheck.geometry import Point, dot
from dxfcheck.linkage import Joint, Linkage, Pin
from dxfcheck.tolerances.analysis import REST_RELATIVE, TRANSLATION_RELATIVE

__all__ = ["joint_motions", "link_motions", "pin_motions", "unknown_motions"]

_UNKNOWN_LINK = LinkMotion(angular_velocity=None, pole=None, determined=False)
_UNKNOWN_PIN = PinMotion(velocity=None)
_UNKNOWN_JOINT = JointMotion(relative_angular_velocity=None, slide_speed=None, rubbing_speed=None)
_FRAME_AT_REST = LinkMotion(angular_velocity=0.0, pole=None, determined=True)

Motions = tuple[tuple[LinkMotion, ...], tuple[PinMotion, ...], tuple[JointMotion, ...]]


def unknown_motions(linkage: Linkage) -> Motions:
    """Nothing known of any link, pin or joint: an assembly that nothing ties to the frame."""
    return (
        (_UNKNOWN_LINK,) * len(linkage.links),
        (_UNKNOWN_PIN,) * len(linkage.pins),
        (_UNKNOWN_JOINT,) * len(linkage.joints),
    )


def link_motions(linkage: Linkage, motion: Motion) -> tuple[LinkMotion, ...]:
    """Angular velocity and pole of every link, None where the drives do not settle it."""
    return tuple([_link_motion(link, linkage.frame, motion) for link in range(len(linkage.links))])


def _link_motion(link: int, frame: int, motion: Motion) -> LinkMotion:
    """The pole is where the link's velocity is zero: v + i omega (pole - centre) = 0, so pole = centre + i v / omega.

    Source: Norton, Design of Machinery, ch. 6, instant centres (from memory).
    """
    if link == frame:
        return _FRAME_AT_REST
    if not motion.settled[link]:
        return _UNKNOWN_LINK
    turn, velocity, body = motion.turns[link], motion.centres[link], motion.bodies[link]
    rim = abs(turn) * body.size
    pole = None
    if rim > TRANSLATION_RELATIVE * abs(velocity) and rim > REST_RELATIVE * motion.fastest:
        pole = body.centre + 1j * velocity / turn
    return LinkMotion(angular_velocity=turn, pole=pole, determined=True)


def pin_motions(linkage: Linkage, motion: Motion) -> tuple[PinMotion, ...]:
    """Velocity of every pin: that of any of its links whose point there is settled."""
    return tuple([PinMotion(velocity=_pin_velocity(pin, motion)) for pin in linkage.pins])


def _pin_velocity(pin: Pin, motion: Motion) -> Point | None:
    if pin.fixed:
        return 0j
    for link in pin.links:
        if motion.point_settled(link, pin.at):
            velocity = motion.velocity(link, pin.at)
            return complex(velocity.real + 0.0, velocity.imag + 0.0)
    return None


def joint_motions(linkage: Linkage, motion: Motion) -> tuple[JointMotion, ...]:
    """Relative turning, sliding and rubbing at every joint, each None where it is not settled or has no meaning."""
    radii = [pin.radius for pin in linkage.pins]
    return tuple([_joint_motion(joint, motion, radii) for joint in linkage.joints])


def _joint_motion(joint: Joint, motion: Motion, radii: list[float]) -> JointMotion:
    turn = None
    if joint.kind == "slide":
        turn = 0.0
    elif motion.turn_settled(joint.first, joint.second):
        turn = motion.turns[joint.second] - motion.turns[joint.first] + 0.0
    rubbing = None
    if joint.kind == "pin" and joint.pin is not None and turn is not None:
        rubbing = radii[joint.pin] * abs(turn)
    slide = None
    if joint.kind in ("slide", "pin in slot"):
        slide = _slide_speed(joint, motion)
    return JointMotion(relative_angular_velocity=turn, slide_speed=slide, rubbing_speed=rubbing)


def _slide_speed(joint: Joint, motion: Motion) -> float | None:
    direction = joint.direction
    if direction is None or not motion.slide_settled(joint.first, joint.second, joint.at, direction):
        return None
    relative = motion.velocity(joint.second, joint.at) - motion.velocity(joint.first, joint.at)
    return dot(relative, direction) + 0.0
