"""A motion of a whole sheet in its plane."""

from __future__ import annotations

import cmath
from collections.abc import Sequence
from dataclasses import dataclass

from dxfcheck.geometry import Point

__all__ = ["UNMOVED", "SheetMotion"]


@dataclass(frozen=True, slots=True)
class SheetMotion:
    """Mirrored in the x axis if so said, then turned (a unit number) and scaled, then shifted.

    Lengths are in the new drawing's unit; a ``scale`` other than 1 says that what was drawn differs in size by it.
    """

    turn: complex = 1 + 0j
    shift: Point = 0j
    mirrored: bool = False
    scale: float = 1.0

    def __call__(self, place: Point) -> Point:
        """Where a place of the old sheet lies on the new one."""
        return self.vector(place) * self.scale + self.shift

    def vector(self, vector: Point) -> Point:
        """What a direction of the old sheet, or a velocity on it, is on the new one."""
        return (vector.conjugate() if self.mirrored else vector) * self.turn

    @property
    def angle(self) -> float:
        """The angle of the turn, radians from -pi to pi, counter-clockwise positive."""
        return cmath.phase(self.turn)

    @property
    def sense(self) -> int:
        """1; -1 where mirroring makes counter-clockwise clockwise."""
        return -1 if self.mirrored else 1

    def fitted(self, pairs: Sequence[tuple[Point, Point]]) -> SheetMotion:
        """This motion, turned and shifted to bring old and new places closest together in the sum of squares.

        In complex numbers the best turn is the direction of the sum of conj(a) b over places a, b from their means
        (K. Kanatani, Geometric Computation for Machine Vision, rotation fitting, in the plane; from memory).
        """
        old = [(place.conjugate() if self.mirrored else place) * self.scale for place, _ in pairs]
        middle, aim = sum(old) / len(old), sum(place for _, place in pairs) / len(pairs)
        product = sum(
            ((place - middle).conjugate() * (target - aim) for place, (_, target) in zip(old, pairs, strict=True)), 0j
        )
        turn = product / abs(product) if product else self.turn
        return SheetMotion(turn, aim - middle * turn, self.mirrored, self.scale)


UNMOVED = SheetMotion()
