"""What lies near a link in a large linkage: speeds there are judged against those nearby, not against the far end's.

At the top of a lattice of thousands of arms everything runs thousands of times as fast as at its foot; a crank there
is slow, but held it is not. In a mechanism of up to DENSE_LINKS links everything is near.
"""

from __future__ import annotations

from collections import deque

import numpy as np
from numpy.typing import NDArray

from dxfcheck.analysis.topology import Topology
from dxfcheck.tolerances.analysis import DENSE_LINKS, NEARBY_JOINTS

__all__ = ["fastest_nearby", "links_near"]


def links_near(topology: Topology, links: tuple[int, ...]) -> frozenset[int] | None:
    """The DENSE_LINKS moving links nearest to some links by joints, not counting those of the frame; None means all."""
    if topology.links <= DENSE_LINKS:
        return None
    near = {link for link in links if link != topology.frame}
    waiting = deque(sorted(near))
    around = _neighbours(topology)
    while waiting and len(near) < DENSE_LINKS:
        for other in around[waiting.popleft()]:
            if other not in near:
                near.add(other)
                waiting.append(other)
    return frozenset(near)


def _neighbours(topology: Topology) -> list[list[int]]:
    around: list[list[int]] = [[] for _ in range(topology.links)]
    for joint in topology.joints:
        if topology.frame not in (joint.first, joint.second):
            around[joint.first].append(joint.second)
            around[joint.second].append(joint.first)
    return around


def fastest_nearby(topology: Topology, speeds: NDArray[np.float64]) -> NDArray[np.float64]:
    """For each link the greatest of these speeds (one a link) among the links near it, within so many joints."""
    if topology.links <= DENSE_LINKS:
        return np.full(topology.links, speeds.max(initial=0.0))
    ends = [
        (joint.first, joint.second) for joint in topology.joints if topology.frame not in (joint.first, joint.second)
    ]
    first, second = np.array(ends, dtype=np.intp).reshape(-1, 2).T
    nearby = speeds.copy()
    for _ in range(NEARBY_JOINTS):
        before = nearby.copy()
        np.maximum.at(nearby, first, before[second])
        np.maximum.at(nearby, second, before[first])
    return nearby
