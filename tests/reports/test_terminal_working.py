"""The hand working as a reviewer reads it: true line by line, within 80 columns, and a reason where there is none."""

from __future__ import annotations

import math
import re
from pathlib import Path

import pytest

from dxfcheck.analysis import analyse
from dxfcheck.cli import main
from dxfcheck.inspection import MechanismReport, inspect_drawing
from dxfcheck.linkage import Drive, Linkage
from dxfcheck.reports.terminal_working import working_lines
from dxfcheck.settings import Settings
from tests.analysis.lattices import scissor_lattice
from tests.examples import FOUR_BAR, FOUR_BAR_POINTS, STEPHENSON, STEPHENSON_POINTS
from tests.model import Other, linkage
from tests.reports.contacts import (
    gas_spring,
    seed_planet,
    shuttle_yoke,
    slotted_indexer,
    soil_roller,
    tray_rack,
)
from tests.reports.samples import press, tipper

FIXTURES = Path(__file__).parents[2] / "fixtures"
TIPPER = """\
Working, M1

  1  A-B: driven
     omega(A-B) = 10 rad/s ccw, as stated
     v_B = omega(A-B) x r_B/A: 10 x 40 = 400 mm/s towards 180 deg

  2  B-C and C-D, closed at C
     v_C = v_B + omega(B-C) x r_C/B
     v_C = omega(C-D) x r_C/D
     r_C/B = (160, 40): 164.92 mm towards 14.036 deg, so v_C/B is towards
         104.04 deg or back
     r_C/D = (40, 80): 89.443 mm towards 63.435 deg, so v_C is towards
         153.43 deg or back
     side     size  towards  angle opposite  size/sin
              mm/s      deg             deg      mm/s
     v_B    400      180             49.399    526.83
     v_C/B  235.61   104.04          26.565    526.83
     v_C    511.1    153.43         104.04     526.83
     omega(B-C) = v_C/B / r_C/B = 235.61 / 164.92 = 1.4286 rad/s ccw
     omega(C-D) = v_C / r_C/D = 511.1 / 89.443 = 5.7143 rad/s ccw
     pole of B-C: where the line through A and B meets the line through D and C,
         at (0, -240); v_B / omega = 400 / 1.4286 = 280 mm from B
"""


def shown(report: MechanismReport, *, legend: bool = False, width: int = 80) -> str:
    return "\n".join(line.text for line in working_lines(report, "mm", width, legend=legend))


def solved(model: Linkage) -> MechanismReport:
    return MechanismReport(linkage=model, analysis=analyse(model))


def test_a_four_bar_is_worked_as_on_paper() -> None:
    text = shown(tipper().mechanisms[0])
    assert text.startswith(TIPPER)
    assert re.search(r"Closing error: at most \S+ of the greatest speed, 511.1 mm/s; lines cross\n", text)


def test_the_legend_says_how_things_are_named() -> None:
    text = " ".join(shown(tipper().mechanisms[0], legend=True).split())
    assert "v_C/B is the velocity of C against B; lengths in mm, angles from +x, counter-clockwise" in text


def test_a_yoke_and_its_block_make_a_triangle_of_3_4_5() -> None:
    text = shown(shuttle_yoke())
    assert "link 1F slides on the frame and does not turn" in text
    assert "v_B = u(link 1F) + u(block at B)" in text
    assert re.search(r"v_B +100 +143\.13 +90 +100\n +u\(link 1F\) +80 +180 ", text)


@pytest.mark.parametrize("pin_first", [False, True])
def test_a_slotted_lever_says_whose_pin_runs_in_whose_slot(*, pin_first: bool) -> None:
    text = shown(slotted_indexer(pin_first=pin_first))
    assert "u(A-B): pin B of A-B slides in the slot of C, towards 90 deg or back" in text
    assert "omega(C) = v_B/C / r_B/C = 80 / 100 = 0.8 rad/s ccw" in text


def test_a_telescope_turns_as_one_and_its_pole_lies_square_to_the_slide() -> None:
    text = shown(gas_spring(1.0))
    assert "omega(C) = omega(A), as C slides on A" in text
    assert "the line through A square" in text
    assert "omega(A) = v_C/A / r_C/A = 40 / 100 = 0.4 rad/s ccw" in text


def test_rolling_contacts_are_one_equation_each_with_its_quotient() -> None:
    text = shown(seed_planet())
    assert "along the contact K2 at (72, 0): 0 = v_X + omega(X) x r_K2/X" in text
    assert "omega(X) = -52 / 20 = -2.6: 2.6 rad/s cw" in text
    assert "omega(O) = 104 / 32 = 3.25 rad/s ccw" in text
    assert "u(rack) = 100 / 1 = 100 mm/s" in shown(tray_rack())


def test_a_roller_on_the_frame_tells_its_centre_s_speed() -> None:
    assert "v_C = omega(C) x r_C/K1 = 100 mm/s towards 0 deg" in shown(soil_roller())


def test_a_driven_block_tells_its_pin_s_speed() -> None:
    points = {"B": 100 + 50j, "C": 160 + 130j, "D": 260 + 130j}
    slide: list[Other] = [("slide", points["B"], "ground", "block", 1 + 0j)]
    pins = {"B": "block rod", "C": "rod lever", "D": "ground lever"}
    model = linkage(points, pins, others=slide, drives=[Drive(link=1, against=0, rate=40.0, kind="slide", joint=3)])
    text = shown(solved(model))
    assert "block slides on the frame at 40 mm/s towards 0 deg, as stated" in text
    assert "v_B = u(block) = 40 mm/s towards 0 deg" in text


