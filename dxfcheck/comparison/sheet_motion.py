"""The motion that lays one sheet on another: moved, turned, mirrored as a whole.

Candidates come from pairs of places that lie equally far apart on both sheets; each is weighed by how many places it
brings together, and how alike these are. The sheet left where it is wins over any other that explains no more.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence
from dataclasses import replace
from typing import NamedTuple

from dxfcheck.comparison.candidates import candidates
from dxfcheck.comparison.landmarks import Landmark, PlaceIndex
from dxfcheck.comparison.motion import UNMOVED, SheetMotion
from dxfcheck.tolerances.comparison import (
    COMPARED_ENOUGH,
    COMPARED_MORE,
    COMPARED_SAMPLE,
    COMPARED_SAMPLE_LEAST,
    COMPARED_SNAP_OF_REACH,
)

__all__ = ["Laid", "find_motion", "lay", "same_arms"]


class Laid(NamedTuple):
    """A motion and the pairs of landmarks (old index, new index) that it brings together."""

    motion: SheetMotion
    pairs: tuple[tuple[int, int], ...]


Weight = tuple[int, int, int, int, int, bool, int, bool]


def find_motion(old: Sequence[Landmark], new: Sequence[Landmark], reach: float) -> Laid:
    """The motion that lays the old landmarks on the new ones; the sheet unmoved where none explains more.

    ``reach`` is how far apart two places may lie and still be one, in the new drawing's unit, as are all places.
    Near-linear in the landmarks: the number of candidates is limited, and most are weighed on a sample of the places.
    """
    index = PlaceIndex([mark.at for mark in new], reach)
    best = lay(UNMOVED, old, new, index)
    best_weight = _weight(best, old, new, reach)
    all_of_both, enough = max(len(old), len(new)), COMPARED_ENOUGH * min(len(old), len(new))
    large, left = len(old) > COMPARED_SAMPLE, COMPARED_MORE
    if _explains(best_weight, all_of_both) or (large and best_weight[0] >= enough):
        return best
    for motion in _promising(candidates(old, new, reach), old, index):
        laid = _refined(lay(motion, old, new, index), old, new, index, reach)
        weight = _weight(laid, old, new, reach)
        if weight > best_weight:
            best, best_weight = laid, weight
        if large and best_weight[0] >= enough:
            left -= 1
            if left == 0 or _explains(best_weight, all_of_both):
                break
    return best


def _explains(weight: Weight, whole: int) -> bool:
    """Whether every place is explained, by one that is alike and driven alike."""
    return weight[0] == weight[2] == weight[3] == weight[4] == whole


def lay(motion: SheetMotion, old: Sequence[Landmark], new: Sequence[Landmark], index: PlaceIndex) -> Laid:
    """The pairs of landmarks that a motion brings together, each landmark in one pair at most."""
    taken: dict[int, int] = {}
    for number, mark in enumerate(old):
        found = index.nearest(motion(mark.at))
        if found is None:
            continue
        before = taken.get(found)
        if before is None or (new[found].make == mark.make) > (new[found].make == old[before].make):
            taken[found] = number
    return Laid(motion, tuple(sorted((number, found) for found, number in taken.items())))


def _weight(laid: Laid, old: Sequence[Landmark], new: Sequence[Landmark], reach: float) -> Weight:
    """How much a motion explains, the most telling first; the greatest wins."""
    pairs = [(old[first], new[second]) for first, second in laid.pairs]
    return (
        len(pairs),
        sum(first.fixed and second.fixed for first, second in pairs),
        sum(first.make == second.make for first, second in pairs),
        sum(_arms_agree(first, second, reach) for first, second in pairs),
        sum(first.driven == second.driven for first, second in pairs),
        laid.motion == UNMOVED,
        sum(first.name == second.name != "" for first, second in pairs),
        not laid.motion.mirrored,
    )


def same_arms(old: Sequence[Landmark], new: Sequence[Landmark], reach: float) -> bool:
    """Whether most landmarks have their like in the other mechanism by the lengths of the links there."""
    alike = sum(any(_arms_agree(first, second, reach) for second in new) for first in old)
    return 2 * alike > len(old)


def _arms_agree(first: Landmark, second: Landmark, reach: float) -> bool:
    return len(first.arms) == len(second.arms) and all(
        abs(arm - other) <= 2.0 * reach for arm, other in zip(first.arms, second.arms, strict=True)
    )


def _promising(found: Iterable[SheetMotion], old: Sequence[Landmark], index: PlaceIndex) -> Iterator[SheetMotion]:
    """The candidates; on a large sheet those that bring together most of a sample, then the best of the others."""
    if len(old) <= COMPARED_SAMPLE:
        yield from found
        return
    step = len(old) // COMPARED_SAMPLE
    sample = [old[number].at for number in range(0, len(old), step)][:COMPARED_SAMPLE]
    others: list[tuple[int, SheetMotion]] = []
    for motion in found:
        hits = sum(index.nearest(motion(place)) is not None for place in sample)
        if 2 * hits > len(sample):
            yield motion
        elif hits >= len(sample) * COMPARED_SAMPLE_LEAST:
            others.append((hits, motion))
    others.sort(key=lambda item: -item[0])
    yield from (motion for _, motion in others[:COMPARED_SAMPLE])


def _refined(laid: Laid, old: Sequence[Landmark], new: Sequence[Landmark], index: PlaceIndex, reach: float) -> Laid:
    """The motion fitted to all places that it brings together (least squares), where that loses none of them."""
    if len(laid.pairs) < 2:
        return laid
    fitted = laid.motion.fitted([(old[first].at, new[second].at) for first, second in laid.pairs])
    noise = COMPARED_SNAP_OF_REACH * reach
    extent = max(abs(old[first].at) for first, _ in laid.pairs)
    if not fitted.mirrored and abs(fitted.turn - 1.0) * extent <= noise:
        first, second = laid.pairs[0]
        fitted = SheetMotion(shift=new[second].at - old[first].at)
    if abs(fitted.shift) <= noise:
        fitted = replace(fitted, shift=0j)
    again = lay(fitted, old, new, index)
    return again if len(again.pairs) >= len(laid.pairs) else laid
