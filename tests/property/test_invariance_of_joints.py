"""Linkages that slide and roll are read alike however they are drawn, and their figures move with the sheet.

The demonstration plans, in random habits. A turning drive is stated counter-clockwise or clockwise, so on a mirrored
sheet links turn as before and velocities are mirrored and reversed; an extension stays one, so links turn the other
way. Speeds along a slide or slot count along its direction, which points to +x, or straight up.
"""

from __future__ import annotations

import dataclasses
import math
from collections import Counter
from collections.abc import Mapping
from typing import NamedTuple, TypeVar

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from dxfcheck.inspection import MechanismReport
from dxfcheck.linkage import Joint
from fixtures.drafting import Habit, Motion, Plan, mechanisms_gears, mechanisms_slides
from tests.property.comparison import PHASES, inspect
from tests.property.strategies import motions
from tests.property.test_random_linkages import random_habit

PLANS: dict[str, Plan] = {
    "dibber in line": mechanisms_slides.DIBBER_IN_LINE,
    "dibber, offset": mechanisms_slides.DIBBER_OFFSET,
    "laser-cut bars": mechanisms_gears.LASER_CUT_BARS,
    "lift table": mechanisms_slides.LIFT_TABLE,
    "mixer": mechanisms_gears.MIXER,
    "picker": mechanisms_gears.PICKER,
    "seed meter": mechanisms_slides.SEED_METER,
    "seed shuttle": mechanisms_slides.SEED_SHUTTLE,
    "soil press": mechanisms_slides.SOIL_PRESS,
    "tray gate": mechanisms_slides.TRAY_GATE,
    "tray indexer": mechanisms_slides.TRAY_INDEXER,
    "tray rack": mechanisms_gears.TRAY_RACK,
}
EXTENDED = "lift table"
"""Driven by its telescope; all others by a crank."""
RELATIVE = 1e-9
MILLIMETRES_OF_INCH = 25.4
Key = TypeVar("Key")

RADIUS = 4.0
"""Of the pins: letters are as large, and the lift table's drive note stands at its telescope."""
PLAIN = Habit(radius=RADIUS, barrels="clevis")

names = st.sampled_from(sorted(PLANS))
seeds = st.integers(0, 10**6)
modest = settings(max_examples=24, phases=PHASES, suppress_health_check=[HealthCheck.too_slow], deadline=None)


class Told(NamedTuple):
    """A report's figures by names: turning, poles and velocities, and for other joints than pins their slide speeds.

    Links without a pin have no name that lasts: they are called 'pinless'.
    """

    counts: tuple[int, int, int, int, int]
    joints: Counter[tuple[str, str, str]]
    turning: dict[str, float | None]
    poles: dict[str, complex | None]
    velocities: dict[str, complex | None]
    slides: dict[tuple[str, str, str], tuple[complex, complex, float | None]]


def habit_of(seed: int) -> Habit:
    """A random habit on a sheet that is neither moved nor shuffled."""
    habit = random_habit(seed)
    return dataclasses.replace(habit, motion=Motion(), unit="mm", order=None, reversal=None, radius=RADIUS)


def told(name: str, habit: Habit) -> Told:
    """What is reported of a plan drawn in a habit."""
    report = inspect(PLANS[name], habit)
    assert report.status == "checked"
    assert len(report.mechanisms) == 1, [finding.message for finding in report.findings]
    assert [drive.source for drive in report.mechanisms[0].linkage.drives] == ["note"]
    return figures(report.mechanisms[0])


def figures(mechanism: MechanismReport) -> Told:
    """A mechanism's figures by name."""
    linkage, analysis = mechanism.linkage, mechanism.analysis
    links = [link.name if link.pins or link.kind == "frame" else "pinless" for link in linkage.links]

    def key(joint: Joint) -> tuple[str, str, str]:
        return joint.kind, links[joint.first], links[joint.second]

    mobility = analysis.mobility
    return Told(
        counts=(mobility.count, mobility.links, mobility.full_joints, mobility.half_joints, mobility.at_pose),
        joints=Counter(key(joint) for joint in linkage.joints),
        turning={link: motion.angular_velocity for link, motion in zip(links, analysis.links, strict=True)},
        poles={link: motion.pole for link, motion in zip(links, analysis.links, strict=True)},
        velocities={pin.name: each.velocity for pin, each in zip(linkage.pins, analysis.pins, strict=True)},
        slides={
            key(joint): (joint.at, joint.direction or 0j, motion.slide_speed)
            for joint, motion in zip(linkage.joints, analysis.joints, strict=True)
            if joint.kind != "pin"
        },
    )


