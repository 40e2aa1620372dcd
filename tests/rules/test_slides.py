from __future__ import annotations

import cmath
import math

import pytest

from dxfcheck.drawing.primitives import LengthUnit
from tests.rules.subjects import findings, only
from tests.sketches import Drawn, arc, line, obround, path, rectangle, ring, rod, text

A, B, C = 0j, 40 + 45j, 210 + 0j
RULES = (
    "block-without-guide",
    "two-guides",
    "past-guide-end",
    "guide-taken-as-frame",
    "empty-guide",
    "slot-pins",
    "off-slot-centre",
    "doubtful-hole",
)
BLOCK = rectangle(C, 24, 16, handle="block")


def dibber(*guided: Drawn) -> tuple[Drawn, ...]:
    """A crank AB on the frame and a rod BC, and whatever its pin C is guided by."""
    names = {"A": A, "B": B, "C": C}
    rings = [ring(at, layer="FRAME" if name == "A" else "0", handle=f"ring {name}") for name, at in names.items()]
    return (*rings, rod(A, B), rod(B, C), *(text(name, at + 6 + 9j) for name, at in names.items()), *guided)


def guide(aside: float = 0.0, *, behind: float = 80.0, ahead: float = 60.0, layer: str = "FRAME") -> Drawn:
    """A level line past pin C."""
    return line(C - behind + aside * 1j, C + ahead + aside * 1j, layer=layer, handle="guide")


@pytest.mark.parametrize("rule", RULES)
def test_nothing_is_wrong_with_a_block_on_its_guide(rule: str) -> None:
    assert findings(rule, *dibber(BLOCK, guide())) == []


@pytest.mark.parametrize("rule", RULES)
def test_nothing_is_wrong_with_a_pin_in_its_slot(rule: str) -> None:
    assert findings(rule, *dibber(obround(C - 30, C + 30, 5)._replace(layer="FRAME"))) == []


def test_a_block_too_far_from_its_guide_says_how_far_and_against_which_limit() -> None:
    found = only("block-without-guide", *dibber(BLOCK, guide(-20)))
    assert (found.severity, found.at, found.handles, found.mechanism) == ("error", C, ("block",), "M1")
    assert found.message.startswith("the block at pin C: the nearest line parallel to a side is 12 mm (limit 8 mm)")
    assert "expected a guide line" in found.message
    assert "draw its guide" in found.remedy


def test_a_block_past_its_guide_altogether_says_where_the_guide_ends() -> None:
    found = only("block-without-guide", *dibber(BLOCK, guide(-10, ahead=-32)))
    assert "the nearest one in its way ends 20 mm before it" in found.message


def test_a_block_with_nothing_near_says_what_was_expected() -> None:
    found = only("block-without-guide", *dibber(BLOCK))
    assert "no line runs through it or along it; expected a guide line" in found.message


def test_a_block_that_is_tied_to_its_guide_cannot_slide() -> None:
    lug = [line(C + 12 + 4j, C + 30 + 4j), line(C + 30 + 4j, C + 30 - 8j)]
    found = only("block-without-guide", *dibber(BLOCK, guide(-8), *lug))
    assert "its guide is welded to it" in found.message
    assert "take away the line" in found.remedy


def test_a_block_with_two_guides_says_which_was_taken_and_where_the_other_is() -> None:
    post = line(C + 16 - 40j, C + 16 + 40j, layer="FRAME", handle="post")
    found = only("two-guides", *dibber(BLOCK, guide(-12), post))
    assert (found.severity, found.at, found.handles) == ("error", C, ("block", "guide", "post"))
    assert "at pin C: two guides fit the block, where one was expected" in found.message
    assert "at 0 degrees" in found.message
    assert "16 mm from its middle; read as sliding along the first" in found.message


def test_a_block_past_the_end_of_its_guide_says_how_far() -> None:
    found = only("past-guide-end", *dibber(BLOCK, guide(-10, ahead=5)))
    assert (found.severity, found.at, found.mechanism) == ("warning", C, "M1")
    assert "at pin C: the block stands 7 mm (limit 0.16 mm) past the end of its guide" in found.message
    assert "lengthen the guide" in found.remedy


def test_a_ram_past_the_end_of_its_rails_is_told_of_its_block() -> None:
    ram = rectangle(C + 60, 40, 16, handle="ram")
    rails = (line(C + 20 - 8j, C + 70 - 8j, layer="FRAME"), line(C + 20 + 8j, C + 70 + 8j, layer="FRAME"))
    found = only("past-guide-end", *dibber(ring(B), rod(C, C + 44), ram, *rails))
    assert found.message.startswith("on block at C: the block stands 10 mm")


