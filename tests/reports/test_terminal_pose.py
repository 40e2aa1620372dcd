from __future__ import annotations

import math
from dataclasses import replace

import pytest

from dxfcheck.analysis import analyse
from dxfcheck.analysis.results import Advantage, DeadCentre, FiniteMotion, SpeedBounds
from dxfcheck.inspection import MechanismReport
from dxfcheck.linkage import Drive
from dxfcheck.reports.json_pose import off_by, pose_items
from dxfcheck.reports.terminal_mechanism import mechanism_lines
from dxfcheck.reports.terminal_pose import finite_words, push_sentences, trust_words, why_they_differ
from tests.model import Other, linkage

FOUR_BAR = {"A": "ground crank", "B": "crank coupler", "C": "coupler rocker", "D": "rocker ground"}
PLACES = {"A": 0j, "B": 30 + 40j, "C": 150 + 80j, "D": 100 + 0j}
TIPPER = linkage(PLACES, FOUR_BAR, turn={"crank": 10.0})
SLIDE: list[Other] = [("slide", 150 + 10j, "ground", "block", 1 + 0j)]
DIBBER = linkage(
    {"A": 0j, "B": 30 + 40j, "C": 150 + 10j},
    {"A": "ground crank", "B": "crank rod", "C": "rod block"},
    others=SLIDE,
    turn={"crank": 10.0},
)


def finite(verdict: str, freedom: int = 0) -> FiniteMotion:
    made = FiniteMotion(verdict="through", turn=0.06, opening=1.08e-4, misfit=0.0587, limit=0.015, freedom=freedom)
    return replace(made, verdict=verdict)  # type: ignore[arg-type]


def test_a_finite_step_is_told_with_its_figures() -> None:
    locked = finite_words(finite("locked"), "mm")
    assert locked.startswith("momentary: it locks after the first step; after a turn of 3.4 deg")
    assert "stays open by 0.00011 mm, as if a length were off by 0.059 mm (limit 0.015)" in locked
    assert "it moves through" in finite_words(finite("through", 1), "mm")
    assert finite_words(finite("momentary", 1), "mm").endswith("1 freedom is left")
    assert finite_words(finite("momentary", 2), "mm").endswith("2 freedoms are left")


def test_a_push_is_told_with_its_angle() -> None:
    sentences = list(push_sentences(TIPPER, analyse(TIPPER), "mm"))
    cosine = abs(((150 + 80j - 30 - 40j) * (50 + 80j).conjugate()).real) / abs(120 + 40j) / abs(50 + 80j)
    assert sentences[0] == (
        "push",
        f"coupler pushes rocker at C: transmission angle {math.degrees(math.acos(cosine)):.4g} deg",
    )
    assert sentences[1][0] == "advantage"


def test_at_a_slide_the_pressure_angle_is_told_and_the_advantage_has_a_unit() -> None:
    push, advantage = (text for _, text in push_sentences(DIBBER, analyse(DIBBER), "mm"))
    assert push.endswith("transmission angle 75.96 deg (pressure angle 14.04 deg)")
    assert advantage.endswith("rad/mm")
    sliding = replace(DIBBER, drives=(Drive(link=3, against=0, rate=50.0, kind="slide", joint=3),))
    assert dict(push_sentences(sliding, analyse(sliding), "in"))["advantage"].endswith("in/rad")


def test_an_output_at_rest_has_no_limit() -> None:
    still = replace(analyse(TIPPER), transmissions=(), advantages=(Advantage(3, turns=True, ratio=None),))
    assert list(push_sentences(TIPPER, still, "mm")) == [
        ("advantage", "drive speed over output speed: rocker no limit")
    ]


def bounds(part: float) -> SpeedBounds:
    """The rocker is off by a part of its speed, nothing else is."""
    rocker = abs(analyse(TIPPER).links[3].angular_velocity or 0.0)
    none = (0.0,) * 4
    return SpeedBounds(resolution=0.005, links=(0.0, 0.0, 0.0, part * rocker), pins=none, turns=none, slides=none)


def test_the_worst_speed_tells_how_far_all_can_be_trusted() -> None:
    found = analyse(TIPPER)
    words = trust_words(TIPPER, found, bounds(2e-4), "mm")
    assert words == "every coordinate within 0.005 mm: speeds within 0.02 % (rocker at worst)"
    assert "no rounding of places was found" in trust_words(TIPPER, found, bounds(0.0), "mm")


def test_json_has_angles_in_degrees_and_null_for_what_was_not_worked_out() -> None:
    found = replace(analyse(DIBBER), finite=finite("locked"))
    items = pose_items(DIBBER, found)
    (push,) = items["transmissions"]
    assert (push["pin"], push["pusher"], push["pushed"]) == ("C", "rod", "block")
    assert push["angle"] + push["pressure_angle"] == pytest.approx(90.0)
    assert push["pressure_angle"] == pytest.approx(math.degrees(math.atan2(30, 120)))
    assert items["finite_motion"]["verdict"] == "locked"
    assert items["finite_motion"]["turn"] == pytest.approx(math.degrees(0.06))
    bare = pose_items(DIBBER, replace(found, finite=None, bounds=None))
    assert (bare["finite_motion"], bare["resolution"]) == (None, None)
    assert off_by(None, "links", 3) is None
    assert off_by(bounds(0.5), "links", 3) == pytest.approx(0.5 * abs(analyse(TIPPER).links[3].angular_velocity or 0.0))
    assert off_by(bounds(0.5), "pins", 1) == 0.0


def test_a_large_disagreement_is_explained() -> None:
    found = analyse(TIPPER)
    redundant = replace(found, mobility=replace(found.mobility, count=0))
    assert "only within the drawing's rounding" in why_they_differ(TIPPER, redundant)
    near = DeadCentre(pin=2, links=(2, 3), driven=3, angle=0.001)
    assert "near a dead centre, at C" in why_they_differ(TIPPER, replace(found, near_dead_centres=(near,)))
    assert "nearly repeat one another" in why_they_differ(TIPPER, replace(found, rank_gap=(2e-5, 0.0)))
    assert "do not rely on these speeds" in why_they_differ(TIPPER, found)


def test_it_is_explained_only_where_it_is_large() -> None:
    found = analyse(TIPPER)
    assert found.disagreement is not None

    def shown(part: float) -> str:
        report = MechanismReport(linkage=TIPPER, analysis=replace(found, disagreement=part))
        return " ".join(line.text for line in mechanism_lines(report, "mm", 80))

    assert "so much" not in shown(1e-12)
    assert "so much" in shown(1e-3)
