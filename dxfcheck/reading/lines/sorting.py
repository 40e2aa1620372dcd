"""The primitives of a sketch by what they can be: rings, linework, texts, fills, or skipped at sight (rule 1)."""

from __future__ import annotations

from dataclasses import dataclass, replace
from operator import itemgetter

from dxfcheck.drawing.primitives import Arc, Dimension, Fate, Fill, Path, Ring, Segment, Sketch, Text
from dxfcheck.reading.lines.racks import pitch_lines
from dxfcheck.reading.lines.roles import BUILT_IN_ROLES, construction_reason, frame_reason, is_pitch
from dxfcheck.settings import LayerRoles

__all__ = ["Sorted", "sort_primitives"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Sorted:
    """Indices into Sketch.primitives beside the primitives themselves; ``skipped`` are fates by index.

    ``roles`` say which layers mean what. ``frame_lines`` are the linework indices that their layer or block makes
    frame, with the reason. ``racks`` are the places in ``lines`` (strand numbers) of pitch lines that are tangent to a
    pitch ring.
    """

    rings: tuple[tuple[int, Ring], ...]
    pitch_rings: tuple[tuple[int, Ring], ...]
    lines: tuple[tuple[int, Segment | Arc | Path], ...]
    frame_lines: dict[int, str]
    texts: tuple[tuple[int, Text], ...]
    fills: tuple[tuple[int, Fill], ...]
    skipped: dict[int, Fate]
    racks: frozenset[int] = frozenset()
    roles: LayerRoles = BUILT_IN_ROLES


def sort_primitives(sketch: Sketch, roles: LayerRoles = BUILT_IN_ROLES) -> Sorted:
    """Sort primitives by kind, linetype and by what ``roles`` say of their layer."""
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
        elif isinstance(primitive, Ring) and is_pitch(primitive.source, roles):
            pitch_rings.append((index, primitive))
        else:
            reason = construction_reason(primitive.source, roles)
            if reason is not None:
                skipped[index] = Fate("skipped", reason)
            elif isinstance(primitive, Fill):
                fills.append((index, primitive))
            elif isinstance(primitive, Ring):
                rings.append((index, primitive))
            else:
                lines.append((index, primitive))
                why = frame_reason(primitive.source, roles)
                if why is not None:
                    frame_lines[index] = why
    kinds = Sorted(
        rings=tuple(rings),
        pitch_rings=tuple(pitch_rings),
        lines=tuple(lines),
        frame_lines=frame_lines,
        texts=tuple(texts),
        fills=tuple(fills),
        skipped=skipped,
        roles=roles,
    )
    return _with_racks(sketch, kinds) if pitch_rings else kinds


def _with_racks(sketch: Sketch, kinds: Sorted) -> Sorted:
    """The same with its racks: plain pitch lines on a pitch layer, and chain lines, which are no longer skipped."""
    roles, rings = kinds.roles, [ring for _, ring in kinds.pitch_rings]
    looked_at = [*kinds.lines, *((index, sketch.primitives[index]) for index in kinds.skipped)]
    candidates = [
        (index, line) for index, line in looked_at if isinstance(line, Segment) and is_pitch(line.source, roles)
    ]
    racks = dict(candidates[place] for place in pitch_lines(rings, [line for _, line in candidates]))
    taken = racks.keys() & kinds.skipped.keys()
    whys = {index: frame_reason(racks[index].source, roles) for index in taken}
    lines = sorted([*kinds.lines, *((index, racks[index]) for index in taken)], key=itemgetter(0))
    return replace(
        kinds,
        lines=tuple(lines),
        frame_lines=kinds.frame_lines | {index: why for index, why in whys.items() if why is not None},
        skipped={index: fate for index, fate in kinds.skipped.items() if index not in taken},
        racks=frozenset(place for place, (index, _) in enumerate(lines) if index in racks),
    )
