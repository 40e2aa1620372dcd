"""What the text of a dimension states, where it can be told for sure.

Only a text that is understood to its last letter is read as a figure: 'HOLE 5' states no length.
"""

from __future__ import annotations

import ast
import math
import operator
import re
from collections.abc import Callable, Iterator
from itertools import chain

from dxfcheck.reading.lengths.figures import (
    FRACTION,
    NUMBER,
    UNIT,
    Figure,
    Meaning,
    plain_text,
    read_figure,
    read_numbers,
)
from dxfcheck.tolerances.sheet import LIMITS_ALIKE, MOST_REPEATS

__all__ = ["is_not_to_scale", "stated_figures"]

_MAGNITUDE = rf"(?:{FRACTION}|{NUMBER})"
_NOT_TO_SCALE = re.compile(r"\b(?:nts|n\.t\.s\.?|not to scale)(?!\w)", re.IGNORECASE)
_WORDS = re.compile(
    r"(?<!\w)(?:typ(?:ical)?|ref|nom(?:inal)?|basic|theor|overall|o/a|c/c|c-c|c to c|crs|ctrs|cent(?:er|re)s|lg|long|"
    r"thru|through|eq\.? ?sp|equally spaced|pl(?:aces|cs)?|plc|bsc|cl)(?!\w)\.?",
    re.IGNORECASE,
)
_ROUGHLY = re.compile(r"~|(?<!\w)(?:approx|ca|circa|about|abt)(?!\w)\.?", re.IGNORECASE)
_LEAST = re.compile(r"(?<!\w)min(?:imum)?(?!\w)\.?|≥|>=?", re.IGNORECASE)
_MOST = re.compile(r"(?<!\w)max(?:imum)?(?!\w)\.?|≤|<=?", re.IGNORECASE)
_BRACKETS = re.compile(r"\[([^\]]*)\]")
_PARENTHESES = re.compile(r"\(([^()]*)\)")
_NAME = re.compile(r"[^\W\d][\w.\- ']*")
_PREFIX = re.compile(r"(S ?Ø|Ø|dia(?:m|meter)?\b\.?|S ?R|R(?:ad(?:ius)?)?\b\.?|R(?=\s?[\d.,]))\s*", re.IGNORECASE)
_DIAMETER = re.compile(r"\s*(?:Ø|\bdia(?:m|meter)?\b\.?)$", re.IGNORECASE)
_SQUARE = re.compile(r"^(?:□|◻|\bsq(?:uare)?\b\.?|C(?=\s?\d))\s*|\s*(?:□|\bsq(?:uare)?\b\.?)$", re.IGNORECASE)
_COUNT = re.compile(r"\(?(\d{1,3}) ?(?:x|off\b|no\b\.?|pl(?:aces|cs|c)?\b\.?|\*|-(?= ?[ØR]))\)? ?(?=\S)", re.IGNORECASE)
_FIT = re.compile(r"(?<=\d)\s*(?:[A-HJ-NP-Z]|JS|js|[A-Z][A-C]|[a-hj-np-z]|z[a-c])\d{1,2}(?:/[A-Za-z]{1,2}\d{1,2})?$")
_PLUS_MINUS = re.compile(rf"\s*(?:±|\+ ?/ ?-|\+-)\s*({_MAGNITUDE})\s*(?:{UNIT}|°)?$", re.IGNORECASE)
_TWO_DEVIATIONS = re.compile(
    rf"(?:\s*([+-] ?{NUMBER})|\s(0(?:[.,]0+)?))\s*/?\s*(?:([+-] ?{NUMBER})|(?<![\d.,])(0(?:[.,]0+)?))\s*$"
)
_ONE_DEVIATION = re.compile(rf"\s+([+-] ?{NUMBER})$")
_RANGE = re.compile(rf"({_MAGNITUDE})\s*(/|-|\.\.\.?|…|÷| to | bis )\s*({_MAGNITUDE})\s*({UNIT}|°)?")
_SUM = re.compile(r"[\d.,+\-*/()x ]+")
_LONGEST_TEXT = 60
_OPERATIONS: dict[type[ast.operator], Callable[[float, float], float]] = {
    ast.Add: operator.add,
    ast.Sub: operator.sub,
    ast.Mult: operator.mul,
    ast.Div: operator.truediv,
}


