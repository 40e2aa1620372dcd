from __future__ import annotations

import math

import pytest

from dxfcheck.errors import OptionInvalid
from dxfcheck.options import settings_from


def test_stated_options_become_settings() -> None:
    settings = settings_from(
        drives=["A-B = 10 rad/s ccw"], frame=["A", " D "], units="mm", tolerance=0.01, expect_mobility=-1
    )
    assert settings.drives == ("A-B = 10 rad/s ccw",)
    assert settings.frame_pins == ("A", "D")
    assert settings.unit == "mm"
    assert settings.tolerance == 0.01
    assert settings.expected_mobility == -1


@pytest.mark.parametrize("tolerance", [0.0, -1.0, math.nan, math.inf])
def test_a_tolerance_is_a_length_above_zero(tolerance: float) -> None:
    with pytest.raises(OptionInvalid, match="above 0"):
        settings_from(tolerance=tolerance)


def test_an_unknown_unit_is_refused() -> None:
    with pytest.raises(OptionInvalid, match="cubit"):
        settings_from(units="cubit")


def test_a_drive_that_cannot_be_read_is_refused() -> None:
    with pytest.raises(OptionInvalid, match="fast"):
        settings_from(drives=["fast"])


def test_a_frame_pin_needs_a_name() -> None:
    with pytest.raises(OptionInvalid, match="without a name"):
        settings_from(frame=["A", ""])
