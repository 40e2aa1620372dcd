from __future__ import annotations

import cmath
import dataclasses
import math
from pathlib import Path

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from dxfcheck import check
from dxfcheck.comparison.compare import compare_reports
from dxfcheck.comparison.motion import UNMOVED
from dxfcheck.inspection import DrawingReport
from dxfcheck.reports.compare_words import verdict_words
from fixtures.drafting import Habit, Motion, Note, Part, Plan, mechanisms, mechanisms_gears, mechanisms_slides
from tests.comparison.drawn import PLAIN, compared, moved_pins, only, relabelled, shifted
from tests.property.comparison import PHASES
from tests.property.strategies import four_bars, habits, motions, plans

FIXTURES = Path(__file__).parents[2] / "fixtures"
TIPPER = mechanisms.TRAY_TIPPER
SECOND = dataclasses.replace(
    mechanisms.TRANSFER_SHEET,
    points={name: at for name, at in mechanisms.TRANSFER_SHEET.points.items() if name in "EFGH"},
    parts=mechanisms.TRANSFER_SHEET.parts[3:],
    frame=("E", "H"),
    notes=mechanisms.TRANSFER_SHEET.notes[1:],
)
ALL_PLANS = {
    name: plan
    for module in (mechanisms, mechanisms_slides, mechanisms_gears)
    for name, plan in vars(module).items()
    if isinstance(plan, Plan)
}


def with_habit(**changes: object) -> tuple[Habit, Habit]:
    """The plain habit for the old drawing, and one that differs for the new."""
    return PLAIN, dataclasses.replace(PLAIN, **changes)  # type: ignore[arg-type]


@pytest.mark.parametrize("other", ["r12", "blocks", "polylines", "trimmed-symbols"])
def test_the_tray_tipper_in_other_habits_and_versions_is_no_other_mechanism(other: str) -> None:
    old, new = check(FIXTURES / "tray-tipper.dxf"), check(FIXTURES / f"tray-tipper-{other}.dxf")
    for comparison in (compare_reports(old, new), compare_reports(new, old)):
        assert not comparison.changed
        assert not comparison.beyond
        assert verdict_words(comparison).startswith("no change as a mechanism")
        assert comparison.motion == UNMOVED


@pytest.mark.parametrize("name", ALL_PLANS)
@pytest.mark.parametrize(
    "habit",
    [
        {"version": "R12", "order": 3, "reversal": 4},
        {"version": "R2018", "order": 5, "reversal": 2, "motion": Motion(turn=0.7, shift=300 - 120j)},
        {"motion": Motion(turn=math.pi, shift=31 + 7j)},
        {"unit": "in", "radius": None, "motion": Motion(scale=1 / 25.4, turn=-1.0)},
    ],
    ids=["R12 re-ordered", "R2018 turned", "half a turn", "inches"],
)
def test_moved_turned_re_ordered_and_re_exported_is_no_change(
    name: str, habit: dict[str, object], tmp_path: Path
) -> None:
    plan = ALL_PLANS[name]
    old = dataclasses.replace(PLAIN, radius=None)
    comparison = compared(tmp_path, plan, plan, habits=(old, dataclasses.replace(old, **habit)))  # type: ignore[arg-type]
    assert (comparison.changed, comparison.beyond) == (False, False)
    assert comparison.motion.scale == 1.0
    assert not any(change.renamed or change.placed for change in comparison.mechanisms)


def test_the_motion_of_the_sheet_is_told(tmp_path: Path) -> None:
    comparison = compared(tmp_path, TIPPER, TIPPER, habits=with_habit(motion=Motion(turn=0.5, shift=20 - 5j)))
    assert comparison.motion.angle == pytest.approx(0.5)
    assert comparison.motion.shift == pytest.approx(20 - 5j)
    assert not comparison.motion.mirrored


def test_a_unit_that_changed_is_told_and_lengths_are_converted(tmp_path: Path) -> None:
    habits = with_habit(unit="in", radius=4 / 25.4, motion=Motion(scale=1 / 25.4))
    comparison = compared(tmp_path, TIPPER, moved_pins(TIPPER, {"B": 1.27}), habits=habits)
    assert "OLD is drawn in mm, NEW in in" in comparison.unit_note
    (move,) = only(comparison).moved
    assert move.by == pytest.approx(0.05)


