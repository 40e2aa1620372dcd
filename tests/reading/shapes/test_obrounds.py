from __future__ import annotations

import cmath
import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from dxfcheck.drawing.primitives import Arc, Path
from dxfcheck.reading.shapes.obrounds import (
    CurvedSlot,
    Obround,
    find_curved_slots,
    find_obrounds,
)
from tests.sketches import Drawn, arc, laid_out, line, obround, ring

FAR = line(-100 + 50j, 100 + 50j)
"""Gives the sheet a diagonal of about 210."""


def obrounds(*things: Drawn) -> list[Obround]:
    sheet, _ = laid_out(ring(0j, 2.0), FAR, *things)
    return find_obrounds(sheet.strands, sheet.touching)


def drawn_in_four(one: complex, other: complex, radius: float) -> list[Drawn]:
    """An obround along +x of two lines and two half arcs."""
    up = radius * 1j
    return [
        line(one - up, other - up),
        arc(other, radius, 270, 180),
        line(other + up, one + up),
        arc(one, radius, 90, 180),
    ]


def test_an_obround_of_one_polyline_and_one_of_four_pieces() -> None:
    (outline,) = obrounds(obround(-15 + 0j, 15 + 0j, 5.0))
    (pieces,) = obrounds(*drawn_in_four(-15 + 0j, 15 + 0j, 5.0))
    assert outline.radius == pieces.radius == 5.0
    assert {*outline.centres} == {*pieces.centres} == {-15 + 0j, 15 + 0j}
    assert len(pieces.strands) == 4


def test_a_turned_obround() -> None:
    (found,) = obrounds(obround(-15 - 15j, 15 + 15j, 5.0))
    assert {*found.centres} == {-15 - 15j, 15 + 15j}


@pytest.mark.parametrize(
    "pieces",
    [
        pytest.param(drawn_in_four(-15 + 0j, 15 + 0j, 5.0)[:3], id="open"),
        pytest.param(
            [*drawn_in_four(-15 + 0j, 15 + 0j, 5.0)[:3], arc(-15 + 0j, 5.0, 90, 170)], id="less than half an arc"
        ),
    ],
)
def test_what_is_no_obround(pieces: list[Drawn]) -> None:
    assert obrounds(*pieces) == []


@pytest.mark.parametrize(
    ("at", "held"),
    [
        pytest.param(0j, True, id="in the middle"),
        pytest.param(15 + 0j, True, id="at an end"),
        pytest.param(15.2 + 0j, False, id="past the end"),
        pytest.param(2.4j, True, id="a little to the side"),
        pytest.param(2.6j, False, id="too far to the side"),
    ],
)
def test_an_obround_holds_a_pin_on_its_centre_line(at: complex, held: bool) -> None:  # noqa: FBT001 - a table
    sheet, _ = laid_out(ring(at, 2.0), FAR)
    assert Obround((0,), (-15 + 0j, 15 + 0j), 5.0).holds(sheet.pins[0]) is held


POLE, BEND, HALF = 40 - 30j, 60.0, 4.0


def curved_slots(*things: Drawn) -> list[CurvedSlot]:
    sheet, _ = laid_out(ring(0j, 2.0), FAR, *things)
    return find_curved_slots(sheet.strands, sheet.touching, sheet.tolerance)


def end_at(degrees: float) -> complex:
    return POLE + cmath.rect(BEND, math.radians(degrees))


def bent(start: float, sweep: float, *, digits: int = 12) -> list[Drawn]:
    """A curved slot of four arcs, its figures rounded to so many decimals."""

    def typed(centre: complex, radius: float, turn: float, over: float) -> Drawn:
        middle = complex(round(centre.real, digits), round(centre.imag, digits))
        return arc(middle, round(radius, digits), round(turn, digits), round(over, digits))

    return [
        typed(POLE, BEND - HALF, start, sweep),
        typed(end_at(start + sweep), HALF, start + sweep, 180),
        typed(POLE, BEND + HALF, start, sweep),
        typed(end_at(start), HALF, start + 180, 180),
    ]


def bent_in_one(start: float, sweep: float) -> Drawn:
    """The same as one closed polyline with bulges."""
    sheet, _ = laid_out(*bent(start, sweep), FAR)
    arcs = [strand.primitive for strand in sheet.strands[:4] if isinstance(strand.primitive, Arc)]
    corners = (arcs[0].start, arcs[0].end, arcs[2].end, arcs[2].start)
    return Drawn("LWPOLYLINE", lambda source: Path(source, tuple(arcs), corners, closed=True, curved=False))


def assert_bent(found: CurvedSlot, start: float, sweep: float, within: float) -> None:
    assert found.radius == pytest.approx(HALF, abs=within)
    assert found.bend == pytest.approx(BEND, abs=within)
    assert abs(found.pole - POLE) <= within
    assert found.length == pytest.approx(BEND * math.radians(sweep), abs=4 * within)
    assert abs(found.centres[0] - end_at(start)) <= within
    assert abs(found.centres[1] - end_at(start + sweep)) <= within


