"""What the sheet says of its length unit besides its header: notes, dimension texts and styles, stated lengths."""

from __future__ import annotations

import re
from collections.abc import Iterable, Iterator
from typing import NamedTuple

from dxfcheck.drawing.primitives import Dimension, DimensionStyle, Text
from dxfcheck.drawing.units import LENGTH_UNITS
from dxfcheck.geometry import Point
from dxfcheck.reading.lengths.figures import unit_named
from dxfcheck.reading.lengths.mix_ups import INCH_IN_MILLIMETRES
from dxfcheck.tolerances.sheet import UNIT_LIKENESS

__all__ = ["UNIT_WORDS", "UnitSign", "named_like", "signs_of_styles", "signs_of_texts", "unit_shown"]

_UNIT_WORD = (
    r"mm|millimet(?:er|re)s?|millimètres?|millimetri|milímetros|cm|centimet(?:er|re)s?|in\.|inch(?:es)?|zoll|feet"
)
_SUBJECT = (
    r"dim(?:ension)?s?\.?|measure(?:ment)?s?|sizes?|lengths?|units?|maße|masse|abmessungen|längen|einheit(?:en)?|"
    r"cotes|dimensions|unités?|misure|quote|unità|medidas|cotas|unidad(?:es)?"
)
_NOTE = re.compile(
    rf"\b(?:{_SUBJECT})\b(?:\s+(?:are|is|given|shown|stated|expressed|angegeben|alle))*\s*[:=]?\s*"
    rf"(?:\b(?:in|en|im)\s+)?\b({_UNIT_WORD})(?!\w)",
    re.IGNORECASE,
)
_ANOTHER = re.compile(rf"\b(?:{_UNIT_WORD})(?!\w)", re.IGNORECASE)
_SUFFIX = re.compile(r"(?:\[\]|<>)?\s*(mm|cm|m|inch(?:es)?|in\.?|\"|ft\.?|')\s*$", re.IGNORECASE)
_SHORTEST = 7
"""'unit mm'."""
_INCH, _MILLIMETRE = 0.0254, 0.001
UNIT_WORDS = {"mm": "millimetres", "in": "inches", "cm": "centimetres", "m": "metres", "ft": "feet"}
"""Units as a sentence names them."""


class UnitSign(NamedTuple):
    """One thing on the sheet that says what the length unit is: its name, in which words, and where."""

    unit: str
    why: str
    at: Point | None
    handle: str
    layer: str | None = None


def signs_of_texts(texts: Iterable[tuple[Text, str]]) -> Iterator[UnitSign]:
    """Notes such as 'ALL DIMENSIONS IN mm'; ``texts`` come with their handles.

    One that names two units (for two figures on each dimension) says nothing sure.
    """
    for text, handle in texts:
        content = text.content
        if len(content) < _SHORTEST:
            continue
        match = _NOTE.search(content)
        if match is None:
            continue
        unit = _unit_of(match[1])
        if unit is not None and {_unit_of(word) for word in _ANOTHER.findall(content)} <= {unit, None}:
            line = content[content.rfind("\n", 0, match.start()) + 1 :].partition("\n")[0]
            shown = _short(line if len(line) >= len(match[0]) else match[0])
            yield UnitSign(unit, f"the note '{shown}' says {UNIT_WORDS[unit]}", text.at, handle, text.source.layer)


def _unit_of(word: str) -> str | None:
    known = unit_named(word)
    if known is not None:
        return known
    start = word.lower()[:2]
    return {"mi": "mm", "ce": "cm"}.get(start)


def _short(text: str) -> str:
    return " ".join(text.split())


def signs_of_styles(dimensions: Iterable[tuple[Dimension, str]]) -> Iterator[UnitSign]:
    """What dimension styles write with the figures: a unit, a second figure in another unit, feet and inches.

    A dimension inside a block measures in the block's own unit and says nothing of the sheet's; one whose text was
    written by hand does not show what its style says. ``dimensions`` come with their handles.
    """
    seen: set[DimensionStyle] = set()
    for dimension, handle in dimensions:
        style = dimension.style
        shown = not dimension.text or "<>" in dimension.text
        if not shown or style in seen or dimension.source.blocks or dimension.kind == "angular":
            continue
        seen.add(style)
        at = dimension.points[0] if dimension.points else None
        for metres, why in _said_by(style):
            unit = named_like(metres)
            if unit is not None:
                yield UnitSign(unit, why, at, handle, dimension.source.layer)


def unit_shown(style: DimensionStyle) -> bool:
    """Whether a style writes a unit behind its figures, or shows feet and inches."""
    return style.feet or _size_of(style.suffix) is not None


def _said_by(style: DimensionStyle) -> Iterator[tuple[float, str]]:
    """The size of the drawing's unit in metres by each thing that a style shows, and in which words."""
    suffix = _size_of(style.suffix)
    if suffix is not None:
        yield suffix * style.factor, f"the dimensions show '{_short(style.suffix.replace('<>', ''))}'"
    elif style.feet:
        yield _INCH * style.factor, "the dimensions show feet and inches"
    if style.alternate is None:
        return
    second = _size_of(style.alternate_suffix)
    if second is not None:
        suffix_shown = _short(style.alternate_suffix.replace("[]", ""))
        why = f"the second figure of dimensions, in {suffix_shown}, is {style.alternate:.4g} times the first"
        yield second * style.alternate * style.factor, why
    else:
        for factor, metres in ((INCH_IN_MILLIMETRES, _INCH), (1.0 / INCH_IN_MILLIMETRES, _MILLIMETRE)):
            if abs(style.alternate - factor) <= UNIT_LIKENESS * factor:
                yield metres * style.factor, f"the second figure of dimensions is {style.alternate:.4g} times the first"


def _size_of(suffix: str) -> float | None:
    """The size in metres of the unit that a dimension's figure is followed by."""
    match = _SUFFIX.search(suffix)
    unit = unit_named(match[1]) if match is not None else None
    return LENGTH_UNITS[unit] if unit is not None else None


def named_like(metres: float) -> str | None:
    """The common unit of this size, None where there is none: the factor of a scale is in it as well."""
    for unit in ("mm", "in", "cm", "m", "ft"):
        size = LENGTH_UNITS[unit]
        if size is not None and abs(metres - size) <= UNIT_LIKENESS * size:
            return unit
    return None
