from __future__ import annotations

import cmath

import pytest

from dxfcheck.reading.frames.frame import LEG, FrameSymbols
from dxfcheck.reading.lines.sheet import Sheet, lay_out
from dxfcheck.reading.lines.sorting import Sorted, sort_primitives
from dxfcheck.reading.lines.tolerance import tolerance_for
from dxfcheck.reading.parts.ground import Ground, find_ground, without_plinths
from dxfcheck.reading.shapes.outlined import find_outlined
from dxfcheck.settings import Settings
from tests.reading.slides.sliders import A, C, block, crank_and_rod, dibber, guide, slid, strokes
from tests.sketches import Drawn, line, obround, path, read_as, rectangle, ring, sketch


def ground(*things: Drawn) -> tuple[Sheet, Ground]:
    """What is looked at on a sheet of these things; strands are numbered as the lines among them."""
    drawn = sketch(*things)
    kinds: Sorted = sort_primitives(drawn)
    sheet = lay_out(kinds, tolerance_for(drawn.diagonal, Settings()))
    by_layer = {strand.number: "layer" for strand in sheet.strands if strand.frame}
    return sheet, find_ground(kinds, sheet, find_outlined(sheet, by_layer.keys(), ()), by_layer)


def reached(*things: Drawn) -> list[int]:
    return list(ground(*things)[1].reached)


WHEEL = (ring(0j, 20.0, layer="PITCH"), ring(0j, 2.0))
"""A pitch circle about a pin."""
LINK = (ring(0j, 2.0), line(0j, 50 + 0j))
"""A pin and strand 0 that ends on it."""


@pytest.mark.parametrize(
    ("more", "expected"),
    [
        pytest.param([line(50 + 0j, 80 + 20j)], [0, 1], id="meets it"),
        pytest.param([line(50 + 0j, 80 + 20j), line(80 + 20j, 90 - 10j)], [0, 1, 2], id="hangs on what meets it"),
        pytest.param([line(60 + 0j, 90 + 0j)], [0], id="apart"),
        pytest.param([line(20 - 5j, 20 + 30j)], [0], id="crosses it"),
        pytest.param([line(30 + 0j, 30 + 20j)], [0, 1], id="stands on it"),
        pytest.param([line(30 + 0.02j, 30 + 20j)], [0, 1], id="within the shape tolerance of it"),
        pytest.param(
            [line(50.02 + 0j, 80 + 0j), line(80.02 + 0j, 99 + 0j), line(99.02 + 0j, 120 + 0j)],
            [0, 1, 2],
            id="two such steps, and no third",
        ),
        pytest.param([path(50 + 0j, 40 - 20j, 60 - 20j, closed=True), line(20 - 20j, 90 - 20j)], [0, 1, 2], id="base"),
        pytest.param([obround(100 + 50j, 130 + 50j, 5)], [0], id="an empty slot"),
    ],
)
def test_what_hangs_together_with_a_pin_is_looked_at(more: list[Drawn], expected: list[int]) -> None:
    assert reached(*LINK, *more) == expected


@pytest.mark.parametrize(
    ("things", "expected"),
    [
        pytest.param([line(0j, 50 + 0j)], [], id="no pin"),
        pytest.param([ring(0j, 2.0), line(-30 + 1j, 30 + 1j)], [], id="a line across a ring"),
        pytest.param([ring(0j, 2.0), line(-30 + 1j, 30 + 1j, layer="FRAME")], [0], id="a frame line across a ring"),
        pytest.param([*WHEEL, line(-50 - 20j, 50 - 20j)], [0], id="a line along a wheel"),
        pytest.param([*WHEEL, line(-50 - 25j, 50 - 25j)], [], id="one off it"),
        pytest.param([ring(0j, 20.0), ring(10 + 0j, 2.0), line(20 + 0j, 50 + 0j)], [0], id="a line at a disc"),
        pytest.param([ring(0j, 20.0), ring(10 + 0j, 2.0), line(21 + 0j, 50 + 0j)], [], id="one off it"),
    ],
)
def test_a_pin_a_frame_line_over_one_a_wheel_or_a_disc_begins_it(things: list[Drawn], expected: list[int]) -> None:
    assert reached(*things) == expected


