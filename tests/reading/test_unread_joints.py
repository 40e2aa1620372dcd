from __future__ import annotations

import pytest

from dxfcheck.drawing.primitives import Ring
from dxfcheck.reading.pins import PinSite, find_pins
from dxfcheck.reading.shapes import Obround, Rectangle
from dxfcheck.reading.unread_joints import bars_of, blocks_of, pitch_circles_of, slots_of
from tests.sketches import SOURCE, TOLERANCE

BLOCK = Rectangle((0,), (-10 - 6j, 10 - 6j, 10 + 6j, -10 + 6j))
SLOT = Obround((0,), (-15 + 0j, 15 + 0j), 5.0)


def pins(*places: complex) -> tuple[PinSite, ...]:
    return find_pins([Ring(SOURCE, at, 2.0) for at in places], TOLERANCE).pins


@pytest.mark.parametrize(
    ("places", "blocks"),
    [
        pytest.param([0j], 1, id="one pin"),
        pytest.param([9 + 5j, 40 + 0j], 1, id="one in a corner, another elsewhere"),
        pytest.param([-5 + 0j, 5 + 0j], 0, id="two pins"),
        pytest.param([40 + 0j], 0, id="none"),
    ],
)
def test_a_rectangle_that_holds_one_pin_is_a_block(places: list[complex], blocks: int) -> None:
    found = list(blocks_of([BLOCK], pins(*places)))
    assert [joint.read_as for joint in found] == ["slide"] * blocks


@pytest.mark.parametrize(
    ("places", "slots", "bars"),
    [
        pytest.param([0j], 1, 0, id="one pin"),
        pytest.param([15 + 0j], 1, 0, id="one pin, at an end of the slot"),
        pytest.param([-15 + 0j, 15 + 0j], 0, 1, id="a pin at each end"),
        pytest.param([-15 + 0j, 14 + 0j], 0, 0, id="two pins, one off the end"),
        pytest.param([-15 + 0j, 0j, 15 + 0j], 0, 0, id="three pins"),
        pytest.param([40j], 0, 0, id="none"),
    ],
)
def test_an_obround_with_one_pin_is_a_slot_and_with_two_at_its_ends_a_bar(
    places: list[complex], slots: int, bars: int
) -> None:
    assert len(list(slots_of([SLOT], pins(*places)))) == slots
    assert len(list(bars_of([SLOT], pins(*places), TOLERANCE))) == bars


def pitch(*rings: tuple[complex, float]) -> list[tuple[int, Ring]]:
    return [(number, Ring(SOURCE, *each)) for number, each in enumerate(rings)]


@pytest.mark.parametrize(
    ("second", "rolls"),
    [
        pytest.param((30 + 0j, 20.0), True, id="outside"),
        pytest.param((10 + 0j, 20.0), True, id="inside"),
        pytest.param((30.19 + 0j, 20.0), True, id="within 2 % of the smaller radius"),
        pytest.param((30.21 + 0j, 20.0), False, id="further apart"),
        pytest.param((28 + 0j, 20.0), False, id="overlapping"),
    ],
)
def test_pitch_circles_about_pins_that_touch_roll_on_one_another(second: tuple[complex, float], rolls: bool) -> None:  # noqa: FBT001 - a table
    found = list(pitch_circles_of(pitch((0j, 10.0), second), pins(0j, second[0]), TOLERANCE))
    assert [joint.site for joint in found] == ([0, 1] if rolls else [])
    assert {joint.read_as for joint in found} == ({"pitch circle"} if rolls else set())


def test_pitch_circles_on_one_centre_do_not_roll_and_one_without_a_pin_is_none() -> None:
    assert list(pitch_circles_of(pitch((0j, 10.0), (0j, 20.0)), pins(0j), TOLERANCE)) == []
    assert [joint.site for joint in pitch_circles_of(pitch((0j, 10.0), (30 + 0j, 20.0)), pins(0j), TOLERANCE)] == [0]
