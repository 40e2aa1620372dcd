"""What becomes of drives: taken, repeated, contradicting, at the limit, and what stays unknown."""

from __future__ import annotations

import cmath
import math
from collections.abc import Callable
from dataclasses import replace

import pytest

from dxfcheck.analysis import analyse
from dxfcheck.analysis.results import Analysis
from dxfcheck.linkage import Drive, Linkage
from tests.closed_forms import circles_meet
from tests.drive_models import FORE, LEAN, LEG, REAR, carriage, drive, hoist, lift_table, shuttle
from tests.examples import FOUR_BAR, FOUR_BAR_POINTS, WATT, WATT_POINTS
from tests.model import Other, Solved, linkage

FIVE_BAR_POINTS = {"A": 0j, "B": -20 + 70j, "C": 60 + 120j, "D": 140 + 60j, "E": 110 + 0j}
FIVE_BAR = {"A": "ground a", "B": "a b", "C": "b c", "D": "c d", "E": "ground d"}
SLIDER_POINTS = {"O": 0j, "B": 30 + 40j, "P": 150 + 0j}
SLIDER_PINS = {"O": "ground crank", "B": "crank rod", "P": "rod block"}


def outcomes(analysis: Analysis) -> list[str]:
    return [verdict.outcome for verdict in analysis.drives]


def four_bar(*drives: tuple[int, float]) -> Linkage:
    return linkage(FOUR_BAR_POINTS, FOUR_BAR, drives=[Drive(link=link, against=0, rate=rate) for link, rate in drives])


def in_line(bend: float = 0.0) -> dict[str, complex]:
    """Four-bar whose coupler and rocker are in line but for a bend at C; the crank is A-B."""
    b, c = 20 + 35j, 100 + 60j
    away = (c - b) * complex(math.cos(bend), math.sin(bend))
    return {"A": 0j, "B": b, "C": c, "D": c + away * 0.8}


def test_one_drive_is_taken_and_solves_the_linkage() -> None:
    analysis = analyse(four_bar((1, 2.0)))
    assert outcomes(analysis) == ["taken"]
    assert analysis.solved
    assert analysis.drives[0].implied is None
    assert analysis.links[0].angular_velocity == 0.0
    assert analysis.links[0].determined
    assert analysis.links[0].pole is None


def test_second_drive_that_agrees_repeats() -> None:
    rate = Solved(four_bar((1, 2.0))).turn("rocker")
    analysis = analyse(four_bar((1, 2.0), (3, rate * 1.001)))
    assert outcomes(analysis) == ["taken", "repeats"]
    assert analysis.drives[1].implied == pytest.approx(rate)
    assert analysis.solved


def test_second_drive_that_contradicts_is_left_out() -> None:
    rate = Solved(four_bar((1, 2.0))).turn("rocker")
    analysis = analyse(four_bar((1, 2.0), (3, rate * 1.1)))
    assert outcomes(analysis) == ["taken", "conflict"]
    assert analysis.drives[1].implied == pytest.approx(rate)
    assert not analysis.solved
    assert analysis.links[3].angular_velocity == pytest.approx(rate)


def test_crank_cannot_drive_coupler_and_rocker_in_line() -> None:
    analysis = analyse(linkage(in_line(), FOUR_BAR, turn={"crank": 1.0}))
    assert outcomes(analysis) == ["at limit"]
    assert analysis.drives[0].implied == 0.0
    assert not analysis.solved
    assert analysis.disagreement is None
    assert analysis.links[1].angular_velocity == pytest.approx(0.0, abs=1e-12)
    assert analysis.links[3].angular_velocity is None


def test_a_dead_centre_typed_to_two_decimals_is_one() -> None:
    points = {name: complex(round(at.real, 2), round(at.imag, 2)) for name, at in in_line().items()}
    analysis = analyse(linkage(points, FOUR_BAR, turn={"crank": 1.0}))
    assert outcomes(analysis) == ["at limit"]


def test_half_a_degree_before_it_the_crank_still_drives() -> None:
    analysis = analyse(linkage(in_line(math.radians(0.5)), FOUR_BAR, turn={"crank": 1.0}))
    assert outcomes(analysis) == ["taken"]
    assert analysis.solved


