"""Motions that might lay one sheet on another, the likeliest first, and only so many of them."""

from __future__ import annotations

import math
from collections import defaultdict
from collections.abc import Iterator, Sequence
from itertools import combinations, islice, pairwise

from dxfcheck.comparison.landmarks import Landmark
from dxfcheck.comparison.motion import UNMOVED, SheetMotion
from dxfcheck.geometry import Point
from dxfcheck.tolerances.comparison import COMPARED_CANDIDATES, COMPARED_SAMPLE

__all__ = ["candidates"]

ALL_PAIRS_UP_TO = 8
"""Of a mechanism with more landmarks only neighbours are paired: in its list, and with its first."""

Pair = tuple[Point, Point]


def candidates(old: Sequence[Landmark], new: Sequence[Landmark], reach: float) -> Iterator[SheetMotion]:
    """Motions that bring two places of the old sheet on two of the new; a shift where there is no pair."""
    if not old or not new:
        return
    yield from _by_outline(old, new, reach)
    yield from _by_name(old, new, reach)
    yield from islice(_by_distance(old, new, reach), COMPARED_CANDIDATES)
    if len(old) == len(new) == 1:
        yield SheetMotion(shift=new[0].at - old[0].at)


def _by_outline(old: Sequence[Landmark], new: Sequence[Landmark], reach: float) -> Iterator[SheetMotion]:
    """From the middle of all places and the one farthest from it: right where the sheet was moved as it is."""
    if len(old) != len(new):
        return
    middle, aim = (sum(mark.at for mark in marks) / len(marks) for marks in (old, new))
    far = max((mark.at for mark in old), key=lambda at: abs(at - middle))
    size = abs(far - middle)
    if size > reach:
        targets = (mark.at for mark in new if abs(abs(mark.at - aim) - size) <= 2.0 * reach)
        for target in islice(targets, COMPARED_SAMPLE):
            yield from _motions((middle, far), (aim, target))


def _by_name(old: Sequence[Landmark], new: Sequence[Landmark], reach: float) -> Iterator[SheetMotion]:
    """From labels that stand once on each sheet: the first of them with some of the others."""
    first, second = _named_once(old), _named_once(new)
    common = [name for name in first if name in second]
    for start, end in combinations(common[: ALL_PAIRS_UP_TO // 2], 2):
        pair, target = (first[start], first[end]), (second[start], second[end])
        if abs(_length(pair) - _length(target)) <= 2.0 * reach < _length(pair):
            yield from _motions(pair, target)


def _named_once(marks: Sequence[Landmark]) -> dict[str, Point]:
    found: defaultdict[str, list[Point]] = defaultdict(list)
    for mark in marks:
        if mark.name:
            found[mark.name].append(mark.at)
    return {name: places[0] for name, places in found.items() if len(places) == 1}


def _by_distance(old: Sequence[Landmark], new: Sequence[Landmark], reach: float) -> Iterator[SheetMotion]:
    """From pairs of a mechanism that lie equally far apart on both sheets, those with the fewest partners first."""
    width = 4.0 * reach
    by_length: defaultdict[int, list[Pair]] = defaultdict(list)
    for pair in _pairs(new):
        by_length[int(_length(pair) // width)].append(pair)
    partners: list[tuple[int, Pair, list[Pair]]] = []
    for pair in _pairs(old):
        length = _length(pair)
        cells = range(int((length - 2.0 * reach) // width), int((length + 2.0 * reach) // width) + 1)
        near = [other for cell in cells for other in by_length.get(cell, ())]
        if near and length > reach:
            partners.append((len(near), pair, near))
    partners.sort(key=lambda item: item[0])
    for _, pair, near in partners:
        for start, end in near:
            if abs(abs(end - start) - _length(pair)) <= 2.0 * reach:
                yield from _motions(pair, (start, end))
                yield from _motions(pair, (end, start))


def _pairs(marks: Sequence[Landmark]) -> Iterator[Pair]:
    """Pairs of landmarks within each mechanism."""
    groups: defaultdict[int, list[Point]] = defaultdict(list)
    for mark in marks:
        groups[mark.mechanism].append(mark.at)
    for places in groups.values():
        if len(places) <= ALL_PAIRS_UP_TO:
            yield from combinations(places, 2)
        else:
            yield from pairwise(places)
            yield from ((places[0], place) for place in places[2:])
    yield from pairwise([places[0] for places in groups.values()])


def _length(pair: Pair) -> float:
    return abs(pair[1] - pair[0])


def _motions(pair: Pair, target: Pair) -> Iterator[SheetMotion]:
    """The two motions, plain and mirrored, that lay a pair of places on another as far apart."""
    for mirrored in (False, True):
        start, end = (place.conjugate() if mirrored else place for place in pair)
        turn = (target[1] - target[0]) / (end - start)
        size = abs(turn)
        if math.isfinite(size) and size > 0:
            turn /= size
            yield SheetMotion(turn, (target[0] + target[1]) / 2 - (start + end) / 2 * turn, mirrored, UNMOVED.scale)
