"""200 random linkages of dyads with slides, telescopes, slots and ternary links, drawn in random habits.

Each is read from its drawing and its report held against scipy's solution of the model it was drawn from: the same
links, joints, counts and names, and every speed to 1e-9 of the greatest.
"""

from __future__ import annotations

import math
import random
from dataclasses import replace
from pathlib import Path

import pytest

from dxfcheck.inspection import MechanismReport, inspect_drawing
from dxfcheck.settings import Settings
from fixtures.drafting import Habit, Motion, write_plan
from tests.property.clearance import is_clear
from tests.property.growing import FIXED
from tests.property.link_solution import LinkSolution, solve_links
from tests.property.linkage_plans import RandomLinkage
from tests.property.random_linkages import random_linkage

RELATIVE = 1e-9
RADIUS = 2.0
WEAKEST = 1e-3
"""Poses whose smallest singular value is below this part of the greatest are nearly singular: not drawn."""


def is_good(linkage: RandomLinkage) -> bool:
    """Whether a pose is far from singular and can be drawn clearly."""
    solution = solve_links(linkage.model)
    return solution.freedom == 1 and solution.weakest > WEAKEST and is_clear(linkage.plan, RADIUS)


def random_habit(seed: int) -> Habit:
    """Any mixture of habits on a sheet that is turned, scaled and shifted."""
    chance = random.Random(f"habit {seed}")  # noqa: S311 - a repeatable choice, nothing to guard
    pick = chance.choice
    return Habit(
        ends=pick(("centre", "rim")),
        frame=pick(("layer mark", "ring layer", "symbol", "symbol", "block")),
        base=pick(("triangle", "through centre", "under rim")),
        strokes=pick(("exact", "short", "uneven", "hatch")),
        symbol_tilt=chance.uniform(-0.7, 0.7),
        pins=pick(("circle", "arcs", "bulges", "block", "ellipse", "rings")),
        blocks=pick(("polyline", "lines")),
        guides=pick(("through", "interrupted", "under", "rails", "strokes")),
        guide_gap=chance.uniform(0.0, 0.6),
        guide_frame=pick(("layer", "strokes")),
        contours=pick(("polyline", "pieces")),
        slot_blocks=pick(("rectangle", "strokes")),
        barrels=pick(("pin inside", "clevis")),
        pistons=pick(("none", "line", "wall to wall")),
        labels=pick(("text", "mtext", "attrib")),
        named_layers=pick((True, False)),
        link_layer=pick(("LINKS", "Hebel", "0", "M-PARTS-07")),
        version=pick(("R12", "R2000", "R2010", "R2018")),
        unit=pick(("mm", "in", None)),
        order=pick((None, seed)),
        reversal=pick((None, seed)),
        radius=RADIUS,
        motion=Motion(
            turn=pick((0.0, chance.uniform(-math.pi, math.pi))),
            scale=pick((1.0, 0.001, 1 / 25.4, 1000.0)),
            shift=complex(chance.uniform(-2000, 2000), chance.uniform(-2000, 2000)),
        ),
    )


@pytest.mark.parametrize("seed", range(200))
def test_a_random_linkage_is_read_and_solved_as_it_was_meant(seed: int, tmp_path: Path) -> None:
    linkage, habit = random_linkage(seed, is_good), random_habit(seed)
    if linkage.drives and habit.unit == "in":
        habit = replace(habit, unit="mm")  # the drive is stated in mm/s
    path = tmp_path / "random.dxf"
    write_plan(path, linkage.plan, habit)
    report = inspect_drawing(str(path), Settings(drives=linkage.drives))
    assert report.status == "checked"
    assert len(report.mechanisms) == 1, [finding.message for finding in report.findings]
    found = report.mechanisms[0]
    assert_counts(found, linkage)
    assert_names(found, linkage)
    assert_contacts(found, linkage, habit)
    model = linkage.model
    if model.driven is not None:  # a stated speed is the sheet's, whatever the sheet's scale
        model = replace(model, rate=model.rate / habit.motion.scale)
    assert_speeds(found, linkage, habit, solve_links(model))