def test_rate_of_zero_at_the_limit_agrees() -> None:
    analysis = analyse(linkage(in_line(), FOUR_BAR, turn={"crank": 0.0, "rocker": 1.0}))
    assert outcomes(analysis) == ["repeats", "taken"]
    assert analysis.solved


def test_link_of_a_structure_is_at_its_limit() -> None:
    points = {"A": 0j, "B": 50 + 80j, "C": 100 + 0j}
    analysis = analyse(linkage(points, {"A": "ground a", "B": "a b", "C": "ground b"}, turn={"a": 1.0}))
    assert outcomes(analysis) == ["at limit"]
    assert [link.determined for link in analysis.links] == [True, True, True]


def test_two_freedoms_and_one_drive_leave_links_unknown() -> None:
    analysis = analyse(linkage(FIVE_BAR_POINTS, FIVE_BAR, turn={"a": 1.0}))
    assert outcomes(analysis) == ["taken"]
    assert not analysis.solved
    assert analysis.links[1].angular_velocity == pytest.approx(1.0)
    assert [link.angular_velocity for link in analysis.links[2:]] == [None, None, None]
    assert analysis.pins[1].velocity == pytest.approx(-70 - 20j)
    assert analysis.pins[2].velocity is None
    assert analysis.joints[2].relative_angular_velocity is None
    assert analysis.joints[2].rubbing_speed is None
    assert analysis.disagreement is not None
    assert analysis.disagreement < 1e-9


def test_two_freedoms_and_two_drives_are_solved() -> None:
    analysis = analyse(linkage(FIVE_BAR_POINTS, FIVE_BAR, turn={"a": 1.0, "d": -2.0}))
    assert outcomes(analysis) == ["taken", "taken"]
    assert analysis.solved
    assert analysis.disagreement is not None
    assert analysis.disagreement < 1e-9


def test_relative_turn_can_be_known_where_neither_link_is() -> None:
    """The drive says how b turns against a; a itself is free."""
    drive = Drive(link=2, against=1, rate=3.0)
    analysis = analyse(linkage({"A": 0j, "B": 50 + 20j}, {"A": "ground a", "B": "a b"}, drives=[drive]))
    assert outcomes(analysis) == ["taken"]
    assert not analysis.solved
    assert analysis.links[2].angular_velocity is None
    assert analysis.joints[1].relative_angular_velocity == pytest.approx(3.0)


def test_without_drives_nothing_is_known_but_the_frame() -> None:
    analysis = analyse(four_bar())
    assert not analysis.solved
    assert [link.determined for link in analysis.links] == [True, False, False, False]
    assert analysis.disagreement is None
    assert analysis.pins[0].velocity == 0j
    assert analysis.pins[1].velocity is None


def test_driven_slide_moves_the_crank() -> None:
    slide: list[Other] = [("slide", 150 + 0j, "ground", "block", 1 + 0j)]
    drive = Drive(link=3, against=0, rate=-12.0, kind="slide", joint=3)
    by_slide = Solved(linkage(SLIDER_POINTS, SLIDER_PINS, others=slide, drives=[drive]))
    assert by_slide.analysis.solved
    assert by_slide.velocity("P") == pytest.approx(-12.0)
    back = Solved(linkage(SLIDER_POINTS, SLIDER_PINS, others=slide, turn={"crank": by_slide.turn("crank")}))
    assert back.velocity("P") == pytest.approx(-12.0)
    assert by_slide.analysis.disagreement is not None
    assert by_slide.analysis.disagreement < 1e-9


def test_slide_driven_from_either_side_of_the_joint() -> None:
    slide: list[Other] = [("slide", 150 + 0j, "block", "ground", 1 + 0j)]
    drive = Drive(link=3, against=0, rate=5.0, kind="slide", joint=3)
    case = Solved(linkage(SLIDER_POINTS, SLIDER_PINS, others=slide, drives=[drive]))
    assert case.velocity("P") == pytest.approx(5.0)
    assert case.analysis.joints[3].slide_speed == pytest.approx(-5.0)
    assert case.analysis.disagreement is not None
    assert case.analysis.disagreement < 1e-9


