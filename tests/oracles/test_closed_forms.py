"""Slides, slots and rolling contacts against closed forms, over whole turns or many random shapes."""

from __future__ import annotations

import cmath
import math
from dataclasses import replace

import pytest
from hypothesis import given
from hypothesis import strategies as st

from dxfcheck.linkage import Drive
from tests.closed_forms import lift_rate, slider_crank, slotted_lever, willis
from tests.model import Other, Solved, linkage

EXACT = 1e-9
TURN = [math.radians(degrees) for degrees in range(0, 360, 5)]
RATE = 7.0
angles = st.floats(-math.pi, math.pi)


def agrees(case: Solved) -> Solved:
    assert case.analysis.solved
    assert case.analysis.disagreement is not None
    assert case.analysis.disagreement < EXACT
    return case


def test_offset_slider_crank_over_a_turn() -> None:
    for angle in TURN:
        pin, slider, rod, speed = slider_crank(40.0, 130.0, 25.0, angle, RATE)
        pins = {"O": "ground crank", "B": "crank rod", "P": "rod block"}
        slide: list[Other] = [("slide", slider, "ground", "block", 1 + 0j)]
        model = linkage({"O": 0j, "B": pin, "P": slider}, pins, others=slide, turn={"crank": RATE})
        case = agrees(Solved(model))
        assert case.counts == (1, 4, 4, 0, 1)
        assert case.turn("rod") == pytest.approx(rod, rel=EXACT, abs=EXACT)
        assert case.slide("ground", "block") == pytest.approx(speed, rel=EXACT, abs=1e-7)
        assert case.velocity("P") == pytest.approx(speed, rel=EXACT, abs=1e-7)


def test_slider_crank_driven_at_its_slide() -> None:
    """The same motion driven the other way round: the block's speed stated, the crank's rate to be found."""
    pin, slider, rod, speed = slider_crank(40.0, 130.0, 25.0, 1.0, RATE)
    pins = {"O": "ground crank", "B": "crank rod", "P": "rod block"}
    slide: list[Other] = [("slide", slider, "ground", "block", 1 + 0j)]
    model = linkage({"O": 0j, "B": pin, "P": slider}, pins, others=slide)
    block = next(number for number, link in enumerate(model.links) if link.name == "block")
    drive = Drive(link=block, against=0, rate=speed, kind="slide", joint=len(model.joints) - 1)
    case = agrees(Solved(replace(model, drives=(drive,))))
    assert case.turn("crank") == pytest.approx(RATE, rel=EXACT)
    assert case.turn("rod") == pytest.approx(rod, rel=EXACT)


@pytest.mark.parametrize("pivot", [-100j, 30 - 60j, 15 + 0j], ids=["below", "aside", "inside the crank circle"])
@pytest.mark.parametrize("half_joint", [False, True])
def test_slotted_lever_over_a_turn(pivot: complex, *, half_joint: bool) -> None:
    """An inverted slider: the crank's pin runs along the lever, by a block or in a slot."""
    for angle in TURN:
        pin = 40.0 * cmath.exp(1j * angle)
        turn, along = slotted_lever(pivot, pin, 1j * RATE * pin)
        pins = {"O": "ground crank", "L": "ground lever", **({} if half_joint else {"B": "crank block"})}
        kind: Other = (
            ("pin in slot", pin, "lever", "crank", pin - pivot)
            if half_joint
            else ("slide", pin, "lever", "block", pin - pivot)
        )
        points = {"O": 0j, "L": pivot, "B": pin}
        case = agrees(Solved(linkage(points, pins, others=[kind], turn={"crank": RATE})))
        assert case.counts == ((1, 3, 2, 1, 1) if half_joint else (1, 4, 4, 0, 1))
        assert case.turn("lever") == pytest.approx(turn, rel=EXACT, abs=EXACT)
        assert case.slide("lever", kind[3]) == pytest.approx(along, rel=EXACT, abs=1e-7)


def test_yoke_over_a_turn() -> None:
    """The yoke runs at x' = - r w sin t, the block in it at y' = r w cos t."""
    for angle in TURN:
        pin = 40.0 * cmath.exp(1j * angle)
        others: list[Other] = [("slide", pin, "yoke", "block", 1j), ("slide", 90j, "ground", "yoke", 1 + 0j)]
        pins = {"O": "ground crank", "B": "crank block"}
        case = agrees(Solved(linkage({"O": 0j, "B": pin}, pins, others=others, turn={"crank": RATE})))
        assert case.slide("ground", "yoke") == pytest.approx(-40.0 * RATE * math.sin(angle), rel=EXACT, abs=1e-8)
        assert case.slide("yoke", "block") == pytest.approx(40.0 * RATE * math.cos(angle), rel=EXACT, abs=1e-8)


