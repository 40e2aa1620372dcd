"""Lengths that notes on the sheet state ('AB = 120 mm'), against the drawn distance of the two pins (rule 9)."""

from __future__ import annotations

import re
from collections import defaultdict
from collections.abc import Iterable, Iterator, Mapping, Sequence
from typing import NamedTuple

from dxfcheck.drawing.primitives import LengthUnit, Text
from dxfcheck.geometry import Point, distance_to_segment
from dxfcheck.linkage import Linkage
from dxfcheck.reading.lengths.dimension_text import stated_figures
from dxfcheck.reading.lengths.figures import FRACTION, NUMBER, UNIT, Figure, plain_text
from dxfcheck.reading.lengths.mix_ups import Mismatch
from dxfcheck.reading.lengths.overrides import agrees, unit_factor
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.tolerances.sheet import NOTE_CLEARLY_NEARER

__all__ = ["LengthNote", "judge_length_notes"]

_SHORTEST = 4
"""'AB=5'."""
_KIND = (
    r"(?:links?|lengths?|distances?|dist|crank|coupler|rod|rocker|lever|bar|arm|frame|base|centres|centers|"
    r"länge|abstand|kurbel|koppel|schwinge|stab|longueur|lunghezza|longitud)"
)
_NAME = r"[^\W_](?:[^\W_]|['*]){0,3}?"
_TOLERANCE = rf"(?: ?(?:±|\+/-) ?{NUMBER}(?: ?(?:{UNIT}))?)?"
_RANGE = rf"(?: ?(?:-|\.\.\.?|to\b|bis\b) ?{NUMBER}(?: ?(?:{UNIT}))?)?"
_SIZE = rf"(?:{FRACTION}|{NUMBER})(?: ?(?:{UNIT}))?(?: ?-? ?(?:{FRACTION}|{NUMBER}) ?\")?{_RANGE}{_TOLERANCE}"
_NOTE = re.compile(
    rf"(?:^|[,;:.\n(|=]|(?<=\d) |(?<=mm) |\b{_KIND}\b\.?:?)\s*\|?(?:[lLd] ?_ ?[({{]?)?"
    rf"(?P<one>{_NAME})(?P<dash> ?- ?)?(?P<other>{_NAME})[)}}]?\|?\s*=\s*(?P<size>{_SIZE})"
    # not '120 kg' or '120 rad/s', unless the word begins another statement
    r"(?![\d.,]*\d| ?[\w°%/:^*·+](?![^=\n]{0,9}=))",
    re.IGNORECASE,
)


class LengthNote(NamedTuple):
    """A note on the distance of two pins, and how it stands to the drawn one.

    ``mismatch`` is None where it agrees; ``unit`` is the unit it would agree in, without being converted, where it
    names one other than the drawing's. ``joined`` is False where no single link holds both pins.
    """

    pins: str
    mechanism: str
    mismatch: Mismatch | None
    unit: str | None
    joined: bool
    text: Text


class _Pair(NamedTuple):
    linkage: Linkage
    one: int
    other: int

    @property
    def ends(self) -> tuple[Point, Point]:
        return self.linkage.pins[self.one].at, self.linkage.pins[self.other].at


class _Said(NamedTuple):
    one: str
    other: str
    dashed: bool
    size: str


def judge_length_notes(
    linkages: Sequence[Linkage],
    texts: Iterable[tuple[Text, str]],
    unit: LengthUnit,
    tolerance: Tolerance,
) -> list[LengthNote]:
    """The notes that state the distance of two pins of one linkage; ``texts`` come with their handles.

    Of several linkages with such pins the one beside which the note stands is meant. A text that gives a pair several
    lengths lists variants: one of them has to be the drawn one.
    """
    said = [
        (text, handle, each)
        for text, handle in texts
        if "=" in text.content and len(text.content) >= _SHORTEST
        for each in _statements(text.content)
    ]
    if not said:
        return []
    pins: defaultdict[str, list[tuple[Linkage, int]]] = defaultdict(list)
    for linkage in linkages:
        for index, pin in enumerate(linkage.pins):
            pins[pin.name].append((linkage, index))
    judged = (_judge(text, handle, each, pins, unit, tolerance) for text, handle, each in said)
    found = [note for note in judged if note is not None]
    right = {(id(note.text), note.mechanism, note.pins) for note in found if note.mismatch is None}
    return [note for note in found if note.mismatch is None or (id(note.text), note.mechanism, note.pins) not in right]


