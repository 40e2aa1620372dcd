"""Everything on a sheet that a dimension may be taken from, as arrays: lines, rims, ends, centres."""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np

from dxfcheck.drawing.primitives import Arc, Fill, Path, Ring, Segment, Sketch
from dxfcheck.geometry import Point
from dxfcheck.reading.lines.nearness import ComplexArray, FloatArray, pair_distances
from dxfcheck.tolerances.linework import RIM_OF_RADIUS

__all__ = ["Sites", "sites_of"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Sites:
    """Straight lines (S,), arcs and rings (A,) and the ends, corners and centres (P,) of all linework of a sheet.

    Construction linework counts: it is drawn to be dimensioned. Angles are radians, ``sweeps`` a full turn for a ring.
    """

    starts: ComplexArray
    ends: ComplexArray
    centres: ComplexArray
    radii: FloatArray
    first_angles: FloatArray
    sweeps: FloatArray
    spots: ComplexArray

    @property
    def empty(self) -> bool:
        """Whether the sheet holds no linework at all."""
        return not self.spots.size

    def rim_distances(self, point: Point) -> FloatArray:
        """Distances (A,) of a point from the arcs and rings as drawn; from their ends where they do not face it."""
        out = point - self.centres
        facing = (np.angle(out) - self.first_angles) % math.tau <= self.sweeps
        found: FloatArray = np.where(facing, np.abs(np.abs(out) - self.radii), np.inf)
        return found

    def nearest_spot(self, point: Point) -> tuple[Point, float]:
        """The nearest end, corner or centre and how far off it lies; for an end on a rim, the ring's centre."""
        index = int(np.abs(self.spots - point).argmin())
        spot = complex(self.spots[index])
        around = np.abs(np.abs(spot - self.centres) - self.radii) <= RIM_OF_RADIUS * self.radii
        rings = np.nonzero(around & (self.sweeps >= math.tau))[0]
        if rings.size:
            spot = complex(self.centres[rings[self.radii[rings].argmin()]])
        return spot, abs(spot - point)

    def nearest(self, point: Point) -> float:
        """How far off the nearest linework, end or centre lies."""
        to_lines = pair_distances(np.array([point]), self.starts, self.ends).min(initial=math.inf)
        to_rims = self.rim_distances(point).min(initial=math.inf)
        return float(min(to_lines, to_rims, np.abs(self.spots - point).min()))


def sites_of(sketch: Sketch) -> Sites:
    """All that is drawn on a sheet, marks of a point without extent among it."""
    lines: list[tuple[Point, Point]] = []
    arcs: list[tuple[Point, float, float, float]] = []
    spots: list[Point] = [each.at for each in sketch.entities if each.type == "POINT" and each.at is not None]
    for primitive in sketch.primitives:
        if isinstance(primitive, Segment):
            lines.append((primitive.start, primitive.end))
        elif isinstance(primitive, Ring):
            arcs.append((primitive.centre, primitive.radius, 0.0, math.tau))
        elif isinstance(primitive, Arc):
            arcs.append(_arc(primitive))
        elif isinstance(primitive, Path):
            lines += ((piece.start, piece.end) for piece in primitive.pieces if isinstance(piece, Segment))
            arcs += (_arc(piece) for piece in primitive.pieces if isinstance(piece, Arc))
            if primitive.closed:
                spots.append(sum(primitive.vertices) / len(primitive.vertices))
        elif isinstance(primitive, Fill):
            for outline in primitive.outlines:
                lines += zip(outline, (*outline[1:], outline[0]), strict=True)
    starts = np.array([start for start, _ in lines], dtype=np.complex128)
    ends = np.array([end for _, end in lines], dtype=np.complex128)
    centres = np.array([centre for centre, _, _, _ in arcs], dtype=np.complex128)
    rest = np.array([each[1:] for each in arcs], dtype=np.float64).reshape(-1, 3)
    part = rest[:, 2] < math.tau
    tips = [
        centres[part] + rest[part, 0] * np.exp(1j * (rest[part, 1] + share * rest[part, 2])) for share in (0.0, 1.0)
    ]
    return Sites(
        starts=starts,
        ends=ends,
        centres=centres,
        radii=rest[:, 0],
        first_angles=rest[:, 1],
        sweeps=rest[:, 2],
        spots=np.concatenate((starts, ends, centres, *tips, np.array(spots, dtype=np.complex128))),
    )


def _arc(arc: Arc) -> tuple[Point, float, float, float]:
    return arc.centre, arc.radius, arc.start_angle, arc.sweep
