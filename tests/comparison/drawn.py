"""Pairs of drawings, drawn and checked, for the tests of comparisons."""

from __future__ import annotations

import dataclasses
from collections.abc import Mapping, Sequence
from pathlib import Path

from dxfcheck import check
from dxfcheck.comparison.compare import compare_reports
from dxfcheck.comparison.result import Comparison, MechanismChange
from dxfcheck.inspection import DrawingReport
from fixtures.drafting import Habit, Note, Plan, write_marks, write_plans

__all__ = ["PLAIN", "compared", "drawn", "moved_pins", "only", "relabelled", "shifted"]

PLAIN = Habit(radius=4.0)


def drawn(path: Path, plans: Sequence[Plan], habit: Habit = PLAIN) -> Path:
    """The plans on one sheet; an empty drawing where there is none."""
    if plans:
        write_plans(path, plans, habit)
    else:
        write_marks(path, (), habit)
    return path


def compared(
    folder: Path,
    old: Plan | Sequence[Plan],
    new: Plan | Sequence[Plan],
    *,
    habits: tuple[Habit, Habit] = (PLAIN, PLAIN),
    allow: float = 0.1,
) -> Comparison:
    """Both drawn in their habits, checked and compared."""
    return compare_reports(
        *(_checked(folder, *side) for side in zip(("old", "new"), (old, new), habits, strict=True)), allow=allow
    )


def _checked(folder: Path, name: str, plans: Plan | Sequence[Plan], habit: Habit) -> DrawingReport:
    return check(drawn(folder / f"{name}.dxf", [plans] if isinstance(plans, Plan) else plans, habit))


def only(comparison: Comparison) -> MechanismChange:
    """The one mechanism that both drawings hold."""
    assert not comparison.parts
    (change,) = comparison.mechanisms
    return change


def moved_pins(plan: Plan, moves: Mapping[str, complex]) -> Plan:
    """The plan with some pins elsewhere."""
    points = {name: place + moves.get(name, 0) for name, place in plan.points.items()}
    return dataclasses.replace(plan, points=points)


def shifted(plan: Plan, by: complex) -> Plan:
    """The plan elsewhere on the sheet."""
    return moved_pins(plan, dict.fromkeys(plan.points, by))


def relabelled(plan: Plan, names: Mapping[str, str], notes: Sequence[Note] = ()) -> Plan:
    """A plan of pins and links under other names."""
    parts = [dataclasses.replace(part, pins=tuple(names.get(pin, pin) for pin in part.pins)) for part in plan.parts]
    return dataclasses.replace(
        plan,
        points={names.get(name, name): place for name, place in plan.points.items()},
        parts=tuple(parts),
        frame=tuple(names.get(pin, pin) for pin in plan.frame),
        notes=tuple(notes),
    )
