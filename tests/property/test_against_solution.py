from __future__ import annotations

from hypothesis import HealthCheck, given, settings

from fixtures.drafting import Habit, Plan
from tests.property.comparison import PHASES, assert_same, on_the_sheet, reported
from tests.property.solution import solve
from tests.property.strategies import habits, plans, stated_drives

modest = settings(max_examples=120, phases=PHASES, suppress_health_check=[HealthCheck.too_slow])


def _expected_counts(plan: Plan, freedom: int) -> tuple[int, int, int, int, int]:
    joints = sum(plan.links_at(pin) - 1 for pin in plan.points)
    return plan.mobility(), len(plan.parts) + 1, joints, 0, freedom


@modest
@given(plans(), habits())
def test_labelled_drawing_gives_the_plans_own_counts_names_and_speeds(plan: Plan, habit: Habit) -> None:
    found, expected = reported(plan, habit), solve(on_the_sheet(plan, habit), stated_drives(plan))
    assert found.counts == _expected_counts(plan, expected.freedom)
    assert found.labels == {pin: pin for pin in plan.points}
    assert found.link_names == {part.name: part.name for part in plan.parts}
    if plan.notes:
        assert_same({**found.turning}, {**expected.turning})
        assert_same(found.velocity, expected.velocity)


@modest
@given(plans(driven=False), habits(labelled=False))
def test_unlabelled_drawing_has_the_shortest_crank_turn_at_one(plan: Plan, habit: Habit) -> None:
    spans = {
        part.name: abs(plan.points[fixed] - plan.points[other])
        for part in plan.parts
        for fixed in part.pins
        if fixed in plan.frame
        for other in sorted(part.pins, key=lambda pin: -abs(plan.points[fixed] - plan.points[pin]))
        if other != fixed
    }
    shortest = min(spans, key=lambda link: spans[link])
    sheet = on_the_sheet(plan, habit)
    expected = solve(sheet, {shortest: 1.0})
    found = reported(plan, habit)
    assert found.counts == _expected_counts(plan, expected.freedom)
    if expected.freedom and expected.condition < 1e4:
        assert_same({**found.turning}, {**expected.turning})
        assert_same(found.velocity, expected.velocity)
