from __future__ import annotations

import math

import pytest

from dxfcheck.analysis import analyse
from dxfcheck.drawing.primitives import LengthUnit
from dxfcheck.reading.requirements.requirement_text import read_expected_speed, read_limit, read_ratio
from dxfcheck.requirements.judge import judge_requirements
from dxfcheck.requirements.verdict import Judged, Verdict
from dxfcheck.settings import Requirement, Settings
from tests.sketches import MM, A, B, C, D, Drawn, ring, rod, sketch, text, tipper
from tests.sketches import read as read_sketch

RATE = 10.0
CRANK_SPEED = RATE * abs(B - A)
"""mm/s of pin B."""
UNITLESS = LengthUnit("unitless", "assumed", None)


def rocker_speed() -> float:
    """rad/s of CD: the part of B's velocity along the rod is C's too."""
    coupler = C - B
    along_crank = (1j * RATE * (B - A) * coupler.conjugate()).real
    return along_crank / (1j * (C - D) * coupler.conjugate()).real


def judged(
    *requirements: Requirement,
    drive: str = f"A-B = {RATE} rad/s",
    notes: tuple[str, ...] = (),
    unit: LengthUnit = MM,
    things: tuple[Drawn, ...] | None = None,
    expected_mobility: int | None = None,
) -> Judged:
    settings = Settings(
        requirements=requirements, drives=(drive,) if drive else (), expected_mobility=expected_mobility
    )
    drawn = [text(content, 60 + 300j - 20j * number) for number, content in enumerate(notes)]
    reading = read_sketch(*(tipper() if things is None else things), *drawn, settings=settings)
    mechanisms = [(linkage, analyse(linkage)) for linkage in reading.linkages]
    return judge_requirements(mechanisms, settings, reading.requirements, unit)


def one(*requirements: Requirement, **chosen: object) -> Verdict:
    (verdict,) = judged(*requirements, **chosen).verdicts  # type: ignore[arg-type]
    return verdict


def test_nothing_stated_is_nothing_judged() -> None:
    assert judged() == Judged()


def test_a_pins_speed_is_held_by_its_size() -> None:
    verdict = one(read_limit("pin-speed", "B", f"{CRANK_SPEED * 0.99:.6f} mm/s"))
    assert (verdict.outcome, verdict.subject, verdict.mechanism) == ("broken", "B", "M1")
    assert verdict.actual == pytest.approx(CRANK_SPEED)
    assert verdict.bounds.greatest == pytest.approx(CRANK_SPEED * 0.99)
    assert verdict.at == B
    assert one(read_limit("pin-speed", "B", f"{CRANK_SPEED * 1.01:.6f} mm/s")).outcome == "kept"


def test_a_limit_that_is_the_nominal_speed_is_kept_in_spite_of_rounding() -> None:
    assert one(read_limit("pin-speed", "B", f"{CRANK_SPEED * (1 - 5e-5):.9f} mm/s")).outcome == "kept"


def test_stated_units_are_brought_to_the_drawings() -> None:
    inches = LengthUnit("in", "header", 0.0254)
    assert one(read_limit("pin-speed", "B", "2 in/s"), unit=inches).bounds.greatest == pytest.approx(2.0)
    assert one(read_limit("pin-speed", "B", "0.0508 m/s"), unit=inches).bounds.greatest == pytest.approx(2.0)


def test_without_a_unit_the_figure_is_taken_as_written() -> None:
    verdict = one(read_limit("pin-speed", "B", "5 m/s"), unit=UNITLESS)
    assert (verdict.bounds.greatest, verdict.unit_assumed) == (5.0, True)


def test_a_least_speed() -> None:
    assert one(read_limit("pin-speed", "B", ">= 1 m/s")).outcome == "broken"
    assert one(read_limit("pin-speed", "B", ">= 1 mm/s")).outcome == "kept"


def test_turning_is_expected_with_its_sense() -> None:
    speed = rocker_speed()
    assert one(read_expected_speed("C-D", f"{speed:.9f} rad/s ± 1 %")).outcome == "kept"
    other = one(read_expected_speed("C-D", f"{-speed:.9f} rad/s ± 1 %"))
    assert other.outcome == "broken"
    assert other.actual == pytest.approx(speed)


def test_relative_turning_and_ratios() -> None:
    speed = rocker_speed()
    relative = one(read_limit("link-speed", "C-D against A-B", "1 rpm"))
    assert relative.actual == pytest.approx(speed - RATE)
    ratio = one(read_ratio("C-D / A-B", f"{abs(speed) / RATE:.9f} ± 1 %"))
    assert ratio.outcome == "kept"
    assert ratio.actual == pytest.approx(speed / RATE)


def test_rubbing_names_the_pin_and_both_links() -> None:
    verdict = one(read_limit("rubbing-speed", "A", "1 mm/s"))
    assert (verdict.subject, verdict.against) == ("A", "frame and A-B")
    assert verdict.actual == pytest.approx(4.0 * RATE)


def test_a_pattern_is_about_every_part_that_moves() -> None:
    found = judged(read_limit("pin-speed", "*", "1 m/s")).verdicts
    assert [each.subject for each in found] == ["B", "C"]
    assert [each.subject for each in judged(read_limit("link-speed", "*-C", "1 rpm")).verdicts] == ["B-C"]


