"""Which of the lines beside a box is its guide (reading rule 6)."""

from __future__ import annotations

from collections.abc import Collection, Iterator, Sequence
from typing import NamedTuple

from dxfcheck.reading.slides.boxes import Box
from dxfcheck.reading.slides.rails import Rail
from dxfcheck.tolerances.shapes import GUIDE_LEVEL_OF_WIDTH

__all__ = ["ENDS_INSIDE", "STROKES", "Guide", "Rivals", "choose_guide"]


class Guide(NamedTuple):
    """What a box slides along, or what slides in it.

    ``strength`` says how plain the drawing is: 4 a line through the box, one interrupted at it, two rails, a frame
    line or hatch strokes along it; 3 a line that ends inside it (a rod in a barrel); 2 a single line beside it.
    ``offset`` is how far its nearest line is from the box's middle; ``ends`` how far it reaches along the axis from
    there, None for strokes. ``frame`` says that it is known to be frame.
    """

    axis: int
    rails: tuple[Rail, ...]
    how: str
    strength: int
    frame: bool
    offset: float
    ends: tuple[float, float] | None

    @property
    def strands(self) -> tuple[int, ...]:
        """The strands it is drawn with, each once."""
        return tuple(dict.fromkeys(rail.strand for rail in self.rails))


class Rivals(NamedTuple):
    """The guide taken and the others that fit as well."""

    guide: Guide
    others: tuple[Guide, ...]


THROUGH, INTERRUPTED, RAILS = "runs through it", "is interrupted at it", "runs along both its sides"
BESIDE, ENDS_INSIDE, ENDS, STROKES = "runs beside it", "ends inside it", "ends at it", "is hatched along it"


def choose_guide(box: Box, rails: Sequence[Rail], frame: Collection[int], hatched: Sequence[int]) -> Rivals | None:
    """The guide of a box, or None where nothing fits.

    ``frame`` are the strands known to be frame, ``hatched`` the axes along which hatch strokes stand on the box itself.
    A box without a pin takes only what is plain (strength 3 or more).
    """
    least = 2 if box.sites else 3
    found = [guide for axis in (0, 1) for guide in _guides(box, axis, rails, frame) if guide.strength >= least]
    found += [Guide(axis, (), STROKES, 4, frame=True, offset=box.halves[1 - axis], ends=None) for axis in hatched]
    if box.open:
        found = [guide for guide in found if _enters_open_end(box, guide)]
    if not found:
        return None
    found.sort(key=lambda guide: (-guide.strength, not guide.frame, _loose(guide, frame), abs(guide.offset)))
    if found[0].how == STROKES and len(found) > 1 and found[1].axis == found[0].axis and found[1].frame:
        # The strokes stand on the rails that the box touches: the drawn lines say more.
        found[:2] = found[1::-1]
    best = found[0]
    return Rivals(best, tuple(guide for guide in found[1:] if _rivals(best, guide)))


def _enters_open_end(box: Box, guide: Guide) -> bool:
    """Whether a rod runs in where a side is missing, and ends before the bottom."""
    deepest = max((rail.high for rail in guide.rails), default=box.halves[0])
    return guide.how == ENDS_INSIDE and guide.axis == 0 and deepest < box.halves[0] - box.slack


def _loose(guide: Guide, frame: Collection[int]) -> bool:
    """Whether one of the pieces of an interrupted guide is not frame: it may be a rod in line with the other piece."""
    return guide.how == INTERRUPTED and any(strand not in frame for strand in guide.strands)


def _rivals(best: Guide, other: Guide) -> bool:
    """Whether another guide fits as well: across the first as plainly, or along it and of another part."""
    if other.strength < best.strength or other.how == INTERRUPTED:
        return False
    if other.axis != best.axis:
        # A wall that closes a cylinder runs beside the piston at the end of its stroke.
        if other.how == STROKES and best.how == INTERRUPTED and best.frame:
            return False  # the hatch along each piece of the guide ends at the block, too
        return other.how != BESIDE or best.how == BESIDE
    shared = set(best.strands) & set(other.strands)
    return not shared and not (best.frame and other.frame)


