"""The demonstration drawings give the figures of closed forms that share no code with the program.

Four-bar: from the loop equation a e^(i t2) + b e^(i t3) = d + c e^(i t4), differentiated and turned by -t4 or -t3
(Norton, Design of Machinery, sec. 6.7). Dyads: the velocities of a rigid bar's ends have equal parts along the bar.
"""

from __future__ import annotations

import cmath
import math
import subprocess
import sys
from pathlib import Path

import ezdxf
import pytest

from dxfcheck.inspection import DrawingReport, MechanismReport, inspect_drawing
from dxfcheck.settings import Settings
from fixtures.drafting import mechanisms

FIXTURES = Path(__file__).parent.parent / "fixtures"
TIPPERS = (
    "tray-tipper",
    "tray-tipper-blocks",
    "tray-tipper-polylines",
    "tray-tipper-r12",
    "tray-tipper-trimmed-symbols",
)


def inspect(name: str) -> DrawingReport:
    return inspect_drawing(str(FIXTURES / f"{name}.dxf"), Settings())


def only(name: str) -> MechanismReport:
    (mechanism,) = inspect(name).mechanisms
    return mechanism


def turning(mechanism: MechanismReport) -> dict[str, float | None]:
    pairs = zip(mechanism.linkage.links, mechanism.analysis.links, strict=True)
    return {link.name: motion.angular_velocity for link, motion in pairs if link.kind != "frame"}


def velocities(mechanism: MechanismReport) -> dict[str, complex | None]:
    pairs = zip(mechanism.linkage.pins, mechanism.analysis.pins, strict=True)
    return {pin.name: motion.velocity for pin, motion in pairs}


def counts(mechanism: MechanismReport) -> tuple[int, int, int, int]:
    mobility = mechanism.analysis.mobility
    return mobility.count, mobility.links, mobility.full_joints, mobility.at_pose


def four_bar_rates(crank: complex, coupler: complex, rocker: complex, rate: float) -> tuple[float, float]:
    """rad/s of coupler and rocker; the vectors run A to B, B to C, D to C."""
    angle_crank, angle_coupler, angle_rocker = cmath.phase(crank), cmath.phase(coupler), cmath.phase(rocker)
    coupler_rate = -abs(crank) * rate * math.sin(angle_crank - angle_rocker)
    rocker_rate = abs(crank) * rate * math.sin(angle_crank - angle_coupler)
    return (
        coupler_rate / (abs(coupler) * math.sin(angle_coupler - angle_rocker)),
        rocker_rate / (abs(rocker) * math.sin(angle_rocker - angle_coupler)),
    )


def along(vector: complex, direction: complex) -> float:
    return (vector * direction.conjugate()).real


def close(expected: object) -> object:
    return pytest.approx(expected, rel=1e-9, abs=1e-9)


@pytest.mark.parametrize("name", TIPPERS)
def test_every_drafters_tray_tipper_gives_the_same_figures(name: str) -> None:
    points = mechanisms.TRAY_TIPPER.points
    crank, coupler = points["B"] - points["A"], points["C"] - points["B"]
    rocker = points["C"] - points["D"]
    coupler_rate, rocker_rate = four_bar_rates(crank, coupler, rocker, 10.0)
    tipper = only(name)
    assert counts(tipper) == (1, 4, 4, 1)
    assert turning(tipper) == close({"A-B": 10.0, "B-C": coupler_rate, "C-D": rocker_rate})
    assert velocities(tipper) == close({"A": 0j, "B": 10j * crank, "C": 1j * rocker_rate * rocker, "D": 0j})


def test_tray_tipper_sheet_has_nothing_wrong_on_it() -> None:
    report = inspect("tray-tipper")
    assert report.findings == ()
    assert report.unit is not None
    assert report.unit.name == "mm"


def test_seedling_gripper_is_solved_though_no_dyad_is_solvable_alone() -> None:
    """Solved backwards: at 1 rad/s of AB the four-bar and then FG follow; the whole is scaled to FG's -4 rad/s."""
    points = mechanisms.SEEDLING_GRIPPER.points
    crank, rocker = points["B"] - points["A"], points["C"] - points["D"]
    coupler_rate, rocker_rate = four_bar_rates(crank, points["C"] - points["B"], rocker, 1.0)
    corner = 1j * crank + 1j * coupler_rate * (points["E"] - points["B"])
    rod, arm = points["F"] - points["E"], points["F"] - points["G"]
    arm_rate = along(corner, rod) / along(1j * arm, rod)
    rod_rate = ((1j * arm_rate * arm - corner) / (1j * rod)).real
    scale = -4.0 / arm_rate
    gripper = only("seedling-gripper")
    expected = {"A-B": 1.0, "B-C-E": coupler_rate, "C-D": rocker_rate, "E-F": rod_rate, "F-G": arm_rate}
    assert counts(gripper) == (1, 6, 7, 1)
    assert turning(gripper) == close({link: rate * scale for link, rate in expected.items()})


