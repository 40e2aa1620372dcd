"""Joints that are not pins, as they were read from a sheet, and what looked wrong about them."""

from __future__ import annotations

from typing import Literal, NamedTuple

from dxfcheck.geometry import Point

__all__ = ["Contact", "Oddity", "directed"]


class Contact(NamedTuple):
    """A slide, a pin in a slot or a rolling contact between two bodies (indices).

    ``at`` is its place and ``direction`` a unit vector as ``directed`` gives it: along the slide or the slot's centre
    line, along the common tangent of a rolling contact. ``site`` is the pin that sits in the block or the slot.
    ``strands`` are what it is drawn with (block and guide, slot, rack), ``rings`` its pitch circles (indices of
    primitives). ``full`` is a rolling contact that nothing else holds together: it removes two freedoms.
    ``room`` is how far the second body can go against and along ``direction`` before the guide or slot ends (less than
    0: it is drawn past that end); None where it has no ends. ``carrier`` is which of the two has the slot, 0 or 1;
    ``curves`` are the centres of the circle that the first body offers and of that of the second (pitch circle, curved
    slot), None for a straight one.
    """

    kind: Literal["slide", "pin in slot", "rolling"]
    bodies: tuple[int, int]
    at: Point
    direction: Point
    why: str
    site: int | None = None
    strands: tuple[int, ...] = ()
    rings: tuple[int, ...] = ()
    full: bool = False
    room: tuple[float, float] | None = None
    carrier: int | None = None
    curves: tuple[Point | None, Point | None] = (None, None)

    def swapped(self) -> Contact:
        """The same with its two bodies the other way round; direction and room stay as they are."""
        return self._replace(
            bodies=self.bodies[::-1],
            carrier=None if self.carrier is None else 1 - self.carrier,
            curves=self.curves[::-1],
        )


class Oddity(NamedTuple):
    """Something wrong about such a joint, for the rule of name ``kind`` to weigh.

    ``detail`` is a phrase, with '{amount}' where the figure goes; ``amount`` and ``limit`` in the drawing's unit.
    ``body`` is the body it is about, where there is one; ``case`` the case of its rule, where there are several.
    """

    kind: str
    at: Point
    detail: str
    amount: float | None = None
    limit: float | None = None
    site: int | None = None
    body: int | None = None
    strands: tuple[int, ...] = ()
    rings: tuple[int, ...] = ()
    severity: Literal["error", "warning", "note"] | None = None
    case: str = ""


def directed(vector: Point) -> Point:
    """The unit vector along a line, pointing to +x, or straight up where it has no x."""
    along = vector / abs(vector)
    if abs(along.real) <= ROUNDING:
        return 1j
    if abs(along.imag) <= ROUNDING:
        return 1 + 0j
    return along if along.real > 0.0 else -along


ROUNDING = 1e-12
"""A component below this is rounding error of a line drawn upright or level."""
