"""The lines that a box could slide along, or that could slide in it, each measured in the box's own axes.

Glossary
    rail        a straight piece of linework that runs along one axis of a box, in it or close beside it
    how         through: it runs in at one end and out at the other; enters: it ends inside; stops: it ends at the box;
                beside: it runs along outside
"""

from __future__ import annotations

import math
from collections import defaultdict
from collections.abc import Collection, Iterator, Mapping, Sequence
from typing import Literal, NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import Segment
from dxfcheck.geometry import angle_between_lines, dot
from dxfcheck.reading.lines.landing import Landing
from dxfcheck.reading.lines.linework import Linework, Strand
from dxfcheck.reading.lines.nearness import near_pairs
from dxfcheck.reading.lines.touches import Touches
from dxfcheck.reading.slides.boxes import Box
from dxfcheck.tolerances.linework import GUIDE_TURN_DEGREES
from dxfcheck.tolerances.shapes import GUIDE_BESIDE_OF_WIDTH, GUIDE_GAP_OF_BLOCK

__all__ = ["Rail", "RailHow", "rails_of"]

RailHow = Literal["through", "enters", "stops", "beside"]


class Rail(NamedTuple):
    """A piece along ``axis`` (0 or 1) of a box: ``offset`` to the left of it, from ``low`` to ``high`` along it.

    ``pinned`` says that it ends at the box's own pin: then it is a link, unless it is frame.
    """

    strand: int
    axis: int
    offset: float
    low: float
    high: float
    how: RailHow
    pinned: bool = False


def rails_of(
    boxes: Sequence[Box],
    linework: Linework,
    touching: Touches,
    landings: Sequence[Landing],
    apart: Collection[int],
) -> list[list[Rail]]:
    """For each box its rails, in drawing order.

    One that stops at other linework is no guide that is
    interrupted at the box; those ``apart`` are used up otherwise. Cost near-linear.
    """
    found: list[list[Rail]] = [[] for _ in boxes]
    if not boxes or not linework.piece_starts.size:
        return found
    pinned: defaultdict[int, set[int]] = defaultdict(set)
    for landing in landings:
        if landing.how in {"end", "corner"}:
            pinned[landing.pin].add(landing.strand)
    for box, strand, axis, measures in _parallel(boxes, linework):
        ends_at_pin = any(strand in pinned[site] for site in boxes[box].sites)
        if strand in boxes[box].strands or strand in apart:
            continue
        rail = _rail(boxes[box], strand, axis, *measures)
        if rail is not None and (
            rail.how != "stops" or _stops_at(boxes[box], axis, linework.strands, strand, touching, pinned)
        ):
            found[box].append(rail._replace(pinned=ends_at_pin))
    return found


def _stops_at(
    box: Box,
    axis: int,
    strands: Sequence[Strand],
    number: int,
    touching: Touches,
    pinned: Mapping[int, Collection[int]],
) -> bool:
    """Whether the end of a strand nearer to a box meets nothing but the box, and links in line with it.

    At a dead centre the rod to the box's pin, or one trimmed at the box, lies over its guide.
    """
    strand = strands[number]
    if not strand.ends:
        return False
    end = min((0, 1), key=lambda each: abs(strand.ends[each] - box.centre))
    return all(
        touch.strand in box.strands
        or any(touch.strand in pinned.get(site, ()) for site in box.sites)
        or _overlap(box, axis, strand, strands[touch.strand])
        for touch in touching.at(number, end)
        if touch.meets
    )


def _overlap(box: Box, axis: int, one: Strand, other: Strand) -> bool:
    """Whether two lines along an axis of a box lie on the same side of it, the one over the other."""
    if not isinstance(other.primitive, Segment):
        return False
    along = box.axes[axis]
    if angle_between_lines(other.ends[1] - other.ends[0], along) > math.radians(GUIDE_TURN_DEGREES):
        return False
    first = sorted(dot(end - box.centre, along) for end in one.ends)
    second = sorted(dot(end - box.centre, along) for end in other.ends)
    return min(first[1], second[1]) - max(first[0], second[0]) > box.slack


def _parallel(boxes: Sequence[Box], linework: Linework) -> Iterator[tuple[int, int, int, tuple[float, float, float]]]:
    """Pieces near a box and parallel to one of its axes: box, strand, axis, (offset, low, high)."""
    centres = np.array([box.centre for box in boxes], dtype=np.complex128)
    halves = np.array([box.halves for box in boxes])
    axes = np.array([box.axes for box in boxes], dtype=np.complex128)
    reach = (1.0 + max(2.0 * GUIDE_BESIDE_OF_WIDTH, GUIDE_GAP_OF_BLOCK)) * np.hypot(halves[:, 0], halves[:, 1])
    which, piece = near_pairs(centres, reach, linework.piece_starts, linework.piece_ends)
    starts = linework.piece_starts[piece] - centres[which]
    ends = linework.piece_ends[piece] - centres[which]
    within = math.sin(math.radians(GUIDE_TURN_DEGREES))
    length = np.abs(ends - starts)
    for axis in (0, 1):
        turned = axes[which, axis].conj()
        first, last = starts * turned, ends * turned
        level = (np.abs(last.imag - first.imag) <= within * length) & (length > 0.0)
        offsets = (first.imag + last.imag) / 2.0
        lows, highs = np.minimum(first.real, last.real), np.maximum(first.real, last.real)
        for each in np.nonzero(level)[0].tolist():
            measures = (float(offsets[each]), float(lows[each]), float(highs[each]))
            yield int(which[each]), int(linework.piece_strand[piece[each]]), axis, measures


def _rail(box: Box, strand: int, axis: int, offset: float, low: float, high: float) -> Rail | None:
    """The piece as a rail, or None where it lies inside the box or too far from it."""
    along, across, slack = box.halves[axis], box.halves[1 - axis], box.slack
    gap = 2.0 * along * GUIDE_GAP_OF_BLOCK
    how: RailHow | None = None
    if abs(offset) < across - slack:
        how = _how_inside(low, high, along, slack, gap)
    elif abs(offset) <= across * (1.0 + 2.0 * GUIDE_BESIDE_OF_WIDTH) + slack:
        overlaps = low < along - slack and high > slack - along
        longer = high - low >= 2.0 * along - slack
        how = "beside" if overlaps and longer else None
    return Rail(strand, axis, offset, low, high, how) if how is not None else None


def _how_inside(low: float, high: float, along: float, slack: float, gap: float) -> RailHow | None:
    """How a line within the width of a box runs to it."""
    out_behind, out_ahead = low < -along - slack, high > along + slack
    if out_behind and out_ahead:
        return "through"
    if not out_behind and not out_ahead:
        return None
    inner = high if out_behind else -low
    if inner > slack - along:
        return "enters"
    return "stops" if inner >= -along - gap else None
