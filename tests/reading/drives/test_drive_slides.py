"""Drives by slides and telescopes: by name, by option, by a note beside them."""

from __future__ import annotations

import cmath
from dataclasses import replace

import pytest

from dxfcheck.drawing.units import parse_unit
from dxfcheck.linkage import Linkage
from dxfcheck.reading.drives.drives import Shapes, drive_linkages
from dxfcheck.settings import Settings
from tests.drive_models import (
    MM,
    REACH,
    SHUTTLE_POINTS,
    carriage,
    dibber,
    drive,
    hoist,
    lift_table,
    named,
    note,
    shuttle,
    told,
    unknown,
)
from tests.model import Other, Solved

BLOCK = ("block at C", "frame", 200.0, "slide")
BESIDE_BLOCK = {"block at C": [(140 + 0j, 160 + 0j)]}


@pytest.mark.parametrize("option", ["block at C = 0.2 m/s", "C = 0.2 m/s", "Block at C = 200 mm/s", "C = 20 cm/s"])
def test_an_option_drives_a_block_by_its_name_or_its_pin(option: str) -> None:
    driven = drive(dibber(), options=[option])
    ((*names, rate, kind),) = told(driven)
    assert (*names, kind) == ("block at C", "frame", "slide")
    assert rate == pytest.approx(200.0)
    assert driven.observations == ()


@pytest.mark.parametrize("content", ["v_C = 0.2 m/s", "vC = 0.2 m/s", "v block at C = 0.2 m/s", "v_{C} = 0.2 m/s"])
def test_a_note_names_the_block_it_drives(content: str) -> None:
    assert told(drive(dibber(), notes=[note(content, 900j)])) == [BLOCK]


def test_a_note_beside_a_block_drives_it() -> None:
    text = note("v = 0.2 m/s", 150 + REACH * 0.9j)
    assert told(drive(dibber(), notes=[text], shapes=BESIDE_BLOCK)) == [BLOCK]


def test_a_note_too_far_from_a_block_is_unknown() -> None:
    text = note("v = 0.2 m/s", 150 + REACH * 1.1j)
    driven = drive(dibber(), notes=[text], shapes=BESIDE_BLOCK)
    assert unknown(driven) == "no link lies near it"
    assert told(driven) == [("B-O", "frame", 1.0, "turn")]


def test_a_rod_that_does_not_slide_is_no_rival_of_the_block_beside_it() -> None:
    shapes = {"B-C": [(30 + 40j, 150 + 10j)], **BESIDE_BLOCK}
    assert told(drive(dibber(), notes=[note("v = 0.2 m/s", 150 + 9j)], shapes=shapes)) == [BLOCK]


def test_a_drive_by_a_slide_keeps_its_joint_and_says_what_is_positive() -> None:
    driven = drive(dibber(), notes=[note("v_C = -0.2 m/s", 5j)])
    (one,) = driven.linkages[0].drives
    (shown,) = driven.evidence
    assert driven.linkages[0].joints[one.joint or 0].kind == "slide"
    assert (one.rate, one.source, one.at, one.handles) == (-200.0, "note", 5j, ("note 0",))
    assert (shown.name, shown.rule) == ("block at C", 9)
    assert shown.why == "stated by the note 'v_C = -0.2 m/s'; positive is along +x"


@pytest.mark.parametrize(("along", "words"), [(1j, "along +y"), (1 - 1j, "at -45 deg from +x")])
def test_the_evidence_tells_the_direction_of_a_slide(along: complex, words: str) -> None:
    (shown,) = drive(dibber(along), options=["C = 1 m/s"]).evidence
    assert shown.why == f"stated by option: C = 1 m/s; positive is {words}"


@pytest.mark.parametrize(("unit", "rate"), [("mm", 200.0), ("m", 0.2), ("cm", 20.0), ("in", 200.0 / 25.4)])
def test_a_sliding_speed_comes_in_the_unit_of_the_drawing(unit: str, rate: float) -> None:
    ((*_, found, _),) = told(drive(dibber(), options=["C = 0.2 m/s"], unit=parse_unit(unit)))
    assert found == pytest.approx(rate, rel=1e-15)


