"""Figures as people write them: decimals with point or comma, thousands, fractions, feet and inches, degrees."""

from __future__ import annotations

import re
import unicodedata
from collections.abc import Iterator
from typing import Literal, NamedTuple

from dxfcheck.tolerances.sheet import FRACTION_STEP

__all__ = ["FRACTION", "NUMBER", "UNIT", "Figure", "Meaning", "plain_text", "read_figure", "read_numbers", "unit_named"]

Meaning = Literal["length", "radius", "diameter", "angle"]

NUMBER = r"(?:\d{1,3}(?:[ ']\d{3})+(?![\d'])(?:[.,]\d+)?|\d+(?:[.,]\d+)*|[.,]\d+)"
FRACTION = r"(?:\d+[ -]+)?\d+/\d+"
_UNITS = {
    "mm": "mm",
    "millimetre": "mm",
    "millimetres": "mm",
    "millimeter": "mm",
    "millimeters": "mm",
    "cm": "cm",
    "dm": "dm",
    "m": "m",
    "metre": "m",
    "metres": "m",
    "meter": "m",
    "meters": "m",
    "in": "in",
    "in.": "in",
    "inch": "in",
    "inches": "in",
    "zoll": "in",
    '"': "in",
    "ft": "ft",
    "ft.": "ft",
    "feet": "ft",
    "foot": "ft",
    "'": "ft",
}
UNIT = "|".join(sorted(map(re.escape, _UNITS), key=len, reverse=True))
_SIGNS = str.maketrans(
    {
        "\N{DIAMETER SIGN}": "Ø",
        "\N{EMPTY SET}": "Ø",
        "ø": "Ø",
        "φ": "Ø",
        "Φ": "Ø",
        "ϕ": "Ø",
        "\N{MULTIPLICATION SIGN}": "x",
        "\N{MULTIPLICATION X}": "x",
        "\N{ALMOST EQUAL TO}": "~",
        "\N{MINUS SIGN}": "-",
        "\N{EN DASH}": "-",
        "\N{EM DASH}": "-",
        "\N{PRIME}": "'",
        "\N{RIGHT SINGLE QUOTATION MARK}": "'",
        "\N{DOUBLE PRIME}": '"',
        "\N{RIGHT DOUBLE QUOTATION MARK}": '"',
        "\N{MASCULINE ORDINAL INDICATOR}": "°",
        "\N{RING ABOVE}": "°",
    }
)
_VULGAR = re.compile("[\N{VULGAR FRACTION ONE QUARTER}-\N{VULGAR FRACTION THREE QUARTERS}\u2150-\u215e]")
_BLANKS = re.compile(r"\s+")
_FRACTION = re.compile(r"(?:(\d+)[ -]+)?(\d+)/(\d+)")
_FEET = re.compile(
    rf"({NUMBER})\s*(?:'|ft\b\.?|feet\b|foot\b)[\s-]*(?:({FRACTION}|{NUMBER})\s*(?:\"|in\b\.?|inch(?:es)?\b)?)?"
)
_LENGTH = re.compile(rf"([+-]?)\s*({FRACTION}|{NUMBER})\s*({UNIT})?(?!\w)", re.IGNORECASE)
_ANGLE = re.compile(
    rf"([+-]?)\s*({NUMBER})\s*(?:°|degrees\b|deg\b\.?|d(?![a-z]))\s*(?:({NUMBER})\s*'\s*(?:({NUMBER})\s*\")?)?",
    re.IGNORECASE,
)
_GROUPS = re.compile(r"\d{1,3}(?:[.,]\d{3})+")
INCHES_IN_FOOT = 12.0


class Figure(NamedTuple):
    """One way to read a written figure: ``value``, and the bounds between which it rounds to what is written.

    ``unit`` is 'mm', 'in' ... where one is written, None else; an angle is in degrees.
    """

    value: float
    low: float
    high: float
    unit: str | None = None
    meaning: Meaning = "length"

    @property
    def half(self) -> float:
        """How far off a figure may be and still round to this one."""
        return min(self.value - self.low, self.high - self.value)


def plain_text(text: str) -> str:
    """The text with single blanks, and with one sign for what is written in several ways."""
    spaced = _VULGAR.sub(lambda match: f" {match[0]}", text.translate(_SIGNS))
    plain = unicodedata.normalize("NFKC", spaced).replace("\N{FRACTION SLASH}", "/").replace("''", '"')
    return _BLANKS.sub(" ", plain).strip()


def unit_named(word: str | None) -> str | None:
    """The unit that a word or mark stands for, None where it stands for none."""
    return _UNITS.get(word.lower().strip()) if word else None


def read_numbers(text: str) -> Iterator[tuple[float, float]]:
    """All values that a number or fraction may have, each with half a unit of its last digit.

    '1,200' is 1200 or 1.2, as no one can tell.
    """
    fraction = _FRACTION.fullmatch(text)
    if fraction is not None:
        whole, over, under = fraction.groups()
        if int(under):
            yield float(whole or 0) + int(over) / int(under), min(1 / int(under), FRACTION_STEP) / 2
        return
    digits = text.replace(" ", "").replace("'", "")
    marks = [mark for mark in digits if mark in ".,"]
    if len(marks) > 1 and len(set(marks)) > 1:  # both are used: the last is the decimal one
        whole, _, rest = digits.rpartition(marks[-1])
        yield float(re.sub("[.,]", "", whole) + "." + rest), _half(rest)
        return
    if len(marks) <= 1:
        _, _, rest = digits.replace(",", ".").partition(".")
        yield float(digits.replace(",", ".")), _half(rest)
    if marks and _GROUPS.fullmatch(digits):
        yield float(re.sub("[.,]", "", digits)), 0.5


def _half(decimals: str) -> float:
    return 0.5 * 10.0 ** -len(decimals)


def read_figure(text: str) -> tuple[Figure, ...]:
    """All readings of a single figure with or without a unit; empty where it is none."""
    angle = _ANGLE.fullmatch(text)
    if angle is not None:
        return tuple(_angle(*angle.groups()))
    feet = _FEET.fullmatch(text)
    if feet is not None:
        found = tuple(_feet(feet[1], feet[2]))
        # 1'200 is how a thousand is written in Switzerland.
        return (*found, *_lengths("", text, None)) if re.fullmatch(NUMBER, text) else found
    length = _LENGTH.fullmatch(text)
    return tuple(_lengths(*length.groups())) if length is not None else ()


def _lengths(sign: str, number: str, unit: str | None) -> Iterator[Figure]:
    for value, half in read_numbers(number):
        signed = -value if sign == "-" else value
        yield Figure(signed, signed - half, signed + half, unit_named(unit))


def _feet(feet: str, inches: str | None) -> Iterator[Figure]:
    for whole, half in read_numbers(feet):
        if inches is None:
            yield Figure(whole, whole - half, whole + half, "ft")
            continue
        for rest, half_inch in read_numbers(inches):
            total = whole * INCHES_IN_FOOT + rest
            yield Figure(total, total - half_inch, total + half_inch, "in")


def _angle(sign: str, degrees: str, minutes: str | None, seconds: str | None) -> Iterator[Figure]:
    value, half = next(read_numbers(degrees))
    for part, size in ((minutes, 60.0), (seconds, 3600.0)):
        if part is not None:
            more, half = next(read_numbers(part))
            value, half = value + more / size, half / size
    signed = -value if sign == "-" else value
    yield Figure(signed, signed - half, signed + half, None, "angle")
