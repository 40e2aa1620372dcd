"""From what a user typed to settings, refused before any drawing is opened; the same for the command and for Python."""

from __future__ import annotations

import math
from collections.abc import Sequence

from dxfcheck.drawing.units import parse_unit
from dxfcheck.errors import OptionInvalid
from dxfcheck.reading.drives.drive_text import parse_drive
from dxfcheck.settings import Settings

__all__ = ["settings_from"]


def settings_from(
    *,
    drives: Sequence[str] = (),
    frame: Sequence[str] = (),
    units: str | None = None,
    tolerance: float | None = None,
    expect_mobility: int | None = None,
) -> Settings:
    """Settings made of stated options; OptionInvalid, in one line, for one that cannot be used.

    ``tolerance`` is in the drawing's unit, finite and above 0.
    """
    for drive in drives:
        parse_drive(drive)
    if tolerance is not None and not (math.isfinite(tolerance) and tolerance > 0):
        msg = f"the tolerance must be a length above 0, not {tolerance:g}"
        raise OptionInvalid(msg)
    if units is not None:
        parse_unit(units)
    pins = tuple(name.strip() for name in frame)
    if not all(pins):
        msg = "a frame pin without a name; write them as A,D"
        raise OptionInvalid(msg)
    return Settings(
        unit=units, tolerance=tolerance, drives=tuple(drives), frame_pins=pins, expected_mobility=expect_mobility
    )
