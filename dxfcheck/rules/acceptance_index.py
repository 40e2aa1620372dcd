"""Which acceptances are about a finding, found without going through all of them: an office may accept thousands."""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator

from dxfcheck.geometry import Point
from dxfcheck.rules.finding import Finding
from dxfcheck.settings import Acceptance

__all__ = ["AcceptanceIndex"]

_Cell = tuple[str, int, int]
_ROUND = (-1, 0, 1)


class AcceptanceIndex:
    """Acceptances by rule and place, by rule and handle, and by rule alone.

    ``reach`` is how far from its stated place a finding may lie, in the drawing's unit. Adding takes constant time, a
    look-up time in proportion to what lies within a few reaches.
    """

    def __init__(self, acceptances: Iterable[Acceptance], reach: float) -> None:
        self._reach = reach
        self._all: list[Acceptance] = []
        self._placed: dict[_Cell, list[int]] = {}
        self._named: dict[tuple[str, str], list[int]] = {}
        self._bare: dict[str, list[int]] = {}
        for acceptance in acceptances:
            self.add(acceptance)

    def add(self, acceptance: Acceptance) -> None:
        """Add an acceptance behind the others."""
        number = len(self._all)
        self._all.append(acceptance)
        rule = acceptance.rule
        if acceptance.at is not None:
            self._placed.setdefault((rule, *self._cell(acceptance.at)), []).append(number)
        if acceptance.handle is not None:
            self._named.setdefault((rule, acceptance.handle.upper()), []).append(number)
        if acceptance.at is None and acceptance.handle is None:
            self._bare.setdefault(rule, []).append(number)

    def about(self, finding: Finding) -> list[int]:
        """The numbers, from 0 in the order of adding, of the acceptances about a finding, whatever day it is."""
        found = set(self._near(finding.rule, finding.at)) if finding.at is not None else set()
        for handle in finding.handles if self._named else ():
            found.update(self._named.get((finding.rule, handle.upper()), ()))
        if finding.at is None and not finding.handles:
            found.update(self._bare.get(finding.rule, ()))
        return sorted(found)

    def _near(self, rule: str, at: Point) -> Iterator[int]:
        column, row = self._cell(at)
        for x in _ROUND:
            for y in _ROUND:
                for number in self._placed.get((rule, column + x, row + y), ()):
                    stated = self._all[number].at
                    if stated is not None and abs(stated - at) <= self._reach:
                        yield number

    def _cell(self, at: Point) -> tuple[int, int]:
        size = self._reach or 1.0
        return math.floor(at.real / size), math.floor(at.imag / size)
