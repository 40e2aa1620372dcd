"""The figures of the hand working: the sine rule holds, all closes, and nothing is divided by zero."""

from __future__ import annotations

import cmath
import math
from pathlib import Path

import pytest

from dxfcheck.analysis import analyse
from dxfcheck.analysis.by_hand.working import StepWorking, Working, work_out
from dxfcheck.inspection import inspect_drawing
from dxfcheck.linkage import Drive, Linkage
from dxfcheck.settings import Settings
from fixtures.drafting import Habit, write_plan
from tests.analysis.lattices import scissor_lattice
from tests.closed_forms import four_bar_rates, slotted_lever
from tests.examples import FOUR_BAR, FOUR_BAR_POINTS, STEPHENSON, STEPHENSON_POINTS
from tests.model import Other, linkage
from tests.property.random_linkages import random_linkage
from tests.property.test_random_linkages import is_good

EXACT = 1e-9
FIXTURES = Path(__file__).parents[3] / "fixtures"
SOLVED = (
    "dibber-in-line",
    "laser-cut-bars",
    "leaf-fan",
    "lift-table",
    "mixer",
    "picker",
    "pot-placer",
    "seed-meter",
    "seed-shuttle",
    "seedling-gripper",
    "shelf-leveller",
    "soil-press",
    "tipper-dead-centre",
    "tray-gate",
    "tray-indexer",
    "tray-rack",
    "tray-tipper",
)


def worked(model: Linkage) -> Working:
    working = work_out(model, analyse(model))
    assert working is not None
    assert_closed(working)
    return working


def assert_closed(working: Working) -> None:
    """Whatever is written down agrees with the solution: triangles by the sine rule, sums, equations and poles."""
    assert working.closing < EXACT
    solved = working.solved
    for step in working.steps:
        triangle = step.closing.triangle
        if triangle is not None and triangle.angles is not None and triangle.ratios is not None:
            assert max(triangle.ratios) == pytest.approx(min(triangle.ratios), rel=EXACT)
            assert math.fsum(triangle.angles) == pytest.approx(math.pi, rel=EXACT)
            assert abs(sum(triangle.sides)) < EXACT * solved.fastest
        for point in step.points:
            found = solved.analysis.pins[point.pin].velocity
            assert found is not None
            assert abs(point.base_velocity + 1j * point.omega * point.arm - found) <= EXACT * solved.fastest
        for pole in step.poles:
            if pole.crossing is not None and pole.pole is not None:
                assert abs(pole.crossing - pole.pole) < 1e-8 * max(solved.reach, abs(pole.pole))


def forms(working: Working) -> list[str]:
    return [step.closing.form for step in working.steps]


def pole_cases(step: StepWorking) -> list[str]:
    return [pole.case for pole in step.poles]


def test_a_four_bar_is_one_triangle_with_the_rates_of_the_closed_form() -> None:
    working = worked(linkage(FOUR_BAR_POINTS, FOUR_BAR, turn={"crank": 2.0}))
    assert forms(working) == ["given", "triangle"]
    triangle = working.steps[1].closing.triangle
    assert triangle is not None
    a, b, c, d = (FOUR_BAR_POINTS[name] for name in "ABCD")
    coupler, rocker = four_bar_rates(a, b, c, d, 2.0)
    sizes = sorted(abs(side) for side in triangle.sides)
    assert sizes == pytest.approx(sorted([2.0 * abs(b - a), abs(coupler * (c - b)), abs(rocker * (c - d))]), rel=EXACT)
    assert [unknown.value for unknown in working.steps[1].closing.unknowns] == pytest.approx([coupler, rocker])
    (pole,) = working.steps[1].poles
    assert [line.kind for line in pole.lines] == ["kennedy", "kennedy"]


def test_a_dyad_between_two_moving_links_has_the_difference_as_its_known_side() -> None:
    points = {"A": 0j, "B": 20 + 70j, "C": 90 + 130j, "D": 190 + 70j, "E": 150 + 0j}
    pins = {"A": "ground a", "B": "a b", "C": "b c", "D": "c d", "E": "ground d"}
    working = worked(linkage(points, pins, turn={"a": 2.0, "d": -1.0}))
    triangle = working.steps[2].closing.triangle
    assert triangle is not None
    assert abs(triangle.sides[0]) == pytest.approx(abs(2j * points["B"] + 1j * (points["D"] - points["E"])), rel=EXACT)
    assert [line.kind for line in working.steps[2].poles[0].lines] == ["kennedy", "velocity"]


def test_a_slotted_lever_is_one_triangle_with_the_slide_as_a_side() -> None:
    points = {"A": 0j, "B": 30 + 40j, "D": 10 - 90j}
    slot: list[Other] = [("pin in slot", points["B"], "crank", "lever", points["B"] - points["D"])]
    pins = {"A": "ground crank", "D": "ground lever"}
    working = worked(linkage(points, pins, others=slot, tracing={"B": "crank"}, turn={"crank": 3.0}))
    assert forms(working) == ["given", "triangle"]
    rate, slide = slotted_lever(points["D"], points["B"], 3j * points["B"])
    values = {unknown.kind: unknown.value for unknown in working.steps[1].closing.unknowns}
    assert values["turn"] == pytest.approx(rate, rel=EXACT)
    assert abs(values["slide"]) == pytest.approx(abs(slide), rel=EXACT)


