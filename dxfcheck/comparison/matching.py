"""Which mechanism, link and pin of the old drawing is which of the new one.

By place first, under the motion of the sheet; what moved is then found by what it is joined to, and by its label.
"""

from __future__ import annotations

from collections import Counter, defaultdict
from collections.abc import Sequence
from dataclasses import dataclass, replace

from dxfcheck.comparison.landmarks import Landmark, PlaceIndex, landmarks_of
from dxfcheck.comparison.motion import SheetMotion
from dxfcheck.comparison.sheet_motion import Laid, find_motion, same_arms
from dxfcheck.inspection import MechanismReport
from dxfcheck.linkage import Linkage

__all__ = ["MatchedSheets", "MechanismPair", "match_mechanisms"]

Make = tuple[int, int, tuple[tuple[str, int], ...]]
Place = tuple[Landmark, Landmark]

ALIKE_TRIED = 40
"""Of mechanisms that are built alike, so many are tried for the one that a mechanism laid elsewhere is."""


@dataclass(frozen=True, slots=True, kw_only=True)
class MechanismPair:
    """One mechanism in both drawings (indices): the motion that lays it on the new sheet, and pins known by place."""

    old: int
    new: int
    motion: SheetMotion
    pins: tuple[tuple[int, int], ...]


@dataclass(frozen=True, slots=True, kw_only=True)
class MatchedSheets:
    """The mechanisms that are in both drawings, in the new one's order, and those (indices) in one only."""

    motion: SheetMotion
    pairs: tuple[MechanismPair, ...]
    gone: tuple[int, ...]
    added: tuple[int, ...]


def match_mechanisms(
    old: Sequence[MechanismReport], new: Sequence[MechanismReport], scale: float, reach: float
) -> MatchedSheets:
    """Find the motion of the sheet, then pair the mechanisms; ``scale`` brings old lengths to the new unit.

    ``reach`` is how far apart two places may lie and still be one, in the new unit.
    """
    marks, others = landmarks_of(old, scale), landmarks_of(new)
    laid, size = _laid(marks, others, reach)
    if size != 1.0:
        marks = [mark._replace(at=mark.at * size) for mark in marks]
    shared = _shared_pins(laid, marks, others)
    matching = _Matching(_by_mechanism(marks), _by_mechanism(others))
    by_votes = sorted(shared, key=lambda pair: (-len(shared[pair]), pair))
    for first, second in by_votes:
        if 2 * len(shared[first, second]) > matching.least(first, second):
            matching.pair(first, second, laid.motion, shared[first, second])
    _pair_laid_elsewhere(matching, old, new, reach)
    for first, second in by_votes:
        matching.pair(first, second, laid.motion, shared[first, second])
    _pair_alike(matching, old, new, laid.motion)
    return matching.result(laid.motion, size)


class _Matching:
    """The pairs found so far, each mechanism in one at most."""

    def __init__(self, old: dict[int, list[Landmark]], new: dict[int, list[Landmark]]) -> None:
        self.old = old
        self.new = new
        self._pairs: dict[int, MechanismPair] = {}

    def least(self, first: int, second: int) -> int:
        """The number of landmarks of the smaller of two mechanisms."""
        return min(len(self.old[first]), len(self.new[second]))

    def pair(self, first: int, second: int, motion: SheetMotion, places: Sequence[Place]) -> None:
        """Take two mechanisms for one, unless either has found its own already."""
        if first in self.old and second in self.new:
            pins = tuple((a.pin, b.pin) for a, b in places if a.pin is not None and b.pin is not None)
            self._pairs[second] = MechanismPair(old=first, new=second, motion=motion, pins=pins)
            del self.old[first], self.new[second]

    def result(self, motion: SheetMotion, size: float) -> MatchedSheets:
        """What was found, and what is left over; ``size`` is the factor of the sheet's size."""
        pairs = (pair for _, pair in sorted(self._pairs.items()))
        return MatchedSheets(
            motion=replace(motion, scale=size),
            pairs=tuple(replace(pair, motion=replace(pair.motion, scale=size)) for pair in pairs),
            gone=tuple(sorted(self.old)),
            added=tuple(sorted(self.new)),
        )


def _shared_pins(laid: Laid, old: Sequence[Landmark], new: Sequence[Landmark]) -> dict[tuple[int, int], list[Place]]:
    """By mechanism of the old and of the new sheet: the landmarks that lie at one place."""
    shared: defaultdict[tuple[int, int], list[Place]] = defaultdict(list)
    for first, second in laid.pairs:
        shared[old[first].mechanism, new[second].mechanism].append((old[first], new[second]))
    return shared


