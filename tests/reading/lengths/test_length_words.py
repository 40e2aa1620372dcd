from __future__ import annotations

import pytest

from dxfcheck.reading.lengths.length_words import difference, place, scale_named, size
from dxfcheck.reading.lengths.mix_ups import Mismatch
from tests.reading.lengths.dimensioned import UNITLESS
from tests.sketches import MM


@pytest.mark.parametrize(
    ("stated", "drawn", "kind", "words"),
    [
        (125.0, 120.0, "linear", "5 mm (4.17 %) more"),
        (115.0, 120.0, "linear", "5 mm (4.17 %) less"),
        (35.0, 30.0, "angular", "5 degrees (16.7 %) more"),
        (500.0, 30.0, "linear", "470 mm more"),
        (5.0, 0.0, "linear", "5 mm more"),
    ],
)
def test_a_difference_says_how_much_and_which_way(stated: float, drawn: float, kind: str, words: str) -> None:
    assert difference(Mismatch("", stated, drawn, 0.05, kind, None, "", None), MM) == words


def test_without_a_unit_none_is_said() -> None:
    assert size(120.0, UNITLESS) == "120"


def test_a_place_is_told_apart_from_another_that_is_near() -> None:
    assert place(100003.1234567 - 2.5j, 4.0) == "(100003.123, -2.5)"
    assert place(0.0012345678 + 0j, 0.00004) == "(0.0012346, 0)"


def test_a_scale_is_named_as_on_a_title_block() -> None:
    assert [scale_named(factor) for factor in (2.0, 0.2, 2.5)] == ["drawn at 1:2", "drawn at 5:1", "drawn at 1:2.5"]
