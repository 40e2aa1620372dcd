from __future__ import annotations

import pytest

from tests.reading.slides.sliders import B, C, crank_and_rod, dibber, guide, named, strokes
from tests.sketches import Drawn, line, obround, observed, ring, rod

SLOT = obround(130 + 0j, 180 + 0j, 4.5)._replace(layer="FRAME")
REACH = 48.0
"""Six diameters of the pin's ring."""


def empty(*things: Drawn) -> list[tuple[str, float, tuple[str, ...]]]:
    """Pin, distance (to six digits) and linework of each guide or slot that holds nothing."""
    return [(each.subject, round(each.amount or 0.0, 6), each.handles) for each in observed("empty-guide", *things)]


@pytest.mark.parametrize(
    ("away", "found"), [(20.0, True), (47.9, True), (48.1, False)], ids=["near", "within reach", "out of reach"]
)
def test_a_frame_line_that_holds_nothing_near_a_pin_of_one_link(away: float, found: bool) -> None:  # noqa: FBT001
    line_below = guide(90 - away * 1j, 210 - away * 1j)
    assert empty(*crank_and_rod(), line_below) == ([("C", away, ("guide",))] if found else [])
    for odd in observed("empty-guide", *crank_and_rod(), line_below):
        assert (odd.at, odd.limit, odd.mechanism) == (C, REACH, "M1")
        assert "expected a rectangle (a block) round the pin" in odd.detail


def test_the_nearest_one_counts() -> None:
    lines = [guide(90 - 30j, 210 - 30j), guide(90 + 25j, 210 + 25j, handle="upper")]
    assert empty(*crank_and_rod(), *lines) == [("C", 25.0, ("upper",))]


@pytest.mark.parametrize(("length", "found"), [(8.1, True), (7.9, False)])
def test_a_frame_line_shorter_than_the_pins_diameter_is_no_guide(length: float, found: bool) -> None:  # noqa: FBT001
    assert bool(empty(*crank_and_rod(), guide(150 - 20j, 150 + length - 20j))) == found


@pytest.mark.parametrize(("count", "found"), [(3, True), (2, False), (0, False)])
def test_a_line_off_the_frame_layer_is_a_guide_by_three_strokes(count: int, found: bool) -> None:  # noqa: FBT001
    hatch = strokes(90 - 20j, 210 - 20j, count=count) if count else ()
    assert [each[0] for each in empty(*crank_and_rod(), guide(90 - 20j, 210 - 20j, layer="0"), *hatch)] == (
        ["C"] if found else []
    )


def test_a_slot_that_holds_nothing() -> None:
    drawn = (*crank_and_rod(), obround(130 - 20j, 180 - 20j, 4.5, handle="slot"))
    assert empty(*drawn) == [("C", 15.5, ("slot",))]
    (odd,) = observed("empty-guide", *drawn)
    assert "a slot holds no pin" in odd.detail
    assert empty(*crank_and_rod(), obround(130 - 60j, 180 - 60j, 4.5)) == []


@pytest.mark.parametrize(
    "things",
    [
        pytest.param([*dibber(guide()), guide(90 - 30j, 210 - 30j, handle="lower")], id="a pin that slides"),
        pytest.param(
            [*crank_and_rod(), rod(C, 200 + 60j), ring(200 + 60j, layer="FRAME"), guide(90 - 30j, 210 - 30j)],
            id="a pin of two links",
        ),
        pytest.param(
            [*crank_and_rod(), ring(C, 3.0, layer="FRAME"), guide(90 - 30j, 210 - 30j)], id="a pin on the frame"
        ),
        pytest.param([*crank_and_rod(), SLOT, guide(90 - 30j, 210 - 30j)], id="a pin in a slot"),
        pytest.param(
            [*crank_and_rod(), line(-4j, 90 - 30j, layer="FRAME"), guide(90 - 30j, 210 - 30j)],
            id="a line of a bracket that holds a pin",
        ),
        pytest.param([*crank_and_rod(), line(90 - 30j, 210 - 30j)], id="a line that is not frame"),
    ],
)
def test_what_needs_no_guide(things: list[Drawn]) -> None:
    assert empty(*things) == []


def test_every_pin_of_one_link_has_its_own() -> None:
    tip, upper = 150 + 140j, guide(90 + 150j, 210 + 150j, handle="upper")
    fork = (rod(B, tip, handle="second rod"), ring(tip), *named(T=tip))
    assert empty(*crank_and_rod(), *fork, guide(90 - 20j, 210 - 20j), upper) == [
        ("C", 20.0, ("guide",)),
        ("T", 10.0, ("upper",)),
    ]
