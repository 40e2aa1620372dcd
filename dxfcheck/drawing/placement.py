"""Where a block's own plane lands on the sheet.

With a point as a complex number p, every map of the plane that keeps straight lines is

    p -> direct * p + mirrored * conjugate(p) + shift

It keeps circles round just where one of the two factors is zero: ``direct`` alone turns and scales, ``mirrored`` alone
also reflects. Nested references compose in closed form, so no matrix is needed. Heights go z -> z_scale * z + z_shift.
"""

from __future__ import annotations

import cmath
import math
from typing import NamedTuple

from dxfcheck.geometry import Point
from dxfcheck.tolerances.drawing import EVEN_SCALE_RELATIVE

__all__ = ["FLIPPED", "SHEET", "Placement", "reference_placement"]


class Placement(NamedTuple):
    """A map of a plane into the sheet's; see the module head."""

    direct: complex
    mirrored: complex
    shift: Point
    z_scale: float
    z_shift: float

    def __call__(self, point: Point) -> Point:
        """The point's place on the sheet."""
        return self.direct * point + self.mirrored * point.conjugate() + self.shift

    def height(self, z: float) -> float:
        """The z on the sheet of a z of the plane mapped."""
        return self.z_scale * z + self.z_shift

    @property
    def even(self) -> bool:
        """Whether circles stay round."""
        return not self.direct or not self.mirrored

    @property
    def scale(self) -> float:
        """Mean factor of lengths; exact where even."""
        return math.sqrt(abs(abs(self.direct) ** 2 - abs(self.mirrored) ** 2))

    def after(self, inner: Placement) -> Placement:
        """The map that takes ``inner`` first and this one second."""
        direct, mirrored = _without_noise(
            self.direct * inner.direct + self.mirrored * inner.mirrored.conjugate(),
            self.direct * inner.mirrored + self.mirrored * inner.direct.conjugate(),
        )
        return Placement(direct, mirrored, self(inner.shift), self.z_scale * inner.z_scale, self.height(inner.z_shift))


SHEET = Placement(1 + 0j, 0j, 0j, 1.0, 0.0)
"""The sheet's own plane."""

FLIPPED = Placement(0j, -1 + 0j, 0j, -1.0, 0.0)
"""The object coordinate system of extrusion (0, 0, -1): (x, y, z) -> (-x, y, -z), by the arbitrary axis algorithm
(Autodesk, DXF Reference, "Object Coordinate Systems", from memory; agrees with ezdxf)."""


def reference_placement(
    at: tuple[float, float, float],
    base: tuple[float, float, float],
    scale: tuple[float, float, float],
    rotation: float,
) -> Placement:
    """Map of a block's plane into that of its reference; ``rotation`` in degrees, a scale of 0 is read as 1."""
    scale_x, scale_y, scale_z = (factor or 1.0 for factor in scale)
    turn = cmath.rect(1.0, math.radians(rotation)) if rotation else 1 + 0j
    direct, mirrored = _without_noise(turn * (scale_x + scale_y) / 2, turn * (scale_x - scale_y) / 2)
    base_point = complex(base[0], base[1])
    shift = complex(at[0], at[1]) - direct * base_point - mirrored * base_point.conjugate()
    return Placement(direct, mirrored, shift, scale_z, at[2] - scale_z * base[2])


def _without_noise(direct: complex, mirrored: complex) -> tuple[complex, complex]:
    """The two factors, the lesser set to zero where it is rounding noise of the greater."""
    if abs(mirrored) <= EVEN_SCALE_RELATIVE / 2 * abs(direct):
        return direct, 0j
    if abs(direct) <= EVEN_SCALE_RELATIVE / 2 * abs(mirrored):
        return 0j, mirrored
    return direct, mirrored
