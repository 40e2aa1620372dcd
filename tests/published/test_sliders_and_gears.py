"""Published velocities of linkages with slides, slots and rolling contact; tolerances as in test_four_bars."""

from __future__ import annotations

import cmath
import math

import pytest

from tests.closed_forms import RPM, slider_crank
from tests.model import Other, Solved, linkage

EXACT = 1e-9
GRAPHICAL = 0.01
SLIDER_CRANK = {"O": "ground crank", "B": "crank rod", "P": "rod block"}


def solved_slider(
    b: complex, p: complex, rate: float, radius: dict[str, float] | None = None, **traced: complex
) -> Solved:
    points = {"O": 0j, "B": b, "P": p, **traced}
    tracing = dict.fromkeys(traced, "rod")
    slide: list[Other] = [("slide", p, "ground", "block", 1 + 0j)]
    model = linkage(points, SLIDER_CRANK, others=slide, turn={"crank": rate}, radius=radius, tracing=tracing)
    case = Solved(model)
    assert case.analysis.solved
    assert case.analysis.disagreement is not None
    assert case.analysis.disagreement < EXACT
    return case


def test_v08_steam_engine_with_rubbing_speeds() -> None:
    """R.S. Khurmi & J.K. Gupta, Theory of Machines (S. Chand), Ex. 7.2 (seen; number from memory); graphical."""
    # the engine lies to the left: mirror the closed form, which turns the sense of rotation round
    rate = -180.0 * RPM
    pin, slider, rod, speed = slider_crank(500.0, 2000.0, 0.0, math.pi / 4.0, -rate)
    b, p = complex(-pin.real, pin.imag), complex(-slider.real, slider.imag)
    e = b + 0.25 * (p - b)
    # G, the rod's slowest point, is the foot of the perpendicular from the pole, where the velocity runs along the rod
    way = (p - b) / abs(p - b)
    least = (1j * rate * b * way.conjugate()).real
    g = b + way * (1j * rate * b * way.conjugate()).imag / rod
    case = solved_slider(b, p, rate, {"O": 25.0, "B": 30.0, "P": 15.0}, E=e, G=g)
    assert abs(case.velocity("G")) == pytest.approx(8000.0, abs=500.0)
    assert case.velocity("G") == pytest.approx(least * way, rel=EXACT)
    assert case.turn("rod") == pytest.approx(3.4, abs=0.05)
    assert abs(case.velocity("E")) == pytest.approx(8500.0, rel=GRAPHICAL)
    assert case.rubbing("O") == pytest.approx(470.0, abs=5.0)
    assert case.rubbing("B") == pytest.approx(667.5, rel=GRAPHICAL)
    assert case.rubbing("P") == pytest.approx(51.0, abs=0.5)
    assert case.turn("rod") == pytest.approx(-rod, rel=EXACT)
    assert case.velocity("P") == pytest.approx(-speed, rel=EXACT)
    assert case.rubbing("O") == pytest.approx(25.0 * abs(rate), rel=EXACT)
    assert case.rubbing("B") == pytest.approx(30.0 * abs(rate + rod), rel=EXACT)
    assert case.rubbing("P") == pytest.approx(15.0 * abs(rod), rel=EXACT)
    assert case.analysis.links[-1].pole is None


def test_v11_piston_in_line() -> None:
    """R. Larson & B. Edwards, Calculus, sec. 2.6 Example 6 (seen); analytic: -9600 pi sqrt(3) / 13 in/min."""
    b, p, rod, _ = slider_crank(3.0, 7.0, 0.0, math.pi / 3.0, 200.0 * RPM)
    assert p == pytest.approx(8.0)
    case = solved_slider(b, p, 200.0 * RPM)
    assert case.velocity("P").real * 60.0 == pytest.approx(-4018.0, abs=0.5)
    assert case.velocity("P").real * 60.0 == pytest.approx(-9600.0 * math.pi * math.sqrt(3.0) / 13.0, rel=EXACT)
    assert case.turn("rod") == pytest.approx(rod, rel=EXACT)
    assert case.analysis.joints[-1].slide_speed == pytest.approx(-160.0 * math.pi * math.sqrt(3.0) / 13.0, rel=EXACT)


def test_v15_offset_slider_crank() -> None:
    """R.L. Norton, Design of Machinery, Table P6-2 row a / Problem 6-6 (from memory); analytic."""
    b, p, rod, speed = slider_crank(1.4, 4.0, 1.0, math.pi / 4.0, 10.0)
    case = solved_slider(b, p, 10.0)
    assert abs(case.velocity("B")) == pytest.approx(14.0, abs=0.5)
    assert abs(case.velocity("P")) == pytest.approx(9.9, abs=0.05)
    assert abs(case.turn("rod")) == pytest.approx(2.47, abs=0.005)
    assert case.turn("rod") == pytest.approx(rod, rel=EXACT)
    assert case.velocity("P") == pytest.approx(speed, rel=EXACT)


def test_v17_engine_with_a_point_of_the_rod() -> None:
    """J.L. Meriam & L.G. Kraige, Engineering Mechanics: Dynamics (US units), sample problem 5/9 (from memory)."""
    rate = -1500.0 * RPM
    b, p, rod, speed = slider_crank(5.0, 14.0, 0.0, math.pi / 3.0, rate)
    g = b + 4.0 / 14.0 * (p - b)
    case = solved_slider(b, p, rate, G=g)
    assert abs(case.velocity("B")) / 12.0 == pytest.approx(65.4, abs=0.05)
    assert abs(case.velocity("P")) / 12.0 == pytest.approx(67.3, abs=0.05)
    assert abs(case.velocity("G")) / 12.0 == pytest.approx(64.1, abs=0.05)
    assert abs(case.turn("rod")) == pytest.approx(29.5, abs=0.05)
    assert case.velocity("P") == pytest.approx(speed, rel=EXACT)
    assert case.velocity("G") == pytest.approx(1j * rate * b + 1j * rod * (g - b), rel=EXACT)