def test_another_unit_in_the_header_of_the_same_figures_is_another_size(tmp_path: Path) -> None:
    comparison = compared(tmp_path, TIPPER, TIPPER, habits=with_habit(unit="in"))
    assert comparison.motion.scale == pytest.approx(25.4)
    assert comparison.beyond


def test_mirroring_is_told_and_is_no_change(tmp_path: Path) -> None:
    comparison = compared(tmp_path, TIPPER, TIPPER, habits=with_habit(motion=Motion(turn=0.3, mirrored=True)))
    assert comparison.motion.mirrored
    assert (comparison.changed, comparison.beyond) == (False, False)
    assert verdict_words(comparison) == "no change as a mechanism, but mirrored"
    assert only(comparison).reversed_motion


def test_a_pin_moved_by_a_fifth_of_a_per_cent_changes_its_links_and_speeds_and_only_these(tmp_path: Path) -> None:
    change = only(compared(tmp_path, TIPPER, moved_pins(TIPPER, {"B": TIPPER.points["B"] * 0.002})))
    assert [move.subject for move in change.moved] == ["B"]
    assert {length.subject: length.percent for length in change.lengths} == pytest.approx(
        {"A-B": 0.2, "B-C": -0.0526}, rel=0.01
    )
    assert {(speed.quantity, speed.subject) for speed in change.speeds} == {
        ("turning", "B-C"),
        ("turning", "C-D"),
        ("pin speed", "B"),
        ("pin speed", "C"),
        ("rubbing", "C (B-C, C-D)"),
        ("rubbing", "D (frame, C-D)"),
    }
    assert [(speed.quantity, speed.subject) for speed in change.within] == [("rubbing", "B (A-B, B-C)")]
    assert change.speeds_compared == 9
    assert not change.parts
    assert not change.drives


def test_a_frame_pin_moved_on_a_turned_sheet(tmp_path: Path) -> None:
    habits = with_habit(motion=Motion(turn=1.0, shift=100))
    change = only(compared(tmp_path, TIPPER, moved_pins(TIPPER, {"D": 0.4}), habits=habits))
    (move,) = change.moved
    assert move.subject == "D"
    assert abs(move.by) == pytest.approx(0.4)
    assert [length.subject for length in change.lengths] == ["frame", "C-D"]
    assert change.beyond


def test_a_change_within_the_allowance_is_told_and_passes(tmp_path: Path) -> None:
    new = moved_pins(TIPPER, {"B": TIPPER.points["B"] * 0.002})
    comparison = compared(tmp_path, TIPPER, new, allow=1.0)
    assert comparison.changed
    assert not comparison.beyond
    assert len(only(comparison).within) == 7
    assert "no speed by more than 1 %" in verdict_words(comparison)


def test_coordinates_rounded_to_six_digits_are_equal(tmp_path: Path) -> None:
    far = shifted(TIPPER, 3000 + 1000j)
    rounded = dataclasses.replace(
        far, points={name: complex(float(f"{at.real:.6g}"), float(f"{at.imag:.6g}")) for name, at in far.points.items()}
    )
    comparison = compared(tmp_path, far, rounded)
    assert comparison.rounded == "NEW"
    assert comparison.tolerance > 0.005
    assert not comparison.changed


def test_another_pose_of_the_same_links_is_told_as_such(tmp_path: Path) -> None:
    habits = with_habit(labels="none", motion=Motion(turn=2.1))
    bare = (dataclasses.replace(mechanisms.four_bar(angle), notes=()) for angle in (60, 75))
    change = only(compared(tmp_path, *bare, habits=(dataclasses.replace(PLAIN, labels="none"), habits[1])))
    assert change.other_pose
    assert len(change.moved) == 2
    assert change.ratio_to


def test_a_link_removed(tmp_path: Path) -> None:
    fan = mechanisms.LEAF_FAN
    change = only(compared(tmp_path, fan, dataclasses.replace(fan, parts=fan.parts[:-1], frame=("A", "D"))))
    assert [(part.what, part.change, part.subject) for part in change.parts] == [
        ("link", "gone", "E-F"),
        ("joint", "gone", "pin E"),
        ("joint", "gone", "pin F"),
    ]
    assert (change.old_mobility.count, change.new_mobility.count) == (1, 2)
    assert not change.lengths
    unknown = [speed for speed in change.speeds if speed.new is None]
    assert unknown
    assert all(speed.percent is None for speed in unknown)
    assert {speed.subject for speed in change.speeds} == {"C-E", "E", "C (B-C, C-E)"}


