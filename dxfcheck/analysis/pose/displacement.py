"""A linkage moved by a finite amount: how far its joints then fail to close, and the linkage at its new pose.

A displacement q holds three lengths for each moving link, in the order of the linkage: w = angle * size, and how far
its centre moved, dx and dy (centre and size as in ``constraints``). A point p of the link goes to
centre + d + (p - centre) e^(i angle). What is left open at a joint is measured along the same directions as its rows in
the constraint matrix, so that the matrix at the new pose is its derivative, but for what is small of second order.
"""

from __future__ import annotations

import cmath
from dataclasses import replace
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from dxfcheck.analysis.freedom.constraints import Body
from dxfcheck.geometry import Point, dot
from dxfcheck.linkage import Joint, Linkage

__all__ = ["Displaced", "can_be_displaced", "displace"]


class Displaced(NamedTuple):
    """The linkage at its new pose (joints, directions and pins moved), its bodies there, and the closure errors.

    ``errors`` run parallel to the rows of the constraint matrix, in the drawing's unit.
    """

    linkage: Linkage
    bodies: list[Body]
    errors: NDArray[np.float64]


class _Pose(NamedTuple):
    """Where one link went: its centre, by what ``shift``, turned by ``angle`` radians."""

    centre: Point
    shift: Point
    angle: float

    @property
    def turn(self) -> Point:
        return cmath.rect(1.0, self.angle)

    def place(self, point: Point) -> Point:
        return self.centre + self.shift + (point - self.centre) * self.turn


def can_be_displaced(linkage: Linkage) -> bool:
    """Whether every joint says enough of its shape for finite motion; the velocities at the pose need less."""
    return all(_is_known(joint) for joint in linkage.joints)


def _is_known(joint: Joint) -> bool:
    if joint.kind == "pin in slot":
        return joint.carrier is not None
    if joint.kind == "rolling":
        lines = joint.curves.count(None)
        return lines == 1 or (lines == 0 and not joint.full)
    return True


def displace(linkage: Linkage, bodies: list[Body], displacement: NDArray[np.float64]) -> Displaced:
    """Move every link; ValueError where a joint does not say enough of its shape (see ``can_be_displaced``)."""
    if not can_be_displaced(linkage):
        msg = f"a joint of {linkage.name} does not say on which circle or line it runs"
        raise ValueError(msg)
    parts = displacement.reshape(-1, 3).tolist()
    parts.insert(linkage.frame, [0.0, 0.0, 0.0])
    poses = [
        _Pose(body.centre, complex(across, up), turn / body.size)
        for body, (turn, across, up) in zip(bodies, parts, strict=True)
    ]
    joints: list[Joint] = []
    errors: list[float] = []
    for joint in linkage.joints:
        moved, left_open = _moved(joint, poses, bodies)
        joints.append(moved)
        errors += left_open
    pins = [replace(pin, at=poses[pin.links[0]].place(pin.at)) if pin.links else pin for pin in linkage.pins]
    return Displaced(
        linkage=replace(linkage, joints=tuple(joints), pins=tuple(pins)),
        bodies=[Body(pose.place(body.centre), body.size) for pose, body in zip(poses, bodies, strict=True)],
        errors=np.array(errors),
    )


def _moved(joint: Joint, poses: list[_Pose], bodies: list[Body]) -> tuple[Joint, list[float]]:
    """The joint at the new pose, and what is left open along each of its rows."""
    if joint.kind == "pin":
        first, second = (poses[link].place(joint.at) for link in (joint.first, joint.second))
        apart = second - first
        return replace(joint, at=(first + second) / 2.0), [apart.real, apart.imag]
    if joint.kind == "slide":
        return _moved_slide(joint, poses, bodies)
    if joint.kind == "pin in slot":
        return _moved_slot(joint, poses)
    return _moved_rolling(joint, poses)


def _along(joint: Joint) -> Point:
    return joint.direction if joint.direction is not None else 1 + 0j


