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

LENGTHS = {"m": 1.0, "dm": 0.1, "cm": 0.01, "mm": 0.001, "in": 0.0254, "ft": 0.3048}
"""Length units to metres (the inch is 25.4 mm exactly)."""

TIMES = {"s": 1.0, "sec": 1.0, "min": 60.0}
"""Time units to seconds."""

SLIDE_UNITS = {f"{length}/{time}": (LENGTHS[length], TIMES[time]) for length in LENGTHS for time in TIMES}
"""Speed units: their length in metres and their time in seconds."""

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

SHORTEST_NOTE = 4
"""'1rpm': anything shorter is a label."""

_DIGITS = r"\d{1,3}(?:[ \u2009]\d{3})+(?:[.,]\d+)?|\d+(?:[.,]\d*)?|[.,]\d+"
_NUMBER = rf"(?P<number>[+-]?\s*(?:{_DIGITS})(?:[eE][+-]?\d+)?)"
_UNIT = "|".join(sorted((re.escape(unit) for unit in (*TURN_UNITS, *SLIDE_UNITS)), key=len, reverse=True))
_SENSE = "|".join(sorted((re.escape(word) for word in (*CLOCKWISE, *COUNTER_CLOCKWISE)), key=len, reverse=True))
_VALUE = rf"{_NUMBER}\s*(?P<unit>{_UNIT})(?![\w/^])(?:[\s,;:/\[(\-]*(?P<sense>{_SENSE})(?!\w)[\])]?)?"
_SIGN = r"\s*(?P<sign>=|:|≈|~)\s*"
_LINK = r"(?:(?:block|wheel)\s+at\s+)?(?!against\b)[^\W_][\w'\-]*(?:\s?\(\d+\))?"
_NAME = rf"(?:\s*_?\s*\(?\{{?(?P<name>{_LINK})(?:/(?P<over>{_LINK}))?\}}?\)?)?"
_BEFORE = rf"(?:\s*\bagainst\s+(?P<before>{_LINK}))?"
_AFTER = rf"(?:[\s,;(]*\bagainst\s+(?P<after>{_LINK}))?"
# A small letter runs straight into a name of capitals or digits ('nAB', 'n2'), but 'nominal' and 'WHEEL' are words.
_LETTER = r"(?<!\w)(?P<letter>[ωΩ]|(?-i:omega|[wnv])(?!(?-i:[a-z]))|(?:omega|w|n|v)(?![^\W_]))"
_NOTE = re.compile(rf"{_LETTER}{_NAME}{_BEFORE}{_SIGN}{_VALUE}{_AFTER}", re.IGNORECASE)
_BARE = re.compile(rf"(?<![\w.,])\s*{_VALUE}{_AFTER}", re.IGNORECASE)
_MEANT = re.compile(rf"{_LETTER}{_NAME}\s*=\s*(?P<rest>\S.*)", re.IGNORECASE)
_LIKE_SPEED = re.compile(rf"{_NUMBER}(?!.*s\^?-?2)")
"""A number, and not an angular acceleration."""
_OPTION_VALUE = re.compile(rf"\s*{_VALUE}{_AFTER}\s*", re.IGNORECASE)
_AGAINST = re.compile(r"(?:^|\s+)against(?:\s+|$)", re.IGNORECASE)
_KIND_OF_LINK = re.compile(r"(block|wheel) at ", re.IGNORECASE)
_THOUSANDS = re.compile(r"[1-9]\d{0,2}[,]\d{3}")


class DriveStatement(NamedTuple):
    """What a drive text says: ``name`` of the driven link (or of pins of it; None where the text names none).

    ``against`` names the link it is driven against, None for the frame or for whatever a slide runs on. ``rate`` is
    rad/s counter-clockwise for kind 'turn', m/s for kind 'slide'; ``written`` is then the figure a second as it
    stands, and ``metres`` the size of its length unit. ``doubt`` says what contradicts itself in the text, or is None.
    ``explicit`` is False for a mere speed ('60 rpm'), which is a drive only beside a link.
    """

    name: str | None
    rate: float
    kind: Literal["turn", "slide"]
    doubt: str | None
    text: str
    explicit: bool = True
    against: str | None = None
    written: float = 0.0
    metres: float = 1.0


EXAMPLE = (
    "write for instance 'A-B = 10 rad/s ccw', 'A-B against B-C = 120 rpm cw', 'block at C = 0.2 m/s', "
    "or 'D-E = 50 mm/s' for the telescope between pins D and E"
)


