from __future__ import annotations

import cmath
import math

import pytest

from dxfcheck.settings import Settings
from tests.sketches import (
    A,
    B,
    C,
    D,
    Drawn,
    fates,
    fill,
    labels,
    line,
    linkage,
    observed,
    path,
    ring,
    rod,
    rods,
)

E = 90 + 120j
PLAIN = (ring(A, handle="ring A"), ring(B), ring(C), ring(D, layer="FRAME"), *rods(), *labels())
"""The tray tipper with nothing yet that fixes A."""
HALF_BASE = 12.0


def strokes(
    base: complex, *, count: int = 4, angle: float = 45.0, length: float = 6.0, gap: float = 0.0
) -> list[Drawn]:
    """Hatch strokes below a level base about a place; ``gap`` is how far along each it begins."""
    down = -cmath.exp(1j * math.radians(angle))
    feet = [base - HALF_BASE + 2 * HALF_BASE * (number + 0.5) / count for number in range(count)]
    return [
        line(foot + gap * down, foot + length * down, handle=f"stroke {number}") for number, foot in enumerate(feet)
    ]


def base_line(at: complex) -> Drawn:
    return line(at - HALF_BASE, at + HALF_BASE, handle="base")


def legs(at: complex, *, meet: complex = 0j, spread: float = 7.0) -> list[Drawn]:
    """Two lines from a place on or in the ring to a base 12 below."""
    feet = at - spread - 12j, at + spread - 12j
    tips = at - meet.conjugate(), at + meet
    return [line(tip, foot, handle=f"leg {number}") for number, (tip, foot) in enumerate(zip(tips, feet, strict=True))]


def fixed(*things: Drawn, settings: Settings | None = None) -> list[str]:
    return [pin.name for pin in linkage(*things, settings=settings).pins if pin.fixed]


TRIANGLE = (*legs(A), base_line(A - 12j))


def test_without_a_symbol_the_pin_is_not_fixed() -> None:
    assert fixed(*PLAIN) == ["D"]


def test_a_triangle_over_a_hatched_base_fixes_its_pin_and_is_all_frame() -> None:
    drawn = [*PLAIN, *TRIANGLE, *strokes(A - 12j)]
    assert fixed(*drawn) == ["A", "D"]
    read = fates(*drawn)
    assert {read[handle].read_as for handle in read if handle.startswith(("stroke", "leg", "base"))} == {"frame"}
    assert read["stroke 0"].why == "hatch stroke of a frame symbol"
    assert read["leg 0"].why == "leg of a frame symbol"
    assert read["base"].why == "base line of a frame symbol with hatch strokes"


def test_all_frame_linework_is_one_link() -> None:
    both = linkage(*PLAIN, *TRIANGLE, *strokes(A - 12j))
    assert [link.name for link in both.links] == ["frame", "A-B", "B-C", "C-D"]
    assert both.links[0].kind == "frame"
    assert len(both.links[0].pins) == 2


@pytest.mark.parametrize(
    ("meet", "spread"),
    [
        pytest.param(0j, 7.0, id="to the centre"),
        pytest.param(4 * cmath.exp(-1j * math.radians(60)), 8.0, id="to the rim, aimed at the centre"),
        pytest.param(4 + 0j, 10.0, id="to the sides of the ring, at any angle"),
        pytest.param(1 - 1j, 7.0, id="inside the ring"),
    ],
)
def test_the_legs_of_a_triangle_run_to_pin_rim_or_centre(meet: complex, spread: float) -> None:
    drawn = [*PLAIN, *legs(A, meet=meet, spread=spread), base_line(A - 12j), *strokes(A - 12j)]
    assert fixed(*drawn) == ["A", "D"]
    assert len(linkage(*drawn).links) == 4, "legs are no links"


@pytest.mark.parametrize(("count", "fixes"), [(1, False), (2, True), (7, True)])
def test_two_strokes_make_a_symbol(count: int, fixes: bool) -> None:  # noqa: FBT001 - a table
    assert ("A" in fixed(*PLAIN, *TRIANGLE, *strokes(A - 12j, count=count))) is fixes


@pytest.mark.parametrize(
    ("angle", "fixes"), [(14.0, False), (16.0, True), (45.0, True), (74.0, True), (76.0, False), (90.0, False)]
)
def test_strokes_stand_at_15_to_75_degrees(angle: float, fixes: bool) -> None:  # noqa: FBT001
    assert ("A" in fixed(*PLAIN, *TRIANGLE, *strokes(A - 12j, angle=angle))) is fixes


@pytest.mark.parametrize(("length", "fixes"), [(11.9, True), (12.1, False)])
def test_strokes_are_at_most_half_their_base(length: float, fixes: bool) -> None:  # noqa: FBT001
    assert ("A" in fixed(*PLAIN, *TRIANGLE, *strokes(A - 12j, length=length))) is fixes


@pytest.mark.parametrize(("gap", "fixes"), [(0.3, True), (1.9, True), (2.1, False)])
def test_loose_strokes_may_stop_short_of_the_base(gap: float, fixes: bool) -> None:  # noqa: FBT001
    """By half of their own height: strokes of 6 that begin at 2 are half as high as they stand off."""
    assert ("A" in fixed(*PLAIN, *TRIANGLE, *strokes(A - 12j, gap=gap))) is fixes


def test_strokes_of_one_symbol_are_parallel_and_on_one_side() -> None:
    one, other = strokes(A - 12j, count=2)
    (slanted,) = strokes(A - 12j + 3, count=1, angle=60.0)
    (above,) = strokes(A - 12j + 5, count=1, length=-6.0)
    assert fixed(*PLAIN, *TRIANGLE, one, other) == ["A", "D"]
    assert fixed(*PLAIN, *TRIANGLE, one, slanted._replace(handle="slanted")) == ["D"]
    assert fixed(*PLAIN, *TRIANGLE, one, above._replace(handle="above")) == ["D"]


