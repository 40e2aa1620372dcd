"""The tables of a mechanism's motion: its links, its pins, its joints.

'?' is what is not known, '-' what does not apply. What lies below SHOWN_AS_ZERO of the mechanism's greatest figure of
its kind is rounding noise and shown as 0.
"""

from __future__ import annotations

import cmath
import math
from collections.abc import Sequence

from dxfcheck.analysis.results import Analysis, LinkMotion
from dxfcheck.geometry import Point
from dxfcheck.linkage import Joint, JointKind, Linkage
from dxfcheck.reports.terminal_layout import NOT_APPLICABLE, UNKNOWN, Column, figure_column
from dxfcheck.tolerances.findings import SHOWN_AS_ZERO

__all__ = ["joint_columns", "link_columns", "pin_columns", "turns_a_minute"]

Cell = float | str | None

TURNING: tuple[JointKind, ...] = ("pin", "pin in slot", "rolling")
SLIDING: tuple[JointKind, ...] = ("slide", "pin in slot")
RUBBING: tuple[JointKind, ...] = ("pin",)
"""A pin in a slot slides: its sliding speed is the rubbing there."""


def turns_a_minute(angular_velocity: float) -> float:
    """r/min for rad/s."""
    return angular_velocity * 30.0 / math.pi


def link_columns(linkage: Linkage, analysis: Analysis, unit: str) -> list[Column]:
    """Every link but the frame: how fast it turns and about which pole (its instant centre against the frame)."""
    moving = [number for number in range(len(linkage.links)) if number != linkage.frame]
    omegas = [analysis.links[number].angular_velocity for number in moving]
    poles = [_pole(linkage, analysis, number, analysis.links[number]) for number in moving]
    second = [pole if isinstance(pole, complex) else UNKNOWN if pole == UNKNOWN else NOT_APPLICABLE for pole in poles]
    noise, reach = _noise(omegas), _noise([abs(pin.at) for pin in linkage.pins])
    return [
        Column("link", "", [linkage.links[number].name for number in moving], numeric=False),
        figure_column("omega", "rad/s", omegas, noise),
        figure_column("omega", "r/min", [None if w is None else turns_a_minute(w) for w in omegas], 10 * noise),
        figure_column("pole x", unit, [pole.real if isinstance(pole, complex) else pole for pole in poles], reach),
        figure_column("pole y", unit, [pole.imag if isinstance(pole, complex) else pole for pole in second], reach),
    ]


def _pole(linkage: Linkage, analysis: Analysis, link: int, motion: LinkMotion) -> Point | str:
    """The pole, or why there is none: a link at rest or one that only translates has none."""
    if motion.pole is not None:
        return motion.pole
    if not motion.determined:
        return UNKNOWN
    velocities = [analysis.pins[pin].velocity for pin in linkage.links[link].pins]
    if not velocities:
        return _pinless(linkage, analysis, link)
    noise = _noise([abs(pin.velocity) for pin in analysis.pins if pin.velocity is not None])
    at_rest = all(velocity is not None and abs(velocity) <= noise for velocity in velocities)
    return "at rest" if at_rest else "translates"


def _pinless(linkage: Linkage, analysis: Analysis, link: int) -> str:
    """Whether a link without pins translates, if it slides on the frame; else only that it has no pole."""
    speeds = [
        motion.slide_speed
        for joint, motion in zip(linkage.joints, analysis.joints, strict=True)
        if joint.kind == "slide" and {joint.first, joint.second} == {link, linkage.frame}
    ]
    if not speeds or speeds[0] is None:
        return "none"
    noise = _noise([motion.slide_speed for motion in analysis.joints])
    return "at rest" if abs(speeds[0]) <= noise else "translates"


def pin_columns(linkage: Linkage, analysis: Analysis, unit: str) -> list[Column]:
    """Every pin: its place, and its velocity against the frame with the angle it points at from +x."""
    velocities = [
        None if pin.fixed else motion.velocity for pin, motion in zip(linkage.pins, analysis.pins, strict=True)
    ]
    fixed = [pin.fixed for pin in linkage.pins]
    speeds = [None if velocity is None else abs(velocity) for velocity in velocities]
    noise, reach = _noise(speeds), _noise([abs(pin.at) for pin in linkage.pins])
    parts: list[list[float | None]] = [
        [None if velocity is None else velocity.real for velocity in velocities],
        [None if velocity is None else velocity.imag for velocity in velocities],
    ]
    towards = [_direction(velocity, noise) for velocity in velocities]
    rate = f"{unit}/s"
    return [
        Column("pin", "", [pin.name for pin in linkage.pins], numeric=False),
        figure_column("x", unit, [pin.at.real for pin in linkage.pins], reach),
        figure_column("y", unit, [pin.at.imag for pin in linkage.pins], reach),
        figure_column("speed", rate, _marked(speeds, fixed, "fixed"), noise),
        figure_column("vx", rate, _marked(parts[0], fixed), noise),
        figure_column("vy", rate, _marked(parts[1], fixed), noise),
        figure_column("towards", "deg", _marked(towards, fixed), SHOWN_AS_ZERO),
    ]


def _direction(velocity: Point | None, noise: float) -> Cell:
    """Degrees from +x, counter-clockwise, above -180 up to 180; what stands still has no direction."""
    if velocity is None:
        return None
    if abs(velocity) <= noise:
        return NOT_APPLICABLE
    upward = 0.0 if abs(velocity.imag) <= noise else velocity.imag
    return math.degrees(cmath.phase(complex(velocity.real, upward)))


def joint_columns(linkage: Linkage, analysis: Analysis, unit: str) -> list[Column]:
    """Every joint: what it joins and the motion of the second link against the first."""
    joints, motions, names = linkage.joints, analysis.joints, [link.name for link in linkage.links]
    turning = _where(TURNING, joints, [motion.relative_angular_velocity for motion in motions])
    sliding = _where(SLIDING, joints, [motion.slide_speed for motion in motions])
    rubbing = _where(RUBBING, joints, [motion.rubbing_speed for motion in motions])
    at = [NOT_APPLICABLE if joint.pin is None else linkage.pins[joint.pin].name for joint in joints]
    rate = f"{unit}/s"
    columns = [
        Column("joint", "", at, numeric=False),
        Column("kind", "", [joint.kind for joint in joints], numeric=False),
        Column("between", "", [f"{names[joint.first]}, {names[joint.second]}" for joint in joints], numeric=False),
        figure_column("relative", "rad/s", turning, _noise(turning)),
        figure_column("sliding", rate, sliding, _noise(sliding)),
        figure_column("rubbing", rate, rubbing, _noise(rubbing)),
    ]
    if all(joint.kind not in SLIDING for joint in joints):
        del columns[4]
    return columns


def _where(kinds: tuple[JointKind, ...], joints: Sequence[Joint], values: Sequence[float | None]) -> list[Cell]:
    """The values at joints of these kinds; at others they do not apply."""
    return [value if joint.kind in kinds else NOT_APPLICABLE for joint, value in zip(joints, values, strict=True)]


def _marked(values: Sequence[Cell], fixed: Sequence[bool], word: str = NOT_APPLICABLE) -> list[Cell]:
    """The values, with a word in place of those of pins on the frame."""
    return [word if held else value for held, value in zip(fixed, values, strict=True)]


def _noise(values: Sequence[Cell]) -> float:
    """Below this a figure of the column is rounding noise."""
    return SHOWN_AS_ZERO * max([abs(value) for value in values if isinstance(value, float)], default=0.0)
