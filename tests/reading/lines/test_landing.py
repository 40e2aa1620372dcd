from __future__ import annotations

import cmath
import math

import pytest

from dxfcheck.drawing.primitives import Arc, Path, Ring, Segment
from dxfcheck.reading.lines.landing import Landing, Landings, find_landings
from dxfcheck.reading.lines.linework import make_linework
from dxfcheck.reading.lines.pins import find_pins
from tests.sketches import SOURCE, TOLERANCE, Drawn, path

T = TOLERANCE.t
RADIUS = 4.0
RIM = 0.08
"""2 % of the radius."""
FAR = -100 + 0j


def landed(*shapes: Segment | Arc | Path, radii: tuple[float, ...] = (RADIUS,)) -> Landings:
    pins = find_pins([Ring(SOURCE, 0j, radius) for radius in radii], TOLERANCE).pins
    return find_landings(pins, make_linework(shapes, ()), TOLERANCE)


def line(start: complex, end: complex) -> Segment:
    return Segment(SOURCE, start, end)


def polyline(drawn: Drawn) -> Path:
    made = drawn.make(SOURCE)
    assert isinstance(made, Path)
    return made


def only(found: Landings) -> Landing:
    (landing,) = found.landings
    return landing


@pytest.mark.parametrize(
    ("end", "how"),
    [
        pytest.param(0j, "end", id="at the centre"),
        pytest.param(-1 + 0j, "end", id="inside the ring"),
        pytest.param(-4 + 0j, "end", id="on the rim"),
        pytest.param(-4.079 + 0j, "end", id="just within 2 % of the rim"),
        pytest.param(-4.095 + 0j, "loose", id="as frame symbols meet a rim"),
        pytest.param(-4.101 + 0j, None, id="beyond"),
    ],
)
def test_where_an_end_lands(end: complex, how: str | None) -> None:
    assert [landing.how for landing in landed(line(FAR, end)).landings] == ([how] if how else [])


def test_the_end_that_lands_is_named() -> None:
    assert only(landed(line(FAR, 0j))).end == 1
    assert only(landed(line(0j, FAR))).end == 0


@pytest.mark.parametrize("radius", [2.0, 4.0, 6.0])
def test_an_end_lands_on_any_rim_of_a_pin_of_several_rings(radius: float) -> None:
    assert only(landed(line(FAR, complex(-radius, 0)), radii=(2.0, 4.0, 6.0))).how == "end"


def test_an_end_between_two_rims_lands_on_neither() -> None:
    assert landed(line(FAR, -3 + 0j), radii=(2.0, 6.0)).landings == ()


def aimed(degrees: float) -> Segment:
    """A line to the rim, turned off the centre by an angle."""
    tip = complex(-RADIUS, 0)
    return line(tip - 90 * cmath.exp(1j * math.radians(degrees)), tip)


@pytest.mark.parametrize(
    ("degrees", "how"),
    [
        pytest.param(0.0, "end", id="straight at the centre"),
        pytest.param(59.0, "end", id="far off, still an end"),
        pytest.param(61.0, "loose", id="a tangent"),
        pytest.param(90.0, "loose", id="square to the radius"),
    ],
)
def test_a_tangent_at_the_rim_does_not_land(degrees: float, how: str) -> None:
    landing = only(landed(aimed(degrees)))
    assert landing.how == how
    assert landing.offset == pytest.approx(RADIUS * math.sin(math.radians(degrees)), abs=1e-9)


def test_a_line_that_runs_on_through_the_centre_is_pinned_partway() -> None:
    assert only(landed(line(FAR, 70 + 0j))).how == "through"
    assert only(landed(line(FAR + 0.9j * T, 70 + 0.9j * T))).how == "through"


def test_a_line_that_runs_through_the_ring_off_its_centre_only_lies_across() -> None:
    landing = only(landed(line(FAR + 0.5j, 70 + 0.5j)))
    assert landing.how == "across"
    assert landing.offset == pytest.approx(0.5)


@pytest.mark.parametrize(
    ("height", "how"),
    [
        pytest.param(RADIUS, "beside", id="touching"),
        pytest.param(RADIUS + 0.9 * RIM, "beside", id="within 2 % outside"),
        pytest.param(RADIUS - 0.9 * RIM, "beside", id="within 2 % inside"),
        pytest.param(RADIUS + 0.095, "loose", id="as frame symbols do"),
        pytest.param(RADIUS + 0.11, None, id="clear of it"),
    ],
)
def test_a_line_that_runs_on_past_a_ring_is_pinned_where_it_touches(height: float, how: str | None) -> None:
    found = landed(line(-50 + height * 1j, 50 + height * 1j)).landings
    assert [landing.how for landing in found] == ([how] if how else [])


def test_a_line_that_ends_beside_a_ring_is_not_pinned_to_it() -> None:
    assert landed(line(-50 + 4j, 3 + 4j)).landings == ()


def test_a_polyline_lands_where_it_bends() -> None:
    landing = only(landed(polyline(path(FAR, 0j, 70j))))
    assert (landing.how, landing.end) == ("corner", None)


def test_a_closed_outline_lands_where_it_has_corners() -> None:
    assert only(landed(polyline(path(0j, 70 + 0j, 70j, closed=True)))).how == "corner"


def test_one_polyline_lands_on_one_pin_once() -> None:
    assert only(landed(polyline(path(FAR, -2 + 0j, 0j, 2j, 70j)))).how == "corner"


def test_an_arc_through_the_centre_is_pinned_there_and_one_past_it_is_not() -> None:
    assert only(landed(Arc(SOURCE, 30 + 0j, 30.0, math.pi / 2, math.pi))).how == "through"
    assert landed(Arc(SOURCE, 30 + 0j, 30.0 - 2 * T, math.pi / 2, math.pi)).landings == ()
    assert landed(Arc(SOURCE, 30 + 0j, 30.0, -math.pi / 2, math.pi)).landings == (), "the other half of its circle"


def test_an_arc_ends_on_a_rim_by_its_tangent() -> None:
    into = Arc(SOURCE, -4 + 30j, 30.0, -math.pi, math.pi / 2)
    assert only(landed(into)).how == "end"
    past = Arc(SOURCE, -34 + 0j, 30.0, -math.pi / 2, math.pi / 2)
    assert only(landed(past)).how == "loose"


@pytest.mark.parametrize(
    ("gap", "missed"),
    [
        pytest.param(0.5, True, id="a little"),
        pytest.param(15.9, True, id="up to two diameters"),
        pytest.param(16.1, False, id="further"),
    ],
)
def test_an_end_short_of_a_rim_by_up_to_two_diameters_is_a_miss(gap: float, missed: bool) -> None:  # noqa: FBT001
    found = landed(line(FAR, complex(-RADIUS - gap, 0)))
    assert found.landings == ()
    assert [miss.end for miss in found.misses] == ([1] if missed else [])
    assert [miss.gap for miss in found.misses] == pytest.approx([gap] if missed else [])


def test_how_far_a_miss_aims_past_the_centre() -> None:
    (miss,) = landed(line(FAR + 3j, -8 + 3j)).misses
    assert miss.offset == pytest.approx(3.0)


def test_no_pins_have_no_landings() -> None:
    assert find_landings((), make_linework([line(0j, 1j)], ()), TOLERANCE) == Landings(landings=(), misses=())
