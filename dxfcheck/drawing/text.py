"""Readers of TEXT, MTEXT and ATTRIB: what they say, where, and about how much room they take.

Fonts of the machine are not asked: they cost time and differ, so boxes are estimates from the height alone.
"""

from __future__ import annotations

import cmath
import math
import re
from collections.abc import Sequence

from ezdxf.entities.attrib import Attrib
from ezdxf.entities.dxfentity import DXFEntity
from ezdxf.lldxf.encoding import decode_dxf_unicode
from ezdxf.tools.text import plain_mtext, plain_text

from dxfcheck.drawing.cleaning import clean_lines
from dxfcheck.drawing.fates import INVISIBLE
from dxfcheck.drawing.placement import Placement
from dxfcheck.drawing.primitives import Fate, Source, Text
from dxfcheck.drawing.shapes import Given, NotRead, Shapes, faces_away, require_numbers
from dxfcheck.geometry import Point
from dxfcheck.tolerances.drawing import TEXT_LINE_OF_HEIGHT, TEXT_WIDTH_OF_HEIGHT

__all__ = ["decode_line", "decode_paragraphs", "read_attribute", "read_mtext", "read_text", "unstack"]

_EMPTY = Fate("note", "an empty text")
_HIDDEN_ATTRIBUTE = 1
_MIRRORED_X = 2
_UPSIDE_DOWN = 4
_ALIGNED = 3
_MIDDLE = 4
_FIT = 5
_LEFT_OF_HALIGN = {0: 0.0, 1: -0.5, 2: -1.0, _MIDDLE: -0.5}
"""Left edge of the box over its width, by horizontal alignment."""
_BOTTOM_OF_VALIGN = {0: 0.0, 1: 0.0, 2: -0.5, 3: -1.0}
"""Lower edge of the box over its height, by vertical alignment (baseline, bottom, middle, top)."""
_CODE = re.compile(r"%%(\d{3})")
_STACK = re.compile(r"\\S([^;\\]*?)([\^/#])([^;\\]*);")


def decode_line(raw: str) -> str:
    r"""One line of text with %%c, %%d, %%p, %%nnn and \U+XXXX resolved and control characters replaced."""
    if "\\" in raw:
        raw = decode_dxf_unicode(raw)
    if "%%" in raw or "^" in raw:
        raw = plain_text(_CODE.sub(lambda match: chr(int(match.group(1))), raw))
    return clean_lines(raw)


def decode_paragraphs(raw: str) -> str:
    r"""The paragraphs of an MTEXT without their codes; '\n' between them, other control characters replaced."""
    if "\\" in raw:
        raw = decode_dxf_unicode(raw)
    # The library's scanner is slow; most texts hold no code but that of a new line.
    simple = raw.replace("\\P", "\n")
    if any(mark in simple for mark in "\\{}^") or "%%" in simple:
        return clean_lines("".join(plain_mtext(raw, split=False)))
    return clean_lines(simple)


def unstack(raw: str) -> str:
    r"""The raw text of a dimension with figures that stand on one another in a row, and '\X' as the end of a line.

    A fraction stands behind a blank ('5 1/2'), and so do two tolerances or limits, with blanks round their stroke
    (' +0.1 / -0.1'); one that is alone stands alone.
    """
    return _STACK.sub(_in_a_row, raw).replace("\\X", "\\P")


def _in_a_row(stack: re.Match[str]) -> str:
    upper, lower = stack[1].strip(), stack[3].strip()
    stroke = " / " if stack[2] == "^" else "/"
    return f" {stroke.join(part for part in (upper, lower) if part)}"


def read_text(_entity: DXFEntity, given: Given, source: Source, place: Placement) -> Shapes:
    """A TEXT; its alignment point lies in its object coordinate system."""
    content = decode_line(str(given.get("text", "")))
    if not content.strip():
        raise NotRead(_EMPTY)
    return _line_of_text(content, given, source, place)


def read_attribute(entity: DXFEntity, given: Given, source: Source, place: Placement) -> Shapes:
    """An ATTRIB of a block reference: a TEXT that may hold the paragraphs of an MTEXT."""
    assert isinstance(entity, Attrib)  # noqa: S101 - told by the kind
    if given.get("flags", 0) & _HIDDEN_ATTRIBUTE:
        raise NotRead(INVISIBLE)
    paragraphs = entity.virtual_mtext_entity().text if entity.has_embedded_mtext_entity else None
    content = decode_line(str(given.get("text", ""))) if paragraphs is None else decode_paragraphs(paragraphs)
    if not content.strip():
        raise NotRead(_EMPTY)
    return _line_of_text(content, given, source, place)


