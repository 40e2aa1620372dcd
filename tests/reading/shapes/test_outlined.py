from __future__ import annotations

import pytest

from dxfcheck.reading.shapes.outlined import Outlined, find_outlined
from tests.sketches import Drawn, laid_out, line, obround, path, rectangle, ring

FAR = line(-100 + 90j, 100 + 90j)
SLOT = obround(-15 + 0j, 15 + 0j, 5)
ENDS = (line(-6 - 5j, -6 + 5j), line(6 - 5j, 6 + 5j))


def outlined(*things: Drawn) -> Outlined:
    """The closed shapes of these things; strands are numbered as the lines among them."""
    sheet, _ = laid_out(*things, FAR)
    frame = {strand.number for strand in sheet.strands if strand.frame}
    return find_outlined(sheet, frame, ())


def landed(found: Outlined) -> set[tuple[int, int, str]]:
    return {(each.strand, each.pin, each.how) for each in found.landings}


def test_lines_alone_are_none_of_it() -> None:
    found = outlined(ring(0j, 2.0), line(2 + 0j, 50 + 0j))
    assert landed(found) == {(0, 0, "end")}
    assert not any((found.borders, found.slots, found.empty, found.bars, found.groups, found.closed, found.oddities))


def test_a_pin_in_a_slot_does_not_land_on_it() -> None:
    found = outlined(ring(0j, 5.0), line(5j, 60j), SLOT)
    (slot,) = found.slots
    assert (slot.strands, slot.sites, slot.pinned) == ((1,), (0,), None)
    assert landed(found) == {(0, 0, "end")}
    assert found.groups == ((1,),)
    assert found.closed == {1}


def test_the_pivot_of_a_slotted_lever_lands_on_it() -> None:
    found = outlined(ring(-15 + 0j, 2.0), line(-15 + 2j, -15 + 60j), ring(10 + 0j, 2.0), line(10 + 2j, 40 + 60j), SLOT)
    (slot,) = found.slots
    assert (slot.pinned, slot.sites) == (0, (1,))
    assert (2, 0, "corner") in landed(found)
    assert not any(strand == 2 and pin == 1 for strand, pin, _ in landed(found))
    assert [oddity.kind for oddity in found.oddities] == ["slot-pins"]


def test_a_block_in_a_slot_holds_the_pin_and_does_not_weld_to_it() -> None:
    found = outlined(ring(0j, 2.0), line(2j, 60j), SLOT, *ENDS)
    (slot,) = found.slots
    assert sorted(slot.block) == [2, 3]
    assert {(strand, pin) for strand, pin, _ in landed(found)} == {(0, 0), (slot.block[0], 0)}
    assert found.never == {(1, 2), (2, 1), (1, 3), (3, 1)}
    assert {frozenset(group) for group in found.groups} == {frozenset({1}), frozenset({2, 3})}


def test_an_empty_slot_is_kept_for_what_is_said_of_it() -> None:
    found = outlined(ring(60j, 2.0), line(60j, 60j + 30), SLOT)
    assert found.slots == ()
    assert [shape.strands for shape in found.empty] == [(1,)]


def test_a_bar_has_its_two_holes() -> None:
    holes = [ring(at, 2.0) for at in (-15 + 0j, 15 + 0j)]
    found = outlined(*holes, SLOT)
    assert (found.bars, found.slots) == (((0,),), ())
    assert {(strand, pin) for strand, pin, _ in landed(found)} == {(0, 0), (0, 1)}


def test_a_plate_has_the_holes_in_it_but_not_what_slides_in_its_slot() -> None:
    plate = path(-40 - 30j, 40 - 30j, 40 + 30j, -40 + 30j, closed=True)
    holes = [ring(at, 2.0) for at in (-30 - 20j, 30 + 20j)]
    found = outlined(*holes, ring(0j, 5.0), line(5j, 70j), SLOT, plate)
    assert {(strand, pin) for strand, pin, _ in landed(found)} == {(0, 2), (2, 0), (2, 1)}
    assert (1, 2) in found.groups
    assert found.closed == {1, 2}


def test_a_plate_that_passes_by_a_pin_has_it_not() -> None:
    """The ring of the third pin touches its side from outside."""
    holes = [ring(at, 2.0) for at in (-30 + 0j, 30 + 0j)]
    found = outlined(*holes, ring(12j, 2.0), line(14j, 70j), rectangle(0j, 80, 20))
    assert {(strand, pin) for strand, pin, _ in landed(found)} == {(0, 2), (1, 0), (1, 1)}


