"""Near dead centres, flat transmission angles, and speeds that hang on the drawing's last digits."""

from __future__ import annotations

import cmath
import math

import pytest

from dxfcheck.settings import Settings
from tests.rules.subjects import findings, only
from tests.sketches import Drawn, ring, rod, text, tipper

RULES = ("near-dead-centre", "low-transmission-angle", "doubtful-speed")


def four_bar(crank_end: complex, joint: complex, foot: complex = 200 + 0j) -> list[Drawn]:
    """Links AB, BC and CD on frame pins A and D, and a drive of AB."""
    places = {"A": 0j, "B": crank_end, "C": joint, "D": foot}
    drawn = [ring(at, layer="FRAME" if name in "AD" else "0") for name, at in places.items()]
    drawn += [text(name, at + 4 + 6j) for name, at in places.items()]
    drawn += [rod(places[bar[0]], places[bar[1]]) for bar in ("AB", "BC", "CD")]
    return [*drawn, text("ω_AB = 1 rad/s", 60 + 500j)]


def bent(degrees: float) -> list[Drawn]:
    """Crank and coupler so many degrees off one line."""
    crank_end = cmath.rect(60, 0.6)
    return four_bar(crank_end, crank_end + cmath.rect(120, 0.6 - math.radians(degrees)))


@pytest.mark.parametrize("rule", RULES)
def test_nothing_is_wrong_with_the_tray_tipper(rule: str) -> None:
    assert findings(rule, *tipper()) == []


def test_links_nearly_in_line_are_told_with_the_angle_and_the_limit() -> None:
    found = only("near-dead-centre", *bent(3.0))
    assert found.severity == "warning"
    assert found.message == (
        "near a dead centre: A-B and B-C are 3 deg off one line at B, so that B-C can hardly drive A-B (limit 5 deg)"
    )
    assert findings("near-dead-centre", *bent(6.0)) == []
    assert findings("near-dead-centre", *bent(0.0)) == []


def test_a_flat_transmission_angle_is_told_with_its_limit_that_may_be_set() -> None:
    joint = 120 + 90j
    coupler = cmath.phase(joint - 60j)
    flat = four_bar(60j, joint, joint + cmath.rect(100, coupler - math.radians(30)))
    found = only("low-transmission-angle", *flat)
    assert found.message == "B-C pushes C-D at C under a transmission angle of 30 deg (least 40 deg)"
    assert findings("low-transmission-angle", *flat, settings=Settings(transmission_angle=25.0)) == []


def test_pushes_within_a_locked_part_are_no_matter_of_the_pose() -> None:
    places = {"A": 0j, "B": 180 + 0j, "C": 190 + 130j, "D": -10 + 120j, "E": -80 + 170j}
    drawn = [ring(at, layer="FRAME" if name in "AB" else "0") for name, at in places.items()]
    drawn += [rod(places[bar[0]], places[bar[1]]) for bar in ("AC", "AD", "BC", "BD", "CD", "DE")]
    assert len(findings("locked-part", *drawn)) == 1
    for rule in (*RULES, "dead-centre"):
        assert findings(rule, *drawn) == []


def test_typed_to_whole_tenths_near_a_dead_centre_a_speed_is_doubtful() -> None:
    crank_end, joint = 51.2 + 31.3j, 203.3 + 127.6j
    drawn = four_bar(crank_end, joint)
    found = only("doubtful-speed", *drawn)
    assert found.severity == "warning"
    assert "plus or minus" in found.message
    assert "where every coordinate may be off by 0.05 mm" in found.message
    assert findings("doubtful-speed", *drawn, settings=Settings(doubtful_speed=10.0)) == []
