"""The order in which the links of a large linkage are dealt with."""

from __future__ import annotations

import pytest

from dxfcheck.analysis.freedom.fronts import fronts_of
from dxfcheck.analysis.topology import topology_of
from dxfcheck.linkage import Linkage
from tests.analysis.lattices import four_bar_chain, scissor_lattice
from tests.analysis.random_models import random_model

MODELS = [*map(random_model, range(20)), scissor_lattice(60), four_bar_chain(30)]


@pytest.mark.parametrize("model", MODELS, ids=range(len(MODELS)))
def test_every_link_and_every_joint_has_its_turn_once(model: Linkage) -> None:
    fronts = fronts_of(topology_of(model))
    assert sorted(link for front in fronts for link in front.links) == list(range(1, len(model.links)))
    assert sorted(joint for front in fronts for joint in front.joints) == list(range(len(model.joints)))
    assert sorted(part for front in fronts for part in front.parts) == [
        number for number, front in enumerate(fronts) if front.border
    ]


@pytest.mark.parametrize("model", MODELS, ids=range(len(MODELS)))
def test_joints_join_only_links_of_the_step_its_border_and_the_frame(model: Linkage) -> None:
    done: set[int] = set()
    for front in fronts_of(topology_of(model)):
        inside = {0, *front.links, *front.border}
        assert done.isdisjoint(front.border)
        for joint in front.joints:
            assert {model.joints[joint].first, model.joints[joint].second} <= inside
        done.update(front.links)


@pytest.mark.parametrize(("model", "widest"), [(scissor_lattice(2000), 2), (four_bar_chain(1000), 1)])
def test_borders_stay_narrow_however_long_the_linkage(model: Linkage, widest: int) -> None:
    assert max(len(front.border) for front in fronts_of(topology_of(model))) == widest


def test_a_link_with_hundreds_of_neighbours_comes_last() -> None:
    """Its neighbours are dealt with one after another, never all at once."""
    topology = topology_of(scissor_lattice(10))
    joint = topology.joints[0]
    hub = topology._replace(
        links=402, joints=tuple(joint._replace(first=1, second=link, pin=link) for link in range(2, 402))
    )
    fronts = fronts_of(hub)
    assert 1 in fronts[-1].links
    assert max(len(front.border) for front in fronts) == 1
