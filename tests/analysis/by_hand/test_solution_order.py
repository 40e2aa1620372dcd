"""Who is solved when: driven links first, dyads next, and only what hangs together is solved together."""

from __future__ import annotations

import random
from pathlib import Path

import pytest

from dxfcheck.analysis import analyse
from dxfcheck.analysis.by_hand.block_order import blocks_in_order
from dxfcheck.analysis.by_hand.solution_order import SolutionStep, solution_order
from dxfcheck.analysis.results import Analysis
from dxfcheck.inspection import inspect_drawing
from dxfcheck.linkage import Drive, Linkage
from dxfcheck.settings import Settings
from fixtures.drafting import Habit, write_plan
from tests.analysis.lattices import four_bar_chain, scissor_lattice
from tests.examples import FOUR_BAR, FOUR_BAR_POINTS, STEPHENSON, STEPHENSON_POINTS, WATT, WATT_POINTS
from tests.model import linkage
from tests.property.random_linkages import random_linkage
from tests.property.test_random_linkages import is_good

FIXTURES = Path(__file__).parents[3] / "fixtures"

Named = list[tuple[str, tuple[str, ...]]]


def steps_of(model: Linkage, analysis: Analysis | None = None) -> tuple[SolutionStep, ...]:
    verdicts = (analysis or analyse(model)).drives
    return solution_order(model, [number for number, each in enumerate(verdicts) if each.outcome == "taken"])


def named(model: Linkage) -> Named:
    return [(step.kind, tuple(model.links[link].name for link in step.links)) for step in steps_of(model)]


def test_a_four_bar_is_its_crank_and_a_dyad() -> None:
    model = linkage(FOUR_BAR_POINTS, FOUR_BAR, turn={"crank": 1.0})
    assert named(model) == [("single", ("crank",)), ("dyad", ("coupler", "rocker"))]
    first, second = steps_of(model)
    assert first.drives == (0,)
    assert {model.joints[number].pin for number in second.joints} == {1, 2, 3}
    assert second.drives == ()


def test_dyads_follow_one_another_outward_from_the_drive() -> None:
    model = linkage(WATT_POINTS, WATT, turn={"l2": 1.0})
    assert named(model) == [("single", ("l2",)), ("dyad", ("l3", "l4")), ("dyad", ("l5", "l6"))]
    model = linkage(WATT_POINTS, WATT, turn={"l6": 1.0})
    assert named(model) == [("single", ("l6",)), ("dyad", ("l4", "l5")), ("dyad", ("l2", "l3"))]


def test_what_is_no_dyad_chain_is_solved_together() -> None:
    model = linkage(STEPHENSON_POINTS, STEPHENSON, turn={"lever": 1.0})
    assert named(model) == [("single", ("lever",)), ("group", ("crank", "coupler", "rocker", "rod"))]


def test_a_driven_coupler_makes_the_whole_four_bar_one_group() -> None:
    model = linkage(FOUR_BAR_POINTS, FOUR_BAR, turn={"coupler": 1.0})
    assert named(model) == [("group", ("crank", "coupler", "rocker"))]


def test_a_dyad_hung_on_a_group_comes_after_it() -> None:
    points = STEPHENSON_POINTS | {"H": 260 + 20j, "I": 240 - 60j}
    middle = (STEPHENSON_POINTS["B"] + STEPHENSON_POINTS["C"]) / 2 - 15j
    pins = STEPHENSON | {"K": "coupler arm", "H": "arm foot", "I": "ground foot"}
    model = linkage(points | {"K": middle}, pins, turn={"lever": 1.0})
    assert named(model)[-1] == ("dyad", ("arm", "foot"))


def test_two_groups_are_solved_one_after_the_other() -> None:
    """Two open chains driven at their far links against the frame: neither needs the other."""
    points = {"A": 0j, "B": 50 + 40j, "C": 150 + 30j, "D": 160 + 0j}
    far = {f"{name}2": at + 400 for name, at in points.items()}
    pins = {"A": "ground a", "B": "a b", "C": "b c", "D": "ground c"}
    more = {"A2": "ground a2", "B2": "a2 b2", "C2": "b2 c2", "D2": "ground c2"}
    model = linkage(points | far, pins | more, turn={"b2": 1.0, "b": 2.0})
    assert named(model) == [("group", ("a", "b", "c")), ("group", ("a2", "b2", "c2"))]


