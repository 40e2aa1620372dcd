"""Sketches built from plain shapes, without a DXF file: exact coordinates, and quick.

Each builder (``line``, ``ring`` ...) gives one drawn thing; ``sketch`` makes entities of them, numbered as handles
'1', '2' ... unless a thing was given a handle of its own. ``read`` and ``fates`` take the same things.
"""

from __future__ import annotations

import cmath
import math
from collections.abc import Callable, Iterable, Sequence
from itertools import pairwise
from typing import NamedTuple

from dxfcheck.drawing.primitives import (
    Arc,
    BlockUse,
    Dimension,
    Entity,
    Fate,
    Fill,
    LengthUnit,
    Notice,
    Path,
    Primitive,
    Ring,
    Segment,
    Sketch,
    Source,
    Text,
)
from dxfcheck.linkage import Linkage
from dxfcheck.reading.lines.sheet import Sheet, lay_out
from dxfcheck.reading.lines.sorting import sort_primitives
from dxfcheck.reading.lines.tolerance import Tolerance, tolerance_for
from dxfcheck.reading.mechanisms.model import make_model
from dxfcheck.reading.parts.parts import Parts, find_parts
from dxfcheck.reading.read import read_linkages
from dxfcheck.reading.reading import Observation, Reading
from dxfcheck.reading.records.fates import fates_of
from dxfcheck.settings import Settings

MM = LengthUnit("mm", "header", 1e-3)
SOURCE = Source(0, "1", "0", "CONTINUOUS", ())
TOLERANCE = Tolerance(t=0.001, shape=0.1, gap=0.2)
"""A sheet of a diagonal of 200 reads so, with t a little rounded up."""


class Drawn(NamedTuple):
    """One thing as drawn: how to make its primitive once its source is known, and where it says it lies."""

    type: str
    make: Callable[[Source], Primitive]
    layer: str = "0"
    linetype: str = "CONTINUOUS"
    block: str = ""
    handle: str = ""


def line(
    start: complex, end: complex, *, layer: str = "0", linetype: str = "CONTINUOUS", block: str = "", handle: str = ""
) -> Drawn:
    """A straight line."""
    return Drawn("LINE", lambda source: Segment(source, start, end), layer, linetype, block, handle)


def ring(
    at: complex,
    radius: float = 4.0,
    *,
    layer: str = "0",
    linetype: str = "CONTINUOUS",
    block: str = "",
    handle: str = "",
) -> Drawn:
    """A full circle."""
    return Drawn("CIRCLE", lambda source: Ring(source, at, radius), layer, linetype, block, handle)


def arc(centre: complex, radius: float, start: float, sweep: float, *, layer: str = "0", handle: str = "") -> Drawn:
    """An arc from ``start`` over ``sweep``, in degrees counter-clockwise."""
    turned = math.radians(start), math.radians(sweep)
    return Drawn("ARC", lambda source: Arc(source, centre, radius, *turned), layer, handle=handle)


def path(*points: complex, closed: bool = False, curved: bool = False, layer: str = "0", handle: str = "") -> Drawn:
    """A polyline of straight pieces."""
    run = (*points, points[0]) if closed else points

    def make(source: Source) -> Path:
        return Path(source, tuple(Segment(source, *pair) for pair in pairwise(run)), points, closed, curved)

    return Drawn("LWPOLYLINE", make, layer, handle=handle)


def rectangle(centre: complex, length: float, width: float, *, handle: str = "") -> Drawn:
    """A closed polyline of four corners, its length along +x."""
    half, up = length / 2, width / 2 * 1j
    corners = (centre - half - up, centre + half - up, centre + half + up, centre - half + up)
    return path(*corners, closed=True, handle=handle)


def obround(one: complex, other: complex, radius: float, *, handle: str = "") -> Drawn:
    """A closed polyline of two lines and two half arcs about two centres."""
    along = (other - one) / abs(other - one)
    side = radius * along * 1j
    angle = cmath.phase(along)
    corners = (one - side, other - side, other + side, one + side)

    def make(source: Source) -> Path:
        pieces = (
            Segment(source, corners[0], corners[1]),
            Arc(source, other, radius, angle - math.pi / 2, math.pi),
            Segment(source, corners[2], corners[3]),
            Arc(source, one, radius, angle + math.pi / 2, math.pi),
        )
        return Path(source, pieces, corners, closed=True, curved=False)

    return Drawn("LWPOLYLINE", make, handle=handle)


def text(content: str, at: complex, height: float = 3.0, *, layer: str = "0", handle: str = "") -> Drawn:
    """A line of lettering that begins at a place."""
    width, up = 0.65 * height * len(content), height * 1j
    box = (at, at + width, at + width + up, at + up)
    return Drawn("TEXT", lambda source: Text(source, content, at, height, box), layer, handle=handle)


def fill(*points: complex, solid: bool, layer: str = "0", handle: str = "") -> Drawn:
    """A hatch over one polygon, solid or a pattern."""
    return Drawn("HATCH", lambda source: Fill(source, (points,), solid), layer, handle=handle)


