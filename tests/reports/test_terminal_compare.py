from __future__ import annotations

import dataclasses
import io
from pathlib import Path

from dxfcheck.comparison.motion import UNMOVED, SheetMotion
from dxfcheck.comparison.result import Comparison
from dxfcheck.reports.compare_words import motion_words, verdict_words
from dxfcheck.reports.terminal_compare import CompareReport, comparison_lines
from fixtures.drafting import Motion, Note, mechanisms
from tests.comparison.drawn import PLAIN, compared, moved_pins, shifted

TIPPER = mechanisms.TRAY_TIPPER
LONGER = moved_pins(TIPPER, {"B": TIPPER.points["B"] * 0.002})


def text_of(comparison: Comparison) -> str:
    return "\n".join(line.text for line in comparison_lines(comparison, 80))


def test_a_change_is_shown_with_old_new_difference_and_per_cent(tmp_path: Path) -> None:
    text = text_of(compared(tmp_path, TIPPER, LONGER))
    rows = {line.split()[0]: line.split() for line in text.splitlines() if line.strip()}
    assert rows["A-B"] == ["A-B", "A-B", "60", "60.12", "+0.12", "+0.2"]
    assert "C-D       3.2744   3.2821  +0.0077733  +0.237" in text
    assert "within    1 speed changed by less than 0.1 %, by 0.037 % at most" in text
    assert "+0.06  +0.10392  0.12" in text


def test_the_speeds_of_a_sheet_that_cannot_move_any_more_are_zero_and_not_noise(tmp_path: Path) -> None:
    text = text_of(compared(tmp_path, TIPPER, mechanisms.TIPPER_DEAD_CENTRE))
    assert "e-1" not in text
    assert "drawn at another pose" in text
    assert "New findings\n  warning  dead-centre at (52, 29.9333) in NEW" in text


def test_what_is_not_known_is_said_and_never_zero(tmp_path: Path) -> None:
    fan = mechanisms.LEAF_FAN
    text = text_of(compared(tmp_path, fan, dataclasses.replace(fan, parts=fan.parts[:-1], frame=("A", "D"))))
    assert "C-E      -1.0085      ?  not known in NEW  ?" in text


def test_drives_labels_rings_and_sense_are_told_in_words(tmp_path: Path) -> None:
    note = Note(content="ω_AB = 10 rad/s cw", beside=("A", "B"))
    habits = (PLAIN, dataclasses.replace(PLAIN, radius=3.0))
    text = text_of(compared(tmp_path, TIPPER, dataclasses.replace(TIPPER, notes=(note,)), habits=habits))
    assert "drive     A-B: 10 rad/s -> -10 rad/s" in text
    assert "ring      A, B, C and D: radius 4 -> 3 mm" in text
    assert "sense     it runs the other way; the speeds below" in text


def test_mechanisms_elsewhere_are_told_and_the_rest_counted(tmp_path: Path) -> None:
    far = shifted(TIPPER, 600)
    text = text_of(compared(tmp_path, [TIPPER, far], [TIPPER, shifted(far, 50j)]))
    assert text.splitlines()[0] == "no change as a mechanism; 1 mechanism elsewhere on the sheet"
    assert "lies elsewhere than the rest of the sheet: moved by (0, 50)" in text
    assert "1 mechanism unchanged" in text


def test_words_for_motions() -> None:
    assert motion_words(UNMOVED) == "as it was"
    assert motion_words(SheetMotion(1j, 3 + 4j)) == "turned by 90 deg, then moved by (3, 4)"
    assert motion_words(SheetMotion(1j, 0j, mirrored=True)) == "mirrored in a line at 45 deg"


def test_the_size_is_told_where_only_the_unit_changed(tmp_path: Path) -> None:
    comparison = compared(tmp_path, TIPPER, TIPPER, habits=(PLAIN, dataclasses.replace(PLAIN, unit="in")))
    assert "the figures are the same, only the unit is another one" in " ".join(text_of(comparison).split())
    assert verdict_words(comparison).startswith("changed as a mechanism: 25.4 times as large")


def test_a_subject_stands_before_the_verdict(tmp_path: Path) -> None:
    comparison = compared(tmp_path, TIPPER, TIPPER, habits=(PLAIN, dataclasses.replace(PLAIN, motion=Motion(shift=5))))
    stream = io.StringIO()
    report = CompareReport(stream)
    report.comparison(comparison, subject="tipper.dxf")
    report.caution()
    assert stream.getvalue().startswith("tipper.dxf: no change as a mechanism\n")
    assert "sheet: moved by (5, 0)" in stream.getvalue()
    assert "a qualified person signs" in " ".join(stream.getvalue().split())


def test_rolling_contacts_that_moved_are_counted_as_joints(tmp_path: Path) -> None:
    comparison = compared(tmp_path, TIPPER, LONGER)
    (change,) = comparison.mechanisms
    rolling = change.moved[0]._replace(is_pin=False)
    both = dataclasses.replace(change, moved=(*change.moved, rolling, rolling))
    text = verdict_words(dataclasses.replace(comparison, mechanisms=(both,)))
    assert text.startswith("changed as a mechanism: 1 pin moved, 2 joints moved, 2 lengths")
