from __future__ import annotations

import pytest

from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.rules.wording import length, listed, place, plural
from tests.sketches import MM


def test_a_length_carries_its_unit_where_there_is_one() -> None:
    assert length(12.34567, MM) == "12.35 mm"
    assert length(0.000123456, LengthUnit("in", "header", 0.0254)) == "0.0001235 in"
    assert length(5.0, LengthUnit("unitless", "assumed", None)) == "5"


@pytest.mark.parametrize(
    ("at", "text"),
    [
        (12.5 - 3.25j, "(12.5, -3.25)"),
        (1.27e-14 - 3e-15j, "(0, 0)"),
        (200 + 1.27e-14j, "(200, 0)"),
        (-2e-4 + 300j, "(0, 300)"),
        (0.0512345678 + 0.2j, "(0.051235, 0.2)"),
        (12345.6785 + 7.0004j, "(12345.678, 7)"),
        (1e6 + 1234567.891234j, "(1000000, 1234567.891)"),
        (100 + 2000j, "(100, 2000)"),
    ],
)
def test_a_place_is_written_as_it_is_typed(at: complex, text: str) -> None:
    assert place(at) == text


@pytest.mark.parametrize(
    ("count", "noun", "text"),
    [(1, "line", "1 line"), (2, "line", "2 lines"), (1, "entity", "1 entity"), (3, "entity", "3 entities")],
)
def test_one_and_many(count: int, noun: str, text: str) -> None:
    assert plural(count, noun) == text


def test_a_long_list_is_cut_and_says_so() -> None:
    assert listed(["A", "B"], 3) == "A, B"
    assert listed(["A", "B", "C", "D", "E"], 3) == "A, B, C and 2 more"
    assert listed([]) == ""