def _moved_slide(joint: Joint, poses: list[_Pose], bodies: list[Body]) -> tuple[Joint, list[float]]:
    first, second = poses[joint.first], poses[joint.second]
    smaller = min((joint.first, joint.second), key=lambda link: (bodies[link].size, link == joint.first))
    along = _along(joint) * cmath.rect(1.0, (first.angle + second.angle) / 2.0)
    centre = bodies[smaller].centre
    apart = second.place(centre) - first.place(centre)
    open_turn = (second.angle - first.angle) * bodies[smaller].size
    return replace(joint, at=second.place(joint.at), direction=along), [open_turn, dot(apart, 1j * along)]


def _moved_slot(joint: Joint, poses: list[_Pose]) -> tuple[Joint, list[float]]:
    """The pin off the slot's centre line, as the carrier has it now: a line, or a circle about its curve's centre."""
    owner_first = joint.carrier == joint.first
    carrier, runner = (joint.first, joint.second) if owner_first else (joint.second, joint.first)
    middle = joint.curves[0 if owner_first else 1]
    pin = poses[runner].place(joint.at)
    along = _along(joint) * poses[carrier].turn
    if middle is None:
        off = dot(pin - poses[carrier].place(joint.at), 1j * along)
    else:
        centre, radius = poses[carrier].place(middle), abs(joint.at - middle)
        outward = (pin - centre) / abs(pin - centre)
        outwards = dot(1j * along, poses[carrier].turn * (joint.at - middle)) >= 0.0
        off = (abs(pin - centre) - radius) * (1.0 if outwards else -1.0)
        along = -1j * outward if outwards else 1j * outward
    return replace(joint, at=pin, direction=along), [off if owner_first else -off]


def _moved_rolling(joint: Joint, poses: list[_Pose]) -> tuple[Joint, list[float]]:
    one, other = joint.curves
    if one is not None and other is not None:
        return _moved_gears(joint, poses, one, other)
    return _moved_wheel(joint, poses)


def _moved_gears(joint: Joint, poses: list[_Pose], one: Point, other: Point) -> tuple[Joint, list[float]]:
    """Rolled arcs are equal: d dphi + r2 dtheta2 - r1 dtheta1 = 0.

    phi is the angle of the line of centres, d its length, r1 and r2 how far the pitch point lies from each centre along
    it: pure rolling seen from the line of centres, as Willis' equation has it.
    """
    before, after = other - one, poses[joint.second].place(other) - poses[joint.first].place(one)
    line = before / abs(before)
    to_first, to_second = dot(joint.at - one, line), dot(joint.at - other, line)
    turned = cmath.phase(after / before)
    rolled = abs(before) * turned + to_second * poses[joint.second].angle - to_first * poses[joint.first].angle
    sense = 1.0 if dot(1j * line, _along(joint)) >= 0.0 else -1.0
    now = after / abs(after)
    at = poses[joint.first].place(one) + to_first * now
    return replace(joint, at=at, direction=sense * 1j * now), [sense * rolled]


def _moved_wheel(joint: Joint, poses: list[_Pose]) -> tuple[Joint, list[float]]:
    """A wheel on a straight line: its centre's way along the line and its turn against it roll off one another."""
    wheel_first = joint.curves[0] is not None
    wheel, line = (joint.first, joint.second) if wheel_first else (joint.second, joint.first)
    centre = joint.curves[0] if wheel_first else joint.curves[1]
    assert centre is not None  # noqa: S101 - one of the two is a wheel, see can_be_displaced
    along = _along(joint) * poses[line].turn
    way = poses[wheel].place(centre) - poses[line].place(centre)
    lever = dot(1j * (joint.at - centre), _along(joint))
    sign = -1.0 if wheel_first else 1.0
    rolled = sign * (dot(way, along) + lever * (poses[wheel].angle - poses[line].angle))
    at = poses[wheel].place(centre) + (joint.at - centre) * poses[line].turn
    moved = replace(joint, at=at, direction=along)
    if not joint.full:
        return moved, [rolled]
    lifted = sign * dot(way, 1j * along)
    apart = rolled * along + lifted * 1j * along
    return moved, [apart.real, apart.imag]