@pytest.mark.parametrize(("angle", "fixes"), [(47.9, True), (48.1, False)])
def test_strokes_are_parallel_within_three_degrees(angle: float, fixes: bool) -> None:  # noqa: FBT001
    one = strokes(A - 12j - 6, count=1)
    other = [stroke._replace(handle="other") for stroke in strokes(A - 12j + 6, count=1, angle=angle)]
    assert ("A" in fixed(*PLAIN, *TRIANGLE, *one, *other)) is fixes


def test_strokes_may_differ_in_length_as_a_clipped_hatch_does() -> None:
    clipped = [line(A - 12j + x, A - 12j + x - reach * (1 + 1j), handle="") for x, reach in ((-8, 2), (0, 4), (8, 3))]
    assert fixed(*PLAIN, *TRIANGLE, *clipped) == ["A", "D"]


@pytest.mark.parametrize(
    "at",
    [
        pytest.param(A - 4j, id="touching the ring from below"),
        pytest.param(A - 4.05j, id="within the shape tolerance of the ring"),
        pytest.param(A, id="through the centre"),
    ],
)
def test_a_hatched_base_alone_fixes_the_pin_on_it(at: complex) -> None:
    assert fixed(*PLAIN, base_line(at), *strokes(at)) == ["A", "D"]


def test_a_hatched_base_clear_of_the_ring_fixes_nothing() -> None:
    assert fixed(*PLAIN, base_line(A - 7j), *strokes(A - 7j)) == ["D"]


def test_a_symbol_may_be_turned() -> None:
    upright = [line(A - 4 - 12j, A - 4 + 12j, handle="base")]
    leaning = [line(A - 4 + 1j * y, A - 8 + 1j * (y - 4)) for y in (-8, 0, 8)]
    assert fixed(*PLAIN, *upright, *leaning) == ["A", "D"]


def test_a_symbol_drawn_as_a_closed_polyline() -> None:
    triangle = path(A, A - 12 - 12j, A + 12 - 12j, closed=True)
    assert fixed(*PLAIN, triangle, *strokes(A - 12j)) == ["A", "D"]


def below(at: complex, *, solid: bool) -> Drawn:
    return fill(at - HALF_BASE, at + HALF_BASE, at + HALF_BASE - 6j, at - HALF_BASE - 6j, solid=solid)


def test_a_pattern_hatch_along_the_base_is_a_frame_symbol_and_a_solid_fill_is_none() -> None:
    assert fixed(*PLAIN, base_line(A - 4j), below(A - 4j, solid=False)) == ["A", "D"]
    assert fixed(*PLAIN, base_line(A - 4j), below(A - 4j, solid=True)) == ["D"]


def test_strokes_across_the_corners_of_a_ternary_link_are_no_frame() -> None:
    def across(corner: complex, one: complex, other: complex) -> Drawn:
        return line(*(corner + 12 * (far - corner) / abs(far - corner) for far in (one, other)))

    coupler = [ring(E), rod(C, E), rod(E, B), across(B, C, E), across(C, B, E), across(E, B, C)]
    assert fixed(*PLAIN, *coupler) == ["D"]


@pytest.mark.parametrize("layer", ["GROUND", "Frame", "FIXED-1", "base", "Gestell", "BATI", "TELAIO", "BASTIDOR"])
def test_linework_on_a_frame_layer_fixes_the_pins_on_it(layer: str) -> None:
    drawn = [*PLAIN, line(A - 4j, A - 30j, layer=layer, handle="bracket")]
    assert fixed(*drawn) == ["A", "D"]
    assert fates(*drawn)["bracket"].why == f"frame by layer {layer}"


def test_a_ring_on_a_frame_layer_is_fixed() -> None:
    assert fixed(ring(A, layer="ground"), *PLAIN[1:]) == ["A", "D"]


def test_a_block_named_as_frame_fixes_the_pins_on_it() -> None:
    assert fixed(*PLAIN, line(A - 4j, A - 30j, block="Gestell_klein")) == ["A", "D"]


def test_the_option_names_frame_pins() -> None:
    assert fixed(*PLAIN, settings=Settings(frame_pins=("A",))) == ["A", "D"]


def test_a_frame_pin_that_is_not_there_is_told() -> None:
    (seen,) = observed("unknown-frame-pin", *PLAIN, settings=Settings(frame_pins=("A", "Z")))
    assert seen.subject == "Z"
    assert "A, B, C, D" in seen.detail


def test_an_outline_that_lies_over_a_symbol_is_neither_leg_nor_welded_to_it() -> None:
    """A bar upwards from A covers the symbol there, and a stroke ends on its side."""
    symbol = (*legs(A), base_line(A - 12j), *strokes(A - 12j, angle=60, length=8))
    end = A + 60j
    bar = path(A - 6 - 22j, A + 5 - 22j, end + 5 + 8j, end - 6 + 8j, closed=True, handle="bar")
    drawn = (*symbol, ring(A), bar, ring(end), rod(end, end + 80), ring(end + 80, layer="FRAME"))
    assert fates(*drawn)["bar"].read_as == "link"
    (bar_link,) = (each for each in linkage(*drawn).links if "bar" in each.handles)
    assert bar_link.kind == "link"


def test_legs_that_end_on_a_greater_ring_about_their_pin_are_legs_still() -> None:
    """The root circle of a gear passes through the feet of the legs."""
    feet = abs(-7 - 12j)
    assert fixed(*PLAIN, ring(A, feet), *TRIANGLE, *strokes(A - 12j)) == ["A", "D"]
