"""Lines tangent to circles, and which of them are pitch lines of racks (reading rule 6).

Not every line in a chain linetype that touches a pitch circle is a rack: the axes through the centre of another pitch
circle, the common tangent drawn through a pitch point, and the runs of a belt or chain touch one as well.
"""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Sequence
from itertools import pairwise
from typing import NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import Ring, Segment
from dxfcheck.geometry import Point
from dxfcheck.reading.lines.nearness import ComplexArray, near_pairs
from dxfcheck.tolerances.linework import RIM_OF_RADIUS

__all__ = ["Tangent", "find_tangents", "pitch_lines"]


class Tangent(NamedTuple):
    """A straight piece tangent to a circle (both by place).

    ``foot`` is where the perpendicular meets it, measured from its start, ``length`` the piece's, ``miss`` the gap
    between them (negative where they overlap).
    """

    circle: int
    piece: int
    foot: float
    length: float
    miss: float


def find_tangents(
    centres: Sequence[Point], radii: Sequence[float], starts: ComplexArray, ends: ComplexArray
) -> list[Tangent]:
    """Circles and straight pieces that touch within 2 % of the radius, the foot of the perpendicular on the piece.

    ``starts`` and ``ends`` (S,) of the pieces. Cost near-linear in circles plus pieces.
    """
    places = np.array(centres, dtype=np.complex128)
    sizes = np.array(radii, dtype=np.float64)
    circle, piece = near_pairs(places, (1.0 + RIM_OF_RADIUS) * sizes, starts, ends)
    along = (ends - starts)[piece]
    length = np.abs(along)
    with np.errstate(divide="ignore", invalid="ignore"):
        seen = (places[circle] - starts[piece]) * np.conj(along) / length
    miss = np.abs(seen.imag) - sizes[circle]
    within = RIM_OF_RADIUS * sizes[circle]
    fits = (np.abs(miss) <= within) & (seen.real >= -within) & (seen.real <= length + within)
    chosen = np.nonzero(fits)[0]
    columns = (circle[chosen], piece[chosen], seen.real[chosen], length[chosen], miss[chosen])
    return [Tangent(*each) for each in zip(*(column.tolist() for column in columns), strict=True)]


def pitch_lines(rings: Sequence[Ring], lines: Sequence[Segment]) -> set[int]:
    """Which lines (by place) are pitch lines of racks that roll on one of the pitch rings."""
    if not rings or not lines:
        return set()
    starts = np.array([line.start for line in lines], dtype=np.complex128)
    ends = np.array([line.end for line in lines], dtype=np.complex128)
    centres, radii = [ring.centre for ring in rings], [ring.radius for ring in rings]
    touched: defaultdict[int, list[Tangent]] = defaultdict(list)
    for tangent in find_tangents(centres, radii, starts, ends):
        touched[tangent.piece].append(tangent)
    places = np.array(centres, dtype=np.complex128)
    _, axes = near_pairs(places, RIM_OF_RADIUS * np.array(radii, dtype=np.float64), starts, ends)
    through = set(axes.tolist())
    return {line for line, tangents in touched.items() if line not in through and _is_rack(tangents, radii)}


def _is_rack(tangents: Sequence[Tangent], radii: Sequence[float]) -> bool:
    """Whether a line tangent to some rings is neither a common tangent at their pitch point nor the run of a belt."""
    if len(tangents) == 1:
        return True
    ordered = sorted(tangents, key=lambda each: each.foot)
    slack = [RIM_OF_RADIUS * radii[each.circle] for each in ordered]
    gaps = [after.foot - before.foot for before, after in pairwise(ordered)]
    if any(gap <= max(pair) for gap, pair in zip(gaps, pairwise(slack), strict=True)):
        return False
    return ordered[0].foot > slack[0] or ordered[-1].foot < ordered[-1].length - slack[-1]
