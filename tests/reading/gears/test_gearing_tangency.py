from __future__ import annotations

import cmath
import math

import pytest

from dxfcheck.reading.shapes.contact import Oddity
from dxfcheck.tolerances.linework import RIM_OF_RADIUS
from tests.reading.gears.trains import fixed_pin, geared, pin, pitch, told
from tests.sketches import Drawn, line

ONE, OTHER = 20.0, 30.0
T = 3e-4
"""About t on these sheets."""


def pair(miss: float, *more: Drawn) -> tuple[Drawn, ...]:
    """Two wheels about fixed pins that miss tangency."""
    apart = complex(ONE + OTHER + miss)
    return fixed_pin(0j), fixed_pin(apart), pitch(0j, ONE), pitch(apart, OTHER), *more


def the_oddity(*things: Drawn) -> Oddity:
    (oddity,) = geared(*things).oddities
    return oddity


@pytest.mark.parametrize("miss", [0.0, 0.03, -0.03])
def test_what_two_decimals_leave_is_tangent(miss: float) -> None:
    train = geared(*pair(miss))
    assert len(train.contacts) == 1
    assert train.oddities == ()


@pytest.mark.parametrize("miss", [0.1, -0.4], ids=["a gap of 0.5 %", "an overlap of 2 %"])
def test_a_small_miss_is_read_as_rolling_and_told(miss: float) -> None:
    (contact,) = geared(*pair(miss)).contacts
    assert contact.at == pytest.approx((50 + miss) * ONE / (ONE + OTHER))
    oddity = the_oddity(*pair(miss))
    assert (oddity.kind, oddity.severity) == ("off-tangency", "warning")
    assert oddity.amount == pytest.approx(miss)
    assert oddity.limit == pytest.approx(0.05)
    assert "expected centres 50 apart" in oddity.detail
    assert f"they are {50 + miss:g} apart" in oddity.detail
    assert "{amount}" in oddity.detail
    assert oddity.rings == (2, 3)


@pytest.mark.parametrize("miss", [1.0, -2.9])
def test_a_wide_miss_is_not_read_and_an_error(miss: float) -> None:
    assert geared(*pair(miss)).contacts == ()
    oddity = the_oddity(*pair(miss))
    assert (oddity.kind, oddity.severity) == ("off-tangency", "error")
    assert oddity.amount == pytest.approx(miss)
    assert "too far to be read as rolling" in oddity.detail


@pytest.mark.parametrize("miss", [3.1, -3.1])
def test_wheels_further_off_have_nothing_to_do_with_one_another(miss: float) -> None:
    train = geared(*pair(miss))
    assert train.contacts == ()
    assert train.oddities == ()
    assert train.idle_rings == (2, 3)


@pytest.mark.parametrize(("miss", "contacts"), [(0.0, 2), (0.2, 2), (0.8, 1)])
def test_an_annulus_that_misses_its_planet_is_told(miss: float, contacts: int) -> None:
    planet = 52 + 0j
    arm = [fixed_pin(0j), pin(planet), line(0j, planet), pitch(0j, 32.0), pitch(planet, 20.0)]
    train = geared(*arm, pitch(0j, 72.0 + miss))
    assert len(train.contacts) == contacts
    assert [each.amount for each in train.oddities] == ([pytest.approx(miss)] if miss else [])


def test_wheels_that_nearly_touch_but_roll_on_others_are_not_told() -> None:
    beside, turned = 50 + 0j, cmath.rect(50.0, 2.0 * math.asin(31.0 / 50.0))
    assert abs(turned - beside) == pytest.approx(62.0)
    arms = [line(0j, beside), line(0j, turned)]
    drawn = [fixed_pin(0j), pin(beside), pin(turned), *arms, pitch(0j, 20.0), pitch(beside, 30.0), pitch(turned, 30.0)]
    train = geared(*drawn)
    assert [each.rings for each in train.contacts] == [(5, 6), (5, 7)]
    assert train.oddities == ()


def test_tip_and_root_circles_do_not_mesh_with_one_another() -> None:
    circles = [pitch(0j, 22.0), pitch(0j, 17.5), pitch(50 + 0j, 32.0), pitch(50 + 0j, 27.5)]
    train = geared(*pair(0.0, *circles))
    assert [each.rings for each in train.contacts] == [(2, 3)]
    assert train.oddities == ()


def test_stages_of_one_train_do_not_mesh_across() -> None:
    stages = [pitch(50 + 0j, 29.5), pitch(0j, 20.5)]
    train = geared(*pair(0.0, *stages))
    assert [each.rings for each in train.contacts] == [(2, 3), (4, 5)]
    assert "off-tangency" not in told(train)


@pytest.mark.parametrize(("off", "odd"), [(0.5 * T, []), (0.3, ["off-centre-ring"])])
def test_a_pitch_circle_a_little_off_its_pin_is_read_about_the_pin(off: float, odd: list[str]) -> None:
    drawn = [fixed_pin(0j), fixed_pin(50 + 0j), pitch(off * 1j, ONE), pitch(50 + 0j, OTHER)]
    train = geared(*drawn)
    assert train.contacts[0].at == pytest.approx(20 + 0j)
    assert told(train) == odd
    assert [each.amount for each in train.oddities] == [pytest.approx(off) for _ in odd]


def test_a_pitch_circle_further_off_its_pin_has_none() -> None:
    off = 1.1 * RIM_OF_RADIUS * ONE
    drawn = [fixed_pin(0j), fixed_pin(50 + 0j), pitch(off * 1j, ONE), pitch(50 + 0j, OTHER)]
    assert told(geared(*drawn)) == ["wheel-pin"]


@pytest.mark.parametrize(("miss", "odd"), [(0.04, []), (0.2, ["off-tangency"]), (-0.2, ["off-tangency"])])
def test_a_wheel_that_misses_its_track_is_told(miss: float, odd: list[str]) -> None:
    track = line(-60 - (20 + miss) * 1j, 60 - (20 + miss) * 1j, layer="GROUND")
    train = geared(pin(0j), pitch(0j, 20.0), track)
    assert len(train.contacts) == 1
    assert told(train) == odd
    assert [each.amount for each in train.oddities] == [pytest.approx(miss) for _ in odd]


def test_a_wheel_further_from_a_line_does_not_roll_on_it() -> None:
    track = line(-60 - 20.5j, 60 - 20.5j, layer="GROUND")
    assert geared(pin(0j), pitch(0j, 20.0), track).contacts == ()


def test_one_circle_drawn_twice_is_one_wheel() -> None:
    train = geared(*pair(0.0, pitch(0j, ONE)))
    assert [each.rings for each in train.contacts] == [(2, 4, 3)]
    assert train.idle_rings == ()