def is_not_to_scale(text: str) -> bool:
    """Whether the text itself says that it is not to scale."""
    return bool(_NOT_TO_SCALE.search(text))


def stated_figures(text: str) -> tuple[Figure, ...]:
    """All figures a dimension's text may state, the plainest first; empty where it states none that is sure.

    Tolerances and limits widen the bounds of a figure; 'max' and 'min' open them.
    """
    plain = _NOT_TO_SCALE.sub(" ", plain_text(text)).strip()
    if len(plain) > _LONGEST_TEXT or not _has_digit(plain):
        return ()
    parts = [part.strip() for part in _without_second_unit(plain).split("=")]
    if len(parts) > 1 and (not parts[0] or _NAME.fullmatch(parts[0])):
        del parts[0]
    if len(parts) > 1 and _NAME.fullmatch(parts[-1]):
        del parts[-1]
    if not 0 < len(parts) <= 2 or not all(parts):
        return ()
    stated = _read(parts[-1])
    if len(parts) == 1 or not stated:
        return stated
    # '3 x 40 = 120' may stand over one part as well as over all three.
    return (*stated, *(figure for figure in _repeated(parts[0], whole=False)))


def _without_second_unit(plain: str) -> str:
    """The text without what stands in brackets; but '(=120)' closes a sum, and a text wholly in brackets is one."""
    outside = _BRACKETS.sub("", plain)
    plain = outside.strip() if _has_digit(outside) else _BRACKETS.sub(r"\1", plain)
    if "(" not in plain:
        return plain
    outside = _PARENTHESES.sub("", plain)
    if not _has_digit(outside):
        return _PARENTHESES.sub(r" \1 ", plain).strip()
    closing = _PARENTHESES.search(plain)
    if closing is not None and closing[1].strip().startswith("="):
        return f"{plain[: closing.start()]}{closing[1]}"
    if _value_of(plain.rpartition("=")[2]) is not None:
        return plain
    counted = _COUNT.match(plain)
    return plain if counted is not None and counted[0].endswith(")") else outside.strip()


def _has_digit(text: str) -> bool:
    return any(letter.isdigit() for letter in text)


def _read(part: str) -> tuple[Figure, ...]:
    """The figures of a part without an equals sign."""
    least, most, roughly = (bool(pattern.search(part)) for pattern in (_LEAST, _MOST, _ROUGHLY))
    counted = _COUNT.match(part)
    count, rest = (counted[0], part[counted.end() :]) if counted is not None else ("", part)
    for pattern in (_WORDS, _ROUGHLY, _LEAST, _MOST):
        rest = pattern.sub(" ; ", rest)  # so that figures on both sides of a word stay apart
    part = count + " ".join(rest.split()).strip(" ,;:")
    figures = tuple(_repeated(part, whole=True)) or _sum(part)
    if roughly:
        figures = tuple(_rounded(figure, part) for figure in figures)
    if least != most:
        return tuple(each._replace(high=math.inf) if least else each._replace(low=-math.inf) for each in figures)
    return figures


def _rounded(figure: Figure, part: str) -> Figure:
    """A figure that is only said to be about right: to half a unit of its last digit that is not 0."""
    digits = re.sub(r"\D", "", part)
    step = 10.0 ** (len(digits) - len(digits.rstrip("0"))) if digits.rstrip("0") else 1.0
    half = figure.half * step
    return figure._replace(low=min(figure.low, figure.value - half), high=max(figure.high, figure.value + half))


def _repeated(part: str, *, whole: bool) -> Iterator[Figure]:
    """The figures of '60', and of '2x60': 60, and (where the whole may be meant) 120."""
    count = _COUNT.match(part)
    if count is None:
        yield from _sized(part)
        return
    times = int(count[1])
    own = Figure(float(times), times - 0.5, times + 0.5)
    for figure in _sized(part[count.end() :]):
        yield figure
        if figure.meaning == "angle" or (figure.meaning == "length" and times > MOST_REPEATS):
            yield own  # '2x45°' is a chamfer, '60x40' are two sides
        if whole and figure.meaning == "length":
            yield figure._replace(value=figure.value * times, low=figure.low * times, high=figure.high * times)


