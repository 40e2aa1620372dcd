from __future__ import annotations

import cmath
import math

import pytest

from tests.sketches import A, B, D, Drawn, arc, fates, line, links, path, read, ring, tipper

AS_DRAWN = ["frame", "A-B", "B-C", "C-D"]
MIDDLE = (A + B) / 2


def cross(at: complex, reach: float, tilt: complex = 1j) -> list[Drawn]:
    return [
        line(at - reach, at + reach, handle="mark 1"),
        line(at - reach * tilt, at + reach * tilt, handle="mark 2"),
    ]


def why(*things: Drawn) -> set[tuple[str, str]]:
    read = fates(*things)
    return {(fate.read_as, fate.why) for handle, fate in read.items() if handle.startswith("mark")}


@pytest.mark.parametrize("reach", [4.5, 7.9])
def test_a_centre_cross_just_outside_its_ring_is_a_mark(reach: float) -> None:
    drawn = [*tipper(), *cross(B, reach)]
    assert why(*drawn) == {("skipped", "a centre cross")}
    assert links(*drawn) == AS_DRAWN


def test_lines_that_run_on_further_are_no_centre_cross() -> None:
    assert why(*tipper(), *cross(B, 8.1)) == {("link", "part of a link")}


def test_a_lone_line_through_a_ring_is_no_cross() -> None:
    assert why(*tipper(), *cross(B, 5.0)[:1]) == {("link", "part of a link")}


@pytest.mark.parametrize(("degrees", "marks"), [(31, True), (29, False)])
def test_the_lines_of_a_cross_stand_thirty_degrees_apart(degrees: float, marks: bool) -> None:  # noqa: FBT001 - a table
    tilt = cmath.exp(1j * math.radians(degrees))
    assert (("skipped", "a centre cross") in why(*tipper(), *cross(B, 5.0, tilt))) is marks


def test_a_centre_line_that_runs_on_to_another_ring_is_part_of_both_crosses() -> None:
    axes = [
        line(A - 5, D + 5, handle="mark 1"),
        line(A - 5j, A + 5j, handle="mark 2"),
        line(D - 5j, D + 5j, handle="mark 3"),
    ]
    assert why(*tipper(), *axes) == {("skipped", "a centre cross")}
    assert links(*tipper(), *axes) == AS_DRAWN


@pytest.mark.parametrize(
    "marks",
    [
        pytest.param([line(B - 2, B + 2)], id="a stroke through the centre"),
        pytest.param([line(B - 2 + 1j, B + 2 + 1j)], id="a stroke off the centre"),
        pytest.param([line(B - 4, B + 4)], id="a diameter from rim to rim"),
        pytest.param([arc(B, 2.0, 0, 250)], id="an arc"),
        pytest.param([path(B - 1, B + 1, B + 1j, closed=True)], id="an outline"),
    ],
)
def test_linework_wholly_inside_a_ring_is_a_mark(marks: list[Drawn]) -> None:
    named = [mark._replace(handle=f"mark {number}") for number, mark in enumerate(marks)]
    assert why(*tipper(), *named) == {("skipped", "a mark inside a ring")}
    assert links(*tipper(), *named) == AS_DRAWN


def arrow(tip: complex, barb: complex = -5 + 1j, other: complex = -5 - 1j) -> list[Drawn]:
    """A shaft of 30 from the left with two barbs."""
    return [
        line(tip - 30, tip, handle="mark 1"),
        line(tip, tip + barb, handle="mark 2"),
        line(tip, tip + other, handle="mark 3"),
    ]


def test_an_arrow_that_points_at_a_link_is_a_mark() -> None:
    assert why(*tipper(), *arrow(MIDDLE)) == {("skipped", "an arrow")}
    assert links(*tipper(), *arrow(MIDDLE)) == AS_DRAWN


@pytest.mark.parametrize(
    ("barb", "other"),
    [
        pytest.param(-5 + 1j, -5 + 1.5j, id="both barbs on one side"),
        pytest.param(5 + 1j, 5 - 1j, id="swept forward"),
        pytest.param(-1 + 5j, -1 - 5j, id="too blunt"),
        pytest.param(-25 + 4j, -25 - 4j, id="barbs as long as the shaft"),
    ],
)
def test_what_is_no_arrow(barb: complex, other: complex) -> None:
    assert ("skipped", "an arrow") not in why(*tipper(), *arrow(MIDDLE, barb, other))


@pytest.mark.parametrize(("back", "marks"), [(17.6, True), (18.2, False)])
def test_barbs_are_at_most_three_fifths_of_their_shaft(back: float, marks: bool) -> None:  # noqa: FBT001 - a table
    read_as = why(*tipper(), *arrow(MIDDLE, -back + 2j, -back - 2j))
    assert (("skipped", "an arrow") in read_as) is marks


def test_a_pinned_tip_is_a_joint_and_no_arrowhead() -> None:
    drawn = [*tipper(), ring(-30 + 50j, handle="ring E"), *arrow(-30 + 50j)]
    assert ("skipped", "an arrow") not in why(*drawn)


def test_a_speck_on_a_link_is_too_short_to_be_one() -> None:
    assert why(*tipper(), line(B, B, handle="mark")) == {("skipped", "a speck, too short to be a link")}


@pytest.mark.parametrize(("tolerances", "speck"), [(9.9, True), (10.1, False)])
def test_ten_tolerances_make_a_line(tolerances: float, speck: bool) -> None:  # noqa: FBT001 - a table
    size = tolerances * read(*tipper()).tolerance
    marks = why(*tipper(), line(MIDDLE, MIDDLE + size * 1j, handle="mark"))
    assert (marks == {("skipped", "a speck, too short to be a link")}) is speck
