"""What is right is not nagged about: sound linkages, however they are drawn, give no error and no warning.

Excepted are the rules on the quality of a pose, and what a sheet really lacks (the oldest release knows no unit).
"""

from __future__ import annotations

import dataclasses
import random
from collections.abc import Iterator
from pathlib import Path
from typing import get_args

import pytest

from dxfcheck.inspection import inspect_drawing
from dxfcheck.settings import Settings
from fixtures.drafting import Habit, Plan, habit, mechanisms, mechanisms_gears, mechanisms_slides, write_plan

FIXTURES = Path(__file__).parent.parent / "fixtures"
QUALITY_OF_POSE = frozenset(
    {"dead-centre", "near-dead-centre", "low-transmission-angle", "doubtful-speed", "special-geometry"}
)
OF_A_SHEET_WITHOUT_A_UNIT = frozenset({"units-missing", "drive-unit-assumed"})
AT_FAULT = {
    "bench-truss": {"no-motion"},
    "bench-brace": {"locked-part"},
    "gripper-at-limit": {"drive-at-limit"},
}
"""The drawings that show what is wrong with a linkage, and the rule that says so."""

PLAIN = Habit(radius=3.0)
OF_PINS = {
    "ends": get_args(habit.Ends),
    "frame": get_args(habit.FrameHabit),
    "base": get_args(habit.BaseHabit),
    "strokes": get_args(habit.StrokeHabit),
    "pins": get_args(habit.PinHabit),
    "labels": get_args(habit.LabelHabit),
    "version": get_args(habit.Version),
    "named_layers": (True, False),
    "binary": (True, False),
    "order": (1, 2),
    "reversal": (1, 2),
}
OF_SLIDES = {
    "blocks": get_args(habit.BlockHabit),
    "guides": get_args(habit.GuideHabit),
    "cylinder": get_args(habit.CylinderHabit),
    "guide_frame": get_args(habit.GuideFrameHabit),
    "contours": get_args(habit.ContourHabit),
    "slot_blocks": get_args(habit.SlotBlockHabit),
    "barrels": get_args(habit.BarrelHabit),
    "pistons": get_args(habit.PistonHabit),
}
PLANS: dict[str, Plan] = {
    name: getattr(module, name)
    for module in (mechanisms, mechanisms_slides, mechanisms_gears)
    for name in module.__all__
    if name.isupper() and name != "BENCH_TRUSS"
}


def one_at_a_time() -> Iterator[tuple[str, Habit]]:
    """A crank-rocker in each habit of pins; in each habit of slides a linkage that shows it."""
    for field, values in OF_PINS.items():
        for value in values:
            base = dataclasses.replace(PLAIN, frame="symbol") if field in {"base", "strokes"} else PLAIN
            yield "TRAY_TIPPER", dataclasses.replace(base, **{field: value})
    for field, values in OF_SLIDES.items():
        name = "LIFT_TABLE" if field in {"barrels", "pistons", "slot_blocks"} else "DIBBER_OFFSET"
        for value in values:
            base = dataclasses.replace(PLAIN, guides="cylinder") if field == "cylinder" else PLAIN
            yield name, dataclasses.replace(base, **{field: value})
    for pitch in get_args(habit.PitchHabit):
        yield "MIXER", dataclasses.replace(PLAIN, pitch=pitch)


def mixed() -> Iterator[tuple[str, Habit]]:
    """Every linkage in two habits of everything at once."""
    fields = {**OF_PINS, **OF_SLIDES}
    for number, name in enumerate(PLANS):
        dice = random.Random(number)  # noqa: S311 - no secret
        for _ in range(2):
            yield name, dataclasses.replace(PLAIN, **{field: dice.choice(values) for field, values in fields.items()})


def nagged(path: Path) -> list[str]:
    """Rules, with their message, that find an error or a warning that is not about the quality of the pose."""
    found = inspect_drawing(str(path), Settings(), with_evidence=False).findings
    return [
        f"{each.rule}: {each.message}" for each in found if each.severity != "note" and each.rule not in QUALITY_OF_POSE
    ]


DRAWN = [*one_at_a_time(), *mixed()]


@pytest.mark.parametrize(("name", "drawn_in"), DRAWN, ids=[f"{name} {place}" for place, (name, _) in enumerate(DRAWN)])
def test_a_sound_linkage_is_not_nagged_about(name: str, drawn_in: Habit, tmp_path: Path) -> None:
    # A drive note names its link by labels: a drafter who writes none of them writes no such note.
    plan = PLANS[name] if drawn_in.labels != "none" else dataclasses.replace(PLANS[name], notes=())
    write_plan(tmp_path / "sheet.dxf", plan, drawn_in)
    expected = OF_A_SHEET_WITHOUT_A_UNIT if drawn_in.version == "R12" else frozenset()
    left = {each for each in nagged(tmp_path / "sheet.dxf") if each.partition(":")[0] not in expected}
    if not plan.notes and plan.mobility() > 1:
        left = {each for each in left if not each.startswith("undriven-freedom")}
    assert left == set()


@pytest.mark.parametrize("path", sorted(FIXTURES.glob("*.dxf")), ids=lambda path: path.stem)
def test_a_clean_fixture_is_not_nagged_about(path: Path) -> None:
    expected = AT_FAULT.get(path.stem, OF_A_SHEET_WITHOUT_A_UNIT)
    assert [each for each in nagged(path) if each.partition(":")[0] not in expected] == []
