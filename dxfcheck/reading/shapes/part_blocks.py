"""Block references that the settings name as parts: each is one rigid link with its own rings as pins (rule 4)."""

from __future__ import annotations

import unicodedata
from collections import defaultdict
from collections.abc import Collection, Iterable, Sequence
from fnmatch import fnmatchcase
from functools import cache
from typing import NamedTuple

from dxfcheck.drawing.primitives import BlockUse, Source
from dxfcheck.reading.lines.linework import Strand
from dxfcheck.reading.lines.pins import PinSite

__all__ = ["PartGroup", "part_groups"]

Reference = tuple[int, tuple[BlockUse, ...]]


class PartGroup(NamedTuple):
    """One reference to a part block: its name, its strands and the sites of its rings, each in ascending order."""

    name: str
    strands: tuple[int, ...]
    sites: tuple[int, ...]


def part_groups(
    strands: Iterable[Strand], pins: Iterable[PinSite], patterns: Sequence[str], apart: Collection[int] = ()
) -> list[PartGroup]:
    """The parts, in drawing order; ``apart`` are strands used up as rings.

    Of nested references the outermost that matches counts. Copies of one arrayed reference are parts of their own.
    A ring on one centre with those of another part is a pin of both.
    """
    if not patterns:
        return []
    wanted = tuple(patterns)
    lines: defaultdict[Reference, list[int]] = defaultdict(list)
    sites: defaultdict[Reference, dict[int, None]] = defaultdict(dict)
    for strand in strands:
        reference = _part_of(strand.primitive.source, wanted)
        if reference is not None and strand.number not in apart:
            lines[reference].append(strand.number)
    for pin in pins:
        for ring in pin.rings:
            reference = _part_of(ring.source, wanted)
            if reference is not None:
                sites[reference][pin.number] = None
    order = sorted({*lines, *sites})
    return [PartGroup(key[1][-1].name, tuple(sorted(lines[key])), tuple(sorted(sites[key]))) for key in order]


def _part_of(source: Source, patterns: tuple[str, ...]) -> Reference | None:
    """The outermost reference around a primitive that is named a part, or None."""
    for depth, use in enumerate(source.blocks, start=1):
        if _is_named(use.name, patterns):
            return source.entity, source.blocks[:depth]
    return None


@cache
def _is_named(name: str, patterns: tuple[str, ...]) -> bool:
    """Whether a name matches a pattern, without case and accents, as layers are compared."""
    return any(fnmatchcase(_plain(name), _plain(pattern)) for pattern in patterns)


def _plain(name: str) -> str:
    letters = unicodedata.normalize("NFKD", name)
    return "".join(letter for letter in letters if not unicodedata.combining(letter)).upper()