def test_block_translates_and_has_no_pole() -> None:
    slide: list[Other] = [("slide", 150 + 0j, "ground", "block", 1 + 0j)]
    analysis = analyse(linkage(SLIDER_POINTS, SLIDER_PINS, others=slide, turn={"crank": 2.0}))
    assert analysis.links[3].angular_velocity == pytest.approx(0.0, abs=1e-12)
    assert analysis.links[3].pole is None
    assert analysis.links[2].pole == pytest.approx(150 + 200j)


def test_coupler_of_a_parallelogram_has_no_pole() -> None:
    points = {"A": 0j, "B": 30 + 60j, "C": 130 + 60j, "D": 100 + 0j}
    analysis = analyse(linkage(points, FOUR_BAR, turn={"crank": 2.0}))
    assert analysis.links[2].pole is None
    assert analysis.links[2].angular_velocity == pytest.approx(0.0, abs=1e-12)
    assert analysis.links[3].pole == pytest.approx(100.0)


def test_redundant_crank_typed_to_two_decimals_still_moves() -> None:
    turned = complex(math.cos(0.3), math.sin(0.3))
    pins = {"A": "ground a", "B": "a b", "C": "b c", "D": "ground c", "E": "b d", "F": "ground d"}
    exact = {"A": 0j, "B": 30 + 60j, "C": 130 + 60j, "D": 100 + 0j, "E": 80 + 60j, "F": 50 + 0j}
    points = {name: complex(round((at * turned).real, 2), round((at * turned).imag, 2)) for name, at in exact.items()}
    analysis = analyse(linkage(points, pins, turn={"a": 1.0}))
    assert (analysis.mobility.count, analysis.mobility.at_pose, analysis.mobility.redundant) == (0, 1, 1)
    assert analysis.rank_gap is not None
    assert analysis.rank_gap[0] > 1e-3
    assert 0.0 < analysis.rank_gap[1] < 1e-4
    assert analysis.solved
    assert analysis.links[3].angular_velocity == pytest.approx(1.0, rel=1e-3)


def test_crank_wrong_by_a_third_of_a_millimetre_locks() -> None:
    pins = {"A": "ground a", "B": "a b", "C": "b c", "D": "ground c", "E": "b d", "F": "ground d"}
    points = {"A": 0j, "B": 30 + 60j, "C": 130 + 60j, "D": 100 + 0j, "E": 80.3 + 60j, "F": 50 + 0j}
    assert analyse(linkage(points, pins)).mobility.at_pose == 0


def test_assembly_without_a_frame_gets_counts_and_no_speeds() -> None:
    model = replace(four_bar((1, 2.0)), grounded=False)
    analysis = analyse(model)
    assert analysis.mobility.at_pose == 1
    assert analysis.loops == ((0, 1, 2, 3),)
    assert not analysis.solved
    assert {link.angular_velocity for link in analysis.links} == {None}
    assert {pin.velocity for pin in analysis.pins} == {None}
    assert {joint.relative_angular_velocity for joint in analysis.joints} == {None}
    assert outcomes(analysis) == ["not judged"]


def test_lone_crank_is_solved_without_a_loop() -> None:
    points = {"A": 5 + 5j, "B": 25 + 5j}
    analysis = analyse(linkage(points, {"A": "ground crank"}, tracing={"B": "crank"}, turn={"crank": 3.0}))
    assert analysis.solved
    assert analysis.loops == ()
    assert analysis.pins[1].velocity == pytest.approx(60j)
    assert analysis.disagreement is not None
    assert analysis.disagreement < 1e-9


def test_no_joint_at_all() -> None:
    analysis = analyse(linkage({"A": 0j, "B": 10 + 0j}, {}, tracing={"A": "rod", "B": "rod"}))
    assert analysis.mobility.at_pose == 3
    assert analysis.rank_gap is None
    assert not analysis.solved


def test_tiny_crank_on_a_long_sheet_is_not_locked() -> None:
    """An eccentric of 1 in 20,000: each link is scaled by its own size."""
    b = 0.6 + 0.8j
    c = circles_meet(b, 20000.0, 19000.0 + 0j, 9000.0, left=True)
    points = {"A": 0j, "B": b, "C": c, "D": 19000 + 0j}
    case = Solved(linkage(points, FOUR_BAR, turn={"crank": 10.0}))
    assert case.analysis.mobility.at_pose == 1
    assert case.analysis.solved
    assert abs(case.velocity("B")) == pytest.approx(10.0)