def test_the_plainest_name_wins() -> None:
    limits = [read_limit("pin-speed", name, text) for name, text in (("*", "1 mm/s"), ("B*", "2 mm/s"), ("B", "9 m/s"))]
    found = {each.subject: each.requirement.subject for each in judged(*limits).verdicts}
    assert found == {"B": "B", "C": "*"}
    assert {each.requirement.subject for each in judged(*limits[:2]).verdicts if each.subject == "B"} == {"B*"}


def test_a_note_gives_way_to_settings_on_the_same_part_but_not_to_a_pattern() -> None:
    named = judged(read_limit("pin-speed", "B", "9 m/s"), notes=("v_B <= 1 mm/s",)).verdicts
    assert [(each.requirement.source, each.outcome) for each in named] == [("settings", "kept"), ("note", "not judged")]
    both = judged(read_limit("pin-speed", "*", "9 m/s"), notes=("v_B <= 1 mm/s",)).verdicts
    assert ("note", "broken") in [(each.requirement.source, each.outcome) for each in both]


def test_an_expectation_and_a_limit_on_one_part_both_stand() -> None:
    found = judged(read_limit("pin-speed", "B", "9 m/s"), notes=("v_B = 1 mm/s ± 1 %",)).verdicts
    assert [each.outcome for each in found] == ["kept", "broken"]


def test_with_an_assumed_drive_only_ratios_and_mobility_are_judged() -> None:
    speed = read_limit("pin-speed", "B", "1 mm/s")
    found = judged(speed, read_ratio("C-D/A-B", "9"), drive="", expected_mobility=1).verdicts
    assert {each.quantity: each.outcome for each in found} == {
        "pin-speed": "not judged",
        "speed-ratio": "broken",
        "mobility": "kept",
    }


def test_what_is_not_settled_is_not_known() -> None:
    arm = (ring(C + 60 + 20j), rod(C, C + 60 + 20j), text("E", C + 66 + 24j))
    verdict = one(read_limit("pin-speed", "E", "1 mm/s"), things=(*tipper(), *arm))
    assert (verdict.outcome, verdict.actual) == ("not known", None)
    assert "do not settle it" in verdict.why


def test_an_expected_mobility_of_an_option_stands_before_a_note() -> None:
    assert [each.outcome for each in judged(notes=("M = 2",)).verdicts] == ["broken"]
    found = judged(notes=("M = 2",), expected_mobility=1).verdicts
    assert [each.outcome for each in found] == ["kept", "not judged"]


@pytest.mark.parametrize(
    ("requirement", "why", "pattern"),
    [
        (read_limit("pin-speed", "X", "1 m/s"), "no pin is called 'X'; the pins are A, B, C, D", False),
        (read_limit("link-speed", "X-Y", "1 rpm"), "no link is called 'X-Y'; the links are A-B, B-C, C-D", False),
        (read_limit("link-speed", "X*", "1 rpm"), "the pattern 'X*' fits no link", True),
        (read_limit("slide-speed", "C-D", "1 m/s"), "C-D does not slide", False),
        (read_ratio("C-D/X-Y", "1"), "there is no link 'X-Y' beside C-D", False),
    ],
)
def test_what_answers_to_nothing_is_told(requirement: Requirement, why: str, pattern: bool) -> None:  # noqa: FBT001
    (found,) = judged(requirement).unmatched
    assert why in found.why
    assert found.is_pattern == pattern


def test_a_limit_for_everything_may_find_nothing() -> None:
    assert judged(read_limit("slide-speed", "*", "1 m/s")).unmatched == ()


def test_a_pin_on_the_frame_stands_still() -> None:
    verdict = one(read_limit("pin-speed", "A", "1 m/s"))
    assert (verdict.outcome, verdict.actual) == ("kept", 0.0)


def test_what_is_rounding_beside_the_fastest_part_is_nothing() -> None:
    verdict = one(read_limit("pin-speed", "D", ">= 1e-12 mm/s"))
    assert (verdict.outcome, verdict.actual) == ("kept", 0.0)


def test_speeds_scale_with_the_drive() -> None:
    slow = one(read_limit("link-speed", "C-D", "9 rpm"), drive="A-B = 60 rpm")
    assert slow.actual == pytest.approx(rocker_speed() / RATE * 2 * math.pi)


def test_sketches_without_a_linkage_are_held_to_nothing_but_named_parts() -> None:
    settings = Settings(requirements=(read_limit("pin-speed", "C", "1 m/s"), read_limit("pin-speed", "*", "1 m/s")))
    found = judge_requirements((), settings, (), sketch().unit)
    assert [(each.requirement.subject, each.why) for each in found.unmatched] == [("C", "the drawing holds no linkage")]


def test_what_is_off_for_a_pin_takes_its_limit_and_its_note_back() -> None:
    everywhere, lifted = read_limit("pin-speed", "*", "1 mm/s"), read_limit("pin-speed", "C", "off")
    verdicts = judged(everywhere, lifted, notes=("v_C <= 2 mm/s",)).verdicts
    assert {(each.subject, each.outcome) for each in verdicts} == {("B", "broken"), ("C", "not judged")}


def test_what_is_off_for_all_leaves_the_note() -> None:
    verdict = one(read_limit("pin-speed", "*", "off"), notes=("v_C <= 2 mm/s",))
    assert (verdict.subject, verdict.outcome, verdict.requirement.source) == ("C", "broken", "note")


def test_what_is_off_for_a_part_that_is_not_there_is_nothing_to_tell() -> None:
    assert judged(read_limit("pin-speed", "Z", "off")) == Judged()
