"""The model of a planar linkage, with no drawing in it.

Glossary
    link        a rigid part
    frame       the fixed link
    pin         a place where links turn on one another; k links at one pin are k - 1 full joints
    joint       one connection of two links: 'pin' and 'slide' are full joints (two freedoms removed),
                'pin in slot' and 'rolling' half joints (one removed), unless the rolling contact is ``full``
    drive       a stated input motion
    mechanism   one assembly of moving links that hang together otherwise than through the frame, with its own frame

Points are complex numbers x + iy in the drawing's length unit; angular speeds rad/s, counter-clockwise positive;
sliding speeds in that length unit a second.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import Literal

from dxfcheck.geometry import Point

__all__ = ["Drive", "Joint", "JointKind", "Link", "LinkKind", "Linkage", "Pin"]

LinkKind = Literal["frame", "link", "block"]
JointKind = Literal["pin", "slide", "pin in slot", "rolling"]
DriveKind = Literal["turn", "slide"]
DriveSource = Literal["option", "settings", "note", "assumed"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Link:
    """One rigid part; ``pins`` are indices into Linkage.pins, in natural order of their names."""

    name: str
    kind: LinkKind
    pins: tuple[int, ...]
    handles: tuple[str, ...] = ()
    layer: str | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class Pin:
    """One turning centre; ``links`` are indices into Linkage.links: the frame first, then by name.

    A pin with one link is a tracing point. ``radius`` is that of its smallest ring.
    """

    name: str
    at: Point
    radius: float
    links: tuple[int, ...]
    fixed: bool
    labelled: bool = True
    handles: tuple[str, ...] = ()
    layer: str | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class Joint:
    """A connection of links ``first`` and ``second`` (indices); ``pin`` is an index into Linkage.pins or None.

    ``at`` is its place. ``direction`` is a unit vector: the slide's or slot's direction, the common tangent of a
    rolling contact, None for a pin. A ``full`` rolling contact is one that nothing else holds together (a wheel that
    rolls on the frame without an arm): it holds its two links as a pin at the contact does, and removes two freedoms
    (Fabien, Analytical System Dynamics, p. 70: one freedom in pure rolling). It means nothing for other kinds.
    ``carrier`` is the link that has the slot of a pin in slot, None where that is not known. ``curves`` are the centres
    of the circles on which the first and the second link touch or guide (pitch circles, a curved slot), None for a
    straight line: velocities at the pose do not depend on either, finite motion does. ``drawn_length`` is how long its
    guide or slot is drawn, which tells how well its direction is known; None where that is not known.
    """

    kind: JointKind
    first: int
    second: int
    at: Point
    pin: int | None = None
    direction: Point | None = None
    handles: tuple[str, ...] = ()
    full: bool = False
    carrier: int | None = None
    curves: tuple[Point | None, Point | None] = (None, None)
    drawn_length: float | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class Drive:
    """A stated motion of ``link`` against ``against`` (indices into Linkage.links).

    ``rate`` is rad/s, counter-clockwise positive, for kind 'turn', and length units a second along the slide's
    direction for kind 'slide' (then ``joint`` is the driven slide's index). ``stated`` is the text it was read from.
    """

    link: int
    against: int
    rate: float
    kind: DriveKind = "turn"
    source: DriveSource = "option"
    joint: int | None = None
    stated: str = ""
    at: Point | None = None
    handles: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True, kw_only=True)
class Linkage:
    """One mechanism. ``frame`` is the index of the fixed link (0 in a grounded mechanism).

    In an assembly that no joint ties to the frame (``grounded`` False) the longest link is held for the count, and
    no speeds are given. ``resolution`` is what each coordinate may be off by as drawn, in the drawing's unit: half a
    step of typed decimals, gaps between what was meant to meet, a stated tolerance; 0.0 for exact places.
    """

    name: str
    links: tuple[Link, ...]
    pins: tuple[Pin, ...]
    joints: tuple[Joint, ...]
    drives: tuple[Drive, ...] = field(default=())
    frame: int = 0
    grounded: bool = True
    resolution: float = 0.0
