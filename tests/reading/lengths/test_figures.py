from __future__ import annotations

import pytest

from dxfcheck.reading.lengths.figures import plain_text, read_figure, unit_named


@pytest.mark.parametrize(
    ("written", "value", "half", "unit"),
    [
        ("120", 120, 0.5, None),
        ("120.0", 120, 0.05, None),
        ("120,5", 120.5, 0.05, None),
        (".5", 0.5, 0.05, None),
        ("-20", -20, 0.5, None),
        ("12 000", 12000, 0.5, None),
        ("1.234,56", 1234.56, 0.005, None),
        ("1,234.5", 1234.5, 0.05, None),
        ("120 mm", 120, 0.5, "mm"),
        ("120mm", 120, 0.5, "mm"),
        ("4.72 in", 4.72, 0.005, "in"),
        ('4.72"', 4.72, 0.005, "in"),
        ("12 cm", 12, 0.5, "cm"),
        ("0.12 m", 0.12, 0.005, "m"),
        ("3 1/2", 3.5, 1 / 32, None),
        ('3-1/2"', 3.5, 1 / 32, "in"),
        ("5/64", 5 / 64, 1 / 128, None),
        ("5'-3 1/2\"", 63.5, 1 / 32, "in"),
        ("5' 3\"", 63, 0.5, "in"),
        ("5 ft", 5, 0.5, "ft"),
    ],
)
def test_a_length_is_read_with_its_unit_and_rounding(written: str, value: float, half: float, unit: str | None) -> None:
    figure = read_figure(written)[0]
    assert (figure.unit, figure.meaning) == (unit, "length")
    assert figure.value == pytest.approx(value)
    assert figure.half == pytest.approx(half)


@pytest.mark.parametrize(
    ("written", "degrees", "half"),
    [
        ("45°", 45, 0.5),
        ("45.5°", 45.5, 0.05),
        ("45°30'", 45.5, 0.5 / 60),
        ("45° 30' 36\"", 45.51, 0.5 / 3600),
        ("45d30'", 45.5, 0.5 / 60),
        ("45 deg", 45, 0.5),
    ],
)
def test_an_angle_is_read_in_degrees_minutes_and_seconds(written: str, degrees: float, half: float) -> None:
    (figure,) = read_figure(written)
    assert figure.meaning == "angle"
    assert figure.value == pytest.approx(degrees)
    assert figure.half == pytest.approx(half)


@pytest.mark.parametrize(("written", "values"), [("1,200", {1.2, 1200.0}), ("1'200", {212.0, 1200.0})])
def test_what_can_be_read_in_two_ways_is_read_in_both(written: str, values: set[float]) -> None:
    assert {figure.value for figure in read_figure(written)} == values


@pytest.mark.parametrize("written", ["", "L", "M8", "5 holes", "120 kg", "1/0", "12:5", "."])
def test_what_is_no_figure_is_not_read(written: str) -> None:
    assert read_figure(written) == ()


@pytest.mark.parametrize(
    ("written", "plain"),
    [
        ("3½", "3 1/2"),
        ("5\u2032 3\u2033", "5' 3\""),
        ("⌀50", "Ø50"),
        ("2\u00d760", "2x60"),
        ("a \n b", "a b"),
        ("\u22125", "-5"),
    ],
)
def test_one_sign_stands_for_what_is_written_in_several_ways(written: str, plain: str) -> None:
    assert plain_text(written) == plain


@pytest.mark.parametrize(("word", "unit"), [("Inches", "in"), ('"', "in"), ("MM", "mm"), ("kg", None), (None, None)])
def test_units_are_known_by_their_words_and_marks(word: str | None, unit: str | None) -> None:
    assert unit_named(word) == unit
