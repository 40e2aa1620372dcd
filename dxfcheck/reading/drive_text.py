"""Stated input motions as people write them, in notes on the sheet and in options (reading rule 9)."""

from __future__ import annotations

import math
import re
import unicodedata
from typing import Literal, NamedTuple

from dxfcheck.errors import OptionInvalid

__all__ = ["DriveStatement", "find_statements", "parse_drive"]

TURN_UNITS = {
    "rad/s": 1.0,
    "rad/sec": 1.0,
    "1/s": 1.0,
    "s-1": 1.0,
    "s^-1": 1.0,
    "deg/s": math.tau / 360.0,
    "°/s": math.tau / 360.0,
    "rpm": math.tau / 60.0,
    "r/min": math.tau / 60.0,
    "rev/min": math.tau / 60.0,
    "1/min": math.tau / 60.0,
    "min-1": math.tau / 60.0,
    "min^-1": math.tau / 60.0,
    "u/min": math.tau / 60.0,
    "tr/min": math.tau / 60.0,
    "rps": math.tau,
    "r/s": math.tau,
    "rev/s": math.tau,
}
"""Angular speed units to rad/s; 'n = 3 1/s' counts revolutions, see below."""

PER_SECOND = ("1/s", "s-1", "s^-1")

SLIDE_UNITS = {"m/s": 1.0, "cm/s": 0.01, "mm/s": 0.001, "in/s": 0.0254, "ft/s": 0.3048, "m/min": 1.0 / 60.0}
"""Speed units to m/s (the inch is 25.4 mm exactly)."""

CLOCKWISE = ("cw", "c.w.", "clockwise", "clock wise", "↻")
COUNTER_CLOCKWISE = (
    "ccw",
    "c.c.w.",
    "counter-clockwise",
    "counter clockwise",
    "counterclockwise",
    "anticlockwise",
    "anti-clockwise",
    "acw",
    "↺",
)

_DIGITS = r"\d{1,3}(?:[ \u2009]\d{3})+(?:[.,]\d+)?|\d+(?:[.,]\d*)?|[.,]\d+"
_NUMBER = rf"(?P<number>[+-]?\s*(?:{_DIGITS})(?:[eE][+-]?\d+)?)"
_UNIT = "|".join(sorted((re.escape(unit) for unit in (*TURN_UNITS, *SLIDE_UNITS)), key=len, reverse=True))
_SENSE = "|".join(sorted((re.escape(word) for word in (*CLOCKWISE, *COUNTER_CLOCKWISE)), key=len, reverse=True))
_VALUE = rf"{_NUMBER}\s*(?P<unit>{_UNIT})(?![\w/])(?:[\s,;:/\[(\-]*(?P<sense>{_SENSE})(?!\w)[\])]?)?"
_SIGN = r"\s*(?P<sign>=|:|≈|~)\s*"
_NAME = r"(?:\s*_?\s*\(?\{?(?P<name>[^\W_][\w'\-]*)\}?\)?)?"
# A small letter runs straight into a name of capitals or digits ('nAB', 'n2'), but 'nominal' and 'WHEEL' are words.
_LETTER = r"(?<!\w)(?P<letter>[ωΩ]|(?-i:omega|[wnv])(?!(?-i:[a-z]))|(?:omega|w|n|v)(?![^\W_]))"
_NOTE = re.compile(rf"{_LETTER}{_NAME}{_SIGN}{_VALUE}", re.IGNORECASE)
_BARE = re.compile(rf"(?<![\w.,])\s*{_VALUE}", re.IGNORECASE)
_MEANT = re.compile(rf"{_LETTER}{_NAME}\s*=\s*(?P<rest>\S.*)", re.IGNORECASE)
_LIKE_SPEED = re.compile(rf"{_NUMBER}(?!.*s\^?-?2)")
"""A number, and not an angular acceleration."""
_OPTION_VALUE = re.compile(rf"\s*{_VALUE}\s*", re.IGNORECASE)
_THOUSANDS = re.compile(r"[1-9]\d{0,2}[,]\d{3}")