def test_a_slot_with_its_pin_begins_it() -> None:
    slot = obround(-15 + 0j, 15 + 0j, 4.5)
    assert reached(ring(0j), line(4 + 0j, 4 + 50j), slot) == [0, 1]
    assert reached(ring(0j), line(4 + 0j, 4 + 50j), rectangle(100 + 0j, 20, 10)) == [0]


def test_the_lines_along_a_block_are_looked_at_though_nothing_meets_them() -> None:
    drawn = dibber(guide(90 - 15j, 210 - 15j, layer="0"), *strokes(90 - 15j, 210 - 15j))
    sheet, found = ground(*drawn)
    assert [box.strands for box in found.boxes] == [(2,)]
    assert [[rail.strand for rail in rails] for rails in found.rails] == [[3]]
    assert found.reached == list(range(len(sheet.strands)))
    assert ground(*crank_and_rod(), *drawn[-5:])[1].reached == [0, 1]


def test_a_border_round_a_link_is_no_box() -> None:
    link = (ring(-20 + 0j), ring(20 + 0j), line(-16 + 0j, 16 + 0j))
    assert ground(*link, rectangle(0j, 80, 60))[1].boxes == ()
    assert len(ground(*link, rectangle(20 + 0j, 20, 14))[1].boxes) == 1


def test_a_plate_with_a_slot_in_it_is_no_box_and_is_looked_at() -> None:
    pin = (ring(0j, 5.0), line(5j, 70j))
    _, found = ground(*pin, rectangle(0j, 80, 40), obround(-15 + 0j, 15 + 0j, 5))
    assert (found.boxes, found.reached) == ((), [0, 1, 2])


def test_the_weld_strokes_of_a_spider_are_no_box() -> None:
    arms = [line(2 * turn, 40 * turn) for turn in (1, 1j, -1, -1j)]
    strokes_between = [line(8 * turn, 8j * turn) for turn in (1, 1j, -1, -1j)]
    assert ground(ring(0j, 2.0), *arms, *strokes_between)[1].boxes == ()
    assert len(ground(ring(0j, 2.0), *arms[:1], *strokes_between)[1].boxes) == 1


LEGS = (
    line(A + 4 * cmath.exp(-2j), A - 10 - 20j, handle="leg"),
    line(A + 4 * cmath.exp(-1.14j), A + 10 - 20j, handle="other leg"),
)
PLINTH = rectangle(A - 26j, 40, 12, handle="plinth")


def test_a_rectangle_under_the_legs_of_a_frame_symbol_is_its_base() -> None:
    rings = tuple(each._replace(layer="0") for each in crank_and_rod())
    drawn = (*rings, block(), guide(90 + 0j, 210 + 0j), *LEGS, PLINTH, *strokes(A - 20 - 32j, A + 20 - 32j))
    assert [each.second for each in slid(*drawn)] == ["block at C"]
    fates = read_as(*drawn)
    assert [fates[name] for name in ("leg", "other leg", "plinth", "stroke 0", "block")] == [*["frame"] * 4, "slide"]


def test_the_boxes_left_are_numbered_anew() -> None:
    sheet, found = ground(*crank_and_rod(), rectangle(C, 30, 20), guide(), *LEGS, PLINTH)
    assert [box.strands for box in found.boxes] == [(6,), (2,)]
    legs = FrameSymbols(frame={4: LEG, 5: LEG}, strokes={})
    kept = without_plinths(found, legs, sheet)
    assert [(box.number, box.strands) for box in kept.boxes] == [(0, (2,))]
    assert [[rail.strand for rail in rails] for rails in kept.rails] == [[3]]
    base = FrameSymbols(frame={4: "base line", 5: "base line"}, strokes={})
    assert without_plinths(found, base, sheet).boxes == found.boxes
