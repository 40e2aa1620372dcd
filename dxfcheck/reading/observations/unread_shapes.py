"""What a sheet without a linkage shows all the same: slides, slots, wheels and welds that no pin ties to anything."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from dxfcheck.drawing.primitives import Ring
from dxfcheck.reading.frames.weld_marks import weld_marks
from dxfcheck.reading.lines.nearness import near_pairs
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.lines.sorting import Sorted
from dxfcheck.reading.shapes.obrounds import find_curved_slots, find_obrounds
from dxfcheck.reading.shapes.rectangles import find_rectangles
from dxfcheck.reading.slides.boxes import boxes_of
from dxfcheck.reading.slides.guides import choose_guide
from dxfcheck.reading.slides.rails import rails_of
from dxfcheck.tolerances.linework import RIM_OF_RADIUS
from dxfcheck.tolerances.sheet import UNREAD_SHAPES_LIMIT

__all__ = ["shapes_shown"]


def shapes_shown(kinds: Sorted, sheet: Sheet) -> str:
    """Such shapes in words, or '' where there are none (or far too much on the sheet to look for them)."""
    if len(sheet.strands) > UNREAD_SHAPES_LIMIT:
        return ""
    obrounds = find_obrounds(sheet.strands, sheet.touching)
    curved = find_curved_slots(sheet.strands, sheet.touching, sheet.tolerance)
    counts = {
        ("rectangle on a line (a slide)", "rectangles on lines (slides)"): _slides(sheet),
        ("obround (a slot)", "obrounds (slots)"): len(obrounds) + len(curved),
        ("pair of rings that touch or cross (wheels)", "pairs of rings that touch or cross (wheels)"): _wheels(
            [ring for _, ring in (*kinds.rings, *kinds.pitch_rings)]
        ),
        ("weld mark", "weld marks"): len({arc for arc, _, _ in weld_marks(sheet.strands, sheet.ring_strands)}),
    }
    return ", ".join(f"{count} {many if count > 1 else one}" for (one, many), count in counts.items() if count)


def _slides(sheet: Sheet) -> int:
    """Rectangles that a line runs through, into, or along on both sides."""
    every = range(len(sheet.strands))
    rectangles = find_rectangles(sheet.linework, sheet.touching, sheet.pins, sheet.tolerance, every)
    boxes = boxes_of(rectangles, (), (), frozenset(), sheet.tolerance)
    rails = rails_of(boxes, sheet.linework, sheet.touching, (), sheet.ring_strands)
    return sum(choose_guide(box, near, (), ()) is not None for box, near in zip(boxes, rails, strict=True))


def _wheels(rings: Sequence[Ring]) -> int:
    """Pairs of rings, not one about the other, that are tangent or cross one another."""
    if not rings:
        return 0
    centres = np.array([ring.centre for ring in rings], dtype=np.complex128)
    radii = np.array([ring.radius for ring in rings])
    one, other = near_pairs(centres, radii + radii.max(), centres, centres)
    apart = np.abs(centres[one] - centres[other])
    slack = RIM_OF_RADIUS * np.minimum(radii[one], radii[other])
    meet = (apart <= radii[one] + radii[other] + slack) & (apart >= np.abs(radii[one] - radii[other]) - slack)
    return int(np.count_nonzero((one < other) & meet & (apart > slack)))
