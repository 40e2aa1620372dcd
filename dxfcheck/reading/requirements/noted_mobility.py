"""Expected mobilities in notes on the sheet: 'M = 1', 'DOF = 1', 'mobility 1', 'Laufgrad F = 1'."""

from __future__ import annotations

import re
from typing import NamedTuple

from dxfcheck.tolerances.sheet import LONE_FORCE_MOBILITY

__all__ = ["MobilityText", "find_mobility"]

_WORDS = (
    r"mobility",
    r"degrees?\s+of\s+freedom",
    r"dof",
    r"laufgrad",
    r"freiheitsgrade?",
    r"mobilité",
    r"degrés?\s+de\s+liberté",
    r"mobilità",
    r"grad[oi]\s+di\s+libertà",
    r"movilidad",
    r"grados?\s+de\s+libertad",
)
"""The word in English, German, French, Italian and Spanish."""

_COUNT = r"(?P<count>[+-]?\d+)(?![\w%°])(?!\s*[.,:/*x×]\s*\d)"
_LABELLED = re.compile(rf"(?<!\w)(?:{'|'.join(_WORDS)})(?!\w)\s*(?:\(?[MFW]\)?)?\s*[=:]?\s*{_COUNT}", re.IGNORECASE)
_MEANT = re.compile(rf"(?<!\w)(?:{'|'.join(_WORDS)})\s*[MFW]?\s*=\s*(?P<written>\S+)", re.IGNORECASE)
_LONE = re.compile(rf"\s*(?P<letter>[MF])\s*=\s*{_COUNT}\s*")


class MobilityText(NamedTuple):
    """An expected mobility in a line: its figure (None where ``written`` is no whole number) and its place.

    ``labelled`` is False for a lone 'F = 1', which may just as well be a force, and is a mobility beside a linkage
    only.
    """

    figure: int | None
    written: str
    labelled: bool
    start: int
    end: int


def find_mobility(line: str) -> MobilityText | None:
    """The expected mobility that a line states: after the word for it, or a letter M or F with nothing else."""
    match = _LABELLED.search(line)
    if match is not None:
        return MobilityText(int(match["count"]), match["count"], labelled=True, start=match.start(), end=match.end())
    match = _MEANT.search(line)
    if match is not None:
        return MobilityText(None, match["written"], labelled=True, start=match.start(), end=match.end())
    match = _LONE.fullmatch(line)
    if match is None:
        return None
    count = int(match["count"])
    if match["letter"] == "F" and abs(count) > LONE_FORCE_MOBILITY:
        return None
    return MobilityText(count, match["count"], labelled=match["letter"] == "M", start=match.start(), end=match.end())