def _line_of_text(content: str, given: Given, source: Source, place: Placement) -> Shapes:
    height = abs(float(given.get("height", 1.0)))
    turn = cmath.rect(1.0, math.radians(given.get("rotation", 0.0)))
    width = TEXT_WIDTH_OF_HEIGHT * height * len(content) * float(given.get("width", 1.0))
    halign, valign = given.get("halign", 0), given.get("valign", 0)
    at, z = _point(given, "insert")
    if (halign or valign) and "align_point" in given:
        other, z_other = _point(given, "align_point")
        if halign in {_ALIGNED, _FIT}:
            span = other - at
            width, turn = abs(span), (span / abs(span) if span else turn)
        else:
            at, z = other, z_other
    require_numbers(at.real, at.imag, z, height, width, turn.real, turn.imag)
    left = _LEFT_OF_HALIGN.get(halign, 0.0) * width
    bottom = _BOTTOM_OF_VALIGN.get(valign, 0.0) * height if halign != _MIDDLE else -height / 2
    flags = given.get("text_generation_flag", 0)
    flip_x = -1.0 if flags & _MIRRORED_X else 1.0
    flip_y = -1.0 if flags & _UPSIDE_DOWN else 1.0
    corners = [place(at + turn * complex(flip_x * x, flip_y * y)) for x, y in _rectangle(left, bottom, width, height)]
    return (Text(source, content, place(at), height * place.scale, tuple(corners)),), 0.0, 0.0


def read_mtext(_entity: DXFEntity, given: Given, source: Source, place: Placement) -> Shapes:
    """An MTEXT, turned by its text direction or its rotation; wrapped to its column width where it states one."""
    raw = _entity.text if hasattr(_entity, "text") else ""
    content = decode_paragraphs(str(raw))
    if not content.strip():
        raise NotRead(_EMPTY)
    at, z = _point(given, "insert")
    height = abs(float(given.get("char_height", 2.5)))
    away = faces_away(given.get("extrusion", (0.0, 0.0, 1.0)))
    turn = _mtext_direction(given, away=away)
    width, lines = _wrapped(content.split("\n"), TEXT_WIDTH_OF_HEIGHT * height, float(given.get("width", 0.0) or 0.0))
    spacing = TEXT_LINE_OF_HEIGHT * float(given.get("line_spacing_factor", 1.0))
    room = height * (1.0 + (lines - 1) * spacing)
    require_numbers(at.real, at.imag, z, width, room, turn.real, turn.imag)
    row, column = divmod(min(max(int(given.get("attachment_point", 1)), 1), 9) - 1, 3)
    corners = _rectangle(-width * column / 2, -room * (2 - row) / 2 if row < 2 else 0.0, width, room)
    upward = -1j if away else 1j
    box = tuple(place(at + turn * x + turn * upward * y) for x, y in corners)
    return (Text(source, content, place(at), height * place.scale, box),), 0.0, 0.0


def _mtext_direction(given: Given, *, away: bool) -> complex:
    """Unit vector along the lines of an MTEXT; a direction, where stated, overrules the rotation."""
    if "text_direction" in given:
        x, y, _ = given["text_direction"].xyz
        length = math.hypot(x, y)
        return complex(x, y) / length if length else 1 + 0j
    turn = cmath.rect(1.0, math.radians(given.get("rotation", 0.0)))
    return -turn.conjugate() if away else turn


def _wrapped(lines: Sequence[str], letter: float, column: float) -> tuple[float, int]:
    """Width of the widest line and the number of lines, once those wider than the column (0: none) are broken."""
    widths = [letter * len(line) for line in lines]
    widest = max(widths)
    if column <= 0.0 or widest <= column:
        return widest, len(lines)
    return column, sum(max(1, math.ceil(width / column)) for width in widths)


def _rectangle(left: float, bottom: float, width: float, height: float) -> tuple[tuple[float, float], ...]:
    """Corners of an upright rectangle, counter-clockwise from the lower left one."""
    right, top = left + width, bottom + height
    return (left, bottom), (right, bottom), (right, top), (left, top)


def _point(given: Given, name: str) -> tuple[Point, float]:
    """A stated point and its z; the origin where it is missing."""
    x, y, z = given[name].xyz if name in given else (0.0, 0.0, 0.0)
    return complex(x, y), z