def test_locked_part_beside_a_free_part() -> None:
    """A triangle of bars on the six-bar's frame rests whatever is driven."""
    points = {**WATT_POINTS, "S": -100 + 0j, "T": -50 + 80j, "U": -10 + 5j}
    analysis = analyse(linkage(points, {**WATT, "S": "ground s", "T": "s t", "U": "ground t"}))
    assert [link.determined for link in analysis.links] == [True, False, False, False, False, False, True, True]
    assert analysis.links[6].angular_velocity == pytest.approx(0.0, abs=1e-12)


def test_slow_crank_at_its_own_dead_centre_drives() -> None:
    """A crank in line with one rod drives, through another, levers whose ends run thousands of times as fast."""
    points = {"A": 0j, "S": 3 + 0j, "T": 9 + 0.003j, "U": 12 - 5j}
    pins = {"A": "ground crank", "S": "crank rod", "T": "rod rocker", "U": "ground rocker", "B0": "crank rod0"}
    points["B0"] = 1j
    for stage in range(3):
        start = points[f"B{stage}"]
        points |= {f"C{stage}": start + 20, f"D{stage}": start + 20 - 1j, f"B{stage + 1}": start + 20 + 59j}
        pins[f"C{stage}"] = f"rod{stage} lever{stage}"
        pins[f"D{stage}"] = f"ground lever{stage}"
        pins[f"B{stage + 1}"] = f"lever{stage} rod{stage + 1}"
    points["E"] = points["B3"] + 20
    points["F"] = points["E"] - 60j
    pins |= {"E": "rod3 last", "F": "ground last"}
    analysis = analyse(linkage(points, pins, turn={"crank": 1.0}))
    assert [centre.driven for centre in analysis.dead_centres] == [1]
    assert outcomes(analysis) == ["taken"]
    assert analysis.solved


def test_sliding_drive_without_its_slide_is_refused() -> None:
    drive = Drive(link=1, against=0, rate=1.0, kind="slide", stated="v = 1")
    with pytest.raises(ValueError, match="v = 1"):
        analyse(linkage(FOUR_BAR_POINTS, FOUR_BAR, drives=[drive]))


def test_drive_of_one_moving_link_against_another() -> None:
    drive = Drive(link=2, against=1, rate=2.0)
    case = Solved(linkage(FOUR_BAR_POINTS, FOUR_BAR, drives=[drive]))
    assert case.turn("coupler") - case.turn("crank") == pytest.approx(2.0)
    assert case.analysis.joints[1].relative_angular_velocity == pytest.approx(2.0)
    assert case.analysis.disagreement is not None
    assert case.analysis.disagreement < 1e-9


def agreed(case: Solved) -> bool:
    """Whether all is solved, and both formulations say the same."""
    analysis = case.analysis
    return analysis.solved and analysis.disagreement is not None and analysis.disagreement < 1e-9


def swapped(model: Linkage) -> Linkage:
    """The same with the links of each joint that is no pin the other way round; the drives stay as they are."""
    turned = [
        joint if joint.kind == "pin" else replace(joint, first=joint.second, second=joint.first)
        for joint in model.joints
    ]
    return replace(model, joints=tuple(turned))


@pytest.mark.parametrize("side", [swapped, replace], ids=["rod first", "barrel first"])
@pytest.mark.parametrize("rate", [40.0, -3.5])
@pytest.mark.parametrize("tip", [60 + 80j, -20 + 95j, 90 + 30j, 10 - 70j])
def test_arm_lifted_by_a_telescope_on_the_frame(tip: complex, rate: float, side: Callable[[Linkage], Linkage]) -> None:
    """Law of cosines: L^2 = a^2 + b^2 - 2 a b cos(phi), so L dL/dt = a b sin(phi) dphi/dt."""
    foot = 90 + 0j
    (model,) = drive(hoist(tip, foot), options=[f"C-D = {rate} mm/s"]).linkages
    case = Solved(side(model))
    angle = cmath.phase(tip)
    assert case.turn("A-C") == pytest.approx(abs(tip - foot) * rate / (abs(tip) * abs(foot) * math.sin(angle)))
    assert agreed(case)


