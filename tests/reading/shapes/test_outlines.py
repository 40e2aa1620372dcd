from __future__ import annotations

import pytest

from dxfcheck.reading.shapes.outlines import inside_outline
from tests.sketches import A, B, C, D, Drawn, labels, links, obround, path, pins, read_as, ring, rod, tipper

E = 90 + 110j
WITHOUT_COUPLER = (*pins(), rod(A, B), rod(C, D), *labels())
ROUND_B_AND_C = (B - 20 - 20j, C + 20 - 20j, C + 20 + 20j, B - 20 + 20j)
"""Corners of a plate that holds the pins B and C and lies clear of A and D."""
BORDER = (-50 - 50j, 300 - 50j, 300 + 200j, -50 + 200j)


def plate(*corners: complex) -> Drawn:
    return path(*corners, closed=True, handle="plate")


def test_a_closed_outline_is_one_link_with_the_pins_at_its_corners() -> None:
    assert links(*WITHOUT_COUPLER, plate(B, C, E), ring(E)) == ["frame", "A-B", "B-C-P1", "C-D"]


def test_with_no_pin_at_a_corner_it_has_the_pins_inside_it() -> None:
    drawn = [*WITHOUT_COUPLER, plate(*ROUND_B_AND_C)]
    assert links(*drawn) == ["frame", "A-B", "B-C", "C-D"]
    assert read_as(*drawn)["plate"] == "link"


def test_pins_inside_do_not_count_where_a_corner_has_a_pin() -> None:
    inside = (B + C + E) / 3
    assert links(*WITHOUT_COUPLER, plate(B, C, E), ring(inside)) == ["frame", "A-B", "B-C", "C-D"]


def test_a_corner_may_lie_inside_the_ring_of_its_pin() -> None:
    assert links(*WITHOUT_COUPLER, plate(B + 1, C - 1, E)) == ["frame", "A-B", "B-C", "C-D"]


@pytest.mark.parametrize("drawing", [tipper(), (*tipper(), plate(B, C, E), ring(E))], ids=["lines", "and a plate"])
def test_an_outline_round_whole_links_is_a_border(drawing: tuple[Drawn, ...]) -> None:
    border = path(*BORDER, closed=True, handle="border")
    assert read_as(*drawing, border)["border"] == "skipped"
    assert links(*drawing, border) == links(*drawing)


def test_an_outline_with_a_whole_line_of_another_link_in_it_is_no_link() -> None:
    guard = path(A - 10 - 10j, B + 20 - 45j, B + 20 + 20j, A - 10 + 55j, closed=True, handle="guard")
    drawn = [*tipper(), guard]
    assert read_as(*drawn)["guard"] == "skipped"
    assert links(*drawn) == ["frame", "A-B", "B-C", "C-D"]


def test_an_outline_that_holds_no_pin_is_other_linework() -> None:
    table = path(-20 - 20j, 200 - 20j, 200 - 60j, -20 - 60j, closed=True, handle="table")
    assert read_as(*tipper(), table)["table"] == "other linework"
    assert links(*tipper(), table) == ["frame", "A-B", "B-C", "C-D"]


def test_an_outline_with_bulges_holds_the_pins_inside_it() -> None:
    """A bar that is longer than the distance of its pins."""
    along = (C - B) / abs(C - B)
    bar = obround(B - 15 * along, C + 15 * along, 9.0)
    assert links(*WITHOUT_COUPLER, bar) == ["frame", "A-B", "B-C", "C-D"]


SQUARE = [0j, 10 + 0j, 10 + 10j, 10j]
NOTCHED = [0j, 10 + 0j, 10 + 10j, 5 + 2j, 10j]


@pytest.mark.parametrize(
    ("outline", "point", "inside"),
    [
        pytest.param(SQUARE, 5 + 5j, True, id="inside"),
        pytest.param(SQUARE, 11 + 5j, False, id="right of it"),
        pytest.param(SQUARE, -1 + 5j, False, id="left of it"),
        pytest.param(SQUARE, 5 + 11j, False, id="above it"),
        pytest.param(SQUARE[::-1], 5 + 5j, True, id="drawn clockwise"),
        pytest.param(NOTCHED, 5 + 5j, False, id="in a notch"),
        pytest.param(NOTCHED, 1 + 5j, True, id="beside a notch"),
        pytest.param(NOTCHED, 5 + 1j, True, id="under a notch"),
    ],
)
def test_what_lies_inside_an_outline(outline: list[complex], point: complex, inside: bool) -> None:  # noqa: FBT001
    assert inside_outline(point, outline) is inside
