"""The demonstration drawings that slide and roll give the figures of closed forms that share no code with the program.

Rigid bars: the velocities of the two ends have equal parts along the bar. Slider-crank, slotted lever and planetary
train: see tests/closed_forms.py.
"""

from __future__ import annotations

import math
from collections import Counter

import pytest

from dxfcheck.analysis.results import JointMotion
from dxfcheck.inspection import MechanismReport
from dxfcheck.linkage import Joint
from fixtures.drafting import mechanisms_gears, mechanisms_slides, slot_direction
from tests.closed_forms import RPM, four_bar_rates, slider_crank, slotted_lever, willis
from tests.test_fixtures import along, close, inspect, only, turning, velocities

PLANS = {
    "dibber-in-line": mechanisms_slides.DIBBER_IN_LINE,
    "dibber-offset": mechanisms_slides.DIBBER_OFFSET,
    "laser-cut-bars": mechanisms_gears.LASER_CUT_BARS,
    "lift-table": mechanisms_slides.LIFT_TABLE,
    "mixer": mechanisms_gears.MIXER,
    "picker": mechanisms_gears.PICKER,
    "seed-shuttle": mechanisms_slides.SEED_SHUTTLE,
    "soil-press": mechanisms_slides.SOIL_PRESS,
    "tray-gate": mechanisms_slides.TRAY_GATE,
    "tray-indexer": mechanisms_slides.TRAY_INDEXER,
    "tray-rack": mechanisms_gears.TRAY_RACK,
}


def count(mechanism: MechanismReport) -> tuple[int, int, int, int, int]:
    """Mobility, links, full and half joints, freedom at the pose."""
    mobility = mechanism.analysis.mobility
    return mobility.count, mobility.links, mobility.full_joints, mobility.half_joints, mobility.at_pose


def kinds(mechanism: MechanismReport) -> dict[str, int]:
    return dict(Counter(joint.kind for joint in mechanism.linkage.joints))


def joints(mechanism: MechanismReport) -> list[tuple[Joint, JointMotion]]:
    return list(zip(mechanism.linkage.joints, mechanism.analysis.joints, strict=True))


def slide_speed(mechanism: MechanismReport, link: str, against: str) -> float | None:
    """Speed of a link against another along the direction of the slide or slot between them."""
    names = [each.name for each in mechanism.linkage.links]
    for joint, motion in joints(mechanism):
        if joint.kind in ("slide", "pin in slot") and {names[joint.first], names[joint.second]} == {link, against}:
            speed = motion.slide_speed
            return speed if speed is None or names[joint.second] == link else -speed
    raise LookupError(link, against)


def rod_end(velocity: complex, start: complex, end: complex, way: complex) -> tuple[complex, float]:
    """Velocity of a rod's end that can only go along ``way``, and the rod's rate, from the velocity of its start."""
    rod = end - start
    moved = way * along(velocity, rod) / along(way, rod)
    return moved, ((moved - velocity) / (1j * rod)).real


@pytest.mark.parametrize("name", PLANS)
def test_a_sheet_without_faults_has_no_error_or_warning_but_for_its_unit(name: str) -> None:
    grave = {finding.rule for finding in inspect(name).findings if finding.severity != "note"}
    assert grave <= {"units-missing"}


@pytest.mark.parametrize("name", PLANS)
def test_links_are_named_by_their_pins_blocks_and_wheels(name: str) -> None:
    names = [link.name for link in only(name).linkage.links if link.kind != "frame"]
    assert sorted(names) == sorted(PLANS[name].link_names())


def test_soil_press_drives_its_ram_through_the_knee() -> None:
    points, rate = mechanisms_slides.SOIL_PRESS.points, 30 * RPM
    pin = 1j * rate * (points["B"] - points["A"])
    knee, rod_rate = rod_end(pin, points["B"], points["C"], 1j * (points["C"] - points["D"]))
    ram, link_rate = rod_end(knee, points["C"], points["E"], 1j)
    press = only("soil-press")
    assert count(press) == (1, 6, 7, 0, 1)
    assert kinds(press) == {"pin": 6, "slide": 1}
    assert turning(press) == close(
        {
            "A-B": rate,
            "B-C": rod_rate,
            "C-D": (knee / (1j * (points["C"] - points["D"]))).real,
            "C-E": link_rate,
            "block at E": 0.0,
        }
    )
    assert slide_speed(press, "block at E", "frame") == close(ram.imag)


