"""Where the ends of strands meet other strands, or nearly do.

Glossary
    touch       a strand in the neighbourhood of an end: the end meets it, or stops a gap short of it
    meets       within t of a line, or within 2 % of the radius of an arc

Kept as parallel lists, since a busy sheet has tens of thousands of ends and only few of them are ever looked at.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Sequence
from dataclasses import dataclass
from itertools import pairwise
from typing import NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import Arc
from dxfcheck.reading.lines.linework import Linework, distance_to_piece
from dxfcheck.reading.lines.nearness import ComplexArray, FloatArray, IntArray, near_pairs, pair_distances
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.tolerances.linework import CHORD_ANGLE_DEGREES

__all__ = ["Touch", "Touches", "find_touches"]


class Touch(NamedTuple):
    """A strand near an end: how far off, and whether the end counts as meeting it."""

    strand: int
    gap: float
    meets: bool


@dataclass(frozen=True, slots=True)
class Touches:
    """For each end of each strand, the other strands near it, in drawing order.

    End 0 or 1 of a strand has the number 2 * strand + end; ``first`` (2 N + 1 numbers) says where the touches of each
    end begin in ``strands``, ``gaps`` and ``meets``.
    """

    first: Sequence[int]
    strands: Sequence[int]
    gaps: Sequence[float]
    meets: Sequence[bool]

    def at(self, strand: int, end: int) -> Sequence[Touch]:
        """What lies near an end."""
        number = 2 * strand + end
        start, stop = self.first[number], self.first[number + 1]
        if start == stop:
            return ()
        return [Touch(self.strands[each], self.gaps[each], self.meets[each]) for each in range(start, stop)]

    def alone(self, strand: int) -> bool:
        """Whether nothing lies near either end of a strand."""
        return self.first[2 * strand] == self.first[2 * strand + 2]

    def count(self, strand: int, end: int) -> int:
        """How many strands lie near an end."""
        number = 2 * strand + end
        return self.first[number + 1] - self.first[number]

    def met(self, strand: int, end: int) -> list[int]:
        """The strands that an end meets."""
        return [touch.strand for touch in self.at(strand, end) if touch.meets]

    def free(self, strand: int, end: int) -> bool:
        """Whether nothing at all lies near an end."""
        return self.count(strand, end) == 0

    def as_pairs(self) -> tuple[IntArray, IntArray, FloatArray, np.typing.NDArray[np.bool_]]:
        """All touches as arrays (K,): number of the end, strand touched, gap, whether they meet."""
        counts = [after - before for before, after in pairwise(self.first)]
        ends = np.repeat(np.arange(len(counts)), counts)
        return (
            ends,
            np.asarray(self.strands, dtype=np.int64),
            np.asarray(self.gaps, dtype=np.float64),
            np.asarray(self.meets, dtype=np.bool_),
        )


def find_touches(
    linework: Linework, tolerance: Tolerance, within: Callable[[float], float], among: Sequence[int] | None = None
) -> Touches:
    """What lies near each end (of the strands ``among``, or of all); ``within`` gives the reach for a strand's length.

    An end meets an arc within Tolerance.arc, which is bounded by its own line's length, or a wide curved link would
    catch ends that have nothing to do with it. Cost near-linear in the number of strands.
    """
    strands = linework.strands
    looked = strands if among is None else [strands[number] for number in among]
    numbers = np.array([2 * each.number + end for each in looked for end in range(len(each.ends))], dtype=np.int64)
    points = np.array([end for each in looked for end in each.ends], dtype=np.complex128)
    reach = np.array([within(each.length) for each in looked for _ in each.ends])
    ends, targets, gaps = _on_lines(linework, numbers, points, reach)
    meets = gaps <= tolerance.on_line
    if linework.chord_strand.size and points.size:
        on_arcs = _on_arcs(linework, numbers, points, tolerance, reach)
        ends = np.concatenate((ends, np.array([each[0] for each in on_arcs], dtype=np.int64)))
        targets = np.concatenate((targets, np.array([each[1].strand for each in on_arcs], dtype=np.int64)))
        gaps = np.concatenate((gaps, np.array([each[1].gap for each in on_arcs], dtype=np.float64)))
        meets = np.concatenate((meets, np.array([each[1].meets for each in on_arcs], dtype=np.bool_)))
    # A polyline may come near an end with several of its pieces: the nearest one speaks for it.
    order = np.lexsort((gaps, targets, ends))
    ends, targets, gaps, meets = ends[order], targets[order], gaps[order], meets[order]
    new = np.ones(ends.size, dtype=np.bool_)
    new[1:] = (ends[1:] != ends[:-1]) | (targets[1:] != targets[:-1])
    ends, targets, gaps, meets = ends[new], targets[new], gaps[new], meets[new]
    # An end that meets something exactly does not meet an arc beside it as well, by the wider reach of arcs.
    exact = np.zeros(2 * len(strands), dtype=np.bool_)
    exact[ends[gaps <= tolerance.on_line]] = True
    meets &= (gaps <= tolerance.on_line) | ~exact[ends]
    first = np.searchsorted(ends, np.arange(2 * len(strands) + 1))
    return Touches(first.tolist(), targets.tolist(), gaps.tolist(), meets.tolist())


def _on_lines(
    linework: Linework, numbers: IntArray, points: ComplexArray, reach: FloatArray
) -> tuple[IntArray, IntArray, FloatArray]:
    which, piece = near_pairs(points, reach, linework.piece_starts, linework.piece_ends)
    ends, targets = numbers[which], linework.piece_strand[piece]
    foreign = targets != ends // 2
    which, piece = which[foreign], piece[foreign]
    gaps = pair_distances(points[which], linework.piece_starts[piece], linework.piece_ends[piece])
    return ends[foreign], targets[foreign], gaps


def _on_arcs(
    linework: Linework, numbers: IntArray, points: ComplexArray, tolerance: Tolerance, reach: FloatArray
) -> list[tuple[int, Touch]]:
    """The arcs that ends touch: first by chords with the widest reach, then measured on the arc itself."""
    arcs = {
        strand: [piece for piece in linework.strands[strand].pieces if isinstance(piece, Arc)]
        for strand in set(linework.chord_strand.tolist())
    }
    sagitta = 1.0 - math.cos(math.radians(CHORD_ANGLE_DEGREES) / 2.0)
    radius = max(arc.radius for each in arcs.values() for arc in each)
    lengths = [linework.strands[number].length for number in (numbers // 2).tolist()]
    widest = max(float(reach.max()), tolerance.arc(radius, max(lengths))) + sagitta * radius
    which, chord = near_pairs(points, np.full(points.size, widest), linework.chord_starts, linework.chord_ends)
    found = []
    for place, target in sorted(set(zip(which.tolist(), linework.chord_strand[chord].tolist(), strict=True))):
        number = int(numbers[place])
        if number // 2 == target:
            continue
        point = complex(points[place])
        gap, arc = min(((distance_to_piece(point, arc), arc) for arc in arcs[target]), key=lambda pair: pair[0])
        meets = gap <= tolerance.arc(arc.radius, lengths[place])
        if meets or gap <= reach[place]:
            found.append((number, Touch(target, gap, meets)))
    return found
