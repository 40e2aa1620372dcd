from __future__ import annotations

import numpy as np
import pytest

from dxfcheck.drawing.primitives import Text
from dxfcheck.reading.texts.text_places import texts_near
from tests.sketches import SOURCE

BOX = (0j, 10 + 0j, 10 + 2j, 2j)


def label(at: complex, box: tuple[complex, ...]) -> Text:
    return Text(SOURCE, "ABC", at, 2.0, box)


def near(text: Text, reach: float, *pieces: tuple[complex, complex]) -> dict[int, float]:
    starts, ends = (np.array(side, dtype=np.complex128) for side in zip(*pieces, strict=True))
    which, place, distance = texts_near([text], np.array([reach]), starts, ends)
    assert set(which.tolist()) <= {0}
    return dict(zip(place.tolist(), distance.tolist(), strict=True))


@pytest.mark.parametrize(
    ("place", "distance"),
    [
        pytest.param(-3 - 4j, 5.0, id="from a corner"),
        pytest.param(5 - 3j, 3.0, id="from a side"),
        pytest.param(13 + 1j, 3.0, id="from the far side"),
        pytest.param(5 + 2j, 0.0, id="on the box"),
    ],
)
def test_the_distance_runs_from_the_box(place: complex, distance: float) -> None:
    assert near(label(0j, BOX), 6.0, (place, place)) == pytest.approx({0: distance})


def test_the_alignment_point_counts_where_it_is_nearer() -> None:
    assert near(label(5 + 20j, BOX), 6.0, (5 + 23j, 5 + 23j)) == pytest.approx({0: 3.0})


def test_a_text_without_a_box_is_its_alignment_point() -> None:
    assert near(label(1j, ()), 6.0, (4j, 4j), (20j, 20j)) == pytest.approx({0: 3.0})


def test_a_line_is_as_near_as_its_nearest_place() -> None:
    assert near(label(0j, BOX), 3.0, (-50 - 2j, 50 - 2j), (-50 - 4j, 50 - 4j)) == pytest.approx({0: 2.0})


def test_a_turned_box_counts_as_drawn() -> None:
    upright = tuple(corner * 1j for corner in BOX)
    assert near(label(0j, upright), 4.0, (3 + 5j, 3 + 5j), (5 + 0j, 5 + 0j)) == pytest.approx({0: 3.0})


def test_each_text_has_a_reach_of_its_own() -> None:
    texts = [label(0j, ()), label(100 + 0j, ())]
    places = np.array([5 + 0j, 105 + 0j])
    which, place, _ = texts_near(texts, np.array([4.0, 6.0]), places, places)
    assert (which.tolist(), place.tolist()) == ([1], [1])


def test_no_texts_and_no_pieces_are_near_nothing() -> None:
    nothing = np.zeros(0, dtype=np.complex128)
    some = np.array([0j])
    assert texts_near([], np.zeros(0), some, some)[0].size == 0
    assert texts_near([label(0j, BOX)], np.array([1.0]), nothing, nothing)[0].size == 0
