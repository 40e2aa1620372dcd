"""The published cases with slides, slots and rolling contacts again, this time read from drawings of them.

Sources and tolerances are those of test_sliders_and_gears and test_mobility; exact values to 1e-9.
"""

from __future__ import annotations

import cmath
import math
from pathlib import Path
from typing import NamedTuple

import pytest

from fixtures.drafting import FRAME, Habit, Part, Plan, Rack, Slide, Slot, Telescope, Wheel
from tests.closed_forms import RPM, slider_crank, slotted_lever
from tests.published.drawn import Drawn, drawn

EXACT = 1e-9
GRAPHICAL = 0.01
HABITS = {
    "through, on a frame layer": Habit(),
    "interrupted, hatched": Habit(guides="interrupted", guide_frame="strokes", blocks="lines", frame="symbol"),
    "rails, to the rims": Habit(guides="rails", ends="rim", contours="pieces", frame="symbol", strokes="short"),
    "hatch strokes only": Habit(guides="strokes", frame="block", pins="arcs", named_layers=False, pitch="linetype"),
}


@pytest.fixture(params=HABITS)
def habit(request: pytest.FixtureRequest) -> Habit:
    """Habits of four drafters."""
    return HABITS[request.param]


def crank_and_rod(b: complex, p: complex, reach: tuple[float, float], **traced: complex) -> Plan:
    """Crank O-B, a rod B-P with points between its ends, and the block P on a level guide."""
    between = sorted(traced, key=lambda name: abs(traced[name] - b))
    return Plan(
        points={"O": 0j, "B": b, **{name: traced[name] for name in between}, "P": p},
        parts=(Part(pins=("O", "B")), Part(pins=("B", *between, "P"))),
        frame=("O",),
        slides=(Slide(pin="P", along=1 + 0j, reach=reach),),
    )


def agrees(case: Drawn, counts: tuple[int, int, int, int, int]) -> Drawn:
    assert case.counts == counts
    assert case.analysis.solved
    assert case.analysis.disagreement is not None
    assert case.analysis.disagreement < EXACT
    return case


def test_v08_steam_engine_with_rubbing_speeds(tmp_path: Path, habit: Habit) -> None:
    """R.S. Khurmi & J.K. Gupta, Theory of Machines (S. Chand), Ex. 7.2 (seen; number from memory); graphical."""
    pin, slider, rod, speed = slider_crank(500.0, 2000.0, 0.0, math.pi / 4.0, 180.0 * RPM)
    b, p = complex(-pin.real, pin.imag), complex(-slider.real, slider.imag)
    plan = crank_and_rod(b, p, (200.0, 250.0), E=b + 0.25 * (p - b))
    radii = {"O": 25.0, "B": 30.0, "P": 15.0}
    case = drawn(tmp_path / "v08.dxf", plan, "O-B = 180 rpm cw", radius=20.0, radii=radii, habit=habit)
    agrees(case, (1, 4, 4, 0, 1))
    assert case.turn("B-E-P") == pytest.approx(3.4, abs=0.05)
    assert abs(case.velocity("E")) == pytest.approx(8500.0, rel=GRAPHICAL)
    assert case.rubbing("O") == pytest.approx(470.0, abs=5.0)
    assert case.rubbing("B") == pytest.approx(667.5, rel=GRAPHICAL)
    assert case.rubbing("P") == pytest.approx(51.0, abs=0.5)
    assert case.turn("B-E-P") == pytest.approx(-rod, rel=EXACT)
    assert case.slide() == pytest.approx(-speed, rel=EXACT)
    assert case.rubbing("B") == pytest.approx(30.0 * abs(180.0 * RPM - rod), rel=EXACT)


class Piston(NamedTuple):
    """A slider-crank at a crank angle (degrees) and rate (rad/s), and the published speed of its slide."""

    crank: float
    rod: float
    offset: float
    degrees: float
    rate: float
    published: float
    half_digit: float


@pytest.mark.parametrize(
    "case",
    [
        pytest.param(
            Piston(3.0, 7.0, 0.0, 60.0, 200.0 * RPM, 4018.0 / 60.0, 0.5 / 60.0),
            id="V11 R. Larson and B. Edwards, Calculus, sec. 2.6 Example 6",
        ),
        pytest.param(
            Piston(1.4, 4.0, 1.0, 45.0, 10.0, 9.9, 0.05), id="V15 R.L. Norton, Design of Machinery, Table P6-2 row a"
        ),
        pytest.param(
            Piston(5.0, 14.0, 0.0, 60.0, 1500.0 * RPM, 67.3 * 12.0, 0.05 * 12.0),
            id="V17 J.L. Meriam and L.G. Kraige, Dynamics, 5-9",
        ),
    ],
)
def test_pistons(tmp_path: Path, habit: Habit, case: Piston) -> None:
    b, p, rod_rate, speed = slider_crank(case.crank, case.rod, case.offset, math.radians(case.degrees), case.rate)
    plan = crank_and_rod(b, p, (case.crank, case.crank))
    found = drawn(tmp_path / "piston.dxf", plan, f"O-B = {case.rate!r} rad/s", radius=case.crank / 15.0, habit=habit)
    agrees(found, (1, 4, 4, 0, 1))
    assert abs(found.slide()) == pytest.approx(case.published, abs=case.half_digit)
    assert found.slide() == pytest.approx(speed, rel=EXACT)
    assert found.velocity("P") == pytest.approx(speed, rel=EXACT)
    assert found.turn("B-P") == pytest.approx(rod_rate, rel=EXACT)