@pytest.mark.parametrize(("stated", "rate"), [("0.2 m/s", 0.2), ("50 mm/s", 50.0), ("3 m/min", 0.05)])
def test_a_drawing_without_a_unit_takes_the_figure_as_it_stands_and_tells(stated: str, rate: float) -> None:
    driven = drive(dibber(), notes=[note(f"v_C = {stated}", 5j)], unit=parse_unit("unitless"))
    ((*_, found, _),) = told(driven)
    (seen,) = driven.observations
    assert found == pytest.approx(rate)
    assert (seen.kind, seen.at, seen.handles, seen.mechanism) == ("drive-unit-assumed", 5j, ("note 0",), "M1")
    assert seen.subject == f"v_C = {stated}"
    assert seen.detail == f"the drawing has no length unit: it is taken as {rate:g} of its units a second"


def test_a_turning_speed_needs_no_unit() -> None:
    assert drive(dibber(), options=["B-O = 1 rad/s"], unit=parse_unit("unitless")).observations == ()


def test_a_speed_beyond_all_figures_in_the_unit_of_the_drawing_is_unknown() -> None:
    assert "beyond all figures" in unknown(drive(dibber(), options=["C = 1e59 m/s"]))


def test_a_block_slides_on_the_lever_that_guides_it() -> None:
    lever = ("block at B", "P-Q", 50.0, "slide")
    shapes = {"P-Q": [(SHUTTLE_POINTS["P"], SHUTTLE_POINTS["Q"])], "block at B": [(28 + 38j, 32 + 42j)]}
    assert told(drive(shuttle(), options=["B = 50 mm/s"])) == [lever]
    assert told(drive(shuttle(), notes=[note("v = 50 mm/s", 36 + 40j)], shapes=shapes)) == [lever]
    assert told(drive(shuttle(), notes=[note("v = 50 mm/s", 64 + 118j)], shapes=shapes)) == [lever]
    assert told(drive(shuttle(), options=["block at B against P-Q = 50 mm/s"])) == [lever]


def test_a_guide_that_is_named_runs_against_its_block() -> None:
    driven = drive(shuttle(), options=["P-Q = 50 mm/s"])
    assert told(driven) == [("P-Q", "block at B", 50.0, "slide")]
    assert driven.evidence[0].name == "P-Q against block at B"


def test_a_link_with_several_slides_needs_to_be_told_against_which() -> None:
    assert unknown(drive(carriage(), options=["P-Q = 1 mm/s"])) == (
        "it could belong to P-Q against frame of M1, P-Q against block at C of M1"
    )
    found = told(drive(carriage(), options=["P-Q against frame = 1 mm/s", "C against QP = 2 mm/s"]))
    assert found == [("P-Q", "frame", 1.0, "slide"), ("block at C", "P-Q", 2.0, "slide")]


def test_a_note_by_a_pin_of_a_ram_means_its_speed_on_the_frame() -> None:
    assert told(drive(carriage(), notes=[note("v_Q = 7 mm/s")])) == [("P-Q", "frame", 7.0, "slide")]


def test_a_note_without_a_name_goes_to_the_nearer_of_two_slides() -> None:
    shapes = {"P-Q": [(0j, 100 + 0j)], "block at C": [(36 + 6j, 44 + 6j)]}
    assert told(drive(carriage(), notes=[note("v = 1 mm/s", 40 + 7j)], shapes=shapes))[0][0] == "block at C"
    assert told(drive(carriage(), notes=[note("v = 1 mm/s", 90 + 1j)], shapes=shapes))[0][0] == "P-Q"
    assert "could belong to" in unknown(drive(carriage(), notes=[note("v = 1 mm/s", 40 + 3j)], shapes=shapes))


@pytest.mark.parametrize("name", ["C-D", "CD", "D-C", "DC", "C", "D"])
@pytest.mark.parametrize("stated", [50.0, -50.0])
@pytest.mark.parametrize("turn", [0.0, 1.0, 2.0, 3.0, 4.0, 5.0])
def test_a_telescope_lengthens_at_the_stated_speed_whatever_way_it_lies(name: str, stated: float, turn: float) -> None:
    aim = cmath.exp(1j * turn)
    driven = drive(hoist((60 + 80j) * aim, 90 * aim), options=[f"{name} = {stated} mm/s"])
    case = Solved(driven.linkages[0])
    along = (60 + 80j) * aim - 90 * aim
    assert (case.velocity("C") / along).real * abs(along) == pytest.approx(stated, rel=1e-12)
    assert case.analysis.joints[-1].slide_speed is not None


def test_a_telescope_between_two_moving_links_parts_its_pins() -> None:
    driven = drive(lift_table(), options=["E-F = 50 mm/s"])
    case = Solved(driven.linkages[0])
    pins = {pin.name: pin.at for pin in case.model.pins}
    along = pins["F"] - pins["E"]
    apart = case.velocity("F") - case.velocity("E")
    assert (apart / along).real * abs(along) == pytest.approx(50.0, rel=1e-12)
    assert driven.evidence[0].why == "stated by option: E-F = 50 mm/s; positive moves E and F apart"


