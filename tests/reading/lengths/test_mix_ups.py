from __future__ import annotations

import pytest

from dxfcheck.reading.lengths.mix_ups import Mismatch, factor_named, shared_factor


def mismatch(stated: float, drawn: float, half: float = 0.005, kind: str = "linear") -> Mismatch:
    return Mismatch("", stated, drawn, half, kind, None, "", None)


@pytest.mark.parametrize(
    ("stated", "drawn", "words"),
    [
        (4.72, 120.0, "25.4 times smaller: millimetres against inches"),
        (3048.0, 120.0, "25.4 times larger: millimetres against inches"),
        (1200.0, 120.0, "10 times larger"),
        (0.12, 120.0, "1000 times smaller: millimetres against metres"),
        (121.0, 120.0, ""),
        (240.0, 120.0, ""),
    ],
)
def test_a_mix_up_of_units_is_named(stated: float, drawn: float, words: str) -> None:
    named = factor_named(mismatch(stated, drawn, half=0.0005 if stated < 1 else 0.005))
    assert words in named
    assert bool(words) == bool(named)


def test_radius_and_diameter_may_be_mixed_up_on_round_things_only() -> None:
    assert "diameter against radius" in factor_named(mismatch(50.0, 25.0, kind="radius"))
    assert not factor_named(mismatch(50.0, 25.0))


def test_too_few_digits_name_no_mix_up() -> None:
    assert not factor_named(mismatch(5.0, 120.0, half=0.5))


@pytest.mark.parametrize(("factor", "drawn"), [(2.0, (120.0, 60.0)), (0.2, (120.0, 60.0)), (25.4, (10.0, 30.0))])
def test_a_factor_that_all_share_is_found(factor: float, drawn: tuple[float, float]) -> None:
    assert shared_factor([mismatch(factor * each, each) for each in drawn]) == pytest.approx(factor)


def test_one_alone_or_one_that_differs_shares_nothing() -> None:
    assert shared_factor([mismatch(240.0, 120.0)]) is None
    assert shared_factor([mismatch(240.0, 120.0), mismatch(61.0, 60.0)]) is None
    assert shared_factor([mismatch(240.0, 120.0), mismatch(60.0, 30.0, kind="angular")]) is None
