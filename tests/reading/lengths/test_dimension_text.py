from __future__ import annotations

import math

import pytest

from dxfcheck.reading.lengths.dimension_text import is_not_to_scale, stated_figures


def values(text: str) -> list[float]:
    return [round(figure.value, 9) for figure in stated_figures(text)]


@pytest.mark.parametrize(
    "text",
    [
        "120",
        "(120)",
        "[120]",
        "120 [4.72]",
        "120 (4.72)",
        "120 TYP",
        "120 typ.",
        "REF 120",
        "120\nTYP",
        "120 ±0.1",
        "120 +0.2/-0.1",
        "120 +0.2 / -0.1",
        "120 0/-0.2",
        "120 + 0,1",
        "120 H7",
        "120h6",
        "L = 120",
        "l1=240/2",
        "= 120",
        "(100+20)",
        "120 c/c",
        "~120",
        "120 NTS",
        "□120",
    ],
)
def test_the_size_is_read_without_what_goes_with_it(text: str) -> None:
    assert values(text)[0] == 120


@pytest.mark.parametrize(
    ("text", "low", "high"),
    [
        ("120 ±0.8", 119.2, 120.8),
        ("120 ±0.1", 119.5, 120.5),
        ("120.0 +0.2/-0.1", 119.9, 120.2),
        ("120.0 0/-0.2", 119.8, 120.05),
        ("120.1 / 119.9", 119.85, 120.15),
        ("100-120", 99.5, 120.5),
        ("100...120", 99.5, 120.5),
        ("max 120", -math.inf, 120.5),
        ("120 MIN", 119.5, math.inf),
        ("ca. 120", 115, 125),
    ],
)
def test_tolerances_and_limits_widen_the_bounds(text: str, low: float, high: float) -> None:
    figure = stated_figures(text)[0]
    assert [figure.low, figure.high] == pytest.approx([low, high])


@pytest.mark.parametrize(
    ("text", "stated"),
    [
        ("2x60", [60, 120]),
        ("2X 60", [60, 120]),
        ("4 PL 60", [60, 240]),
        ("3 x 40 = 120", [120, 40]),
        ("3 x 40 (=120)", [120, 40]),
        ("60x40", [40, 60, 2400]),
        ("0.5x45°", [0.5, 45]),
        ("2x45°", [45, 2]),
        ("100-20", [80]),
        ("33.2/2", [16.6]),
    ],
)
def test_repeated_sizes_and_sums_may_mean_the_part_or_the_whole(text: str, stated: list[float]) -> None:
    assert values(text) == pytest.approx(stated)


@pytest.mark.parametrize(
    ("text", "meaning"),
    [("R25", "radius"), ("R 25 TYP", "radius"), ("Ø50", "diameter"), ("2x Ø50 H7", "diameter"), ("50 dia", "diameter")],
)
def test_a_prefix_says_radius_or_diameter(text: str, meaning: str) -> None:
    assert [figure.meaning for figure in stated_figures(text)] == [meaning]


@pytest.mark.parametrize(
    "text",
    ["", " ", "L", "X1", "see note 3", "HOLE 5", "DETAIL 2", "M8", "M8x1.25", "G1/2", "1/4-20 UNC", "120?", "120 kg",
     "d1/2", "A = B", "a=b=c=3", "9" * 400, "(" * 30 + "1" + ")" * 30, "120*", "10**9**9", "Ø"],
)  # fmt: skip
def test_what_is_not_understood_to_the_last_letter_states_nothing(text: str) -> None:
    assert stated_figures(text) == ()


@pytest.mark.parametrize(("text", "marked"), [("120 NTS", True), ("120 (not to scale)", True), ("120 UNITS", False)])
def test_a_text_may_say_that_it_is_not_to_scale(text: str, *, marked: bool) -> None:
    assert is_not_to_scale(text) is marked
