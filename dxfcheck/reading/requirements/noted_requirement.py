"""Limits and expectations in notes on the sheet, as people write them (reading rule 12)."""

from __future__ import annotations

import re
from collections.abc import Iterator
from functools import cache
from typing import NamedTuple

from dxfcheck.reading.drives.speed_units import LETTER, LINK, NUMBER, plain_text, single_spaced, spoken_name
from dxfcheck.reading.requirements.noted_mobility import MobilityText, find_mobility
from dxfcheck.reading.requirements.stated_value import (
    BOUND,
    VALUE,
    StatedValue,
    ValueUnclear,
    value_of,
)
from dxfcheck.settings import Figure, Quantity
from dxfcheck.tolerances.sheet import LABEL_LENGTH

__all__ = ["NotedRequirement", "find_requirements", "without_requirements"]

_MAY_STATE = re.compile(
    r"[≤≥<>±%…]|\+/?-|max|(?<!/)min|most|least|than|over|up\s+to|\d\s*(?:to|\.\.|[-–—−])|s\s*(?:to|\.\.)"
    r"|[/:]\s*(?:[ωΩ]|omega|[wnv](?![a-z]))|(?<!\w)i\s*[_=]|[MF]\s*=|speed|dof|mobil|freedom|laufgrad|freiheit|libert"
    r"|movil",
    re.IGNORECASE,
)
"""What no text that states a requirement is without: every text of a sheet is held against it, so it must be quick."""

_EXTREME = r"(?:max|min)(?![^\W_])\.?"
_NAME = rf"(?!{_EXTREME}){LINK}"
_AGAINST = rf"(?:\s*\bagainst\s+(?P<against>{LINK}))?"
_SUBSCRIPT = rf"\s*_?\s*[({{]{{0,2}}(?:(?P<first>{_EXTREME})[\s,_]*)?(?P<name>{_NAME})?[)}}]{{0,2}}"
_RELATION = rf"[\s,]*(?P<before>{BOUND})?[)}}]{{0,2}}\s*(?P<sign>[=:≈~])?\s*(?P<after>{BOUND})?\s*"
_OTHER = rf"\s*[/:]\s*(?P<other_letter>[ωΩ]|omega|[wnv])\s*_?\s*[({{]?(?P<other>{_NAME})[)}}]?"
_INDEXED = rf"(?<!\w)(?P<letter>(?-i:i))\s*_\s*[({{]?(?P<name>{_NAME})\s*[/,]\s*(?P<other>{_NAME})[)}}]?"
_KIND = r"(?<!\w)(?P<kind>pin|slide|sliding|rubbing|link|turning)\s+speeds?"
_OF = rf"(?:\s+(?!{BOUND})(?:at|of|in|on)(?!\w))?(?:\s+(?:pin\s+)?(?!{BOUND}|[\d.,])(?P<name>{_NAME}))?"


def _pattern(head: str, value: str = VALUE) -> re.Pattern[str]:
    return re.compile(rf"{head}{_RELATION}{value}", re.IGNORECASE)


@cache
def _forms() -> tuple[tuple[str, re.Pattern[str]], ...]:
    """Ways of writing a requirement, the most telling first: each is looked for in what those before it left.

    Compiled on first use: it takes as long as checking a small drawing, and few sheets have a text that needs it.
    """
    return (
        ("ratio", _pattern(rf"{LETTER}{_SUBSCRIPT}{_OTHER}")),
        ("ratio", _pattern(_INDEXED)),
        ("words", _pattern(rf"{_KIND}{_OF}{_AGAINST}")),
        ("letter", _pattern(rf"{LETTER}{_SUBSCRIPT}{_AGAINST}")),
        ("bare", _pattern(r"(?<![\w.,=])")),
    )


@cache
def _meant_form() -> re.Pattern[str]:
    """What is meant as a limit but has no figure that can be understood."""
    return _pattern(rf"{LETTER}{_SUBSCRIPT}{_AGAINST}", r"(?P<rest>\S.*)")


