"""Hand-checkable published cases: the working shows the published figures, found in the way the books find them.

Tolerances as in test_four_bars: half a digit of the published figure, a per cent where it was scaled off a drawing.
"""

from __future__ import annotations

import cmath
import math

import pytest

from dxfcheck.analysis.by_hand.working import StepWorking, Working, work_out
from tests.closed_forms import RPM, circles_meet, slider_crank
from tests.model import Other, Solved, linkage

EXACT = 1e-9
GRAPHICAL = 0.01
FOUR_BAR = {"A": "ground crank", "B": "crank coupler", "C": "coupler rocker", "D": "rocker ground"}


def worked(case: Solved) -> Working:
    working = work_out(case.model, case.analysis)
    assert working is not None
    assert working.closing < EXACT
    return working


def sides(step: StepWorking) -> list[float]:
    """Sizes of the triangle's sides, the known one first; the sine rule holds among them."""
    triangle = step.closing.triangle
    assert triangle is not None
    assert triangle.ratios is not None
    assert max(triangle.ratios) == pytest.approx(min(triangle.ratios), rel=EXACT)
    return [abs(side) for side in triangle.sides]


def values(case: Solved, step: StepWorking) -> dict[str, float]:
    """The angular velocities that a step finds, by the names of links, rad/s."""
    return {case.model.links[each.link].name: each.value for each in step.closing.unknowns if each.kind == "turn"}


def test_v01_velocity_polygon_of_a_crank_rocker() -> None:
    """R.S. Khurmi & J.K. Gupta, Theory of Machines (S. Chand), Ex. 7.1 (seen; number from memory); graphical."""
    b = 40.0 * cmath.exp(1j * math.pi / 3.0)
    c = circles_meet(b, 150.0, 150.0, 80.0, left=True)
    case = Solved(linkage({"A": 0j, "B": b, "C": c, "D": 150 + 0j}, FOUR_BAR, turn={"crank": -120.0 * RPM}))
    step = worked(case).steps[1]
    known, _, rocker = sides(step)
    assert known == pytest.approx(120.0 * RPM * 40.0, rel=EXACT)
    assert rocker == pytest.approx(385.0, rel=GRAPHICAL)
    assert values(case, step)["rocker"] == pytest.approx(-4.8, abs=0.05)


def test_v03_pole_of_the_coupler_by_its_two_lines() -> None:
    """R.S. Khurmi & J.K. Gupta, Theory of Machines (S. Chand), Ex. 6.1 (answers from memory); graphical."""
    b = 300.0 * cmath.exp(1j * math.pi / 3.0)
    c = circles_meet(b, 360.0, 600.0, 360.0, left=True)
    case = Solved(linkage({"A": 0j, "B": b, "C": c, "D": 600 + 0j}, FOUR_BAR, turn={"crank": -100.0 * RPM}))
    (pole,) = worked(case).steps[1].poles
    assert pole.crossing is not None
    assert abs(pole.crossing - b) == pytest.approx(500.0, abs=5.0)
    # I13 lies on the line of the crank and on that of the rocker
    assert (pole.crossing / b).imag == pytest.approx(0.0, abs=EXACT)
    assert ((pole.crossing - 600.0) / (c - 600.0)).imag == pytest.approx(0.0, abs=EXACT)


def test_v07_sides_of_a_triangle_with_a_known_angle() -> None:
    """J.L. Meriam & L.G. Kraige, Engineering Mechanics: Dynamics, sample problem 5/8 (seen); analytic.

    v_B = 150 straight down, v_A = 300/7 along x, and v_B/A square to AB, which falls by 2 on 7.
    """
    points = {"O": 0j, "A": 100j, "B": 175 + 50j, "C": 250 + 50j}
    pins = {"O": "ground OA", "A": "OA AB", "B": "AB CB", "C": "CB ground"}
    case = Solved(linkage(points, pins, turn={"CB": 2.0}))
    step = worked(case).steps[1]
    assert sorted(sides(step)) == pytest.approx([300.0 / 7.0, 150.0, math.hypot(300.0 / 7.0, 150.0)], rel=EXACT)
    assert values(case, step)["OA"] == pytest.approx(-0.42855, abs=5e-5)
    assert values(case, step)["AB"] == pytest.approx(-0.8571, abs=5e-5)
    triangle = step.closing.triangle
    assert triangle is not None
    assert triangle.angles is not None
    assert max(triangle.angles) == pytest.approx(math.pi / 2.0, rel=EXACT)
    (pole,) = step.poles
    assert pole.crossing == pytest.approx(50j, rel=EXACT)


def test_v08_slider_crank_of_a_steam_engine() -> None:
    """R.S. Khurmi & J.K. Gupta, Theory of Machines (S. Chand), Ex. 7.2 (seen; number from memory); graphical."""
    pin, slider, rod, speed = slider_crank(500.0, 2000.0, 0.0, math.pi / 4.0, 180.0 * RPM)
    slide: list[Other] = [("slide", slider, "ground", "block", 1 + 0j)]
    points = {"O": 0j, "B": pin, "P": slider, "E": pin + 0.25 * (slider - pin)}
    pins = {"O": "ground crank", "B": "crank rod", "P": "rod block"}
    case = Solved(linkage(points, pins, others=slide, tracing={"E": "rod"}, turn={"crank": 180.0 * RPM}))
    step = worked(case).steps[1]
    assert sides(step)[0] == pytest.approx(180.0 * RPM * 500.0, rel=EXACT)
    assert abs(speed) in [pytest.approx(side, rel=EXACT) for side in sides(step)]
    assert values(case, step)["rod"] == pytest.approx(rod, rel=EXACT)
    assert abs(values(case, step)["rod"]) == pytest.approx(3.4, abs=0.05)
    (traced,) = [point for point in step.points if case.model.pins[point.pin].name == "E"]
    assert abs(traced.velocity) == pytest.approx(8500.0, rel=GRAPHICAL)
    (pole,) = [pole for pole in step.poles if pole.case == "crossing"]
    assert [line.kind for line in pole.lines] == ["kennedy", "translating"]
