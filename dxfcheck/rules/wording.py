"""Figures and lists as findings write them."""

from __future__ import annotations

from collections.abc import Sequence

from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.geometry import Point
from dxfcheck.tolerances import PLACES_NAMED

__all__ = ["length", "listed", "place", "plural"]


def length(value: float, unit: LengthUnit) -> str:
    """A length with its unit, to four digits; without a unit where the drawing has none."""
    return f"{value:.4g}" if unit.metres is None else f"{value:.4g} {unit.name}"


def place(at: Point) -> str:
    """Coordinates as a drafter types them."""
    return f"({at.real:.6g}, {at.imag:.6g})"


def plural(count: int, noun: str) -> str:
    """'1 line', '3 lines', '2 entities'."""
    if count == 1:
        return f"1 {noun}"
    return f"{count} {noun[:-1]}ies" if noun.endswith("y") else f"{count} {noun}s"


def listed(names: Sequence[str], most: int = PLACES_NAMED) -> str:
    """Names in a row, the first few of many."""
    return ", ".join(names[:most]) + (f" and {len(names) - most} more" if len(names) > most else "")
