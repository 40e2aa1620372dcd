"""The places by which two sheets are laid on one another: pins, and joints that have no pin."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Sequence
from typing import NamedTuple

from dxfcheck.geometry import Point
from dxfcheck.inspection import MechanismReport
from dxfcheck.linkage import Linkage

__all__ = ["Landmark", "PlaceIndex", "landmarks_of"]


ARMS = 4
"""Of each link, the distances to so many of its pins are looked at."""


class Landmark(NamedTuple):
    """One place: of pin ``pin`` (index) of mechanism ``mechanism`` (index), or of a joint without one (pin is None).

    ``make`` is what must be alike at one place in two drawings (fixed or not, how many links, which kind of joint).
    ``arms`` are the distances to the other pins of its moving links, the shortest first: they stay when the linkage is
    drawn at another pose.
    ``driven`` says that a stated drive moves a link here; ``name`` is a label, '' where nothing was written.
    """

    at: Point
    mechanism: int
    pin: int | None
    fixed: bool
    make: tuple[str | int, ...]
    arms: tuple[float, ...]
    driven: bool
    name: str


def landmarks_of(mechanisms: Sequence[MechanismReport], scale: float = 1.0) -> list[Landmark]:
    """The landmarks of a sheet, its lengths brought to another unit by ``scale``."""
    return [mark for number, report in enumerate(mechanisms) for mark in _landmarks(number, report.linkage, scale)]


def _landmarks(number: int, linkage: Linkage, scale: float) -> list[Landmark]:
    driven = {drive.link for drive in linkage.drives if drive.source != "assumed"}
    marks = [
        Landmark(
            at=pin.at * scale,
            mechanism=number,
            pin=index,
            fixed=pin.fixed,
            make=("pin", int(pin.fixed), len(pin.links)),
            arms=_arms(linkage, index, scale),
            driven=not driven.isdisjoint(pin.links),
            name=pin.name if pin.labelled else "",
        )
        for index, pin in enumerate(linkage.pins)
    ]
    marks += [
        Landmark(
            at=joint.at * scale,
            mechanism=number,
            pin=None,
            fixed=linkage.frame in (joint.first, joint.second),
            make=(joint.kind,),
            arms=(),
            driven=not driven.isdisjoint((joint.first, joint.second)),
            name="",
        )
        for joint in linkage.joints
        if joint.pin is None
    ]
    return marks


def _arms(linkage: Linkage, pin: int, scale: float) -> tuple[float, ...]:
    at = linkage.pins[pin].at
    moving = [linkage.links[link] for link in linkage.pins[pin].links if link != linkage.frame]
    return tuple(
        sorted(
            abs(linkage.pins[other].at - at) * scale for link in moving for other in link.pins[:ARMS] if other != pin
        )
    )


class PlaceIndex:
    """Finds the nearest of many places within a reach, each look-up in constant time."""

    def __init__(self, places: Sequence[Point], reach: float) -> None:
        self._places = places
        self._reach = reach
        self._cell = 4.0 * reach
        self._cells: defaultdict[tuple[int, int], list[int]] = defaultdict(list)
        for number, place in enumerate(places):
            self._cells[int(place.real // self._cell), int(place.imag // self._cell)].append(number)

    def nearest(self, place: Point) -> int | None:
        """The index of the nearest place within reach, the first of equals; None where there is none."""
        best, distance = None, self._reach
        low_x, high_x = int((place.real - distance) // self._cell), int((place.real + distance) // self._cell)
        low_y, high_y = int((place.imag - distance) // self._cell), int((place.imag + distance) // self._cell)
        for x in range(low_x, high_x + 1):
            for y in range(low_y, high_y + 1):
                for number in self._cells.get((x, y), ()):
                    off = abs(self._places[number] - place)
                    if off < distance or (best is None and off <= distance):
                        best, distance = number, off
        return best
