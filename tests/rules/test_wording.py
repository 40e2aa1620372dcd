from __future__ import annotations

import pytest

from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.rules.wording import length, listed, place, plural
from tests.sketches import MM


def test_a_length_carries_its_unit_where_there_is_one() -> None:
    assert length(12.34567, MM) == "12.35 mm"
    assert length(0.000123456, LengthUnit("in", "header", 0.0254)) == "0.0001235 in"
    assert length(5.0, LengthUnit("unitless", "assumed", None)) == "5"


def test_a_place_is_written_as_it_is_typed() -> None:
    assert place(12.5 - 3.25j) == "(12.5, -3.25)"


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
