"""Arrows drawn in plain linework: a shaft with two barbs, a closed head or a filled one at its end (reading rule 1)."""

from __future__ import annotations

import math
from collections import Counter
from collections.abc import Iterator, Sequence
from typing import NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import Arc, Segment
from dxfcheck.geometry import Point, angle_between_lines, cross, dot
from dxfcheck.reading.lines.landing import Landing
from dxfcheck.reading.lines.linework import Strand
from dxfcheck.reading.lines.nearness import near_pairs
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.tolerances.shapes import ARROW_BARB_DEGREES, ARROW_BARB_OF_SHAFT, ARROW_HEAD_DEGREES

__all__ = ["find_arrows"]


def find_arrows(sheet: Sheet, landings: Sequence[Landing]) -> Iterator[int]:
    """Shafts and heads of arrows; an end that has landed on a pin is no tip, a triangle between two pins no head."""
    landed = {(landing.strand, landing.end) for landing in landings}
    pins = Counter(landing.strand for landing in landings)
    shafts = [strand for strand in sheet.strands if _may_be_shaft(strand)]
    for shaft in shafts:
        for end in (0, 1):
            if (shaft.number, end) in landed or sheet.touching.count(shaft.number, end) < 2:
                continue
            barbs = list(_barbs(sheet, shaft, end))
            back = _backwards(shaft, end)
            sides = {cross(back, barb) > 0 for _, barb in barbs}
            if len(barbs) == 2 and len(sides) == 2:
                yield shaft.number
                yield from (number for number, _ in barbs)
    heads = [head for head in _heads(sheet) if head.strand is None or pins[head.strand] < 2]
    free = [(shaft, end) for shaft in shafts for end in (0, 1) if (shaft.number, end) not in landed]
    yield from _with_closed_heads(sheet, free, heads)


def _may_be_shaft(strand: Strand) -> bool:
    return isinstance(strand.primitive, Segment | Arc) and strand.length > 0.0


def _backwards(shaft: Strand, end: int) -> Point:
    """Direction of a shaft from one of its ends back along it."""
    piece = shaft.primitive
    if isinstance(piece, Arc):
        along = (shaft.ends[end] - piece.centre) * 1j
        return along if end == 0 else -along
    return shaft.ends[1 - end] - shaft.ends[end]


def _barbs(sheet: Sheet, shaft: Strand, end: int) -> Iterator[tuple[int, Point]]:
    """Short lines swept back from an end of a shaft, their far ends free: number and direction."""
    tip, back = shaft.ends[end], _backwards(shaft, end)
    low, high = ARROW_BARB_DEGREES
    for number in sheet.touching.met(shaft.number, end):
        other = sheet.strands[number]
        if not isinstance(other.primitive, Segment) or other.length > ARROW_BARB_OF_SHAFT * shaft.length:
            continue
        near = min((0, 1), key=lambda each: abs(other.ends[each] - tip))
        swept = other.ends[1 - near] - other.ends[near]
        free = not sheet.touching.met(number, 1 - near)
        if free and dot(swept, back) > 0 and low <= math.degrees(angle_between_lines(swept, back)) <= high:
            yield number, swept


class _Head(NamedTuple):
    """A triangle that may be an arrow's head; ``strand`` is its closed outline, None for a fill."""

    strand: int | None
    corners: tuple[Point, ...]

    @property
    def size(self) -> float:
        """Its longest side."""
        first, second, third = self.corners
        return max(abs(first - second), abs(second - third), abs(third - first))

    def axes(self) -> Iterator[tuple[Point, Point]]:
        """Each corner with the middle of the side opposite."""
        for number, tip in enumerate(self.corners):
            yield tip, (self.corners[number - 1] + self.corners[number - 2]) / 2


def _heads(sheet: Sheet) -> Iterator[_Head]:
    for strand in sheet.strands:
        if strand.closed and len(strand.corners) == 3:
            yield _Head(strand.number, strand.corners)
    for fill in sheet.fills:
        for outline in fill.outlines if fill.solid else ():
            corners = tuple(dict.fromkeys(outline))
            if len(corners) == 3:
                yield _Head(None, corners)


def _with_closed_heads(sheet: Sheet, ends: Sequence[tuple[Strand, int]], heads: Sequence[_Head]) -> Iterator[int]:
    """Shafts that end at the tip of a small triangle in line with them, or at the middle of the side opposite."""
    if not heads or not ends:
        return
    axes = [(head, *axis) for head in heads for axis in head.axes()]
    places = np.array([place for _, tip, middle in axes for place in (tip, middle)], dtype=np.complex128)
    reach = np.array([sheet.tolerance.close(head.size) for head, _, _ in axes for _ in (0, 1)])
    points = np.array([shaft.ends[end] for shaft, end in ends], dtype=np.complex128)
    for place, number in zip(*(each.tolist() for each in near_pairs(places, reach, points, points)), strict=True):
        head, tip, middle = axes[place // 2]
        shaft, end = ends[number]
        back = _backwards(shaft, end)
        in_line = math.degrees(angle_between_lines(tip - middle, back)) <= ARROW_HEAD_DEGREES
        # A shaft that ends at the base leads away from it, one that ends at the tip runs through the head.
        away = dot(middle - tip, back) > 0
        if in_line and away and head.size <= ARROW_BARB_OF_SHAFT * shaft.length:
            yield shaft.number
            if head.strand is not None:
                yield head.strand
