from __future__ import annotations

import pytest

from tests.reading.slides.sliders import C, block, crank_and_rod, dibber, guide, slid, turned_rectangle
from tests.sketches import Drawn, line, observed, path, rectangle, ring

BELOW = guide(90 - 10j, 210 - 10j)
KINDS = ("block-without-guide", "two-guides", "past-guide-end")


@pytest.mark.parametrize(
    "guides",
    [
        pytest.param([guide()], id="through"),
        pytest.param([BELOW, guide(90 + 10j, 210 + 10j, handle="other")], id="rails"),
        pytest.param([BELOW, guide(90 - 15j, 210 - 15j, handle="other")], id="two frame lines on one side"),
    ],
)
def test_a_block_on_its_guide_is_not_odd(guides: list[Drawn]) -> None:
    assert [each for kind in KINDS for each in observed(kind, *dibber(*guides))] == []


# --- blocks without a guide ---


@pytest.mark.parametrize(
    ("lines", "amount", "limit", "words"),
    [
        pytest.param([], None, None, "no line runs through it or along it; expected", id="no line at all"),
        pytest.param(
            [guide(90 - 23j, 210 - 23j)],
            13.0,
            10.0,
            "the nearest line parallel to a side is {amount}",
            id="too far off",
        ),
        pytest.param(
            [guide(90 - 30j, 210 - 30j), guide(90 + 25j, 210 + 25j, handle="other")],
            15.0,
            10.0,
            "the nearest line parallel to a side",
            id="the nearer of two",
        ),
        pytest.param(
            [guide(190 - 60j, 190 + 60j)], 25.0, 15.0, "the nearest line parallel to a side", id="across, too far off"
        ),
        pytest.param(
            [guide(190 + 0j, 260 + 0j)],
            25.0,
            None,
            "the nearest one in its way ends {amount} before it",
            id="too short",
        ),
        pytest.param([guide(90 - 100j, 210 - 100j)], None, None, "no line runs through", id="further than is looked"),
        pytest.param([guide(140 - 23j, 160 - 23j)], None, None, "no line runs through", id="shorter than the block"),
        pytest.param([guide(90 - 23j, 210 - 28j)], None, None, "no line runs through", id="not parallel"),
    ],
)
def test_a_block_without_a_guide_says_how_far_off_the_nearest_line_is(
    lines: list[Drawn], amount: float | None, limit: float | None, words: str
) -> None:
    assert slid(*dibber(*lines)) == []
    (odd,) = observed("block-without-guide", *dibber(*lines))
    assert odd.amount == (None if amount is None else pytest.approx(amount))
    assert odd.limit == (None if limit is None else pytest.approx(limit))
    assert words in odd.detail
    assert odd.detail.endswith("no further off than half the block's width")
    assert (odd.subject, odd.at, odd.handles, odd.mechanism) == ("C", C, ("block",), "M1")


def test_a_guide_that_other_lines_weld_to_its_block_cannot_guide_it() -> None:
    stray = guide(layer="0")
    bracket = (line(210 + 0j, 150 + 40j, handle="bracket"), line(150 + 40j, 150 + 10j, handle="post"))
    assert slid(*dibber(stray, *bracket)) == []
    (odd,) = observed("block-without-guide", *dibber(stray, *bracket))
    assert "welded to it by other linework" in odd.detail
    assert odd.handles == ("block", "guide")
    assert odd.subject == "C"


# --- two guides ---


def test_two_guides_across_one_another_are_told_and_the_first_is_taken() -> None:
    upright = guide(150 - 60j, 150 + 60j, handle="upright")
    drawn = dibber(guide(), upright)
    assert [each.direction for each in slid(*drawn)] == [1 + 0j]
    (odd,) = observed("two-guides", *drawn)
    assert odd.detail == (
        "two guides fit the block, where one was expected: one that runs through it, at 0 degrees, and one across it "
        "that runs through it, {amount} from its middle; read as sliding along the first"
    )
    assert (odd.amount, odd.subject, odd.at) == (0.0, "C", C)
    assert odd.handles == ("block", "guide", "upright")


def test_two_guides_along_one_another_say_how_far_off_the_second_is() -> None:
    drawn = (*crank_and_rod(), turned_rectangle(C, 30, 20, 0.0), *(guide(90 + y, 210 + y, layer="0") for y in (0j, 7j)))
    (odd,) = observed("two-guides", *drawn)
    assert "one along it" in odd.detail
    assert odd.amount == pytest.approx(7.0)


# --- past the end ---


@pytest.mark.parametrize(
    ("start", "end", "past"),
    [
        (90.0, 165.0, None),
        (90.0, 164.9, None),
        (90.0, 164.7, 0.3),
        (90.0, 160.0, 5.0),
        (138.0, 210.0, 3.0),
        (138.0, 160.0, None),
    ],
)
def test_a_block_drawn_past_the_end_of_its_guide(start: float, end: float, past: float | None) -> None:
    """It may be off by a fiftieth of half its width; a line shorter than the block is none of its guides."""
    odd = observed("past-guide-end", *dibber(guide(start - 10j, end - 10j)))
    assert [each.amount for each in odd] == ([] if past is None else [pytest.approx(past)])
    for each in odd:
        assert each.limit == pytest.approx(0.2)
        assert (each.subject, each.handles) == ("C", ("block", "guide"))


def test_a_rod_in_a_barrel_has_no_end_to_be_past() -> None:
    pins = (ring(0j, layer="FRAME"), ring(120 + 0j), ring(60 + 90j, layer="FRAME"))
    drawn = (*pins, line(120 + 0j, 60 + 90j), rectangle(30 + 0j, 80, 24), line(40 + 0j, 116 + 0j))
    assert len(slid(*drawn)) == 1
    assert observed("past-guide-end", *drawn) == []


def test_a_piston_half_out_of_its_cylinder() -> None:
    cylinder = path(90 + 10j, 155 + 10j, 155 - 10j, 90 - 10j, layer="FRAME")
    assert [each.amount for each in observed("past-guide-end", *crank_and_rod(), block(), cylinder)] == [
        pytest.approx(10.0)
    ]
