from __future__ import annotations

import pytest

from dxfcheck.reading.reading import Observation
from tests.reading.slides.sliders import C, crank_and_rod, dibber, guide, named
from tests.sketches import A, Drawn, line, obround, observed, rectangle, ring, rod

UP = 500j


def only(kind: str, *things: Drawn) -> Observation:
    (seen,) = observed(kind, *things)
    return seen


def lever(base: complex) -> tuple[Drawn, ...]:
    """A lever on the frame, with a pin T of its own."""
    tip = base + 60
    return (ring(base, layer="FRAME"), ring(tip), rod(base, tip), *named(S=base, T=tip))


def test_an_oddity_at_a_pin_is_about_that_pin_and_its_mechanism() -> None:
    odd = only("block-without-guide", *dibber(), *lever(-600 + 0j))
    assert (odd.subject, odd.mechanism, odd.at, odd.layer) == ("C", "M2", C, "0")


def test_an_oddity_at_no_pin_is_about_the_link() -> None:
    odd = only("guide-taken-as-frame", *dibber(guide(layer="RAILS")), *lever(-600 + 0j))
    assert (odd.subject, odd.mechanism, odd.layer, odd.handles) == ("block at C", "M2", "RAILS", ("guide",))


def test_one_without_a_body_is_in_the_mechanism_of_its_pin() -> None:
    odd = only("empty-guide", *crank_and_rod(), guide(90 - 20j, 210 - 20j), *lever(-600 + 0j))
    assert (odd.subject, odd.mechanism, odd.layer) == ("C", "M2", "FRAME")


def test_handles_come_once_and_in_order() -> None:
    upright = guide(150 - 60j, 150 + 60j, handle="upright")
    assert only("two-guides", *dibber(guide(), upright)).handles == ("block", "guide", "upright")


def test_what_is_on_a_ring_that_carries_no_link_is_not_told() -> None:
    """A bearing on a frame layer far from the linkage, and a slot that holds the lone ring."""
    lone = ring(C + UP, 4.0, handle="lone")
    slot = obround(C + UP - 20 + 3j, C + UP + 20 + 3j, 6, handle="lone slot")
    assert observed("off-slot-centre", *dibber(guide()), lone, slot) == []
    pinned = (lone, ring(C + UP + 80j), rod(C + UP, C + UP + 80j))
    assert len(observed("off-slot-centre", *dibber(guide()), *pinned, slot)) == 1


@pytest.mark.parametrize("miss", [0.5, 1.3])
def test_pitch_circles_are_told_by_their_rings(miss: float) -> None:
    """Two wheels that miss one another: what is said names both rings, and their layer where no line is meant."""
    second = 100 + 0j
    drawn = (
        ring(A, layer="FRAME"),
        ring(second, layer="FRAME"),
        *(ring(A + tip, handle=f"r{tip}") for tip in (60j, 100 + 60j)),
        rod(A, A + 60j),
        rod(second, second + 60j),
        *named(A=A, D=second, B=60j, C=100 + 60j),
        ring(A, 40.0, layer="PITCH", handle="pinion"),
        ring(second, 60.0 - miss, layer="PITCH", handle="wheel"),
    )
    odd = only("off-tangency", *drawn)
    assert set(odd.handles) == {"pinion", "wheel"}
    assert odd.layer == "PITCH"
    assert odd.amount == pytest.approx(miss)


def test_a_sheet_without_slides_says_nothing_of_them() -> None:
    kinds = ("block-without-guide", "two-guides", "past-guide-end", "guide-taken-as-frame", "empty-guide")
    drawn = (*crank_and_rod(), rod(C, 200 + 60j), ring(200 + 60j, layer="FRAME"), line(600j, 610j), rectangle(UP, 9, 7))
    assert [odd for kind in kinds for odd in observed(kind, *drawn)] == []
