"""Slider-cranks for the tests of the reading: a dibber with its block, guides of all makes, and how they are read."""

from __future__ import annotations

import cmath
from typing import NamedTuple

from dxfcheck.linkage import Linkage
from dxfcheck.settings import Settings
from tests.sketches import Drawn, line, linkage, path, rectangle, ring, rod, text

__all__ = [
    "BLOCK",
    "A",
    "B",
    "C",
    "Slid",
    "block",
    "crank_and_rod",
    "dibber",
    "guide",
    "loose_rectangle",
    "named",
    "slid",
    "slides_in",
    "strokes",
    "turned_rectangle",
]

A, B, C = 0j, 30 + 40j, 150 + 0j
"""The crank's pin on the frame, its end, and the block's pin."""
BLOCK = (30.0, 20.0)
"""Length and width of the dibber's block."""


class Slid(NamedTuple):
    """A slide as read: the names of the two links, and its direction rounded to six digits."""

    first: str
    second: str
    direction: complex


def crank_and_rod(*, rod_end: complex = C) -> tuple[Drawn, ...]:
    """Pins A (frame), B and C with the crank and the rod between them; ``rod_end`` is where the rod stops, if not C."""
    links = (rod(A, B, handle="crank"), rod(B, C, handle="rod"))
    if rod_end != C:
        links = (links[0], line(B + 4 * (C - B) / abs(C - B), rod_end, handle="rod"))
    rings = (ring(A, layer="FRAME", handle="ring A"), ring(B, handle="ring B"), ring(C, handle="ring C"))
    return (*rings, *links, *named(A=A, B=B, C=C))


def named(**places: complex) -> tuple[Drawn, ...]:
    """Labels of pins."""
    return tuple(text(name, at + 4 + 6j, handle=f"label {name}") for name, at in places.items())


def block(centre: complex = C) -> Drawn:
    """A block about a place, along +x."""
    return rectangle(centre, *BLOCK, handle="block")


def guide(start: complex = 90 + 0j, end: complex = 210 + 0j, *, layer: str = "FRAME", handle: str = "guide") -> Drawn:
    """A guide line, on the frame by its layer."""
    return line(start, end, layer=layer, handle=handle)


def dibber(*guides: Drawn) -> tuple[Drawn, ...]:
    """Crank, rod and block with these guides."""
    return (*crank_and_rod(), block(), *guides)


def loose_rectangle(centre: complex, length: float, width: float) -> tuple[Drawn, ...]:
    """A rectangle of four lines, along +x."""
    half, up = length / 2, width / 2 * 1j
    corners = (centre - half - up, centre + half - up, centre + half + up, centre - half + up)
    return tuple(line(corners[number - 1], corners[number], handle=f"side {number}") for number in range(4))


def turned_rectangle(centre: complex, length: float, width: float, turn: float, *, handle: str = "block") -> Drawn:
    """A rectangle whose length points along an angle (radians)."""
    along = cmath.rect(0.5, turn)
    half, up = along * length, along * width * 1j
    return path(
        centre - half - up, centre + half - up, centre + half + up, centre - half + up, closed=True, handle=handle
    )


def strokes(start: complex, end: complex, *, away: complex = -4 - 4j, count: int = 4) -> tuple[Drawn, ...]:
    """Hatch strokes that stand on the way from one place to another."""
    places = [start + (end - start) * (number + 0.5) / count for number in range(count)]
    return tuple(line(at, at + away, handle=f"stroke {number}") for number, at in enumerate(places))


def slides_in(found: Linkage) -> list[Slid]:
    """The slides of a linkage."""
    return [
        Slid(
            found.links[joint.first].name,
            found.links[joint.second].name,
            complex(round((joint.direction or 0j).real, 6), round((joint.direction or 0j).imag, 6)),
        )
        for joint in found.joints
        if joint.kind == "slide"
    ]


def slid(*things: Drawn, settings: Settings | None = None) -> list[Slid]:
    """The slides of the one linkage that these things are read as."""
    return slides_in(linkage(*things, settings=settings))
