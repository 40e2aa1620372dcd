from __future__ import annotations

import pytest

from dxfcheck.reading.lengths.sites import sites_of
from tests.sketches import arc, line, path, ring, sketch


def test_the_nearest_place_is_an_end_a_corner_or_a_centre() -> None:
    sites = sites_of(sketch(line(0j, 10 + 0j), arc(50 + 0j, 5, 0, 90), path(100 + 0j, 110 + 0j, 110 + 6j, closed=True)))
    for near, spot in ((1 + 1j, 0j), (50 + 1j, 50 + 0j), (51 + 6j, 50 + 5j), (111 + 7j, 110 + 6j)):
        assert sites.nearest_spot(near)[0] == pytest.approx(spot)


def test_an_end_on_a_rim_stands_for_the_centre_of_its_ring() -> None:
    sites = sites_of(sketch(ring(0j, 4), line(4 + 0j, 60 + 0j)))
    spot, distance = sites.nearest_spot(6 + 2j)
    assert spot == 0j
    assert distance == pytest.approx(abs(6 + 2j))


def test_distances_are_to_what_is_drawn() -> None:
    sites = sites_of(sketch(line(0j, 10 + 0j), arc(50 + 0j, 5, 0, 90)))
    assert sites.nearest(5 + 2j) == pytest.approx(2)
    assert sites.nearest(50 + 7j) == pytest.approx(2)
    assert sites.nearest(44 + 0j) == pytest.approx(6)


def test_a_sheet_without_linework_is_empty() -> None:
    assert sites_of(sketch()).empty
    assert not sites_of(sketch(ring(0j))).empty