def dimension(measured: float, *points: complex, layer: str = "0", handle: str = "") -> Drawn:
    """A linear dimension."""
    return Drawn("DIMENSION", lambda source: Dimension(source, "", measured, points, "linear"), layer, handle=handle)


def sketch(
    *things: Drawn,
    entities: Iterable[Entity] = (),
    notices: Iterable[Notice] = (),
    unit: LengthUnit = MM,
    diagonal: float | None = None,
) -> Sketch:
    """A sketch of these things, one entity each; ``entities`` are further ones, their fate sealed on loading."""
    records = []
    primitives = []
    for number, thing in enumerate(things):
        handle = thing.handle or str(number + 1)
        blocks = (BlockUse(thing.block, handle),) if thing.block else ()
        primitives.append(thing.make(Source(number, handle, thing.layer, thing.linetype, blocks)))
        records.append(Entity(handle, "INSERT" if thing.block else thing.type, thing.layer, None, None))
    return Sketch(
        path="sheet.dxf",
        unit=unit,
        entities=(*records, *entities),
        primitives=tuple(primitives),
        notices=tuple(notices),
        diagonal=_diagonal(primitives) if diagonal is None else diagonal,
    )


def _diagonal(primitives: Sequence[Primitive]) -> float:
    points: list[complex] = []
    for primitive in primitives:
        if isinstance(primitive, Segment):
            points += [primitive.start, primitive.end]
        elif isinstance(primitive, Path):
            points += primitive.vertices
        elif isinstance(primitive, Ring | Arc):
            reach = primitive.radius * (1 + 1j)
            points += [primitive.centre - reach, primitive.centre + reach]
    xs, ys = [point.real for point in points], [point.imag for point in points]
    return math.hypot(max(xs) - min(xs), max(ys) - min(ys)) if points else 0.0


def read(*things: Drawn, settings: Settings | None = None) -> Reading:
    """The reading of these things."""
    return read_linkages(sketch(*things), settings or Settings())


def linkage(*things: Drawn, settings: Settings | None = None) -> Linkage:
    """The one linkage that these things are read as."""
    reading = read(*things, settings=settings)
    (only,) = reading.linkages
    return only


def links(*things: Drawn, settings: Settings | None = None) -> list[str]:
    """The names of the links of the one linkage that these things are read as."""
    return [link.name for link in linkage(*things, settings=settings).links]


def counts(*things: Drawn) -> tuple[int, int]:
    """Links (the frame among them) and full joints of the one linkage."""
    only = linkage(*things)
    return len(only.links), len(only.joints)


def observed(kind: str, *things: Drawn, settings: Settings | None = None) -> list[Observation]:
    """The observations of one kind."""
    return [each for each in read(*things, settings=settings).observations if each.kind == kind]


def laid_out(*things: Drawn) -> tuple[Sheet, Parts]:
    """The sheet and its parts, as the steps of the reading make them."""
    drawn = sketch(*things)
    kinds = sort_primitives(drawn)
    sheet = lay_out(kinds, tolerance_for(drawn.diagonal, Settings()))
    return sheet, find_parts(kinds, sheet, Settings())


def fates(*things: Drawn) -> dict[str, Fate]:
    """What each thing was read as and why, by its handle."""
    drawn = sketch(*things)
    kinds = sort_primitives(drawn)
    sheet = lay_out(kinds, tolerance_for(drawn.diagonal, Settings()))
    parts = find_parts(kinds, sheet, Settings())
    settled = fates_of(drawn, kinds, sheet, parts, make_model(drawn, Settings(), kinds, sheet, parts))
    return {drawn.handles(drawn.primitives[index]): fate for index, fate in settled.items()}


def read_as(*things: Drawn) -> dict[str, str]:
    """The account's word for each thing, by its handle."""
    return {handle: fate.read_as for handle, fate in fates(*things).items()}


# The tray tipper: frame pins A and D, crank AB, coupler BC, rocker CD; the lines run from rim to rim.
A, B, C, D = 0j, 20 + 35j, 160 + 80j, 150 + 0j
RADIUS = 4.0


def rod(start: complex, end: complex, *, radius: float = RADIUS, layer: str = "0", handle: str = "") -> Drawn:
    """A line between two pins that stops at the rims of both."""
    along = radius * (end - start) / abs(end - start)
    return line(start + along, end - along, layer=layer, handle=handle)


def labels() -> tuple[Drawn, ...]:
    """The names of the tray tipper's pins."""
    places = {"A": A, "B": B, "C": C, "D": D}
    return tuple(text(name, at + 5 + 3j, handle=f"label {name}") for name, at in places.items())


def pins() -> tuple[Drawn, ...]:
    """The rings of the tray tipper, the fixed ones on a frame layer."""
    return (
        ring(A, layer="FRAME", handle="ring A"),
        ring(B, handle="ring B"),
        ring(C, handle="ring C"),
        ring(D, layer="FRAME", handle="ring D"),
    )


def rods() -> tuple[Drawn, ...]:
    """The lines of the tray tipper."""
    return rod(A, B, handle="crank"), rod(B, C, handle="coupler"), rod(C, D, handle="rocker")


def tipper() -> tuple[Drawn, ...]:
    """The tray tipper, labelled."""
    return *pins(), *rods(), *labels()
