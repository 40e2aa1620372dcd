"""How findings speak of limits and expectations: what runs how fast, what was stated, and by how much they differ."""

from __future__ import annotations

import math

from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.requirements.verdict import Verdict
from dxfcheck.rules.wording import place
from dxfcheck.settings import Requirement

__all__ = ["beyond", "figure_of", "runs", "stated_where"]

HUNDREDS = 999.5
"""From here on three digits of a percentage are fewer than its whole ones."""


def stated_where(requirement: Requirement) -> str:
    """Where a requirement was stated, with its words."""
    if requirement.source == "note":
        at = "" if requirement.at is None else f" at {place(requirement.at)}"
        return f"set by the note '{requirement.stated}'{at}"
    if requirement.source == "option":
        return f"set by the option {requirement.stated}"
    return f"set as '{requirement.stated}' in {requirement.where or 'the settings'}"


def figure_of(verdict: Verdict, figure: float, unit: LengthUnit, *, size: bool = False) -> str:
    """A figure of a verdict's kind with its unit; a speed of turning with its sense, unless its ``size`` is meant."""
    if verdict.quantity in {"mobility", "speed-ratio"}:
        return f"{figure:.4g}"
    if verdict.quantity == "link-speed":
        sense = "" if size or figure == 0.0 else (" ccw" if figure > 0.0 else " cw")
        turns = abs(figure) * 60.0 / math.tau
        return f"{abs(figure):.4g} rad/s{sense} ({turns:.4g} r/min)"
    along = abs(figure) if size else figure
    return f"{along:.4g} {'units' if unit.metres is None else unit.name}/s"


def runs(verdict: Verdict, unit: LengthUnit) -> str:
    """What runs how fast: 'pin C of M1 runs at 350 mm/s'."""
    actual = verdict.actual or 0.0
    told = figure_of(verdict, actual, unit, size=verdict.quantity != "link-speed" and not verdict.requirement.signed)
    against = f" against {verdict.against}" if verdict.against else ""
    of = f" of {verdict.mechanism}"
    match verdict.quantity:
        case "pin-speed":
            return f"pin {verdict.subject}{of} runs at {told}"
        case "rubbing-speed":
            return f"{verdict.against}{of} rub on one another at pin {verdict.subject} at {told}"
        case "slide-speed":
            return f"{verdict.subject}{of} slides{against} at {told}"
        case "speed-ratio":
            ways = "the same way" if actual > 0.0 else "the other way"
            return f"{verdict.subject}{of} turns {abs(actual):.4g} times as fast as {verdict.against}, {ways}"
        case _:
            return f"{verdict.subject}{of} turns{against} at {told}"


def beyond(verdict: Verdict, unit: LengthUnit) -> str:
    """By how much it is beyond what bounds it: '15.7 % over its limit of 2000 mm/s'."""
    bounds, signed = verdict.bounds, verdict.requirement.signed
    actual = verdict.actual or 0.0
    figure = actual if signed else abs(actual)
    if bounds.expected is not None:
        expected = figure_of(verdict, bounds.expected, unit, size=not signed)
        low, high = bounds.least, bounds.greatest
        within = "" if low is None or high is None else f" (from {_plain(low)} to {_plain(high)} holds)"
        if figure * bounds.expected < 0.0:
            return f"the other way than the {expected} expected{within}"
        way = "more" if abs(figure) > abs(bounds.expected) else "less"
        return f"{_part(figure, bounds.expected)}{way} than the {expected} expected{within}"
    if bounds.greatest is not None and figure > bounds.greatest:
        limit = figure_of(verdict, bounds.greatest, unit, size=not signed)
        return f"{_part(figure, bounds.greatest)}over its limit of {limit}"
    least = bounds.least or 0.0
    return f"{_part(figure, least)}under its least of {figure_of(verdict, least, unit, size=not signed)}"


def _part(figure: float, bound: float) -> str:
    """The difference from a bound in per cent of it; nothing where the bound is 0."""
    if bound == 0.0:
        return ""
    part = abs(figure - bound) / abs(bound) * 100.0
    return f"{part:.3g} % " if part < HUNDREDS else f"{part:.0f} % "


def _plain(figure: float) -> str:
    return f"{figure:.4g}"