def test_gears_and_racks_are_one_equation_each() -> None:
    points = {"A": 0j, "C": 100 + 0j}
    others: list[Other] = [
        ("rolling", 40 + 0j, "wheel", "other", 1j),
        ("slide", 100 - 80j, "ground", "rack", 1 + 0j),
        ("rolling", 100 - 60j, "other", "rack", 1 + 0j),
    ]
    working = worked(linkage(points, {"A": "ground wheel", "C": "ground other"}, others=others, turn={"wheel": 3.0}))
    assert forms(working) == ["given", "equations", "equations"]
    assert [working.steps[number].closing.unknowns[0].value for number in (1, 2)] == pytest.approx([-2.0, -120.0])
    assert [len(step.closing.equations) for step in working.steps[1:]] == [1, 1]


def test_a_group_is_written_as_equations_that_the_solution_fulfils() -> None:
    working = worked(linkage(STEPHENSON_POINTS, STEPHENSON, turn={"lever": 1.5}))
    closing = working.steps[1].closing
    assert closing.form == "equations"
    assert [unknown.kind for unknown in closing.unknowns] == ["turn"] * 4
    assert len(closing.equations) == 4
    for equation in closing.equations:
        left = sum(cell * each.value for cell, each in zip(equation.cells, closing.unknowns, strict=True))
        assert left == pytest.approx(equation.right, abs=EXACT * working.solved.fastest)
    assert any(equation.right for equation in closing.equations)
    assert [line.kind for line in working.steps[1].poles[0].lines] == ["kennedy", "kennedy"]


def test_a_relative_drive_within_a_group_is_an_equation_of_it() -> None:
    drive = Drive(link=2, against=1, rate=3.0)
    closing = worked(linkage(FOUR_BAR_POINTS, FOUR_BAR, drives=[drive])).steps[0].closing
    assert [equation.joint for equation in closing.equations][-1] is None
    assert (closing.equations[-1].drive, closing.equations[-1].right) == (0, 3.0)
    assert sorted(closing.equations[-1].cells) == [-1.0, 0.0, 1.0]


def test_a_driven_coupler_is_the_known_side_of_a_triangle() -> None:
    working = worked(linkage(FOUR_BAR_POINTS, FOUR_BAR, turn={"coupler": 2.0}))
    triangle = working.steps[0].closing.triangle
    assert triangle is not None
    assert abs(triangle.sides[0]) == pytest.approx(2.0 * abs(FOUR_BAR_POINTS["C"] - FOUR_BAR_POINTS["B"]), rel=EXACT)


def test_a_dead_centre_has_no_triangle_and_the_pole_at_the_resting_pin() -> None:
    """Crank and coupler in line: the rocker stands still."""
    way = cmath.exp(0.5j)
    c = 240.0 * way
    points = {"A": 0j, "B": 60.0 * way, "C": c, "D": c - 120.0 * cmath.exp(1.5j)}
    step = worked(linkage(points, FOUR_BAR, turn={"crank": 10.0})).steps[1]
    assert step.closing.triangle is not None
    assert step.closing.triangle.angles is None
    assert pole_cases(step) == ["resting pin"]


def test_a_parallelogram_s_coupler_translates_and_has_no_pole() -> None:
    points = {"A": 0j, "B": 30 + 60j, "C": 150 + 60j, "D": 120 + 0j}
    step = worked(linkage(points, FOUR_BAR, turn={"crank": 2.0})).steps[1]
    assert step.closing.triangle is not None
    assert step.closing.triangle.ratios is None
    assert pole_cases(step) == ["translates"]


def test_a_redundant_crank_is_found_along_one_line() -> None:
    points = {"A": 0j, "B": 30 + 60j, "C": 150 + 60j, "D": 120 + 0j, "E": 250 + 60j, "F": 220 + 0j}
    pins = FOUR_BAR | {"E": "coupler third", "F": "ground third"}
    assert forms(worked(linkage(points, pins, turn={"crank": 2.0}))) == ["given", "triangle", "line"]


def test_a_linkage_at_rest_is_worked_without_division() -> None:
    working = worked(linkage(FOUR_BAR_POINTS, FOUR_BAR, turn={"crank": 0.0}))
    assert working.closing == 0.0
    assert pole_cases(working.steps[1]) == ["at rest"]


def test_many_unknowns_that_hang_together_are_counted_but_not_written_out() -> None:
    working = worked(scissor_lattice(40, driven=39))
    (step,) = working.steps
    assert not step.closing.written_out
    assert (step.closing.equations, step.points, step.poles) == ((), (), ())
    assert step.gap > 0.0


def test_there_is_no_working_where_speeds_are_not_settled() -> None:
    loose = linkage({"A": 0j, "B": 50 + 0j}, {"A": "ground a", "B": "a b"}, turn={"a": 1.0})
    assert work_out(loose, analyse(loose)) is None
    floating = linkage({"A": 0j, "B": 50 + 0j}, {"A": "ground a", "B": "a b"})
    assert work_out(floating, analyse(floating)) is None


@pytest.mark.parametrize("fixture", SOLVED)
def test_every_fixture_closes(fixture: str) -> None:
    report = inspect_drawing(str(FIXTURES / f"{fixture}.dxf"), Settings())
    for mechanism in report.mechanisms:
        working = work_out(mechanism.linkage, mechanism.analysis)
        assert working is not None
        assert_closed(working)


@pytest.mark.parametrize("seed", range(100, 140))
def test_every_random_linkage_closes(seed: int, tmp_path: Path) -> None:
    drawn = random_linkage(seed, is_good)
    path = tmp_path / "random.dxf"
    write_plan(path, drawn.plan, Habit(radius=2.0))
    mechanism = inspect_drawing(str(path), Settings(drives=drawn.drives)).mechanisms[0]
    working = work_out(mechanism.linkage, mechanism.analysis)
    assert working is not None
    assert_closed(working)
    told = {pin for pin in range(len(mechanism.linkage.pins)) if mechanism.linkage.pins[pin].fixed}
    assert len([point for step in working.steps for point in step.points]) <= len(mechanism.linkage.pins) - len(told)
