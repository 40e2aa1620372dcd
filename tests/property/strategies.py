"""Plans and habits at random: any well-shaped linkage of some known topologies, drawn in any mixture of habits."""

from __future__ import annotations

import cmath
import dataclasses
import math
import random
from collections.abc import Iterator
from itertools import combinations, pairwise

from hypothesis import strategies as st

from fixtures.drafting import Habit, Line, Motion, Note, Outline, Part, Plan, draft
from fixtures.drafting.plan import Shape
from tests.property.solution import solve

SHEET = 400.0
CLOSEST_PINS = 50.0
CLOSEST_PASS = 16.0
"""How near a link or frame line may pass a pin that is not its own."""
NARROWEST = math.radians(8)
"""The smallest angle between two lines from one pin."""
SAME_PLACE = 1e-6
WORST_CONDITION = 300.0

TOPOLOGIES: dict[str, tuple[tuple[str, ...], str, tuple[str, ...]]] = {
    # links, frame pins, driven links
    "four-bar": (("AB", "BC", "CD"), "AD", ("AB",)),
    "five-bar": (("AB", "BC", "CD", "DE"), "AE", ("AB", "DE")),
    "six-bar by the coupler": (("AB", "BCE", "CD", "EF", "FG"), "ADG", ("AB",)),
    "six-bar by the rocker": (("AB", "BC", "CDE", "EF", "FG"), "ADG", ("AB",)),
    "six-bar solved at once": (("AB", "BCE", "CD", "EF", "FG"), "ADG", ("FG",)),
    "pin of three links": (("AB", "BC", "CD", "CE", "EF"), "ADF", ("AB",)),
    "open arm": (("AB", "BC"), "A", ("AB",)),
    "lever": (("ABC",), "A", ("ABC",)),
    "traced coupler": (("AB", "BCE", "CD"), "AD", ("AB",)),
    "run-on coupler": (("AB", "BCE", "CD"), "AD", ("AB",)),
    "run-on rocker": (("AB", "BC", "DCE"), "AD", ("AB",)),
    "structure": (("AB", "BC"), "AC", ()),
}
STRAIGHT = {"run-on coupler": "BCE", "run-on rocker": "DCE"}
"""The link of a topology that is one straight line, pinned partway."""


PinnedLine = tuple[complex, complex, frozenset[str]]


def plans(*, driven: bool = True) -> st.SearchStrategy[Plan]:
    """Plans of every topology; ``driven`` ones carry notes for their drives."""
    return st.builds(_plan, st.sampled_from(sorted(TOPOLOGIES)), st.integers(0, 10**9), st.just(driven))


def four_bars() -> st.SearchStrategy[Plan]:
    """Plans of four-bars with a drive note."""
    return st.builds(_plan, st.just("four-bar"), st.integers(0, 10**9))


def motions() -> st.SearchStrategy[Motion]:
    """Moves of a whole sheet."""
    place = st.floats(-2000, 2000)
    return st.builds(
        Motion,
        turn=st.floats(-math.pi, math.pi),
        scale=st.sampled_from([1.0, 0.001, 1 / 25.4, 3.7, 1000.0]),
        shift=st.builds(complex, place, place),
        mirrored=st.booleans(),
    )


def habits(*, labelled: bool = True, motion: st.SearchStrategy[Motion] | None = None) -> st.SearchStrategy[Habit]:
    """Any mixture of habits; a drawing of the oldest release writes no units."""
    return st.builds(
        Habit,
        ends=st.sampled_from(["centre", "rim"]),
        frame=st.sampled_from(["layer line", "layer mark", "ring layer", "symbol", "symbol", "symbol", "block"]),
        base=st.sampled_from(["triangle", "through centre", "under rim"]),
        strokes=st.sampled_from(["exact", "short", "uneven", "hatch"]),
        symbol_tilt=st.floats(-0.7, 0.7),
        frame_block=st.sampled_from(["FRAME", "GESTELL"]),
        pins=st.sampled_from(["circle", "arcs", "bulges", "block", "ellipse", "rings"]),
        labels=st.sampled_from(["text", "mtext", "attrib"]) if labelled else st.just("none"),
        named_layers=st.booleans(),
        link_layer=st.sampled_from(["LINKS", "Hebel", "0", "M-PARTS-07"]),
        version=st.sampled_from(["R12", "R2000", "R2010", "R2018"]),
        binary=st.booleans(),
        unit=st.sampled_from(["mm", "in", None]),
        order=st.none() | st.integers(0, 1000),
        reversal=st.none() | st.integers(0, 1000),
        motion=motions() if motion is None else motion,
    )


