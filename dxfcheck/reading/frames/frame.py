"""Frame symbols in plain lines: a base line with hatch strokes on one side, or a hatch along it (reading rule 5)."""

from __future__ import annotations

from collections.abc import Collection, Sequence
from dataclasses import dataclass

from dxfcheck.reading.frames.bases import bases_along_hatches
from dxfcheck.reading.frames.legs import legs_of, on_two_pins, polyline_legs_of
from dxfcheck.reading.frames.strokes import accept_bases, loose_strokes, strokes_on_bases
from dxfcheck.reading.lines.landing import Landing
from dxfcheck.reading.lines.sheet import Sheet
from dxfcheck.reading.lines.touches import Touches

__all__ = ["LEG", "FrameSymbols", "find_frame_symbols", "symbols_apart"]

LEG = "leg of a frame symbol"


@dataclass(frozen=True, slots=True, kw_only=True)
class FrameSymbols:
    """Strands that are frame by a symbol (bases and legs) and strands that are its hatch strokes, with reasons.

    ``bases`` are the straight pieces (strand, number) that strokes stand on or a hatch runs along.
    """

    frame: dict[int, str]
    strokes: dict[int, str]
    bases: tuple[tuple[int, int], ...] = ()


def find_frame_symbols(
    sheet: Sheet,
    relevant: Collection[int],
    marks: Collection[int],
    landings: Sequence[Landing],
    boxes: Collection[int] = (),
    outlines: Collection[int] = (),
) -> FrameSymbols:
    """Frame symbols among the linework that hangs together with pins (``relevant`` strands, no ``marks``).

    ``boxes`` are strands of rectangles that may slide: a single rod that ends on one is no leg, the two of a triangle
    are. ``outlines`` are strands of outlines with holes: a stroke that ends on the side of one that lies over it is a
    stroke still, and a corner that comes to lie on a base makes no leg of one.
    """
    strands, tolerance = sheet.strands, sheet.tolerance
    ignored = sheet.ring_strands.union(marks)
    landed = {(landing.strand, landing.end) for landing in landings}
    links = on_two_pins(landings)
    standing = list(strokes_on_bases(sheet, relevant, ignored, landed))
    plain = [stroke for stroke in standing if stroke.base.strand not in links]
    bases, strokes = accept_bases(strands, plain, {})
    loose = list(loose_strokes(sheet, relevant, ignored, bases, strokes, landed, links))
    # A link that passes close by the strokes of a symbol is their base only where no other line is.
    placed = strokes.keys() | {stroke.strand for stroke in loose if stroke.base.strand not in links}
    loose.extend(stroke for stroke in standing if stroke.base.strand in links and stroke.strand not in placed)
    bases, strokes = accept_bases(strands, loose, strokes, bases)
    if outlines and bases:
        on_outlines = [number for number in relevant if _meets_any(sheet.touching, number, outlines)]
        covered = strokes_on_bases(sheet, on_outlines, ignored, landed, outlines)
        known = set(bases)
        more = [stroke for stroke in covered if stroke.base in known and stroke.strand not in strokes]
        bases, strokes = accept_bases(strands, more, strokes, bases)
    reasons = {base.strand: "base line of a frame symbol with hatch strokes" for base in bases}
    hatched = bases_along_hatches(strands, relevant, sheet.fills, sheet.pins, tolerance)
    reasons.update({base.strand: "base line with a hatch along it" for base in hatched if base.strand not in reasons})
    lines = [*bases, *hatched]
    legs = [
        *legs_of(sheet, lines, landings, boxes),
        *polyline_legs_of(strands, lines, landings, sheet.pins, tolerance, outlines),
    ]
    new = (leg for leg in legs if leg not in reasons and leg not in strokes)
    reasons.update(dict.fromkeys(new, LEG))
    return FrameSymbols(
        frame=reasons,
        strokes=dict.fromkeys(strokes, "hatch stroke of a frame symbol"),
        bases=tuple((base.strand, base.number) for base in lines),
    )


def _meets_any(touching: Touches, strand: int, others: Collection[int]) -> bool:
    """Whether some of the other strands lie near an end of a strand."""
    return any(touch.strand in others for end in (0, 1) for touch in touching.at(strand, end))


def symbols_apart(
    symbols: FrameSymbols, outlines: Sequence[Sequence[int]], touching: Touches
) -> frozenset[tuple[int, int]]:
    """Pairs (both ways round) of a line of a symbol and an outline with holes that it touches by chance: no welds."""
    holed = {strand for outline in outlines for strand in outline}.difference(symbols.frame)
    if not holed or not symbols.frame:
        return frozenset()
    drawn = sorted(holed.union(symbols.frame))
    met = ((strand, touch.strand) for strand in drawn for end in (0, 1) for touch in touching.at(strand, end))
    pairs = {(one, other) for one, other in met if (one in holed) != (other in holed)}
    pairs = {(one, other) for one, other in pairs if one in symbols.frame or other in symbols.frame}
    return frozenset(pairs | {(other, one) for one, other in pairs})
