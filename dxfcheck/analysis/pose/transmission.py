"""How well the drive's push passes on at the drawn pose: transmission angles, and speeds against the drive's.

The transmission angle at a pin is the acute angle between the link that pushes there and the line on which the pushed
link can answer: the line through its fixed pin, or the normal of the slide or slot it runs in (90 degrees less the
pressure angle). 90 degrees is best, 0 a dead centre.
Source: R.L. Norton, Design of Machinery, ch. 4, transmission angles and mechanical advantage (from memory).
"""

from __future__ import annotations

import math
from collections import defaultdict, deque
from collections.abc import Sequence
from functools import lru_cache

from dxfcheck.analysis.results import Advantage, DeadCentre, JointMotion, LinkMotion, Transmission
from dxfcheck.analysis.topology import TOPOLOGIES_KEPT, Topology, topology_of
from dxfcheck.linkage import Drive, Linkage
from dxfcheck.tolerances.analysis import REST_RELATIVE

__all__ = ["advantages", "transmissions"]


def transmissions(linkage: Linkage, pairs: Sequence[DeadCentre]) -> tuple[Transmission, ...]:
    """Where a link pushes another one on, away from the drives; in the order of the pins.

    ``pairs`` are all neighbours that some pose could keep from driving one another: dead_centres within pi/2.
    """
    if not linkage.drives:
        return ()
    driven = {link for drive in linkage.drives for link in (drive.link, drive.against)} - {linkage.frame}
    depth = _depths(topology_of(linkage), tuple(sorted(driven)))
    found = []
    for centre in pairs:
        if centre.driven is None:
            continue
        pusher = centre.links[0] if centre.links[1] == centre.driven else centre.links[1]
        if depth.get(pusher, math.inf) < depth.get(centre.driven, -math.inf):
            found.append(Transmission(centre.pin, pusher, centre.driven, centre.angle, centre.square))
    return tuple(found)


@lru_cache(maxsize=TOPOLOGIES_KEPT)
def _depths(topology: Topology, driven: tuple[int, ...]) -> dict[int, int]:
    """How many joints each moving link is away from a driven one, without passing the frame."""
    beside: defaultdict[int, set[int]] = defaultdict(set)
    for joint in topology.joints:
        beside[joint.first].add(joint.second)
        beside[joint.second].add(joint.first)
    depth = dict.fromkeys(driven, 0)
    waiting = deque(driven)
    while waiting:
        link = waiting.popleft()
        for other in sorted(beside[link]):
            if other != topology.frame and other not in depth:
                depth[other] = depth[link] + 1
                waiting.append(other)
    return depth


def advantages(
    linkage: Linkage, links: Sequence[LinkMotion], joints: Sequence[JointMotion], taken: Sequence[Drive]
) -> tuple[Advantage, ...]:
    """Drive speed over output speed of every link that turns or slides on the frame, other than the driven one.

    ``taken`` are the drives that count; with several there is no one drive to compare with, and nothing is given.
    """
    if len(taken) != 1 or not linkage.grounded or not taken[0].rate:
        return ()
    drive = taken[0]
    outputs: dict[tuple[int, bool], float | None] = {}
    for joint, motion in zip(linkage.joints, joints, strict=True):
        if linkage.frame in (joint.first, joint.second) and joint.kind in ("pin", "slide"):
            link = joint.second if joint.first == linkage.frame else joint.first
            turns = joint.kind == "pin"
            outputs[link, turns] = links[link].angular_velocity if turns else motion.slide_speed
    return tuple(
        Advantage(link, turns, _ratio(drive.rate, speed))
        for (link, turns), speed in sorted(outputs.items())
        if link != drive.link and speed is not None
    )


def _ratio(drive: float, output: float) -> float | None:
    return abs(drive / output) if abs(output) > REST_RELATIVE * abs(drive) else None
