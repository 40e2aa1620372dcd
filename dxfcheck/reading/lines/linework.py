"""The linework of a sketch as strands.

Glossary
    strand      one rigid piece of drawn linework: a line, an arc, a polyline, a closed outline
    end         one of the two ends of an open strand; a closed one has none
"""

from __future__ import annotations

import cmath
import math
from collections.abc import Collection, Iterable
from dataclasses import dataclass
from typing import NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import Arc, Path, Segment
from dxfcheck.geometry import Point, distance_to_segment
from dxfcheck.reading.lines.nearness import ComplexArray, IntArray
from dxfcheck.tolerances.linework import CHORD_ANGLE_DEGREES

__all__ = [
    "Linework",
    "Strand",
    "arc_middle",
    "distance_to_piece",
    "make_linework",
    "piece_length",
]


class Strand(NamedTuple):
    """One rigid piece of linework.

    ``number`` is its place among the strands; ``ends`` are the two ends, empty for a closed strand; ``corners`` the
    drawn vertices between them (all of them, for a closed one; none for a smooth curve). ``frame`` is True where its
    layer or block says that it is the frame; ``length`` is measured along it.
    """

    number: int
    primitive: Segment | Arc | Path
    pieces: tuple[Segment | Arc, ...]
    ends: tuple[Point, ...]
    corners: tuple[Point, ...]
    frame: bool
    length: float

    @property
    def closed(self) -> bool:
        """Whether it is an outline, without ends."""
        return not self.ends


@dataclass(frozen=True, slots=True, kw_only=True)
class Linework:
    """All strands, with their straight pieces and arcs as arrays (chords stand for arcs when looking for neighbours).

    ``piece_strand`` (S,) and ``chord_strand`` (C,) hold the strand of each piece and chord.
    """

    strands: tuple[Strand, ...]
    piece_starts: ComplexArray
    piece_ends: ComplexArray
    piece_strand: IntArray
    chord_starts: ComplexArray
    chord_ends: ComplexArray
    chord_strand: IntArray

    def line_directions(self) -> ComplexArray:
        """From start to end of each strand that is a single straight line; nan for all others (N,)."""
        along = np.full(len(self.strands), np.nan, dtype=np.complex128)
        lone = [number for number, strand in enumerate(self.strands) if isinstance(strand.primitive, Segment)]
        single = np.zeros(len(self.strands), dtype=np.bool_)
        single[lone] = True
        chosen = single[self.piece_strand]
        along[self.piece_strand[chosen]] = (self.piece_ends - self.piece_starts)[chosen]
        return along


def piece_length(piece: Segment | Arc) -> float:
    """Length of a line or arc."""
    return abs(piece.end - piece.start) if isinstance(piece, Segment) else piece.radius * piece.sweep


def distance_to_piece(point: Point, piece: Segment | Arc) -> float:
    """Shortest distance from a point to a line or arc."""
    if isinstance(piece, Segment):
        return distance_to_segment(point, piece.start, piece.end)
    out = point - piece.centre
    turn = (cmath.phase(out) - piece.start_angle) % math.tau if out else 0.0
    if turn <= piece.sweep:
        return abs(abs(out) - piece.radius)
    return min(abs(point - piece.start), abs(point - piece.end))


def arc_middle(arc: Arc) -> Point:
    """The point half way along an arc."""
    return arc.centre + cmath.rect(arc.radius, arc.start_angle + arc.sweep / 2.0)


def make_linework(primitives: Iterable[Segment | Arc | Path], frame: Collection[int]) -> Linework:
    """Strands from primitives; ``frame`` are the places of those that their layer or block makes frame."""
    strands = tuple(_strand(number, primitive, frame) for number, primitive in enumerate(primitives))
    starts: list[Point] = []
    ends: list[Point] = []
    owners: list[int] = []
    chord_starts: list[Point] = []
    chord_ends: list[Point] = []
    chord_owners: list[int] = []
    for index, strand in enumerate(strands):
        for piece in strand.pieces:
            if isinstance(piece, Segment):
                starts.append(piece.start)
                ends.append(piece.end)
                owners.append(index)
            else:
                points = _chord_points(piece)
                chord_starts.extend(points[:-1])
                chord_ends.extend(points[1:])
                chord_owners.extend([index] * (len(points) - 1))
    return Linework(
        strands=strands,
        piece_starts=np.array(starts, dtype=np.complex128),
        piece_ends=np.array(ends, dtype=np.complex128),
        piece_strand=np.array(owners, dtype=np.int64),
        chord_starts=np.array(chord_starts, dtype=np.complex128),
        chord_ends=np.array(chord_ends, dtype=np.complex128),
        chord_strand=np.array(chord_owners, dtype=np.int64),
    )


def _strand(index: int, primitive: Segment | Arc | Path, frames: Collection[int]) -> Strand:
    frame = index in frames
    if isinstance(primitive, Path):
        corners = () if primitive.curved else primitive.vertices
        length = sum(piece_length(piece) for piece in primitive.pieces)
        if primitive.closed:
            return Strand(index, primitive, primitive.pieces, (), corners, frame, length)
        ends = (primitive.vertices[0], primitive.vertices[-1])
        return Strand(index, primitive, primitive.pieces, ends, corners[1:-1], frame, length)
    return Strand(index, primitive, (primitive,), (primitive.start, primitive.end), (), frame, piece_length(primitive))


def _chord_points(arc: Arc) -> list[Point]:
    count = max(1, math.ceil(arc.sweep / math.radians(CHORD_ANGLE_DEGREES)))
    step = arc.sweep / count
    return [arc.centre + cmath.rect(arc.radius, arc.start_angle + step * number) for number in range(count + 1)]