def test_v21_crank_and_slotted_lever() -> None:
    """R.S. Khurmi & J.K. Gupta, Theory of Machines (S. Chand), Ex. 7.5 (seen; number from memory); graphical."""
    rate = 40.0 * RPM
    b = 800j + 300.0 * cmath.exp(1j * math.pi / 4.0)
    d = 1300.0 * b / abs(b)
    pins = {"O1": "ground crank", "B": "crank block", "O2": "ground lever"}
    slide: list[Other] = [("slide", b, "block", "lever", b)]
    points = {"O1": 800j, "O2": 0j, "B": b, "D": d}
    case = Solved(linkage(points, pins, others=slide, turn={"crank": rate}, tracing={"D": "lever"}))
    assert case.turn("lever") == pytest.approx(1.015, rel=GRAPHICAL)
    assert abs(case.velocity("D")) == pytest.approx(1320.0, abs=5.0)
    relative = 1j * rate * (b - 800j) / b  # in the lever's own axes: real part slides, imaginary part turns
    assert case.turn("lever") == pytest.approx(relative.imag, rel=EXACT)
    assert case.analysis.joints[-1].slide_speed == pytest.approx(-relative.real * abs(b), rel=EXACT)


def test_v24_pin_in_a_turning_slot() -> None:
    """J.L. Meriam & L.G. Kraige, Engineering Mechanics: Dynamics, sample problem 5/17 (from memory); analytic."""
    a = 225 - 225j
    points = {"O": 0j, "C": 450 - 225j, "A": a}
    slot: list[Other] = [("pin in slot", a, "slotted", "AC", 1 - 1j)]
    model = linkage(
        points,
        {"O": "ground slotted", "C": "ground AC"},
        others=slot,
        turn={"slotted": 2.0},
        tracing={"A": "AC"},
    )
    case = Solved(model)
    assert (case.analysis.mobility.count, case.analysis.mobility.at_pose) == (1, 1)
    assert abs(case.turn("AC")) == pytest.approx(4.0, rel=EXACT)
    assert abs(case.velocity("A")) == pytest.approx(900.0, rel=EXACT)
    assert abs(case.analysis.joints[-1].slide_speed or 0.0) == pytest.approx(450.0 * math.sqrt(2.0), rel=EXACT)
    assert case.analysis.disagreement is not None
    assert case.analysis.disagreement < EXACT


def epicyclic(pins: dict[str, str], out: float, meshes: list[tuple[float, str, str]], turn: dict[str, float]) -> Solved:
    others: list[Other] = [("rolling", complex(at), first, second, 1j) for at, first, second in meshes]
    case = Solved(linkage({"O": 0j, "X": complex(out)}, pins, others=others, turn=turn))
    assert case.analysis.solved
    assert case.analysis.disagreement is not None
    assert case.analysis.disagreement < EXACT
    return case


def test_v26_annulus_fixed() -> None:
    """Epicyclic worked examples, Problem 1 (seen); data as Khurmi & Gupta, Theory of Machines, ch. 13; rpm."""
    meshes = [(32.0, "sun", "planet"), (72.0, "planet", "ground")]
    case = epicyclic({"O": "ground arm sun", "X": "arm planet"}, 52.0, meshes, {"arm": 18.0})
    assert case.turn("sun") == pytest.approx(18.0 * (1.0 + 72.0 / 32.0), rel=EXACT)
    assert case.turn("planet") == pytest.approx(18.0 * (1.0 - 72.0 / 20.0), rel=EXACT)


def test_v27_two_inputs() -> None:
    """R.S. Khurmi & J.K. Gupta, Theory of Machines (S. Chand), ch. 13, simple epicyclic 36/45 (seen); rpm."""
    meshes = [(36.0, "A", "B")]
    case = epicyclic({"O": "ground arm A", "X": "arm B"}, 81.0, meshes, {"arm": 150.0, "A": 0.0})
    assert case.turn("B") == pytest.approx(270.0, rel=EXACT)
    assert case.analysis.mobility.count == case.analysis.mobility.at_pose == 2


def test_v28_reverted_train() -> None:
    """R.S. Khurmi & J.K. Gupta, Theory of Machines (S. Chand), ch. 13, reverted train 75/30/90 (seen); rpm."""
    meshes = [(75.0, "DE", "ground"), (30.0, "DE", "C")]
    case = epicyclic({"O": "ground arm C", "X": "arm DE"}, 120.0, meshes, {"arm": -100.0})
    assert case.turn("C") == pytest.approx(400.0, rel=EXACT)


def test_v30_ring_fixed_sun_driven() -> None:
    """J.E. Shigley & C.R. Mischke, Mechanical Engineering Design, planetary example (from memory); rpm."""
    meshes = [(20.0, "sun", "planet"), (80.0, "planet", "ground")]
    case = epicyclic({"O": "ground arm sun", "X": "arm planet"}, 50.0, meshes, {"sun": -100.0})
    assert case.turn("arm") == pytest.approx(-20.0, rel=EXACT)
    assert case.turn("planet") == pytest.approx(100.0 / 3.0, rel=EXACT)
