"""The demonstration drawings whose count does not tell what they do: who is named, and what small steps say."""

from __future__ import annotations

import cmath
import dataclasses
import math
from pathlib import Path

import pytest

from dxfcheck.inspection import inspect_drawing
from dxfcheck.rules.finding import Finding
from dxfcheck.settings import Settings
from fixtures.drafting import Habit, mechanisms_faults, write_plan
from tests.test_fixtures import FIXTURES, counts, inspect, only


def told(name: str, rule: str, *drives: str) -> Finding:
    report = inspect_drawing(str(FIXTURES / f"{name}.dxf"), Settings(drives=drives))
    (found,) = (finding for finding in report.findings if finding.rule == rule)
    return found


def rules(name: str) -> set[str]:
    return {finding.rule for finding in inspect(name).findings}


def verdict(name: str) -> str | None:
    finite = only(name).analysis.finite
    return None if finite is None else finite.verdict


def test_brace_of_the_bench_is_locked_and_loose_with_a_count_of_1() -> None:
    assert counts(only("bench-brace")) == (1, 8, 10, 2)
    locked = told("bench-brace", "locked-part")
    assert "A-C, A-D, B-C, B-D, C-D are locked with the frame: 1 constraint too many" in locked.message
    assert locked.remedy.startswith("take out A-C, A-D, B-C, B-D or C-D")
    assert "C-F turns freely about C" in told("bench-brace", "idle-freedom").message
    assert rules("bench-brace") == {"locked-part", "idle-freedom"}


def test_leveller_moves_through_and_worn_by_a_thousandth_it_locks() -> None:
    assert (verdict("shelf-leveller"), verdict("shelf-leveller-worn")) == ("through", "locked")
    assert counts(only("shelf-leveller-worn")) == (0, 5, 6, 1)
    for name, words in (("shelf-leveller", "it moves through"), ("shelf-leveller-worn", "locks after the first step")):
        found = told(name, "special-geometry")
        assert "the constraints of A, B, C, D, E, F depend on one another" in found.message
        assert words in found.message
        assert found.remedy.endswith("take out A-B, C-D or E-F")


def test_stretched_stay_of_the_gate_only_shivers() -> None:
    assert counts(only("gate-stay")) == (0, 3, 3, 1)
    found = told("gate-stay", "special-geometry")
    assert "the constraints of A, B, C depend on one another" in found.message
    assert "cannot move beyond an instant" in found.message


def test_twin_shelf_moves_through_and_either_shelf_can_go() -> None:
    assert counts(only("twin-shelf")) == (0, 5, 6, 1)
    assert verdict("twin-shelf") == "through"
    assert told("twin-shelf", "special-geometry").remedy.endswith("take out B-E or C-F")
    assert rules("twin-shelf") == {"special-geometry"}


def test_dead_centre_from_either_side() -> None:
    driven = told("tipper-dead-centre", "dead-centre")
    assert "B-C cannot drive A-B" in driven.message
    assert driven.remedy.endswith("A-B drives it from here")
    stopped = told("tipper-dead-centre", "drive-at-limit", "C-D = 1 rad/s")
    assert stopped.message.endswith("the joints hold C-D still")
    assert stopped.remedy.endswith("leave this drive out: A-B can drive it")


def test_gripper_at_its_limit_names_the_link_that_could_drive_it() -> None:
    found = told("gripper-at-limit", "drive-at-limit")
    assert found.message.endswith("the joints hold F-G still; A-B could drive it from here")
    assert only("gripper-at-limit").analysis.dead_centres == ()
    other = inspect_drawing(str(FIXTURES / "gripper-at-limit.dxf"), Settings(drives=("A-B = 1 rad/s",)))
    outcomes = sorted(drive.outcome for drive in other.mechanisms[0].analysis.drives)
    assert outcomes == ["at limit", "taken"]
    assert all(link.determined for link in other.mechanisms[0].analysis.links)


@pytest.mark.parametrize(("degrees", "doubtful"), [(0.3, True), (3.0, False)])
def test_gripper_near_its_limit_has_doubtful_speeds(degrees: float, tmp_path: Path, *, doubtful: bool) -> None:
    """Typed to two decimals, the rod EF a little off the point in which the lines of AB and CD meet; FG is driven."""
    plan = mechanisms_faults.GRIPPER_AT_LIMIT
    corner, end = plan.points["E"], plan.points["F"]
    points = {**plan.points, "F": corner + (end - corner) * cmath.rect(1, math.radians(degrees))}
    typed = {pin: complex(round(at.real, 2), round(at.imag, 2)) for pin, at in points.items()}
    write_plan(tmp_path / "near.dxf", dataclasses.replace(plan, points=typed), Habit(radius=4))
    report = inspect_drawing(str(tmp_path / "near.dxf"), Settings())
    assert report.mechanisms[0].analysis.solved
    assert {finding.rule for finding in report.findings} == ({"doubtful-speed"} if doubtful else set())
