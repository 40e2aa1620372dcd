from __future__ import annotations

import cmath
import math
from dataclasses import replace

import pytest

from dxfcheck.analysis import analyse
from dxfcheck.analysis.pose.dead_centres import dead_centres
from dxfcheck.analysis.results import DeadCentre
from tests.examples import FOUR_BAR, FOUR_BAR_POINTS
from tests.model import Other, Solved, linkage

SLIDER_PINS = {"O": "ground crank", "B": "crank rod", "P": "rod block"}


def found(points: dict[str, complex], pins: dict[str, str] = FOUR_BAR, **more: object) -> list[tuple[str, str | None]]:
    model = linkage(points, pins, **more)  # type: ignore[arg-type]
    return [
        (model.pins[centre.pin].name, None if centre.driven is None else model.links[centre.driven].name)
        for centre in analyse(model).dead_centres
    ]


def test_general_pose_has_none() -> None:
    assert found(FOUR_BAR_POINTS) == []


@pytest.mark.parametrize("sense", [1.0, -1.0])
def test_crank_and_coupler_in_line(sense: float) -> None:
    """Stretched or folded, the rocker cannot drive the crank, and driven by the crank it stands still."""
    b = 30 + 20j
    points = {"A": 0j, "B": b, "C": b + sense * 3.0 * b, "D": 150 - 40j}
    assert found(points) == [("B", "crank")]
    by_crank = Solved(linkage(points, FOUR_BAR, turn={"crank": 1.0}))
    assert abs(by_crank.turn("rocker")) < 1e-12
    by_rocker = analyse(linkage(points, FOUR_BAR, turn={"rocker": 1.0}))
    assert by_rocker.drives[0].outcome == "at limit"


def test_coupler_and_rocker_in_line() -> None:
    points = {"A": 0j, "B": 20 + 35j, "C": 100 + 60j, "D": 164 + 80j}
    assert found(points) == [("C", "rocker")]


def test_parallelogram_folded_flat_has_both() -> None:
    points = {"A": 0j, "B": 40 + 0j, "C": 140 + 0j, "D": 100 + 0j}
    assert found(points) == [("B", "crank"), ("C", "rocker")]
    assert analyse(linkage(points, FOUR_BAR)).mobility.at_pose == 2


def test_slider_crank_at_its_end_of_stroke() -> None:
    points = {"O": 0j, "B": 50 + 0j, "P": 200 + 0j}
    slide: list[Other] = [("slide", 200 + 0j, "ground", "block", 1 + 0j)]
    assert found(points, SLIDER_PINS, others=slide) == [("B", "crank")]
    drive = {"crank": 1.0}
    assert abs(Solved(linkage(points, SLIDER_PINS, others=slide, turn=drive)).velocity("P")) < 1e-12


def test_rod_square_to_the_slide_cannot_drive_the_block() -> None:
    points = {"O": 0j, "B": 30 + 40j, "P": 30 - 80j}
    slide: list[Other] = [("slide", 30 - 80j, "ground", "block", 1 + 0j)]
    assert found(points, SLIDER_PINS, others=slide) == [("P", "block")]


def test_flat_triangle_on_two_fixed_pins_is_no_dead_centre() -> None:
    """Three pins in line, the outer two fixed: a special structure, not a pose of a mechanism."""
    points = {"A": 0j, "B": 50 + 0j, "C": 120 + 0j}
    assert found(points, {"A": "ground a", "B": "a b", "C": "ground b"}) == []


def test_a_rod_with_a_third_joint_can_drive() -> None:
    """Crank and coupler in line, but another link drives the coupler from a third pin."""
    b = 30 + 20j
    points = {"A": 0j, "B": b, "C": 4.0 * b, "D": 150 - 40j, "E": 60 + 90j, "F": 0 + 140j}
    assert found(points, {**FOUR_BAR, "E": "coupler rod", "F": "ground rod"}) == []


def test_knee_between_two_floating_links_names_no_driven_link() -> None:
    points = {"A": 0j, "B": 0 + 50j, "C": 60 + 50j, "D": 130 + 50j, "E": 140 + 0j}
    pins = {"A": "ground a", "B": "a b", "C": "b c", "D": "c d", "E": "ground d"}
    assert found(points, pins) == [("C", None)]


