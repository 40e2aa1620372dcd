"""Redundant constraints: which joints depend on one another, and what can go; checked by taking it away."""

from __future__ import annotations

from dataclasses import replace

import pytest

from dxfcheck.analysis import analyse
from dxfcheck.analysis.faults import dependence
from dxfcheck.analysis.faults.dependence import dependent_joints
from dxfcheck.analysis.freedom.constraints import bodies_of, constraint_matrix
from dxfcheck.analysis.freedom.freedom import freedom_of_linkage, part_of
from dxfcheck.analysis.results import DependentJoints
from dxfcheck.analysis.topology import topology_of
from dxfcheck.linkage import Joint, Linkage
from tests.analysis.random_models import random_model, stacked_floors
from tests.model import Other, linkage

PARALLELOGRAM = {"A": 0j, "B": 30 + 60j, "C": 130 + 60j, "D": 100 + 0j, "E": 80 + 60j, "F": 50 + 0j}
THREE_CRANKS = {"A": "ground a", "B": "a b", "C": "b c", "D": "ground c", "E": "b d", "F": "ground d"}


def found(model: Linkage) -> tuple[DependentJoints, ...]:
    return dependent_joints(model, topology_of(model), bodies_of(model))


def freedom(model: Linkage) -> int:
    return len(freedom_of_linkage(model).motions)


def redundant(model: Linkage) -> int:
    """Constraints less rank."""
    matrix = constraint_matrix(model, topology_of(model), bodies_of(model))
    columns = matrix.shape[1]
    return len(matrix) - int(columns) + freedom(model)


def without_link(model: Linkage, link: int) -> Linkage:
    """The rest, where the links of a pin that lost its first one hang on the next."""
    joints = []
    heirs: dict[int, int] = {}
    for joint in model.joints:
        if joint.pin is not None and joint.kind == "pin" and joint.first == link:
            heir = heirs.setdefault(joint.pin, joint.second)
            joints += [replace(joint, first=heir)] if heir != joint.second else []
        elif link not in (joint.first, joint.second):
            joints.append(joint)
    rest = tuple(number for number in range(len(model.links)) if number != link)
    return part_of(replace(model, joints=tuple(joints)), rest)


def test_third_crank_of_a_parallelogram() -> None:
    """All six pins depend on one another; any crank can go, the coupler cannot."""
    model = linkage(PARALLELOGRAM, THREE_CRANKS, turn={"a": 1.0})
    (one,) = analyse(model).dependent_joints
    assert one.joints == tuple(range(6))
    assert one.joints_to_go == ()
    assert [model.links[link].name for link in one.links_to_go] == ["a", "c", "d"]


def test_the_same_typed_to_two_decimals() -> None:
    turned = 0.955336489 + 0.295520207j
    points = {
        name: complex(round((at * turned).real, 2), round((at * turned).imag, 2)) for name, at in PARALLELOGRAM.items()
    }
    assert found(linkage(points, THREE_CRANKS)) == found(linkage(PARALLELOGRAM, THREE_CRANKS))


def test_what_moves_freely_beside_it_is_not_named() -> None:
    """The truss has one bar too many; neither the arm nor its pin has to do with it."""
    points = {"A": 0j, "B": 100 + 0j, "C": 110 + 90j, "D": -5 + 95j, "L": 300 + 0j, "M": 350 + 20j}
    pins = {"A": "ground ac ad", "B": "ground bc bd", "C": "bc ac cd", "D": "ad bd cd", "L": "ground arm"}
    model = linkage(points, pins, tracing={"M": "arm"})
    (one,) = found(model)
    assert {model.joints[joint].pin for joint in one.joints} == {0, 1, 2, 3}
    assert [model.links[link].name for link in one.links_to_go] == ["ac", "ad", "bc", "bd", "cd"]


def test_one_of_two_slides_along_the_same_line_can_go() -> None:
    slides: list[Other] = [("slide", at, "ground", "block", 1 + 0j) for at in (150 + 0j, 200 + 0j)]
    pins = {"O": "ground crank", "B": "crank rod", "P": "rod block"}
    both = found(linkage({"O": 0j, "B": 30 + 40j, "P": 150 + 0j}, pins, others=slides))
    assert [one.joints for one in both] == [(3, 4), (3, 4)]
    assert [one.joints_to_go for one in both] == [(3, 4), (3, 4)]
    assert [one.links_to_go for one in both] == [(), ()]


def test_each_floor_has_its_own() -> None:
    model = stacked_floors(30)
    assert sorted(one.joints for one in found(model)) == [tuple(range(6 * floor, 6 * floor + 6)) for floor in range(30)]
    assert all(len(one.links_to_go) == 3 for one in found(model))


def test_nothing_redundant_nothing_told() -> None:
    assert found(linkage({"A": 0j, "B": 50 + 80j, "C": 100 + 0j}, {"A": "ground a", "B": "a b", "C": "ground b"})) == ()


@pytest.mark.parametrize("coarse", [False, True])
@pytest.mark.parametrize("seed", range(40))
def test_sets_are_minimal_and_what_can_go_adds_no_freedom(seed: int, *, coarse: bool) -> None:
    model = random_model(seed, 12, coarse=coarse)
    whole, told = freedom(model), found(model)
    assert len(told) == redundant(model)
    for one in told:
        assert redundant(only(model, one.joints)) > 0
    named = {joint for one in told for joint in one.joints}
    for joint in named:
        less = replace(model, joints=without(model.joints, joint))
        assert (freedom(less) == whole) == any(joint in one.joints_to_go for one in told)
    links = {end for joint in named for end in (model.joints[joint].first, model.joints[joint].second)} - {0}
    for link in links:
        less = without_link(model, link)
        can_go = freedom(less) == whole and redundant(less) < redundant(model)
        assert can_go == any(link in one.links_to_go for one in told)


def only(model: Linkage, joints: tuple[int, ...]) -> Linkage:
    return replace(model, joints=tuple(model.joints[joint] for joint in joints))


def without(joints: tuple[Joint, ...], left_out: int) -> tuple[Joint, ...]:
    return joints[:left_out] + joints[left_out + 1 :]


@pytest.mark.parametrize("seed", range(40, 80))
def test_traced_through_the_steps_it_is_the_same(seed: int, monkeypatch: pytest.MonkeyPatch) -> None:
    """As many sets, of the same joints in all, and the same that can go."""
    model = random_model(seed, 20)
    small = found(model)
    monkeypatch.setattr(dependence, "DENSE_LINKS", 0)
    large = found(model)
    assert len(large) == len(small)
    for kind in ("joints", "joints_to_go", "links_to_go"):
        assert {each for one in large for each in getattr(one, kind)} == {
            each for one in small for each in getattr(one, kind)
        }
