"""Stated input motions as people write them, in notes on the sheet and in options (reading rule 9)."""

from __future__ import annotations

import re
from typing import NamedTuple

from dxfcheck.errors import OptionInvalid
from dxfcheck.reading.drives.speed_units import (
    CLOCKWISE,
    LETTER,
    LINK,
    NUMBER,
    SENSE,
    UNIT,
    SpeedKind,
    may_be_thousands,
    number_of,
    plain_text,
    single_spaced,
    spoken_name,
    unit_of,
)
from dxfcheck.tolerances.drawing import COORDINATE_LIMIT

__all__ = ["DriveStatement", "find_statements", "parse_drive"]

SHORTEST_NOTE = 4
"""'1rpm': anything shorter is a label."""

_VALUE = (
    rf"(?P<number>{NUMBER})\s*(?P<unit>{UNIT})(?![\w/^])"
    rf"(?:[\s,;:/\[(\-]*(?P<sense>{SENSE})(?!\w)[\])]?)?"
)
_SIGN = r"\s*(?P<sign>=|:|≈|~)\s*"
_NAME = rf"(?:\s*_?\s*\(?\{{?(?P<name>{LINK})(?:/(?P<over>{LINK}))?\}}?\)?)?"
_BEFORE = rf"(?:\s*\bagainst\s+(?P<before>{LINK}))?"
_AFTER = rf"(?:[\s,;(]*\bagainst\s+(?P<after>{LINK}))?"
_NOTE = re.compile(rf"{LETTER}{_NAME}{_BEFORE}{_SIGN}{_VALUE}{_AFTER}", re.IGNORECASE)
_BARE = re.compile(rf"(?<![\w.,])\s*{_VALUE}{_AFTER}", re.IGNORECASE)
_MEANT = re.compile(rf"{LETTER}{_NAME}\s*=\s*(?P<rest>\S.*)", re.IGNORECASE)
_LIKE_SPEED = re.compile(rf"{NUMBER}(?!.*s\^?-?2)")
"""A number, and not an angular acceleration."""
_OPTION_VALUE = re.compile(rf"\s*{_VALUE}{_AFTER}\s*", re.IGNORECASE)
_AGAINST = re.compile(r"(?:^|\s+)against(?:\s+|$)", re.IGNORECASE)


class DriveStatement(NamedTuple):
    """What a drive text says: ``name`` of the driven link (or of pins of it; None where the text names none).

    ``against`` names the link it is driven against, None for the frame or for whatever a slide runs on. ``rate`` is
    rad/s counter-clockwise for kind 'turn', m/s for kind 'slide'; ``written`` is then the figure a second as it
    stands, and ``metres`` the size of its length unit. ``doubt`` says what contradicts itself in the text, or is None.
    ``explicit`` is False for a mere speed ('60 rpm'), which is a drive only beside a link.
    """

    name: str | None
    rate: float
    kind: SpeedKind
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
    names = _AGAINST.split(plain_text(left).strip())
    if not all(names):
        raise _invalid(text, "it names no link on one side of 'against'")
    match = _OPTION_VALUE.fullmatch(plain_text(value))
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
    plain = plain_text(text)
    found = [_noted(match, text) for match in _NOTE.finditer(plain)]
    if found:
        return found
    meant = _MEANT.search(plain)
    if meant is not None and meant["letter"] in "ωΩ" and _LIKE_SPEED.match(meant["rest"]):
        doubt = f"{meant['rest']!r} is no speed with a unit"
        return [DriveStatement(meant["name"], 0.0, "turn", doubt, single_spaced(text))]
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


def _statement(match: re.Match[str], name: str | None, against: str | None, letter: str, text: str) -> DriveStatement:
    number = number_of(match["number"])
    sense = (match["sense"] or "").lower()
    unit = unit_of(match["unit"], revolutions=letter == "n")
    rate = -number * unit.factor if sense in CLOCKWISE else number * unit.factor
    return DriveStatement(
        name=spoken_name(name),
        rate=rate,
        kind=unit.kind,
        doubt=_doubt(letter, unit.kind, match["number"].strip(), sense, rate),
        text=single_spaced(text),
        against=spoken_name(against),
        written=number / unit.seconds,
        metres=unit.metres,
    )


def _doubt(letter: str, kind: str, written: str, sense: str, rate: float) -> str | None:
    if written.startswith("-") and sense:
        return f"it carries a minus sign and says '{sense}' as well"
    if kind == "slide" and sense:
        return f"a sliding speed has no sense '{sense}'"
    if letter and (letter == "v") != (kind == "slide"):
        return f"'{letter}' does not go with that unit"
    if not abs(rate) <= COORDINATE_LIMIT:
        return "the speed is beyond any that can be meant"
    if may_be_thousands(written):
        return f"{written!r} can be read as a decimal or in thousands"
    return None