class DriveStatement(NamedTuple):
    """What a drive text says: ``name`` of the driven link (or two of its pins; None where the text names none).

    ``rate`` is rad/s counter-clockwise for kind 'turn', m/s for kind 'slide'. ``doubt`` says what contradicts itself
    in the text, or is None. ``explicit`` is False for a mere speed ('60 rpm'), which is a drive only beside a link.
    """

    name: str | None
    rate: float
    kind: Literal["turn", "slide"]
    doubt: str | None
    text: str
    explicit: bool = True


def parse_drive(text: str) -> DriveStatement:
    """The statement of an option such as 'A-B = 10 rad/s ccw'; OptionInvalid says what is wrong with it."""
    name, equals, value = text.partition("=")
    example = "write for instance 'A-B = 10 rad/s ccw' or 'A-B = 120 rpm cw'"
    if not equals or not name.strip():
        msg = f"drive {text!r}: it names no link before an equals sign; {example}"
        raise OptionInvalid(msg)
    match = _OPTION_VALUE.fullmatch(_plain(value))
    if match is None:
        msg = f"drive {text!r}: {value.strip()!r} is no speed with a unit; {example}"
        raise OptionInvalid(msg)
    statement = _statement(match, _plain(name).strip(), "", text)
    if statement.doubt is not None:
        msg = f"drive {text!r}: {statement.doubt}; {example}"
        raise OptionInvalid(msg)
    return statement


def find_statements(text: str) -> list[DriveStatement]:
    """The drives a note on the sheet states; a drive that is meant but cannot be understood carries a doubt."""
    plain = _plain(text)
    found = [_statement(match, match["name"], match["letter"].lower(), text) for match in _NOTE.finditer(plain)]
    if found:
        return found
    meant = _MEANT.search(plain)
    if meant is not None and meant["letter"] in "ωΩ" and _LIKE_SPEED.match(meant["rest"]):
        return [DriveStatement(meant["name"], 0.0, "turn", f"{meant['rest']!r} is no speed with a unit", _short(text))]
    bare = (_statement(match, None, "", text) for match in _BARE.finditer(plain))
    return [each._replace(explicit=False) for each in bare if each.kind == "turn"]


def _plain(text: str) -> str:
    """Raised and lowered digits as plain ones, every kind of minus sign and dash as a hyphen."""
    return re.sub("[−–—]", "-", unicodedata.normalize("NFKC", text))


def _short(text: str) -> str:
    return " ".join(text.split())


def _statement(match: re.Match[str], name: str | None, letter: str, text: str) -> DriveStatement:
    written = match["number"]
    number = float(re.sub(r"\s", "", written).replace(",", "."))
    unit = match["unit"].lower()
    sense = (match["sense"] or "").lower()
    kind: Literal["turn", "slide"] = "turn" if unit in TURN_UNITS else "slide"
    factor = TURN_UNITS[unit] if kind == "turn" else SLIDE_UNITS[unit]
    if letter == "n" and unit in PER_SECOND:
        factor = math.tau  # n is a speed of rotation: revolutions, not radians, a second
    doubt = _doubt(letter, kind, number, sense)
    if doubt is None and _THOUSANDS.fullmatch(written.lstrip("+- ")):
        doubt = f"{written.strip()!r} can be read as a decimal or in thousands"
    return DriveStatement(
        name=name or None,
        rate=-number * factor if sense in CLOCKWISE else number * factor,
        kind=kind,
        doubt=doubt,
        text=_short(text),
    )


def _doubt(letter: str, kind: str, number: float, sense: str) -> str | None:
    if number < 0 and sense:
        return f"it carries a minus sign and says '{sense}' as well"
    if kind == "slide" and sense:
        return f"a sliding speed has no sense '{sense}'"
    if letter and (letter == "v") != (kind == "slide"):
        return f"'{letter}' does not go with that unit"
    if not math.isfinite(number):
        return "the speed is not a finite number"
    return None
