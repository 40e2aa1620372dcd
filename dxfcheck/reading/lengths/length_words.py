"""A stated figure against a drawn one, in words."""

from __future__ import annotations

import math

from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.geometry import Point
from dxfcheck.reading.lengths.mix_ups import Mismatch, factor_named
from dxfcheck.tolerances.sheet import PLACE_LEAST_DECIMALS

__all__ = ["difference", "place", "scale_named", "size"]


def size(value: float, unit: LengthUnit, *, is_angle: bool = False) -> str:
    """A figure with its unit, to six digits."""
    if is_angle:
        return f"{value:.6g} degrees"
    return f"{value:.6g}" if unit.metres is None else f"{value:.6g} {unit.name}"


def place(at: Point, apart: float) -> str:
    """Coordinates with as many decimals as tell places so far apart from one another, but at least three."""
    wanted = 2 - math.floor(math.log10(apart)) if apart > 0.0 else 0
    decimals = max(PLACE_LEAST_DECIMALS, wanted)
    return f"({round(at.real, decimals):.15g}, {round(at.imag, decimals):.15g})"


def difference(mismatch: Mismatch, unit: LengthUnit) -> str:
    """By how much what is stated exceeds what is drawn, and which mix-up would explain it."""
    off = mismatch.stated - mismatch.drawn
    way = "more" if off > 0.0 else "less"
    explained = factor_named(mismatch)
    words = f"{size(abs(off), unit, is_angle=mismatch.is_angle)}{_part(mismatch)} {way}"
    return f"{words}; {explained}" if explained else words


def _part(mismatch: Mismatch) -> str:
    """The difference as a part of what is drawn; nothing where that says little."""
    if not mismatch.drawn:
        return ""
    part = abs(mismatch.stated / mismatch.drawn - 1.0)
    return f" ({100.0 * part:.3g} %)" if part <= 1.0 else ""


def scale_named(factor: float) -> str:
    """How a drawing is drawn whose stated lengths are so many times the drawn ones."""
    return f"drawn at 1:{factor:g}" if factor > 1.0 else f"drawn at {1.0 / factor:g}:1"
