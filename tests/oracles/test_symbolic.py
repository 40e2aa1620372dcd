"""The four-bar's rates against its loop equations written in symbols and differentiated by sympy."""

from __future__ import annotations

import cmath
import math

import pytest
import sympy

from tests.closed_forms import circles_meet
from tests.model import Solved, linkage

FOUR_BAR = {"A": "ground crank", "B": "crank coupler", "C": "coupler rocker", "D": "ground rocker"}
CRANK, COUPLER, ROCKER, BASE = 40.0, 150.0, 80.0, 150.0


def symbolic_rates() -> tuple[sympy.Lambda, sympy.Lambda]:
    """Rates of coupler and rocker for a unit rate of the crank, as functions of the three angles."""
    time = sympy.Symbol("time")
    angles = [sympy.Function(name)(time) for name in ("t2", "t3", "t4")]
    plain = sympy.symbols("a2 a3 a4")
    rates = sympy.symbols("w2 w3 w4")
    loop = [
        CRANK * wave(angles[0])
        + COUPLER * wave(angles[1])
        - ROCKER * wave(angles[2])
        - (BASE if wave is sympy.cos else 0)
        for wave in (sympy.cos, sympy.sin)
    ]
    equations = [equation.diff(time) for equation in loop]
    for angle, symbol, rate in zip(angles, plain, rates, strict=True):
        equations = [equation.subs(angle.diff(time), rate).subs(angle, symbol) for equation in equations]
    found = sympy.solve([equation.subs(rates[0], 1) for equation in equations], rates[1:], dict=True)[0]
    return sympy.Lambda(plain, found[rates[1]]), sympy.Lambda(plain, found[rates[2]])


@pytest.fixture(scope="module")
def rates() -> tuple[sympy.Lambda, sympy.Lambda]:
    return symbolic_rates()


@pytest.mark.parametrize("degrees", [10.0, 60.0, 100.0, 200.0, 275.0, 340.0])
def test_rates_of_a_four_bar(rates: tuple[sympy.Lambda, sympy.Lambda], degrees: float) -> None:
    b = CRANK * cmath.exp(1j * math.radians(degrees))
    c = circles_meet(b, COUPLER, complex(BASE), ROCKER, left=True)
    case = Solved(linkage({"A": 0j, "B": b, "C": c, "D": complex(BASE)}, FOUR_BAR, turn={"crank": 1.0}))
    angles = (cmath.phase(b), cmath.phase(c - b), cmath.phase(c - BASE))
    assert case.turn("coupler") == pytest.approx(float(rates[0](*angles)), rel=1e-9)
    assert case.turn("rocker") == pytest.approx(float(rates[1](*angles)), rel=1e-9)