def test_a_pin_past_the_end_of_its_slot_says_how_far() -> None:
    found = only("past-guide-end", *dibber(obround(C - 60, C - 2, 5, handle="slot")))
    assert "at pin C: the pin stands 2 mm" in found.message
    assert "past the end of its slot" in found.message
    assert "lengthen the slot" in found.remedy


def test_a_guide_that_nothing_holds_is_told_with_what_slides_on_it() -> None:
    found = only("guide-taken-as-frame", *dibber(BLOCK, guide(layer="0")))
    assert (found.severity, found.handles) == ("warning", ("guide",))
    assert "read as fixed to the frame (block at C slides on it)" in found.message
    assert "FRAME" in found.remedy


def test_a_guide_without_a_block_says_how_far_the_pin_is_and_what_was_expected() -> None:
    found = only("empty-guide", *dibber(guide(-12)))
    assert (found.severity, found.at, found.handles) == ("warning", C, ("guide",))
    assert "at pin C: a frame line with nothing on it runs 12 mm from the pin" in found.message
    assert "expected a rectangle (a block) round the pin" in found.message
    assert "draw the block" in found.remedy


def test_a_slot_beside_the_pin_says_how_far_off_it_is() -> None:
    found = only("empty-guide", *dibber(obround(C - 40 - 20j, C + 40 - 20j, 5, handle="slot")))
    assert "at pin C: a slot holds no pin, and the pin stands 15 mm from it" in found.message
    assert "delete the slot" in found.remedy


def test_a_slot_with_two_pins_says_what_was_expected_and_how_far_it_is_from_a_bar() -> None:
    second = C + 50
    pusher = (ring(second), rod(C, second), text("D", second + 6 + 9j), obround(C - 30, second + 20, 5, handle="slot"))
    found = only("slot-pins", *dibber(*pusher))
    assert (found.severity, found.handles) == ("warning", ("slot",))
    assert "two pins in one slot, where one pin (a slot) or a pin at each end (a bar) was expected" in found.message
    assert "a pin is 30 mm (limit 0.1 mm) from its end's centre" in found.message
    assert "ends if it is a bar" in found.remedy


def test_a_pin_beside_the_centre_line_of_its_slot_says_how_far() -> None:
    found = only("off-slot-centre", *dibber(obround(C - 30 + 1j, C + 30 + 1j, 5, handle="slot")))
    assert (found.severity, found.at, found.handles) == ("warning", C, ("slot",))
    assert found.message == "at pin C: the pin is 1 mm (limit 0.1 mm) off the centre line of its slot"


def test_figures_are_bare_where_the_drawing_has_no_unit() -> None:
    unitless = LengthUnit("unitless", "assumed", None)
    found = only("off-slot-centre", *dibber(obround(C - 30 + 1j, C + 30 + 1j, 5)), unit=unitless)
    assert "the pin is 1 (limit 0.1) off" in found.message


def strip(one: complex, other: complex) -> Drawn:
    """A strip of sheet metal with square ends round two holes."""
    along = 12 * (other - one) / abs(other - one)
    side = along * 1j
    return path(one - along - side, other + along - side, other + along + side, one - along + side, closed=True)


@pytest.mark.parametrize(("holes", "told"), [(1, 1), (2, 0)])
def test_a_hole_under_two_strips_is_told_where_it_is_drawn_once(holes: int, told: int) -> None:
    end = 100 + 0j
    base = (ring(A, layer="FRAME"), ring(end), text("A", A + 14j), text("B", B + 14j), text("C", end + 14j))
    found = findings("doubtful-hole", *base, *[ring(B)] * holes, strip(A, B), strip(B + 2j, end + 2j))
    assert len(found) == told
    for each in found:
        assert (each.severity, each.at) == ("warning", B)
        assert each.message.startswith("the hole at pin B: 2 outlines lie over it but 1 ring is drawn")


def curved_slot(centre: complex) -> tuple[Drawn, ...]:
    """Two arcs of radii 95 and 105 from -20 to 20 degrees, closed by half arcs."""
    ends = ((cmath.rect(100, math.radians(turn)), start) for turn, start in ((-20, 160), (20, 20)))
    caps = (arc(centre + end, 5, start, 180) for end, start in ends)
    return arc(centre, 105, -20, 40), arc(centre, 95, -20, 40), *caps


def test_a_curved_slot_is_held_to_its_own_centre_line() -> None:
    assert findings("off-slot-centre", *dibber(*curved_slot(C - 100))) == []
    found = only("off-slot-centre", *dibber(*curved_slot(C - 98)))
    assert "the pin is 2 mm (limit 0.1 mm) off the centre line" in found.message