def test_a_link_and_its_joints_added(tmp_path: Path) -> None:
    new = dataclasses.replace(
        TIPPER,
        points={**TIPPER.points, "E": 100 + 150j},
        parts=(*TIPPER.parts, Part(pins=("C", "E"))),
        frame=("A", "D", "E"),
    )
    change = only(compared(tmp_path, TIPPER, new))
    assert [(part.what, part.change, part.subject) for part in change.parts] == [
        ("link", "added", "C-E"),
        ("joint", "added", "pin E"),
        ("joint", "added", "pin C"),
    ]
    assert change.mobility_changed


def test_a_pin_turned_from_free_to_fixed(tmp_path: Path) -> None:
    coupler = Part(pins=("B", "C", "T"), shape="strokes")
    free = dataclasses.replace(
        TIPPER, points={**TIPPER.points, "T": 60 + 160j}, parts=(TIPPER.parts[0], coupler, TIPPER.parts[2])
    )
    change = only(compared(tmp_path, free, dataclasses.replace(free, frame=("A", "D", "T"))))
    (part,) = change.parts
    assert (part.what, part.change, part.subject) == ("joint", "added", "pin T")
    assert part.detail == "fixed to the frame, was free"
    assert not change.moved
    assert change.mobility_changed


def test_no_per_cent_are_taken_of_a_speed_that_is_only_rounding_error(tmp_path: Path) -> None:
    change = only(compared(tmp_path, mechanisms.TIPPER_DEAD_CENTRE, TIPPER))
    stopped = next(speed for speed in change.speeds if (speed.quantity, speed.subject) == ("turning", "C-D"))
    assert (stopped.old, stopped.percent) == (0.0, None)
    assert stopped.beyond


@pytest.mark.parametrize(("note", "other_way"), [("ω_AB = 12 rad/s", False), ("ω_AB = 10 rad/s cw", True)])
def test_a_drive_changed(note: str, *, other_way: bool, tmp_path: Path) -> None:
    new = dataclasses.replace(TIPPER, notes=(Note(content=note, beside=("A", "B")),))
    change = only(compared(tmp_path, TIPPER, new))
    (drive,) = change.drives
    assert drive.subject == "A-B"
    assert drive.beyond
    assert change.turned_round is other_way
    assert len(change.speeds) == (0 if other_way else 9)
    assert change.beyond


def test_ratios_are_compared_where_both_drives_are_assumed(tmp_path: Path) -> None:
    old = dataclasses.replace(TIPPER, notes=())
    change = only(compared(tmp_path, old, old, habits=with_habit(motion=Motion(mirrored=True))))
    assert (change.changed, change.drives, change.reversed_motion) == (False, (), False)
    shorter = dataclasses.replace(old, points={**old.points, "C": old.points["C"] + 0.6})
    assert only(compared(tmp_path, old, shorter)).ratio_to == "A-B"


def test_two_mechanisms_that_changed_places(tmp_path: Path) -> None:
    comparison = compared(tmp_path, [TIPPER, SECOND], [shifted(TIPPER, 320), shifted(SECOND, -320)])
    assert not comparison.changed
    assert [(each.old_name, each.new_name) for each in comparison.mechanisms] == [("M2", "M1"), ("M1", "M2")]
    assert all(each.placed is not None for each in comparison.mechanisms)


def test_a_mechanism_added_or_gone(tmp_path: Path) -> None:
    added = compared(tmp_path, TIPPER, [TIPPER, SECOND])
    assert [(part.change, part.subject) for part in added.parts] == [("added", "M2")]
    gone = compared(tmp_path, [TIPPER, SECOND], TIPPER)
    assert [(part.change, part.subject) for part in gone.parts] == [("gone", "M2")]
    assert added.beyond
    assert gone.beyond


def test_an_empty_drawing_against_one_with_a_mechanism(tmp_path: Path) -> None:
    comparison = compared(tmp_path, [], TIPPER)
    assert [part.change for part in comparison.parts] == ["added"]
    assert [finding.rule for finding in comparison.cured_findings] == ["empty-model-space"]
    assert compared(tmp_path, TIPPER, []).beyond


def test_two_empty_drawings(tmp_path: Path) -> None:
    comparison = compared(tmp_path, [], [])
    assert not comparison.changed
    assert "neither drawing holds a linkage" in verdict_words(comparison)


