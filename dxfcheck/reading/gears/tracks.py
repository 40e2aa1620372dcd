"""Lines that wheels roll on, racks and lines of the frame, and wheels that frame linework holds (reading rule 6)."""

from __future__ import annotations

import math
from collections.abc import Collection, Mapping, Sequence
from typing import NamedTuple

import numpy as np

from dxfcheck.geometry import Point, angle_between_lines
from dxfcheck.reading.gears.wheels import Wheel
from dxfcheck.reading.lines.racks import find_tangents
from dxfcheck.reading.lines.roles import frame_reason
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.tolerances.shapes import RACK_PARALLEL_DEGREES

__all__ = ["Track", "find_tracks", "held_by_frame"]

PARALLEL = math.radians(RACK_PARALLEL_DEGREES)


class Track(NamedTuple):
    """A straight strand tangent to a wheel (number): its ``foot`` on the line, ``normal`` the unit vector towards it.

    ``miss`` is the gap between them, negative where they overlap; ``rack`` says that it is drawn as a pitch line.
    """

    wheel: int
    strand: int
    foot: Point
    normal: Point
    miss: float
    rack: bool

    def same_side(self, other: Track) -> bool:
        """Whether another line touches the same wheel at the same place, as one interrupted there does."""
        turn = angle_between_lines(self.normal, other.normal)
        facing = (self.normal * other.normal.conjugate()).real > 0.0
        return self.wheel == other.wheel and facing and turn <= PARALLEL

    def runs_along(self, direction: Point) -> bool:
        """Whether the line is parallel to a direction."""
        return angle_between_lines(self.normal * 1j, direction) <= PARALLEL


def find_tracks(
    wheels: Sequence[Wheel], racks: Collection[int], frame_strands: Collection[int], sheet: Sheet
) -> list[Track]:
    """The racks and the straight pieces of frame strands that are tangent to a wheel, by wheel, then strand."""
    linework = sheet.linework
    lines = np.array(sorted({*racks, *frame_strands}), dtype=np.int64)
    chosen = np.nonzero(np.isin(linework.piece_strand, lines))[0]
    if not chosen.size:
        return []
    starts, ends = linework.piece_starts[chosen], linework.piece_ends[chosen]
    centres, radii = [wheel.at for wheel in wheels], [wheel.radius for wheel in wheels]
    found: dict[tuple[int, int], Track] = {}
    for tangent in find_tangents(centres, radii, starts, ends):
        wheel, strand = wheels[tangent.circle], int(linework.piece_strand[chosen[tangent.piece]])
        start, end = complex(starts[tangent.piece]), complex(ends[tangent.piece])
        foot = start + (end - start) * (tangent.foot / tangent.length)
        normal = (foot - wheel.at) / abs(foot - wheel.at)
        track = Track(wheel.number, strand, foot, normal, tangent.miss, strand in racks)
        known = found.get((wheel.number, strand), track)
        found[wheel.number, strand] = min(known, track, key=lambda each: abs(each.miss))
    return [found[key] for key in sorted(found)]


def held_by_frame(
    wheels: Sequence[Wheel],
    touched: Sequence[Mapping[int, Sequence[int]]],
    frame_strands: Collection[int],
    sheet: Sheet,
) -> set[int]:
    """Wheels that are frame by their layer or block, or on whose rim frame linework ends.

    The legs and the base line of the symbol under the wheel's own pin may end there by chance: they do not count.
    """
    held = {wheel.number for wheel in wheels if frame_reason(wheel.source, sheet.roles) is not None}
    ending = {
        wheel.number: {
            strand
            for strand, ends in touched[wheel.number].items()
            if strand in frame_strands and any(end >= 0 for end in ends)
        }
        for wheel in wheels
        if wheel.number not in held
    }
    sites = {wheels[number].site for number, strands in ending.items() if strands}
    symbols = _symbols(sites, frame_strands, sheet) if sites else {}
    return held | {number for number, strands in ending.items() if strands - symbols.get(wheels[number].site, set())}


def _symbols(sites: Collection[int | None], frame_strands: Collection[int], sheet: Sheet) -> dict[int | None, set[int]]:
    """For each pin the frame linework that runs from it to other frame linework, and what that ends on."""
    found: dict[int | None, set[int]] = {}
    for landing in sheet.landings.landings:
        if landing.pin not in sites or landing.strand not in frame_strands or landing.end is None:
            continue
        near = sheet.touching.at(landing.strand, 1 - landing.end)
        met = [touch.strand for touch in near if touch.strand in frame_strands]
        if met:
            found.setdefault(landing.pin, set()).update((landing.strand, *met))
    return found
