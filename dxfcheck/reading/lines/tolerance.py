"""The two tolerances a sketch is read with."""

from __future__ import annotations

import math
from collections.abc import Sequence
from typing import NamedTuple

from dxfcheck.drawing.primitives import Ring
from dxfcheck.settings import Settings
from dxfcheck.tolerances.drawing import SHAPE_OF_DIAGONAL
from dxfcheck.tolerances.linework import (
    ARC_REACH_IN_SHAPES,
    COINCIDENCE_OF_DIAGONAL,
    GAP_OF_SIZE,
    RIM_OF_RADIUS,
    SHAPE_OF_SIZE,
    STRAY_DIAGONALS,
    WELD_GAP_OF_DIAGONAL,
)

__all__ = ["Tolerance", "tolerance_for"]


class Tolerance(NamedTuple):
    """Lengths in the drawing's unit.

    ``t`` is for ends that meet, ``shape`` for rectangles, obrounds and frame symbols, ``gap`` is how far off an end may
    stop and still be taken to have been meant to meet. Where all rings, or all rings and line ends, were typed to so
    many decimals, ``typed_rings`` and ``typed`` are that step (else 0): what was meant to lie on a line misses it by
    as much, however exact t is.
    """

    t: float
    shape: float
    gap: float
    typed_rings: float = 0.0
    typed: float = 0.0

    @property
    def on_line(self) -> float:
        """How far an end may lie from a line and still meet it."""
        return max(self.t, min(self.typed, self.shape))

    def through(self, radius: float) -> float:
        """How far a line may run past the centre of a ring of this radius and still run through it."""
        return max(self.t, min(self.typed_rings, RIM_OF_RADIUS * radius))

    def close(self, size: float) -> float:
        """How far apart the parts of a symbol of this size may lie: the shape tolerance, but no more than 3 % of it.

        On a sheet of hundreds of mechanisms the diagonal says little about any one of them.
        """
        return max(self.t, min(self.shape, SHAPE_OF_SIZE * size))

    def arc(self, radius: float, size: float) -> float:
        """How far from an arc an end of a line of this length may lie and still meet it.

        2 % of the radius, but on no account much of the line itself: corner and hatch strokes beside a wide curved
        link are not welded to it.
        """
        return max(self.t, min(self.rim(radius), ARC_REACH_IN_SHAPES * self.shape, SHAPE_OF_SIZE * size))

    def missing(self, size: float) -> float:
        """How far an end of a line of this length may stop short of what it was meant to meet."""
        return max(self.t, min(self.gap, GAP_OF_SIZE * size))

    def rim(self, radius: float) -> float:
        """How far from a rim of this radius an end may lie and still be on it."""
        return max(self.t, RIM_OF_RADIUS * radius)


def tolerance_for(diagonal: float, settings: Settings, rings: Sequence[Ring] = ()) -> Tolerance:
    """The tolerances for a sketch of this diagonal; a tolerance set by the user replaces t.

    A stray line a kilometre off must not make every end of a small linkage meet every other: the diagonal counts only
    up to STRAY_DIAGONALS of that of the box round the rings.
    """
    if len(rings) > 1:
        across = [ring.centre.real for ring in rings]
        up = [ring.centre.imag for ring in rings]
        diagonal = min(diagonal, STRAY_DIAGONALS * math.hypot(max(across) - min(across), max(up) - min(up)) or diagonal)
    t = settings.tolerance if settings.tolerance is not None else COINCIDENCE_OF_DIAGONAL * diagonal
    return Tolerance(t, max(t, SHAPE_OF_DIAGONAL * diagonal), max(t, WELD_GAP_OF_DIAGONAL * diagonal))
