"""From sorted primitives to rigid bodies: the order in which the reading rules are applied to the linework.

Rings come first, then where ends land, shapes, marks, frame symbols, and last welds. Each step is a pure function of
the ones before it.
"""

from __future__ import annotations

from collections.abc import Collection, Iterable, Mapping, Sequence
from dataclasses import dataclass
from typing import NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import Ring
from dxfcheck.reading.bodies import Bodies, make_bodies
from dxfcheck.reading.frame import FrameSymbols, find_frame_symbols
from dxfcheck.reading.landing import Landing
from dxfcheck.reading.marks import find_marks
from dxfcheck.reading.nearness import near_pairs
from dxfcheck.reading.outlines import find_outlines, loose_borders
from dxfcheck.reading.shapes import find_obrounds, find_rectangles
from dxfcheck.reading.sheet import Sheet
from dxfcheck.reading.sorting import Sorted
from dxfcheck.reading.unread_joints import UnreadJoint, bars_of, blocks_of, pitch_circles_of, slots_of

__all__ = ["Parts", "find_parts"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Parts:
    """What the linework was read as: marks, borders round whole links, frame, joints not read, bodies."""

    marks: Mapping[int, str]
    borders: frozenset[int]
    symbols: FrameSymbols
    frame: Mapping[int, str]
    unread: tuple[UnreadJoint, ...]
    bodies: Bodies
    landings: tuple[Landing, ...]


def find_parts(kinds: Sorted, sheet: Sheet) -> Parts:
    """What each strand is, and the bodies they make up."""
    strands, pins, tolerance = sheet.strands, sheet.pins, sheet.tolerance
    by_layer = {
        number: f"frame by {kinds.frame_lines[index]}"
        for number, (index, _) in enumerate(kinds.lines)
        if index in kinds.frame_lines
    }
    # A ring that no line lands on is a hole of some part: what is drawn round it is no block and no slot.
    carrying = {landing.pin for landing in sheet.landings.landings}
    used = [pin for pin in pins if pin.number in carrying]
    obrounds = find_obrounds(strands, sheet.touching) if pins else []
    rectangles = find_rectangles(sheet.linework, sheet.touching, used, tolerance) if used else []
    bars = list(bars_of(obrounds, pins, tolerance))
    in_bars = {strand for bar, _ in bars for strand in bar.strands}
    of_bars = [Landing(bar.strands[0], site, "corner", None, 0.0) for bar, sites in bars for site in sites]
    known = [*sheet.landings.landings, *of_bars]
    outlines = find_outlines(strands, in_bars | sheet.ring_strands, known, pins, by_layer)
    unread = (
        *blocks_of([each for each in rectangles if by_layer.keys().isdisjoint(each.strands)], used),
        *slots_of(obrounds, used),
        *pitch_circles_of(kinds.pitch_rings, pins, tolerance),
    )
    landings = [*known, *outlines.held]
    borders = outlines.borders | loose_borders(rectangles, known, pins, by_layer)
    apart = {*borders, *sheet.ring_strands, *(strand for joint in unread for strand in joint.strands)}
    landings = [landing for landing in landings if landing.strand not in apart]
    touched = [each.strand for each in landings if each.how != "across" or each.strand in by_layer]
    reached = _reached(touched, [disc.ring for disc in sheet.sites.discs], sheet, apart)
    marks = find_marks(sheet, reached, landings)
    plain = [index for index in reached if index not in marks]
    symbols = find_frame_symbols(sheet, plain, marks, landings)
    frame = {**by_layer, **symbols.frame}
    active = {index for index in plain if index not in symbols.strokes}
    known_frame = {index: why for index, why in frame.items() if index in active}
    bodies = make_bodies(sheet, active, landings, known_frame, [bar.strands for bar, _ in bars])
    return Parts(
        marks=marks,
        borders=borders,
        symbols=symbols,
        frame=frame,
        unread=unread,
        bodies=bodies,
        landings=tuple(landings),
    )


def _reached(touched: Iterable[int], discs: Sequence[Ring], sheet: Sheet, apart: Collection[int]) -> list[int]:
    """Strands that hang together with a pin or a disc: all others are other linework.

    Linework hangs together where ends meet. Twice, what is close enough to belong to a frame symbol is taken in as
    well: the base under a leg, then the strokes under the base.
    """
    beside, close = _neighbours(sheet)
    waiting = list(touched)
    for ring in discs:
        within = sheet.tolerance.rim(ring.radius)
        waiting.extend(
            strand.number
            for strand in sheet.strands
            if any(abs(abs(end - ring.centre) - ring.radius) <= within for end in strand.ends)
        )
    seen: set[int] = set(apart)
    reached = _spread(waiting, beside, seen)
    for _ in range(FRINGES):
        nearby = [near for number in reached for near in close.of(number)]
        nearby.extend(_under_corners(sheet, reached))
        reached.extend(_spread(nearby, beside, seen))
    return sorted(reached)


def _under_corners(sheet: Sheet, reached: Sequence[int]) -> list[int]:
    """Lines that corners of reached polylines lie on: the base line under a triangle drawn in one piece."""
    paths = [sheet.strands[number] for number in reached if sheet.strands[number].corners]
    corners = np.array([corner for path in paths for corner in path.corners], dtype=np.complex128)
    reach = np.array([sheet.tolerance.close(path.length) for path in paths for _ in path.corners])
    _, pieces = near_pairs(corners, reach, sheet.linework.piece_starts, sheet.linework.piece_ends)
    found: list[int] = np.unique(sheet.linework.piece_strand[pieces]).tolist()
    return found


FRINGES = 2


class _Neighbours(NamedTuple):
    """The neighbours of each strand, in one list; ``first`` says where those of each strand begin."""

    first: Sequence[int]
    others: Sequence[int]

    def of(self, strand: int) -> Sequence[int]:
        return self.others[self.first[strand] : self.first[strand + 1]]


def _neighbours(sheet: Sheet) -> tuple[_Neighbours, _Neighbours]:
    """Strands that meet, and strands that come within the shape tolerance of one another."""
    ends, targets, _, meets = sheet.touching.as_pairs()
    owners = ends // 2

    def listed(chosen: np.typing.NDArray[np.bool_]) -> _Neighbours:
        one = np.concatenate((owners[chosen], targets[chosen]))
        other = np.concatenate((targets[chosen], owners[chosen]))
        order = np.argsort(one, kind="stable")
        first = np.searchsorted(one[order], np.arange(len(sheet.strands) + 1))
        return _Neighbours(first.tolist(), other[order].tolist())

    return listed(meets), listed(np.ones(meets.size, dtype=np.bool_))


def _spread(waiting: list[int], beside: _Neighbours, seen: set[int]) -> list[int]:
    """The strands not seen before that hang together with those waiting; they count as seen from now on."""
    reached = []
    while waiting:
        number = waiting.pop()
        if number not in seen:
            seen.add(number)
            reached.append(number)
            waiting.extend(beside.of(number))
    return reached
