"""The rings and the linework of a sheet laid out side by side: what every later step of the reading looks at."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np

from dxfcheck.drawing.primitives import Fill
from dxfcheck.reading.lines.landing import Landings, find_landings
from dxfcheck.reading.lines.linework import Linework, Strand, make_linework
from dxfcheck.reading.lines.pins import PinSite, PinSites, find_pins, rings_of_arcs, rings_of_lines
from dxfcheck.reading.lines.roles import BUILT_IN_ROLES
from dxfcheck.reading.lines.sorting import Sorted
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.reading.lines.touches import Touches, find_touches
from dxfcheck.reading.lines.typed import typed_step
from dxfcheck.settings import LayerRoles

__all__ = ["Sheet", "lay_out"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Sheet:
    """Rings, linework and fills of a sheet, and how they meet.

    ``landings`` are those of all linework, before it is known what is frame, mark or link. ``of_ring`` maps a ring (by
    id) to the primitives it was made of; ``ring_strands`` are strands used up as rings. ``roles`` say which layers and
    blocks are frame.
    """

    linework: Linework
    touching: Touches
    sites: PinSites
    landings: Landings
    ring_strands: frozenset[int]
    of_ring: Mapping[int, tuple[int, ...]]
    fills: tuple[Fill, ...]
    tolerance: Tolerance
    roles: LayerRoles = BUILT_IN_ROLES

    @property
    def strands(self) -> tuple[Strand, ...]:
        """All strands, those used up as rings among them."""
        return self.linework.strands

    @property
    def pins(self) -> tuple[PinSite, ...]:
        """All places where a pin is drawn."""
        return self.sites.pins


def lay_out(kinds: Sorted, tolerance: Tolerance) -> Sheet:
    """Rings, strands and where they meet."""
    frame = {number for number, (index, _) in enumerate(kinds.lines) if index in kinds.frame_lines}
    linework = make_linework((primitive for _, primitive in kinds.lines), frame)
    tolerance = _for_typed(kinds, linework, tolerance)
    touching = find_touches(linework, tolerance, tolerance.close)
    arcs = [strand for strand in linework.strands if len(strand.pieces) == 1]
    made = rings_of_arcs(arcs, tolerance)
    made.extend(rings_of_lines(linework, touching, tolerance))
    rings = [ring for _, ring in kinds.rings] + [ring for ring, _ in made]
    of_ring: dict[int, tuple[int, ...]] = {id(ring): (index,) for index, ring in kinds.rings}
    of_ring.update({id(ring): tuple(kinds.lines[strand][0] for strand in strands) for ring, strands in made})
    used = frozenset(strand for _, strands in made for strand in strands)
    sites = find_pins(rings, tolerance, [ring for _, ring in kinds.pitch_rings], kinds.roles)
    found = find_landings(sites.pins, linework, tolerance)
    landings = Landings(
        landings=tuple(each for each in found.landings if each.strand not in used),
        misses=tuple(each for each in found.misses if each.strand not in used),
    )
    return Sheet(
        linework=linework,
        touching=touching,
        sites=sites,
        landings=landings,
        ring_strands=used,
        of_ring=of_ring,
        fills=tuple(fill for _, fill in kinds.fills),
        tolerance=tolerance,
        roles=kinds.roles,
    )


def _for_typed(kinds: Sorted, linework: Linework, tolerance: Tolerance) -> Tolerance:
    """The tolerance with the step to which rings, and rings and lines, were typed."""
    rings = np.array([ring.centre for _, ring in kinds.rings], dtype=np.complex128)
    of_rings = typed_step(rings) if rings.size > 1 else 0.0
    if not of_rings:
        return tolerance
    every = typed_step(np.concatenate((rings, linework.piece_starts, linework.piece_ends)))
    return tolerance._replace(typed_rings=of_rings, typed=every)
