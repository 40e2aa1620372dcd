from __future__ import annotations

import cmath
import math

import pytest

from dxfcheck.reading.bodies.body import Body
from dxfcheck.tolerances.linework import COINCIDENCE_OF_DIAGONAL
from tests.sketches import (
    A,
    B,
    C,
    D,
    Drawn,
    arc,
    counts,
    fill,
    labels,
    laid_out,
    line,
    links,
    obround,
    path,
    pins,
    read_as,
    ring,
    rod,
    rods,
    sketch,
    text,
    tipper,
)

E = 90 + 120j
MIDDLE = (B + C) / 2
AS_DRAWN = ["frame", "A-B", "B-C", "C-D"]
WITHOUT_COUPLER = (*pins(), rod(A, B), rod(C, D), *labels())
T = COINCIDENCE_OF_DIAGONAL * sketch(*tipper()).diagonal


def corner(at: complex, one: complex, other: complex) -> Drawn:
    """A stroke across a corner."""
    return line(*(at + 12 * (far - at) / abs(far - at) for far in (one, other)))


TRIANGLE = (rod(B, C), rod(C, E), rod(E, B), ring(E), text("E", E + 5))
STROKES = (corner(B, C, E), corner(C, B, E), corner(E, B, C))


@pytest.mark.parametrize("ends", [rods(), (line(A, B), line(B, C), line(C, D))], ids=["rim to rim", "to the centres"])
def test_lines_to_the_rim_and_lines_to_the_centre_read_alike(ends: tuple[Drawn, ...]) -> None:
    assert links(*pins(), *ends, *labels()) == AS_DRAWN
    assert counts(*pins(), *ends, *labels()) == (4, 4)


def test_a_ring_that_interrupts_a_line_hinges_both_pieces() -> None:
    drawn = [ring(A, layer="FRAME"), ring(50 + 0j), ring(100 + 0j), rod(0j, 50 + 0j), rod(50 + 0j, 100 + 0j)]
    assert links(*drawn) == ["frame", "P1-P2", "P2-P3"]


def test_a_line_that_runs_on_through_a_pin_is_one_link_with_both() -> None:
    drawn = [ring(A, layer="FRAME"), ring(50 + 0j), ring(100 + 0j), line(0j, 100 + 0j)]
    assert links(*drawn) == ["frame", "P1-P2-P3"]


def test_one_polyline_through_several_pins_is_one_link() -> None:
    drawn = [*WITHOUT_COUPLER, path(B, C, E, handle="bell"), ring(E), text("E", E + 5)]
    assert links(*drawn) == ["frame", "A-B", "B-C-E", "C-D"]


@pytest.mark.parametrize(
    "twice",
    [
        pytest.param(rod(B, C, handle="twice"), id="rim to rim"),
        pytest.param(line(C, B, handle="twice"), id="centre to centre, the other way"),
        pytest.param(line(B + 0.9j * T, C + 0.9j * T, handle="twice"), id="within t beside it"),
    ],
)
def test_lines_that_lie_on_one_another_between_two_pins_are_one_drawn_twice(twice: Drawn) -> None:
    _, parts = laid_out(*tipper(), twice)
    assert len(parts.bodies.doubles) == 1
    assert links(*tipper(), twice) == AS_DRAWN


def test_lines_beside_one_another_stay_two_links() -> None:
    beside = line(B + 0.05j, C + 0.05j)
    assert links(*tipper(), beside) == ["frame", "A-B", "B-C", "B-C (2)", "C-D"]


def test_an_overlapping_line_that_ends_elsewhere_stays_a_link_of_its_own() -> None:
    along = (C - B) / abs(C - B)
    drawn = [*tipper(), line(B, B + 60 * along), ring(B + 60 * along, 3.0), text("F", B + 60 * along + 4j)]
    assert len(laid_out(*drawn)[1].bodies.doubles) == 0


def test_a_folded_dead_centre_lays_the_coupler_over_the_cranks_pivot() -> None:
    drawn = [
        ring(0j, layer="FRAME"),
        ring(-20 + 0j),
        ring(100 + 0j),
        ring(120 - 50j, layer="FRAME"),
        line(0j, -20 + 0j),
        line(-20 + 0j, 100 + 0j),
        line(100 + 0j, 120 - 50j),
    ]
    assert links(*drawn) == ["frame", "P1-P2", "P1-P3", "P3-P4"]
    assert len(laid_out(*drawn)[1].bodies.laid_over) == 1


@pytest.mark.parametrize(
    "arm",
    [
        pytest.param(line(MIDDLE, E), id="an end on a line's inside"),
        pytest.param(line(MIDDLE + 0.9j * T, E), id="within t of it"),
        pytest.param(path(E, MIDDLE + 30j, MIDDLE), id="a polyline's end"),
    ],
)
def test_linework_that_meets_without_a_pin_is_welded(arm: Drawn) -> None:
    assert links(*tipper(), arm, ring(E), text("E", E + 5)) == ["frame", "A-B", "B-C-E", "C-D"]


