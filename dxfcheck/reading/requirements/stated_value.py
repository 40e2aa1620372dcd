"""Stated figures with what bounds them: '<= 2 m/s', '0.35 m/s ± 1 %', '0.4 to 0.6', '4 rad/s cw'."""

from __future__ import annotations

import math
import re
from typing import Literal, NamedTuple

from dxfcheck.reading.drives.speed_units import (
    CLOCKWISE,
    NUMBER,
    SENSE,
    UNIT,
    SpeedUnit,
    may_be_thousands,
    number_of,
    unit_of,
)
from dxfcheck.settings import Figure
from dxfcheck.tolerances.sheet import EXPECTED_RELATIVE

__all__ = ["BOUND", "VALUE", "StatedValue", "ValueKind", "ValueUnclear", "value_of"]

ValueKind = Literal["turn", "slide", "number"]

_MOST = r"<=|=<|≤|<|at\s+most|not?\s+more\s+than|not\s+over|up\s+to|max(?:imum|\.)?(?![^\W_])"
_LEAST = r">=|=>|≥|>|at\s+least|not?\s+less\s+than|min(?:imum|\.)?(?![^\W_])"
BOUND = rf"(?:{_MOST}|{_LEAST})"
"""Pattern of the words and signs that make a figure a limit."""

_UNIT = rf"(?:{UNIT})(?![\w/^])"
_TURN = rf"[\s,;(\[]*(?:{SENSE})(?!\w)[\])]?"
# A dash is a range only where what follows can be nothing else: '4-6 rad/s', but not '10 rad/s - 20 mm'.
_RANGE = rf"(?:to|\.\.\.?|(?(unit)-(?=\s*{NUMBER}\s*{_UNIT})|-(?=\s*[\d.,])))"
_LATE = r"(?:[\s,;(]*(?P<late>max(?:imum|\.)?|min(?:imum|\.)?)(?=\s*(?:$|[,;)\]])))?"
VALUE = (
    rf"\(?\s*(?P<number>{NUMBER})(?:\s*(?P<unit>{_UNIT})|\s*[:/]\s*(?P<divisor>{NUMBER}))?(?P<sense>{_TURN})?"
    rf"(?:\s*{_RANGE}\s*(?P<upper>{NUMBER})(?:\s*(?P<upper_unit>{_UNIT}))?"
    rf"|\s*(?:±|\+/-|\+-)\s*(?P<off>{NUMBER})(?:\s*(?P<off_unit>%|{_UNIT}))?)?"
    rf"\s*\)?(?:\s*(?P<common>{_UNIT}))?(?P<late_sense>{_TURN})?{_LATE}"
)
"""Pattern of a figure with its unit, its sense, and a tolerance or an upper end; after ``plain_text``, without case."""

_WORD = re.compile(SENSE, re.IGNORECASE)
_PLAIN = SpeedUnit("turn", 1.0)


class ValueUnclear(ValueError):
    """A figure that cannot be understood; the text says why."""


class StatedValue(NamedTuple):
    """A figure as stated: rad/s for 'turn', m/s for 'slide', plain for 'number'.

    ``expected`` is None where only bounds are stated. ``signed`` says that a sign or a sense is written;
    ``toleranced`` that a tolerance is.
    """

    kind: ValueKind
    least: Figure | None
    greatest: Figure | None
    expected: Figure | None
    signed: bool
    toleranced: bool = False


def _is_most(bound: str) -> bool:
    """Whether a bound (that BOUND fits) is an upper one."""
    return re.fullmatch(_MOST, bound.strip(), re.IGNORECASE) is not None


def value_of(match: re.Match[str], bound: str = "", *, revolutions: bool = False) -> StatedValue:
    """The figure of a match of VALUE after ``bound`` ('' where none is written); ValueUnclear says what is wrong.

    ``revolutions`` as for ``unit_of``.
    """
    kind, unit = _unit(match, revolutions=revolutions)
    bound = bound or match["late"] or ""
    sense = _sense(match)
    number = _figure(match["number"])
    if match["divisor"]:
        number = _divided(number, match["divisor"], kind)
    if sense and kind != "turn":
        msg = f"only a speed of turning has a sense, {sense!r}"
        raise ValueUnclear(msg)
    if sense and match["number"].startswith(("-", "+")):
        msg = f"it carries a sign and says {sense!r} as well"
        raise ValueUnclear(msg)
    low, high, expected = _ends(match, number, unit, bound, revolutions=revolutions)
    if sense in CLOCKWISE:
        low, high = (None if high is None else -high), (None if low is None else -low)
        expected = None if expected is None else -expected
    figures = [None if each is None else _stated(each, unit) for each in (low, high, expected)]
    signed = bool(sense) or match["number"].startswith(("-", "+"))
    return StatedValue(kind, figures[0], figures[1], figures[2], signed, bool(match["off"]))


