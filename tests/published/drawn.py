"""Published cases drawn as a drafter would and read back: what the report says, by the names of links and pins."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import replace
from pathlib import Path

from dxfcheck.inspection import MechanismReport, inspect_drawing
from dxfcheck.settings import Settings
from fixtures.drafting import Habit, Plan, Ring, draft, write_marks

__all__ = ["Drawn", "drawn"]


class Drawn:
    """One mechanism read from a drawing, asked by names; what is not known fails the test that asks."""

    def __init__(self, report: MechanismReport) -> None:
        self.linkage, self.analysis = report.linkage, report.analysis
        self._links = {link.name: number for number, link in enumerate(report.linkage.links)}
        self._pins = {pin.name: number for number, pin in enumerate(report.linkage.pins)}

    @property
    def counts(self) -> tuple[int, int, int, int, int]:
        """Count, links, full joints, half joints, freedom at the pose."""
        mobility = self.analysis.mobility
        return mobility.count, mobility.links, mobility.full_joints, mobility.half_joints, mobility.at_pose

    def turn(self, link: str) -> float:
        value = self.analysis.links[self._links[link]].angular_velocity
        assert value is not None, f"{link} is not settled"
        return value

    def wheel_turn(self, pin: str) -> float:
        """Rate of the moving link that has this pin and no other."""
        only = (self._pins[pin],)
        (name,) = (link.name for link in self.linkage.links if link.kind != "frame" and link.pins == only)
        return self.turn(name)

    def velocity(self, pin: str) -> complex:
        value = self.analysis.pins[self._pins[pin]].velocity
        assert value is not None, f"{pin} is not settled"
        return value

    def rubbing(self, pin: str) -> float:
        joint = next(
            number
            for number, joint in enumerate(self.linkage.joints)
            if joint.pin == self._pins[pin] and joint.kind == "pin"
        )
        value = self.analysis.joints[joint].rubbing_speed
        assert value is not None, f"rubbing at {pin} is not settled"
        return value

    def slide(self, kind: str = "slide") -> float:
        """Speed at the only joint of a kind, along its direction."""
        (joint,) = (number for number, joint in enumerate(self.linkage.joints) if joint.kind == kind)
        value = self.analysis.joints[joint].slide_speed
        assert value is not None, f"the {kind} is not settled"
        return value


def drawn(
    path: Path,
    plan: Plan,
    *drives: str,
    radius: float,
    radii: Mapping[str, float] | None = None,
    habit: Habit | None = None,
) -> Drawn:
    """The plan written to a file in a habit, each pin with its radius, and read with the drives as options."""
    habit = replace(habit or Habit(), radius=radius)
    if radii:
        habit = replace(habit, ends="centre")  # rims are those of one radius
    sizes = {f"pin {name}": size for name, size in (radii or {}).items()}
    marks = [
        replace(mark, radius=sizes[mark.part]) if isinstance(mark, Ring) and mark.part in sizes else mark
        for mark in draft(plan, habit)
    ]
    write_marks(path, tuple(marks), habit)
    report = inspect_drawing(str(path), Settings(drives=drives))
    assert len(report.mechanisms) == 1, [finding.message for finding in report.findings]
    return Drawn(report.mechanisms[0])