def stated_drives(plan: Plan) -> dict[str, float]:
    """Rates (rad/s) by link name as the plan's notes state them."""
    drives = {}
    for note in plan.notes:
        left, right = note.content.split(" = ")
        name = next(part.name for part in plan.parts if set(left.removeprefix("ω_")) <= set(part.pins))
        drives[name] = float(right.removesuffix(" rad/s"))
    return drives


def _plan(kind: str, seed: int, driven: bool = True) -> Plan:  # noqa: FBT001, FBT002 - hypothesis builds it by position
    """The first well-shaped plan of a kind that chance gives; the same one for the same seed."""
    chance = random.Random(seed)  # noqa: S311 - a repeatable choice, nothing to guard
    while True:
        plan = _try_plan(kind, chance)
        if _is_well_shaped(plan):
            return plan if driven else dataclasses.replace(plan, notes=())


def _try_plan(kind: str, chance: random.Random) -> Plan:
    links, frame, driven = TOPOLOGIES[kind]
    straight = STRAIGHT.get(kind)
    names = sorted({pin for link in links for pin in link})
    points = {name: complex(chance.uniform(0, SHEET), chance.uniform(0, SHEET)) for name in names}
    if straight is not None:
        first, middle, last = list(straight)
        points[last] = points[first] + (points[middle] - points[first]) * chance.uniform(1.4, 2.2)
    parts = tuple(Part(pins=tuple(link), shape=_shape(link, straight, chance)) for link in links)
    notes = tuple(
        Note(content=f"ω_{link[:2]} = {chance.choice([10, -4, 2.5])} rad/s", beside=(link[0], link[1]))
        for link in driven
    )
    return Plan(points=points, parts=parts, frame=tuple(frame), notes=notes)


def _shape(link: str, straight: str | None, chance: random.Random) -> Shape:
    if link == straight:
        return "line"
    binary: tuple[Shape, ...] = ("line", "line", "polyline", "bent")
    ternary: tuple[Shape, ...] = ("polyline", "strokes", "filled", "bent")
    return chance.choice(binary if len(link) == 2 else ternary)


def _is_well_shaped(plan: Plan) -> bool:
    """Whether a drafter could draw it clearly and its speeds are not near a singular pose."""
    if any(abs(first - second) < CLOSEST_PINS for first, second in combinations(plan.points.values(), 2)):
        return False
    if any(_nearly_in_line(*pair) for pair in combinations(_lines(plan), 2)):
        return False
    if any(_passes_too_near(plan, *line) for line in _lines(plan)):
        return False
    return solve(plan, stated_drives(plan)).condition < WORST_CONDITION


def _lines(plan: Plan) -> Iterator[PinnedLine]:
    """Every line of the links and of a frame line, with the pins it belongs to."""
    own = {part.name: frozenset(part.pins) for part in plan.parts} | {"frame": frozenset(plan.frame)}
    for mark in draft(plan, Habit(frame="layer line")):
        if isinstance(mark, Line) and mark.part in own:
            yield mark.start, mark.end, own[mark.part]
        elif isinstance(mark, Outline):
            run = (*mark.points, mark.points[0]) if mark.closed else mark.points
            for start, end in pairwise(run):
                yield start, end, own[mark.part]


def _nearly_in_line(first: PinnedLine, second: PinnedLine) -> bool:
    """Whether two lines leave one place in nearly the same direction."""
    for start, end, _ in (first, (first[1], first[0], first[2])):
        for other_start, other_end, _ in (second, (second[1], second[0], second[2])):
            if abs(start - other_start) < SAME_PLACE:
                return abs(cmath.phase((end - start) / (other_end - other_start))) < NARROWEST
    return False


def _passes_too_near(plan: Plan, start: complex, end: complex, own: frozenset[str]) -> bool:
    """Whether a line passes near a pin of another link, or near one of its own that it does not end at."""
    for name, point in plan.points.items():
        along = (point - start) / (end - start)
        off = abs(along.imag) if 0 <= along.real <= 1 else min(abs(along), abs(along - 1))
        distance = off * abs(end - start)
        if distance < CLOSEST_PASS and not (name in own and distance < SAME_PLACE):
            return True
    return False
