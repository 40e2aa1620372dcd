from __future__ import annotations

import pytest

from dxfcheck.geometry import Point
from dxfcheck.reading.shapes.bar_axes import long_axis
from dxfcheck.reading.shapes.contours import Contour, find_contours
from tests.sketches import Drawn, laid_out, obround, path, rectangle, ring


def contour(outline: Drawn) -> tuple[Contour, list[float]]:
    sheet, _ = laid_out(ring(0j, 1.0), outline)
    (found,) = find_contours(sheet.linework, sheet.touching, sheet.tolerance, (), sheet.pins)
    axis = long_axis(found, sheet.tolerance)
    return found, [] if axis is None else sorted(round(end.real, 6) for end in axis)


@pytest.mark.parametrize(
    ("outline", "ends"),
    [
        (rectangle(0j, 60, 10), [-30, 30]),
        (obround(-30 + 0j, 30 + 0j, 5), [-35, 35]),
        (path(-30 - 8j, 30 - 4j, 30 + 4j, -30 + 8j, closed=True), [-30, 30]),
        (rectangle(0j, 20, 10), []),
        (path(-30 - 8j, 30 - 8j, 30 + 4j, -30 + 8j, closed=True), []),
    ],
    ids=["a flat bar", "a round bar", "a tapered bar", "a plate", "a skew outline"],
)
def test_the_axis_of_a_bar_runs_from_end_to_end(outline: Drawn, ends: list[float]) -> None:
    assert contour(outline)[1] == ends


@pytest.mark.parametrize("turn", [1j, 0.6 + 0.8j])
def test_the_axis_turns_with_the_bar(turn: Point) -> None:
    corners = [turn * at for at in (-30 - 5j, 30 - 5j, 30 + 5j, -30 + 5j)]
    sheet, _ = laid_out(ring(0j, 1.0), path(*corners, closed=True))
    (found,) = find_contours(sheet.linework, sheet.touching, sheet.tolerance, (), sheet.pins)
    axis = long_axis(found, sheet.tolerance)
    assert axis is not None
    assert axis.aside(20 * turn) == pytest.approx(0.0, abs=1e-9)
    assert sorted(axis.overhangs(20 * turn)) == pytest.approx([10.0, 50.0])
