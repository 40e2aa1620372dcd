from __future__ import annotations

import io
from dataclasses import replace

import pytest

from dxfcheck.inspection import MechanismReport
from dxfcheck.linkage import Drive
from dxfcheck.reading.reading import Evidence
from dxfcheck.reports.terminal import TerminalReport
from dxfcheck.reports.terminal_contacts import contact_sentences, joint_counts, towards
from dxfcheck.reports.terminal_mechanism import mechanism_lines
from tests.reports.contacts import gas_spring, seed_planet, shuttle_yoke, slotted_indexer, soil_roller, tray_rack
from tests.reports.samples import PRESS, PRESS_ANALYSIS, tipper


def sentences(report: MechanismReport) -> list[tuple[str, str]]:
    return list(contact_sentences(report.linkage, report.analysis, "mm"))


def shown(report: MechanismReport) -> str:
    return "\n".join(line.text for line in mechanism_lines(report, "mm", 80))


def test_a_slide_says_what_slides_on_what_how_fast_and_where_to() -> None:
    """B runs at (-80, 60): the yoke goes left with it, the block up in the yoke."""
    assert sentences(shuttle_yoke()) == [
        ("sliding", "block at B slides on link 1F at 60 mm/s towards 90 deg"),
        ("", "link 1F slides on the frame at 80 mm/s towards 180 deg"),
    ]


@pytest.mark.parametrize("pin_first", [False, True])
def test_a_pin_moves_in_the_slot_of_the_other_link(*, pin_first: bool) -> None:
    said = "pin B of A-B slides in the slot of C at 60 mm/s towards 90 deg"
    assert sentences(slotted_indexer(pin_first=pin_first)) == [("sliding", said)]


def test_a_slot_whose_pin_is_not_known_says_which_link_moves() -> None:
    report = slotted_indexer()
    unpinned = tuple(replace(joint, pin=None) if joint.kind != "pin" else joint for joint in report.linkage.joints)
    report = replace(report, linkage=replace(report.linkage, joints=unpinned))
    said = "the pin at (30, 40) in the slot between C and A-B: A-B slides at 60 mm/s towards 90 deg"
    assert sentences(report) == [("sliding", said)]


@pytest.mark.parametrize(("rate", "says"), [(0.5, "closes"), (-0.5, "extends")])
def test_a_telescope_extends_or_closes(rate: float, says: str) -> None:
    """|AC| = 100; C moves square to DC = (-40, 80): v = i rate DC = rate (-80, -40), along AC = -80 rate."""
    report = gas_spring(rate)
    assert sentences(report) == [("sliding", f"telescope A-C {says} at 40 mm/s")]
    turned = replace(
        report.linkage,
        joints=tuple(
            joint if joint.direction is None else replace(joint, direction=-joint.direction)
            for joint in report.linkage.joints
        ),
    )
    motions = tuple(
        motion if motion.slide_speed is None else replace(motion, slide_speed=-motion.slide_speed)
        for motion in report.analysis.joints
    )
    other = replace(report, linkage=turned, analysis=replace(report.analysis, joints=motions))
    assert sentences(other) == sentences(report)


def test_a_telescope_that_does_not_move_keeps_its_length() -> None:
    assert sentences(gas_spring(0.0)) == [("sliding", "telescope A-C keeps its length")]


def test_a_slide_beside_the_pins_is_no_telescope() -> None:
    report = gas_spring(0.5)
    beside = tuple(
        replace(joint, at=joint.at + 5) if joint.kind == "slide" else joint for joint in report.linkage.joints
    )
    report = replace(report, linkage=replace(report.linkage, joints=beside))
    assert sentences(report) == [("sliding", "C slides on A at 40 mm/s towards -126.87 deg")]


def test_a_driven_telescope_is_told_of_in_the_same_words() -> None:
    report = gas_spring(0.5)
    slide = len(report.linkage.joints) - 1
    drive = Drive(link=1, against=2, rate=12.0, kind="slide", joint=slide)
    text = shown(replace(report, linkage=replace(report.linkage, drives=(drive,))))
    joint = report.linkage.joints[slide]
    assert (joint.first, joint.second) == (1, 2)
    assert "telescope A-C closes at 12 mm/s: from the option" in text
    backwards = replace(drive, link=2, against=1)
    text = shown(replace(report, linkage=replace(report.linkage, drives=(backwards,))))
    assert "telescope A-C extends at 12 mm/s: from the option" in text


def test_what_is_not_settled_is_no_figure() -> None:
    report = MechanismReport(linkage=PRESS, analysis=PRESS_ANALYSIS)
    assert sentences(report) == [("sliding", "block at C slides on the frame at ? mm/s")]


