from __future__ import annotations

from dxfcheck.reading.reading import Observation
from tests.sketches import A, B, C, D, Drawn, line, path, pins, read, ring, rod

WIDE = 14.0


def floating(*things: Drawn) -> list[Observation]:
    return [each for each in read(*things).observations if each.kind == "floating-group"]


def plate(*windows: Drawn) -> tuple[Drawn, ...]:
    """The tray tipper with a plate for a coupler, its pins inside."""
    along = (C - B) / abs(C - B)
    side = WIDE * along * 1j
    low, high = B - WIDE * along, C + WIDE * along
    return (
        *pins(),
        rod(A, B),
        path(low - side, high - side, high + side, low + side, closed=True),
        rod(C, D),
        *windows,
    )


MIDDLE = (B + C) / 2


def test_a_window_in_a_plate_is_no_loose_part() -> None:
    window = path(MIDDLE - 5, MIDDLE + 5, MIDDLE + 5j, closed=True)
    assert floating(*plate(window)) == []


def test_a_window_of_loose_lines_is_none_either() -> None:
    corners = (MIDDLE - 5, MIDDLE + 5, MIDDLE + 5j)
    loose = (line(corners[0], corners[1]), line(corners[1], corners[2]), line(corners[2], corners[0]))
    assert floating(*plate(*loose)) == []


def test_an_outline_beside_the_plate_is_told() -> None:
    away = MIDDLE + 200j
    (seen,) = floating(*plate(path(away - 5, away + 5, away + 5j, closed=True)))
    assert seen.amount == 1.0


def hatched(*strokes: Drawn) -> tuple[Drawn, ...]:
    """The tray tipper with a base line under pin A, four strokes on it, and what else is given."""
    base = (line(A - 8 - 4j, A + 8 - 4j), *(line(A + x - 4j, A + x - 2 - 6j) for x in (-5, -1, 3, 7)))
    return (*pins()[1:], ring(A), *base, rod(A, B), rod(B, C), rod(C, D), *strokes)


def test_a_clipped_stroke_of_a_frame_symbol_is_no_loose_part() -> None:
    assert floating(*hatched(line(A + 8 - 7j, A + 7.5 - 7.5j))) == []


def test_a_longer_line_or_one_turned_away_is_told() -> None:
    assert len(floating(*hatched(line(A + 8 - 7j, A + 2 - 13j)))) == 1
    assert len(floating(*hatched(line(A + 8 - 7j, A + 7.5 - 6.5j)))) == 1
