"""Blocks, barrels and sleeves drawn in unusual ways, each found by drawing them so."""

from __future__ import annotations

import cmath
import math

import pytest

from tests.reading.slides.sliders import (
    BLOCK,
    A,
    B,
    C,
    Slid,
    block,
    crank_and_rod,
    dibber,
    guide,
    loose_rectangle,
    named,
    slid,
    slides_in,
    strokes,
)
from tests.sketches import Drawn, fill, line, linkage, observed, path, rectangle, ring, rod

ALONG_X = Slid("frame", "block at C", 1 + 0j)


def hatched_line(start: complex, end: complex, *, away: complex = -4 - 4j, count: int = 8) -> tuple[Drawn, ...]:
    """A line with hatch strokes all along it."""
    return (line(start, end, handle="hatched"), *strokes(start, end, away=away, count=count))


def hatched_bar(low: complex, high: complex) -> tuple[Drawn, ...]:
    """A closed rectangle with section strokes from side to side."""
    up = (high - low).imag
    first = [low + step * (high - low).real / 8 for step in range(1, 6)]
    corners = (low, complex(high.real, low.imag), high, complex(low.real, high.imag))
    across = [line(foot, foot + up * (1 + 1j), handle=f"section {number}") for number, foot in enumerate(first)]
    return (path(*corners, closed=True, handle="bar"), *across)


# --- dead centres ---


@pytest.mark.parametrize("turned", [1, -1], ids=["outstretched", "folded"])
def test_at_a_dead_centre_a_guide_that_lies_over_the_rod_is_read(turned: int) -> None:
    crank, pin = turned * 50 + 0j, 150 + 0j
    found = linkage(
        ring(A, layer="FRAME"),
        ring(crank),
        ring(pin),
        *named(A=A, B=crank, C=pin),
        rod(A, crank),
        rod(crank, pin),
        block(pin),
        guide(90 + 0j, 135 + 0j),
        guide(165 + 0j, 210 + 0j),
    )
    assert slides_in(found) == [ALONG_X]
    assert len(found.joints) == 4


@pytest.mark.parametrize("off", [0.0, 0.1, 1.0])
def test_a_rod_trimmed_where_the_guide_crosses_the_block_does_not_weld_to_it(off: float) -> None:
    crank, end = cmath.rect(50, math.radians(off)), C - BLOCK[0] / 2
    found = linkage(
        ring(A, layer="FRAME"),
        ring(crank),
        ring(C),
        *named(A=A, B=crank, C=C),
        rod(A, crank),
        line(crank + 4 * (end - crank) / abs(end - crank), end),
        block(),
        guide(100 + 0j, 210 + 0j),
    )
    assert slides_in(found) == [ALONG_X]
    assert len(found.joints) == 4


# --- sleeves of two bars ---


@pytest.mark.parametrize("hatch", ["fill", "strokes"])
def test_a_rod_between_two_hatched_bars_slides_in_them(hatch: str) -> None:
    bars: list[Drawn] = []
    for low in (180 + 2j, 180 - 12j):
        high = low + 40 + 10j
        if hatch == "strokes":
            bars.extend(hatched_bar(low, high))
        else:
            corners = (low, low + 40, high, low + 10j)
            bars.extend((path(*corners, closed=True), fill(*corners, solid=False)))
    found = linkage(*crank_and_rod(), line(C + 4, 260 + 0j), *bars)
    assert [(each.first, each.direction) for each in slides_in(found)] == [("frame", 1 + 0j)]


# --- yokes ---


def yoke(*, first: int = 0, height: float = 30.0) -> tuple[Drawn, ...]:
    """A crank with its block in a yoke of four loose lines, whose stem runs in a sleeve on the frame."""
    pin = cmath.rect(40, math.radians(height))
    sides = loose_rectangle(complex(pin.real, 0), 20, 120)
    return (
        ring(A, layer="FRAME"),
        ring(pin),
        *named(A=A, B=pin),
        rod(A, pin),
        rectangle(pin, 20, 28, handle="block"),
        *sides[first:],
        *sides[:first],
        line(complex(pin.real + 10, 0), 200 + 0j, handle="stem"),
        path(120 - 6j, 160 - 6j, 160 + 6j, 120 + 6j, closed=True, layer="FRAME", handle="sleeve"),
    )


@pytest.mark.parametrize("first", [0, 1, 2, 3])
def test_a_yoke_of_loose_lines_is_not_pinned_whatever_their_order(first: int) -> None:
    found = linkage(*yoke(first=first))
    assert sorted(joint.kind for joint in found.joints) == ["pin", "pin", "slide", "slide"]


