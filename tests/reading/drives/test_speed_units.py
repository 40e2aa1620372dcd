from __future__ import annotations

import math

import pytest

from dxfcheck.reading.drives.speed_units import may_be_thousands, number_of, plain_text, spoken_name, unit_of


@pytest.mark.parametrize(
    ("written", "kind", "factor"),
    [("rad/s", "turn", 1.0), ("RPM", "turn", math.tau / 60), ("mm/s", "slide", 1e-3), ("m/min", "slide", 1 / 60)],
)
def test_a_unit_brings_figures_to_radians_or_metres_a_second(written: str, kind: str, factor: float) -> None:
    unit = unit_of(written)
    assert unit.kind == kind
    assert unit.factor == pytest.approx(factor)


def test_a_speed_of_rotation_counts_turns_a_second() -> None:
    assert unit_of("1/s").factor == 1.0
    assert unit_of("1/s", revolutions=True).factor == pytest.approx(math.tau)
    assert unit_of("rad/s", revolutions=True).factor == 1.0


def test_what_is_no_unit_is_refused() -> None:
    with pytest.raises(KeyError):
        unit_of("furlong/s")


@pytest.mark.parametrize(("written", "number"), [("1 200,5", 1200.5), ("- 4", -4.0), (".5", 0.5), ("1e3", 1000.0)])
def test_numbers_are_written_in_many_ways(written: str, number: float) -> None:
    assert number_of(written) == number


def test_a_comma_before_three_digits_can_be_read_in_two_ways() -> None:
    assert may_be_thousands("1,200")
    assert may_be_thousands("-12,345")
    assert not may_be_thousands("1,20")
    assert not may_be_thousands("0,200")


def test_raised_digits_and_dashes_become_plain() -> None:
    assert plain_text("s\u207b\u00b9 \u2212 A\u2013B \u2082") == "s-1 - A-B 2"


def test_a_name_has_single_spaces_and_small_words() -> None:
    assert spoken_name("Block  at  C") == "block at C"
    assert spoken_name(None) is None
    assert spoken_name("") is None
