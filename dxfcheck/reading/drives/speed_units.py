"""Numbers, units and senses of stated speeds, as people write them: what drives, limits and expectations share."""

from __future__ import annotations

import math
import re
import unicodedata
from typing import Literal, NamedTuple

__all__ = [
    "CLOCKWISE",
    "LETTER",
    "LINK",
    "NUMBER",
    "SENSE",
    "UNIT",
    "SpeedKind",
    "SpeedUnit",
    "may_be_thousands",
    "number_of",
    "plain_text",
    "single_spaced",
    "spoken_name",
    "unit_of",
]

SpeedKind = Literal["turn", "slide"]

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
"""Angular speed units to rad/s; 'n = 3 1/s' counts revolutions, see ``unit_of``."""

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

_DIGITS = r"\d{1,3}(?:[ \u2009]\d{3})+(?:[.,]\d+)?|\d+(?:[.,]\d*)?|[.,]\d+"
NUMBER = rf"[+-]?\s*(?:{_DIGITS})(?:[eE][+-]?\d+)?"
"""Pattern of a number, with a decimal point or comma, or thousands set apart by spaces."""

UNIT = "|".join(sorted((re.escape(unit) for unit in (*TURN_UNITS, *SLIDE_UNITS)), key=len, reverse=True))
"""Pattern of the units of speed, the longest first."""

SENSE = "|".join(sorted((re.escape(word) for word in (*CLOCKWISE, *COUNTER_CLOCKWISE)), key=len, reverse=True))
"""Pattern of the senses of turning."""

LINK = r"(?:(?:block|wheel)\s+at\s+)?(?!against\b)[^\W_][\w'\-]*(?:\s?\(\d+\))?"
"""Pattern of the name of a link or pin."""

# A small letter runs straight into a name of capitals or digits ('nAB', 'n2'), but 'nominal' and 'WHEEL' are words.
LETTER = r"(?<!\w)(?P<letter>[ωΩ]|(?-i:omega|[wnv])(?!(?-i:[a-z]))|(?:omega|w|n|v)(?![^\W_]))"
"""Pattern of the letter of a speed, group ``letter``."""

_KIND_OF_LINK = re.compile(r"(block|wheel) at ", re.IGNORECASE)
_THOUSANDS = re.compile(r"[1-9]\d{0,2}[,]\d{3}")


class SpeedUnit(NamedTuple):
    """A unit of speed: ``factor`` brings a figure to rad/s or m/s.

    ``metres`` and ``seconds`` are the sizes of the length and the time in it; 1 for turning.
    """

    kind: SpeedKind
    factor: float
    metres: float = 1.0
    seconds: float = 1.0


def unit_of(written: str, *, revolutions: bool = False) -> SpeedUnit:
    """The unit of that name; KeyError where it is none.

    With ``revolutions`` a figure 'a second' counts turns: n is a speed of rotation, in revolutions, not radians.
    """
    name = written.lower()
    if name in TURN_UNITS:
        return SpeedUnit("turn", math.tau if revolutions and name in PER_SECOND else TURN_UNITS[name])
    metres, seconds = SLIDE_UNITS[name]
    return SpeedUnit("slide", metres / seconds, metres, seconds)


def number_of(written: str) -> float:
    """The figure of a text that NUMBER fits; it may be infinite."""
    return float(re.sub(r"\s", "", written).replace(",", "."))


def may_be_thousands(written: str) -> bool:
    """Whether a number can be read as a decimal or in thousands: '1,200'."""
    return _THOUSANDS.fullmatch(written.lstrip("+- ")) is not None


def plain_text(text: str) -> str:
    """Raised and lowered digits as plain ones, every kind of minus sign and dash as a hyphen."""
    return re.sub("[−–—]", "-", unicodedata.normalize("NFKC", text))


def single_spaced(text: str) -> str:
    """The text with single spaces, in one line."""
    return " ".join(text.split())


def spoken_name(name: str | None) -> str | None:
    """A name with single spaces and 'block at' and 'wheel at' in small letters."""
    return _KIND_OF_LINK.sub(lambda match: match[0].lower(), single_spaced(name)) if name else None
