from __future__ import annotations

import dataclasses

import pytest

from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.linkage import Drive, Linkage
from dxfcheck.reading.lengths.unit_doubts import doubt_units
from dxfcheck.reading.lengths.unit_signs import UnitSign
from dxfcheck.reading.reading import Observation
from tests.reading.lengths.dimensioned import INCH, METRE, UNITLESS
from tests.sketches import MM, linkage, sketch, tipper

SAYS_MM, SAYS_INCH = (UnitSign(unit, f"the note says {unit}", 1j, "7") for unit in ("mm", "in"))


def doubts(
    *signs: UnitSign, unit: LengthUnit = MM, metric: bool | None = None, drive: str = "", source: str = "note"
) -> list[Observation]:
    drawn = dataclasses.replace(sketch(*tipper(), unit=unit), metric=metric)
    only: Linkage = linkage(*tipper())
    if drive:
        stated = Drive(link=1, against=0, rate=1.0, kind="slide", source=source, stated=drive)  # type: ignore[arg-type]
        only = dataclasses.replace(only, drives=(stated,))
    return list(doubt_units(drawn, [only], signs))


def test_signs_that_agree_with_the_header_raise_no_doubt() -> None:
    assert doubts(SAYS_MM) == []
    assert doubts(SAYS_INCH, unit=INCH) == []
    assert doubts() == []


def test_inches_against_millimetres_are_named_with_their_factor() -> None:
    (only,) = doubts(SAYS_MM, unit=INCH)
    assert only.kind == "units-doubtful"
    assert (only.subject, only.at) == ("mm", 1j)
    assert only.amount == pytest.approx(25.4)
    assert only.detail.startswith("the header says in, but the note says mm (inches and millimetres mixed up")


def test_other_units_are_told_by_their_factor() -> None:
    (only,) = doubts(SAYS_MM, unit=METRE)
    assert "a factor of 1000" in only.detail
    assert "inches" not in only.detail


def test_signs_for_both_are_told() -> None:
    (only,) = doubts(SAYS_MM, SAYS_INCH)
    assert only.subject == "in"
    assert "other signs agree" in only.detail


def test_it_is_said_whose_unit_it_is() -> None:
    (only,) = doubts(SAYS_MM, unit=LengthUnit("in", "option", 0.0254))
    assert only.detail.startswith("the option says in")


def test_where_no_unit_is_stated_the_one_that_all_signs_name_is_offered() -> None:
    (only,) = doubts(SAYS_MM, unit=UNITLESS)
    assert (only.kind, only.subject) == ("units-missing", "mm")
    assert doubts(SAYS_MM, SAYS_INCH, unit=UNITLESS) == []
    assert doubts(SAYS_MM, unit=LengthUnit("unitless", "option", None)) == []


@pytest.mark.parametrize(
    ("unit", "metric", "drive", "doubtful"),
    [
        (MM, False, "v = 5 in/s", True),
        (INCH, True, "v = 50 mm/s", True),
        (MM, False, "", False),
        (MM, None, "v = 5 in/s", False),
        (MM, True, "v = 5 in/s", False),
        (INCH, True, "v = 5 in/s", False),
        (INCH, True, "ω = 5 rad/s", False),
    ],
)
def test_the_system_of_patterns_counts_only_with_the_unit_of_a_drive(
    unit: LengthUnit, metric: bool | None, drive: str, *, doubtful: bool  # noqa: FBT001
) -> None:  # fmt: skip
    assert bool(doubts(unit=unit, metric=metric, drive=drive)) is doubtful


def test_neither_counts_where_the_sheet_names_the_unit() -> None:
    assert doubts(SAYS_MM, metric=False, drive="v = 5 in/s") == []


@pytest.mark.parametrize(("name", "metres", "words"), [("m", 1.0, "longer than 100 m"), ("um", 1e-6, "shorter than 1")])
def test_a_size_that_no_linkage_has_is_told(name: str, metres: float, words: str) -> None:
    (only,) = doubts(unit=LengthUnit(name, "header", metres))
    assert words in only.detail
    assert "B-C" in only.detail
    assert only.subject == "mm"


@pytest.mark.parametrize("unit", [MM, INCH, LengthUnit("cm", "header", 0.01), LengthUnit("ft", "header", 0.3048)])
def test_plausible_sizes_raise_no_doubt(unit: LengthUnit) -> None:
    assert doubts(unit=unit) == []
