"""Which links a note stands beside (reading rule 9)."""

from __future__ import annotations

import math
from collections.abc import Sequence

import numpy as np

from dxfcheck.drawing.primitives import Text
from dxfcheck.geometry import Point
from dxfcheck.reading.drives.drive_names import Place, Target
from dxfcheck.reading.texts.text_places import texts_near
from dxfcheck.tolerances.sheet import NAMED_NOTE_REACH_IN_HEIGHTS, NOTE_CLEARLY_NEARER

__all__ = ["Near", "Shapes", "clearly_nearest", "near_links", "nearest_of"]

Shapes = Sequence[Sequence[Sequence[tuple[Point, Point]]]]
"""For each linkage and each of its links, the straight pieces it is drawn with."""

Near = Sequence[tuple[float, Place]]
"""Links in the neighbourhood of a note with their distances from it, nearest first."""


def near_links(texts: Sequence[Text], shapes: Shapes) -> list[Near]:
    """For each text, the links in its neighbourhood."""
    pieces = [
        (Place(number, link), piece)
        for number, links in enumerate(shapes)
        for link, drawn in enumerate(links)
        for piece in drawn
    ]
    found: list[dict[Place, float]] = [{} for _ in texts]
    reaches = np.array([NAMED_NOTE_REACH_IN_HEIGHTS * text.height for text in texts])
    starts = np.array([piece[0] for _, piece in pieces], dtype=np.complex128)
    ends = np.array([piece[1] for _, piece in pieces], dtype=np.complex128)
    near = texts_near(texts, reaches, starts, ends)
    for number, index, distance in zip(*(each.tolist() for each in near), strict=True):
        place = pieces[index][0]
        found[number][place] = min(distance, found[number].get(place, math.inf))
    return [sorted((distance, place) for place, distance in each.items()) for each in found]


def nearest_of(targets: Sequence[Target], near: Near) -> list[Target]:
    """Of several targets that a name fits, the one whose linework the note clearly stands beside.

    All those it stands beside, where none is clearly nearest; none, where it stands beside none.
    """
    distances = {place: distance for distance, place in near}
    beside = []
    for target in targets:
        shown = [distances.get(Place(target.linkage, link), math.inf) for link in target.shown]
        if min(shown, default=math.inf) < math.inf:
            beside.append((min(shown), target))
    return clearly_nearest(sorted(beside, key=lambda each: each[0]))


def clearly_nearest(near: Sequence[tuple[float, Target]]) -> list[Target]:
    """The nearest target alone where the next is clearly further off, else all of them; ``near`` is nearest first."""
    if len(near) > 1 and near[0][0] <= NOTE_CLEARLY_NEARER * near[1][0]:
        return [near[0][1]]
    return [target for _, target in near]