def test_an_end_further_than_t_from_a_line_is_not_welded() -> None:
    assert links(*tipper(), line(MIDDLE + 2j * T, E), ring(E), text("E", E + 5)) == AS_DRAWN


def test_ends_that_meet_are_welded() -> None:
    assert links(*WITHOUT_COUPLER, line(B, E), line(E, C)) == AS_DRAWN


def test_lines_that_merely_cross_pass_over_one_another() -> None:
    assert links(*tipper(), line(MIDDLE - 30j, E), ring(E)) == AS_DRAWN


def test_a_triangle_trimmed_at_its_pins_is_three_links_and_just_as_rigid() -> None:
    drawn = [*pins(), rod(A, B), rod(C, D), *TRIANGLE, *labels()]
    assert links(*drawn) == ["frame", "A-B", "B-C", "B-E", "C-D", "C-E"]
    assert counts(*drawn) == (6, 7), "3 * 5 - 2 * 7 = 1"


@pytest.mark.parametrize("strokes", [STROKES, STROKES[:2]], ids=["three corners", "two corners"])
def test_strokes_across_its_corners_weld_a_triangle_to_one_ternary_link(strokes: tuple[Drawn, ...]) -> None:
    drawn = [*pins(), rod(A, B), rod(C, D), *TRIANGLE, *strokes, *labels()]
    assert links(*drawn) == ["frame", "A-B", "B-C-E", "C-D"]


def test_a_solid_fill_is_one_link_with_the_pins_at_its_corners() -> None:
    drawn = [*WITHOUT_COUPLER, fill(B, C, E, solid=True, handle="plate"), ring(E), text("E", E + 5)]
    assert links(*drawn) == ["frame", "A-B", "B-C-E", "C-D"]
    assert read_as(*drawn)["plate"] == "link"


def test_a_solid_fill_and_the_lines_round_it_are_one_link() -> None:
    drawn = [*pins(), rod(A, B), rod(C, D), *TRIANGLE, fill(B, C, E, solid=True), *labels()]
    assert links(*drawn) == ["frame", "A-B", "B-C-E", "C-D"]


def test_a_pattern_hatch_is_no_link() -> None:
    drawn = [*WITHOUT_COUPLER, rod(B, C), fill(B, C, E, solid=False, handle="hatch")]
    assert read_as(*drawn)["hatch"] == "skipped"
    assert links(*drawn) == AS_DRAWN


def quarter(at: complex, radius: float, one: complex, other: complex) -> Drawn:
    start = math.degrees(cmath.phase(one - at))
    return arc(at, radius, start, math.degrees(cmath.phase((other - at) / (one - at))) % 360)


def test_an_arc_across_the_angle_of_two_lines_welds_them() -> None:
    drawn = [*tipper(), quarter(B, 12.0, A, C)]
    assert links(*drawn) == ["frame", "A-B-C", "C-D"]


def test_an_obround_with_a_pin_at_each_end_is_a_bar() -> None:
    assert links(*WITHOUT_COUPLER, obround(B, C, 8.0)) == AS_DRAWN


def test_a_curved_link_lands_on_its_pins_like_a_straight_one() -> None:
    bow = arc(MIDDLE, abs(C - B) / 2, math.degrees(cmath.phase(B - C)), 180)
    assert links(*WITHOUT_COUPLER, bow) == AS_DRAWN


def test_a_disc_carries_the_pins_it_holds_and_what_ends_on_its_rim() -> None:
    hub = 60 + 60j
    plate = [ring(hub, 30.0), ring(hub + 20, 3.0), ring(hub - 20, 3.0)]
    arms = [line(hub + 30j, hub + 70j), ring(hub + 70j, 3.0)]
    frame = [ring(-50 + 0j, 3.0, layer="FRAME"), line(-50 + 0j, hub - 20)]
    (disc,) = [body for body in laid_out(*plate, *arms, *frame)[1].bodies.bodies if body.discs]
    assert len(disc.pins) == 3
    assert links(*plate, *arms, *frame) == ["frame", "P1-P2", "P2-P3-P4"]


def test_pins_are_given_to_bodies_and_the_frame_comes_first() -> None:
    _, parts = laid_out(*tipper())
    assert parts.bodies.bodies == (
        Body(strands=(), pins=(0, 3), frame=True),
        Body(strands=(0,), pins=(0, 1), frame=False),
        Body(strands=(1,), pins=(1, 2), frame=False),
        Body(strands=(2,), pins=(2, 3), frame=False),
    )


def test_linework_with_no_pin_on_it_is_no_body() -> None:
    _, parts = laid_out(*tipper(), line(300 + 0j, 400 + 0j))
    assert len(parts.bodies.bodies) == 4