def test_pot_placers_clamp_moves_by_both_drives() -> None:
    points = mechanisms.POT_PLACER.points
    left, right = 3j * (points["B"] - points["A"]), -2j * (points["D"] - points["E"])
    first, second = points["C"] - points["B"], points["C"] - points["D"]
    left_part, right_part = along(left, first), along(right, second)
    # Cramer's rule on v . first = left_part, v . second = right_part
    area = (first.conjugate() * second).imag
    clamp = complex(
        (left_part * second.imag - right_part * first.imag) / area,
        (right_part * first.real - left_part * second.real) / area,
    )
    placer = only("pot-placer")
    assert counts(placer) == (2, 5, 5, 2)
    assert velocities(placer)["C"] == close(clamp)
    assert turning(placer)["B-C"] == close(((clamp - left) / (1j * first)).real)
    assert turning(placer)["C-D"] == close(((clamp - right) / (1j * second)).real)


def test_leaf_fan_has_two_joints_at_its_pin_of_three_links() -> None:
    points = mechanisms.LEAF_FAN.points
    crank, rocker = points["B"] - points["A"], points["C"] - points["D"]
    rate = 120 * 2 * math.pi / 60
    _, rocker_rate = four_bar_rates(crank, points["C"] - points["B"], rocker, rate)
    rod, arm = points["E"] - points["C"], points["E"] - points["F"]
    arm_rate = along(1j * rocker_rate * rocker, rod) / along(1j * arm, rod)
    fan = only("leaf-fan")
    joint_pins = [fan.linkage.pins[joint.pin].name for joint in fan.linkage.joints if joint.pin is not None]
    assert counts(fan) == (1, 6, 7, 1)
    assert joint_pins.count("C") == 2
    assert turning(fan)["C-D"] == close(rocker_rate)
    assert turning(fan)["E-F"] == close(arm_rate)


def test_shelf_leveller_moves_against_its_count() -> None:
    leveller = only("shelf-leveller")
    assert counts(leveller) == (0, 5, 6, 1)
    assert leveller.analysis.mobility.redundant == 1
    assert turning(leveller) == close({"A-B": 2.0, "B-C-E": 0.0, "C-D": 2.0, "E-F": 2.0})
    assert "special-geometry" in {finding.rule for finding in inspect("shelf-leveller").findings}


def test_bench_truss_does_not_move() -> None:
    assert counts(only("bench-truss")) == (0, 3, 3, 0)
    assert "no-motion" in {finding.rule for finding in inspect("bench-truss").findings}


def test_rocker_stands_still_at_the_dead_centre() -> None:
    tipper = only("tipper-dead-centre")
    assert counts(tipper) == (1, 4, 4, 1)
    # stretched in line, C is the coupler's pole: its rate is -AB/BC of the crank's
    assert turning(tipper) == close({"A-B": 10.0, "B-C": -10.0 / 3, "C-D": 0.0})
    assert "dead-centre" in {finding.rule for finding in inspect("tipper-dead-centre").findings}


def test_transfer_sheet_holds_two_mechanisms_from_left_to_right() -> None:
    first, second = inspect("transfer-sheet").mechanisms
    points = mechanisms.TRANSFER_SHEET.points
    crank, rocker = points["F"] - points["E"], points["G"] - points["H"]
    coupler_rate, rocker_rate = four_bar_rates(crank, points["G"] - points["F"], rocker, -5.0)
    assert (first.linkage.name, second.linkage.name) == ("M1", "M2")
    assert turning(first)["A-B"] == close(10.0)
    assert turning(second) == close({"E-F": -5.0, "F-G": coupler_rate, "G-H": rocker_rate})


@pytest.mark.parametrize("name", ["parts-only", "wiring-like"])
def test_sheets_of_other_trades_hold_no_linkage_and_no_error(name: str) -> None:
    report = inspect(name)
    assert report.mechanisms == ()
    assert "no-linkage" in {finding.rule for finding in report.findings}
    assert "error" not in {finding.severity for finding in report.findings}


def test_the_drawings_in_the_repository_are_those_of_the_script(tmp_path: Path) -> None:
    subprocess.run([sys.executable, str(FIXTURES / "draw.py"), str(tmp_path)], check=True)
    drawn = sorted(path.relative_to(tmp_path) for path in tmp_path.rglob("*.dxf"))
    assert drawn == sorted(path.relative_to(FIXTURES) for path in FIXTURES.rglob("*.dxf"))
    for name in ("tray-tipper.dxf", "seedling-gripper.dxf", "rules/near-miss-bad.dxf"):
        fresh, kept = (ezdxf.readfile(folder / name).modelspace() for folder in (tmp_path, FIXTURES))
        assert [entity.dxfattribs() for entity in fresh] == [entity.dxfattribs() for entity in kept]