@given(
    angles,
    st.complex_numbers(min_magnitude=60.0, max_magnitude=300.0, allow_nan=False),
    angles,
    st.floats(0.2, 0.8),
    st.floats(-50.0, 50.0),
)
def test_pin_in_the_slot_of_any_link(angle: float, pivot: complex, lean: float, share: float, rate: float) -> None:
    """The slot runs anywhere across a lever: what holds is that the pin has no speed across it in the lever's axes."""
    pin = 40.0 * cmath.exp(1j * angle)
    along = cmath.exp(1j * lean)
    side = (1j * (pin - pivot) * (1j * along).conjugate()).real / abs(pin - pivot)
    if abs(side) < share:
        along = (pin - pivot) / abs(pin - pivot)
        side = 1.0
    across = 1j * along
    turn = (1j * rate * pin * across.conjugate()).real / (1j * (pin - pivot) * across.conjugate()).real
    slot: list[Other] = [("pin in slot", pin, "lever", "crank", along)]
    pins = {"O": "ground crank", "L": "ground lever"}
    case = agrees(Solved(linkage({"O": 0j, "L": pivot}, pins, others=slot, turn={"crank": rate})))
    assert case.turn("lever") == pytest.approx(turn, rel=EXACT, abs=EXACT)
    sliding = ((1j * rate * pin - 1j * turn * (pin - pivot)) * along.conjugate()).real
    assert case.slide("lever", "crank") == pytest.approx(sliding, rel=EXACT, abs=1e-7)


@given(angles, angles, st.floats(15.0, 400.0))
def test_a_curved_slot_holds_as_a_crank_from_its_middle_does(angle: float, towards: float, reach: float) -> None:
    """A pin on an arc about Q, on a moving plate: the same speeds as with a link pinned at Q and at the pin."""
    points = {"O": 0j, "D": 200 + 0j, "B": 60.0 * cmath.exp(1j * angle)}
    points["P"] = 180 + 90j
    points["Q"] = points["P"] + reach * cmath.exp(1j * towards)
    rod = (points["P"] - points["B"]) / abs(points["P"] - points["B"])
    arm = points["P"] - points["Q"]
    across_rod = abs((arm * rod.conjugate()).real) / abs(arm)
    lever = abs(((points["Q"] - points["D"]) * arm.conjugate()).imag) / abs(arm)
    if across_rod < 0.2 or lever < 20.0:
        return  # nearly a dead centre, where no two solutions agree to 12 figures
    pins = {"O": "ground crank", "B": "crank rod", "D": "ground plate"}
    pinned = {**pins, "P": "rod swing", "Q": "swing plate"}
    drives = {"crank": RATE, "plate": 2.5}
    expected = agrees(Solved(linkage(points, pinned, turn=drives)))
    slot: list[Other] = [("pin in slot", points["P"], "plate", "rod", 1j * arm)]
    case = agrees(Solved(linkage(points, pins, others=slot, turn=drives, tracing={"P": "rod"})))
    assert case.counts == (2, 4, 3, 1, 2)
    greatest = max(abs(expected.turn(name)) for name in ("crank", "rod", "plate"))
    for name in ("rod", "plate"):
        assert case.turn(name) == pytest.approx(expected.turn(name), rel=1e-12, abs=1e-12 * greatest)
    assert case.velocity("P") == pytest.approx(expected.velocity("P"), rel=1e-12, abs=1e-12 * greatest * 400.0)
    slid = ((expected.turn("swing") - expected.turn("plate")) * 1j * arm / (1j * arm / abs(arm))).real
    assert case.slide("plate", "rod") == pytest.approx(slid, rel=1e-11, abs=1e-11 * greatest * 400.0)