def _statements(content: str) -> Iterator[_Said]:
    lines = "\n".join(plain_text(line) for line in content.splitlines())
    for match in _NOTE.finditer(lines):
        yield _Said(match["one"], match["other"], match["dash"] is not None, match["size"].strip())


def _judge(
    text: Text,
    handle: str,
    said: _Said,
    pins: Mapping[str, Sequence[tuple[Linkage, int]]],
    unit: LengthUnit,
    tolerance: Tolerance,
) -> LengthNote | None:
    figures = [figure for figure in stated_figures(said.size) if figure.meaning == "length"]
    pairs = _pairs(said, pins)
    if not figures or not pairs:
        return None
    slack = 2.0 * max(tolerance.t, tolerance.typed)
    meant = _meant(text, pairs)
    for pair in meant:
        note = _compared(text, handle, said, pair, figures, unit, slack)
        if note.mismatch is None:
            return note
    return _compared(text, handle, said, meant[0], figures, unit, slack) if len(meant) == 1 else None


def _pairs(said: _Said, pins: Mapping[str, Sequence[tuple[Linkage, int]]]) -> list[_Pair]:
    """Two pins of one linkage, for each way in which the names may be told apart; none where they are one pin's name.

    Two mere numbers run together are no names of pins: '12 = 5'.
    """
    whole = said.one + said.other
    if said.dashed:
        splits = [(said.one, said.other)]
    elif whole in pins or whole.isdecimal():
        return []
    else:
        splits = _splits(whole, pins) or (_splits(whole[1:], pins) if whole[0] in "lLd" else [])
    found: list[_Pair] = []
    for one, other in splits:
        if one == other or one not in pins or other not in pins:
            continue
        others: defaultdict[int, list[int]] = defaultdict(list)
        for linkage, index in pins[other]:
            others[id(linkage)].append(index)
        found += (
            _Pair(linkage, index, second) for linkage, index in pins[one] for second in others.get(id(linkage), ())
        )
    return found


def _splits(whole: str, pins: Mapping[str, Sequence[tuple[Linkage, int]]]) -> list[tuple[str, str]]:
    """The ways in which a name falls into those of two pins."""
    pairs = ((whole[:place], whole[place:]) for place in range(1, len(whole)))
    return [(one, other) for one, other in pairs if one in pins and other in pins]


def _meant(text: Text, pairs: list[_Pair]) -> list[_Pair]:
    """The pair that the note clearly stands beside, or all of them, nearest first."""
    if len(pairs) == 1:
        return pairs
    marks = (text.at, *text.box)
    near = sorted(
        ((min(distance_to_segment(mark, *pair.ends) for mark in marks), place) for place, pair in enumerate(pairs))
    )
    if near[0][0] <= NOTE_CLEARLY_NEARER * near[1][0]:
        return [pairs[near[0][1]]]
    return [pairs[place] for _, place in near]


def _compared(
    text: Text,
    handle: str,
    said: _Said,
    pair: _Pair,
    figures: Sequence[Figure],
    unit: LengthUnit,
    slack: float,
) -> LengthNote:
    one, other = pair.ends
    drawn = abs(other - one)
    linkage = pair.linkage
    joined = any(pair.one in link.pins and pair.other in link.pins for link in linkage.links)
    names = f"{linkage.pins[pair.one].name}-{linkage.pins[pair.other].name}"
    named: str | None = None
    mismatch: Mismatch | None = None
    if not any(agrees(figure, drawn, unit, slack) for figure in figures):
        named = next(
            (each.unit for each in figures if each.unit and agrees(each._replace(unit=None), drawn, unit, slack)), None
        )
        factor = unit_factor(figures[0], unit)
        mismatch = (
            None
            if named
            else Mismatch(
                text=f"{names} = {said.size}",
                stated=figures[0].value * factor,
                drawn=drawn,
                half=figures[0].half * factor,
                kind="note",
                at=text.at,
                handle=handle,
                layer=text.source.layer,
            )
        )
    return LengthNote(names, linkage.name, mismatch, named, joined, text)
