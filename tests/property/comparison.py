"""Draws a plan in a habit, lets the program inspect the file, and puts its report beside the plan's own solution."""

from __future__ import annotations

import dataclasses
import tempfile
from dataclasses import dataclass
from pathlib import Path

from hypothesis import Phase

from dxfcheck.inspection import DrawingReport, MechanismReport, inspect_drawing
from dxfcheck.settings import Settings
from fixtures.drafting import Habit, Mark, Plan, write_plan

RELATIVE = 1e-9
PHASES = (Phase.explicit, Phase.generate)
"""No shrinking: a plan is chosen by a seed, so a smaller seed is no simpler plan."""


@dataclass(frozen=True, slots=True, kw_only=True)
class Reported:
    """What the report says of a plan, by the plan's own names (matched by place)."""

    counts: tuple[int, int, int, int, int]
    turning: dict[str, float | None]
    velocity: dict[str, complex | None]
    labels: dict[str, str]
    link_names: dict[str, str]


def inspect(plan: Plan, habit: Habit, *extra: Mark) -> DrawingReport:
    """The report on the plan as drawn in the habit."""
    with tempfile.TemporaryDirectory() as folder:
        path = Path(folder) / "drawing.dxf"
        write_plan(path, plan, habit, *extra)
        return inspect_drawing(str(path), Settings())


def on_the_sheet(plan: Plan, habit: Habit) -> Plan:
    """The plan with its points where the habit's sheet has them."""
    return dataclasses.replace(plan, points={pin: habit.motion(point) for pin, point in plan.points.items()})


def reported(plan: Plan, habit: Habit) -> Reported:
    """What the program reports of the plan's one mechanism."""
    report = inspect(plan, habit)
    assert report.status == "checked"
    assert len(report.mechanisms) == 1, [finding.message for finding in report.findings]
    return by_place(report.mechanisms[0], on_the_sheet(plan, habit))


def by_place(mechanism: MechanismReport, plan: Plan) -> Reported:
    """A mechanism's figures under the names of the plan's pins that lie at the same places."""
    linkage, analysis = mechanism.linkage, mechanism.analysis
    named = [min(plan.points, key=lambda name: abs(plan.points[name] - pin.at)) for pin in linkage.pins]
    assert sorted(named) == sorted(plan.points), [pin.at for pin in linkage.pins]
    parts = {part.name for part in plan.parts}
    links = ["-".join(sorted(named[pin] for pin in link.pins)) for link in linkage.links]
    moving = [number for number, link in enumerate(linkage.links) if link.kind != "frame"]
    assert {links[number] for number in moving} == parts
    mobility = analysis.mobility
    return Reported(
        counts=(
            mobility.count,
            mobility.links,
            mobility.full_joints,
            mobility.half_joints,
            mobility.at_pose,
        ),
        turning={links[number]: analysis.links[number].angular_velocity for number in moving},
        velocity={name: analysis.pins[number].velocity for number, name in enumerate(named)},
        labels={name: linkage.pins[number].name for number, name in enumerate(named)},
        link_names={links[number]: linkage.links[number].name for number in moving},
    )


def assert_same(found: dict[str, complex | None], expected: dict[str, complex | None]) -> None:
    """Assert that two sets of speeds agree within RELATIVE of the greatest, and are unknown in the same places."""
    assert found.keys() == expected.keys()
    greatest = max((abs(value) for value in expected.values() if value is not None), default=0.0)
    for name, value in expected.items():
        other = found[name]
        assert (other is None) == (value is None), (name, other, value)
        if other is not None and value is not None:
            assert abs(other - value) <= RELATIVE * greatest, (name, other, value)