@given(
    start=st.floats(-180.0, 180.0),
    sweep=st.floats(15.0, 320.0),
    order=st.permutations(range(4)),
)
def test_a_curved_slot_of_four_arcs_in_any_order_and_place(start: float, sweep: float, order: list[int]) -> None:
    arcs = bent(start, sweep)
    (found,) = curved_slots(*(arcs[number] for number in order))
    assert len(found.strands) == 4
    assert_bent(found, start, sweep, 1e-9)


@pytest.mark.parametrize("sweep", [40.0, 180.0, 300.0])
def test_a_curved_slot_of_one_polyline(sweep: float) -> None:
    (found,) = curved_slots(bent_in_one(20.0, sweep))
    assert len(found.strands) == 1
    assert_bent(found, 20.0, sweep, 1e-9)


@pytest.mark.parametrize("start", [0.0, 33.3, 123.456, -77.7])
def test_a_curved_slot_typed_to_two_decimals(start: float) -> None:
    (found,) = curved_slots(*bent(start, 50.12, digits=2))
    assert_bent(found, start, 50.12, 0.02)


@pytest.mark.parametrize(
    "spoilt",
    [
        pytest.param((0, arc(POLE + 1, BEND - HALF, 20, 60)), id="sides not on one centre"),
        pytest.param((1, arc(end_at(80), HALF, 80, 160)), id="an end that is no half arc"),
        pytest.param((2, line(end_at(20), end_at(80))), id="a straight side"),
        pytest.param((3, arc(end_at(20), 0.9 * HALF, 200, 180)), id="a narrower end"),
    ],
)
def test_what_is_no_curved_slot(spoilt: tuple[int, Drawn]) -> None:
    arcs = bent(20.0, 60.0)
    arcs[spoilt[0]] = spoilt[1]
    assert curved_slots(*arcs) == []
    assert curved_slots(*arcs[:3]) == []


def test_a_straight_obround_is_no_curved_slot_nor_the_other_way_round() -> None:
    assert curved_slots(obround(-15 + 0j, 15 + 0j, 5.0)) == []
    assert obrounds(*bent(20.0, 60.0)) == []


@given(turn=st.floats(-29.9, 329.9), off=st.floats(-3.9, 3.9))
def test_where_a_place_lies_in_a_curved_slot(turn: float, off: float) -> None:
    slot = CurvedSlot((0,), (end_at(0), end_at(300)), HALF, POLE, BEND)
    point = POLE + cmath.rect(BEND - off, math.radians(turn))
    first, second = slot.reach(point)
    assert first == pytest.approx(BEND * math.radians(turn), abs=1e-9)
    assert first + second == pytest.approx(slot.length)
    assert slot.aside(point) == pytest.approx(off, abs=1e-9)
    assert cmath.isclose(slot.tangent_at(point), 1j * cmath.rect(1.0, math.radians(turn)), abs_tol=1e-9)


@given(turn=st.floats(0.0, 360.0), at=st.floats(-6.0, 36.0), off=st.floats(-4.9, 4.9))
def test_where_a_place_lies_in_an_obround(turn: float, at: float, off: float) -> None:
    along = cmath.rect(1.0, math.radians(turn))
    slot = Obround((0,), (7 + 3j, 7 + 3j + 30 * along), 5.0)
    point = 7 + 3j + along * complex(at, off)
    assert slot.reach(point) == pytest.approx((at, 30 - at), abs=1e-9)
    assert slot.aside(point) == pytest.approx(off, abs=1e-9)
    beyond = max(-at, at - 30, 0.0)
    assert slot.contains(point) is (math.hypot(beyond, off) < 5.0)


def test_room_goes_by_the_direction_asked_for() -> None:
    slot = Obround((0,), (0j, 30 + 0j), 5.0)
    assert slot.room(10 + 0j, 1 + 0j) == pytest.approx((10, 20))
    assert slot.room(10 + 0j, -1 + 0j) == pytest.approx((20, 10))
    assert slot.room(-1 + 0j, 1 + 0j) == pytest.approx((-1, 31))


@pytest.mark.parametrize(("sweep", "found"), [(178.0, 1), (182.0, 1), (176.0, 0)])
def test_half_arcs_may_be_a_bit_off(sweep: float, found: int) -> None:
    """2 % of the radius at each end, 2.3 degrees in all."""
    drawn = drawn_in_four(-15 + 0j, 15 + 0j, 5.0)
    drawn[3] = arc(-15 + 0j, 5.0, 270 - sweep - (180 - sweep) / 2, sweep)
    assert len(obrounds(*drawn)) == found
