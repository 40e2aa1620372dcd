"""Known ways in which a stated figure misses what is drawn by a factor: other units, other scales."""

from __future__ import annotations

from collections.abc import Sequence
from typing import NamedTuple

from dxfcheck.geometry import Point
from dxfcheck.tolerances.sheet import MIX_UP_DIGITS

__all__ = ["INCH_IN_MILLIMETRES", "Mismatch", "factor_between", "factor_named", "shared_factor"]

INCH_IN_MILLIMETRES = 25.4
_UNIT_FACTORS = {
    INCH_IN_MILLIMETRES: "millimetres against inches",
    304.8: "millimetres against feet",
    12.0: "inches against feet",
    10.0: "a decimal place, or millimetres against centimetres",
    100.0: "centimetres against metres",
    1000.0: "millimetres against metres",
}
_SCALES = (2.0, 2.5, 4.0, 5.0, 10.0, 20.0, 50.0, 100.0, 200.0, 500.0, 1000.0)
"""Reduction and enlargement scales (ISO 5455, from memory), and those in use besides."""


class Mismatch(NamedTuple):
    """A stated figure that disagrees with what is drawn; both in the drawing's unit (degrees for an angle).

    ``half`` is how far off a figure rounds to the one that is written; ``kind`` that of the dimension, 'note' for one.
    """

    text: str
    stated: float
    drawn: float
    half: float
    kind: str
    at: Point | None
    handle: str
    layer: str | None

    @property
    def is_angle(self) -> bool:
        """Whether the figures are degrees."""
        return self.kind == "angular"


def factor_between(stated: float, half: float, drawn: float, factor: float) -> bool:
    """Whether a written figure is ``factor`` times the drawn one, to its last digit; False where it has too few."""
    if not stated or half > MIX_UP_DIGITS * abs(stated):
        return False
    return abs(abs(stated) - factor * drawn) <= half * (1.0 + MIX_UP_DIGITS)


def factor_named(mismatch: Mismatch) -> str:
    """What mix-up of units would explain a mismatch, '' where none would."""
    if mismatch.is_angle or not mismatch.drawn:
        return ""
    known = {2.0: "diameter against radius"} if mismatch.kind in {"radius", "diameter"} else {}
    for factor, name in (known | _UNIT_FACTORS).items():
        for ratio, way in ((factor, "larger"), (1.0 / factor, "smaller")):
            if factor_between(mismatch.stated, mismatch.half, mismatch.drawn, ratio):
                return f"{factor:g} times {way}: {name}?"
    return ""


def shared_factor(mismatches: Sequence[Mismatch]) -> float | None:
    """The scale or unit factor by which all of two or more stated lengths exceed the drawn ones; None if none fits."""
    if len(mismatches) < 2 or any(each.is_angle for each in mismatches):
        return None
    for factor in (INCH_IN_MILLIMETRES, *_SCALES):
        for ratio in (factor, 1.0 / factor):
            if all(factor_between(each.stated, each.half, each.drawn, ratio) for each in mismatches):
                return ratio
    return None
