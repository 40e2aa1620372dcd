from __future__ import annotations

import cmath
import math

import pytest

from dxfcheck.comparison.landmarks import Landmark
from dxfcheck.comparison.motion import UNMOVED, SheetMotion
from dxfcheck.comparison.sheet_motion import find_motion

REACH = 1e-3
FOUR_BAR = {"A": 0j, "B": 30 + 52j, "C": 197 + 120j, "D": 200 + 0j}


def marks(places: dict[str, complex], *, fixed: str = "AD", driven: str = "AB", named: bool = True) -> list[Landmark]:
    return [
        Landmark(
            at=at,
            mechanism=0,
            pin=number,
            fixed=name in fixed,
            make=("pin", int(name in fixed), 2),
            arms=(),
            driven=name in driven,
            name=name if named else "",
        )
        for number, (name, at) in enumerate(places.items())
    ]


def laid(places: dict[str, complex], motion: SheetMotion) -> dict[str, complex]:
    return {name: motion(at) for name, at in places.items()}


@pytest.mark.parametrize("named", [True, False])
@pytest.mark.parametrize("mirrored", [True, False])
def test_a_sheet_that_was_turned_and_moved_is_laid_back(*, mirrored: bool, named: bool) -> None:
    motion = SheetMotion(cmath.rect(1.0, 2.0), 500 - 30j, mirrored)
    found = find_motion(marks(FOUR_BAR, named=named), marks(laid(FOUR_BAR, motion), named=named), REACH).motion
    assert found.mirrored is mirrored
    assert found.turn == pytest.approx(motion.turn)
    assert found.shift == pytest.approx(motion.shift)


def test_one_pin_that_moved_does_not_turn_the_sheet() -> None:
    new = marks({**FOUR_BAR, "B": 31 + 52j})
    found = find_motion(marks(FOUR_BAR), new, REACH)
    assert found.motion == UNMOVED
    assert found.pairs == ((0, 0), (2, 2), (3, 3))


def test_the_unmoved_sheet_wins_over_a_half_turn_that_explains_as_much() -> None:
    square = {"A": 0j, "B": 10j, "C": 10 + 10j, "D": 10 + 0j}
    swapped = dict(zip("CDAB", square.values(), strict=True))
    old, new = marks(square, fixed="", driven=""), marks(swapped, fixed="", driven="")
    assert find_motion(old, new, REACH).motion == UNMOVED


def test_of_ways_to_lay_a_symmetric_linkage_the_drive_decides_then_the_labels() -> None:
    bow = {"A": 0j, "B": 10 + 30j, "C": 50 + 30j, "D": 60 + 0j}
    motion = SheetMotion(cmath.rect(1.0, 0.4), 7 + 7j)
    for driven in ("AB", ""):
        found = find_motion(marks(bow, driven=driven), marks(laid(bow, motion), driven=driven), REACH)
        assert found.motion.turn == pytest.approx(motion.turn)
        assert found.pairs == tuple((number, number) for number in range(4))


def test_the_shift_and_turn_of_rounding_noise_are_none() -> None:
    off = {name: at * cmath.rect(1.0, math.pi / 3) + 1e-12 for name, at in FOUR_BAR.items()}
    assert find_motion(marks(FOUR_BAR), marks(off), REACH).motion.shift == 0


def test_nothing_on_a_sheet_leaves_it_where_it_is() -> None:
    assert find_motion([], marks(FOUR_BAR), REACH).motion == UNMOVED
    assert find_motion(marks(FOUR_BAR), [], REACH).pairs == ()


def test_a_large_sheet_that_was_turned_with_some_of_its_places_gone() -> None:
    places = {f"P{number}": complex(number * 37 % 1009, number * 91 % 787) for number in range(400)}
    motion = SheetMotion(cmath.rect(1.0, -1.2), 50 + 0j)
    rest = dict(list(laid(places, motion).items())[40:])
    found = find_motion(marks(places, named=False), marks(rest, named=False), REACH)
    assert found.motion.turn == pytest.approx(motion.turn)
    assert len(found.pairs) == len(rest)
