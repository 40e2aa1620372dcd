from __future__ import annotations

import pytest

from dxfcheck.drawing.primitives import Text
from dxfcheck.reading.texts.labels import natural_key
from tests.sketches import RADIUS, A, B, C, D, Drawn, fates, labels, linkage, pins, read_as, ring, rods, text, tipper

UNLABELLED = (*pins(), *rods())


def names(*texts: Drawn) -> dict[complex, str]:
    return {pin.at: pin.name for pin in linkage(*UNLABELLED, *texts).pins}


def test_labels_name_the_pins_beside_them() -> None:
    assert names(*labels()) == {A: "A", B: "B", C: "C", D: "D"}
    assert read_as(*tipper())["label A"] == "label"


@pytest.mark.parametrize(
    ("height", "off", "named"),
    [
        pytest.param(1.0, 15.9, True, id="within two ring diameters"),
        pytest.param(1.0, 16.1, False, id="beyond them"),
        pytest.param(10.0, 24.9, True, id="within 2.5 text heights"),
        pytest.param(10.0, 25.1, False, id="beyond them, too"),
    ],
)
def test_how_near_a_label_must_be(height: float, off: float, named: bool) -> None:  # noqa: FBT001 - a table
    assert (names(_below("Q", A - 1j * off, height))[A] == "Q") is named


def _below(content: str, at: complex, height: float) -> Drawn:
    """A text whose box hangs down from its alignment point."""
    width, down = 0.65 * height * len(content), -height * 1j
    box = (at, at + width, at + width + down, at + down)
    return Drawn("TEXT", lambda source: Text(source, content, at, height, box))


def test_the_box_counts_where_it_is_nearer_than_the_alignment_point() -> None:
    left = text("ABCD", A - 20, height=4.0)
    assert names(left)[A] == "ABCD", "it begins 20 away and ends 9.6 away"


def test_a_text_turned_or_mirrored_counts_as_drawn() -> None:
    upright = Drawn("TEXT", lambda source: Text(source, "ABCD", A - 20j, 4.0, (A - 20j, A - 9j, A - 13j, A - 24j)))
    assert names(upright)[A] == "ABCD"


def test_the_nearest_label_wins_and_each_label_names_one_pin() -> None:
    near, far = text("N", A + 5), text("F", A - 10)
    assert names(far, near)[A] == "N"
    both = ring(A + 12 - 12j), text("N", A + 5)
    assert sorted(names(*both).values()) == ["N", "P1", "P2", "P3"]


@pytest.mark.parametrize("content", ["A", "O2", "B'", "C\u2032", "A0", "AB12", "Ø8", "Ω", "A*"])
def test_one_to_four_characters_may_be_a_label(content: str) -> None:
    assert names(text(content, A + 5))[A] == content


@pytest.mark.parametrize("content", ["CRANK", "A=3", "°", "-", "A B", "", "1/2", "_A"])
def test_what_is_no_label(content: str) -> None:
    assert names(text(content, A + 5))[A] == "P1"


def test_blanks_round_a_label_do_not_count() -> None:
    assert names(text("  A ", A + 5))[A] == "A"


def test_a_letter_is_taken_before_a_mere_number() -> None:
    assert names(text("30", A + 5), text("A", A - 9))[A] == "A"
    assert names(text("7", A + 5))[A] == "7"


@pytest.mark.parametrize("layer", ["DIM", "Title-block", "BORDER"])
def test_texts_on_layers_of_dimensions_and_title_block_name_nothing(layer: str) -> None:
    assert names(text("A", A + 5, layer=layer))[A] == "P1"


def test_pins_without_a_label_are_numbered_by_x_then_y() -> None:
    assert names() == {A: "P1", B: "P2", D: "P3", C: "P4"}
    assert [pin.labelled for pin in linkage(*UNLABELLED, text("B", B + 5)).pins] == [True, False, False, False]


def test_numbers_that_labels_already_use_are_passed_over() -> None:
    assert names(text("P2", A + 5)) == {A: "P2", B: "P1", D: "P3", C: "P4"}


def test_a_ring_without_a_link_takes_no_label() -> None:
    assert names(ring(A + 14 - 14j, RADIUS / 2), text("A", A + 11 - 11j))[A] == "A"
    assert fates(*UNLABELLED, text("A", A + 5, handle="label"))["label"].why == "names a pin"


def test_natural_order_counts_numbers_as_numbers() -> None:
    assert sorted(["A10", "B", "A2", "A", "2", "10", "A2'"], key=natural_key) == [
        "2",
        "10",
        "A",
        "A2",
        "A2'",
        "A10",
        "B",
    ]