def _guides(box: Box, axis: int, rails: Sequence[Rail], frame: Collection[int]) -> Iterator[Guide]:
    """All guides along one axis of a box."""
    along = [rail for rail in rails if rail.axis == axis and (not rail.pinned or rail.strand in frame)]
    if not along:
        return
    level = GUIDE_LEVEL_OF_WIDTH * 2.0 * box.halves[1 - axis] + box.slack
    for rail in along:
        fixed = rail.strand in frame
        if rail.how == "through":
            yield _of((rail,), THROUGH, 4, fixed)
        elif rail.how == "enters":
            rod = (rail, *_other_side(box, rail, along))
            fixed = any(each.strand in frame for each in rod)
            if rail == min(rod):
                yield _of(rod, ENDS_INSIDE, 4 if fixed else 3, fixed)
        elif rail.how == "stops" and fixed:
            yield _of((rail,), ENDS, 3, fixed)
    yield from _interrupted(along, frame, level)
    yield from _beside(along, frame, level)


def _other_side(box: Box, rail: Rail, along: Sequence[Rail]) -> list[Rail]:
    """The other side of a thick rod that enters a box: a line as deep in it, from the same end."""
    ahead = rail.high > box.halves[rail.axis] + box.slack
    depth = rail.low if ahead else rail.high
    return [
        other
        for other in along
        if other.how == "enters"
        and other is not rail
        and (other.high > box.halves[rail.axis] + box.slack) == ahead
        and abs((other.low if ahead else other.high) - depth) <= box.slack
    ][:1]


def _of(rails: tuple[Rail, ...], how: str, strength: int, frame: bool) -> Guide:  # noqa: FBT001 (a plain fact)
    nearest = min(rails, key=lambda rail: abs(rail.offset))
    ends = (min(rail.low for rail in rails), max(rail.high for rail in rails))
    return Guide(nearest.axis, rails, how, strength, frame, nearest.offset, ends)


def _interrupted(along: Sequence[Rail], frame: Collection[int], level: float) -> Iterator[Guide]:
    """Collinear pieces on both sides of a box."""
    behind = [rail for rail in along if rail.how == "stops" and rail.high <= 0.0]
    ahead = [rail for rail in along if rail.how == "stops" and rail.low >= 0.0]
    for one in behind:
        for other in ahead:
            if abs(one.offset - other.offset) <= level:
                fixed = one.strand in frame or other.strand in frame
                yield _of((one, other), INTERRUPTED, 4, fixed)


def _beside(along: Sequence[Rail], frame: Collection[int], level: float) -> Iterator[Guide]:
    """Lines along one or both sides: two rails where they stand level, else the frame, else the nearest one alone."""
    left = sorted((rail for rail in along if rail.how == "beside" and rail.offset > 0.0), key=lambda each: each.offset)
    right = sorted(
        (rail for rail in along if rail.how == "beside" and rail.offset < 0.0), key=lambda each: -each.offset
    )
    pair = _level_pair(left, right, frame, level)
    if pair is not None:
        yield _of(pair, RAILS, 4, any(rail.strand in frame for rail in pair))
        return
    fixed = [rail for rail in (*left, *right) if rail.strand in frame]
    if fixed:
        yield _of((min(fixed, key=lambda rail: abs(rail.offset)),), BESIDE, 4, frame=True)
    elif left or right:
        yield _of((min((*left, *right), key=lambda rail: abs(rail.offset)),), BESIDE, 2, frame=False)


def _level_pair(
    left: Sequence[Rail], right: Sequence[Rail], frame: Collection[int], level: float
) -> tuple[Rail, Rail] | None:
    """The nearest two rails at like distances on both sides, both frame or both not, or of one strand."""
    pairs = [
        (one, other)
        for one in left
        for other in right
        if abs(one.offset + other.offset) <= 2.0 * level or (one.strand in frame and other.strand in frame)
    ]
    return min(pairs, key=lambda pair: pair[0].offset - pair[1].offset) if pairs else None
