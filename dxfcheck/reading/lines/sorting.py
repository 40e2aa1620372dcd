"""The primitives of a sketch by what they can be: rings, linework, texts, fills, or skipped at sight (rule 1)."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from operator import itemgetter

from dxfcheck.drawing.primitives import Arc, Dimension, Fate, Fill, Path, Ring, Segment, Sketch, Text
from dxfcheck.reading.lines.racks import pitch_lines
from dxfcheck.reading.lines.roles import construction_reason, frame_reason, is_pitch

__all__ = ["Sorted", "sort_primitives"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Sorted:
    """Indices into Sketch.primitives beside the primitives themselves; ``skipped`` are fates by index.

    ``frame_lines`` are the linework indices that their layer or block makes frame, with the reason. ``racks`` are the
    places in ``lines`` (strand numbers) of pitch lines that are tangent to a pitch ring.
    """

    rings: tuple[tuple[int, Ring], ...]
    pitch_rings: tuple[tuple[int, Ring], ...]
    lines: tuple[tuple[int, Segment | Arc | Path], ...]
    frame_lines: dict[int, str]
    texts: tuple[tuple[int, Text], ...]
    fills: tuple[tuple[int, Fill], ...]
    skipped: dict[int, Fate]
    racks: frozenset[int] = frozenset()


def sort_primitives(sketch: Sketch) -> Sorted:
    """Sort primitives by kind, layer and linetype."""
    rings: list[tuple[int, Ring]] = []
    pitch_rings: list[tuple[int, Ring]] = []
    lines: list[tuple[int, Segment | Arc | Path]] = []
    texts: list[tuple[int, Text]] = []
    fills: list[tuple[int, Fill]] = []
    frame_lines: dict[int, str] = {}
    skipped: dict[int, Fate] = {}
    for index, primitive in enumerate(sketch.primitives):
        if isinstance(primitive, Text):
            texts.append((index, primitive))
        elif isinstance(primitive, Dimension):
            skipped[index] = Fate("note", "dimension")
        elif isinstance(primitive, Ring) and is_pitch(primitive.source):
            pitch_rings.append((index, primitive))
        else:
            reason = construction_reason(primitive.source)
            if reason is not None:
                skipped[index] = Fate("skipped", reason)
            elif isinstance(primitive, Fill):
                fills.append((index, primitive))
            elif isinstance(primitive, Ring):
                rings.append((index, primitive))
            else:
                lines.append((index, primitive))
                why = frame_reason(primitive.source)
                if why is not None:
                    frame_lines[index] = why
    racks = _take_racks(sketch, [ring for _, ring in pitch_rings], lines, frame_lines, skipped) if pitch_rings else ()
    return Sorted(
        rings=tuple(rings),
        pitch_rings=tuple(pitch_rings),
        lines=tuple(lines),
        frame_lines=frame_lines,
        texts=tuple(texts),
        fills=tuple(fills),
        skipped=skipped,
        racks=frozenset(racks),
    )


def _take_racks(
    sketch: Sketch,
    rings: Sequence[Ring],
    lines: list[tuple[int, Segment | Arc | Path]],
    frame_lines: dict[int, str],
    skipped: dict[int, Fate],
) -> list[int]:
    """The places of pitch lines in ``lines``: plain ones on a pitch layer, and chain lines moved from ``skipped``."""
    candidates = [(index, line) for index, line in lines if isinstance(line, Segment) and is_pitch(line.source)]
    passed_over = ((index, sketch.primitives[index]) for index in skipped)
    candidates += [(index, line) for index, line in passed_over if isinstance(line, Segment) and is_pitch(line.source)]
    racks = dict(candidates[place] for place in pitch_lines(rings, [line for _, line in candidates]))
    if not racks:
        return []
    for index in racks.keys() & skipped.keys():
        del skipped[index]
        lines.append((index, racks[index]))
        why = frame_reason(racks[index].source)
        if why is not None:
            frame_lines[index] = why
    lines.sort(key=itemgetter(0))
    return [place for place, (index, _) in enumerate(lines) if index in racks]
