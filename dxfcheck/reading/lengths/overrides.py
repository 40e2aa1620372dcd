"""Dimensions whose text was written by hand, against what they measure."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from typing import NamedTuple

from dxfcheck.drawing.primitives import Dimension, LengthUnit, Sketch
from dxfcheck.drawing.units import LENGTH_UNITS
from dxfcheck.reading.lengths.dimension_text import is_not_to_scale, stated_figures
from dxfcheck.reading.lengths.figures import Figure
from dxfcheck.reading.lengths.mix_ups import Mismatch
from dxfcheck.tolerances.sheet import STATED_NOISE

__all__ = ["Override", "agrees", "judge_overrides", "unit_factor"]

MEASURED = "<>"


class Override(NamedTuple):
    """A hand-written text with a figure, and how it stands to what is measured.

    ``mismatch`` is None where it agrees. ``unit`` is the unit it would agree in, without being converted, where it
    names one other than the drawing's. ``marked`` is True where it is marked as not to scale.
    """

    dimension: Dimension
    mismatch: Mismatch | None
    unit: str | None
    marked: bool


def judge_overrides(sketch: Sketch, dimensions: Iterable[Dimension]) -> list[Override]:
    """The dimensions whose text states a figure that can be held against the measured one."""
    found = (_judge(sketch, dimension) for dimension in dimensions if dimension.text)
    return [each for each in found if each is not None]


def _judge(sketch: Sketch, dimension: Dimension) -> Override | None:
    measured = dimension.measured
    if measured is None or MEASURED in dimension.text:
        return None
    figures = [figure for figure in stated_figures(dimension.text) if _fits(figure, dimension)]
    if not figures:
        return None
    marked = dimension.underlined or is_not_to_scale(dimension.text)
    drawn = [_in_terms_of(figure, dimension, measured) for figure in figures]
    pairs = list(zip(figures, drawn, strict=True))
    if any(_agrees_as_shown(figure, size, dimension, sketch.unit) for figure, size in pairs):
        return Override(dimension, None, None, marked)
    for figure, size in pairs:
        if figure.unit is not None and agrees(figure._replace(unit=None), size, sketch.unit):
            return Override(dimension, None, figure.unit, marked)
    return Override(dimension, _mismatch(sketch, dimension, *pairs[0]), None, marked)


def _fits(figure: Figure, dimension: Dimension) -> bool:
    """Whether the figure is of the dimension's own sort: an angle on an angle, a length on a length."""
    if dimension.kind == "angular":
        return figure.meaning == "angle" or (figure.meaning == "length" and figure.unit is None)
    return figure.meaning != "angle"


def _in_terms_of(figure: Figure, dimension: Dimension, measured: float) -> float:
    """What is measured, as a radius or diameter where the figure is one and the dimension the other."""
    if dimension.kind == "diameter" and figure.meaning == "radius":
        return measured / 2.0
    if dimension.kind == "radius" and figure.meaning == "diameter":
        return measured * 2.0
    return measured


def unit_factor(figure: Figure, unit: LengthUnit) -> float:
    """From the unit a figure names to the drawing's; 1 where either is not known."""
    metres = LENGTH_UNITS[figure.unit] if figure.unit is not None else None
    return metres / unit.metres if metres is not None and unit.metres is not None else 1.0


def agrees(figure: Figure, size: float, unit: LengthUnit, slack: float = 0.0) -> bool:
    """Whether what is drawn rounds to what is written, or lies within its limits; ``slack`` in the drawing's unit."""
    factor = unit_factor(figure, unit)
    noise = STATED_NOISE * size + slack
    low, high = figure.low * factor - noise, figure.high * factor + noise
    return low <= size <= high or (figure.value < 0.0 and low <= -size <= high)


def _agrees_as_shown(figure: Figure, size: float, dimension: Dimension, unit: LengthUnit) -> bool:
    """Whether it agrees with what is measured, or with what the style would show of it."""
    if agrees(figure, size, unit):
        return True
    style = dimension.style
    shown = size
    if style.rounding and dimension.kind != "angular":
        shown = round(size / style.rounding) * style.rounding
    if style.decimals is not None and dimension.kind != "angular":
        shown = round(shown, min(max(style.decimals, 0), 15))
    return abs(abs(figure.value * unit_factor(figure, unit)) - shown) <= STATED_NOISE * max(size, shown)


def _mismatch(sketch: Sketch, dimension: Dimension, figure: Figure, size: float) -> Mismatch:
    stated = abs(figure.value) * unit_factor(figure, sketch.unit)
    return Mismatch(
        text=" ".join(dimension.text.split()),
        stated=stated,
        drawn=size,
        half=figure.half * unit_factor(figure, sketch.unit),
        kind=dimension.kind,
        at=middle_of(dimension.points),
        handle=sketch.handles(dimension),
        layer=dimension.source.layer,
    )


def middle_of(points: Sequence[complex]) -> complex | None:
    """The mean of the points; None where there are none."""
    return sum(points) / len(points) if points else None
