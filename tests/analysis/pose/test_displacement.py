from __future__ import annotations

import cmath
from collections.abc import Callable
from dataclasses import replace

import numpy as np
import pytest
from numpy.typing import NDArray

from dxfcheck.analysis.freedom.constraints import Body, bodies_of, constraint_matrix
from dxfcheck.analysis.pose.displacement import can_be_displaced, displace
from dxfcheck.analysis.topology import topology_of
from dxfcheck.linkage import Joint, Linkage
from tests.model import Other, linkage

SMALL = 1e-5


def with_shapes(model: Linkage, shape: Callable[[Joint], Joint]) -> Linkage:
    """The model with what its other joints need besides their velocities."""
    joints = tuple(joint if joint.kind in ("pin", "slide") else shape(joint) for joint in model.joints)
    return replace(model, joints=joints)


def in_slot(carrier: str, middle: complex | None = None) -> Linkage:
    """A crank whose pin B runs in a slot of the frame or of a lever that turns about D."""
    points = {"A": 0j, "B": 30 + 40j, "D": 100 + 0j}
    along = points["B"] - points["D"] if middle is None else 1j * (points["B"] - middle)
    slot: list[Other] = [("pin in slot", points["B"], "crank", carrier, along)]
    pins = {"A": "ground crank", "D": "ground lever"}
    model = linkage(points, pins, others=slot, tracing={"B": "crank"})
    owner = [link.name for link in model.links].index(carrier)

    def shape(joint: Joint) -> Joint:
        curves = (middle, None) if owner == joint.first else (None, middle)
        return replace(joint, carrier=owner, curves=curves)

    return with_shapes(model, shape)


def gears(*, inside: bool = False) -> Linkage:
    """A pinion of 20 about A and a wheel about D that mesh, outside or inside."""
    radius = 20.0
    at = radius + 0j
    points = {"A": 0j, "D": (-40 + 0j) if inside else (80 + 0j)}
    mesh: list[Other] = [("rolling", at, "pinion", "wheel", 1j)]
    model = linkage(points, {"A": "ground pinion", "D": "ground wheel"}, others=mesh)
    return with_shapes(model, lambda joint: replace(joint, curves=(points["A"], points["D"])))


def rolling_wheel(*, full: bool) -> Linkage:
    """A wheel of 10 about C on a line of the frame, pushed by a rod from the crank AB."""
    points = {"A": 0j, "B": 10 + 20j, "C": 80 + 5j}
    track: list[Other] = [("full rolling" if full else "rolling", 80 - 5j, "ground", "wheel", 1 + 0j)]
    model = linkage(points, {"A": "ground crank", "B": "crank rod", "C": "rod wheel"}, others=track)
    return with_shapes(model, lambda joint: replace(joint, curves=(None, points["C"])))


def slider() -> Linkage:
    points = {"A": 0j, "B": 30 + 40j, "C": 150 + 10j}
    pins = {"A": "ground crank", "B": "crank rod", "C": "rod block"}
    return linkage(points, pins, others=[("slide", points["C"], "ground", "block", 2 + 1j)])


MODELS = {
    "slider": slider(),
    "straight slot of a lever": in_slot("lever"),
    "straight slot, runner second": replace(
        in_slot("lever"),
        joints=tuple(
            replace(joint, first=joint.second, second=joint.first) if joint.kind == "pin in slot" else joint
            for joint in in_slot("lever").joints
        ),
    ),
    "curved slot of a lever": in_slot("lever", 70 + 90j),
    "gears outside": gears(),
    "gears inside": gears(inside=True),
    "wheel on the frame": rolling_wheel(full=False),
    "wheel that nothing else holds": rolling_wheel(full=True),
}


@pytest.mark.parametrize("model", MODELS.values(), ids=MODELS)
def test_what_opens_is_the_constraint_matrix_times_a_small_displacement(model: Linkage) -> None:
    bodies = bodies_of(model)
    matrix = constraint_matrix(model, topology_of(model), bodies)
    for column in range(matrix.shape[1]):
        small = np.zeros(matrix.shape[1])
        small[column] = SMALL
        there, back = (displace(model, bodies, sign * small).errors for sign in (1.0, -1.0))
        np.testing.assert_allclose((there - back) / (2.0 * SMALL), matrix[:, column], atol=1e-8)


@pytest.mark.parametrize("model", MODELS.values(), ids=MODELS)
def test_nothing_opens_where_the_whole_sheet_stays(model: Linkage) -> None:
    bodies = bodies_of(model)
    still = displace(model, bodies, np.zeros(3 * (len(model.links) - 1)))
    np.testing.assert_allclose(still.errors, 0.0, atol=1e-12)
    assert [joint.at for joint in still.linkage.joints] == pytest.approx([joint.at for joint in model.joints])


def turned(bodies: list[Body], angles: tuple[float, ...], pivots: tuple[complex, ...]) -> NDArray[np.float64]:
    """A displacement that turns every moving link about its pivot."""
    parts = []
    for body, angle, pivot in zip(bodies[1:], angles, pivots, strict=True):
        way = (body.centre - pivot) * (cmath.rect(1.0, angle) - 1.0)
        parts += [angle * body.size, way.real, way.imag]
    return np.array(parts)


def test_gears_that_turn_in_the_ratio_of_their_radii_stay_in_mesh() -> None:
    model = gears()
    bodies = bodies_of(model)
    pivots = (0j, 80 + 0j)
    own = displace(model, bodies, turned(bodies, (0.6, -0.2), pivots))
    np.testing.assert_allclose(own.errors, 0.0, atol=1e-12)
    wrong = displace(model, bodies, turned(bodies, (0.6, 0.2), pivots))
    assert np.abs(wrong.errors).max() == pytest.approx(24.0)


def test_a_curved_slot_holds_its_pin_at_one_distance_from_its_middle() -> None:
    """A slot of the frame about D guides B as a rod from D would."""
    middle = 100 + 0j
    points = {"A": 0j, "B": 30 + 40j}
    slot: list[Other] = [("pin in slot", points["B"], "ground", "crank", 1j * (points["B"] - middle))]
    model = linkage(points, {"A": "ground crank"}, others=slot, tracing={"B": "crank"})
    model = with_shapes(model, lambda joint: replace(joint, carrier=0, curves=(middle, None)))
    bodies = bodies_of(model)
    there = displace(model, bodies, turned(bodies, (0.3,), (0j,)))
    gone = abs(points["B"] * cmath.rect(1.0, 0.3) - middle) - abs(points["B"] - middle)
    assert abs(there.errors[2]) == pytest.approx(abs(gone))
    slotted = there.linkage.joints[-1]
    assert slotted.direction is not None
    assert abs((slotted.direction * (slotted.at - middle).conjugate()).real) < 1e-9


def test_a_joint_of_unknown_shape_is_refused() -> None:
    model = in_slot("lever")
    unknown = replace(model, joints=tuple(replace(joint, carrier=None) for joint in model.joints))
    assert can_be_displaced(model)
    assert not can_be_displaced(unknown)
    with pytest.raises(ValueError, match="M1 does not say on which circle or line it runs"):
        displace(unknown, bodies_of(unknown), np.zeros(6))
