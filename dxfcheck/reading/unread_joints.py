"""Joints that are recognised but not yet read: slides, slots, rolling contacts; their mechanisms are refused."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from typing import NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import Ring
from dxfcheck.reading.nearness import ComplexArray, near_pairs
from dxfcheck.reading.outlines import pins_inside
from dxfcheck.reading.pins import PinSite
from dxfcheck.reading.shapes import Obround, Rectangle
from dxfcheck.reading.tolerance import Tolerance

__all__ = ["UnreadJoint", "bars_of", "blocks_of", "pitch_circles_of", "slots_of"]


class UnreadJoint(NamedTuple):
    """A shape at a pin (a site) that stands for a joint this version does not read.

    ``read_as`` is the account's word for it, ``strands`` the linework it is drawn with, ``rings`` the pitch circles
    (indices of primitives).
    """

    site: int
    read_as: str
    what: str
    strands: tuple[int, ...]
    rings: tuple[int, ...] = ()


def blocks_of(rectangles: Sequence[Rectangle], pins: Sequence[PinSite]) -> Iterator[UnreadJoint]:
    """Rectangles that hold exactly one pin: blocks of slides."""
    places = np.array([pin.at for pin in pins], dtype=np.complex128)
    for rectangle in rectangles:
        inside = [pins[number] for number in pins_inside(rectangle.corners, places)]
        if len(inside) == 1:
            yield UnreadJoint(
                inside[0].number, "slide", "a rectangle round the pin (a sliding block)", rectangle.strands
            )


def slots_of(obrounds: Sequence[Obround], pins: Sequence[PinSite]) -> Iterator[UnreadJoint]:
    """Obrounds that hold one pin: slots."""
    places = np.array([pin.at for pin in pins], dtype=np.complex128)
    for obround in obrounds:
        inside = _pins_in(obround, pins, places)
        if len(inside) == 1:
            yield UnreadJoint(inside[0].number, "slot", "an obround round the pin (a slot)", obround.strands)


def bars_of(
    obrounds: Sequence[Obround], pins: Sequence[PinSite], tolerance: Tolerance
) -> Iterator[tuple[Obround, tuple[int, int]]]:
    """Obrounds with a pin at each end and none between: bars, with the two sites."""
    places = np.array([pin.at for pin in pins], dtype=np.complex128)
    for obround in obrounds:
        inside = _pins_in(obround, pins, places)
        if len(inside) == 2 and all(obround.ends_at(pin, tolerance) for pin in inside):
            yield obround, (inside[0].number, inside[1].number)


def _pins_in(obround: Obround, pins: Sequence[PinSite], places: ComplexArray) -> list[PinSite]:
    """The pins on the centre line of an obround."""
    middle = (obround.centres[0] + obround.centres[1]) / 2
    reach = abs(obround.centres[1] - obround.centres[0]) / 2 + obround.radius
    near = np.nonzero(np.abs(places - middle) <= reach)[0].tolist()
    return [pins[number] for number in near if obround.holds(pins[number])]


def pitch_circles_of(
    rings: Sequence[tuple[int, Ring]], pins: Sequence[PinSite], tolerance: Tolerance
) -> Iterator[UnreadJoint]:
    """Pitch rings about a pin that touch another such ring, from outside or inside."""
    if not rings or not pins:
        return
    centres = np.array([ring.centre for _, ring in rings], dtype=np.complex128)
    places = np.array([pin.at for pin in pins], dtype=np.complex128)
    pairs = near_pairs(centres, np.full(centres.size, tolerance.t), places, places)
    site_of = dict(zip(*(each.tolist() for each in pairs), strict=True))
    for number, (index, ring) in enumerate(rings):
        if number in site_of and any(_roll(ring, other, tolerance) for each, other in rings if each != index):
            yield UnreadJoint(site_of[number], "pitch circle", "a pitch circle about the pin", (), (index,))


def _roll(one: Ring, other: Ring, tolerance: Tolerance) -> bool:
    apart = abs(one.centre - other.centre)
    within = tolerance.rim(min(one.radius, other.radius))
    outside, inside = one.radius + other.radius, abs(one.radius - other.radius)
    return apart > tolerance.t and (abs(apart - outside) <= within or abs(apart - inside) <= within)
