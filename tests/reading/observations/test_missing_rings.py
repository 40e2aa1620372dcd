from __future__ import annotations

from dxfcheck.reading.reading import Observation
from tests.sketches import A, B, C, D, Drawn, line, pins, read, ring, rod, text, tipper

BEND = (B + C) / 2 + 20j
LABELS = (text("A", A + 5), text("C", C + 5), text("D", D + 5))


def missing(*things: Drawn) -> list[Observation]:
    return [each for each in read(*things).observations if each.kind == "missing-ring"]


def bent(*things: Drawn) -> tuple[Drawn, ...]:
    """The tray tipper with a bend in its coupler."""
    return (*pins(), rod(A, B), line(B, BEND, handle="one"), line(BEND, C, handle="two"), rod(C, D), *things)


def test_a_label_at_a_corner_without_a_ring_is_told() -> None:
    (seen,) = missing(*bent(*LABELS, text("B", B + 5), text("E", BEND + 3)))
    assert (seen.at, seen.detail, seen.handles, seen.severity) == (BEND, "E", ("one", "two"), None)


def test_nothing_is_missing_where_nothing_says_so() -> None:
    assert missing(*bent(*LABELS, text("B", B + 5))) == []
    assert missing(*bent(*LABELS, text("B", B + 5), text("3", BEND + 3))) == []
    assert missing(*bent(*LABELS, text("B", B + 5), text("E", BEND + 90j))) == []
    assert missing(*tipper(), text("E", B + 9)) == []


def test_labels_of_another_height_are_not_names_of_pins() -> None:
    assert missing(*bent(*LABELS, text("B", B + 5), text("E", BEND + 3, height=9.0))) == []


def test_a_sheet_whose_pins_bear_no_labels_misses_no_ring() -> None:
    assert missing(*bent(text("E", BEND + 3))) == []


def test_the_ring_makes_it_a_pin() -> None:
    assert missing(*bent(*LABELS, text("B", B + 5), text("E", BEND + 3), ring(BEND))) == []