_LONE_RATIO = re.compile(rf"\s*(?-i:i)\s*=\s*{NUMBER}(?:\s*:\s*{NUMBER})?\s*")
_RUN_TOGETHER = re.compile(r"(?<!\w)([vnωΩ])(max|min)(?!\w)")
_SUFFIX = re.compile(r"(.+?)(max|min)", re.IGNORECASE)

_NO_RATIO = "a ratio is one of speeds of turning, ω or n"

_QUANTITIES: dict[str, Quantity] = {
    "pin": "pin-speed",
    "slide": "slide-speed",
    "sliding": "slide-speed",
    "rubbing": "rubbing-speed",
    "link": "link-speed",
    "turning": "link-speed",
}


class NotedRequirement(NamedTuple):
    """What a note states; ``doubt`` says what cannot be understood in it, or is None (then there is a ``value``).

    ``quantity`` is None for a speed along that may be a pin's or a slide's, as its name decides. ``name`` is the
    subject as written, None where the text names none; ``against`` the other link of a ratio or a relative speed.
    ``explicit`` is False for what is a requirement only beside or with the name of something in the linkage.
    ``span`` is its place in the text as ``plain_text`` gives it, by line, start and end.
    """

    quantity: Quantity | None
    name: str | None
    against: str | None
    value: StatedValue | None
    doubt: str | None
    text: str
    span: tuple[int, int, int]
    explicit: bool = True


def find_requirements(text: str) -> list[NotedRequirement]:
    """The limits and expectations that a note on the sheet states, line by line.

    A figure alone after an equals sign is a drive and not found here; with a bound, a range or a tolerance it is.
    """
    if (len(text) <= LABEL_LENGTH and "=" not in text) or _MAY_STATE.search(text) is None:
        return []
    return [found for number, line in enumerate(_lines(text)) for found in _in_line(line, number)]


def without_requirements(text: str, found: list[NotedRequirement]) -> str:
    """The text with what was found blanked out, for those who look for drives in it."""
    lines = _lines(text)
    for each in found:
        number, start, end = each.span
        lines[number] = lines[number][:start] + " " * (end - start) + lines[number][end:]
    return "\n".join(lines)


def _lines(text: str) -> list[str]:
    return [_RUN_TOGETHER.sub(r"\1_\2", line) for line in plain_text(text).splitlines()]


def _in_line(line: str, number: int) -> Iterator[NotedRequirement]:
    mobility = find_mobility(line)
    if mobility is not None:
        yield _mobility(mobility, line, number)
        return
    left, found = line, False
    for form, pattern in _forms():
        for match in pattern.finditer(left):
            if not _is_bounded(match, form):
                continue
            found = True
            yield _noted(form, match, number)
            left = left[: match.start()] + "\0" * (match.end() - match.start()) + left[match.end() :]
    if not found:
        yield from _meant(line, number)


def _is_bounded(match: re.Match[str], form: str) -> bool:
    """Whether a match states a limit or an expectation, and not a drive or just any figure."""
    groups = match.groupdict()
    bounded = any(groups.get(group) for group in ("first", "before", "after", "late", "off", "upper"))
    if form == "ratio":
        return bounded or bool(match["sign"])
    if form == "words":
        return bounded or bool(match["sign"] and match["unit"])
    has_unit = any(groups[group] for group in ("unit", "upper_unit", "common")) or (groups["off_unit"] or "%") != "%"
    if form == "bare":
        return bounded and has_unit
    named_bound = bool(match["name"] and _SUFFIX.fullmatch(match["name"]))
    return (bounded or named_bound) and has_unit and bool(match["sign"] or bounded)


