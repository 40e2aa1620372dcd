from __future__ import annotations

import cmath

import numpy as np
import pytest

from dxfcheck.reading.lines.typed import rounding_of, typed_step

PLACES = [300 * cmath.rect(1.0, 0.1 + number) for number in range(6)]


def rounded(decimals: int) -> np.ndarray[tuple[int], np.dtype[np.complex128]]:
    return np.array([complex(round(at.real, decimals), round(at.imag, decimals)) for at in PLACES])


@pytest.mark.parametrize("decimals", [1, 2, 3, 4, 5, 6, 7, 8])
def test_coordinates_may_be_off_by_half_of_their_last_decimal(decimals: int) -> None:
    assert rounding_of(rounded(decimals)) == pytest.approx(0.5 * 10.0**-decimals)


def test_decimals_that_nobody_types_widen_no_tolerance() -> None:
    assert typed_step(rounded(3)) == pytest.approx(1e-3)
    assert typed_step(rounded(6)) == 0.0


@pytest.mark.parametrize("places", [PLACES, [3 + 4j, 120 + 0j], []])
def test_full_precision_whole_numbers_and_nothing_are_not_rounded(places: list[complex]) -> None:
    points = np.array(places, dtype=np.complex128)
    assert (rounding_of(points), typed_step(points)) == (0.0, 0.0)
