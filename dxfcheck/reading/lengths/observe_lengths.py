"""What the sheet says of lengths and of its unit, and where that disagrees with what is drawn."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from dxfcheck.drawing.primitives import Dimension, LengthUnit, Sketch, Text
from dxfcheck.geometry import Point
from dxfcheck.linkage import Linkage
from dxfcheck.reading.lengths.dimension_points import points_off_geometry
from dxfcheck.reading.lengths.length_notes import LengthNote, judge_length_notes
from dxfcheck.reading.lengths.length_words import difference, place, scale_named, size
from dxfcheck.reading.lengths.mix_ups import INCH_IN_MILLIMETRES, Mismatch, shared_factor
from dxfcheck.reading.lengths.overrides import Override, judge_overrides, middle_of
from dxfcheck.reading.lengths.unit_doubts import doubt_units
from dxfcheck.reading.lengths.unit_signs import UNIT_WORDS, UnitSign, signs_of_styles, signs_of_texts, unit_shown
from dxfcheck.reading.lines.sorting import Sorted
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.reading.reading import Observation
from dxfcheck.tolerances.sheet import PLACES_NAMED

__all__ = ["observe_lengths"]


def observe_lengths(
    sketch: Sketch, kinds: Sorted, tolerance: Tolerance, linkages: Sequence[Linkage]
) -> Iterator[Observation]:
    """All observations on dimensions, stated lengths and the length unit."""
    dimensions = _dimensions(sketch, kinds)
    texts = [(text, sketch.handles(text)) for _, text in kinds.texts]
    overrides = judge_overrides(sketch, dimensions)
    notes = judge_length_notes(linkages, texts, sketch.unit, tolerance) if linkages else []
    yield from _overrides(sketch, overrides, held=bool(linkages))
    yield from _notes(sketch.unit, notes)
    if linkages:
        yield from _scaled(sketch, dimensions)
    if dimensions:
        yield from _off_points(sketch, dimensions, tolerance, held=bool(linkages))
    signs = [*_signs(sketch, dimensions, overrides, notes), *signs_of_texts(texts)]
    yield from doubt_units(sketch, linkages, signs)


def _dimensions(sketch: Sketch, kinds: Sorted) -> list[Dimension]:
    skipped = (sketch.primitives[index] for index, fate in kinds.skipped.items() if fate.why == "dimension")
    return [each for each in skipped if isinstance(each, Dimension)]


def _overrides(sketch: Sketch, overrides: Sequence[Override], *, held: bool) -> Iterator[Observation]:
    wrong = [each.mismatch for each in overrides if each.mismatch is not None and not each.marked]
    agreeing = [each for each in overrides if each.mismatch is None and each.dimension.kind != "angular"]
    factor = shared_factor(wrong) if not agreeing else None
    if factor is not None:
        yield _shared(wrong, factor)
    else:
        yield from (_override(each, sketch.unit) for each in wrong)
    if held:
        marked = (each.mismatch for each in overrides if each.marked and each.mismatch is not None)
        yield from (_override(each, sketch.unit, marked=True) for each in marked)


def _scaled(sketch: Sketch, dimensions: Sequence[Dimension]) -> Iterator[Observation]:
    """A note where every dimension shows other lengths than are drawn, by the linear factor of its style.

    A factor between units, with the unit shown, is no scale.
    """
    lengths = [each for each in dimensions if each.kind != "angular" and not each.source.blocks]
    factors = {each.style.factor for each in lengths}
    if len(factors) != 1 or factors == {1.0} or any(unit_shown(each.style) for each in lengths):
        return
    factor = factors.pop()
    shown = "all dimensions show" if len(lengths) > 1 else "the one dimension shows"
    yield Observation(
        kind="dimension-override",
        at=middle_of(lengths[0].points),
        handles=tuple(sketch.handles(each) for each in lengths[:PLACES_NAMED]),
        layer=lengths[0].source.layer,
        amount=factor,
        subject="",
        detail=f"{shown} {factor:g} times what is drawn (linear factor of their style); lengths and speeds "
        "are those that are drawn",
        severity="note",
    )


def _shared(wrong: Sequence[Mismatch], factor: float) -> Observation:
    """One observation for texts that all miss by the same factor."""
    return Observation(
        kind="dimension-override",
        at=wrong[0].at,
        handles=tuple(each.handle for each in wrong),
        layer=wrong[0].layer,
        amount=factor,
        detail=f"all {len(wrong)} dimension texts written by hand say {_times(factor)} what they measure: "
        f"{_explained(factor)}?",
    )


def _times(factor: float) -> str:
    return f"{factor:g} times" if factor > 1.0 else f"1/{1.0 / factor:g} of"


def _explained(factor: float) -> str:
    """What a factor that all stated lengths share may come from."""
    mixed = factor in {INCH_IN_MILLIMETRES, 1.0 / INCH_IN_MILLIMETRES}
    return "inches and millimetres mixed up" if mixed else scale_named(factor)


def _override(mismatch: Mismatch, unit: LengthUnit, *, marked: bool = False) -> Observation:
    drawn = size(mismatch.drawn, unit, is_angle=mismatch.is_angle)
    if marked:
        said = (
            f"text '{mismatch.text}' is marked as not to scale; speeds are worked out from the {drawn} that are drawn"
        )
    else:
        said = f"text '{mismatch.text}' over a measured {drawn}: {difference(mismatch, unit)}"
    return Observation(
        kind="dimension-override",
        at=mismatch.at,
        handles=(mismatch.handle,),
        layer=mismatch.layer,
        amount=mismatch.stated - mismatch.drawn,
        limit=mismatch.half,
        subject=mismatch.text,
        detail=said,
        severity="note" if marked else None,
    )


def _notes(unit: LengthUnit, notes: Sequence[LengthNote]) -> Iterator[Observation]:
    mismatches = [note.mismatch for note in notes if note.mismatch is not None]
    factor = shared_factor(mismatches) if len(mismatches) == len(notes) else None
    hint = f"; all stated lengths are {_times(factor)} the drawn ones: {_explained(factor)}?" if factor else ""
    for note in notes:
        wrong = note.mismatch
        if wrong is not None:
            how = "" if note.joined else " (no single link joins them)"
            apart = f"pins {note.pins} are {size(wrong.drawn, unit)} apart{how}"
            yield Observation(
                kind="stated-length",
                at=wrong.at,
                handles=(wrong.handle,),
                layer=wrong.layer,
                amount=wrong.stated - wrong.drawn,
                limit=wrong.half,
                subject=note.pins,
                detail=f"'{wrong.text}' is stated, but {apart}: stated {difference(wrong, unit)}{hint}",
                mechanism=note.mechanism,
            )


def _off_points(
    sketch: Sketch, dimensions: Sequence[Dimension], tolerance: Tolerance, *, held: bool
) -> Iterator[Observation]:
    """A dimension left behind at one end on any sheet; one on nothing at all only where the sheet holds a linkage."""
    for each in points_off_geometry(sketch, dimensions, tolerance):
        if not held and not (each.near and each.held):
            continue
        spot, point = (place(at, each.spot_distance) for at in (each.spot, each.point))
        nearest = f"the nearest end or centre is {size(each.spot_distance, sketch.unit)} off at {spot}"
        unasked = f"; with so many off, {each.unasked} more dimensions were not looked at" if each.unasked else ""
        yield Observation(
            kind="dimension-off-geometry",
            at=each.point,
            handles=(sketch.handles(each.dimension),),
            layer=each.dimension.source.layer,
            amount=each.distance,
            subject=each.dimension.kind,
            detail=f"point {point} of the {each.dimension.kind} dimension sits on nothing: {nearest}{unasked}",
            severity=None if each.near else "note",
        )


def _signs(
    sketch: Sketch, dimensions: Sequence[Dimension], overrides: Sequence[Override], notes: Sequence[LengthNote]
) -> Iterator[UnitSign]:
    """What dimensions and stated lengths say of the unit."""
    yield from signs_of_styles((each, sketch.handles(each)) for each in dimensions)
    for override in overrides:
        own = override.dimension
        if override.unit is not None and not own.source.blocks:
            yield _sign(override.unit, f"the dimension text '{_short(own.text)}'", middle_of(own.points), own, sketch)
    for note in notes:
        if note.unit is not None:
            yield _sign(note.unit, f"the note '{_short(note.text.content)}'", note.text.at, note.text, sketch)
    wrong = [each.mismatch for each in overrides] + [note.mismatch for note in notes]
    lengths = [each for each in wrong if each is not None and not each.is_angle]
    factor = shared_factor(lengths)
    if factor in {INCH_IN_MILLIMETRES, 1.0 / INCH_IN_MILLIMETRES}:
        unit, other = ("in", "mm") if factor == INCH_IN_MILLIMETRES else ("mm", "in")
        why = f"{len(lengths)} stated lengths, read as {UNIT_WORDS[other]}, fit a drawing in {UNIT_WORDS[unit]}"
        yield UnitSign(unit, why, lengths[0].at, lengths[0].handle, lengths[0].layer)


def _sign(unit: str, what: str, at: Point | None, own: Dimension | Text, sketch: Sketch) -> UnitSign:
    """The sign of a text that names a unit and is right if the drawing is in it."""
    why = f"{what} fits if the drawing is in {UNIT_WORDS[unit]}"
    return UnitSign(unit, why, at, sketch.handles(own), own.source.layer)


def _short(text: str) -> str:
    return " ".join(text.split())
