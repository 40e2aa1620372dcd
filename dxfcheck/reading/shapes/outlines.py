"""Which places lie inside an outline given as a polygon."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np
from numpy.typing import NDArray

from dxfcheck.geometry import Point

__all__ = ["inside_outline", "pins_inside"]


def pins_inside(outline: Sequence[Point], places: NDArray[np.complex128]) -> list[int]:
    """Which of the places (P,) lie inside an outline."""
    if not places.size:
        return []
    left, right = min(point.real for point in outline), max(point.real for point in outline)
    low, high = min(point.imag for point in outline), max(point.imag for point in outline)
    near = (places.real >= left) & (places.real <= right) & (places.imag >= low) & (places.imag <= high)
    return [number for number in np.nonzero(near)[0].tolist() if inside_outline(complex(places[number]), outline)]


def inside_outline(point: Point, outline: Sequence[Point]) -> bool:
    """Whether a point lies inside a polygon (even-odd rule)."""
    across, up = point.real, point.imag
    inside = False
    before = outline[-1]
    above = before.imag > up
    for corner in outline:
        now_above = corner.imag > up
        if now_above != above:
            parameter = (up - before.imag) / (corner.imag - before.imag)
            if before.real + parameter * (corner.real - before.real) > across:
                inside = not inside
        before, above = corner, now_above
    return inside
