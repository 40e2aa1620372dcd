from __future__ import annotations

import pytest

from dxfcheck.comparison.landmarks import PlaceIndex, landmarks_of
from tests.reports.samples import press, tipper


@pytest.mark.parametrize("offset", [0j, 1e6 - 3e5j])
def test_the_nearest_place_within_reach(offset: complex) -> None:
    places = [offset + place for place in (0j, 1 + 0j, 1.5 + 0j, -2 - 2j)]
    index = PlaceIndex(places, 0.5)
    assert index.nearest(offset + 0.4j) == 0
    assert index.nearest(offset + 1.3) == 2
    assert index.nearest(offset + 0.5) in (0, 1)
    assert index.nearest(offset - 2.4 - 2.2j) == 3
    assert index.nearest(offset + 5) is None


def test_equal_places_give_the_first() -> None:
    assert PlaceIndex([1j, 1j], 0.1).nearest(1j) == 0


def test_every_pin_is_a_landmark_in_the_unit_asked_for() -> None:
    marks = landmarks_of(tipper().mechanisms, 2.0)
    pins = tipper().mechanisms[0].linkage.pins
    assert [mark.at for mark in marks] == [2 * pin.at for pin in pins]
    assert [mark.fixed for mark in marks] == [pin.fixed for pin in pins]


def test_a_pin_without_a_label_has_no_name_and_a_slide_without_a_pin_no_pin() -> None:
    marks = landmarks_of(press().mechanisms)
    assert [(mark.pin, mark.name) for mark in marks] == [(0, "A"), (1, "B"), (2, ""), (None, "")]