def _ends(
    match: re.Match[str], number: float, unit: SpeedUnit, bound: str, *, revolutions: bool
) -> tuple[float | None, float | None, float | None]:
    """Least, greatest and expected, in rad/s, m/s or plain."""
    figure = number * unit.factor
    if bound and (match["off"] or match["upper"]):
        msg = f"it says {bound.strip()!r} and gives {'a tolerance' if match['off'] else 'a range'} as well"
        raise ValueUnclear(msg)
    if bound:
        return (None, figure, None) if _is_most(bound) else (figure, None, None)
    if match["upper"]:
        upper = _figure(match["upper"]) * unit.factor
        if upper < figure:
            msg = f"{match['upper'].strip()} is less than {match['number'].strip()}: state the lesser figure first"
            raise ValueUnclear(msg)
        return figure, upper, None
    off = _off(match, figure, unit, revolutions=revolutions)
    return figure - off, figure + off, figure


def _off(match: re.Match[str], figure: float, unit: SpeedUnit, *, revolutions: bool) -> float:
    """How far off the figure may be."""
    if not match["off"]:
        return abs(figure) * EXPECTED_RELATIVE
    off, named = _figure(match["off"]), match["off_unit"]
    if off < 0.0:
        msg = "its tolerance is below 0"
        raise ValueUnclear(msg)
    if named == "%":
        if figure == 0.0:
            msg = "per cent of 0 is 0: state the tolerance as a figure with a unit"
            raise ValueUnclear(msg)
        return abs(figure) * off / 100.0
    return off * (unit_of(named, revolutions=revolutions).factor if named else unit.factor)


def _unit(match: re.Match[str], *, revolutions: bool) -> tuple[ValueKind, SpeedUnit]:
    """The unit of the figure: its own, or the one after a range, a tolerance or a bracket."""
    others = [match["unit"], match["common"], match["upper_unit"]]
    written = [each for each in (*others, match["off_unit"]) if each and each != "%"]
    units = [unit_of(each, revolutions=revolutions) for each in written]
    if not units:
        return "number", _PLAIN
    if any(each.kind != units[0].kind for each in units):
        msg = f"{written[0]!r} and {written[-1]!r} do not go together"
        raise ValueUnclear(msg)
    if len({each.lower() for each in others if each}) > 1:
        msg = f"it gives two units, {written[0]!r} and {written[1]!r}"
        raise ValueUnclear(msg)
    return units[0].kind, units[0]


def _sense(match: re.Match[str]) -> str:
    """The sense of turning, in small letters, '' where none is written."""
    said = [_WORD.search(each) for each in (match["sense"], match["late_sense"]) if each]
    words = [each[0].lower() for each in said if each]
    if len(words) > 1:
        msg = f"it says {words[0]!r} and {words[1]!r}"
        raise ValueUnclear(msg)
    return words[0] if words else ""


def _divided(number: float, divisor: str, kind: ValueKind) -> float:
    """A ratio written as two figures, '1:2'."""
    by = _figure(divisor)
    if kind != "number" or by == 0.0:
        msg = f"{divisor.strip()!r} cannot be divided by" if by == 0.0 else "a speed is no fraction"
        raise ValueUnclear(msg)
    return number / by


def _figure(written: str) -> float:
    number = number_of(written)
    if not math.isfinite(number):
        msg = f"{written.strip()} is not a finite number"
        raise ValueUnclear(msg)
    if may_be_thousands(written.strip()):
        msg = f"{written.strip()!r} can be read as a decimal or in thousands"
        raise ValueUnclear(msg)
    return number


def _stated(amount: float, unit: SpeedUnit) -> Figure:
    return Figure(amount, amount / unit.metres)
