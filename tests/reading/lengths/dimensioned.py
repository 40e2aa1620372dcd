"""Dimensions and sheets for the tests of stated lengths."""

from __future__ import annotations

from dxfcheck.drawing.primitives import Dimension, DimensionStyle, LengthUnit
from tests.sketches import Drawn

__all__ = ["INCH", "METRE", "UNITLESS", "dimensioned"]

INCH = LengthUnit("in", "header", 0.0254)
METRE = LengthUnit("m", "header", 1.0)
UNITLESS = LengthUnit("unitless", "assumed", None)


def dimensioned(
    text: str,
    *points: complex,
    measured: float | None = None,
    kind: str = "linear",
    direction: complex | None = None,
    style: DimensionStyle | None = None,
    underlined: bool = False,
    block: str = "",
    handle: str = "",
) -> Drawn:
    """A dimension with a hand-written text; measured between its first two points where nothing else is stated."""
    ends = points or (0j, 120 + 0j)
    figure = abs(ends[1] - ends[0]) if measured is None and len(ends) > 1 else measured
    chosen = style or DimensionStyle()
    return Drawn(
        "DIMENSION",
        lambda source: Dimension(source, text, figure, ends, kind, direction, chosen, underlined=underlined),
        "DIM",
        block=block,
        handle=handle,
    )
