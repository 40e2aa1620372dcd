"""Whether coordinates were typed to so many decimals: then what lies on a line misses it by up to a step."""

from __future__ import annotations

import numpy as np

from dxfcheck.reading.lines.nearness import ComplexArray, FloatArray
from dxfcheck.tolerances.linework import EXPORTED_STEPS, TYPED_NOISE, TYPED_STEPS

__all__ = ["rounding_of", "typed_step"]

GLANCE = 64
"""So many coordinates are looked at first: one that is off the grid settles it."""


def typed_step(points: ComplexArray) -> float:
    """The coarsest grid of decimals on which all coordinates of the points (P,) lie.

    0 for whole numbers (nothing was rounded), for full precision and where there are no points.
    """
    return _coarsest_of(points, TYPED_STEPS)


def rounding_of(points: ComplexArray) -> float:
    """What the coordinates of the points (P,) may be off by: half a step of their decimals, typed or exported.

    0 for whole numbers and where no rounding can be told from full precision.
    """
    return _coarsest_of(points, (*TYPED_STEPS, *EXPORTED_STEPS)) / 2.0


def _coarsest_of(points: ComplexArray, steps: tuple[float, ...]) -> float:
    values = np.concatenate((points.real, points.imag))
    for step in (1.0, *steps):
        if _on_grid(values[:GLANCE], step) and _on_grid(values, step):
            return 0.0 if step == 1.0 or not values.size else step
    return 0.0


def _on_grid(values: FloatArray, step: float) -> bool:
    off = np.abs(values / step - np.rint(values / step)) * step
    return bool((off <= TYPED_NOISE * np.maximum(1.0, np.abs(values))).all())
