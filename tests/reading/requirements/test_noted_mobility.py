from __future__ import annotations

import pytest

from dxfcheck.reading.requirements.noted_mobility import find_mobility


@pytest.mark.parametrize(
    ("line", "figure"),
    [
        ("M = 1", 1),
        ("M=0", 0),
        ("DOF = 2", 2),
        ("mobility 1", 1),
        ("tray tipper, mobility: 1", 1),
        ("Laufgrad F = 1", 1),
        ("Freiheitsgrad F=-1", -1),
        ("degrees of freedom: 2", 2),
    ],
)
def test_an_expected_mobility_is_found_by_its_word_or_letter(line: str, figure: int) -> None:
    found = find_mobility(line)
    assert found is not None
    assert (found.figure, found.labelled) == (figure, True)


def test_a_lone_f_may_be_a_force() -> None:
    found = find_mobility("F = 1")
    assert found is not None
    assert not found.labelled


@pytest.mark.parametrize(
    "line", ["M 1:1", "M = 1:2", "F = 120", "F = 1 N", "F = 1 kN", "M = 5 Nm", "M1", "mobility", "M = 1.5"]
)
def test_scales_forces_and_moments_are_no_mobility(line: str) -> None:
    assert find_mobility(line) is None


def test_a_mobility_that_is_no_whole_number_is_told() -> None:
    found = find_mobility("mobility = one")
    assert found is not None
    assert (found.figure, found.written) == (None, "one")
