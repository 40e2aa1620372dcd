from __future__ import annotations

import dataclasses

from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from fixtures.drafting import Habit, Motion, Plan
from tests.property.comparison import PHASES, Reported, assert_same, reported
from tests.property.strategies import four_bars, habits, motions, plans

modest = settings(max_examples=40, phases=PHASES, suppress_health_check=[HealthCheck.too_slow])
unmoved = st.just(Motion())


def _assert_alike(first: Reported, second: Reported) -> None:
    assert first.counts == second.counts
    assert first.link_names == second.link_names
    assert_same({**first.turning}, {**second.turning})


@modest
@given(plans(), habits(motion=unmoved), st.integers(0, 1000), st.integers(0, 1000))
def test_entity_order_and_line_direction_change_nothing(plan: Plan, habit: Habit, order: int, reversal: int) -> None:
    other = dataclasses.replace(habit, order=order, reversal=reversal)
    _assert_alike(reported(plan, habit), reported(plan, other))


@modest
@given(plans(), habits(motion=unmoved), habits(motion=unmoved))
def test_another_drafters_habits_change_nothing(plan: Plan, habit: Habit, other: Habit) -> None:
    first, second = reported(plan, habit), reported(plan, other)
    _assert_alike(first, second)
    assert_same(first.velocity, second.velocity)


@modest
@given(plans(), habits(motion=unmoved), motions())
def test_a_moved_sheet_turns_and_scales_the_velocities(plan: Plan, habit: Habit, motion: Motion) -> None:
    rigid = dataclasses.replace(motion, mirrored=False)
    plain, moved = reported(plan, habit), reported(plan, dataclasses.replace(habit, motion=rigid))
    _assert_alike(plain, moved)
    turned = {pin: None if v is None else rigid(v) - rigid.shift for pin, v in plain.velocity.items()}
    assert_same(moved.velocity, turned)


@modest
@given(plans(), habits(motion=unmoved))
def test_a_mirrored_sheet_flips_signs_only(plan: Plan, habit: Habit) -> None:
    """The note still says counter-clockwise: the links turn as before, the velocities are mirrored and reversed."""
    plain = reported(plan, habit)
    mirrored = reported(plan, dataclasses.replace(habit, motion=Motion(mirrored=True)))
    _assert_alike(plain, mirrored)
    flipped = {pin: None if v is None else -v.conjugate() for pin, v in plain.velocity.items()}
    assert_same(mirrored.velocity, flipped)


@modest
@given(four_bars(), habits())
def test_a_unit_says_what_the_figures_mean_and_changes_none(plan: Plan, habit: Habit) -> None:
    millimetres, inches = dataclasses.replace(habit, unit="mm"), dataclasses.replace(habit, unit="in")
    first, second = reported(plan, millimetres), reported(plan, inches)
    _assert_alike(first, second)
    assert_same(first.velocity, second.velocity)
