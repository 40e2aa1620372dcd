"""What must hold for any linkage: the answers turn, shift, grow and mirror with the drawing, and keep their order."""

from __future__ import annotations

import cmath
import math
from collections.abc import Callable

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from dxfcheck.analysis import analyse
from tests.examples import FOUR_BAR, FOUR_BAR_POINTS, STEPHENSON, STEPHENSON_POINTS, STRAIGHT_LINE, STRAIGHT_LINE_POINTS
from tests.model import Other, Solved, linkage

TOLERANCE = 1e-9
SLIDER = {"O": "ground crank", "B": "crank rod", "P": "rod block"}
angles = st.floats(-math.pi, math.pi)
scales = st.floats(1e-3, 1e3)


def slider_crank(move: Callable[[complex], complex], sense: float) -> Solved:
    """A slider-crank with a radius of 2 at its crank pin, its places moved as a drawing is."""
    points = {name: move(at) for name, at in {"O": 0j, "B": 30 + 40j, "P": 150 - 10j}.items()}
    slide: list[Other] = [("slide", points["P"], "ground", "block", move(151 - 10j) - points["P"])]
    return Solved(linkage(points, SLIDER, others=slide, turn={"crank": 3.0 * sense}))


def stephenson(move: Callable[[complex], complex], sense: float) -> Solved:
    points = {name: move(at) for name, at in STEPHENSON_POINTS.items()}
    return Solved(linkage(points, STEPHENSON, turn={"lever": 3.0 * sense}))


@given(angles, st.complex_numbers(max_magnitude=1e4, allow_nan=False), scales, st.booleans())
@pytest.mark.parametrize("build", [slider_crank, stephenson])
def test_answers_move_with_the_drawing(
    build: Callable[[Callable[[complex], complex], float], Solved],
    angle: float,
    shift: complex,
    scale: float,
    mirrored: bool,  # noqa: FBT001
) -> None:
    turned = scale * cmath.exp(1j * angle)

    def along(vector: complex) -> complex:
        return turned * (vector.conjugate() if mirrored else vector)

    sense = -1.0 if mirrored else 1.0
    plain, moved = build(lambda at: at, 1.0), build(lambda at: along(at) + shift * scale, sense)
    assert moved.analysis.solved
    assert moved.analysis.mobility == plain.analysis.mobility
    for link in (link.name for link in plain.model.links[1:]):
        assert moved.turn(link) == pytest.approx(sense * plain.turn(link), rel=TOLERANCE, abs=TOLERANCE)
    for pin in (pin.name for pin in plain.model.pins):
        expected = along(plain.velocity(pin))
        assert abs(moved.velocity(pin) - expected) < TOLERANCE * scale * 1e3
    for one, other in zip(plain.analysis.joints, moved.analysis.joints, strict=True):
        if one.slide_speed is not None:
            assert other.slide_speed == pytest.approx(scale * one.slide_speed, rel=1e-8)


@given(st.permutations(["crank", "coupler", "rocker", "rod", "lever"]))
def test_order_of_the_links_does_not_matter(order: list[str]) -> None:
    plain = Solved(linkage(STEPHENSON_POINTS, STEPHENSON, turn={"lever": 3.0}))
    other = Solved(linkage(STEPHENSON_POINTS, STEPHENSON, turn={"lever": 3.0}, order=order))
    for link in order:
        assert other.turn(link) == pytest.approx(plain.turn(link), rel=1e-11)
    for pin in STEPHENSON_POINTS:
        assert other.velocity(pin) == pytest.approx(plain.velocity(pin), rel=1e-11)


@given(st.permutations(["la", "lb", "crank", "r1", "r2", "r3", "r4"]))
def test_pins_of_three_links_in_any_order(order: list[str]) -> None:
    case = Solved(linkage(STRAIGHT_LINE_POINTS, STRAIGHT_LINE, turn={"crank": 1.0}, order=order))
    assert case.analysis.solved
    assert case.analysis.disagreement is not None
    assert case.analysis.disagreement < TOLERANCE


def test_far_from_the_origin_by_a_million_sizes() -> None:
    near = Solved(linkage(FOUR_BAR_POINTS, FOUR_BAR, turn={"crank": 3.0}))
    points = {name: at + 1e8 * (1 + 1j) for name, at in FOUR_BAR_POINTS.items()}
    far = Solved(linkage(points, FOUR_BAR, turn={"crank": 3.0}))
    assert far.turn("rocker") == pytest.approx(near.turn("rocker"), rel=1e-9)
    assert far.pole("coupler") - 1e8 * (1 + 1j) == pytest.approx(near.pole("coupler"), rel=1e-6)


def test_no_figure_is_a_negative_zero() -> None:
    analysis = analyse(
        linkage({"A": 0j, "B": 10 + 0j}, {"A": "ground crank"}, tracing={"B": "crank"}, turn={"crank": -1.0})
    )
    figures = [
        part for pin in analysis.pins if pin.velocity is not None for part in (pin.velocity.real, pin.velocity.imag)
    ]
    figures += [joint.relative_angular_velocity or 0.0 for joint in analysis.joints]
    assert not any(figure == 0.0 and math.copysign(1.0, figure) < 0.0 for figure in figures)


def test_hundreds_of_links() -> None:
    """A chain of 60 four-bars, each driven by the rocker of the one before."""
    points: dict[str, complex] = {}
    pins: dict[str, str] = {}
    for bar in range(60):
        x = 100.0 * bar
        points |= {f"D{bar}": x + 0j, f"B{bar}": x + 5 + 30j, f"C{bar}": x + 97 + 40j}
        before, now = (f"rocker{bar - 1}" if bar else "crank"), f"rocker{bar}"
        pins |= {f"D{bar}": f"ground {before}", f"B{bar}": f"{before} coupler{bar}", f"C{bar}": f"coupler{bar} {now}"}
    points["D60"], pins["D60"] = 6000 + 0j, "ground rocker59"
    case = Solved(linkage(points, pins, turn={"crank": 1.0}))
    assert case.analysis.solved
    assert case.analysis.disagreement is not None
    assert case.analysis.disagreement < TOLERANCE
    rates = np.cumprod([four_bar_ratio(points, bar) for bar in range(60)])
    assert case.turn("rocker59") == pytest.approx(rates[-1], rel=1e-7)


def four_bar_ratio(points: dict[str, complex], bar: int) -> float:
    """Rate of a rocker over its crank's: the coupler gives both ends one speed along itself."""
    b, c = points[f"B{bar}"], points[f"C{bar}"]
    along = (c - b).conjugate()
    crank, rocker = 1j * (b - points[f"D{bar}"]), 1j * (c - points[f"D{bar + 1}"])
    return (crank * along).real / (rocker * along).real
