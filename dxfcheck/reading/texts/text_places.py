"""How far texts lie from pins and linework: from the alignment point or the box as drawn, whichever is nearer."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from dxfcheck.drawing.primitives import Text
from dxfcheck.reading.lines.nearness import ComplexArray, FloatArray, IntArray, near_pairs, pair_distances

__all__ = ["texts_near"]


def texts_near(
    texts: Sequence[Text], reaches: FloatArray, starts: ComplexArray, ends: ComplexArray
) -> tuple[IntArray, IntArray, FloatArray]:
    """Pairs of a text and a straight piece (or a point: start and end alike) within the text's reach of one another.

    ``reaches`` (T,) are lengths from the text's alignment point or box, ``starts`` and ``ends`` (S,) the pieces.
    Returns indices (K,) of texts, (K,) of pieces and their distances (K,), by text, then piece.
    """
    if not texts or not starts.size:
        none = np.zeros(0, dtype=np.int64)
        return none, none, np.zeros(0)
    outlines = np.array([(text.at, *text.box) if text.box else (text.at,) * 5 for text in texts], dtype=np.complex128)
    around = np.abs(outlines - outlines[:, :1]).max(axis=1)
    which, piece = near_pairs(outlines[:, 0], reaches + around, starts, ends)
    distance = _distances(outlines[which], starts[piece], ends[piece])
    near = distance <= reaches[which]
    return which[near], piece[near], distance[near]


def _distances(outlines: ComplexArray, starts: ComplexArray, ends: ComplexArray) -> FloatArray:
    """Distance of each outline (K, 5: the alignment point, then the corners of the box) from its piece (K,).

    The least of the outline's points from the piece and of the piece's ends from the sides of the box.
    """
    least: FloatArray = pair_distances(outlines, starts[:, None], ends[:, None]).min(axis=1)
    for corner, after in ((1, 2), (2, 3), (3, 4), (4, 1)):
        for end in (starts, ends):
            least = np.minimum(least, pair_distances(end, outlines[:, corner], outlines[:, after]))
    return least
