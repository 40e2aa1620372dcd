"""Length units: what the header's code, and the option, call them.

The codes are those of the header variable $INSUNITS and the sizes the units' definitions (Autodesk, DXF Reference,
HEADER section, from memory; inch and yard: international yard and pound agreement of 1959; US survey foot: 1200/3937 m;
astronomical unit: IAU 2012 resolution B2; parsec: IAU 2015 resolution B2).
"""

from __future__ import annotations

import math
from typing import Any

from dxfcheck.drawing.cleaning import clean
from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.errors import OptionInvalid

__all__ = ["LENGTH_UNITS", "header_metric", "header_unit", "parse_unit"]

_INCH = 0.0254
_SURVEY_FOOT = 1200.0 / 3937.0
_ASTRONOMICAL = 149_597_870_700.0

_CODES: tuple[tuple[int, str, float], ...] = (
    (1, "in", _INCH),
    (2, "ft", 12 * _INCH),
    (3, "mi", 63_360 * _INCH),
    (4, "mm", 1e-3),
    (5, "cm", 1e-2),
    (6, "m", 1.0),
    (7, "km", 1e3),
    (8, "uin", 1e-6 * _INCH),
    (9, "mil", 1e-3 * _INCH),
    (10, "yd", 36 * _INCH),
    (11, "angstrom", 1e-10),
    (12, "nm", 1e-9),
    (13, "um", 1e-6),
    (14, "dm", 1e-1),
    (15, "dam", 1e1),
    (16, "hm", 1e2),
    (17, "Gm", 1e9),
    (18, "au", _ASTRONOMICAL),
    (19, "ly", 9_460_730_472_580_800.0),
    (20, "pc", _ASTRONOMICAL * 648_000.0 / math.pi),
    (21, "ft-us", _SURVEY_FOOT),
    (22, "in-us", _SURVEY_FOOT / 12),
    (23, "yd-us", 3 * _SURVEY_FOOT),
    (24, "mi-us", 5280 * _SURVEY_FOOT),
)

LENGTH_UNITS: dict[str, float | None] = {name: metres for _, name, metres in _CODES} | {"unitless": None}
"""Every unit name an option may state, with its size in metres."""

_ALIASES = {
    "inch": "in",
    "inches": "in",
    '"': "in",
    "foot": "ft",
    "feet": "ft",
    "'": "ft",
    "mile": "mi",
    "yard": "yd",
    "microinch": "uin",
    "thou": "mil",
    "micron": "um",
    "\N{MICRO SIGN}m": "um",
    "\N{GREEK SMALL LETTER MU}m": "um",
    "millimetre": "mm",
    "millimeter": "mm",
    "centimetre": "cm",
    "centimeter": "cm",
    "metre": "m",
    "meter": "m",
    "none": "unitless",
}
_BY_CODE = {code: (name, metres) for code, name, metres in _CODES}
_BY_FOLDED_NAME = {name.lower(): name for name in LENGTH_UNITS} | _ALIASES
_UNITLESS = LengthUnit("unitless", "assumed", None)


def parse_unit(name: str) -> LengthUnit:
    """The unit an option names, case ignored except between 'mm' and the like; OptionInvalid where it is unknown."""
    stated = name.strip()
    known = stated if stated in LENGTH_UNITS else _BY_FOLDED_NAME.get(stated.lower())
    if known is None:
        msg = f"length unit {clean(name)!r} is not known; use one of {', '.join(sorted(LENGTH_UNITS, key=str.lower))}"
        raise OptionInvalid(msg)
    return LengthUnit(known, "option", LENGTH_UNITS[known])


def header_unit(code: Any) -> LengthUnit:  # noqa: ANN401 - a damaged header may hold anything
    """The unit of a $INSUNITS code; 'unitless', assumed, for 0, None, or a code that is not one of 1 to 24."""
    if not isinstance(code, int | float) or code not in _BY_CODE:
        return _UNITLESS
    name, metres = _BY_CODE[int(code)]
    return LengthUnit(name, "header", metres)


def header_metric(code: Any) -> bool | None:  # noqa: ANN401 - a damaged header may hold anything
    """What a $MEASUREMENT code says: True for metric (1), False for inches (0), None for anything else."""
    return {0: False, 1: True}.get(code) if isinstance(code, int) else None
