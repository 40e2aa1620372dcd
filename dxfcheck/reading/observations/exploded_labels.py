"""Labels that were exploded into lines: heaps of small strokes beside pins on a sheet where no pin has a label."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterator

import numpy as np

from dxfcheck.geometry import Point
from dxfcheck.reading.lines.linework import Strand
from dxfcheck.reading.lines.nearness import near_pairs
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.mechanisms.model import Model
from dxfcheck.reading.parts.parts import Parts
from dxfcheck.reading.reading import Observation
from dxfcheck.tolerances.sheet import (
    EXPLODED_LABELS,
    EXPLODED_LETTER_IN_DIAMETERS,
    EXPLODED_STROKES,
    LABEL_REACH_IN_DIAMETERS,
    PLACES_NAMED,
)

__all__ = ["observe_exploded_labels"]


def observe_exploded_labels(sheet: Sheet, parts: Parts, model: Model) -> Iterator[Observation]:
    """One observation where several pins have such a heap to one side of them, and none has a label."""
    sites = sorted({site for each in model.assembled for site in each.sites})
    if len(sites) < EXPLODED_LABELS or not model.names.labels.keys().isdisjoint(sites):
        return
    pins = [sheet.pins[site] for site in sites]
    strokes = _small_strokes(sheet, parts, EXPLODED_LETTER_IN_DIAMETERS * 2.0 * max(pin.radius for pin in pins))
    if not strokes:
        return
    centres = np.array([pin.at for pin in pins], dtype=np.complex128)
    reach = np.array([LABEL_REACH_IN_DIAMETERS * 2.0 * pin.radius for pin in pins])
    middles = np.array([middle for _, middle in strokes], dtype=np.complex128)
    beside: defaultdict[int, list[int]] = defaultdict(list)
    for number, stroke in zip(*(each.tolist() for each in near_pairs(centres, reach, middles, middles)), strict=True):
        pin = pins[number]
        small = strokes[stroke][0].length <= EXPLODED_LETTER_IN_DIAMETERS * 2.0 * pin.radius
        if small and abs(strokes[stroke][1] - pin.at) > pin.radii[-1]:
            beside[number].append(stroke)
    labelled = [
        number for number, heap in sorted(beside.items()) if _is_heap(pins[number].at, reach[number], heap, strokes)
    ]
    if len(labelled) >= EXPLODED_LABELS and 2 * len(labelled) >= len(pins):
        first = [stroke for number in labelled for stroke in beside[number][:1]][:PLACES_NAMED]
        yield Observation(
            kind="exploded-text",
            at=pins[labelled[0]].at,
            handles=tuple(model.strand_handles[strokes[stroke][0].number] for stroke in first),
            layer=strokes[first[0]][0].primitive.source.layer,
            amount=float(len(labelled)),
            limit=float(len(pins)),
        )


def _small_strokes(sheet: Sheet, parts: Parts, longest: float) -> list[tuple[Strand, Point]]:
    """Lines that are no part of anything, no longer than letters have them, with their middles."""
    owned = {strand for body in parts.bodies.bodies for strand in body.strands}
    owned.update(parts.marks, parts.symbols.strokes, parts.borders, sheet.ring_strands)
    owned.update(strand for box in parts.slides.boxes for strand in box.strands)
    return [
        (strand, sum((piece.start + piece.end) / 2 for piece in strand.pieces) / len(strand.pieces))
        for strand in sheet.strands
        if strand.length <= longest and strand.number not in owned and not strand.frame
    ]


def _is_heap(pin: Point, reach: float, heap: list[int], strokes: list[tuple[Strand, Point]]) -> bool:
    """Whether strokes are enough for a letter and stand to one side of the pin: a nut stands round it."""
    middle = sum(strokes[stroke][1] for stroke in heap) / len(heap)
    pieces = sum(len(strokes[stroke][0].pieces) for stroke in heap)
    return pieces >= EXPLODED_STROKES and abs(middle - pin) >= reach / 4