def test_a_stem_that_starts_where_the_block_stands_belongs_to_the_yoke() -> None:
    things = yoke(height=0.0)
    assert sorted(joint.kind for joint in linkage(*things).joints) == ["pin", "pin", "slide", "slide"]
    assert observed("block-without-guide", *things) == []


# --- section strokes ---


def test_section_strokes_in_a_block_do_not_weld_it_to_its_rails() -> None:
    low = C - 15 - 10j
    section = [line(low + step, low + step + 8 + 20j) for step in (1, 6, 20, 21)]
    assert slid(*dibber(guide(90 - 10j, 210 - 10j), guide(90 + 10j, 210 + 10j), *section)) == [ALONG_X]


def test_a_stroke_of_the_guide_that_ends_close_beside_the_block_stays_on_the_guide() -> None:
    beside = line(170 + 0j, 165.1 + 8j, handle="stroke")
    ways = (*strokes(172 + 0j, 210 + 0j, away=-4 - 4j), beside)
    things = dibber(guide(90 + 0j, 134 + 0j), guide(166 + 0j, 210 + 0j), *ways)
    assert slid(*things) == [ALONG_X]
    assert observed("floating-group", *things) == []


@pytest.mark.parametrize("gap", [0.0, 3.0])
def test_a_bar_in_section_under_a_block_is_frame(gap: float) -> None:
    things = dibber(*hatched_bar(90 - (22 + gap) * 1j, 210 - (10 + gap) * 1j))
    assert slid(*things) == [ALONG_X]
    assert observed("guide-taken-as-frame", *things) == []


# --- trimmed rods ---


def test_a_stroke_that_starts_in_the_pins_ring_is_no_link() -> None:
    end = C + (B - C) / abs((B - C).real) * BLOCK[0] / 2
    found = linkage(*crank_and_rod(rod_end=end), block(), *hatched_line(90 + 0j, 210 + 0j, count=21))
    assert slides_in(found) == [ALONG_X]
    assert sum(joint.kind == "pin" for joint in found.joints) == 3


def test_a_rod_that_ends_a_hair_before_the_block_is_pinned_to_it() -> None:
    end = C + (B - C) / abs((B - C).real) * (BLOCK[0] / 2 + 0.05)
    found = linkage(*crank_and_rod(rod_end=end), block(), guide())
    assert slides_in(found) == [ALONG_X]
    assert sum(joint.kind == "pin" for joint in found.joints) == 3


# --- blocks with two pins ---


@pytest.mark.parametrize("loose", [True, False])
def test_a_block_with_two_pins_slides_and_is_called_by_them(loose: bool) -> None:  # noqa: FBT001 (a parameter)
    one, two = 150 - 20j, 150 + 20j
    middle = (one + two) / 2
    plate = loose_rectangle(middle, 30, 80) if loose else (rectangle(middle, 30, 80),)
    found = linkage(
        *crank_and_rod(rod_end=C)[:2],
        rod(A, B),
        rod(B, one),
        ring(one),
        ring(two),
        rod(two, 60 + 90j),
        ring(60 + 90j),
        *named(A=A, B=B, C=one, D=two, E=60 + 90j),
        *plate,
        guide(135 - 90j, 135 + 90j),
        guide(165 - 90j, 165 + 90j),
    )
    assert slides_in(found) == [Slid("frame", "C-D", 1j)]


# --- what belongs to a block ---


@pytest.mark.parametrize(
    "extra",
    [
        pytest.param([rectangle(C, 18, 10)], id="bush"),
        pytest.param(loose_rectangle(C, *BLOCK), id="drawn twice"),
        pytest.param([line(C - 18, C + 18), line(C - 13j, C + 13j)], id="centre marks"),
    ],
)
def test_what_is_drawn_within_a_block_is_no_second_guide(extra: list[Drawn]) -> None:
    things = dibber(guide(90 - 10j, 210 - 10j), *extra)
    assert slid(*things) == [ALONG_X]
    assert observed("two-guides", *things) == []


# --- thick rods ---


def test_a_rod_drawn_as_a_rectangle_slides_along_its_barrel() -> None:
    found = linkage(
        *crank_and_rod()[:1],
        ring(B),
        ring(200 + 0j, layer="FRAME"),
        rod(A, B),
        *named(A=A, B=B, D=200 + 0j),
        *barrel_and_thick_rod(),
    )
    along = (B - 200) / abs(B - 200)
    (only,) = slides_in(found)
    assert abs(abs((only.direction * along.conjugate()).real) - 1) < 1e-6


