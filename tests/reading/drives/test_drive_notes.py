from __future__ import annotations

from dxfcheck.reading.drives.drive_names import Place, Target
from dxfcheck.reading.drives.drive_notes import clearly_nearest, near_links, nearest_of
from tests.drive_models import note

FIRST, SECOND, THIRD = (Target(0, link, 0, shown=(link,)) for link in (1, 2, 3))


def test_links_around_a_note_come_nearest_first_by_their_nearest_piece() -> None:
    far, near = [(30j, 40j), (10j, 20j)], [(3 + 0j, 9 + 0j)]
    (found,) = near_links([note("ω = 1 rad/s", height=1.0)], [[[], far, near, [(41j, 50j)]]])
    assert found == [(3.0, Place(0, 2)), (10.0, Place(0, 1))]


def test_only_what_is_twice_as_near_is_clearly_nearest() -> None:
    assert clearly_nearest([(1.0, FIRST), (2.0, SECOND)]) == [FIRST]
    assert clearly_nearest([(1.0, FIRST), (1.9, SECOND)]) == [FIRST, SECOND]
    assert clearly_nearest([(1.0, FIRST)]) == [FIRST]


def test_of_targets_with_one_name_those_beside_the_note_are_meant() -> None:
    near = [(1.0, Place(0, 2)), (5.0, Place(0, 3))]
    assert nearest_of([FIRST, SECOND, THIRD], near) == [SECOND]
    assert nearest_of([FIRST, THIRD], near) == [THIRD]
    assert nearest_of([FIRST], near) == []
