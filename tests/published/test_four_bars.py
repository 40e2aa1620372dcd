"""Published four-bar velocities. Half a digit of the published figure, a per cent or two where it was scaled off a
drawing; and the same quantity to 1e-9 against the closed form."""

from __future__ import annotations

import cmath
import math

import pytest

from tests.closed_forms import RPM, circles_meet, four_bar_rates
from tests.model import Solved, linkage

EXACT = 1e-9
GRAPHICAL = 0.01
FOUR_BAR = {"A": "ground crank", "B": "crank coupler", "C": "coupler rocker", "D": "rocker ground"}


def solved(a: complex, b: complex, c: complex, d: complex, crank: float, **more: object) -> Solved:
    points = {"A": a, "B": b, "C": c, "D": d, **more.pop("points", {})}  # type: ignore[dict-item]
    case = Solved(linkage(points, FOUR_BAR, turn={"crank": crank}, **more))  # type: ignore[arg-type]
    assert case.analysis.solved
    assert case.analysis.disagreement is not None
    assert case.analysis.disagreement < EXACT
    assert case.analysis.mobility.count == case.analysis.mobility.at_pose == 1
    return case


def test_v01_crank_rocker() -> None:
    """R.S. Khurmi & J.K. Gupta, Theory of Machines (S. Chand), Ex. 7.1 (seen; number from memory); graphical."""
    crank = -120.0 * RPM
    b = 40.0 * cmath.exp(1j * math.pi / 3.0)
    c = circles_meet(b, 150.0, 150.0, 80.0, left=True)
    case = solved(0.0, b, c, 150.0, crank)
    assert case.turn("rocker") == pytest.approx(-4.8, abs=0.05)
    assert abs(case.velocity("C")) == pytest.approx(385.0, rel=GRAPHICAL)
    coupler, rocker = four_bar_rates(0.0, b, c, 150.0, crank)
    assert case.turn("coupler") == pytest.approx(coupler, rel=EXACT)
    assert case.turn("rocker") == pytest.approx(rocker, rel=EXACT)
    assert abs(case.velocity("C")) == pytest.approx(80.0 * abs(rocker), rel=EXACT)


def test_v03_pole_of_the_coupler() -> None:
    """R.S. Khurmi & J.K. Gupta, Theory of Machines (S. Chand), Ex. 6.1 (answers from memory); graphical."""
    crank = -100.0 * RPM
    b = 300.0 * cmath.exp(1j * math.pi / 3.0)
    c = circles_meet(b, 360.0, 600.0, 360.0, left=True)
    case = solved(0.0, b, c, 600.0, crank)
    assert abs(case.pole("coupler") - b) == pytest.approx(500.0, abs=5.0)
    assert abs(case.turn("coupler")) == pytest.approx(6.282, rel=GRAPHICAL)
    coupler, _ = four_bar_rates(0.0, b, c, 600.0, crank)
    assert case.turn("coupler") == pytest.approx(coupler, rel=EXACT)
    # the pole lies where the lines of the crank and the rocker meet
    along = (c - 600.0).conjugate()
    pole = b * ((-600.0 * along).imag / (-b * along).imag)
    assert case.pole("coupler") == pytest.approx(pole, rel=EXACT)


def test_v06_open_four_bar() -> None:
    """R.L. Norton, Design of Machinery (McGraw-Hill), Table P6-1 row a (givens seen, answers from memory); analytic."""
    b = 2.0 * cmath.exp(1j * math.pi / 6.0)
    c = circles_meet(b, 7.0, 6.0, 9.0, left=True)
    assert c == pytest.approx((47.60211 + 203.163388j) / 25.4, rel=1e-7)
    case = solved(0.0, b, c, 6.0, 10.0)
    assert case.turn("coupler") == pytest.approx(-5.99, abs=0.005)
    assert case.turn("rocker") == pytest.approx(-3.99, abs=0.005)
    coupler, rocker = four_bar_rates(0.0, b, c, 6.0, 10.0)
    assert case.turn("coupler") == pytest.approx(coupler, rel=EXACT)
    assert case.turn("rocker") == pytest.approx(rocker, rel=EXACT)


def test_v07_driven_at_the_other_side() -> None:
    """J.L. Meriam & L.G. Kraige, Engineering Mechanics: Dynamics, sample problem 5/8 (seen); analytic."""
    points = {"O": 0j, "A": 100j, "B": 175 + 50j, "C": 250 + 50j}
    pins = {"O": "ground OA", "A": "OA AB", "B": "AB CB", "C": "CB ground"}
    case = Solved(linkage(points, pins, turn={"CB": 2.0}))
    assert case.turn("OA") == pytest.approx(-0.42855, abs=5e-5)
    assert case.turn("AB") == pytest.approx(-0.8571, abs=5e-5)
    assert case.turn("OA") == pytest.approx(-3.0 / 7.0, rel=EXACT)
    assert case.turn("AB") == pytest.approx(-6.0 / 7.0, rel=EXACT)
    assert case.velocity("B") == pytest.approx(-150j, rel=EXACT)
    assert case.velocity("A").real == pytest.approx(42.9, abs=0.05)
    assert case.velocity("A") == pytest.approx(300.0 / 7.0, rel=EXACT)
    assert case.pole("AB") == pytest.approx(50j, rel=EXACT)


def test_v20_rubbing_speeds() -> None:
    """S.S. Rattan, Theory of Machines, ch. 2, first worked example (from memory); graphical."""
    b = 50.0 * cmath.exp(1j * math.pi / 3.0)
    c = circles_meet(b, 66.0, 100.0, 56.0, left=True)
    e = b + 40.0 / 66.0 * (c - b)
    radius = {"A": 30.0, "B": 40.0, "C": 25.0, "D": 35.0}
    case = solved(0.0, b, c, 100.0, 10.5, radius=radius, points={"E": e}, tracing={"E": "coupler"})
    assert abs(case.velocity("E")) == pytest.approx(415.0, rel=0.02)
    assert abs(case.turn("coupler")) == pytest.approx(5.15, abs=0.005)
    assert case.rubbing("A") == pytest.approx(315.0, abs=0.5)
    coupler, rocker = four_bar_rates(0.0, b, c, 100.0, 10.5)
    assert case.velocity("E") == pytest.approx(10.5j * b + 1j * coupler * (e - b), rel=EXACT)
    # Khurmi & Gupta, Theory of Machines, ch. 7: radius times the difference of the signed rates
    assert case.rubbing("A") == pytest.approx(30.0 * 10.5, rel=EXACT)
    assert case.rubbing("B") == pytest.approx(40.0 * abs(10.5 - coupler), rel=EXACT)
    assert case.rubbing("C") == pytest.approx(25.0 * abs(coupler - rocker), rel=EXACT)
    assert case.rubbing("D") == pytest.approx(35.0 * abs(rocker), rel=EXACT)