def test_other_labels_are_told_and_are_no_change(tmp_path: Path) -> None:
    note = Note(content="ω_PQ = 10 rad/s", beside=("P", "Q"))
    new = relabelled(TIPPER, {"A": "P", "B": "Q", "C": "B", "D": "A"}, [note])
    comparison = compared(tmp_path, TIPPER, new, habits=with_habit(motion=Motion(turn=2.0)))
    assert not comparison.changed
    assert set(only(comparison).renamed) == {("A", "P"), ("B", "Q"), ("C", "B"), ("D", "A")}


def test_findings_that_stay_move_with_the_sheet(tmp_path: Path) -> None:
    plan = mechanisms.TIPPER_DEAD_CENTRE
    comparison = compared(tmp_path, plan, plan, habits=with_habit(motion=Motion(turn=1.1, shift=50)))
    assert (comparison.new_findings, comparison.cured_findings) == ((), ())
    mended = compared(tmp_path, plan, TIPPER)
    assert "dead-centre" in [finding.rule for finding in mended.cured_findings]
    assert mended.new_findings == ()


def test_a_drawing_that_was_not_read_is_refused() -> None:
    unread = DrawingReport(path="x.dxf", status="unreadable", error="is no DXF file")
    with pytest.raises(ValueError, match="not read"):
        compare_reports(unread, check(FIXTURES / "tray-tipper.dxf"))


@settings(max_examples=25, phases=PHASES)
@given(plans(), habits(motion=st.just(Motion())), motions())
def test_a_sheet_moved_as_a_whole_is_no_change(
    tmp_path_factory: pytest.TempPathFactory, plan: Plan, habit: Habit, motion: Motion
) -> None:
    rigid = dataclasses.replace(motion, scale=1.0)
    folder = tmp_path_factory.mktemp("moved")
    comparison = compared(folder, plan, plan, habits=(habit, dataclasses.replace(habit, motion=rigid)))
    assert (comparison.changed, comparison.beyond) == (False, False)


@settings(max_examples=30, phases=PHASES)
@given(four_bars(), st.sampled_from("ABCD"), st.floats(0, 6.2), motions())
def test_a_pin_that_moved_is_told_from_the_sheet_that_did(
    tmp_path_factory: pytest.TempPathFactory, plan: Plan, pin: str, towards: float, motion: Motion
) -> None:
    size = max(abs(first - second) for first in plan.points.values() for second in plan.points.values())
    new = moved_pins(plan, {pin: cmath.rect(0.003 * size, towards)})
    rigid = dataclasses.replace(motion, scale=1.0, mirrored=False)
    habit = dataclasses.replace(PLAIN, radius=None)
    comparison = compared(
        tmp_path_factory.mktemp("pin"), plan, new, habits=(habit, dataclasses.replace(habit, motion=rigid))
    )
    change = only(comparison)
    assert [move.subject for move in change.moved] == [pin]
    assert abs(change.moved[0].by) == pytest.approx(0.003 * size, rel=1e-3)
    links_there = {part.name for part in plan.parts if pin in part.pins} | {"frame"}
    assert {length.subject for length in change.lengths} <= links_there
    assert not change.parts


def test_two_mechanisms_that_changed_places_are_the_same_elsewhere(tmp_path: Path) -> None:
    moves = {"B": -0.1 * TIPPER.points["B"], "C": -5 - 5j}
    smaller = relabelled(moved_pins(TIPPER, moves), dict(zip("ABCD", "EFGH", strict=True)))
    aside = 600 + 0j
    old, new = [TIPPER, shifted(smaller, aside)], [shifted(TIPPER, aside), smaller]
    comparison = compared(tmp_path, old, new)
    assert not comparison.changed
    assert sorted(round(change.placed.shift.real) for change in comparison.mechanisms if change.placed) == [-600, 600]


def test_a_rolling_contact_that_moved_is_no_pin(tmp_path: Path) -> None:
    picker = mechanisms_gears.PICKER
    first, second = picker.wheels
    wheels = (
        dataclasses.replace(first, radii=(first.radii[0] + 10,)),
        dataclasses.replace(second, radii=(second.radii[0] - 10,)),
    )
    comparison = compared(tmp_path, picker, dataclasses.replace(picker, wheels=wheels))
    assert [move.is_pin for move in only(comparison).moved] == [False]
    assert "1 joint moved" in verdict_words(comparison)