def parse_drive(text: str) -> DriveStatement:
    """The statement of an option such as 'A-B = 10 rad/s ccw'; OptionInvalid says what is wrong with it."""
    left, equals, value = text.partition("=")
    if not equals or not left.strip():
        raise _invalid(text, "it names no link before an equals sign")
    names = _AGAINST.split(_plain(left).strip())
    if not all(names):
        raise _invalid(text, "it names no link on one side of 'against'")
    match = _OPTION_VALUE.fullmatch(_plain(value))
    if match is None:
        raise _invalid(text, f"{value.strip()!r} is no speed with a unit")
    names += [match["after"]] if match["after"] else []
    if len(names) > 2:
        raise _invalid(text, "it says 'against' more than once")
    statement = _statement(match, names[0], names[1] if len(names) > 1 else None, "", text)
    if statement.doubt is not None:
        raise _invalid(text, statement.doubt)
    return statement


def _invalid(text: str, why: str) -> OptionInvalid:
    return OptionInvalid(f"drive {text!r}: {why}; {EXAMPLE}")


def find_statements(text: str) -> list[DriveStatement]:
    """The drives a note on the sheet states; a drive that is meant but cannot be understood carries a doubt."""
    if len(text) < SHORTEST_NOTE:
        return []
    plain = _plain(text)
    found = [_noted(match, text) for match in _NOTE.finditer(plain)]
    if found:
        return found
    meant = _MEANT.search(plain)
    if meant is not None and meant["letter"] in "ωΩ" and _LIKE_SPEED.match(meant["rest"]):
        return [DriveStatement(meant["name"], 0.0, "turn", f"{meant['rest']!r} is no speed with a unit", _short(text))]
    bare = (_statement(match, None, match["after"], "", text) for match in _BARE.finditer(plain))
    return [each._replace(explicit=False) for each in bare if each.kind == "turn"]


def _noted(match: re.Match[str], text: str) -> DriveStatement:
    """The statement of a note with a letter and an equals sign."""
    others = [other for other in (match["over"], match["before"], match["after"]) if other]
    letter = match["letter"].lower()
    statement = _statement(match, match["name"], others[0] if others else None, letter, text)
    if statement.doubt is None and len(others) > 1:
        return statement._replace(doubt="it says more than once what it runs against")
    if statement.doubt is None and match["over"] and letter == "v":
        return statement._replace(doubt="'/' may mean two points or two links: write 'against' for links")
    return statement


def _plain(text: str) -> str:
    """Raised and lowered digits as plain ones, every kind of minus sign and dash as a hyphen."""
    return re.sub("[−–—]", "-", unicodedata.normalize("NFKC", text))


def _short(text: str) -> str:
    return " ".join(text.split())


def _named(name: str | None) -> str | None:
    """A name with single spaces and 'block at' and 'wheel at' in small letters."""
    return _KIND_OF_LINK.sub(lambda match: match[0].lower(), _short(name)) if name else None


def _statement(match: re.Match[str], name: str | None, against: str | None, letter: str, text: str) -> DriveStatement:
    number = float(re.sub(r"\s", "", match["number"]).replace(",", "."))
    unit = match["unit"].lower()
    sense = (match["sense"] or "").lower()
    kind: Literal["turn", "slide"] = "turn" if unit in TURN_UNITS else "slide"
    metres, seconds = SLIDE_UNITS.get(unit, (1.0, 1.0))
    factor = TURN_UNITS[unit] if kind == "turn" else metres / seconds
    if letter == "n" and unit in PER_SECOND:
        factor = math.tau  # n is a speed of rotation: revolutions, not radians, a second
    rate = -number * factor if sense in CLOCKWISE else number * factor
    return DriveStatement(
        name=_named(name),
        rate=rate,
        kind=kind,
        doubt=_doubt(letter, kind, match["number"].strip(), sense, rate),
        text=_short(text),
        against=_named(against),
        written=number / seconds,
        metres=metres,
    )


def _doubt(letter: str, kind: str, written: str, sense: str, rate: float) -> str | None:
    if written.startswith("-") and sense:
        return f"it carries a minus sign and says '{sense}' as well"
    if kind == "slide" and sense:
        return f"a sliding speed has no sense '{sense}'"
    if letter and (letter == "v") != (kind == "slide"):
        return f"'{letter}' does not go with that unit"
    if not math.isfinite(rate):
        return "the speed is not a finite number"
    if _THOUSANDS.fullmatch(written.lstrip("+- ")):
        return f"{written!r} can be read as a decimal or in thousands"
    return None