def test_a_note_beside_a_telescope_lengthens_it() -> None:
    middle = (150 + 80j) / 2
    shapes = {"C": [(60 + 80j, middle)], "D": [(middle, 90 + 0j)], "A-C": [(0j, 60 + 80j)]}
    by_note = drive(hoist(), notes=[note("v = 50 mm/s", middle + 1)], shapes=shapes)
    assert told(by_note) == told(drive(hoist(), options=["C-D = 50 mm/s"]))


def test_one_part_of_a_telescope_against_the_other_runs_along_the_slide() -> None:
    assert told(drive(hoist(), options=["C against D = 50 mm/s"])) == [("C", "D", 50.0, "slide")]
    assert told(drive(hoist(), options=["D against C = 50 mm/s"])) == [("D", "C", 50.0, "slide")]


def test_a_link_that_has_both_pins_comes_before_a_telescope_between_them() -> None:
    assert unknown(drive(hoist(), options=["A-C = 50 mm/s"])) == (
        "A-C of M1 does not slide, so it has no sliding speed"
    )


def test_pins_of_a_telescope_side_by_side_tell_no_way_to_lengthen_it() -> None:
    points = {"A": 0j, "C": 60 + 80j, "D": 60 + 0j}
    pins = {"A": "ground arm", "C": "arm rod", "D": "ground barrel"}
    model = named(points, pins, [("slide", 40j, "barrel", "rod", 1 + 0j)])
    assert "neither apart nor together" in unknown(drive(model, options=["C-D = 50 mm/s"]))
    beside = drive(model, notes=[note("v = 5 mm/s", 60 + 79j)], shapes={"C": [(60 + 80j, 70 + 80j)]})
    assert "which way C of M1 slides" in unknown(beside)


def test_an_option_for_a_telescope_comes_before_the_note_on_it() -> None:
    driven = drive(hoist(), notes=[note("v_CD = 9 mm/s")], options=["DC = 50 mm/s"])
    assert [(one.rate, one.source) for one in driven.linkages[0].drives] == [(50.0, "option")]


def test_a_note_on_another_motion_of_the_same_links_stands_beside_an_option() -> None:
    driven = drive(hoist(), notes=[note("ω_AC = 1 rad/s")], options=["C-D = 50 mm/s"])
    assert [one.kind for one in driven.linkages[0].drives] == ["slide", "turn"]


def test_a_name_that_no_slide_has_tells_the_names() -> None:
    assert (
        unknown(drive(dibber(), options=["X = 1 m/s"])) == "no link is called 'X'; the links are B-O, B-C, block at C"
    )


def test_two_links_that_no_slide_joins() -> None:
    assert unknown(drive(dibber(), options=["C against B-O = 1 m/s"])) == "no slide joins block at C of M1 and B-O"


def test_a_slide_of_a_mechanism_on_no_frame_is_unknown() -> None:
    loose = replace(dibber(), grounded=False)
    assert unknown(drive(loose, options=["C = 1 m/s"])) == "its mechanism has no frame to move against"


def test_of_two_mechanisms_with_the_same_names_a_note_means_the_nearer() -> None:
    one, other = dibber(), replace(dibber(), name="M2")
    shapes = [[[], [], [], [(at, at + 5)]] for at in (500j, 10j)]
    driven = drive_linkages([one, other], shapes, [note("v_C = 1 mm/s")], ["n"], Settings(), MM)
    assert [each.drives[0].source for each in driven.linkages] == ["assumed", "note"]
    assert "M1, block at C of M2" in unknown(drive(one, other, options=["C = 1 mm/s"]))


def test_a_block_and_not_the_lever_pinned_with_it_is_meant_by_their_pin() -> None:
    """A ram C-E on the frame and, on the same pin C, a block with an ear H on another guide."""
    points = {"C": 0j, "E": 100 + 0j, "H": 20j}
    slides: list[Other] = [("slide", 50 + 0j, "ground", "ram", 1 + 0j), ("slide", 0j, "ground", "block", 1j)]
    model = named(points, {"C": "ram block"}, slides, tracing={"E": "ram", "H": "block"})
    assert told(drive(model, options=["C = 1 mm/s"])) == [("C-H", "frame", 1.0, "slide")]


