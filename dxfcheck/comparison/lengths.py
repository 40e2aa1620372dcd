"""One unit for the lengths of two drawings, and how far apart lengths may be and still be equal."""

from __future__ import annotations

import math
from dataclasses import dataclass

from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.inspection import DrawingReport
from dxfcheck.tolerances.comparison import COMPARED_DIGITS, COMPARED_FLOAT, COMPARED_OF_SIZE

__all__ = ["Lengths", "common_lengths"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Lengths:
    """How lengths of both drawings compare, in ``unit`` (the new drawing's, where it has one).

    ``scale`` brings the old drawing's figures to it; ``note`` says what was taken for granted, '' where both drawings
    have one unit. ``coincidence`` is the sum of both coincidence tolerances. ``steps`` are the greatest rounding errors
    of the coordinates of the old and the new drawing, 0 where these are not rounded to COMPARED_DIGITS. ``greatest``
    is the greatest coordinate of either.
    """

    unit: str
    scale: float
    note: str
    coincidence: float
    steps: tuple[float, float]
    greatest: float

    @property
    def reach(self) -> float:
        """How far apart two places may lie and still be taken for one when the sheets are laid on one another."""
        return self.coincidence + sum(self.steps) + COMPARED_FLOAT * self.greatest

    @property
    def rounded(self) -> str:
        """'OLD' or 'NEW' where that drawing alone is rounded."""
        if (self.steps[0] > 0) == (self.steps[1] > 0):
            return ""
        return "OLD" if self.steps[0] > 0 else "NEW"

    def tolerance(self, *, moved: bool, size: float | None = None) -> float:
        """How far apart places and lengths may be and still be equal, of a mechanism of that size where one is stated.

        Rounding counts only where it can have made a difference: in one drawing alone, or after a motion.
        """
        close = self.coincidence if size is None else min(self.coincidence, COMPARED_OF_SIZE * size)
        rounding = sum(self.steps) if self.rounded or moved else 0.0
        return close + rounding + COMPARED_FLOAT * self.greatest


def common_lengths(old: DrawingReport, new: DrawingReport) -> Lengths:
    """The unit that both drawings are compared in, and the tolerances in it."""
    before, after = (report.unit or LengthUnit("unitless", "assumed", None) for report in (old, new))
    scale, unit, note = 1.0, after.name, ""
    if before.metres and after.metres:
        scale = before.metres / after.metres
        if before.name != after.name:
            note = f"OLD is drawn in {before.name}, NEW in {after.name}: lengths of OLD are converted"
    elif before.metres or after.metres:
        bare = "OLD" if after.metres else "NEW"
        unit = after.name if after.metres else before.name
        note = f"{bare} names no unit: its figures are taken as {unit}, the unit of the other drawing"
    steps = _rounding(old) * scale, _rounding(new)
    return Lengths(
        unit=unit,
        scale=scale,
        note=note,
        coincidence=(old.tolerance or 0.0) * scale + (new.tolerance or 0.0),
        steps=steps,
        greatest=max(max(_coordinates(old), default=0.0) * scale, max(_coordinates(new), default=0.0)),
    )


def _coordinates(report: DrawingReport) -> list[float]:
    """The sizes of the coordinates of all pins."""
    places = [pin.at for mechanism in report.mechanisms for pin in mechanism.linkage.pins]
    return [abs(value) for place in places for value in (place.real, place.imag)]


def _rounding(report: DrawingReport) -> float:
    """The greatest error of coordinates rounded to COMPARED_DIGITS significant digits; 0 where they are not."""
    values = _coordinates(report)
    if not values or not all(_is_rounded(value) for value in values):
        return 0.0
    greatest = max(values)
    return 0.5 * 10.0 ** (math.floor(math.log10(greatest)) + 1 - COMPARED_DIGITS) if greatest else 0.0


def _is_rounded(value: float) -> bool:
    return math.isclose(value, float(f"{value:.{COMPARED_DIGITS}g}"), rel_tol=COMPARED_FLOAT, abs_tol=COMPARED_FLOAT)
