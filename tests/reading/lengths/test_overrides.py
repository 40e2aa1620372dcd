from __future__ import annotations

import pytest

from dxfcheck.drawing.primitives import Dimension, DimensionStyle, LengthUnit
from dxfcheck.reading.lengths.overrides import Override, judge_overrides
from tests.reading.lengths.dimensioned import INCH, METRE, UNITLESS, dimensioned
from tests.sketches import MM, Drawn, sketch


def judged(*things: Drawn, unit: LengthUnit = MM) -> list[Override]:
    drawn = sketch(*things, unit=unit)
    return judge_overrides(drawn, [each for each in drawn.primitives if isinstance(each, Dimension)])


def wrong(*things: Drawn, unit: LengthUnit = MM) -> bool:
    """Whether the one text disagrees with what is measured."""
    (only,) = judged(*things, unit=unit)
    return only.mismatch is not None


@pytest.mark.parametrize(
    "text",
    ["120", "120.0", "120 ±0.1", "4.72 in", "4.724 in", '4.72"', "12 cm", "0.12 m", "2x60", "3 x 40 = 120", "d=240/2",
     "R120", "Ø120", "~100", "119 - 121", "max 130", "min 110"],
)  # fmt: skip
def test_a_text_that_rounds_to_what_is_measured_agrees(text: str) -> None:
    assert not wrong(dimensioned(text))


@pytest.mark.parametrize("text", ["121", "120.1", "120.4 ±0.1", "4.8 in", "13 cm", "2x65", "3 x 40 = 130", "max 119",
                                  "min 121", "119...119.4", "4.72"])  # fmt: skip
def test_a_text_that_does_not_disagrees(text: str) -> None:
    assert wrong(dimensioned(text))


@pytest.mark.parametrize("text", ["", "<>", "2x <>", "L", "see note", "HOLE 120", "M120", "45°"])
def test_without_a_length_there_is_nothing_to_judge(text: str) -> None:
    assert judged(dimensioned(text)) == []


def test_nor_where_nothing_is_measured() -> None:
    assert judged(dimensioned("120", 0j)) == []


def test_half_a_unit_of_the_last_digit_is_the_bound() -> None:
    assert not wrong(dimensioned("120", measured=120.5))
    assert wrong(dimensioned("120", measured=120.51))
    assert not wrong(dimensioned("120.0", measured=119.95))
    assert wrong(dimensioned("120.0", measured=119.94))


def test_the_rounding_of_the_style_counts() -> None:
    coarse = DimensionStyle(rounding=5.0)
    assert not wrong(dimensioned("120", measured=122.0, style=coarse))
    assert wrong(dimensioned("121", measured=122.0, style=coarse))
    assert not wrong(dimensioned("120.0", measured=120.4, style=DimensionStyle(decimals=0)))


@pytest.mark.parametrize(
    ("kind", "text", "disagrees"),
    [
        ("radius", "R25", False),
        ("radius", "Ø50", False),
        ("radius", "50", True),
        ("radius", "R50", True),
        ("diameter", "R12.5", False),
        ("diameter", "Ø25", False),
        ("diameter", "R25", True),
    ],
)
def test_radius_and_diameter_are_told_apart(kind: str, text: str, *, disagrees: bool) -> None:
    assert wrong(dimensioned(text, 0j, 25 + 0j, kind=kind)) is disagrees


@pytest.mark.parametrize(("text", "disagrees"), [("30°", False), ("30", False), ("30°00'", False), ("29°30'", True)])
def test_angles_are_held_against_degrees(text: str, *, disagrees: bool) -> None:
    assert wrong(dimensioned(text, measured=30.0, kind="angular")) is disagrees


def test_an_ordinate_may_be_written_with_its_sign() -> None:
    assert not wrong(dimensioned("-20", 3j, measured=20.0, kind="ordinate"))


def test_a_unit_that_fits_only_if_the_drawing_is_in_it_is_told() -> None:
    (only,) = judged(dimensioned("120 in"))
    assert (only.mismatch, only.unit) == (None, "in")
    (metric,) = judged(dimensioned("120 mm"), unit=INCH)
    assert (metric.mismatch, metric.unit) == (None, "mm")


def test_a_unit_is_converted_to_the_drawings() -> None:
    assert not wrong(dimensioned("120 mm", measured=4.724), unit=INCH)
    assert not wrong(dimensioned("120 mm", measured=0.12), unit=METRE)
    assert not wrong(dimensioned("5'-3\"", measured=63.0), unit=INCH)
    assert not wrong(dimensioned("120 mm"), unit=UNITLESS)


@pytest.mark.parametrize(("text", "underlined"), [("130", True), ("130 NTS", False)])
def test_what_is_marked_as_not_to_scale_is_told(text: str, *, underlined: bool) -> None:
    (only,) = judged(dimensioned(text, underlined=underlined))
    assert only.marked