@pytest.mark.parametrize(("degrees", "seen"), [(0.03, True), (0.1, False), (3.0, False)])
def test_angle_is_what_is_missing_from_a_straight_line(degrees: float, seen: bool) -> None:  # noqa: FBT001
    b = 30 + 20j
    points = {"A": 0j, "B": b, "C": b + 3.0 * b * cmath.exp(1j * math.radians(degrees)), "D": 150 - 40j}
    model = linkage(points, FOUR_BAR)
    assert bool(dead_centres(model)) is seen
    wide: tuple[DeadCentre, ...] = dead_centres(model, math.radians(5.0))
    assert [centre.angle for centre in wide] == [pytest.approx(math.radians(degrees))]


LEVER_PINS = {"O": "ground crank", "L": "ground lever", "B": "crank block"}


def slotted_lever(b: complex, pivot: complex, *, block: bool) -> list[tuple[str, str | None]]:
    """A crank about 0 whose pin runs along a lever about a pivot, in a block or in a slot of it."""
    points = {"O": 0j, "L": pivot, "B": b}
    if block:
        slide: list[Other] = [("slide", b, "lever", "block", b - pivot)]
        return found(points, LEVER_PINS, others=slide)
    slot: list[Other] = [("pin in slot", b, "lever", "crank", b - pivot)]
    pins = {name: links for name, links in LEVER_PINS.items() if name != "B"}
    model = linkage(points, pins, others=slot, tracing={"B": "crank"})
    at_pin = replace(model, joints=(*model.joints[:-1], replace(model.joints[-1], pin=2)))
    centres = analyse(at_pin).dead_centres
    assert all(centre.square for centre in centres)
    return [("B", None if centre.driven is None else model.links[centre.driven].name) for centre in centres]


@pytest.mark.parametrize("block", [True, False])
def test_a_crank_square_to_its_slotted_lever_cannot_be_driven_by_it(*, block: bool) -> None:
    """The ends of a quick return's stroke: cos = crank / distance at the pivot of the crank."""
    pivot = -100j
    for side in (-1.0, 1.0):
        b = 40.0 * cmath.exp(1j * (side * math.acos(0.4) - math.pi / 2.0))
        assert slotted_lever(b, pivot, block=block) == [("B", "crank")]
    assert slotted_lever(40.0 + 0j, pivot, block=block) == []
    assert slotted_lever(40j, pivot, block=block) == []


def test_a_lever_driven_where_it_cannot_drive_its_crank_is_at_its_limit() -> None:
    b = 40.0 * cmath.exp(1j * (math.acos(0.4) - math.pi / 2.0))
    slide: list[Other] = [("slide", b, "lever", "block", b + 100j)]
    points = {"O": 0j, "L": -100j, "B": b}
    by_lever = analyse(linkage(points, LEVER_PINS, others=slide, turn={"lever": 1.0}))
    assert by_lever.drives[0].outcome == "at limit"
    by_crank = Solved(linkage(points, LEVER_PINS, others=slide, turn={"crank": 1.0}))
    assert abs(by_crank.turn("lever")) < 1e-12


def test_a_yoke_at_the_end_of_its_stroke_cannot_drive_the_crank() -> None:
    pins = {"O": "ground crank", "B": "crank block"}
    for b, expected in ((50 + 0j, [("B", "crank")]), (50j, []), (30 + 40j, [])):
        others: list[Other] = [("slide", b, "yoke", "block", 1j), ("slide", 90j, "ground", "yoke", 1 + 0j)]
        assert found({"O": 0j, "B": b}, pins, others=others) == expected


def test_a_slot_along_the_slide_of_its_own_link_drives_nothing() -> None:
    """A slot that runs the way its link slides pushes it nowhere."""
    pins = {"O": "ground crank", "B": "crank block"}
    others: list[Other] = [("slide", 30 + 40j, "yoke", "block", 1 + 0j), ("slide", 90j, "ground", "yoke", 1 + 0j)]
    assert found({"O": 0j, "B": 30 + 40j}, pins, others=others) == [("B", "yoke")]
