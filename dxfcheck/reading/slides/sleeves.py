"""Sleeves drawn as two short frame lines, one on either side of a rod (reading rule 6)."""

from __future__ import annotations

import math
from collections.abc import Collection, Iterator, Sequence

import numpy as np

from dxfcheck.drawing.primitives import Segment
from dxfcheck.geometry import cross, dot
from dxfcheck.reading.lines.nearness import near_pairs, pair_distances
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.slides.boxes import Box
from dxfcheck.tolerances.linework import GUIDE_TURN_DEGREES, RIM_OF_RADIUS
from dxfcheck.tolerances.shapes import SLEEVE_LIKENESS, SLEEVE_STROKES, SLEEVE_WIDTH_OF_LENGTH

__all__ = ["lines_beside_rods", "sleeves_of", "sleeves_of_bars"]


def lines_beside_rods(sheet: Sheet, reached: Sequence[int]) -> list[int]:
    """Straight lines, on a frame layer or with hatch strokes, close beside and parallel to one that is reached.

    They touch nothing that hangs on a pin, yet they may be the two sides of a sleeve.
    """
    strands, linework = sheet.strands, sheet.linework
    ends, targets, _, _ = sheet.touching.as_pairs()
    seen = np.zeros(len(strands), dtype=np.bool_)
    seen[list(reached)] = True
    standing = np.bincount(targets[~seen[ends // 2]], minlength=len(strands)) >= SLEEVE_STROKES
    framed = np.array([strand.frame for strand in strands], dtype=np.bool_)
    along = linework.line_directions()
    places = np.nonzero(~seen & (standing | framed) & np.isfinite(along.real))[0]
    if not places.size:
        return []
    middles = np.array([sum(strands[number].ends) / 2 for number in places.tolist()], dtype=np.complex128)
    chosen = seen[linework.piece_strand]
    starts, stops = linework.piece_starts[chosen], linework.piece_ends[chosen]
    which, piece = near_pairs(middles, SLEEVE_WIDTH_OF_LENGTH * np.abs(along[places]), starts, stops)
    turned = (stops - starts)[piece] * along[places[which]].conj()
    with np.errstate(divide="ignore", invalid="ignore"):
        level = np.abs(turned.imag) <= math.sin(math.radians(GUIDE_TURN_DEGREES)) * np.abs(turned)
    found: list[int] = np.unique(places[which[level]]).tolist()
    return found


def sleeves_of(sheet: Sheet, frame: Collection[int], used: Collection[int]) -> Iterator[Box]:
    """Pairs of frame lines that face one another, as boxes on the frame.

    ``used`` are strands that are frame for another reason: guides, and what holds a pin.
    """
    lines = [
        strand
        for number, strand in enumerate(sheet.strands)
        if number in frame and number not in used and isinstance(strand.primitive, Segment) and strand.length > 0.0
    ]
    if len(lines) < 2:
        return
    middles = np.array([sum(line.ends) / 2 for line in lines], dtype=np.complex128)
    reach = np.array([SLEEVE_WIDTH_OF_LENGTH * line.length for line in lines])
    which, other = near_pairs(middles, reach, middles, middles)
    order = np.argsort(pair_distances(middles[which], middles[other], middles[other]), kind="stable")
    taken: set[int] = set()
    for one, two in zip(which[order].tolist(), other[order].tolist(), strict=True):
        if one >= two or taken & {one, two}:
            continue
        along = lines[one].ends[1] - lines[one].ends[0]
        facing = lines[two].ends[1] - lines[two].ends[0]
        alike = abs(abs(facing) - abs(along)) <= SLEEVE_LIKENESS * abs(along)
        level = abs(cross(along, facing)) <= math.sin(math.radians(GUIDE_TURN_DEGREES)) * abs(along) * abs(facing)
        apart = complex(middles[two]) - complex(middles[one])
        askew = abs(dot(along, apart)) / abs(along)
        width = abs(cross(along, apart)) / abs(along)
        if alike and level and width > 0.0 and askew <= SLEEVE_LIKENESS * abs(along):
            taken |= {one, two}
            yield Box(
                number=len(taken) // 2 - 1,
                strands=(lines[one].number, lines[two].number),
                centre=complex(middles[one] + middles[two]) / 2,
                axes=(along / abs(along), 1j * along / abs(along)),
                halves=(min(abs(along), abs(facing)) / 2, width / 2),
                sites=(),
                frame=True,
                slack=RIM_OF_RADIUS * min(abs(along), width) / 2.0,
            )


def sleeves_of_bars(bars: Sequence[Box]) -> Iterator[Box]:
    """Pairs of hatched rectangles that face one another, with a gap for a rod, as boxes on the frame."""
    taken: set[int] = set()
    for place, one in enumerate(bars):
        for two in bars[place + 1 :]:
            sleeve = None if taken & {one.number, two.number} else _between(one, two)
            if sleeve is not None:
                taken |= {one.number, two.number}
                yield sleeve._replace(number=len(taken) // 2 - 1)


def _between(one: Box, two: Box) -> Box | None:
    """The sleeve of two bars that are level and alike in length."""
    axis = 0 if one.halves[0] >= one.halves[1] else 1
    along, across = one.axes[axis], 1j * one.axes[axis]
    level = min((0, 1), key=lambda each: abs(cross(along, two.axes[each])))
    half = one.halves[axis]
    askew, apart = dot(two.centre - one.centre, along), dot(two.centre - one.centre, across)
    first = one.halves[1 - axis] * math.copysign(1.0, apart)
    second = apart - two.halves[1 - level] * math.copysign(1.0, apart)
    gap = abs(second - first)
    if (
        abs(cross(along, two.axes[level])) > math.sin(math.radians(GUIDE_TURN_DEGREES))
        or max(abs(two.halves[level] - half), abs(askew) / 2.0) > SLEEVE_LIKENESS * half
        or (second - first) * apart <= 0.0
        or gap > 2.0 * half * SLEEVE_WIDTH_OF_LENGTH
    ):
        return None
    return Box(
        number=0,
        strands=(*one.strands, *two.strands),
        centre=one.centre + along * askew / 2.0 + across * (first + second) / 2.0,
        axes=(along, across),
        halves=(min(half, two.halves[level]), gap / 2.0),
        sites=(),
        frame=True,
        slack=min(one.slack, two.slack),
    )
