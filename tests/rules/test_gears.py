from __future__ import annotations

import cmath
import math

import pytest

from tests.rules.subjects import findings, only
from tests.sketches import Drawn, line, rectangle, ring, rod, text

A, E = 0j, 150 + 0j
RULES = ("off-tangency", "off-centre-ring", "wheel-pin", "wheel-owner", "shared-axis", "gear-centres")


def pitch(at: complex, radius: float, handle: str = "") -> Drawn:
    return ring(at, radius, layer="PITCH", handle=handle)


def lever(at: complex, degrees: float, name: str, *, layer: str = "FRAME") -> tuple[Drawn, ...]:
    """A pin, a link from it to a tracing point, and the names of both."""
    tip = at + cmath.rect(30, math.radians(degrees))
    names = text(name[0], at + 3 + 9j), text(name[1], tip + 3 + 9j)
    return (ring(at, layer=layer), ring(tip), rod(at, tip), *names)


def pair(small: float = 60, large: float = 90, *, shift: complex = 0j) -> tuple[Drawn, ...]:
    """A gear on each of two levers, whose pins are 150 apart on the frame."""
    wheels = pitch(A + shift, small, "small"), pitch(E, large, "large")
    return (*lever(A, 120, "AB"), *lever(E, 60, "EF"), *wheels)


@pytest.mark.parametrize("rule", RULES)
def test_nothing_is_wrong_with_a_pair_of_gears(rule: str) -> None:
    assert findings(rule, *pair()) == []


@pytest.mark.parametrize(
    ("small", "severity", "words"),
    [
        pytest.param(60.3, "warning", "overlap, missing tangency by 0.3 mm", id="overlap of 0.5 %"),
        pytest.param(59.7, "warning", "miss tangency by 0.3 mm", id="gap of 0.5 %"),
        pytest.param(66, "error", "overlap, missing tangency by 6 mm", id="overlap of 10 %"),
        pytest.param(54, "error", "miss tangency by 6 mm", id="gap of 10 %"),
    ],
)
def test_pitch_circles_that_miss_tangency_say_what_was_expected_and_how_far_off_it_is(
    small: float, severity: str, words: str
) -> None:
    found = only("off-tangency", *pair(small))
    assert (found.severity, found.handles) == (severity, ("small", "large"))
    assert f"radius {small:g} and 90 {words} (limit " in found.message
    assert f"expected centres {small + 90:g} apart, they are 150 apart" in found.message
    assert ("read as rolling" in found.message) is True
    assert ("too far to be read as rolling" in found.message) is (severity == "error")


@pytest.mark.parametrize("small", [60.12, 59.88])
def test_pitch_circles_typed_to_the_nearest_fifth_of_a_percent_are_tangent(small: float) -> None:
    assert findings("off-tangency", *pair(small)) == []


def test_a_pitch_circle_beside_its_pin_says_how_far() -> None:
    found = only("off-centre-ring", *pair(shift=0.5j))
    assert (found.severity, found.at, found.handles) == ("warning", 0.5j, ("small",))
    assert "at pin A: the pitch circle of radius 60 is 0.5 mm (limit " in found.message
    assert "off the centre of its pin" in found.message


def test_a_pitch_circle_without_a_pin_is_told() -> None:
    found = only("wheel-pin", *pair(), pitch(-100 + 0j, 40, "idler"))
    assert (found.severity, found.at, found.handles) == ("warning", -100 + 0j, ("idler",))
    assert "has no pin at its centre; not read" in found.message
    assert findings("wheel-pin", *pair(), pitch(-100 + 0j, 40), ring(-100 + 0j, layer="FRAME")) == []


def test_a_pitch_circle_with_two_links_on_its_pin_tells_how_it_was_read() -> None:
    found = only("wheel-owner", *pair(), *lever(A, 200, "AG")[1:])
    assert (found.severity, found.handles) == ("warning", ("small",))
    assert "at pin A: the pitch circle of radius 60 could belong to any of 2 links" in found.message
    assert "draw a spoke" in found.remedy


def test_a_wheel_that_a_rod_pushes_along_a_line_is_a_note() -> None:
    centre = 20j
    track = line(-150 + 0j, 150 + 0j, layer="FRAME")
    pusher = (
        ring(centre),
        ring(centre + 120),
        rod(centre, centre + 120),
        rectangle(centre + 120, 20, 14),
        line(centre + 60 - 7j, centre + 160 - 7j, layer="FRAME"),
        text("P", centre + 9j),
        text("Q", centre + 120 + 12j),
    )
    found = only("wheel-owner", *pusher, track, pitch(centre, 20, "roller"))
    assert found.severity == "note"
    assert "free to turn on the link" in found.message


def compound(*spokes: Drawn) -> tuple[Drawn, ...]:
    """The pair, with a second circle about E that drives a third lever's wheel."""
    third = E + 70
    wheels = pitch(A, 60), pitch(E, 90, "great"), pitch(E, 30, "little"), pitch(third, 40)
    shaft = ring(E, layer="FRAME"), text("E", E + 9j)
    return (*lever(A, 120, "AB"), *lever(third, 60, "HK"), *shaft, *spokes, *wheels)


def test_two_circles_about_one_pin_are_told_unless_a_spoke_touches_both() -> None:
    found = only("shared-axis", *compound())
    assert (found.severity, found.at) == ("warning", E)
    assert set(found.handles) == {"great", "little"}
    assert "nothing shows whether the pitch circles" in found.message
    assert findings("shared-axis", *compound(line(E + 30j, E + 90j))) == []


def test_gears_that_nothing_holds_together_are_told() -> None:
    planet = cmath.rect(90, math.radians(20))
    loose = (
        *lever(A, 120, "AB"),
        *lever(planet, 80, "PQ", layer="0"),
        pitch(A, 60, "sun"),
        pitch(planet, 30, "planet"),
    )
    found = only("gear-centres", *loose)
    assert (found.severity, found.handles) == ("warning", ("sun", "planet"))
    assert "no link holds the centres of the pitch circles of radius 60 and 30 apart" in found.message
    assert "a pin at both centres" in found.remedy
    assert findings("gear-centres", *loose, rod(A, planet)) == []


def test_a_rack_that_no_slide_leads_is_told() -> None:
    rack = (
        line(-60 - 60j, 90 - 60j, layer="PITCH", handle="rack"),
        line(90 - 60j, 90 - 100j),
        ring(90 - 104j),
        text("R", 99 - 100j),
    )
    found = only("gear-centres", *lever(A, 120, "AB"), pitch(A, 60), *rack)
    assert "nothing holds the rack" in found.message
    assert "draw the slide" in found.remedy
