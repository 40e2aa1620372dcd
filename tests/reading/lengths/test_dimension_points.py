from __future__ import annotations

import cmath
import math

import pytest

from dxfcheck.drawing.primitives import Dimension, Entity, Fate, Notice
from dxfcheck.reading.lengths.dimension_points import MOST_OFF, OffPoint, points_off_geometry
from tests.reading.lengths.dimensioned import dimensioned
from tests.sketches import TOLERANCE, Drawn, arc, fill, line, path, ring, sketch

CORNER = 100 + 60j
PLATE = (line(0j, 100 + 0j), line(100 + 0j, CORNER), ring(20 + 30j), arc(60 + 30j, 20, 0, 90))


def off(*points: complex, kind: str = "aligned", direction: complex | None = None, more: tuple[Drawn, ...] = (),
        entities: tuple[Entity, ...] = (), notices: tuple[Notice, ...] = ()) -> list[OffPoint]:  # fmt: skip
    """What is said of one dimension over the plate."""
    drawn = sketch(*PLATE, *more, dimensioned("", *points, kind=kind, direction=direction),
                   entities=entities, notices=notices)  # fmt: skip
    dimensions = [each for each in drawn.primitives if isinstance(each, Dimension)]
    return points_off_geometry(drawn, dimensions, TOLERANCE)


@pytest.mark.parametrize(
    "at",
    [
        pytest.param(CORNER, id="an end"),
        pytest.param(50 + 0j, id="along a line"),
        pytest.param(20 + 30j, id="a centre"),
        pytest.param(24 + 30j, id="a rim"),
        pytest.param(60 + 50j, id="an end of an arc"),
        pytest.param(60 + cmath.rect(20, 0.5) + 30j, id="along an arc"),
        pytest.param(50 + 0.05j, id="as near as makes no difference"),
    ],
)
def test_a_point_on_linework_is_right(at: complex) -> None:
    assert off(0j, at) == []


def test_a_point_left_behind_is_told_with_the_end_it_belongs_to() -> None:
    (only,) = off(0j, CORNER + 2 + 2j)
    assert (only.point, only.spot, only.near) == (102 + 62j, CORNER, True)
    assert only.spot_distance == pytest.approx(math.sqrt(8))


def test_a_point_far_from_everything_is_told_apart() -> None:
    (only,) = off(0j, 160 + 140j)
    assert not only.near


def test_one_dimension_is_told_once_and_whether_its_other_end_sits_right() -> None:
    assert [each.held for each in off(-2 - 2j, CORNER + 2 + 2j)] == [False]
    assert [each.held for each in off(0j, CORNER + 2 + 2j)] == [True]


def test_where_two_lines_would_meet_is_a_place() -> None:
    trimmed = (line(200 + 0j, 200 + 40j), line(210 + 50j, 260 + 50j))
    assert off(200 + 0j, 200 + 50j, more=trimmed) == []
    (only,) = off(200 + 0j, 203 + 50j, more=trimmed)
    assert only.point == 203 + 50j


def test_the_middle_between_two_ends_is_a_place() -> None:
    assert off(0j, (CORNER + 20 + 30j) / 2) == []


def test_a_length_may_be_taken_level_with_an_end_since_it_is_right() -> None:
    assert off(0 - 8j, 100 - 8j, kind="linear", direction=1 + 0j) == []
    assert len(off(0 - 8j, 104 - 8j, kind="linear", direction=1 + 0j)) == 1
    assert len(off(0 - 8j, 100 - 8j, kind="linear", direction=cmath.rect(1, 0.3))) == 1


def test_an_ordinate_too() -> None:
    assert off(100 - 8j, kind="ordinate", direction=1 + 0j) == []
    assert len(off(100.5 - 0.5j, kind="ordinate", direction=1 + 0j)) == 1


def test_the_legs_of_an_angle_may_be_drawn_on() -> None:
    assert off(130 + 0j, 100 + 90j, 100 + 0j, kind="angular") == []
    assert len(off(130 + 4j, 100 + 90j, 100 + 0j, kind="angular")) == 1


def test_a_rim_may_be_drawn_on_for_a_radius_but_not_for_a_length() -> None:
    behind = 60 + 30j + cmath.rect(20, 4.0)
    assert off(60 + 30j, behind, kind="radius") == []
    assert len(off(60 + 30j, behind)) == 1


@pytest.mark.parametrize(
    "shape",
    [
        pytest.param(path(200 + 0j, 240 + 0j, 240 + 30j, closed=True), id="a polyline"),
        pytest.param(fill(200 + 0j, 240 + 0j, 240 + 30j, solid=True), id="a fill"),
        pytest.param(line(240 + 30j, 300 + 0j, linetype="CENTER"), id="an axis"),
        pytest.param(line(240 + 30j, 300 + 0j, layer="CONSTRUCTION"), id="construction"),
    ],
)
def test_everything_that_is_drawn_counts(shape: Drawn) -> None:
    assert off(0j, 240 + 30j, more=(shape,)) == []


def unread(at: complex | None, kind: str = "SPLINE", why: Fate | None = None) -> Entity:
    return Entity("9", kind, "0", why or Fate("unread", f"{kind} is not read"), at)


@pytest.mark.parametrize(
    "entity",
    [
        unread(CORNER),
        unread(None),
        unread(900j, "XLINE"),
        unread(CORNER, "LINE", Fate("skipped", "layer is off")),
    ],
)
def test_near_linework_that_is_not_read_nothing_is_said(entity: Entity) -> None:
    assert off(0j, CORNER + 2 + 2j, entities=(entity,)) == []


def test_far_from_it_a_near_miss_is_told_still_but_no_point_on_nothing() -> None:
    spline = unread(900 + 900j)
    assert len(off(0j, CORNER + 2 + 2j, entities=(spline,))) == 1
    assert off(0j, 160 + 140j, entities=(spline,)) == []


def test_a_text_that_is_not_read_is_no_linework() -> None:
    assert len(off(0j, CORNER + 2 + 2j, entities=(unread(CORNER, "MTEXT"),))) == 1


def test_parts_of_a_block_that_are_not_read_count_as_well() -> None:
    notice = Notice("unread-part", "SPLINE is not read", 0, CORNER, 1.0)
    assert off(0j, CORNER + 2 + 2j, notices=(notice,)) == []


def test_a_marked_point_is_a_place() -> None:
    point = Entity("9", "POINT", "0", Fate("skipped", "a point has no extent"), 160 + 140j)
    assert off(0j, 160 + 140j, entities=(point,)) == []


def test_a_sheet_of_dimensions_alone_has_nothing_to_hold_them_against() -> None:
    drawn = sketch(dimensioned("", 0j, 5 + 5j))
    dimensions = [each for each in drawn.primitives if isinstance(each, Dimension)]
    assert points_off_geometry(drawn, dimensions, TOLERANCE) == []


@pytest.mark.parametrize(("count", "unasked"), [(MOST_OFF, 0), (MOST_OFF + 3, 3)])
def test_how_many_were_not_looked_at_is_told_with_the_last(count: int, unasked: int) -> None:
    astray = [dimensioned("", 0j, 100 + 62j + number) for number in range(count)]
    drawn = sketch(*PLATE, *astray)
    dimensions = [each for each in drawn.primitives if isinstance(each, Dimension)]
    found = points_off_geometry(drawn, dimensions, TOLERANCE)
    assert [each.unasked for each in found] == [0] * (MOST_OFF - 1) + [unasked]