def test_v21_crank_and_slotted_lever(tmp_path: Path, habit: Habit) -> None:
    """R.S. Khurmi & J.K. Gupta, Theory of Machines (S. Chand), Ex. 7.5 (seen; number from memory); graphical."""
    b = 800j + 300.0 * cmath.exp(1j * math.pi / 4.0)
    plan = Plan(
        points={"O1": 800j, "B": b, "O2": 0j, "D": 1300.0 * b / abs(b)},
        parts=(Part(pins=("O1", "B")), Part(pins=("O2", "D"))),
        frame=("O1", "O2"),
        slides=(Slide(pin="B", along=b, guide="D-O2", reach=(150.0, 150.0)),),
    )
    case = drawn(tmp_path / "v21.dxf", plan, "O1-B = 40 rpm", radius=15.0, habit=habit)
    agrees(case, (1, 4, 4, 0, 1))
    turn, along = slotted_lever(0j, b, 1j * 40.0 * RPM * (b - 800j))
    assert case.turn("D-O2") == pytest.approx(1.015, rel=GRAPHICAL)
    assert abs(case.velocity("D")) == pytest.approx(1320.0, abs=5.0)
    assert case.turn("D-O2") == pytest.approx(turn, rel=EXACT)
    assert abs(case.slide()) == pytest.approx(abs(along), rel=EXACT)


def test_v24_pin_in_a_turning_slot(tmp_path: Path, habit: Habit) -> None:
    """J.L. Meriam & L.G. Kraige, Engineering Mechanics: Dynamics, sample problem 5/17 (from memory); analytic."""
    a = 225 - 225j
    plan = Plan(
        points={"O": 0j, "A": a, "C": 450 - 225j},
        parts=(Part(pins=("O",)), Part(pins=("A", "C"))),
        frame=("O", "C"),
        slots=(Slot(pin="A", owner="O", first=a * 0.7, last=a * 1.3),),
    )
    case = drawn(tmp_path / "v24.dxf", plan, "O = 2 rad/s", radius=8.0, habit=habit)
    agrees(case, (1, 3, 2, 1, 1))
    assert abs(case.turn("A-C")) == pytest.approx(4.0, rel=EXACT)
    assert abs(case.velocity("A")) == pytest.approx(900.0, rel=EXACT)
    assert abs(case.slide("pin in slot")) == pytest.approx(450.0 * math.sqrt(2.0), rel=EXACT)


def epicyclic(out: float, wheels: tuple[Wheel, ...], handle: complex | None = None) -> Plan:
    """An arm O-X and wheels; the sun's link O-Q where it has a handle."""
    return Plan(
        points={"O": 0j, "X": out * cmath.exp(0.6j), **({} if handle is None else {"Q": handle})},
        parts=(Part(pins=("O", "X")), *([] if handle is None else [Part(pins=("O", "Q"))])),
        frame=("O",),
        wheels=wheels,
    )


def test_v26_annulus_fixed(tmp_path: Path, habit: Habit) -> None:
    """Epicyclic worked examples, Problem 1 (seen); data as Khurmi & Gupta, Theory of Machines, ch. 13; rpm."""
    wheels = (Wheel(pin="O", radii=(96.0,)), Wheel(pin="X", radii=(60.0,)), Wheel(pin="O", radii=(216.0,), owner=FRAME))
    case = drawn(tmp_path / "v26.dxf", epicyclic(156.0, wheels), "O-X = 18 rpm", radius=4.0, habit=habit)
    agrees(case, (1, 4, 3, 2, 1))
    assert case.wheel_turn("O") == pytest.approx(58.5 * RPM, rel=EXACT)
    assert case.wheel_turn("X") == pytest.approx(-46.8 * RPM, rel=EXACT)


def test_v27_two_inputs(tmp_path: Path, habit: Habit) -> None:
    """R.S. Khurmi & J.K. Gupta, Theory of Machines (S. Chand), ch. 13, simple epicyclic 36/45 (seen); rpm."""
    wheels = (Wheel(pin="O", radii=(108.0,), owner="O-Q"), Wheel(pin="X", radii=(135.0,)))
    plan = epicyclic(243.0, wheels, -60 + 20j)
    case = drawn(tmp_path / "v27.dxf", plan, "O-X = 150 rpm", "O-Q = 0 rpm", radius=4.0, habit=habit)
    agrees(case, (2, 4, 3, 1, 2))
    assert case.wheel_turn("X") == pytest.approx(270.0 * RPM, rel=EXACT)


