"""Turning drives against another link, wheels by their pin, and what cannot be told."""

from __future__ import annotations

import math

import pytest

from dxfcheck.linkage import Linkage
from tests.drive_models import dibber, drive, named, note, told, unknown
from tests.examples import FOUR_BAR, FOUR_BAR_POINTS
from tests.model import Solved

AGAINST = [("A-B", "B-C", 10.0, "turn")]


def tipper() -> Linkage:
    return named(FOUR_BAR_POINTS, FOUR_BAR, [])


@pytest.mark.parametrize(
    "option",
    [
        "A-B against B-C = 10 rad/s",
        "BA against CB = 10 rad/s",
        "AB  AGAINST  BC = 10 rad/s",
        "A-B = 10 rad/s against B-C",
        "A-B = 10 rad/s ccw against C-B",
    ],
)
def test_an_option_drives_a_link_against_another(option: str) -> None:
    driven = drive(tipper(), options=[option])
    assert told(driven) == AGAINST
    assert driven.evidence[0].name == "A-B against B-C"


@pytest.mark.parametrize(
    "content",
    [
        "ω_AB against BC = 10 rad/s",
        "ω_AB against B-C = 10 rad/s",
        "ω_AB = 10 rad/s against CB",
        "ω_{AB} = 10 rad/s ccw, against BC",
        "ω_AB/BC = 10 rad/s",
        "ω_{AB/BC} = 10 rad/s",
    ],
)
def test_a_note_drives_a_link_against_another(content: str) -> None:
    driven = drive(tipper(), notes=[note(content)])
    assert told(driven) == AGAINST
    case = Solved(driven.linkages[0])
    assert case.turn("A-B") - case.turn("B-C") == pytest.approx(10.0)


def test_a_note_beside_a_link_drives_it_against_the_one_it_names() -> None:
    shapes = {"A-B": [(0j, 40j)], "B-C": [(5j, 5j + 40)]}
    assert told(drive(tipper(), notes=[note("ω against BC = 10 rad/s", 2j)], shapes=shapes)) == AGAINST
    assert told(drive(tipper(), notes=[note("10 rad/s against BC", 2j)], shapes=shapes)) == AGAINST


def test_a_speed_against_the_frame_may_say_so() -> None:
    assert told(drive(tipper(), options=["A-B against frame = 10 rad/s"])) == [("A-B", "frame", 10.0, "turn")]


def test_a_drive_against_another_link_leaves_the_one_against_the_frame() -> None:
    found = told(drive(tipper(), notes=[note("ω_AB = 1 rad/s")], options=["A-B against B-C = 10 rad/s"]))
    assert found == [*AGAINST, ("A-B", "frame", 1.0, "turn")]


@pytest.mark.parametrize("option", ["A-B against X-Y = 1 rad/s", "A-B against A-B = 1 rad/s"])
def test_a_link_to_run_against_that_is_not_there(option: str) -> None:
    assert "A-B of M1 has no other link" in unknown(drive(tipper(), options=[option]))


def test_numbers_of_links_are_unknown_where_two_are_meant() -> None:
    """Links are not numbered here: a wrong guess would be silent."""
    shapes = {"A-B": [(0j, 40j)]}
    assert "no other link '1'" in unknown(drive(tipper(), notes=[note("ω_2/1 = 3 rad/s", 2j)], shapes=shapes))


def gears(*names: str) -> Linkage:
    """Wheels on pins of the frame, O always among them."""
    return named({"O": 0j, "Q": 50 + 0j}, {"O": f"ground {' '.join(names)}", "Q": "ground wheelq"}, [])


def test_a_wheel_is_named_by_its_only_pin() -> None:
    ((link, against, rate, kind),) = told(drive(gears("wheel1"), options=["O = 60 rpm"]))
    assert (link, against, kind) == ("wheel at O", "frame", "turn")
    assert rate == pytest.approx(math.tau)
    assert told(drive(gears("wheel1"), options=["wheel at O = 3 rad/s"]))[0][:3] == ("wheel at O", "frame", 3.0)
    assert told(drive(gears("wheel1"), notes=[note("n_O = 1 rps")]))[0][0] == "wheel at O"


def test_two_wheels_on_one_pin_are_not_told_apart_by_it() -> None:
    assert unknown(drive(gears("wheel1", "wheel2"), options=["O = 60 rpm"])).startswith("it could belong to wheel at O")


def test_a_pin_of_longer_links_names_none_of_them() -> None:
    assert unknown(drive(tipper(), options=["B = 60 rpm"])).startswith("no link is called 'B'")


def test_a_block_turns_by_its_pin_if_somebody_says_so() -> None:
    assert told(drive(dibber(), options=["C = 1 rad/s"])) == [("block at C", "frame", 1.0, "turn")]
