"""Which links form rigid sub-structures at the drawn pose, whatever the drives do.

Links without relative motion at a joint in any of the allowed motions are candidates; what hangs together so is rigid
only if it is so by itself, taken out of the linkage: a crank at rest in line with its coupler is not locked. What is
not is looked at again on its own, until every part is rigid or a single link. Source of the count: columns less rank,
as for the whole (constraints.py).
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from dxfcheck.analysis.faults.joined import joined_groups
from dxfcheck.analysis.freedom.constraints import Body, Matrix, bodies_of
from dxfcheck.analysis.freedom.freedom import freedom_at_pose, part_of
from dxfcheck.analysis.freedom.vicinity import fastest_nearby
from dxfcheck.analysis.results import RigidParts
from dxfcheck.analysis.topology import Topology, topology_of
from dxfcheck.geometry import Point
from dxfcheck.linkage import Linkage
from dxfcheck.tolerances.analysis import STILL_JOINT

__all__ = ["rigid_parts"]


def rigid_parts(linkage: Linkage, topology: Topology, bodies: list[Body], motions: Matrix) -> RigidParts:
    """The moving links that are rigid with the frame, and the other groups of links rigid in themselves.

    ``motions`` are the motions that the constraints allow, one a row, no drive applied. Joints with the held link of an
    assembly that nothing ties to the frame count like all others.
    """
    with_frame: list[int] = []
    others: list[tuple[int, ...]] = []
    for links in _rigid_within(linkage, topology, bodies, motions):
        if linkage.frame in links and linkage.grounded:
            with_frame += [link for link in links if link != linkage.frame]
        else:
            others.append(links)
    return RigidParts(with_frame=tuple(with_frame), others=tuple(sorted(others)))


def _rigid_within(linkage: Linkage, topology: Topology, bodies: list[Body], motions: Matrix) -> list[tuple[int, ...]]:
    """Every largest group of two or more links that is rigid by itself, in ascending order."""
    if not len(motions):
        return [tuple(range(topology.links))] if topology.links > 1 else []
    found: list[tuple[int, ...]] = []
    pairs = _neighbours(linkage)
    for links in _groups(topology, pairs, _still(pairs, topology, bodies, motions)):
        part = part_of(linkage, links)
        inner = topology_of(part)
        own = bodies_of(part)
        left = freedom_at_pose(part, inner, own).motions
        if not len(left):
            found.append(links)
        elif len(links) < topology.links:
            found += [tuple([links[link] for link in group]) for group in _rigid_within(part, inner, own, left)]
    return found


class _Pair(NamedTuple):
    """Two links that a joint ties to one another, or that share a pin of three or more."""

    first: int
    second: int
    at: Point
    slides: bool


def _neighbours(linkage: Linkage) -> list[_Pair]:
    """All pairs of neighbours: at a pin of several links each with each, not only with the one that the joints name."""
    pairs = []
    at_pin: dict[int, list[int]] = {}
    for joint in linkage.joints:
        pairs.append(_Pair(joint.first, joint.second, joint.at, joint.kind == "slide"))
        if joint.kind == "pin" and joint.pin is not None:
            there = at_pin.setdefault(joint.pin, [joint.first])
            pairs += [_Pair(link, joint.second, joint.at, slides=False) for link in there if link != joint.first]
            there.append(joint.second)
    return pairs


def _groups(topology: Topology, pairs: list[_Pair], still: NDArray[np.bool_]) -> list[tuple[int, ...]]:
    """Links that hang together by neighbours without relative motion, two or more."""
    rigid = [(pair.first, pair.second) for pair, is_still in zip(pairs, still.tolist(), strict=True) if is_still]
    return [group for group in joined_groups(range(topology.links), rigid) if len(group) > 1]


def _still(pairs: list[_Pair], topology: Topology, bodies: list[Body], motions: Matrix) -> NDArray[np.bool_]:
    """For each pair whether the two do not move against one another in any motion, beside the fastest near."""
    first = np.array([pair.first for pair in pairs], dtype=np.intp)
    second = np.array([pair.second for pair in pairs], dtype=np.intp)
    sizes = np.array([body.size for body in bodies])
    centres = np.array([body.centre for body in bodies])
    least = np.minimum(sizes[first], sizes[second])
    places = np.array([pair.at for pair in pairs], dtype=complex)
    slides = np.array([pair.slides for pair in pairs], dtype=bool)
    places[slides] = np.where(sizes[first] <= sizes[second], centres[first], centres[second])[slides]
    apart = np.zeros(len(pairs))
    speeds = np.zeros(topology.links)
    held = 3 * topology.frame
    for motion in motions:
        whole = np.concatenate([motion[:held], np.zeros(3), motion[held:]]).reshape(-1, 3)
        turns = whole[:, 0] / sizes
        velocities = whole[:, 1] + 1j * whole[:, 2]
        here, there = (velocities[ends] + 1j * turns[ends] * (places - centres[ends]) for ends in (first, second))
        apart += ((turns[second] - turns[first]) * least) ** 2 + abs(there - here) ** 2
        speeds = np.maximum(speeds, abs(whole).max(axis=1))
    nearby = fastest_nearby(topology, speeds)
    still: NDArray[np.bool_] = np.sqrt(apart) <= STILL_JOINT * np.maximum(nearby[first], nearby[second])
    return still
