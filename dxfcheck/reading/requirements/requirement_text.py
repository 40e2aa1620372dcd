"""Limits and expectations as people write them in settings; those of notes on the sheet come by way of here, too."""

from __future__ import annotations

import re
from typing import NoReturn

from dxfcheck.errors import OptionInvalid
from dxfcheck.reading.drives.speed_units import plain_text, single_spaced, spoken_name
from dxfcheck.reading.requirements.noted_requirement import NotedRequirement, find_requirements
from dxfcheck.reading.requirements.stated_value import (
    BOUND,
    VALUE,
    StatedValue,
    ValueKind,
    ValueUnclear,
    value_of,
)
from dxfcheck.settings import Quantity, Requirement

__all__ = ["OFF", "NotedRequirement", "find_requirements", "read_expected_speed", "read_limit", "read_ratio"]

OFF = "off"
"""Stands in settings in place of a figure where none is to hold."""

_TEXT = re.compile(rf"\s*(?P<bound>{BOUND})?\s*{VALUE}\s*", re.IGNORECASE)
_AGAINST = re.compile(r"(?:^|\s+)against(?:\s+|$)", re.IGNORECASE)

_KINDS: dict[Quantity, ValueKind] = {
    "pin-speed": "slide",
    "slide-speed": "slide",
    "rubbing-speed": "slide",
    "link-speed": "turn",
    "speed-ratio": "number",
}
_LIKE: dict[ValueKind, str] = {
    "slide": "a speed such as '2 m/s' or '500 mm/s'",
    "turn": "a speed of turning such as '300 rpm' or '5 rad/s'",
    "number": "a plain figure such as '0.5', '1:2' or '0.4 to 0.6'",
}
_EXPECTED = "write for instance '0.35 m/s ± 2 %', '4.2 rad/s cw ± 1 %' or '4 rad/s to 5 rad/s'"


def read_limit(quantity: Quantity, subject: str, text: str, *, where: str = "") -> Requirement:
    """The limit on a speed of a pin, link or block, or of all whose names a pattern fits: '2 m/s', '300 rpm'.

    A figure alone is the greatest size; '>= 0.1 m/s' and '0.1 to 0.3 m/s' state a least one; OFF lifts the limit. A
    subject may be 'A-B against B-C'. OptionInvalid says in one line what is wrong and what would be right.
    """
    if quantity == "speed-ratio":
        return read_ratio(subject, text, where=where)
    kind = _KINDS.get(quantity)
    if kind is None:
        msg = f"{quantity} has no limit: an expected mobility is a whole number"
        raise OptionInvalid(msg)
    name, against = _names(subject)
    if quantity != "slide-speed":
        name = name.removeprefix("pin ")
    if against and quantity in {"pin-speed", "rubbing-speed"}:
        _refuse(subject, f"a limit on the {quantity} names a pin only")
    if text == OFF:
        return Requirement(quantity=quantity, subject=name, against=against, stated=OFF, where=where)
    example = f"write {_LIKE[kind]}"
    value = _value(text, kind, example)
    if value.toleranced:
        _refuse(text, f"a limit has no tolerance; {example}")
    if value.signed:
        _refuse(text, f"a limit is a size, without sign or sense; {example}")
    least, greatest = value.least, value.greatest
    if value.expected is not None:  # a figure alone
        least, greatest = None, value.expected
    return Requirement(
        quantity=quantity,
        subject=name,
        against=against,
        least=least,
        greatest=greatest,
        stated=single_spaced(text),
        where=where,
    )


def read_expected_speed(subject: str, text: str, *, where: str = "") -> Requirement:
    """The speed a pin, link or block is expected to have: '0.35 m/s ± 2 %', '4.2 rad/s cw ± 1 %', '4 to 5 rad/s'.

    Turning is counter-clockwise positive and held with its sign; other speeds are sizes, unless one carries a sign.
    Where no tolerance is stated it is EXPECTED_RELATIVE. A speed along is a pin's, or a slide's where the subject
    names a block, two links or two pins. OptionInvalid says in one line what is wrong and what would be right.
    """
    name, against = _names(subject)
    value = _value(text, None, _EXPECTED)
    if value.kind == "number":
        _refuse(text, f"it has no unit; {_EXPECTED}")
    turns = value.kind == "turn"
    slides = against or name.startswith("block at ") or "-" in name
    quantity: Quantity = "link-speed" if turns else "slide-speed" if slides else "pin-speed"
    if quantity == "pin-speed":
        name = name.removeprefix("pin ")
    if quantity == "pin-speed" and value.signed:
        _refuse(text, f"the speed of pin {name} is a size, without a sign")
    return Requirement(
        quantity=quantity,
        subject=name,
        against=against,
        least=value.least,
        greatest=value.greatest,
        expected=value.expected,
        signed=value.signed or (turns and value.expected is not None),
        stated=single_spaced(text),
        where=where,
    )


def read_ratio(links: str, text: str, *, where: str = "") -> Requirement:
    """The ratio of the speeds of turning of two links: 'C-D / A-B' and '0.5 ± 2 %', '0.4 to 0.6', 'at most 0.6'.

    It is a size unless it carries a sign: '-0.5' means that the two turn opposite ways. Where no tolerance is stated
    it is EXPECTED_RELATIVE. OptionInvalid says in one line what is wrong and what would be right.
    """
    names = [each.strip() for each in re.split(r"\s/\s|/", plain_text(links))]
    if len(names) != 2 or not all(names):
        _refuse(links, "a ratio names two links, as 'C-D / A-B'")
    value = _value(text, "number", f"write {_LIKE['number']}")
    return Requirement(
        quantity="speed-ratio",
        subject=spoken_name(names[0]) or "",
        against=spoken_name(names[1]) or "",
        least=value.least,
        greatest=value.greatest,
        expected=value.expected,
        signed=value.signed,
        stated=single_spaced(text),
        where=where,
    )


def _value(text: str, kind: ValueKind | None, example: str) -> StatedValue:
    """The figure of a text, of that kind where one is given."""
    match = _TEXT.fullmatch(plain_text(text))
    if match is None:
        _refuse(text, f"it is no figure that can be understood; {example}")
    try:
        value = value_of(match, match["bound"] or "")
    except ValueUnclear as fault:
        _refuse(text, f"{fault}; {example}")
    if kind is not None and value.kind != kind:
        is_a = {"turn": "a speed of turning", "slide": "a speed along", "number": "a figure without a unit"}
        _refuse(text, f"it is {is_a[value.kind]}; {example}")
    return value


def _names(subject: str) -> tuple[str, str]:
    """The subject and the link it is taken against, '' for the frame."""
    names = [spoken_name(each.strip()) or "" for each in _AGAINST.split(plain_text(subject))]
    if not all(names) or len(names) > 2:
        _refuse(subject, "name a pin, a link or a block, or two links as 'A-B against B-C'")
    return names[0], names[1] if len(names) > 1 else ""


def _refuse(text: str, why: str) -> NoReturn:
    msg = f"{single_spaced(text)!r}: {why}"
    raise OptionInvalid(msg)