def barrel_and_thick_rod() -> tuple[Drawn, ...]:
    """A barrel from pin D, and a rod in it drawn as a rectangle, to pin B."""
    end = 200 + 0j
    along = (B - end) / abs(B - end)
    up = along * 1j

    def box(first: float, last: float, half: float, handle: str) -> Drawn:
        one, two = end + first * along, end + last * along
        return path(one - half * up, two - half * up, two + half * up, one + half * up, closed=True, handle=handle)

    reach = abs(B - end)
    return (
        box(12, 110, 14, "barrel"),
        line(end + 4 * along, end + 12 * along),
        box(60, reach - 12, 4, "rod"),
        line(B - 12 * along, B - 4 * along),
    )


# --- barrels of three sides, pistons of one line ---


@pytest.mark.parametrize("piston", [False, True])
def test_a_rod_that_enters_a_barrel_of_three_sides_slides_in_it(piston: bool) -> None:  # noqa: FBT001 (a parameter)
    end = 200 + 0j
    along = (B - end) / abs(B - end)
    up = 14j * along
    deep = end + 70 * along
    head = [line(deep - up, deep + up, handle="piston")] if piston else []
    found = linkage(
        ring(A, layer="FRAME"),
        ring(B),
        ring(end, layer="FRAME"),
        rod(A, B),
        *named(A=A, B=B, D=end),
        path(end + 110 * along + up, end + 12 * along + up, end + 12 * along - up, end + 110 * along - up),
        line(end + 4 * along, end + 12 * along),
        line(deep, B - 4 * along),
        *head,
    )
    assert sorted(joint.kind for joint in found.joints) == ["pin", "pin", "pin", "slide"]


def test_a_pin_in_an_open_bracket_is_no_block() -> None:
    bracket = path(135 - 10j, 165 - 10j, 165 + 10j, 135 + 10j)
    assert observed("block-without-guide", *crank_and_rod(), bracket) == []


def test_a_piston_drawn_as_one_line_slides_between_the_walls_it_touches() -> None:
    walls = (*hatched_line(180 - 12j, 260 - 12j), *hatched_line(260 + 12j, 180 + 12j, away=4 + 4j))
    closed = line(260 - 12j, 260 + 12j, handle="bottom")
    found = linkage(*crank_and_rod(), line(C + 4, 220 + 0j), line(220 - 12j, 220 + 12j), *walls, closed)
    assert [(each.first, each.direction) for each in slides_in(found)] == [("frame", 1 + 0j)]
    assert len(found.joints) == 4


# --- blocks whose sides are part of the guide ---


@pytest.mark.parametrize("makes", ["lines", "polyline", "two lines"])
def test_a_block_may_share_its_sides_with_the_guide(makes: str) -> None:
    low, high, top, left = 135 - 10j, 165 - 10j, 165 + 10j, 135 + 10j
    shapes: dict[str, list[Drawn]] = {
        "lines": [line(top, high), line(low, left), line(left, top)],
        "polyline": [path(low, left, top, high)],
        "two lines": [line(low, left), line(top, high), *hatched_line(210 + 10j, 90 + 10j, away=4 + 4j)],
    }
    things = (*crank_and_rod(), *hatched_line(90 - 10j, 210 - 10j), *shapes[makes])
    assert slid(*things) == [ALONG_X]
    assert len(linkage(*things).joints) == 4


@pytest.mark.parametrize("turned", [50 + 0j, -50 + 0j, cmath.rect(50, math.radians(1))])
def test_a_rod_trimmed_at_the_block_is_no_leg_of_a_hatched_guide_in_line_with_it(turned: complex) -> None:
    end = C - BLOCK[0] / 2
    found = linkage(
        ring(A, layer="FRAME"),
        ring(turned),
        ring(C),
        *named(A=A, B=turned, C=C),
        rod(A, turned),
        line(turned + 4 * (end - turned) / abs(end - turned), end),
        block(),
        *hatched_line(100 + 0j, 200 + 0j, count=17),
    )
    assert slides_in(found) == [ALONG_X]
    assert len(found.joints) == 4


@pytest.mark.parametrize("gap", [0.0, 2.0])
def test_a_rack_drawn_as_a_rectangle_with_its_pitch_line_slides_on_its_guide(gap: float) -> None:
    """Flush on a frame line or a little clear of it: the pitch line is part of the rack, not its guide."""
    pinion = [ring(0j, 3.0, layer="FRAME"), ring(0j, 30.0, layer="PITCH")]
    rack = [path(-60 - 30j, 60 - 30j, 60 - 42j, -60 - 42j, closed=True), line(-60 - 30j, 60 - 30j, layer="PITCH")]
    guide = line(complex(-100, -42 - gap), complex(100, -42 - gap), layer="FRAME")
    drawn = linkage(*pinion, *rack, guide)
    assert sorted(joint.kind for joint in drawn.joints) == ["pin", "rolling", "slide"]
    assert len(drawn.links) == 3