def assert_counts(found: MechanismReport, linkage: RandomLinkage) -> None:
    model, mobility = linkage.model, found.analysis.mobility
    turning = sum(
        max(0, sum(name in pins for pins in model.links) + (name in model.fixed) - 1) for name in model.points
    )
    slides = sum(contact.kind == "slide" for contact in model.contacts)
    slots = len(model.contacts) - slides
    assert (mobility.links, mobility.full_joints, mobility.half_joints) == (
        len(model.links) + 1,
        turning + slides,
        slots,
    )
    assert (mobility.count, mobility.at_pose) == (1, 1)


def assert_names(found: MechanismReport, linkage: RandomLinkage) -> None:
    links = found.linkage.links
    assert sorted(link.name for link in links) == sorted(["frame", *linkage.names])
    pins = {pin.name: pin for pin in found.linkage.pins}
    assert pins.keys() == linkage.model.points.keys()
    for name, pin in pins.items():
        expected = {linkage.names[number] for number, held in enumerate(linkage.model.links) if name in held} | (
            {"frame"} if name in linkage.model.fixed else set()
        )
        assert {links[link].name for link in pin.links} == expected


def assert_contacts(found: MechanismReport, linkage: RandomLinkage, habit: Habit) -> None:
    """Every slide and slot between its links, along its line; one in a slot at its pin."""
    names = ["frame" if number == FIXED else linkage.names[number] for number in range(-1, len(linkage.names))]
    left = [joint for joint in found.linkage.joints if joint.kind != "pin"]
    for contact in linkage.model.contacts:
        owner, *runners = ({names[link + 1]} for link in contact.links)
        if contact.kind == "pin in slot":  # any link of the pin may stand for it
            runners = [{linkage.names[link]} for link, pins in enumerate(linkage.model.links) if contact.pin in pins]
        joint = next(
            joint
            for joint in left
            if joint.kind == contact.kind
            and {found.linkage.links[end].name for end in (joint.first, joint.second)}
            in [owner | each for each in runners]
        )
        left.remove(joint)
        along = habit.motion(contact.along) - habit.motion(0j)
        assert joint.direction is not None
        assert abs((joint.direction * along.conjugate()).imag) < RELATIVE * abs(along)
        if contact.kind == "pin in slot":
            assert abs(joint.at - habit.motion(contact.at)) < RELATIVE * habit.motion.scale * 1e4
    assert left == []


def assert_speeds(found: MechanismReport, linkage: RandomLinkage, habit: Habit, expected: LinkSolution) -> None:
    """Turns as solved; velocities and slide speeds turned and scaled with the sheet; poles where links stand still."""
    assert found.analysis.solved
    assert found.analysis.disagreement is not None
    assert found.analysis.disagreement < RELATIVE
    number = {"frame": FIXED} | {name: link for link, name in enumerate(linkage.names)}
    links = found.linkage.links
    moved = habit.motion(1 + 0j) - habit.motion(0j)
    fastest = max(abs(turn) for turn in expected.turning)
    for link, motion in zip(links, found.analysis.links, strict=True):
        if link.kind != "frame":
            assert motion.angular_velocity == pytest.approx(
                expected.turning[number[link.name]], rel=RELATIVE, abs=RELATIVE * fastest
            )
    velocities = {
        pin.name: moved * expected.velocity(number[links[pin.links[-1]].name], linkage.model.points[pin.name])
        for pin in found.linkage.pins
    }
    greatest = max(map(abs, velocities.values()))
    for pin, pin_motion in zip(found.linkage.pins, found.analysis.pins, strict=True):
        assert pin_motion.velocity is not None
        assert abs(pin_motion.velocity - velocities[pin.name]) < RELATIVE * greatest
    for joint, joint_motion in zip(found.linkage.joints, found.analysis.joints, strict=True):
        if joint.kind != "pin":
            assert joint.direction is not None
            at = (joint.at - habit.motion.shift) / moved
            one, other = (expected.velocity(number[links[link].name], at) for link in (joint.first, joint.second))
            relative = (moved * (other - one) * joint.direction.conjugate()).real
            assert joint_motion.slide_speed == pytest.approx(relative, rel=RELATIVE, abs=RELATIVE * greatest)
