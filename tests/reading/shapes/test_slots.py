from __future__ import annotations

import cmath
import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from dxfcheck.reading.shapes.obrounds import Channel, CurvedSlot, find_curved_slots, find_obrounds
from dxfcheck.reading.shapes.rectangles import find_rectangles
from dxfcheck.reading.shapes.slots import Slots, find_slots
from tests.sketches import Drawn, arc, laid_out, line, obround, path, rectangle, ring

FAR = line(-100 + 50j, 100 + 50j)
"""Gives the sheet a diagonal of about 210: the shape tolerance is 0.1."""
SLOT = obround(-15 + 0j, 15 + 0j, 5.0)
LIMIT = 0.1
"""2 % of the slot's radius."""


def slots(*things: Drawn, carrying: frozenset[int] | None = None) -> Slots:
    sheet, _ = laid_out(*things, FAR)
    shapes: list[Channel] = [
        *find_obrounds(sheet.strands, sheet.touching),
        *find_curved_slots(sheet.strands, sheet.touching, sheet.tolerance),
    ]
    rectangles = find_rectangles(sheet.linework, sheet.touching, sheet.pins, sheet.tolerance)
    return find_slots(shapes, sheet.pins, sheet.linework, sheet.tolerance, carrying=carrying, rectangles=rectangles)


def pins(*places: complex) -> list[Drawn]:
    return [ring(at, 2.0) for at in places]


@pytest.mark.parametrize("at", [0j, 15 + 0j, 17 + 0j, -15.3 + 0j])
def test_an_obround_with_one_pin_is_a_slot_even_at_or_past_its_end(at: complex) -> None:
    found = slots(SLOT, *pins(at))
    (slot,) = found.slots
    assert slot.sites == (0,)
    assert slot.block == ()
    assert slot.pinned is None
    assert slot.shape.room(at, 1 + 0j) == pytest.approx((at.real + 15, 15 - at.real))
    assert not any((found.oddities, found.bars, found.empty))


def test_an_obround_with_a_pin_at_each_end_is_a_bar() -> None:
    found = slots(SLOT, *pins(-15 + 0j, 15.05 + 0j))
    (bar,) = found.bars
    assert bar.sites == (0, 1)
    assert not any((found.slots, found.oddities))


def test_a_pin_off_the_axis_does_not_unmake_a_bar() -> None:
    assert [bar.sites for bar in slots(SLOT, *pins(-15 + 0j, 15 + 0j, 3.5j)).bars] == [(0, 1)]


def test_an_obround_without_a_pin_is_empty() -> None:
    found = slots(SLOT, *pins(60 + 0j))
    assert [shape.strands for shape in found.empty] == [(0,)]
    assert found.slots == ()


def test_an_obround_with_holes_only_is_left_to_the_outlines() -> None:
    found = slots(SLOT, *pins(0j), carrying=frozenset())
    assert not any((found.slots, found.empty))
    assert len(slots(SLOT, *pins(0j), carrying=frozenset({0})).slots) == 1


def test_an_obround_with_three_pins_is_left_to_the_outlines() -> None:
    found = slots(SLOT, *pins(-15 + 0j, 0j, 15 + 0j))
    assert not any((found.slots, found.bars, found.empty))


def test_of_two_pins_the_one_at_an_end_is_the_pivot_of_the_slotted_lever() -> None:
    found = slots(SLOT, *pins(-15 + 0j, 12 + 0j))
    (slot,) = found.slots
    assert (slot.pinned, slot.sites) == (0, (1,))
    (odd,) = found.oddities
    assert odd.kind == "slot-pins"
    assert odd.amount == pytest.approx(3.0)
    assert odd.limit == pytest.approx(LIMIT)
    assert odd.site == 1
    assert "pivot" in odd.detail
    assert "{amount}" in odd.detail


def test_two_pins_between_the_ends_both_slide() -> None:
    found = slots(SLOT, *pins(-14 + 0j, 5 + 0j))
    (slot,) = found.slots
    assert (slot.pinned, slot.sites) == (None, (0, 1))
    (odd,) = found.oddities
    assert odd.kind == "slot-pins"
    assert odd.amount == pytest.approx(10.0)
    assert odd.site == 1


@pytest.mark.parametrize(("off", "odd"), [(0.05, False), (0.15, True), (4.5, True), (5.5, None)])
def test_a_pin_off_the_centre_line_is_in_the_slot_but_reported(off: float, odd: bool | None) -> None:  # noqa: FBT001
    found = slots(SLOT, *pins(3 + off * 1j))
    assert len(found.slots) == (0 if odd is None else 1)
    assert [(each.kind, each.limit) for each in found.oddities] == ([("off-slot-centre", LIMIT)] if odd else [])
    assert [each.amount for each in found.oddities] == pytest.approx([off] if odd else [])


@given(turn=st.floats(0.0, 360.0), at=st.floats(-10.0, 10.0), shift=st.complex_numbers(max_magnitude=20.0))
def test_turning_and_moving_the_sheet_changes_no_reading(turn: float, at: float, shift: complex) -> None:
    along = cmath.rect(1.0, math.radians(turn))
    found = slots(obround(shift - 15 * along, shift + 15 * along, 5.0), *pins(shift + at * along))
    (slot,) = found.slots
    assert slot.shape.room(shift + at * along, along) == pytest.approx((15 + at, 15 - at), abs=1e-9)
    assert found.oddities == ()


