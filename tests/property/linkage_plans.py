"""What a random linkage is drawn as: the shapes of its links, the plan, and the names that the report is to give."""

from __future__ import annotations

from dataclasses import dataclass, replace

from fixtures.drafting import FRAME, Note, Part, Plan, Slide
from fixtures.drafting.plan import Shape
from tests.property.growing import FIXED, Growing, Model

__all__ = ["RandomLinkage", "finished"]

ROOM = 90.0
"""Least distance of a telescope's pins."""
SLIDE_DRIVEN = 0.4
"""How often a linkage with a telescope is driven by it."""


@dataclass(frozen=True, slots=True, kw_only=True)
class RandomLinkage:
    """A plan to draw, the model of the same linkage, and what the report is to call the model's links.

    ``drives`` are options; without them the plan has a drive note.
    """

    plan: Plan
    model: Model
    names: tuple[str, ...]
    drives: tuple[str, ...] = ()


BINARY: tuple[Shape, ...] = ("line", "line", "polyline", "bent", "contour")
TERNARY: tuple[Shape, ...] = ("polyline", "strokes", "filled", "bent", "contour")
HIGHER: tuple[Shape, ...] = ("polyline", "strokes", "bent", "contour")


def _parts(growing: Growing) -> dict[int, Part]:
    """The links that are parts, each in some shape; one that carries a guide is welded to it."""
    parts: dict[int, Part] = {}
    for number, (kind, pins) in enumerate(zip(growing.kinds, growing.links, strict=True)):
        if kind in ("part", "lever", "slotted"):
            guides = [slide for slide, guide in growing.slides if guide == number and kind == "part"]
            shape = growing.chance.choice(_shapes(pins, growing, guided=bool(guides)) if kind == "part" else ("line",))
            extra = tuple(_weld(growing, pins, slide) for slide in guides)
            parts[number] = Part(pins=tuple(pins), shape=shape, extra=extra)
    return parts


def _shapes(pins: list[str], growing: Growing, *, guided: bool) -> tuple[Shape, ...]:
    """What a link may look like: the eye of a cut part would cover a block or slot at its pin."""
    shapes = BINARY if len(pins) == 2 else TERNARY if len(pins) == 3 else HIGHER
    if guided or growing.taken & set(pins):
        shapes = tuple(shape for shape in shapes if shape != "contour")
    return tuple(shape for shape in shapes if shape != "bent") if guided and len(pins) == 2 else shapes


def _weld(growing: Growing, pins: list[str], slide: Slide) -> tuple[complex, complex]:
    """A line from the middle of a link's first side to the nearer end of the guide that it carries."""
    side = (growing.points[pins[0]] + growing.points[pins[1]]) / 2
    at, along = growing.points[slide.pin], slide.along / abs(slide.along)
    ends = (at - along * slide.reach[0], at + along * slide.reach[1])
    return side, min(ends, key=lambda end: abs(end - side))


def finished(growing: Growing) -> RandomLinkage | None:
    """The linkage so far; None where a telescope is too short or two links would have one name."""
    if any(abs(growing.points[each.rear] - growing.points[each.front]) < ROOM for each in growing.telescopes):
        return None
    parts = _parts(growing)
    owners = {FIXED: FRAME} | {number: part.name for number, part in parts.items()}
    names = [
        parts[number].name if number in parts else f"block at {pins[0]}" if kind == "block" else pins[0]
        for number, (kind, pins) in enumerate(zip(growing.kinds, growing.links, strict=True))
    ]
    if len(set(names)) < len(names):
        return None
    rate = growing.chance.choice((10.0, -4.0, 2.5))
    crank = growing.links[0]
    plan = Plan(
        points=growing.points,
        parts=tuple(parts.values()),
        frame=tuple(growing.fixed),
        notes=(Note(content=f"ω_{crank[0]}{crank[1]} = {rate} rad/s", beside=(crank[0], crank[1])),),
        slides=tuple(replace(slide, guide=owners[guide]) for slide, guide in growing.slides),
        telescopes=tuple(growing.telescopes),
        slots=tuple(replace(slot, owner=owners[owner]) for slot, owner in growing.slots),
    )
    model = Model(
        points=growing.points,
        links=tuple(map(tuple, growing.links)),
        fixed=frozenset(growing.fixed),
        contacts=tuple(growing.contacts),
        rate=rate,
    )
    linkage = RandomLinkage(plan=plan, model=model, names=tuple(names))
    if growing.telescopes and growing.chance.random() < SLIDE_DRIVEN:
        return _driven_by_telescope(linkage, growing)
    return linkage


def _driven_by_telescope(linkage: RandomLinkage, growing: Growing) -> RandomLinkage:
    """The linkage with the extension of its first telescope stated instead of a crank's turning."""
    telescope, rate = growing.telescopes[0], growing.chance.choice((12.0, -30.0))
    tube = growing.links.index([telescope.rear], growing.kinds.index("tube"))
    driven = next(number for number, contact in enumerate(linkage.model.contacts) if contact.links[0] == tube)
    return replace(
        linkage,
        plan=replace(linkage.plan, notes=()),
        model=replace(linkage.model, driven=driven, rate=rate),
        drives=(f"{telescope.rear}-{telescope.front} = {rate} mm/s",),
    )