@pytest.mark.parametrize(
    ("fixture", "expected"),
    [
        ("mixer", [("single", ("A-P",)), ("single", ("P-Q",)), ("single", ("A",))]),
        ("tray-rack", [("single", ("A-B",)), ("single", ("C",)), ("single", ("block at D",))]),
        ("tray-gate", [("single", ("A-B",)), ("single", ("B-C-T",))]),
        ("tray-indexer", [("single", ("A-B",)), ("single", ("D-E",)), ("dyad", ("E-F", "block at F"))]),
        (
            "seed-shuttle",
            [("single", ("A-B",)), ("dyad", ("block at B", "C-D")), ("dyad", ("C-E", "block at E"))],
        ),
        ("shelf-leveller", [("single", ("A-B",)), ("dyad", ("B-C-E", "C-D")), ("single", ("E-F",))]),
        (
            "lift-table",
            [("group", ("A-D-E-M", "block at B", "B-C-F-M", "E", "F")), ("single", ("C-T",))],
        ),
        ("seedling-gripper", [("single", ("F-G",)), ("group", ("A-B", "B-C-E", "C-D", "E-F"))]),
    ],
)
def test_fixtures_in_the_order_of_a_person(fixture: str, expected: Named) -> None:
    report = inspect_drawing(str(FIXTURES / f"{fixture}.dxf"), Settings())
    assert named(report.mechanisms[0].linkage) == expected


def assert_each_link_once(model: Linkage, steps: tuple[SolutionStep, ...]) -> None:
    solved = [link for step in steps for link in step.links]
    assert sorted(solved) == [link for link in range(len(model.links)) if link != model.frame]
    known = {model.frame}
    for step in steps:
        known |= set(step.links)
        ends = {(model.joints[number].first, model.joints[number].second) for number in step.joints}
        assert all(known.issuperset(pair) and not set(step.links).isdisjoint(pair) for pair in ends)


@pytest.mark.parametrize("seed", range(40))
def test_every_link_of_a_random_linkage_is_solved_once(seed: int, tmp_path: Path) -> None:
    drawn = random_linkage(seed, is_good)
    path = tmp_path / "random.dxf"
    write_plan(path, drawn.plan, Habit(radius=2.0))
    mechanism = inspect_drawing(str(path), Settings(drives=drawn.drives)).mechanisms[0]
    steps = steps_of(mechanism.linkage, mechanism.analysis)
    assert_each_link_once(mechanism.linkage, steps)
    assert steps == steps_of(mechanism.linkage, mechanism.analysis)


@pytest.mark.parametrize("model", [four_bar_chain(60), scissor_lattice(80)], ids=["chain", "lattice"])
def test_long_chains_are_dyads_all_along(model: Linkage) -> None:
    steps = steps_of(model)
    assert_each_link_once(model, steps)
    assert {step.kind for step in steps[1:]} == {"dyad"}


def test_a_lattice_driven_from_its_far_end_is_one_group() -> None:
    model = scissor_lattice(80, driven=79)
    steps = steps_of(model)
    assert_each_link_once(model, steps)
    assert [step.kind for step in steps] == ["group"]


def test_what_no_drive_settles_is_the_last_group() -> None:
    points = {"A": 0j, "B": 50 + 40j, "C": 150 + 30j}
    model = linkage(points, {"A": "ground a", "B": "a b", "C": "b c"}, turn={"a": 1.0})
    assert named(model) == [("single", ("a",)), ("group", ("b", "c"))]


def test_a_relative_drive_settles_its_link_once_the_other_is_known() -> None:
    points = {"A": 0j, "B": 50 + 40j}
    model = linkage(points, {"A": "ground a", "B": "a b"}, drives=[Drive(link=2, against=1, rate=1.0)], turn={"a": 1.0})
    assert named(model) == [("single", ("a",)), ("single", ("b",))]


def test_blocks_come_in_the_order_of_who_needs_whom() -> None:
    """Link 5 settles itself, 7 needs 5, and 2 and 3 need each other and 7."""
    rows = [(5,), (5,), (5,), (7, 5), (7,), (7, 5), (2, 7), (2,), (2, 3), (3, 2), (3,), (3, 7)]
    assert blocks_in_order([2, 3, 5, 7], rows) == [[5], [7], [2, 3]]


@pytest.mark.parametrize("seed", range(5))
def test_blocks_do_not_depend_on_the_order_of_equations(seed: int) -> None:
    """Each link needs the one before it, in a ring of three at the end: equations find their links by passing on."""
    rows = [(1, 2), (1, 2), (1,), (1,), (2,), (1, 2), (3, 4), (4, 5), (5, 3), (3, 2), (3,), (4,), (4,), (5,), (5,)]
    random.Random(seed).shuffle(rows)  # noqa: S311 - a repeatable choice, nothing to guard
    assert blocks_in_order([1, 2, 3, 4, 5], rows) == [[1, 2], [3, 4, 5]]


def test_equations_in_excess_and_links_short_of_them_do_no_harm() -> None:
    assert blocks_in_order([1, 2], [(1,)] * 5) == [[1], [2]]
    assert blocks_in_order([], []) == []
