"""Gear trains for the tests of the reading: what they are drawn with, and how they are read."""

from __future__ import annotations

from collections import Counter
from collections.abc import Sequence

from dxfcheck.reading.bodies.bodies import Known, make_bodies
from dxfcheck.reading.bodies.body import Body
from dxfcheck.reading.gears.gearing import Gearing, find_gearing
from dxfcheck.reading.lines.sheet import Sheet, lay_out
from dxfcheck.reading.lines.sorting import Sorted, sort_primitives
from dxfcheck.reading.lines.tolerance import tolerance_for
from dxfcheck.reading.shapes.contact import Contact
from dxfcheck.settings import Settings
from tests.sketches import Drawn, ring, sketch

__all__ = ["bodies_of", "fixed_pin", "geared", "laid", "mobility", "pin", "pitch", "told"]


def pitch(at: complex, radius: float, *, layer: str = "PITCH", linetype: str = "CONTINUOUS", block: str = "") -> Drawn:
    """A pitch circle."""
    return ring(at, radius, layer=layer, linetype=linetype, block=block)


def pin(at: complex) -> Drawn:
    """A pin that moves."""
    return ring(at, 2.0)


def fixed_pin(at: complex) -> Drawn:
    """A pin on the frame."""
    return ring(at, 2.0, layer="FRAME")


def laid(*things: Drawn) -> tuple[Sorted, Sheet, tuple[Body, ...]]:
    """Sorted primitives, the sheet, and its bodies without any gearing."""
    drawn = sketch(*things)
    kinds = sort_primitives(drawn)
    sheet = lay_out(kinds, tolerance_for(drawn.diagonal, Settings()))
    frame = {strand.number: "layer" for strand in sheet.strands if strand.frame}
    active = {strand.number for strand in sheet.strands} - sheet.ring_strands
    return kinds, sheet, make_bodies(sheet, active, sheet.landings.landings, frame, Known()).bodies


def geared(*things: Drawn, slides: Sequence[Contact] = ()) -> Gearing:
    """The gearing of these things; ``slides`` are contacts between their bodies."""
    kinds, sheet, bodies = laid(*things)
    frame = [strand.number for strand in sheet.strands if strand.frame]
    return find_gearing(kinds.pitch_rings, kinds.racks, sheet, bodies, frame, slides)


def mobility(gearing: Gearing, slides: int = 0) -> int:
    """Grübler's count over bodies, pins and contacts, and so many slides."""
    bodies = gearing.bodies
    links = len(bodies) + (not bodies[0].frame)
    at_pin = Counter(site for body in bodies for site in body.pins)
    full = slides + sum(count - 1 for count in at_pin.values()) + sum(each.full for each in gearing.contacts)
    return 3 * (links - 1) - 2 * full - sum(not each.full for each in gearing.contacts)


def bodies_of(gearing: Gearing) -> list[tuple[tuple[int, ...], tuple[int, ...]]]:
    """Pins and wheels of each body that has wheels, by wheel."""
    return sorted(((body.pins, body.wheels) for body in gearing.bodies if body.wheels), key=lambda each: each[1])


def told(gearing: Gearing) -> list[str]:
    """The kinds of what looked wrong."""
    return sorted(oddity.kind for oddity in gearing.oddities)