def test_v28_reverted_train(tmp_path: Path, habit: Habit) -> None:
    """R.S. Khurmi & J.K. Gupta, Theory of Machines (S. Chand), ch. 13, reverted train 75/30/90 (seen); rpm."""
    wheels = (
        Wheel(pin="O", radii=(150.0,), owner=FRAME),
        Wheel(pin="X", radii=(90.0, 180.0)),
        Wheel(pin="O", radii=(60.0,)),
    )
    case = drawn(tmp_path / "v28.dxf", epicyclic(240.0, wheels), "O-X = 100 rpm cw", radius=4.0, habit=habit)
    agrees(case, (1, 4, 3, 2, 1))
    assert case.wheel_turn("O") == pytest.approx(400.0 * RPM, rel=EXACT)


def test_v30_ring_fixed_sun_driven(tmp_path: Path, habit: Habit) -> None:
    """J.E. Shigley & C.R. Mischke, Mechanical Engineering Design, planetary example (from memory); rpm."""
    wheels = (
        Wheel(pin="O", radii=(100.0,), owner="O-Q"),
        Wheel(pin="X", radii=(150.0,)),
        Wheel(pin="O", radii=(400.0,), owner=FRAME),
    )
    plan = epicyclic(250.0, wheels, -60 + 20j)
    case = drawn(tmp_path / "v30.dxf", plan, "O-Q = 100 rpm cw", radius=4.0, habit=habit)
    agrees(case, (1, 4, 3, 2, 1))
    assert case.turn("O-X") == pytest.approx(-20.0 * RPM, rel=EXACT)
    assert case.wheel_turn("X") == pytest.approx(100.0 / 3.0 * RPM, rel=EXACT)


SIX_BAR = {"A": 0j, "B": 20 + 35j, "C": 100 + 70j, "D": 120 + 0j, "E": 150 + 60j, "F": 230 + 90j, "G": 240 + 0j}
"""M03 and M06: coordinates of the published list."""

COUNTED = {
    "M05 pin in slot": (
        Plan(
            points={"O": 0j, "A": 225 - 225j, "C": 450 - 225j},
            parts=(Part(pins=("O", "A")), Part(pins=("C",))),
            frame=("O", "C"),
            slots=(Slot(pin="A", owner="C", first=160 - 225j, last=290 - 225j),),
        ),
        (1, 3, 2, 1, 1),
    ),
    "M06 structure with a half joint": (
        Plan(
            points={name: 4.0 * at for name, at in SIX_BAR.items()} | {"H": 240 + 210j},
            parts=(
                Part(pins=("A", "B")),
                Part(pins=("B", "H", "C")),
                Part(pins=("C", "D", "E"), shape="polyline"),
                Part(pins=("E", "F")),
                Part(pins=("F", "G")),
            ),
            frame=("A", "D", "G"),
            slots=(Slot(pin="H", first=240 + 210j - 10 - 30j, last=240 + 210j + 10 + 30j),),
        ),
        (0, 6, 7, 1, 0),
    ),
    "M09 telescoping arm": (
        Plan(
            points={"A": 0j, "B": 80 + 40j, "C": 60 - 50j},
            parts=(Part(pins=("A", "B")),),
            frame=("A", "C"),
            telescopes=(Telescope(rear="C", front="B"),),
        ),
        (1, 4, 4, 0, 1),
    ),
    "M19 yoke": (
        Plan(
            points={"O": 0j, "A": 60 + 80j},
            parts=(Part(pins=("O", "A")), Part(pins=(), title="yoke", extra=((60 + 0j, 162.5 + 0j),))),
            frame=("O",),
            slides=(
                Slide(pin="A", along=1j, guide="yoke", reach=(80.0, 60.0)),
                Slide(carrier="yoke", at=170 + 0j, along=1 + 0j, reach=(60.0, 70.0)),
            ),
        ),
        (1, 4, 4, 0, 1),
    ),
    "M20 cam with roller follower": (
        Plan(
            points={"O": 0j, "R": 80 + 60j},
            parts=(Part(pins=("R",)),),
            frame=("O",),
            slides=(Slide(carrier="R", at=80 + 130j, along=1j, reach=(35.0, 60.0)),),
            wheels=(Wheel(pin="O", radii=(70.0,)), Wheel(pin="R", radii=(30.0,))),
        ),
        (2, 4, 3, 1, 2),
    ),
    "M21 planetary, three central members free": (
        epicyclic(
            156.0, (Wheel(pin="O", radii=(96.0,)), Wheel(pin="X", radii=(60.0,)), Wheel(pin="O", radii=(216.0,)))
        ),
        (2, 5, 4, 2, 2),
    ),
    "M23 wheel rolling on the ground": (
        Plan(
            points={"C": 50j},
            parts=(),
            frame=(),
            wheels=(Wheel(pin="C", radii=(50.0,)),),
            racks=(Rack(owner=FRAME, start=-90 + 0j, end=90 + 0j),),
        ),
        (1, 2, 1, 0, 1),
    ),
}


@pytest.mark.parametrize("name", COUNTED)
def test_published_counts(tmp_path: Path, habit: Habit, name: str) -> None:
    plan, counts = COUNTED[name]
    assert drawn(tmp_path / "counted.dxf", plan, radius=3.0, habit=habit).counts == counts
