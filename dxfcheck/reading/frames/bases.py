"""Base lines of frame symbols: straight pieces that hatch strokes stand on, or that a hatch runs along (rule 5)."""

from __future__ import annotations

from collections.abc import Collection, Sequence
from typing import NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import Fill, Segment
from dxfcheck.geometry import Point, cross, parameter_on_line
from dxfcheck.reading.lines.linework import Strand
from dxfcheck.reading.lines.nearness import near_pairs
from dxfcheck.reading.lines.pins import PinSite
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.reading.shapes.outlines import inside_outline

__all__ = ["Base", "bases_along_hatches", "piece_of"]


class Base(NamedTuple):
    """One straight piece of a strand, as a base line strokes may stand on."""

    strand: int
    number: int


def piece_of(strands: Sequence[Strand], base: Base) -> Segment:
    """The straight piece that a base is."""
    piece = strands[base.strand].pieces[base.number]
    assert isinstance(piece, Segment)  # noqa: S101 (bases are made of straight pieces only)
    return piece


def bases_along_hatches(
    strands: Sequence[Strand],
    relevant: Collection[int],
    fills: Sequence[Fill],
    pins: Sequence[PinSite],
    tolerance: Tolerance,
) -> list[Base]:
    """Straight pieces that a pattern hatch runs along; a hatch between two or more pins fills a link instead."""
    edges = [
        (start, end)
        for fill in fills
        if not fill.solid
        for outline in fill.outlines
        if _pins_in(outline, pins, tolerance) < 2
        for start, end in zip(outline, [*outline[1:], *outline[:1]], strict=True)
        if abs(end - start) > tolerance.close(abs(end - start))
    ]
    bases = [
        Base(index, number)
        for index in sorted(relevant)
        for number, piece in enumerate(strands[index].pieces)
        if isinstance(piece, Segment)
    ]
    if not edges or not bases:
        return []
    middles = np.array([(start + end) / 2 for start, end in edges], dtype=np.complex128)
    half = np.array([abs(end - start) / 2 for start, end in edges])
    starts = np.array([piece_of(strands, base).start for base in bases], dtype=np.complex128)
    ends = np.array([piece_of(strands, base).end for base in bases], dtype=np.complex128)
    found = []
    for edge, piece in zip(*(each.tolist() for each in near_pairs(middles, half, starts, ends)), strict=True):
        if _lies_along(edges[edge], piece_of(strands, bases[piece]), tolerance) and bases[piece] not in found:
            found.append(bases[piece])
    return found


def _lies_along(edge: tuple[Point, Point], base: Segment, tolerance: Tolerance) -> bool:
    """Whether an edge lies on a base line, over at least half of the shorter of the two."""
    along = base.end - base.start
    within = tolerance.close(abs(edge[1] - edge[0]))
    if along == 0 or any(abs(cross(along, point - base.start)) / abs(along) > within for point in edge):
        return False
    low, high = sorted(parameter_on_line(point, base.start, base.end) for point in edge)
    shared = min(high, 1.0) - max(low, 0.0)
    return shared >= min(1.0, high - low) / 2


def _pins_in(outline: Sequence[Point], pins: Sequence[PinSite], tolerance: Tolerance) -> int:
    """How many pins an outline has at its corners or inside it."""
    left, right = min(point.real for point in outline), max(point.real for point in outline)
    low, high = min(point.imag for point in outline), max(point.imag for point in outline)
    found = 0
    for pin in pins:
        reach = pin.radii[-1] + tolerance.rim(pin.radii[-1])
        near = left - reach <= pin.at.real <= right + reach and low - reach <= pin.at.imag <= high + reach
        if near and (inside_outline(pin.at, outline) or any(abs(corner - pin.at) <= reach for corner in outline)):
            found += 1
    return found