def test_seed_shuttles_block_slides_on_the_lever_that_it_turns() -> None:
    points, rate = mechanisms_slides.SEED_SHUTTLE.points, -60 * RPM
    pin = 1j * rate * (points["B"] - points["A"])
    lever_rate, slip = slotted_lever(points["D"], points["B"], pin)
    end = 1j * lever_rate * (points["C"] - points["D"])
    block, rod_rate = rod_end(end, points["C"], points["E"], 1)
    shuttle = only("seed-shuttle")
    assert count(shuttle) == (1, 6, 7, 0, 1)
    assert kinds(shuttle) == {"pin": 5, "slide": 2}
    rates = {"A-B": rate, "C-D": lever_rate, "C-E": rod_rate, "block at B": lever_rate, "block at E": 0.0}
    assert turning(shuttle) == close(rates)
    assert slide_speed(shuttle, "block at B", "C-D") == close(slip)
    assert slide_speed(shuttle, "block at E", "frame") == close(block.real)


def test_lift_table_rises_level_as_its_telescope_extends() -> None:
    """By s^2 = (L cos(t) / 4)^2 + (0.45 L sin(t))^2 and h = L sin(t) for the telescope and the table's height."""
    arm, lean, extension = 300.0, math.radians(35), 50.0
    length = arm * math.hypot(math.cos(lean) / 4, 0.45 * math.sin(lean))
    rate = length * extension / (arm**2 * (0.45**2 - 0.25**2) * math.sin(lean) * math.cos(lean))
    rise, spread = arm * math.cos(lean) * rate, -arm * math.sin(lean) * rate
    lift = only("lift-table")
    rates, moving = turning(lift), velocities(lift)
    assert count(lift) == (1, 7, 8, 1, 1)
    assert kinds(lift) == {"pin": 6, "slide": 2, "pin in slot": 1}
    assert {name: rates[name] for name in ("A-D-E-M", "B-C-F-M", "C-T", "block at B")} == close(
        {"A-D-E-M": rate, "B-C-F-M": -rate, "C-T": 0.0, "block at B": 0.0}
    )
    assert moving["C"] == close(1j * rise)
    assert moving["T"] == close(1j * rise)
    assert moving["D"] == close(spread + 1j * rise)
    assert moving["B"] == close(spread)


@pytest.mark.parametrize(
    ("name", "crank", "rod", "offset", "angle", "rate", "upwards"),
    [
        pytest.param("dibber-in-line", 60, 180, 0, 55, 90 * RPM, -1, id="in line, downwards"),
        pytest.param("dibber-offset", 50, 165.5, -22.5, 65, -8, 1, id="offset, on a slope"),
    ],
)
def test_dibbers_are_slider_cranks(
    name: str, crank: float, rod: float, offset: float, angle: float, rate: float, upwards: int
) -> None:
    _, _, rod_rate, speed = slider_crank(crank, rod, offset, math.radians(angle), rate)
    dibber = only(name)
    assert count(dibber) == (1, 4, 4, 0, 1)
    assert kinds(dibber) == {"pin": 3, "slide": 1}
    assert turning(dibber) == close({"A-B": rate, "B-C": rod_rate, "block at C": 0.0})
    assert slide_speed(dibber, "block at C", "frame") == close(upwards * speed)


def test_tray_indexers_crank_pin_slides_in_the_levers_slot() -> None:
    points, rate = mechanisms_slides.TRAY_INDEXER.points, 3.0
    pin = 1j * rate * (points["B"] - points["A"])
    lever_rate, slip = slotted_lever(points["D"], points["B"], pin)
    carrier, rod_rate = rod_end(1j * lever_rate * (points["E"] - points["D"]), points["E"], points["F"], 1)
    indexer = only("tray-indexer")
    assert count(indexer) == (1, 5, 5, 1, 1)
    assert kinds(indexer) == {"pin": 4, "slide": 1, "pin in slot": 1}
    assert turning(indexer) == close({"A-B": rate, "D-E": lever_rate, "E-F": rod_rate, "block at F": 0.0})
    assert slide_speed(indexer, "A-B", "D-E") == close(slip)
    assert slide_speed(indexer, "block at F", "frame") == close(carrier.real)