def test_a_pin_in_a_curved_slot() -> None:
    pole, bend = 0j, 50.0
    middle = cmath.rect(bend, math.radians(40))
    sides = [arc(pole, bend - 4, 20, 50), arc(pole, bend + 4, 20, 50)]
    caps = [
        arc(cmath.rect(bend, math.radians(20)), 4.0, 200, 180),
        arc(cmath.rect(bend, math.radians(70)), 4.0, 70, 180),
    ]
    (slot,) = slots(*sides, *caps, *pins(middle)).slots
    assert isinstance(slot.shape, CurvedSlot)
    assert cmath.isclose(slot.shape.tangent_at(middle), 1j * middle / 50)
    assert slot.shape.reach(middle) == pytest.approx((50 * math.radians(20), 50 * math.radians(30)))


# --- blocks in slots ---


def turned(things: list[tuple[complex, complex]], degrees: float) -> list[Drawn]:
    turn = cmath.rect(1.0, math.radians(degrees))
    return [line(start * turn, end * turn) for start, end in things]


STROKES = [(-4 - 5j, -4 + 5j), (4 - 5j, 4 + 5j)]


@pytest.mark.parametrize("degrees", [0.0, 30.0, 250.0])
def test_two_strokes_across_the_slot_are_a_block(degrees: float) -> None:
    turn = cmath.rect(1.0, math.radians(degrees))
    (slot,) = slots(obround(-15 * turn, 15 * turn, 5.0), *pins(0j), *turned(STROKES, degrees)).slots
    assert sorted(slot.block) == [1, 2]


def test_of_several_strokes_the_two_nearest_are_the_block() -> None:
    strokes = [(-8 - 5j, -8 + 5j), *STROKES, (9 - 5j, 9 + 5j)]
    (slot,) = slots(SLOT, *pins(0j), *turned(strokes, 0)).slots
    assert sorted(slot.block) == [2, 3]


@pytest.mark.parametrize(
    "strokes",
    [
        pytest.param(STROKES[:1], id="one"),
        pytest.param([STROKES[0], (-8 - 5j, -8 + 5j)], id="both on one side"),
        pytest.param([(-4 - 3j, -4 + 3j), (4 - 3j, 4 + 3j)], id="short of the sides"),
        pytest.param([(-4 - 15j, -4 + 15j), (4 - 15j, 4 + 15j)], id="running on"),
        pytest.param([(-6 - 5j, -3 + 5j), (3 - 5j, 6 + 5j)], id="aslant"),
    ],
)
def test_strokes_that_make_no_block(strokes: list[tuple[complex, complex]]) -> None:
    (slot,) = slots(SLOT, *pins(0j), *turned(strokes, 0)).slots
    assert slot.block == ()


@pytest.mark.parametrize(
    ("block", "stands"),
    [
        pytest.param(rectangle(1 + 0j, 12, 10), True, id="as wide as the slot"),
        pytest.param(rectangle(0j, 12, 8), True, id="narrower"),
        pytest.param(rectangle(0j, 12, 12), False, id="wider"),
        pytest.param(rectangle(9 + 0j, 12, 10), False, id="beside the pin"),
        pytest.param(path(-4 - 2j, 4 - 4j, 5 + 0j, -3 + 2j, closed=True), False, id="aslant"),
    ],
)
def test_a_rectangle_between_the_sides_round_the_pin_is_a_block(block: Drawn, stands: bool) -> None:  # noqa: FBT001
    (slot,) = slots(SLOT, *pins(0j), block).slots
    assert slot.block == ((1,) if stands else ())


def test_with_a_block_the_pin_need_not_be_on_the_centre_line() -> None:
    found = slots(SLOT, *pins(1.5j), rectangle(0j, 12, 10))
    assert found.slots[0].block == (1,)
    assert found.oddities == ()


@pytest.mark.parametrize(
    ("places", "radius", "bar"),
    [
        pytest.param((-9 + 0j, 9 + 0j), 2.0, True, id="alike"),
        pytest.param((-9 + 0j, 9.05 + 0j), 2.0, True, id="alike within 2 % of its half width"),
        pytest.param((-9 + 0j, 8 + 0j), 2.0, False, id="not alike"),
        pytest.param((-9 + 0j, 9 + 0j), 4.5, False, id="pins that fill the slot"),
        pytest.param((-9 + 1j, 9 + 0j), 2.0, False, id="one off the axis"),
    ],
)
def test_a_bar_may_overhang_its_two_holes_alike(places: tuple[complex, complex], radius: float, bar: bool) -> None:  # noqa: FBT001
    found = slots(SLOT, *(ring(at, radius) for at in places))
    assert [each.sites for each in found.bars] == ([(0, 1)] if bar else [])
    assert any(each.kind == "slot-pins" for each in found.oddities) is not bar


def test_an_obround_out_of_which_a_slot_is_cut_is_a_plate() -> None:
    plate, slot = obround(-60 + 0j, 30 + 0j, 12.0), obround(-15 + 0j, 15 + 0j, 5.0)
    for drawn in ([plate, slot], [slot, plate]):
        found = slots(*drawn, *pins(-60 + 0j, 3 + 0j))
        assert [(each.shape.radius, each.sites) for each in found.slots] == [(5.0, (1,))]
        assert not any((found.bars, found.empty, found.oddities))
    both_ends = slots(plate, slot, *pins(-60 + 0j, 3 + 0j, 30 + 0j))
    assert [bar.sites for bar in both_ends.bars] == [(0, 2)]
    assert [each.sites for each in both_ends.slots] == [(1,)]
