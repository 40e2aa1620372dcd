from __future__ import annotations

import dataclasses

import pytest

from dxfcheck.comparison.lengths import common_lengths
from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.inspection import DrawingReport
from tests.reports.samples import tipper

MILLIMETRES = LengthUnit("mm", "header", 1e-3)
INCHES = LengthUnit("in", "header", 0.0254)
NONE = LengthUnit("unitless", "assumed", None)


def in_unit(unit: LengthUnit) -> DrawingReport:
    return dataclasses.replace(tipper(), unit=unit)


@pytest.mark.parametrize(
    ("old", "new", "unit", "scale", "says"),
    [
        (MILLIMETRES, MILLIMETRES, "mm", 1.0, ""),
        (MILLIMETRES, INCHES, "in", 1 / 25.4, "lengths of OLD are converted"),
        (MILLIMETRES, NONE, "mm", 1.0, "NEW names no unit"),
        (NONE, INCHES, "in", 1.0, "OLD names no unit"),
        (NONE, NONE, "unitless", 1.0, ""),
    ],
)
def test_lengths_are_brought_to_one_unit(old: LengthUnit, new: LengthUnit, unit: str, scale: float, says: str) -> None:
    lengths = common_lengths(in_unit(old), in_unit(new))
    assert lengths.unit == unit
    assert lengths.scale == pytest.approx(scale)
    assert says in lengths.note
    assert bool(says) == bool(lengths.note)


def test_a_small_mechanism_on_a_large_sheet_has_a_tolerance_of_its_own_size() -> None:
    lengths = dataclasses.replace(common_lengths(tipper(), tipper()), coincidence=1.0, steps=(0.0, 0.0))
    assert lengths.tolerance(moved=False) == pytest.approx(1.0)
    assert lengths.tolerance(moved=False, size=100.0) == pytest.approx(2e-3)


def test_rounding_counts_in_one_drawing_alone_or_after_a_motion() -> None:
    lengths = dataclasses.replace(common_lengths(tipper(), tipper()), coincidence=0.0, steps=(0.5, 0.5), greatest=0.0)
    assert lengths.tolerance(moved=False) == 0.0
    assert lengths.tolerance(moved=True) == 1.0
    alone = dataclasses.replace(lengths, steps=(0.0, 0.5))
    assert (alone.rounded, alone.tolerance(moved=False)) == ("NEW", 0.5)