def test_an_outline_round_whole_links_is_a_border_on_which_nothing_lands() -> None:
    link = (ring(-20 + 0j, 2.0), ring(20 + 0j, 2.0), line(-18 + 0j, 18 + 0j))
    found = outlined(*link, rectangle(0j, 80, 60))
    assert found.borders == {1}
    assert {(strand, pin) for strand, pin, _ in landed(found)} == {(0, 0), (0, 1)}


def test_a_fork_is_a_slot_open_at_one_end() -> None:
    fork = path(60 - 2j, -20 - 2j, -20 + 2j, 60 + 2j)
    found = outlined(ring(20 + 0j, 2.0), line(20 + 2j, 20 + 60j), fork)
    assert [(slot.strands, slot.sites) for slot in found.slots] == [((1,), (0,))]
    assert not any(strand == 1 for strand, _, _ in landed(found))


@pytest.mark.parametrize("layer", ["0", "FRAME"])
def test_a_slot_on_the_frame_is_a_slot_as_well(layer: str) -> None:
    assert len(outlined(ring(0j, 5.0), line(5j, 60j), SLOT._replace(layer=layer)).slots) == 1


def bar_outline(one: complex, other: complex, half: float) -> Drawn:
    """A closed rectangle round two pins, as a bar is drawn."""
    along = (other - one) / abs(other - one) * half
    side = along * 1j
    return path(one - along - side, other + along - side, other + along + side, one - along + side, closed=True)


def test_a_bar_that_covers_a_short_crank_is_no_border() -> None:
    """The crank from site 0 to 1 lies inside the coupler from 1 to 2, but its pivot's ring juts out."""
    crank = (ring(-20 + 4j, 2.0), ring(0j, 2.0), line(-18 + 3.6j, -2 + 0.4j))
    coupler = bar_outline(-30 + 0j, 60 + 0j, 5.0)
    rocker = (ring(60 + 0j, 2.0), line(62 + 0j, 90 + 60j), ring(90 + 60j, 2.0))
    found = outlined(*crank, coupler, *rocker)
    assert found.borders == frozenset()
    assert {(strand, pin) for strand, pin, _ in landed(found) if strand == 1} == {(1, 1), (1, 2)}


def test_a_slotted_lever_that_covers_the_crank_is_no_border_and_has_not_its_pivot() -> None:
    """The crank's pivot, site 0, lies inside the lever but off its axis; the lever's own is site 2."""
    crank = (ring(3 + 0j, 2.0), ring(30j, 2.0), line(2.8 + 2j, 0.2 + 28j))
    lever = (bar_outline(-80j, 60j, 8.0), obround(14j, 50j, 4.0), ring(-80j, 2.0), line(-82j, -100j))
    found = outlined(*crank, *lever)
    assert found.borders == frozenset()
    assert {(strand, pin) for strand, pin, _ in landed(found) if strand == 1} == {(1, 2)}
    assert [odd.site for odd in found.oddities if odd.kind == "doubtful-hole"] == [0]


def test_the_corners_of_a_slot_cut_out_of_a_lever_land_on_no_ring_they_pass_by() -> None:
    pivot = (ring(3.5 + 0j, 2.0), line(3.5 + 2j, 30j))
    lever = (bar_outline(-80j, 60j, 8.0), obround(0j, 50j, 4.0), ring(-80j, 2.0), line(-82j, -100j))
    found = outlined(*pivot, ring(30j, 3.5), *lever)
    (slot,) = found.slots
    assert not any(strand in slot.strands for strand, _, _ in landed(found))


@pytest.mark.parametrize("plate_layer", ["0", "FRAME"])
@pytest.mark.parametrize("slot_layer", ["0", "FRAME"])
def test_a_slot_is_cut_out_of_a_plate_unless_the_plate_moves_over_a_slot_of_the_frame(
    plate_layer: str, slot_layer: str
) -> None:
    plate = rectangle(0j, 80, 40)._replace(layer=plate_layer)
    pin = (ring(0j, 5.0), line(5j, 70j))
    found = outlined(*pin, SLOT._replace(layer=slot_layer), plate)
    moves_over = (plate_layer, slot_layer) == ("0", "FRAME")
    assert ((2, 0) in {(strand, pin) for strand, pin, _ in landed(found)}) == moves_over
    assert found.slotted == (frozenset() if moves_over else {2})


def test_a_line_along_the_side_of_a_slot_does_not_hold_its_pin() -> None:
    slotted = (ring(0j, 5.0), line(5j, 60j), SLOT)
    along = [line(-12 - 5j, 12 - 5j), line(-12 - 5j, 12 - 5j, layer="FRAME")]
    assert [{strand for strand, _, _ in landed(outlined(*slotted, each))} for each in along] == [{0}, {0}]
    assert {strand for strand, _, _ in landed(outlined(*slotted, line(-12 - 7j, 12 - 3j)))} == {0, 2}
