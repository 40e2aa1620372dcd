from __future__ import annotations

import cmath
import math
from collections.abc import Mapping
from dataclasses import replace

import pytest

from dxfcheck.analysis.freedom.constraints import bodies_of, constraint_matrix, freedom_of, rank_tolerance
from dxfcheck.analysis.pose.finite_motion import finite_motion
from dxfcheck.analysis.results import FiniteMotion
from dxfcheck.analysis.topology import topology_of
from dxfcheck.linkage import Linkage
from tests.analysis.pose.test_displacement import in_slot, rolling_wheel, slider, with_shapes
from tests.model import Other, linkage

THREE_CRANKS = {
    "A": "ground first",
    "B": "first coupler",
    "C": "coupler second",
    "D": "second ground",
    "E": "ground third",
    "F": "third coupler",
}
FOUR_BAR = {"A": "ground crank", "B": "crank coupler", "C": "coupler rocker", "D": "rocker ground"}


def stepped(model: Linkage) -> FiniteMotion | None:
    bodies, tolerance = bodies_of(model), rank_tolerance(model)
    freedom = freedom_of(constraint_matrix(model, topology_of(model), bodies), lambda: tolerance)
    across = [pin.at.real for pin in model.pins]
    up = [pin.at.imag for pin in model.pins]
    diagonal = math.hypot(max(across) - min(across), max(up) - min(up))
    return finite_motion(model, bodies, freedom.motions, tolerance, diagonal)


def verdict(points: Mapping[str, complex], pins: Mapping[str, str]) -> str:
    found = stepped(linkage(points, pins))
    assert found is not None
    return found.verdict


def parallel_cranks(crank: complex, third: float = 1.0, decimals: int = 12) -> dict[str, complex]:
    """Three cranks side by side; the third is longer by a factor."""
    places = {"A": 0j, "B": crank, "C": 100 + crank, "D": 100 + 0j, "E": 47.1234 + 0j, "F": 47.1234 + third * crank}
    return {name: complex(round(at.real, decimals), round(at.imag, decimals)) for name, at in places.items()}


def test_a_parallelogram_with_a_third_crank_moves_through() -> None:
    assert verdict(parallel_cranks(cmath.rect(50.0, 0.9)), THREE_CRANKS) == "through"


@pytest.mark.parametrize("angle", range(8, 90, 9))
@pytest.mark.parametrize("decimals", [2, 3])
def test_one_typed_to_few_decimals_moves_through_as_well(angle: int, decimals: int) -> None:
    places = parallel_cranks(cmath.rect(50.0, math.radians(angle)), decimals=decimals)
    assert verdict(places, THREE_CRANKS) == "through"


def test_a_third_crank_that_is_longer_locks_and_the_misfit_is_told() -> None:
    found = stepped(linkage(parallel_cranks(30 + 40j, third=1.001), THREE_CRANKS))
    assert found is not None
    assert (found.verdict, found.freedom) == ("locked", 0)
    assert found.misfit == pytest.approx(0.05, rel=0.25)
    assert found.misfit > 3 * found.limit


@pytest.mark.parametrize("elbow", [40 + 0j, 40.03 + 0.01j])
def test_a_stretched_pair_of_bars_locks(elbow: complex) -> None:
    """Typed to two decimals or drawn exactly: it only shivers."""
    places = {"A": 0j, "B": elbow, "C": 2.5 * elbow}
    found = stepped(linkage(places, {"A": "ground left", "B": "left right", "C": "right ground"}))
    assert found is not None
    assert found.verdict == "locked"
    assert found.misfit > 10


def test_a_flat_parallelogram_keeps_one_of_its_two_freedoms() -> None:
    found = stepped(linkage({"A": 0j, "B": 50 + 0j, "C": 150 + 0j, "D": 100 + 0j}, FOUR_BAR))
    assert found is not None
    assert (found.verdict, found.freedom) == ("momentary", 1)


@pytest.mark.parametrize(
    "model",
    [
        linkage({"A": 0j, "B": 30 + 40j, "C": 150 + 80j, "D": 100 + 0j}, FOUR_BAR),
        slider(),
        in_slot("lever"),
        in_slot("lever", 70 + 90j),
        rolling_wheel(full=True),
    ],
    ids=["four-bar", "slider-crank", "slot", "curved slot", "wheel"],
)
def test_what_moves_as_counted_moves_through(model: Linkage) -> None:
    found = stepped(model)
    assert found is not None
    assert (found.verdict, found.freedom) == ("through", 1)


def test_a_scale_changes_no_verdict() -> None:
    for scale in (1e-3, 1e3):
        places = {name: scale * at for name, at in parallel_cranks(30 + 40j, third=1.001).items()}
        found = stepped(linkage(places, THREE_CRANKS))
        assert found is not None
        assert found.verdict == "locked"
        assert found.misfit == pytest.approx(0.05 * scale, rel=0.25)


def test_what_cannot_be_judged_is_not() -> None:
    """A pin in a slot of which it is not known whose it is."""
    model = with_shapes(in_slot("lever"), lambda joint: replace(joint, carrier=None))
    assert stepped(model) is None
    free: list[Other] = []
    loose = linkage({"A": 0j, "B": 10 + 0j}, {"A": "ground bar"}, others=free, tracing={"B": "bar"})
    found = stepped(loose)
    assert found is not None
    assert found.verdict == "through"