def test_tray_gates_pin_follows_the_curved_slot() -> None:
    plan, rate = mechanisms_slides.TRAY_GATE, -1.5
    points = plan.points
    tangent = slot_direction(plan.slots[0], points["C"])
    led, rod_rate = rod_end(1j * rate * points["B"], points["B"], points["C"], tangent)
    gate = only("tray-gate")
    assert count(gate) == (1, 3, 2, 1, 1)
    assert kinds(gate) == {"pin": 2, "pin in slot": 1}
    assert turning(gate) == close({"A-B": rate, "B-C-T": rod_rate})
    assert velocities(gate)["C"] == close(led)


def test_seed_meters_yoke_moves_as_the_crank_pins_shadow() -> None:
    """x = r cos(t) for the yoke, y = r sin(t) for the pin in its slot."""
    angle, rate = math.radians(50), 4.0
    meter = only("seed-meter")
    assert count(meter) == (1, 3, 2, 1, 1)
    assert kinds(meter) == {"pin": 1, "slide": 1, "pin in slot": 1}
    speeds = {joint.kind: motion.slide_speed for joint, motion in joints(meter)}
    assert speeds["slide"] == close(-40 * rate * math.sin(angle))
    assert abs(speeds["pin in slot"] or 0.0) == close(40 * rate * math.cos(angle))


def test_pickers_gears_turn_its_arms_against_one_another() -> None:
    points = mechanisms_gears.PICKER.points
    other = -2.0 * 0.4 / 0.6
    left, right = 2j * (points["B"] - points["A"]), 1j * other * (points["D"] - points["E"])
    first, second = points["C"] - points["B"], points["C"] - points["D"]
    # v . first = left . first and v . second = right . second, by Cramer's rule
    area = (first.conjugate() * second).imag
    claw = 1j * (along(right, second) * first - along(left, first) * second) / area
    picker = only("picker")
    assert count(picker) == (1, 5, 5, 1, 1)
    assert kinds(picker) == {"pin": 5, "rolling": 1}
    assert {name: turning(picker)[name] for name in ("A-B", "D-E")} == close({"A-B": 2.0, "D-E": other})
    assert velocities(picker)["C"] == close(claw)


def test_mixers_planet_turns_by_the_equation_of_willis() -> None:
    mixer = only("mixer")
    assert count(mixer) == (1, 4, 3, 2, 1)
    assert kinds(mixer) == {"pin": 3, "rolling": 2}
    rates = {"A-P": 6.0, "P-Q": 6.0 * (1 - 90 / 30), "A": willis(30, 90, 6.0, 0.0)}
    assert turning(mixer) == close(rates)


def test_tray_rack_is_moved_by_the_small_ring_of_the_compound_wheel() -> None:
    wheel = -5.0 * 40 / 60
    rack = only("tray-rack")
    assert count(rack) == (1, 4, 3, 2, 1)
    assert kinds(rack) == {"pin": 2, "slide": 1, "rolling": 2}
    assert turning(rack) == close({"A-B": 5.0, "C": wheel, "block at D": 0.0})
    assert slide_speed(rack, "block at D", "frame") == close(25 * wheel)


def test_laser_cut_bars_move_as_the_tray_tipper_does() -> None:
    points = mechanisms_gears.LASER_CUT_BARS.points
    coupler, rocker = four_bar_rates(points["A"], points["B"], points["C"], points["D"], 10.0)
    bars = only("laser-cut-bars")
    assert count(bars) == (1, 4, 4, 0, 1)
    assert turning(bars) == close({"A-B": 10.0, "B-C-E": coupler, "C-D": rocker})
    traced = 10j * points["B"] + 1j * coupler * (points["E"] - points["B"])
    assert velocities(bars)["E"] == close(traced)
