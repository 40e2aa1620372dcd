"""Findings that are new, and those that are cured."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Callable, Hashable, Mapping, Sequence

from dxfcheck.comparison.landmarks import PlaceIndex
from dxfcheck.geometry import Point
from dxfcheck.inspection import DrawingReport
from dxfcheck.rules.finding import Finding

__all__ = ["FindingPlaces", "compare_findings"]

PinId = tuple[int, int]

ABOUT_THE_SHEET = ("unlabelled-pins",)
"""Rules with one finding a sheet, which stands at the first of the places in question."""


class FindingPlaces:
    """Where findings lie in terms of the new drawing: at which pin, in which mechanism, at which place."""

    def __init__(
        self,
        report: DrawingReport,
        to_new: Callable[[Point], Point],
        pins: Mapping[PinId, PinId],
        mechanisms: Mapping[str, str],
    ) -> None:
        """``to_new`` takes a place, ``pins`` and ``mechanisms`` take numbers and names, to the new drawing's."""
        self._to_new = to_new
        self._mechanisms = mechanisms
        self._ids = [
            pins.get((number, index))
            for number, mechanism in enumerate(report.mechanisms)
            for index in range(len(mechanism.linkage.pins))
        ]
        places = [pin.at for mechanism in report.mechanisms for pin in mechanism.linkage.pins]
        self._index = PlaceIndex(places, report.tolerance or 1.0)

    def pin(self, finding: Finding) -> PinId | None:
        """The pin that the finding stands at."""
        near = None if finding.at is None else self._index.nearest(finding.at)
        return None if near is None else self._ids[near]

    def mechanism(self, finding: Finding) -> str | None:
        """The mechanism it is about."""
        return None if finding.mechanism is None else self._mechanisms.get(finding.mechanism)

    def at(self, finding: Finding) -> Point | None:
        """Its place on the new sheet."""
        return None if finding.at is None else self._to_new(finding.at)


def compare_findings(
    old: Sequence[Finding], new: Sequence[Finding], before: FindingPlaces, after: FindingPlaces, reach: float
) -> tuple[tuple[Finding, ...], tuple[Finding, ...]]:
    """The findings that are new, and those that are cured; one of the same rule at the same pin or place stays.

    ``reach`` is how far a finding may lie from where it lay before and still be the same.
    """
    left, right = list(old), list(new)
    _drop_same(left, right, before.pin, after.pin)
    _drop_near(left, right, before, after, reach)
    placeless = "no place"
    _drop_same(
        left,
        right,
        lambda finding: (placeless, before.mechanism(finding)) if finding.at is None else None,
        lambda finding: (placeless, after.mechanism(finding)) if finding.at is None else None,
    )
    _drop_same(left, right, _whole_sheet, _whole_sheet)
    return tuple(right), tuple(left)


def _whole_sheet(finding: Finding) -> str | None:
    """The same for findings about the whole sheet, whose place is only that of the first of many."""
    return finding.rule if finding.rule in ABOUT_THE_SHEET else None


def _drop_same(
    left: list[Finding],
    right: list[Finding],
    old_key: Callable[[Finding], Hashable | None],
    new_key: Callable[[Finding], Hashable | None],
) -> None:
    """Drop from both what has the same rule and key."""
    there: defaultdict[tuple[str, Hashable], list[Finding]] = defaultdict(list)
    for finding in right:
        key = new_key(finding)
        if key is not None:
            there[finding.rule, key].append(finding)
    kept, gone = [], set()
    for finding in left:
        key = old_key(finding)
        same = there.get((finding.rule, key)) if key is not None else None
        if same:
            gone.add(id(same.pop(0)))
        else:
            kept.append(finding)
    left[:] = kept
    right[:] = [finding for finding in right if id(finding) not in gone]


def _drop_near(
    left: list[Finding], right: list[Finding], before: FindingPlaces, after: FindingPlaces, reach: float
) -> None:
    """Drop from both what has the same rule and mechanism and lies near by on the new sheet, the nearest first."""
    if reach <= 0:
        return
    targets: defaultdict[tuple[str, str | None], list[tuple[int, Point]]] = defaultdict(list)
    for number, finding in enumerate(right):
        at = after.at(finding)
        if at is not None:
            targets[finding.rule, after.mechanism(finding)].append((number, at))
    indices = {key: PlaceIndex([at for _, at in placed], reach) for key, placed in targets.items()}
    near: list[tuple[float, int, int]] = []
    for number, finding in enumerate(left):
        at, key = before.at(finding), (finding.rule, before.mechanism(finding))
        found = indices[key].nearest(at) if at is not None and key in indices else None
        if at is not None and found is not None:
            target, place = targets[key][found]
            near.append((abs(place - at), number, target))
    done: tuple[set[int], set[int]] = (set(), set())
    for _, first, second in sorted(near):
        if first not in done[0] and second not in done[1]:
            done[0].add(first)
            done[1].add(second)
    left[:] = [finding for number, finding in enumerate(left) if number not in done[0]]
    right[:] = [finding for number, finding in enumerate(right) if number not in done[1]]
