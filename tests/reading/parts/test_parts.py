from __future__ import annotations

import cmath
import math
from dataclasses import replace

import pytest

from dxfcheck.drawing.primitives import BlockUse, Primitive
from dxfcheck.reading.read import read_linkages
from dxfcheck.settings import Settings
from tests.reading.slides.sliders import (
    B,
    C,
    block,
    crank_and_rod,
    dibber,
    guide,
    loose_rectangle,
    named,
    slid,
    slides_in,
    strokes,
)
from tests.sketches import (
    Drawn,
    arc,
    laid_out,
    line,
    linkage,
    links,
    obround,
    path,
    read_as,
    rectangle,
    ring,
    rod,
    sketch,
    tipper,
)

SHEET_EDGE = path(-300 - 300j, 400 - 300j, 400 + 300j, -300 + 300j, closed=True, handle="edge")


def test_without_slides_there_are_pins_only() -> None:
    _, parts = laid_out(*tipper())
    assert (parts.contacts, parts.oddities, parts.slots, parts.slides.slides) == ((), (), (), ())
    assert [body.pins for body in parts.bodies.bodies] == [(0, 3), (0, 1), (1, 2), (2, 3)]
    assert [body.block for body in parts.bodies.bodies] == [False] * 4


def test_each_strand_is_told_for_what_it_is() -> None:
    """Strands: crank, rod, block, guide, four strokes, the sheet's edge."""
    _, parts = laid_out(*dibber(guide(layer="0"), *strokes(170 + 0j, 210 + 0j)), SHEET_EDGE)
    assert parts.frame == {3: "base line of a frame symbol with hatch strokes"}
    assert set(parts.symbols.strokes) == {4, 5, 6, 7}
    assert parts.borders == {8}
    assert [body.strands for body in parts.bodies.bodies] == [(3,), (0,), (1,), (2,)]
    assert [body.block for body in parts.bodies.bodies] == [False, False, False, True]


def test_strokes_on_a_block_make_its_guide_frame_and_not_the_block() -> None:
    _, parts = laid_out(*dibber(*strokes(135 - 10j, 165 - 10j)))
    assert parts.frame == {}
    (frame, *_, held) = parts.bodies.bodies
    assert (frame.frame, held.frame, held.strands) == (True, False, (2,))


def test_a_link_that_slides_does_not_hold_its_own_block_or_pin() -> None:
    """The lever runs through the ring of the block's pin, and the block's sides through the rods on it."""
    foot, way = -60j, cmath.rect(1, math.radians(50))
    tip, at = foot + 160 * way, foot + 80 * way
    pins = {"D": foot, "E": tip, "B": at, "A": 0j}
    rings = [ring(place, layer="FRAME" if name in "AD" else "0") for name, place in pins.items()]
    sides = [at + 12 * way * corner for corner in (1 + 0.7j, -1 + 0.7j, -1 - 0.7j, 1 - 0.7j)]
    drawn = (*rings, *named(**pins), rod(foot, tip), rod(0j, at), path(*sides, closed=True))
    found = linkage(*drawn)
    assert sorted(link.name for link in found.links) == ["A-B", "D-E", "block at B", "frame"]
    assert {*slides_in(found)[0][:2]} == {"D-E", "block at B"}


def test_a_rectangular_block_in_a_slot_has_one_joint() -> None:
    """The sides of the obround are the guide of the block, so the pin does not run in it as well."""
    slot = obround(110 + 0j, 190 + 0j, 10, handle="slot")._replace(layer="FRAME")
    found = linkage(*crank_and_rod(), block(), slot)
    assert [joint.kind for joint in found.joints] == ["pin", "pin", "pin", "slide"]


@pytest.mark.parametrize("square", [[rectangle(C, 30, 20)], [*loose_rectangle(C, 30, 20)]])
def test_a_block_is_a_link_of_its_own_in_either_line_habit(square: list[Drawn]) -> None:
    assert links(*crank_and_rod(), *square, guide()) == ["frame", "A-B", "B-C", "block at C"]