def two_on_a_lever() -> Linkage:
    """Two blocks on one lever A-Z."""
    points = {"A": 0j, "Z": 100 + 0j, "F": 30 + 0j, "G": 70 + 0j}
    slides: list[Other] = [("slide", points[pin], "lever", f"block{pin}", 1 + 0j) for pin in "FG"]
    tracing = {"Z": "lever", "F": "blockF", "G": "blockG"}
    return named(points, {"A": "ground lever"}, slides, tracing=tracing)


def test_a_note_beside_a_lever_with_two_blocks_means_the_block_that_it_is_near() -> None:
    shapes = {"A-Z": [(0j, 100 + 0j)], "block at F": [(24 + 3j, 36 + 3j)], "block at G": [(64 + 3j, 76 + 3j)]}
    assert told(drive(two_on_a_lever(), notes=[note("v = 1 mm/s", 30 + 1j)], shapes=shapes))[0][0] == "block at F"
    assert "could belong to" in unknown(drive(two_on_a_lever(), notes=[note("v = 1 mm/s", 50 + 0j)], shapes=shapes))
    far_off = {"A-Z": [(0j, 300 + 0j)]}
    assert "which way A-Z of M1 slides" in unknown(
        drive(two_on_a_lever(), notes=[note("v = 1 mm/s", 200 + 0j)], shapes=far_off)
    )


def test_sliding_and_turning_of_the_same_links_are_two_motions() -> None:
    driven = drive(dibber(), options=["C = 1 mm/s"], notes=[note("ω_C = 2 rad/s"), note("v_C = 3 mm/s")])
    assert told(driven) == [("block at C", "frame", 1.0, "slide"), ("block at C", "frame", 2.0, "turn")]


def test_a_telescope_is_meant_where_the_link_of_that_name_is_of_another_mechanism_and_cannot_slide() -> None:
    other = named({"C": 500j, "D": 500j + 40}, {"C": "ground lever"}, [], tracing={"D": "lever"})
    driven = drive(replace(other, name="M2"), hoist(), options=["C-D = 5 mm/s"])
    assert [each.drives[0].source for each in driven.linkages] == ["assumed", "option"]


def test_a_link_is_named_in_the_mechanism_of_the_one_it_runs_against() -> None:
    """Two slotted levers with the same names: a speed against a lever is against that of the same mechanism."""
    lone = replace(shuttle(), name="M2")
    shapes: Shapes = [[[], [], [], []], [[], [], [(1j, 2j)], []]]
    texts = [note("v_B against PQ = 1 mm/s")]
    driven = drive_linkages([shuttle(), lone], shapes, texts, ["n"], Settings(), MM)
    assert [len(each.drives) for each in driven.linkages] == [1, 1]
    assert driven.linkages[1].drives[0].stated == "v_B against PQ = 1 mm/s"


def test_an_unnamed_telescope_of_many_pins_parts_those_furthest_along_it() -> None:
    """The barrel is pinned at D, and carries F beyond the rod's end C."""
    points = {"A": 0j, "C": 60 + 80j, "D": 0j - 40j, "F": 62 + 84j}
    along = points["C"] - points["D"]
    pins = {"A": "ground arm", "C": "arm rod", "D": "ground barrel"}
    model = named(points, pins, [("slide", 30 + 20j, "barrel", "rod", along)], tracing={"F": "barrel"})
    driven = drive(model, notes=[note("v = 5 mm/s", 60 + 79j)], shapes={"C": [(60 + 80j, 55 + 70j)]})
    assert driven.evidence[0].why.endswith("positive moves D and C apart")


@pytest.mark.parametrize("pinned", ["P", "C"])
def test_a_link_with_a_pin_in_its_block_is_what_slides_and_no_telescope(pinned: str) -> None:
    """Two levers, one with a block on the other: what the joint's pin belongs to is the one that slides."""
    points = {"A": 0j, "P": 50 + 0j, "B": 100 + 40j, "C": 60 + 0j}
    slides: list[Other] = [("slide", points[pinned], "one", "other", 1 + 0j)]
    model = named(points, {"A": "ground one", "B": "ground other"}, slides, tracing={"P": "one", "C": "other"})
    pin = next(number for number, each in enumerate(model.pins) if each.name == pinned)
    joints = (*model.joints[:-1], replace(model.joints[-1], pin=pin))
    model = replace(model, joints=joints)
    shapes = {"A-P": [(0j, 50 + 0j)], "B-C": [(100 + 40j, 60 + 0j)]}
    found = told(drive(model, notes=[note("v = 1 mm/s", 55 + 0j)], shapes=shapes))
    assert found == [("A-P", "B-C", 1.0, "slide") if pinned == "P" else ("B-C", "A-P", 1.0, "slide")]
