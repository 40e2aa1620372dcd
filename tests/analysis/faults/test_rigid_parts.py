"""Which links form rigid sub-structures: on known linkages, and against ranks of every part on its own."""

from __future__ import annotations

from dataclasses import replace

import pytest

from dxfcheck.analysis import analyse
from dxfcheck.analysis.faults.rigid_parts import rigid_parts
from dxfcheck.analysis.freedom.constraints import bodies_of
from dxfcheck.analysis.freedom.freedom import freedom_at_pose, freedom_of_linkage, part_of
from dxfcheck.analysis.results import RigidParts
from dxfcheck.analysis.topology import topology_of
from dxfcheck.linkage import Linkage
from tests.analysis.random_models import random_model
from tests.examples import FOUR_BAR, FOUR_BAR_POINTS
from tests.model import linkage

SQUARE = {"A": 0j, "B": 100 + 0j, "C": 110 + 90j, "D": -5 + 95j}
BRACED = {"A": "ground ac ad", "B": "ground bc bd", "C": "bc ac cd", "D": "ad bd cd"}


def parts_of(model: Linkage) -> RigidParts:
    topology, bodies = topology_of(model), bodies_of(model)
    return rigid_parts(model, topology, bodies, freedom_at_pose(model, topology, bodies).motions)


def names(model: Linkage, links: tuple[int, ...]) -> set[str]:
    return {model.links[link].name for link in links}


def test_truss_on_the_frame_beside_a_loose_arm() -> None:
    """One bar too many and one arm too loose: the count is 0 and hides both."""
    points = {**SQUARE, "L": 300 + 0j, "M": 350 + 20j}
    model = linkage(points, {**BRACED, "L": "ground arm"}, tracing={"M": "arm"}, turn={"arm": 1.0})
    result = analyse(model)
    assert (result.mobility.count, result.mobility.at_pose) == (0, 1)
    assert result.rigid_parts is not None
    assert names(model, result.rigid_parts.with_frame) == {"ac", "ad", "bc", "bd", "cd"}
    assert result.rigid_parts.others == ()


def test_truss_that_moves_with_a_crank() -> None:
    pins = {"A": "ab ac ad", "B": "ab bc bd", "C": "bc ac cd", "D": "ad bd cd crank", "P": "ground crank"}
    model = linkage({**SQUARE, "P": -50 - 50j}, pins)
    parts = parts_of(model)
    assert parts.with_frame == ()
    assert [names(model, part) for part in parts.others] == [{"ab", "ac", "ad", "bc", "bd", "cd"}]


def test_four_bar_holds_none() -> None:
    assert parts_of(linkage(FOUR_BAR_POINTS, FOUR_BAR)) == RigidParts((), ())


def test_crank_at_rest_in_line_with_its_coupler_is_not_locked() -> None:
    """At the dead centre it does not move in the one motion there is, but nothing holds it."""
    points = {"A": 0j, "B": 20 + 35j, "C": 100 + 60j, "D": 164 + 80j}
    assert parts_of(linkage(points, FOUR_BAR)) == RigidParts((), ())


def test_locked_linkage_is_one_with_the_frame() -> None:
    points = {"A": 0j, "B": 50 + 80j, "C": 100 + 0j}
    assert parts_of(linkage(points, {"A": "ground a", "B": "a b", "C": "ground b"})).with_frame == (1, 2)


def test_assembly_without_a_frame_names_its_held_link_too() -> None:
    model = replace(linkage({"A": 0j, "B": 50 + 80j, "C": 90 + 0j}, {"A": "p q", "B": "q r", "C": "r p"}), frame=1)
    assert parts_of(replace(model, grounded=False)).others == ((1, 2, 3),)


def test_the_usual_linkage_pays_nothing() -> None:
    result = analyse(linkage(FOUR_BAR_POINTS, FOUR_BAR, turn={"crank": 1.0}))
    assert result.rigid_parts is None
    assert result.dependent_joints == ()
    assert result.free_parts == ()


@pytest.mark.parametrize("coarse", [False, True])
@pytest.mark.parametrize("seed", range(60))
def test_every_part_is_rigid_by_itself_and_none_could_be_larger(seed: int, *, coarse: bool) -> None:
    """Rank of each part, of each part with one link more that is joined to it, and of two parts together."""
    model = random_model(seed, 14, coarse=coarse)
    parts = parts_of(model)
    groups = [(0, *parts.with_frame), *parts.others]
    for group in groups:
        assert len(freedom_of_linkage(part_of(model, group)).motions) == 0
    rigid = {link: number for number, group in enumerate(groups) for link in group}
    for joint in model.joints:
        ends = [rigid.get(end, -1 - end) for end in (joint.first, joint.second)]
        if ends[0] != ends[1]:
            both = [groups[end] if end >= 0 else (-1 - end,) for end in ends]
            assert len(freedom_of_linkage(part_of(model, tuple(sorted((*both[0], *both[1]))))).motions) > 0


def test_pin_that_joins_the_part_to_an_outside_link_first() -> None:
    """The joints of a pin run from its first link, here the crank: the bars there are still pinned to one another."""
    pins = {"P": "ground crank", "D": "ad bd cd crank", "A": "ab ac ad", "B": "ab bc bd", "C": "bc ac cd"}
    model = linkage({**SQUARE, "P": -50 - 50j}, pins)
    assert model.links[1].name == "crank"
    assert [names(model, part) for part in parts_of(model).others] == [{"ab", "ac", "ad", "bc", "bd", "cd"}]