def test_wheels_that_roll() -> None:
    """Sun 3.25, planet -2.6 rad/s by Willis; the planet's contact with the sun turns at the difference."""
    assert sentences(soil_roller()) == [("rolling", "C rolls on the frame at 2 rad/s cw")]
    assert sentences(seed_planet()) == [
        ("rolling", "O rolls on X at 5.85 rad/s ccw; against the frame O turns 1.25 times as fast as X, the other way"),
        ("", "X rolls on the frame at 2.6 rad/s cw"),
    ]


@pytest.mark.parametrize("rack_first", [False, True])
def test_a_rack_gets_no_ratio_as_it_does_not_turn(*, rack_first: bool) -> None:
    said = [text for _, text in sentences(tray_rack(rack_first=rack_first)) if "rolls" in text]
    assert said == ["wheel rolls on rack at 2 rad/s ccw; rack does not turn"]


def test_wheels_that_are_not_settled_get_no_figure() -> None:
    report = seed_planet()
    loose = tuple(replace(motion, relative_angular_velocity=None) for motion in report.analysis.joints)
    links = tuple(replace(motion, angular_velocity=None) for motion in report.analysis.links)
    report = replace(report, analysis=replace(report.analysis, joints=loose, links=links))
    assert sentences(report)[0] == ("rolling", "O rolls on X at ? rad/s")


def test_the_heading_counts_the_joints_that_are_no_pins() -> None:
    assert joint_counts(shuttle_yoke().linkage) == ["2 slides"]
    assert joint_counts(slotted_indexer().linkage) == ["1 pin in slot"]
    assert shown(seed_planet()).startswith("M1: 4 links, 2 pins, 2 rolling contacts; frame at O\n")
    assert joint_counts(tipper().mechanisms[0].linkage) == []


def test_a_link_without_pins_that_slides_on_the_frame_translates() -> None:
    report = shuttle_yoke()
    row = next(line for line in shown(report).splitlines() if line.startswith("  1F "))
    assert row.split() == ["1F", "0", "0", "translates", "-"]
    still = replace(report.linkage, drives=(replace(report.linkage.drives[0], rate=0.0),))
    still_motions = tuple(
        motion if motion.slide_speed is None else replace(motion, slide_speed=0.0) for motion in report.analysis.joints
    )
    resting = replace(report, linkage=still, analysis=replace(report.analysis, joints=still_motions))
    row = next(line for line in shown(resting).splitlines() if line.startswith("  1F "))
    assert row.split() == ["1F", "0", "0", "at", "rest", "-"]


def test_a_pin_in_a_slot_rubs_nowhere_but_slides() -> None:
    row = next(line for line in shown(slotted_indexer()).splitlines() if "pin in slot " in line)
    assert row.split()[-1] == "-"
    assert "?" not in shown(slotted_indexer())


@pytest.mark.parametrize(
    ("direction", "says"),
    [(1 + 0j, "0"), (1j, "90"), (-1 - 1e-15j, "180"), (-1 + 1e-15j, "180"), (-1j, "-90"), (1 - 1j, "-45")],
)
def test_degrees_run_from_the_right_counter_clockwise(direction: complex, says: str) -> None:
    assert towards(direction) == says


def test_the_reading_says_what_a_block_is_and_where_a_joint_points() -> None:
    stream = io.StringIO()
    reports = (shuttle_yoke(), soil_roller())
    TerminalReport(stream).reading(replace(tipper(findings=()), mechanisms=reports, evidence=()))
    text = " ".join(stream.getvalue().split())
    assert "link block at B; pins B (a block)" in text
    assert "link 1F; no pins, so it goes by a handle" in text
    assert "joint block at B and 1F; slide; at (30, 40); along 90 deg" in text
    assert "joint frame and C; rolling; at (0, 0); tangent 0 deg; nothing else holds it: a full joint" in text


def test_a_sliding_drive_is_read_with_its_unit_and_what_it_runs_against() -> None:
    report = gas_spring(0.5)
    drive = Drive(link=2, against=1, rate=12.0, kind="slide", joint=len(report.linkage.joints) - 1, source="note")
    report = replace(report, linkage=replace(report.linkage, drives=(drive,)))
    why = Evidence("drive", "C against A", 9, "stated by the note", (), None, "M1")
    stream = io.StringIO()
    TerminalReport(stream).reading(replace(tipper(findings=()), mechanisms=(report,), evidence=(why,)))
    text = " ".join(stream.getvalue().split())
    assert "drive C against A; 12 mm/s; source: note rule 9: stated by the note" in text
    assert "Also decided" not in text
