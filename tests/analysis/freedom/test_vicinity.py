"""What counts as near a link, by which slow ends of large linkages are judged."""

from __future__ import annotations

import numpy as np

from dxfcheck.analysis.freedom.vicinity import fastest_nearby, links_near
from dxfcheck.analysis.topology import topology_of
from dxfcheck.tolerances.analysis import DENSE_LINKS, NEARBY_JOINTS
from tests.analysis.lattices import scissor_lattice


def test_everything_is_near_in_a_small_linkage() -> None:
    topology = topology_of(scissor_lattice(10))
    speeds = np.arange(12.0)
    assert links_near(topology, (1, 0)) is None
    assert fastest_nearby(topology, speeds).tolist() == [11.0] * 12


def test_the_nearest_links_of_a_lattice_are_those_of_the_next_cells() -> None:
    near = links_near(topology_of(scissor_lattice(400)), (201, 0))
    assert near is not None
    assert len(near) in (DENSE_LINKS, DENSE_LINKS + 1)
    assert 0 not in near
    assert min(near) > 201 - DENSE_LINKS
    assert max(near) < 201 + DENSE_LINKS


def test_a_speed_is_felt_so_many_joints_away_and_not_through_the_frame() -> None:
    topology = topology_of(scissor_lattice(400))
    speeds = np.zeros(402)
    speeds[0] = 7.0
    speeds[201] = 1.0
    felt = np.flatnonzero(fastest_nearby(topology, speeds) == 1.0)
    assert felt.min() >= 201 - 2 * NEARBY_JOINTS
    assert felt.max() <= 202 + 2 * NEARBY_JOINTS
    assert fastest_nearby(topology, speeds)[1] == 0.0