@pytest.mark.parametrize("side", [swapped, replace], ids=["rod first", "barrel first"])
@pytest.mark.parametrize("turned", [1 + 0j, 1j, cmath.exp(2j), cmath.exp(4j)])
def test_lift_table_raised_by_a_telescope_between_its_legs(turned: complex, side: Callable[[Linkage], Linkage]) -> None:
    """The angle between the arms to E and F is twice the lean of the legs, whose top is 2 LEG sin(lean) up."""
    (model,) = drive(lift_table(turned), options=["E-F = 50 mm/s"]).linkages
    case = Solved(side(model))
    length = math.sqrt(REAR**2 + FORE**2 - 2 * REAR * FORE * math.cos(2 * LEAN))
    lean_rate = length * 50.0 / (REAR * FORE * math.sin(2 * LEAN)) / 2
    assert case.turn("A-C-E-M") == pytest.approx(lean_rate)
    assert case.turn("F-M-P-Q") == pytest.approx(-lean_rate)
    assert (case.velocity("C") / turned).imag == pytest.approx(2 * LEG * math.cos(LEAN) * lean_rate)
    assert agreed(case)


def test_crank_turned_by_its_block_along_a_moving_lever() -> None:
    """Velocity of the crank pin along the lever, seen from it, is the drive; across it, it is the lever's turning."""
    (model,) = drive(shuttle(), options=["B = 50 mm/s"]).linkages
    case = Solved(model)
    along = (70 + 180j) / abs(70 + 180j)
    relative = 1j * case.turn("B-O") * (30 + 40j) - 1j * case.turn("P-Q") * (40 + 100j)
    assert relative == pytest.approx(50.0 * along)
    assert agreed(case)


def test_block_that_slides_on_a_carriage_adds_their_speeds() -> None:
    (model,) = drive(carriage(), options=["P-Q against frame = 3 mm/s", "C against P-Q = 4 mm/s"]).linkages
    case = Solved(model)
    assert case.velocity("C") == pytest.approx(7.0)
    assert agreed(case)


def test_turns_of_an_open_arm_add_up() -> None:
    points = {"A": 0j, "B": 50 + 0j, "C": 50 + 30j}
    drives = [Drive(link=1, against=0, rate=1.5), Drive(link=2, against=1, rate=-4.0)]
    case = Solved(linkage(points, {"A": "ground a", "B": "a b"}, tracing={"C": "b"}, drives=drives))
    assert case.turn("b") == pytest.approx(-2.5)
    assert case.velocity("C") == pytest.approx(75j + 75.0)
    assert agreed(case)


def test_two_relative_drives_of_a_five_bar() -> None:
    drives = [Drive(link=2, against=1, rate=2.0), Drive(link=4, against=3, rate=-1.0)]
    case = Solved(linkage(FIVE_BAR_POINTS, FIVE_BAR, drives=drives))
    assert case.turn("b") - case.turn("a") == pytest.approx(2.0)
    assert case.turn("d") - case.turn("c") == pytest.approx(-1.0)
    assert agreed(case)


def test_drive_between_links_that_share_no_joint() -> None:
    drive_across = Drive(link=3, against=1, rate=2.0)
    case = Solved(linkage(FOUR_BAR_POINTS, FOUR_BAR, drives=[drive_across]))
    assert case.turn("rocker") - case.turn("crank") == pytest.approx(2.0)
    assert agreed(case)


def test_second_sliding_drive_that_contradicts_the_first_tells_the_speed_that_fits() -> None:
    (model,) = drive(hoist(), options=["C-D = 50 mm/s", "C against D = 30 mm/s"]).linkages
    analysis = analyse(model)
    assert outcomes(analysis) == ["taken", "conflict"]
    assert analysis.drives[1].implied == pytest.approx(-30.0)


def test_turning_of_a_block_on_the_frame_is_at_its_limit() -> None:
    slide: list[Other] = [("slide", 150 + 0j, "ground", "block", 1 + 0j)]
    analysis = analyse(linkage(SLIDER_POINTS, SLIDER_PINS, others=slide, turn={"block": 1.0}))
    assert outcomes(analysis) == ["at limit"]
