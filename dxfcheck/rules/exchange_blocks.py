"""Rules on block references: stretched, arrayed, nested, or standing for another file."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterator, Sequence

from dxfcheck.drawing.fates import UNDERLAY
from dxfcheck.drawing.primitives import Notice, Path
from dxfcheck.geometry import Point
from dxfcheck.rules.finding import Finding
from dxfcheck.rules.noticed import about_entities, about_notices, among_links, boxes, linkage_handles, noticed
from dxfcheck.rules.registry import rule
from dxfcheck.rules.settings_and_sources import BLOCK_REFERENCES
from dxfcheck.rules.subject import RuleSubject
from dxfcheck.rules.wording import listed, place, plural

__all__: list[str] = []

CLEAN = 9
"""Decimals to which a mean of many corners is free of rounding noise."""


@rule(
    "uneven-scale",
    "warning",
    "A block scaled unevenly",
    family="exchange",
    also=("note",),
    looks_for="A block reference with different scales in x and y: a warning where rings in it become ellipses, or "
    "links are drawn with it; a note elsewhere.",
    matters="An ellipse is no pin, and the angles and lengths of what is in the block change; programs differ in what "
    "they make of arcs in it.",
    remedy="Insert the block with one scale, or redraw what it holds.",
    source=BLOCK_REFERENCES,
)
def uneven_scale(subject: RuleSubject) -> Iterator[Finding]:
    """Block references with unequal scales; one finding for those that matter, one for the rest."""
    notices = noticed(subject, "uneven-scale")
    if not notices:
        return
    ellipses = _ellipses(subject, {notice.entity for notice in notices})
    handles = linkage_handles(subject)
    grave = [notice for notice in notices if notice.entity in ellipses or _draws(subject, notice, handles)]
    places = [at for notice in dict.fromkeys(notice.entity for notice in grave) for at in ellipses.get(notice, ())]
    if places:
        was = "1 ring in it is an ellipse" if len(places) == 1 else f"{len(places)} rings in it are ellipses"
        said = f"; {was} and so no pin: at {listed([place(at) for at in places], 3)}"
    else:
        said = "; links are drawn with it and are read as stretched"
    remedy = "insert the block with equal scales, or redraw it"
    yield from about_notices(subject, "uneven-scale", "warning", grave, _scales(grave) + said, remedy)
    rest = [notice for notice in notices if notice not in grave]
    remedy = "nothing, if it is no part of the linkage; else insert it with equal scales"
    yield from about_notices(subject, "uneven-scale", "note", rest, _scales(rest), remedy)


def _scales(notices: Sequence[Notice]) -> str:
    return listed(list(dict.fromkeys(notice.detail for notice in notices)), 3)


def _ellipses(subject: RuleSubject, entities: set[int | None]) -> dict[int | None, list[Point]]:
    """Centres of the closed curves that came of stretched rings, by top-level entity."""
    found: defaultdict[int | None, list[Point]] = defaultdict(list)
    for shape in subject.sketch.primitives:
        if isinstance(shape, Path) and shape.curved and shape.closed and shape.source.entity in entities:
            centre = sum(shape.vertices) / len(shape.vertices)
            found[shape.source.entity].append(complex(round(centre.real, CLEAN), round(centre.imag, CLEAN)))
    return found


def _draws(subject: RuleSubject, notice: Notice, handles: frozenset[str]) -> bool:
    """Whether the linkage is drawn with the entity that a notice is about."""
    return notice.entity is not None and subject.sketch.entities[notice.entity].handle in handles


@rule(
    "block-array",
    "warning",
    "Links in an arrayed block reference",
    family="exchange",
    looks_for="Links or pins that are drawn by a block reference with rows and columns.",
    matters="Here every copy is read. Other programs drop all copies but the first, or cannot explode the array: the "
    "next reader sees another mechanism.",
    remedy="Replace the array by single references, or draw the linkage without it.",
    source=BLOCK_REFERENCES,
)
def block_array(subject: RuleSubject) -> Iterator[Finding]:
    """Arrays that links come from."""
    notices = noticed(subject, "block-array")
    handles = linkage_handles(subject) if notices else frozenset()
    used = [notice for notice in notices if _draws(subject, notice, handles)]
    said = listed([f"{notice.detail} in {int(notice.amount or 0)} copies" for notice in used], 3)
    message = f"links are drawn by an arrayed reference, which other programs may drop or cut to one copy: {said}"
    yield from about_notices(subject, "block-array", "warning", used, message, "replace it by single references")


@rule(
    "nested-block",
    "note",
    "Links deep in nested blocks",
    family="exchange",
    looks_for="Links or pins in blocks within blocks, four or more deep.",
    matters="Programs that explode blocks step by step commonly stop after two or three, and lose what lies deeper.",
    remedy="Explode the outer blocks, so that the linkage lies at most three deep.",
    source=BLOCK_REFERENCES,
)
def nested_block(subject: RuleSubject) -> Iterator[Finding]:
    """Deeply nested references that links come from."""
    notices = noticed(subject, "nested-block")
    handles = linkage_handles(subject) if notices else frozenset()
    used = [notice for notice in notices if _draws(subject, notice, handles)]
    said = listed([f"{notice.detail} holds blocks {int(notice.amount or 0)} deep" for notice in used], 3)
    message = f"links are drawn by nested blocks, of which other programs may lose the innermost: {said}"
    yield from about_notices(
        subject, "nested-block", "note", used, message, "explode the outer blocks if the next program loses them"
    )


@rule(
    "outside-reference",
    "warning",
    "A reference to another file",
    family="exchange",
    also=("note",),
    looks_for="A block that stands for another drawing file; a picture or an underlay from another file: a warning "
    "where it is placed among the links, a note elsewhere.",
    matters="What it shows is not in this file and is not read; it is lost when the file is sent alone.",
    remedy="Bind the reference into the drawing, or check the other file by itself.",
)
def outside_reference(subject: RuleSubject) -> Iterator[Finding]:
    """External references, then pictures and underlays."""
    notices = noticed(subject, "outside-reference")
    details = listed([notice.detail for notice in notices], 3)
    yield from about_notices(
        subject, "outside-reference", "warning", notices, details, "bind the reference into the drawing"
    )
    underlays = [entity for entity in subject.sketch.entities if entity.fate is UNDERLAY]
    around = boxes(subject) if underlays else []
    for among in (True, False):
        entities = [entity for entity in underlays if among_links(entity.at, around) is among]
        if not entities:
            continue
        kinds = listed(sorted({_UNDERLAYS.get(entity.type, "an underlay") for entity in entities}))
        where = "among the links" if among else "elsewhere on the sheet" if subject.mechanisms else "on the sheet"
        message = f"{plural(len(entities), 'reference')} to other files {where} not read: {kinds}"
        remedy = "draw with lines, arcs and circles what of it is part of the linkage"
        yield about_entities("outside-reference", "warning" if among else "note", entities, message, remedy)


_UNDERLAYS = {"IMAGE": "a picture", "PDFUNDERLAY": "a PDF underlay"}