def _noted(form: str, match: re.Match[str], number: int) -> NotedRequirement:
    """The requirement of a match of one of the forms."""
    groups = match.groupdict()
    letter = (groups.get("letter") or "").lower()
    name, bound = groups.get("name"), _bounds(match)
    suffix = _SUFFIX.fullmatch(name) if name and form == "letter" else None
    if suffix is not None:
        name, bound = suffix[1], [*bound, suffix[2]]
    doubt, value = None, None
    if len(bound) > 1:
        doubt = f"it says {bound[0].strip()!r} and {bound[1].strip()!r}"
    else:
        try:
            value = value_of(match, bound[0] if bound else "", revolutions=letter == "n")
        except ValueUnclear as fault:
            doubt = str(fault)
    quantity = _quantity(form, groups.get("kind"), value, letter)
    if value is not None and doubt is None:
        doubt = _doubt(form, quantity, value, letter, groups)
    return NotedRequirement(
        quantity=quantity,
        name=spoken_name(name),
        against=spoken_name(groups.get("other") or groups.get("against")),
        value=value if doubt is None else None,
        doubt=doubt,
        text=single_spaced(match[0]).strip(" ,;"),
        span=(number, match.start(), match.end()),
        explicit=form != "bare",
    )


def _bounds(match: re.Match[str]) -> list[str]:
    """The bounding words and signs of a match before its figure."""
    return [each for group in ("first", "before", "after") if (each := match.groupdict().get(group))]


def _quantity(form: str, kind: str | None, value: StatedValue | None, letter: str) -> Quantity | None:
    if form == "ratio":
        return "speed-ratio"
    if kind:
        return _QUANTITIES[kind.lower()]
    turns = value.kind == "turn" if value is not None else letter != "v"
    return "link-speed" if turns else None


def _doubt(
    form: str, quantity: Quantity | None, value: StatedValue, letter: str, groups: dict[str, str | None]
) -> str | None:
    """What contradicts itself in a note."""
    if form == "ratio":
        pins = "v" in (letter, groups.get("other_letter"))
        return "a ratio of two speeds has no unit" if value.kind != "number" else _NO_RATIO if pins else None
    if value.kind == "number":
        return "it has no unit"
    if letter and (letter == "v") != (value.kind == "slide"):
        return f"'{letter}' does not go with that unit"
    if (quantity == "link-speed") != (value.kind == "turn"):
        return f"a {groups['kind']} speed does not go with that unit"
    one_sided = value.expected is None and None in (value.least, value.greatest)
    return "a limit is a size, without sign or sense" if value.signed and one_sided else None


def _meant(line: str, number: int) -> Iterator[NotedRequirement]:
    """A requirement that is meant but whose figure is none; 'w' may be a width."""
    match = _meant_form().search(line)
    if match is not None and match["letter"] not in "wW" and (_bounds(match) or "±" in match["rest"]):
        letter = match["letter"].lower()
        yield NotedRequirement(
            quantity=None if letter == "v" else "link-speed",
            name=spoken_name(match["name"]),
            against=None,
            value=None,
            doubt=f"{single_spaced(match['rest'])!r} is no speed with a unit",
            text=single_spaced(match[0]),
            span=(number, match.start(), match.end()),
            explicit=letter in "ωΩ",
        )
    elif _LONE_RATIO.fullmatch(line):
        yield NotedRequirement(
            quantity="speed-ratio",
            name=None,
            against=None,
            value=None,
            doubt="it names no links; a ratio is written 'ω_CD/ω_AB = 0.5 ± 2 %'",
            text=single_spaced(line),
            span=(number, 0, len(line)),
        )


def _mobility(mobility: MobilityText, line: str, number: int) -> NotedRequirement:
    figure = mobility.figure
    value = None
    if figure is not None:
        stated = Figure(float(figure), float(figure))
        value = StatedValue("number", stated, stated, stated, signed=True, toleranced=False)
    return NotedRequirement(
        quantity="mobility",
        name=None,
        against=None,
        value=value,
        doubt=None if value is not None else f"{mobility.written!r} is no whole number",
        text=single_spaced(line),
        span=(number, mobility.start, mobility.end),
        explicit=mobility.labelled,
    )