def test_oddities_about_an_outline_that_is_a_block_or_guide_are_not_told() -> None:
    """A closed cylinder round pins that are not its holes."""
    cylinder = rectangle(150 + 0j, 120, 20, handle="cylinder")
    _, parts = laid_out(*crank_and_rod(), block(), cylinder)
    assert [oddity.kind for oddity in parts.oddities] == ["guide-taken-as-frame"]


def test_a_weld_mark_is_told_by_its_arc() -> None:
    arm_end = (B + C) / 2
    mark = arc(arm_end, 5, math.degrees(cmath.phase(C - B)), 90, handle="mark")
    _, parts = laid_out(*dibber(guide()), line(arm_end, arm_end + 40j), mark)
    assert len(parts.welds) == 1


# --- part blocks ---

ARM_HOLES, BAR_HOLES = (0j, 60 + 0j), (60 + 0j, 120 + 50j)


def part(name: str, handle: str, holes: tuple[complex, complex]) -> list[Drawn]:
    """A reference to a block: two rings and the lines of a bar that meets neither."""
    along = (holes[1] - holes[0]) / abs(holes[1] - holes[0])
    sides = [line(holes[0] + 8j * along * side, holes[1] + 8j * along * side) for side in (1, -1)]
    return [each._replace(block=name, handle=handle) for each in (*(ring(at) for at in holes), *sides)]


def assembly() -> list[Drawn]:
    """A four-bar of two parts and a plain rod CD."""
    pins = {"A": 0j, "B": 60 + 0j, "C": 120 + 50j, "D": 180 + 0j}
    own = [ring(0j, layer="FRAME"), ring(180 + 0j, layer="FRAME"), ring(120 + 50j)]
    parts = [*part("ARM", "arm", ARM_HOLES), *part("BAR-2", "bar", BAR_HOLES)]
    return [*parts, *own, rod(120 + 50j, 180 + 0j, handle="rod"), *named(**pins)]


def names_with(*patterns: str, extra: Drawn | None = None) -> list[list[str]]:
    """The links of each linkage; what has one handle in common is one entity."""
    drawn = sketch(*assembly(), *([extra] if extra is not None else []))
    first: dict[BlockUse, int] = {}
    primitives: list[Primitive] = []
    for primitive in drawn.primitives:
        source = primitive.source
        if source.blocks:
            source = source._replace(entity=first.setdefault(source.blocks[0], source.entity))
        primitives.append(primitive._replace(source=source))
    reading = read_linkages(replace(drawn, primitives=tuple(primitives)), Settings(part_blocks=patterns))
    return [[link.name for link in each.links] for each in reading.linkages]


@pytest.mark.parametrize(
    ("patterns", "expected"),
    [
        pytest.param((), [["frame", "C-D"]], id="none"),
        pytest.param(("arm", "BAR*"), [["frame", "A-B", "B-C", "C-D"]], id="both"),
        pytest.param(("ARM",), [["frame", "A-B"], ["frame", "C-D"]], id="one"),
    ],
)
def test_references_to_part_blocks_are_links(patterns: tuple[str, ...], expected: list[list[str]]) -> None:
    assert names_with(*patterns) == expected


def test_a_part_has_the_pins_of_its_own_rings_and_no_others() -> None:
    """A pointer of the arm comes to lie on the ring of C, which is drawn on the sheet and in the bar."""
    pointer = line(30 + 8j, 116 + 50j)._replace(block="ARM", handle="arm")
    assert names_with("arm", "BAR*", extra=pointer) == [["frame", "A-B", "B-C", "C-D"]]


# --- sheets that hold more ---


def test_other_linework_changes_nothing() -> None:
    other = [rectangle(600 + 40j * number, 30, 20, handle=f"other {number}") for number in range(5)]
    lines = [line(560 + 40j * number, 640 + 40j * number) for number in range(5)]
    drawn = (*dibber(guide()), *other, *lines)
    assert slid(*drawn) == slid(*dibber(guide()))
    assert {read_as(*drawn)[f"other {number}"] for number in range(5)} == {"other linework"}


@pytest.mark.parametrize("order", [slice(None), slice(None, None, -1)], ids=["as drawn", "backwards"])
def test_the_order_of_the_drawing_changes_nothing(order: slice) -> None:
    assert slid(*dibber(guide())[order]) == slid(*dibber(guide()))
