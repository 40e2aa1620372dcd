from __future__ import annotations

import pytest
from ezdxf.math import OCS, Matrix44
from hypothesis import given
from hypothesis import strategies as st

from dxfcheck.drawing.placement import FLIPPED, SHEET, Placement, reference_placement

figures = st.floats(-50, 50).map(lambda figure: round(figure, 3))
scales = figures.filter(lambda figure: abs(figure) > 0.1)
triples = st.tuples(figures, figures, figures)
placements = st.builds(reference_placement, triples, triples, st.tuples(scales, scales, scales), figures)
points = st.builds(complex, figures, figures)


def test_the_flip_is_the_arbitrary_axis_of_a_normal_into_the_sheet() -> None:
    x, y, z = OCS((0, 0, -1)).to_wcs((3, 4, 5)).xyz
    assert (FLIPPED(3 + 4j), FLIPPED.height(5)) == (complex(x, y), z)


def test_a_reference_goes_where_the_matrix_of_its_steps_takes_it() -> None:
    place = reference_placement((10, 20, 3), (1, 2, 0.5), (2, -3, 4), 30)
    steps = Matrix44.chain(
        Matrix44.translate(-1, -2, -0.5),
        Matrix44.scale(2, -3, 4),
        Matrix44.z_rotate(0.5235987755982988),
        Matrix44.translate(10, 20, 3),
    )
    x, y, z = steps.transform((7, 8, 9)).xyz
    assert place(7 + 8j) == pytest.approx(complex(x, y))
    assert place.height(9) == pytest.approx(z)


@given(placements, placements, points)
def test_placements_compose(outer: Placement, inner: Placement, point: complex) -> None:
    assert outer.after(inner)(point) == pytest.approx(outer(inner(point)), abs=1e-6)
    assert outer.after(inner).height(point.real) == pytest.approx(outer.height(inner.height(point.real)), abs=1e-6)


def test_circles_stay_round_under_mirroring_but_not_under_uneven_scale() -> None:
    assert SHEET.even
    assert reference_placement((0, 0, 0), (0, 0, 0), (-2, 2, 1), 33).even
    assert not reference_placement((0, 0, 0), (0, 0, 0), (2, 2.00001, 1), 0).even


def test_a_scale_of_zero_is_read_as_one() -> None:
    assert reference_placement((0, 0, 0), (0, 0, 0), (0, 0, 0), 0) == SHEET
