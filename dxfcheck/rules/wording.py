"""Figures and lists as findings write them."""

from __future__ import annotations

import math
from collections.abc import Sequence

from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.geometry import Point
from dxfcheck.tolerances.sheet import PLACE_DIGITS, PLACE_LEAST_DECIMALS, PLACE_MOST_DECIMALS, PLACES_NAMED

__all__ = ["length", "listed", "place", "plural"]


def length(value: float, unit: LengthUnit) -> str:
    """A length with its unit, to four digits; without a unit where the drawing has none."""
    return f"{value:.4g}" if unit.metres is None else f"{value:.4g} {unit.name}"


def place(at: Point) -> str:
    """Coordinates as a drafter types them: to the same decimals, in full, and 0 where only rounding noise is left."""
    larger = max(abs(at.real), abs(at.imag), 10.0**-PLACE_MOST_DECIMALS)
    before_point = math.floor(math.log10(larger)) + 1
    decimals = min(max(PLACE_DIGITS - before_point, PLACE_LEAST_DECIMALS), PLACE_MOST_DECIMALS)
    return f"({_typed(at.real, decimals)}, {_typed(at.imag, decimals)})"


def _typed(coordinate: float, decimals: int) -> str:
    """A coordinate to so many decimals, without noughts at its end."""
    text = f"{coordinate:.{decimals}f}".rstrip("0").rstrip(".")
    return "0" if text == "-0" else text


def plural(count: int, noun: str) -> str:
    """'1 line', '3 lines', '2 entities'."""
    if count == 1:
        return f"1 {noun}"
    return f"{count} {noun[:-1]}ies" if noun.endswith("y") else f"{count} {noun}s"


def listed(names: Sequence[str], most: int = PLACES_NAMED) -> str:
    """Names in a row, the first few of many."""
    return ", ".join(names[:most]) + (f" and {len(names) - most} more" if len(names) > most else "")
