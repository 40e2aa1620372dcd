from __future__ import annotations

import math
from dataclasses import replace

import pytest

from dxfcheck.analysis import analyse
from dxfcheck.analysis.pose.dead_centres import dead_centres
from dxfcheck.analysis.pose.transmission import advantages, transmissions
from dxfcheck.analysis.results import Advantage
from dxfcheck.linkage import Drive, Linkage
from tests.model import Other, linkage

FOUR_BAR = {"A": "ground crank", "B": "crank coupler", "C": "coupler rocker", "D": "rocker ground"}
PLACES = {"A": 0j, "B": 30 + 40j, "C": 150 + 80j, "D": 100 + 0j}


def only(model: Linkage) -> tuple[tuple[str, str, str], float]:
    """Pin, pusher and pushed of the one place there is, and its angle in degrees."""
    names = [link.name for link in model.links]
    (found,) = transmissions(model, dead_centres(model, math.pi / 2))
    return (model.pins[found.pin].name, names[found.pusher], names[found.pushed]), math.degrees(found.angle)


def between(first: complex, second: complex) -> float:
    """Acute angle between two lines, degrees, by the cosine rule's scalar product."""
    cosine = abs((first * second.conjugate()).real) / (abs(first) * abs(second))
    return math.degrees(math.acos(cosine))


def test_the_transmission_angle_of_a_four_bar_lies_between_coupler_and_rocker() -> None:
    names, angle = only(linkage(PLACES, FOUR_BAR, turn={"crank": 10.0}))
    expected = between(PLACES["C"] - PLACES["B"], PLACES["C"] - PLACES["D"])
    assert names == ("C", "coupler", "rocker")
    assert angle == pytest.approx(expected)


def test_driven_from_the_rocker_it_lies_at_the_crank() -> None:
    names, angle = only(linkage(PLACES, FOUR_BAR, turn={"rocker": 10.0}))
    expected = between(PLACES["C"] - PLACES["B"], PLACES["B"] - PLACES["A"])
    assert names == ("B", "coupler", "crank")
    assert angle == pytest.approx(expected)


def slider_crank(along: complex = 1 + 0j) -> Linkage:
    points = {"A": 0j, "B": 30 + 40j, "C": 150 + 10j}
    pins = {"A": "ground crank", "B": "crank rod", "C": "rod block"}
    guide: list[Other] = [("slide", points["C"], "ground", "block", along)]
    return linkage(points, pins, others=guide, turn={"crank": 10.0})


def test_at_a_slide_it_is_what_the_pressure_angle_leaves_of_a_square() -> None:
    """The rod's angle to the guide is the pressure angle: tan = 30 / 120."""
    model = slider_crank()
    (found,) = transmissions(model, dead_centres(model, math.pi / 2))
    assert found.square
    assert math.pi / 2 - found.angle == pytest.approx(math.atan2(30, 120))


def test_without_a_drive_nothing_pushes() -> None:
    model = linkage(PLACES, FOUR_BAR)
    assert transmissions(model, dead_centres(model, math.pi / 2)) == ()


def test_the_advantage_is_the_drives_speed_over_the_outputs() -> None:
    model = linkage(PLACES, FOUR_BAR, turn={"crank": 10.0})
    found = analyse(model)
    rocker = [link.name for link in model.links].index("rocker")
    speed = found.links[rocker].angular_velocity
    assert speed is not None
    (given,) = advantages(model, found.links, found.joints, model.drives)
    assert given == Advantage(rocker, turns=True, ratio=given.ratio)
    assert given.ratio == pytest.approx(10.0 / abs(speed))


def test_an_output_at_rest_has_no_limit() -> None:
    """A crank in line with its coupler cannot move the rocker on."""
    points = {"A": 0j, "B": 30 + 40j, "C": 90 + 120j, "D": 150 + 0j}
    model = linkage(points, FOUR_BAR, turn={"crank": 10.0})
    found = analyse(model)
    assert [each.ratio for each in advantages(model, found.links, found.joints, model.drives)] == [None]


def test_with_two_drives_or_none_there_is_nothing_to_compare_with() -> None:
    model = linkage(PLACES, FOUR_BAR, turn={"crank": 10.0})
    found = analyse(model)
    assert advantages(model, found.links, found.joints, ()) == ()
    assert advantages(model, found.links, found.joints, (*model.drives, Drive(link=3, against=0, rate=1.0))) == ()
    still = [replace(drive, rate=0.0) for drive in model.drives]
    assert advantages(model, found.links, found.joints, still) == ()
