"""Linework that hangs on nothing and is not meant to: windows cut out of plates, clipped strokes of frame symbols."""

from __future__ import annotations

import math
from collections.abc import Collection, Iterable, Sequence
from typing import NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import Arc, Segment
from dxfcheck.geometry import Point, angle_between_lines
from dxfcheck.reading.lines.linework import Strand, arc_middle
from dxfcheck.reading.lines.nearness import near_pairs
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.parts.parts import Parts
from dxfcheck.tolerances.linework import STROKE_PARALLEL_DEGREES
from dxfcheck.tolerances.sheet import CLIPPED_STROKE_REACH

__all__ = ["clipped_strokes", "cut_outs"]


class _Plate(NamedTuple):
    """The outline of a link as chords in no order, and the box round it."""

    chords: tuple[tuple[Point, Point], ...]
    low: Point
    high: Point

    def holds(self, point: Point) -> bool:
        """Whether a place lies inside: a line to the right of it crosses the outline an odd number of times."""
        x, y = point.real, point.imag
        if not (self.low.real <= x <= self.high.real and self.low.imag <= y <= self.high.imag):
            return False
        crossings = 0
        for start, end in self.chords:
            if (start.imag > y) != (end.imag > y):
                share = (y - start.imag) / (end.imag - start.imag)
                crossings += start.real + share * (end.real - start.real) > x
        return crossings % 2 == 1


def cut_outs(loose: Sequence[Strand], linked: Iterable[int], parts: Parts, sheet: Sheet) -> set[int]:
    """The loose strands (their numbers) of closed shapes inside the outline of one of the ``linked`` bodies."""
    if not loose:
        return set()
    plates = []
    for body in linked:
        lines = [number for number in parts.bodies.bodies[body].strands if number in parts.closed]
        if lines:
            plates.append(_plate([sheet.strands[number] for number in lines]))
    numbers = {strand.number for strand in loose} if plates else set()
    return {
        strand.number
        for strand in loose
        if any(plate.holds(strand.pieces[0].start) for plate in plates) and _closes(strand, numbers, sheet)
    }


def _closes(strand: Strand, loose: Collection[int], sheet: Sheet) -> bool:
    """Whether a strand is closed, or each of its ends meets another loose one."""
    return all(any(met in loose for met in sheet.touching.met(strand.number, end)) for end in range(len(strand.ends)))


def _plate(lines: Sequence[Strand]) -> _Plate:
    chords: list[tuple[Point, Point]] = []
    for strand in lines:
        for piece in strand.pieces:
            if isinstance(piece, Arc):
                middle = arc_middle(piece)
                chords += ((piece.start, middle), (middle, piece.end))
            else:
                chords.append((piece.start, piece.end))
    across = [end.real for chord in chords for end in chord]
    up = [end.imag for chord in chords for end in chord]
    return _Plate(tuple(chords), complex(min(across), min(up)), complex(max(across), max(up)))


def clipped_strokes(loose: Sequence[Strand], parts: Parts, sheet: Sheet) -> set[int]:
    """The loose lines that are strokes of a frame symbol whose upper end was clipped off, as at a hatch's corner.

    They lie beside a stroke of it, in its direction, and are no longer than that.
    """
    strokes = [sheet.strands[each] for each in parts.symbols.strokes if len(sheet.strands[each].ends) > 1]
    lines = [strand for strand in loose if isinstance(strand.primitive, Segment)]
    if not strokes or not lines:
        return set()
    starts, ends = (np.array([stroke.ends[end] for stroke in strokes]) for end in (0, 1))
    places = np.array([strand.ends[0] for strand in lines])
    reach = np.full(len(lines), CLIPPED_STROKE_REACH * max(stroke.length for stroke in strokes))
    found = set()
    for one, other in zip(*(each.tolist() for each in near_pairs(places, reach, starts, ends)), strict=True):
        line, stroke = lines[one], strokes[other]
        apart = min(abs(a - b) for a in line.ends for b in stroke.ends)
        turn = angle_between_lines(line.ends[1] - line.ends[0], stroke.ends[1] - stroke.ends[0])
        beside = apart <= CLIPPED_STROKE_REACH * stroke.length and line.length <= stroke.length
        if beside and turn <= math.radians(STROKE_PARALLEL_DEGREES):
            found.add(line.number)
    return found
