from __future__ import annotations

import cmath
import math

import pytest

from dxfcheck.reading.lines.sheet import lay_out
from dxfcheck.reading.lines.sorting import sort_primitives
from dxfcheck.reading.lines.tolerance import tolerance_for
from dxfcheck.reading.observations.unread_shapes import shapes_shown
from dxfcheck.settings import Settings
from dxfcheck.tolerances.sheet import UNREAD_SHAPES_LIMIT
from tests.reading.slides.sliders import loose_rectangle
from tests.sketches import Drawn, arc, line, obround, observed, rectangle, ring, sketch, tipper

SLIDE = "1 rectangle on a line (a slide)"
SLOT = "1 obround (a slot)"
WHEELS = "1 pair of rings that touch or cross (wheels)"
BLOCK = rectangle(0j, 30, 20)


def shown(*things: Drawn) -> str:
    drawn = sketch(*things)
    kinds = sort_primitives(drawn)
    return shapes_shown(kinds, lay_out(kinds, tolerance_for(drawn.diagonal, Settings())))


@pytest.mark.parametrize(
    ("things", "words"),
    [
        pytest.param([BLOCK, line(-60 + 0j, 60 + 0j)], SLIDE, id="through"),
        pytest.param([BLOCK, line(-60 + 0j, 5 + 0j)], SLIDE, id="into"),
        pytest.param([BLOCK, line(-60 + 10j, 60 + 10j), line(-60 - 10j, 60 - 10j)], SLIDE, id="rails"),
        pytest.param([*loose_rectangle(0j, 30, 20), line(-60 + 0j, 60 + 0j)], SLIDE, id="four lines"),
        pytest.param([BLOCK, line(-60 + 10j, 60 + 10j)], "", id="a line on one side"),
        pytest.param([BLOCK], "", id="a rectangle alone"),
        pytest.param([obround(-20 + 0j, 20 + 0j, 5)], SLOT, id="an obround"),
        pytest.param(
            [arc(0j, 46, 20, 50), arc(0j, 54, 20, 50), arc(46.984631 + 17.101007j, 4, 200, 180)], "", id="not closed"
        ),
        pytest.param([ring(0j, 20), ring(30 + 0j, 10)], WHEELS, id="touching rings"),
        pytest.param([ring(0j, 20), ring(25 + 0j, 10)], WHEELS, id="crossing rings"),
        pytest.param([ring(0j, 20), ring(10 + 0j, 10)], WHEELS, id="touching from within"),
        pytest.param([ring(0j, 20), ring(30.15 + 0j, 10)], WHEELS, id="touching but for 1.5 % of the smaller"),
        pytest.param([ring(0j, 20), ring(30.3 + 0j, 10)], "", id="apart"),
        pytest.param([ring(0j, 20), ring(5 + 0j, 10)], "", id="within"),
        pytest.param([ring(0j, 20), ring(0j, 20)], "", id="on one centre"),
        pytest.param([ring(0j, 20, layer="PITCH"), ring(30 + 0j, 10)], WHEELS, id="one of them a pitch circle"),
        pytest.param([line(0j, 60 + 0j), line(60 + 0j, 60 + 50j), arc(60 + 0j, 6, 90, 90)], "1 weld mark", id="weld"),
        pytest.param([], "", id="nothing"),
    ],
)
def test_what_a_sheet_without_a_linkage_shows(things: list[Drawn], words: str) -> None:
    assert shown(*things, line(-100 + 90j, 100 + 90j)) == words


def test_a_curved_slot_counts_as_an_obround() -> None:
    ends = (cmath.rect(50, math.radians(20)), cmath.rect(50, math.radians(70)))
    sides = [arc(0j, radius, 20, 50) for radius in (46, 54)]
    assert shown(*sides, arc(ends[0], 4, 200, 180), arc(ends[1], 4, 70, 180), line(-99 + 90j, 99 + 90j)) == SLOT


def test_several_are_counted_and_kinds_are_listed() -> None:
    slide = [BLOCK, line(-60 + 0j, 60 + 0j), rectangle(200 + 0j, 30, 20), line(140 + 0j, 260 + 0j)]
    slots = [obround(at - 20, at + 20, 5) for at in (100j, 130j, 160j)]
    rings = [ring(300 + 0j, 20), ring(330 + 0j, 10), ring(350 + 0j, 10)]
    assert shown(*slide, *slots, *rings) == (
        "2 rectangles on lines (slides), 3 obrounds (slots), 2 pairs of rings that touch or cross (wheels)"
    )


def test_a_sheet_of_very_many_lines_is_not_searched() -> None:
    slide = [BLOCK, line(-60 + 0j, 60 + 0j)]
    others = [line(complex(number, 100), complex(number, 101)) for number in range(UNREAD_SHAPES_LIMIT - 2)]
    assert shown(*slide, *others) == SLIDE
    assert shown(*slide, *others, line(-50 + 100j, -50 + 101j)) == ""


def test_the_reading_says_so_where_there_is_no_linkage_and_only_there() -> None:
    slide = (BLOCK, line(-60 + 0j, 60 + 0j))
    (odd,) = observed("no-linkage", *slide)
    assert odd.detail == SLIDE
    away = (rectangle(900 + 0j, 30, 20), line(840 + 0j, 960 + 0j))
    assert observed("no-linkage", *tipper(), *away) == []
