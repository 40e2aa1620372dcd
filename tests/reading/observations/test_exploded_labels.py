from __future__ import annotations

from dxfcheck.reading.reading import Observation
from tests.sketches import A, B, C, D, Drawn, labels, line, path, pins, read, rods

LETTER = (0j, 2 + 5j, 4 + 0j)


def exploded(*things: Drawn) -> list[Observation]:
    return [each for each in read(*pins(), *rods(), *things).observations if each.kind == "exploded-text"]


def letters(*places: complex) -> list[Drawn]:
    """An A in three strokes beside each place."""
    corners = [place + 6 + 3j for place in places]
    return [
        line(corner + start, corner + end)
        for corner in corners
        for start, end in ((0j, 2 + 5j), (2 + 5j, 4 + 0j), (1 + 2.5j, 3 + 2.5j))
    ]


def test_heaps_of_strokes_beside_the_pins_are_exploded_labels() -> None:
    (seen,) = exploded(*letters(A, B, C, D))
    assert (seen.amount, seen.limit) == (4.0, 4.0)


def test_letters_drawn_as_polylines_count_by_their_pieces() -> None:
    runs = [path(*(place + 6 + 3j + point for point in (*LETTER, 1 + 2.5j))) for place in (A, B, C, D)]
    assert len(exploded(*runs)) == 1


def test_few_strokes_few_pins_or_real_labels_say_nothing() -> None:
    assert exploded(*(line(place + 6 + 3j, place + 8 + 8j) for place in (A, B, C, D))) == []
    assert exploded(*letters(A, B)) == []
    assert exploded(*letters(A, B, C, D), *labels()) == []


def test_strokes_round_a_pin_are_no_label() -> None:
    corners = (6 + 2j, 6j - 2, -6 - 2j, 2 - 6j)
    around = [line(place + corner, place + corner * 1.3) for place in (A, B, C, D) for corner in corners]
    assert exploded(*around) == []