def test_links_solved_together_are_a_table_of_coefficients() -> None:
    text = shown(solved(linkage(STEPHENSON_POINTS, STEPHENSON, turn={"lever": 1.5})))
    assert "crank, coupler, rocker and rod: to be solved together" in text
    assert "at C: omega(crank) x r_B/A + omega(coupler) x r_C/B = omega(rocker) x r_C/D" in text
    assert "4 equations in 4 unknowns: x1 = omega(crank), x2 = omega(coupler)" in text
    # C along x: -r_y of each link: B - A = (30, 45), C - B = (100, 35)
    assert re.search(r"C along x +-45 +-35 ", text)
    assert re.search(r"C along y +30 +100 ", text)
    assert "put in, they leave at most " in text


def test_the_figures_of_each_sum_add_up() -> None:
    """'= (a + w x y, b - w x x)' followed by its value, as printed to five digits."""
    text = shown(solved(linkage(STEPHENSON_POINTS, STEPHENSON, turn={"lever": 1.5})))
    number = r"(-?[\d.]+)"
    part = rf"{number} ([+-]) {number} x {number}"
    sums = re.findall(rf"= \({part}, {part}\)\n +=  ?\({number}, {number}\)", text)
    assert sums
    for a, sign, w, y, b, other, _, x, across, up in sums:
        first = float(a) + (1 if sign == "+" else -1) * float(w) * float(y)
        second = float(b) + (1 if other == "+" else -1) * float(w) * float(x)
        assert (first, second) == pytest.approx((float(across), float(up)), rel=1e-3, abs=0.05)


def test_a_relation_between_two_sought_rates_stands_among_the_equations() -> None:
    text = shown(solved(linkage(FOUR_BAR_POINTS, FOUR_BAR, drives=[Drive(link=2, against=1, rate=3.0)])))
    assert "omega(coupler) - omega(crank) = 3 rad/s, as stated" in text
    assert re.search(r"the drive, rad/s +-1 +1 +0 +3\n", text)


def test_a_dead_centre_says_that_there_is_no_triangle() -> None:
    report = inspect_drawing(str(FIXTURES / "tipper-dead-centre.dxf"), Settings()).mechanisms[0]
    text = shown(report)
    assert "no triangle: the known side lies along one of those sought, so v_C = 0" in text
    assert "pole of B-C: its pin C, which has no speed" in text


def test_a_translating_link_has_no_pole_and_hands_on_its_velocity() -> None:
    text = shown(inspect_drawing(str(FIXTURES / "shelf-leveller.dxf"), Settings()).mechanisms[0])
    assert "so v_C/B = 0" in text
    assert "v_E = v_B = 180 mm/s towards 155 deg, as B-C-E does not turn" in text
    assert "B-C-E has no pole: all its points have one velocity" in text


def test_a_linkage_at_rest_is_said_to_be() -> None:
    text = shown(solved(linkage(FOUR_BAR_POINTS, FOUR_BAR, turn={"crank": 0.0})))
    assert "coupler is at rest" in text
    assert text.endswith("Nothing moves")


def test_too_many_unknowns_are_counted_only() -> None:
    text = " ".join(shown(solved(scissor_lattice(40, driven=39))).split())
    assert "41 links: to be solved together" in text
    assert "unknowns hang together: too many to solve by hand" in text


def test_where_there_is_no_working_it_says_why() -> None:
    assert shown(press().mechanisms[0]) == "  Working: none, as the drives do not settle all speeds"
    truss = inspect_drawing(str(FIXTURES / "bench-truss.dxf"), Settings()).mechanisms[0]
    assert shown(truss) == "  Working: none, as the mechanism cannot move"


@pytest.mark.parametrize("path", sorted(FIXTURES.glob("*.dxf")), ids=lambda path: path.stem)
def test_every_line_fits_and_every_figure_is_finite(path: Path) -> None:
    for mechanism in inspect_drawing(str(path), Settings()).mechanisms:
        text = shown(mechanism, legend=True)
        assert all(len(line) <= 80 for line in text.splitlines())
        assert "nan" not in text
        assert "inf" not in text
        assert not re.search(r"size/sin\D*\b0\n", text)


def test_the_sines_of_the_printed_angles_give_the_printed_ratios() -> None:
    rows = re.findall(r"v_\S+ +([\d.]+) +-?[\d.]+ +([\d.]+) +([\d.]+)\n", shown(tipper().mechanisms[0]))
    assert len(rows) == 3
    for size, angle, ratio in rows:
        assert float(size) / math.sin(math.radians(float(angle))) == pytest.approx(float(ratio), rel=1e-4)


def test_check_prints_the_working_after_the_tables_where_asked(capsys: pytest.CaptureFixture[str]) -> None:
    path = str(FIXTURES / "transfer-sheet.dxf")
    assert main(["check", path]) == 0
    assert "Working" not in capsys.readouterr().out
    assert main(["check", path, "--working"]) == 0
    out = capsys.readouterr().out
    assert out.index("M1: ") < out.index("Working, M1") < out.index("M2: ") < out.index("Working, M2")
    assert out.count("By relative velocities") == 1
    assert "no forces, strength, clearance or guarding" in " ".join(out.split())


@pytest.mark.parametrize("other", [["--quiet"], ["--json", "-"]], ids=["quiet", "json"])
def test_a_working_that_could_not_be_printed_is_refused(other: list[str], capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["check", "any.dxf", "--working", *other]) == 2
    error = capsys.readouterr().err
    assert "working" in error
    assert error.count("\n") == 1