def _sized(part: str) -> Iterator[Figure]:
    """The figures of '60', and of '2x45°' (a chamfer) the 2 and the 45 degrees."""
    yield from _toleranced(part)
    if "x" in part.lower():
        pieces = [tuple(_toleranced(piece.strip())) for piece in re.split("x", part, flags=re.IGNORECASE)]
        if all(pieces):
            yield from chain.from_iterable(pieces)


def _toleranced(part: str) -> Iterator[Figure]:
    """The figures of one size with its prefix, its fit and its tolerance."""
    part = _SQUARE.sub("", part)
    meaning: Meaning | None = None
    prefix = _PREFIX.match(part)
    if prefix is not None:
        meaning = "diameter" if prefix[1][-1] in "Øø" or prefix[1][0] in "dD" else "radius"
        part = part[prefix.end() :]
    elif _DIAMETER.search(part):
        meaning, part = "diameter", _DIAMETER.sub("", part)
    for figure in _with_deviations(part.strip()):
        yield figure._replace(meaning=meaning) if meaning and figure.meaning == "length" else figure


def _with_deviations(part: str) -> Iterator[Figure]:
    whole = read_figure(part)
    if whole:
        yield from whole
        return
    limits = _RANGE.fullmatch(part)
    found = tuple(_between(limits[1], limits[3], limits[4], limits[2].strip())) if limits is not None else ()
    if found:
        yield from found
        return
    size, low, high = _deviations(part)
    for figure in read_figure(_FIT.sub("", size)):
        bounds = min(figure.low, figure.value + low), max(figure.high, figure.value + high)
        yield figure._replace(low=bounds[0], high=bounds[1])


def _between(one: str, other: str, unit: str | None, mark: str) -> Iterator[Figure]:
    """Two limits, those written with a stroke in either order; the first as written stands for the figure.

    '100-20' is a difference, and '33.2/2' a division: the limits of one size are alike.
    """
    for first in read_figure(one + (unit or "")):
        for last in read_figure(other + (unit or "")):
            apart = first.value > last.value if mark != "/" else last.value < first.value / LIMITS_ALIKE
            if not apart:
                yield first._replace(low=min(first.low, last.low), high=max(first.high, last.high))


def _deviations(part: str) -> tuple[str, float, float]:
    """The size without its tolerance, and the lower and upper deviation."""
    both = _PLUS_MINUS.search(part)
    if both is not None:
        off = next(read_numbers(both[1]), (0.0, 0.0))[0]
        return part[: both.start()].strip(), -off, off
    two = _TWO_DEVIATIONS.search(part)
    one = _ONE_DEVIATION.search(part) if two is None else None
    found = two or one
    if found is None:
        return part, 0.0, 0.0
    signed = [_signed(text) for text in found.groups() if text]
    return part[: found.start()].strip(), min(0.0, *signed, 0.0), max(0.0, *signed, 0.0)


def _signed(text: str) -> float:
    value = next(read_numbers(text.lstrip("+- ")), (0.0, 0.0))[0]
    return -value if text.startswith("-") else value


def _sum(part: str) -> tuple[Figure, ...]:
    """The value of '33.2/2' or '40+2*15', to half a unit of the finest digit in it."""
    value = _value_of(part)
    if value is None:
        return ()
    halves = [half for number in re.findall(NUMBER, part) for _, half in read_numbers(number)]
    half = min(halves, default=0.5)
    return (Figure(value, value - half, value + half),)


def _value_of(part: str) -> float | None:
    """The value of a sum of plain numbers, None where it is none."""
    if not part or not _SUM.fullmatch(part):
        return None
    try:
        return _evaluate(ast.parse(part.replace(",", ".").replace("x", "*").strip(), mode="eval").body)
    except (SyntaxError, ValueError, ArithmeticError, RecursionError, MemoryError):
        return None


def _evaluate(node: ast.expr) -> float:
    if isinstance(node, ast.BinOp) and type(node.op) in _OPERATIONS:
        return _OPERATIONS[type(node.op)](_evaluate(node.left), _evaluate(node.right))
    if isinstance(node, ast.UnaryOp) and isinstance(node.op, ast.USub | ast.UAdd):
        return math.copysign(1.0, -1.0 if isinstance(node.op, ast.USub) else 1.0) * _evaluate(node.operand)
    if isinstance(node, ast.Constant) and isinstance(node.value, int | float):
        return float(node.value)
    msg = "not a sum"
    raise ValueError(msg)