def _pair_laid_elsewhere(
    matching: _Matching, old: Sequence[MechanismReport], new: Sequence[MechanismReport], reach: float
) -> None:
    """Pair mechanisms of one make of which one lies elsewhere on the sheet, moved as a whole."""
    makes: defaultdict[Make, list[int]] = defaultdict(list)
    for number in matching.new:
        makes[_make(new[number].linkage)].append(number)
    for first in list(matching.old):
        for second in makes[_make(old[first].linkage)][:ALIKE_TRIED]:
            if second not in matching.new:
                continue
            marks, others = matching.old[first], matching.new[second]
            if not same_arms(marks, others, reach):
                continue
            laid = find_motion(marks, others, reach)
            if 2 * len(laid.pairs) > len(marks):
                matching.pair(first, second, laid.motion, [(marks[a], others[b]) for a, b in laid.pairs])
                makes[_make(new[second].linkage)].remove(second)
                break


def _pair_alike(
    matching: _Matching, old: Sequence[MechanismReport], new: Sequence[MechanismReport], motion: SheetMotion
) -> None:
    """Pair what is left by labels, then by make, in the order of their names."""
    labels: defaultdict[str, list[int]] = defaultdict(list)
    makes: defaultdict[Make, list[int]] = defaultdict(list)
    for number in matching.new:
        makes[_make(new[number].linkage)].append(number)
        for label in _labels(new[number].linkage):
            labels[label].append(number)
    for first in list(matching.old):
        mine = _labels(old[first].linkage)
        common = Counter(second for label in mine for second in labels[label][:ALIKE_TRIED] if second in matching.new)
        if common:
            second, count = min(common.items(), key=lambda item: (-item[1], item[0]))
            if 2 * count >= len(mine):
                matching.pair(first, second, motion, ())
    for first in list(matching.old):
        alike = [second for second in makes[_make(old[first].linkage)][:ALIKE_TRIED] if second in matching.new]
        if alike:
            matching.pair(first, alike[0], motion, ())
            makes[_make(old[first].linkage)].remove(alike[0])


def _make(linkage: Linkage) -> Make:
    """What is the same for two mechanisms of one make: how many links, and which joints."""
    return len(linkage.links), len(linkage.pins), tuple(sorted(Counter(joint.kind for joint in linkage.joints).items()))


def _labels(linkage: Linkage) -> set[str]:
    return {pin.name for pin in linkage.pins if pin.labelled}


def _laid(old: Sequence[Landmark], new: Sequence[Landmark], reach: float) -> tuple[Laid, float]:
    """The motion of the sheet, and the factor of its size where only another size explains it."""
    laid = find_motion(old, new, reach)
    whole = min(len(old), len(new))
    if 2 * len(laid.pairs) > whole or len(old) != len(new) or whole < 2:
        return _unless_half(laid, old, new, reach), 1.0
    size = _spread(new) / _spread(old) if _spread(old) else 1.0
    if size > 0 and abs(size - 1.0) * _spread(old) > reach:
        resized = find_motion([mark._replace(at=mark.at * size) for mark in old], new, reach)
        if len(resized.pairs) == whole:
            return resized, size
    return _unless_half(laid, old, new, reach), 1.0


def _unless_half(laid: Laid, old: Sequence[Landmark], new: Sequence[Landmark], reach: float) -> Laid:
    """The motion, or the sheet unmoved where several mechanisms share it and no motion explains most of them."""
    several = min(len({mark.mechanism for mark in marks}) for marks in (old, new)) > 1 if old and new else False
    if several and 2 * len(laid.pairs) <= min(len(old), len(new)):
        return _unmoved(old, new, reach)
    return laid


def _unmoved(old: Sequence[Landmark], new: Sequence[Landmark], reach: float) -> Laid:
    index = PlaceIndex([mark.at for mark in new], reach)
    found = [(number, index.nearest(mark.at)) for number, mark in enumerate(old)]
    return Laid(SheetMotion(), tuple((number, other) for number, other in found if other is not None))


def _spread(marks: Sequence[Landmark]) -> float:
    """Root of the mean square distance of the landmarks from their middle."""
    middle = sum(mark.at for mark in marks) / len(marks)
    return float((sum(abs(mark.at - middle) ** 2 for mark in marks) / len(marks)) ** 0.5)


def _by_mechanism(marks: Sequence[Landmark]) -> dict[int, list[Landmark]]:
    groups: defaultdict[int, list[Landmark]] = defaultdict(list)
    for mark in marks:
        groups[mark.mechanism].append(mark)
    return groups
