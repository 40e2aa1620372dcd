"""The drive that is assumed where none is stated."""

from __future__ import annotations

import pytest

from tests.drive_models import dibber, drive, named, told
from tests.model import Other, Solved


def test_an_arm_on_the_frame_comes_before_a_slide_on_it() -> None:
    driven = drive(dibber())
    assert told(driven) == [("B-O", "frame", 1.0, "turn")]
    assert (driven.evidence[0].rule, driven.evidence[0].name) == (10, "B-O")


def two_rams(first: str = "B", second: str = "C") -> dict[str, complex]:
    return {first: 0j, second: 30 + 40j}


@pytest.mark.parametrize(
    ("names", "driven_block"), [(("B", "C"), "block at B"), (("P10", "P9"), "block at P9"), (("Z", "Y"), "block at Y")]
)
def test_where_no_arm_turns_the_first_frame_slide_by_name_runs_at_one(
    names: tuple[str, str], driven_block: str
) -> None:
    """The elliptic trammel of the tray lifter: a rod between two blocks on square guides."""
    one, other = names
    slides: list[Other] = [("slide", 0j, "ground", "block1", 1 + 0j), ("slide", 30 + 40j, "ground", "block2", 1j)]
    model = named({one: 0j, other: 30 + 40j}, {one: "block1 rod", other: "block2 rod"}, slides)
    driven = drive(model)
    assert told(driven) == [(driven_block, "frame", 1.0, "slide")]
    (shown,) = driven.evidence
    assert shown.rule == 10
    assert shown.why.startswith("no drive is stated and no arm turns on the frame: the first slide on it runs at 1")
    solved = Solved(driven.linkages[0]).analysis
    assert solved.solved
    assert solved.drives[0].outcome == "taken"


def test_a_frame_slide_stated_as_the_second_link_runs_all_the_same() -> None:
    model = named({"C": 0j}, {}, [("slide", 0j, "block", "ground", 1 + 0j)], tracing={"C": "block"})
    driven = drive(model)
    assert told(driven) == [("block at C", "frame", 1.0, "slide")]
    assert Solved(driven.linkages[0]).velocity("C") == pytest.approx(1.0)


def test_where_nothing_slides_the_first_wheel_on_the_frame_turns() -> None:
    """A pair of gears."""
    points = {"K": 0j, "L": 50 + 0j}
    model = named(points, {"K": "ground wheel1", "L": "ground wheel2"}, [("rolling", 20 + 0j, "wheel1", "wheel2", 1j)])
    driven = drive(model)
    assert told(driven) == [("wheel at K", "frame", 1.0, "turn")]
    assert "a single pin on it turns at 1 rad/s" in driven.evidence[0].why
    assert Solved(driven.linkages[0]).turn("wheel at L") == pytest.approx(-20.0 / 30.0)


def test_a_block_that_turns_on_the_frame_is_assumed_last() -> None:
    points = {"A": 0j, "Z": 50 + 0j}
    slides: list[Other] = [("slide", 0j, "rod", "block", 1 + 0j), ("rolling", 40 + 0j, "rod", "wheel", 1j)]
    model = named(points, {"A": "ground block", "Z": "ground wheel"}, slides)
    assert told(drive(model)) == [("wheel at Z", "frame", 1.0, "turn")]


def test_nothing_is_assumed_where_nothing_hangs_on_the_frame_by_arm_slide_or_wheel() -> None:
    model = named({"A": 0j}, {}, [("pin in slot", 0j, "ground", "rod", 1 + 0j)], tracing={"A": "rod"})
    assert told(drive(model)) == []


def test_a_stated_drive_leaves_nothing_to_assume() -> None:
    assert told(drive(dibber(), options=["C = 3 mm/s"])) == [("block at C", "frame", 3.0, "slide")]