@given(
    st.integers(12, 90),
    st.integers(12, 90),
    angles,
    st.booleans(),
    st.integers(-100, 100),
    st.integers(-100, 100),
    st.floats(1, 9),
)
def test_planetary_trains_obey_willis(
    sun: int,
    planet: int,
    at: float,
    backwards: bool,  # noqa: FBT001
    arm_rate: int,
    ring_rate: int,
    module: float,
) -> None:
    """Arm and ring driven; teeth at random, the planet anywhere round the sun."""
    way = cmath.exp(1j * at)
    ring = sun + 2 * planet
    out = {"O": 3 + 4j, "X": 3 + 4j + module * (sun + planet) / 2.0 * way}
    tangent = -1j * way if backwards else 1j * way
    meshes: list[Other] = [
        ("rolling", 3 + 4j + module * sun / 2.0 * way, "sun", "planet", tangent),
        ("rolling", 3 + 4j + module * ring / 2.0 * way, "ring", "planet", -tangent),
    ]
    pins = {"O": "ground arm sun ring", "X": "arm planet"}
    case = agrees(Solved(linkage(out, pins, others=meshes, turn={"arm": arm_rate, "ring": ring_rate})))
    assert case.counts == (2, 5, 4, 2, 2)
    greatest = (abs(arm_rate) + abs(ring_rate)) * ring / min(sun, planet)
    assert case.turn("sun") == pytest.approx(willis(sun, ring, arm_rate, ring_rate), rel=EXACT, abs=EXACT * greatest)
    expected = arm_rate + (ring_rate - arm_rate) * ring / planet
    assert case.turn("planet") == pytest.approx(expected, rel=EXACT, abs=EXACT * greatest)


@pytest.mark.parametrize("gear", [-30.0 / 45.0, 50.0 / 80.0], ids=["outside", "inside"])
def test_two_wheels_on_the_frame(gear: float) -> None:
    """Wheels turn as their radii say, against one another outside, with one another inside."""
    first, second = (30.0, 45.0) if gear < 0 else (50.0, 80.0)
    centre = first + second if gear < 0 else first - second
    mesh: list[Other] = [("rolling", complex(first), "one", "other", 1j)]
    model = linkage({"A": 0j, "B": complex(centre)}, {"A": "ground one", "B": "ground other"}, others=mesh)
    driven = replace(model, drives=(Drive(link=1, against=0, rate=RATE),))
    case = agrees(Solved(driven))
    assert case.counts == (1, 3, 2, 1, 1)
    assert case.turn("other") == pytest.approx(gear * RATE, rel=EXACT)
    assert case.analysis.joints[-1].relative_angular_velocity == pytest.approx((gear - 1.0) * RATE, rel=EXACT)


def test_rack_and_wheel() -> None:
    """A rack that slides on the frame under a wheel about a fixed pin runs at w r."""
    others: list[Other] = [("slide", 80 - 35j, "ground", "rack", 1 + 0j), ("rolling", -25j, "wheel", "rack", 1 + 0j)]
    case = agrees(Solved(linkage({"C": 0j}, {"C": "ground wheel"}, others=others, turn={"wheel": RATE})))
    assert case.counts == (1, 3, 2, 1, 1)
    assert case.slide("ground", "rack") == pytest.approx(25.0 * RATE, rel=EXACT)


@pytest.mark.parametrize("degrees", range(10, 80, 5))
def test_lift_rises_as_its_telescope_extends(degrees: int) -> None:
    """A lift table of crossed arms of 600; a telescope from the base at 250 to a pin of one arm at 420."""
    angle, arm, foot, reach = math.radians(degrees), 600.0, 250.0, 420.0
    way = cmath.exp(1j * angle)
    points = {
        "O": 0j,
        "F": complex(arm * math.cos(angle)),
        "M": arm / 2.0 * way,
        "T": complex(0.0, arm * math.sin(angle)),
        "R": arm * way,
        "P": complex(foot),
        "Q": reach * way,
    }
    pins = {
        "O": "ground arm",
        "F": "brace foot",
        "M": "arm brace",
        "T": "brace table",
        "R": "arm roller",
        "P": "ground barrel",
        "Q": "arm rod",
    }
    slides: list[Other] = [
        ("slide", points["F"], "ground", "foot", 1 + 0j),
        ("slide", points["R"], "table", "roller", 1 + 0j),
        ("slide", (points["P"] + points["Q"]) / 2.0, "barrel", "rod", points["Q"] - points["P"]),
    ]
    model = linkage(points, pins, others=slides)
    names = [link.name for link in model.links]
    drive = Drive(
        link=names.index("rod"), against=names.index("barrel"), rate=12.0, kind="slide", joint=len(model.joints) - 1
    )
    case = agrees(Solved(replace(model, drives=(drive,))))
    assert case.counts == (1, 8, 10, 0, 1)
    assert case.velocity("T") == pytest.approx(1j * 12.0 * lift_rate(arm, foot, reach, angle), rel=EXACT)
    assert case.turn("table") == pytest.approx(0.0, abs=1e-12)
    assert case.slide("barrel", "rod") == pytest.approx(12.0, rel=EXACT)
