"""Stated input motions as people write them, in notes on the sheet and in options (reading rule 9)."""

from __future__ import annotations

import math
import re
from typing import Literal, NamedTuple

from dxfcheck.errors import OptionInvalid

__all__ = ["DriveStatement", "find_statement", "parse_drive"]

TURN_UNITS = {
    "rad/s": 1.0,
    "rad/sec": 1.0,
    "1/s": 1.0,
    "s-1": 1.0,
    "s^-1": 1.0,
    "s⁻¹": 1.0,
    "deg/s": math.tau / 360.0,
    "°/s": math.tau / 360.0,
    "rpm": math.tau / 60.0,
    "r/min": math.tau / 60.0,
    "rev/min": math.tau / 60.0,
    "1/min": math.tau / 60.0,
    "min-1": math.tau / 60.0,
    "min^-1": math.tau / 60.0,
    "min⁻¹": math.tau / 60.0,
    "u/min": math.tau / 60.0,
}
"""Angular speed units to rad/s; 'n = 3 1/s' counts revolutions, see below."""

SLIDE_UNITS = {"m/s": 1.0, "cm/s": 0.01, "mm/s": 0.001, "in/s": 0.0254, "ft/s": 0.3048, "m/min": 1.0 / 60.0}
"""Speed units to m/s (the inch is 25.4 mm exactly)."""

CLOCKWISE = ("cw", "clockwise", "↻")
COUNTER_CLOCKWISE = ("ccw", "counter-clockwise", "counterclockwise", "anticlockwise", "anti-clockwise", "acw", "↺")

_NUMBER = r"(?P<number>[+\-−]?\s*(?:\d+(?:[.,]\d*)?|[.,]\d+)(?:[eE][+\-]?\d+)?)"
_UNIT = "|".join(sorted((re.escape(unit) for unit in (*TURN_UNITS, *SLIDE_UNITS)), key=len, reverse=True))
_SENSE = "|".join(sorted((re.escape(word) for word in (*CLOCKWISE, *COUNTER_CLOCKWISE)), key=len, reverse=True))
_VALUE = rf"{_NUMBER}\s*(?P<unit>{_UNIT})(?![\w/])(?:[\s,;(]*(?P<sense>{_SENSE})(?!\w)\)?)?"
_NOTE = re.compile(
    rf"(?<!\w)(?P<letter>[ωΩ]|omega|w|n|v)(?:\s*[_ ]?\s*\(?\{{?(?P<name>[^\W_][\w'\-−–]*)\}}?\)?)?\s*=\s*{_VALUE}",
    re.IGNORECASE,
)
_OPTION_VALUE = re.compile(rf"\s*{_VALUE}\s*", re.IGNORECASE)


class DriveStatement(NamedTuple):
    """What a drive text says: ``name`` of the driven link (or two of its pins; None where the text names none).

    ``rate`` is rad/s counter-clockwise for kind 'turn', m/s for kind 'slide'. ``doubt`` says what contradicts itself
    in the text, or is None.
    """

    name: str | None
    rate: float
    kind: Literal["turn", "slide"]
    doubt: str | None
    text: str


def parse_drive(text: str) -> DriveStatement:
    """The statement of an option such as 'A-B = 10 rad/s ccw'; OptionInvalid says what is wrong with it."""
    name, equals, value = text.partition("=")
    example = "write for instance 'A-B = 10 rad/s ccw' or 'A-B = 120 rpm cw'"
    if not equals or not name.strip():
        msg = f"drive {text!r}: it names no link before an equals sign; {example}"
        raise OptionInvalid(msg)
    match = _OPTION_VALUE.fullmatch(value)
    if match is None:
        msg = f"drive {text!r}: {value.strip()!r} is no speed with a unit; {example}"
        raise OptionInvalid(msg)
    statement = _statement(match, name.strip(), "", text)
    if statement.doubt is not None:
        msg = f"drive {text!r}: {statement.doubt}; {example}"
        raise OptionInvalid(msg)
    return statement


def find_statement(text: str) -> DriveStatement | None:
    """The drive a note on the sheet states, or None where it states none."""
    match = _NOTE.search(text)
    if match is None:
        return None
    return _statement(match, match["name"], match["letter"].lower(), text)


def _statement(match: re.Match[str], name: str | None, letter: str, text: str) -> DriveStatement:
    number = float(match["number"].replace(" ", "").replace("−", "-").replace(",", "."))
    unit = match["unit"].lower()
    sense = (match["sense"] or "").lower()
    kind: Literal["turn", "slide"] = "turn" if unit in TURN_UNITS else "slide"
    factor = TURN_UNITS[unit] if kind == "turn" else SLIDE_UNITS[unit]
    if letter == "n" and unit in {"1/s", "s-1", "s^-1", "s⁻¹"}:
        factor = math.tau  # n is a speed of rotation: revolutions, not radians, a second
    return DriveStatement(
        name=name.replace("−", "-").replace("–", "-") if name else None,
        rate=-number * factor if sense in CLOCKWISE else number * factor,
        kind=kind,
        doubt=_doubt(letter, kind, number, sense),
        text=" ".join(text.split()),
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
