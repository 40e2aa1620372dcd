"""The drives that would settle what is free, by name; tests/property/test_faults.py drives them."""

from __future__ import annotations

from dxfcheck.analysis import analyse
from dxfcheck.analysis.results import SettlingDrive
from tests.analysis.lattices import scissor_lattice
from tests.examples import FOUR_BAR, FOUR_BAR_POINTS
from tests.model import Other, linkage

FIVE_BAR_POINTS = {"A": 0j, "B": 20 + 70j, "C": 80 + 120j, "D": 140 + 60j, "E": 110 + 0j}
FIVE_BAR = {"A": "ground a", "B": "a b", "C": "b c", "D": "c d", "E": "ground d"}


def test_one_missing_drive_and_two() -> None:
    one = analyse(linkage(FIVE_BAR_POINTS, FIVE_BAR, turn={"a": 1.0}))
    assert one.settling_drives == (SettlingDrive(4, 0, None),)
    two = analyse(linkage(FIVE_BAR_POINTS, FIVE_BAR))
    assert two.settling_drives == (SettlingDrive(1, 0, None), SettlingDrive(4, 0, None))


def test_slide_on_the_frame_where_no_link_turns_there() -> None:
    slides: list[Other] = [("slide", 0j, "ground", "left", 1 + 0j), ("slide", 60 + 45j, "ground", "right", 1j)]
    model = linkage({"B": 0j, "C": 60 + 45j}, {"B": "left rod", "C": "rod right"}, others=slides)
    assert analyse(model).settling_drives == (SettlingDrive(1, 0, 2),)


def test_at_a_dead_centre_the_link_that_can_drive_it() -> None:
    """Crank and coupler in line: the rocker stands still, and the crank drives."""
    points = {"A": 0j, "B": 30 + 0j, "C": 130 + 0j, "D": 150 - 60j}
    result = analyse(linkage(points, FOUR_BAR, turn={"rocker": 1.0}))
    assert result.drives[0].outcome == "at limit"
    assert result.settling_drives == (SettlingDrive(1, 0, None),)
    assert analyse(linkage(points, FOUR_BAR, turn={"crank": 1.0})).settling_drives == ()


def test_nothing_to_choose_where_all_is_settled() -> None:
    assert analyse(linkage(FOUR_BAR_POINTS, FOUR_BAR, turn={"crank": 1.0})).settling_drives == ()


def test_large_linkage_with_a_part_that_one_drive_cannot_settle() -> None:
    assert analyse(scissor_lattice(200, unpinned=(60,))).settling_drives == ()