def assert_moved(
    plain: Told, moved: Told, motion: Motion, *, extended: bool, unit: float = 1.0, places: bool = True
) -> None:
    """Assert that the second report is that of the first sheet under a motion.

    ``unit`` is how many of the first sheet's units, in which an extension is stated, are one of the second's.
    ``places`` says that blocks and barrels are drawn as large on both, so that their middles agree.
    """
    assert moved.counts == plain.counts
    assert moved.joints == plain.joints
    turned = -1.0 if motion.mirrored else 1.0
    # A stated speed is the sheet's own: on a sheet twice as large the links turn half as fast.
    pace = 1.0 / (motion.scale * unit) if extended else turned
    step = motion(1 + 0j) - motion(0j)
    size = max(abs(at) for at, _, _ in plain.slides.values()) * abs(step) if plain.slides else abs(step) * 1e3

    def along(vector: complex) -> complex:
        return step * (vector.conjugate() if motion.mirrored else vector)

    assert_close(moved.turning, {link: turn and pace * turned * turn for link, turn in plain.turning.items()})
    velocities = {pin: None if each is None else pace * along(each) for pin, each in plain.velocities.items()}
    assert_close(moved.velocities, velocities)
    assert {link: pole is None for link, pole in moved.poles.items()} == {
        link: pole is None for link, pole in plain.poles.items()
    }
    assert moved.slides.keys() == plain.slides.keys()
    speeds: dict[tuple[str, str, str], float | None] = {}
    for joint, (at, direction, speed) in plain.slides.items():
        place, way, _ = moved.slides[joint]
        expected = along(direction) / abs(step)
        assert not places or abs(place - motion(at)) <= RELATIVE * (abs(motion(at)) + size)
        assert min(abs(way - expected), abs(way + expected)) <= RELATIVE
        assert (way.real, way.imag) > (RELATIVE, -2.0) or (abs(way.real) <= RELATIVE and way.imag > 0.0)
        sense = math.copysign(1.0, (way * expected.conjugate()).real)
        speeds[joint] = None if speed is None else pace * abs(step) * sense * speed
    fastest = max((abs(each) for each in velocities.values() if each is not None), default=0.0)
    assert_close({joint: each[2] for joint, each in moved.slides.items()}, speeds, fastest)


def assert_close(
    found: Mapping[Key, complex | None], expected: Mapping[Key, complex | None], greatest: float = 0.0
) -> None:
    """Assert that figures agree within RELATIVE of the greatest and are unknown in the same places."""
    assert found.keys() == expected.keys()
    greatest = max([greatest, *(abs(value) for value in expected.values() if value is not None)])
    for name, value in expected.items():
        other = found[name]
        assert (other is None) == (value is None), (name, other, value)
        if other is not None and value is not None:
            assert abs(other - value) <= RELATIVE * greatest, (name, other, value)


@pytest.mark.parametrize("name", sorted(PLANS))
def test_each_plan_is_solved_in_a_plain_habit(name: str) -> None:
    found = told(name, PLAIN)
    assert found.counts[0] == PLANS[name].mobility() == 1
    assert None not in found.turning.values()
    assert None not in found.velocities.values()


@modest
@given(names, seeds, seeds, seeds)
def test_entity_order_and_line_direction_change_nothing(name: str, drafter: int, order: int, reversal: int) -> None:
    habit = habit_of(drafter)
    other = dataclasses.replace(habit, order=order, reversal=reversal)
    assert_moved(told(name, habit), told(name, other), Motion(), extended=name == EXTENDED)


@modest
@given(names, seeds, seeds)
def test_another_drafters_habits_change_nothing(name: str, drafter: int, another: int) -> None:
    """Guides, blocks, slots, barrels, frames, pins, layers, releases."""
    one, other = told(name, habit_of(drafter)), told(name, habit_of(another))
    assert_moved(one, other, Motion(), extended=name == EXTENDED, places=False)


@modest
@given(names, seeds, motions())
def test_a_moved_turned_scaled_or_mirrored_sheet_moves_the_figures(name: str, drafter: int, motion: Motion) -> None:
    habit = habit_of(drafter)
    moved = dataclasses.replace(habit, motion=motion)
    assert_moved(told(name, habit), told(name, moved), motion, extended=name == EXTENDED)


@pytest.mark.parametrize("name", sorted(PLANS))
def test_a_mirrored_sheet_turns_signs_only(name: str) -> None:
    mirrored = Motion(mirrored=True)
    plain, moved = told(name, PLAIN), told(name, dataclasses.replace(PLAIN, motion=mirrored))
    assert_moved(plain, moved, mirrored, extended=name == EXTENDED)


@pytest.mark.parametrize("name", sorted(PLANS))
def test_a_layer_of_links_means_nothing(name: str) -> None:
    for layer in ("0", "M-PARTS-07"):
        other = told(name, dataclasses.replace(PLAIN, link_layer=layer))
        assert_moved(told(name, PLAIN), other, Motion(), extended=name == EXTENDED)


@pytest.mark.parametrize("name", sorted(PLANS))
def test_a_unit_scales_a_stated_speed_and_nothing_else(name: str) -> None:
    inches = told(name, dataclasses.replace(PLAIN, unit="in"))
    assert_moved(told(name, PLAIN), inches, Motion(), extended=name == EXTENDED, unit=MILLIMETRES_OF_INCH)


def test_a_pin_in_a_barrel_or_behind_it_is_extended_alike() -> None:
    inside = dataclasses.replace(PLAIN, barrels="pin inside")
    assert_moved(told(EXTENDED, PLAIN), told(EXTENDED, inside), Motion(), extended=True, places=False)
