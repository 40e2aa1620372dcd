from __future__ import annotations

import pytest

from dxfcheck.drawing.primitives import LengthUnit, Text
from dxfcheck.reading.lengths.length_notes import LengthNote, judge_length_notes
from tests.reading.lengths.dimensioned import INCH
from tests.sketches import MM, TOLERANCE, A, B, C, D, Drawn, linkage, pins, ring, rod, rods, sketch, text, tipper

AB, BC, CD, AC = abs(B - A), abs(C - B), abs(D - C), abs(C - A)


def judged(*notes: Drawn, unit: LengthUnit = MM, drawn: tuple[Drawn, ...] = ()) -> list[LengthNote]:
    """What the notes state of the tray tipper."""
    sheet = sketch(*notes)
    texts = [(each, sheet.handles(each)) for each in sheet.primitives if isinstance(each, Text)]
    return judge_length_notes([linkage(*(drawn or tipper()))], texts, unit, TOLERANCE)


def note(content: str) -> Drawn:
    return text(content, 60 - 30j)


@pytest.mark.parametrize(
    "content",
    [
        f"AB = {AB:.1f}",
        f"AB={AB:.2f} mm",
        f"BA = {AB:.1f}",
        f"A-B = {AB / 25.4:.3f} in",
        f"A - B = {AB:.1f}",
        f"l_AB = {AB:.1f}",
        f"lAB = {AB:.1f}",
        f"|AB| = {AB:.1f}",
        f"Crank AB = {AB:.1f} mm",
        f"link A-B = {AB / 10:.2f} cm",
        f"AB = {AB:.0f} ± 0.5",
        f"AB = {AB:.1f}".replace(".", ","),
    ],
)
def test_a_length_that_rounds_to_what_is_drawn_agrees(content: str) -> None:
    (only,) = judged(note(content))
    assert (only.mismatch, only.unit, only.joined) == (None, None, True)


def test_one_that_does_not_says_what_is_stated_and_drawn() -> None:
    (only,) = judged(note("BC = 150 mm"))
    assert only.pins == "B-C"
    assert only.mechanism == "M1"
    assert only.mismatch is not None
    assert [only.mismatch.stated, only.mismatch.drawn, only.mismatch.half] == pytest.approx([150.0, BC, 0.5])


def test_several_lengths_in_one_note_are_judged_each() -> None:
    content = f"AB = {AB:.0f}, BC = 150; CD = {CD:.0f} mm\nl_AD = 150"
    assert [(each.pins, each.mismatch is None) for each in judged(note(content))] == [
        ("A-B", True), ("B-C", False), ("C-D", True), ("A-D", True),
    ]  # fmt: skip


def test_a_text_may_list_variants_one_of_which_is_drawn() -> None:
    assert [each.mismatch for each in judged(note("AD = 100\nAD = 150\nAD = 200"))] == [None]
    assert len(judged(note("AD = 100\nAD = 200"))) == 2


@pytest.mark.parametrize(("content", "agrees"), [("AD = 100-160 mm", True), ("AD = 100...140", False),
                                                 ("AD = 140 to 160", True), ("AD = 150 - see note", True)])  # fmt: skip
def test_a_range_may_be_stated(content: str, *, agrees: bool) -> None:
    assert [each.mismatch is None for each in judged(note(content))] == [agrees]


def test_pins_that_no_link_joins_are_told() -> None:
    (only,) = judged(note("AC = 100"))
    assert not only.joined
    assert only.mismatch is not None
    assert only.mismatch.drawn == pytest.approx(AC)


@pytest.mark.parametrize(
    "content",
    ["AB = 10 rad/s", "AB = 10 mm/s", "v_AB = 5 m/s", "m_AB = 5", "i_AB = 2", "AB = 10°", "AB = 5 kg", "AB = 120 rpm",
     "AB = 1:2", "AB = 5 %", "3 = 4", "12 = 5", "AX = 120", "XY = 120", "A = 120", "AA = 120", "speed AB = 10", "AB",
     "=", "ω_AB = 10"],
)  # fmt: skip
def test_what_states_no_distance_of_two_pins_is_no_length(content: str) -> None:
    assert judged(note(content)) == []


def test_names_of_two_letters_are_told_apart() -> None:
    names = tuple(text(name, at + 5 + 3j) for name, at in (("O2", A), ("A", B), ("B", C), ("O4", D)))
    drawn = (*pins(), *rods(), *names)
    (only,) = judged(note("O2A = 99"), drawn=drawn)
    assert only.pins == "O2-A"
    (other,) = judged(note("O2O4 = 150"), drawn=drawn)
    assert (other.pins, other.mismatch) == ("O2-O4", None)


def test_a_unit_that_fits_only_if_the_drawing_is_in_it_is_told() -> None:
    (only,) = judged(note("AD = 150 in"))
    assert (only.mismatch, only.unit) == (None, "in")
    (metric,) = judged(note("AD = 150 mm"), unit=INCH)
    assert (metric.mismatch, metric.unit) == (None, "mm")


def twin(by: complex) -> tuple[Drawn, ...]:
    """The tray tipper further on the sheet."""
    names = (("A", A), ("B", B), ("C", C), ("D", D))
    rings = (ring(at + by, layer="FRAME" if name in "AD" else "0") for name, at in names)
    lines = (rod(one + by, other + by) for one, other in ((A, B), (B, C), (C, D)))
    return (*rings, *lines, *(text(name, at + by + 5 + 3j) for name, at in names))


def test_of_two_linkages_the_one_beside_the_note_is_meant() -> None:
    far = 1000 + 0j
    sheet = sketch(text("AB = 99", 60 - 30j), text("AB = 99", far + 60 - 30j))
    texts = [(each, sheet.handles(each)) for each in sheet.primitives if isinstance(each, Text)]
    both = [linkage(*tipper()), linkage(*twin(far))]
    places = [each.mismatch.at for each in judge_length_notes(both, texts, MM, TOLERANCE) if each.mismatch]
    assert places == [60 - 30j, far + 60 - 30j]
